"""How much of each substance a quantity of a material brings.

Plain stoichiometry: mass through molar mass, volume through density, solutions through their
strength. Where a density or a formula is missing the answer is `Missing`, with what is missing:
it is printed as unknown and never counted as nought.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.base.figures import CATALOGUE_FIGURES
from watchglass.chemistry.stoichiometry import (
    amount_in_solution,
    amount_of_mass,
    mass_of_amount,
)
from watchglass.resolve import model

if TYPE_CHECKING:
    from watchglass.base.dimensions import Dimension
    from watchglass.catalogue.substances import Substance

#: Figures that a solubility, a density from the table, and one taken for water's are good for.
SOLUBILITY_FIGURES, DENSITY_FIGURES, ASSUMED_FIGURES = 3, 4, 2


@dataclass(frozen=True, slots=True)
class Content:
    """So much of one substance.

    Attributes:
        substance: Which.
        moles: Amount of substance, mol.
        mass: Mass, kg.
        figures: Significant figures that may be shown.
    """

    substance: Substance
    moles: float
    mass: float
    figures: int


@dataclass(frozen=True, slots=True)
class Missing:
    """Why it cannot be computed.

    Attributes:
        what: `density`, `solution density`, `formula`, `solubility`, `composition`, `size` (of a
            countable measure).
        substance: Of which substance, or None.
    """

    what: str
    substance: Substance | None


def contents(
    material: model.Material, dimension: Dimension, value: float, figures: int
) -> tuple[Content, ...] | Missing:
    """Work out what a quantity of a material holds.

    Args:
        material: What it is.
        dimension: Mass, volume or amount of substance.
        value: How much, in SI units (kg, m3, mol).
        figures: Significant figures of that quantity.

    Returns:
        One entry a substance (a solvent is left out), or what is missing.
    """
    match material.composition:
        case model.Pure(substance):
            return _one(_pure(substance, dimension, value, figures))
        case model.Solution(strength, solute, _):
            facts = material.solution
            return _one(_solution(strength, solute, dimension, value, figures, facts))
        case model.Saturated(solute, _):
            return _one(_saturated(solute, dimension, value, figures, material.solution))
        case model.Mixture():
            return _mixture(material.composition, dimension, value, figures)
        case _:
            return Missing("composition", None)


def _one(found: Content | Missing) -> tuple[Content, ...] | Missing:
    return found if isinstance(found, Missing) else (found,)


def _of_mass(substance: Substance, mass: float, figures: int) -> Content | Missing:
    molar_mass = substance.formula.molar_mass_si if substance.formula else None
    if molar_mass is None:
        return Missing("formula", substance)
    moles = amount_of_mass(mass=mass, molar_mass=molar_mass)
    return Content(substance, moles, mass, min(figures, CATALOGUE_FIGURES))


def _of_moles(substance: Substance, moles: float, figures: int) -> Content | Missing:
    molar_mass = substance.formula.molar_mass_si if substance.formula else None
    if molar_mass is None:
        return Missing("formula", substance)
    mass = mass_of_amount(amount=moles, molar_mass=molar_mass)
    return Content(substance, moles, mass, min(figures, CATALOGUE_FIGURES))


def _of_volume(substance: Substance, volume: float, figures: int) -> Content | Missing:
    if substance.density is None:
        return Missing("density", substance)
    density = substance.density.value
    # A handbook's density does not limit what is measured at the bench: it is known better.
    return _of_mass(substance, volume * density.si, figures)


def _pure(
    substance: Substance, dimension: Dimension, value: float, figures: int
) -> Content | Missing:
    if dimension == dim.MASS:
        return _of_mass(substance, value, figures)
    if dimension == dim.AMOUNT:
        return _of_moles(substance, value, figures)
    if dimension == dim.VOLUME:
        return _of_volume(substance, value, figures)
    return Missing("size", substance)


def _solution(
    strength: model.Strength,
    solute: Substance,
    dimension: Dimension,
    value: float,
    figures: int,
    facts: model.SolutionFacts | None = None,
) -> Content | Missing:
    basis, by = strength.quantity.dimension, strength.quantity.middle
    shown = min(figures, strength.quantity.figures)
    if dimension == dim.AMOUNT:
        return _of_moles(solute, value, figures)
    if dimension == dim.VOLUME:
        if basis == dim.CONCENTRATION:
            return _of_moles(solute, amount_in_solution(volume=value, concentration=by), shown)
        if basis == dim.MASS_CONCENTRATION:
            return _of_mass(solute, by * value, shown)
        if basis == dim.VOLUME_FRACTION:
            return _of_volume(solute, by * value, shown)
        if facts is not None and facts.per_volume is not None:
            return _of_mass(solute, facts.per_volume * value, _through_density(shown, facts))
        return Missing("solution density", solute)
    if dimension == dim.MASS:
        if basis == dim.MASS_FRACTION:
            return _of_mass(solute, by * value, shown)
        if facts is not None and facts.fraction is not None and facts.density is not None:
            return _of_mass(solute, facts.fraction * value, _through_density(shown, facts))
        return Missing("solution density", solute)
    return Missing("size", solute)


def _saturated(
    solute: Substance,
    dimension: Dimension,
    value: float,
    figures: int,
    facts: model.SolutionFacts | None,
) -> Content | Missing:
    """Work out what a saturated solution holds; a solubility is good for three figures."""
    shown = min(figures, SOLUBILITY_FIGURES)
    if dimension == dim.AMOUNT:
        return _of_moles(solute, value, shown)
    if facts is None:
        return Missing("solubility", solute)
    if dimension == dim.VOLUME and facts.per_volume is not None:
        return _of_mass(solute, facts.per_volume * value, shown)
    if dimension == dim.MASS and facts.fraction is not None:
        return _of_mass(solute, facts.fraction * value, shown)
    return Missing("solution density", solute)


def _through_density(figures: int, facts: model.SolutionFacts) -> int:
    """Limit the figures of what rests on the density of a solution."""
    if facts.source == "water":
        return min(figures, ASSUMED_FIGURES)
    return min(figures, DENSITY_FIGURES)


def _mixture(
    mixture: model.Mixture, dimension: Dimension, value: float, figures: int
) -> tuple[Content, ...] | Missing:
    if mixture.basis == "strength":
        found = [
            _solution(
                model.Strength(part.quantity, part.span), part.substance, dimension, value, figures
            )
            for part in mixture.parts
        ]
    elif mixture.basis == "mass" and dimension == dim.MASS:
        whole = sum(part.quantity.si for part in mixture.parts)
        found = [
            _of_mass(part.substance, value * part.quantity.si / whole, figures)
            for part in mixture.parts
        ]
    elif mixture.basis == "amount" and dimension == dim.MASS:
        masses = [part.substance.molar_mass for part in mixture.parts]
        for part, mass in zip(mixture.parts, masses, strict=True):
            if mass is None:
                return Missing("formula", part.substance)
        whole = sum(
            p.quantity.si * m * 1e-3 for p, m in zip(mixture.parts, masses, strict=True) if m
        )
        found = [
            _of_moles(part.substance, value * part.quantity.si / whole, figures)
            for part in mixture.parts
        ]
    elif mixture.basis in ("volume", "mass", "amount"):
        return _by_density(mixture, dimension, value, figures)
    else:
        return Missing("density", None)
    return _all(found)


def _all(found: list[Content | Missing]) -> tuple[Content, ...] | Missing:
    for entry in found:
        if isinstance(entry, Missing):
            return entry
    return tuple(entry for entry in found if isinstance(entry, Content))


def _by_density(
    mixture: model.Mixture, dimension: Dimension, value: float, figures: int
) -> tuple[Content, ...] | Missing:
    """Take a mixture of liquids whose volumes add up, by whatever it is measured.

    Parts by volume, mass or amount give the mass and the volume of one batch as the author wrote
    it; what is taken is a share of that batch.
    """
    masses, volumes = [], []
    for part in mixture.parts:
        density = part.substance.density
        molar_mass = part.substance.formula.molar_mass_si if part.substance.formula else None
        if density is None and not (mixture.basis != "volume" and dimension == dim.MASS):
            return Missing("density", None)
        if mixture.basis == "amount" and molar_mass is None:
            return Missing("formula", part.substance)
        size = part.quantity.middle
        if mixture.basis == "amount":
            size *= molar_mass or 0.0
        elif mixture.basis == "volume" and density is not None:
            size *= density.value.si
        masses.append(size)
        volumes.append(size / density.value.si if density is not None else 0.0)
    whole = {dim.MASS: sum(masses), dim.VOLUME: sum(volumes)}.get(dimension)
    if not whole:
        return Missing("size", None)
    return _all(
        [
            _of_mass(part.substance, value * mass / whole, figures)
            for part, mass in zip(mixture.parts, masses, strict=True)
        ]
    )
