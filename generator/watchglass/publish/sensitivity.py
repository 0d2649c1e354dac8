"""What each expectation hangs on, in words and figures. Instructors only."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.publish.model import SensitivityRow
from watchglass.publish.text import NBSP
from watchglass.run.bench.evaluator import reached_words
from watchglass.run.bench.sensitivity import Bench, sensitivities

if TYPE_CHECKING:
    from watchglass.judge.bench.run import Run
    from watchglass.run.bench.sensitivity import Effect, Reached, Sensitivity

#: Inputs that are named beside a verdict at most.
_NAMED = 3
#: Change of what is reached, over the figure itself, from which an input is named [-].
_FELT = 0.01


def sensitivity_rows(run: Run) -> tuple[SensitivityRow, ...]:
    """Work out what the expectations of a procedure hang on."""
    case = run.case
    bench = Bench(case.procedure, case.course, case.usage, run.known, run.laboratory, run.carried)
    return tuple(_row(found) for found in sensitivities(bench, run.ledger))


def _row(found: Sensitivity) -> SensitivityRow:
    now = found.now.value.si if found.now.value is not None else 0.0
    flips = [effect for effect in found.effects if effect.flips]
    felt = [e for e in found.effects if not e.flips and e.span > _FELT * abs(now)]
    shown = (*flips, *felt)[: max(_NAMED, len(flips))]
    if flips:
        names = [_words(effect) for effect in flips]
        verdict = f"hangs on {_listed(names)}"
    else:
        verdict = "robust"
    return SensitivityRow(
        found.line.written,
        _reached(found.now),
        verdict,
        tuple((_input(e), _reached(e.low), _reached(e.high)) for e in shown),
    )


def _listed(names: list[str]) -> str:
    *before, last = names
    return f"{', '.join(before)} and {last}" if before else last


def _words(effect: Effect) -> str:
    if effect.kind == "log P":
        return f"the partition ratio of {effect.of}"
    return f"the {effect.kind} of {effect.of}"


def _input(effect: Effect) -> str:
    change = f"∓{NBSP}0.5 in log{NBSP}P" if effect.kind == "log P" else f"∓{NBSP}10{NBSP}%"
    return f"{_words(effect)}, {change}"


def _reached(reached: Reached) -> str:
    if reached.value is None:
        return "not known"
    words = reached_words(reached.value)
    return f"{words}, missed" if reached.holds is False else words
