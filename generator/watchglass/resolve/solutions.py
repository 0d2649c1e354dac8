"""What is known of a solution beside its strength: its density, how much of it is solute, and why.

A density given with the material or its stock wins; then what two strengths on one label leave no
choice about; then the table of aqueous solutions. A dilute aqueous solution without a table (up to
5 % by mass) is taken to be as dense as water, and says so. Of other solvents nothing is taken.
"""

from __future__ import annotations

from functools import lru_cache
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.scan import Found, scan_quantity
from watchglass.chemistry.densities import WATER, density_at, fraction_of_concentration
from watchglass.resolve import model

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.substances import Substance
    from watchglass.chemistry.densities import DensityTable

#: Mass fraction up to which a solution without a table is taken to be as dense as water [-].
DILUTE = 0.05
#: Densities between which every solution of a teaching laboratory lies, kg/m3. Judgement: ether
#: has 710, a heavy liquid such as strong zinc bromide 2500.
LEAST, MOST = 500.0, 3500.0


class _Asked(NamedTuple):
    """What of a solution is known by its strength: its mass fraction, or its solute per volume.

    `in_table` is the solute per volume by which a table is asked, where that is another: a volume
    of a pure liquid is the mass that the table's own last point gives it.
    """

    fraction: float | None
    per_volume: float | None
    in_table: float | None = None


_NOTHING = _Asked(None, None)


def facts_of(
    composition: model.Composition,
    own: float | None,
    catalogue: Catalogue,
    *,
    also: Quantity | None = None,
    figures: int = 4,
) -> model.SolutionFacts | None:
    """Work out the density of a solution and the mass fraction of its solute.

    Args:
        composition: What the material is.
        own: Density given with it, kg/m3, or None.
        catalogue: The table of densities.
        also: The strength again in another measure, or None.
        figures: Figures of the density given.

    Returns:
        The facts; None for what is no solution of one solute, or where nothing is known. With a
        density of its own, anything has facts.
    """
    match composition:
        case model.Solution(strength, solute, solvent):
            asked = _of_strength(strength.quantity, solute, catalogue)
            facts = _facts(asked, solute, solvent, own, catalogue, figures)
            if own is None and also is not None and (facts is None or facts.source != "table"):
                between = density_between(strength.quantity, also, solute)
                if between is not None and LEAST <= between <= MOST:
                    least = min(strength.quantity.figures, also.figures)
                    facts = _facts(asked, solute, solvent, between, catalogue, least)
            return facts
        case model.Saturated(solute, solvent):
            found = _of_saturation(solute, solvent, catalogue)
            if found is None:
                return _given(own, figures)
            facts = _facts(found[0], solute, solvent, own, catalogue, figures)
            return facts._replace(solubility=found[1]) if facts is not None else None
        case model.Pure():
            facts = _given(own, figures)
            return facts._replace(fraction=1.0, per_volume=own) if facts is not None else None
        case _:
            return _given(own, figures)


def _given(own: float | None, figures: int) -> model.SolutionFacts | None:
    return model.SolutionFacts(own, None, None, "given", figures) if own is not None else None


def density_between(one: Quantity, other: Quantity, solute: Substance) -> float | None:
    """Give the density at which two strengths are the same, kg/m3.

    One of them counts by mass and one by volume; None for any other two.
    """
    for by_mass, by_volume in ((one, other), (other, one)):
        fraction = _of_value(by_mass, solute).fraction
        per_volume = _of_value(by_volume, solute).per_volume
        if fraction and per_volume:
            return per_volume / fraction
    return None


def _of_strength(quantity: Quantity, solute: Substance, catalogue: Catalogue) -> _Asked:
    asked = _of_value(quantity, solute)
    if quantity.dimension != dim.VOLUME_FRACTION or asked.per_volume is None:
        return asked
    table = catalogue.density_table(solute.key)
    if table is None or table.most < 1:
        return asked
    return asked._replace(in_table=quantity.middle * table.points[-1][1])


def _of_value(quantity: Quantity, solute: Substance) -> _Asked:
    value, dimension, molar_mass = quantity.middle, quantity.dimension, solute.molar_mass
    if dimension == dim.MASS_FRACTION:
        return _Asked(value, None)
    if dimension == dim.MASS_CONCENTRATION:
        return _Asked(None, value)
    if dimension == dim.VOLUME_FRACTION and solute.density is not None:
        return _Asked(None, value * solute.density.value.si)
    if dimension == dim.CONCENTRATION and molar_mass:
        return _Asked(None, value * molar_mass * 1e-3)
    if dimension == dim.MOLALITY and molar_mass:
        mass = value * molar_mass * 1e-3
        return _Asked(mass / (1 + mass), None)
    return _NOTHING


def _of_saturation(
    solute: Substance, solvent: Substance, catalogue: Catalogue
) -> tuple[_Asked, str] | None:
    """Read the solubility nearest to room temperature, of a hydrate by that of its anhydrous salt.

    Returns:
        What is known, and the solubility in the catalogue's words; None where there is none.
    """
    known, share = solute, 1.0
    anhydrous = catalogue.by_key(solute.hydrate_of) if solute.hydrate_of else None
    if not solute.soluble.get(solvent.key) and anhydrous is not None:
        known, share = anhydrous, _share_anhydrous(solute, catalogue)
    best: tuple[float, _Asked, str] | None = None
    for text in known.soluble.get(solvent.key, ()):
        amount, _, at = text.partition(" at ")
        read, temperature = scan_quantity(amount, 0), scan_quantity(at, 0) if at else None
        if not isinstance(read, Found):
            continue
        kelvin = temperature.quantity.si if isinstance(temperature, Found) else 293.15
        value = read.quantity.middle / share
        if read.quantity.dimension == dim.MASS_FRACTION and value < 1:
            asked = _Asked(value, None)
        elif read.quantity.dimension == dim.MASS_CONCENTRATION:
            asked = _Asked(None, value)
        else:
            continue
        away = abs(kelvin - 293.15)
        if best is None or away < best[0]:
            best = away, asked, f"{text} of {known.name}"
    return best[1:] if best else None


def _facts(
    asked: _Asked,
    solute: Substance,
    solvent: Substance,
    own: float | None,
    catalogue: Catalogue,
    figures: int,
) -> model.SolutionFacts | None:
    fraction, per_volume, in_table = asked
    density, source = own, "given"
    if density is None and solvent.key == "water":
        density, source, figures = _of_table(asked, solute, catalogue), "table", 4
        if density is None and _dilute(fraction, per_volume):
            density, source, figures = WATER, "water", 2
    if density is None:
        return (
            model.SolutionFacts(None, fraction, per_volume, "") if per_volume or fraction else None
        )
    if fraction is None and per_volume is not None:
        fraction = (in_table or per_volume) / density
        if fraction > 1:
            fraction = None  # the density, or the strength, is another's
    if per_volume is None and fraction is not None:
        per_volume = fraction * density
    return model.SolutionFacts(density, fraction, per_volume, source, figures)


def _of_table(asked: _Asked, solute: Substance, catalogue: Catalogue) -> float | None:
    """Give the density of an aqueous solution by the table of its anhydrous solute, kg/m3."""
    table = catalogue.density_table(solute.hydrate_of or solute.key)
    if table is None:
        return None
    anhydrous = _share_anhydrous(solute, catalogue)
    per_volume = asked.in_table or asked.per_volume
    share = asked.fraction * anhydrous if asked.fraction is not None else None
    if share is None and per_volume is not None:
        share = _fraction(table, per_volume * anhydrous)
    return density_at(table, share) if share is not None else None


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
