"""Expressions: the small language of figures, records and expectations.

A hand-written Pratt parser on the source text itself, so that every node has its place and every
fault its column and cause. Units bind first after a number (`6 g/mL` is one quantity); a minus
sign stands between blanks, since elsewhere a hyphen belongs to a name. No statements, no access
to anything but the documented functions; those are typed in resolve and evaluated in run.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NamedTuple, NoReturn

from watchglass.base import codes, units
from watchglass.base.findings import Finding
from watchglass.base.scan import BLANKS, Fault, Found, scan_quantity, starts_quantity
from watchglass.read.syntax import Measured, Name, Words
from watchglass.read.words import NAME

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.findings import Code
    from watchglass.base.spans import Source, Span

DEEPEST = 40
#: Operators of one expression: a longer chain is a tree too deep to be walked.
MOST_OPERATORS = 100
_COMPARISONS = ("<=", ">=", "≤", "≥", "<", ">")
_POWERS = {"+": 10, "-": 10, "*": 20, "·": 20, "×": 20, "/": 20, "^": 40}
_BINDS_COMPARISON, _BINDS_AFTER, _BINDS_IN, _BINDS_SIGN = 2, 4, 6, 30
_GLUED = re.compile(r"(\d[\d.]*)-(\d[\d.]*)")
_ONE_A_LINE = "write one to a line"
#: A last word, an arrow or another sign.
_LAST = re.compile(r"(?:[^\W_](?:[\w-]*[^\W_])?|->|[<>]=|\S)\Z")
_LONGEST_WORD = 60
_WORD_TIE = re.compile(r"(in|on|after|of)\b")


class Call(NamedTuple):
    """A function with its arguments; `pH of A` is `ph(A)`."""

    function: Name
    arguments: tuple[Expression, ...]
    span: Span


class Binary(NamedTuple):
    """`+ - * / ^` between two expressions; `*` for every sign of multiplication."""

    operator: str
    left: Expression
    right: Expression
    span: Span


class Negative(NamedTuple):
    """A minus sign before an expression."""

    operand: Expression
    span: Span


class Compare(NamedTuple):
    """`>= > <= <` between two expressions."""

    operator: str
    left: Expression
    right: Expression
    span: Span


class Within(NamedTuple):
    """`… in 9–11`: a value lies in a range."""

    operand: Expression
    range: Measured
    span: Span


class Held(NamedTuple):
    """`X in V` or `X on V`: a substance in a vessel."""

    substance: Expression
    vessel: Expression
    span: Span


class After(NamedTuple):
    """`… after label(x)`: a value at the state with that label."""

    operand: Expression
    state: Expression
    span: Span


Expression = Measured | Name | Words | Call | Binary | Negative | Compare | Within | Held | After


class StopReading(Exception):  # noqa: N818 - no error: it ends one act
    """Ends the reading of one act or expression; carries the finding. Never leaves `read`."""

    def __init__(self, finding: Finding) -> None:
        """Keep the finding."""
        super().__init__(finding.message)
        self.finding = finding


class Cursor:
    """A place in a source between two ends, with what both readers of marks need."""

    __slots__ = ("at", "end", "measures", "source", "text")

    def __init__(
        self, source: Source, start: int, end: int, measures: Mapping[str, float | None] | None
    ) -> None:
        """Begin at `start`; nothing at or beyond `end` is looked at."""
        self.source = source
        self.text = source.text
        self.at = start
        self.end = end
        self.measures = measures
        self.blanks()

    def blanks(self) -> None:
        """Skip blanks."""
        text, at, end = self.text, self.at, self.end
        while at < end and text[at] in BLANKS:
            at += 1
        self.at = at

    @property
    def done(self) -> bool:
        """True at the end."""
        return self.at >= self.end

    def span(self, start: int) -> Span:
        """Give the span from `start` to here, without blanks at its end."""
        end = self.at
        while end > start and self.text[end - 1] in BLANKS:
            end -= 1
        return self.source.span(start, end)

    def rest(self) -> Span:
        """Give the span of what is left; at the end that of the last word or sign before it."""
        end = self.end
        while end > self.at and self.text[end - 1] in BLANKS:
            end -= 1
        if end > self.at:
            return self.source.span(self.at, end)
        end = min(self.at, len(self.text))
        while end > 1 and self.text[end - 1] in BLANKS:
            end -= 1
        found = _LAST.search(self.text, max(0, end - _LONGEST_WORD), end)
        start = found.start() if found else max(0, end - 1)
        return self.source.span(start, max(end, start + 1))

    def takes(self, literal: str) -> bool:
        """Go past `literal` and blanks after it, if it stands here."""
        if self.text.startswith(literal, self.at, self.end):
            self.at += len(literal)
            self.blanks()
            return True
        return False

    def peek_word(self) -> str:
        """Give the name-like word that begins here, or nothing."""
        found = NAME.match(self.text, self.at, self.end)
        return found[0] if found else ""

    def takes_word(self, word: str) -> bool:
        """Go past a whole word and blanks after it, if it stands here."""
        if self.peek_word() == word:
            self.at += len(word)
            self.blanks()
            return True
        return False

    def name(self, expected: str) -> Name:
        """Read a name; stop with what was expected where there is none."""
        if self.text.startswith('"', self.at, self.end):
            words = self.quoted()
            return Name(words.text, words.span, quoted=True)
        found = NAME.match(self.text, self.at, self.end)
        if found is None:
            self.stop(codes.MARK_NOT_READ, self.rest(), f"{expected} is expected{self.here()}")
        start = self.at
        self.at = found.end()
        span = self.source.span(start, self.at)
        self.blanks()
        return Name(found[0], span)

    def quoted(self) -> Words:
        """Read text in double quotes."""
        start = self.at
        close = self.text.find('"', start + 1, self.end)
        if close < 0:
            self.stop(
                codes.MARK_NOT_READ,
                self.source.span(start, start + 1),
                "a quote opens and never closes",
                'add `"`',
            )
        self.at = close + 1
        words = Words(self.text[start + 1 : close], self.source.span(start, close + 1))
        self.blanks()
        return words

    def quantity(self, *, factor: bool = False) -> Measured | None:
        """Read a quantity if one begins here; stop at a faulty one. `factor`: it may be multiplied."""
        if self.done or not starts_quantity(self.text, self.at):
            return None
        if NAME.match(self.text, self.at, self.end) and not self.text[self.at].isalpha():
            return None  # `2-propanol`
        found = scan_quantity(self.text, self.at, self.end, measures=self.measures, factor=factor)
        if isinstance(found, Fault):
            self.stop(
                found.code, self.source.span(found.start, found.end), found.message, found.help
            )
        if not isinstance(found, Found):
            return None
        start = self.at
        self.at = found.end
        span = self.source.span(start, found.end)
        self.blanks()
        return Measured(found.quantity, span)

    def here(self) -> str:
        """Say what stands here, for a message."""
        return "" if self.done else f" at `{cut(self.rest().text)}`"

    def stop(self, code: Code, span: Span, message: str, help_: str | None = None) -> NoReturn:
        """Stop reading with a finding."""
        raise StopReading(Finding(code=code, span=span, message=message, help=help_))


def cut(text: str, most: int = 30) -> str:
    """Shorten words for a message."""
    return text if len(text) <= most else text[:most] + "…"


def ends_in_unit(cursor: Cursor) -> bool:
    """Tell whether a unit, and nothing else, stands from here to the end."""
    text = cursor.text[cursor.at : cursor.end].strip()
    if text == "1" or text in units.UNITS:
        return True
    found = scan_quantity("1 " + text, 0)
    return isinstance(found, Found) and found.measured and found.end == len(text) + 2


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
