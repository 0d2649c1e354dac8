"""Making solutions: diluting, weighing out, mixing.

What a technician works out on paper before filling a bottle. Volumes of a target are those to which
the solution is made up; masses add, volumes are never added. All in SI units; `strengths` turns one
measure of strength into another.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.chemistry.formulas import Formula


@dataclass(frozen=True, slots=True)
class TooWeak:
    """The stock is weaker than what is to be made of it; both in the caller's own unit."""

    stock: float
    target: float


@dataclass(frozen=True, slots=True)
class Portions:
    """What to weigh together.

    Attributes:
        stock: Mass of the stock, kg.
        diluent: Mass of the solvent to add, kg.
    """

    stock: float
    diluent: float


def stock_volume(*, stock: float, target: float, volume: float) -> float | TooWeak:
    """Work out the volume of stock to make up to a volume of weaker solution.

    Args:
        stock: Strength of the stock over volume (mol/m3, kg/m3 or volume fraction), > 0.
        target: Strength to be made, in the same unit, >= 0.
        volume: Volume to which it is made up, m3, >= 0.

    Returns:
        Volume of stock, m3, or that the stock is too weak.

    Raises:
        ValueError: An argument out of its range.
    """
    _check(target, volume)
    if stock <= 0:
        raise ValueError(f"a stock of strength {stock}")
    return TooWeak(stock, target) if target > stock else target / stock * volume


def strength_after_dilution(*, stock: float, volume: float, made_up_to: float) -> float:
    """Work out the strength of a volume of stock made up to a larger volume.

    Args:
        stock: Strength of the stock over volume, any unit, >= 0.
        volume: Volume of stock taken, m3, >= 0.
        made_up_to: Volume of the solution made, m3, > 0, no less than `volume`.

    Returns:
        Strength in the unit of `stock`.

    Raises:
        ValueError: An argument out of its range.
    """
    _check(stock, volume)
    if made_up_to <= 0 or made_up_to < volume:
        raise ValueError(f"{volume} m3 made up to {made_up_to} m3")
    return stock * volume / made_up_to


def dilute_by_mass(*, stock: float, target: float, mass: float) -> Portions | TooWeak:
    """Work out what to weigh for a solution of a lower mass fraction.

    Args:
        stock: Mass fraction of the stock [-], > 0 to 1.
        target: Mass fraction to be made [-], 0 to 1.
        mass: Mass of solution to be made, kg, >= 0.

    Returns:
        Masses of stock and solvent, or that the stock is too weak.

    Raises:
        ValueError: An argument out of its range.
    """
    _check(target, mass)
    if not 0 < stock <= 1:
        raise ValueError(f"a stock with a mass fraction of {stock}")
    if target > stock:
        return TooWeak(stock, target)
    taken = target / stock * mass
    return Portions(taken, mass - taken)


def mass_fraction_of_mixture(portions: Sequence[tuple[float, float]]) -> float:
    """Work out the mass fraction of several solutions of one solute put together.

    Args:
        portions: Mass, kg, >= 0, and mass fraction [-], 0 to 1, of each; pure solvent has 0.

    Returns:
        Mass fraction [-].

    Raises:
        ValueError: No mass at all, or a value out of its range.
    """
    for mass, fraction in portions:
        _check(mass, fraction)
        if fraction > 1:
            raise ValueError(f"a mass fraction of {fraction}")
    whole = sum(mass for mass, _ in portions)
    if whole <= 0:
        raise ValueError("a mixture without mass")
    return sum(mass * fraction for mass, fraction in portions) / whole


def solute_amount(*, concentration: float, volume: float) -> float:
    """Work out the amount of solute, mol, in a solution of so many mol/m3 and m3, both >= 0."""
    _check(concentration, volume)
    return concentration * volume


def solute_mass(*, fraction: float, density: float, volume: float) -> float:
    """Work out the mass of solute in a volume of solution of known mass fraction.

    Args:
        fraction: Mass fraction of the solute [-], 0 to 1.
        density: Density of the solution, kg/m3, > 0.
        volume: Volume of the solution, m3, >= 0.

    Returns:
        Mass of solute, kg. The mass of solvent is `density * volume` less this.

    Raises:
        ValueError: An argument out of its range.
    """
    _check(fraction, volume)
    if fraction > 1 or density <= 0:
        raise ValueError(f"a mass fraction of {fraction} at a density of {density} kg/m3")
    return fraction * density * volume


def solid_to_weigh(
    *,
    amount: float,
    molar_mass: float,
    solute_units: Fraction | float = 1,
    purity: float = 1.0,
) -> float:
    """Work out the mass of a solid, hydrate or impure, that brings an amount of solute.

    Args:
        amount: Amount of the solute wanted, mol, >= 0.
        molar_mass: Molar mass of the solid as weighed, its water included, kg/mol, > 0.
        solute_units: Formula units of solute in one of the solid [-], > 0, as `solute_units` gives.
        purity: Mass fraction of the solid in what is weighed [-], > 0 to 1.

    Returns:
        Mass, kg.

    Raises:
        ValueError: An argument out of its range.
    """
    _check(amount, molar_mass)
    if solute_units <= 0 or not 0 < purity <= 1:
        raise ValueError(f"{solute_units} units of solute at a purity of {purity}")
    return amount / float(solute_units) * molar_mass / purity


def solute_units(solid: Formula, solute: Formula) -> Fraction | None:
    """Count the formula units of a solute in one of its hydrate.

    Args:
        solid: What is weighed, such as `Na2CO3·10H2O`.
        solute: What the solution is of, such as `Na2CO3`.

    Returns:
        How many; 1 where they are the same; None where the solid is not the solute and water, so
        that no mass is worked out for what may be another substance.
    """
    if solid.charge == solute.charge and solid.composition == solute.composition:
        return Fraction(1)
    atoms, units = dict(solid.composition), dict(solute.composition)
    marking = next((symbol for symbol in units if symbol not in ("H", "O")), None)
    if marking is None or "·" not in solid.text:
        # By atoms alone NaOH is half Na2O and half water; only a formula with a dot is a hydrate.
        return None
    number = Fraction(atoms.get(marking, 0)) / units[marking]
    if number <= 0 or solid.charge != solute.charge * number:
        return None
    rest = {
        symbol: atoms.get(symbol, 0) - units.get(symbol, 0) * number for symbol in atoms | units
    }
    water = rest.pop("O", Fraction(0))
    hydrogen = rest.pop("H", Fraction(0))
    if any(rest.values()) or water < 0 or hydrogen != 2 * water:
        return None
    return number


def _check(*values: float) -> None:
    if any(value < 0 for value in values):
        raise ValueError(f"a negative value among {values}")
