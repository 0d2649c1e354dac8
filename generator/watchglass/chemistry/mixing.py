"""Mass, volume and density of liquids put together.

Volumes add and dissolved solids bring mass but no volume: the rule of the bench, right to some
per cent (ethanol and water contract by up to 4 %). It makes a solution denser than it is, so where
two densities decide which layer is the upper one, use `density_with_solute` for organic liquids and
the tabulated densities of `density_by_table` for aqueous ones.
"""

from __future__ import annotations

from itertools import pairwise
from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence

#: Density of water at 20 °C, kg/m3. IAPWS: 998.2.
WATER_DENSITY = 998.2
#: What a dissolved solid adds to the density of an organic liquid, over its mass concentration [-].
#: Common practice, no source: most solids have about 1.3 times the density of what dissolves them.
SOLUTE_EXCESS = 0.3


class Liquid(NamedTuple):
    """A portion of liquid.

    Attributes:
        mass: Mass, kg, >= 0.
        volume: Volume, m3, >= 0.
    """

    mass: float
    volume: float


def liquid_of_volume(*, volume: float, density: float) -> Liquid:
    """Tell the mass of a measured liquid.

    Args:
        volume: Volume, m3, >= 0.
        density: Density, kg/m3, > 0.

    Returns:
        The portion.

    Raises:
        ValueError: An argument out of its range.
    """
    if volume < 0 or density <= 0:
        raise ValueError(f"{volume} m3 of a density of {density} kg/m3")
    return Liquid(volume * density, volume)


def liquid_of_mass(*, mass: float, density: float) -> Liquid:
    """Tell the volume of a weighed liquid.

    Args:
        mass: Mass, kg, >= 0.
        density: Density, kg/m3, > 0.

    Returns:
        The portion.

    Raises:
        ValueError: An argument out of its range.
    """
    if mass < 0 or density <= 0:
        raise ValueError(f"{mass} kg of a density of {density} kg/m3")
    return Liquid(mass, mass / density)


def mix(portions: Iterable[Liquid], *, dissolved: float = 0.0) -> Liquid:
    """Put liquids together.

    Args:
        portions: The liquids; none gives an empty vessel.
        dissolved: Mass of solids dissolved in them, kg, >= 0.

    Returns:
        The mixture: masses and volumes added, the solids without volume.

    Raises:
        ValueError: A negative mass or volume.
    """
    if dissolved < 0:
        raise ValueError(f"{dissolved} kg dissolved")
    mass, volume = dissolved, 0.0
    for portion in portions:
        if portion.mass < 0 or portion.volume < 0:
            raise ValueError(f"a portion of {portion.mass} kg and {portion.volume} m3")
        mass += portion.mass
        volume += portion.volume
    return Liquid(mass, volume)


def density(liquid: Liquid) -> float | None:
    """Give the density of a portion, kg/m3, or None where it has no volume.

    Raises:
        ValueError: A negative mass or volume.

    Example:
        >>> round(density(mix([Liquid(0.0997, 1e-4)], dissolved=0.005)), 3)
        1047.0
    """
    if liquid.mass < 0 or liquid.volume < 0:
        raise ValueError(f"a portion of {liquid.mass} kg and {liquid.volume} m3")
    return liquid.mass / liquid.volume if liquid.volume else None


def density_with_solute(*, density: float, concentration: float) -> float:
    """Estimate the density of an organic liquid with a solid dissolved in it.

    Args:
        density: Density of the liquid alone, kg/m3, > 0.
        concentration: Mass concentration of the solute, kg/m3, >= 0.

    Returns:
        Density, kg/m3.

    Raises:
        ValueError: An argument out of its range.

    Source:
        `SOLUTE_EXCESS`: common practice.
    """
    if density <= 0 or concentration < 0:
        raise ValueError(f"{concentration} kg/m3 in a liquid of {density} kg/m3")
    return density + SOLUTE_EXCESS * concentration


def density_by_table(points: Sequence[tuple[float, float]], fraction: float) -> float | None:
    """Read the density of a solution off a table.

    Args:
        points: Mass fraction [-] and density, kg/m3, ascending in the fraction; that of water, at
            0, is put before them where it is missing.
        fraction: Mass fraction of the solute [-], 0 to 1.

    Returns:
        Density, kg/m3, between the two points around; None beyond the last.

    Raises:
        ValueError: A fraction out of its range, or points that do not ascend.

    Source:
        Linear interpolation; within 0.5 % for points 10 % apart.
    """
    if not 0 <= fraction <= 1:
        raise ValueError(f"a mass fraction of {fraction}")
    lower = (0.0, WATER_DENSITY)
    known = points if points and points[0][0] == 0 else [lower, *points]
    if any(not 0 <= a[0] < b[0] <= 1 for a, b in pairwise(known)):
        raise ValueError("points of a table that do not ascend")
    for (left, light), (right, heavy) in pairwise(known):
        if left <= fraction <= right:
            return light + (heavy - light) * (fraction - left) / (right - left)
    return known[0][1] if fraction == known[0][0] else None


def density_of_several(densities: Iterable[float]) -> float:
    """Estimate the density of water that holds several solutes.

    Args:
        densities: Density that the solution of each alone has at its own fraction, kg/m3, > 0.

    Returns:
        Density, kg/m3: water and the excess over it of each.

    Raises:
        ValueError: A density that is not positive.

    Source:
        Common practice, no source: excesses add.
    """
    total = WATER_DENSITY
    for each in densities:
        if each <= 0:
            raise ValueError(f"a density of {each} kg/m3")
        total += each - WATER_DENSITY
    return total
