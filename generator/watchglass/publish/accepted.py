"""The list of accepted findings and intended reactions: instructors' business, in no student edition."""

from __future__ import annotations

from bisect import bisect_right
from typing import TYPE_CHECKING, NamedTuple

from watchglass.publish import model as m
from watchglass.publish.paging import in_parts
from watchglass.resolve.outline import slug

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Span
    from watchglass.resolve.model import Acceptance, Procedure

_INTENDED = "Intended reactions"
_ASIDE = "#page.instructors"


class Accepted(NamedTuple):
    """One procedure with what was accepted of it.

    Attributes:
        link: To its page.
        procedure: Its steps, and the reactions it intends.
        findings: What was found, and why it was accepted.
    """

    link: m.PageLink
    procedure: Procedure
    findings: tuple[tuple[Finding, Acceptance], ...]


def accepted_lists(procedures: Iterable[Accepted]) -> tuple[m.ListPage, ...]:
    """List what was found and accepted, by kind of finding, then what is intended.

    Args:
        procedures: All of the set, in the order of the handbook.

    Returns:
        The list in parts; nothing where nothing is accepted.
    """
    found: dict[str, list[m.ListEntry]] = {}
    intended: list[m.ListEntry] = []
    for entry in procedures:
        starts = [step.span.start for step in entry.procedure.steps]
        for finding, acceptance in entry.findings:
            title = f"{finding.code.name} ({finding.code.number})"
            address, place = _place(finding.span, entry, starts)
            link = m.PageLink(entry.link.title, entry.link.code, address)
            line = m.ListEntry(link, place, (m.Run(finding.message),), acceptance.reason)
            found.setdefault(title, []).append(line)
        aside = m.PageLink(entry.link.title, entry.link.code, f"{entry.link.address}{_ASIDE}")
        intended += (
            m.ListEntry(aside, "", (m.Run(line.word),), line.reason)
            for line in entry.procedure.intended
        )
    groups = [
        m.ListGroup(title, f"accepted-{slug(title)}", tuple(entries))
        for title, entries in sorted(found.items())
    ]
    if intended:
        groups.append(m.ListGroup(_INTENDED, "intended", tuple(intended)))
    if not groups:
        return ()
    places = tuple(m.PageLink(f"{g.title}, {len(g.entries)}", "", g.id) for g in groups)
    whole = m.ListPage(
        kind="accepted",
        title="Accepted findings",
        address="accepted.html",
        groups=tuple(groups),
        places=places,
    )
    return in_parts(whole)


def _place(span: Span, entry: Accepted, starts: list[int]) -> tuple[str, str]:
    """Give the address of where a finding stands: a step, else the part for instructors."""
    at = bisect_right(starts, span.start) - 1
    if at >= 0:
        step = entry.procedure.steps[at]
        if span.start < step.span.end:
            return f"{entry.link.address}#step-{step.number}", f"step {step.number}"
    return f"{entry.link.address}{_ASIDE}", "outside the steps"
