"""Where everything ends: vessels that are never emptied, solids that are never taken up."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.judge.bench.run import Run, at, filled_by
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.run.bench.figures import volume_words

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.run.bench.state import Vessel

#: What is left in a vessel after a rinse is not worth a finding, m3.
_DREGS = 0.6e-6


def never_emptied(run: Run) -> Iterator[Finding]:
    """Report vessels that still hold a liquid at the end and that nothing asks for any more.

    A draft that throws nothing away yet is left alone: it does not speak of ends.
    """
    if not _says_where_things_go(run):
        return
    asked = asked_for(run)
    for name, vessel in run.ledger.end.vessels.items():
        if vessel.volume <= _DREGS or name in asked or kept(run, vessel) or _delivers(run, name):
            continue
        filled = filled_by(run.ledger, len(run.ledger.entries), name)
        if not filled:
            continue
        yield Finding(
            code=codes.VESSEL_NEVER_EMPTIED,
            span=filled[-1].span,
            message=f"`{name}` still holds {volume_words(vessel.volume)} at the end",
            related=tuple(
                at(m, "some of it came in here") for m in filled[:1] if m is not filled[-1]
            ),
            help=f"say where it goes, as in `{{discard {name} to aqueous-neutral}}`",
        )


def _says_where_things_go(run: Run) -> bool:
    """Tell whether a procedure discards anything at all."""
    return any(
        isinstance(event, model.Operation) and event.verb == "discard"
        for step in run.case.procedure.steps
        for event in step.events
    )


def _delivers(run: Run, name: str) -> bool:
    """Tell whether a vessel only delivers: a burette is emptied by the prep room."""
    declared = run.case.procedure.vessels.get(name)
    return bool(declared and declared.type and declared.type.type.measures == "delivers")


def kept(run: Run, vessel: Vessel) -> bool:
    """Tell whether a vessel is a product's: tared, or a vial."""
    declared = run.case.procedure.vessels.get(vessel.name)
    if declared is None or declared.type is None:
        return True
    return "tared" in declared.type.states or declared.type.type.key in ("sample-vial", "vial")


def asked_for(run: Run) -> frozenset[str]:
    """Give the vessels that a record, an expectation or a plain mark speaks of at their end."""
    names: set[str] = set()
    for line in run.case.procedure.expectations:
        names |= names_in(line.expression)
    for record in run.case.procedure.records:
        if record.expression is not None:
            names |= names_in(record.expression)
    for step in run.case.procedure.steps:
        for event in step.events:
            if (
                isinstance(event, model.Operation)
                and event.verb in ("weigh", "test", "collect")
                and event.object
            ):
                names.add(event.object.name.text)
    return frozenset(names)


def names_in(node: object) -> set[str]:
    """Give all names that an expression mentions."""
    if isinstance(node, syntax.Name):
        return {node.text}
    if isinstance(node, tuple) and hasattr(node, "_fields"):
        return {name for child in node for name in names_in(child)}
    if isinstance(node, tuple):
        return {name for child in node for name in names_in(child)}
    return set()
