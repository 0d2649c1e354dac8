"""What is read and checked but not yet run at the bench: said once a procedure, never in silence."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding, Related
from watchglass.read import syntax
from watchglass.resolve import model

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.judge.case import Case

_SHOWN = 3


def not_yet_run(case: Case) -> Iterator[Finding]:
    """Name what the notation can say and the bench does not run: branches, secrets, products of others."""
    procedure = case.procedure
    waiting = [(block.opening, "`:::if`") for block in branches(procedure.body)]
    for material in procedure.materials.values():
        if isinstance(material.composition, model.Secret):
            waiting.append((material.span, "`one-of`"))
        elif isinstance(material.composition, model.Continued):
            waiting.append((material.span, "`from:` another procedure"))
    if not waiting:
        return
    (span, word), *others = waiting
    yield Finding(
        code=codes.NOT_YET_RUN,
        span=span,
        message=f"{word} is read and checked, not yet run at the bench",
        related=tuple(Related(place, f"{said}, not yet run") for place, said in others[:_SHOWN]),
    )


def branches(blocks: Iterable[syntax.Block]) -> Iterator[syntax.Fenced]:
    """Give every `:::if` block, at whatever depth."""
    for block in blocks:
        match block:
            case syntax.Fenced("if"):
                yield block
            case syntax.Fenced(_, _, _, children, _, _) | syntax.Quote(children, _):
                yield from branches(children)
            case syntax.Steps(items, _):
                for item in items:
                    yield from branches(item.children)
            case _:
                pass


def too_many_passes(case: Case) -> Iterator[Finding]:
    """Report an `again` whose repetitions multiply beyond what is run."""
    if case.course.cut is not None:
        yield Finding(
            code=codes.TOO_MANY_PASSES,
            span=case.course.cut.span,
            message="with this repetition the procedure has more events than are run",
            help="repeat fewer steps, or fewer times; a repeated step's own `again` counts each time",
        )
