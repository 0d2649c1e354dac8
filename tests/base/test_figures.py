"""Computed numbers become digits: rounding, noughts, powers, never more figures than asked."""

from __future__ import annotations

import math
from decimal import Decimal

import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from watchglass.base.figures import MOST_FIGURES, minus, rounded, shown
from watchglass.base.scan import Found, scan_quantity

finite = st.floats(min_value=1e-25, max_value=1e25)


@pytest.mark.parametrize(
    ("value", "figures", "digits"),
    [
        # half to even, on the shortest decimal of the float
        (2.5, 1, "2"),
        (3.5, 1, "4"),
        (0.125, 2, "0.12"),
        (0.375, 2, "0.38"),
        (2.675, 3, "2.68"),  # the float is 2.67499999…; the digits typed are meant
        (1.005, 3, "1.00"),
        (-2.5, 1, "−2"),
        # carries
        (9.96, 2, "10"),
        (9.96, 3, "9.96"),
        (99.5, 2, "100"),
        (0.9996, 3, "1.00"),
        (999999.9, 6, "1.00000 × 10^6"),
        # noughts
        (0.0, 3, "0"),
        (-0.0, 3, "0"),
        (2.0, 3, "2.00"),
        (0.05, 3, "0.0500"),
        (15.0, 2, "15"),
        (15.0, 4, "15.00"),
        (1249.7, 2, "1200"),
        (1249.7, 4, "1250"),
        (123456.0, 1, "100000"),
        # powers of ten: from 1e-4 up to 1e6 in plain digits
        (1e-4, 2, "0.00010"),
        (1e-5, 2, "1.0 × 10^−5"),
        (9.996e-5, 2, "0.00010"),
        (9.9e-6, 2, "9.9 × 10^−6"),
        (999999.0, 6, "999999"),
        (1e6, 2, "1.0 × 10^6"),
        (6.02214076e23, 3, "6.02 × 10^23"),
        (-1.5e-9, 2, "−1.5 × 10^−9"),
        # bounds of figures
        (math.pi, 0, "3"),
        (math.pi, -4, "3"),
        (math.pi, 6, "3.14159"),
        (math.pi, 12, "3.14159"),
    ],
)
def test_number_is_shown_with_its_figures(value: float, figures: int, digits: str) -> None:
    assert shown(value, figures) == digits


@pytest.mark.parametrize("value", [math.nan, math.inf, -math.inf])
def test_what_is_no_number_is_shown_as_unknown(value: float) -> None:
    assert shown(value, 3) == "unknown"


@pytest.mark.parametrize(
    ("value", "figures", "digits"),
    [(0.0031832, 2, "0.0032"), (1249.7, 3, "1.25E+3"), (9.96, 2, "10"), (0.0, 2, "0")],
)
def test_rounding_gives_just_those_digits(value: float, figures: int, digits: str) -> None:
    assert str(rounded(value, figures)) == digits


def test_hyphen_becomes_a_minus_sign() -> None:
    assert minus("-1.5 × 10^-9") == "−1.5 × 10^−9"


def test_last_bit_of_a_float_never_shows() -> None:
    assert shown(0.1 + 0.2, 6) == "0.300000"
    assert shown(3 * 1.1, 6) == "3.30000"


def _significant(digits: str) -> int:
    mantissa = digits.replace("−", "").partition(" ×")[0]
    whole = mantissa.replace(".", "").lstrip("0")
    return len(whole if "." in mantissa else whole.rstrip("0") or "0")


@given(finite, st.integers(1, 9))
def test_no_more_figures_are_shown_than_asked_for(value: float, figures: int) -> None:
    assert _significant(shown(value, figures)) <= min(figures, MOST_FIGURES)


@given(finite, st.integers(1, MOST_FIGURES))
def test_what_is_shown_is_within_half_a_unit_of_the_last_figure(value: float, figures: int) -> None:
    read = scan_quantity(shown(value, figures).replace("−", "-"), 0)
    assert isinstance(read, Found)
    half = Decimal(5).scaleb(Decimal(repr(value)).adjusted() - figures)
    off = abs(Decimal(read.quantity.number.text.replace(" × 10^", "e")) - Decimal(repr(value)))

    assert off <= half


@given(finite, st.integers(1, MOST_FIGURES))
def test_what_is_shown_reads_back_whole(value: float, figures: int) -> None:
    digits = shown(value, figures)
    read = scan_quantity(digits, 0)

    assert isinstance(read, Found)
    assert read.end == len(digits)


@given(finite, st.integers(1, MOST_FIGURES))
def test_rounding_twice_changes_nothing(value: float, figures: int) -> None:
    once = float(rounded(value, figures))

    assert shown(once, figures) == shown(value, figures)


@given(finite, finite, st.integers(1, MOST_FIGURES))
def test_rounding_keeps_the_order(one: float, other: float, figures: int) -> None:
    assume(one <= other)

    assert rounded(one, figures) <= rounded(other, figures)


@given(finite, st.integers(1, MOST_FIGURES))
def test_minus_sign_changes_nothing_else(value: float, figures: int) -> None:
    assert shown(-value, figures) == "−" + shown(value, figures)
