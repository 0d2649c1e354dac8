"""Titrations: curve, equivalence points, titre and what it tells.

A titrant is a reagent as in `reagents`, and the titre to an indicator's change is its
`volume_to_ph`.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.chemistry.equilibrium import solve
from watchglass.chemistry.reagents import check_reagent, with_reagent

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.chemistry.phases import PhaseSystem

#: How far before and after an equivalence point its jump is read, as a share of the volume [-].
_BESIDE = 1e-3


class Point(NamedTuple):
    """A point of a titration curve.

    Attributes:
        volume: Titrant added, m3.
        ph: pH [-], or None where unknown.
    """

    volume: float
    ph: float | None


class EquivalencePoint(NamedTuple):
    """Where the titrant has met what it meets, to the next proton.

    Attributes:
        volume: Titrant added, m3.
        ph: pH there [-], or None where unknown.
        jump: How far the pH goes from 0.1 % before to 0.1 % after [-], or None where unknown. Less
            than about 1 shows no indicator's change sharply (common practice, no source).
    """

    volume: float
    ph: float | None
    jump: float | None


def titration_curve(
    held: PhaseSystem, titrant: PhaseSystem, volumes: Iterable[float]
) -> tuple[Point, ...]:
    """Work out the pH after each volume of titrant.

    Args:
        held: What is in the vessel at the start.
        titrant: The titrant, any volume of it, without organic liquid.
        volumes: Volumes added in all, m3, >= 0.

    Returns:
        One point for each volume, in their order.

    Raises:
        ValueError: As `with_reagent`.
    """
    return tuple(Point(volume, solve(with_reagent(held, titrant, volume)).ph) for volume in volumes)


def equivalence_points(
    held: PhaseSystem, titrant: PhaseSystem
) -> tuple[EquivalencePoint, ...] | None:
    """Find the equivalence points of a titration with a strong acid or base.

    Args:
        held: What is in the vessel at the start.
        titrant: The titrant, any volume of it, without organic liquid.

    Returns:
        The points ahead, in the order in which they come: strong acid or base first, then one
        proton after the other by pKa. Those that no indicator shows have a small `jump`. None
        where the titrant is not a strong acid or base alone.

    Raises:
        ValueError: As `with_reagent`.

    Source:
        At a point every family is in one state, so the strong ions balance a whole number of
        protons of each.
    """
    check_reagent(held, titrant)
    if not titrant.strong or any(family.amount for family in titrant.families if family.pkas):
        return None
    balanced = -sum(family.top * family.amount for family in held.families)
    steps = sorted((pka, f.amount) for f in held.families for pka in f.pkas if f.amount)
    marks = [balanced]
    for place, (pka, amount) in enumerate(steps):
        balanced += amount
        if place + 1 < len(steps) and steps[place + 1][0] == pka:
            continue  # the same pKa: their protons leave together
        marks.append(balanced)
    strength = titrant.strong / titrant.aqueous
    whole = sum(amount for _, amount in steps) + abs(held.strong)
    ahead = sorted(
        volume
        for volume in ((mark - held.strong) / strength for mark in marks)
        if volume * abs(strength) > 1e-12 * whole
    )
    return tuple(_point(held, titrant, volume) for volume in ahead)


def titration_error(*, titre: float, equivalence: float) -> float:
    """Tell by how much a titre read at an indicator's change misses the equivalence point.

    Args:
        titre: Volume at the change, m3, >= 0, as `volume_to_ph` gives it.
        equivalence: Volume at the equivalence point, m3, > 0.

    Returns:
        Error relative to the equivalence point [-]; below nought where the change comes too early.

    Raises:
        ValueError: An argument out of its range.
    """
    if titre < 0 or equivalence <= 0:
        raise ValueError(f"a titre of {titre} m3 for {equivalence} m3")
    return titre / equivalence - 1


def titre_by_equation(*, amount: float, titrant: float, ratio: float = 1.0) -> float:
    """Work out the titre that the equation asks for.

    Args:
        amount: Amount of what is titrated, mol, >= 0.
        titrant: Concentration of the titrant, mol/m3, > 0.
        ratio: Titrant for each mole of what is titrated, by the equation [-], > 0.

    Returns:
        Volume, m3.

    Raises:
        ValueError: An argument out of its range.
    """
    if amount < 0 or titrant <= 0 or ratio <= 0:
        raise ValueError(f"{amount} mol titrated with {titrant} mol/m3, {ratio} for each")
    return amount * ratio / titrant


def concentration_by_titre(
    *, titre: float, titrant: float, sample: float, ratio: float = 1.0
) -> float:
    """Work out the concentration of a sample from its titre.

    Args:
        titre: Volume of titrant, m3, >= 0.
        titrant: Concentration of the titrant, mol/m3, >= 0.
        sample: Volume of the sample, m3, > 0.
        ratio: Titrant for each mole of what is titrated, by the equation [-], > 0.

    Returns:
        Concentration, mol/m3.

    Raises:
        ValueError: An argument out of its range.
    """
    if titre < 0 or titrant < 0 or sample <= 0 or ratio <= 0:
        raise ValueError(f"{titre} m3 of {titrant} mol/m3 for {sample} m3, {ratio} for each")
    return titre * titrant / ratio / sample


def _point(held: PhaseSystem, titrant: PhaseSystem, volume: float) -> EquivalencePoint:
    before, at, after = (
        point.ph
        for point in titration_curve(
            held, titrant, (volume * (1 - _BESIDE), volume, volume * (1 + _BESIDE))
        )
    )
    jump = None if before is None or after is None else abs(after - before)
    return EquivalencePoint(volume, at, jump)
