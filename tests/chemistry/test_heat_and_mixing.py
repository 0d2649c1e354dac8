"""Heat, temperatures, densities of mixtures: closed forms, limits and what is refused."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from watchglass.chemistry.heat import (
    DILUTIONS,
    PROTON_TRANSFERS,
    REACTIONS,
    SOLUTIONS,
    Body,
    Heat,
    heat_capacity,
    ice_to_take_up,
    mixed_temperature,
    neutralisation_heat,
    released,
    temperature_rise,
)
from watchglass.chemistry.mixing import (
    WATER_DENSITY,
    Liquid,
    density,
    density_by_table,
    density_of_several,
    density_with_solute,
    liquid_of_mass,
    liquid_of_volume,
    mix,
)

if TYPE_CHECKING:
    from collections.abc import Callable

HEATS = {**PROTON_TRANSFERS, **DILUTIONS, **SOLUTIONS, **REACTIONS}
#: Sodium chloride at 20 °C, CRC Handbook, from memory.
BRINE = [(0.05, 1034.0), (0.10, 1071.0), (0.20, 1148.0), (0.264, 1197.0)]


@pytest.mark.parametrize("heat", HEATS.values(), ids=HEATS.keys())
def test_heat_names_its_source(heat: Heat) -> None:
    assert heat.source
    assert heat.per


@pytest.mark.parametrize("heat", HEATS.values(), ids=HEATS.keys())
def test_heat_is_in_joule_not_kilojoule(heat: Heat) -> None:
    assert 1e3 < abs(heat.value) < 1e6


def test_heat_given_out_is_counted_up() -> None:
    assert released([(2.0, SOLUTIONS["sodium hydroxide"])]).heat == pytest.approx(89e3)


def test_salt_that_cools_takes_heat_up() -> None:
    assert released([(1.0, SOLUTIONS["ammonium nitrate"])]).heat < 0


def test_heat_known_in_its_order_alone_taints_the_sum() -> None:
    sure = (1.0, SOLUTIONS["sodium hydroxide"])

    assert released([sure, (1.0, REACTIONS["arene, nitration"])]).order_only
    assert not released([sure, (0.0, REACTIONS["arene, nitration"])]).order_only


def test_weak_acid_gives_less_heat() -> None:
    assert neutralisation_heat(water=1.0) == pytest.approx(57.1e3)
    assert neutralisation_heat(water=0.0, weak=1.0) == pytest.approx(56e3)


def test_litre_of_water_takes_up_a_calorie_a_gram() -> None:
    assert temperature_rise(heat=4180.0, capacity=heat_capacity(water=1.0)) == pytest.approx(1.0)


def test_organic_liquid_warms_more() -> None:
    assert heat_capacity(organic=1.0) < heat_capacity(water=1.0)


def test_molar_acid_and_base_warm_each_other_by_seven_kelvin() -> None:
    # 50 mL of 1 M each: the classroom figure is about 6.8 K.
    rise = temperature_rise(heat=neutralisation_heat(water=0.05), capacity=heat_capacity(water=0.1))

    assert rise == pytest.approx(6.8, abs=0.1)


def test_heat_of_mixing_warms_the_mixture() -> None:
    cold = Body(0.1, 4180.0, 293.15)

    assert mixed_temperature([cold], heat=418.0) == pytest.approx(294.15)


def test_ice_takes_up_heat_by_melting() -> None:
    assert ice_to_take_up(333.4e3) == pytest.approx(1.0)


def test_volume_and_mass_of_a_liquid_belong_together() -> None:
    poured = liquid_of_volume(volume=1e-5, density=740.0)

    assert liquid_of_mass(mass=poured.mass, density=740.0) == pytest.approx(poured)


def test_volumes_and_masses_add() -> None:
    assert mix([Liquid(0.1, 1e-4), Liquid(0.2, 3e-4)]) == pytest.approx((0.3, 4e-4))


def test_dissolved_solid_brings_mass_and_no_volume() -> None:
    assert mix([Liquid(0.1, 1e-4)], dissolved=0.01) == pytest.approx((0.11, 1e-4))


def test_empty_vessel_has_no_density() -> None:
    assert density(mix([])) is None


def test_solute_makes_an_organic_liquid_denser_by_part_of_its_mass() -> None:
    assert density_with_solute(density=740.0, concentration=100.0) == pytest.approx(770.0)


@pytest.mark.parametrize(
    ("fraction", "expected"),
    [(0.0, WATER_DENSITY), (0.025, 1016.1), (0.05, 1034.0), (0.15, 1109.5), (0.264, 1197.0)],
)
def test_density_is_read_off_a_table(fraction: float, expected: float) -> None:
    assert density_by_table(BRINE, fraction) == pytest.approx(expected)


def test_density_beyond_a_table_is_unknown() -> None:
    assert density_by_table(BRINE, 0.3) is None


def test_table_without_points_knows_water_alone() -> None:
    assert density_by_table([], 0.0) == WATER_DENSITY
    assert density_by_table([], 0.1) is None


def test_table_may_bring_its_own_water() -> None:
    assert density_by_table([(0.0, 997.0), (0.1, 1097.0)], 0.05) == pytest.approx(1047.0)


def test_excess_densities_add() -> None:
    assert density_of_several([WATER_DENSITY + 30, WATER_DENSITY + 12]) == pytest.approx(1040.2)


@pytest.mark.parametrize(
    "asked",
    [
        lambda: released([(-1.0, SOLUTIONS["ammonium nitrate"])]),
        lambda: heat_capacity(water=-1.0),
        lambda: temperature_rise(heat=1.0, capacity=0.0),
        lambda: mixed_temperature([]),
        lambda: mixed_temperature([Body(-1.0, 4180.0, 293.0)]),
        lambda: mixed_temperature([Body(1.0, 4180.0, 0.0)]),
        lambda: ice_to_take_up(-1.0),
        lambda: liquid_of_volume(volume=-1.0, density=1.0),
        lambda: liquid_of_mass(mass=1.0, density=0.0),
        lambda: mix([Liquid(-1.0, 1.0)]),
        lambda: mix([], dissolved=-1.0),
        lambda: density(Liquid(-1.0, 1.0)),
        lambda: density_with_solute(density=0.0, concentration=1.0),
        lambda: density_by_table(BRINE, 1.5),
        lambda: density_by_table([(0.2, 1100.0), (0.1, 1050.0)], 0.1),
        lambda: density_of_several([0.0]),
    ],
)
def test_arguments_that_no_caller_should_pass_are_refused(asked: Callable[[], object]) -> None:
    with pytest.raises(ValueError, match=r"\w"):
        asked()
