"""Line and column of spans, with one line table a source.

A span that does not lie in its text is a bug of an earlier stage; tests there look for it. Here
it is drawn in to the text, since a finding shown a little off is worth more than none.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base.spans import Lines

if TYPE_CHECKING:
    from watchglass.base.spans import Position, Source, Span


class Places:
    """The line tables of the sources met so far."""

    __slots__ = ("_last", "_tables")

    def __init__(self) -> None:
        """Begin with none."""
        self._tables: dict[Source, Lines] = {}
        self._last: tuple[Source | None, int, str] = (None, 0, "")

    def lines(self, source: Source) -> Lines:
        """Give the line table of a source."""
        table = self._tables.get(source)
        if table is None:
            table = self._tables[source] = Lines(source.text)
        return table

    def line(self, source: Source, number: int) -> str:
        """Give the text of a line; the last one is kept, since findings come in their order.

        Without that, many findings on one very long line would each copy the line.
        """
        if self._last[:2] != (source, number):
            self._last = (source, number, self.lines(source).line(number))
        return self._last[2]

    def position(self, source: Source, offset: int) -> Position:
        """Give line and column of an offset, both from 1."""
        return self.lines(source).position(min(max(offset, 0), len(source.text)))

    def address(self, span: Span) -> str:
        """Give the place as `path:line:column`, the form that editors and terminals jump to."""
        line, column = self.position(span.source, span.start)
        return f"{span.source.name}:{line}:{column}"
