"""Repetitions that multiply beyond what is run."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.case import Case


def too_many_passes(case: Case) -> Iterator[Finding]:
    """Report an `again` whose repetitions multiply beyond what is run."""
    if case.course.cut is not None:
        yield Finding(
            code=codes.TOO_MANY_PASSES,
            span=case.course.cut.span,
            message="with this repetition the procedure has more events than are run",
            help="repeat fewer steps, or fewer times; a repeated step's own `again` counts each time",
        )
