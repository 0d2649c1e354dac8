"""Gas in a closed vessel."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.judge.bench.run import Run, at, filled_by
from watchglass.run.bench.figures import volume_words
from watchglass.run.bench.mixing import gas_volume_of

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.run.bench.ledger import Moment
    from watchglass.run.bench.state import Vessel

CLOSED = frozenset(("stoppered",))


def gas_in_closed_vessel(run: Run) -> Iterator[Finding]:
    """Report gas that comes off while its vessel is stoppered; one a place."""
    seen: set[int] = set()
    for ledger in run.ledgers:
        for moment in ledger.moments:
            for result in moment.entry.results:
                gas = gas_volume_of(result.outcome)
                vessel = moment.entry.bench.vessel(result.vessel)
                allowed = run.limit("gas-in-closed-vessel") * _headspace(vessel)
                closed = vessel.closure in CLOSED and moment.span.start not in seen
                if closed and gas > allowed:
                    seen.add(moment.span.start)
                    yield _finding(run, moment, vessel, gas)


def _headspace(vessel: Vessel) -> float:
    if vessel.capacity is None:
        return 0.0
    return max(vessel.capacity - vessel.volume, 0.0)


def _finding(run: Run, moment: Moment, vessel: Vessel, gas: float) -> Finding:
    room = (
        f"; {volume_words(_headspace(vessel), 2)} are free above the liquid"
        if vessel.capacity
        else ""
    )
    earlier = [m for m in filled_by(run.ledger, moment.place, vessel.name) if m.span != moment.span]
    return Finding(
        code=codes.GAS_IN_CLOSED_VESSEL,
        span=moment.span,
        message=f"about {volume_words(gas, 2)} of gas comes off while `{vessel.name}` is"
        f" {vessel.closure}{room}",
        related=tuple(at(m, "what gives the gas came in here") for m in earlier[-1:]),
        help=f"swirl it open first, `{{swirl {vessel.name}, open, for 1 min}}`, and vent after every turn",
    )
