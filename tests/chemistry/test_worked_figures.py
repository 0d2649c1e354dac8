"""Figures worked out by hand, each in the line above it; published ones name their source."""

from __future__ import annotations

from fractions import Fraction

import pytest

from watchglass.chemistry.acidbase import buffer_capacity
from watchglass.chemistry.densities import DensityTable, density_at, fraction_of_concentration
from watchglass.chemistry.equilibrium import Family, Part, PhaseSystem, solve
from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.chemistry.gases import gas_amount, gas_volume
from watchglass.chemistry.heat import heat_capacity
from watchglass.chemistry.moving import reagent_by_equation, volume_to_move
from watchglass.chemistry.solutions import solid_to_weigh, solute_mass, solute_units
from watchglass.chemistry.stoichiometry import (
    Limit,
    Reactant,
    amount_of_volume,
    equivalents,
    left_over,
    limit,
    relative_difference,
    volume_of_amount,
)
from watchglass.chemistry.suggestions import Lacking, suggest

LITRE = 1e-3
#: Bent on purpose: specific volumes of 1.0, 0.9, 0.8 and 0.8 litre a kilogram.
BENT = DensityTable(
    ((0.0, 1000.0), (0.1, 1000 / 0.9), (0.2, 1250.0), (0.3, 1250.0)), ("", "", "", "")
)


def formula(text: str) -> Formula:
    read = parse_formula(text)
    assert isinstance(read, Formula)
    return read


# ---------------------------------------------------------------- amounts


def test_equivalents_count_the_coefficient_of_what_limits() -> None:
    # 2 KMnO4 to 5 H2C2O4: 5 mmol of permanganate turn over 12.5 mmol of oxalic acid; 10 are there.
    found = equivalents(
        amount=0.010, limiting_amount=0.005, coefficient=5, limiting_coefficient=Fraction(2)
    )

    assert found == pytest.approx(0.8)


def test_equivalents_of_what_limits_are_one_whatever_its_coefficient() -> None:
    found = equivalents(
        amount=0.3, limiting_amount=0.3, coefficient=3, limiting_coefficient=Fraction(3)
    )

    assert found == pytest.approx(1.0)


def test_reactant_in_excess_by_declaration_hides_none_after_it() -> None:
    # 2 and 3 of them react a quarter of a mole each: 1 - 0.5 and 1 - 0.75 are left.
    left = left_over([Reactant(1, None), Reactant(2, 1.0), Reactant(3, 1.0)], 0.25)

    assert left == (None, 0.5, 0.25)


def test_limiting_reactant_is_told_by_its_place_among_all() -> None:
    found = limit([Reactant(1, None), Reactant(1, 2.0), Reactant(4, 2.0), Reactant(1, None)])

    assert found == Limit(0.5, (2,))


@pytest.mark.parametrize(("more", "together"), [(0.9e-9, (0, 1)), (1.1e-9, (0,))])
def test_reactants_run_out_together_to_one_part_in_a_billion(
    more: float, together: tuple[int, ...]
) -> None:
    found = limit([Reactant(1, 1.0), Reactant(1, 1.0 + more)])

    assert found is not None
    assert found.indices == together


@pytest.mark.parametrize(("extent", "left"), [(1.0 - 0.9e-9, 0.0), (1.0 - 1.1e-9, 1.1e-9)])
def test_a_billionth_left_is_nothing_left(extent: float, left: float) -> None:
    # Of 2 mol at a coefficient of 2, so that both sides of the comparison count.
    found = left_over([Reactant(2, 2.0)], extent)

    assert found[0] == pytest.approx(2 * left, rel=1e-3, abs=0.0)


def test_rounding_beyond_the_whole_is_nothing_left_and_no_fault() -> None:
    assert left_over([Reactant(1, 1.0)], 1.0 + 0.9e-9) == (0.0,)


def test_mole_of_water_is_eighteen_millilitres() -> None:
    # 18.015 g / 0.9982 g/mL = 18.047 mL.
    volume = volume_of_amount(amount=1.0, density=998.2, molar_mass=18.015e-3)

    assert volume == pytest.approx(18.047e-6, rel=1e-4)


def test_half_pure_liquid_takes_twice_the_volume() -> None:
    volume = volume_of_amount(amount=1.0, density=998.2, molar_mass=18.015e-3, purity=0.5)

    assert volume == pytest.approx(36.095e-6, rel=1e-4)


def test_concentrated_hydrochloric_acid_is_twelve_molar() -> None:
    # 37 % w/w, 1.18 g/mL, 36.46 g/mol: 1180 x 0.37 / 36.46 = 11.97 mol in a litre.
    found = amount_of_volume(volume=LITRE, density=1180.0, molar_mass=36.46e-3, purity=0.37)

    assert found == pytest.approx(11.975, abs=0.001)


@pytest.mark.parametrize(
    ("stated", "computed", "difference"), [(9.0, 10.0, -0.1), (-9.0, -10.0, -0.1), (0.0, 5.0, -1.0)]
)
def test_print_that_is_low_differs_below_nought(
    stated: float, computed: float, difference: float
) -> None:
    assert relative_difference(stated=stated, computed=computed) == pytest.approx(difference)


# ---------------------------------------------------------------- gases


def test_mole_of_gas_takes_the_molar_volume_of_an_ideal_gas() -> None:
    # CODATA 2018: 22.41396954e-3 m3/mol at 273.15 K and 101.325 kPa.
    found = gas_volume(amount=1.0, temperature=273.15, pressure=101325.0)

    assert found == pytest.approx(22.41396954e-3, rel=1e-8)


def test_molar_volume_at_one_bar_is_a_mole() -> None:
    # CODATA 2018: 22.71095464e-3 m3/mol at 273.15 K and 100 kPa.
    found = gas_amount(volume=22.71095464e-3, temperature=273.15, pressure=1e5)

    assert found == pytest.approx(1.0, rel=1e-8)


# ---------------------------------------------------------------- solutions


def test_solid_with_two_units_of_solute_is_weighed_for_half_the_moles() -> None:
    # 0.100 mol of CaSO4 out of 2CaSO4·H2O, 290.29 g/mol: 0.050 mol, 14.51 g.
    plaster = formula("2CaSO4·H2O")
    units = solute_units(plaster, formula("CaSO4"))
    assert units == 2
    assert plaster.molar_mass_si is not None

    found = solid_to_weigh(amount=0.100, molar_mass=plaster.molar_mass_si, solute_units=units)

    assert found == pytest.approx(14.51e-3, rel=1e-3)


def test_solid_with_half_a_unit_of_solute_is_weighed_twice() -> None:
    found = solid_to_weigh(amount=0.100, molar_mass=0.100, solute_units=Fraction(1, 2))

    assert found == pytest.approx(0.020)


def test_impure_solid_is_weighed_for_what_it_lacks() -> None:
    # 0.1 mol x 40 g/mol / 0.8 = 5 g.
    assert solid_to_weigh(amount=0.1, molar_mass=0.040, purity=0.8) == pytest.approx(5e-3)


def test_litre_of_concentrated_hydrochloric_acid_holds_its_mass_of_hydrogen_chloride() -> None:
    # 0.37 x 1180 g.
    found = solute_mass(fraction=0.37, density=1180.0, volume=LITRE)

    assert found == pytest.approx(0.4366)


@pytest.mark.parametrize(
    ("solid", "solute", "units"),
    [
        ("Sr(OH)2·8H2O", "Sr(OH)2", 1),  # hydrogen and oxygen are the solute's own as well
        ("HNO3·H2O", "HNO3", 1),
        ("AlCl3·AlCl3", "AlCl3", 2),  # twice itself, and no water
        ("Al2(SO4)3·18H2O", "Al2(SO4)3", 1),
        ("NaCl·KCl", "NaCl", None),  # something beside, and no water
        ("Na2CO3·1.5H2O2", "Na2CO3", None),  # hydrogen peroxide is no water
        ("CuSO4·H2O", "CuSO4·5H2O", None),  # it lacks water
        ("MgCl2·6NH3", "MgCl2", None),
        ("NaCl·H2O^+", "NaCl", None),
        ("2NaOH·H2O", "NaOH", 2),
    ],
)
def test_units_are_counted_where_all_that_is_left_over_is_water(
    solid: str, solute: str, units: int | None
) -> None:
    assert solute_units(formula(solid), formula(solute)) == units


# ---------------------------------------------------------------- densities


@pytest.mark.parametrize(
    ("fraction", "litres"),
    [
        # The first and last stretch have one parabola: through 1.0, 0.9, 0.8 a straight line.
        (0.05, 0.95),
        # Half way: 0.850 by the line, 0.375 x 0.9 + 0.75 x 0.8 - 0.125 x 0.8 = 0.8375 by the next.
        (0.15, 0.84375),
        # A quarter of the way: 0.875, and 0.865625 with a quarter of the weight.
        (0.125, 0.87265625),
        # Last stretch, by the parabola through 0.9, 0.8, 0.8: -0.1125 + 0.6 + 0.3.
        (0.25, 0.7875),
    ],
)
def test_specific_volume_goes_over_from_one_parabola_into_the_next(
    fraction: float, litres: float
) -> None:
    assert density_at(BENT, fraction) == pytest.approx(1000 / litres, rel=1e-12)


def test_water_alone_is_a_solution_of_nothing() -> None:
    assert density_at(BENT, 0.0) == pytest.approx(1000.0)
    assert fraction_of_concentration(BENT, 0.0, 0.05) == pytest.approx(0.0, abs=1e-15)


def test_strongest_solution_of_a_table_is_found_and_nothing_beyond() -> None:
    # 0.3 x 1250 g in a litre at 50 g/mol are 7.5 mol.
    assert fraction_of_concentration(BENT, 7500.0, 0.05) == pytest.approx(0.3)
    assert fraction_of_concentration(BENT, 7500.1, 0.05) is None


# ---------------------------------------------------------------- heat and ions


def test_heat_capacities_of_water_organic_liquid_and_solid_add() -> None:
    # 100 g x 4.18 + 50 g x 2.00 + 10 g x 0.80 J/K.
    found = heat_capacity(water=0.100, organic=0.050, solid=0.010)

    assert found == pytest.approx(418.0 + 100.0 + 8.0)


def test_ion_that_takes_up_no_proton_counts_towards_the_ionic_strength() -> None:
    # 0.1 mol/L of a quaternary ammonium chloride: half of 100 + 100 mol/m3.
    salt = PhaseSystem((Family((), 1, 0.1),), -0.1, LITRE)

    assert solve(salt).ionic_strength == pytest.approx(100.0, rel=1e-5)


def test_neutral_substance_does_not_count_towards_the_ionic_strength() -> None:
    # 0.1 mol/L of strong acid beside as much sugar.
    held = PhaseSystem((Family((), 0, 0.1),), -0.1, LITRE)

    assert solve(held).ionic_strength == pytest.approx(100.0, rel=1e-5)


def test_solution_beside_a_sugar_of_unknown_ratio_has_an_ionic_strength() -> None:
    held = PhaseSystem((Family((), 0, 0.1, None),), -0.1, LITRE, LITRE)

    assert solve(held).ionic_strength == pytest.approx(100.0, rel=1e-5)


def test_phenol_far_below_its_pka_is_neutral_though_nothing_else_is_known_of_it() -> None:
    # The amine of unknown ratio leaves the pH open between 5 and 10; of phenol-like pKa 20 hardly
    # a molecule is charged at either, wherever the molecules are.
    amine, phenol = Family((9.5,), 1, 0.02, None), Family((20.0,), 0, 0.01, None, 1.0)
    found = solve(PhaseSystem((amine, phenol), -0.01, LITRE, LITRE))

    assert found.ph is None
    assert found.parts[0] == Part(None, None, None, None, None)
    assert found.parts[1][:3] == (None, None, None)
    assert found.parts[1].charge == pytest.approx(0.0, abs=1e-6)
    assert found.parts[1].fractions == pytest.approx((1.0, 0.0), abs=1e-6)


def test_buffer_capacity_of_water_is_that_of_its_own_ions() -> None:
    # pH 4: ln 10 x (1e-4 + 1e-10) mol/L = 0.230 mol/m3.
    assert buffer_capacity([], 4.0) == pytest.approx(0.23026, rel=1e-4)
    assert buffer_capacity([], 10.0) == pytest.approx(0.23026, rel=1e-4)


def test_two_equal_pkas_buffer_by_three_states_alike() -> None:
    # At the pKa a third each of charge 0, -1, -2: variance 2/3; ln 10 x 100 x 2/3 = 153.5 mol/m3.
    assert buffer_capacity([((7.0, 7.0), 0, 100.0)], 7.0) == pytest.approx(153.5, rel=1e-3)


# ---------------------------------------------------------------- moving a share


@pytest.mark.parametrize(
    ("sites", "excess", "moles"), [(1, 1.0, 0.1), (2, 1.0, 0.2), (2, 1.5, 0.3), (1, 1.2, 0.12)]
)
def test_reagent_by_the_equation_is_amount_times_sites_times_excess(
    sites: int, excess: float, moles: float
) -> None:
    found = reagent_by_equation(amount=0.1, sites=sites, excess=excess)

    assert found == pytest.approx(moles)


def test_reagent_by_the_equation_is_one_for_one_unless_it_is_said() -> None:
    assert reagent_by_equation(amount=0.1) == pytest.approx(0.1)


ETHER = PhaseSystem((Family((4.6,), 1, 0.01, 8.0),), 0.0, 20e-6, 50e-6)
ACID = PhaseSystem((), -3.0, LITRE)


def test_no_share_at_all_needs_no_reagent() -> None:
    assert volume_to_move(ETHER, ACID, 0, 0.0) == 0.0


def test_whole_of_what_partitions_is_never_moved() -> None:
    # However much water comes, the ether keeps something, up to what is tried.
    assert volume_to_move(ETHER, PhaseSystem((), 0.0, LITRE), 0, 1.0, most=1e-3) is None


def test_whole_of_what_stays_in_water_is_there_already() -> None:
    held = ETHER._replace(families=(Family((4.6,), 1, 0.01, 0.0),))

    assert volume_to_move(held, ACID, 0, 1.0) == 0.0


@pytest.mark.parametrize(("place", "share"), [(-1, 0.5), (1, 0.5), (0, -1e-9), (0, 1.000001)])
def test_share_of_no_family_is_refused(place: int, share: float) -> None:
    with pytest.raises(ValueError, match="a share of"):
        volume_to_move(ETHER, ACID, place, share)


# ---------------------------------------------------------------- what an equation lacks


def test_two_forgotten_waters_are_counted() -> None:
    left = [(1, formula("CaC2"))]
    right = [(1, formula("C2H2")), (1, formula("Ca(OH)2"))]

    assert suggest(left, right).lacking == Lacking("left", formula("H2O"), 2)


def test_forgotten_ion_must_bring_the_charge_as_well() -> None:
    # H+ would bring the atom that is lacking here, but no charge is.
    assert suggest([(1, formula("CH4"))], [(1, formula("CH3"))]).lacking is None
    assert suggest([(1, formula("NH4^+"))], [(1, formula("NH3"))]).lacking == Lacking(
        "right", formula("H^+"), 1
    )


def test_elements_of_one_side_alone_are_named_in_order() -> None:
    found = suggest([(1, formula("NaOH"))], [(1, formula("KCl"))])

    assert found.only_left == ("H", "Na", "O")
    assert found.only_right == ("Cl", "K")
