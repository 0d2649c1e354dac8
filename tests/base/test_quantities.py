"""Quantities as written: digits, figures, kind, unit, and where reading stops."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from watchglass.base import dimensions as dim
from watchglass.base import units
from watchglass.base.quantities import Kind, Number, Quantity
from watchglass.base.scan import Fault, Found, read_quantity, scan_quantity, starts_quantity
from watchglass.base.units import UNITS

MEASURES = {"drop": 5e-8, "drops": 5e-8, "spatula tip": None, "spatula tips": None}


def found(text: str) -> Found:
    scanned = scan_quantity(text, 0, measures=MEASURES)
    assert isinstance(scanned, Found), scanned
    return scanned


def quantity(text: str) -> Quantity:
    read = read_quantity(text, measures=MEASURES)
    assert isinstance(read, Quantity), read
    return read


@pytest.mark.parametrize(
    ("digits", "value", "figures", "last_place"),
    [
        ("5", 5.0, 1, 0),
        ("2.50", 2.5, 3, -2),
        ("0.50", 0.5, 2, -2),
        ("0.050", 0.05, 2, -3),
        ("00.50", 0.5, 2, -2),
        (".5", 0.5, 1, -1),
        ("100", 100.0, 3, 0),
        ("100.0", 100.0, 4, -1),
        ("0", 0.0, 1, 0),
        ("0.00", 0.0, 1, -2),
        ("+5", 5.0, 1, 0),
        ("1.5e-3", 1.5e-3, 2, -4),
        ("1.50E3", 1500.0, 3, 1),
        ("2e3", 2000.0, 1, 3),
        ("1.5 × 10^-3", 1.5e-3, 2, -4),
        ("1.5×10^3", 1500.0, 2, 2),
        ("1.5 x 10^3", 1500.0, 2, 2),
        ("1.5×10⁻³", 1.5e-3, 2, -4),
        ("6.022 × 10²³", 6.022e23, 4, 20),
        ("1.5 × 10^−3", 1.5e-3, 2, -4),
    ],
)
def test_digits_as_written_carry_the_figures(
    digits: str, value: float, figures: int, last_place: int
) -> None:
    assert quantity(digits) == Quantity(
        digits, Kind.EXACT, Number(digits, value, figures, last_place), units.NONE
    )


@pytest.mark.parametrize(
    ("text", "kind", "first", "second", "bound"),
    [
        ("2–3 mL", Kind.RANGE, 2.0, 3.0, None),
        ("2—3 mL", Kind.RANGE, 2.0, 3.0, None),
        ("2-3 mL", Kind.RANGE, 2.0, 3.0, None),
        ("2 – 3 mL", Kind.RANGE, 2.0, 3.0, None),
        ("2 to 3 mL", Kind.RANGE, 2.0, 3.0, None),
        ("0.5-.8 mL", Kind.RANGE, 0.5, 0.8, None),
        ("3–3 mL", Kind.RANGE, 3.0, 3.0, None),
        ("-10 to -5 °C", Kind.RANGE, -10.0, -5.0, None),
        ("-10–-5 °C", Kind.RANGE, -10.0, -5.0, None),
        ("−10 °C", Kind.EXACT, -10.0, None, None),
        ("ca. 5 mL", Kind.ABOUT, 5.0, None, None),
        ("ca 5 mL", Kind.ABOUT, 5.0, None, None),
        ("about 5 mL", Kind.ABOUT, 5.0, None, None),
        ("approx. 5 mL", Kind.ABOUT, 5.0, None, None),
        ("~5 mL", Kind.ABOUT, 5.0, None, None),
        ("≈ 5 mL", Kind.ABOUT, 5.0, None, None),
        ("2.00 ± 0.05 g", Kind.TOLERANCE, 2.0, 0.05, None),
        ("2.00 +/- 0.05 g", Kind.TOLERANCE, 2.0, 0.05, None),
        (">= 10 mL", Kind.BOUND, 10.0, None, ">="),
        ("≥10 mL", Kind.BOUND, 10.0, None, ">="),
        ("<= 10 mL", Kind.BOUND, 10.0, None, "<="),
        ("≤ 10 mL", Kind.BOUND, 10.0, None, "<="),
        ("> 10 mL", Kind.BOUND, 10.0, None, ">"),
        ("<10 mL", Kind.BOUND, 10.0, None, "<"),
    ],
)
def test_kind_is_told_by_the_way_it_is_written(
    text: str, kind: Kind, first: float, second: float | None, bound: str | None
) -> None:
    read = quantity(text)

    assert (read.kind, read.number.value, read.bound) == (kind, first, bound)
    assert (read.second.value if read.second else None) == second
    assert read.text == text


@pytest.mark.parametrize(
    ("text", "low", "high", "middle", "figures"),
    [
        ("15 mL", 15e-6, 15e-6, 15e-6, 2),
        ("2.0–3 mL", 2e-6, 3e-6, 2.5e-6, 1),
        ("2.00 ± 0.05 g", 2e-3, 2e-3, 2e-3, 3),
        ("20 °C", 293.15, 293.15, 293.15, 2),
        ("79–84 °C", 352.15, 357.15, 354.65, 2),
        ("5.0 % w/v", 50.0, 50.0, 50.0, 2),
        ("80 %", 0.8, 0.8, 0.8, 2),
        ("3.0 M", 3000.0, 3000.0, 3000.0, 2),
    ],
)
def test_si_value_stands_beside_the_digits(
    text: str, low: float, high: float, middle: float, figures: int
) -> None:
    read = quantity(text)

    assert (read.si, read.si_high, read.middle) == pytest.approx((low, high, middle), rel=1e-14)
    assert read.figures == figures


@pytest.mark.parametrize(
    ("text", "end", "measured"),
    [
        ("15 mL acid", 5, True),
        ("15mL", 4, True),
        ("15\N{NO-BREAK SPACE}mL acid", 5, True),
        ("15\N{NARROW NO-BREAK SPACE}mL acid", 5, True),
        ("15\N{THIN SPACE}mL acid", 5, True),
        ("15 acid", 2, False),
        ("15 mLx", 2, False),
        ("15 mL-flask", 2, False),
        ("5 m2", 1, False),
        ("5 in A", 1, False),
        ("5 in mL", 1, False),
        ("5 in", 4, True),
        ("5 in)", 4, True),
        ("2-propanol", 1, False),
        ("3 drops indicator", 7, True),
        ("2 spatula tips salt", 14, True),
        ("2 spatula salt", 1, False),
        ("3 dropsy", 1, False),
        ("1 drop of water", 6, True),
        ("5 J/(g·K) x", 9, True),
        ("5 J/(g·K", 3, True),
        ("5 m^2", 5, True),
        ("5 m²", 4, True),
        ("5 L^(-1)", 8, True),
        ("5 % of it", 3, True),
        ("5% w/v salt", 6, True),
        ("2 h 30 min", 3, True),
        ("5. Stir", 1, False),
        ("1/2 g", 1, False),
        ("1e5", 3, False),
        ("1e5x", 1, False),
        ("5 mol L^-1", 5, True),
        ("2 - 3", 1, False),
    ],
)
def test_reading_stops_after_the_unit(text: str, end: int, measured: bool) -> None:
    scanned = found(text)

    assert (scanned.end, scanned.measured) == (end, measured)
    assert scanned.quantity.text == text[:end]


def test_offsets_count_from_the_start_of_the_whole_text() -> None:
    scanned = scan_quantity("add 15 mL acid", 4)

    assert isinstance(scanned, Found)
    assert scanned.end == 9


def test_nothing_beyond_the_end_is_looked_at() -> None:
    scanned = scan_quantity("15 mL/min", 0, 5)

    assert isinstance(scanned, Found)
    assert (scanned.quantity.text, scanned.end) == ("15 mL", 5)


@pytest.mark.parametrize("text", ["", " 5 g", "g", "acid", "-", "–5 g", "about", "ca. g", "^2"])
def test_nothing_is_read_where_no_number_begins(text: str) -> None:
    assert scan_quantity(text, 0) is None


@pytest.mark.parametrize(
    ("text", "starts"),
    [
        ("5", True), ("-5", True), ("−5", True), (".5", True), ("+5", True), ("½", True),
        ("ca. 5", True), ("about 5", True), ("~5", True), (">= 5", True), ("< 5", True),
        ("", False), ("acid", False), ("about that", False), ("calcium", False), ("- 5", False),
    ],
)  # fmt: skip
def test_start_of_a_quantity_is_told_from_a_word(text: str, starts: bool) -> None:
    assert starts_quantity(text, 0) is starts


@pytest.mark.parametrize(
    ("text", "dimension"),
    [
        ("1 g", dim.MASS), ("1 mL", dim.VOLUME), ("1 cm^3", dim.VOLUME), ("1 mmol", dim.AMOUNT),
        ("1 M", dim.CONCENTRATION), ("1 mol/L", dim.CONCENTRATION), ("1 g/L", dim.MASS_CONCENTRATION),
        ("1 g/mol", dim.MOLAR_MASS), ("1 mol/kg", dim.MOLALITY), ("1 °C", dim.TEMPERATURE),
        ("1 K", dim.DIFFERENCE), ("1 min", dim.TIME), ("1 mbar", dim.PRESSURE), ("1 mL/min", dim.RATE),
        ("1 rpm", dim.ROTATION), ("1 Hz", dim.FREQUENCY), ("1 nm", dim.LENGTH), ("1 cm²", dim.AREA),
        ("1 kJ", dim.ENERGY), ("1 kJ/mol", dim.MOLAR_ENERGY), ("1 W", dim.POWER), ("1 mA", dim.CURRENT),
        ("1 mV", dim.VOLTAGE), ("1 %", dim.SHARE), ("1 % w/w", dim.MASS_FRACTION),
        ("1 % v/v", dim.VOLUME_FRACTION), ("1 % w/v", dim.MASS_CONCENTRATION), ("1", dim.NUMBER),
        ("1 drop", dim.COUNT),
    ],
)  # fmt: skip
def test_every_place_can_ask_for_its_dimension(text: str, dimension: dim.Dimension) -> None:
    assert quantity(text).dimension == dimension


def test_temperature_point_and_difference_are_two_things() -> None:
    assert quantity("20 °C").dimension != quantity("20 K").dimension


@pytest.mark.parametrize(
    "text", ["-5 V", "-20 mA", "-56 kJ/mol", "-5 kJ", "-0.5", "-10 °C", "-3 °F"]
)
def test_what_can_be_negative_may_be(text: str) -> None:
    assert quantity(text).number.value < 0


@pytest.mark.parametrize("text", ["  2.50 g", "2.50 g  ", "\t2.50 g "])
def test_blanks_round_a_whole_quantity_do_not_count(text: str) -> None:
    assert quantity(text).text == "2.50 g"


@given(st.text(max_size=60))
def test_any_text_is_read_or_refused_within_its_bounds(text: str) -> None:
    scanned = scan_quantity(text, 0, measures=MEASURES)

    match scanned:
        case Found(read, end, _):
            assert 0 < end <= len(text)
            assert read.text == text[:end]
            assert math.isfinite(read.si)
        case Fault(_, start, end, message, _):
            assert 0 <= start < end <= len(text)
            assert message
        case None:
            assert not text[:1].isdecimal()


_PIECES = st.sampled_from(
    ["1", "0", "25", ".", ",", "-", "−", "–", " to ", "±", "+/-", "ca. ", ">=", "e", "e-3", " × 10^",
     "⁻³", "x", " ", "\xa0", "%", "w/v", "(", ")", "/", "·", "^", "2", "°", "C", "N", "½", "drops",
     *sorted(UNITS)]
)  # fmt: skip


@given(st.lists(_PIECES, max_size=8).map("".join))
def test_any_heap_of_pieces_is_read_or_refused_within_its_bounds(text: str) -> None:
    scanned = scan_quantity(text, 0, measures=MEASURES)

    if isinstance(scanned, Found):
        assert scanned.quantity.text == text[: scanned.end]
        assert math.isfinite(scanned.quantity.si)
        assert scanned.quantity.figures >= 1
    elif isinstance(scanned, Fault):
        assert 0 <= scanned.start < scanned.end <= len(text)


@given(st.decimals(min_value=0, max_value=10**6, places=3), st.sampled_from(sorted(UNITS)))
def test_what_is_written_is_read_back(number: object, symbol: str) -> None:
    text = f"{number:f} {symbol}"
    read = quantity(text)

    assert (read.number.value, read.unit.symbol) == (float(f"{number:f}"), symbol)
    assert read.number.last_place == -3
