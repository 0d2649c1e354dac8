"""Quantities, formulas and units set for the eye: spaces that do not break, true minus signs."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base.quantities import Kind
from watchglass.chemistry.formulas import PartKind
from watchglass.publish.model import Lowered, Raised, Run

if TYPE_CHECKING:
    from watchglass.base.quantities import Number, Quantity
    from watchglass.chemistry.formulas import Formula
    from watchglass.publish.model import Words

NBSP = "\N{NO-BREAK SPACE}"
_JOIN = "\N{WORD JOINER}"
_POWER = re.compile(r"\^(?:\((-?\d+)\)|(-?\d+))|([⁻]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+)")
_PLAIN = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")
_ALIKE = {
    "ml": "mL",
    "μL": "µL",
    "uL": "µL",
    "ul": "µL",
    "degC": "°C",
    "℃": "°C",
    "degF": "°F",
    "um": "µm",
    "ug": "µg",
    "umol": "µmol",
    "uM": "µM",
}


def unit_words(symbol: str) -> tuple[Words, ...]:
    """Set a unit: exponents raised, the basis of a percentage kept together."""
    symbol = (
        _ALIKE.get(symbol, symbol)
        .replace(" ", NBSP)
        .replace("w/", f"w/{_JOIN}")
        .replace("v/", f"v/{_JOIN}")
    )
    words: list[Words] = []
    at = 0
    for found in _POWER.finditer(symbol):
        if found.start() > at:
            words.append(Run(symbol[at : found.start()]))
        words.append(Raised(found[found.lastindex or 0].translate(_PLAIN).replace("-", "−")))
        at = found.end()
    if at < len(symbol):
        words.append(Run(symbol[at:]))
    return tuple(words)


def digits_words(text: str) -> tuple[Words, ...]:
    """Set a number: minus for hyphen, powers of ten raised."""
    mantissa, times, exponent = text.replace("-", "−").partition(" × 10^")
    if not times:
        return (Run(mantissa),)
    return (Run(f"{mantissa}{NBSP}×{NBSP}10"), Raised(exponent))


def number_words(number: Number) -> tuple[Words, ...]:
    """Set a number as written."""
    text = number.text.replace("+", "").replace("x", "×")
    found = re.fullmatch(r"([−-]?[\d.]+)(?:[eE]|\s*×\s*10\^?)([⁻−\-\d⁰¹²³⁴⁵⁶⁷⁸⁹]+)", text)
    if found:
        exponent = found[2].translate(_PLAIN)
        return digits_words(f"{found[1]} × 10^{exponent}")
    return digits_words(text)


def value_words(digits: str, symbol: str) -> tuple[Words, ...]:
    """Set a computed figure with its unit."""
    unit = unit_words(symbol)
    return (*digits_words(digits), *((Run(NBSP), *unit) if unit else ()))


def quantity_words(quantity: Quantity) -> tuple[Words, ...]:
    """Set a quantity as its author meant it: range, approximation, tolerance, bound."""
    words: list[Words] = []
    match quantity.kind:
        case Kind.ABOUT:
            words.append(Run(f"about{NBSP}"))
        case Kind.BOUND:
            said = {">=": "at least", ">": "more than", "<=": "at most", "<": "less than"}
            words.append(Run(f"{said[quantity.bound or '>=']}{NBSP}"))
        case _:
            pass
    words += number_words(quantity.number)
    if quantity.second is not None:
        ranged = quantity.kind is Kind.RANGE
        negative = quantity.number.value < 0 or quantity.second.value < 0
        words.append(
            Run(f"{NBSP}to{NBSP}" if ranged and negative else "–" if ranged else f"{NBSP}±{NBSP}")
        )
        words += number_words(quantity.second)
    if quantity.unit.symbol:
        words += (Run(NBSP), *unit_words(quantity.unit.symbol))
    return joined(words)


def formula_words(formula: Formula) -> tuple[Words, ...]:
    """Set a formula: counts lowered, charge raised, all else on the line."""
    words: list[Words] = []
    for kind, text in formula.parts:
        match kind:
            case PartKind.COUNT:
                words.append(Lowered(text))
            case PartKind.CHARGE:
                words.append(Raised(text.replace("-", "−")))
            case _:
                words.append(Run(text))
    return joined(words)


def joined(words: list[Words] | tuple[Words, ...]) -> tuple[Words, ...]:
    """Join plain words that stand side by side."""
    result: list[Words] = []
    for word in words:
        last = result[-1] if result else None
        if isinstance(word, Run) and isinstance(last, Run):
            result[-1] = Run(last.text + word.text)
        elif not (isinstance(word, Run) and not word.text):
            result.append(word)
    return tuple(result)
