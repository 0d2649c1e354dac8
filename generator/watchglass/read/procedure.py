"""Reading a whole file: the front matter is cut off, the rest is Markdown with marks."""

from __future__ import annotations

import re
from functools import partial
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.base.yaml import YamlMapping, read_yaml
from watchglass.read.markdown import MAX_CHARACTERS, read_body
from watchglass.read.marks import read_mark
from watchglass.read.strays import strays
from watchglass.read.syntax import ProcedureSyntax

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.spans import Source

    Measures = Mapping[str, float | None] | None

_OPENING = re.compile(r"---[ \t]*(?:\n|\Z)")
_CLOSING = re.compile(r"^(?:---|\.\.\.)[ \t]*(?:\n|\Z)", re.MULTILINE)


def read_procedure(
    source: Source, measures: Measures = None
) -> tuple[ProcedureSyntax, tuple[Finding, ...]]:
    """Read a procedure. Never fails.

    Without front matter the names used in the body are unknown, not wrong: `front_broken` says so.
    """
    return _read(source, measures, ordinary=False)


def read_page(
    source: Source, measures: Measures = None
) -> tuple[ProcedureSyntax, tuple[Finding, ...]]:
    """Read an ordinary page: its front matter may be missing, its numbered lists are no steps."""
    return _read(source, measures, ordinary=True)


def _read(
    source: Source, measures: Measures, *, ordinary: bool
) -> tuple[ProcedureSyntax, tuple[Finding, ...]]:
    front, start, broken, found = _read_front(source, optional=ordinary)
    body, marks, more = read_body(
        source, start, partial(read_mark, measures=measures), ordinary=ordinary
    )
    syntax = ProcedureSyntax(
        source=source, front=front, front_broken=broken, body=body, marks=marks
    )
    return syntax, (*found, *more, *strays(source, start, body))


def _read_front(
    source: Source, *, optional: bool
) -> tuple[YamlMapping | None, int, bool, tuple[Finding, ...]]:
    """Give the front matter, where the body begins, whether it is broken, and what was found."""
    opening = _OPENING.match(source.text)
    if opening is None:
        return (None, 0, False, ()) if optional else (None, 0, True, (_missing(source),))
    closing = _CLOSING.search(source.text, opening.end())
    if closing is None:
        # Where it was meant to end nobody can tell, so nothing after it is read for something else.
        return None, len(source.text), True, (_left_open(source),)
    if len(source.text) > MAX_CHARACTERS:
        return None, closing.end(), True, ()
    node, found = read_yaml(source, opening.end(), closing.start())
    if node is None or isinstance(node, YamlMapping):
        return node, closing.end(), node is None and bool(found), found
    return None, closing.end(), True, (*found, _no_fields(source, node.span.start))


def _missing(source: Source) -> Finding:
    return Finding(
        code=codes.FRONT_MATTER_MISSING,
        span=source.span(0, _line_end(source, 0)),
        message="the first line is not `---`, so there is no front matter",
        help="begin the file with `---`, the fields `title:` and `code:`, and `---` again",
    )


def _left_open(source: Source) -> Finding:
    return Finding(
        code=codes.FRONT_MATTER_OPEN,
        span=source.span(0, _line_end(source, 0)),
        message="the front matter opens here and is never closed; the rest was not read",
        help="write `---` on a line of its own after the last field",
    )


def _no_fields(source: Source, start: int) -> Finding:
    return Finding(
        code=codes.FIELD_UNFIT,
        span=source.span(start, _line_end(source, start)),
        message="the front matter holds no fields",
        help="write fields, as `title: Melting points`",
    )


def _line_end(source: Source, start: int) -> int:
    end = source.text.find("\n", start)
    return len(source.text) if end < 0 else end
