"""Cards: the small digest of a page that set checks, lists and navigation need."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base.yaml import YamlText
from watchglass.read import syntax
from watchglass.resolve.model import Continued
from watchglass.resolve.outline import HIDDEN, anchors, plain

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.base.spans import Span
    from watchglass.resolve.model import Procedure


class LinkOut(NamedTuple):
    """A link in a page: its target as written, its place, and whether only instructors see it."""

    target: str
    span: Span
    hidden: bool


class Card(NamedTuple):
    """The small digest of one page that set checks and lists need.

    Attributes:
        path: Path of its source within the set.
        kind: `procedure` or `page`.
        title: Its title.
        code: Its code; empty for pages.
        code_span: Where the code stands.
        after: Codes it says come before it, with places.
        continues: Codes of procedures whose product it takes up, with places.
        anchors: Addresses within it that links may name.
        links: Links to other pages and pictures.
    """

    path: str
    kind: str
    title: str
    code: str = ""
    code_span: Span | None = None
    after: tuple[tuple[str, Span], ...] = ()
    continues: tuple[tuple[str, Span], ...] = ()
    anchors: frozenset[str] = frozenset()
    links: tuple[LinkOut, ...] = ()


def procedure_card(path: str, procedure: Procedure) -> Card:
    """Make the card of a procedure."""
    head, body = procedure.head, procedure.syntax.body
    return Card(
        path=path,
        kind="procedure",
        title=head.title,
        code=head.code,
        code_span=head.code_span,
        after=head.after,
        continues=tuple(
            (material.composition.code, material.value_span)
            for material in procedure.materials.values()
            if isinstance(material.composition, Continued)
        ),
        anchors=anchors(body),
        links=tuple(_links(body)),
    )


def page_card(path: str, page: syntax.ProcedureSyntax) -> Card:
    """Make the card of an ordinary page; its title is its front matter's, or its first heading."""
    return Card(
        path=path,
        kind="page",
        title=page_title(path, page),
        anchors=anchors(page.body),
        links=tuple(_links(page.body)),
    )


def page_title(path: str, page: syntax.ProcedureSyntax) -> str:
    """Give an ordinary page's title: declared, or its first heading, or its file's name."""
    declared = page.front.get("title") if page.front else None
    if isinstance(declared, YamlText) and declared.text:
        return declared.text
    first = next((b for b in page.body if isinstance(b, syntax.Heading)), None)
    if first is not None:
        return plain(first.children)
    return path.rpartition("/")[2].removesuffix(".md").replace("-", " ").capitalize()


def _links(blocks: Iterable[syntax.Block], *, hidden: bool = False) -> Iterator[LinkOut]:
    for block in blocks:
        match block:
            case syntax.Paragraph(children, _) | syntax.Heading(_, children, _):
                yield from _inline_links(children, hidden=hidden)
            case syntax.Steps(items, _):
                for item in items:
                    yield from _links(item.children, hidden=hidden)
            case syntax.ListBlock(_, items, _):
                for inner in items:
                    yield from _links(inner, hidden=hidden)
            case syntax.Quote(inner, _):
                yield from _links(inner, hidden=hidden)
            case syntax.Fenced():
                yield from _links(block.children, hidden=hidden or block.kind in HIDDEN)
            case syntax.Table():
                for row in (block.head, *block.rows):
                    for cell in row:
                        yield from _inline_links(cell.children, hidden=hidden)
            case syntax.CodeBlock() | syntax.Rule():
                pass


def _inline_links(inlines: Iterable[syntax.Inline], *, hidden: bool) -> Iterator[LinkOut]:
    for inline in inlines:
        match inline:
            case syntax.Link(children, target, _, span):
                yield LinkOut(target=target, span=span, hidden=hidden)
                yield from _inline_links(children, hidden=hidden)
            case syntax.Image(_, target, _, span):
                yield LinkOut(target=target, span=span, hidden=hidden)
            case syntax.Emphasis(_, children, _):
                yield from _inline_links(children, hidden=hidden)
            case syntax.Marked(words, _, _, _) if words is not None:
                yield from _inline_links(words, hidden=hidden)
            case _:
                pass
