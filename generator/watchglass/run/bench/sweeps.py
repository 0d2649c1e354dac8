"""Curves around what a procedure does, for instructors' pages; nothing of a check asks for them.

Where substances lie against pH, how much of them portions move, and pH against the volume of a reagent.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from itertools import pairwise
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.chemistry.acidbase import state_fractions
from watchglass.chemistry.equilibrium import solve, unknown_ratios
from watchglass.chemistry.reagents import with_reagent
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.run.bench.bringing import bring
from watchglass.run.bench.ledger import Added, Moved, Taken
from watchglass.run.bench.mixing import dissolve, mix, prepare
from watchglass.run.bench.pouring import draw, drawn_from, pour
from watchglass.run.bench.state import EMPTY

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.quantities import Quantity
    from watchglass.chemistry.equilibrium import PhaseSystem
    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.ledger import Entry, Ledger
    from watchglass.run.bench.state import Bench, Phase, Vessel

#: Amount from which a substance is worth a curve, mol.
_WORTH = 1e-6
#: Curves in one plot at most: the largest amounts.
MOST_CURVES = 5
#: Portions that are tried.
MOST_PORTIONS = 5


class Curve(NamedTuple):
    """One curve: what it is of, and its points."""

    name: str
    xs: tuple[float, ...]
    ys: tuple[float, ...]


class ShareByPh(NamedTuple):
    """Share of each substance in a layer against the pH of the water, at the volumes there are.

    Attributes:
        step: In which the layers are drawn.
        vessel: Of the two layers.
        part: Layer whose shares are told: the one that is drawn.
        ph: The pH there is, or None.
        curves: One a substance; x is pH [-], y the share [-].
    """

    step: int
    vessel: str
    part: str
    ph: float | None
    curves: tuple[Curve, ...]


class ShareByPortions(NamedTuple):
    """Share of each substance that is drawn off, against the number of portions of one total volume.

    Attributes:
        step: In which the last portion is drawn.
        vessel: In which it is washed.
        material: Local name of what it is washed with.
        part: Layer that is drawn.
        volume: Of all portions, m3.
        portions: How many the procedure takes.
        curves: One a substance; x is the number of portions, y the share [-].
    """

    step: int
    vessel: str
    material: str
    part: str
    volume: float
    portions: int
    curves: tuple[Curve, ...]


class PhByVolume(NamedTuple):
    """pH of a vessel against the volume of a reagent.

    Attributes:
        step: In which it is added.
        verb: `adjust` or `titrate`.
        vessel: Into which.
        material: Local name of the reagent.
        volume: That the procedure takes, m3.
        aim: pH aimed at, or the range of the indicator; None for neither.
        curve: x is the volume, m3, y the pH [-].
    """

    step: int
    verb: str
    vessel: str
    material: str
    volume: float
    aim: Quantity | None
    curve: Curve


# ---------------------------------------------------------------- washings


@dataclass(slots=True)
class Washing:
    """Portions of one material that go into a vessel, each drawn off again with its layer.

    Attributes:
        vessel: Where.
        material: What.
        part: The layer that is drawn.
        before: The vessel before the first portion.
        drawn_from: The vessel as it stood when the layer was first drawn.
        volumes: Of the portions, m3.
        step: Of the last draw.
    """

    vessel: str
    material: str
    part: str
    before: Vessel
    drawn_from: Vessel
    volumes: list[float] = field(default_factory=list)
    step: int = 0


def washings(ledger: Ledger) -> tuple[Washing, ...]:
    """Find what is washed with what: charges to a vessel with two layers, up to the draw of one."""
    found: list[Washing] = []
    pending: dict[str, list[tuple[str, Vessel, float]]] = {}
    before = ledger.start
    for entry in ledger.entries:
        before = before if entry.since is None else entry.since
        _note_charges(entry, before, pending)
        for result in entry.results:
            moved = result.outcome
            if not isinstance(moved, Moved) or moved.part not in ("aqueous", "organic"):
                continue
            vessel = before.vessel(moved.origin)
            portions = pending.pop(moved.origin, [])
            if vessel.aqueous and vessel.organic and portions:
                _add(found, moved, vessel, portions, entry.happening.step)
        before = entry.bench
    return tuple(found)


def _note_charges(
    entry: Entry, before: Bench, pending: dict[str, list[tuple[str, Vessel, float]]]
) -> None:
    for result in entry.results:
        taken = result.outcome
        if isinstance(taken, Taken) and taken.volume:
            vessel = before.vessel(result.vessel)
            pending.setdefault(result.vessel, []).append((taken.material, vessel, taken.volume))


def _add(
    found: list[Washing],
    moved: Moved,
    vessel: Vessel,
    portions: list[tuple[str, Vessel, float]],
    step: int,
) -> None:
    """Enter a draw: one more portion of the washing before, or a new one."""
    material, before, volume = portions[-1]
    last = next((w for w in reversed(found) if w.vessel == moved.origin), None)
    same = last is not None and (last.material, last.part) == (material, moved.part)
    if last is not None and same and len(portions) == 1:
        last.volumes.append(volume)
        last.step = step
        return
    found.append(Washing(moved.origin, material, moved.part, before, vessel, [volume], step))


def share_by_ph(washing: Washing, ledger: Ledger, known: Knowledge) -> ShareByPh | None:
    """Work out where the substances of a washing would lie at any pH.

    Nernst's distribution law over the neutral fraction of each family; what separates beyond its
    solubility is not counted. Left out is what is here in traces only. None where no substance with
    a known ratio changes layers with pH.
    """
    vessel = washing.drawn_from
    prepared = prepare(vessel.aqueous, vessel.organic, vessel.temperature, known)
    system = prepared.system
    xs = tuple(x / 4 for x in range(57))
    curves: list[tuple[float, Curve]] = []
    for key, family in zip(prepared.keys, system.families, strict=True):
        thing = known.thing(key)
        whole = ledger.charged.get(key, 0.0) + ledger.formed.get(key, 0.0)
        if not family.ratio or family.amount < _MUCH * whole or thing.gas or thing.miscible:
            continue
        ys = []
        for ph in xs:
            neutral = state_fractions(family.pkas, ph)[family.top]
            organic = family.ratio * neutral * system.organic
            share = organic / (organic + system.aqueous)
            ys.append(share if washing.part == "organic" else 1 - share)
        curves.append((family.amount, Curve(thing.name, xs, tuple(ys))))
    changing = [c for c in curves if max(c[1].ys) - min(c[1].ys) > _CHANGES]
    if not changing:
        return None
    return ShareByPh(washing.step, washing.vessel, washing.part, vessel.ph, _largest(curves))


#: Share of all there is of a substance from which it is worth a curve here [-].
_MUCH = 0.05
#: Span of shares from which a pH decides where a substance lies [-].
_CHANGES = 0.2


def share_by_portions(
    washing: Washing, procedure: model.Procedure, known: Knowledge
) -> ShareByPortions | None:
    """Wash with one total volume in one to five portions, and add up what is drawn.

    None where the vessel held one layer only before, or the material is no liquid of the layer drawn.
    """
    material = procedure.materials.get(washing.material)
    start = washing.before
    if material is None or not (start.organic if washing.part == "aqueous" else start.aqueous):
        return None
    total = sum(washing.volumes)
    whole = bring(material, dim.VOLUME, total, known)
    coming = drawn_from(whole, start.temperature, known)
    if whole.why or not (coming.aqueous if washing.part == "aqueous" else coming.organic):
        return None
    there = _amounts(start, known)
    drawn: dict[str, list[float]] = {key: [] for key in there}
    for count in range(1, MOST_PORTIONS + 1):
        taken = dict.fromkeys(there, 0.0)
        vessel = start
        portion = drawn_from(
            bring(material, dim.VOLUME, total / count, known), start.temperature, known
        )
        for _ in range(count):
            vessel, _ = mix(pour(vessel, portion, known), known)
            vessel, part = draw(vessel, washing.part)
            phase = part.aqueous if washing.part == "aqueous" else part.organic
            for key in taken:
                taken[key] += phase.amounts.get(key, 0.0)
        for key, amount in taken.items():
            drawn[key].append(amount / there[key])
    xs = tuple(float(count) for count in range(1, MOST_PORTIONS + 1))
    curves = [
        (there[key], Curve(known.thing(key).name, xs, tuple(shares)))
        for key, shares in drawn.items()
        if max(shares) > _MOVED
    ]
    if not any(max(c.ys) - min(c.ys) > _DIFFERS for _, c in curves):
        return None
    return ShareByPortions(
        washing.step,
        washing.vessel,
        washing.material,
        washing.part,
        total,
        len(washing.volumes),
        _largest(curves),
    )


#: Share moved from which a substance is shown, and difference that makes portions matter [-].
_MOVED, _DIFFERS = 0.005, 0.005


def _amounts(vessel: Vessel, known: Knowledge) -> dict[str, float]:
    """Give the substances of a vessel that may go from layer to layer, mol."""
    amounts: dict[str, float] = {}
    for phase in (vessel.aqueous, vessel.organic):
        for key, amount in phase.amounts.items():
            thing = known.thing(key)
            if not (thing.ion or thing.liquid or thing.gas) and amount > _WORTH:
                amounts[key] = amounts.get(key, 0.0) + amount
    return amounts


def _largest(curves: list[tuple[float, Curve]]) -> tuple[Curve, ...]:
    return tuple(c for _, c in sorted(curves, key=lambda held: -held[0])[:MOST_CURVES])


# ---------------------------------------------------------------- reagents


def ph_by_volume(
    ledger: Ledger, procedure: model.Procedure, known: Knowledge
) -> Iterator[PhByVolume]:
    """Work out the pH on the way of every `adjust` and `titrate`, the first pass of each."""
    seen: set[int] = set()
    before = ledger.start
    for entry in ledger.entries:
        before = before if entry.since is None else entry.since
        event = entry.happening.event
        if (
            isinstance(event, model.Operation)
            and event.verb in ("adjust", "titrate")
            and event.object is not None
            and event.span.start not in seen
        ):
            seen.add(event.span.start)
            vessel = before.vessel(entry.happening.name(event.object.name.text))
            added = next((r.outcome for r in entry.results if isinstance(r.outcome, Added)), None)
            if added is not None and added.volume:
                curve = _titration(entry, event, vessel, before, added, procedure, known)
                if curve is not None:
                    yield curve
        before = entry.bench


def _titration(
    entry: Entry,
    event: model.Operation,
    vessel: Vessel,
    before: Bench,
    added: Added,
    procedure: model.Procedure,
    known: Knowledge,
) -> PhByVolume | None:
    reagent = _reagent(entry, event, before, added, procedure, known)
    if reagent is None or not reagent or not vessel.aqueous or vessel.unknown:
        return None
    dissolved, _, _ = dissolve(vessel, known)
    held = prepare(dissolved.aqueous, dissolved.organic, dissolved.temperature, known)
    coming = prepare(reagent, EMPTY, 298.15, known)
    if held.spoilt or coming.spoilt or unknown_ratios(held.system):
        return None
    volume = added.volume or 0.0
    points = _points(held.system, coming.system, volume)
    xs, ys = tuple(x for x, _ in points), tuple(y for _, y in points)
    return PhByVolume(
        entry.happening.step,
        event.verb,
        vessel.name,
        added.material,
        volume,
        _aim(event, known),
        Curve("pH", xs, ys),
    )


def _reagent(
    entry: Entry,
    event: model.Operation,
    before: Bench,
    added: Added,
    procedure: model.Procedure,
    known: Knowledge,
) -> Phase | None:
    """Give the reagent: what is in the burette, or what the material is."""
    for clause in event.clauses:
        if clause.word == "from" and isinstance(clause.value, syntax.Place):
            return before.vessel(entry.happening.name(clause.value.name.text)).aqueous
    material = procedure.materials.get(added.material)
    if material is None:
        return None
    brought = bring(material, dim.VOLUME, 1e-3, known)
    return None if brought.why else brought.liquid


def _points(
    held: PhaseSystem, coming: PhaseSystem, volume: float
) -> tuple[tuple[float, float], ...]:
    """Give volumes up to half as much again with their pH, closer where it is steep."""
    points = [
        (x, _ph(held, coming, x)) for x in (volume * 1.5 * i / _COARSE for i in range(_COARSE))
    ]
    points.append((volume * 1.5, _ph(held, coming, volume * 1.5)))
    found = points[:1]
    for before, after in pairwise(points):
        found += _between(held, coming, before, after, _HALVINGS)
    return tuple(found)


#: Intervals looked at first; change of pH that is shown in one stroke; how often one is halved at most.
_COARSE, _FINE, _HALVINGS = 20, 0.5, 6


def _between(
    held: PhaseSystem,
    coming: PhaseSystem,
    before: tuple[float, float],
    after: tuple[float, float],
    halvings: int,
) -> list[tuple[float, float]]:
    """Give the points after one up to the next, with halves between them where it is steep."""
    if not halvings or abs(after[1] - before[1]) <= _FINE:
        return [after]
    half = (before[0] + after[0]) / 2
    middle = half, _ph(held, coming, half)
    return [
        *_between(held, coming, before, middle, halvings - 1),
        *_between(held, coming, middle, after, halvings - 1),
    ]


def _ph(held: PhaseSystem, coming: PhaseSystem, volume: float) -> float:
    return solve(with_reagent(held, coming, volume)).ph or 0.0


def _aim(event: model.Operation, known: Knowledge) -> Quantity | None:
    for clause in event.clauses:
        if clause.word != "to":
            continue
        if isinstance(clause.value, syntax.Ph):
            return clause.value.quantity
        if isinstance(clause.value, syntax.Place):
            indicator = known.catalogue.indicators.get(clause.value.name.text)
            return indicator.range if indicator is not None else None
    return None
