"""Finding the blocks: markdown-it's block rules, run by a loop of ours that notes places.

markdown-it tells of a block only its lines, and a list item or quote shifts the line marks only
while its inside is read. So the loop that tries the rules is replaced: whatever a rule has just
found is noted with its place while the marks still stand. The loop also bounds how deep blocks
nest, and the rules for `:::` lines join markdown-it's own.
"""

from __future__ import annotations

import functools
from typing import TYPE_CHECKING, cast

from markdown_it import MarkdownIt
from markdown_it.common.utils import MD_TRIM_CHARS
from markdown_it.parser_block import ParserBlock

from watchglass.read.markdown import fences
from watchglass.read.markdown.braces import lost_in
from watchglass.read.markdown.links import is_safe
from watchglass.read.markdown.messages import nested_too_deeply
from watchglass.read.markdown.prose import of_cell, of_lines
from watchglass.read.markdown.reading import BlockReading

if TYPE_CHECKING:
    from collections.abc import Callable

    from markdown_it.rules_block import StateBlock
    from markdown_it.token import Token

    from watchglass.base.spans import Source

    Rule = Callable[[StateBlock, int, int, bool], bool]

#: How deep lists, quotes and `:::` blocks nest.
MAX_DEPTH = 32

_CONTAINERS = ("blockquote", "list", "fenced")
_INTERRUPTS = {"alt": ["paragraph", "reference", "blockquote", "list"]}


class _Loop(ParserBlock):
    """markdown-it's loop over the lines, with notes of place and a bound on depth."""

    containers: tuple[Rule, ...] = ()
    leaves: tuple[Rule, ...] = ()

    def settle(self) -> None:
        """Sort the rules, once all are there."""
        rules = {rule.name: rule.fn for rule in self.ruler.__rules__ if rule.enabled}
        self.containers = tuple(rules[name] for name in _CONTAINERS)
        self.leaves = tuple(fn for name, fn in rules.items() if name not in _CONTAINERS)

    def tokenize(self, state: StateBlock, startLine: int, endLine: int) -> None:  # noqa: N803
        """Read lines until their end, or until one stands further left than they may.

        The same as the inherited loop, except that it does not ask which lists are tight: that
        is a matter of looks, and the theme's.
        """
        reading = cast("BlockReading", state)
        reading.depth += 1
        shallow = reading.depth <= MAX_DEPTH
        rules = self.ruler.getRules("") if shallow else self.leaves
        line = startLine
        while line < endLine:
            state.line = line = state.skipEmptyLines(line)
            if line >= endLine or state.sCount[line] < state.blkIndent:
                break
            if not shallow:
                self._refuse(reading, line, endLine)
            number = len(state.tokens)
            start = reading.start_of(line)
            for rule in rules:
                if rule(state, line, endLine, False):  # noqa: FBT003 - markdown-it's
                    break
            _note(reading, number, line, start)
            line = state.line
        reading.depth -= 1

    def _refuse(self, reading: BlockReading, line: int, end: int) -> None:
        """Report a block that begins beyond the bound; what it holds is read as it stands."""
        for rule in self.containers:
            if rule(reading, line, end, True):  # noqa: FBT003 - markdown-it's
                break
        else:
            return
        start, stop = reading.start_of(line), reading.eMarks[line]
        if reading.src[start:stop].startswith(":::"):
            if not reading.src[start:stop].rstrip(" \t").strip(":"):
                return
            reading.refused += 1
        if not reading.too_deep:
            reading.too_deep = True
            place = reading.span(start, stop)
            reading.findings.append(nested_too_deeply(place, MAX_DEPTH, "blocks"))


class _Engine(MarkdownIt):
    """markdown-it, with addresses kept as written: whoever writes HTML escapes them."""

    def normalizeLink(self, url: str) -> str:  # noqa: N802 - markdown-it's
        """Keep an address."""
        return url

    def validateLink(self, url: str) -> bool:  # noqa: N802 - markdown-it's
        """Tell whether an address may be linked to."""
        return is_safe(url)


@functools.cache
def _engine() -> _Engine:
    engine = _Engine("zero")
    loop = _Loop()
    engine.block = loop
    engine.configure("commonmark")
    engine.enable("table").disable(["html_block", "html_inline"])
    loop.ruler.before("table", "fenced_end", fences.is_end, {"alt": _INTERRUPTS["alt"]})
    loop.ruler.after("fenced_end", "fenced", fences.begins, {"alt": _INTERRUPTS["alt"]})
    loop.settle()
    return engine


def read_structure(source: Source, start: int) -> BlockReading:
    """Find the blocks of a file from offset `start` on.

    U+0000 is read as U+FFFD, as CommonMark says; nothing else is changed, so that offsets hold.
    """
    engine = _engine()
    text = source.text[start:].replace("\0", "\ufffd")
    reading = BlockReading(text, engine, source, start)
    engine.block.tokenize(reading, 0, reading.lineMax)
    reading.findings.extend(fences.ends_and_beginnings(reading))
    return reading


def _note(reading: BlockReading, number: int, line: int, start: int) -> None:
    """Note the places of the tokens from `number` on, which begin at `start` in `line`."""
    if number == len(reading.tokens):
        if reading.src.startswith("[", start):
            _lose(reading, start, reading.eMarks[reading.line - 1], "definition")
        return
    token = reading.tokens[number]
    reading.notes.starts[number] = start
    match token.type:
        case "paragraph_open":
            _note_lines(reading, number + 1, line, reading.line)
        case "heading_open" if token.markup.startswith("#"):
            _note_heading(reading, number, start + len(token.markup))
        case "heading_open":
            _note_lines(reading, number + 1, line, reading.line - 1)
        case "bullet_list_open" | "ordered_list_open":
            _note_items(reading, number)
        case "table_open":
            _note_table(reading, number)
        case "fence":
            _lose(reading, start, reading.eMarks[line], "info")
        case _:
            pass


def _lose(reading: BlockReading, start: int, end: int, where: str) -> None:
    shift = reading.shift
    reading.findings.extend(lost_in(reading.source, start + shift, end + shift, where))


def _note_lines(reading: BlockReading, number: int, first: int, after: int) -> None:
    lines = [(reading.start_of(line), reading.eMarks[line]) for line in range(first, after)]
    reading.notes.prose[number] = of_lines(reading.src, lines, reading.shift)


def _note_heading(reading: BlockReading, number: int, after: int) -> None:
    # markdown-it has cut the blanks and closing signs; the words begin with no blank, so that
    # the first place where they stand is theirs.
    words = reading.tokens[number + 1].content
    start = reading.src.find(words, after) if words else after
    lines = [(start, start + len(words))]
    reading.notes.prose[number + 1] = of_lines(reading.src, lines, reading.shift)


def _note_items(reading: BlockReading, number: int) -> None:
    level = reading.tokens[number].level + 1
    for at in range(number + 1, len(reading.tokens)):
        token = reading.tokens[at]
        if token.level == level and token.type == "list_item_open":
            reading.notes.starts[at] = reading.start_of(_first_line(token))


def _first_line(token: Token) -> int:
    return token.map[0] if token.map else 0


def _note_table(reading: BlockReading, number: int) -> None:
    cells: list[tuple[int, int]] = []
    column = stop = 0
    for at in range(number, len(reading.tokens)):
        token = reading.tokens[at]
        if token.type == "tr_open":
            cells, stop = _cells(reading, _first_line(token))
            column = 0
            reading.notes.starts[at] = cells[0][0] if cells else stop
        elif token.type == "inline":
            start, end = cells[column] if column < len(cells) else (stop, stop)
            column += 1
            reading.notes.prose[at] = of_cell(
                reading.src, start, end, shift=reading.shift, row_end=stop
            )
        elif token.type == "tr_close" and column < len(cells):
            _lose(reading, cells[column][0], stop, "surplus")


def _cells(reading: BlockReading, line: int) -> tuple[list[tuple[int, int]], int]:
    """Give start and end of each cell in a row, without blanks, and where the row ends.

    A bar ends a cell unless the character before it is a backslash, even an escaped one: so says
    the description of tables that markdown-it follows.
    """
    text = reading.src
    start, stop = _trimmed(text, reading.start_of(line), reading.eMarks[line])
    cells = []
    left = start
    bar = text.find("|", start, stop)
    while bar >= 0:
        if bar == start or text[bar - 1] != "\\":
            cells.append((left, bar))
            left = bar + 1
        bar = text.find("|", bar + 1, stop)
    cells.append((left, stop))
    if cells[0][0] == cells[0][1]:
        del cells[0]
    if cells and cells[-1][0] == cells[-1][1]:
        del cells[-1]
    return [_trimmed(text, *cell) for cell in cells], stop


def _trimmed(text: str, start: int, end: int) -> tuple[int, int]:
    words = text[start:end]
    inner = words.lstrip(MD_TRIM_CHARS)
    start += len(words) - len(inner)
    return start, start + len(inner.rstrip(MD_TRIM_CHARS))
