"""Works a recipe out: which lines, in the order of the work, and what they rest on."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.catalogue.reagents import PRACTICE
from watchglass.resolve import model
from watchglass.run.recipes.by_mass import weighed
from watchglass.run.recipes.lines import Care, Line, Recipe, Unknown
from watchglass.run.recipes.mixtures import poured, saturated, weighed_together
from watchglass.run.recipes.rounding import mass_text, volume_text
from watchglass.run.recipes.solutions import diluted, made_up
from watchglass.run.recipes.strengths import BY_MASS, Part

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.catalogue.substances import Substance
    from watchglass.run.recipes.job import Job


def make(job: Job) -> Recipe:
    """Work out how a stock is made."""
    lines = _lines(job, job.material.composition)
    if any(isinstance(line, Unknown) for line in lines):
        job.reached = None
    size = mass_text(job.mass) if job.mass is not None else volume_text(job.volume or 0.0)
    if any(isinstance(line, Care) and line.source == PRACTICE for line in lines):
        job.assumptions.append("cautions are common practice, without a source")
    said = tuple(dict.fromkeys(filter(None, job.assumptions)))
    return Recipe(size, tuple(lines), job.reached, said, job.too_weak)


def _lines(job: Job, composition: model.Composition) -> Sequence[Line]:
    match composition:
        case model.Solution(strength, solute, solvent):
            return _solution(job, (Part(strength.quantity, solute),), solvent)
        case model.Saturated(solute, solvent):
            return saturated(job, solute, solvent)
        case model.Mixture(parts, "strength", solvent):
            solvent = solvent or job.store.catalogue.by_key("water")
            if solvent is None:
                return (Unknown("what it is dissolved in is not known"),)
            return _solution(
                job,
                tuple(Part(p.quantity, p.substance) for p in parts),
                solvent,
            )
        case model.Mixture(parts, "volume", _):
            return poured(job, parts)
        case model.Mixture(parts, _, _):
            return weighed_together(job, parts)
        case model.Pure(substance):
            return (Care(f"{substance.name} is used as it is bought", ""),)
        case _:
            return (Unknown("what it is made of is not known"),)


def _solution(job: Job, parts: Sequence[Part], solvent: Substance) -> Sequence[Line]:
    if any(part.strength.middle <= 0 for part in parts):
        return (Unknown("it holds nothing of what it is named after"),)
    if (parent := job.store.mixture(job.stock)) is not None:
        return diluted(job, parts, solvent, *parent)
    by_mass = sum(part.strength.dimension in BY_MASS for part in parts)
    if by_mass == len(parts):
        return weighed(job, parts, solvent)
    if by_mass:
        return (Unknown("its strengths count partly by mass and partly by volume"),)
    return made_up(job, parts, solvent)
