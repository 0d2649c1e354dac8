"""Reading quantities: our own strict reading of number and unit.

A library's parser reads `1,5 mL` as 15 mL, `ca` as a centiyear and `6 N` as newtons. Here every
spelling that can be read in two ways is refused at its column, with the way to write it.

`scan_quantity` reads at an offset and says where it stopped, so that marks, expressions and YAML
values share one reader.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes, units
from watchglass.base import dimensions as dim
from watchglass.base.quantities import Kind, Number, Quantity
from watchglass.base.units import REFUSED, STRENGTHS, UNITS, Unit

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.findings import Code

#: Blanks within a line: the no-break and thin spaces that typesetters put before a unit count too.
BLANKS = " \t\xa0\u2009\u202f"
_DIGITS = re.compile(r"[+\-−]?(?:\d+(?:\.\d+)?|\.\d+)")
_PRODUCT = re.compile(r"\s*[×x*]\s*\d[\d.]*")
_POWER = re.compile(r"[eE]([+\-−]?\d+)(?![\w.])|\s*[×x]\s*10(?:\^([+\-−]?\d+)|([⁻⁺]?[⁰¹²³⁴-⁹]+))")
_ABOUT = re.compile(r"(?:ca\.?|approx\.?|about|[~≈])\s*(?=[\d.+\-−])")
_BOUND = re.compile(r"(>=|<=|≥|≤|>|<)\s*")
_RANGE = re.compile(r"\s*[–—]\s*|(?<=\d)-(?=\.?\d)|\s+to\s+(?=[+\-−.\d])")
_TOLERANCE = re.compile(r"\s*(±|\+/-)\s*")
_SYMBOL = re.compile(r"[A-Za-zµμÅ°º˚℃℉%‰][A-Za-zµμ]*")
#: The degree sign, and two that look like it.
_DEGREES = "°º˚"
_EXPONENT = re.compile(r"\^(?:\((-?\d)\)|(-?\d))|([⁻]?[²³¹⁴])")
_BASIS = re.compile(r"\s*\(?\s*(w/w|w/v|v/v|m/m|m/v|wt|vol)\b(?:\s*\))?")
_GROUPED = re.compile(r"(?:[ \xa0\u2009\u202f'’]\d{3}(?!\d))+(?:[.,]\d+)?")
_COMMA = re.compile(r"\d{1,3}(?:,\d{3})+(?![\d,])(?:\.\d+)?|\d+(?:[., ]\d{3})*,\d+")
_NAME_GOES_ON = re.compile(r"[\w-]")
_SUPERSCRIPT = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺", "0123456789-+")
_VULGAR = re.compile(r"\d*[½⅓¼¾⅔⅛]")
_INTO = re.compile(r"\s+[^\W\d_%(]|\s*[%°]|\s+1(?![\w.])")
_WORDS = re.compile(r"([^\W\d_][\w-]*)(?: [^\W\d_][\w-]*)?")
_LONGEST = 40
#: No quantity is longer than this many characters; only so much is looked at.
_WINDOW = 200
_LARGEST_POWER = 30
_SIGNED = frozenset((dim.NUMBER, dim.VOLTAGE, dim.CURRENT, dim.ENERGY, dim.MOLAR_ENERGY))


@dataclass(frozen=True, slots=True)
class Fault:
    """Why a quantity could not be read: offsets in the text scanned."""

    code: Code
    start: int
    end: int
    message: str
    help: str | None = None


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
        or _DIGITS.match(text, at)
        or _ABOUT.match(text, at)
        or _BOUND.match(text, at)
        or _VULGAR.match(text, at)
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
    number = _number(text, here, factor=factor)
    if not isinstance(number, tuple):
        return number
    value, here = number
    second: Number | None = None
    if kind is Kind.EXACT and (found := _RANGE.match(text, here)):
        high = _number(text, found.end(), factor=factor)
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
        margin = _number(text, found.end(), factor=factor)
        if not isinstance(margin, tuple):
            return margin or Fault(
                codes.NUMBER_NOT_READ,
                found.start(1),
                found.end(1),
                "no number follows `±`",
                "write `2.00 ± 0.05 g`",
            )
        kind, (second, here) = Kind.TOLERANCE, margin
    unit = _unit(text, here, measures)
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
    if not found.measured and (word := _SYMBOL.match(text, start)):
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


def unknown_unit(word: str, start: int) -> Fault:
    """Give the fault for a word that stands where a unit should."""
    end = start + len(word)
    if word in UNITS:
        return Fault(
            codes.UNIT_UNKNOWN,
            start,
            end,
            f"the unit `{word}` runs on into what follows it",
            f"write an exponent as `{word}^2`, and a blank before any other word",
        )
    if (known := REFUSED.get(word)) is not None:
        code = codes.UNIT_AMBIGUOUS if word in ("C", "F", "G", "k") else codes.UNIT_UNKNOWN
        return Fault(
            code, start, end, f"`{word}` is not how the unit is written", f"write `{known}`"
        )
    from watchglass.base.findings import did_you_mean  # noqa: PLC0415 - only when something is wrong

    return Fault(
        codes.UNIT_UNKNOWN,
        start,
        end,
        f"`{word}` is no unit",
        did_you_mean(word, UNITS)
        or "take one of the units in the list, such as `g`, `mL`, `mmol`, `min`",
    )


# ------------------------------------------------------------------------------ numbers


def _number(text: str, at: int, *, factor: bool) -> tuple[Number, int] | Fault | None:
    if found := _VULGAR.match(text, at):
        return Fault(
            codes.NUMBER_NOT_READ,
            at,
            found.end(),
            f"`{found[0]}` is written with a fraction",
            "write it with a decimal point, as in `3.5`",
        )
    found = _DIGITS.match(text, at)
    if found is None:
        return None
    return _comma_or_groups(text, at, found.end()) or _with_power(text, at, found, factor=factor)


def _comma_or_groups(text: str, at: int, after: int) -> Fault | None:
    """Refuse `1,5`, `1.000,5`, `1 000` and `1'000`: each is read differently by different people."""
    if text[after : after + 1] == "," and (found := _COMMA.match(text, at)):
        written = found[0]
        if re.fullmatch(r"\d+,\d{1,2}|\d+,\d{4,}|0,\d+", written):
            help_ = f"write `{written.replace(',', '.')}`"
        elif re.fullmatch(r"\d+(?:[. ]\d{3})+,\d+", written):
            whole, _, decimals = written.partition(",")
            help_ = f"write `{''.join(c for c in whole if c.isdigit())}.{decimals}`"
        elif "." in written:
            help_ = f"write `{written.replace(',', '')}`"
        else:
            plain = "".join(c for c in written if c.isdigit())
            help_ = f"write `{plain}` without commas, or a decimal point for the comma"
        return Fault(
            codes.DECIMAL_COMMA, at, found.end(), f"`{written}` is written with a comma", help_
        )
    if (found := _GROUPED.match(text, after)) and text[at:after].isdigit():
        written = text[at : found.end()]
        plain = "".join(c for c in written.replace(",", ".") if c.isdigit() or c == ".")
        return Fault(
            codes.DIGITS_APART,
            at,
            found.end(),
            f"the digits of `{written}` stand apart",
            f"write `{plain}`",
        )
    return None


def _with_power(
    text: str, at: int, found: re.Match[str], *, factor: bool
) -> tuple[Number, int] | Fault:
    digits, after, power = found[0].replace("−", "-"), found.end(), 0
    if ten := _POWER.match(text, after):
        written = ten[1] or ten[2] or ten[3].translate(_SUPERSCRIPT)
        after = ten.end()
        power = int(written.replace("−", "-")) if len(written) <= 4 else 999
    elif not factor and (times := _PRODUCT.match(text, after)):
        return Fault(
            codes.NUMBER_NOT_READ,
            at,
            times.end(),
            f"`{text[at : times.end()]}` is a product",
            "write one portion in the mark and say with `again` how often",
        )
    if text[after : after + 1] == "." and text[after + 1 : after + 2].isdigit():
        return Fault(
            codes.NUMBER_NOT_READ, at, after + 2, "a number has two decimal points", "take one out"
        )
    if abs(power) > _LARGEST_POWER or len(digits) > _LONGEST:
        return Fault(
            codes.NUMBER_NOT_READ,
            at,
            after,
            "a number is beyond anything that is measured",
            f"keep to {_LONGEST} digits and powers of ten within {_LARGEST_POWER}",
        )
    whole, _, decimals = digits.lstrip("+-").partition(".")
    significant = (whole + decimals).lstrip("0")
    value = float(f"{digits}e{power}") if power else float(digits)
    number = Number(text[at:after], value, max(1, len(significant)), power - len(decimals))
    return number, after


# ------------------------------------------------------------------------------ units


def _unit(
    text: str, at: int, measures: Mapping[str, float | None] | None
) -> tuple[Unit, int] | Fault | None:
    here = at
    while here < len(text) and text[here] in BLANKS:
        here += 1
    if here == at and text[at : at + 1] == "-":
        return None  # `2-propanol` is a name; the mark's reader never comes here for it
    if measures and (count := _measure(text, here, measures)):
        return count
    found = _SYMBOL.match(text, here)
    if found is None:
        return None
    word = found[0]
    if word == "in" and _INTO.match(text, found.end()):
        return None  # `5 in A`, `2 in mL`: the clause word, not the inch
    if word[0] in _DEGREES and word not in UNITS:
        return _degree(text, here, word)
    if word == "N" and not _word_goes_on(text, found.end()):
        return _normality(text, here)
    if word == "%":
        return _percent(text, here)
    if word not in UNITS:
        if word in REFUSED and not _word_goes_on(text, found.end()):
            return unknown_unit(word, here)
        return None
    return _compound(text, here)


def _word_goes_on(text: str, at: int) -> bool:
    return bool(_NAME_GOES_ON.match(text, at))


def _degree(text: str, at: int, word: str) -> Fault:
    after = at + len(word)
    if word[1:] in ("C", "F"):
        return Fault(
            codes.UNIT_UNKNOWN,
            at,
            after,
            f"`{word}` is written with another sign than the degree sign",
            f"write `°{word[1:]}`",
        )
    if len(word) == 1 and (letter := re.compile(r"\s*([CF])\b").match(text, after)):
        return Fault(
            codes.UNIT_AMBIGUOUS,
            at,
            letter.end(),
            "the degree sign stands apart from its letter",
            f"write `°{letter[1]}`",
        )
    return Fault(
        codes.UNIT_AMBIGUOUS,
        at,
        after,
        f"`{word}` does not say on which scale",
        "write `°C` for a temperature",
    )


def _normality(text: str, at: int) -> Fault:
    number = re.compile(r"([\d.]+)\s*$").search(text, 0, at)
    figure = number[1] if number else "1.0"
    return Fault(
        codes.NORMALITY,
        number.start() if number else at,
        at + 1,
        "normality depends on the reaction; `N` is the newton",
        f"write the amount concentration: `{figure} M` where one proton or electron counts,"
        " less where one molecule gives several",
    )


def _percent(text: str, at: int) -> tuple[Unit, int] | Fault:
    after = at + 1
    basis = _BASIS.match(text, after)
    if basis is None:
        return UNITS["%"], after
    written = basis[0].strip()
    if written in STRENGTHS:
        return STRENGTHS[written], basis.end()
    meant = {"m/m": "w/w", "wt": "w/w", "m/v": "w/v", "vol": "v/v"}.get(basis[1], basis[1])
    end = at + 1 + len(basis[0].rstrip())
    return Fault(
        codes.UNIT_UNKNOWN,
        at,
        end,
        f"`{text[at:end]}` is not how the basis is written",
        f"write `% {meant}`",
    )


def _measure(text: str, at: int, measures: Mapping[str, float | None]) -> tuple[Unit, int] | None:
    """Read a countable measure of one or two words; the longer wins."""
    found = _WORDS.match(text, at)
    if found is None:
        return None
    for end in (found.end(), found.end(1)):
        word = text[at:end]
        if word in measures and not _word_goes_on(text, end):
            return Unit(word, dim.COUNT), end
    return None


def _atom(text: str, at: int) -> tuple[Unit, int] | None:
    if text[at : at + 1] == "(":
        inner = _compound_until(text, at + 1)
        if inner and text[inner[1] : inner[1] + 1] == ")":
            return inner[0], inner[1] + 1
        return None
    found = _SYMBOL.match(text, at)
    if found is None or found[0] not in UNITS:
        return None
    unit, after = UNITS[found[0]], found.end()
    if _word_goes_on(text, after) and text[after] != "-" and text[after] not in "²³¹⁴":
        return None  # `m2`, `g3`: not a unit and an exponent
    if (raised := _EXPONENT.match(text, after)) is not None:
        symbol = text[at : raised.end()]
        lifted = units.power(unit, units.exponent_of(raised[raised.lastindex or 0]), symbol=symbol)
        if lifted is not None:
            return lifted, raised.end()
    return unit, after


def _compound_until(text: str, at: int) -> tuple[Unit, int] | None:
    first = _atom(text, at)
    if first is None:
        return None
    unit, here = first
    while here < len(text) and text[here] in "/·*":
        following = _atom(text, here + 1)
        if following is None:
            break
        joined = units.compound(
            unit, following[0], symbol=text[at : following[1]], divide=text[here] == "/"
        )
        if joined is None:
            break
        unit, here = joined, following[1]
    return unit, here


def _compound(text: str, at: int) -> tuple[Unit, int] | Fault | None:
    read = _compound_until(text, at)
    if read is None:
        return None
    _, after = read
    if _word_goes_on(text, after):
        return None
    if text[after : after + 1] == "/" and (word := _SYMBOL.match(text, after + 1)):
        if read[0].offset:
            return _point_divided(text, at, word.end())
        return unknown_unit(word[0], after + 1)
    return read


def _point_divided(text: str, start: int, end: int) -> Fault:
    """Refuse `°C/min`: a temperature point has no share in a rate, a difference has."""
    kelvin = "K" + text[start:end].partition("/")[1] + text[start:end].partition("/")[2]
    return Fault(
        codes.UNIT_UNKNOWN,
        start,
        end,
        f"`{text[start:end]}` divides a temperature point",
        f"write the difference in kelvin: `{kelvin}`",
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
