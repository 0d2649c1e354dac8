"""The head of a procedure: title, code, course, time, what comes before."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.fields import Field, Record, Shape
from watchglass.base.findings import Finding, did_you_mean
from watchglass.base.yaml import YamlText
from watchglass.catalogue import texts
from watchglass.resolve import materials, reactions
from watchglass.resolve.model import Acceptance, Head

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span

SHOWN = ("adjust-volumes", "yield", "components")
_ADDRESS = re.compile(r"[A-Za-z0-9][A-Za-z0-9-]{0,39}")
_MATERIAL = Field(
    Shape.TEXT_OR_MAPPING,
    "what it is, as `3.0 M hydrochloric acid`",
    required=True,
    fields=materials.FIELDS,
)
_VESSEL = Field(
    Shape.TEXT_OR_MAPPING,
    "type and size, as `conical flask 100 mL`; or a family by numbers",
    required=True,
    each=Field(Shape.TEXT, "type and size of these numbers", required=True),
)
_REACTION = Field(
    Shape.TEXT_OR_MAPPING,
    "the equation, or fields with it",
    required=True,
    fields=reactions.FIELDS,
)
FIELDS: dict[str, Field] = {
    "title": Field(Shape.TEXT, "the procedure's title", required=True),
    "code": Field(
        Shape.TEXT,
        "its code, unique in the set: its address in the handbook",
        required=True,
        pattern=_ADDRESS.pattern,
    ),
    "course": Field(Shape.TEXT, "the course it belongs to"),
    "revision": Field(Shape.TEXT, "number and date of the revision"),
    "time": Field(Shape.TEXT_OR_LIST, "time of each period, as `165 min`", quantity=(dim.TIME,)),
    "group": Field(Shape.TEXT, "who shares a station, as `2 students`"),
    "after": Field(Shape.TEXT_OR_LIST, "codes of procedures that come before"),
    "references": Field(Shape.TEXT_OR_LIST, "books and articles it rests on"),
    "read": Field(Shape.TEXT_OR_LIST, "what to read before"),
    "materials": Field(
        Shape.MAPPING, "local names of materials with what they are", each=_MATERIAL
    ),
    "vessels": Field(Shape.MAPPING, "local names of vessels with type and size", each=_VESSEL),
    "equipment": Field(
        Shape.MAPPING, "what is neither vessel nor material", each=Field(Shape.TEXT, "what it is")
    ),
    "reactions": Field(Shape.MAPPING, "reactions by name", each=_REACTION),
    "scale": Field(Shape.TEXT, "multiplies every extensive quantity", quantity=(dim.NUMBER,)),
    "expect": Field(Shape.TEXT_OR_LIST, "what the experiment is designed to give"),
    "accept": Field(
        Shape.MAPPING,
        "findings looked at and accepted, each with its reason",
        each=Field(Shape.TEXT, "why it is sound all the same", required=True),
    ),
    "intended": Field(
        Shape.MAPPING,
        "planned reactions, each with its reason and controls",
        each=Field(Shape.TEXT, "the reason, and the controls taken", required=True),
    ),
    "show": Field(Shape.TEXT_OR_LIST, "what students see beyond the default", words=SHOWN),
}


def read_head(record: Record, findings: list[Finding]) -> Head:
    """Read the plain fields; faults go to the findings."""
    code = record.text("code")
    if code is not None and not _ADDRESS.fullmatch(code.text):
        findings.append(
            Finding(
                code=codes.ADDRESS_UNFIT,
                span=code.span,
                message=f"`{code.text}` cannot serve as an address",
                help="use letters, digits and hyphens, at most 40, as in `OC-04`",
            )
        )
    title = record.text("title")
    return Head(
        title=title.text if title else "",
        code=code.text if code else "",
        code_span=code.span if code else None,
        course=_text(record, "course"),
        revision=_text(record, "revision"),
        periods=_periods(record, findings),
        group=_text(record, "group"),
        after=tuple((item.text, item.span) for item in texts.words(record.values.get("after"))),
        references=tuple(item.text for item in texts.words(record.values.get("references"))),
        read=tuple(item.text for item in texts.words(record.values.get("read"))),
        scale=_scale(record, findings),
        show=_shown(record, findings),
    )


def _text(record: Record, name: str) -> str:
    node = record.text(name)
    return node.text.strip() if node else ""


def _periods(record: Record, findings: list[Finding]) -> tuple[tuple[Quantity, Span], ...]:
    periods = []
    for item in texts.words(record.values.get("time")):
        read = texts.quantity(item, dim.TIME, findings)
        if read is not None:
            periods.append((read, item.span))
    return tuple(periods)


def _scale(record: Record, findings: list[Finding]) -> float:
    node = record.text("scale")
    if node is None:
        return 1.0
    read = texts.quantity(node, dim.NUMBER, findings)
    if read is None:
        return 1.0
    if not 0 < read.si <= 1000:
        findings.append(
            Finding(
                code=codes.NUMBER_NOT_READ,
                span=node.span,
                message=f"`{node.text}` is no factor to scale by",
                help="write a number above 0, as in `scale: 0.5`",
            )
        )
        return 1.0
    return read.si


def _shown(record: Record, findings: list[Finding]) -> tuple[str, ...]:
    shown = []
    for item in texts.words(record.values.get("show")):
        if item.text in SHOWN:
            shown.append(item.text)
        else:
            findings.append(
                Finding(
                    code=codes.FIELD_UNFIT,
                    span=item.span,
                    message=f"`{item.text}` is nothing that can be shown",
                    help=did_you_mean(item.text, SHOWN)
                    or "take one of " + ", ".join(f"`{s}`" for s in SHOWN),
                )
            )
    return tuple(shown)


def read_acceptances(record: Record, findings: list[Finding]) -> tuple[Acceptance, ...]:
    """Read `accept:`: each a finding's name or number, with the reason it is accepted for."""
    accepted = []
    for entry in record.mapping("accept") or ():
        word = entry.key
        reason = entry.value.text.strip() if isinstance(entry.value, YamlText) else ""
        code = codes.find(word.text)
        if code is None:
            findings.append(
                Finding(
                    code=codes.ACCEPT_UNKNOWN,
                    span=word.span,
                    message=f"`{word.text}` is no finding",
                    help=did_you_mean(word.text, codes.words())
                    or "name the finding as it is printed, as in `material-unused`",
                )
            )
        elif not reason:
            findings.append(
                Finding(
                    code=codes.ACCEPT_WITHOUT_REASON,
                    span=word.span,
                    message=f"`{word.text}` is accepted without a reason",
                    help=f"write why, as in `{word.text}: looked at by the laboratory, and why it is sound`",
                )
            )
        if code is not None:
            accepted.append(Acceptance(code.number, reason, word.span))
    return tuple(accepted)


def read_intended(record: Record) -> tuple[Acceptance, ...]:
    """Read `intended:`: planned reactions of the incompatibility tables."""
    return tuple(
        Acceptance(entry.key.text, entry.value.text, entry.key.span)
        for entry in record.mapping("intended") or ()
        if isinstance(entry.value, YamlText)
    )
