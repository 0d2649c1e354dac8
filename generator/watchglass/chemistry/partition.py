"""Partition of a substance between water and a liquid that does not mix with it.

Closed forms, for one substance and one pH at a time; where several families share the water and set
its pH together, `equilibrium.solve` is the way, and `moving` tells the reagent it takes. Only the neutral form goes into the organic liquid.
Volumes in m3, amounts in mol, ratios always organic over aqueous. Layers are at equilibrium, and
each portion is drawn off whole.
"""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

from watchglass.chemistry.acidbase import neutral_fraction

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence


def distribution_ratio(*, pkas: Sequence[float], top: int, ratio: float, ph: float) -> float:
    """Work out the distribution ratio of a family, all its forms together.

    Args:
        pkas: pKa's, ascending [-].
        top: Charge of the fully protonated form [-].
        ratio: Partition ratio of the neutral form, organic over aqueous [-], >= 0.
        ph: pH of the water [-].

    Returns:
        Concentration in the organic liquid over that of all forms in water [-].

    Raises:
        ValueError: A negative ratio, or pKa's that are no family's.

    Source:
        D = K x fraction of the neutral form.
    """
    _positive_or_nought(ratio)
    return ratio * neutral_fraction(pkas, top, ph)


def acid_distribution_ratio(*, pka: float, ratio: float, ph: float) -> float:
    """Work out the distribution ratio of a monoprotic acid.

    Args:
        pka: pKa of the acid [-].
        ratio: Partition ratio of the acid, organic over aqueous [-], >= 0.
        ph: pH of the water [-].

    Returns:
        Distribution ratio [-].

    Raises:
        ValueError: A negative ratio, or a pKa that is none.

    Source:
        D = K / (1 + 10^(pH - pKa)).

    Example:
        >>> acid_distribution_ratio(pka=5.0, ratio=3.0, ph=5.0)
        1.5
    """
    return distribution_ratio(pkas=(pka,), top=0, ratio=ratio, ph=ph)


def base_distribution_ratio(*, pka: float, ratio: float, ph: float) -> float:
    """Work out the distribution ratio of a base with one basic place.

    Args:
        pka: pKa of its conjugate acid [-].
        ratio: Partition ratio of the free base, organic over aqueous [-], >= 0.
        ph: pH of the water [-].

    Returns:
        Distribution ratio [-].

    Raises:
        ValueError: A negative ratio, or a pKa that is none.

    Source:
        D = K / (1 + 10^(pKaH - pH)).
    """
    return distribution_ratio(pkas=(pka,), top=1, ratio=ratio, ph=ph)


def share_in_organic(*, ratio: float, organic: float, aqueous: float) -> float:
    """Work out the share of a substance that one portion takes up.

    Args:
        ratio: Distribution ratio, organic over aqueous [-], >= 0.
        organic: Volume of the organic liquid, m3, >= 0.
        aqueous: Volume of the water, m3, >= 0.

    Returns:
        Share in the organic liquid [-], 0 to 1.

    Raises:
        ValueError: An argument out of its range, or no volume at all.

    Source:
        Nernst's distribution law.

    Example:
        >>> share_in_organic(ratio=3.0, organic=1.0, aqueous=1.0)
        0.75
    """
    _positive_or_nought(ratio, organic, aqueous)
    if not organic + aqueous:
        raise ValueError("two layers without volume")
    if not aqueous:
        return 1.0
    return ratio * organic / (ratio * organic + aqueous)


def share_left(*, ratio: float, portions: Iterable[float], layer: float) -> float:
    """Work out the share that stays in the water after several portions of organic liquid.

    Args:
        ratio: Distribution ratio, organic over aqueous [-], >= 0; the same for each portion.
        portions: Volume of each portion, m3, >= 0.
        layer: Volume of the water, m3, > 0.

    Returns:
        Share left [-], 0 to 1; 1 without portions.

    Raises:
        ValueError: An argument out of its range.

    Source:
        Product of Va / (Va + K Vo) over the portions. To wash an organic layer with water instead,
        give the reciprocal of the ratio.

    Example:
        >>> share_left(ratio=10.0, portions=[20e-6] * 4, layer=100e-6)
        0.012345679012345678
    """
    _positive_or_nought(ratio)
    if layer <= 0:
        raise ValueError(f"a layer of {layer} m3")
    left = 1.0
    for portion in portions:
        _positive_or_nought(portion)
        left *= layer / (layer + ratio * portion)
    return left


def portions_needed(*, ratio: float, portion: float, layer: float, share: float) -> int | None:
    """Count the equal portions that take a share out of the water.

    Args:
        ratio: Distribution ratio, organic over aqueous [-], >= 0.
        portion: Volume of each portion, m3, >= 0.
        layer: Volume of the water, m3, > 0.
        share: Share to be taken out [-], 0 to 1.

    Returns:
        The least number that takes at least that share; None where none is enough.

    Raises:
        ValueError: An argument out of its range.
    """
    _check_share(share)
    left = share_left(ratio=ratio, portions=(portion,), layer=layer)
    if share == 0:
        return 0
    if left == 1 or share == 1:
        return None
    if left == 0:
        return 1
    # A share met to the last bit is met: the quotient is not rounded up for its rounding.
    return math.ceil(math.log1p(-share) / math.log(left) - 1e-9)


def ratio_of_solubilities(*, organic: float, aqueous: float) -> float:
    """Estimate a partition ratio by the solubilities in the two liquids.

    Args:
        organic: Solubility in the organic liquid, mol/m3 or kg/m3, >= 0.
        aqueous: Solubility in water in the same unit, > 0.

    Returns:
        Ratio, organic over aqueous [-]. An estimate: each liquid takes up some of the other, and
        near saturation the law is no longer simple.

    Raises:
        ValueError: An argument out of its range.
    """
    _positive_or_nought(organic)
    if aqueous <= 0:
        raise ValueError(f"a solubility of {aqueous} in water")
    return organic / aqueous


def ratio_of_log_p(log_p: float) -> float:
    """Turn log P, octan-1-ol over water, into a ratio [-]; for other solvents it only stands in."""
    return float(10.0**log_p)


def salted_out(*, ratio: float, constant: float, salt: float) -> float:
    """Work out what salt in the water does to a partition ratio.

    Args:
        ratio: Ratio without salt, organic over aqueous [-], >= 0.
        constant: Setschenow's constant of the substance with that salt, m3/mol; above nought where
            the salt drives it out.
        salt: Concentration of the salt, mol/m3, >= 0.

    Returns:
        Ratio with salt [-].

    Raises:
        ValueError: An argument out of its range.

    Source:
        Setschenow: lg(s0 / s) = Ks c.
    """
    _positive_or_nought(ratio, salt)
    return float(ratio * 10.0 ** (constant * salt))


def _check_share(share: float) -> None:
    if not 0 <= share <= 1:
        raise ValueError(f"a share of {share}")


def _positive_or_nought(*values: float) -> None:
    if any(value < 0 for value in values):
        raise ValueError(f"a negative value among {values}")
