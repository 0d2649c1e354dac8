"""Running text taken out of its lines, with the way back to the file.

A paragraph in a quoted list item stands in the file in pieces, each after its own indent and `>`;
a table cell loses the backslash of an escaped bar. `Prose` is the text that remains, and knows for
each of its characters where it came from.
"""

from __future__ import annotations

from bisect import bisect_right
from dataclasses import dataclass
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence


@dataclass(frozen=True, slots=True)
class Prose:
    r"""Text of a paragraph, heading or cell.

    Attributes:
        text: The characters to read; lines are parted by `\n` and begin with no blank.
        starts: Where in `text` each piece begins; the first is 0.
        origins: Where in the file each piece begins.
        row_end: For a table cell, offset in the file at which its row ends.
    """

    text: str
    starts: Sequence[int]
    origins: Sequence[int]
    row_end: int | None = None

    def at(self, position: int) -> int:
        """Give the offset in the file of a character of `text`."""
        piece = bisect_right(self.starts, position) - 1
        return self.origins[piece] + position - self.starts[piece]

    def end(self, position: int) -> int:
        """Give the offset in the file after the character before `position`."""
        return self.at(position - 1) + 1 if position else self.origins[0]


def of_lines(text: str, lines: Iterable[tuple[int, int]], shift: int) -> Prose:
    """Put lines together.

    Args:
        text: What the block parser read.
        lines: Start and end of each line in `text`, without indent and line end; at least one.
        shift: Offset in the file at which `text` begins.
    """
    parts: list[str] = []
    starts: list[int] = []
    origins: list[int] = []
    length, expected = 0, -1
    for start, end in lines:
        if start != expected:
            starts.append(length)
            origins.append(start + shift)
        parts.append(text[start:end])
        length += end - start + 1
        expected = end + 1
    parts[-1] = parts[-1].rstrip(" \t")
    return Prose("\n".join(parts), starts, origins)


def of_cell(text: str, start: int, end: int, *, shift: int, row_end: int) -> Prose:
    r"""Take a table cell from `text[start:end]`, which has no blank at its ends.

    The backslash before a bar is dropped, as the table takes it for its own.
    """
    parts: list[str] = []
    starts = [0]
    origins = [start + shift]
    length = 0
    bar = text.find("\\|", start, end)
    while bar >= 0:
        parts.append(text[start:bar])
        length += bar - start
        start = bar + 1
        if length == starts[-1]:
            origins[-1] = start + shift
        else:
            starts.append(length)
            origins.append(start + shift)
        bar = text.find("\\|", start + 1, end)
    parts.append(text[start:end])
    return Prose("".join(parts), starts, origins, row_end + shift)
