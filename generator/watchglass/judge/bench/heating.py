"""Closed vessels that are heated, liquids hotter than they boil, heat that nothing takes up."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.figures import shown
from watchglass.base.findings import Finding
from watchglass.judge.bench.gas import CLOSED
from watchglass.resolve import model
from watchglass.run.bench.ledger import Warmed

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.bench.run import Run
    from watchglass.run.bench.knowledge import Thing
    from watchglass.run.bench.ledger import Moment
    from watchglass.run.bench.state import Vessel

_HEATING = frozenset(("heat", "warm", "boil", "reflux", "distil", "evaporate"))
_CONDENSED = frozenset(("reflux", "distil", "evaporate", "boil"))
#: From here a vessel counts as heated, K (30 °C). Common practice, no source.
_WARM = 303.15


def heated_while_closed(run: Run) -> Iterator[Finding]:
    """Report stoppered vessels that are heated."""
    seen: set[int] = set()
    for moment in run.ledger.moments:
        event, vessel = _heated(moment)
        if event is None or vessel is None or moment.span.start in seen:
            continue
        if vessel.closure in CLOSED and (vessel.temperature > _WARM or event.verb in _CONDENSED):
            seen.add(moment.span.start)
            yield Finding(
                code=codes.HEATED_CLOSED,
                span=moment.span,
                message=f"`{vessel.name}` is {vessel.closure} while it is heated",
                help=f"open it, or put it under a condenser: `{{{event.verb} {vessel.name} …, under condenser}}`",
            )


def hotter_than_it_boils(run: Run) -> Iterator[Finding]:
    """Report liquids heated above the boiling point of a main part of them without a condenser."""
    seen: set[int] = set()
    for moment in run.ledger.moments:
        event, vessel = _heated(moment)
        if (
            event is None
            or vessel is None
            or event.verb in _CONDENSED
            or vessel.closure == "under condenser"
            or moment.span.start in seen
        ):
            continue
        thing = _lowest(run, vessel)
        if thing is None or thing.boils is None or vessel.temperature <= thing.boils + 0.5:
            continue
        seen.add(moment.span.start)
        yield Finding(
            code=codes.HOTTER_THAN_IT_BOILS,
            span=moment.span,
            message=f"`{vessel.name}` is brought to {_celsius(vessel.temperature)};"
            f" {thing.name} in it boils at {_celsius(thing.boils)}",
            help="reflux it, stay below its boiling point, or evaporate on purpose",
        )


def heat_without_cooling(run: Run) -> Iterator[Finding]:
    """Report acts that warm their vessel more than is left to itself, with no bath to take it up."""
    seen: set[int] = set()
    for moment in run.ledger.moments:
        for result in moment.entry.results:
            warmed = result.outcome
            if not isinstance(warmed, Warmed) or moment.span.start in seen:
                continue
            vessel = moment.entry.bench.vessel(result.vessel)
            if warmed.held:
                continue
            lowest = _lowest(run, vessel)
            start = moment.before.vessel(result.vessel).temperature
            near = (
                lowest is not None
                and lowest.boils is not None
                and start + warmed.rise > lowest.boils - run.limit("below-boiling")
                and warmed.rise > 5.0
            )
            if warmed.rise <= run.limit("rise-with-cooling") and not near:
                continue
            seen.add(moment.span.start)
            boils = (
                f"; {lowest.name} boils at {_celsius(lowest.boils)}"
                if near and lowest and lowest.boils
                else ""
            )
            yield Finding(
                code=codes.HEAT_WITHOUT_COOLING,
                span=moment.span,
                message=f"{warmed.source} warms `{vessel.name}` by up to {shown(warmed.rise, 2)} K{boils}",
                help=f"cool it before, `{{cool {vessel.name} to 5 °C with ice}}`, and add in small portions",
            )


def _heated(moment: Moment) -> tuple[model.Operation | None, Vessel | None]:
    event = moment.entry.happening.event
    if not isinstance(event, model.Operation) or event.verb not in _HEATING or event.object is None:
        return None, None
    name = moment.entry.happening.name(event.object.name.text)
    after = moment.entry.bench.vessel(name)
    return event, after if not after.empty else moment.before.vessel(name)


def _lowest(run: Run, vessel: Vessel) -> Thing | None:
    """Give the lowest boiling liquid that makes up a tenth of a layer or more."""
    best: Thing | None = None
    for phase in (vessel.aqueous, vessel.organic):
        for key, amount in phase.amounts.items():
            thing = run.known.thing(key)
            if (
                thing.boils is None
                or not thing.volume
                or amount * thing.volume < 0.1 * phase.volume
            ):
                continue
            if best is None or best.boils is None or thing.boils < best.boils:
                best = thing
    return best


def _celsius(kelvin: float) -> str:
    return f"{kelvin - 273.15:.0f} °C".replace("-", "−")
