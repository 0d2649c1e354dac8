"""Figures that need no bench: values, dimensions, significant figures; and what is not known, and why."""

from __future__ import annotations

import pytest

from builders import NAMES, Judged, judged, step, surroundings
from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.base.spans import Source
from watchglass.base.units import customary
from watchglass.read.expressions import read_expression
from watchglass.run.evaluate import Evaluator, NotKnown, Result, Value, in_unit

SETTING = step(
    "Do {15 mL acid -> A; 2.50 g salt -> B; all mixture -> funnel; 10 mL ether -> tube-1}.",
    "Do {10 mL base -> A}.",
    "Do {5 mL base -> B}{label end}.",
)


def evaluated(
    expression: str, entry: Judged = SETTING, records: dict[str, Result] | None = None
) -> Result:
    source = Source.of("a.md", expression)
    node, findings = read_expression(source, 0, len(expression))
    assert findings == ()
    assert node is not None
    return Evaluator(
        entry.procedure, entry.case.usage, surroundings().catalogue, records or {}
    ).value(node)


def said(expression: str, unit: str = "", entry: Judged = SETTING) -> str:
    """Give a figure as it would be shown."""
    found = evaluated(expression, entry)
    assert isinstance(found, Value), found
    unit = unit or customary(found.dimension)
    number = in_unit(found, unit)
    assert number is not None
    return f"{shown(number, found.figures)} {unit}".strip()


@pytest.mark.parametrize(
    ("expression", "unit", "figure"),
    [
        # products and quotients keep the fewer figures
        ("2.50 g / 2.0 mL", "", "1.2 g/mL"),
        ("2.50 g * 2", "", "5.00 g"),
        ("2 * 3", "", "6.00000"),
        ("5.0 g / 2.500 g", "", "2.0"),
        ("5.0 g / 20.0 g", "%", "25 %"),
        ("3 * (5.0 g + 2.5 g)", "", "22 g"),
        ("- 5.0 g", "", "−5.0 g"),
        ("2.0 cm ^ 2", "cm^2", "4.0 cm^2"),
        ("2.0 cm ^ -1", "cm^-1", "0.50 cm^-1"),
        ("2 ^ 10", "", "1024.00"),
        ("2 ^ 0.5", "", "1.41421"),
        # sums keep the coarser place
        ("0.651 g - 0.650 g", "", "0.001 g"),
        ("100.0 g + 0.25 g", "", "100.2 g"),
        ("95 g + 6 g", "", "101 g"),
        ("15 mL + 2.5 mL", "", "18 mL"),
        ("5.0 g - 5.0 g", "", "0 g"),
        ("1 - 0.25", "", "0.750000"),
        ("1.00 L + 5 mL", "L", "1.00 L"),
        # temperatures
        ("20 °C + 5 K", "", "25 °C"),
        ("100.0 °C - 20.5 °C", "", "79.5 K"),
        ("20 °C - 25 °C", "", "−5 K"),
        ("20 °C - 5.5 K", "", "14 °C"),
        ("20 °C", "K", "290 K"),
        # functions
        ("mean(1.0 g, 2.0 g, 4.5 g)", "", "2.5 g"),
        ("min(2.0 g, 500 mg)", "mg", "500 mg"),
        ("max(2.0 g, 500 mg)", "", "2.0 g"),
        ("sqrt(16 cm^2)", "cm", "4.0 cm"),
        ("ln(10)", "", "2.30259"),
        ("log(1000)", "", "3.00000"),
        ("round(5.57, 1)", "", "5.60000"),
        ("convert(5.0 g, mg)", "mg", "5000 mg"),
        # things
        ("mass(salt)", "", "2.50 g"),
        ("mass(mixture)", "", "0.900 g"),
        ("volume(acid)", "", "15 mL"),
        ("volume(ether)", "", "10 mL"),
        ("moles(acid)", "", "45 mmol"),
        ("moles(salt)", "", "42.8 mmol"),
        ("moles(2.00 g benzoic-acid)", "", "16.4 mmol"),
        ("mass(5.0 mmol benzoic-acid)", "", "0.61 g"),
        ("moles(10.0 mL acid)", "", "30 mmol"),
        ("mass(benzocaine)", "mg", "517 mg"),
        ("moles(benzoic-acid)", "", "3.13 mmol"),
        ("strength(acid)", "", "3.0 mol/L"),
        ("molar-mass(salt)", "", "58.440 g/mol"),
        ('molar-mass("CuSO4·5H2O")', "", "249.68 g/mol"),
        ('molar-mass("hydrochloric acid")', "", "36.458 g/mol"),
        ("density(ether)", "", "0.7408 g/mL"),
        ("density(acid)", "", "1.050 g/mL"),  # of the solution: 3.0 M, 10.4 % by mass
        ("mass(acid)", "", "16 g"),
        ("melts(benzocaine)", "", "89.6 °C"),
        ("theoretical-yield(neutral)", "g", "2.6 g"),
    ],
)
def test_figure_has_value_unit_and_no_more_figures_than_go_in(
    expression: str, unit: str, figure: str
) -> None:
    assert said(expression, unit) == figure


@pytest.mark.parametrize(
    ("expression", "why"),
    [
        ("pH of A", "bench"),
        ("titre(end)", "bench"),
        ("recovered(salt in B)", "bench"),
        ("fraction(salt in B)", "bench"),
        ("salt in B", "bench"),
        ("recovered(salt in B) / theoretical-yield(neutral)", "bench"),
        ("moles(base)", "bench"),  # two portions: which is meant, the bench will tell
        ("mass(A)", "data"),
        ("volume(salt)", "data"),
        ("strength(salt)", "data"),
        ("density(salt)", "data"),
        ('molar-mass("zzz")', "data"),
        ("own", "measured"),
        ("own * 2", "measured"),
        ("2 - own", "measured"),
        ("5 g / 0", "data"),
        ("ln(0)", "data"),
        ("log(0 - 1)", "data"),
        ("sqrt(0 - 4)", "data"),
        ("(0 - 4) ^ 0.5", "data"),
        ("10 ^ 400", "data"),
    ],
)
def test_what_is_not_known_says_why(expression: str, why: str) -> None:
    assert evaluated(expression) == NotKnown(why)


def test_record_that_is_expected_gives_its_value_to_later_ones() -> None:
    records: dict[str, Result] = {"m": Value(5e-3, dim.MASS, 2)}

    assert evaluated("m / 2", records=records) == Value(2.5e-3, dim.MASS, 2)


def test_scale_reaches_what_a_pass_takes() -> None:
    entry = step("{2.50 g salt -> A}", front=f"{NAMES}scale: 2\n")

    assert said("mass(salt)", entry=entry) == "5.00 g"
    assert said("mass(2.50 g salt)", entry=entry) == "2.50 g"


def test_figure_of_a_repeated_step_is_that_of_one_pass() -> None:
    entry = step("{2.50 g salt -> A}", "{again 1, 2 more times}")

    assert said("mass(salt)", entry=entry) == "2.50 g"


def test_yield_is_that_of_the_product_named_first() -> None:
    front = (
        "materials: {x: ethanol}\nvessels: {A: beaker 50 mL}\nreactions: {r: 'C2H6O -> C2H4 + H2O'}"
    )
    entry = judged("1. {4.607 g x -> A}", front)
    found = evaluated("theoretical-yield(r)", entry)

    assert isinstance(found, Value)  # 0.1000 mol of ethene, 28.054 g/mol
    assert found.si == pytest.approx(2.8054e-3, rel=1e-3)


@pytest.mark.parametrize(
    ("value", "unit", "number"),
    [
        (Value(293.15, dim.TEMPERATURE, 2), "°C", 20.0),
        (Value(293.15, dim.TEMPERATURE, 2), "K", 293.15),
        (Value(0.0025, dim.MASS, 2), "mg", 2500.0),
        (Value(0.8, dim.SHARE, 2), "%", 80.0),
        (Value(0.8, dim.NUMBER, 2), "%", 80.0),
        (Value(0.0025, dim.MASS, 2), "", 0.0025),
        (Value(0.0025, dim.MASS, 2), "mL", None),
        (Value(0.0025, dim.MASS, 2), "zzz", None),
    ],
)
def test_value_is_given_in_a_unit_that_fits(value: Value, unit: str, number: float | None) -> None:
    assert in_unit(value, unit) == (pytest.approx(number) if number is not None else None)


SOLUTIONS = step(
    "Do {10.00 mL strong -> A; 10.00 g brine -> B; 5.00 mL spirit -> A; 5.00 mL tincture -> B}.",
    "Do {5.00 mL syrup -> A; 5.00 mL labelled -> A; 10.00 mL solvents -> B}.",
    front="materials:\n  strong: 36.0 % w/w hydrochloric acid\n  brine: saturated sodium chloride\n"
    "  spirit: 50 % v/v ethanol\n  tincture: 10 % w/w benzoic acid in ethanol\n"
    "  syrup: 40 % w/w sucrose\n"
    "  labelled: {is: 10 % w/w benzoic acid in ethanol, density: 0.820 g/mL}\n"
    "  solvents: {contains: {ethanol: 3 mL, water: 1 mL}, density: 0.860 g/mL}\n"
    "vessels: {A: beaker 100 mL, B: beaker 100 mL}",
)


@pytest.mark.parametrize(
    ("expression", "figure"),
    [
        ("strength(strong)", "11.6 mol/L"),  # 0.360 × 1179.1 g/L / 36.458 g/mol
        ("strength(brine)", "5.41 mol/L"),
        ("strength(spirit)", "8.6 mol/L"),  # 395 g/L / 46.07 g/mol
        ("strength(labelled)", "0.67 mol/L"),  # 82.0 g/L / 122.12 g/mol
        ("density(strong)", "1.179 g/mL"),
        ("density(spirit)", "0.9302 g/mL"),  # never that of pure ethanol
        ("density(labelled)", "0.820 g/mL"),
        ("density(solvents)", "0.860 g/mL"),
        ("mass(strong)", "11.79 g"),
        ("volume(brine)", "8.336 mL"),
        ("mass(labelled)", "4.10 g"),
        ("moles(strong)", "116 mmol"),
    ],
)
def test_figure_of_a_solution_goes_by_its_own_density(expression: str, figure: str) -> None:
    assert said(expression, entry=SOLUTIONS) == figure


@pytest.mark.parametrize(
    "expression",
    ["strength(tincture)", "density(tincture)", "mass(tincture)", "strength(syrup)", "mass(syrup)"],
)
def test_solution_without_a_density_has_no_such_figure(expression: str) -> None:
    assert evaluated(expression, SOLUTIONS) == NotKnown("data")


def test_mass_of_a_solution_is_by_its_tabulated_density() -> None:
    # 15 mL of 3.0 M hydrochloric acid, 1.0492 g/mL (10.4 % w/w, the table between 10 % and 15 %).
    found = evaluated("mass(acid)")

    assert isinstance(found, Value)
    assert found.si == pytest.approx(15e-6 * 1049.2, rel=2e-3)
