"""Dimensions of quantities: exponents of the base quantities, and a tag where those do not tell.

A share, a count and a mass fraction all have exponents of nought; a temperature point and a
temperature difference have the same. The tag keeps them apart, since a place that takes one must
refuse the other.
"""

from __future__ import annotations

from typing import NamedTuple

_NOUGHT = (0, 0, 0, 0, 0, 0, 0)


class Dimension(NamedTuple):
    """What kind of thing a quantity is.

    Attributes:
        exponents: Of length, mass, time, temperature, amount of substance, electric current, turn.
        tag: Tells apart what the exponents do not; empty for most.
        name: Words for a person, with their article; they follow from exponents and tag.
    """

    exponents: tuple[int, ...] = _NOUGHT
    tag: str = ""
    name: str = ""

    def times(self, other: Dimension) -> Dimension:
        """Give the dimension of a product. Tags are lost: a product is no point, share or count."""
        return named(tuple(a + b for a, b in zip(self.exponents, other.exponents, strict=True)))

    def over(self, other: Dimension) -> Dimension:
        """Give the dimension of a quotient."""
        return named(tuple(a - b for a, b in zip(self.exponents, other.exponents, strict=True)))

    def power(self, exponent: int) -> Dimension:
        """Give the dimension of a power."""
        return named(tuple(a * exponent for a in self.exponents))

    @property
    def plain(self) -> bool:
        """True where all exponents are nought."""
        return self.exponents == _NOUGHT

    @property
    def si(self) -> str:
        """Its SI units, as `kg·m^-1·s^-2`; `1` for a plain number."""
        return _spell(self.exponents)

    @property
    def words(self) -> str:
        """Words for a finding; a rare dimension is spelt out by its SI units."""
        return self.name or "a quantity in " + self.si


def _spell(exponents: tuple[int, ...]) -> str:
    symbols = ("m", "kg", "s", "K", "mol", "A", "turn")
    parts = [
        symbol if power == 1 else f"{symbol}^{power}"
        for symbol, power in zip(symbols, exponents, strict=True)
        if power
    ]
    return "·".join(parts) or "1"


def _d(name: str, tag: str = "", **powers: int) -> Dimension:
    order = ("length", "mass", "time", "temperature", "amount", "current", "turn")
    return Dimension(tuple(powers.get(key, 0) for key in order), tag, name)


NUMBER = _d("a plain number")
COUNT = _d("a count", "count")
SHARE = _d("a share", "share")
MASS_FRACTION = _d("a strength by mass (% w/w)", "w/w")
VOLUME_FRACTION = _d("a strength by volume (% v/v)", "v/v")
MASS = _d("a mass", mass=1)
VOLUME = _d("a volume", length=3)
AMOUNT = _d("an amount of substance", amount=1)
CONCENTRATION = _d("an amount concentration", amount=1, length=-3)
MASS_CONCENTRATION = _d("a mass per volume", mass=1, length=-3)
MOLAR_MASS = _d("a molar mass", mass=1, amount=-1)
MOLALITY = _d("a molality", amount=1, mass=-1)
TEMPERATURE = _d("a temperature", "point", temperature=1)
DIFFERENCE = _d("a temperature difference", temperature=1)
TIME = _d("a time", time=1)
PRESSURE = _d("a pressure", mass=1, length=-1, time=-2)
RATE = _d("a rate of flow", length=3, time=-1)
ROTATION = _d("a rate of rotation", turn=1, time=-1)
FREQUENCY = _d("a frequency", time=-1)
LENGTH = _d("a length", length=1)
AREA = _d("an area", length=2)
ENERGY = _d("an energy", mass=1, length=2, time=-2)
MOLAR_ENERGY = _d("an energy per amount", mass=1, length=2, time=-2, amount=-1)
POWER = _d("a power", mass=1, length=2, time=-3)
CURRENT = _d("an electric current", current=1)
VOLTAGE = _d("a voltage", mass=1, length=2, time=-3, current=-1)

ALL = (
    NUMBER,
    COUNT,
    SHARE,
    MASS_FRACTION,
    VOLUME_FRACTION,
    MASS,
    VOLUME,
    AMOUNT,
    CONCENTRATION,
    MASS_CONCENTRATION,
    MOLAR_MASS,
    MOLALITY,
    TEMPERATURE,
    DIFFERENCE,
    TIME,
    PRESSURE,
    RATE,
    ROTATION,
    FREQUENCY,
    LENGTH,
    AREA,
    ENERGY,
    MOLAR_ENERGY,
    POWER,
    CURRENT,
    VOLTAGE,
)
_NAMED = {d.exponents: d for d in ALL if not d.tag}


def named(exponents: tuple[int, ...]) -> Dimension:
    """Give the untagged dimension with these exponents, with its name where it has one."""
    return _NAMED.get(exponents) or Dimension(exponents)
