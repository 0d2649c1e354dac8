"""What the stages report: a code, a place, the fact, and how to mend it.

An author's mistake is a value of type `Finding`; an exception is a bug of ours. Stages return
findings beside their result and never print: the shell sorts, counts and renders them.
"""

from __future__ import annotations

from dataclasses import dataclass
from enum import IntEnum
from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.base.spans import Span


class Severity(IntEnum):
    """How much a finding weighs. An error stops publishing; a note asks for nothing."""

    NOTE = 1
    WARNING = 2
    ERROR = 3

    @property
    def word(self) -> str:
        """The word that stands in print."""
        return self.name.lower()


class Code(NamedTuple):
    """One kind of finding.

    Attributes:
        number: Letter of the subject and three digits, never used again for another kind.
        name: The fault, in words that read well after "accept".
        severity: What a finding of this kind weighs.
        summary: One line that says what is wrong.
        since: Version that first reported it.
    """

    number: str
    name: str
    severity: Severity
    summary: str
    since: str = "0.1"


class Related(NamedTuple):
    """Where another part of the story stands, and what is to be seen there."""

    span: Span
    message: str


class Edit(NamedTuple):
    """A replacement that mends the finding for certain."""

    span: Span
    text: str


@dataclass(frozen=True, slots=True, kw_only=True)
class Finding:
    """One fault in what an author wrote.

    Attributes:
        code: Its kind, from `watchglass.base.codes`.
        span: The narrowest text that is wrong.
        message: The fact with the author's own words and figures; lower case, no full stop.
        label: A few words to stand beside the underlined text.
        related: Where the other half of the story stands.
        help: What to write instead; begins with a verb, what can be typed stands in backticks.
        fix: Only where it is certain.
    """

    code: Code
    span: Span
    message: str
    label: str | None = None
    related: tuple[Related, ...] = ()
    help: str | None = None
    fix: Edit | None = None


def near(word: str, known: Iterable[str], *, most: int = 3) -> tuple[str, ...]:
    """Find known names so near to a word that they may be what was meant; best first."""
    from difflib import get_close_matches  # noqa: PLC0415 - only when something is wrong

    table: dict[str, str] = {}
    for name in known:
        table.setdefault(name.casefold(), name)
    found = get_close_matches(word.casefold(), table, n=most, cutoff=0.72)
    return tuple(table[name] for name in found)


def did_you_mean(word: str, known: Iterable[str]) -> str | None:
    """Put near names into a help text; None where nothing is near."""
    names = near(word, known)
    if not names:
        return None
    return "did you mean " + " or ".join(f"`{name}`" for name in names) + "?"
