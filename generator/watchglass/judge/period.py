"""The time the steps take against the time of the periods."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.figures import shown
from watchglass.base.findings import Finding, Related
from watchglass.read import syntax
from watchglass.resolve import model

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.case import Case


def time_over_period(case: Case) -> Iterator[Finding]:
    """Report periods in which the stated times of the steps add up to more than there is.

    Only times that acts state count (`for`, `over`, `take`): the sum is a lower bound.
    """
    periods = case.procedure.head.periods
    if not periods:
        return
    spent = [0.0]
    longest: list[model.Event | None] = [None]
    for happening in case.course.happenings:
        event = happening.event
        if isinstance(event, model.Operation) and event.verb == "next period":
            spent.append(0.0)
            longest.append(None)
        elif time := _time(event):
            spent[-1] += time
            before = longest[-1]
            if before is None or _time(before) < time:
                longest[-1] = event
    if len(periods) == 1:
        periods *= len(spent)  # one figure is the time of each period
    for number, (taken, (period, span)) in enumerate(zip(spent, periods, strict=False)):
        if taken > period.si_high * (1 + 1e-9):
            minutes = (
                shown(taken / 60, 4).rstrip("0").rstrip(".")
                if taken % 60
                else str(round(taken / 60))
            )
            which = f"period {number + 1}" if len(periods) > 1 else "the period"
            most = longest[number]
            yield Finding(
                code=codes.TIME_OVER_PERIOD,
                span=span,
                message=f"the steps state {minutes} min; {which} has `{period.text}`",
                related=(Related(most.span, "the longest of them"),) if most else (),
                help="shorten a step, divide the work with `{next period}`, or give the period more time",
            )


def _time(event: model.Event) -> float:
    """Give the time that an act states, s; 0 where it states none."""
    if isinstance(event, model.Operation):
        return event.time or 0.0
    if not isinstance(event, model.Charge | model.Transfer):
        return 0.0
    return sum(
        clause.value.quantity.si
        for clause in event.clauses
        if clause.word in ("for", "over") and isinstance(clause.value, syntax.Measured)
    )
