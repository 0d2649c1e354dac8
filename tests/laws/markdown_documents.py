"""Made-up documents full of marks, and the laws that any reading of Markdown must keep."""

from __future__ import annotations

import re
from itertools import count
from typing import TYPE_CHECKING

from read.markdown_trees import groups, inside, read, walk
from watchglass.read import syntax

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator
    from random import Random

    from read.markdown_trees import Node, Reading
    from watchglass.base.findings import Finding
    from watchglass.base.spans import Source

_WORDS = (
    "wash", "the", "é🧪", "µL", "*x*", "**b**", "_u_", "`c`", "`{c}`", "\\{", "\\}", "&amp;", "&#956;",
    "[l](u)", "[l](u 't')", "![i](u)", "\\|", '"q"', "3.", "-", "+", "#", ">", "\t", "~", "<b>", "*",
    "**", "_", "[", "]", "a*b*c", "<http://e.x/y>", "\\", "5 °C", "\u00a0", "[d]", "!", "(", ")",
)  # fmt: skip
# HTML, which is off here; bars, which may make a table; blanks that some take for the end of a
# paragraph; a backslash that would escape a mark; signs that begin a block by accident, of which
# no two readers make the same at odd indents.
_DISPUTED = ("<b>", "\\|", "\u00a0", "\t", "\\", ">", "-", "+", "*", "#", "3.")
_MARK = re.compile(r"\{@\d+\}")


class Maker:
    """Makes documents out of chance; each mark in one bears its own number.

    Attributes:
        common: True where only what all readers of CommonMark agree on is wanted: no tables, no
            `:::` blocks, no half marks, no tabs, no `>` without a blank, no lazy lines.
    """

    def __init__(self, chance: Random, *, common: bool = False) -> None:
        self.chance = chance
        self.common = common
        self.vocabulary = [w for w in _WORDS if w not in _DISPUTED] if common else _WORDS
        self.numbers = count()

    def document(self) -> str:
        """Make a document of a few blocks."""
        self.numbers = count()
        chance = self.chance
        lines: list[str] = []
        for _ in range(chance.randint(1, 5)):
            lines += [*self.block(0), *([""] if chance.random() < 0.8 else [])]
        if chance.random() < 0.1:
            lines += ["", "[d]: /there 'a title'"]
        text = "\n".join(lines)
        return text.replace("\n", "\r\n") if chance.random() < 0.2 else text

    def words(self, most: int) -> str:
        """Make a few words, two in five of them marks."""
        chance = self.chance
        parts = []
        for _ in range(chance.randint(1, most)):
            draw = chance.random()
            if draw < 0.3:
                parts.append(self.mark())
            elif draw < 0.4:
                parts.append(f"[{chance.choice(self.vocabulary)} *w*]{self.mark()}")
            elif draw < 0.42 and not self.common:
                parts.append(chance.choice(("{", "}", "{{", "{a", "b}", '{"}', "{x|y}")))
            else:
                parts.append(chance.choice(self.vocabulary))
        return chance.choice((" ", " ", "")).join(parts)

    def mark(self) -> str:
        return f"{{@{next(self.numbers)}}}"

    def paragraph(self) -> list[str]:
        chance = self.chance
        return [
            " " * (chance.choice((0, 0, 1, 3, 5)) if line else chance.choice((0, 0, 0, 2)))
            + self.words(5)
            + chance.choice(("", "", "  ", "\\", " "))
            for line in range(chance.randint(1, 3))
        ]

    def block(self, depth: int) -> list[str]:
        """Make a block, perhaps with others in it."""
        draw = self.chance.random()
        if draw < 0.3 or depth > (1 if self.common else 3):
            return self.paragraph()
        if draw < 0.5:
            return self.items(depth)
        if draw < 0.65:
            quoted = self.block(depth + 1)
            sign = self.chance.choice(("> ",) if self.common else ("> ", "> ", ">", ">\t"))
            lazy = 0 if self.common else 0.07
            return [line if self.chance.random() < lazy else sign + line for line in quoted]
        if draw < 0.77:
            return self.paragraph() if self.common else self.table()
        if draw < 0.83:
            signs = "#" * self.chance.randint(1, 6) + " " * self.chance.randint(1, 3)
            return [signs + self.words(4) + self.chance.choice(("", " ##", "  "))]
        if draw < 0.88:
            return [*self.paragraph(), self.chance.choice(("===", "---"))]
        if draw < 0.91:
            return ["```", *self.paragraph(), "```"]
        if draw < 0.93:
            return ["", *("    " + line for line in self.paragraph()), ""]
        return self.fence(depth)

    def fence(self, depth: int) -> list[str]:
        if self.common:
            return ["***"]
        kind = self.chance.choice(("question", "caution", "record 3 rows", "if dry", "other"))
        end = [":::"] if self.chance.random() < 0.93 else []
        return [f":::{kind}", *self.block(depth + 1), *end]

    def items(self, depth: int) -> list[str]:
        chance = self.chance
        signs = ("- ", "* ", "1. ", "12) ")
        sign = chance.choice(signs if self.common else (*signs, "-   ", "-\t"))
        indent = "\t" if "\t" in sign else " " * len(sign)
        lines: list[str] = []
        for _ in range(chance.randint(1, 3)):
            block = self.block(depth + 1)
            if chance.random() < 0.5:
                block += ["", *self.block(depth + 1)]
            lines.append(sign + block[0])
            for line in block[1:]:
                kept = self.common or chance.random() < 0.93
                lines.append((indent + line if line else line) if kept else line.lstrip())
            if chance.random() < 0.3:
                lines.append("")
        return lines

    def table(self) -> list[str]:
        chance = self.chance
        columns = chance.randint(1, 3)

        def row(cells: int) -> str:
            middle = " | ".join(self.words(3) for _ in range(cells))
            return "| " + middle + chance.choice((" |", ""))

        head = [row(columns), "|" + "---|" * columns]
        body = [
            row(chance.choice((columns, columns, columns + 1, columns - 1 or 1)))
            for _ in range(chance.randint(1, 3))
        ]
        return [*head, *body]


def faults(text: str) -> list[str]:
    """Read a text and give every way in which the reading breaks a law."""
    source, blocks, findings = read(text)
    found = list(_badly_placed(source, blocks))
    found += _badly_nested(blocks)
    found += _unaccounted(source, blocks, findings)
    found += [
        f"{f.code.name} has no help, or lies outside the file"
        for f in findings
        if not f.help or not 0 <= f.span.start <= f.span.end <= len(source.text)
    ]
    starts = [f.span.start for f in findings]
    return found if starts == sorted(starts) else [*found, "findings are not in order of place"]


def marks_read(reading: Reading) -> list[str]:
    """Give the marks of a reading, as they stand in the file, in order."""
    return [node.mark.text for node in walk(reading[1]) if isinstance(node, syntax.Marked)]


def _badly_placed(source: Source, blocks: Iterable[Node]) -> Iterator[str]:
    """Give nodes whose span does not hold what they say."""
    for node in walk(blocks):
        there = node.span.text
        match node:
            case syntax.Text() if there[:1] == "&" and there[-1:] == ";":
                pass
            case syntax.Text() if node.text != there.replace("\0", "\ufffd"):
                yield f"text {node.text!r} is said to stand at {there!r}"
            case syntax.Marked() if node.mark.text[:1] + node.mark.text[-1:] != "{}":
                yield f"a mark is said to stand at {node.mark.text!r}"
            case syntax.Marked() if not inside(node.mark, node.span):
                yield f"a mark stands outside its node {there!r}"
            case syntax.Emphasis() if there[:1] != there[-1:] or there[:1] not in ("*", "_"):
                yield f"emphasis is said to stand at {there!r}"
            case syntax.CodeText() if there[:1] + there[-1:] != "``":
                yield f"code is said to stand at {there!r}"
            case syntax.Step() if not re.fullmatch(r"\d+[.)]", node.number_span.text):
                yield f"a step's number is said to stand at {node.number_span.text!r}"
            case _:
                pass
        if not 0 <= node.span.start <= node.span.end <= len(source.text):
            yield f"{type(node).__name__} lies outside the file"


def _badly_nested(nodes: Iterable[Node], outer: Node | None = None) -> Iterator[str]:
    """Give nodes that lie outside what holds them, or before the node before them."""
    after = -1
    for node in nodes:
        if outer is not None and not inside(node.span, outer.span):
            yield f"{node.span.text!r} lies outside {outer.span.text!r}"
        if node.span.start < after:
            yield f"{node.span.text!r} overlaps what stands before it"
        after = node.span.end
        for group in groups(node):
            yield from _badly_nested(group, node)


def _unaccounted(
    source: Source, blocks: Iterable[Node], findings: Iterable[Finding]
) -> Iterator[str]:
    """Give each `{` that was neither read, nor reported, nor escaped, nor code."""
    known = bytearray(len(source.text) + 1)
    for node in walk(blocks):
        match node:
            case syntax.Marked():
                spans = [node.mark]
            case syntax.CodeText() | syntax.CodeBlock():
                spans = [node.span]
            case _:
                spans = []
        for span in spans:
            known[span.start : span.end] = b"x" * (span.end - span.start)
    for finding in findings:
        span = finding.span
        known[span.start : span.end] = b"x" * (span.end - span.start)
    for found in re.finditer(r"\\.|\{", source.text, re.DOTALL):
        if found[0] == "{" and not known[found.start()]:
            yield f"the brace at {found.start()} was lost: {source.text[found.start() :][:20]!r}"


def wrong_marks(text: str) -> tuple[int, list[str]]:
    """Count the numbered marks read in a text, and give those at a wrong place, doubled or lost."""
    reading = read(text)
    read_marks = [mark for mark in marks_read(reading) if "@" in mark and '"' not in mark]
    wrong = [mark for mark in read_marks if not _MARK.fullmatch(mark)]
    if len(set(read_marks)) != len(read_marks):
        wrong.append("a mark was read twice")
    numbers = [int(mark[2:-1]) for mark in read_marks if _MARK.fullmatch(mark)]
    if numbers != sorted(numbers):
        wrong.append("marks are out of order")
    return len(read_marks), wrong
