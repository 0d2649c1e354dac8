"""Figures of the model in words: three figures, a pH two places, one below 0 as "below 0"."""

from __future__ import annotations

from watchglass.base.figures import shown

FIGURES = 3


def ph_words(ph: float) -> str:
    """Write a pH: two places, below 0 as such.

    >>> ph_words(7.5044), ph_words(-0.46)
    ('pH 7.50', 'pH below 0')
    """
    return "pH below 0" if ph < 0 else f"pH {ph:.2f}"


def amount_words(amount: float) -> str:
    """Write an amount of substance in mmol, or µmol where it is small.

    >>> amount_words(1.925e-3), amount_words(2.5e-6)
    ('1.92 mmol', '2.50 µmol')
    """
    if 0 < amount < 1e-5:
        return f"{shown(amount * 1e6, FIGURES)} µmol"
    return f"{shown(amount * 1e3, FIGURES)} mmol"


def volume_words(volume: float, figures: int = FIGURES) -> str:
    """Write a volume in mL.

    >>> volume_words(1.5e-5)
    '15.0 mL'
    """
    return f"{shown(volume * 1e6, figures)} mL"


def share_words(share: float) -> str:
    """Write a share in per cent; what is nearly all or nearly nothing is not rounded to it.

    >>> share_words(0.98253), share_words(0.99996), share_words(0.0004)
    ('98.3 %', '> 99.9 %', '< 0.1 %')
    """
    if share > 0.9995 and share < 1.0 - 1e-9:
        return "> 99.9 %"
    if 0 < share < 0.0005:
        return "< 0.1 %"
    return f"{100 * share:.1f} %"
