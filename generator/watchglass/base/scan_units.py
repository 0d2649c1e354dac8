"""Reading units: the closed list, compounds of it, and the way to write what is not in it."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base import codes, units
from watchglass.base import dimensions as dim
from watchglass.base.fault import Fault
from watchglass.base.units import REFUSED, STRENGTHS, UNITS, Unit

if TYPE_CHECKING:
    from collections.abc import Mapping

#: Blanks within a line: the no-break and thin spaces that typesetters put before a unit count too.
BLANKS = " \t\xa0\u2009\u202f"
SYMBOL = re.compile(r"[A-Za-zµμÅ°º˚℃℉%‰][A-Za-zµμ]*")
#: The degree sign, and two that look like it.
_DEGREES = "°º˚"
_EXPONENT = re.compile(r"\^(?:\((-?\d)\)|(-?\d))|([⁻]?[²³¹⁴])")
_BASIS = re.compile(r"\s*\(?\s*(w/w|w/v|v/v|m/m|m/v|wt|vol)\b(?:\s*\))?")
_NAME_GOES_ON = re.compile(r"[\w-]")
_INTO = re.compile(r"\s+[^\W\d_%(]|\s*[%°]|\s+1(?![\w.])")
_WORDS = re.compile(r"([^\W\d_][\w-]*)(?: [^\W\d_][\w-]*)?")


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


def read_unit(
    text: str, at: int, measures: Mapping[str, float | None] | None
) -> tuple[Unit, int] | Fault | None:
    """Read the unit after a number, blanks before it skipped.

    Returns:
        The unit and the offset after it, the fault of a spelling that is refused, or None where no
        unit stands: the word then is a material's.
    """
    here = at
    while here < len(text) and text[here] in BLANKS:
        here += 1
    if here == at and text[at : at + 1] == "-":
        return None  # `2-propanol` is a name; the mark's reader never comes here for it
    if measures and (count := _measure(text, here, measures)):
        return count
    found = SYMBOL.match(text, here)
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
    found = SYMBOL.match(text, at)
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
    if text[after : after + 1] == "/" and (word := SYMBOL.match(text, after + 1)):
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
