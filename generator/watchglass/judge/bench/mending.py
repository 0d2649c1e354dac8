"""What would mend a missed expectation: the procedure run again with one thing changed."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.base.quantities import Number
from watchglass.read.terms import Compare, Within
from watchglass.resolve import model
from watchglass.run.bench.asked import Asked
from watchglass.run.bench.bench import run_bench
from watchglass.run.bench.evaluator import BenchEvaluator
from watchglass.run.bench.figures import share_words
from watchglass.run.evaluate import Value

if TYPE_CHECKING:
    from watchglass.judge.bench.run import Run
    from watchglass.run.passes import Course, Happening

#: Strengths tried, as multiples of the one written; common strengths of the shelf, mol/L.
_SHELF = (0.1, 0.5, 1.0, 2.0, 3.0, 6.0)


#: Portions tried beside the first.
_MORE = (1, 2, 3)
_COUNTED = {1: "one", 2: "two", 3: "three", 4: "four"}


class Mend(NamedTuple):
    """What would do.

    Attributes:
        words: `3.0 M would move 98 %`, for the message.
        help: What to type.
    """

    words: str
    help: str


class Washing(NamedTuple):
    """A reagent that is charged and drawn off again: its material, and the events from one to the other."""

    material: str
    first: Happening
    last: Happening


def mended(run: Run, line: model.Expectation, washing: Washing) -> Mend | None:
    """Find what makes an expectation hold: a stronger reagent, more portions of it, or both.

    The least change comes first: the least common strength that does with the portions there are,
    then up to three portions more of the strength there is, then both.
    """
    material = run.case.procedure.materials.get(washing.material)
    if material is None:
        return None
    strengths = _stronger(material)
    for more, candidates in ((0, strengths), *((k, (None, *strengths)) for k in _MORE)):
        for strength in candidates:
            reached = _reached(run, line, washing, material, strength, more)
            if reached is not None:
                return _told(material, strength, more, share_words(reached))
    return None


def _stronger(material: model.Material) -> tuple[float | None, ...]:
    """Give the common strengths above the one there is, mol/L."""
    if not isinstance(material.composition, model.Solution):
        return ()
    quantity = material.composition.strength.quantity
    if quantity.dimension != dim.CONCENTRATION:
        return ()
    return tuple(s for s in _SHELF if s * 1000.0 > quantity.middle * (1 + 1e-9))


def _told(material: model.Material, strength: float | None, more: int, share: str) -> Mend:
    portions = f"{_COUNTED.get(more, '')} portion{'s' if more > 1 else ''} more"
    again = f"do it again, `{{again STEP, {more} more time{'s' if more > 1 else ''}}}`"
    if strength is None:
        return Mend(f"{portions} would move {share}", again)
    text = f"{shown(strength, 2)} M"
    written = material.written
    if isinstance(material.composition, model.Solution):
        written = written.replace(material.composition.strength.quantity.text, text, 1)
    declare = f"declare `{material.name}: {written}`"
    if not more:
        return Mend(f"{text} would move {share}", declare)
    return Mend(f"{text}, and {portions}, would move {share}", f"{declare}, and {again}")


def _reached(
    run: Run,
    line: model.Expectation,
    washing: Washing,
    material: model.Material,
    strength: float | None,
    more: int,
) -> float | None:
    """Run the procedure so changed; give the figure reached where the expectation then holds."""
    procedure = run.case.procedure
    if strength is not None:
        changed = _of_strength(material, strength)
        procedure = replace(procedure, materials={**procedure.materials, material.name: changed})
    course = _with_portions(run.case.course, washing, more)
    ledger = run_bench(procedure, course, run.known, run.laboratory)
    asked = Asked(procedure, ledger, run.known)
    evaluator = BenchEvaluator(procedure, run.case.usage, run.known.catalogue, {}, asked=asked)
    expression = line.expression
    if not isinstance(expression, Compare | Within):
        return None
    holds, reached = evaluator.holds(expression)
    return reached.si if holds and isinstance(reached, Value) else None


def _of_strength(material: model.Material, strength: float) -> model.Material:
    composition = material.composition
    if not isinstance(composition, model.Solution):
        return material
    quantity = composition.strength.quantity
    factor = strength * 1000.0 / quantity.unit.factor
    changed = quantity._replace(number=Number(f"{factor:g}", factor, 2, 0), second=None)
    return material._replace(
        composition=composition._replace(strength=composition.strength._replace(quantity=changed))
    )


def _with_portions(course: Course, washing: Washing, more: int) -> Course:
    """Repeat the events from the charge of a reagent to the draw after it."""
    happenings = course.happenings
    places = [place for place, h in enumerate(happenings) if h is washing.first]
    ends = [place for place, h in enumerate(happenings) if h is washing.last]
    if not more or not places or not ends or ends[0] < places[0]:
        return course
    first, last = places[0], ends[0] + 1
    repeated = happenings[first:last] * more
    return course._replace(happenings=(*happenings[:last], *repeated, *happenings[last:]))
