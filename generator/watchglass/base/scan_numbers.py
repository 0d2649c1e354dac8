"""Reading numbers: digits kept, every spelling that people read in two ways refused."""

from __future__ import annotations

import re

from watchglass.base import codes
from watchglass.base.fault import Fault
from watchglass.base.quantities import Number

DIGITS = re.compile(r"[+\-−]?(?:\d+(?:\.\d+)?|\.\d+)")
_PRODUCT = re.compile(r"\s*[×x*]\s*\d[\d.]*")
_POWER = re.compile(r"[eE]([+\-−]?\d+)(?![\w.])|\s*[×x]\s*10(?:\^([+\-−]?\d+)|([⁻⁺]?[⁰¹²³⁴-⁹]+))")
_GROUPED = re.compile(r"(?:[ \xa0\u2009\u202f'’]\d{3}(?!\d))+(?:[.,]\d+)?")
_COMMA = re.compile(r"\d{1,3}(?:,\d{3})+(?![\d,])(?:\.\d+)?|\d+(?:[., ]\d{3})*,\d+")
_SUPERSCRIPT = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺", "0123456789-+")
VULGAR = re.compile(r"\d*[½⅓¼¾⅔⅛]")
_LONGEST = 40
_LARGEST_POWER = 30


def read_number(text: str, at: int, *, factor: bool) -> tuple[Number, int] | Fault | None:
    """Read the number at an offset.

    Args:
        text: Any text.
        at: Where the number begins.
        factor: Whether a sign of multiplication may follow, as in an expression.

    Returns:
        The number and the offset after it, the fault, or None where no number begins.
    """
    if found := VULGAR.match(text, at):
        return Fault(
            codes.NUMBER_NOT_READ,
            at,
            found.end(),
            f"`{found[0]}` is written with a fraction",
            "write it with a decimal point, as in `3.5`",
        )
    found = DIGITS.match(text, at)
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
