"""What can be read in two ways is refused at its column, with the way to write it."""

from __future__ import annotations

import pytest

from watchglass.base.quantities import Quantity
from watchglass.base.scan import Fault, read_quantity, scan_quantity


def fault(text: str) -> Fault:
    scanned = scan_quantity(text, 0)
    assert isinstance(scanned, Fault), scanned
    return scanned


#: Text, code, what is underlined, what the help must say.
FAULTS = [
    ("1,5 mL", "Q102", "1,5", "write `1.5`"),
    ("0,50 mL", "Q102", "0,50", "write `0.50`"),
    ("0,500 mL", "Q102", "0,500", "write `0.500`"),
    ("1,2345 mL", "Q102", "1,2345", "write `1.2345`"),
    ("1,000 mL", "Q102", "1,000", "write `1000` without commas, or a decimal point for the comma"),
    ("1,250,000 mL", "Q102", "1,250,000", "write `1250000` without commas"),
    ("1,234.5 mL", "Q102", "1,234.5", "write `1234.5`"),
    ("1.000,5 mL", "Q102", "1.000,5", "write `1000.5`"),
    ("1 000 mL", "Q103", "1 000", "write `1000`"),
    ("1 000 000 mL", "Q103", "1 000 000", "write `1000000`"),
    ("12 345 mL", "Q103", "12 345", "write `12345`"),
    ("1 234,5 mL", "Q103", "1 234,5", "write `1234.5`"),
    ("1'000 mL", "Q103", "1'000", "write `1000`"),
    ("1’000.5 mL", "Q103", "1’000.5", "write `1000.5`"),
    ("1\N{NO-BREAK SPACE}000 mL", "Q103", "1\N{NO-BREAK SPACE}000", "write `1000`"),
    ("1\N{THIN SPACE}000 mL", "Q103", "1\N{THIN SPACE}000", "write `1000`"),
    ("½ g", "Q101", "½", "write it with a decimal point, as in `3.5`"),
    ("3½ g", "Q101", "3½", "write it with a decimal point, as in `3.5`"),
    ("1.2.3 g", "Q101", "1.2.3", "take one out"),
    ("3 x 10 mL", "Q101", "3 x 10", "say with `again` how often"),
    ("3×10 mL", "Q101", "3×10", "say with `again` how often"),
    ("2*5 mL", "Q101", "2*5", "say with `again` how often"),
    ("2.00 ± g", "Q101", "±", "write `2.00 ± 0.05 g`"),
    ("1e99 g", "Q101", "1e99", "powers of ten within 30"),
    ("1e-999999 g", "Q101", "1e-999999", "powers of ten within 30"),
    ("1" * 41 + " g", "Q101", "1" * 41, "keep to 40 digits"),
    ("5 ± 1,5 g", "Q102", "1,5", "write `1.5`"),
    ("2–1 000 g", "Q103", "1 000", "write `1000`"),
    ("3–2 mL", "Q116", "3–2", "write `2–3`"),
    ("-5 to -10 °C", "Q116", "-5 to -10", "write `-10–-5`"),
    ("6 N", "Q106", "6 N", "write the amount concentration: `6 M`"),
    ("0.10 N acid", "Q106", "0.10 N", "`0.10 M`"),
    ("20 °", "Q108", "°", "write `°C` for a temperature"),
    ("20 °X", "Q108", "°X", "write `°C` for a temperature"),
    ("20 ° C", "Q108", "° C", "write `°C`"),
    ("20 ° F", "Q108", "° F", "write `°F`"),
    ("20 C", "Q108", "C", "write `°C`"),
    ("68 F", "Q108", "F", "write `°F`"),
    ("5 k", "Q108", "k", "write `K`"),
    ("5 G", "Q108", "G", "write `g`"),
    ("5 cc", "Q105", "cc", "write `mL`"),
    ("5 gr", "Q105", "gr", "write `g`"),
    ("5 grams", "Q105", "grams", "write `g`"),
    ("5 ML", "Q105", "ML", "write `mL`"),
    ("5 mcg", "Q105", "mcg", "write `µg`"),
    ("5 mins", "Q105", "mins", "write `min`"),
    ("5 molar", "Q105", "molar", "write `M`"),
    ("5 percent", "Q105", "percent", "write `%`"),
    ("5 % m/m", "Q105", "% m/m", "write `% w/w`"),
    ("5 % (w/v)", "Q105", "% (w/v)", "write `% w/v`"),
    ("5 % vol", "Q105", "% vol", "write `% v/v`"),
    ("5 % wt", "Q105", "% wt", "write `% w/w`"),
    ("5 g/foo", "Q105", "foo", "take one of the units in the list"),
    ("5 g/mLs", "Q105", "mLs", "write `mL`"),
    ("5 °C/min", "Q105", "°C/min", "write the difference in kelvin: `K/min`"),
    ("-5 g", "Q110", "-5 g", "take the minus sign out"),
    ("−5 mL", "Q110", "−5 mL", "take the minus sign out"),
    ("-3 %", "Q110", "-3 %", "take the minus sign out"),
    ("-3 min", "Q110", "-3 min", "take the minus sign out"),
    ("-1 to 2 M", "Q110", "-1 to 2 M", "take the minus sign out"),
    ("-5 K", "Q111", "-5 K", "absolute zero is -273.15 °C, 0 K"),
    ("-274 °C", "Q111", "-274 °C", "absolute zero is -273.15 °C, 0 K"),
    ("-460 °F", "Q111", "-460 °F", "absolute zero is -273.15 °C, 0 K"),
]


@pytest.mark.parametrize(("text", "code", "marked", "help_"), FAULTS)
def test_spelling_of_two_readings_is_refused(text: str, code: str, marked: str, help_: str) -> None:
    refused = fault(text)

    assert refused.code.number == code
    assert text[refused.start : refused.end] == marked
    assert help_ in (refused.help or "")


@pytest.mark.parametrize(("text", "code", "marked", "help_"), FAULTS)
def test_fault_is_found_at_its_place_in_a_sentence_too(
    text: str, code: str, marked: str, help_: str
) -> None:
    del help_
    sentence = f"Then take {text}."
    refused = scan_quantity(sentence, 10, 10 + len(text))

    assert isinstance(refused, Fault)
    assert refused.code.number == code
    assert sentence[refused.start : refused.end] == marked


#: Faults whose help gives the number or the unit itself.
MENDED = [
    pytest.param(text.replace(marked, help_.split("`")[1]), id=text)
    for text, code, marked, help_ in FAULTS
    if code in {"Q102", "Q103", "Q105", "Q108", "Q116"} and help_.startswith("write `")
]


@pytest.mark.parametrize("text", MENDED)
def test_what_the_help_says_can_be_typed(text: str) -> None:
    assert isinstance(read_quantity(text), Quantity)


@pytest.mark.parametrize(
    ("text", "code", "marked"),
    [
        ("acid", "Q101", "acid"),
        ("", "Q101", ""),
        ("5 g acid", "Q101", "acid"),
        ("5 g, dry", "Q101", ", dry"),
        ("5 zorkmids", "Q105", "zorkmids"),
        ("2 h 30 min", "Q101", "30 min"),
        ("5 mx", "Q105", "mx"),
        ("5 g-x", "Q105", "g"),
        ("5 mol L^-1", "Q101", "L^-1"),
        ("5 J/(g·K", "Q101", "/(g·K"),
        ("  1,5 g ", "Q102", "1,5"),
    ],
)
def test_text_that_is_to_be_one_quantity_holds_nothing_else(
    text: str, code: str, marked: str
) -> None:
    refused = read_quantity(text)

    assert isinstance(refused, Fault)
    assert (refused.code.number, text[refused.start : refused.end]) == (code, marked)


@pytest.mark.parametrize(
    ("text", "help_"),
    [
        ("5 mmoll", "did you mean `mmol` or `mol`?"),
        ("5 kPaa", "did you mean `kPa`?"),
        ("5 zorkmids", "take one of the units in the list, such as `g`, `mL`, `mmol`, `min`"),
    ],
)
def test_unknown_unit_is_met_with_the_nearest_ones(text: str, help_: str) -> None:
    refused = read_quantity(text)

    assert isinstance(refused, Fault)
    assert refused.help == help_


def test_mended_comma_keeps_its_figures() -> None:
    mended = read_quantity((fault("2,50 g").help or "").split("`")[1] + " g")

    assert isinstance(mended, Quantity)
    assert mended.figures == 3
