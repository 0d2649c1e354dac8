"""Quantities multiplied by a factor, written as a person would measure them.

A scaled figure is an instruction, not a measurement: `15 mL` times 1.5 is `22.5 mL`, since `23 mL`
would change the recipe. It keeps the figures that were written, and takes one or two more only
where rounding to them would change the amount by more than `CHANGE`.
"""

from __future__ import annotations

from decimal import ROUND_HALF_EVEN, Decimal
from math import floor, log10
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.figures import MOST_FIGURES, rounded, shown
from watchglass.base.quantities import Kind, Number

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity

#: Most that rounding may change an amount [-]; of a range or an approximation, which are meant
#: loosely, the second. Common practice, no source.
CHANGE, LOOSE_CHANGE = 0.01, 0.05
#: Figures that may be added to those written.
_MORE = 2

EXTENSIVE = (dim.MASS, dim.VOLUME, dim.AMOUNT, dim.COUNT)


class Scaled(NamedTuple):
    """A scaled quantity.

    Attributes:
        quantity: As it is to be measured, with its text.
        change: How much rounding changed it, as a share of the exact amount [-], >= 0.
    """

    quantity: Quantity
    change: float


def scaled(quantity: Quantity, factor: float, *, step: float | None = None) -> Scaled:
    """Multiply an extensive quantity by a factor.

    Args:
        quantity: A mass, volume, amount of substance or count, of any kind (a range is scaled at
            both ends, a tolerance with its value).
        factor: Greater than 0 [-].
        step: Finest step that can be measured, in the quantity's SI unit; None where that is not
            known. A figure is never finer than it.

    Returns:
        The quantity with at least the figures written, never finer than `step`.

    >>> from watchglass.base.scan import read_quantity
    >>> [scaled(read_quantity(q), 1.5).quantity.text for q in ("15 mL", "0.90 g", "2–3 mL")]
    ['22.5 mL', '1.35 g', '3.0–4.5 mL']
    """
    unit = quantity.unit
    fine = Decimal(f"{step / unit.factor:.6g}") if step else None
    if quantity.dimension == dim.COUNT:
        fine = Decimal(1)
    allowed = LOOSE_CHANGE if quantity.kind in (Kind.ABOUT, Kind.RANGE) else CHANGE
    number, change = _scaled(quantity.number, factor, fine, allowed)
    second = None
    if quantity.second is not None:
        tolerance = quantity.kind is Kind.TOLERANCE
        second, more = (
            _scaled(quantity.second, factor, None, 4 * LOOSE_CHANGE)
            if tolerance
            else _scaled(quantity.second, factor, fine, allowed)
        )
        change = change if tolerance else max(change, more)
        if quantity.kind is Kind.RANGE:
            number, second = _alike(number, second)
    symbol = unit.symbol
    if quantity.dimension == dim.COUNT:
        symbol = _counted(symbol, (second or number).value)
    result = quantity._replace(
        number=number, second=second, unit=unit._replace(symbol=symbol), text=""
    )
    return Scaled(result._replace(text=_text(result)), change)


def _scaled(
    number: Number, factor: float, step: Decimal | None, allowed: float
) -> tuple[Number, float]:
    """Scale one number; give it with the share by which rounding changed it."""
    exact = number.value * factor
    if exact == 0:
        return number, 0.0
    figures = min(number.figures, MOST_FIGURES)
    value = rounded(exact, figures)
    while abs(float(value) - exact) > allowed * abs(exact) and figures < min(
        number.figures + _MORE, MOST_FIGURES
    ):
        figures += 1
        value = rounded(exact, figures)
    if step is not None and (_place(value) < _place(step) or value % step):
        turns = (Decimal(f"{exact:.12g}") / step).quantize(Decimal(1), ROUND_HALF_EVEN)
        value = (max(turns, Decimal(1)) * step).quantize(step)
        figures = max(1, value.adjusted() - _place(value) + 1)
    digits = shown(float(value), figures)
    place = floor(log10(abs(float(value))) + 1e-9) - figures + 1
    if place > 0 and "×" not in digits:  # noughts before the point are read as figures
        figures, place = figures + place, 0
    change = abs(float(value) - exact) / abs(exact)
    return Number(digits, float(value), figures, place), change


def _place(value: Decimal) -> int:
    exponent = value.as_tuple().exponent
    return exponent if isinstance(exponent, int) else 0


def _alike(low: Number, high: Number) -> tuple[Number, Number]:
    """Write both ends of a range to the same place."""
    place = min(low.last_place, high.last_place)
    return _to_place(low, place), _to_place(high, place)


def _to_place(number: Number, place: int) -> Number:
    if number.value == 0:
        return number  # nought is nought to every place
    figures = max(number.figures, floor(log10(abs(number.value)) + 1e-9) - place + 1)
    if figures > MOST_FIGURES:
        return number
    return Number(shown(number.value, figures), number.value, figures, place)


def _counted(word: str, count: float) -> str:
    """Give the word of a countable measure in the number that its count takes."""
    first, *rest = word.split(" ")
    last = rest[-1] if rest else first
    if count == 1 and last.endswith("s"):
        return word[:-1]
    if count != 1 and not last.endswith("s"):
        return word + "s"
    return word


def _text(quantity: Quantity) -> str:
    begins = {Kind.ABOUT: "ca. ", Kind.BOUND: f"{quantity.bound} "}.get(quantity.kind, "")
    joint = {Kind.RANGE: "–", Kind.TOLERANCE: " ± "}.get(quantity.kind, "")
    second = quantity.second.text if quantity.second else ""
    return f"{begins}{quantity.number.text}{joint}{second} {quantity.unit.symbol}"
