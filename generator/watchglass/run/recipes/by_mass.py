"""Solutions by mass: solutes and solvent are weighed together."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.run.recipes import cautions
from watchglass.run.recipes.job import Job, Taken, as_bought, only_unknown, weak
from watchglass.run.recipes.lines import Line, Unknown, Weigh
from watchglass.run.recipes.store import SLACK, NoSource
from watchglass.run.recipes.strengths import Part, missing, shares

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.catalogue.substances import Substance


def weighed(job: Job, parts: Sequence[Part], solvent: Substance) -> Sequence[Line]:
    """Weigh every solute and the solvent."""
    wanted = shares(parts)
    if wanted is None:
        return (Unknown(next(missing(p) for p in parts if not p.solute.molar_mass)),)
    if sum(wanted) > 1 + 1e-9:
        return (Unknown("its parts are more than the whole"),)
    whole = job.whole_mass(solvent)
    found, offered, rest = [], [], whole
    for (_, solute), share in zip(parts, wanted, strict=True):
        one, offers = _weigh_out(job, solute, solvent, share, whole)
        found.append(one)
        offered.append(offers)
        rest -= one.line.exact if isinstance(one.line, Weigh) else 0.0
    if (done := as_bought(job, parts, found) or only_unknown(found)) is not None:
        return done
    if rest < -SLACK * whole:
        return (weak(found),)
    job.assume(found)
    if any(isinstance(one.line, Unknown) for one in found):
        unknown = Unknown(f"how much {solvent.name} it takes depends on what is not known")
        return _solvent_in_place(parts, found, unknown, solvent)
    filling = job.rounding.mass(solvent.name, max(0.0, rest))
    weights = [one.line.mass if isinstance(one.line, Weigh) else 0.0 for one in found]
    total = sum(weights) + filling.mass
    if total:
        job.reach(
            weight * offers / total / share
            for weight, offers, share in zip(weights, offered, wanted, strict=True)
            if weight
        )
    return _solvent_in_place(parts, found, filling, solvent)


def _weigh_out(
    job: Job, solute: Substance, solvent: Substance, share: float, whole: float
) -> tuple[Taken, float]:
    """Work out how one solute is weighed for a share of a mass, and what its source offers [-]."""
    facts = job.material.solution
    held = share * facts.density if facts is not None and facts.density else None
    source = job.store.source(job.stock, solute, solvent, held, share)
    if isinstance(source, NoSource):
        job.too_weak = job.too_weak or source.too_weak
        return Taken(Unknown(source.why)), 0.0
    offers = job.store.share(source, solute)
    if not offers:
        return Taken(Unknown(job.store.missing(source)), source), 0.0
    molar, dense = solute.molar_mass, job.store.per_volume(source, solute)
    made = held / molar * 1e3 if held is not None and molar else None
    strong = dense / molar * 1e3 if dense is not None and molar else None
    line = job.rounding.mass(source.name, share / offers * whole)
    return Taken(line, source, made, strong), offers


def _solvent_in_place(
    parts: Sequence[Part],
    found: Sequence[Taken],
    filling: Weigh | Unknown,
    solvent: Substance,
) -> Sequence[Line]:
    """Put the solvent before a concentrated acid, and behind anything else."""
    lines: list[Line] = [cautions.in_hood(solvent)] if cautions.volatile(solvent) else []
    before = False
    for (_, solute), one in zip(parts, found, strict=True):
        if one.source is not None:
            lines += cautions.cautions(solute, one.source, one.strong, one.made)
            before = before or cautions.first(solute, solvent, one.strong, 1.0) is not None
    solutes = [one.line for one in found]
    rest = () if isinstance(filling, Weigh) and filling.exact <= 0 else (filling,)
    return (*lines, *(rest if before else ()), *solutes, *(() if before else rest))
