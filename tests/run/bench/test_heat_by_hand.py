"""Rises of temperature worked out by hand: heat over the heat capacity of all that is there.

57.1 and 56.0 kJ per mole of water by strong and weak acid, 4180 and 2000 J/(kg K) as the model has
them (CRC Handbook, from memory; common practice).
"""

from __future__ import annotations

import pytest

from bench_runner import knowledge
from run.bench.shelf import ANY, SHELF, THINGS, Shelf, litres
from watchglass.run.bench.heat import on_dissolving, on_pouring
from watchglass.run.bench.knowledge import Thing
from watchglass.run.bench.pouring import Drawn
from watchglass.run.bench.state import Phase, Vessel

REAL = knowledge()
#: All of 100 g/mol, so that masses are read off; a weak acid, a base, and a gas that is an acid.
LAB = Shelf(
    {
        thing.key: thing
        for thing in (
            *THINGS,
            Thing("Na^+", charge=1, molar_mass=0.023),
            Thing("vinegar", ANY, molar_mass=0.1, pkas=(4.76,)),
            Thing("diacid", ANY, molar_mass=0.1, pkas=(2.0, 11.9)),
            Thing("sugar-acid", ANY, molar_mass=0.1, pkas=(12.0,)),
            Thing("amine", ANY, molar_mass=0.1, pkas=(9.3,), top=1),
            Thing("fizz", ANY, molar_mass=0.1, pkas=(6.4, 10.3), gas=True),
            Thing(
                "sulfuric-acid",
                ANY,
                molar_mass=98.08e-3,
                liquid=True,
                density=1830.0,
                miscible=True,
            ),
        )
    }
)
#: One kilogram of water.
KILO = {"water": 1 / 0.018015}


def water(**amounts: float) -> Phase:
    named = {key.replace("_", "-"): amount for key, amount in amounts.items()}
    ions = {"H": "H^+", "Na": "Na^+", "Cl": "Cl^-"}
    return Phase(KILO | {ions.get(key, key): n for key, n in named.items()}, 1e-3)


def rise(held: Phase, coming: Phase, *, bath: str = "") -> float | None:
    warmed = on_pouring(Vessel("A", aqueous=held, bath=bath), Drawn(coming), LAB)
    return None if warmed is None else warmed.rise


ALKALI = water(Na=1.0, H=-1.0)
ACID = water(Cl=1.0, H=1.0)
#: Two kilograms of water with 23 + 35 g of ions.
BOTH = 4180.0 * 2.058


@pytest.mark.parametrize(("held", "coming"), [(ALKALI, ACID), (ACID, ALKALI)])
def test_mole_of_strong_acid_and_base_gives_its_heat_whichever_is_poured(
    held: Phase, coming: Phase
) -> None:
    assert rise(held, coming) == pytest.approx(57.1e3 / BOTH)


def test_lesser_of_acid_and_base_is_what_is_neutralised() -> None:
    # 0.4 mol of base for a mole of acid: 2 kg of water, 9.2 g of sodium, 35 g of chloride, and the
    # protons, 1 g less 0.4 g.
    capacity = 4180.0 * (2.0 + 0.0092 + 0.035 + 0.0006)

    assert rise(water(Na=0.4, H=-0.4), ACID) == pytest.approx(0.4 * 57.1e3 / capacity)


@pytest.mark.parametrize("turned", [False, True])
def test_weak_acid_gives_the_lesser_heat(turned: bool) -> None:
    # 0.6 mol of it for a mole of base; 1 kg + 60 g and 1 kg + 22 g.
    pair = (ALKALI, water(vinegar=0.6))
    held, coming = pair[::-1] if turned else pair

    assert rise(held, coming) == pytest.approx(0.6 * 56.0e3 / (4180.0 * 2.082))


def test_acid_of_two_protons_takes_two_bases() -> None:
    # 0.4 mol: 0.8 mol of water; 1 kg + 40 g and 1 kg + 22 g.
    assert rise(ALKALI, water(diacid=0.4)) == pytest.approx(0.8 * 56.0e3 / (4180.0 * 2.062))


def test_base_that_is_left_goes_on_to_the_weak_acid() -> None:
    # 0.3 mol of strong acid first, then 0.7 of the 1.5 mol of ammonium's like: amine hydrochloride.
    coming = water(amine=1.5, Cl=1.8, H=1.8)
    capacity = 4180.0 * (2 + 0.022 + 0.150 + 1.8 * 0.036)

    assert rise(ALKALI, coming) == pytest.approx((0.3 * 57.1e3 + 0.7 * 56.0e3) / capacity)


def test_acids_weaker_than_water_take_no_base() -> None:
    assert rise(ALKALI, water(sugar_acid=1.0)) is None


def test_carbon_dioxide_counts_as_no_acid() -> None:
    assert rise(ALKALI, water(fizz=1.0)) is None


def test_salt_of_a_weak_acid_is_no_strong_base() -> None:
    # Sodium acetate: the base is held by its acid.
    assert rise(water(vinegar=1.0, Na=1.0, H=-1.0), water()) is None


def test_two_acids_warm_nothing() -> None:
    assert rise(ACID, ACID) is None
    assert rise(ALKALI, ALKALI) is None


@pytest.mark.parametrize(("share", "told"), [(0.15, True), (0.14, False)])
def test_rise_below_a_kelvin_is_not_worth_a_word(share: float, *, told: bool) -> None:
    # 0.15 mol: 8.57 kJ in 2 kg of water, 1.02 K; 0.14 mol: 0.95 K.
    held = water(Na=share, H=-share)

    assert (rise(held, water(Cl=share, H=share)) is not None) is told


def test_organic_liquid_takes_up_its_share_of_the_heat() -> None:
    # A litre of 800 g at 2000 J/(kg K): 1600 J/K more.
    held = Vessel("A", aqueous=ALKALI, organic=litres("light", 1.0))
    warmed = on_pouring(held, Drawn(ACID), LAB)

    assert warmed is not None
    assert warmed.rise == pytest.approx(57.1e3 / (BOTH + 1600.0))
    assert warmed.source == "neutralisation"


def test_bath_holds_the_heat() -> None:
    warmed = on_pouring(Vessel("A", aqueous=ALKALI, bath="ice"), Drawn(ACID), LAB)

    assert warmed is not None
    assert warmed.held


def test_nothing_holds_the_heat_without_a_bath() -> None:
    warmed = on_pouring(Vessel("A", aqueous=ALKALI), Drawn(ACID), LAB)

    assert warmed is not None
    assert not warmed.held


# ---------------------------------------------------------------- concentrated sulfuric acid

#: 98.08 g of sulfuric acid.
OIL = Phase({"sulfuric-acid": 1.0}, 53.6e-6)


@pytest.mark.parametrize("turned", [False, True])
def test_concentrated_sulfuric_acid_warms_water_either_way(turned: bool) -> None:
    # 73 kJ in 1 kg of water (4180 J/K) and 98 g of acid, which lies as an organic liquid (2000).
    acid, wet = Vessel("A", organic=OIL), Vessel("A", aqueous=water())
    held, coming = (acid, Drawn(water())) if turned else (wet, Drawn(organic=OIL))
    warmed = on_pouring(held, coming, LAB)

    assert warmed is not None
    assert warmed.rise == pytest.approx(73e3 / (4180.0 + 2000.0 * 98.08e-3))
    assert warmed.source == "the dilution of sulfuric acid"


@pytest.mark.parametrize(("moles", "warms"), [(2.3, True), (2.4, False)])
def test_acid_of_seventy_per_cent_is_concentrated(moles: float, *, warms: bool) -> None:
    # 98.08 g with 2.3 x 18.015 = 41.4 g of water: 70.3 %; with 43.2 g: 69.4 %.
    acid = Phase({"sulfuric-acid": 1.0, "water": moles}, 90e-6)
    warmed = on_pouring(Vessel("A", aqueous=water()), Drawn(organic=acid), LAB)

    assert (warmed is not None) is warms


@pytest.mark.parametrize(("moles", "warms"), [(5.4, False), (5.5, True)])
def test_acid_that_meets_less_water_than_itself_is_not_diluted(
    moles: float, *, warms: bool
) -> None:
    # 97.3 and 99.1 g of water for 98.08 g.
    wet = Phase({"water": moles}, moles * 18e-6)
    warmed = on_pouring(Vessel("A", aqueous=wet), Drawn(organic=OIL), LAB)

    assert (warmed is not None) is warms


def test_greater_of_two_heats_is_told() -> None:
    # A tenth of a mole of base gives less than the dilution of a mole of acid.
    warmed = on_pouring(Vessel("A", aqueous=water(Na=0.1, H=-0.1)), Drawn(organic=OIL), LAB)

    assert warmed is not None
    assert warmed.source == "the dilution of sulfuric acid"


# ---------------------------------------------------------------- solids that dissolve


def test_sodium_hydroxide_warms_the_water_it_dissolves_in() -> None:
    # 44.5 kJ/mol (CRC Handbook, from memory): 1 mol in 1 kg of water, 10.6 K.
    warmed = on_dissolving(Vessel("A", aqueous=water()), {"sodium-hydroxide": 1.0}, REAL)

    assert warmed is not None
    assert warmed.rise == pytest.approx(44.5 / 4.18, rel=1e-4)
    assert warmed.source == "dissolving sodium hydroxide"


def test_heat_of_one_salt_and_cold_of_another_are_set_off() -> None:
    # 2 x 44.5 - 34.9 kJ.
    dissolved = {"sodium-hydroxide": 2.0, "potassium-nitrate": 1.0, "sodium-chloride": 9.0}
    warmed = on_dissolving(Vessel("A", aqueous=water()), dissolved, REAL)

    assert warmed is not None
    assert warmed.rise == pytest.approx(54.1 / 4.18, rel=1e-4)
    assert warmed.source == "dissolving sodium hydroxide"


@pytest.mark.parametrize("key", ["ammonium-chloride", "potassium-nitrate", "sodium-chloride"])
def test_salt_that_cools_is_not_told(key: str) -> None:
    assert on_dissolving(Vessel("A", aqueous=water()), {key: 1.0}, REAL) is None


def test_shelf_weighs_a_hundred_grams_a_mole() -> None:
    assert SHELF.thing("light").molar_mass == 0.1
