"""Counting the steps of a procedure, and comparing what was typed."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.read.markdown.messages import step_number_differs

if TYPE_CHECKING:
    from watchglass.base.findings import Finding
    from watchglass.base.spans import Span


class StepCounter:
    """Counts steps from 1 and reports where the typed numbers leave the count.

    One slip moves all numbers after it, and some type `1.` for every step: neither is reported
    again with each step that follows.
    """

    def __init__(self) -> None:
        """Begin at nought."""
        self.findings: list[Finding] = []
        self._number = 0
        self._first: Span | None = None
        self._written = 0

    def count(self, written: int, place: Span) -> int:
        """Count one more step, typed as `written` at `place`; give its number."""
        ahead = self._written - self._number
        repeated = written == self._written and ahead != 0
        self._number += 1
        if written - self._number not in (0, ahead) and not repeated:
            self.findings.append(step_number_differs(place, self._number, self._first))
        if self._first is None:
            self._first = place
        self._written = written
        return self._number
