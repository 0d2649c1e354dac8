"""Accepting findings: with a reason, of a kind that can be accepted, and only while they are found."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base.findings import Finding, Severity

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.resolve.model import Acceptance

#: Letters of findings that speak of the bench and its hazards, not of what cannot be read.
_JUDGED = frozenset("BXHWP")


class Settled(NamedTuple):
    """Findings after acceptance.

    Attributes:
        open: What is still to be mended.
        accepted: What was found and accepted, each with its acceptance.
    """

    open: tuple[Finding, ...]
    accepted: tuple[tuple[Finding, Acceptance], ...]


def can_be_accepted(finding: Finding) -> bool:
    """Tell whether a kind of finding can be accepted at all: what cannot be read must be mended."""
    return finding.code.severity is not Severity.ERROR or finding.code.number[0] in _JUDGED


def settle(findings: Iterable[Finding], acceptances: Iterable[Acceptance]) -> Settled:
    """Take accepted findings out; an acceptance that takes nothing out is itself a finding."""
    by_code = {acceptance.word: acceptance for acceptance in acceptances}
    effective: set[str] = set()
    still: list[Finding] = []
    accepted: list[tuple[Finding, Acceptance]] = []
    for finding in findings:
        acceptance = by_code.get(finding.code.number)
        if acceptance is None or not can_be_accepted(finding):
            still.append(finding)
        else:
            effective.add(finding.code.number)
            accepted.append((finding, acceptance))
    refused = {f.code.number for f in still}
    for number, acceptance in by_code.items():
        if number not in effective:
            still.append(_without_effect(acceptance, found=number in refused))
    return Settled(tuple(still), tuple(accepted))


def _without_effect(acceptance: Acceptance, *, found: bool) -> Finding:
    word = acceptance.span.text
    return Finding(
        code=codes.ACCEPT_WITHOUT_EFFECT,
        span=acceptance.span,
        message=f"`{word}` cannot be accepted: it must be mended"
        if found
        else f"`{word}` is accepted and not found",
        help="mend the finding and take this line out" if found else "take the line out",
    )
