"""Headings and addresses within a page: the same for links, navigation and both editions' pages."""

from __future__ import annotations

import re
import unicodedata
from typing import TYPE_CHECKING

from watchglass.read import syntax

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

_NOT_WORD = re.compile(r"[^a-z0-9]+")
HIDDEN = frozenset(("instructor", "answer"))


def plain(inlines: Iterable[syntax.Inline]) -> str:
    """Give the words of inlines without their dress; a mark gives its own text where it has words."""
    words = []
    for inline in inlines:
        match inline:
            case syntax.Text(text, _) | syntax.CodeText(text, _):
                words.append(text)
            case syntax.Break():
                words.append(" ")
            case syntax.Emphasis(_, children, _) | syntax.Link(children, _, _, _):
                words.append(plain(children))
            case syntax.Image(alt, _, _, _):
                words.append(alt)
            case syntax.Marked(children, _, mark, _):
                words.append(plain(children) if children is not None else mark.text.strip("{}"))
    return "".join(words).strip()


def slug(text: str) -> str:
    """Turn a heading's words into an address: plain letters, digits and hyphens."""
    decomposed = unicodedata.normalize("NFKD", text.lower())
    letters = "".join(c for c in decomposed if not unicodedata.combining(c))
    return _NOT_WORD.sub("-", letters).strip("-") or "part"


def headings(
    blocks: Iterable[syntax.Block], *, hidden: bool
) -> Iterator[tuple[syntax.Heading, str]]:
    """Give the headings with their addresses, in reading order.

    Args:
        blocks: The body.
        hidden: Whether those in instructors' blocks count too: addresses are made per edition, so
            that a hidden heading leaves no trace in the other's.
    """
    taken: dict[str, int] = {}
    for heading in _headings(blocks, hidden=hidden):
        base = slug(plain(heading.children))
        if re.fullmatch(r"step-\d+", base):
            base = f"part-{base}"
        count = taken.get(base, 0)
        taken[base] = count + 1
        yield heading, base if not count else f"{base}-{count + 1}"


def _headings(blocks: Iterable[syntax.Block], *, hidden: bool) -> Iterator[syntax.Heading]:
    for block in blocks:
        match block:
            case syntax.Heading():
                yield block
            case syntax.Fenced(kind, _, _, children, _, _):
                if hidden or kind not in HIDDEN:
                    yield from _headings(children, hidden=hidden)
            case syntax.Quote(children, _):
                yield from _headings(children, hidden=hidden)
            case syntax.Steps(items, _):
                for item in items:
                    yield from _headings(item.children, hidden=hidden)
            case syntax.ListBlock(_, items, _):
                for children in items:
                    yield from _headings(children, hidden=hidden)
            case _:
                pass


def steps(blocks: Iterable[syntax.Block]) -> Iterator[int]:
    """Give the numbers of all steps."""
    for block in blocks:
        match block:
            case syntax.Steps(items, _):
                yield from (item.number for item in items)
            case syntax.Fenced(_, _, _, children, _, _):
                yield from steps(children)
            case _:
                pass


def anchors(blocks: tuple[syntax.Block, ...]) -> frozenset[str]:
    """Give every address within a page that a link may name: of steps, and of headings all see."""
    names = {f"step-{number}" for number in steps(blocks)}
    names.update(address for _, address in headings(blocks, hidden=False))
    return frozenset(names)
