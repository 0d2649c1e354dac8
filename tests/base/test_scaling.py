"""Scaled figures: what a person would measure, never finer than can be measured."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from watchglass.base.quantities import Quantity  # noqa: TC001 - hypothesis reads the types
from watchglass.base.scaling import CHANGE, scaled
from watchglass.base.scan import Fault, read_quantity

MEASURES = {"drop": 5e-8, "drops": 5e-8, "spatula tip": None, "spatula tips": None}


def read(text: str) -> Quantity:
    found = read_quantity(text, measures=MEASURES)
    assert not isinstance(found, Fault)
    return found


def times(text: str, factor: float, step: float | None = None) -> str:
    return scaled(read(text), factor, step=step).quantity.text


@pytest.mark.parametrize(
    ("written", "factor", "text"),
    [
        ("15 mL", 2, "30 mL"),
        ("15 mL", 1.5, "22.5 mL"),
        ("0.900 g", 0.5, "0.450 g"),
        ("25.00 mL", 2, "50.00 mL"),
        ("10 mL", 1 / 3, "3.3 mL"),
        ("0.65 g", 3, "1.95 g"),
        ("2–3 mL", 1.5, "3.0–4.5 mL"),
        ("ca. 5 mL", 1 / 3, "ca. 1.7 mL"),
        (">= 10 mL", 3, ">= 30 mL"),
        ("0–5 mL", 2, "0–10 mL"),
        ("0.0–2.5 mL", 2, "0.0–5.0 mL"),
        ("2.00 ± 0.05 g", 2, "4.00 ± 0.1 g"),
        ("1.5e-3 mol", 0.01, "1.5 × 10^−5 mol"),
        ("3 drops", 2, "6 drops"),
        ("3 drops", 0.1, "1 drop"),
        ("1 drop", 3, "3 drops"),
    ],
)
def test_scaled_figure_is_what_a_person_would_measure(
    written: str, factor: float, text: str
) -> None:
    assert times(written, factor) == text


@pytest.mark.parametrize(
    ("written", "factor", "step", "text"),
    [
        ("15 mL", 1.5, 1e-6, "22 mL"),
        ("15 mL", 1.5, 5e-7, "22.5 mL"),
        ("1.00 g", 0.123, 1e-5, "0.12 g"),
        ("10 mL", 0.31, 2e-7, "3.2 mL"),
        ("0.50 g", 0.001, 1e-5, "0.01 g"),
    ],
)
def test_scaled_figure_stands_on_a_step_that_can_be_measured(
    written: str, factor: float, step: float, text: str
) -> None:
    assert times(written, factor, step) == text


def test_share_that_rounding_changes_is_told() -> None:
    assert scaled(read("0.50 g"), 0.03, step=1e-5).change == pytest.approx(1 / 3)


def test_exact_result_has_not_been_changed() -> None:
    assert scaled(read("0.50 g"), 0.5, step=1e-5).change == 0


QUANTITIES = st.builds(
    lambda digits, place, unit: read(f"{digits / 10**place:.{place}f} {unit}"),
    st.integers(1, 9999),
    st.integers(0, 3),
    st.sampled_from(("g", "mL", "mmol", "L")),
)


@given(QUANTITIES, st.floats(0.1, 10))
def test_rounding_changes_an_amount_by_a_hundredth_at_most(
    quantity: Quantity, factor: float
) -> None:
    found = scaled(quantity, factor)

    exact = quantity.si * factor
    assert abs(found.quantity.si - exact) <= CHANGE * exact * (1 + 1e-9)


@given(QUANTITIES, st.floats(0.1, 10))
def test_text_says_the_value_and_reads_back(quantity: Quantity, factor: float) -> None:
    found = scaled(quantity, factor).quantity

    again = read(found.text.replace("−", "-"))
    assert again.si == pytest.approx(found.si, rel=1e-12)
    assert again.number.last_place == found.number.last_place


@given(QUANTITIES)
def test_factor_one_changes_no_value(quantity: Quantity) -> None:
    assert scaled(quantity, 1).quantity.si == pytest.approx(quantity.si, rel=1e-12)


@given(QUANTITIES, st.floats(0.1, 10))
def test_no_more_than_two_figures_are_gained(quantity: Quantity, factor: float) -> None:
    found = scaled(quantity, factor).quantity

    assert found.figures <= quantity.figures + 2
