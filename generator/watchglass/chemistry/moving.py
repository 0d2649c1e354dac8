"""Reagent that moves an acid or a base from an organic liquid into water.

Closed forms for one monoprotic substance; `volume_to_move` for any vessel.
"""

from __future__ import annotations

import math
from typing import NamedTuple

from watchglass.chemistry.equilibrium import PH_RANGE, Family, PhaseSystem, charge, solve
from watchglass.chemistry.reagents import check_reagent, least_volume, with_reagent


class Reagent(NamedTuple):
    """What moves a share of a family into the water.

    Attributes:
        amount: Strong acid or base that it takes, mol; 0 where water alone is enough.
        ph: pH of the water then [-].
    """

    amount: float
    ph: float


def volume_to_move(
    held: PhaseSystem,
    reagent: PhaseSystem,
    place: int,
    share: float,
    *,
    most: float | None = None,
) -> float | None:
    """Find how much of a reagent brings a share of one family into the water.

    Args:
        held: What is in the vessel, both layers.
        reagent: The reagent, any volume of it, without organic liquid.
        place: Place of the family in `held.families`, counted from 0.
        share: Share of it to be in the water [-], 0 to 1.
        most: No more than this is tried, m3, >= 0; None for `MOST` times the water in the vessel.

    Returns:
        Volume, m3, the least that does it; None where none does. It moves by what the reagent does
        to the pH and by the water that it brings.

    Raises:
        ValueError: As `volume_to_ph`; no such family, none of it, an unknown ratio of it, or a
            share out of its range.

    Source:
        `equilibrium.solve` at each volume tried, as `volume_to_ph` tries them.
    """
    check_reagent(held, reagent)
    if not 0 <= share <= 1 or not 0 <= place < len(held.families):
        raise ValueError(f"a share of {share} of family {place}")
    if not held.families[place].amount:
        raise ValueError("a share of nothing")

    def moved(volume: float) -> bool:
        system = with_reagent(held, reagent, volume)
        there = solve(system).parts[place].aqueous
        if there is None:
            raise ValueError("a share that hangs on an unknown ratio")
        return there >= share * system.families[place].amount

    return 0.0 if moved(0.0) else least_volume(moved, held.aqueous, most)


def acid_to_move_amine(
    *, amount: float, pka: float, ratio: float, organic: float, aqueous: float, share: float
) -> Reagent | None:
    """Work out the strong acid that moves a share of an amine from an organic liquid into water.

    Args:
        amount: Amount of the amine in both layers, mol, >= 0.
        pka: pKa of its conjugate acid [-].
        ratio: Partition ratio of the free amine, organic over aqueous [-], >= 0.
        organic: Volume of the organic liquid, m3, >= 0.
        aqueous: Volume of the water, that of the acid included, m3, > 0.
        share: Share to be in the water [-], above 0 and below 1.

    Returns:
        Acid, mol, and the pH; None where no pH in `PH_RANGE` does it. What salt the amine forms and
        the acid that stays free are both in it.

    Raises:
        ValueError: An argument out of its range.

    Source:
        Fraction of the free amine = (1 - share) / share x Va / (K Vo), hence the pH; then the
        charge balance.

    Example:
        Aniline, 10 mmol in 50 mL of ether, into 20 mL of acid:

        >>> found = acid_to_move_amine(
        ...     amount=0.010, pka=4.6, ratio=7.9, organic=50e-6, aqueous=20e-6, share=0.99
        ... )
        >>> round(found.amount, 5), round(found.ph, 2)
        (0.01088, 1.31)
    """
    amine = Family((pka,), 1, amount, ratio)
    return _to_move(amine, organic=organic, aqueous=aqueous, share=share)


def base_to_move_acid(
    *, amount: float, pka: float, ratio: float, organic: float, aqueous: float, share: float
) -> Reagent | None:
    """Work out the strong base that moves a share of an acid from an organic liquid into water.

    Args:
        amount: Amount of the acid in both layers, mol, >= 0.
        pka: pKa of the acid [-].
        ratio: Partition ratio of the acid, organic over aqueous [-], >= 0.
        organic: Volume of the organic liquid, m3, >= 0.
        aqueous: Volume of the water, that of the base included, m3, > 0.
        share: Share to be in the water [-], above 0 and below 1.

    Returns:
        Base, mol, and the pH; None where no pH in `PH_RANGE` does it.

    Raises:
        ValueError: An argument out of its range.

    Source:
        As `acid_to_move_amine`.
    """
    acid = Family((pka,), 0, amount, ratio)
    return _to_move(acid, organic=organic, aqueous=aqueous, share=share)


def reagent_by_equation(*, amount: float, sites: int = 1, excess: float = 1.0) -> float:
    """Work out the acid or base that the equation asks for, with an excess.

    Args:
        amount: Amount of the amine or acid to be moved, mol, >= 0.
        sites: Protons that each molecule takes up or gives off [-], >= 1.
        excess: Factor on what the equation asks for [-], >= 1.

    Returns:
        Reagent, mol. It says nothing of whether the share moves: a weak base may need far more.

    Raises:
        ValueError: An argument out of its range.
    """
    if amount < 0 or sites < 1 or excess < 1:
        raise ValueError(f"{amount} mol of {sites} sites with an excess of {excess}")
    return amount * sites * excess


def _to_move(family: Family, *, organic: float, aqueous: float, share: float) -> Reagent | None:
    """Give the strong acid or base that brings a share of a monoprotic family into the water."""
    ratio = family.ratio or 0.0
    if not 0 < share < 1:
        raise ValueError(f"a share of {share}")
    system = PhaseSystem((family,), 0.0, aqueous, organic)
    alone = solve(system)
    there = alone.parts[0].aqueous
    if there is not None and alone.ph is not None and there >= share * family.amount:
        return Reagent(0.0, alone.ph)
    # Water alone does not hold the share, so there is a ratio, a volume and a pH beyond its own.
    neutral = (1 - share) / share * aqueous / (ratio * organic)
    towards = -1.0 if family.top else 1.0
    ph = family.pkas[0] + towards * math.log10(1 / neutral - 1)
    if not PH_RANGE[0] <= ph <= PH_RANGE[1]:
        return None
    return Reagent(abs(charge(system, ph)), ph)
