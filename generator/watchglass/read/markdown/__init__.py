"""Reading Markdown with marks into the syntax tree, each node with its exact place.

Two passes. `structure` lets markdown-it find the blocks and notes where each begins, which its
tokens do not tell; `inlines` reads what stands in a paragraph, heading or cell. The second pass is
our own: a mark decides what a bracket means, every brace must be accounted for, offsets fall out
of it for nothing, and it stays linear on text that is nothing but brackets. Tests compare it with
markdown-it's own reading.

markdown-it takes a while to import, so nothing of it is loaded before there is something to read.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.base.spans import Source

if TYPE_CHECKING:
    from watchglass.read.syntax import Act, Block

__all__ = ["MAX_CHARACTERS", "MarkReader", "read_body"]

#: Longest file that is read, in characters: some two hundred times a long procedure.
MAX_CHARACTERS = 1_000_000

MarkReader = Callable[[Source, int, int], "tuple[tuple[Act, ...], tuple[Finding, ...]]"]
"""Reads what stands between the braces: source, offset after `{`, offset of `}`."""


def read_body(
    source: Source, start: int, parse_mark: MarkReader, *, ordinary: bool = False
) -> tuple[tuple[Block, ...], int, tuple[Finding, ...]]:
    """Read the Markdown of a file. Never fails.

    Args:
        source: The file.
        start: Offset at which the body begins, after the front matter.
        parse_mark: Reads one mark.
        ordinary: True for a page that is no procedure: numbered lists are then no steps.

    Returns:
        The blocks, how many marks were read, and the findings in order of place. A file beyond
        `MAX_CHARACTERS` gives no blocks.
    """
    if len(source.text) > MAX_CHARACTERS:
        return (), 0, (_too_large(source, start),)
    from watchglass.read.markdown.document import read_document  # noqa: PLC0415 - loads markdown-it

    return read_document(source, start, parse_mark, ordinary=ordinary)


def _too_large(source: Source, start: int) -> Finding:
    end = source.text.find("\n", start)
    return Finding(
        code=codes.SOURCE_TOO_LARGE,
        span=source.span(start, len(source.text) if end < 0 else end),
        message=f"the file has {len(source.text)} characters; {MAX_CHARACTERS} are read",
        help="divide the procedure into several files",
    )
