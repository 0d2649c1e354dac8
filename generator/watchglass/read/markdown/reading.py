"""What is kept while the blocks of one file are found: places, open `:::` blocks, findings."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from markdown_it.rules_block import StateBlock

if TYPE_CHECKING:
    from markdown_it import MarkdownIt

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Source, Span
    from watchglass.read.markdown.prose import Prose


@dataclass(slots=True)
class OpenFence:
    """A `:::` block whose inside is being read.

    Attributes:
        level: markdown-it's level of what stands directly in it.
        closed: Line of the `:::` that closes it, once that is met.
    """

    level: int
    closed: int | None = None


@dataclass(frozen=True, slots=True)
class FenceLine:
    """The line that opens a `:::` block: its kind, what stands after it, and their places."""

    kind: Span
    argument: Span
    opening: Span


@dataclass(slots=True)
class Notes:
    """What markdown-it's tokens do not tell, by the number of the token.

    Attributes:
        starts: Offset at which the block begins, in the text that is parsed.
        prose: The running text of an `inline` token.
        fences: The line of a `fenced_open` token.
        ends: Offset at which a `:::` block ends, of its `fenced_open` token.
    """

    starts: dict[int, int] = field(default_factory=dict)
    prose: dict[int, Prose] = field(default_factory=dict)
    fences: dict[int, FenceLine] = field(default_factory=dict)
    ends: dict[int, int] = field(default_factory=dict)


class BlockReading(StateBlock):
    """markdown-it's state, with ours.

    Attributes:
        source: The file.
        shift: Offset in it at which the parsed text begins.
        depth: How many loops are at work: 1 outside every list, quote and `:::` block.
        open: The `:::` blocks being read, innermost last.
        refused: How many `:::` blocks opened beyond the bound and are not yet closed.
        strays: Each `:::` that closed nothing.
        unclosed: Opening line of each block that was never closed.
        too_deep: True once blocks nested too deeply, which is reported once.
    """

    def __init__(self, text: str, md: MarkdownIt, source: Source, shift: int) -> None:
        """Make ready to read `text`, which is the source from offset `shift` on."""
        super().__init__(text, md, {}, [])
        self.source = source
        self.shift = shift
        self.notes = Notes()
        self.findings: list[Finding] = []
        self.depth = 0
        self.open: list[OpenFence] = []
        self.refused = 0
        self.strays: list[Span] = []
        self.unclosed: list[Span] = []
        self.too_deep = False

    def start_of(self, line: int) -> int:
        """Give where a line's words begin, as the lists and quotes being read see it."""
        return self.bMarks[line] + self.tShift[line]

    def span(self, start: int, end: int) -> Span:
        """Give the span in the file of a stretch of the parsed text."""
        return self.source.span(start + self.shift, end + self.shift)
