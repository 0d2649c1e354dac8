"""Labels that say a thing twice: density and strength, two strengths, a density and the catalogue."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from builders import faults, judged, only, places
from watchglass.shell.pipeline import check_texts

HCL = "37 % w/w hydrochloric acid"  # 1.184 g/mL by the table


def found(material: str) -> list[tuple[str, str]]:
    entry = judged("1. Here is {x}.", f"materials:\n  x: {material}")
    return [tuple(place) for place in places(faults(entry))]


@pytest.mark.parametrize(
    "material",
    [
        f"{{is: {HCL}, density: 1.18 g/mL}}",
        f"{{is: {HCL}, density: 1.19 g/mL}}",
        f"{{is: {HCL}, density: 1.2 g/mL}}",  # any density from 1.15 to 1.25
        f"{{is: {HCL}, density: 1180 kg/m^3}}",
        f"{{is: {HCL}, density: 1.18 g/mL at 25 °C}}",
        f"{{is: {HCL}, density: 1.18–1.19 g/mL}}",
        f"{{is: {HCL}, also: 12 M}}",
        f"{{is: {HCL}, also: 12.1 M}}",
        f"{{is: {HCL}, density: 1.19 g/mL, also: 12.1 mol/L}}",
        f"{{is: {HCL}, also: 438 g/L}}",
        f"{{is: {HCL}, also: 43.8 % w/v}}",
        "{is: 12.0 M hydrochloric acid, also: 37 % w/w}",
        "{is: 36–38 % w/w hydrochloric acid, also: 12 M}",
        "{is: 3.0 M hydrochloric acid, density: 1.05 g/mL}",
        "{is: 96 % w/w sulfuric acid, density: 1.84 g/mL, also: 18 M}",
        "{is: 50 % w/w sodium hydroxide, density: 1.53 g/mL, also: 19.1 M}",
        "{is: 28 % w/w ammonia, density: 0.90 g/mL, also: 15 M}",
        "{is: 70 % v/v ethanol, also: 62.4 % w/w}",
        "{is: 40 % w/w sucrose, density: 1.18 g/mL}",  # nothing to hold it against
        "{is: 10 % w/w benzoic acid in ethanol, density: 0.82 g/mL, also: 0.67 M}",
        "{is: 70 % w/w perchloric acid, also: 11.65 M}",
        "{is: saturated sodium chloride, density: 1.20 g/mL, also: 5.4 M}",
        "{is: ethanol, density: 0.79 g/mL}",
        "{is: benzoic acid, density: 1.27 g/mL}",
        "{composition: unknown, is: tea leaves, density: 1.0 g/mL}",
        "{contains: {ethanol: 3 mL, water: 1 mL}, density: 0.86 g/mL}",
    ],
)
def test_sound_label_passes(material: str) -> None:
    assert found(material) == []


@pytest.mark.parametrize(
    ("material", "code", "marked"),
    [
        (f"{{is: {HCL}, density: 1.81 g/mL}}", "K120", "1.81 g/mL"),
        (f"{{is: {HCL}, density: 1.16 g/mL}}", "K120", "1.16 g/mL"),
        ("{is: 98 % w/w sulfuric acid, density: 1.48 g/mL}", "K120", "1.48 g/mL"),
        ("{is: 3.0 M hydrochloric acid, density: 1.18 g/mL}", "K120", "1.18 g/mL"),
        ("{is: saturated sodium chloride, density: 1.02 g/mL}", "K120", "1.02 g/mL"),
        ("{is: ethanol, density: 0.97 g/mL}", "K120", "0.97 g/mL"),
        (f"{{is: {HCL}, also: 12.6 M}}", "S120", "12.6 M"),
        (f"{{is: {HCL}, density: 1.18 g/mL, also: 10.2 M}}", "S120", "10.2 M"),
        (f"{{is: {HCL}, also: 370 g/L}}", "S120", "370 g/L"),  # per cent by mass read as by volume
        ("{is: 12.0 M hydrochloric acid, also: 32 % w/w}", "S120", "32 % w/w"),
        ("{is: 3.0 M hydrochloric acid, also: 150 g/L}", "S120", "150 g/L"),
        ("{is: 70 % w/w perchloric acid, density: 1.67 g/mL, also: 9.2 M}", "S120", "9.2 M"),
        ("{is: 70 % w/w perchloric acid, also: 1.165 M}", "S120", "1.165 M"),  # of 0.17 g/mL
        ("{is: 70 % v/v ethanol, also: 70 % w/w}", "S120", "70 % w/w"),
        # both wrong together: one finding, of the strengths
        (f"{{is: {HCL}, density: 1.48 g/mL, also: 12.0 M}}", "S120", "12.0 M"),
        # a label that cannot be read
        (f"{{is: {HCL}, also: 12 %}}", "Q107", "12 %"),
        (f"{{is: {HCL}, also: 12}}", "Q104", "12"),
        (f"{{is: {HCL}, also: 12 g}}", "Q109", "12 g"),
        (f"{{is: {HCL}, also: 12 N}}", "Q106", "12 N"),
        (f"{{is: {HCL}, density: 1.18}}", "Q109", "1.18"),
        (f"{{is: {HCL}, density: 1.18 g}}", "Q109", "1.18 g"),
        (f"{{is: {HCL}, density: 1.18 g/mL at 25}}", "Q109", "25"),
        ("{is: ethanol, also: 17 M}", "N145", "17 M"),
        ("{contains: {ethanol: 3 mL, water: 1 mL}, also: 17 M}", "N145", "17 M"),
    ],
)
def test_label_at_odds_with_itself_is_found_once(material: str, code: str, marked: str) -> None:
    assert found(material) == [(code, marked)]


def test_finding_shows_both_sides() -> None:
    entry = judged(
        "1. Here is {x}.", f"materials:\n  x: {{is: {HCL}, density: 1.18 g/mL, also: 10.2 M}}"
    )
    finding = only(entry)

    assert finding.message == f"`{HCL}` comes to 12.0 M, and `10.2 M` is said of it, too"
    assert (
        finding.help
        == "compare strength and density with the label, and mend the one that is wrong"
    )


def test_density_finding_gives_the_tables_figure() -> None:
    entry = judged("1. Here is {x}.", f"materials:\n  x: {{is: {HCL}, density: 1.81 g/mL}}")

    assert only(entry).message == (
        "`1.81 g/mL` is given; a solution of this strength has 1.184 g/mL at 20 °C"
    )


@given(st.floats(min_value=0.5, max_value=36.0), st.floats(min_value=-0.019, max_value=0.019))
def test_molarity_within_two_per_cent_of_the_percentage_passes(percent: float, off: float) -> None:
    label = f"{percent:.3f} % w/w hydrochloric acid"
    facts = judged("1. Here is {x}.", f"materials:\n  x: {label}").procedure.materials["x"].solution
    assert facts is not None
    assert facts.per_volume is not None
    molar = facts.per_volume / 36.458 * (1 + off)

    assert found(f"{{is: {label}, also: {molar:.5f} M}}") == []


@given(st.floats(min_value=0.5, max_value=36.0), st.sampled_from([-0.3, -0.03, 0.03, 0.3]))
def test_molarity_three_per_cent_away_is_found(percent: float, off: float) -> None:
    label = f"{percent:.3f} % w/w hydrochloric acid"
    facts = judged("1. Here is {x}.", f"materials:\n  x: {label}").procedure.materials["x"].solution
    assert facts is not None
    assert facts.per_volume is not None
    molar = facts.per_volume / 36.458 * (1 + off)

    assert [code for code, _ in found(f"{{is: {label}, also: {molar:.5f} M}}")] == ["S120"]


# ------------------------------------------------------------------------------ stocks


def of_stocks(stock: str, material: str = "") -> list[tuple[str, str]]:
    """Check a stock and, where there is one, a procedure that uses it."""
    texts = {"stocks.yml": f"strong:\n  {stock}\n"}
    if material:
        texts["procedures/t-01.md"] = (
            f"---\ntitle: A procedure\ncode: T-01\nmaterials:\n  x: {material}\n"
            "vessels: {A: beaker 100 mL}\n---\n\n1. Take {5 mL x -> A} and keep {A}.\n"
        )
    return [(f.code.number, f.span.text) for f in check_texts(texts) if f.code.number[0] in "KSQN"]


@pytest.mark.parametrize(
    ("beside", "expected"),
    [
        ("also: 12.1 M", []),
        ("density: 1.18 g/mL\n  also: 12 M", []),
        ("density: 1.18 g/mL at 25 °C", []),
        ("also: 10.2 M", [("S120", "10.2 M")]),
        ("density: 1.48 g/mL", [("K120", "1.48 g/mL")]),
        ("also: 12 %", [("Q107", "12 %")]),
    ],
)
@pytest.mark.parametrize("material", ["", "strong", "{is: strong}"])
def test_label_of_a_stock_is_judged_once_where_it_stands(
    beside: str, expected: list[tuple[str, str]], material: str
) -> None:
    assert of_stocks(f"material: {HCL}\n  {beside}", material) == expected


def test_what_a_material_says_goes_over_the_label_of_its_stock() -> None:
    stock = f"material: {HCL}\n  density: 1.18 g/mL"

    assert of_stocks(stock, "{is: strong, density: 1.48 g/mL}") == [("K120", "1.48 g/mL")]
