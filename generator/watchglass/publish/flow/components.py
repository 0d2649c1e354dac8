"""What is in a box, each component with its share of all there is: where that may be shown."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.catalogue.components import PROTON, WATER
from watchglass.publish.flow.desk import DISTILLATE
from watchglass.publish.text import NBSP
from watchglass.run.bench.figures import share_words
from watchglass.run.bench.state import added

if TYPE_CHECKING:
    from collections.abc import Iterator, Mapping

    from watchglass.publish.flow.desk import Draft
    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.ledger import Ledger
    from watchglass.run.bench.state import Bench

#: Shares below this are not main ones; no box names more components than this.
LEAST, MOST = 0.03, 4


class Shares:
    """Tells the main components of a box, by the ledger."""

    def __init__(self, ledger: Ledger, known: Knowledge) -> None:
        self.ledger = ledger
        self.known = known

    def __call__(self, draft: Draft) -> tuple[str, ...]:
        """Give `benzocaine 98.3 %` and the like, the largest share first."""
        amounts: Mapping[str, float]
        if draft.held:
            bench = (
                self.ledger.entries[draft.entries[-1]].bench if draft.entries else self.ledger.end
            )
            amounts = dict(self._held(bench, draft.place))
        else:
            amounts = self._came(draft)
        found = []
        for key, amount in amounts.items():
            thing = self.known.thing(key)
            solvent = thing.layers and key not in self.ledger.formed and draft.head != DISTILLATE
            if key in (WATER, PROTON) or thing.ion or thing.gas or solvent:
                continue
            whole = self.ledger.charged.get(key, 0.0) + self.ledger.formed.get(key, 0.0)
            if whole > 0 and amount / whole >= LEAST:
                found.append((amount / whole, thing.name))
        found.sort(key=lambda entry: (-entry[0], entry[1]))
        return tuple(
            f"{name} {share_words(share).replace(' ', NBSP)}" for share, name in found[:MOST]
        )

    def _came(self, draft: Draft) -> Mapping[str, float]:
        """Add up what came to a place at some entries."""
        total: Mapping[str, float] = {}
        for at in draft.entries:
            entry = self.ledger.entries[at]
            before = entry.since
            if before is None:
                before = self.ledger.entries[at - 1].bench if at else self.ledger.start
            total = added(total, dict(self._held(entry.bench, draft.place)))
            total = added(total, dict(self._held(before, draft.place)), -1.0)
        return total

    def _held(self, bench: Bench, place: str) -> Iterator[tuple[str, float]]:
        """Give the amount of each component in a vessel or a waste stream, mol."""
        total: dict[str, float] = {}
        if place in bench.vessels:
            vessel = bench.vessels[place]
            total = added(vessel.aqueous.amounts, vessel.organic.amounts)
            solids = vessel.solid
        elif place in bench.sinks:
            total = dict(bench.sinks[place].liquids)
            solids = bench.sinks[place].solids
        else:
            return
        for key, amount in solids.items():
            parts = self.known.parts(key)
            total = added(total, {part: count * amount for part, count in parts.items()})
        yield from total.items()
