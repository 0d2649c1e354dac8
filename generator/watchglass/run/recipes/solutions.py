"""Solutions by volume: every solute is weighed or measured, and the whole made up to the mark."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.resolve import model
from watchglass.run.recipes import cautions
from watchglass.run.recipes.job import AS_BOUGHT, FINE, Job, Taken, as_bought, only_unknown, weak
from watchglass.run.recipes.lines import Begin, Dissolve, Line, MakeUp, Measure, Unknown, Weigh
from watchglass.run.recipes.rounding import volume_text
from watchglass.run.recipes.store import SLACK, NoSource, Source
from watchglass.run.recipes.strengths import BY_MASS, Part, missing, per_volume

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.catalogue.substances import Substance


def diluted(
    job: Job, parts: Sequence[Part], solvent: Substance, name: str, parent: model.Mixture
) -> Sequence[Line]:
    """Dilute a mixture of solutes as a whole, where all of them are weaker by one factor."""
    offered = {part.substance.key: part.quantity for part in parent.parts}
    ratios = [
        strength.middle / other.middle
        for strength, solute in parts
        if (other := offered.get(solute.key)) is not None
        and other.dimension == strength.dimension
        and other.middle > 0
    ]
    whole = job.whole_volume()
    alike = len(ratios) == len(parts) == len(offered)
    if whole is None or not alike or max(ratios) > (1 + AS_BOUGHT) * min(ratios):
        return (Unknown(f"it is not `{name}` made weaker by one factor"),)
    if max(ratios) > 1:
        return (Unknown(f"`{name}` is weaker than what is to be made of it"),)
    fine = min(part.strength.figures for part in parts) >= FINE
    line = job.rounding.volume(name, ratios[0] * whole, fine=fine)
    job.reach((line.volume / line.exact,))
    ware = job.rounding.flask(whole) if fine else ""
    return (line, MakeUp(solvent.name, volume_text(whole), ware))


def made_up(job: Job, parts: Sequence[Part], solvent: Substance) -> Sequence[Line]:
    """Weigh or measure every solute, and make up to volume."""
    whole = job.whole_volume()
    if whole is None:
        return (Unknown("it is made by mass, and its density is not known"),)
    fine = min(part.strength.figures for part in parts) >= FINE
    found = [_take(job, part, solvent, whole, fine=fine) for part in parts]
    if (done := as_bought(job, parts, found) or only_unknown(found)) is not None:
        return done
    if sum(one.line.exact for one in found if isinstance(one.line, Measure)) > whole * (1 + SLACK):
        return (weak(found),)
    job.assume(found)
    job.reach(
        one.line.mass / one.line.exact
        if isinstance(one.line, Weigh)
        else one.line.volume / one.line.exact
        for one in found
        if not isinstance(one.line, Unknown)
    )
    lines = _in_order(parts, found, solvent, whole)
    if any(cautions.warms(one.made) for one in found):
        lines.append(cautions.when_cold())
    ware = job.rounding.flask(whole) if fine else ""
    return (*lines, MakeUp(solvent.name, volume_text(whole), ware))


def _in_order(
    parts: Sequence[Part], found: Sequence[Taken], solvent: Substance, whole: float
) -> list[Line]:
    """Put solids before liquids, and each behind what is minded of it."""
    lines: list[Line] = []
    if cautions.volatile(solvent):
        lines.append(cautions.in_hood(solvent))
    pairs = sorted(
        zip(parts, found, strict=True), key=lambda pair: not isinstance(pair[1].line, Weigh)
    )
    first: Begin | None = None
    for (_, solute), one in pairs:
        if one.source is not None:
            lines += cautions.cautions(solute, one.source, one.strong, one.made)
            first = cautions.first(solute, solvent, one.strong, whole)
        if first is not None and not any(isinstance(x, Begin | Weigh) for x in lines):
            lines.append(first)
        lines.append(one.line)
    weighed = [at for at, line in enumerate(lines) if isinstance(line, Weigh)]
    if weighed:
        lines.insert(weighed[-1] + 1, Dissolve(solvent.name, cautions.dissolving(whole)))
    return lines


def _take(job: Job, part: Part, solvent: Substance, whole: float, *, fine: bool) -> Taken:
    """Work out how one solute is taken, for a volume of solution, m3."""
    solute, held = part.solute, per_volume(part)
    source = job.store.source(job.stock, solute, solvent, held)
    if isinstance(source, NoSource):
        job.too_weak = job.too_weak or source.too_weak
        return Taken(Unknown(source.why))
    molar = solute.molar_mass
    offers = job.store.per_volume(source, solute)
    made = held / molar * 1e3 if held is not None and molar else None
    strong = offers / molar * 1e3 if offers is not None and molar else None
    line: Weigh | Measure | Unknown
    if (ratio := _same_measure(part, source)) is not None:
        line = job.rounding.volume(source.name, ratio * whole, fine=fine)
    elif held is None:
        line = Unknown(missing(part))
    elif not source.solid and offers:
        line = job.rounding.volume(source.name, held / offers * whole, fine=fine)
    elif share := job.store.share(source, solute):
        line = job.rounding.mass(source.name, held / share * whole)
    else:
        line = Unknown(job.store.missing(source))
    return Taken(line, source, made, strong)


def _same_measure(part: Part, source: Source) -> float | None:
    """Give the volume of a source over that of what is made where both are given in one measure [-].

    So no density or formula is needed: `1 % v/v` of a pure liquid, `0.1 M` of `1 M`.
    """
    composition, dimension = source.material.composition, part.strength.dimension
    if source.substance.key != part.solute.key or dimension in BY_MASS:
        return None
    match composition:
        case model.Pure(substance):
            liquid = substance.state == "liquid" and source.purity == 1.0
            return part.strength.middle if dimension == dim.VOLUME_FRACTION and liquid else None
        case model.Solution(strength, _, _) if strength.quantity.dimension == dimension:
            offered = strength.quantity.middle
            return part.strength.middle / offered if offered > 0 else None
        case _:
            return None
