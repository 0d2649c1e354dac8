"""Stock solutions the prep room keeps, and indicators."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span
    from watchglass.base.yaml import YamlText


@dataclass(frozen=True, slots=True, kw_only=True)
class Stock:
    """One stock: its `material` is text in the notation of a material, resolved where it is used."""

    key: str
    names: tuple[str, ...]
    material: YamlText
    notes: str
    span: Span


@dataclass(frozen=True, slots=True, kw_only=True)
class Indicator:
    """An indicator with its transition range (pH) and the colours on either side of it."""

    key: str
    names: tuple[str, ...]
    range: Quantity
    acid_colour: str
    base_colour: str
    source: str
    span: Span
