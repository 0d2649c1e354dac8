"""Rounding for display: the one place where a computed number becomes digits.

Digits are rounded half to even on the shortest decimal that gives the same float, so that the
last bit of a float never shows and two machines print the same.
"""

from __future__ import annotations

from decimal import ROUND_HALF_EVEN, Decimal
from math import isfinite

#: Figures shown of what rests on catalogue values alone (a molar mass, a handbook density).
CATALOGUE_FIGURES = 5
#: No computed figure shows more than this, however many its inputs have.
MOST_FIGURES = 6


def rounded(value: float, figures: int) -> Decimal:
    """Round to significant figures.

    Args:
        value: Any finite number.
        figures: Significant figures, at least 1.

    Returns:
        The rounded value with just those digits; nought stays `0`.

    >>> str(rounded(0.0031832, 2)), str(rounded(1249.7, 3))
    ('0.0032', '1.25E+3')
    """
    exact = Decimal(f"{value:.14g}")
    if not exact:
        return Decimal(0)
    place = Decimal(1).scaleb(exact.adjusted() - figures + 1)
    result = exact.quantize(place, rounding=ROUND_HALF_EVEN)
    if result.adjusted() > exact.adjusted():  # 9.96 to two figures is 10, not 10.0
        result = result.quantize(place.scaleb(1), rounding=ROUND_HALF_EVEN)
    return result


def shown(value: float, figures: int) -> str:
    """Write a computed number with so many figures.

    Plain digits from 1e-4 up to 1e6, with noughts before the point where the figures do not
    reach it (1249.7 to two figures prints 1200); powers of ten beyond.

    >>> shown(1249.7, 2), shown(0.05, 3), shown(6.02214076e23, 3)
    ('1200', '0.0500', '6.02 × 10^23')
    """
    if not isfinite(value):
        return "unknown"
    figures = max(1, min(figures, MOST_FIGURES))
    result = rounded(value, figures)
    if not result:
        return "0"
    if -5 < result.adjusted() < 6:
        return minus(format(result, "f"))
    mantissa, _, exponent = format(result, "E").partition("E")
    return minus(f"{mantissa} × 10^{int(exponent)}")


def minus(digits: str) -> str:
    """Put a minus sign for the hyphen that computers write."""
    return digits.replace("-", "−")
