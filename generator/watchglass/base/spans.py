r"""Places in text: a source, a span in it, and the line and column a person looks for.

Spans are offsets, since offsets can be cut, joined and compared without thought. Line and column
are worked out only when something is printed. A source's text has its byte order mark taken off
and its line ends made `\n` (`Source.of`): neither changes a line number or a column, and every
later stage is spared the question.
"""

from __future__ import annotations

from bisect import bisect_right
from dataclasses import dataclass, field
from typing import NamedTuple


@dataclass(frozen=True, slots=True, eq=False)
class Source:
    r"""One text that an author wrote.

    Attributes:
        name: What findings call it: its path within the set, with forward slashes.
        text: Its characters; line ends are `\n`, a byte order mark is gone.
    """

    name: str
    text: str = field(repr=False)

    @classmethod
    def of(cls, name: str, text: str) -> Source:
        """Make a source from text as it stands in a file."""
        text = text.removeprefix("\ufeff")
        if "\r" in text:
            text = text.replace("\r\n", "\n").replace("\r", "\n")
        return cls(name, text)

    def span(self, start: int, end: int) -> Span:
        """Give the span from offset `start` up to, not with, offset `end`."""
        return Span(self, start, end)


class Position(NamedTuple):
    """A place as editors show it: both count from 1, a column is one Unicode code point."""

    line: int
    column: int


class Span(NamedTuple):
    """Part of a source: offsets in code points, `end` not included."""

    source: Source
    start: int
    end: int

    @property
    def text(self) -> str:
        """The characters the span covers."""
        return self.source.text[self.start : self.end]

    def part(self, start: int, end: int) -> Span:
        """Give the span of characters `start` to `end`, counted from this span's start."""
        return Span(self.source, self.start + start, self.start + end)

    def position(self) -> Position:
        """Work out line and column of the start. For many spans of one source take `Lines`."""
        return Lines(self.source.text).position(self.start)

    def through(self, other: Span) -> Span:
        """Give the span from this start to the other's end."""
        return Span(self.source, self.start, other.end)


class Lines:
    """The line table of one text."""

    __slots__ = ("_starts", "_text")

    def __init__(self, text: str) -> None:
        """Find where each line starts."""
        self._text = text
        starts = [0]
        at = text.find("\n")
        while at >= 0:
            starts.append(at + 1)
            at = text.find("\n", at + 1)
        self._starts = starts

    def position(self, offset: int) -> Position:
        """Give line and column of an offset."""
        line = bisect_right(self._starts, offset)
        return Position(line, offset - self._starts[line - 1] + 1)

    def line(self, number: int) -> str:
        """Give the text of line `number` (from 1), without its line end."""
        start = self._starts[number - 1]
        end = self._text.find("\n", start)
        return self._text[start:] if end < 0 else self._text[start:end]

    def start(self, number: int) -> int:
        """Give the offset at which line `number` (from 1) starts."""
        return self._starts[number - 1]

    def __len__(self) -> int:
        """Count the lines."""
        return len(self._starts)
