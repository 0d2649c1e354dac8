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
from watchglass.run.evaluate import Value

if TYPE_CHECKING:
    from watchglass.judge.bench.run import Run

#: Strengths tried, as multiples of the one written; common strengths of the shelf, mol/L.
_SHELF = (0.1, 0.5, 1.0, 2.0, 3.0, 6.0)


class Mend(NamedTuple):
    """A strength that would do: as words, as a material is declared, and the share it reaches."""

    strength: str
    written: str
    reached: float


def mended_by_strength(run: Run, line: model.Expectation, name: str) -> Mend | None:
    """Find the least common strength of a reagent with which an expectation holds."""
    material = run.case.procedure.materials.get(name)
    if material is None or not isinstance(material.composition, model.Solution):
        return None
    quantity = material.composition.strength.quantity
    if quantity.dimension != dim.CONCENTRATION:
        return None
    for strength in _SHELF:
        if strength * 1000.0 <= quantity.middle * (1 + 1e-9):
            continue
        reached = _with_strength(run, line, material, strength)
        if reached is not None:
            text = f"{shown(strength, 2)} M"
            return Mend(text, material.written.replace(quantity.text, text, 1), reached)
    return None


def _with_strength(
    run: Run, line: model.Expectation, material: model.Material, strength: float
) -> float | None:
    """Run the procedure with another strength; give the share where the expectation then holds."""
    composition = material.composition
    assert isinstance(composition, model.Solution)  # noqa: S101 - told before
    quantity = composition.strength.quantity
    factor = strength * 1000.0 / quantity.unit.factor
    changed = quantity._replace(number=Number(f"{factor:g}", factor, 2, 0), second=None)
    other = material._replace(
        composition=composition._replace(strength=composition.strength._replace(quantity=changed))
    )
    procedure = replace(
        run.case.procedure, materials={**run.case.procedure.materials, material.name: other}
    )
    ledger = run_bench(procedure, run.case.course, run.known, run.laboratory)
    asked = Asked(procedure, ledger, run.known)
    evaluator = BenchEvaluator(procedure, run.case.usage, run.known.catalogue, {}, asked=asked)
    expression = line.expression
    if not isinstance(expression, Compare | Within):
        return None
    holds, reached = evaluator.holds(expression)
    return reached.si if holds and isinstance(reached, Value) else None
