"""Stills, filters and driers with made-up liquids of round boiling points and volumes."""

from __future__ import annotations

import pytest

from run.bench.shelf import ANY, LITRE, SHELF, THINGS, Shelf, liquid, litres, near
from watchglass.run.bench.knowledge import Thing
from watchglass.run.bench.pouring import Drawn
from watchglass.run.bench.separating import distil, evaporate, run_through
from watchglass.run.bench.state import EMPTY, Phase, Vessel

#: Boiling points in K; each mole takes 125 mL.
STILL = Shelf(
    {
        thing.key: thing
        for thing in (
            *THINGS,
            liquid("early", 800.0, boils=330.0),
            liquid("middle", 800.0, boils=350.0),
            liquid("late", 800.0, boils=398.15),
            liquid("oil", 800.0, boils=398.16),
            liquid("odd", 800.0, boils=None),
            Thing("fume", ANY, molar_mass=0.03, gas=True),
        )
    }
)


def pot(**amounts: float) -> Vessel:
    return Vessel(
        "pot", organic=Phase(amounts, sum(amounts.values()) * 125e-6), temperature=300.0, used=True
    )


def test_what_boils_at_125_celsius_goes_off_and_what_boils_higher_stays() -> None:
    parted = evaporate(pot(early=1.0, late=2.0, oil=3.0), None, STILL)

    assert parted.over.organic.amounts == {"early": 1.0, "late": 2.0}
    assert parted.over.volume == near(375e-6)
    assert parted.vessel.organic == Phase({"oil": 3.0}, near(375e-6))
    assert parted.why == ()


def test_vapour_is_collected_at_room_temperature_and_the_pot_stays_where_it_was() -> None:
    parted = evaporate(pot(early=1.0, oil=3.0), None, STILL)

    assert parted.over.temperature == 293.15
    assert parted.vessel.temperature == 300.0
    assert not parted.vessel.mixed


def test_dissolved_solid_stays_dissolved_while_there_is_liquid() -> None:
    parted = evaporate(pot(early=1.0, oil=3.0, solute=0.1), None, STILL)

    assert parted.vessel.organic.amounts == {"oil": 3.0, "solute": 0.1}
    assert parted.vessel.solid == {}


def test_dissolved_solid_is_a_solid_once_all_liquid_is_gone() -> None:
    held = pot(early=1.0, solute=0.1)._replace(
        solid={"solute": 0.4, "salt": 1.0},
        unknown=frozenset({"sample"}),
        doubt=frozenset({"solute"}),
        ph=7.0,
    )
    dry = evaporate(held, None, STILL).vessel

    assert dry.solid == {"solute": 0.5, "salt": 1.0}
    assert (dry.aqueous, dry.organic) == (EMPTY, EMPTY)
    assert dry.unknown == {"sample"}
    assert dry.doubt == {"solute"}
    assert dry.ph is None


def test_ions_of_a_solution_that_went_dry_are_kept_without_volume() -> None:
    hot = Shelf({**STILL.things, "water": STILL.thing("water")._replace(boils=373.15)})
    brine = Vessel("pot", aqueous=Phase({**LITRE.amounts, "Na^+": 2.0, "Cl^-": 2.0}, 1e-3))
    parted = evaporate(brine, None, hot)

    assert parted.vessel.aqueous == Phase({"Na^+": 2.0, "Cl^-": 2.0}, 0.0)
    assert parted.over.aqueous.volume == near(1e-3, rel=1e-4)


def test_liquid_of_unknown_boiling_point_is_said_to_stay() -> None:
    parted = evaporate(pot(early=1.0, odd=2.0), None, STILL)

    assert parted.vessel.organic.amounts == {"odd": 2.0}
    assert len(parted.why) == 1
    assert "boiling point" in parted.why[0]


def test_gas_in_solution_leaves_before_anything_else() -> None:
    parted = evaporate(pot(fume=0.5, early=1.0, oil=1.0), None, STILL)

    assert parted.fore.organic.amounts == {"fume": 0.5}
    assert parted.over.organic.amounts == {"early": 1.0}


def test_what_is_to_be_left_stays_in_the_pot_in_the_proportions_of_the_vapour() -> None:
    # 2 mol and 2 mol are 500 mL; 100 mL of them are a fifth of each.
    parted = evaporate(pot(early=2.0, late=2.0), 100e-6, STILL)

    assert parted.vessel.organic.amounts == near({"early": 0.4, "late": 0.4})
    assert parted.vessel.organic.volume == near(100e-6)
    assert parted.over.organic.amounts == near({"early": 1.6, "late": 1.6})


def test_what_stays_anyway_counts_towards_what_is_left() -> None:
    # 100 mL of oil stay; of 150 mL to be left, 50 mL come out of 250.
    parted = evaporate(pot(early=2.0, oil=0.8), 150e-6, STILL)

    assert parted.vessel.organic.amounts == near({"early": 0.4, "oil": 0.8})


def test_more_to_be_left_than_there_is_leaves_all() -> None:
    parted = evaporate(pot(early=2.0), 900e-6, STILL)

    assert parted.vessel.organic.amounts == near({"early": 2.0})
    assert parted.over == Drawn(temperature=300.0)


def test_less_to_be_left_than_stays_anyway_keeps_nothing_back() -> None:
    parted = evaporate(pot(early=2.0, oil=0.8), 50e-6, STILL)

    assert parted.over.organic.amounts == {"early": 2.0}


def test_fraction_lies_between_its_two_temperatures() -> None:
    parted = distil(pot(early=1.0, middle=2.0, late=3.0), 345.0, 360.0, None, STILL)

    assert parted.fore.organic.amounts == {"early": 1.0}
    assert parted.over.organic.amounts == {"middle": 2.0}
    assert parted.vessel.organic.amounts == {"late": 3.0}


@pytest.mark.parametrize(("low", "over"), [(355.0, True), (355.1, False), (None, True)])
def test_liquid_comes_over_up_to_five_kelvin_early(low: float | None, *, over: bool) -> None:
    parted = distil(pot(middle=2.0, late=3.0), low, 380.0, None, STILL)

    assert bool(parted.over.organic) is over
    assert bool(parted.fore.organic) is not over


@pytest.mark.parametrize(("high", "over"), [(350.0, True), (349.9, False)])
def test_liquid_that_boils_at_the_last_temperature_comes_over(high: float, *, over: bool) -> None:
    parted = distil(pot(middle=2.0, late=3.0), None, high, None, STILL)

    assert bool(parted.over.organic) is over


def test_doubt_goes_over_with_what_it_is_about() -> None:
    held = pot(early=1.0, oil=1.0)._replace(doubt=frozenset({"early", "oil"}))

    assert evaporate(held, None, STILL).over.doubt == {"early"}


def test_water_in_the_pot_stays_an_aqueous_layer() -> None:
    hot = Shelf({**STILL.things, "water": STILL.thing("water")._replace(boils=373.15)})
    held = Vessel("pot", aqueous=LITRE.plus(litres("spirit", 0.1)))
    warm = Shelf({**hot.things, "spirit": hot.thing("spirit")._replace(boils=351.0)})
    parted = distil(held, None, 355.0, None, warm)

    assert parted.vessel.aqueous.amounts == LITRE.amounts
    assert parted.vessel.organic == EMPTY
    assert parted.over.organic.amounts == {"spirit": near(0.8)}


# ---------------------------------------------------------------- filters


def test_filter_lets_liquids_through_with_all_that_is_known_of_them() -> None:
    held = Vessel(
        "A",
        aqueous=LITRE,
        organic=litres("light", 1.0),
        solid={"salt": 1.0},
        temperature=310.0,
        ph=5.0,
        unknown=frozenset({"sample"}),
        doubt=frozenset({"solute"}),
        mixed=False,
    )
    kept, liquid_ = run_through(held)

    assert liquid_ == Drawn(
        LITRE, litres("light", 1.0), {}, held.unknown, held.doubt, 310.0, 5.0, mixed=False
    )
    assert kept == held.emptied()._replace(solid={"salt": 1.0}, doubt=frozenset({"solute"}))


def test_shelf_is_as_its_units_say() -> None:
    assert SHELF.thing("light").volume == STILL.thing("early").volume == 125e-6
