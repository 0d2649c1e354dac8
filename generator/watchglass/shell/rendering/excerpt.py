"""The part of a source that a finding speaks of, with what is wrong underlined.

The fault itself comes first, then its related places in the order the check gave them: those of
the same file in the same excerpt, on lines of their own or as further underlines of a line already
shown; those of other files below, each file with its own address. Every underline has a row to
itself, so that its words can be read without following lines. A span over several lines is shown
whole up to three lines, else by its first and last.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.base.findings import Severity
from watchglass.shell.rendering.cells import text_width, visible
from watchglass.shell.rendering.window import Mark, views

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Source, Span
    from watchglass.shell.rendering.places import Places
    from watchglass.shell.rendering.style import Style

_WHOLE_LINES = 3
_INDENT = "   "


@dataclass(slots=True)
class _Shown:
    """A line to show; without a number it stands for lines left out."""

    number: int | None
    marks: list[Mark] = field(default_factory=list)


@dataclass(slots=True)
class _Section:
    """The lines of one source to show, in order, and the first span that asked for them."""

    span: Span
    lines: list[_Shown] = field(default_factory=list)


def excerpt(finding: Finding, places: Places, style: Style) -> Iterator[str]:
    """Give the lines of a finding's excerpt; the address of the fault itself is not among them."""
    sections = _sections(finding, places)
    numbers = [line.number or 0 for section in sections for line in section.lines]
    digits = len(str(max(numbers)))
    grave = finding.code.severity is Severity.ERROR
    for index, section in enumerate(sections):
        if index:
            yield "  " + visible(places.address(section.span), unicode=style.unicode)
        for line in section.lines:
            yield from _draw(section.span.source, line, digits, places, style, grave=grave)


def _sections(finding: Finding, places: Places) -> list[_Section]:
    first = _Section(finding.span)
    sections = {finding.span.source.name: first}
    _add(first, finding.span, places, words=finding.label or "", primary=True)
    for related in finding.related:
        section = sections.setdefault(related.span.source.name, _Section(related.span))
        _add(section, related.span, places, words=related.message, primary=False)
    return list(sections.values())


def _add(section: _Section, span: Span, places: Places, *, words: str, primary: bool) -> None:
    """Put a span's lines into a section, or its mark on lines that are there already."""
    pieces = _pieces(span, places)
    if primary:
        _add_context(section, pieces[0][0], span.source, places)
    left_out = len(pieces) > _WHOLE_LINES
    if left_out:
        pieces = [pieces[0], pieces[-1]]
    for index, (number, start, end) in enumerate(pieces):
        last = index == len(pieces) - 1
        mark = Mark(start, end, primary, words if last else "")
        known = next((line for line in section.lines if line.number == number), None)
        if known is None:
            known = _Shown(number)
            section.lines.append(known)
        if start < end or last or index == 0:
            known.marks.append(mark)
        if left_out and not last:
            section.lines.append(_Shown(None))


def _add_context(section: _Section, number: int, source: Source, places: Places) -> None:
    """Show the line above a blank one, since a caret under nothing tells little."""
    text = places.line(source, number)
    if number > 1 and (not text or text.isspace()):
        section.lines.append(_Shown(number - 1))


def _pieces(span: Span, places: Places) -> list[tuple[int, int, int]]:
    """Cut a span at line ends: line number, first and last character of each; one at least."""
    text = span.source.text
    start = min(max(span.start, 0), len(text))
    end = min(max(span.end, start), len(text))
    while end > start and text[end - 1] == "\n":
        end -= 1
    table = places.lines(span.source)
    first, last = table.position(start), table.position(end)
    if first.line == last.line:
        return [(first.line, first.column - 1, last.column - 1)]
    pieces = [(first.line, first.column - 1, len(table.line(first.line)))]
    for number in range(first.line + 1, last.line + 1):
        line = table.line(number)
        indent = len(line) - len(line.lstrip())
        stop = last.column - 1 if number == last.line else len(line)
        pieces.append((number, min(indent, stop), stop))
    return pieces


def _draw(
    source: Source, line: _Shown, digits: int, places: Places, style: Style, *, grave: bool
) -> Iterator[str]:
    if line.number is None:
        yield style.faint(f"{_INDENT}{'':>{digits}} :")
        return
    numbered = f"{_INDENT}{line.number:>{digits}} |"
    blank = f"{_INDENT}{'':>{digits}} |"
    room = max(style.width - len(blank) - 1, 20)
    text = places.line(source, line.number)
    for view in views(text, line.marks, room=room, style=style):
        yield (style.faint(numbered) + " " + view.text).rstrip()
        for mark, first, last in view.marks:
            for row in _underline(mark, first, last, room, style, grave=grave):
                yield style.faint(blank) + " " + row


def _underline(
    mark: Mark, first: int, last: int, room: int, style: Style, *, grave: bool
) -> Iterator[str]:
    """Draw one underline and its words: beside it where they fit, else in a row below."""
    words = visible(mark.words, unicode=style.unicode)
    signs = ("^" if mark.primary else "-") * (last - first)
    dress = (style.alarm if grave else style.strong) if mark.primary else style.faint
    row = " " * first + dress(signs)
    needed = text_width(words)
    if not words:
        yield row
    elif last + 1 + needed <= room:
        yield f"{row} {dress(words) if mark.primary else words}"
    else:
        yield row
        yield " " * max(0, min(first, room - needed)) + (dress(words) if mark.primary else words)
