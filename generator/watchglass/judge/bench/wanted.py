"""A layer thrown away that still carries what is wanted later."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding, Related
from watchglass.read.terms import After, Binary, Call, Compare, Held, Name, Negative, Within, Words
from watchglass.resolve import model
from watchglass.run.bench.figures import share_words
from watchglass.run.bench.ledger import Moved

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.spans import Span
    from watchglass.judge.bench.run import Run
    from watchglass.read.terms import Expression
    from watchglass.run.bench.ledger import Moment


def wanted_is_discarded(run: Run) -> Iterator[Finding]:
    """Report discarded layers with a share of what a later record or expectation asks for."""
    wanted = dict(_wanted(run))
    seen: set[int] = set()
    for moment in run.ledger.moments:
        event = moment.entry.happening.event
        if not isinstance(event, model.Operation) or event.verb != "discard":
            continue
        part = next(
            (r.outcome.part for r in moment.entry.results if isinstance(r.outcome, Moved)), ""
        )
        if part not in ("aqueous", "organic") or moment.span.start in seen or event.object is None:
            continue
        vessel = moment.before.vessel(moment.entry.happening.name(event.object.name.text))
        phase = vessel.aqueous if part == "aqueous" else vessel.organic
        if not (vessel.aqueous and vessel.organic):
            continue
        for component, (span, step) in wanted.items():
            if step and step <= moment.entry.happening.step:
                continue
            whole = run.ledger.charged.get(component, 0.0) + run.ledger.formed.get(component, 0.0)
            lost = phase.amounts.get(component, 0.0)
            if (
                component in vessel.doubt
                or whole <= 0
                or lost <= run.limit("lost-with-layer") * whole
            ):
                continue
            seen.add(moment.span.start)
            yield _finding(run, moment, part, component, lost / whole, span)
            break


def _finding(
    run: Run, moment: Moment, part: str, component: str, share: float, span: Span
) -> Finding:
    return Finding(
        code=codes.WANTED_DISCARDED,
        span=moment.span,
        message=f"the {part} layer that is thrown away holds {share_words(share)} of the"
        f" {run.known.thing(component).name}",
        related=(Related(span, "it is wanted here"),),
        help="keep the layer until the product is weighed, or move the substance out of it before",
    )


def _wanted(run: Run) -> Iterator[tuple[str, tuple[Span, int]]]:
    """Give the components that records and expectations ask for, with place and step."""
    asked = run.asked()
    procedure = run.case.procedure
    lines: list[tuple[Expression, Span, int]] = [
        (line.expression, line.span, 0) for line in procedure.expectations
    ]
    lines += [(r.expression, r.span, r.step) for r in procedure.records if r.expression is not None]
    for expression, span, step in lines:
        for held in _helds(expression):
            if isinstance(held.substance, Name | Words):
                component = asked.component(held.substance.text)
                if component is not None:
                    yield component, (span, step)


def _helds(node: Expression) -> Iterator[Held]:
    match node:
        case Held():
            yield node
        case Call(_, arguments, _):
            for argument in arguments:
                yield from _helds(argument)
        case Binary(_, left, right, _) | Compare(_, left, right, _):
            yield from _helds(left)
            yield from _helds(right)
        case Negative(operand, _) | Within(operand, _, _) | After(operand, _, _):
            yield from _helds(operand)
        case _:
            return
