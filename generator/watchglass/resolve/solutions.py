"""What is known of a solution beside its strength: its density, how much of it is solute, and why.

A density given with the material or its stock wins; then the table of aqueous solutions; a dilute
aqueous solution without a table (up to 5 % by mass) is taken to be as dense as water, and says so.
"""

from __future__ import annotations

from functools import lru_cache
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.scan import Found, scan_quantity
from watchglass.chemistry.densities import WATER, density_at, fraction_of_concentration
from watchglass.resolve import model

if TYPE_CHECKING:
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.substances import Substance
    from watchglass.chemistry.densities import DensityTable

#: Mass fraction up to which a solution without a table is taken to be as dense as water [-].
DILUTE = 0.05


class _Asked(NamedTuple):
    """What of a solution is known by its strength: its mass fraction, or its solute per volume."""

    fraction: float | None
    per_volume: float | None


def facts_of(
    composition: model.Composition, own: float | None, catalogue: Catalogue
) -> model.SolutionFacts | None:
    """Work out the density of a solution and the mass fraction of its solute.

    Args:
        composition: What the material is.
        own: Density given with it, kg/m3, or None.
        catalogue: The table of densities.

    Returns:
        The facts; None for what is no solution of one solute, or where nothing is known.
    """
    match composition:
        case model.Solution(strength, solute, solvent):
            quantity = strength.quantity
            return _facts(
                _of_strength(quantity.middle, quantity.dimension, solute),
                solute,
                solvent,
                own,
                catalogue,
            )
        case model.Saturated(solute, solvent):
            asked = _of_saturation(solute, solvent)
            return _facts(asked, solute, solvent, own, catalogue) if asked else None
        case _:
            return None


def _of_strength(value: float, dimension: dim.Dimension, solute: Substance) -> _Asked:
    if dimension == dim.MASS_FRACTION:
        return _Asked(value, None)
    if dimension == dim.MASS_CONCENTRATION:
        return _Asked(None, value)
    molar_mass = solute.molar_mass
    if dimension == dim.CONCENTRATION and molar_mass:
        return _Asked(None, value * molar_mass * 1e-3)
    if dimension == dim.MOLALITY and molar_mass:
        mass = value * molar_mass * 1e-3
        return _Asked(mass / (1 + mass), None)
    return _Asked(None, None)


def _of_saturation(solute: Substance, solvent: Substance) -> _Asked | None:
    """Read the solubility nearest to room temperature."""
    best: tuple[float, _Asked] | None = None
    for text in solute.soluble.get(solvent.key, ()):
        amount, _, at = text.partition(" at ")
        read, temperature = scan_quantity(amount, 0), scan_quantity(at, 0) if at else None
        if not isinstance(read, Found):
            continue
        kelvin = temperature.quantity.si if isinstance(temperature, Found) else 293.15
        quantity = read.quantity
        if quantity.dimension == dim.MASS_FRACTION:
            asked = _Asked(quantity.middle, None)
        elif quantity.dimension == dim.MASS_CONCENTRATION:
            asked = _Asked(None, quantity.middle)
        else:
            continue
        away = abs(kelvin - 293.15)
        if best is None or away < best[0]:
            best = away, asked
    return best[1] if best else None


def _facts(
    asked: _Asked, solute: Substance, solvent: Substance, own: float | None, catalogue: Catalogue
) -> model.SolutionFacts | None:
    fraction, per_volume = asked
    anhydrous = _share_anhydrous(solute, catalogue)
    table = catalogue.density_table(solute.hydrate_of or solute.key)
    aqueous = solvent.key == "water"
    density, source = own, "given"
    if density is None and aqueous and table is not None:
        share = fraction * anhydrous if fraction is not None else None
        if share is None and per_volume is not None:
            share = _fraction(table, per_volume * anhydrous)
        density, source = (density_at(table, share) if share is not None else None), "table"
    if density is None and aqueous and _dilute(fraction, per_volume):
        density, source = WATER, "water"
    if density is None:
        return (
            model.SolutionFacts(None, fraction, per_volume, "") if per_volume or fraction else None
        )
    if fraction is None and per_volume is not None:
        fraction = per_volume / density
    if per_volume is None and fraction is not None:
        per_volume = fraction * density
    return model.SolutionFacts(density, fraction, per_volume, source)


def _dilute(fraction: float | None, per_volume: float | None) -> bool:
    share = fraction if fraction is not None else (per_volume or 1e9) / WATER
    return share <= DILUTE


def _share_anhydrous(solute: Substance, catalogue: Catalogue) -> float:
    """Give the mass of anhydrous salt in a mass of its hydrate; 1 where it is none."""
    anhydrous = catalogue.by_key(solute.hydrate_of) if solute.hydrate_of else None
    if anhydrous is None or not anhydrous.molar_mass or not solute.molar_mass:
        return 1.0
    return anhydrous.molar_mass / solute.molar_mass


@lru_cache(maxsize=512)
def _fraction(table: DensityTable, per_volume: float) -> float | None:
    return fraction_of_concentration(table, per_volume, 1.0)
