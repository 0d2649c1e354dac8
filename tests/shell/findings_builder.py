"""Findings for the renderers' tests, in a few words.

A source is written with its spans in it: ⟦the fault⟧ and ⟪a related place⟫.
"""

from __future__ import annotations

from dataclasses import dataclass

from watchglass.base.findings import Code, Edit, Finding, Related, Severity
from watchglass.base.spans import Source, Span

OVERFILLED = Code("B120", "funnel-overfilled", Severity.ERROR, "a funnel would hold too much")
UNUSED = Code("N180", "material-unused", Severity.WARNING, "a material is never used")
NOT_RUN = Code("N190", "not-yet-run", Severity.NOTE, "acts are read, not yet run")

_OPEN, _CLOSE = "⟦⟪", "⟧⟫"


@dataclass(frozen=True)
class Marked:
    """A source, the span of its fault and those of its related places."""

    source: Source
    fault: Span
    places: tuple[Span, ...]


def marked(text: str, name: str = "procedures/oc-04.md") -> Marked:
    """Take the brackets out of a text and remember what they held."""
    plain = ""
    begun: list[tuple[str, int]] = []
    stretches: list[tuple[str, int, int]] = []
    for char in text:
        if char in _OPEN:
            begun.append((char, len(plain)))
        elif char in _CLOSE:
            kind, start = begun.pop()
            stretches.append((kind, start, len(plain)))
        else:
            plain += char
    source = Source.of(name, plain)
    faults = [source.span(start, end) for kind, start, end in stretches if kind == "⟦"]
    others = [source.span(start, end) for kind, start, end in stretches if kind == "⟪"]
    return Marked(source, faults[0] if faults else source.span(0, 0), tuple(others))


def finding(
    text: str,
    *,
    code: Code = OVERFILLED,
    message: str = "the funnel would hold 150 mL; its size is 125 mL",
    label: str | None = "150 mL after this step",
    related: tuple[str, ...] = (),
    help: str | None = None,  # noqa: A002 - the field's own name
    fix: str | None = None,
    name: str = "procedures/oc-04.md",
) -> Finding:
    """Make the finding of a marked text; `related` are the words of its places in order."""
    here = marked(text, name)
    return Finding(
        code=code,
        span=here.fault,
        message=message,
        label=label,
        related=tuple(map(Related, here.places, related)),
        help=help,
        fix=None if fix is None else Edit(here.fault, fix),
    )
