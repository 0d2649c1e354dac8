"""`schedule.yml`: which procedure runs in which week, for which sections and how many stations."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base.fields import Field, Record, Shape, read_fields, unfit
from watchglass.base.findings import Finding
from watchglass.base.yaml import YamlList, YamlNode, YamlText
from watchglass.catalogue import texts

if TYPE_CHECKING:
    from watchglass.base.spans import Span

_COUNT = re.compile(r"[0-9]{1,5}")
FIELDS: dict[str, Field] = {
    "week": Field(
        Shape.TEXT, "week of the term, a whole number", required=True, pattern=_COUNT.pattern
    ),
    "procedure": Field(
        Shape.TEXT_OR_LIST, "code of the procedure, or a list of codes", required=True
    ),
    "course": Field(Shape.TEXT, "the course"),
    "sections": Field(Shape.TEXT_OR_LIST, "when it is run, one entry a section"),
    "stations": Field(Shape.TEXT, "stations laid out for one section", pattern=_COUNT.pattern),
    "note": Field(Shape.TEXT, "a remark"),
}


class Slot(NamedTuple):
    """One entry of the schedule.

    Attributes:
        week: Week of the term, from 1.
        course: The course, or empty.
        procedures: Codes, with their places.
        sections: When it is run.
        stations: Stations for one section, or None.
    """

    week: int
    course: str
    procedures: tuple[tuple[str, Span], ...]
    sections: tuple[str, ...]
    stations: int | None


def read_schedule(node: YamlNode | None) -> tuple[tuple[Slot, ...], tuple[Finding, ...]]:
    """Decode `schedule.yml`; entries that cannot be read are left out."""
    if node is None:
        return (), ()
    if not isinstance(node, YamlList):
        return (), (unfit(node, "the schedule", Shape.LIST),)
    slots: list[Slot] = []
    findings: list[Finding] = []
    for item in node.items:
        record, found = read_fields(item, FIELDS, "an entry of the schedule")
        findings += found
        week = _count(record.text("week"), findings) if record else None
        if record is not None and week is not None:
            slots.append(_slot(record, week, findings))
    return tuple(slots), tuple(findings)


def _slot(record: Record, week: int, findings: list[Finding]) -> Slot:
    course = record.text("course")
    return Slot(
        week=week,
        course=course.text if course else "",
        procedures=tuple((n.text, n.span) for n in texts.words(record.values.get("procedure"))),
        sections=tuple(n.text for n in texts.words(record.values.get("sections"))),
        stations=_count(record.text("stations"), findings),
    )


def _count(node: YamlText | None, findings: list[Finding]) -> int | None:
    if node is None:
        return None
    if _COUNT.fullmatch(node.text) and int(node.text) > 0:
        return int(node.text)
    findings.append(
        Finding(
            code=codes.NUMBER_NOT_READ,
            span=node.span,
            message=f"`{node.text}` is not a count",
            help="write a whole number, as in `3`",
        )
    )
    return None
