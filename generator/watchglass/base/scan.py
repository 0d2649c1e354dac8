"""Reading quantities: our own strict reading of number and unit.

A library's parser reads `1,5 mL` as 15 mL, `ca` as a centiyear and `6 N` as newtons. Here every
spelling that can be read in two ways is refused at its column, with the way to write it.

`scan_quantity` reads at an offset and says where it stopped, so that marks, expressions and YAML
values share one reader.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes, units
from watchglass.base import dimensions as dim
from watchglass.base.fault import Fault
from watchglass.base.quantities import Kind, Number, Quantity
from watchglass.base.scan_numbers import DIGITS, VULGAR, read_number
from watchglass.base.scan_units import BLANKS, SYMBOL, read_unit, unknown_unit

__all__ = [
    "BLANKS",
    "Fault",
    "Found",
    "left_over",
    "read_quantity",
    "scan_quantity",
    "starts_quantity",
    "unknown_unit",
]

if TYPE_CHECKING:
    from collections.abc import Mapping


_ABOUT = re.compile(r"(?:ca\.?|approx\.?|about|[~≈])\s*(?=[\d.+\-−])")
_BOUND = re.compile(r"(>=|<=|≥|≤|>|<)\s*")
_RANGE = re.compile(r"\s*[–—]\s*|(?<=\d)-(?=\.?\d)|\s+to\s+(?=[+\-−.\d])")
_TOLERANCE = re.compile(r"\s*(±|\+/-)\s*")
#: No quantity is longer than this many characters; only so much is looked at.
_WINDOW = 200
_SIGNED = frozenset((dim.NUMBER, dim.VOLTAGE, dim.CURRENT, dim.ENERGY, dim.MOLAR_ENERGY))


class Found(NamedTuple):
    """A quantity, where its number ends and where it ends."""

    quantity: Quantity
    end: int
    measured: bool  # a unit stood there


Scan = Found | Fault | None


def starts_quantity(text: str, at: int) -> bool:
    """Tell whether a number, or a word that only stands before one, begins here."""
    if at >= len(text):
        return False
    first = text[at]
    if first.isalpha():
        return first in "ca" and _ABOUT.match(text, at) is not None
    return bool(
        first.isdigit()
        or DIGITS.match(text, at)
        or _ABOUT.match(text, at)
        or _BOUND.match(text, at)
        or VULGAR.match(text, at)
    )


def scan_quantity(
    text: str,
    at: int,
    end: int | None = None,
    *,
    measures: Mapping[str, float | None] | None = None,
    factor: bool = False,
) -> Scan:
    """Read the quantity that begins at an offset.

    Args:
        text: Any text.
        at: Where the quantity begins; leading blanks are not skipped.
        end: Where to stop; the end of the text by default.
        measures: Countable measures (`drop`, `spatula tip`) that may stand for a unit.
        factor: Whether a sign of multiplication may follow, as in an expression.

    Returns:
        The quantity and the offset after it (a number without a unit has `measured` false and
        `units.NONE`), the fault, or None where no number begins.
    """
    stop = len(text) if end is None else end
    found = _scan(text[at : min(stop, at + _WINDOW)], measures, factor=factor)
    match found:
        case Found(quantity, after, measured):
            return Found(quantity, at + after, measured)
        case Fault(code, start, after, message, help_):
            return Fault(code, at + start, at + after, message, help_)
        case None:
            return None


def _scan(text: str, measures: Mapping[str, float | None] | None, *, factor: bool) -> Scan:
    """Read the quantity at the start of a text; offsets count from there."""
    at = here = 0
    kind, bound = Kind.EXACT, None
    if found := _ABOUT.match(text, here):
        kind, here = Kind.ABOUT, found.end()
    elif found := _BOUND.match(text, here):
        kind, here = Kind.BOUND, found.end()
        bound = {"≥": ">=", "≤": "<="}.get(found[1], found[1])
    number = read_number(text, here, factor=factor)
    if not isinstance(number, tuple):
        return number
    value, here = number
    second: Number | None = None
    if kind is Kind.EXACT and (found := _RANGE.match(text, here)):
        high = read_number(text, found.end(), factor=factor)
        if isinstance(high, Fault):
            return high
        if high is not None:
            kind, (second, here) = Kind.RANGE, high
            if second.value < value.value:
                return Fault(
                    codes.RANGE_REVERSED,
                    at,
                    here,
                    f"the range ends at {second.text}, below its start {value.text}",
                    f"write `{second.text}–{value.text}`",
                )
    elif kind is Kind.EXACT and (found := _TOLERANCE.match(text, here)):
        margin = read_number(text, found.end(), factor=factor)
        if not isinstance(margin, tuple):
            return margin or Fault(
                codes.NUMBER_NOT_READ,
                found.start(1),
                found.end(1),
                "no number follows `±`",
                "write `2.00 ± 0.05 g`",
            )
        kind, (second, here) = Kind.TOLERANCE, margin
    unit = read_unit(text, here, measures)
    if isinstance(unit, Fault):
        return unit
    measure, after = unit or (units.NONE, here)
    quantity = Quantity(text[at:after], kind, value, measure, second, bound)
    return _impossible(quantity, at, after) or Found(quantity, after, unit is not None)


def read_quantity(
    text: str, *, measures: Mapping[str, float | None] | None = None
) -> Quantity | Fault:
    """Read a text that is one quantity and nothing else; blanks around it are allowed."""
    start = len(text) - len(text.lstrip())
    end = len(text.rstrip())
    found = scan_quantity(text, start, end, measures=measures)
    if found is None:
        return Fault(
            codes.NUMBER_NOT_READ,
            start,
            max(end, start),
            f"`{text.strip()}` is not a quantity",
            "write a number and a unit, as in `2.50 g`",
        )
    if isinstance(found, Found) and found.end < end:
        return left_over(text, found, end)
    return found if isinstance(found, Fault) else found.quantity


def left_over(text: str, found: Found, end: int) -> Fault:
    """Say what is wrong with text that goes on after a quantity."""
    start = found.end
    while start < end and text[start].isspace():
        start += 1
    rest = text[start:end]
    if not found.measured and (word := SYMBOL.match(text, start)):
        return unknown_unit(word[0], start)
    if rest[0].isdigit():
        return Fault(
            codes.NUMBER_NOT_READ,
            start,
            end,
            f"a second number, `{rest}`, follows `{text[: found.end].strip()}`",
            "write one number with one unit, as in `150 min`",
        )
    return Fault(
        codes.NUMBER_NOT_READ,
        start,
        end,
        f"`{rest}` cannot follow a quantity",
        "take it out, or put it into the sentence",
    )


# ------------------------------------------------------------------------------ sense


def _impossible(quantity: Quantity, start: int, end: int) -> Fault | None:
    """Refuse what cannot be: below absolute zero, a negative mass, volume, time or share."""
    dimension, text = quantity.dimension, quantity.text
    cold = dimension == dim.TEMPERATURE or quantity.unit.symbol == "K"
    if cold and quantity.si < 0:
        return Fault(
            codes.BELOW_ABSOLUTE_ZERO,
            start,
            end,
            f"`{text}` is below absolute zero",
            "absolute zero is -273.15 °C, 0 K",
        )
    signed = cold or dimension in _SIGNED
    if not signed and quantity.number.value < 0:
        return Fault(
            codes.QUANTITY_NEGATIVE,
            start,
            end,
            f"`{text}` is negative, and {dimension.words} cannot be",
            "take the minus sign out",
        )
    return None
