"""Expressions: the small language of figures, records and expectations.

A hand-written Pratt parser on the source text itself, so that every node has its place and every
fault its column and cause. Units bind first after a number (`6 g/mL` is one quantity); a minus
sign stands between blanks, since elsewhere a hyphen belongs to a name. No statements, no access
to anything but the documented functions; those are typed in resolve and evaluated in run.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NoReturn

from watchglass.base import codes
from watchglass.read.cursor import Cursor, StopReading, cut, ends_in_unit
from watchglass.read.terms import (
    After,
    Binary,
    Call,
    Compare,
    Expression,
    Held,
    Measured,
    Name,
    Negative,
    Within,
    Words,
)
from watchglass.read.words import NAME

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Source, Span

DEEPEST = 40
#: Operators of one expression: a longer chain is a tree too deep to be walked.
MOST_OPERATORS = 100
_COMPARISONS = ("<=", ">=", "≤", "≥", "<", ">")
_POWERS = {"+": 10, "-": 10, "*": 20, "·": 20, "×": 20, "/": 20, "^": 40}
_BINDS_COMPARISON, _BINDS_AFTER, _BINDS_IN, _BINDS_SIGN = 2, 4, 6, 30
_GLUED = re.compile(r"(\d[\d.]*)-(\d[\d.]*)")
_ONE_A_LINE = "write one to a line"
_WORD_TIE = re.compile(r"(in|on|after|of)\b")


class ExpressionReader:
    """Reads one expression from a cursor; `unit_follows` lets `… in mL` end it."""

    def __init__(self, cursor: Cursor, *, unit_follows: bool = False) -> None:
        """Read from the cursor's place."""
        self.cursor = cursor
        self.unit_follows = unit_follows
        self.depth = 0
        self.operators = 0

    def read(self, binding: int = 0) -> Expression:
        """Read an expression whose operators bind tighter than `binding`."""
        cursor = self.cursor
        self.depth += 1
        if self.depth > DEEPEST:
            self._stop(cursor.rest(), f"the expression nests deeper than {DEEPEST} levels")
        start = cursor.at
        left = self._operand()
        while not cursor.done:
            longer = self._longer(left, start, binding)
            if longer is None:
                break
            left = longer
            self.operators += 1
            if self.operators > MOST_OPERATORS:
                self._stop(
                    cursor.span(start), f"the expression has more than {MOST_OPERATORS} operators"
                )
        self.depth -= 1
        return left

    def _longer(self, left: Expression, start: int, binding: int) -> Expression | None:
        cursor = self.cursor
        for sign in _COMPARISONS:
            if cursor.text.startswith(sign, cursor.at, cursor.end):
                if binding >= _BINDS_COMPARISON:
                    return None
                if isinstance(left, Compare | Within):
                    self._stop(
                        cursor.source.span(cursor.at, cursor.at + len(sign)),
                        "two comparisons stand in one expression",
                        _ONE_A_LINE,
                    )
                cursor.takes(sign)
                right = self.read(_BINDS_COMPARISON)
                if isinstance(right, Within):
                    self._stop(right.span, "two comparisons stand in one expression", _ONE_A_LINE)
                operator = {"≤": "<=", "≥": ">="}.get(sign, sign)
                return Compare(operator, left, right, cursor.span(start))
        sign = cursor.text[cursor.at]
        if sign in "+-*·×/^−":
            return self._binary(sign, left, start, binding)
        return self._word_tie(left, start, binding)

    def _binary(self, sign: str, left: Expression, start: int, binding: int) -> Expression | None:
        cursor = self.cursor
        sign = "-" if sign == "−" else sign
        power = _POWERS[sign]
        if power <= binding:
            return None
        at = cursor.at
        if cursor.text.startswith("->", at) or cursor.text.startswith("**", at):
            self._stop(
                cursor.source.span(at, at + 2), f"`{cursor.text[at : at + 2]}` is no operator here"
            )
        if sign == "-" and not (
            cursor.text[at - 1 : at].isspace() and cursor.text[at + 1 : at + 2].isspace()
        ):
            self._stop(
                cursor.source.span(at, at + 1),
                "a minus sign needs a blank on both sides",
                "write ` - `",
            )
        if sign == "^" and isinstance(left, Measured) and left.span.start == start:
            self._signed_power(left)
        cursor.at += 1
        cursor.blanks()
        right = self.read(power - 1 if sign == "^" else power)
        return Binary({"·": "*", "×": "*"}.get(sign, sign), left, right, cursor.span(start))

    def _signed_power(self, left: Measured) -> None:
        """Refuse `-2 ^ 2`, which some read as 4 and some as -4."""
        digits = left.quantity.text
        if digits[:1] in "-−+":
            self._stop(
                left.span,
                f"`{digits} ^` does not say whether the sign is raised too",
                f"write `({digits}) ^ …` or `{digits[0]} ({digits[1:]} ^ …)`",
            )

    def _word_tie(self, left: Expression, start: int, binding: int) -> Expression | None:
        cursor = self.cursor
        found = _WORD_TIE.match(cursor.text, cursor.at, cursor.end)
        if found is None:
            return None
        word, before = found[1], cursor.at
        strength = _BINDS_AFTER if word == "after" else _BINDS_IN
        if strength <= binding and not (word in ("in", "on") and binding == _BINDS_AFTER):
            return None
        cursor.at = found.end()
        cursor.blanks()
        if word == "in" and self.unit_follows and ends_in_unit(cursor):
            cursor.at = before
            return None
        if word == "of":
            if isinstance(left, Name):
                return Call(left, (self.read(_BINDS_SIGN),), cursor.span(start))
            self._stop(found_span(cursor, found), "`of` follows a function's name, as in `pH of A`")
        if word == "after":
            return After(left, self.read(_BINDS_IN), cursor.span(start))
        value = cursor.quantity()
        if value is not None:
            return Within(left, value, cursor.span(start))
        return Held(left, self.read(_BINDS_SIGN), cursor.span(start))

    def _operand(self) -> Expression:
        cursor = self.cursor
        start = cursor.at
        if cursor.done:
            self._stop(
                cursor.rest(), "the expression ends too early", "add a number, a name or `(`"
            )
        if cursor.takes("("):
            inner = self.read()
            if not cursor.takes(")"):
                self._stop(
                    cursor.source.span(start, start + 1),
                    "`(` opens here and never closes",
                    "add `)`",
                )
            return inner
        if cursor.text[start] in "-−" and not cursor.text[start + 1 : start + 2].isdigit():
            cursor.at += 1
            cursor.blanks()
            return Negative(self.read(_BINDS_SIGN), cursor.span(start))
        if cursor.text[start] == '"':
            return cursor.quoted()
        self._glued()
        value = cursor.quantity(factor=True)
        if value is not None:
            return value
        if not NAME.match(cursor.text, start, cursor.end):
            self._stop(
                cursor.source.span(start, start + 1),
                f"`{cursor.text[start]}` cannot stand here",
                "write a number, a name or `(`",
            )
        name = cursor.name("a name")
        return self._call(name, start) if cursor.takes("(") else name

    def _glued(self) -> None:
        """Refuse `5-3`: within an expression it may be meant as a range or as a difference."""
        cursor = self.cursor
        found = _GLUED.match(cursor.text, cursor.at, cursor.end)
        if found and not NAME.match(cursor.text, cursor.at, cursor.end):
            low, high = found[1], found[2]
            self._stop(
                found_span(cursor, found),
                f"`{found[0]}` can be a range or a difference",
                f"write `{low} - {high}` for the difference, `{low}–{high}` for the range",
            )

    def _call(self, name: Name, start: int) -> Call:
        cursor = self.cursor
        arguments: list[Expression] = []
        if not cursor.takes(")"):
            while True:
                arguments.append(self._argument(name, len(arguments)))
                if cursor.takes(")"):
                    break
                if not cursor.takes(","):
                    self._stop(
                        cursor.source.span(name.span.end, name.span.end + 1),
                        "`(` opens here and never closes"
                        if cursor.done
                        else f"`,` or `)` is expected{cursor.here()}",
                        "add `)`",
                    )
        return Call(name, tuple(arguments), cursor.span(start))

    def _argument(self, name: Name, place: int) -> Expression:
        """Read an argument; an equation of `balance` and the unit of `convert` stay words."""
        cursor = self.cursor
        if name.text == "balance" or (name.text == "convert" and place == 1 and not cursor.done):
            return self._raw_words()
        unit = self.unit_follows
        self.unit_follows = False
        value = self.read()
        self.unit_follows = unit
        if isinstance(value, Measured) and not cursor.done and cursor.text[cursor.at] not in ",)":
            material = cursor.name("a material")
            return Call(
                Name("amount", value.span), (value, material), value.span.through(material.span)
            )
        return value

    def _raw_words(self) -> Words:
        cursor = self.cursor
        start, depth = cursor.at, 0
        while not cursor.done:
            char = cursor.text[cursor.at]
            if char == ")" and depth == 0:
                break
            depth += {"(": 1, ")": -1}.get(char, 0)
            cursor.at += 1
        if not cursor.text[start : cursor.at].strip():
            self._stop(
                cursor.rest(),
                f"something is expected{cursor.here()}",
                "write it, or take the `,` out",
            )
        return Words(cursor.text[start : cursor.at].strip(), cursor.span(start))

    def _stop(self, span: Span, message: str, help_: str | None = None) -> NoReturn:
        self.cursor.stop(codes.EXPRESSION_NOT_READ, span, message, help_)


def found_span(cursor: Cursor, found: re.Match[str]) -> Span:
    """Give the span of a match in the cursor's text."""
    return cursor.source.span(found.start(), found.end())


def read_expression(
    source: Source, start: int, end: int, measures: Mapping[str, float | None] | None = None
) -> tuple[Expression | None, tuple[Finding, ...]]:
    """Read a text that is one expression, as in `expect:`; None and a finding where it is not."""
    cursor = Cursor(source, start, end, measures)
    try:
        expression = ExpressionReader(cursor).read()
        if not cursor.done:
            cursor.stop(
                codes.EXPRESSION_NOT_READ,
                cursor.rest(),
                f"`{cut(cursor.rest().text)}` cannot follow a whole expression",
                "put an operator between, or take it out",
            )
    except StopReading as stop:
        return None, (stop.finding,)
    return expression, ()
