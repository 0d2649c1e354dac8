"""What is in a vessel, in the terms of the equilibrium: families, strong ions, two volumes."""

from __future__ import annotations

import math
from typing import NamedTuple

from watchglass.chemistry.acidbase import check_pkas


class Family(NamedTuple):
    """Forms of one substance that differ by protons.

    Attributes:
        pkas: pKa's, ascending [-]; none for what is neither acid nor base.
        top: Charge of the fully protonated form [-].
        amount: Amount in water, organic liquid and solid together, mol, >= 0.
        ratio: Concentration of the neutral form in the organic liquid over that in water [-],
            >= 0; None where unknown. Without organic liquid it does not count.
        cap: Most that the neutral form reaches in water, mol/m3, >= 0; None where there is no such
            limit, or none is known: nothing separates then, and the caller says why.
        gas: Whether what is beyond the cap leaves as gas; otherwise it is a solid.
        key: Name by which a family in two liquids is known to be the same; empty for none.
    """

    pkas: tuple[float, ...]
    top: int
    amount: float
    ratio: float | None = None
    cap: float | None = None
    gas: bool = False
    key: str = ""


class PhaseSystem(NamedTuple):
    """What is in a vessel.

    Attributes:
        families: Acids, bases and neutral substances.
        strong: Charge of the strong ions, cations less anions, mol: sodium, potassium, …, less
            chloride, nitrate, …; 3 M hydrochloric acid has -3 mol in a litre.
        aqueous: Volume of the water layer, m3, > 0.
        organic: Volume of the organic liquid, m3; 0 for none.
        strong_squares: Sum over the strong ions of amount times charge squared, mol; None where
            only their balance is known.
    """

    families: tuple[Family, ...]
    strong: float
    aqueous: float
    organic: float = 0.0
    strong_squares: float | None = None


def unknown_ratios(system: PhaseSystem) -> tuple[int, ...]:
    """Tell which families have an unknown ratio that bears on the pH.

    Args:
        system: What is in the vessel.

    Returns:
        Their places in `system.families`, counted from 0. A family does not bear on the pH without
        organic liquid, without amount, without pKa's, or without a neutral form.
    """
    if not system.organic:
        return ()
    return tuple(
        place
        for place, family in enumerate(system.families)
        if family.ratio is None and family.amount and family.pkas and _has_neutral(family)
    )


def check(system: PhaseSystem) -> None:
    """Refuse a system that no caller should make.

    Args:
        system: What is in the vessel; SI units as in `PhaseSystem`.

    Raises:
        ValueError: As `solve`.
    """
    families, strong, aqueous, organic, squares = system
    if not (0 < aqueous < math.inf and 0 <= organic < math.inf and math.isfinite(strong)):
        raise ValueError(
            f"{aqueous} m3 of water with a charge of {strong} mol, {organic} m3 besides"
        )
    if squares is not None and squares < 0:
        raise ValueError(f"a sum of squares of {squares} mol")
    for pkas, _, amount, ratio, cap, _, _ in families:
        if not 0 <= amount < math.inf:
            raise ValueError(f"an amount of {amount} mol")
        if (ratio is not None and not 0 <= ratio < math.inf) or (cap is not None and not cap >= 0):
            raise ValueError(f"a ratio of {ratio} with a cap of {cap} mol/m3")
        check_pkas(pkas)


def _has_neutral(family: Family) -> bool:
    return 0 <= family.top <= len(family.pkas)
