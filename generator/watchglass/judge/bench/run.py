"""What a check of the bench is given."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base.findings import Related
from watchglass.resolve import model
from watchglass.run.bench.asked import Asked

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.judge.case import Case
    from watchglass.read import syntax
    from watchglass.resolve.laboratory import Laboratory
    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.ledger import Ledger, Moment
    from watchglass.run.bench.state import Vessel


class Sample(NamedTuple):
    """A run with one candidate for each secret material; `words` name them: `sample` is caffeine."""

    words: str
    run: Run


class Run(NamedTuple):
    """One procedure as it went at the bench.

    Attributes:
        case: The procedure with its course and usage.
        ledger: What happened, open amounts at their low end.
        high: The same at their high end; `ledger` itself where there is none.
        known: What is known of the components.
        laboratory: Its limits and glassware.
        samples: How it went with each candidate, where there are secret samples: what they bring is
            then not known in `ledger`, from which students' pages are made.
        carried: What the products of other procedures consist of, by local name.
    """

    case: Case
    ledger: Ledger
    high: Ledger
    known: Knowledge
    laboratory: Laboratory
    samples: tuple[Sample, ...] = ()
    carried: Mapping[str, Vessel] = {}

    @property
    def opened(self) -> Run:
        """What instructors are shown: the run with the first candidates, or itself."""
        return self.samples[0].run if self.samples else self

    @property
    def ledgers(self) -> tuple[Ledger, ...]:
        """Both ends, or the one."""
        return (self.ledger,) if self.high is self.ledger else (self.ledger, self.high)

    def asked(self, ledger: Ledger | None = None) -> Asked:
        """Give what answers questions about a ledger."""
        return Asked(self.case.procedure, ledger or self.ledger, self.known)

    def limit(self, name: str) -> float:
        """Give a limit of the checks, SI."""
        return self.laboratory.limit(name)


def at(moment: Moment, words: str) -> Related:
    """Point to the event of a moment."""
    return Related(moment.span, words)


def filled_by(ledger: Ledger, index: int, vessel: str) -> tuple[Moment, ...]:
    """Give the moments at which something came into a vessel, since it was last empty."""
    found: list[Moment] = []
    for moment in ledger.moments:
        if moment.place > index:
            break
        for was, after in moment.vessels():
            if after.name != vessel:
                continue
            if was.empty:
                found = []
            if after.volume > was.volume + 1e-12:
                found.append(moment)
    return tuple(found)


def drawn_from(moment: Moment) -> syntax.Place | None:
    """Give the vessel, and the part of it, that an act takes something out of."""
    match moment.entry.happening.event:
        case model.Transfer(origin, _, _, _) | model.Aliquot(_, origin, _, _, _):
            return origin
        case model.Operation("discard", place):
            return place
        case _:
            return None
