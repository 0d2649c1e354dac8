"""The ledger: what happened at each event, and how the bench stood after it."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.run.bench.state import NOTHING

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping

    from watchglass.base.spans import Span
    from watchglass.run.bench.layers import Layers
    from watchglass.run.bench.mixing import Mixed
    from watchglass.run.bench.state import Bench, Vessel
    from watchglass.run.passes import Happening


class Taken(NamedTuple):
    """A portion of a material came into a vessel.

    Attributes:
        material: Its local name.
        mass: kg; None where it was not measured so.
        volume: m3; None where it was not measured so.
        why: Why what it brings is not known; empty where it is.
    """

    material: str
    mass: float | None
    volume: float | None
    why: str = ""


class Moved(NamedTuple):
    """Something went from one vessel to another, or to a sink.

    Attributes:
        origin: Vessel it left.
        target: Vessel or sink it went to.
        part: `aqueous`, `organic`, `solid`, `liquid`, or empty for everything.
        volume: Of the liquid, m3.
        short: How much less there was than was asked for, m3.
        nothing: Whether there was nothing at all.
        whole: Whether it was all of the part; else a measured share, or what boils over.
    """

    origin: str
    target: str
    part: str
    volume: float
    short: float = 0.0
    nothing: bool = False
    whole: bool = True


class Added(NamedTuple):
    """What `adjust` or `titrate` took.

    Attributes:
        material: The reagent's local name.
        volume: m3; None where it cannot be told.
        wanted: pH aimed at, or None.
        before: pH before, or None.
        stated: Whether the author stated the volume.
        why: Why it cannot be told, in words; empty where it is.
    """

    material: str
    volume: float | None
    wanted: float | None
    before: float | None
    stated: bool = False
    why: str = ""


class Reacted(NamedTuple):
    """A reaction ran.

    Attributes:
        reaction: Its local name.
        extent: mol of the equation as written.
        limiting: Component or substance that ran out first, or empty.
        why: Why it did not run; empty where it did.
    """

    reaction: str
    extent: float
    limiting: str
    why: str = ""


class Warmed(NamedTuple):
    """Temperature rise of an act by its own heat, K, before any bath takes it up."""

    rise: float
    held: bool
    source: str


class Supposed(NamedTuple):
    """The author stated an outcome.

    Attributes:
        what: The substance or material.
        share: Of it, 0 to 1; None where an amount was stated.
        outcome: As written.
        reason: As written.
        why: Why it could not be applied; empty where it was.
    """

    what: str
    share: float | None
    outcome: str
    reason: str
    why: str = ""


class NotAssessed(NamedTuple):
    """An act that the model says nothing about, and why."""

    why: str


Outcome = Taken | Moved | Added | Reacted | Warmed | Supposed | NotAssessed


class Result(NamedTuple):
    """One outcome and the vessel it is of."""

    vessel: str
    outcome: Outcome | Mixed | Layers


class Entry(NamedTuple):
    """One event in the ledger.

    Attributes:
        happening: The event at its turn.
        results: What it did, in order.
        bench: How the bench stands after it.
        branch: Words of the `:::if` it stands in, which is run and then dropped; else empty.
        since: The bench before it where that is not the one after the entry before: at the end of
            a branch that was dropped. Else None.
    """

    happening: Happening
    results: tuple[Result, ...]
    bench: Bench
    branch: str = ""
    since: Bench | None = None


class Moment(NamedTuple):
    """An entry with the bench before it and its place in the ledger."""

    place: int
    entry: Entry
    before: Bench

    @property
    def span(self) -> Span:
        """Where its event is written."""
        return self.entry.happening.event.span

    def vessels(self) -> Iterator[tuple[Vessel, Vessel]]:
        """Give the vessels that the event changed: as they were, and as they are."""
        for name, after in self.entry.bench.vessels.items():
            was = self.before.vessels.get(name)
            if after is not was:
                yield was if was is not None else after.emptied(), after


def moments(start: Bench, entries: Iterable[Entry]) -> Iterator[Moment]:
    """Go through entries with the bench before each."""
    before = start
    for place, entry in enumerate(entries):
        yield Moment(place, entry, before if entry.since is None else entry.since)
        before = entry.bench


class Ledger(NamedTuple):
    """All that happened, oldest first.

    Attributes:
        start: The bench before the first event.
        entries: One an event.
        labels: For each label the number of entries before it.
        charged: Moles of each component and of each solid substance that were brought, by key of
            the substance as its components (`H^+` included).
        formed: Theoretical yield of each product, mol: what its reaction would give if it ran to
            the end on what was there; by its components, and of a salt by its key as well.
        titres: Volume that each titration took, m3, with the number of entries before its end.
        benches: The bench at each label.
        final: The bench at the end, branches that are dropped left aside; None: after the last entry.
        moments: The entries once more, each with the bench before it.
    """

    start: Bench
    entries: tuple[Entry, ...]
    labels: Mapping[str, int]
    charged: Mapping[str, float] = NOTHING
    formed: Mapping[str, float] = NOTHING
    titres: tuple[tuple[int, str, float | None], ...] = ()
    benches: Mapping[str, Bench] = {}
    final: Bench | None = None
    moments: tuple[Moment, ...] = ()

    @property
    def end(self) -> Bench:
        """The bench at the end."""
        if self.final is not None:
            return self.final
        return self.entries[-1].bench if self.entries else self.start

    def at(self, label: str) -> Bench | None:
        """Give the bench at a label; None where it was never reached."""
        return self.benches.get(label)
