"""Which liquid lies in which layer, and which layer below: worked out with round figures.

Densities of real solvents at 20 °C are from the CRC Handbook, from memory.
"""

from __future__ import annotations

import pytest

from bench_runner import ran
from run.bench.shelf import LITRE, REAL, SHELF, litres
from watchglass.run.bench.layers import aqueous_density, layers, organic_density
from watchglass.run.bench.liquids import carrier, liquid_volume, mass_of, sort
from watchglass.run.bench.state import EMPTY, Phase, Vessel

# ---------------------------------------------------------------- sums


def test_masses_of_components_add_and_unknown_ones_are_left_out() -> None:
    # 2 x 100 g + 1 x 23 g.
    assert mass_of({"light": 2.0, "Na^+": 1.0, "weightless": 5.0}, SHELF) == pytest.approx(0.223)


def test_volumes_of_liquids_add_and_what_is_dissolved_has_none() -> None:
    # 8 mol of 125 mL and 16 mol of 62.5 mL.
    found = liquid_volume({"light": 8.0, "heavy": 16.0, "solute": 9.0, "Na^+": 1.0}, SHELF)

    assert found == pytest.approx(2e-3)


def test_liquid_without_density_or_formula_has_no_volume() -> None:
    assert SHELF.thing("blank").volume is None
    assert SHELF.thing("weightless").volume is None
    assert SHELF.thing("solute").volume is None
    assert SHELF.thing("light").volume == pytest.approx(125e-6)


# ---------------------------------------------------------------- densities


def test_water_alone_has_its_own_density() -> None:
    assert aqueous_density(LITRE, SHELF) == pytest.approx(998.2)


def test_ions_make_water_denser_by_two_thirds_of_their_mass() -> None:
    # 46 g of ions in a litre: 0.68 x 46 = 31.28 kg/m3 more.
    brine = Phase({**LITRE.amounts, "Na^+": 2.0}, 1e-3)

    assert aqueous_density(brine, SHELF) == pytest.approx(998.2 + 31.28, abs=0.01)


def test_molecules_make_water_denser_by_half_of_their_mass() -> None:
    # 100 g in a litre: 50 kg/m3 more.
    syrup = Phase({**LITRE.amounts, "solute": 1.0}, 1e-3)

    assert aqueous_density(syrup, SHELF) == pytest.approx(1048.2, abs=0.01)


def test_solute_in_twice_the_volume_counts_half() -> None:
    thin = Phase({**LITRE.amounts, "solute": 1.0}, 2e-3)

    assert aqueous_density(thin, SHELF) == pytest.approx(998.2 + 25.0, abs=0.01)


def test_hydrogen_ion_makes_water_lighter_and_hydroxide_heavier() -> None:
    acid = Phase({**LITRE.amounts, "H^+": 5.0}, 1e-3)
    alkali = Phase({**LITRE.amounts, "H^+": -5.0}, 1e-3)

    assert aqueous_density(acid, SHELF) == pytest.approx(998.2 - 35.0)
    assert aqueous_density(alkali, SHELF) == pytest.approx(998.2 + 87.5)


@pytest.mark.parametrize(
    ("written", "published"),
    [
        # g/mL at 20 °C; CRC Handbook, the last two from memory.
        ("6.0 M sodium hydroxide", 1.216),
        ("10 % w/w sodium hydroxide", 1.109),
        ("40 % w/w sodium hydroxide", 1.430),
        ("6.0 M hydrochloric acid", 1.098),
        ("3.0 M hydrochloric acid", 1.049),
        ("6.0 M ammonia", 0.955),
        ("saturated sodium chloride", 1.197),
        ("5.0 % w/v sodium hydrogencarbonate", 1.034),
        ("20 % w/w potassium carbonate", 1.190),
        ("1.0 M ammonium chloride", 1.014),
    ],
)
def test_density_of_a_solution_is_near_the_published_one(written: str, published: float) -> None:
    front = f"materials: {{x: {written}}}\nvessels: {{A: beaker 100 mL}}\n"
    asked = ran("{50 mL x -> A} {swirl A, open}", front=front)

    found = aqueous_density(asked.ledger.end.vessel("A").aqueous, asked.known)
    assert found / 1000 == pytest.approx(published, abs=0.04)


def test_spirit_thins_water_by_volume() -> None:
    # 998.2 g and 800 g in two litres.
    both = LITRE.plus(litres("spirit", 1.0))

    assert aqueous_density(both, SHELF) == pytest.approx(899.1)


def test_ions_without_water_count_as_water() -> None:
    assert aqueous_density(Phase({"Na^+": 1.0}, 0.0), SHELF) == 998.2


def test_organic_liquids_mix_by_volume() -> None:
    # 800 g and 1600 g in two litres.
    both = litres("light", 1.0).plus(litres("heavy", 1.0))

    assert organic_density(both, 293.15, SHELF) == pytest.approx(1200.0)


def test_solute_makes_an_organic_liquid_denser_by_three_tenths_of_its_mass() -> None:
    # 200 g in a litre: 60 kg/m3 more.
    loaded = litres("light", 1.0).plus(Phase({"solute": 2.0}, 0.0))

    assert organic_density(loaded, 293.15, SHELF) == pytest.approx(860.0)


@pytest.mark.parametrize(
    ("key", "density"), [("light", 800 - 11.0), ("heavy", 1600 - 19.0), ("close", 1010 - 11.0)]
)
def test_liquids_expand_with_heat_those_with_halogen_more(key: str, density: float) -> None:
    # Ten kelvin above 20 °C at 1.1 and 1.9 kg/m3 a kelvin.
    assert organic_density(litres(key, 1.0), 303.15, SHELF) == pytest.approx(density)


def test_layer_of_a_liquid_of_unknown_density_has_none() -> None:
    mixed = litres("light", 1.0).plus(Phase({"blank": 1.0}, 0.0))

    assert organic_density(mixed, 293.15, SHELF) is None


def test_solutes_without_a_liquid_have_no_density() -> None:
    assert organic_density(Phase({"solute": 1.0}, 0.0), 293.15, SHELF) is None


# ---------------------------------------------------------------- which is below


def standing(organic: Phase, aqueous: Phase = LITRE) -> Vessel:
    return Vessel("A", aqueous=aqueous, organic=organic, temperature=293.15)


@pytest.mark.parametrize(
    ("key", "below", "close"),
    [
        ("light", "aqueous", False),
        ("heavy", "organic", False),
        ("close", "", True),  # 12 kg/m3 apart: no call
        ("near", "organic", True),  # 42: a drop test is asked for
        ("far", "organic", False),  # 52
    ],
)
def test_denser_layer_is_called_below_where_it_is_denser_by_twenty(
    key: str, below: str, *, close: bool
) -> None:
    found = layers(standing(litres(key, 1.0)), SHELF)

    assert found is not None
    assert (found.below, found.close) == (below, close)
    assert found.aqueous == pytest.approx(998.2)
    assert found.organic == pytest.approx(SHELF.thing(key).density)


def test_layer_of_unknown_density_is_not_called() -> None:
    found = layers(standing(Phase({"blank": 1.0}, 1e-3)), SHELF)

    assert found is not None
    assert (found.organic, found.below, found.close) == (None, "", False)


@pytest.mark.parametrize(
    "vessel",
    [
        standing(EMPTY),
        standing(litres("light", 1.0), EMPTY),
        standing(litres("spirit", 1.0)),
    ],
    ids=["water", "ether", "spirit"],
)
def test_one_liquid_has_no_layers(vessel: Vessel) -> None:
    assert layers(vessel, SHELF) is None


def test_brine_that_is_strong_enough_floats_a_liquid_just_heavier_than_water() -> None:
    # 184 g of ions in a litre: 998.2 + 0.68 x 184 = 1123.3, above 1050.1 by 73.
    brine = Phase({**LITRE.amounts, "Na^+": 8.0}, 1e-3)
    found = layers(standing(litres("far", 1.0), brine), SHELF)

    assert found is not None
    assert found.below == "aqueous"


# ---------------------------------------------------------------- which liquid where


def test_largest_volume_carries_the_layer_and_not_the_largest_mass() -> None:
    both = litres("light", 1.0).plus(litres("heavy", 0.9))

    found = carrier(both, SHELF)

    assert found is not None
    assert found.key == "light"


def test_liquid_that_mixes_with_water_carries_no_layer() -> None:
    assert carrier(litres("spirit", 1.0), SHELF) is None
    assert carrier(EMPTY, SHELF) is None


def test_liquids_without_water_are_one_organic_liquid() -> None:
    assert sort(litres("spirit", 1.0), litres("light", 1.0), SHELF) == (
        EMPTY,
        litres("light", 1.0).plus(litres("spirit", 1.0)),
    )


def test_water_and_what_does_not_mix_stay_apart() -> None:
    ether = litres("light", 1.0)

    assert sort(LITRE, ether, SHELF) == (LITRE, ether)


def test_water_that_came_with_the_organic_liquid_goes_to_the_water() -> None:
    wet = litres("light", 1.0).plus(Phase({"water": 1.0, "Na^+": 0.5}, 18.05e-6))
    aqueous, organic = sort(LITRE, wet, SHELF)

    assert organic.amounts == litres("light", 1.0).amounts
    assert organic.volume == pytest.approx(1e-3, rel=1e-3)
    assert aqueous.amounts["water"] == pytest.approx(LITRE.amounts["water"] + 1.0)
    assert aqueous.amounts["Na^+"] == 0.5
    assert aqueous.volume == pytest.approx(1.01805e-3, rel=1e-3)


def test_liquid_that_came_with_the_water_goes_to_its_own_layer() -> None:
    cloudy = LITRE.plus(litres("light", 0.1))
    aqueous, organic = sort(cloudy, litres("light", 1.0), SHELF)

    assert aqueous.amounts == pytest.approx(LITRE.amounts)
    assert aqueous.volume == pytest.approx(1e-3)
    assert organic.amounts["light"] == pytest.approx(8.8)
    assert organic.volume == pytest.approx(1.1e-3)


@pytest.mark.parametrize(("millilitres", "parts"), [(124.0, False), (126.0, True)])
def test_second_layer_forms_beyond_what_the_water_dissolves(
    millilitres: float, *, parts: bool
) -> None:
    # 1 mol in a litre of water, 125 mL of the liquid.
    aqueous, organic = sort(LITRE, litres("slight", millilitres * 1e-3), SHELF)

    assert bool(organic) is parts
    assert aqueous.volume + organic.volume == pytest.approx(1e-3 + millilitres * 1e-6)


@pytest.mark.parametrize(("millilitres", "parts"), [(15.0, False), (17.0, True)])
def test_little_water_is_held_by_the_organic_liquid(millilitres: float, *, parts: bool) -> None:
    # A litre of 800 g holds 2 % of its mass, 16 g.
    water = Phase({"water": millilitres / 18.015}, millilitres * 1e-6)
    aqueous, organic = sort(water, litres("light", 1.0), SHELF)

    assert bool(aqueous) is parts
    assert organic.amounts["light"] == pytest.approx(8.0)


@pytest.mark.parametrize(("spirit", "parts"), [(1.3, False), (1.1, True)])
def test_spirit_brings_as_much_water_as_itself_into_the_organic_liquid(
    spirit: float, *, parts: bool
) -> None:
    # 998.2 g of water against 1.3 and 1.1 litres of spirit (1040 and 880 g) with 100 mL of the
    # organic liquid (80 g, which hold 1.6 g).
    held = litres("light", 0.1).plus(litres("spirit", spirit))
    aqueous, organic = sort(LITRE, held, SHELF)

    assert bool(aqueous and organic) is parts


@pytest.mark.parametrize(("spirit", "aqueous"), [(1.24, True), (1.26, False)])
def test_liquid_is_aqueous_when_half_of_it_is_water_by_mass(
    spirit: float, *, aqueous: bool
) -> None:
    # 998.2 g of water with 992 and 1008 g of spirit.
    found, other = sort(LITRE.plus(litres("spirit", spirit)), EMPTY, SHELF)

    assert bool(found) is aqueous
    assert bool(other) is not aqueous


def test_nothing_is_in_no_layer() -> None:
    assert sort(EMPTY, EMPTY, SHELF) == (EMPTY, EMPTY)


# ---------------------------------------------------------------- solvents of the trade


@pytest.mark.parametrize(
    ("solvent", "density"),
    [
        ("diethyl-ether", 713.4),
        ("ethyl-acetate", 900.3),
        ("dichloromethane", 1326.6),
        ("hexane", 659.3),
    ],
)
def test_solvent_of_the_trade_has_its_density(solvent: str, density: float) -> None:
    # CRC Handbook, from memory, at 20 °C; the catalogue may hold figures of 25 °C.
    found = REAL.thing(solvent).density

    assert found == pytest.approx(density, rel=0.01)
