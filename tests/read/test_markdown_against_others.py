"""Our reading beside two others: markdown-it's own reading of running text, and marko's of blocks."""

from __future__ import annotations

import re
from functools import cache
from random import Random
from typing import TYPE_CHECKING, Any

import pytest
from markdown_it import MarkdownIt
from marko import Markdown

from laws.markdown_documents import Maker
from read.markdown_trees import groups, read
from watchglass.read import syntax

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from markdown_it.token import Token

    from read.markdown_trees import Node

_PIECES = (
    "*", "**", "***", "_", "__", "a", "b c", " ", "\n", "  \n", "\\\n", "\\", "\\*", "`", "``", "`d`",
    "[", "]", "](u)", "](<u v> 't')", "![i `c`](u)", "!", "[x]", "[x][]", "][x]", "(", ")", "&amp;", "&bad;",
    "&#0;", "&#x1F600;", "<", "<http://e.x/*>", "<a@b.c>", "é", "🧪", "“", "\u00a0", ".", "£",
    "[l](u)", "](javascript:x)", '](u "t)', "]()", "\t",
)  # fmt: skip


# Where CommonMark's own reader sides with us: markdown-it takes a blank after a backslash for
# escaped and misses the hard break, and gives up a short reference before `(` or `[` even where
# neither address nor label follows.
_DISPUTED = re.compile(r"\\ +\n|\[x\]\(|\]\[[^\]]*\[")


@cache
def _markdown_it() -> MarkdownIt:
    engine = MarkdownIt("commonmark", {"maxNesting": 200}).enable("table")
    return engine.disable(["html_block", "html_inline"])


def _theirs(tokens: Iterable[Token]) -> Iterator[str]:
    for token in tokens:
        match token.type:
            case "text" | "text_special":
                yield token.content
            case "code_inline":
                # markdown-it leaves the indent of a line in code; CommonMark's reader does not.
                yield f"<code {' '.join(token.content.split())}>"
            case "softbreak":
                yield "<line>"
            case "hardbreak":
                yield "<break>"
            case "image":
                yield f"<image {_alt(token.children or ())}>"
            case "link_open":
                yield f"<link {token.attrs.get('title', '')}>"
            case _:
                yield f"<{token.type}>".replace("_open", "").replace("_close", " end")


def _alt(tokens: Iterable[Token]) -> str:
    return "".join(
        _alt(token.children or ())
        if token.type == "image"
        else {"softbreak": " ", "hardbreak": "\n"}.get(token.type, token.content)
        for token in tokens
    )


def _ours(nodes: Iterable[syntax.Inline]) -> Iterator[str]:
    for node in nodes:
        match node:
            case syntax.Text():
                yield node.text
            case syntax.CodeText():
                yield f"<code {' '.join(node.text.split())}>"
            case syntax.Break():
                yield "<break>" if node.hard else "<line>"
            case syntax.Image():
                yield f"<image {node.alt}>"
            case syntax.Link():
                yield f"<link {node.title}>"
                yield from _ours(node.children)
                yield "<link end>"
            case syntax.Emphasis():
                kind = "strong" if node.strong else "em"
                yield f"<{kind}>"
                yield from _ours(node.children)
                yield f"<{kind} end>"
            case syntax.Marked():
                yield node.mark.text


@pytest.mark.parametrize("seed", range(40))
def test_running_text_reads_as_markdown_it_reads_it(seed: int) -> None:
    chance = Random(seed)  # noqa: S311 - test material
    for _ in range(50):
        words = "".join(chance.choice(_PIECES) for _ in range(chance.randint(1, 14)))
        text = f"start {words} end\n\n[x]: /there 'title'\n"
        if _DISPUTED.search(text):
            continue
        tokens = _markdown_it().parse(text)
        if tokens[0].type != "paragraph_open" or len(read(text)[1]) != 1:
            continue
        _, (paragraph,), _ = read(text)

        assert isinstance(paragraph, syntax.Paragraph)
        ours = "".join(_ours(paragraph.children))
        assert ours == "".join(_theirs(tokens[1].children or ())), repr(text)


_KINDS = {"Quote": "quote", "List": "list", "Heading": "heading", "SetextHeading": "heading"}
_KINDS |= {"ListBlock": "list", "Steps": "list", "CodeBlock": "code"}
_KINDS |= {"FencedCode": "code", "CodeText": "code", "CodeSpan": "code"}
_NUMBERED = re.compile(r"\{@\d+\}")


def _placed_by_marko(element: Any, around: tuple[str, ...] = ()) -> Iterator[tuple[str, ...]]:
    name = type(element).__name__
    around = (*around, _KINDS[name]) if name in _KINDS else around
    children = element.children if hasattr(element, "children") else ()
    if isinstance(children, str):
        for mark in _NUMBERED.findall(children):
            yield (*around, mark)
        return
    for child in children:
        yield from _placed_by_marko(child, around)


def _placed_by_us(nodes: Iterable[Node], around: tuple[str, ...] = ()) -> Iterator[tuple[str, ...]]:
    for node in nodes:
        name = type(node).__name__
        inner = (*around, _KINDS[name]) if name in _KINDS else around
        match node:
            case syntax.Marked():
                for group in groups(node):
                    yield from _placed_by_us(group, inner)
                yield (*inner, node.mark.text)
            case syntax.CodeText() | syntax.CodeBlock() | syntax.Text():
                for mark in _NUMBERED.findall(node.text):
                    yield (*inner, mark)
            case _:
                for group in groups(node):
                    yield from _placed_by_us(group, inner)


@pytest.mark.parametrize("seed", range(60))
def test_marks_land_in_the_blocks_where_marko_finds_them(seed: int) -> None:
    maker = Maker(Random(seed), common=True)  # noqa: S311 - test material
    for _ in range(5):
        text = maker.document()
        ours = sorted(_placed_by_us(read(text)[1]), key=lambda place: place[-1])
        theirs = sorted(_placed_by_marko(Markdown().parse(text)), key=lambda place: place[-1])

        assert ours == theirs, text
