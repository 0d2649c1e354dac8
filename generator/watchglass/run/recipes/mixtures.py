"""Saturated solutions, and mixtures by ratio."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.chemistry.densities import WATER
from watchglass.run.content import Missing, contents
from watchglass.run.recipes import cautions
from watchglass.run.recipes.lines import Care, Line, Unknown
from watchglass.run.recipes.store import NoSource, Source

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.catalogue.substances import Substance
    from watchglass.resolve import model
    from watchglass.run.recipes.job import Job

#: More of a solid than dissolves, so that some is left [-]. Judgement.
_EXCESS = 0.1


def saturated(job: Job, solute: Substance, solvent: Substance) -> Sequence[Line]:
    """Weigh more of a solid than dissolves, and measure what it dissolves in."""
    by_mass = job.mass is not None
    whole = job.mass if job.mass is not None else job.volume or 0.0
    held = contents(job.material, dim.MASS if by_mass else dim.VOLUME, whole, 6)
    if isinstance(held, Missing):
        return (Unknown(f"the {held.what} of {solute.name} is not known"),)
    source = job.store.source(job.stock._replace(made_from=""), solute, solvent, None)
    share = job.store.share(source, solute) if isinstance(source, Source) else None
    if isinstance(source, NoSource) or source.dissolved or not share:
        return (Unknown(f"no {solute.name} is owned to saturate it with"),)
    facts, own = job.material.solution, solvent.density
    density = own.value.middle if own is not None else WATER
    dense = facts.density if facts is not None and facts.density else density
    mass = held[0].mass / share
    rest = (whole if by_mass else whole * dense) - mass
    job.assumptions += [*held[0].assumptions, source.assumption]
    job.assumptions.append("solubility near 20 °C; a tenth more, so that some is left")
    return (
        job.rounding.mass(source.name, mass * (1 + _EXCESS)),
        job.rounding.volume(solvent.name, max(0.0, rest) / density),
        Care("some solid must lie at the bottom when it has stood for a day", ""),
    )


def poured(job: Job, parts: Sequence[model.Part]) -> Sequence[Line]:
    """Measure the parts of a mixture by volume."""
    whole = job.whole_volume()
    if whole is None:
        return (Unknown("it is made by mass, and its density is not known"),)
    total = sum(part.quantity.middle for part in parts)
    if not total:
        return (Unknown("its parts are nothing"),)
    job.assumptions.append("volumes add up")
    lines: list[Line] = []
    for part in parts:
        if cautions.volatile(part.substance):
            lines = lines or [cautions.in_hood(part.substance)]
    for part in parts:
        size = whole * part.quantity.middle / total
        lines.append(job.rounding.volume(part.substance.name, size))
    return lines


def weighed_together(job: Job, parts: Sequence[model.Part]) -> Sequence[Line]:
    """Weigh the parts of a mixture by mass or by amount, or one batch of them as written."""
    by_mass = job.mass is not None
    whole = job.mass if job.mass is not None else job.volume or 0.0
    held = contents(job.material, dim.MASS if by_mass else dim.VOLUME, whole, 6)
    if isinstance(held, Missing):
        return (Unknown(f"the {held.what} of a part is not known: give `makes:` by mass"),)
    job.assumptions += held[0].assumptions
    job.assumptions += (f"{part.substance.name} taken as pure" for part in parts)
    return tuple(job.rounding.mass(one.substance.name, one.mass) for one in held)
