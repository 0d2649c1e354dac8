"""Amounts and yields: from what is weighed or measured to moles, and on to what can form.

Functions of a few numbers each, so that every figure of a reagent table can be followed by hand.
Units are those of the SI (kg, m3, mol, kg/mol); fractions are between 0 and 1, never per cent. An
amount that is not known is no number here: the caller says so and does not call.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from collections.abc import Sequence
    from fractions import Fraction

#: Reactants whose extents differ by no more than this share run out together: it is rounding.
SAME_EXTENT = 1e-9


def amount_of_mass(*, mass: float, molar_mass: float, purity: float = 1.0) -> float:
    """Turn a mass into an amount.

    Args:
        mass: Mass weighed, kg, >= 0.
        molar_mass: Molar mass, kg/mol, > 0.
        purity: Mass fraction of the substance in what is weighed [-], > 0 to 1.

    Returns:
        Amount of substance, mol.

    Raises:
        ValueError: An argument out of its range.
    """
    return _not_negative(mass, "mass") * _share(purity) / _positive(molar_mass, "molar mass")


def mass_of_amount(*, amount: float, molar_mass: float, purity: float = 1.0) -> float:
    """Turn an amount into the mass to weigh.

    Args:
        amount: Amount of substance, mol, >= 0.
        molar_mass: Molar mass, kg/mol, > 0.
        purity: Mass fraction of the substance in what is weighed [-], > 0 to 1.

    Returns:
        Mass, kg.

    Raises:
        ValueError: An argument out of its range.
    """
    return _not_negative(amount, "amount") * _positive(molar_mass, "molar mass") / _share(purity)


def amount_of_volume(
    *, volume: float, density: float, molar_mass: float, purity: float = 1.0
) -> float:
    """Turn the volume of a liquid into an amount.

    Args:
        volume: Volume, m3, >= 0.
        density: Density of the liquid at its temperature, kg/m3, > 0.
        molar_mass: Molar mass, kg/mol, > 0.
        purity: Mass fraction of the substance in the liquid [-], > 0 to 1; for a solution of
            stated percentage by mass, that percentage, with the density of the solution.

    Returns:
        Amount of substance, mol.

    Raises:
        ValueError: An argument out of its range.
    """
    mass = _not_negative(volume, "volume") * _positive(density, "density")
    return amount_of_mass(mass=mass, molar_mass=molar_mass, purity=purity)


def volume_of_amount(
    *, amount: float, density: float, molar_mass: float, purity: float = 1.0
) -> float:
    """Turn an amount into the volume of liquid to measure.

    Args:
        amount: Amount of substance, mol, >= 0.
        density: Density of the liquid at its temperature, kg/m3, > 0.
        molar_mass: Molar mass, kg/mol, > 0.
        purity: Mass fraction of the substance in the liquid [-], > 0 to 1.

    Returns:
        Volume, m3.

    Raises:
        ValueError: An argument out of its range.
    """
    mass = mass_of_amount(amount=amount, molar_mass=molar_mass, purity=purity)
    return mass / _positive(density, "density")


def amount_in_solution(*, volume: float, concentration: float) -> float:
    """Work out the amount of solute in a volume of solution.

    Args:
        volume: Volume of the solution, m3, >= 0.
        concentration: Amount concentration, mol/m3, >= 0.

    Returns:
        Amount of solute, mol.

    Raises:
        ValueError: An argument out of its range.
    """
    return _not_negative(volume, "volume") * _not_negative(concentration, "concentration")


def equivalents(
    *,
    amount: float,
    limiting_amount: float,
    coefficient: Fraction | float = 1,
    limiting_coefficient: Fraction | float = 1,
) -> float:
    """Compare an amount with what the limiting reactant calls for.

    Args:
        amount: Amount of the reagent, mol, >= 0.
        limiting_amount: Amount of the limiting reactant, mol, > 0.
        coefficient: Stoichiometric number of the reagent, > 0; leave both at 1 for equivalents as
            they are printed in reagent tables, moles over moles.
        limiting_coefficient: Stoichiometric number of the limiting reactant, > 0.

    Returns:
        Equivalents [-]: 1 is just enough.

    Raises:
        ValueError: An argument out of its range.
    """
    reagent = _not_negative(amount, "amount") / _positive(float(coefficient), "coefficient")
    limiting = _positive(limiting_amount, "amount") / _positive(
        float(limiting_coefficient), "coefficient"
    )
    return reagent / limiting


@dataclass(frozen=True, slots=True)
class Reactant:
    """A reactant at hand.

    Attributes:
        coefficient: Its stoichiometric number, > 0.
        amount: How much of it there is, mol, >= 0; None for one that is in excess by declaration.
    """

    coefficient: Fraction | int
    amount: float | None


@dataclass(frozen=True, slots=True)
class Limit:
    """What stops a reaction that runs to its end.

    Attributes:
        extent: Extent of reaction then, mol: the amount of a species with coefficient 1.
        indices: Which reactants run out, by their place in what was given; more than one where
            they run out together.
    """

    extent: float
    indices: tuple[int, ...]


def limit(reactants: Sequence[Reactant]) -> Limit | None:
    """Find the reactant or reactants that run out first.

    Args:
        reactants: In the order of the equation.

    Returns:
        The extent and which they are; None where all are in excess by declaration.

    Raises:
        ValueError: A coefficient or an amount out of its range.

    Source:
        The least of amount over stoichiometric number.
    """
    extents = [
        (
            _not_negative(reactant.amount, "amount")
            / _positive(float(reactant.coefficient), "coefficient"),
            index,
        )
        for index, reactant in enumerate(reactants)
        if reactant.amount is not None
    ]
    if not extents:
        return None
    least = min(extents)[0]
    first = tuple(index for extent, index in extents if extent <= least * (1 + SAME_EXTENT))
    return Limit(least, first)


def left_over(reactants: Sequence[Reactant], extent: float) -> tuple[float | None, ...]:
    """Work out what is left of each reactant after so much reaction.

    Args:
        reactants: In the order of the equation.
        extent: Extent of reaction, mol, >= 0; times the conversion where it is not complete.

    Returns:
        Amounts, mol, in the same order; None for a reactant in excess by declaration. What is
        within rounding of nought is nought.

    Raises:
        ValueError: More would react than there is.
    """
    _not_negative(extent, "extent")
    left: list[float | None] = []
    for reactant in reactants:
        if reactant.amount is None:
            left.append(None)
            continue
        rest = reactant.amount - extent * float(reactant.coefficient)
        if abs(rest) <= reactant.amount * SAME_EXTENT:
            rest = 0.0
        left.append(_not_negative(rest, "amount left"))
    return tuple(left)


def product_amount(*, extent: float, coefficient: Fraction | float) -> float:
    """Work out how much of a product an extent of reaction gives.

    Args:
        extent: Extent of reaction, mol, >= 0.
        coefficient: Stoichiometric number of the product, > 0.

    Returns:
        Amount of the product, mol: the theoretical yield where the extent is that of the limit.

    Raises:
        ValueError: An argument out of its range.
    """
    return _not_negative(extent, "extent") * _positive(float(coefficient), "coefficient")


def yield_fraction(*, actual: float, theoretical: float) -> float:
    """Compare what was obtained with what could form.

    Args:
        actual: Obtained, as mass or amount, >= 0.
        theoretical: Theoretical yield in the same unit, > 0.

    Returns:
        Yield as a fraction [-]; above 1 where the product is wet or impure, which is for the
        caller to say.

    Raises:
        ValueError: An argument out of its range.
    """
    return _not_negative(actual, "yield") / _positive(theoretical, "theoretical yield")


def relative_difference(*, stated: float, computed: float) -> float:
    """Compare a figure as printed with the same figure computed.

    Args:
        stated: As printed.
        computed: As computed, in the same unit, not 0.

    Returns:
        (stated - computed) / computed [-]: positive where the print is high.

    Raises:
        ValueError: The computed figure is 0.
    """
    if computed == 0:
        raise ValueError("a computed figure of 0 has no relative difference")
    return (stated - computed) / computed


def _not_negative(value: float, what: str) -> float:
    if value < 0:
        raise ValueError(f"{what} of {value}")
    return value


def _positive(value: float, what: str) -> float:
    if value <= 0:
        raise ValueError(f"{what} of {value}")
    return value


def _share(value: float) -> float:
    if not 0 < value <= 1:
        raise ValueError(f"purity of {value}")
    return value
