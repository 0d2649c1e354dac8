"""What tests of reading Markdown share: a stand-in for the reader of marks, and trees as text."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base.spans import Lines, Source
from watchglass.read import syntax
from watchglass.read.markdown import read_body

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Span

Node = syntax.Block | syntax.Inline | syntax.Step | syntax.Cell
Reading = tuple[Source, tuple[syntax.Block, ...], tuple["Finding", ...]]


def stand_in(
    source: Source, start: int, end: int
) -> tuple[tuple[syntax.Act, ...], tuple[Finding, ...]]:
    """Read any mark as one act that covers what stands between its braces."""
    return (syntax.BrokenAct(source.span(start, end)),), ()


def read(text: str, *, start: int = 0, ordinary: bool = False) -> Reading:
    """Read Markdown with the stand-in."""
    source = Source.of("procedures/t-01.md", text)
    blocks, _, findings = read_body(source, start, stand_in, ordinary=ordinary)
    return source, blocks, findings


def places(text: str) -> list[str]:
    """Give the findings of a text as `line:column name text`."""
    source, _, findings = read(text)
    lines = Lines(source.text)
    return [
        "{}:{} {} {}".format(*lines.position(f.span.start), f.code.name, f.span.text)
        for f in findings
    ]


def outline(text: str, *, ordinary: bool = False) -> list[str]:
    """Give the tree as lines: two blanks a level, kind, what it says, `line:column`, its source."""
    source, blocks, _ = read(text, ordinary=ordinary)
    lines = Lines(source.text)
    out: list[str] = []

    def put(nodes: Iterable[Node], depth: int) -> None:
        for node in nodes:
            line, column = lines.position(node.span.start)
            words = f"{'  ' * depth}{_title(node)} {line}:{column} {node.span.text!r}"
            out.append(words)
            for group in groups(node):
                put(group, depth + 1)

    put(blocks, 0)
    return out


def _title(node: Node) -> str:
    name = type(node).__name__
    match node:
        case syntax.Text() if node.text != node.span.text:
            return f"{name}({node.text!r})"
        case syntax.CodeText():
            return f"{name}({node.text!r})"
        case syntax.CodeBlock():
            return f"{name}({node.text!r}, {node.info!r})"
        case syntax.Emphasis() if node.strong:
            return "Strong"
        case syntax.Break() if node.hard:
            return "HardBreak"
        case syntax.Heading():
            return f"{name}({node.level})"
        case syntax.Link():
            return f"{name}({node.target!r}, {node.title!r})"
        case syntax.Image():
            return f"{name}({node.alt!r}, {node.target!r}, {node.title!r})"
        case syntax.Step():
            return f"{name}({node.number}, {node.number_span.text!r})"
        case syntax.ListBlock():
            return f"{name}({node.start})"
        case syntax.Fenced():
            return f"{name}({node.kind!r}, {node.argument!r})"
        case _:
            return name


def groups(node: Node) -> Iterator[tuple[Node, ...]]:
    """Give what stands in a node: one group for each item, row or run of children."""
    match node:
        case syntax.Steps():
            yield node.items
        case syntax.ListBlock():
            yield from node.items
        case syntax.Table():
            yield node.head
            yield from node.rows
        case syntax.Marked():
            yield node.words or ()
        case (
            syntax.Text() | syntax.Break() | syntax.CodeText() | syntax.Image()
            | syntax.CodeBlock() | syntax.Rule()
        ):  # fmt: skip
            pass
        case _:
            yield node.children


def walk(nodes: Iterable[Node]) -> Iterator[Node]:
    """Go through nodes and all they hold, in order."""
    for node in nodes:
        yield node
        for group in groups(node):
            yield from walk(group)


def inside(inner: Span, outer: Span) -> bool:
    """Tell whether a span lies within another."""
    return outer.start <= inner.start <= inner.end <= outer.end
