"""Running a procedure: its events in order, each applied to the bench, each entered in the ledger."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.run.bench.acts import act
from watchglass.run.bench.branches import Branch, Branches, Kept, branches_at, dropped_branches
from watchglass.run.bench.ledger import Entry, Ledger, Moved, NotAssessed, moments
from watchglass.run.bench.liquids import mass_held, mass_of
from watchglass.run.bench.pouring import draw
from watchglass.run.bench.runner import Runner
from watchglass.run.bench.state import Bench, Vessel

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.dimensions import Dimension
    from watchglass.base.quantities import Quantity
    from watchglass.resolve.laboratory import Laboratory
    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.passes import Course, Happening

#: The sink for what earlier passes left in their vessels.
ASIDE = "set aside"


def run_bench(
    procedure: model.Procedure,
    course: Course,
    known: Knowledge,
    laboratory: Laboratory,
    *,
    high: bool = False,
    carried: Mapping[str, Vessel] | None = None,
    factors: Mapping[str, float] | None = None,
) -> Ledger:
    """Run a procedure.

    Args:
        procedure: As resolved, at its size.
        course: Its events in the order they happen.
        known: What is known of components.
        laboratory: Room temperature.
        high: Run open amounts (`2–6 mL … until`) at their high end, not at their low one.
        carried: What each material that another procedure made consists of, by local name.
        factors: What the amounts charged of some materials are multiplied by, by local name.
    """
    going = _Course(
        procedure,
        known,
        laboratory.temperature,
        high=high,
        carried=carried or {},
        factors=factors or {},
    )
    for happening in course.happenings:
        going.happen(happening)
    going.leave_branches()
    return going.ledger()


def has_open_amounts(procedure: model.Procedure) -> bool:
    """Tell whether any amount is a range, so that both ends have to be run."""
    for step in procedure.steps:
        for event in step.events:
            portions: tuple[model.Portion, ...] = ()
            if isinstance(event, model.Charge | model.Operation):
                portions = event.portions
            quantities: list[Quantity | None] = [p.quantity for p in portions]
            if isinstance(event, model.Aliquot):
                quantities.append(event.quantity)
            if any(q is not None and q.si_high != q.si for q in quantities):
                return True
    return False


@dataclass(slots=True)
class _Course(Runner):
    """A procedure on its way through its events: labels, branches and passes with clean vessels."""

    start: Bench = field(init=False)
    labels: dict[str, int] = field(default_factory=dict)
    benches: dict[str, Bench] = field(default_factory=dict)
    branches: Branches = field(init=False)
    _kept: list[tuple[Branch, Kept]] = field(default_factory=list)
    _since: Bench | None = None
    _fresh: int = 0

    def __post_init__(self) -> None:
        """Set the clean vessels out."""
        Runner.__post_init__(self)
        self.start = self.bench
        self.branches = dropped_branches(self.procedure.body)

    def ledger(self) -> Ledger:
        """Give all that happened."""
        return Ledger(
            self.start,
            tuple(self.entries),
            self.labels,
            self.charged,
            self.formed,
            tuple(self.titres),
            self.benches,
            self.bench,
            tuple(moments(self.start, self.entries)),
        )

    # ------------------------------------------------------------------ events

    def happen(self, happening: Happening) -> None:
        """Carry out one event and enter it."""
        self.happening = happening
        self.results = []
        event = happening.event
        self._enter(branches_at(self.branches, event.span.start))
        if happening.fresh:
            self._clean(happening)
        match event:
            case model.Labelled(name, _):
                self.labels[name] = len(self.entries)
                self.benches[name] = self.bench
                return
            case model.Charge(portions, target, _, _, _):
                self.charge(portions, target.name.text, _at(event))
            case model.Transfer():
                _transfer(self, event)
            case model.Aliquot():
                _aliquot(self, event)
            case model.Operation():
                act(self, event)
            case _:
                return
        branch = self._kept[-1][0].words if self._kept else ""
        entry = Entry(happening, tuple(self.results), self.bench, branch, self._since)
        self.entries.append(entry)
        self._since = None

    # ------------------------------------------------------------------ branches

    def _enter(self, path: Branches) -> None:
        """Go from the branches that are open to those that an event stands in."""
        common = 0
        while common < min(len(path), len(self._kept)) and self._kept[common][0] == path[common]:
            common += 1
        while len(self._kept) > common:
            _, kept = self._kept.pop()
            self.bench, self.charged, self.formed = kept.bench, kept.charged, kept.formed
            self.runs_into, self.taken = dict(kept.runs_into), dict(kept.taken)
            del self.titres[kept.titres :]
            self._since = self.bench
        for branch in path[common:]:
            kept = Kept(
                self.bench,
                self.charged,
                dict(self.formed),
                dict(self.runs_into),
                dict(self.taken),
                len(self.titres),
            )
            self._kept.append((branch, kept))

    def leave_branches(self) -> None:
        """Drop the branches that are still open: the procedure is at its end."""
        self._enter(())

    def _clean(self, happening: Happening) -> None:
        """Set what earlier passes left in their vessels aside; the pass begins with clean ones."""
        if happening.turn == self._fresh:
            return
        first = happening.turn > self._fresh
        self._fresh = happening.turn
        if not first:
            return
        for vessel in self.bench.vessels.values():
            if vessel.used and vessel.name not in self.kept_full():
                self.bench = self.bench.to_sink(
                    ASIDE,
                    liquids=(vessel.aqueous, vessel.organic),
                    solids=vessel.solid,
                    unknown=vessel.unknown,
                ).with_vessels(
                    Vessel(name=vessel.name, capacity=vessel.capacity, temperature=self.room)
                )


def _transfer(runner: Runner, event: model.Transfer) -> None:
    origin, target = runner.vessel(event.origin.name.text), runner.name(event.target.name.text)
    through = any(clause.word == "through" for clause in event.clauses)
    runner.move(origin, event.origin.part, target, keep_solids=through)


def _aliquot(runner: Runner, event: model.Aliquot) -> None:
    origin, target = runner.vessel(event.origin.name.text), runner.name(event.target.name.text)
    which = runner.part(origin, event.origin.part)
    if which is None:
        runner.say(origin.name, NotAssessed("which layer lies below cannot be told"))
        return
    wanted = runner.value(event.quantity)
    whole = _measure(runner, origin, which, event.quantity.dimension)
    if not whole:
        runner.say(origin.name, Moved(origin.name, target, which, 0.0, wanted, nothing=True))
        return
    part = which
    if event.quantity.dimension == dim.MASS and not which and origin.solid:
        part = "solid"
    left, drawn = draw(origin, part, min(wanted / whole, 1.0))
    runner.put(left)
    runner.say(
        origin.name,
        Moved(
            origin.name,
            target,
            which,
            drawn.volume,
            max(wanted - whole * (1 + 1e-9), 0.0),
            whole=wanted >= whole,
        ),
    )
    runner.pour(target, drawn)


def _measure(runner: Runner, vessel: Vessel, part: str, dimension: Dimension) -> float:
    """Give how much there is of what is measured out: volume of liquid, or mass."""
    if dimension == dim.VOLUME:
        chosen = {"aqueous": vessel.aqueous.volume, "organic": vessel.organic.volume}
        return chosen.get(part, vessel.volume)
    if vessel.solid and part in ("", "solid"):
        return mass_of(vessel.solid, runner.known)
    return mass_held(vessel, runner.known)


def _at(event: model.Charge | model.Operation) -> float | None:
    """Give the temperature that what is charged has, K, where it is said."""
    clauses: tuple[syntax.Clause, ...] = getattr(event, "clauses", ())
    for clause in clauses:
        if clause.word == "at" and isinstance(clause.value, syntax.Measured):
            quantity = clause.value.quantity
            if quantity.dimension == dim.TEMPERATURE:
                return quantity.middle
    return None
