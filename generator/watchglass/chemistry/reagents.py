"""Reagent poured into a vessel, and how much of it brings the vessel to a pH.

A reagent or titrant is a `PhaseSystem` of its own without organic liquid: any volume of it, from
which portions of the same composition are taken. 0.100 M sodium hydroxide is
`PhaseSystem((), strong=0.1, aqueous=1e-3)`. Volumes add. Families of vessel and reagent with the same
key (`Family.key`) are one substance, and the vessel's constants are taken for it.
"""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

from watchglass.chemistry.acidbase import hydrogen_ion, hydroxide, state_fractions
from watchglass.chemistry.equilibrium import PhaseSystem, check, unknown_ratios

if TYPE_CHECKING:
    from collections.abc import Callable

    from watchglass.chemistry.equilibrium import Family

#: No more of a reagent is tried than this times the water that is there [-].
MOST = 1e4
#: The first portion tried, in the same measure [-].
_LEAST = 1e-9
_HALVINGS = 50
#: A charge below this share of the ions that make it up is rounding [-].
_ROUNDING = 1e-14


def with_reagent(held: PhaseSystem, reagent: PhaseSystem, volume: float) -> PhaseSystem:
    """Pour a volume of a reagent into a vessel; nothing reacts yet.

    Args:
        held: What is in the vessel.
        reagent: The reagent, any volume of it, without organic liquid.
        volume: Volume poured in, m3, >= 0.

    Returns:
        What is in the vessel then; the sum of squares is known where it is for both.

    Raises:
        ValueError: A negative volume, a reagent of two liquids, or what `equilibrium.check` refuses.
    """
    check_reagent(held, reagent)
    if volume < 0:
        raise ValueError(f"a volume of {volume} m3")
    share = volume / reagent.aqueous
    squares = None
    if held.strong_squares is not None and reagent.strong_squares is not None:
        squares = held.strong_squares + share * reagent.strong_squares
    families = tuple(
        family._replace(amount=family.amount + share * poured)
        for family, poured in _together(held, reagent)
    )
    return PhaseSystem(
        families=families,
        strong=held.strong + share * reagent.strong,
        aqueous=held.aqueous + volume,
        organic=held.organic,
        strong_squares=squares,
    )


def volume_to_ph(
    held: PhaseSystem, reagent: PhaseSystem, ph: float, *, most: float | None = None
) -> float | None:
    """Find how much of a reagent brings a vessel to a pH.

    Args:
        held: What is in the vessel, both layers and what has separated.
        reagent: The reagent, any volume of it, without organic liquid.
        ph: pH to be reached [-].
        most: No more than this is tried, m3, >= 0; None for `MOST` times the water in the vessel.

    Returns:
        Volume, m3; 0 where the pH is there already; None where no volume reaches it: the reagent
        goes the other way, or its own pH lies before it.

    Raises:
        ValueError: What `equilibrium.check` refuses, or an unknown ratio that bears on the pH: the
            caller finds it by `equilibrium.unknown_ratios` and does not call.

    Source:
        Charge balance at that pH as a function of the volume; its first change of sign, sought in
        steps of doubled volume, then halved. With a reagent that goes one way it has only one.

    Example:
        30 mL of 3.0 M hydrochloric acid to pH 7 with 6.0 M sodium hydroxide:

        >>> acid = PhaseSystem((), strong=-0.090, aqueous=30e-6)
        >>> alkali = PhaseSystem((), strong=6.0, aqueous=1e-3)
        >>> round(volume_to_ph(acid, alkali, 7.0) * 1e6, 3)
        15.0
    """
    check_reagent(held, reagent)
    if unknown_ratios(with_reagent(held, reagent, reagent.aqueous)):
        raise ValueError("a volume that hangs on an unknown ratio")
    balance = _Balance(held, reagent, ph)
    start = balance.charge(0.0)
    if abs(start) <= _ROUNDING * balance.ions:
        return 0.0
    return least_volume(
        lambda volume: (balance.charge(volume) > 0) != (start > 0), held.aqueous, most
    )


def least_volume(
    reached: Callable[[float], bool], water: float, most: float | None
) -> float | None:
    """Find the least volume at which something is reached, m3, or None; it is not at nought.

    Args:
        reached: Tells for a volume, m3.
        water: Water in the vessel, m3; the scale of what is tried.
        most: No more than this is tried, m3; None for `MOST` times the water.
    """
    limit = MOST * water if most is None else most
    if not 0 <= limit < math.inf:
        raise ValueError(f"no more than {limit} m3 of a reagent")
    low, high = 0.0, min(_LEAST * water, limit)
    while not reached(high):
        if high >= limit:
            return None
        low, high = high, min(2 * high, limit)
    for _ in range(_HALVINGS):
        middle = (low + high) / 2
        if reached(middle):
            high = middle
        else:
            low = middle
    return high


class _Balance:
    """The charge of a vessel at one pH, whatever the volume of reagent."""

    __slots__ = ("_families", "_held", "_share", "_strong", "_water", "ions")

    def __init__(self, held: PhaseSystem, reagent: PhaseSystem, ph: float) -> None:
        self._held = held
        self._share = 1 / reagent.aqueous
        self._strong = reagent.strong * self._share
        self._water = hydrogen_ion(ph) - hydroxide(ph)
        #: Amount there, amount poured in for each m3, mean charge, fraction neutral, ratio, cap.
        self._families: list[tuple[float, float, float, float, float, float]] = []
        self.ions = abs(held.strong) + held.aqueous * (hydrogen_ion(ph) + hydroxide(ph))
        for family, poured in _together(held, reagent):
            fractions = state_fractions(family.pkas, ph)
            mean = sum((family.top - lost) * x for lost, x in enumerate(fractions))
            neutral = fractions[family.top] if 0 <= family.top < len(fractions) else 0.0
            cap = math.inf if family.cap is None else family.cap
            entry = (family.amount, poured * self._share, mean, neutral, family.ratio or 0.0, cap)
            self._families.append(entry)
            self.ions += family.amount * abs(mean)

    def charge(self, volume: float) -> float:
        """Give the charge, mol, with a volume of reagent, m3."""
        water = self._held.aqueous + volume
        total = self._held.strong + self._strong * volume + self._water * water
        for there, poured, mean, neutral, ratio, cap in self._families:
            dissolved = (there + poured * volume) / (
                1 + ratio * self._held.organic / water * neutral
            )
            if dissolved * neutral > cap * water:
                dissolved = cap * water / neutral
            total += dissolved * mean
        return total


def _together(held: PhaseSystem, reagent: PhaseSystem) -> list[tuple[Family, float]]:
    """Pair the families there with the amount that all of the reagent brings, mol."""
    pairs = [(family, 0.0) for family in held.families]
    places = {family.key: place for place, family in enumerate(held.families) if family.key}
    for family in reagent.families:
        place = places.get(family.key) if family.key else None
        if place is None:
            pairs.append((family._replace(amount=0.0), family.amount))
        else:
            there, poured = pairs[place]
            pairs[place] = (there, poured + family.amount)
    return pairs


def check_reagent(held: PhaseSystem, reagent: PhaseSystem) -> None:
    """Refuse a vessel or reagent that no caller should make.

    Args:
        held: What is in the vessel; SI units as in `PhaseSystem`.
        reagent: The reagent; it has no organic liquid.

    Raises:
        ValueError: A reagent of two liquids, or what `equilibrium.check` refuses.
    """
    check(held)
    check(reagent)
    if reagent.organic:
        raise ValueError("a reagent of two liquids")
