"""Quantities as written: digits kept, unit known, SI value beside them.

The types here are what every later stage carries. Reading them from text is `scan.py`; putting
computed values back into digits is `figures.py`.
"""

from __future__ import annotations

from enum import Enum
from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from watchglass.base.dimensions import Dimension
    from watchglass.base.units import Unit


class Number(NamedTuple):
    """A number as written.

    Attributes:
        text: Its characters in the source.
        value: What they are worth.
        figures: Significant figures: every digit from the first that is not nought, trailing
            noughts included (`0.50` has two, `100` three). At least 1.
        last_place: Power of ten of its last digit (`2.50` -> -2, `1.5e-3` -> -4).
    """

    text: str
    value: float
    figures: int
    last_place: int


class Kind(Enum):
    """How a quantity is meant."""

    EXACT = "exact"
    ABOUT = "about"
    RANGE = "range"
    TOLERANCE = "tolerance"
    BOUND = "bound"


class Quantity(NamedTuple):
    """A number with its unit.

    Attributes:
        text: As written, unit included.
        kind: How it is meant.
        number: The value; of a range, its low end.
        unit: The unit; `units.NONE` for a plain number.
        second: High end of a range, or the tolerance; else None.
        bound: `>=`, `>`, `<=` or `<` of a bound; else None.
    """

    text: str
    kind: Kind
    number: Number
    unit: Unit
    second: Number | None = None
    bound: str | None = None

    @property
    def dimension(self) -> Dimension:
        """What it measures."""
        return self.unit.dimension

    @property
    def figures(self) -> int:
        """Significant figures a value computed from it may show."""
        if self.kind is Kind.RANGE and self.second is not None:
            return min(self.number.figures, self.second.figures)
        return self.number.figures

    @property
    def si(self) -> float:
        """Value in SI units; of a range, its low end."""
        return self.number.value * self.unit.factor + self.unit.offset

    @property
    def si_high(self) -> float:
        """High end in SI units; the value itself where there is only one."""
        if self.kind is Kind.RANGE and self.second is not None:
            return self.second.value * self.unit.factor + self.unit.offset
        return self.si

    @property
    def middle(self) -> float:
        """Middle of a range in SI units; the value itself where there is only one."""
        return (self.si + self.si_high) / 2
