"""Strengths of solutions: five measures of one thing, each its own type.

`5 %` may be by mass, by mass in volume or by volume, and the three differ by what is fatal to a
preparation; so a strength is never a bare number, and one becomes another only through the molar
mass and the densities that the caller gives. Where one is missing the answer says which; no density
is ever taken to be that of water.

Source of all conversions: the definitions of the quantities (IUPAC Green Book, from memory).
"""

from __future__ import annotations

from dataclasses import dataclass
from enum import Enum


@dataclass(frozen=True, slots=True)
class AmountConcentration:
    """Amount of solute over volume of solution, mol/m3 (1 mol/L is 1000 mol/m3)."""

    value: float


@dataclass(frozen=True, slots=True)
class MassConcentration:
    """Mass of solute over volume of solution, kg/m3 (1 % w/v, that is 1 g in 100 mL, is 10)."""

    value: float


@dataclass(frozen=True, slots=True)
class MassFraction:
    """Mass of solute over mass of solution [-], 0 to 1 (% w/w)."""

    value: float


@dataclass(frozen=True, slots=True)
class VolumeFraction:
    """Volume of the pure liquid solute over volume of solution [-], 0 to 1 (% v/v)."""

    value: float


@dataclass(frozen=True, slots=True)
class Molality:
    """Amount of solute over mass of solvent, mol/kg."""

    value: float


Strength = AmountConcentration | MassConcentration | MassFraction | VolumeFraction | Molality


class Need(Enum):
    """What a conversion cannot do without."""

    MOLAR_MASS = "molar mass"
    DENSITY = "density of the solution"
    SOLUTE_DENSITY = "density of the pure solute"


@dataclass(frozen=True, slots=True)
class Needs:
    """A conversion that was not done, and everything it lacks, in a fixed order."""

    what: tuple[Need, ...]


@dataclass(frozen=True, slots=True, kw_only=True)
class Known:
    """What is known of a solution and its solute; None where it is not.

    Attributes:
        molar_mass: Molar mass of the solute, kg/mol, > 0.
        density: Density of this solution at its temperature, kg/m3, > 0.
        solute_density: Density of the pure liquid solute, kg/m3, > 0.
    """

    molar_mass: float | None = None
    density: float | None = None
    solute_density: float | None = None

    def __post_init__(self) -> None:
        """Refuse what no substance has.

        Raises:
            ValueError: A value that is not above 0.
        """
        for value in (self.molar_mass, self.density, self.solute_density):
            if value is not None and value <= 0:
                raise ValueError(f"a molar mass or density of {value}")


def mass_concentration(strength: Strength, known: Known) -> MassConcentration | Needs:
    """Express a strength as mass of solute over volume of solution.

    >>> mass_concentration(MassFraction(0.25), Known(density=1200.0))
    MassConcentration(value=300.0)
    """
    match strength:
        case MassConcentration():
            return strength
        case AmountConcentration(value):
            if known.molar_mass is None:
                return Needs((Need.MOLAR_MASS,))
            return MassConcentration(value * known.molar_mass)
        case VolumeFraction(value):
            if known.solute_density is None:
                return Needs((Need.SOLUTE_DENSITY,))
            return MassConcentration(value * known.solute_density)
        case MassFraction(value):
            if known.density is None:
                return Needs((Need.DENSITY,))
            return MassConcentration(value * known.density)
        case Molality():
            fraction = mass_fraction(strength, known)
            if known.density is None:
                lacking = fraction.what if isinstance(fraction, Needs) else ()
                return Needs((*lacking, Need.DENSITY))
            if isinstance(fraction, Needs):
                return fraction
            return MassConcentration(fraction.value * known.density)


def mass_fraction(strength: Strength, known: Known) -> MassFraction | Needs:
    """Express a strength as mass of solute over mass of solution."""
    match strength:
        case MassFraction():
            return strength
        case Molality(value):
            if known.molar_mass is None:
                return Needs((Need.MOLAR_MASS,))
            solute = value * known.molar_mass
            return MassFraction(solute / (1 + solute))
        case AmountConcentration() | MassConcentration() | VolumeFraction():
            by_volume = mass_concentration(strength, known)
            if known.density is None:
                lacking = by_volume.what if isinstance(by_volume, Needs) else ()
                return Needs((*lacking, Need.DENSITY))
            if isinstance(by_volume, Needs):
                return by_volume
            return MassFraction(by_volume.value / known.density)


def amount_concentration(strength: Strength, known: Known) -> AmountConcentration | Needs:
    """Express a strength as amount of solute over volume of solution.

    >>> concentrated = Known(molar_mass=0.03646, density=1180.0)
    >>> round(amount_concentration(MassFraction(0.36), concentrated).value)
    11651
    """
    if isinstance(strength, AmountConcentration):
        return strength
    by_volume = mass_concentration(strength, known)
    if isinstance(by_volume, Needs):
        return _also_molar_mass(by_volume, known)
    if known.molar_mass is None:
        return Needs((Need.MOLAR_MASS,))
    return AmountConcentration(by_volume.value / known.molar_mass)


def molality(strength: Strength, known: Known) -> Molality | Needs | None:
    """Express a strength as amount of solute over mass of solvent; None where there is no solvent.

    A pure substance has no molality: a mass fraction of 1 leaves nothing to divide by.
    """
    if isinstance(strength, Molality):
        return strength
    by_mass = mass_fraction(strength, known)
    if isinstance(by_mass, Needs):
        return _also_molar_mass(by_mass, known)
    if known.molar_mass is None:
        return Needs((Need.MOLAR_MASS,))
    if by_mass.value >= 1:
        return None
    return Molality(by_mass.value / (1 - by_mass.value) / known.molar_mass)


def volume_fraction(strength: Strength, known: Known) -> VolumeFraction | Needs:
    """Express a strength as volume of the pure liquid solute over volume of solution."""
    if isinstance(strength, VolumeFraction):
        return strength
    by_volume = mass_concentration(strength, known)
    if known.solute_density is None:
        lacking = by_volume.what if isinstance(by_volume, Needs) else ()
        return Needs((*lacking, Need.SOLUTE_DENSITY))
    if isinstance(by_volume, Needs):
        return by_volume
    return VolumeFraction(by_volume.value / known.solute_density)


def _also_molar_mass(needs: Needs, known: Known) -> Needs:
    """Name the molar mass too, first, where it is missing."""
    if known.molar_mass is not None or Need.MOLAR_MASS in needs.what:
        return needs
    return Needs((Need.MOLAR_MASS, *needs.what))
