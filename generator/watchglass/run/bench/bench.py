"""Running a procedure: its events in order, each applied to the bench, each entered in the ledger."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.run.bench import acts, heat
from watchglass.run.bench.branches import Branch, Branches, Kept, branches_at, dropped_branches
from watchglass.run.bench.bringing import bring, carried_portion
from watchglass.run.bench.layers import layers
from watchglass.run.bench.ledger import (
    Entry,
    Ledger,
    Moved,
    NotAssessed,
    Result,
    Taken,
    Warmed,
    moments,
)
from watchglass.run.bench.liquids import mass_held, mass_of
from watchglass.run.bench.mixing import Mixed, mix
from watchglass.run.bench.pouring import Drawn, draw, drawn_from, pour
from watchglass.run.bench.separating import run_through
from watchglass.run.bench.state import NOTHING, Bench, Phase, Vessel, added

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

    from watchglass.base.dimensions import Dimension
    from watchglass.base.quantities import Quantity
    from watchglass.resolve.laboratory import Laboratory
    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.ledger import Outcome
    from watchglass.run.passes import Course, Happening

#: Sinks that are no waste stream.
AIR, ASIDE = "air", "set aside"


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
    runner = Runner(
        procedure,
        known,
        laboratory.temperature,
        high=high,
        carried=carried or {},
        factors=factors or {},
    )
    for happening in course.happenings:
        runner.happen(happening)
    runner.leave_branches()
    return runner.ledger()


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
class Runner:
    """One run of a procedure; what it holds changes from event to event."""

    procedure: model.Procedure
    known: Knowledge
    room: float
    high: bool
    carried: Mapping[str, Vessel]
    factors: Mapping[str, float]
    bench: Bench = field(init=False)
    start: Bench = field(init=False)
    entries: list[Entry] = field(default_factory=list)
    labels: dict[str, int] = field(default_factory=dict)
    charged: dict[str, float] = field(default_factory=dict)
    formed: dict[str, float] = field(default_factory=dict)
    titres: list[tuple[int, str, float | None]] = field(default_factory=list)
    runs_into: dict[str, str] = field(default_factory=dict)
    taken: dict[tuple[str, Dimension], float] = field(default_factory=dict)
    results: list[Result] = field(default_factory=list)
    happening: Happening = field(init=False)
    benches: dict[str, Bench] = field(default_factory=dict)
    branches: Branches = field(init=False)
    _kept: list[tuple[Branch, Kept]] = field(default_factory=list)
    _since: Bench | None = None
    _mixed: dict[str, tuple[Vessel, Mixed]] = field(default_factory=dict)
    _fresh: int = 0

    def __post_init__(self) -> None:
        """Set the clean vessels out."""
        vessels = {
            name: Vessel(name=name, capacity=_capacity(vessel), temperature=self.room)
            for name, vessel in self.procedure.vessels.items()
        }
        self.bench = self.start = Bench(vessels=vessels)
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
                self._transfer(event)
            case model.Aliquot():
                self._aliquot(event)
            case model.Operation():
                acts.act(self, event)
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
            self._since = self.bench
        for branch in path[common:]:
            kept = Kept(
                self.bench, self.charged, dict(self.formed), dict(self.runs_into), dict(self.taken)
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

    def kept_full(self) -> frozenset[str]:
        """Give the vessels that a fresh pass does not empty: those that only deliver."""
        return frozenset(
            name
            for name, vessel in self.procedure.vessels.items()
            if vessel.type is not None and vessel.type.type.measures == "delivers"
        )

    # ------------------------------------------------------------------ helpers of the acts

    def name(self, written: str) -> str:
        """Give the name that stands for a written one in this pass."""
        return self.happening.name(written)

    def vessel(self, written: str) -> Vessel:
        """Give a vessel by its written name."""
        return self.bench.vessel(self.name(written))

    def put(self, *vessels: Vessel) -> None:
        """Change vessels."""
        self.bench = self.bench.with_vessels(*vessels)

    def say(self, vessel: str, outcome: Outcome | Mixed) -> None:
        """Enter an outcome of this event."""
        self.results.append(Result(vessel, outcome))

    def value(self, quantity: Quantity) -> float:
        """Give the value of a quantity at the end of its range that is run."""
        return quantity.si_high if self.high else quantity.si

    def mix(self, vessel: Vessel) -> Vessel:
        """Bring a vessel to equilibrium, let its gas go, and enter what happened."""
        last = self._mixed.get(vessel.name)
        if last is not None and _untouched(vessel, last[0]):
            return self._mixed_again(vessel, *last)
        vessel, mixed = mix(vessel, self.known)
        if mixed.dissolved and vessel.aqueous:
            vessel = self._warm(vessel, heat.on_dissolving(vessel, mixed.dissolved, self.known))
        if mixed.gas:
            self.bench = self.bench.to_sink(AIR, liquids=(Phase(mixed.gas, 0.0),))
        self.put(vessel)
        self._mixed[vessel.name] = vessel, mixed
        self.results.append(Result(vessel.name, mixed))
        return vessel

    def _mixed_again(self, vessel: Vessel, before: Vessel, mixed: Mixed) -> Vessel:
        """Mix what is at equilibrium already: it stays as it is, and nothing new happens."""
        vessel = vessel._replace(ph=before.ph, doubt=before.doubt, mixed=True, settled=False)
        self.put(vessel)
        same = mixed._replace(gas=NOTHING, precipitated=NOTHING, dissolved=NOTHING)
        self.results.append(Result(vessel.name, same))
        return vessel

    def pour(self, name: str, coming: Drawn) -> None:
        """Pour something into a vessel; over a filter it runs on into what stands below."""
        below = self.runs_into.get(name)
        before = self.bench.vessel(name)
        vessel = pour(before, coming, self.known)
        vessel = self._warm(vessel, heat.on_pouring(before, coming, self.known))
        meets = bool(vessel.aqueous) and not vessel.organic and not vessel.mixed
        self.put(vessel)
        if below is not None and name != below:
            vessel = vessel._replace(
                stated=before.stated | coming.stated
            )  # a wash takes none of it
            if not vessel.organic:
                vessel = self.mix(vessel)  # a wash takes up what it dissolves; another displaces
            vessel, through = run_through(vessel)
            self.put(vessel)
            self.pour(below, through)
        elif meets and not vessel.solid:
            self.mix(vessel)

    def _warm(self, vessel: Vessel, warmed: Warmed | None) -> Vessel:
        """Enter a rise of temperature; a bath takes it up."""
        if warmed is None:
            return vessel
        self.say(vessel.name, warmed)
        if warmed.held:
            return vessel
        return vessel._replace(temperature=vessel.temperature + warmed.rise)

    def charge(
        self, portions: Iterable[model.Portion], target: str, temperature: float | None = None
    ) -> None:
        """Bring portions of materials into a vessel."""
        for portion in portions:
            amount = self._amount(portion)
            name = self.name(portion.material)
            material = self.procedure.materials.get(name)
            if material is None:
                continue  # an aid: boiling stones, cotton
            if amount is None:
                self._not_measured(name, target)
                continue
            dimension, value = amount
            value *= self.factors.get(name, 1.0)
            self.bring(material, dimension, value, self.name(target), temperature)

    def _not_measured(self, name: str, target: str) -> None:
        vessel = self.vessel(target)
        self.put(vessel._replace(unknown=vessel.unknown | {name}, used=True, ph=None))
        self.say(vessel.name, Taken(name, None, None, "how much is taken is not known"))

    def bring(
        self,
        material: model.Material,
        dimension: Dimension,
        value: float,
        target: str,
        temperature: float | None = None,
    ) -> None:
        """Bring so much of a material into a vessel, and count it."""
        vessel = self.bench.vessel(target)
        if dimension == dim.VOLUME and vessel.capacity and target in self.kept_full():
            value = min(value, max(vessel.capacity - vessel.volume, 0.0))  # it is filled up
        carried = self.carried.get(material.name)
        if carried is not None:
            brought = carried_portion(material, carried, dimension, value, self.known)
        else:
            brought = bring(material, dimension, value, self.known)
        self.charged = added(self.charged, brought.liquid.amounts)
        for key, moles in brought.solids.items():
            parts = {part: count * moles for part, count in self.known.parts(key).items()}
            self.charged = added(self.charged, parts)
        taken = material.name, dimension
        self.taken[taken] = self.taken.get(taken, 0.0) + value
        self.say(
            target,
            Taken(
                material.name,
                value if dimension == dim.MASS else None,
                value if dimension == dim.VOLUME else None,
                brought.why,
            ),
        )
        self.pour(target, drawn_from(brought, temperature or self.room, self.known))

    def _amount(self, portion: model.Portion) -> tuple[Dimension, float] | None:
        """Give dimension and value of a portion; None where the bench cannot tell."""
        name = self.name(portion.material)
        quantity = portion.quantity
        if quantity is None:
            return self._of_all(name, portion.of_all)
        value = self.value(quantity)
        dimension = quantity.dimension
        if portion.per is not None:
            unit, counted = portion.per
            base = self.taken.get((self.name(counted), unit.dimension))
            if base is None or not unit.si:
                return None
            value *= base / unit.si
        if dimension == dim.COUNT:
            size = self.known.catalogue.measures.get(quantity.unit.symbol)
            if size is None:
                return None
            return dim.VOLUME, value * size
        return dimension, value

    def _of_all(self, name: str, word: str) -> tuple[Dimension, float] | None:
        material = self.procedure.materials.get(name)
        if material is None:
            return None
        if material.provided is not None:
            whole = self.value(material.provided)
            dimension = material.provided.dimension
        elif (carried := self.carried.get(name)) is not None:
            whole, dimension = mass_held(carried, self.known), dim.MASS
        else:
            return None
        taken = self.taken.get((name, dimension), 0.0)
        share = {"all": whole, "half": whole / 2, "rest": max(whole - taken, 0.0)}
        return dimension, share[word]

    # ------------------------------------------------------------------ moving

    def part(self, vessel: Vessel, part: str | None) -> str | None:
        """Turn `upper` and `lower` into the layer they are; None where that cannot be told."""
        if part not in ("upper", "lower"):
            return part or ""
        found = layers(vessel, self.known)
        if found is None:
            if part != vessel.remains:
                return None
            return "aqueous" if vessel.aqueous else "organic"
        if not found.below:
            return None
        other = "organic" if found.below == "aqueous" else "aqueous"
        return found.below if part == "lower" else other

    def _transfer(self, event: model.Transfer) -> None:
        origin, target = self.vessel(event.origin.name.text), self.name(event.target.name.text)
        through = any(clause.word == "through" for clause in event.clauses)
        self.move(origin, event.origin.part, target, keep_solids=through)

    def move(
        self, origin: Vessel, part: str | None, target: str, *, keep_solids: bool = False
    ) -> None:
        """Move what a vessel holds, or a part of it, into another."""
        which = self.part(origin, part)
        if which is None:
            self.say(origin.name, NotAssessed("which layer lies below cannot be told"))
            return
        found = layers(origin, self.known)
        if part is not None and found is not None:
            self.results.append(Result(origin.name, found))
        left, drawn = draw(origin, "liquid" if keep_solids and not which else which)
        if keep_solids:
            self.bench = self.bench.to_sink("filter", solids=left.solid)
            left = left.emptied()
        nothing = not (drawn.aqueous or drawn.organic or drawn.solid or drawn.unknown)
        if found is not None and found.below and which in ("aqueous", "organic"):
            left = left._replace(remains="upper" if which == found.below else "lower")
        self.put(left)
        self.say(origin.name, Moved(origin.name, target, which, drawn.volume, nothing=nothing))
        self.pour(target, drawn)

    def _aliquot(self, event: model.Aliquot) -> None:
        origin, target = self.vessel(event.origin.name.text), self.name(event.target.name.text)
        which = self.part(origin, event.origin.part)
        if which is None:
            self.say(origin.name, NotAssessed("which layer lies below cannot be told"))
            return
        wanted = self.value(event.quantity)
        whole = self._measure(origin, which, event.quantity.dimension)
        if not whole:
            self.say(origin.name, Moved(origin.name, target, which, 0.0, wanted, nothing=True))
            return
        part = which
        if event.quantity.dimension == dim.MASS and not which and origin.solid:
            part = "solid"
        left, drawn = draw(origin, part, min(wanted / whole, 1.0))
        self.put(left)
        self.say(
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
        self.pour(target, drawn)

    def _measure(self, vessel: Vessel, part: str, dimension: Dimension) -> float:
        """Give how much there is of what is measured out: volume of liquid, or mass."""
        if dimension == dim.VOLUME:
            chosen = {"aqueous": vessel.aqueous.volume, "organic": vessel.organic.volume}
            return chosen.get(part, vessel.volume)
        if vessel.solid and part in ("", "solid"):
            return mass_of(vessel.solid, self.known)
        return mass_held(vessel, self.known)


def _untouched(vessel: Vessel, before: Vessel) -> bool:
    """Tell whether a vessel still holds just what it held, the very same layers at one temperature."""
    return (
        vessel.aqueous is before.aqueous
        and vessel.organic is before.organic
        and vessel.solid is before.solid
        and vessel.temperature == before.temperature
        and vessel.unknown == before.unknown
        and vessel.stated == before.stated
    )


def _at(event: model.Charge | model.Operation) -> float | None:
    """Give the temperature that what is charged has, K, where it is said."""
    clauses: tuple[syntax.Clause, ...] = getattr(event, "clauses", ())
    for clause in clauses:
        if clause.word == "at" and isinstance(clause.value, syntax.Measured):
            quantity = clause.value.quantity
            if quantity.dimension == dim.TEMPERATURE:
                return quantity.middle
    return None


def _capacity(vessel: model.Vessel) -> float | None:
    size = vessel.type.size if vessel.type else None
    if size is None or size.dimension != dim.VOLUME:
        return None
    return size.si


__all__ = ["NOTHING", "Runner", "has_open_amounts", "run_bench"]
