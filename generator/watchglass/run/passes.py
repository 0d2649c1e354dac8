"""The events of a procedure in the order they happen, `again` carried out.

`again 3–4` runs the events of those steps once more where it stands; in its own step it means the
events before it. A repeated step's own `again` is carried out again too. The number of events is
bounded, since repetitions within repetitions multiply.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from types import MappingProxyType
from typing import TYPE_CHECKING, NamedTuple

from watchglass.resolve import model

if TYPE_CHECKING:
    from collections.abc import Mapping

MOST_EVENTS = 20_000


@dataclass(frozen=True, slots=True)
class Happening:
    """One event at its turn.

    Attributes:
        event: What happens.
        step: Number of the step it is written in.
        turn: 1 the first time this step's events run, 2 the next, and so on.
        names: Names exchanged for this pass: old to new.
        fresh: Whether the pass began with clean vessels.
    """

    event: model.Event
    step: int
    turn: int
    names: Mapping[str, str] = field(default_factory=dict)
    fresh: bool = False

    def name(self, name: str) -> str:
        """Give the name that stands for a written one in this pass."""
        return self.names.get(name, name)


class Course(NamedTuple):
    """All that happens, in order.

    Attributes:
        happenings: The events at their turns.
        cut: The `again` at which the bound on events was reached, or None.
        turns: How often each step is run, steps without events included.
    """

    happenings: tuple[Happening, ...]
    cut: model.Again | None = None
    turns: Mapping[int, int] = MappingProxyType({})


def run_through(procedure: model.Procedure) -> Course:
    """Put a procedure's events into the order they happen in."""
    runner = _Runner({step.number: step for step in procedure.steps})
    for step in procedure.steps:
        runner.turns[step.number] = 1
        for index, event in enumerate(step.events):
            runner.event(event, step.number, index, {}, turn=1, fresh=False)
            if runner.cut is not None:
                break
        if runner.cut is not None:
            break
    return Course(tuple(runner.happenings), runner.cut, runner.turns)


class _Runner:
    def __init__(self, steps: Mapping[int, model.Step]) -> None:
        self.steps = steps
        self.happenings: list[Happening] = []
        self.turns: dict[int, int] = {}
        self.cut: model.Again | None = None
        self._depth = 0
        self._passes = 0

    def event(
        self,
        event: model.Event,
        step: int,
        index: int,
        names: Mapping[str, str],
        *,
        turn: int,
        fresh: bool,
    ) -> None:
        if not isinstance(event, model.Again):
            self.happenings.append(Happening(event, step, turn, names, fresh))
            return
        if self._depth > 8 or len(self.happenings) > MOST_EVENTS:
            self.cut = self.cut or event
            return
        self._depth += 1
        for exchanged in _passes(event):
            self._pass(event, step, index, {**names, **exchanged}, fresh=fresh or event.fresh)
            if self.cut is not None:
                break
        self._depth -= 1

    def _pass(
        self, again: model.Again, step: int, index: int, names: Mapping[str, str], *, fresh: bool
    ) -> None:
        for number in again.steps:
            repeated = self.steps.get(number)
            if repeated is None:
                continue
            self._passes += 1
            if self._passes > MOST_EVENTS:
                self.cut = self.cut or again
                return
            turn = self.turns[number] = self.turns.get(number, 0) + 1
            events = repeated.events[:index] if number == step else repeated.events
            for place, event in enumerate(events):
                self.event(event, number, place, names, turn=turn, fresh=fresh)
                if self.cut is not None or len(self.happenings) > MOST_EVENTS:
                    self.cut = self.cut or again
                    return


def _passes(again: model.Again) -> list[dict[str, str]]:
    """Give the exchanges of each pass: with several new names one pass each, in turn."""
    if not again.exchanges:
        return [{}] * again.times
    if len(again.exchanges) == 1:
        new, old = again.exchanges[0]
        return [{old: new, new: old}] * again.times
    return [{old: new, new: old} for new, old in again.exchanges]
