"""Acts that are read and checked but not yet run on the bench: said once a procedure, never in silence."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding, Related
from watchglass.resolve import model

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.case import Case

_SHOWN = 3
#: Verbs of time alone: all that they do is counted against the period.
_DONE = frozenset(("take", "wait", "next period"))


def not_yet_run(case: Case) -> Iterator[Finding]:
    """Name the acts whose effect on the vessels is not computed."""
    events = [
        event
        for step in case.procedure.steps
        for event in step.events
        if isinstance(event, model.Operation | model.Transfer | model.Aliquot)
    ]
    waiting = [(event.span, _word(event)) for event in events if _word(event) not in _DONE]
    waiting += [(e.span, "expect") for e in case.procedure.expectations]
    if not waiting:
        return
    words = sorted({word for _, word in waiting})
    first, *others = waiting
    yield Finding(
        code=codes.NOT_YET_RUN,
        span=first[0],
        message=f"{len(waiting)} acts are read and checked, not yet run at the bench: "
        + ", ".join(words)
        if len(waiting) > 1
        else f"`{words[0]}` is read and checked, not yet run at the bench",
        related=tuple(Related(span, f"`{word}`, not yet run") for span, word in others[:_SHOWN]),
    )


def _word(event: model.Event) -> str:
    match event:
        case model.Operation():
            return event.verb
        case model.Transfer():
            return "pour"
        case _:
            return "aliquot"


def too_many_passes(case: Case) -> Iterator[Finding]:
    """Report an `again` whose repetitions multiply beyond what is run."""
    if case.course.cut is not None:
        yield Finding(
            code=codes.TOO_MANY_PASSES,
            span=case.course.cut.span,
            message="with this repetition the procedure has more events than are run",
            help="repeat fewer steps, or fewer times; a repeated step's own `again` counts each time",
        )
