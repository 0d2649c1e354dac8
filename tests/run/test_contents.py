"""How much of each substance a quantity of a material brings, and what is said where it cannot be told."""

from __future__ import annotations

import pytest

from builders import golden, judged
from watchglass.base import dimensions as dim
from watchglass.resolve import model
from watchglass.run.content import Content, Missing, contents
from watchglass.run.roles import material_contents

SI = {dim.MASS: 1e-3, dim.VOLUME: 1e-6, dim.AMOUNT: 1e-3, dim.COUNT: 1.0}


def material(description: str) -> model.Material:
    return judged("1. Here is {x}.", f"materials:\n  x: {description}").procedure.materials["x"]


def held(description: str, value: float, dimension: dim.Dimension, figures: int = 4) -> object:
    """Work out what so many g, mL or mmol of a material hold."""
    return contents(material(description), dimension, value * SI[dimension], figures)


def mmol(found: object) -> dict[str, float]:
    assert isinstance(found, tuple)
    return {c.substance.key: c.moles * 1e3 for c in found}


# Molar masses by the IUPAC standard atomic weights of 2021, added up by hand: NaCl 58.440,
# HCl 36.458, NaOH 39.997, H2SO4 98.072, ethanol 46.069, KHC8H4O4 204.222, NaHCO3 84.006.
@pytest.mark.parametrize(
    ("description", "value", "dimension", "expected"),
    [
        ("sodium chloride", 1.0, dim.MASS, {"sodium-chloride": 1e3 / 58.440}),
        ("sodium chloride", 5.0, dim.AMOUNT, {"sodium-chloride": 5.0}),
        ("potassium hydrogen phthalate", 0.65, dim.MASS, {"potassium-hydrogen-phthalate": 3.1828}),
        ("3.0 M hydrochloric acid", 15.0, dim.VOLUME, {"hydrogen-chloride": 45.0}),
        ("1–2 M hydrochloric acid", 10.0, dim.VOLUME, {"hydrogen-chloride": 15.0}),
        ("5.0 % w/v sodium hydrogencarbonate", 15.0, dim.VOLUME, {"sodium-hydrogencarbonate": 8.928}),
        ("10 g/L sodium hydroxide", 100.0, dim.VOLUME, {"sodium-hydroxide": 25.002}),
        ("98 % w/w sulfuric acid", 1.0, dim.MASS, {"sulfuric-acid": 9.9926}),
        ("3.0 M hydrochloric acid", 5.0, dim.AMOUNT, {"hydrogen-chloride": 5.0}),
        ("{contains: {sodium-chloride: 0.10 M, potassium-chloride: 0.20 M}, in: water}", 10.0,
         dim.VOLUME, {"sodium-chloride": 1.0, "potassium-chloride": 2.0}),
        ("{contains: {sodium-chloride: 1 g, sodium-hydroxide: 3 g}}", 4.0, dim.MASS,
         {"sodium-chloride": 17.112, "sodium-hydroxide": 75.006}),
    ],
)  # fmt: skip
def test_amount_follows_from_mass_strength_or_ratio(
    description: str, value: float, dimension: dim.Dimension, expected: dict[str, float]
) -> None:
    assert mmol(held(description, value, dimension)) == pytest.approx(expected, rel=2e-4)


def test_volume_of_a_liquid_becomes_a_mass_by_its_density() -> None:
    ether = material("tert-butyl methyl ether")
    (found,) = contents(ether, dim.VOLUME, 30e-6, 2)  # type: ignore[misc]
    assert isinstance(found, Content)
    assert isinstance(ether.composition, model.Pure)
    density = ether.composition.substance.density
    assert density is not None

    assert found.mass == pytest.approx(30e-6 * density.value.si, rel=1e-12)
    assert found.moles * 88.150 == pytest.approx(found.mass * 1e3, rel=1e-4)


def test_mixture_by_volume_needs_the_density_of_each_part() -> None:
    amounts = mmol(held("{contains: {ethanol: 1 mL, water: 1 mL}}", 2.0, dim.VOLUME))

    assert amounts["water"] == pytest.approx(0.9982 / 18.015 * 1e3, rel=1e-3)


@pytest.mark.parametrize(
    ("description", "value", "dimension", "what", "key"),
    [
        ("benzocaine", 1.0, dim.VOLUME, "density", "benzocaine"),
        ("40 % w/w sucrose", 1.0, dim.VOLUME, "solution density", "sucrose"),
        ("10 % w/w benzoic acid in ethanol", 1.0, dim.VOLUME, "solution density", "benzoic-acid"),
        ("3.0 M glucose", 1.0, dim.MASS, "solution density", "glucose"),
        ("saturated sodium bromide in ethanol", 10.0, dim.VOLUME, "solubility", "sodium-bromide"),
        ("sodium chloride", 3.0, dim.COUNT, "size", "sodium-chloride"),
        ("3.0 M hydrochloric acid", 3.0, dim.COUNT, "size", "hydrogen-chloride"),
        ("{composition: unknown}", 1.0, dim.MASS, "composition", None),
        ("{from: OC-03}", 1.0, dim.MASS, "composition", None),
        ("{one-of: {A: caffeine, B: benzoic-acid}}", 1.0, dim.MASS, "composition", None),
        ("{contains: {benzocaine: 1 mol, benzoic-acid: 1 mol}}", 1.0, dim.VOLUME, "density", None),
    ],
)
def test_what_is_missing_is_said_and_never_taken_for_nought(
    description: str, value: float, dimension: dim.Dimension, what: str, key: str | None
) -> None:
    found = held(description, value, dimension)

    assert isinstance(found, Missing)
    assert found.what == what
    assert (found.substance.key if found.substance else None) == key


# 36 % w/w, 1.1791 g/mL: 424.5 g/L. 26.4 % w/w sodium chloride, 1.2 g/mL: CRC Handbook, 102nd ed.
@pytest.mark.parametrize(
    ("description", "value", "dimension", "expected"),
    [
        ("36 % w/w hydrochloric acid", 10.0, dim.VOLUME, {"hydrogen-chloride": 116.43}),
        ("6.0 M sodium hydroxide", 12.19, dim.MASS, {"sodium-hydroxide": 60.1}),
        ("saturated sodium chloride", 10.0, dim.VOLUME, {"sodium-chloride": 54.0}),
        ("5 % w/w copper(II) sulfate", 10.0, dim.VOLUME, {"copper-ii-sulfate": 3.13}),
        ("{is: 37 % w/w hydrochloric acid, density: 1.19 g/mL}", 10.0, dim.VOLUME,
         {"hydrogen-chloride": 120.8}),
        ("{contains: {ethanol: 3 mL, water: 1 mL}}", 3.366, dim.MASS,
         {"ethanol": 51.4, "water": 55.4}),
        ("{contains: {ethanol: 1 mol, water: 1 mol}}", 6.407, dim.MASS,
         {"ethanol": 100.0, "water": 100.0}),
    ],
)  # fmt: skip
def test_density_of_the_solution_carries_over_between_mass_and_volume(
    description: str, value: float, dimension: dim.Dimension, expected: dict[str, float]
) -> None:
    assert mmol(held(description, value, dimension)) == pytest.approx(expected, rel=5e-3)


@pytest.mark.parametrize(
    ("description", "source"),
    [
        ("36 % w/w hydrochloric acid", "table"),
        ("3.0 M hydrochloric acid", "table"),
        ("5 % w/w copper(II) sulfate", "water"),
        ("{is: 37 % w/w hydrochloric acid, density: 1.19 g/mL}", "given"),
        ("40 % w/w sucrose", ""),
    ],
)
def test_density_says_where_it_is_from(description: str, source: str) -> None:
    facts = material(description).solution

    assert facts is not None
    assert facts.source == source


def test_what_rests_on_an_assumed_density_shows_two_figures() -> None:
    (found,) = held("5.00 % w/w copper(II) sulfate", 10.0, dim.VOLUME)  # type: ignore[misc]

    assert found.figures == 2


@pytest.mark.parametrize(
    ("description", "figures", "shown"),
    [
        ("sodium chloride", 2, 2),
        ("sodium chloride", 9, 5),  # no finer than the catalogue's molar mass
        ("3.0 M hydrochloric acid", 4, 2),
        ("3.000 M hydrochloric acid", 2, 2),
    ],
)
def test_figures_are_no_more_than_what_goes_in_allows(
    description: str, figures: int, shown: int
) -> None:
    dimension = dim.MASS if "chloride" in description else dim.VOLUME
    (found,) = contents(material(description), dimension, 1e-3, figures)  # type: ignore[misc]

    assert isinstance(found, Content)
    assert found.figures == shown


# Computed independently of the program: 0.900 g of an equimolar mixture of benzocaine (165.19),
# benzoic acid (122.12) and 9-fluorenone (180.21 g/mol).
@pytest.mark.parametrize(
    ("key", "milligrams"),
    [("benzocaine", 318.0), ("benzoic-acid", 235.1), ("9-fluorenone", 346.9)],
)
def test_parted_mixture_holds_equal_amounts_of_its_three(key: str, milligrams: float) -> None:
    case = golden("oc-04").case
    found = material_contents(case.procedure.materials["mixture"], case.usage["mixture"])
    assert isinstance(found, tuple)
    (component,) = (c for c in found if c.substance.key == key)

    assert component.moles * 1e3 == pytest.approx(1.925, abs=5e-4)
    assert component.mass * 1e6 == pytest.approx(milligrams, abs=0.05)
    assert component.figures == 3


def test_material_taken_by_mass_and_by_volume_is_not_summed() -> None:
    case = judged(
        "1. {5 mL x -> A} {1 g x -> A}", "materials: {x: ethanol}\nvessels: {A: beaker 50 mL}"
    ).case

    assert material_contents(case.procedure.materials["x"], case.usage["x"]) == Missing("sum", None)


def test_counted_material_has_an_unknown_size() -> None:
    case = judged("1. {2 drops x -> A}", "materials: {x: ethanol}\nvessels: {A: beaker 50 mL}").case

    assert material_contents(case.procedure.materials["x"], case.usage["x"]) == Missing(
        "size", None
    )


def test_material_nobody_takes_holds_nothing_definite() -> None:
    case = judged("1. Here is {x}.", "materials: {x: ethanol}").case

    assert material_contents(case.procedure.materials["x"], case.usage["x"]) is None
    assert material_contents(case.procedure.materials["x"], None) is None
