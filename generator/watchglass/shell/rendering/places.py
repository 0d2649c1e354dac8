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

    __slots__ = ("_tables",)

    def __init__(self) -> None:
        """Begin with none."""
        self._tables: dict[Source, Lines] = {}

    def lines(self, source: Source) -> Lines:
        """Give the line table of a source."""
        table = self._tables.get(source)
        if table is None:
            table = self._tables[source] = Lines(source.text)
        return table

    def position(self, source: Source, offset: int) -> Position:
        """Give line and column of an offset, both from 1."""
        return self.lines(source).position(min(max(offset, 0), len(source.text)))

    def address(self, span: Span) -> str:
        """Give the place as `path:line:column`, the form that editors and terminals jump to."""
        line, column = self.position(span.source, span.start)
        return f"{span.source.name}:{line}:{column}"
