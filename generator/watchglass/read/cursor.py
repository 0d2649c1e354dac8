"""A place in a source between two ends, with what the readers of marks and expressions need."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NoReturn

from watchglass.base import codes, units
from watchglass.base.findings import Finding
from watchglass.base.scan import BLANKS, Fault, Found, scan_quantity, starts_quantity
from watchglass.read.terms import Measured, Name, Words
from watchglass.read.words import NAME

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.findings import Code
    from watchglass.base.spans import Source, Span
#: A last word, an arrow or another sign.
_LAST = re.compile(r"(?:[^\W_](?:[\w-]*[^\W_])?|->|[<>]=|\S)\Z")
_LONGEST_WORD = 60


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
