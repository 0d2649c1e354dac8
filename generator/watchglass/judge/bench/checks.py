"""The checks of the bench, in the order they are made: one table."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Related
from watchglass.judge.bench.along import goes_along
from watchglass.judge.bench.cleaning import vessel_not_clean
from watchglass.judge.bench.ends import never_emptied
from watchglass.judge.bench.expected import expectations
from watchglass.judge.bench.fill import overfilled, too_full
from watchglass.judge.bench.funnels import emulsion_to_expect, solid_in_funnel
from watchglass.judge.bench.gas import gas_in_closed_vessel
from watchglass.judge.bench.heating import (
    heat_without_cooling,
    heated_while_closed,
    hotter_than_it_boils,
)
from watchglass.judge.bench.indicators import indicator_elsewhere
from watchglass.judge.bench.moving import drawn_from_nothing, no_such_layer
from watchglass.judge.bench.opposites import opposites_poured_together
from watchglass.judge.bench.peroxides import peroxide_former_concentrated
from watchglass.judge.bench.products import product_not_collected
from watchglass.judge.bench.reagents import (
    adjusts_the_wrong_way,
    no_test_after_adjusting,
    water_into_acid,
)
from watchglass.judge.bench.titrations import titre_out_of_range
from watchglass.judge.bench.wanted import wanted_is_discarded

if TYPE_CHECKING:
    from collections.abc import Callable, Iterable

    from watchglass.base.findings import Finding
    from watchglass.judge.bench.run import Run

BENCH_CHECKS: tuple[Callable[[Run], Iterable[Finding]], ...] = (
    no_such_layer,
    opposites_poured_together,
    drawn_from_nothing,
    overfilled,
    too_full,
    gas_in_closed_vessel,
    heated_while_closed,
    hotter_than_it_boils,
    heat_without_cooling,
    water_into_acid,
    adjusts_the_wrong_way,
    no_test_after_adjusting,
    goes_along,
    wanted_is_discarded,
    titre_out_of_range,
    indicator_elsewhere,
    solid_in_funnel,
    emulsion_to_expect,
    peroxide_former_concentrated,
    vessel_not_clean,
    never_emptied,
    product_not_collected,
    expectations,
)


#: Mistakes that upset all that follows: what is found after one of them is its consequence.
_ROOTS = frozenset(
    (codes.LAYER_ABSENT, codes.LAYER_OTHER, codes.OPPOSITES_POURED, codes.LAYERS_TOO_CLOSE)
)
#: Findings that speak of the end, wherever they stand.
_DECIDED = frozenset((codes.EXPECTATION_MISSED, codes.REAGENT_TOO_WEAK))
#: Findings that may be such a consequence.
_CONSEQUENCES = frozenset(
    (
        codes.VESSEL_EMPTY,
        codes.MORE_THAN_THERE,
        codes.LAYER_ABSENT,
        codes.LAYER_OTHER,
        codes.OPPOSITES_POURED,
        codes.GAS_IN_CLOSED_VESSEL,
        codes.VESSEL_TOO_FULL,
        codes.HEAT_WITHOUT_COOLING,
        codes.EXPECTATION_MISSED,
        codes.REAGENT_TOO_WEAK,
        codes.REAGENT_WRONG_WAY,
        codes.GOES_ALONG,
        codes.WANTED_DISCARDED,
        codes.VESSEL_NEVER_EMPTIED,
        codes.SOLID_IN_FUNNEL,
        codes.PRODUCT_NOT_COLLECTED,
    )
)


def judge_bench(run: Run) -> tuple[Finding, ...]:
    """Make every check of the bench; what follows from an earlier mistake is attached to it."""
    found = [finding for check in BENCH_CHECKS for finding in check(run)]
    elsewhere = {f.span for f in found if f.code is codes.INDICATOR_ELSEWHERE}
    found = [f for f in found if f.code is not codes.TITRE_OUT_OF_RANGE or f.span not in elsewhere]
    wrong_order = {f.span for f in found if f.code is codes.WATER_INTO_ACID}
    found = [
        f for f in found if f.code is not codes.HEAT_WITHOUT_COOLING or f.span not in wrong_order
    ]
    roots = [f for f in found if f.code in _ROOTS]
    if not roots:
        return tuple(found)
    root = min(roots, key=lambda f: (f.span.start, f.code is codes.LAYER_ABSENT))
    own: list[Finding] = []
    follows: list[Finding] = []
    for finding in found:
        later = finding.span.start >= root.span.start or finding.code in _DECIDED
        consequence = finding is not root and finding.code in _CONSEQUENCES and later
        (follows if consequence else own).append(finding)
    related = tuple(Related(f.span, f"so {f.message}") for f in follows[:3])
    return tuple(replace(f, related=(*f.related, *related)) if f is root else f for f in own)
