"""Vessels that hold more than they can, or more than is wise for what is done in them."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base.figures import shown
from watchglass.base.findings import Finding, Related
from watchglass.judge.bench.run import Run, filled_by
from watchglass.resolve import model
from watchglass.run.bench.figures import volume_words
from watchglass.run.bench.mixing import gas_volume_of

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.run.bench.ledger import Ledger, Moment
    from watchglass.run.bench.state import Vessel

_SHAKEN = frozenset(("shake",))
_BOILED = frozenset(("boil", "reflux", "distil"))
_FUNNEL = "separatory-funnel"
_FLASKS = frozenset(("round-bottom-flask", "pear-shaped-flask", "flat-bottom-flask"))


class Limit(NamedTuple):
    """A fill that is too much for what is done: its name in the table, and why, in words."""

    name: str
    why: str


def overfilled(run: Run) -> Iterator[Finding]:
    """Report the first time that a vessel holds more than its nominal volume, one a vessel."""
    ledger = run.high
    seen: set[str] = set()
    for moment in ledger.moments:
        for was, after in moment.vessels():
            size = after.capacity
            if size is None or after.name in seen or after.volume <= size * (1 + 1e-6):
                continue
            if after.volume <= was.volume:
                continue
            seen.add(after.name)
            what = _named(run, after.name)
            yield Finding(
                code=codes.VESSEL_OVERFILLED,
                span=moment.span,
                message=f"{what} would hold {volume_words(after.volume)}; its size is"
                f" {_size(run, after)}",
                related=_earlier(ledger, moment, after),
                help=f"take a larger vessel, of {volume_words(after.volume, 2)} or more, or do it in"
                " portions",
            )


def _size(run: Run, vessel: Vessel) -> str:
    """Give the nominal size as it was declared."""
    declared = run.case.procedure.vessels.get(vessel.name)
    type_ = declared.type if declared is not None else None
    if type_ is not None and type_.size is not None:
        return type_.size.text
    return volume_words(vessel.capacity or 0.0)


def too_full(run: Run) -> Iterator[Finding]:
    """Report vessels fuller than the operation allows: shaken, boiled, or giving gas."""
    ledger = run.high
    seen: set[str] = set()
    gassing = _gassing(run, ledger)
    for moment in ledger.moments:
        event = moment.entry.happening.event
        if not isinstance(event, model.Operation) or event.object is None:
            continue
        name = moment.entry.happening.name(event.object.name.text)
        vessel = moment.before.vessel(name)
        limit = _limit(run, event.verb, vessel, gas=(name, moment.place) in gassing)
        size = vessel.capacity
        if limit is None or size is None or name in seen or vessel.volume > size * (1 + 1e-6):
            continue
        allowed = run.limit(limit.name)
        if vessel.volume <= allowed * size * (1 + 1e-3):
            continue
        seen.add(name)
        yield Finding(
            code=codes.VESSEL_TOO_FULL,
            span=moment.span,
            message=f"{_named(run, name)} holds {volume_words(vessel.volume)} of"
            f" {_size(run, vessel)}; {limit.why}, and then no more than"
            f" {shown(allowed * 100, 2)} % may be filled",
            related=_earlier(ledger, moment, vessel),
            help=f"take one of {volume_words(vessel.volume / allowed, 2)} or more, or do it in portions",
        )


def _limit(run: Run, verb: str, vessel: Vessel, *, gas: bool) -> Limit | None:
    kind = _kind(run, vessel.name)
    if kind == _FUNNEL and gas:
        return Limit("funnel-fill-with-gas", "gas comes off in it")
    if kind == _FUNNEL and verb in _SHAKEN:
        return Limit("funnel-fill", "it is shaken")
    if kind in _FLASKS and verb in _BOILED:
        return Limit("flask-fill", "its contents boil")
    return None


def _gassing(run: Run, ledger: Ledger) -> set[tuple[str, int]]:
    """Give vessel and entry wherever gas worth a word comes off."""
    found = set()
    for moment in ledger.moments:
        for result in moment.entry.results:
            if gas_volume_of(result.outcome) >= run.limit("gas-worth-a-word"):
                found.add((result.vessel, moment.place))
    return found


def _kind(run: Run, name: str) -> str:
    vessel = run.case.procedure.vessels.get(name)
    return vessel.type.type.key if vessel and vessel.type else ""


def _named(run: Run, name: str) -> str:
    """Call a vessel by its kind and name: the separatory funnel, `A`."""
    vessel = run.case.procedure.vessels.get(name)
    if vessel is None or vessel.type is None:
        return f"`{name}`"
    written = vessel.type.written
    return f"the {written}" if written.endswith(name) else f"the {written} `{name}`"


def _earlier(ledger: Ledger, moment: Moment, vessel: Vessel) -> tuple[Related, ...]:
    """Point to what was poured in before."""
    found = []
    for earlier in filled_by(ledger, moment.place, vessel.name):
        if earlier.span != moment.span:
            added = earlier.entry.bench.vessel(vessel.name)
            found.append(Related(earlier.span, f"{volume_words(added.volume)} after this"))
    return tuple(found[-3:])
