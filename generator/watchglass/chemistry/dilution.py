"""Dilution series: which pipette into which flask, and from which solution, for each strength wanted.

A strength is made by carrying a whole number of fillings of a one-mark pipette into a one-mark flask
and filling it to the mark. Where no such pair gives it from the stock, one may give it from a
solution made before it, so that a series goes down step by step. Tolerances of the pieces are
limits, so that relative tolerances are added up: what is given is the worst case, not a standard
deviation.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from collections.abc import Iterator, Sequence

#: How far the strength of a pair may be from the one wanted to count as that strength [-]: a bit of
#: rounding only, since marks are round figures.
_SAME = 1e-6


class Piece(NamedTuple):
    """A one-mark pipette or flask: its volume and how far that may be off, both m3."""

    volume: float
    tolerance: float


class Dilution(NamedTuple):
    """How one solution of a series is made.

    Attributes:
        target: Strength wanted, in the unit of the stock.
        strength: Strength it gives, in the same unit.
        source: Number of the solution in the series that it is made from; -1 for the stock.
        pipette: What carries the aliquot.
        fillings: How often.
        flask: What it is made up in.
        tolerance: How far the strength may be off by that of the ware and of the stock [-].
    """

    target: float
    strength: float
    source: int
    pipette: Piece
    fillings: int
    flask: Piece
    tolerance: float

    @property
    def aliquot(self) -> float:
        """Volume that is carried, m3."""
        return self.fillings * self.pipette.volume

    @property
    def error(self) -> float:
        """Strength that it gives over the one wanted, less 1 [-]."""
        return self.strength / self.target - 1


class NotReached(NamedTuple):
    """A strength that the ware cannot give: the strength, and the nearest that it can, or None."""

    target: float
    nearest: Dilution | None


def series(
    *,
    stock: float,
    targets: Sequence[float],
    pipettes: Sequence[Piece],
    flasks: Sequence[Piece],
    stock_tolerance: float = 0.0,
    least: float = 0.0,
    fillings: int = 2,
    may_differ: float = _SAME,
) -> tuple[Dilution | NotReached, ...]:
    """Choose pipettes and flasks for the strengths of a series.

    Of the ways to a strength the one with the fewest solutions before it is taken; of these the one
    with the smallest tolerance; of these the one that wastes least.

    Args:
        stock: Strength of the stock, any unit by volume, > 0.
        targets: Strengths wanted, in the same unit, > 0, in any order.
        pipettes: One-mark pipettes owned.
        flasks: One-mark flasks owned.
        stock_tolerance: How far the strength of the stock may be off [-], >= 0.
        least: Volume of each solution that is needed, m3; no smaller flask is taken.
        fillings: How often a pipette may be filled for one aliquot, >= 1.
        may_differ: How far a strength may be from the one wanted [-], > 0.

    Returns:
        For each target, in the order given, how it is made; or that it is not reached.

    Raises:
        ValueError: An argument out of its range.
    """
    if stock <= 0 or fillings < 1 or may_differ <= 0 or stock_tolerance < 0:
        raise ValueError(f"a stock of {stock} ± {stock_tolerance}, {fillings} fillings")
    if any(target <= 0 for target in targets):
        raise ValueError(f"strengths of {tuple(targets)}")
    pairs = tuple(_pairs(pipettes, flasks, least, fillings))
    found: dict[int, Dilution] = {}
    depth = {-1: 0}
    missed: dict[int, NotReached] = {}
    for index in sorted(range(len(targets)), key=lambda at: -targets[at]):
        target = targets[index]
        made = {at: (one.strength, one.tolerance) for at, one in found.items()}
        sources = {-1: (stock, stock_tolerance), **made}
        ways = [
            Dilution(target, strength * carried / flask.volume, at, pipette, count, flask, off)
            for at, (strength, before) in sources.items()
            for pipette, count, flask in pairs
            for carried in (count * pipette.volume,)
            for off in (before + _relative(pipette) + _relative(flask),)
        ]
        fit = [way for way in ways if abs(way.error) <= may_differ]
        if fit:
            best = min(fit, key=lambda way: (depth[way.source], way.tolerance, way.flask.volume))
            found[index], depth[index] = best, depth[best.source] + 1
        else:
            near = min(ways, key=lambda way: (abs(way.error), way.tolerance), default=None)
            missed[index] = NotReached(target, near)
    return tuple(found[at] if at in found else missed[at] for at in range(len(targets)))


def _pairs(
    pipettes: Sequence[Piece], flasks: Sequence[Piece], least: float, fillings: int
) -> Iterator[tuple[Piece, int, Piece]]:
    """Give every aliquot that fits into a flask, with room for some solvent."""
    for flask in flasks:
        if flask.volume < least * (1 - _SAME):
            continue
        for pipette in pipettes:
            for count in range(1, fillings + 1):
                if count * pipette.volume < flask.volume * (1 - _SAME):
                    yield pipette, count, flask


def _relative(piece: Piece) -> float:
    """Give the relative tolerance of a piece; of several fillings each may be off the same way."""
    return piece.tolerance / piece.volume
