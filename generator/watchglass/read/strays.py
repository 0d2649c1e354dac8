"""What an author meant to hide and did not: blocks with too few colons, HTML comments and tags.

Both would be printed for students as they stand, so both are errors. Code between fences is left
alone: what stands there is meant to be seen.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.read import syntax

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.base.spans import Source, Span

_BLOCK = re.compile(
    r"^[ \t>]*(?:(?:\d+[.)]|[-*+])[ \t]+)*"
    r"(:+[ \t]*(?:instructor|answer|question|caution|before|record|charge|if)\b)",
    re.MULTILINE | re.IGNORECASE,
)
_HTML = re.compile(r"<!--|</?[A-Za-z][A-Za-z0-9-]*(?:\s[^<>]*)?/?>")


def strays(source: Source, start: int, blocks: tuple[syntax.Block, ...]) -> tuple[Finding, ...]:
    """Find what would be printed though its author meant it to be hidden."""
    text = source.text
    findings: list[Finding] = []
    if ":" in text:
        findings += _blocks(source, start, blocks)
    if "<" in text:
        for words in _texts(blocks):
            if "<" in words.text and (found := _HTML.search(words.text)):
                findings.append(_html(words.span.part(found.start(), found.end()), found[0]))
    return tuple(findings)


def _blocks(source: Source, start: int, blocks: tuple[syntax.Block, ...]) -> Iterator[Finding]:
    known: list[Span] = []
    for block in _all(blocks):
        if isinstance(block, syntax.Fenced):
            known.append(block.opening)
        elif isinstance(block, syntax.CodeBlock) and block.span.text.lstrip()[:3] in ("```", "~~~"):
            known.append(block.span)
    for found in _BLOCK.finditer(source.text, start):
        at, end = found.span(1)
        if any(span.start <= at < span.end for span in known):
            continue
        word = found[1].lstrip(": \t").lower()
        yield Finding(
            code=codes.BLOCK_UNKNOWN,
            span=source.span(at, end),
            message=f"`{found[1]}` opens no block: students would read it and what follows",
            help=f"begin the line with `:::{word}`, set in by fewer than four blanks",
        )


def _html(span: Span, found: str) -> Finding:
    comment = found == "<!--"
    return Finding(
        code=codes.HTML_NOT_READ,
        span=span,
        message="a comment of HTML is printed as it stands"
        if comment
        else f"`{found}` is printed as it stands: HTML is not read here",
        help="put a note to yourself into a `:::instructor` block, or after `#` in the front matter"
        if comment
        else "write `*word*` or `**word**` for emphasis, `\\<` for the sign itself",
    )


def _all(blocks: Iterable[syntax.Block]) -> Iterator[syntax.Block]:
    """Give every block, those within others after them."""
    for block in blocks:
        yield block
        match block:
            case syntax.Steps(items, _):
                for item in items:
                    yield from _all(item.children)
            case syntax.ListBlock(_, items, _):
                for children in items:
                    yield from _all(children)
            case syntax.Quote(children, _):
                yield from _all(children)
            case syntax.Fenced():
                yield from _all(block.children)
            case _:
                pass


def _texts(blocks: Iterable[syntax.Block]) -> Iterator[syntax.Text]:
    for block in _all(blocks):
        match block:
            case syntax.Paragraph(children, _) | syntax.Heading(_, children, _):
                yield from _words(children)
            case syntax.Table():
                for row in (block.head, *block.rows):
                    for cell in row:
                        yield from _words(cell.children)
            case _:
                pass


def _words(inlines: Iterable[syntax.Inline]) -> Iterator[syntax.Text]:
    for inline in inlines:
        match inline:
            case syntax.Text():
                yield inline
            case syntax.Emphasis(_, children, _) | syntax.Link(children, _, _, _):
                yield from _words(children)
            case syntax.Marked(words, _, _, _) if words is not None:
                yield from _words(words)
            case _:
                pass
