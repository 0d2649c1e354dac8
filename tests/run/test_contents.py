"""How much of each substance a quantity of a material brings, and what is said where it cannot be told."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from builders import golden, judged
from watchglass.base import dimensions as dim
from watchglass.resolve import model
from watchglass.run.content import Content, Missing, contents
from watchglass.run.roles import material_contents

SI = {dim.MASS: 1e-3, dim.VOLUME: 1e-6, dim.AMOUNT: 1e-3, dim.COUNT: 1.0}


def material(description: str) -> model.Material:
    return judged("1. Here is {x}.", f"materials:\n  x: {description}").procedure.materials["x"]


READ = {
    description: material(description)
    for description in (
        "36 % w/w hydrochloric acid",
        "saturated sodium chloride",
        "2.0 M sodium hydroxide",
        "5 % w/w copper(II) sulfate",
        "70 % v/v ethanol",
        "{contains: {ethanol: 3 mL, water: 1 mL}}",
    )
}


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


# Each figure worked out by hand: 10 mL of 37 % acid of 1.18 g/mL hold 4.366 g.
@pytest.mark.parametrize(
    ("description", "value", "dimension", "key", "grams"),
    [
        # a mass of a solution by volume, a volume of one by mass
        ("0.5 mol/kg sodium chloride", 1029.22, dim.MASS, "sodium-chloride", 29.22),
        ("70 % v/v ethanol", 100.0, dim.MASS, "ethanol", 62.4),
        ("{is: 37 % w/w hydrochloric acid, density: 1.18 g/mL}", 10.0, dim.VOLUME,
         "hydrogen-chloride", 4.366),
        ("{is: 37 % w/w hydrochloric acid, density: 1.18 g/mL at 25 °C}", 10.0, dim.VOLUME,
         "hydrogen-chloride", 4.366),
        ("{is: 10 % w/w benzoic acid in ethanol, density: 0.82 g/mL}", 10.0, dim.VOLUME,
         "benzoic-acid", 0.82),
        # two strengths on a label: 11.65 mol/L of 100.45 g/mol
        ("{is: 70 % w/w perchloric acid, also: 11.65 M}", 10.0, dim.VOLUME, "perchloric-acid",
         11.703),
        # a liquid with its own density
        ("{is: ethyl acetate, density: 0.902 g/mL}", 10.0, dim.VOLUME, "ethyl-acetate", 9.02),
        # saturated: 52.6 % w/w; a hydrate by what dissolves of its salt, 210 g/L and 286.14/105.99
        ("saturated potassium carbonate", 10.0, dim.VOLUME, "potassium-carbonate", 8.283),
        ("saturated potassium carbonate", 10.0, dim.MASS, "potassium-carbonate", 5.26),
        ("saturated sodium carbonate decahydrate", 10.0, dim.VOLUME,
         "sodium-carbonate-decahydrate", 5.669),
        # mixtures: of 75 mL of 0.7903 and 25 mL of 0.9982 g/mL, ethanol is 70.4 % by mass
        ("{contains: {ethanol: 3 mL, water: 1 mL}}", 10.0, dim.MASS, "ethanol", 7.037),
        ("{contains: {ethanol: 3 mL, water: 1 mL}}", 10.0, dim.VOLUME, "ethanol", 5.927),
        ("{contains: {ethanol: 3 mL, water: 1 mL}, density: 0.860 g/mL}", 10.0, dim.VOLUME,
         "ethanol", 6.052),
        ("{contains: {ethanol: 1 g, water: 1 g}}", 10.0, dim.VOLUME, "ethanol", 4.411),
        (("{contains: {sodium-chloride: 5.0 % w/w, potassium-chloride: 2.0 % w/w}, in: water,"
         " density: 1.047 g/mL}"), 10.0, dim.VOLUME, "sodium-chloride", 0.5235),
    ],
)  # fmt: skip
def test_mass_follows_whichever_way_a_material_is_measured(
    description: str, value: float, dimension: dim.Dimension, key: str, grams: float
) -> None:
    found = held(description, value, dimension)
    assert isinstance(found, tuple)
    (content,) = (c for c in found if c.substance.key == key)

    assert content.mass * 1e3 == pytest.approx(grams, rel=1e-3)


@pytest.mark.parametrize(
    ("description", "dimension", "assumptions"),
    [
        ("sodium chloride", dim.MASS, ()),
        ("ethanol", dim.VOLUME, ()),
        ("3.0 M hydrochloric acid", dim.VOLUME, ()),
        ("36 % w/w hydrochloric acid", dim.MASS, ()),
        ("36 % w/w hydrochloric acid", dim.AMOUNT, ()),
        ("{is: 36 % w/w hydrochloric acid, density: 1.18 g/mL}", dim.VOLUME, ()),
        ("36 % w/w hydrochloric acid", dim.VOLUME,
         ("density of 36 % w/w hydrochloric acid 1.179 g/mL, from the table of aqueous solutions at 20 °C",)),
        ("3.0 M hydrochloric acid", dim.MASS,
         ("density of 3.0 M hydrochloric acid 1.050 g/mL, from the table of aqueous solutions at 20 °C",)),
        ("5 % w/w copper(II) sulfate", dim.VOLUME,
         ("5 % w/w copper(II) sulfate taken to be as dense as water",)),
        ("saturated sodium chloride", dim.VOLUME, ("solubility 316 g/L at 20 °C of sodium chloride",)),
        ("saturated benzoic acid", dim.MASS,
         ("solubility 2.9 g/L at 25 °C of benzoic acid", "saturated benzoic acid taken to be as dense as water")),
        ("{contains: {ethanol: 3 mL, water: 1 mL}}", dim.VOLUME, ("volumes of ethanol and water added up",)),
        ("{contains: {ethanol: 3 mL, water: 1 mL}}", dim.MASS, ()),
        ("{contains: {ethanol: 3 mL, water: 1 mL}, density: 0.86 g/mL}", dim.VOLUME, ()),
        ("{contains: {hexane: 2 g, toluene: 1 g, ethanol: 1 g}}", dim.VOLUME,
         ("volumes of hexane, toluene and ethanol added up",)),
        ("{contains: {ethanol: 1 mL}}", dim.VOLUME, ()),
    ],
)  # fmt: skip
def test_result_names_what_it_rests_on(
    description: str, dimension: dim.Dimension, assumptions: tuple[str, ...]
) -> None:
    found = held(description, 10.0, dimension)

    assert isinstance(found, tuple)
    assert {content.assumptions for content in found} == {assumptions}


@pytest.mark.parametrize(
    ("description", "figures"),
    [
        ("36.00 % w/w hydrochloric acid", 4),
        ("{is: 36.00 % w/w hydrochloric acid, density: 1.2 g/mL}", 2),
        ("{is: 36.00 % w/w hydrochloric acid, density: 1.18 g/mL}", 3),
        ("5.00 % w/w copper(II) sulfate", 2),
        ("saturated sodium chloride", 3),
        ("{contains: {ethanol: 3 mL, water: 1 mL}}", 2),
    ],
)
def test_density_between_limits_the_figures(description: str, figures: int) -> None:
    found = held(description, 10.0, dim.VOLUME, figures=6)

    assert isinstance(found, tuple)
    assert {content.figures for content in found} == {figures}


@given(
    st.sampled_from(sorted(READ)),
    st.floats(min_value=1e-9, max_value=1.0),
    st.floats(min_value=0.01, max_value=100.0),
)
def test_so_many_times_the_volume_holds_so_many_times_as_much(
    description: str, volume: float, times: float
) -> None:
    one, many = (contents(READ[description], dim.VOLUME, v, 4) for v in (volume, volume * times))
    assert isinstance(one, tuple)
    assert isinstance(many, tuple)

    assert [c.mass for c in many] == pytest.approx([c.mass * times for c in one], rel=1e-9)


@given(
    st.sampled_from(["36 % w/w hydrochloric acid", "2.0 M sodium hydroxide", "70 % v/v ethanol"]),
    st.floats(min_value=1e-9, max_value=1.0),
)
def test_volume_and_the_mass_it_has_hold_the_same(description: str, volume: float) -> None:
    of = READ[description]
    assert of.solution is not None
    assert of.solution.density is not None
    by_volume = contents(of, dim.VOLUME, volume, 4)
    by_mass = contents(of, dim.MASS, volume * of.solution.density, 4)
    assert isinstance(by_volume, tuple)
    assert isinstance(by_mass, tuple)

    # A volume of spirit counts by the catalogue's ethanol, its mass by that of the table: 0.13 %.
    assert by_volume[0].moles == pytest.approx(by_mass[0].moles, rel=2e-3)


@pytest.mark.parametrize(
    ("description", "what"),
    [
        ("saturated ethanol", "solubility"),  # miscible: there is no such thing
        ("saturated copper(II) sulfate", "solution density"),
        ("saturated citric acid", "solution density"),  # beyond the table
        ("90 % w/w phosphoric acid", "solution density"),
        ("{contains: {sodium-chloride: 5 % w/w, potassium-chloride: 2 % w/w}, in: water}",
         "solution density"),
        ("3 % w/w benzoic acid in ethanol", "solution density"),  # dilute, but not in water
        ("{contains: {benzocaine: 1 g, ethanol: 1 g}}", "density"),
    ],
)  # fmt: skip
def test_volume_without_a_density_stays_unknown(description: str, what: str) -> None:
    found = held(description, 10.0, dim.VOLUME)

    assert isinstance(found, Missing)
    assert found.what == what


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
