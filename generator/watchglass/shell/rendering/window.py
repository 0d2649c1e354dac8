"""One line of a source with its marks, fitted into the columns there are.

A line that fits is shown whole. A longer one is shown through a window round what is marked, with
a sign where it was cut; marks too far apart for one window get one each. A very long line (a file
without line ends, say) is cut down before it is laid out, so that one finding costs the same
however long its line is.
"""

from __future__ import annotations

from bisect import bisect_left, bisect_right
from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

from watchglass.shell.rendering.cells import Row, lay_out

if TYPE_CHECKING:
    from collections.abc import Iterator, Sequence

    from watchglass.shell.rendering.style import Style

_VERY_LONG = 4000
_LEAD = 8


@dataclass(frozen=True, slots=True)
class Mark:
    """A stretch of a line that is underlined.

    Attributes:
        start: Character of the line it starts at, from 0.
        end: Character it ends before.
        primary: Whether it is the fault itself, or a related place.
        words: What stands beside the underline; may be empty.
    """

    start: int
    end: int
    primary: bool
    words: str


@dataclass(frozen=True, slots=True)
class View:
    """What is shown of a line, and the columns (from 0) at which each mark starts and ends."""

    text: str
    marks: tuple[tuple[Mark, int, int], ...]


def views(line: str, marks: Sequence[Mark], *, room: int, style: Style) -> Iterator[View]:
    """Show a line with its marks in `room` columns; one view, or several if they lie far apart."""
    if len(line) <= _VERY_LONG:
        yield from _grouped(lay_out(line, unicode=style.unicode), marks, room, style)
        return
    for mark in marks:
        start = max(0, mark.start - _VERY_LONG // 2)
        end = min(len(line), start + _VERY_LONG)
        near = replace(mark, start=mark.start - start, end=min(mark.end, end) - start)
        row = lay_out(line[start:end], unicode=style.unicode)
        yield _view(row, [near], room, style, cut_before=start > 0, cut_after=end < len(line))


def _grouped(row: Row, marks: Sequence[Mark], room: int, style: Style) -> Iterator[View]:
    size = room - 2 * len(style.cut)
    group: list[Mark] = []
    for mark in marks:
        first, last = _extent(row, [*group, mark])
        if group and row.width > room and last - first > size:
            yield _view(row, group, room, style)
            group = []
        group.append(mark)
    yield _view(row, group, room, style)


def _extent(row: Row, marks: Sequence[Mark]) -> tuple[int, int]:
    stretches = [row.stretch(mark.start, mark.end) for mark in marks]
    if not stretches:
        return 0, 0
    return min(first for first, _ in stretches), max(last for _, last in stretches)


def _view(
    row: Row,
    marks: Sequence[Mark],
    room: int,
    style: Style,
    *,
    cut_before: bool = False,
    cut_after: bool = False,
) -> View:
    low, high = _bounds(row, marks, room, style)
    before = style.cut if low > 0 or cut_before else ""
    after = style.cut if high < row.width or cut_after else ""
    shift = len(before) - low
    placed = []
    for mark in marks:
        first, last = row.stretch(mark.start, mark.end)
        if last > high + 1 or (last > high and after):
            last = high + len(after)
        placed.append((mark, first + shift, max(last, first + 1) + shift))
    return View(before + _between(row, low, high, padded=bool(after)) + after, tuple(placed))


def _bounds(row: Row, marks: Sequence[Mark], room: int, style: Style) -> tuple[int, int]:
    """Choose the columns to show: all, or as many as fit with the marks in the middle."""
    if row.width <= room:
        return 0, row.width
    size = max(room - 2 * len(style.cut), 1)
    first, last = _extent(row, marks)
    spare = size - (last - first)
    low = first - (spare // 2 if spare >= 0 else min(_LEAD, size // 4))
    low = max(0, min(low, row.width - size))
    return low, low + size


def _between(row: Row, low: int, high: int, *, padded: bool) -> str:
    """Join the pieces from column `low` to `high`; a wide one cut by an edge becomes blanks."""
    start = bisect_left(row.columns, low)
    while low > 0 and start < len(row.pieces) and row.columns[start] == row.columns[start + 1]:
        start += 1
    end = max(bisect_right(row.columns, high) - 1, start)
    text = " " * (row.columns[start] - low) + "".join(row.pieces[start:end])
    return text + " " * (high - row.columns[end]) if padded else text
