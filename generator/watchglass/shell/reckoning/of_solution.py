"""What is asked of a solution as a whole: its density, mass and volume, and its strength in mol/L.

A solution is known by its strength and, where there is one, by its density: given with the stock,
from the table of aqueous solutions, or water's for a dilute one.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.resolve import model
from watchglass.run.content import DENSITY_FIGURES, SOLUBILITY_FIGURES
from watchglass.run.evaluate import NotKnown, Value

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.substances import Substance
    from watchglass.run.evaluate import Result

_UNKNOWN = NotKnown("data")
_SOURCES = {
    "given": "as given with it",
    "table": "from the table of aqueous solutions at 20 °C",
    "water": "taken to be that of water",
}
#: Bases over volume: mol/L follows from them without a density of the solution.
_OVER_VOLUME = (dim.CONCENTRATION, dim.MASS_CONCENTRATION)


def density(material: model.Material) -> Result:
    """Give the density of a solution, kg/m3."""
    facts = material.solution
    if facts is None or facts.density is None:
        return _UNKNOWN
    return Value(facts.density, dim.MASS_CONCENTRATION, _figures(material))


def concentration(material: model.Material) -> Result:
    """Give the amount of solute over the volume of a solution, mol/m3."""
    facts = material.solution
    match material.composition:
        case model.Solution(strength, solute, _):
            if strength.quantity.dimension == dim.VOLUME_FRACTION:
                return _of_volume_fraction(strength.quantity, solute)
            figures = strength.quantity.figures
        case model.Saturated(solute, _):
            figures = SOLUBILITY_FIGURES
        case _:
            return _UNKNOWN
    if facts is None or facts.per_volume is None or solute.molar_mass is None:
        return _UNKNOWN
    value = facts.per_volume / (solute.molar_mass * 1e-3)
    return Value(value, dim.CONCENTRATION, min(figures, _figures(material)))


def _of_volume_fraction(fraction: Quantity, solute: Substance) -> Result:
    if solute.density is None or solute.molar_mass is None:
        return _UNKNOWN
    per_volume = fraction.middle * solute.density.value.si
    return Value(per_volume / (solute.molar_mass * 1e-3), dim.CONCENTRATION, fraction.figures)


def measured(name: str, material: model.Material, quantity: Quantity, strength: Result) -> Result:
    """Give the mass or the volume of so much of a solution.

    Args:
        name: `mass` or `volume`.
        material: The solution.
        quantity: A mass or volume of the solution, or an amount of what is dissolved in it.
        strength: Its amount concentration, mol/m3, where known.
    """
    wanted = dim.MASS if name == "mass" else dim.VOLUME
    value, figures, of = quantity.middle, quantity.figures, quantity.dimension
    if of == dim.AMOUNT:
        if isinstance(strength, NotKnown) or strength.si <= 0:
            return _UNKNOWN
        value, figures, of = value / strength.si, min(figures, strength.figures), dim.VOLUME
    if of == wanted:
        return Value(value, wanted, figures)
    dense = density(material)
    if isinstance(dense, NotKnown) or of not in (dim.MASS, dim.VOLUME):
        return _UNKNOWN
    value = value * dense.si if wanted == dim.MASS else value / dense.si
    return Value(value, wanted, min(figures, dense.figures))


def rests_on(name: str, material: model.Material, quantity: Quantity | None) -> str:
    """Say which density an answer rests on; empty where it rests on none."""
    composition, facts = material.composition, material.solution
    if isinstance(composition, model.Solution):
        basis = composition.strength.quantity.dimension
        if basis == dim.VOLUME_FRACTION and name != "density":
            dense = composition.solute.density
            at = f" at {dense.temperature.text}" if dense and dense.temperature else ""
            return f"density of {composition.solute.name} {dense.value.text}{at}" if dense else ""
        if not _uses_density(name, basis, quantity):
            return ""
    if facts is None or facts.density is None:
        return ""
    said = f"{shown(facts.density / 1000, DENSITY_FIGURES)} g/mL, {_SOURCES[facts.source]}"
    return _SOURCES[facts.source] if name == "density" else f"density of the solution {said}"


def _uses_density(name: str, basis: dim.Dimension, quantity: Quantity | None) -> bool:
    if name == "density":
        return True
    of = quantity.dimension if quantity is not None else dim.VOLUME
    if name == "mass":
        return of != dim.MASS
    if name == "volume":
        return of == dim.MASS or (of == dim.AMOUNT and basis not in _OVER_VOLUME)
    if of == dim.AMOUNT:
        return False
    return (of == dim.MASS) == (basis in _OVER_VOLUME)


def _figures(material: model.Material) -> int:
    facts = material.solution
    return min(DENSITY_FIGURES, facts.figures) if facts is not None else DENSITY_FIGURES
