"""Stock solutions the prep room keeps, and indicators."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span
    from watchglass.base.yaml import YamlMapping, YamlText


class Stock(NamedTuple):
    """One stock: its `material` is text in the notation of a material, resolved where it is used.

    `contains` are its parts where it is a mixture, `solvent` what they are dissolved in. `density`
    is that of the solution and `also` its strength in another measure, as its label has them;
    `makes` is how much is made at a time; `made_from` the key of another stock that it is diluted
    from, or empty.
    """

    key: str
    names: tuple[str, ...]
    material: YamlText
    notes: str
    span: Span
    density: YamlText | None = None
    makes: Quantity | None = None
    made_from: str = ""
    made_from_span: Span | None = None
    shelf_life: str = ""
    container: str = ""
    contains: YamlMapping | None = None
    solvent: YamlText | None = None
    also: YamlText | None = None


class Indicator(NamedTuple):
    """An indicator with its transition range (pH) and the colours on either side of it."""

    key: str
    names: tuple[str, ...]
    range: Quantity
    acid_colour: str
    base_colour: str
    source: str
    span: Span
