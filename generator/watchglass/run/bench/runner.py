"""What the acts of a procedure are made of: bringing, pouring, mixing and moving on one bench."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.run.bench import heat
from watchglass.run.bench.bringing import bring, carried_portion
from watchglass.run.bench.layers import layers
from watchglass.run.bench.ledger import Moved, NotAssessed, Result, Taken, Warmed
from watchglass.run.bench.liquids import mass_held
from watchglass.run.bench.mixing import Mixed, mix
from watchglass.run.bench.pouring import Drawn, draw, drawn_from, pour
from watchglass.run.bench.separating import run_through
from watchglass.run.bench.state import NOTHING, Bench, Phase, Vessel, added

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

    from watchglass.base.dimensions import Dimension
    from watchglass.base.quantities import Quantity
    from watchglass.resolve import model
    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.ledger import Entry, Outcome
    from watchglass.run.passes import Happening

#: The sink for what leaves as gas.
AIR = "air"


@dataclass(slots=True)
class Runner:
    """One bench at work; what it holds changes from event to event.

    Attributes:
        procedure: That is run.
        known: What is known of components.
        room: Temperature of the laboratory, K.
        high: Whether open amounts are run at their high end.
        carried: What each material that another procedure made consists of, by local name.
        factors: What the amounts charged of some materials are multiplied by, by local name.
        bench: As it stands.
        charged: Moles of each component that were brought.
        formed: Moles of each product that could form at most.
        titres: What each titration took, m3, with the number of entries before its end.
        entries: The ledger so far.
        runs_into: For each filter the vessel below.
        taken: How much was taken of each material, by dimension, SI.
        results: Of the event that is at its turn.
        happening: That event.
    """

    procedure: model.Procedure
    known: Knowledge
    room: float
    high: bool
    carried: Mapping[str, Vessel]
    factors: Mapping[str, float]
    bench: Bench = field(init=False)
    charged: dict[str, float] = field(default_factory=dict)
    formed: dict[str, float] = field(default_factory=dict)
    titres: list[tuple[int, str, float | None]] = field(default_factory=list)
    entries: list[Entry] = field(default_factory=list)
    runs_into: dict[str, str] = field(default_factory=dict)
    taken: dict[tuple[str, Dimension], float] = field(default_factory=dict)
    results: list[Result] = field(default_factory=list)
    happening: Happening = field(init=False)
    _mixed: dict[str, tuple[Vessel, Mixed]] = field(default_factory=dict)

    def __post_init__(self) -> None:
        """Set the clean vessels out."""
        vessels = {
            name: Vessel(name=name, capacity=_capacity(vessel), temperature=self.room)
            for name, vessel in self.procedure.vessels.items()
        }
        self.bench = Bench(vessels=vessels)

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
        settled = vessel
        if mixed.dissolved and vessel.aqueous:
            vessel = self._warm(vessel, heat.on_dissolving(vessel, mixed.dissolved, self.known))
        if mixed.gas:
            self.bench = self.bench.to_sink(AIR, liquids=(Phase(mixed.gas, 0.0),))
        self.put(vessel)
        self._mixed[vessel.name] = settled, mixed  # warmed by itself, it is mixed anew
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
            left = left._replace(solid=NOTHING) if left.volume else left.emptied()
        nothing = not (drawn.aqueous or drawn.organic or drawn.solid or drawn.unknown)
        if found is not None and found.below and which in ("aqueous", "organic"):
            left = left._replace(remains="upper" if which == found.below else "lower")
        self.put(left)
        self.say(origin.name, Moved(origin.name, target, which, drawn.volume, nothing=nothing))
        self.pour(target, drawn)


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


def _capacity(vessel: model.Vessel) -> float | None:
    size = vessel.type.size if vessel.type else None
    if size is None or size.dimension != dim.VOLUME:
        return None
    return size.si
