"""What stands between braces: acts, by the grammar of the notation.

One function an act, on a cursor over the source. A fault ends the act it stands in, gives its
finding and leaves a `BrokenAct`; the acts beside it in the mark are still read.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NoReturn

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding, Related, did_you_mean
from watchglass.base.scan import Found, scan_quantity, unknown_unit
from watchglass.base.units import REFUSED
from watchglass.read import syntax
from watchglass.read.clauses import read_amount, read_clauses, read_object, read_place
from watchglass.read.cursor import Cursor, StopReading, cut, ends_in_unit
from watchglass.read.expressions import ExpressionReader
from watchglass.read.words import (
    CLAUSE_WORDS,
    CLOSURES,
    MEASURES_OF_ALL,
    OTHER_ACTS,
    SETTINGS,
    VERBS,
)

if TYPE_CHECKING:
    from collections.abc import Callable, Mapping

    from watchglass.base.spans import Source, Span
    from watchglass.read.terms import Expression

_RECORD_NAME = re.compile(r"\s*([^\W_][\w-]*)\s*:\s+")
_RECORD_UNIT = re.compile(r".*\bin\s+(?=\S)", re.DOTALL)
_STEPS = re.compile(r"(\d+)(?:\s*[–—-]\s*(\d+))?(?![\w-])")
_COUNT = re.compile(r"(\d+)\s+more\s+times?\b")
_AT_MOST = re.compile(r"at\s+most\s+(\d+)\b")
_NEXT_PERIOD = re.compile(r"next\s+period\b")
_SUPPOSED = re.compile(r"is\s+(\w+)\s*:\s*(\S.*)", re.DOTALL)
_ARROW = re.compile(r"=>|-->|- >|=|>|⟶|⇒")
MOST_PASSES = 1000


def read_mark(
    source: Source, start: int, end: int, measures: Mapping[str, float | None] | None = None
) -> tuple[tuple[syntax.Act, ...], tuple[Finding, ...]]:
    """Read the acts of one mark.

    Args:
        source: The file.
        start: Offset after the opening brace.
        end: Offset of the closing brace.
        measures: Countable measures that may stand for a unit.

    Returns:
        The acts, `BrokenAct` where one could not be read; and the findings.
    """
    text = source.text
    if not text[start:end].strip():
        finding = Finding(
            code=codes.MARK_EMPTY,
            span=source.span(start - 1, end + 1),
            message="the mark is empty",
            help="write an act in it, or take the braces out",
        )
        return (syntax.BrokenAct(source.span(start - 1, end + 1)),), (finding,)
    acts: list[syntax.Act] = []
    findings: list[Finding] = []
    for a, b in _divide(text, start, end):
        cursor = Cursor(source, a, b, measures)
        try:
            if cursor.at >= cursor.end:
                before = a - 1 if a > start else a
                cursor.stop(
                    codes.MARK_NOT_READ,
                    source.span(before, max(b, before + 1)),
                    "nothing stands beside the `;`",
                    "take the `;` out",
                )
            act = _act(cursor)
            if not cursor.done:
                _left_over(cursor)
            acts.append(act)
        except StopReading as stop:
            findings.append(stop.finding)
            acts.append(syntax.BrokenAct(source.span(a, b)))
    return tuple(acts), tuple(findings)


def _divide(text: str, start: int, end: int) -> list[tuple[int, int]]:
    """Cut at each `;` outside quotes."""
    if text.find(";", start, end) < 0:
        return [(start, end)]
    parts, begin, quoted = [], start, False
    for at in range(start, end):
        if text[at] == '"':
            quoted = not quoted
        elif text[at] == ";" and not quoted:
            parts.append((begin, at))
            begin = at + 1
    parts.append((begin, end))
    return parts


def _left_over(cursor: Cursor) -> NoReturn:
    rest = cursor.rest()
    cursor.stop(
        codes.MARK_NOT_READ,
        rest,
        f"`{cut(rest.text)}` cannot stand here",
        _mending(rest.text) or "divide acts with `;`, or take it out",
    )


def _mending(rest: str) -> str | None:
    """Say how the commonest left-overs are written: a closure, a time, a place, a count."""
    word = next((w for w in (*CLOSURES, *SETTINGS) if rest.startswith(w)), None)
    if word is not None:
        return f"write `, {word}`"
    found = scan_quantity(rest, 0)
    if isinstance(found, Found) and found.quantity.dimension == dim.TIME:
        return f"write `for {found.quantity.text}`"
    if isinstance(found, Found) and found.quantity.dimension == dim.TEMPERATURE:
        return f"write `to {found.quantity.text}` or `at {found.quantity.text}`"
    return None


# ------------------------------------------------------------------------------ acts


def _act(cursor: Cursor) -> syntax.Act:
    first = cursor.text[cursor.at]
    start = cursor.at
    if first == "?":
        return _record(cursor, start)
    if first == "=":
        return _value(cursor, start)
    measured = cursor.quantity()
    if measured is not None:
        return _measured(cursor, start, measured)
    word = cursor.peek_word()
    if word in _READERS:
        return _READERS[word](cursor, start)
    if word in MEASURES_OF_ALL:
        cursor.takes_word(word)
        cursor.takes_word("of")
        name = cursor.name("a material")
        return _amounts(cursor, start, syntax.Amount(word, name, cursor.span(start)))
    if word in VERBS:
        return _verb(cursor, start, word)
    return _named(cursor, start)


def _measured(cursor: Cursor, start: int, measured: syntax.Measured) -> syntax.Act:
    """What begins with a quantity: a charge, an aliquot, a stated amount or a bare quantity."""
    if cursor.takes_word("from"):
        origin = read_place(cursor)
        clauses = read_clauses(cursor)
        target = _arrow(cursor)
        clauses = read_clauses(cursor, clauses)
        return syntax.AliquotAct(measured, origin, target, clauses, cursor.span(start))
    if cursor.done:
        if not measured.quantity.unit.symbol:
            _unit_missing(cursor, measured)
        return syntax.QuantityAct(measured, cursor.span(start))
    if cursor.text.startswith("->", cursor.at):
        cursor.stop(
            codes.MARK_NOT_READ,
            cursor.source.span(cursor.at, cursor.at + 2),
            f"`{measured.quantity.text}` of what?",
            "name the material before the arrow",
        )
    return _amounts(cursor, start, read_amount(cursor, start, measured))


def _unit_missing(cursor: Cursor, measured: syntax.Measured) -> NoReturn:
    cursor.stop(
        codes.UNIT_MISSING,
        measured.span,
        f"`{measured.quantity.text}` has no unit",
        "write the unit after it, as in `5 mL`, or take the braces off a plain number",
    )


def _amounts(cursor: Cursor, start: int, first: syntax.Amount) -> syntax.Act:
    amounts = [first]
    while cursor.takes("+"):
        amounts.append(_next_amount(cursor))
    clauses = read_clauses(cursor)
    if cursor.done and len(amounts) == 1 and not clauses:
        return syntax.StatedAct(first, cursor.span(start))
    target = _arrow(cursor)
    clauses = read_clauses(cursor, clauses)
    return syntax.ChargeAct(tuple(amounts), target, clauses, cursor.span(start))


def _next_amount(cursor: Cursor) -> syntax.Amount:
    start = cursor.at
    word = cursor.peek_word()
    if word in MEASURES_OF_ALL:
        cursor.takes_word(word)
        cursor.takes_word("of")
        name = cursor.name("a material")
        return syntax.Amount(word, name, cursor.span(start))
    measured = cursor.quantity()
    if measured is None:
        cursor.stop(
            codes.MARK_NOT_READ, cursor.rest(), f"an amount is expected after `+`{cursor.here()}"
        )
    return read_amount(cursor, start, measured)


def _arrow(cursor: Cursor) -> syntax.Place:
    if not (cursor.takes("->") or cursor.takes("→")):
        if found := _ARROW.match(cursor.text, cursor.at, cursor.end):
            span = cursor.source.span(found.start(), found.end())
            cursor.stop(codes.MARK_NOT_READ, span, f"`{found[0]}` is no arrow", "write `->`")
        cursor.stop(
            codes.MARK_NOT_READ,
            cursor.rest(),
            f"`->` is expected{cursor.here()}",
            "write where it goes, as in `-> funnel`",
        )
    return read_place(cursor)


def _named(cursor: Cursor, start: int) -> syntax.Act:
    """What begins with a name: a transfer, or the name alone."""
    place = read_place(cursor)
    if cursor.done:
        return syntax.NameAct(place, cursor.span(start))
    before = cursor.at
    clauses = read_clauses(cursor)
    if cursor.text.startswith(("->", "→"), cursor.at):
        target = _arrow(cursor)
        clauses = read_clauses(cursor, clauses)
        return syntax.TransferAct(place, target, clauses, cursor.span(start))
    word = place.name
    if place.part is None and before < cursor.end:
        cursor.stop(
            codes.ACT_UNKNOWN,
            word.span,
            f"`{word.text}` is no act of the bench",
            did_you_mean(word.text, VERBS | OTHER_ACTS)
            or "begin with a verb such as `stir`, an amount or a name",
        )
    _left_over(cursor)


# ------------------------------------------------------------------------------ verbs


def _verb(cursor: Cursor, start: int, verb: str) -> syntax.VerbAct:
    cursor.takes_word(verb)
    verb_span = cursor.source.span(start, start + len(verb))
    if verb == "suppose":
        return _suppose(cursor, start, verb_span)
    target: syntax.Place | syntax.Measured | None = None
    subject = None
    if verb in ("take", "wait"):
        target = cursor.quantity()
        cursor.takes_word("for")
        target = target or cursor.quantity()
    elif not cursor.done:
        target = read_object(cursor)
    if target is None:
        wanted = "a time" if verb in ("take", "wait") else "what it is done to"
        cursor.stop(
            codes.MARK_NOT_READ,
            verb_span,
            f"`{verb}` does not say {wanted}",
            f"write `{verb} 5 min`"
            if wanted == "a time"
            else f"name the vessel, as in `{verb} flask`",
        )
    if verb == "test" and cursor.peek_word() not in ("", *CLAUSE_WORDS):
        subject = cursor.name("what is tested")
    clauses = read_clauses(cursor)
    return syntax.VerbAct(verb, verb_span, target, clauses, cursor.span(start), subject)


def _suppose(cursor: Cursor, start: int, verb_span: Span) -> syntax.VerbAct:
    """`suppose 80 % acetanilide in clear is solid: mean of last year`."""
    measured = cursor.quantity()
    if measured is None:
        cursor.stop(
            codes.MARK_NOT_READ, cursor.rest(), "`suppose` begins with a share or an amount"
        )
    amount = read_amount(cursor, measured.span.start, measured)
    clauses: list[syntax.Clause] = []
    at = cursor.at
    if cursor.takes_word("in"):
        clauses.append(syntax.Clause("in", read_place(cursor), cursor.span(at)))
    found = _SUPPOSED.match(cursor.text, cursor.at, cursor.end)
    if found is None or not clauses:
        cursor.stop(
            codes.MARK_NOT_READ,
            cursor.rest(),
            "`suppose` needs a vessel, an outcome and a reason",
            "write `suppose 80 % product in flask is solid: the reason`",
        )
    span = cursor.source.span
    outcome = syntax.Words(found[1], span(found.start(1), found.end(1)))
    said = found[2].rstrip()
    reason = syntax.Words(said, span(found.start(2), found.start(2) + len(said)))
    clauses += [
        syntax.Clause("is", outcome, outcome.span),
        syntax.Clause("because", reason, reason.span),
    ]
    cursor.at = cursor.end
    return syntax.VerbAct("suppose", verb_span, amount, tuple(clauses), cursor.span(start))


# ------------------------------------------------------------------------------ again


def _again(cursor: Cursor, start: int) -> syntax.AgainAct:
    cursor.takes_word("again")
    steps: list[syntax.StepRange] = []
    times, at_most, fresh = 1, None, False
    exchanges: tuple[tuple[syntax.Name, syntax.Name], ...] = ()
    said: dict[str, Span] = {}
    while not cursor.done:
        before = cursor.at
        if found := _COUNT.match(cursor.text, cursor.at, cursor.end):
            times = _count(cursor, found)
            _once(cursor, said, "more times", before)
        elif found := _AT_MOST.match(cursor.text, cursor.at, cursor.end):
            at_most = _count(cursor, found)
            _once(cursor, said, "at most", before)
        elif cursor.takes_word("fresh"):
            fresh = True
            _once(cursor, said, "fresh", before)
        elif cursor.takes_word("with"):
            exchanges = _exchanges(cursor)
            _once(cursor, said, "with", before)
        else:
            steps.append(_steps(cursor))
        divided = cursor.takes(",")
        if not divided and cursor.at < cursor.end and cursor.peek_word() != "with":
            _left_over(cursor)
    if not steps:
        cursor.stop(
            codes.MARK_NOT_READ,
            cursor.source.span(start, start + 5),
            "`again` does not say which steps",
            "write `again 3–4`",
        )
    return syntax.AgainAct(tuple(steps), times, at_most, fresh, exchanges, cursor.span(start))


def _once(cursor: Cursor, said: dict[str, Span], what: str, start: int) -> None:
    """Note what `again` says, and refuse to be told it twice."""
    span = cursor.span(start)
    if what in said:
        raise StopReading(
            Finding(
                code=codes.CLAUSE_TWICE,
                span=span,
                message=f"`{what}` stands twice in one act",
                related=(Related(said[what], "it stood here first"),),
                help="keep one of the two",
            )
        )
    said[what] = span


def _count(cursor: Cursor, found: re.Match[str]) -> int:
    span = cursor.source.span(found.start(), found.end())
    if len(found[1]) > 4 or not 0 < int(found[1]) <= MOST_PASSES:
        cursor.stop(
            codes.MARK_NOT_READ,
            span,
            f"`{cut(found[0])}` is beyond the passes that are run",
            f"keep to 1 to {MOST_PASSES}",
        )
    cursor.at = found.end()
    cursor.blanks()
    return int(found[1])


def _steps(cursor: Cursor) -> syntax.StepRange:
    start = cursor.at
    if found := _STEPS.match(cursor.text, start, cursor.end):
        cursor.at = found.end()
        span = cursor.span(start)
        cursor.blanks()
        return syntax.StepRange(found[1], found[2] or found[1], span)
    name = cursor.name("a step's number or label")
    return syntax.StepRange(name.text, name.text, name.span)


def _exchanges(cursor: Cursor) -> tuple[tuple[syntax.Name, syntax.Name], ...]:
    new = [cursor.name("a name")]
    while cursor.takes(","):
        new.append(cursor.name("a name"))
    if not cursor.takes_word("as"):
        cursor.stop(
            codes.MARK_NOT_READ,
            cursor.rest(),
            f"`as` is expected{cursor.here()}",
            "say what is exchanged, as in `with tube-2 as tube-1`",
        )
    old = cursor.name("a name")
    return tuple((name, old) for name in new)


# ------------------------------------------------------------------------------ records and figures


def _label(cursor: Cursor, start: int) -> syntax.LabelAct:
    cursor.takes_word("label")
    return syntax.LabelAct(cursor.name("a label"), cursor.span(start))


def _step(cursor: Cursor, start: int) -> syntax.StepAct:
    cursor.takes_word("step")
    return syntax.StepAct(cursor.name("a label"), cursor.span(start))


def _next(cursor: Cursor, start: int) -> syntax.VerbAct:
    found = _NEXT_PERIOD.match(cursor.text, start, cursor.end)
    if found is None:
        cursor.stop(codes.ACT_UNKNOWN, cursor.rest(), "`next` stands in `next period` only")
    cursor.at = found.end()
    cursor.blanks()
    span = cursor.span(start)
    return syntax.VerbAct("next period", span, None, (), span)


def _value(cursor: Cursor, start: int) -> syntax.ValueAct:
    cursor.takes("=")
    expression, unit = _expression_in_unit(cursor)
    return syntax.ValueAct(expression, unit, cursor.span(start))


def _expression_in_unit(cursor: Cursor) -> tuple[Expression, syntax.Name | None]:
    expression = ExpressionReader(cursor, unit_follows=True).read()
    unit = None
    if cursor.takes_word("in"):
        span = cursor.rest()
        if not ends_in_unit(cursor):
            fault = unknown_unit(span.text, span.start)
            cursor.stop(fault.code, span, fault.message, fault.help)
        unit = syntax.Name(span.text, span)
        cursor.at = cursor.end
    return expression, unit


def _record(cursor: Cursor, start: int) -> syntax.RecordAct:
    cursor.takes("?")
    name = None
    if found := _RECORD_NAME.match(cursor.text, cursor.at, cursor.end):
        name = syntax.Name(found[1], cursor.source.span(found.start(1), found.end(1)))
        cursor.at = found.end()
    equals = cursor.text.find("=", cursor.at, cursor.end)
    label_end = cursor.end if equals < 0 else equals
    label_start = cursor.at
    label, unit = _label_and_unit(cursor, label_start, label_end)
    if not label:
        cursor.stop(
            codes.MARK_NOT_READ,
            cursor.source.span(start, start + 1),
            "the record does not say what is recorded",
            "write a few words, as in `? mass of product in g`",
        )
    expression = None
    if equals >= 0:
        cursor.at = equals + 1
        cursor.blanks()
        expression, other = _expression_in_unit(cursor)
        if other is not None:
            unit = unit or other
    else:
        cursor.at = cursor.end
    return syntax.RecordAct(name, label, unit, expression, cursor.span(start))


def _label_and_unit(cursor: Cursor, start: int, end: int) -> tuple[str, syntax.Name | None]:
    """Part `mass of product in g` into words and unit; `colour in the flask` is all words."""
    found = _RECORD_UNIT.match(cursor.text, start, end)
    if found:
        inner = Cursor(cursor.source, found.end(), end, None)
        span = inner.rest()
        if ends_in_unit(inner):
            words = cursor.text[start : found.end()].rstrip()[: -len("in")]
            return " ".join(words.split()).strip('"'), syntax.Name(span.text, span)
        if span.text in REFUSED:
            fault = unknown_unit(span.text, span.start)
            cursor.stop(fault.code, span, fault.message, fault.help)
    return " ".join(cursor.text[start:end].split()).strip('"'), None


_READERS: dict[str, Callable[[Cursor, int], syntax.Act]] = {
    "again": _again,
    "label": _label,
    "step": _step,
    "next": _next,
}
