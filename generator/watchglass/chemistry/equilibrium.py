"""One pH for a vessel: charge balance, partition between two liquids, what separates.

`solve` takes what is in a vessel (`PhaseSystem`) and gives its pH and where each family is
(`Equilibrium`). The model, everywhere: 25 °C, Kw = 1.0e-14, ideal; strong ions stay apart and in
the water; only the neutral form of a family goes into the organic liquid, with one ratio; the
neutral form reaches its cap in the water and what is beyond leaves as solid or gas; additive
volumes; no ion pairs, dimers or mutual solubility.

Why bisection and not a numerical package: with N the neutral form in water, every family is
N times fixed powers of the hydrogen ion, and N is the smaller of amount / (sum of the powers +
ratio x volumes) and cap x volume. So the charge of each family only ever falls as the pH rises,
whether it partitions, separates or neither, the sum crosses nought once, and halving always finds
it. The cap needs no second search.

A ratio may be unknown. The charge that its family leaves in the water then lies between none and
all that it would bring without an organic liquid, which bounds the pH from both sides. Where the
bounds meet, the pH is told all the same; where they do not, it is unknown and so is what hangs on it.
"""

from __future__ import annotations

import math
from typing import NamedTuple

from watchglass.chemistry.acidbase import hydrogen_ion, hydroxide, state_fractions
from watchglass.chemistry.charge_balance import PH_RANGE, balanced_ph, ready
from watchglass.chemistry.phases import Family, PhaseSystem, check, unknown_ratios

__all__ = [
    "PH_RANGE",
    "SAME_PH",
    "Equilibrium",
    "Family",
    "Part",
    "PhaseSystem",
    "charge",
    "check",
    "solve",
    "unknown_ratios",
]

#: Bounds of the pH no further apart than this count as one [-].
SAME_PH = 0.01
#: Parts at both bounds that differ by no more than this share of the whole count as one [-].
SAME_SHARE = 1e-3
#: The pH taken for "beyond", to see whether anything still hangs on it [-].
_BEYOND = 4.0


class Part(NamedTuple):
    """Where a family is; None in place of each number that is unknown.

    Attributes:
        aqueous: In the water, all states together, mol.
        organic: In the organic liquid, mol.
        left: Out of solution, mol; `Family.gas` tells as what.
        charge: Mean charge of what is in the water [-].
        fractions: Fraction of each state of what is in the water [-], the most protonated first.
    """

    aqueous: float | None
    organic: float | None
    left: float | None
    charge: float | None
    fractions: tuple[float, ...] | None


_UNKNOWN = Part(None, None, None, None, None)


class Equilibrium(NamedTuple):
    """A vessel at equilibrium.

    Attributes:
        ph: pH of the water [-]; None where unknown.
        parts: One for each family of the system, in its order.
        ionic_strength: Of the water, mol/m3; where `strong_squares` is not given, the least that it
            can be; None where unknown.
        low: The pH is no lower than this [-]; -inf where it is below `PH_RANGE`.
        high: The pH is no higher than this [-]; inf where it is above `PH_RANGE`.
    """

    ph: float | None
    parts: tuple[Part, ...]
    ionic_strength: float | None
    low: float
    high: float


def solve(system: PhaseSystem) -> Equilibrium:
    """Find the pH of a vessel and where everything in it is.

    Args:
        system: What is in the vessel; SI units as in `PhaseSystem`.

    Returns:
        Its equilibrium. What an unknown ratio leaves open is None there.

    Raises:
        ValueError: No water, a negative volume, amount, ratio or cap, pKa's that do not ascend.

    Source:
        Charge balance by bisection; Nernst's distribution law. Checked in tests/outside against
        published and independently computed cases.

    Example:
        0.100 mol of acetic acid in a litre of water:

        >>> acetic = Family(pkas=(4.75,), top=0, amount=0.100)
        >>> found = solve(PhaseSystem((acetic,), strong=0.0, aqueous=1e-3))
        >>> round(found.ph, 2)
        2.88
    """
    check(system)
    groups = ready(system)
    low = balanced_ph(groups, system, envelope=-1)
    high = balanced_ph(groups, system, envelope=1) if groups.doubtful else low
    if -math.inf < low and high < math.inf and high - low <= SAME_PH:
        ph = (low + high) / 2
        parts = tuple([_part(family, system, ph) for family in system.families])
        return Equilibrium(ph, parts, _ionic_strength(system, ph, parts), low, high)
    # Both may lie beyond the same end; the pH is then bounded by that end.
    low, high = min(low, PH_RANGE[1]), max(high, PH_RANGE[0])
    least, most = max(low, PH_RANGE[0] - _BEYOND), min(high, PH_RANGE[1] + _BEYOND)
    between = tuple(_part_between(family, system, least, most) for family in system.families)
    return Equilibrium(None, between, None, low, high)


def charge(system: PhaseSystem, ph: float) -> float:
    """Give the charge that the water of a system would carry at a pH; nought at its own.

    Args:
        system: What is in the vessel; SI units as in `PhaseSystem`.
        ph: pH [-].

    Returns:
        Charge, mol; above nought where the pH of the system is higher than the one given.

    Raises:
        ValueError: As `solve`; or an unknown ratio bears on it, as `unknown_ratios` tells.
    """
    check(system)
    if unknown_ratios(system):
        raise ValueError("a charge that hangs on an unknown ratio")
    total = system.strong + system.aqueous * (hydrogen_ion(ph) - hydroxide(ph))
    for family in system.families:
        part = _part(family, system, ph)
        if part.aqueous is not None and part.charge is not None and (family.pkas or family.top):
            total += part.aqueous * part.charge
    return total


def _part(family: Family, system: PhaseSystem, ph: float) -> Part:
    """Give where a family is at the pH of the water."""
    pkas, top, amount, ratio, cap, _, _ = family
    fractions = state_fractions(pkas, ph)
    mean = 0.0
    for lost, fraction in enumerate(fractions):
        mean += (top - lost) * fraction
    if not amount or not 0 <= top <= len(pkas):
        return Part(amount, 0.0, 0.0, mean, fractions)
    if ratio is None:
        if system.organic:
            return Part(None, None, 0.0 if cap is None else None, mean, fractions)
        ratio = 0.0
    neutral = fractions[top]
    factor = ratio * system.organic / system.aqueous * neutral
    water, left = amount / (1.0 + factor), 0.0
    if cap is not None and water * neutral > cap * system.aqueous:
        water = cap * system.aqueous / neutral
        left = max(amount - water - factor * water, 0.0)
    return Part(water, factor * water, left, mean, fractions)


def _part_between(family: Family, system: PhaseSystem, low: float, high: float) -> Part:
    """Give where a family is while the pH is only known to lie between two; None for what differs."""
    middle = _part(family, system, (low + high) / 2)
    if not family.pkas or not family.amount:
        return middle
    one, other = _part(family, system, low), _part(family, system, high)
    near = SAME_SHARE * family.amount
    moved = [
        abs(here - there)
        for here, there in zip(one[:3], other[:3], strict=True)
        if here is not None and there is not None
    ]
    # The charge only ever falls: where it is the same at both ends it is the same between them, and
    # so is every fraction but one too small to be seen, whose part the amounts show.
    same_charge = abs((one.charge or 0.0) - (other.charge or 0.0)) <= SAME_SHARE
    return middle if same_charge and max(moved, default=0.0) <= near else _UNKNOWN


def _ionic_strength(system: PhaseSystem, ph: float, parts: tuple[Part, ...]) -> float | None:
    """Give the ionic strength of the water, mol/m3, or None where a family's part is unknown."""
    squares = system.strong_squares
    total = abs(system.strong) if squares is None else squares
    total += system.aqueous * (hydrogen_ion(ph) + hydroxide(ph))
    for family, part in zip(system.families, parts, strict=True):
        if not family.pkas and not family.top:
            continue
        if part.aqueous is None or part.fractions is None:
            return None
        top, mean = family.top, 0.0
        for lost, fraction in enumerate(part.fractions):
            mean += (top - lost) * (top - lost) * fraction
        total += mean * part.aqueous
    return total / 2 / system.aqueous
