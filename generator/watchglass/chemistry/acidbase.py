"""Acids and bases in water at one pH: states of protonation, charge, buffers, ionic strength.

A family is what differs by protons only, such as H2CO3, HCO3- and CO3^2-. It is told by its pKa's,
ascending, and the charge of its fully protonated form: (6.35, 10.33) and 0 for carbonic acid, (4.6,)
and 1 for aniline. States are listed from the most to the least protonated, so there is one more of
them than pKa's.

Here the pH is given; `equilibrium` finds it. Everything is ideal (activity coefficient 1) and at
25 °C. Concentrations are in mol/m3, the pH counts mol/L as always.
"""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence

#: Ionic product of water at 25 °C, (mol/L)2. CODATA and IAPWS give 1.01e-14; rounded as is usual.
KW = 1.0e-14
#: Mol/m3 in one mol/L.
PER_LITRE = 1000.0
#: Ionic strength above which an ideal figure is called rough, mol/m3. Judgement: Davies' extension
#: of the Debye-Hückel law is held good to about 0.5 mol/L, and beyond it nothing simple is.
ROUGH_ABOVE = 500.0

#: pKa's that an ideal model in water can mean [-].
PKA_RANGE = (-20.0, 40.0)
_MOST_DECADES = 280.0


def check_pkas(pkas: Sequence[float]) -> None:
    """Refuse pKa's that are no family's.

    Args:
        pkas: pKa's [-].

    Raises:
        ValueError: They do not ascend, one is outside `PKA_RANGE`, or there are too many.
    """
    last, decades = PKA_RANGE[0], 0.0
    for pka in pkas:
        if not last <= pka <= PKA_RANGE[1]:
            raise ValueError(f"pKa's {tuple(pkas)} that do not ascend within {PKA_RANGE}")
        last = pka
        decades += abs(pka)
    if decades > _MOST_DECADES:
        raise ValueError(f"too many pKa's: {tuple(pkas)}")


def hydrogen_ion(ph: float) -> float:
    """Give the concentration of hydrogen ions, mol/m3, at a pH [-]."""
    return float(PER_LITRE * 10.0**-ph)


def hydroxide(ph: float) -> float:
    """Give the concentration of hydroxide, mol/m3, at a pH [-], 25 °C."""
    return float(PER_LITRE * KW * 10.0**ph)


def water_formed(*, hydroxide_before: float, hydroxide_after: float) -> float:
    """Work out how much water proton transfers have made.

    Each hydroxide that is gone became a water; each new one was made of a water. What acids and
    bases hand to one another makes none.

    Args:
        hydroxide_before: Hydroxide in all that was mixed, mol, >= 0.
        hydroxide_after: Hydroxide in the mixture, mol, >= 0.

    Returns:
        Water, mol; below nought where water was taken up.

    Raises:
        ValueError: A negative amount.
    """
    _not_negative(hydroxide_before, hydroxide_after)
    return hydroxide_before - hydroxide_after


def state_fractions(pkas: Sequence[float], ph: float) -> tuple[float, ...]:
    """Share a family out over its states of protonation.

    Args:
        pkas: pKa's, ascending [-]; none for what is neither acid nor base.
        ph: pH of the water [-].

    Returns:
        Fraction of each state [-], the most protonated first; they add up to 1.

    Raises:
        ValueError: The pKa's are no family's.

    Source:
        Law of mass action; ideal.

    Example:
        >>> [round(x, 3) for x in state_fractions((6.35, 10.33), 6.35)]
        [0.5, 0.5, 0.0]
    """
    check_pkas(pkas)
    logs, total = [0.0], 0.0
    for pka in pkas:
        total += ph - pka
        logs.append(total)
    highest = max(logs)
    weights = [10.0 ** (each - highest) for each in logs]
    whole = sum(weights)
    return tuple(weight / whole for weight in weights)


def mean_charge(pkas: Sequence[float], top: int, ph: float) -> float:
    """Give the mean charge of a family.

    Args:
        pkas: pKa's, ascending [-].
        top: Charge of the fully protonated form [-].
        ph: pH of the water [-].

    Returns:
        Charge per molecule [-], between `top - len(pkas)` and `top`.

    Raises:
        ValueError: The pKa's are no family's.

    Example:
        >>> mean_charge((4.6,), 1, 4.6)
        0.5
    """
    return sum((top - lost) * x for lost, x in enumerate(state_fractions(pkas, ph)))


def neutral_fraction(pkas: Sequence[float], top: int, ph: float) -> float:
    """Give the fraction of a family that carries no net charge.

    Args:
        pkas: pKa's, ascending [-].
        top: Charge of the fully protonated form [-].
        ph: pH of the water [-].

    Returns:
        Fraction [-], 0 to 1; 0 where the family has no such state. Zwitterions count as neutral.

    Raises:
        ValueError: The pKa's are no family's.
    """
    fractions = state_fractions(pkas, ph)
    return fractions[top] if 0 <= top <= len(pkas) else 0.0


def isoelectric_point(pkas: Sequence[float], top: int) -> float | None:
    """Find the pH at which an ampholyte carries no charge on average.

    Args:
        pkas: pKa's, ascending [-].
        top: Charge of the fully protonated form [-].

    Returns:
        pH [-], or None where the family has no states on both sides of neutral.

    Raises:
        ValueError: The pKa's are no family's.

    Source:
        Half the sum of the two pKa's around the neutral form; exact for two pKa's, and good to
        0.01 for more where the others are 2 and more away.

    Example:
        >>> round(isoelectric_point((2.35, 9.78), 1), 3)
        6.065
    """
    check_pkas(pkas)
    if not 0 < top < len(pkas):
        return None
    return (pkas[top - 1] + pkas[top]) / 2


def buffer_ph(*, pka: float, acid: float, base: float) -> float:
    """Estimate the pH of a buffer from the amounts of its two forms.

    Args:
        pka: pKa of the acid form [-].
        acid: Amount of the acid form, mol, > 0.
        base: Amount of the base form, mol, > 0.

    Returns:
        pH [-]. It counts what was put in, not what is there at equilibrium: within 0.01 only while
        both are far more than the hydrogen ion and hydroxide. `equilibrium.solve` has no such limit.

    Raises:
        ValueError: An amount that is not positive.

    Source:
        Henderson and Hasselbalch.

    Example:
        >>> buffer_ph(pka=4.75, acid=0.1, base=0.1)
        4.75
    """
    if acid <= 0 or base <= 0:
        raise ValueError(f"a buffer of {acid} mol of acid and {base} mol of base")
    return pka + math.log10(base / acid)


def buffer_base_share(*, pka: float, ph: float) -> float:
    """Tell what share of a buffer must be in its base form for a pH.

    Args:
        pka: pKa of the acid form [-].
        ph: pH wanted [-].

    Returns:
        Share of the base form [-], 0 to 1; the rest is the acid form.

    Raises:
        ValueError: The pKa is none.

    Source:
        Henderson and Hasselbalch.
    """
    return state_fractions((pka,), ph)[1]


def buffer_capacity(families: Iterable[tuple[Sequence[float], int, float]], ph: float) -> float:
    """Work out how much strong base a solution takes for a rise in pH.

    Args:
        families: pKa's [-], charge of the fully protonated form [-] and concentration, mol/m3,
            of each family.
        ph: pH [-].

    Returns:
        Strong base per unit of pH, mol/m3.

    Raises:
        ValueError: The pKa's are no family's.

    Source:
        Van Slyke's buffer value: ln 10 times the variance of the charge; ideal.
    """
    value = hydrogen_ion(ph) + hydroxide(ph)
    for pkas, top, concentration in families:
        fractions = state_fractions(pkas, ph)
        mean = sum((top - lost) * x for lost, x in enumerate(fractions))
        value += concentration * sum(
            (top - lost - mean) ** 2 * x for lost, x in enumerate(fractions)
        )
    return math.log(10.0) * value


def ionic_strength(ions: Iterable[tuple[float, int]]) -> float:
    """Work out an ionic strength.

    Args:
        ions: Concentration, mol/m3, >= 0, and charge [-] of each ion.

    Returns:
        Ionic strength, mol/m3.

    Raises:
        ValueError: A negative concentration.

    Source:
        Lewis and Randall: half the sum of concentration times the square of the charge.

    Example:
        >>> ionic_strength([(100.0, 1), (50.0, -2)])
        150.0
    """
    total = 0.0
    for concentration, charge in ions:
        _not_negative(concentration)
        total += concentration * charge * charge
    return total / 2


def is_rough(strength: float | None) -> bool:
    """Tell whether ideal figures are rough at an ionic strength, mol/m3; they are where unknown."""
    return strength is None or strength > ROUGH_ABOVE


def _not_negative(*values: float) -> None:
    if any(value < 0 for value in values):
        raise ValueError(f"a negative value among {values}")
