"""What the steps take from each material: every portion of every pass, summed.

What `adjust` and `titrate` take is for the bench to compute: such a material is used `as needed`
beside what is charged of it. Amounts of substance follow from `content.py`.
"""

from __future__ import annotations

from math import floor, log10
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.quantities import Kind
from watchglass.resolve import model

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.dimensions import Dimension
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span
    from watchglass.run.passes import Course


class Use(NamedTuple):
    """One written portion and how often it is taken.

    Attributes:
        quantity: How much each time; None for `all`, `half`, `rest` (`of_all`).
        of_all: `all`, `half`, `rest`, or empty.
        times: In how many passes.
        span: Where it is written.
    """

    quantity: Quantity | None
    of_all: str
    times: int
    span: Span


class Total(NamedTuple):
    """A sum of quantities of one dimension.

    Attributes:
        dimension: Of the sum.
        low: Sum of the low ends, SI.
        high: Sum of the high ends, SI.
        figures: Significant figures the low end may show: no finer than its coarsest part.
        symbol: Of the unit it is shown in: that of the first part.
        factor: SI units in one of it [-].
        about: Whether a part is an approximation.
        high_figures: Significant figures the high end may show.
    """

    dimension: Dimension
    low: float
    high: float
    figures: int
    symbol: str
    factor: float
    about: bool
    high_figures: int = 1


class Usage(NamedTuple):
    """All that is taken of one material.

    Attributes:
        material: Its local name.
        uses: The portions, in the order written.
        totals: Their sums, one a dimension (a mass and a volume are not added).
        as_needed: Whether the bench decides how much more.
        unsummed: Whether something is taken that cannot be summed (`per`, `rest`, a `half` of what
            nobody knows).
    """

    material: str
    uses: tuple[Use, ...]
    totals: tuple[Total, ...]
    as_needed: bool
    unsummed: bool


def usage(procedure: model.Procedure, course: Course) -> Mapping[str, Usage]:
    """Sum what a procedure takes of each material, over all its passes."""
    counts: dict[tuple[str, int], list[model.Portion]] = {}
    needed: set[str] = set()
    for happening in course.happenings:
        event = happening.event
        portions: tuple[model.Portion, ...] = ()
        if isinstance(event, model.Charge | model.Operation):
            portions = event.portions
        if isinstance(event, model.Operation) and event.reagent:
            needed.add(happening.name(event.reagent))
        for portion in portions:
            key = happening.name(portion.material), portion.span.start
            counts.setdefault(key, []).append(portion)
    result = {}
    for name, material in procedure.materials.items():
        mine = [taken for (of, _), taken in counts.items() if of == name]
        uses = tuple(
            Use(taken[0].quantity, taken[0].of_all, len(taken), taken[0].span) for taken in mine
        )
        unsummed = any(taken[0].per or taken[0].of_all == "rest" for taken in mine)
        totals, whole = _totals(material, uses, [bool(taken[0].per) for taken in mine])
        result[name] = Usage(name, uses, totals, name in needed, unsummed or not whole)
    return result


def _totals(
    material: model.Material, uses: tuple[Use, ...], per: list[bool]
) -> tuple[tuple[Total, ...], bool]:
    sums: dict[Dimension, list[tuple[Quantity, float]]] = {}
    whole = True
    for use, counted in zip(uses, per, strict=True):
        if counted:
            continue
        quantity, share = use.quantity, float(use.times)
        if quantity is None:
            if use.of_all == "rest" or material.provided is None:
                whole = whole and use.of_all == "rest" and material.provided is not None
                continue
            quantity = material.provided
            share *= 0.5 if use.of_all == "half" else 1.0
        sums.setdefault(quantity.dimension, []).append((quantity, share))
    return tuple(_sum(dimension, parts) for dimension, parts in sums.items()), whole


def _sum(dimension: Dimension, parts: list[tuple[Quantity, float]]) -> Total:
    low = sum(quantity.si * share for quantity, share in parts)
    high = sum(quantity.si_high * share for quantity, share in parts)
    first = parts[0][0].unit
    coarsest = max(quantity.unit.factor * 10.0 ** _place(quantity) for quantity, _ in parts)
    about = any(quantity.kind is Kind.ABOUT for quantity, _ in parts)
    return Total(
        dimension,
        low,
        high,
        _figures(low / first.factor, coarsest / first.factor),
        first.symbol,
        first.factor,
        about,
        _figures(high / first.factor, coarsest / first.factor),
    )


def _place(quantity: Quantity) -> int:
    """Give the power of ten of the last figure; of a range, of its coarser end."""
    ends = [quantity.number]
    if quantity.kind is Kind.RANGE and quantity.second is not None:
        ends.append(quantity.second)
    return max(number.last_place for number in ends)


def _figures(value: float, last: float) -> int:
    """Count the figures of a sum whose last figure has the size `last`, both in one unit."""
    if value <= 0:
        return 1
    return max(1, floor(log10(value) + 1e-9) - floor(log10(last) + 1e-9) + 1)


def total_of(found: Usage, *dimensions: Dimension) -> Total | None:
    """Give the sum of one of the dimensions asked for, or None."""
    for total in found.totals:
        if total.dimension in dimensions:
            return total
    return None


MASS_OR_VOLUME = (dim.MASS, dim.VOLUME)
