"""What reading Markdown reports, in words: one function for each fault."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding, Related, did_you_mean

if TYPE_CHECKING:
    from watchglass.base.spans import Span

#: Kinds of `:::` block, in the order of the notation.
KINDS = ("instructor", "caution", "before", "question", "answer", "record", "if", "charge")

_MOVE = "write the mark in the text beside it"
_LOST = {
    "link": ("a link's address or title", _MOVE + ", or `%7B` for a plain brace in an address"),
    "autolink": ("an address in angle brackets", "write `%7B` and `%7D` for plain braces"),
    "definition": ("a link definition", _MOVE),
    "image": ("a picture's description", "write the mark before or after the picture"),
    "words": ("the words of another mark", "write the marks one after the other"),
    "indented": (
        "indented code",
        "indent by fewer than four spaces more than the text around, or fence it as code",
    ),
    "info": ("the line that opens code", "write the mark in the text before the code"),
    "fenced": ("the line of a `:::` block", "write the mark on a line of its own in the block"),
    "surplus": ("a cell beyond the last column", "give the table's head one more column"),
    "cut": ("two cells of a table, for a `|` ends a cell", "write the mark without `|`"),
}


def _quote(text: str) -> str:
    """Put an author's words in backticks, cut where they are long."""
    return f"`{text}`" if len(text) <= 60 else f"`{text[:57]}…`"


def mark_lost(span: Span, where: str) -> Finding:
    """Report a brace that stands where no mark is read; `where` is a key of `_LOST`."""
    place, mend = _LOST[where]
    return Finding(
        code=codes.MARK_LOST,
        span=span,
        message=f"{_quote(span.text)} stands in {place}: no mark is read there",
        help=mend + (r"; a plain brace is `\{`" if where not in ("autolink", "indented") else ""),
    )


def mark_not_closed(span: Span, *, inner: bool, later: bool) -> Finding:
    """Report `{` without `}`: `inner` where another `{` follows, `later` where `}` comes below."""
    if inner:
        mend = r"close it before the next `{`; a plain brace is `\{`"
    elif later:
        mend = "write the whole mark on one line"
    else:
        mend = r"write `}` where the mark ends; a plain brace is `\{`"
    return Finding(
        code=codes.MARK_NOT_CLOSED,
        span=span,
        message=f"{_quote(span.text)} has no `}}` on its line",
        help=mend,
    )


def brace_alone(span: Span) -> Finding:
    """Report `}` that closes nothing."""
    return Finding(
        code=codes.BRACE_ALONE,
        span=span,
        message="`}` closes no mark",
        help=r"write `{` where the mark begins; a plain brace is `\}`",
    )


def too_many_marks(span: Span, most: int) -> Finding:
    """Report the first mark beyond the bound."""
    return Finding(
        code=codes.TOO_MANY_MARKS,
        span=span,
        message=f"this is mark {most + 1} of the file; {most} are read",
        help="divide the procedure into several files",
    )


def nested_too_deeply(span: Span, most: int, what: str) -> Finding:
    """Report blocks or brackets (`what`) beyond the bound."""
    return Finding(
        code=codes.NESTED_TOO_DEEPLY,
        span=span,
        message=f"{what} nest more than {most} deep here and are kept as plain text",
        help="take a level out",
    )


def block_unknown(span: Span) -> Finding:
    """Report a `:::` block of no known kind."""
    mend = did_you_mean(span.text, KINDS)
    return Finding(
        code=codes.BLOCK_UNKNOWN,
        span=span,
        message=f"{_quote(span.text)} is no kind of block",
        help=mend or "write one of " + ", ".join(f"`{kind}`" for kind in KINDS),
    )


def block_not_closed(span: Span) -> Finding:
    """Report a `:::` block without an end."""
    return Finding(
        code=codes.BLOCK_NOT_CLOSED,
        span=span,
        message=f"{_quote(span.text)} is never closed",
        help="write `:::` on a line of its own where it ends, indented as its first line is",
    )


def block_end_alone(span: Span) -> Finding:
    """Report a `:::` that closes nothing."""
    return Finding(
        code=codes.BLOCK_END_ALONE,
        span=span,
        message=f"{_quote(span.text)} closes no block",
        help="take the line out, or open a block above it, as `:::caution`",
    )


def block_argument(span: Span, message: str, mend: str) -> Finding:
    """Report what stands after a block's kind."""
    return Finding(code=codes.BLOCK_ARGUMENT, span=span, message=message, help=mend)


def answer_alone(span: Span) -> Finding:
    """Report an answer outside a question."""
    return Finding(
        code=codes.ANSWER_ALONE,
        span=span,
        message="`:::answer` stands in no question",
        help="put it before the `:::` that closes its `:::question`",
    )


def step_number_differs(span: Span, number: int, first: Span | None) -> Finding:
    """Report a typed number that is not the counted one; `first` is where step 1 stands."""
    mark = span.text[-1:]
    related = () if first is None else (Related(first, "steps are counted from here"),)
    return Finding(
        code=codes.STEP_NUMBER_DIFFERS,
        span=span,
        message=f"step is typed `{span.text}`, counted {number}",
        related=related,
        help=f"type `{number}{mark}`",
    )
