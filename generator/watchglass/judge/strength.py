"""Solutions stronger than their solute can make.

The most that a volume of solution holds of a solute is

- of a liquid, what the pure liquid holds: its density;
- of a gas in water, the last point of the table of densities and a fifth more, since tables end
  before the gas comes off;
- of a solid in water, its solubility and a fifth more, since rooms are warmer than tables. Where
  that is given by mass, the solute is taken to add no volume to the water, which gives too much
  rather than too little.

A solid that dissolves as something else (an acid or base without charge, iodine in iodide) is not
judged, nor one in another solvent than water.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.base.findings import Finding
from watchglass.base.scan import Found, scan_quantity
from watchglass.chemistry.densities import WATER, density_at, fraction_of_concentration
from watchglass.resolve import model

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.substances import Substance
    from watchglass.chemistry.densities import DensityTable
    from watchglass.judge.case import Case

#: Share by which a solubility or the end of a table may be passed [-]. Judgement: ammonia of 34.5 %
#: and hydrochloric acid of 42 % (saturated at 20 °C, from memory) lie within it.
_MORE = 0.20
#: Share by which the density of a pure liquid may be passed [-]: two tables, two temperatures.
_LIQUID = 0.02
#: Solutes that dissolve in water only as part of something else, which the name leaves out.
_AS_ANOTHER = frozenset(("iodine",))


class _Most(NamedTuple):
    """The most that a solution holds.

    Attributes:
        per_volume: Mass of solute in a volume of it, kg/m3.
        fraction: Mass fraction of the solute [-], or None.
        more: Share by which both may be passed [-].
        why: What sets the limit, in words.
        label: Whether it is a liquid or a gas, whose strength is often labelled by mass.
    """

    per_volume: float
    fraction: float | None
    more: float
    why: str
    label: bool = False


def too_strong(case: Case) -> Iterator[Finding]:
    """Report strengths beyond the pure liquid, or beyond what dissolves at room temperature.

    That of a stock is reported where the stock stands, however many procedures take it.
    """
    for material in case.procedure.materials.values():
        stock = case.catalogue.stocks.get(material.stock.casefold()) if material.stock else None
        described = material._replace(written=stock.material.text) if stock else material
        yield from beyond(described, case.catalogue)


def beyond(material: model.Material, catalogue: Catalogue) -> Iterator[Finding]:
    """Report one material that is stronger than its solute can make it."""
    composition = material.composition
    if not isinstance(composition, model.Solution):
        return
    most = _most(catalogue, composition.solute, composition.solvent)
    quantity = composition.strength.quantity
    limit = _limit(quantity, composition.solute, most) if most is not None else None
    if most is None or limit is None or quantity.si <= limit * (1 + most.more):
        return
    figure = f"{shown(limit / quantity.unit.factor, 2)} {quantity.unit.symbol}"
    yield Finding(
        code=codes.STRENGTH_IMPOSSIBLE,
        span=composition.strength.span,
        message=f"`{quantity.text}` is more than {most.why}: about {figure}",
        help=_help(quantity, material.written, composition.solute, most),
    )


def _limit(quantity: Quantity, solute: Substance, most: _Most) -> float | None:
    """Give the greatest strength in the measure of a strength, SI; None where it is not known."""
    molar_mass = solute.formula.molar_mass_si if solute.formula else None
    if quantity.dimension == dim.MASS_FRACTION:
        return most.fraction
    if quantity.dimension == dim.MASS_CONCENTRATION:
        return most.per_volume
    if quantity.dimension == dim.CONCENTRATION and most.per_volume and molar_mass:
        return most.per_volume / molar_mass
    return None


def _help(quantity: Quantity, written: str, solute: Substance, most: _Most) -> str:
    by_mass = quantity.dimension == dim.CONCENTRATION and quantity.number.value <= 100 * (
        most.fraction or 1.0
    )
    if most.label and by_mass and quantity.text in written:
        meant = written.replace(quantity.text, f"{quantity.number.text} % w/w", 1)
        return f"write `{meant}` if that is what the label says, or mend the figure"
    if not most.label:
        return f"write `saturated {solute.name}`, or mend the figure"
    return "see where the point stands, and which unit the label has"


def _most(catalogue: Catalogue, solute: Substance, solvent: Substance) -> _Most | None:
    if solute.state == "liquid" and solute.density is not None:
        why = f"pure {solute.name} holds"
        return _Most(solute.density.value.si, None, _LIQUID, why, label=True)
    if solvent.key != "water":
        return None
    if solute.state == "gas":
        return _of_gas(catalogue, solute)
    if solute.key in _AS_ANOTHER or (_molecular(solute) and (solute.acid or solute.base)):
        return None
    return _of_solid(catalogue, solute)


def _of_gas(catalogue: Catalogue, solute: Substance) -> _Most | None:
    table = catalogue.density_table(solute.key)
    if table is None:
        return None
    fraction, density = table.points[-1]
    why = f"the strongest solution of {solute.name} holds"
    return _Most(fraction * density, fraction, _MORE, why, label=True)


def _molecular(solute: Substance) -> bool:
    """Tell whether a solute has no ions of its own, or may have none."""
    return "+" not in solute.smiles.replace("[N+](=O)[O-]", "")


def _of_solid(catalogue: Catalogue, solute: Substance) -> _Most | None:
    """Give the greatest solubility that is known of a salt or of its anhydrous form."""
    known, share = solute, 1.0
    anhydrous = catalogue.by_key(solute.hydrate_of) if solute.hydrate_of else None
    if not solute.soluble.get("water") and anhydrous is not None:
        if not anhydrous.molar_mass or not solute.molar_mass:
            return None
        known, share = anhydrous, solute.molar_mass / anhydrous.molar_mass
    table = catalogue.density_table(known.key)
    volumes, fractions = [], []
    for text in known.soluble.get("water", ()):
        read = scan_quantity(text.partition(" at ")[0], 0)
        if not isinstance(read, Found):
            return None  # miscible
        value = read.quantity.si_high
        if read.quantity.dimension == dim.MASS_CONCENTRATION:
            volumes.append(value)
            fraction = fraction_of_concentration(table, value, 1.0) if table else None
            fractions += [fraction] if fraction is not None else []
        elif read.quantity.dimension == dim.MASS_FRACTION and value < 1:
            fractions.append(value)
            volumes.append(_volume(table, value))
    if not volumes:
        return None
    by_mass = max(fractions) if len(fractions) == len(volumes) and share == 1.0 else None
    why = f"dissolves of {solute.name} in water"
    return _Most(max(volumes) * share, by_mass, _MORE, why)


def _volume(table: DensityTable | None, fraction: float) -> float:
    """Give the mass of solute in a volume of a solution saturated at a mass fraction, kg/m3."""
    density = density_at(table, fraction) if table is not None else None
    return fraction * density if density else fraction / (1 - fraction) * WATER
