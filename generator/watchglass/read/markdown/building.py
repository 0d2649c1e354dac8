"""Building nodes from the items of a passage, once it is known what its delimiters mean."""

from __future__ import annotations

from bisect import bisect_left, bisect_right
from typing import TYPE_CHECKING, Protocol

from watchglass.read import syntax
from watchglass.read.markdown.emphasis import Run

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.base.spans import Span
    from watchglass.read.markdown.prose import Prose


class Opener:
    """An opening bracket; plain text for as long as nothing closes it.

    Attributes:
        start: Position of the bracket, or of the `!` before it.
        after: Position after it.
        index: Its place among the items.
        run: The last run of delimiters before it.
        findings: How many findings there were when it was met.
        inner: True once another bracket opened after it.
    """

    __slots__ = ("after", "findings", "index", "inner", "run", "start")

    def __init__(self, start: int, after: int, index: int, run: Run | None, findings: int) -> None:
        """Note a bracket."""
        self.start, self.after, self.index, self.run = start, after, index, run
        self.findings = findings
        self.inner = False

    @property
    def image(self) -> bool:
        """True for `![`."""
        return self.after - self.start > 1


class Built:
    """A node that holds others, with how deep they nest in it, itself counted."""

    __slots__ = ("depth", "node")

    def __init__(self, node: syntax.Inline, depth: int) -> None:
        """Keep a node."""
        self.node, self.depth = node, depth


Item = tuple[int, int] | Run | Opener | Built | syntax.Inline


class Passage(Protocol):
    """What the builder needs to know of the passage."""

    text: str
    prose: Prose

    def span(self, start: int, end: int) -> Span:
        """Give the span in the file of a stretch of the passage."""
        ...

    def too_deep(self, depth: int, start: int, end: int) -> bool:
        """Tell, and report, that a node of this depth is one too many."""
        ...


def build(items: Iterable[Item], passage: Passage) -> tuple[tuple[syntax.Inline, ...], int]:
    """Build nodes from items; give them and how deep they nest (text alone: 0)."""
    builder = _Builder(passage)
    for item in items:
        if type(item) is tuple:
            builder.plain(*item)
        elif type(item) is Run:
            builder.run(item)
        elif type(item) is Opener:
            builder.plain(item.start, item.after)
        elif type(item) is Built:
            builder.node(item.node, item.depth)
        else:
            builder.node(item, 0)  # type: ignore[arg-type] # what is left is a node
    builder.flush()
    return tuple(builder.nodes), builder.depth


class _Builder:
    __slots__ = ("depth", "end", "nodes", "passage", "stack", "start")

    def __init__(self, passage: Passage) -> None:
        self.passage = passage
        self.nodes: list[syntax.Inline] = []
        self.depth = 0
        # The stretch of plain text not yet made a node.
        self.start = self.end = -1
        # Open emphasis: its position, its place among the nodes, the depth around it.
        self.stack: list[tuple[int, int, int]] = []

    def plain(self, start: int, end: int) -> None:
        if start == self.end:
            self.end = end
            return
        if self.end > self.start:
            self.flush()
        self.start, self.end = start, end

    def node(self, node: syntax.Inline, depth: int) -> None:
        if self.end > self.start:
            self.flush()
        self.nodes.append(node)
        self.depth = max(self.depth, depth)

    def flush(self) -> None:
        """Make the waiting text nodes: one, or one for each piece where the file has a gap."""
        start, end = self.start, self.end
        self.start = self.end = -1
        if end <= start:
            return
        starts = self.passage.prose.starts
        if len(starts) > 1:
            for piece in starts[bisect_right(starts, start) : bisect_left(starts, end)]:
                self.add_text(start, piece)
                start = piece
        self.add_text(start, end)

    def add_text(self, start: int, end: int) -> None:
        passage = self.passage
        self.nodes.append(syntax.Text(passage.text[start:end], passage.span(start, end)))

    def run(self, run: Run) -> None:
        for start, width in run.closings:
            self.close(start, width)
        if run.end > run.start:
            self.plain(run.start, run.end)
        for start, width in reversed(run.openings):
            self.flush()
            self.stack.append((start, len(self.nodes), self.depth))
            # Keeps the place for the node, or for the delimiter where it may not be one.
            self.nodes.append(syntax.Text("", self.passage.span(start, start + width)))
            self.depth = 0

    def close(self, at: int, width: int) -> None:
        self.flush()
        start, place, around = self.stack.pop()
        passage = self.passage
        if passage.too_deep(self.depth + 1, start, at + width):
            opening = passage.span(start, start + width)
            self.nodes[place] = syntax.Text(opening.text, opening)
            self.add_text(at, at + width)
            self.depth = max(around, self.depth)
            return
        children = tuple(self.nodes[place + 1 :])
        span = passage.span(start, at + width)
        self.nodes[place:] = [syntax.Emphasis(width > 1, children, span)]
        self.depth = max(around, self.depth + 1)


def plain_text(nodes: Iterable[syntax.Inline]) -> str:
    """Give the words of nodes, without what they are dressed in."""
    return "".join(map(_words, nodes))


def _words(node: syntax.Inline) -> str:
    match node:
        case syntax.Text() | syntax.CodeText():
            return node.text
        case syntax.Break():
            return "\n" if node.hard else " "
        case syntax.Emphasis() | syntax.Link():
            return plain_text(node.children)
        case syntax.Image():
            return node.alt
        case syntax.Marked():
            return node.mark.text if node.words is None else plain_text(node.words)
