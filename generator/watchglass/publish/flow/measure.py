"""How wide words are, without a font at hand, and where they are broken.

Widths are generous averages per class of characters, of the wide sans serifs that the handbook
falls back on (advances in thousandths of the font size, rounded up). Own measure, no source: what
is set in a narrower face leaves air, never too little room.
"""

from __future__ import annotations

from functools import lru_cache

#: Sizes of the drawing, px.
SIZE, LEADING = 12.0, 15.0
#: Heads are bold, which is wider.
BOLD = 1.14

_CLASSES = (
    ("ijl|'.,:;!·", 340),
    ("frt()[]-/‑ \N{NO-BREAK SPACE}", 430),
    ('ckvxyzsJ°“”"', 600),
    ("abdeghnopqu0123456789L", 645),
    ("mw", 1000),
    ("MW%@—", 1030),
    ("₀₁₂₃₄₅₆₇₈₉⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻", 450),
)
_WIDTHS = {ord(c): width for chars, width in _CLASSES for c in chars}
_OTHER, _WIDE = 840, 1050
_NBSP = "\N{NO-BREAK SPACE}"
_JOINTS = f"-{_NBSP}"
#: Parts of names after which a name may be broken.
_PARTS = ("hydrogen", "methyl", "ethyl", "phenyl", "chloro", "nitro", "acetyl")
#: From here on scripts have characters as wide as high.
_WIDE_FROM = 0x2E80


@lru_cache(8192)
def width(text: str, *, bold: bool = False) -> float:
    """Give the width of a line, px."""
    get = _WIDTHS.get
    total = 0
    for c in text:
        code = ord(c)
        total += get(code) or (_OTHER if code < _WIDE_FROM else _WIDE)
    return total * SIZE / 1000 * (BOLD if bold else 1.0)


def wrapped(text: str, most: float, *, bold: bool = False) -> list[str]:
    """Break words into lines no wider than `most` px, at spaces; a longer word within itself."""
    lines: list[str] = []
    line, used = "", 0.0
    space = width(" ", bold=bold)
    for word in text.split(" "):
        size = width(word, bold=bold)
        if line and used + space + size <= most:
            line, used = f"{line} {word}", used + space + size
            continue
        if line:
            lines.append(line)
        line, used = word, size
        while used > most:
            begin, line = _broken(line, most, bold=bold)
            lines.append(begin)
            used = width(line, bold=bold)
    if line:
        lines.append(line)
    return lines


def _broken(word: str, most: float, *, bold: bool) -> tuple[str, str]:
    """Break a word that is too long for a line: where it is joined, or else with a hyphen."""
    count = 1
    room = most - width("-", bold=bold)
    while count < len(word) - 1 and width(word[: count + 1], bold=bold) <= room:
        count += 1
    for at in range(count, 2, -1):
        if word[at - 1] in _JOINTS:
            return word[:at].rstrip(_NBSP), word[at:]
    for part in _PARTS:
        at = word.rfind(part, 0, count) + len(part)
        if len(part) <= at <= count:
            return f"{word[:at]}-", word[at:]
    return f"{word[:count]}-", word[count:]
