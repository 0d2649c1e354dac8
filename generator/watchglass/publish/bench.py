"""The ledger in words: what each act did, and what the vessels hold after it. Instructors only.

Figures are the model's: three figures, a pH two places, a pH below 0 as "below 0". What could not
be assessed says so, with its reason.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

from watchglass.base.figures import shown
from watchglass.catalogue.components import PROTON, WATER
from watchglass.chemistry.gases import gas_volume
from watchglass.run.bench.asked import amount_in
from watchglass.run.bench.figures import amount_words, ph_words, share_words, volume_words
from watchglass.run.bench.layers import Layers
from watchglass.run.bench.ledger import (
    Added,
    Moved,
    NotAssessed,
    Reacted,
    Supposed,
    Taken,
    Warmed,
)
from watchglass.run.bench.liquids import carrier
from watchglass.run.bench.mixing import Mixed

if TYPE_CHECKING:
    from collections.abc import Iterator, Mapping

    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.ledger import Entry, Ledger, Result
    from watchglass.run.bench.state import Bench, Phase, Vessel

#: Amounts below this are not worth a word, mol (0.5 µmol).
_WORTH = 5e-7
#: What a bench page says of its figures.
MODEL = (
    "Estimates of a model: layers in equilibrium after mixing, 25 °C, ideal, additive volumes; only"
    " neutral forms partition, by a measured ratio or else by octanol–water's; nothing is left"
    " behind when a vessel is poured out; a still parts liquids by their boiling points without"
    " overlap."
)


@dataclass(frozen=True, slots=True)
class Content:
    """One substance in a phase: its name, its amount with unit, and its share of all there is."""

    name: str
    amount: str
    share: str


@dataclass(frozen=True, slots=True)
class Holding:
    """One phase of a vessel.

    Attributes:
        vessel: Its local name.
        phase: `aqueous layer`, `organic layer`, `solid`, `liquid`.
        size: Volume with unit, or empty.
        ph: `pH 7.50`, `pH below 0`, `pH not assessed`, or empty.
        contents: What is in it, the largest share first.
        remarks: What is unknown about it.
    """

    vessel: str
    phase: str
    size: str
    ph: str
    contents: tuple[Content, ...]
    remarks: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class Act:
    """One act: as written, and what it did, in sentences."""

    written: str
    did: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class BenchStep:
    """One pass of one step.

    Attributes:
        number: Its number as printed.
        turn: 1 the first time, 2 the next.
        branch: Words of the `:::if` it stands in, whose outcome is dropped; else empty.
        acts: What was done.
        after: What the vessels hold that the step touched.
    """

    number: int
    turn: int
    acts: tuple[Act, ...]
    after: tuple[Holding, ...]
    branch: str = ""


def bench_steps(ledger: Ledger, known: Knowledge) -> tuple[BenchStep, ...]:
    """Put a whole ledger into words, one entry for each pass of each step."""
    steps: list[BenchStep] = []
    group: list[Entry] = []
    for entry in ledger.entries:
        if group and _pass_of(group[0]) != _pass_of(entry):
            steps.append(_step(group, ledger, known))
            group = []
        group.append(entry)
    if group:
        steps.append(_step(group, ledger, known))
    return tuple(steps)


def _pass_of(entry: Entry) -> tuple[int, int, str]:
    return entry.happening.step, entry.happening.turn, entry.branch


def _step(group: list[Entry], ledger: Ledger, known: Knowledge) -> BenchStep:
    bench = group[-1].bench
    touched = dict.fromkeys(name for entry in group for name in _touched(entry, bench))
    acts = tuple(
        Act(
            entry.happening.event.span.text,
            tuple(said for result in entry.results if (said := sentence(result, known))),
        )
        for entry in group
    )
    after = tuple(
        holding for name in touched for holding in holdings(bench.vessel(name), ledger, known)
    )
    first = group[0]
    return BenchStep(first.happening.step, first.happening.turn, acts, after, first.branch)


def _touched(entry: Entry, bench: Bench) -> Iterator[str]:
    for result in entry.results:
        yield result.vessel
        target = getattr(result.outcome, "target", "")
        if target in bench.vessels:
            yield target


# ---------------------------------------------------------------- what an act did


def sentence(result: Result, known: Knowledge) -> str:
    """Say what an outcome was; empty where it is nothing worth saying."""
    match result.outcome:
        case Taken(material, _, _, why):
            return f"what {material} brings is not known: {why}" if why else ""
        case Mixed():
            return _mixed(result.vessel, result.outcome, known)
        case Layers():
            return _layers(result.outcome)
        case Moved():
            return _moved(result.outcome)
        case Added():
            return _added(result.outcome)
        case Reacted(name, extent, limiting, why):
            if why:
                return f"{name} does not run: {why}"
            return f"{name} runs, {amount_words(extent)} of the equation; {known.thing(limiting).name} limits"
        case Warmed(rise, held, source):
            taken_up = ", which the bath takes up" if held else ""
            return f"{source}: up to {shown(rise, 2)} K warmer{taken_up}"
        case Supposed(what, share, outcome, reason, why):
            if why:
                return f"not supposed: {why}"
            return f"stated by the author: {share_words(share or 0.0)} of {what} is {outcome} ({reason})"
        case NotAssessed(why):
            return f"not assessed: {why}"


def _mixed(vessel: str, mixed: Mixed, known: Knowledge) -> str:
    parts = []
    if mixed.ph is not None:
        parts.append(f"{vessel} {ph_words(mixed.ph)}" + (" (rough)" if mixed.rough else ""))
    for key, amount in mixed.gas.items():
        volume = gas_volume(amount=amount, temperature=298.15, pressure=101325.0)
        name = known.thing(key).name
        if amount > _WORTH:
            parts.append(
                f"{amount_words(amount)} of {name} leaves, about {volume_words(volume, 2)}"
                " at 25 °C and 1 atm"
            )
    for key, amount in mixed.precipitated.items():
        if amount > _WORTH:
            parts.append(f"{amount_words(amount)} of {known.thing(key).name} separates")
    for key, amount in mixed.dissolved.items():
        if amount > _WORTH:
            parts.append(f"{amount_words(amount)} of {known.thing(key).name} dissolves")
    parts += mixed.why
    return "; ".join(parts)


def _layers(found: Layers) -> str:
    if found.organic is None:
        return "which layer lies below cannot be told: a density is not known"
    densities = (
        f"aqueous {shown(found.aqueous / 1000, 3)}, organic {shown(found.organic / 1000, 3)} g/mL"
    )
    if not found.below:
        return f"the densities are too close to tell which layer lies below ({densities})"
    close = "; try with a drop of water" if found.close else ""
    return f"the {found.below} layer lies below ({densities}){close}"


def _moved(moved: Moved) -> str:
    if moved.nothing:
        return f"nothing goes from {moved.origin} to {moved.target}: there is none of it"
    part = f"{moved.part} layer" if moved.part in ("aqueous", "organic") else moved.part
    if not part and moved.whole:
        part = "all"
    words = [part] if part else []
    if moved.volume > 0 or not words:
        words.append(volume_words(moved.volume) if moved.volume > 0 else "nothing")
    short = f"; {volume_words(moved.short)} less than asked for" if moved.short > 0 else ""
    return f"{moved.origin} to {moved.target}: {', '.join(words)}{short}"


def _added(added: Added) -> str:
    if added.volume is None:
        return f"how much {added.material} it takes is not assessed: {added.why}"
    stated = " (stated by the author)" if added.stated else ""
    goal = f" to {ph_words(added.wanted)}" if added.wanted is not None else ""
    return f"{volume_words(added.volume)} of {added.material}{goal}{stated}"


# ---------------------------------------------------------------- what a vessel holds


def holdings(vessel: Vessel, ledger: Ledger, known: Knowledge) -> tuple[Holding, ...]:
    """Put what a vessel holds into words, one entry a phase."""
    remarks = []
    if vessel.unknown:
        remarks.append(f"what {', '.join(sorted(vessel.unknown))} brings is not known")
    if vessel.doubt:
        names = ", ".join(sorted(known.thing(key).name for key in vessel.doubt))
        remarks.append(f"not assessed here: {names}")
    if vessel.empty:
        return (Holding(vessel.name, "empty", "", "", ()),)
    found = []
    two = bool(vessel.aqueous and vessel.organic)
    if vessel.aqueous:
        ph = ph_words(vessel.ph) if vessel.ph is not None else "pH not assessed"
        if not vessel.mixed:
            ph = "not mixed yet"
        phase = "aqueous layer" if two else "aqueous"
        found.append(_holding(vessel, vessel.aqueous, phase, ph, ledger, known))
    if vessel.organic:
        solvent = carrier(vessel.organic, known)
        phase = f"{solvent.name} layer" if two and solvent else "liquid"
        found.append(_holding(vessel, vessel.organic, phase, "", ledger, known))
    if vessel.solid:
        contents = _contents(
            {key: amount for key, amount in vessel.solid.items() if amount > _WORTH}, ledger, known
        )
        if contents:
            found.append(Holding(vessel.name, "solid", "", "", contents))
    if remarks and found:
        found[0] = replace(found[0], remarks=tuple(remarks))
    return tuple(found)


def _holding(
    vessel: Vessel, phase: Phase, name: str, ph: str, ledger: Ledger, known: Knowledge
) -> Holding:
    kept = {
        key: amount
        for key, amount in phase.amounts.items()
        if key not in (WATER, PROTON) and amount > _WORTH
    }
    return Holding(
        vessel.name, name, volume_words(phase.volume), ph, _contents(kept, ledger, known)
    )


def _contents(
    amounts: Mapping[str, float], ledger: Ledger, known: Knowledge
) -> tuple[Content, ...]:
    made = []
    for key, amount in amounts.items():
        whole = ledger.charged.get(key, 0.0) + ledger.formed.get(key, 0.0)
        thing = known.thing(key)
        share = share_words(amount / whole) if whole > 0 and not (thing.layers or thing.ion) else ""
        made.append((amount, Content(thing.name, amount_words(amount), share)))
    return tuple(content for _, content in sorted(made, key=lambda m: -m[0]))


__all__ = [
    "MODEL",
    "Act",
    "BenchStep",
    "Content",
    "Holding",
    "amount_in",
    "bench_steps",
    "holdings",
]
