"""Blocks between `:::kind argument` and `:::`: the two rules that find them.

A block's inside is read by a loop of its own, as that of a list item is. The rule for the end
stops that loop, so that no line has to be looked at twice and a `:::` in a list item or in code
can close nothing outside it.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, cast

from watchglass.read.markdown.braces import lost_in
from watchglass.read.markdown.messages import (
    KINDS,
    answer_alone,
    block_argument,
    block_end_alone,
    block_not_closed,
    block_unknown,
)
from watchglass.read.markdown.reading import BlockReading, FenceLine, OpenFence

if TYPE_CHECKING:
    from collections.abc import Collection, Iterator

    from markdown_it.rules_block import StateBlock

    from watchglass.base.findings import Finding

MAX_ROWS = 200

_LINE = re.compile(r":{3,}[ \t]*(\S*)[ \t]*(.*)")
_ROWS = re.compile(r"([0-9]+) rows?")
_WARE = re.compile(r"by \S.*")


def is_end(state: StateBlock, start: int, end: int, silent: bool) -> bool:  # noqa: FBT001 - markdown-it's
    """Read a `:::` that closes a block (a rule of markdown-it)."""
    at = state.bMarks[start] + state.tShift[start]
    if not state.src.startswith(":::", at) or state.is_code_block(start):
        return False
    stop = state.eMarks[start]
    if state.src[at:stop].rstrip(" \t").strip(":"):
        return False
    if not silent:
        _close(cast("BlockReading", state), start, end, at)
    return True


def _close(state: BlockReading, line: int, end: int, at: int) -> None:
    state.line = line + 1
    if state.refused:
        state.refused -= 1
    elif state.open and state.open[-1].level == state.level:
        state.open[-1].closed = line
        state.line = end
    else:
        state.strays.append(state.span(at, at + len(state.src[at : state.eMarks[line]].rstrip())))


def begins(state: StateBlock, start: int, end: int, silent: bool) -> bool:  # noqa: FBT001 - markdown-it's
    """Read a `:::` block from the line that opens it to its end (a rule of markdown-it)."""
    at = state.bMarks[start] + state.tShift[start]
    if not state.src.startswith(":::", at) or state.is_code_block(start):
        return False
    if silent:
        return True
    reading = cast("BlockReading", state)
    line = _read_line(reading, at, state.eMarks[start])
    number = len(state.tokens)
    reading.notes.fences[number] = line
    state.push("fenced_open", "", 1)
    fence = OpenFence(state.level)
    reading.open.append(fence)
    state.line = start + 1
    state.md.block.tokenize(state, start + 1, end)
    reading.open.pop()
    if fence.closed is None:
        reading.unclosed.append(line.opening)
    else:
        reading.notes.ends[number] = state.eMarks[fence.closed]
        state.line = fence.closed + 1
    state.push("fenced_close", "", -1)
    return True


def _read_line(reading: BlockReading, at: int, stop: int) -> FenceLine:
    stop = at + len(reading.src[at:stop].rstrip(" \t"))
    found = _LINE.match(reading.src, at, stop)
    kind, argument = (found.span(1), found.span(2)) if found else ((stop, stop), (stop, stop))
    return FenceLine(reading.span(*kind), reading.span(*argument), reading.span(at, stop))


def ends_and_beginnings(reading: BlockReading) -> Iterator[Finding]:
    """Report what was not closed and what closed nothing.

    A block left open and an end that stands alone are mostly two halves of one slip, as when the
    end is indented otherwise: each block left open takes the stray end nearest after it along.
    """
    strays = sorted(reading.strays, key=lambda span: span.start, reverse=True)
    for opening in sorted(reading.unclosed, key=lambda span: span.start):
        yield block_not_closed(opening)
        if strays and strays[-1].start > opening.start:
            strays.pop()
    for stray in strays:
        yield block_end_alone(stray)


def check_line(line: FenceLine, around: Collection[str]) -> Iterator[Finding]:
    """Check what an opening line says; `around` holds the kinds of the blocks around it."""
    source, opening = line.opening.source, line.opening
    kind, argument = line.kind.text, line.argument.text
    lost = tuple(lost_in(source, opening.start, opening.end, "fenced"))
    if lost:
        yield from lost
        if kind in KINDS or "{" in kind:
            return
    if kind not in KINDS:
        yield block_unknown(line.kind)
        return
    if kind == "answer" and "question" not in around:
        yield answer_alone(opening)
    if (fault := _argument_fault(kind, argument)) is not None:
        yield block_argument(line.argument if argument else opening, *fault)


def _argument_fault(kind: str, argument: str) -> tuple[str, str] | None:
    """Give message and help where a kind cannot have this argument."""
    match kind:
        case "record" if argument:
            return _rows_fault(argument)
        case "charge" if argument and not _WARE.fullmatch(argument):
            mend = "write `by` and the ware that measures, as `:::charge by pipette`, or nothing"
            return f"`:::charge` is followed by `{argument}`", mend
        case "if" if not argument or argument.startswith(","):
            mend = "write the case, as `:::if the solid is coloured`"
            return "`:::if` does not say when", mend
        case "instructor" | "caution" | "before" | "question" | "answer" if argument:
            mend = "write it on the next line, inside the block"
            return f"`:::{kind}` is followed by `{argument}`", mend
        case _:
            return None


def _rows_fault(argument: str) -> tuple[str, str] | None:
    found = _ROWS.fullmatch(argument)
    if found is None:
        mend = "write how many rows, as `:::record 4 rows`, or nothing"
        return f"`:::record` is followed by `{argument}`", mend
    # A figure with more digits than the bound is beyond it; int() refuses the very long ones.
    digits = found[1].lstrip("0")
    if len(digits) <= len(str(MAX_ROWS)) and 1 <= int(digits or "0") <= MAX_ROWS:
        return None
    mend = f"write a figure from 1 to {MAX_ROWS}"
    return f"`:::record` asks for {found[1][:9]} rows; 1 to {MAX_ROWS} are made", mend
