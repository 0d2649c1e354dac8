"""The closed list of units: what may stand after a number, and what each is worth.

Factors come from `unit_table.py`, which pint made from our own definitions file, so that a
command run on every save need not load pint (0.2 s). Compound units are products and powers of
the listed symbols (`g/mL`, `mol/L`, `J/(g·K)`); nothing outside the list is ever guessed at, and
the spellings people reach for instead are refused with the way to write them.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.unit_table import TABLE

if TYPE_CHECKING:
    from watchglass.base.dimensions import Dimension


class Unit(NamedTuple):
    """A unit as written.

    Attributes:
        symbol: As the author wrote it.
        dimension: What it measures.
        factor: SI units in one of it [-]. `SI value = number * factor + offset`.
        offset: SI value of nought; not 0 only for temperature points.
    """

    symbol: str
    dimension: Dimension
    factor: float = 1.0
    offset: float = 0.0


NONE = Unit("", dim.NUMBER)


#: The bare letter names vessels (`A`); only its milli is a unit here.
_ONLY_PREFIXED = frozenset(("A", "turn"))


def _listed() -> dict[str, Unit]:
    units = {}
    for symbol, (factor, offset, exponents) in TABLE.items():
        if symbol in _ONLY_PREFIXED:
            continue
        dimension = dim.named(exponents)
        if offset:
            dimension = dim.TEMPERATURE
        units[symbol] = Unit(symbol, dimension, factor, offset)
    for symbol, factor in (("%", 1e-2), ("‰", 1e-3), ("ppm", 1e-6), ("ppb", 1e-9)):
        units[symbol] = Unit(symbol, dim.SHARE, factor)
    return units


#: Every symbol that stands by itself.
UNITS: dict[str, Unit] = _listed()

#: Strengths in per cent: the basis decides the dimension. 1 % w/v is 1 g in 100 mL.
STRENGTHS: dict[str, Unit] = {
    "w/w": Unit("% w/w", dim.MASS_FRACTION, 1e-2),
    "w/v": Unit("% w/v", dim.MASS_CONCENTRATION, 10.0),
    "v/v": Unit("% v/v", dim.VOLUME_FRACTION, 1e-2),
}

#: What a computed figure is shown in where its author names no unit. Customary at the bench.
CUSTOMARY: dict[Dimension, str] = {
    dim.SHARE: "%",
    dim.MASS_FRACTION: "% w/w",
    dim.VOLUME_FRACTION: "% v/v",
    dim.MASS: "g",
    dim.VOLUME: "mL",
    dim.AMOUNT: "mmol",
    dim.CONCENTRATION: "mol/L",
    dim.MASS_CONCENTRATION: "g/mL",
    dim.MOLAR_MASS: "g/mol",
    dim.MOLALITY: "mol/kg",
    dim.TEMPERATURE: "°C",
    dim.DIFFERENCE: "K",
    dim.TIME: "min",
    dim.PRESSURE: "kPa",
    dim.RATE: "mL/min",
    dim.ROTATION: "rpm",
    dim.FREQUENCY: "Hz",
    dim.LENGTH: "cm",
    dim.AREA: "cm^2",
    dim.ENERGY: "kJ",
    dim.MOLAR_ENERGY: "kJ/mol",
    dim.POWER: "W",
    dim.CURRENT: "mA",
    dim.VOLTAGE: "V",
}

#: Spellings that are refused, with what to write.
REFUSED: dict[str, str] = {
    "C": "°C",
    "F": "°F",
    "deg": "°C",
    "degrees": "°C",
    "Celsius": "°C",
    "celsius": "°C",
    "cc": "mL",
    "ccm": "mL",
    "ML": "mL",
    "Ml": "mL",
    "mLs": "mL",
    "mls": "mL",
    "MLs": "mL",
    "milliliters": "mL",
    "millilitres": "mL",
    "litre": "L",
    "liter": "L",
    "litres": "L",
    "liters": "L",
    "lt": "L",
    "ltr": "L",
    "gm": "g",
    "gms": "g",
    "gr": "g",
    "grs": "g",
    "G": "g",
    "gram": "g",
    "grams": "g",
    "Kg": "kg",
    "KG": "kg",
    "kgs": "kg",
    "MG": "mg",
    "mgs": "mg",
    "mcg": "µg",
    "mole": "mol",
    "moles": "mol",
    "mols": "mol",
    "Mol": "mol",
    "mmole": "mmol",
    "mmoles": "mmol",
    "mMol": "mmol",
    "molar": "M",
    "mMolar": "mM",
    "sec": "s",
    "secs": "s",
    "seconds": "s",
    "second": "s",
    "mins": "min",
    "minute": "min",
    "minutes": "min",
    "Min": "min",
    "hr": "h",
    "hrs": "h",
    "hour": "h",
    "hours": "h",
    "days": "d",
    "day": "d",
    "k": "K",
    "kelvin": "K",
    "Kelvin": "K",
    "RPM": "rpm",
    "mmhg": "mmHg",
    "mm Hg": "mmHg",
    "ATM": "atm",
    "degrees C": "°C",
    "inch": "in",
    "inches": "in",
    "percent": "%",
}


def customary(dimension: Dimension) -> str:
    """Give the unit a computed figure is shown in: never a bare number for what has a dimension."""
    if dimension.plain and dimension not in CUSTOMARY:
        return ""
    return CUSTOMARY.get(dimension) or dimension.si


_SUPERSCRIPTS = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")


def compound(left: Unit, right: Unit, *, symbol: str, divide: bool) -> Unit | None:
    """Multiply or divide two units; None where an offset or a share makes that meaningless."""
    if any(u.offset or u.dimension.tag for u in (left, right)):
        return None
    factor = left.factor / right.factor if divide else left.factor * right.factor
    of = left.dimension.over if divide else left.dimension.times
    return Unit(symbol, of(right.dimension), _clean(factor))


def power(unit: Unit, exponent: int, *, symbol: str) -> Unit | None:
    """Raise a unit to a whole power; None for a temperature point or a share."""
    if unit.offset or unit.dimension.tag:
        return None
    return Unit(symbol, unit.dimension.power(exponent), _clean(unit.factor**exponent))


def _clean(factor: float) -> float:
    """Take off the last bits, so that g/mL is worth 1000 and not 1000.0000000000001."""
    return float(f"{factor:.14g}")


def exponent_of(text: str) -> int:
    """Read an exponent written in ordinary or superscript digits."""
    return int(text.translate(_SUPERSCRIPTS))
