"""Vessels that are used again and were not cleaned, where it matters.

It matters where a vessel measures, where it was declared dry or tared, and where a liquid that has
been dried runs into what held water. Elsewhere what is left on the glass is taken to be harmless:
common practice, no source.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.judge.bench.run import Run, at
from watchglass.resolve import model
from watchglass.run.bench.liquids import carrier

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.run.bench.ledger import Moment
    from watchglass.run.bench.state import Vessel


class _Residue(NamedTuple):
    """What a vessel last held: at which moment it was emptied, and what it was."""

    moment: Moment
    was: Vessel


def vessel_not_clean(run: Run) -> Iterator[Finding]:
    """Report each vessel once that is charged again with the rest of something else in it."""
    residues: dict[str, _Residue] = {}
    dried: set[str] = set()
    seen: set[str] = set()
    turn = 0
    for moment in run.ledger.moments:
        happening, event = moment.entry.happening, moment.entry.happening.event
        if happening.fresh and happening.turn > turn:
            turn = happening.turn
            residues.clear()  # the pass begins with clean vessels
        verb = event.verb if isinstance(event, model.Operation) else ""
        place = event.object if isinstance(event, model.Operation) else None
        name = happening.name(place.name.text) if place is not None else ""
        if verb == "rinse":
            residues.pop(name, None)
            continue
        if verb == "dry":
            dried.add(name)
            residues.pop(name, None)
        from_dried = _origin(moment) in dried
        for was, after in moment.vessels():
            if not was.empty and after.empty:
                residues[after.name] = _Residue(moment, was)
                dried.discard(after.name)
            elif was.empty and not after.empty and after.name in residues:
                residue = residues.pop(after.name)
                why = _matters(run, residue, after, from_dried=from_dried)
                if why and after.name not in seen:
                    seen.add(after.name)
                    yield Finding(
                        code=codes.VESSEL_NOT_CLEAN,
                        span=moment.span,
                        message=f"`{after.name}` is used again and was not rinsed; {why}",
                        related=(at(residue.moment, "it was emptied here"),),
                        help=f"rinse it before, as in `{{rinse {after.name} with 5 mL water}}`, or take"
                        " another vessel",
                    )


def _origin(moment: Moment) -> str:
    """Give the vessel that an event moves something from."""
    event, happening = moment.entry.happening.event, moment.entry.happening
    if isinstance(event, model.Transfer | model.Aliquot):
        return happening.name(event.origin.name.text)
    if isinstance(event, model.Operation) and event.object is not None:
        return happening.name(event.object.name.text)
    return ""


def _matters(run: Run, residue: _Residue, now: Vessel, *, from_dried: bool) -> str:
    """Tell why what is left matters, in words; empty where it does not."""
    declared = run.case.procedure.vessels.get(now.name)
    type_ = declared.type if declared is not None else None
    if type_ is None or _same(residue.was, now):
        return ""
    wet = bool(residue.was.aqueous)
    held = _held(run, residue.was)
    if type_.type.measures in ("delivers", "contains"):
        return f"it measures, and last held {held}"
    if "oven-dried" in type_.states and wet:
        return f"it was to be dry, and last held {held}"
    if "tared" in type_.states and (residue.was.solid or residue.was.aqueous):
        return f"its empty mass is no longer what was weighed: it last held {held}"
    if from_dried and wet and not now.aqueous:
        return f"a dried liquid runs into it, and it last held {held}"
    return ""


def _same(one: Vessel, other: Vessel) -> bool:
    """Tell whether two fillings are of the same things, whatever the amounts."""
    return (
        set(one.aqueous.amounts) == set(other.aqueous.amounts)
        and set(one.organic.amounts) == set(other.organic.amounts)
        and set(one.solid) == set(other.solid)
        and one.unknown == other.unknown
    )


def _held(run: Run, vessel: Vessel) -> str:
    if vessel.aqueous:
        return "an aqueous liquid" if vessel.aqueous.amounts.keys() - {"water"} else "water"
    if vessel.organic:
        liquid = carrier(vessel.organic, run.known)
        return f"a solution in {liquid.name}" if liquid is not None else "another liquid"
    if vessel.solid:
        return run.known.thing(next(iter(vessel.solid))).name
    return ", ".join(sorted(vessel.unknown)) or "something else"
