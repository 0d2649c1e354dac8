"""Titres too small or too large for their burette, and indicators that turn in the wrong place."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding, Related
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.run.bench.figures import share_words, volume_words
from watchglass.run.bench.ledger import Added

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.bench.run import Run
    from watchglass.run.bench.ledger import Moment


#: The last bits of a float decide nothing.
_BIT = 1 - 1e-9


def titre_out_of_range(run: Run) -> Iterator[Finding]:
    """Report titres that a burette cannot give in one filling, or only with a poor reading."""
    seen: set[int] = set()
    for ledger in run.ledgers:
        for moment in ledger.moments:
            event = moment.entry.happening.event
            if not isinstance(event, model.Operation) or event.verb != "titrate":
                continue
            burette = _burette(moment, event)
            vessel = run.case.procedure.vessels.get(burette)
            size = moment.before.vessel(burette).capacity
            if vessel is None or vessel.type is None or size is None:
                continue
            for result in moment.entry.results:
                added = result.outcome
                if not isinstance(added, Added) or added.volume is None:
                    continue
                least = run.limit("titre-least") * size
                if least * _BIT <= added.volume <= size / _BIT or moment.span.start in seen:
                    continue
                seen.add(moment.span.start)
                small = added.volume < least
                yield Finding(
                    code=codes.TITRE_OUT_OF_RANGE,
                    span=moment.span,
                    message=f"the titre comes to {volume_words(added.volume)}; "
                    + (
                        f"a burette of {volume_words(size, 2)} is read well from"
                        f" {volume_words(least, 2)} on"
                        if small
                        else f"the burette holds {volume_words(size, 2)}"
                    ),
                    related=(Related(vessel.span, "the burette is declared here"),),
                    help="take more of the sample or a weaker titrant"
                    if small
                    else "take less of the sample or a stronger titrant",
                )


def _burette(moment: Moment, event: model.Operation) -> str:
    for clause in event.clauses:
        if clause.word == "from" and isinstance(clause.value, syntax.Place):
            return moment.entry.happening.name(clause.value.name.text)
    return ""


__all__ = ["share_words", "titre_out_of_range"]
