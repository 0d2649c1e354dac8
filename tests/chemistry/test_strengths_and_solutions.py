"""Strengths: conversions that need a density say so. Solutions: edges of each preparation."""

from __future__ import annotations

from fractions import Fraction
from typing import TYPE_CHECKING

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.chemistry.solutions import (
    Portions,
    TooWeak,
    dilute_by_mass,
    mass_fraction_of_mixture,
    solid_to_weigh,
    solute_amount,
    solute_mass,
    solute_units,
    stock_volume,
    strength_after_dilution,
)
from watchglass.chemistry.strengths import (
    AmountConcentration,
    Known,
    MassConcentration,
    MassFraction,
    Molality,
    Need,
    Needs,
    Strength,
    VolumeFraction,
    amount_concentration,
    mass_concentration,
    mass_fraction,
    molality,
    volume_fraction,
)

if TYPE_CHECKING:
    from collections.abc import Callable

NOTHING = Known()
CONVERSIONS = {
    AmountConcentration: amount_concentration,
    MassConcentration: mass_concentration,
    MassFraction: mass_fraction,
    VolumeFraction: volume_fraction,
    Molality: molality,
}


def formula(text: str) -> Formula:
    read = parse_formula(text)
    assert isinstance(read, Formula)
    return read


@pytest.mark.parametrize(
    ("strength", "target", "needs"),
    [
        (MassFraction(0.1), MassConcentration, (Need.DENSITY,)),
        (MassFraction(0.1), AmountConcentration, (Need.MOLAR_MASS, Need.DENSITY)),
        (MassFraction(0.1), Molality, (Need.MOLAR_MASS,)),
        (MassFraction(0.1), VolumeFraction, (Need.DENSITY, Need.SOLUTE_DENSITY)),
        (MassConcentration(10.0), AmountConcentration, (Need.MOLAR_MASS,)),
        (MassConcentration(10.0), MassFraction, (Need.DENSITY,)),
        (AmountConcentration(10.0), MassConcentration, (Need.MOLAR_MASS,)),
        (AmountConcentration(10.0), MassFraction, (Need.MOLAR_MASS, Need.DENSITY)),
        (AmountConcentration(10.0), Molality, (Need.MOLAR_MASS, Need.DENSITY)),
        (VolumeFraction(0.5), MassConcentration, (Need.SOLUTE_DENSITY,)),
        (VolumeFraction(0.5), MassFraction, (Need.SOLUTE_DENSITY, Need.DENSITY)),
        (VolumeFraction(0.5), AmountConcentration, (Need.MOLAR_MASS, Need.SOLUTE_DENSITY)),
        (VolumeFraction(0.5), Molality, (Need.MOLAR_MASS, Need.SOLUTE_DENSITY, Need.DENSITY)),
        (MassConcentration(10.0), VolumeFraction, (Need.SOLUTE_DENSITY,)),
        (Molality(1.0), MassFraction, (Need.MOLAR_MASS,)),
        (Molality(1.0), MassConcentration, (Need.MOLAR_MASS, Need.DENSITY)),
    ],
)
def test_conversion_names_all_that_it_lacks(
    strength: Strength, target: type[Strength], needs: tuple[Need, ...]
) -> None:
    assert CONVERSIONS[target](strength, NOTHING) == Needs(needs)


@pytest.mark.parametrize(
    "strength",
    [
        AmountConcentration(1.0),
        MassConcentration(1.0),
        MassFraction(0.1),
        VolumeFraction(0.1),
        Molality(1.0),
    ],
)
def test_strength_in_its_own_measure_needs_nothing(strength: Strength) -> None:
    assert CONVERSIONS[type(strength)](strength, NOTHING) == strength


@given(
    st.sampled_from(sorted(CONVERSIONS, key=str)),
    st.floats(1e-4, 0.9),
    st.floats(0.01, 0.5),
    st.floats(700, 2000),
    st.floats(700, 2000),
)
@settings(deadline=None, derandomize=True, max_examples=200)
def test_strength_to_another_measure_and_back_is_the_same(
    target: type[Strength], fraction: float, molar_mass: float, density: float, pure: float
) -> None:
    known = Known(molar_mass=molar_mass, density=density, solute_density=pure)
    there = CONVERSIONS[target](MassFraction(fraction), known)
    assert isinstance(there, target)

    back = mass_fraction(there, known)

    assert isinstance(back, MassFraction)
    assert back.value == pytest.approx(fraction)


@pytest.mark.parametrize(
    ("strength", "target", "known", "needs"),
    [
        (Molality(1.0), MassConcentration, Known(density=1000.0), (Need.MOLAR_MASS,)),
        (Molality(1.0), MassConcentration, Known(molar_mass=0.1), (Need.DENSITY,)),
        (VolumeFraction(0.5), MassFraction, Known(density=1000.0), (Need.SOLUTE_DENSITY,)),
        (VolumeFraction(0.5), MassFraction, Known(solute_density=800.0), (Need.DENSITY,)),
        (MassFraction(0.1), VolumeFraction, Known(solute_density=800.0), (Need.DENSITY,)),
        (MassFraction(0.1), AmountConcentration, Known(molar_mass=0.1), (Need.DENSITY,)),
        (MassFraction(0.1), AmountConcentration, Known(density=1000.0), (Need.MOLAR_MASS,)),
    ],
)
def test_conversion_names_only_what_it_lacks(
    strength: Strength, target: type[Strength], known: Known, needs: tuple[Need, ...]
) -> None:
    assert CONVERSIONS[target](strength, known) == Needs(needs)


def test_pure_substance_has_no_molality() -> None:
    assert molality(MassFraction(1.0), Known(molar_mass=0.1)) is None


def test_ethanol_by_volume_becomes_a_mass_fraction() -> None:
    # 50 % v/v with the densities 789 (pure) and 930 kg/m3 (solution): 0.5 x 789 / 930.
    found = mass_fraction(VolumeFraction(0.5), Known(density=930.0, solute_density=789.0))

    assert isinstance(found, MassFraction)
    assert found.value == pytest.approx(0.424194, abs=1e-6)


def test_density_of_nought_is_our_own_mistake() -> None:
    with pytest.raises(ValueError, match="density of 0"):
        Known(density=0)


def test_weak_stock_is_a_value_and_not_a_volume() -> None:
    assert stock_volume(stock=1.0, target=2.0, volume=1.0) == TooWeak(1.0, 2.0)


def test_stock_of_the_strength_wanted_is_used_whole() -> None:
    assert stock_volume(stock=2.0, target=2.0, volume=0.5) == 0.5


def test_weak_stock_cannot_be_diluted_by_mass() -> None:
    assert dilute_by_mass(stock=0.1, target=0.2, mass=1.0) == TooWeak(0.1, 0.2)


def test_portions_weigh_what_is_to_be_made() -> None:
    assert dilute_by_mass(stock=0.5, target=0.1, mass=1.0) == Portions(0.2, 0.8)


def test_water_weakens_a_mixture() -> None:
    assert mass_fraction_of_mixture([(1.0, 0.3), (2.0, 0.0)]) == pytest.approx(0.1)


@pytest.mark.parametrize(
    ("solid", "solute", "units"),
    [
        ("Na2CO3·10H2O", "Na2CO3", Fraction(1)),
        ("CuSO4·5H2O", "CuSO4·5H2O", Fraction(1)),
        ("CaSO4·0.5H2O", "CaSO4", Fraction(1)),
        ("2CaSO4·H2O", "CaSO4", Fraction(2)),
        ("H2C2O4·2H2O", "C2H2O4", Fraction(1)),
        ("H2O", "H2O", Fraction(1)),
        ("Na2CO3", "NaHCO3", None),
        ("KCl", "NaCl", None),
        ("NaCl", "Na^+", None),
        ("NaOH", "Na2O", None),
        ("Na2CO3", "Na2CO3·H2O", None),
        ("H2O2", "H2O", None),
        ("KCl·H2O", "NaCl", None),
        ("NaCl·H2O2", "NaCl", None),
        ("H2O2·H2O", "H2O2", None),
    ],
)
def test_units_of_solute_are_counted_only_in_its_hydrates(
    solid: str, solute: str, units: Fraction | None
) -> None:
    assert solute_units(formula(solid), formula(solute)) == units


@pytest.mark.parametrize(
    "call",
    [
        lambda: stock_volume(stock=0.0, target=0.0, volume=1.0),
        lambda: stock_volume(stock=1.0, target=-1.0, volume=1.0),
        lambda: strength_after_dilution(stock=1.0, volume=2.0, made_up_to=1.0),
        lambda: dilute_by_mass(stock=1.5, target=0.1, mass=1.0),
        lambda: mass_fraction_of_mixture([]),
        lambda: mass_fraction_of_mixture([(1.0, 1.5)]),
        lambda: solute_amount(concentration=-1.0, volume=1.0),
        lambda: solute_mass(fraction=1.5, density=1000.0, volume=1.0),
        lambda: solid_to_weigh(amount=1.0, molar_mass=0.1, purity=0.0),
    ],
)
def test_value_out_of_its_range_is_our_own_mistake(call: Callable[[], object]) -> None:
    with pytest.raises(ValueError, match=r"stock|negative|made up|mixture|fraction|purity"):
        call()
