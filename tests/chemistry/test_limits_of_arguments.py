"""At the ends of its range an argument is still computed with; beyond them it is our own mistake.

The figures are worked out by hand; each case stands just at the end that its function names.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from watchglass.chemistry.acidbase import (
    buffer_ph,
    check_pkas,
    ionic_strength,
    isoelectric_point,
    neutral_fraction,
    water_formed,
)
from watchglass.chemistry.gases import gas_amount, gas_volume
from watchglass.chemistry.heat import (
    Body,
    Heat,
    heat_capacity,
    ice_to_take_up,
    mixed_temperature,
    released,
    temperature_rise,
)
from watchglass.chemistry.mixing import (
    Liquid,
    density,
    density_by_table,
    density_of_several,
    density_with_solute,
    liquid_of_mass,
    liquid_of_volume,
    mix,
)
from watchglass.chemistry.moving import acid_to_move_amine, reagent_by_equation
from watchglass.chemistry.partition import (
    distribution_ratio,
    portions_needed,
    ratio_of_solubilities,
    salted_out,
    share_in_organic,
    share_left,
)
from watchglass.chemistry.phases import Family, PhaseSystem, check
from watchglass.chemistry.solutions import (
    Portions,
    dilute_by_mass,
    mass_fraction_of_mixture,
    solid_to_weigh,
    solute_amount,
    solute_mass,
    stock_volume,
    strength_after_dilution,
)
from watchglass.chemistry.stoichiometry import (
    Reactant,
    amount_in_solution,
    amount_of_mass,
    amount_of_volume,
    equivalents,
    left_over,
    limit,
    mass_of_amount,
    product_amount,
    volume_of_amount,
    yield_fraction,
)
from watchglass.chemistry.titration import (
    concentration_by_titre,
    titration_error,
    titre_by_equation,
)

if TYPE_CHECKING:
    from collections.abc import Callable

WATER = PhaseSystem((), 0.0, 1e-3)
ROUGHLY = Heat(-100e3, "mole", "none", order_only=True)


@pytest.mark.parametrize(
    ("compute", "expected"),
    [
        # gases: nothing of a gas takes no room; 1 mol at half a kelvin and half a pascal is R.
        (lambda: gas_volume(amount=0.0, temperature=300.0, pressure=1e5), 0.0),
        (lambda: gas_volume(amount=1.0, temperature=0.5, pressure=0.5), 8.314462618),
        (lambda: gas_amount(volume=0.0, temperature=300.0, pressure=1e5), 0.0),
        (lambda: gas_amount(volume=8.314462618, temperature=0.5, pressure=0.5), 1.0),
        # amounts
        (lambda: amount_of_mass(mass=0.0, molar_mass=0.1), 0.0),
        (lambda: amount_of_mass(mass=0.2, molar_mass=0.1, purity=1.0), 2.0),
        (lambda: mass_of_amount(amount=0.0, molar_mass=0.1), 0.0),
        (lambda: amount_of_volume(volume=0.0, density=800.0, molar_mass=0.1), 0.0),
        (lambda: volume_of_amount(amount=0.0, density=800.0, molar_mass=0.1), 0.0),
        (lambda: amount_in_solution(volume=0.0, concentration=100.0), 0.0),
        (lambda: amount_in_solution(volume=1e-3, concentration=0.0), 0.0),
        (lambda: equivalents(amount=0.0, limiting_amount=0.5), 0.0),
        (lambda: equivalents(amount=1.0, limiting_amount=0.5), 2.0),
        (lambda: product_amount(extent=0.0, coefficient=2), 0.0),
        (lambda: product_amount(extent=2.0, coefficient=0.5), 1.0),
        (lambda: yield_fraction(actual=0.0, theoretical=0.5), 0.0),
        # solutions
        (lambda: stock_volume(stock=0.5, target=0.0, volume=1e-3), 0.0),
        (lambda: stock_volume(stock=0.5, target=0.25, volume=0.0), 0.0),
        (lambda: strength_after_dilution(stock=0.0, volume=0.5, made_up_to=1.0), 0.0),
        (lambda: strength_after_dilution(stock=6.0, volume=0.0, made_up_to=0.5), 0.0),
        (lambda: strength_after_dilution(stock=6.0, volume=0.5, made_up_to=0.5), 6.0),
        (lambda: mass_fraction_of_mixture([(0.3, 1.0), (0.7, 0.0)]), 0.3),
        (lambda: mass_fraction_of_mixture([(0.0, 1.0), (0.5, 0.2)]), 0.2),
        (lambda: solute_amount(concentration=0.0, volume=1e-3), 0.0),
        (lambda: solute_amount(concentration=100.0, volume=0.0), 0.0),
        (lambda: solute_mass(fraction=1.0, density=789.0, volume=1e-3), 0.789),
        (lambda: solute_mass(fraction=0.0, density=789.0, volume=1e-3), 0.0),
        (lambda: solute_mass(fraction=0.5, density=0.5, volume=4.0), 1.0),
        (lambda: solid_to_weigh(amount=0.0, molar_mass=0.1), 0.0),
        (lambda: solid_to_weigh(amount=2.0, molar_mass=0.1, purity=1.0), 0.2),
        # heat
        (lambda: released([(0.0, ROUGHLY), (0.5, ROUGHLY)]).heat, 50e3),
        (heat_capacity, 0.0),
        (lambda: temperature_rise(heat=1.0, capacity=0.5), 2.0),
        (lambda: mixed_temperature([Body(0.0, 4180.0, 0.5), Body(0.5, 0.5, 0.5)]), 0.5),
        (lambda: ice_to_take_up(0.0), 0.0),
        # liquids
        (lambda: liquid_of_volume(volume=0.0, density=0.5).mass, 0.0),
        (lambda: liquid_of_mass(mass=0.0, density=0.5).volume, 0.0),
        (lambda: mix([Liquid(0.0, 0.0)], dissolved=0.0).mass, 0.0),
        (lambda: density(Liquid(0.0, 1e-3)), 0.0),
        (lambda: density_with_solute(density=0.5, concentration=0.0), 0.5),
        (lambda: density_by_table([(1.0, 789.0)], 1.0), 789.0),
        (lambda: density_by_table([(1.0, 789.0)], 0.0), 998.2),
        (lambda: density_of_several([0.5]), 0.5),
        # layers
        (lambda: distribution_ratio(pkas=(), top=0, ratio=0.0, ph=7.0), 0.0),
        (lambda: share_in_organic(ratio=0.0, organic=1.0, aqueous=1.0), 0.0),
        (lambda: share_in_organic(ratio=1.0, organic=0.0, aqueous=1.0), 0.0),
        (lambda: share_left(ratio=0.0, portions=[1.0], layer=0.5), 1.0),
        (lambda: share_left(ratio=1.0, portions=[0.0, 0.5], layer=0.5), 0.5),
        (lambda: ratio_of_solubilities(organic=0.0, aqueous=0.5), 0.0),
        (lambda: ratio_of_solubilities(organic=1.0, aqueous=0.5), 2.0),
        (lambda: salted_out(ratio=0.0, constant=1e-4, salt=1.0), 0.0),
        (lambda: portions_needed(ratio=1.0, portion=1.0, layer=1.0, share=0.5), 1),
        (lambda: reagent_by_equation(amount=0.0), 0.0),
        (lambda: reagent_by_equation(amount=0.5, sites=1, excess=1.0), 0.5),
        # titrations
        (lambda: titration_error(titre=0.0, equivalence=0.5), -1.0),
        (lambda: titre_by_equation(amount=0.0, titrant=0.5), 0.0),
        (lambda: titre_by_equation(amount=1.0, titrant=0.5, ratio=0.5), 1.0),
        (lambda: concentration_by_titre(titre=0.0, titrant=1.0, sample=0.5), 0.0),
        (lambda: concentration_by_titre(titre=1.0, titrant=0.0, sample=0.5), 0.0),
        (lambda: concentration_by_titre(titre=1.0, titrant=0.5, sample=0.5, ratio=0.5), 2.0),
        # acids and bases
        (lambda: water_formed(hydroxide_before=0.0, hydroxide_after=0.0), 0.0),
        (lambda: water_formed(hydroxide_before=0.0, hydroxide_after=0.1), -0.1),
        (lambda: buffer_ph(pka=7.0, acid=0.5, base=0.5), 7.0),
        (lambda: ionic_strength([(0.0, 1)]), 0.0),
        (lambda: neutral_fraction((4.6,), 1, 4.6), 0.5),
        (lambda: neutral_fraction((4.6,), 2, 4.6), 0.0),
        (lambda: neutral_fraction((4.6,), -1, 4.6), 0.0),
    ],
)
def test_value_at_the_end_of_its_range_is_computed_with(
    compute: Callable[[], object], expected: float
) -> None:
    assert compute() == pytest.approx(expected)


def test_pure_liquid_is_a_stock_like_any_other() -> None:
    assert dilute_by_mass(stock=1.0, target=0.25, mass=2.0) == Portions(0.5, 1.5)


def test_stock_of_the_mass_fraction_wanted_is_weighed_alone() -> None:
    assert dilute_by_mass(stock=0.25, target=0.25, mass=2.0) == Portions(2.0, 0.0)


def test_solution_of_nothing_is_all_solvent() -> None:
    assert dilute_by_mass(stock=0.25, target=0.0, mass=2.0) == Portions(0.0, 2.0)


def test_batch_of_nothing_weighs_nothing() -> None:
    assert dilute_by_mass(stock=0.25, target=0.1, mass=0.0) == Portions(0.0, 0.0)


@pytest.mark.parametrize(
    "pkas", [(), (-20.0, 40.0), (7.0, 7.0), (40.0,) * 7], ids=["none", "ends", "equal", "most"]
)
def test_pkas_up_to_the_ends_of_their_range_are_a_family(pkas: tuple[float, ...]) -> None:
    check_pkas(pkas)


@pytest.mark.parametrize("pkas", [(-20.1,), (40.1,), (7.0, 6.9), (40.0,) * 8, (float("nan"),)])
def test_pkas_beyond_their_range_are_none(pkas: tuple[float, ...]) -> None:
    with pytest.raises(ValueError, match="pKa's"):
        check_pkas(pkas)


def test_very_acidic_pkas_count_towards_the_most_as_well() -> None:
    with pytest.raises(ValueError, match="too many"):
        check_pkas((-20.0,) * 15)


def test_base_of_one_proton_has_no_isoelectric_point() -> None:
    # Anilinium, pKa 4.6: aniline is neutral at every pH above, and never an anion.
    assert isoelectric_point((4.6,), 1) is None


@pytest.mark.parametrize(
    "system",
    [
        PhaseSystem((Family((4.76,), 0, 0.0, 0.0, 0.0),), 0.0, 1e-3, 0.0, 0.0),
        PhaseSystem((Family((4.76,), 0, 1.0, None, None),), -1.0, 1e-3, 0.5, 0.5),
    ],
)
def test_vessel_of_noughts_is_a_vessel(system: PhaseSystem) -> None:
    check(system)


@pytest.mark.parametrize(
    "system",
    [
        WATER._replace(aqueous=0.0),
        WATER._replace(aqueous=float("inf")),
        WATER._replace(organic=-1e-9),
        WATER._replace(organic=float("inf")),
        WATER._replace(strong=float("nan")),
        WATER._replace(strong_squares=-1e-9),
        WATER._replace(families=(Family((), 0, -1e-9),)),
        WATER._replace(families=(Family((), 0, float("inf")),)),
        WATER._replace(families=(Family((), 0, 1.0, -1e-9),)),
        WATER._replace(families=(Family((), 0, 1.0, float("inf")),)),
        WATER._replace(families=(Family((), 0, 1.0, None, -1e-9),)),
        WATER._replace(families=(Family((), 0, 1.0, None, float("nan")),)),
        WATER._replace(families=(Family((9.0, 4.0), 0, 1.0),)),
    ],
)
def test_vessel_that_cannot_be_is_refused(system: PhaseSystem) -> None:
    with pytest.raises(ValueError, match=r"of|pKa"):
        check(system)


LEAST = -1e-9


@pytest.mark.parametrize(
    "compute",
    [
        lambda: gas_volume(amount=LEAST, temperature=300.0, pressure=1e5),
        lambda: gas_volume(amount=1.0, temperature=0.0, pressure=1e5),
        lambda: gas_volume(amount=1.0, temperature=300.0, pressure=0.0),
        lambda: gas_volume(amount=1.0, temperature=300.0, pressure=LEAST),
        lambda: gas_amount(volume=LEAST, temperature=300.0, pressure=1e5),
        lambda: gas_amount(volume=1.0, temperature=0.0, pressure=1e5),
        lambda: gas_amount(volume=1.0, temperature=300.0, pressure=0.0),
        lambda: amount_of_mass(mass=LEAST, molar_mass=0.1),
        lambda: amount_of_mass(mass=1.0, molar_mass=LEAST),
        lambda: amount_of_mass(mass=1.0, molar_mass=0.1, purity=1.000001),
        lambda: mass_of_amount(amount=LEAST, molar_mass=0.1),
        lambda: mass_of_amount(amount=1.0, molar_mass=0.0),
        lambda: mass_of_amount(amount=1.0, molar_mass=0.1, purity=0.0),
        lambda: amount_of_volume(volume=LEAST, density=LEAST, molar_mass=0.1),
        lambda: amount_of_volume(volume=1.0, density=0.0, molar_mass=0.1),
        lambda: volume_of_amount(amount=1.0, density=0.0, molar_mass=0.1),
        lambda: volume_of_amount(amount=1.0, density=LEAST, molar_mass=0.1),
        lambda: amount_in_solution(volume=LEAST, concentration=LEAST),
        lambda: amount_in_solution(volume=1.0, concentration=LEAST),
        lambda: equivalents(amount=LEAST, limiting_amount=1.0),
        lambda: equivalents(amount=1.0, limiting_amount=1.0, coefficient=0),
        lambda: equivalents(amount=1.0, limiting_amount=1.0, limiting_coefficient=0),
        lambda: equivalents(amount=1.0, limiting_amount=LEAST, limiting_coefficient=LEAST),
        lambda: limit([Reactant(-1, -1.0)]),
        lambda: left_over([Reactant(1, 1.0)], LEAST),
        lambda: product_amount(extent=LEAST, coefficient=1),
        lambda: product_amount(extent=1.0, coefficient=0),
        lambda: yield_fraction(actual=LEAST, theoretical=1.0),
        lambda: yield_fraction(actual=LEAST, theoretical=LEAST),
        lambda: stock_volume(stock=1.0, target=LEAST, volume=1.0),
        lambda: stock_volume(stock=1.0, target=0.5, volume=LEAST),
        lambda: stock_volume(stock=LEAST, target=0.0, volume=1.0),
        lambda: strength_after_dilution(stock=LEAST, volume=0.5, made_up_to=1.0),
        lambda: strength_after_dilution(stock=1.0, volume=LEAST, made_up_to=1.0),
        lambda: strength_after_dilution(stock=1.0, volume=0.0, made_up_to=0.0),
        lambda: dilute_by_mass(stock=0.0, target=0.0, mass=1.0),
        lambda: dilute_by_mass(stock=0.5, target=LEAST, mass=1.0),
        lambda: dilute_by_mass(stock=0.5, target=0.1, mass=LEAST),
        lambda: dilute_by_mass(stock=1.000001, target=0.1, mass=1.0),
        lambda: mass_fraction_of_mixture([(LEAST, 0.5), (1.0, 0.5)]),
        lambda: mass_fraction_of_mixture([(1.0, LEAST)]),
        lambda: mass_fraction_of_mixture([(0.0, 0.5)]),
        lambda: solute_amount(concentration=LEAST, volume=LEAST),
        lambda: solute_amount(concentration=1.0, volume=LEAST),
        lambda: solute_mass(fraction=LEAST, density=1000.0, volume=1.0),
        lambda: solute_mass(fraction=0.5, density=1000.0, volume=LEAST),
        lambda: solute_mass(fraction=0.5, density=0.0, volume=1.0),
        lambda: solid_to_weigh(amount=LEAST, molar_mass=0.1),
        lambda: solid_to_weigh(amount=1.0, molar_mass=LEAST),
        lambda: solid_to_weigh(amount=1.0, molar_mass=0.1, solute_units=0),
        lambda: solid_to_weigh(amount=1.0, molar_mass=0.1, purity=1.000001),
        lambda: released([(LEAST, ROUGHLY)]),
        lambda: heat_capacity(water=LEAST),
        lambda: heat_capacity(organic=LEAST),
        lambda: heat_capacity(solid=LEAST),
        lambda: temperature_rise(heat=1.0, capacity=0.0),
        lambda: mixed_temperature([Body(LEAST, 4180.0, 300.0), Body(1.0, 4180.0, 300.0)]),
        lambda: mixed_temperature([Body(1.0, 0.0, 300.0), Body(1.0, 4180.0, 300.0)]),
        lambda: mixed_temperature([Body(1.0, 4180.0, 0.0)]),
        lambda: mixed_temperature([Body(0.0, 4180.0, 300.0)]),
        lambda: ice_to_take_up(LEAST),
        lambda: liquid_of_volume(volume=LEAST, density=1000.0),
        lambda: liquid_of_volume(volume=1.0, density=0.0),
        lambda: liquid_of_mass(mass=LEAST, density=1000.0),
        lambda: liquid_of_mass(mass=1.0, density=0.0),
        lambda: mix([], dissolved=LEAST),
        lambda: mix([Liquid(LEAST, 1.0)]),
        lambda: mix([Liquid(1.0, LEAST)]),
        lambda: density(Liquid(LEAST, 1.0)),
        lambda: density(Liquid(1.0, LEAST)),
        lambda: density_with_solute(density=0.0, concentration=1.0),
        lambda: density_with_solute(density=800.0, concentration=LEAST),
        lambda: density_by_table([(0.5, 1100.0)], LEAST),
        lambda: density_by_table([(0.5, 1100.0)], 1.000001),
        lambda: density_by_table([(1.5, 1100.0)], 0.5),
        lambda: density_by_table([(0.5, 1100.0), (0.5, 1200.0)], 0.5),
        lambda: density_of_several([0.0]),
        lambda: distribution_ratio(pkas=(), top=0, ratio=LEAST, ph=7.0),
        lambda: share_in_organic(ratio=LEAST, organic=1.0, aqueous=1.0),
        lambda: share_in_organic(ratio=1.0, organic=LEAST, aqueous=1.0),
        lambda: share_in_organic(ratio=1.0, organic=1.0, aqueous=LEAST),
        lambda: share_in_organic(ratio=1.0, organic=0.0, aqueous=0.0),
        lambda: share_left(ratio=LEAST, portions=[], layer=1.0),
        lambda: share_left(ratio=1.0, portions=[LEAST], layer=1.0),
        lambda: share_left(ratio=1.0, portions=[], layer=0.0),
        lambda: portions_needed(ratio=1.0, portion=1.0, layer=1.0, share=LEAST),
        lambda: portions_needed(ratio=1.0, portion=1.0, layer=1.0, share=1.000001),
        lambda: ratio_of_solubilities(organic=LEAST, aqueous=1.0),
        lambda: ratio_of_solubilities(organic=1.0, aqueous=0.0),
        lambda: salted_out(ratio=LEAST, constant=1e-4, salt=1.0),
        lambda: salted_out(ratio=1.0, constant=1e-4, salt=LEAST),
        lambda: acid_to_move_amine(
            amount=1e-3, pka=9.0, ratio=10.0, organic=1e-5, aqueous=1e-5, share=0.0
        ),
        lambda: acid_to_move_amine(
            amount=1e-3, pka=9.0, ratio=10.0, organic=1e-5, aqueous=1e-5, share=1.0
        ),
        lambda: reagent_by_equation(amount=LEAST),
        lambda: reagent_by_equation(amount=1.0, sites=0),
        lambda: reagent_by_equation(amount=1.0, excess=0.999999),
        lambda: titration_error(titre=LEAST, equivalence=1.0),
        lambda: titration_error(titre=1.0, equivalence=0.0),
        lambda: titre_by_equation(amount=LEAST, titrant=1.0),
        lambda: titre_by_equation(amount=1.0, titrant=0.0),
        lambda: titre_by_equation(amount=1.0, titrant=1.0, ratio=0.0),
        lambda: concentration_by_titre(titre=LEAST, titrant=1.0, sample=1.0),
        lambda: concentration_by_titre(titre=1.0, titrant=LEAST, sample=1.0),
        lambda: concentration_by_titre(titre=1.0, titrant=1.0, sample=0.0),
        lambda: concentration_by_titre(titre=1.0, titrant=1.0, sample=1.0, ratio=0.0),
        lambda: water_formed(hydroxide_before=LEAST, hydroxide_after=0.0),
        lambda: water_formed(hydroxide_before=0.0, hydroxide_after=LEAST),
        lambda: buffer_ph(pka=7.0, acid=0.0, base=1.0),
        lambda: buffer_ph(pka=7.0, acid=1.0, base=0.0),
        lambda: ionic_strength([(LEAST, 1)]),
    ],
)
def test_value_just_beyond_its_range_is_our_own_mistake(compute: Callable[[], object]) -> None:
    with pytest.raises(ValueError, match=r"\w"):
        compute()
