"""From blocks found and passages read to the tree of a file."""

from __future__ import annotations

from typing import TYPE_CHECKING, cast

from markdown_it.common.utils import unescapeAll

from watchglass.read import syntax
from watchglass.read.markdown.braces import MARK
from watchglass.read.markdown.fences import check_line
from watchglass.read.markdown.inlines import InlineReader
from watchglass.read.markdown.messages import KINDS, mark_lost
from watchglass.read.markdown.steps import StepCounter
from watchglass.read.markdown.structure import read_structure

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Source, Span
    from watchglass.read.markdown import MarkReader
    from watchglass.read.markdown.reading import BlockReading

#: Stands among the kinds around a block where a numbered list is a list of steps.
_BODY = "body"


def read_document(
    source: Source, start: int, parse_mark: MarkReader, *, ordinary: bool
) -> tuple[tuple[syntax.Block, ...], int, tuple[Finding, ...]]:
    """Read a body of bearable size; see `watchglass.read.markdown.read_body`."""
    reading = read_structure(source, start)
    references = cast("Mapping[str, Mapping[str, str]]", reading.env.get("references", {}))
    reader = InlineReader(source, parse_mark, references)
    tree = _Tree(reading, reader, ordinary=ordinary)
    blocks = tree.until("", (_BODY,))
    found = [*reading.findings, *reader.findings, *tree.findings, *tree.steps.findings]
    found.sort(key=lambda finding: finding.span.start)
    return tuple(blocks), reader.marks, tuple(found)


class _Tree:
    """Goes through the tokens once and builds a node for each block.

    Attributes:
        at: Number of the token to look at next.
        findings: What was found about `:::` lines and indented code.
        steps: Counts the steps of the whole procedure.
    """

    def __init__(self, reading: BlockReading, reader: InlineReader, *, ordinary: bool) -> None:
        self.reading = reading
        self.reader = reader
        self.ordinary = ordinary
        self.at = 0
        self.findings: list[Finding] = []
        self.steps = StepCounter()

    def until(self, closing: str, around: tuple[str, ...]) -> list[syntax.Block]:
        """Build blocks up to the token of type `closing`, and pass it.

        Args:
            closing: Type of the token; empty for the end.
            around: Kinds of the `:::` blocks around, innermost last; "" for a list or quote.
        """
        tokens = self.reading.tokens
        blocks: list[syntax.Block] = []
        while self.at < len(tokens) and (kind := tokens[self.at].type) != closing:
            number = self.at
            self.at += 1
            if kind == "fenced_open":
                blocks.extend(self.fenced(number, around))
            else:
                blocks.append(self.block(kind, number, around))
        self.at += 1
        return blocks

    def block(self, kind: str, number: int, around: tuple[str, ...]) -> syntax.Block:
        """Build the block that begins with token `number`, of type `kind`."""
        match kind:
            case "paragraph_open":
                return syntax.Paragraph(self.inline(), self.lines(number))
            case "heading_open":
                level = int(self.reading.tokens[number].tag[1:])
                return syntax.Heading(level, self.inline(), self.lines(number))
            case "ordered_list_open" if around[-1] in (_BODY, "if") and not self.ordinary:
                return self.step_list(around)
            case "ordered_list_open" | "bullet_list_open":
                return self.plain_list(around)
            case "blockquote_open":
                children = self.until("blockquote_close", (*around, ""))
                return syntax.Quote(tuple(children), self.over(number, 1, children))
            case "table_open":
                return self.table(number)
            case "fence" | "code_block":
                return self.code(number)
            case _:
                return syntax.Rule(self.lines(number))

    # -- places --------------------------------------------------------------------------------

    def lines(self, number: int) -> Span:
        """Give the span of a block that ends with its last line, without blanks after it."""
        reading = self.reading
        start = reading.notes.starts[number]
        lines = reading.tokens[number].map
        end = reading.eMarks[lines[1] - 1] if lines else start
        return reading.span(start, max(start, start + len(reading.src[start:end].rstrip(" \t\n"))))

    def over(self, number: int, width: int, children: list[syntax.Block]) -> Span:
        """Give the span from a block's sign, `width` long, to the end of what it holds."""
        reading = self.reading
        start = reading.notes.starts[number]
        end = start + width + reading.shift
        if children:
            end = max(end, children[-1].span.end)
        return reading.source.span(start + reading.shift, end)

    # -- blocks --------------------------------------------------------------------------------

    def inline(self) -> tuple[syntax.Inline, ...]:
        """Read the passage of the token at hand, and pass it and the one that closes its block."""
        prose = self.reading.notes.prose[self.at]
        self.at += 2
        return self.reader.read(prose)

    def item(self, around: tuple[str, ...]) -> tuple[tuple[syntax.Block, ...], Span]:
        """Build what stands in the list item at hand."""
        number = self.at
        self.at += 1
        children = self.until("list_item_close", (*around, ""))
        width = len(self.reading.tokens[number].info) + 1
        return tuple(children), self.over(number, width, children)

    def step_list(self, around: tuple[str, ...]) -> syntax.Steps:
        reading, tokens = self.reading, self.reading.tokens
        steps = []
        while (token := tokens[self.at]).type == "list_item_open":
            start = reading.notes.starts[self.at]
            place = reading.span(start, start + len(token.info) + 1)
            written = int(token.info)
            # Counted before its inside is read: a step comes before what stands in it.
            counted = self.steps.count(written, place)
            children, span = self.item(around)
            steps.append(syntax.Step(counted, written, place, children, span))
        self.at += 1
        return syntax.Steps(tuple(steps), steps[0].span.through(steps[-1].span))

    def plain_list(self, around: tuple[str, ...]) -> syntax.ListBlock:
        tokens = self.reading.tokens
        first = tokens[self.at].info
        items = []
        while tokens[self.at].type == "list_item_open":
            items.append(self.item(around))
        self.at += 1
        span = items[0][1].through(items[-1][1])
        start = int(first) if first else None
        return syntax.ListBlock(start, tuple(children for children, _ in items), span)

    def code(self, number: int) -> syntax.CodeBlock:
        token = self.reading.tokens[number]
        span = self.lines(number)
        if token.type == "code_block":
            found = MARK.search(span.source.text, span.start, span.end)
            if found is not None:
                place = span.source.span(found.start(), found.end())
                self.findings.append(mark_lost(place, "indented"))
        return syntax.CodeBlock(token.content, unescapeAll(token.info).strip(), span)

    def table(self, number: int) -> syntax.Table:
        tokens, span = self.reading.tokens, self.lines(number)
        rows: list[tuple[syntax.Cell, ...]] = []
        cells: list[syntax.Cell] = []
        align: list[str | None] = []
        while (token := tokens[self.at]).type != "table_close":
            self.at += 1
            match token.type:
                case "th_open" | "td_open":
                    if token.type == "th_open":
                        style = str(token.attrs.get("style", ""))
                        align.append(style.removeprefix("text-align:") or None)
                    cells.append(self.cell())
                case "tr_close":
                    rows.append(tuple(cells))
                    cells = []
                case _:
                    pass
        self.at += 1
        return syntax.Table(tuple(align), rows[0], tuple(rows[1:]), span)

    def cell(self) -> syntax.Cell:
        prose = self.reading.notes.prose[self.at]
        start = prose.origins[0]
        span = self.reading.source.span(start, max(start, prose.end(len(prose.text))))
        return syntax.Cell(self.inline(), span)

    def fenced(self, number: int, around: tuple[str, ...]) -> list[syntax.Block]:
        """Build a `:::` block; what stands in one of no known kind goes to the block around it."""
        notes = self.reading.notes
        line = notes.fences[number]
        self.findings.extend(check_line(line, around))
        kind = line.kind.text
        if kind not in KINDS:
            return self.until("fenced_close", around)
        children = self.until("fenced_close", (*around, kind))
        end = line.opening.end
        if number in notes.ends:
            end = notes.ends[number] + self.reading.shift
        elif children:
            end = children[-1].span.end
        span = line.opening.source.span(line.opening.start, end)
        block = syntax.Fenced(
            kind, line.argument.text, line.argument, tuple(children), line.opening, span
        )
        return [block]
