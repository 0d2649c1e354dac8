"""How much of a stock, or of a solid or liquid as it is, makes a solution of a wanted strength.

What a technician works out before filling a bottle. The answer is an instruction for measuring, so it
shows as many figures as the volume made up, and at least three: strengths are names on bottles, and
`1 L of 3.0 M from 12 M` asks for 250 mL, not for 300.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.figures import MOST_FIGURES
from watchglass.chemistry.solutions import (
    Portions,
    TooWeak,
    dilute_by_mass,
    solid_to_weigh,
    solute_amount,
    stock_volume,
)
from watchglass.resolve import model
from watchglass.run.evaluate import NotKnown, Value

if TYPE_CHECKING:
    from collections.abc import Callable

    from watchglass.catalogue.substances import Substance
    from watchglass.run.evaluate import Result

_LEAST_FIGURES = 3


class Diluted(NamedTuple):
    """What to take.

    Attributes:
        taken: Volume of a stock or liquid, m3, or mass of a solid or stock, kg.
        diluent: Mass of water to add, kg, where the strengths are by mass; else None.
    """

    taken: Value
    diluent: Value | None = None


class Weak(NamedTuple):
    """The stock is weaker than what is to be made of it."""


class Unclear(NamedTuple):
    """Why there is no answer: what is not known, in words."""

    why: str


def diluted(
    stock: model.Material,
    target: Value,
    made: Value,
    concentration: Callable[[model.Material], Result],
) -> Diluted | Weak | Unclear:
    """Work out what to take for a solution.

    Args:
        stock: What the bottle holds: a solution, or a substance as it is.
        target: Strength to be made: amount or mass over volume, or volume or mass fraction.
        made: Volume to be made up, m3; with mass fractions the mass to be made, kg.
        concentration: Gives the amount concentration of a solution, where it is known.
    """
    figures = min(MOST_FIGURES, max(_LEAST_FIGURES, made.figures))
    match stock.composition:
        case model.Pure(substance):
            return _of_pure(substance, target, made, figures)
        case model.Solution(strength, solute, _):
            quantity = strength.quantity
        case model.Saturated(solute, _):
            return Unclear(f"how much {solute.name} a saturated solution holds is not known")
        case _:
            return Unclear("what the stock holds is not known")
    if quantity.dimension == target.dimension == dim.MASS_FRACTION:
        return _by_mass(quantity.middle, target, made, figures)
    if target.dimension == dim.MASS_FRACTION:
        return Unclear("a strength by mass is made of a stock that is given by mass too")
    if quantity.dimension == target.dimension:
        return _by_volume(quantity.middle, target.si, made, figures)
    reached, wanted = concentration(stock), _amount_concentration(target, solute.molar_mass)
    if isinstance(reached, NotKnown):
        return Unclear("")
    if wanted is None:
        return Unclear(f"the strengths cannot be compared: give both as mol/L of {solute.name}")
    return _by_volume(reached.si, wanted, made, figures)


def _amount_concentration(target: Value, molar_mass: float | None) -> float | None:
    """Give a strength as mol/m3; None where its basis or the molar mass does not allow it."""
    if target.dimension == dim.CONCENTRATION:
        return target.si
    if target.dimension == dim.MASS_CONCENTRATION and molar_mass:
        return target.si / (molar_mass * 1e-3)
    return None


def _by_volume(stock: float, target: float, made: Value, figures: int) -> Diluted | Weak | Unclear:
    if stock <= 0:
        return Unclear("the stock holds nothing")
    found = stock_volume(stock=stock, target=target, volume=made.si)
    return Weak() if isinstance(found, TooWeak) else Diluted(Value(found, dim.VOLUME, figures))


def _by_mass(stock: float, target: Value, made: Value, figures: int) -> Diluted | Weak | Unclear:
    if stock <= 0:
        return Unclear("the stock holds nothing")
    match dilute_by_mass(stock=stock, target=target.si, mass=made.si):
        case TooWeak():
            return Weak()
        case Portions(taken, water):
            return Diluted(Value(taken, dim.MASS, figures), Value(water, dim.MASS, figures))


def _of_pure(
    substance: Substance, target: Value, made: Value, figures: int
) -> Diluted | Weak | Unclear:
    """Weigh a solid, or measure a liquid by its density."""
    molar_mass = substance.molar_mass
    if target.dimension == dim.MASS_FRACTION:
        return _by_mass(1.0, target, made, figures)
    if target.dimension == dim.VOLUME_FRACTION:
        if substance.state != "liquid":
            return Unclear(f"{substance.name} is not known to be a liquid")
        return _by_volume(1.0, target.si, made, figures)
    if target.dimension == dim.MASS_CONCENTRATION:
        mass = target.si * made.si
    elif molar_mass is None:
        return Unclear(f"the catalogue has no molar mass of {substance.name}")
    else:
        amount = solute_amount(concentration=target.si, volume=made.si)
        mass = solid_to_weigh(amount=amount, molar_mass=molar_mass * 1e-3)
    if substance.state != "liquid" or substance.density is None:
        return Diluted(Value(mass, dim.MASS, figures))
    volume = mass / substance.density.value.si
    return Weak() if volume > made.si else Diluted(Value(volume, dim.VOLUME, figures))
