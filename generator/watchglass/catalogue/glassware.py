"""Glassware: the types a vessel can be of, and reading `separatory funnel 125 mL`."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span


class GlasswareType(NamedTuple):
    """One type of vessel.

    Attributes:
        key: Its key in the list.
        names: What it is called; the first is shown.
        unit: Unit of its nominal size: `mL` or `mm`.
        sizes: Nominal sizes made, in that unit, ascending; empty where any is possible.
        holds: Whether things can be charged to it.
        measures: `approximate`, `delivers`, `contains`, or empty.
        source: Where sizes and use are from.
        span: Its key in the file.
        marks: Its sizes that measure, as a table; `measuring.py` reads it when it is asked for.
    """

    key: str
    names: tuple[str, ...]
    unit: str
    sizes: tuple[float, ...]
    holds: bool
    measures: str
    source: str
    span: Span
    marks: str = ""

    @property
    def name(self) -> str:
        """The name that is shown."""
        return self.names[0]


class VesselType(NamedTuple):
    """A vessel as declared: its type, nominal size and state.

    Attributes:
        type: What it is.
        written: The type's name as the author wrote it.
        size: Nominal size, or None where none was given.
        class_: `A`, `B` or empty.
        states: Of `tared`, `oven-dried`.
    """

    type: GlasswareType
    written: str
    size: Quantity | None
    class_: str = ""
    states: tuple[str, ...] = ()
