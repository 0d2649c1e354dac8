"""Where each character of a YAML scalar's value stands in the file.

A plain scalar on one line needs no table. Quoted scalars lose quotes and escapes, scalars over
several lines are folded, literal blocks lose their indentation: for these the table is worked out
from the raw text and checked against the value's length. Folded blocks (`>`) have none.
"""

from __future__ import annotations

_ESCAPE_DIGITS = {"x": 2, "u": 4, "U": 8}
_BLANKS = " \t"


def offsets(raw: str, style: str, value: str) -> list[int] | None:
    """Map each character of a scalar's value to its offset in the raw text.

    Args:
        raw: The scalar as it stands in the file, quotes and block header included.
        style: Quote or block character; empty for a plain scalar.
        value: The value PyYAML made of it.

    Returns:
        One offset a character, in order, and one for the end; None where no exact table exists.
    """
    table: list[int] | None
    if style in ("", "'", '"'):
        table = _flow(raw, style)
    elif style == "|":
        table = _literal(raw, value)
    else:
        return None
    return table if table is not None and len(table) == len(value) + 1 else None


def _flow(raw: str, style: str) -> list[int]:
    at, end = (1, len(raw) - 1) if style else (0, len(raw))
    table: list[int] = []
    while at < end:
        char = raw[at]
        if style == "'" and char == "'":
            table.append(at)
            at += 2
        elif style == '"' and char == "\\":
            at = _escape(raw, at, table)
        elif char in _BLANKS or char == "\n":
            at = _blanks(raw, at, end, table)
        else:
            table.append(at)
            at += 1
    table.append(end)
    return table


def _escape(raw: str, at: int, table: list[int]) -> int:
    kind = raw[at + 1]
    if kind == "\n":  # an escaped line end joins the lines without a blank
        at += 2
        while raw[at] in _BLANKS:
            at += 1
        return at
    table.append(at)
    return at + 2 + _ESCAPE_DIGITS.get(kind, 0)


def _blanks(raw: str, at: int, end: int, table: list[int]) -> int:
    """Blanks stay within a line; across a line end they fold to one blank, or to empty lines."""
    after = at
    while after < end and (raw[after] in _BLANKS or raw[after] == "\n"):
        after += 1
    breaks = [place for place in range(at, after) if raw[place] == "\n"]
    if not breaks:
        table.extend(range(at, after))
    elif len(breaks) == 1:
        table.append(breaks[0])
    else:
        table.extend(breaks[1:])
    return after


def _literal(raw: str, value: str) -> list[int] | None:
    table: list[int] = []
    at = raw.find("\n") + 1
    body = raw[at:].split("\n")
    for number, line in enumerate(value.split("\n")):
        if number >= len(body):
            break
        written = body[number]
        if not written.endswith(line):
            return None
        lead = len(written) - len(line)
        table.extend(range(at + lead, at + len(written) + 1))
        at += len(written) + 1
    del table[len(value) :]
    table.append(min(at, len(raw)))
    return table
