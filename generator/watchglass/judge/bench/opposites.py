"""A basic layer poured into an acid one, or the other way: each undoes the other."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.judge.bench.run import Run, at, filled_by
from watchglass.resolve import model
from watchglass.run.bench.figures import ph_words
from watchglass.run.bench.mixing import mix

if TYPE_CHECKING:
    from collections.abc import Iterator

#: pH that is clearly acid, and pH that is not acid any more.
_ACID, _NOT_ACID = 3.0, 6.5


def opposites_poured_together(run: Run) -> Iterator[Finding]:
    """Report layers drawn from an extraction into a vessel that holds the opposite."""
    seen: set[int] = set()
    for moment in run.ledger.moments:
        event = moment.entry.happening.event
        if not isinstance(event, model.Transfer) or event.origin.part is None:
            continue
        origin = moment.before.vessel(moment.entry.happening.name(event.origin.name.text))
        target = moment.before.vessel(moment.entry.happening.name(event.target.name.text))
        if not (origin.organic and origin.aqueous and target.aqueous) or moment.span.start in seen:
            continue
        if not target.mixed:
            target, _ = mix(target, run.known)
        drawn, there = origin.ph, target.ph
        if drawn is None or there is None:
            continue
        if min(drawn, there) < _ACID and max(drawn, there) > _NOT_ACID:
            seen.add(moment.span.start)
            yield Finding(
                code=codes.OPPOSITES_POURED,
                span=moment.span,
                message=f"a layer of {ph_words(drawn)} goes into `{target.name}`, which holds a liquid"
                f" of {ph_words(there)}: each undoes the other",
                related=tuple(
                    at(m, "what it holds came in here")
                    for m in filled_by(run.ledger, moment.place - 1, target.name)[-1:]
                ),
                help="draw it into a vessel of its own",
            )
