"""The checks of one procedure, in the order they are made: one table."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.judge.at_hand import reactant_not_at_hand
from watchglass.judge.expected import expectations_at_desk
from watchglass.judge.formed import more_than_forms, no_product
from watchglass.judge.limiting import not_limiting
from watchglass.judge.measuring import measuring
from watchglass.judge.passes import too_many_passes
from watchglass.judge.period import time_over_period
from watchglass.judge.provided import provided, volume_without_density
from watchglass.judge.react_place import reactant_not_in_vessel
from watchglass.judge.stated import stated_amounts
from watchglass.judge.strength import too_strong
from watchglass.judge.unused import unused

if TYPE_CHECKING:
    from collections.abc import Callable, Iterable

    from watchglass.base.findings import Finding
    from watchglass.judge.case import Case

CHECKS: tuple[Callable[[Case], Iterable[Finding]], ...] = (
    unused,
    too_strong,
    not_limiting,
    reactant_not_at_hand,
    reactant_not_in_vessel,
    no_product,
    volume_without_density,
    provided,
    expectations_at_desk,
    time_over_period,
    too_many_passes,
)


#: Checks of what the draft says in its author's own figures, whatever it is scaled by.
DRAFT_CHECKS: tuple[Callable[[Case], Iterable[Finding]], ...] = (
    measuring,
    stated_amounts,
    more_than_forms,
)


def judge(case: Case, draft: Case | None = None) -> tuple[Finding, ...]:
    """Make every check of one procedure.

    Args:
        case: The procedure at the size it is run at.
        draft: As its author wrote it, where that is another size.
    """
    written = draft or case
    return (
        *(finding for check in CHECKS for finding in check(case)),
        *(finding for check in DRAFT_CHECKS for finding in check(written)),
    )
