"""What a set's own substance cannot well be, and what it may be: no false alarm at the edges."""

from __future__ import annotations

import pytest

from watchglass.base.spans import Source
from watchglass.shell.pipeline import surroundings

PATH = "substances/local.yml"


def told(entry: str) -> list[tuple[str, str]]:
    _, findings = surroundings({PATH: Source.of(PATH, entry)})[:2]
    return [(f.code.number, f.span.text) for f in findings]


def helped(entry: str) -> list[str]:
    _, findings = surroundings({PATH: Source.of(PATH, entry)})[:2]
    return [f.help or "" for f in findings]


def own(*fields: str, names: str = "[thing]") -> str:
    lines = "".join(f"  {line}\n" for line in fields)
    return f"thing-of-ours:\n  names: {names}\n{lines}  sources: from memory\n"


@pytest.mark.parametrize(
    "fields",
    [
        ("state: liquid", "density: 0.626 g/mL"),  # pentane, DIPPR in Perry
        ("state: liquid", "density: 3.32 g/mL"),  # diiodomethane, CRC
        ("state: liquid", "formula: Hg", "density: 13.55 g/mL"),
        ("state: solid", "density: 19.3 g/mL"),  # gold
        ("state: gas", "density: 1.84 g/L"),  # carbon dioxide at 20 °C
        ("state: gas", "density: 0.68 g/mL at -34 °C", "boils: -33.3 °C"),  # ammonia, liquid
        ("state: liquid", "melts: 25.7 °C", "boils: 82 °C", "flash: 11 °C"),  # tert-butanol
        ("state: liquid", "boils: 20.2 °C"),  # acetaldehyde
        ("state: solid", "melts: 18 °C"),
        ("density: 13.6 g/mL",),
    ],
)
def test_what_a_substance_may_well_be_is_left_alone(fields: tuple[str, ...]) -> None:
    assert told(own(*fields)) == []


@pytest.mark.parametrize(
    ("fields", "marked"),
    [
        (("state: liquid", "density: 789 g/mL"), "789 g/mL"),
        (("state: liquid", "density: 0.789 g/L"), "0.789 g/L"),
        (("state: liquid", "density: 13.6 g/mL"), "13.6 g/mL"),
        (("state: liquid", "density: 0.12 g/mL"), "0.12 g/mL"),
        (("state: gas", "density: 1.84 g/mL"), "1.84 g/mL"),
        (("state: solid", "density: 2160 g/mL"), "2160 g/mL"),
        (("melts: 122 °C", "boils: 78 °C"), "122 °C"),
        (("state: liquid", "boils: 78 °C", "flash: 120 °C"), "120 °C"),
        (("state: liquid", "melts: 122 °C"), "liquid"),
        (("state: solid", "melts: -12 °C"), "solid"),
        (("state: liquid", "boils: -33 °C"), "liquid"),
        (("state: gas", "boils: 78 °C"), "gas"),
    ],
)
def test_what_a_substance_cannot_well_be_is_found(fields: tuple[str, ...], marked: str) -> None:
    assert told(own(*fields)) == [("K109", marked)]


@pytest.mark.parametrize(
    ("fields", "written"),
    [
        (("state: liquid", "density: 789 g/mL"), "write `0.789 g/mL` if kg/m^3 was meant"),
        (("state: liquid", "density: 0.789 g/L"), "write `0.789 g/mL` if g/mL was meant"),
    ],
)
def test_slip_of_a_thousand_is_answered_with_the_other_unit(
    fields: tuple[str, ...], written: str
) -> None:
    (help_,) = helped(own(*fields))

    assert help_.startswith(written)


@pytest.mark.parametrize(
    ("names", "formula"),
    [
        ("[nickel sulfate hexahydrate of ours]", "NiSO4·6H2O"),
        ("[plaster hemihydrate]", "CaSO4·0.5H2O"),
        ("[citric acid monohydrate of ours]", "C6H10O8"),
        ('["salt of ours, anhydrous"]', "NiSO4"),
        ("[hydrazine hydrate of ours]", "N2H4·H2O"),
    ],
)
def test_name_and_formula_with_the_same_water_are_left_alone(names: str, formula: str) -> None:
    assert told(own(f"formula: {formula}", names=names)) == []


@pytest.mark.parametrize(
    ("names", "formula"),
    [
        ("[nickel sulfate hexahydrate of ours]", "NiSO4·7H2O"),
        ("[nickel sulfate hexahydrate of ours]", "NiSO4"),
        ('["nickel sulfate of ours, anhydrous"]', "NiSO4·6H2O"),
    ],
)
def test_name_and_formula_with_other_water_are_found(names: str, formula: str) -> None:
    assert told(own(f"formula: {formula}", names=names)) == [("K131", formula)]


def overriding(*fields: str) -> str:
    lines = "".join(f"  {line}\n" for line in fields)
    return f"ethanol:\n  names: [ethanol]\n{lines}  sources: from memory\n"


@pytest.mark.parametrize(
    "field",
    [
        "density: 0.79 g/mL",
        "density: 0.772 g/mL at 40 °C",  # 0.7903 at 20 °C, less a thousandth a kelvin
        "boils: 78–79 °C",
        "melts: -115 °C",
        "cas: 64-17-5",
        "formula: CH3CH2OH",
    ],
)
def test_figure_near_the_shipped_one_is_left_alone(field: str) -> None:
    assert told(overriding(field)) == []


@pytest.mark.parametrize(
    ("field", "words"),
    [
        ("density: 0.879 g/mL at 20 °C", "the density 0.879 g/mL at 20 °C here and 0.7903 g/mL"),
        ("boils: 87.3 °C", "the boiling point 87.3 °C here and 78.3 °C"),
        ("cas: 67-56-1", "the CAS number 67-56-1 here and 64-17-5"),
        ("formula: CH3OH", "the formula CH3OH here and C2H5OH"),
    ],
)
def test_figure_far_from_the_shipped_one_is_told_with_both(field: str, words: str) -> None:
    _, findings = surroundings({PATH: Source.of(PATH, overriding(field))})[:2]

    assert [f.code.number for f in findings] == ["K130"]
    assert words in findings[0].message


def test_new_key_is_compared_with_nothing() -> None:
    assert told(own("state: liquid", "density: 0.879 g/mL")) == []
