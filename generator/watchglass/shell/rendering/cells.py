"""Characters as a terminal shows them: how many columns wide, and which only as escapes.

What an author wrote may hold anything, a sequence that clears the screen or one that turns the
reading direction included. Nothing of that kind is ever written raw: control characters, format
characters (the bidirectional and the zero-width ones) and lone surrogates are shown by their
number, as `<U+202E>`. A check that hides what it complains about would be worth little.

Widths follow Unicode's East Asian Width: wide and fullwidth characters take two columns, marks
that combine take none, ambiguous ones take one as terminals of most locales have it. Terminals
disagree about emoji put together from several characters; these are taken piece by piece.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache
from unicodedata import category, east_asian_width

TAB = 4
"""Columns between tab stops, as CommonMark counts them."""

_UNSAFE = frozenset({"Cc", "Cf", "Cs", "Zl", "Zp"})
_WITHOUT_WIDTH = frozenset({"Mn", "Me"})
_DOTTED_CIRCLE = "\u25cc"
_JAMO_FIRST, _JAMO_LAST = "\u1160", "\u11ff"


@lru_cache(maxsize=4096)
def shown(char: str, *, unicode: bool = True) -> str:
    """Give what is printed for one character: itself, or its number where it is unsafe."""
    if " " <= char <= "~":
        return char
    if category(char) in _UNSAFE or not (unicode or char.isascii()):
        return f"<U+{ord(char):04X}>"
    return char


@lru_cache(maxsize=4096)
def width(char: str) -> int:
    """Give the columns a printable character takes: 0, 1 or 2."""
    if char.isascii():
        return 1
    if category(char) in _WITHOUT_WIDTH or _JAMO_FIRST <= char <= _JAMO_LAST:
        return 0
    return 2 if east_asian_width(char) in {"W", "F"} else 1


def text_width(text: str) -> int:
    """Give the columns a printable text takes."""
    return len(text) if text.isascii() else sum(map(width, text))


def visible(text: str, *, unicode: bool = True, lines: bool = False) -> str:
    r"""Make a text safe to print on one line.

    Args:
        text: Any text.
        unicode: Whether characters beyond ASCII can be shown.
        lines: Whether line ends may stay; otherwise they become `\n`.

    Returns:
        The text with tabs as `\t`, line ends as said, and unsafe characters as their numbers.
    """
    if text.isascii() and text.isprintable():
        return text
    named = {"\t": r"\t", "\n": "\n" if lines else r"\n", "\r": r"\r"}
    return "".join(named.get(char) or shown(char, unicode=unicode) for char in text)


@dataclass(frozen=True, slots=True)
class Row:
    """One line of a source, laid out.

    Attributes:
        pieces: What is printed for each character.
        columns: The column (from 0) each character starts at, and after them the row's width.
    """

    pieces: tuple[str, ...]
    columns: tuple[int, ...]

    @property
    def width(self) -> int:
        """Columns the whole row takes."""
        return self.columns[-1]

    def stretch(self, start: int, end: int) -> tuple[int, int]:
        """Give the columns of characters `start` to `end`; never less than one column.

        A mark that combines has no column of its own, so it is pointed at by its base's. An empty
        stretch is the column before which something is missing.
        """
        first, last = self.columns[start], self.columns[end]
        at = start
        while first == last and start < end and at > 0:
            at -= 1
            first = self.columns[at]
        return first, max(last, first + 1)


def lay_out(line: str, *, unicode: bool = True) -> Row:
    """Lay out one line without its line end; tabs reach to the next tab stop."""
    pieces: list[str] = []
    columns = [0]
    column = 0
    for char in line:
        piece = " " * (TAB - column % TAB) if char == "\t" else shown(char, unicode=unicode)
        wide = width(piece) if len(piece) == 1 else len(piece)
        if wide == 0 and column == 0:
            piece, wide = _DOTTED_CIRCLE + piece, 1
        pieces.append(piece)
        column += wide
        columns.append(column)
    return Row(tuple(pieces), tuple(columns))
