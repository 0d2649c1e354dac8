"""What a measuring vessel can give: how much, how finely, and how well.

The table stands in `data/glassware.yml`, a row for each size, class and standard, and is read when
a vessel is asked about. Where a vessel's class is not stated, the finest row counts: what no class
could give is a fault, what one of them gives is not. How finely ware is read is common practice and
has no source: half a graduation, of a burette a fifth; never finer than the tolerance, but of a
burette, whose two readings are subtracted. The smallest volume worth measuring is a judgement, too.
"""

from __future__ import annotations

from math import floor, log10
from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.catalogue.glassware import VesselType

_ML = 1e-6
#: Smallest useful volume as a share of the nominal size [-]. Judgement, but for piston pipettes,
#: where ISO 8655-2 has a tenth of the nominal volume (from memory).
_LEAST = {"burette": 0.02, "graduated-pipette": 0.05}
_LEAST_ELSE = 0.1
_BURETTES = ("burette", "gas-burette")
_LADDER = (1.0, 2.0, 2.5, 5.0, 10.0)
_TRUST = {
    "R": "read in the standard",
    "R2": "read in a guide",
    "M": "from memory",
    "J": "judgement",
}


class Reach(NamedTuple):
    """What a measuring vessel can give.

    Attributes:
        least: Smallest volume that it measures usefully, m3.
        most: Largest volume in one filling, m3: its nominal size.
        step: Finest step that a figure may name, m3; of ware with one mark its tolerance.
        tolerance: How far the volume may be off, m3.
        fixed: Whether it has one mark only and gives `most` or nothing.
        source: Standard, class, and how its figures are known.
    """

    least: float
    most: float
    step: float
    tolerance: float
    fixed: bool
    source: str


class Row(NamedTuple):
    """One row of the table: mL, class (`A`, `B` or empty), mL, mL or None, how known, standard."""

    size: float
    class_: str
    tolerance: float
    graduation: float | None
    trust: str
    standard: str


def rows(marks: str) -> Iterator[Row]:
    """Read the rows of a type's table; what stands behind `#` is a remark."""
    for line in marks.splitlines():
        words = line.partition("#")[0].split(maxsplit=5)
        if not words:
            continue
        size, class_, tolerance, graduation, trust, standard = words
        yield Row(
            float(size),
            class_.strip("-"),
            float(tolerance),
            None if graduation == "-" else float(graduation),
            trust,
            standard.strip(),
        )


def reach(vessel: VesselType) -> Reach | None:
    """Tell what a vessel can measure.

    Returns:
        Its reach; None where its type does not measure, or nothing is known of its size or class.
    """
    if not vessel.type.marks or vessel.size is None:
        return None
    nominal = vessel.size.si / _ML
    known = [
        _reach(vessel.type.key, row)
        for row in rows(vessel.type.marks)
        if abs(row.size - nominal) <= 1e-6 * nominal
        and (not vessel.class_ or row.class_ in ("", vessel.class_))
    ]
    return min(known, key=lambda found: (found.step, -found.tolerance), default=None)


def _reach(key: str, row: Row) -> Reach:
    one_mark = row.graduation is None and key in ("volumetric-pipette", "volumetric-flask")
    if row.graduation is not None and key in _BURETTES:
        step = row.graduation / 5
    elif row.graduation is not None and row.graduation / 2 >= row.tolerance:
        step = row.graduation / 2
    elif one_mark:
        step = row.tolerance
    else:
        step = _rung(row.tolerance)
    share = _LEAST.get(key, _LEAST_ELSE)
    said = f"class {row.class_}, {_TRUST[row.trust]}" if row.class_ else _TRUST[row.trust]
    return Reach(
        least=(row.size if one_mark else row.size * share) * _ML,
        most=row.size * _ML,
        step=step * _ML,
        tolerance=row.tolerance * _ML,
        fixed=one_mark,
        source=f"{row.standard}, {said}",
    )


def _rung(value: float) -> float:
    """Give the largest of 1, 2, 2.5, 5 × 10^n that is not above a value."""
    decade = 10.0 ** floor(log10(value) + 1e-9)
    return float(
        f"{max(rung for rung in _LADDER if rung * decade <= value * (1 + 1e-9)) * decade:.6g}"
    )


def finest_place(reach: Reach) -> int:
    """Give the power of ten in mL of the last digit that a vessel can give.

    >>> finest_place(Reach(5e-6, 50e-6, 0.5e-6, 0.5e-6, False, ""))
    -1
    """
    return floor(log10(reach.step / _ML) + 1e-9)


def nearest(value: float, reach: Reach) -> float:
    """Round a volume to what a vessel can give, in as many fillings as it takes.

    Args:
        value: A volume, m3, >= 0.
        reach: Of the vessel.

    Returns:
        A whole number of steps (of fillings, where it has one mark), at least one, m3.
    """
    step = reach.most if reach.fixed else reach.step
    return float(f"{max(1, round(value / step)) * step:.12g}")
