"""What a strength asks for: so much solute in a volume, or so much in a mass."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.substances import Substance

#: Strengths that count by the mass of the whole or of the solvent.
BY_MASS = (dim.MASS_FRACTION, dim.MOLALITY)


class Part(NamedTuple):
    """A solute with its strength."""

    strength: Quantity
    solute: Substance


def per_volume(part: Part) -> float | None:
    """Give the mass of solute that a strength asks for in a volume, kg/m3.

    None for a strength by mass, and where the formula or the density it needs is not known.
    """
    value, dimension = part.strength.middle, part.strength.dimension
    if dimension == dim.MASS_CONCENTRATION:
        return value
    if dimension == dim.CONCENTRATION and part.solute.molar_mass:
        return value * part.solute.molar_mass * 1e-3
    if dimension == dim.VOLUME_FRACTION and part.solute.density is not None:
        return value * part.solute.density.value.middle
    return None


def shares(parts: Sequence[Part]) -> tuple[float, ...] | None:
    """Give the mass of each solute over that of the whole [-].

    None where one of the strengths does not count by mass, or needs a formula that is not known.
    Molalities are of one solvent, so that all of them count together.
    """
    fraction, of_solvent = 0.0, []
    for strength, solute in parts:
        if strength.dimension == dim.MASS_FRACTION:
            fraction += strength.middle
            of_solvent.append(0.0)
        elif strength.dimension == dim.MOLALITY and solute.molar_mass:
            of_solvent.append(strength.middle * solute.molar_mass * 1e-3)
        else:
            return None
    solvent = (1 - fraction) / (1 + sum(of_solvent))
    return tuple(
        part.strength.middle if part.strength.dimension == dim.MASS_FRACTION else ratio * solvent
        for part, ratio in zip(parts, of_solvent, strict=True)
    )


def missing(part: Part) -> str:
    """Say what a strength by volume needs that is not known."""
    what = "density" if part.strength.dimension == dim.VOLUME_FRACTION else "formula"
    return f"the {what} of {part.solute.name} is not known"
