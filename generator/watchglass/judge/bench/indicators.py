"""Indicators that change colour elsewhere than at the equivalence point.

The equivalence point is taken where pH rises or falls most steeply with the volume of titrant. The
titre is the volume at the middle of the indicator's range, as in `run/bench/adjusting.py`.
"""

from __future__ import annotations

from itertools import pairwise
from math import log, sqrt
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base.figures import shown
from watchglass.base.findings import Finding
from watchglass.chemistry.equilibrium import solve, unknown_ratios
from watchglass.chemistry.reagents import volume_to_ph, with_reagent
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.run.bench.figures import volume_words
from watchglass.run.bench.ledger import Added
from watchglass.run.bench.mixing import dissolve, prepare
from watchglass.run.bench.state import EMPTY

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.stocks import Indicator
    from watchglass.chemistry.equilibrium import PhaseSystem
    from watchglass.judge.bench.run import Run
    from watchglass.run.bench.ledger import Moment


def indicator_elsewhere(run: Run) -> Iterator[Finding]:
    """Report titrations whose indicator changes before or after the equivalence point, or slowly."""
    seen: set[int] = set()
    for moment in run.ledger.moments:
        event = moment.entry.happening.event
        if not isinstance(event, model.Operation) or event.verb != "titrate":
            continue
        indicator = _indicator(run, event)
        added = next(
            (r.outcome for r in moment.entry.results if isinstance(r.outcome, Added)), None
        )
        if indicator is None or added is None or not added.volume or moment.span.start in seen:
            continue
        if added.stated or event.object is None:
            continue
        seen.add(moment.span.start)  # further passes are like the first
        finding = _elsewhere(run, moment, event, indicator, added.volume)
        if finding is not None:
            yield finding


def _indicator(run: Run, event: model.Operation) -> Indicator | None:
    for clause in event.clauses:
        if clause.word == "to" and isinstance(clause.value, syntax.Place):
            return run.known.catalogue.indicators.get(clause.value.name.text)
    return None


def _elsewhere(
    run: Run, moment: Moment, event: model.Operation, indicator: Indicator, titre: float
) -> Finding | None:
    systems = _systems(run, moment, event)
    if systems is None:
        return None
    curve = _Curve(*systems)
    allowed = run.limit("indicator-error")
    point: float | None = titre
    if not curve.is_steepest_at(titre, allowed):
        far = [titre * _FAR**place for place in range(-_BEFORE, _BEYOND)]
        point = curve.steepest(far)
    names = f"{indicator.names[0]} (pH {indicator.range.text})"
    ph = curve.ph(point) if point is not None else None
    off = titre / point - 1 if point is not None else 0.0
    wide = curve.width(indicator.range) / titre
    if point is None or ph is None:
        said = f"the pH changes nowhere sharply; {names} is at the middle of its range at"
        said += f" {volume_words(titre)}"
    elif abs(off) > allowed:
        said = f"{names} changes at {volume_words(titre)}; the equivalence point lies at about"
        said += f" {volume_words(point)} and pH {shown(ph, 2)}"
    elif wide > _WIDE * allowed:
        said = (
            f"{names} changes slowly, over {volume_words(wide * titre, 2)} of {volume_words(titre)}"
        )
    else:
        return None
    return Finding(
        code=codes.INDICATOR_ELSEWHERE, span=moment.span, message=said, help=_better(run, ph)
    )


class _Curve(NamedTuple):
    """A titration curve: what is in the vessel, and the titrant."""

    held: PhaseSystem
    coming: PhaseSystem

    def ph(self, volume: float) -> float | None:
        """Give the pH after a volume of titrant, m3."""
        return solve(with_reagent(self.held, self.coming, volume)).ph

    def width(self, over: Quantity) -> float:
        """Give the volume that a range of pH takes, m3; 0 where an end is never reached."""
        ends = [volume_to_ph(self.held, self.coming, ph) for ph in (over.si, over.si_high)]
        return abs(ends[1] - ends[0]) if ends[0] is not None and ends[1] is not None else 0.0

    def is_steepest_at(self, volume: float, share: float) -> bool:
        """Tell whether pH changes as at an equivalence point within a share of a volume, and less beside."""
        beside = [volume * (1 + times * share) for times in (-3, -1, 1, 3)]
        first, low, high, last = (self.ph(v) or 0.0 for v in beside)
        rise = abs(high - low)
        sharp = rise / log(beside[2] / beside[1]) >= _SHARP
        return sharp and rise >= max(abs(low - first), abs(last - high))

    def steepest(self, volumes: list[float]) -> float | None:
        """Find the volume at which pH changes most steeply with its logarithm, between given ones.

        Returns:
            m3; None where it changes nowhere as steeply as at an
            equivalence point, or most steeply at the end of what is looked at.
        """
        phs = [self.ph(volume) for volume in volumes]
        slopes = [
            abs(high - low) / log(volumes[i + 1] / volumes[i]) if low and high else 0.0
            for i, (low, high) in enumerate(pairwise(phs))
        ]
        place = max(range(len(slopes)), key=slopes.__getitem__)
        if slopes[place] < _SHARP or place in (0, len(slopes) - 1):
            return None
        low, high = volumes[place], volumes[place + 1]
        while high / low - 1 > _EXACTLY:
            middle = sqrt(low * high)
            first, second, third = (self.ph(v) or 0.0 for v in (low, middle, high))
            if abs(second - first) >= abs(third - second):
                high = middle
            else:
                low = middle
        return sqrt(low * high)


#: Volumes at which the slope is looked at: from a sixteenth to sixty-four times the titre in steps of a tenth.
_FAR, _BEFORE, _BEYOND = 1.1, 29, 44
#: Change of pH with the natural logarithm of the volume from which it is an equivalence point [-].
#: Judgement: 0.1 mol/L acetic acid with base has 2000, carbonate to hydrogencarbonate, which is still
#: titrated, 20, ammonium with base, which is not, 14 (closed forms: C / (2.3 · buffer capacity)).
_SHARP = 16.0
#: How finely an equivalence point is sought whose pH is told [-]: it is steep there.
_EXACTLY = 1e-5
#: A colour may take this times the error allowed to change [-]. Judgement.
_WIDE = 5.0


def _better(run: Run, ph: float | None) -> str:
    """Name an indicator whose range holds the equivalence point."""
    if ph is not None:
        fitting = {
            i.key: abs(i.range.middle - ph)
            for i in run.known.catalogue.indicators.values()
            if i.range.si - 0.5 <= ph <= i.range.si_high + 0.5
        }
        if fitting:
            best = sorted(fitting, key=lambda key: (fitting[key], key))[:3]
            return "take " + " or ".join(f"`{key}`" for key in best) + ", or titrate to a pH"
    return "titrate with a pH meter, or choose another titrant"


def _systems(
    run: Run, moment: Moment, event: model.Operation
) -> tuple[PhaseSystem, PhaseSystem] | None:
    """Give vessel and titrant in the engine's terms, or None where they cannot be told."""
    if event.object is None:
        return None
    vessel = moment.before.vessel(moment.entry.happening.name(event.object.name.text))
    burette = next(
        (
            moment.before.vessel(moment.entry.happening.name(clause.value.name.text))
            for clause in event.clauses
            if clause.word == "from" and isinstance(clause.value, syntax.Place)
        ),
        None,
    )
    if burette is None or not burette.aqueous or not vessel.aqueous:
        return None
    dissolved, _, _ = dissolve(vessel, run.known)
    held = prepare(dissolved.aqueous, dissolved.organic, dissolved.temperature, run.known)
    coming = prepare(burette.aqueous, EMPTY, burette.temperature, run.known)
    if held.spoilt or coming.spoilt or unknown_ratios(held.system):
        return None
    return held.system, coming.system
