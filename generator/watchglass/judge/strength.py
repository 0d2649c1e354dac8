"""Solutions stronger than their solute can make."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.base.findings import Finding
from watchglass.base.scan import Found, scan_quantity
from watchglass.resolve import model

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.catalogue.substances import Substance
    from watchglass.judge.case import Case

#: Share by which a solubility may be passed: rooms are warmer than tables [-].
_WARMER = 0.10


def too_strong(case: Case) -> Iterator[Finding]:
    """Report strengths beyond the pure liquid, or beyond what dissolves at room temperature."""
    for material in case.procedure.materials.values():
        composition = material.composition
        if not isinstance(composition, model.Solution):
            continue
        quantity, solute = composition.strength.quantity, composition.solute
        molar_mass = solute.molar_mass
        if quantity.dimension == dim.CONCENTRATION and molar_mass:
            held = quantity.si * molar_mass * 1e-3
        elif quantity.dimension == dim.MASS_CONCENTRATION:
            held = quantity.si
        else:
            continue
        most, why = _most(case, solute, composition.solvent)
        if most is None or held <= most:
            continue
        unit = quantity.unit
        size = most / (molar_mass * 1e-3) if quantity.dimension == dim.CONCENTRATION else most
        yield Finding(
            code=codes.STRENGTH_IMPOSSIBLE,
            span=composition.strength.span,
            message=f"`{quantity.text}` is more than {why}:"
            f" about {shown((size or 0.0) / unit.factor, 2)} {unit.symbol}",
            help="see whether the point, or `% w/w` for the unit, is meant",
        )


def _most(case: Case, solute: Substance, solvent: Substance) -> tuple[float | None, str]:
    """Give the most of a solute that a volume of solution holds, kg/m3, and what sets it."""
    if solute.state == "liquid" and solute.density is not None:
        return solute.density.value.si * 1.001, f"pure {solute.name} holds"
    if solvent.key != "water":
        return None, ""
    table = case.catalogue.density_table(solute.hydrate_of or solute.key)
    if solute.state == "gas" and table is not None:
        fraction, density = table.points[-1]
        return fraction * density * (1 + _WARMER), f"the strongest solution of {solute.name} holds"
    best = 0.0
    for text in solute.soluble.get("water", ()):
        amount, _, at = text.partition(" at ")
        read = scan_quantity(amount, 0)
        warm = scan_quantity(at, 0) if at else None
        if isinstance(warm, Found) and warm.quantity.si > 308.15:
            continue
        if isinstance(read, Found) and read.quantity.dimension == dim.MASS_CONCENTRATION:
            best = max(best, read.quantity.si)
    if not best or solute.acid or solute.base:
        return None, ""  # a salt of it may dissolve better, or the solution be made with acid
    return best * (1 + _WARMER), f"dissolves of {solute.name} in water"
