"""How much of each substance a quantity of a material brings.

Plain stoichiometry: mass through molar mass, volume through density, solutions through their
strength. A strength counts by mass or by volume of the solution; measured the other way the
density of the solution comes between. Where a density or a formula is missing the answer is
`Missing`, with what is missing: it is printed as unknown and never counted as nought.

What a figure rests on beside what is written stands with it, in words: a density from the table,
one taken for water's, a solubility, volumes that were added up.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.base.figures import CATALOGUE_FIGURES, shown
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
        assumptions: What it rests on beside what is written, each a clause without a stop.
    """

    substance: Substance
    moles: float
    mass: float
    figures: int
    assumptions: tuple[str, ...] = ()


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
    taken = _Taken(material, dimension, value, figures)
    match material.composition:
        case model.Pure(substance):
            found = _all([_pure(substance, taken)])
        case model.Solution(strength, solute, _):
            found = _all([_solution(strength, solute, taken)])
        case model.Saturated(solute, _):
            found = _all([_saturated(solute, taken)])
        case model.Mixture(parts, "strength", _):
            strengths = [(model.Strength(p.quantity, p.span), p.substance) for p in parts]
            found = _all([_solution(*strength, taken) for strength in strengths])
        case model.Mixture():
            found = _mixture(material.composition, taken)
        case _:
            return Missing("composition", None)
    if isinstance(found, Missing) or not taken.rests_on:
        return found
    rests_on = tuple(dict.fromkeys(taken.rests_on))
    return tuple(replace(content, assumptions=rests_on) for content in found)


class _Taken:
    """A quantity of a material, what its figures are worth, and what they rest on so far."""

    __slots__ = ("dimension", "facts", "figures", "material", "rests_on", "value")

    def __init__(
        self, material: model.Material, dimension: Dimension, value: float, figures: int
    ) -> None:
        self.material, self.facts = material, material.solution
        self.dimension, self.value, self.figures = dimension, value, figures
        self.rests_on: list[str] = []

    def measured_as(self, wanted: Dimension) -> float | None:
        """Give it as a mass or a volume, kg or m3, by the density of the whole where that is needed."""
        if self.dimension == wanted:
            return self.value
        density = self.facts.density if self.facts is not None else None
        if density is None or self.dimension not in (dim.MASS, dim.VOLUME):
            return None
        self.through_density()
        return self.value * density if wanted == dim.MASS else self.value / density

    def through_density(self) -> None:
        """Note that its figures rest on the density of the whole."""
        facts = self.facts
        if facts is None or facts.density is None:
            return
        self.figures = min(self.figures, facts.figures)
        written = self.material.written
        if facts.source == "water":
            self.rests_on.append(f"{written} taken to be as dense as water")
        elif facts.source == "table":
            density = shown(facts.density / 1000, DENSITY_FIGURES)
            self.rests_on.append(
                f"density of {written} {density} g/mL, from the table of aqueous solutions at 20 °C"
            )


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


def _pure(substance: Substance, taken: _Taken) -> Content | Missing:
    if taken.dimension == dim.MASS:
        return _of_mass(substance, taken.value, taken.figures)
    if taken.dimension == dim.AMOUNT:
        return _of_moles(substance, taken.value, taken.figures)
    if taken.dimension == dim.VOLUME:
        mass = taken.measured_as(dim.MASS)  # by a density given with it
        if mass is not None:
            return _of_mass(substance, mass, taken.figures)
        return _of_volume(substance, taken.value, taken.figures)
    return Missing("size", substance)


def _solution(strength: model.Strength, solute: Substance, taken: _Taken) -> Content | Missing:
    basis, by = strength.quantity.dimension, strength.quantity.middle
    if taken.dimension == dim.AMOUNT:
        return _of_moles(solute, taken.value, taken.figures)
    if taken.dimension not in (dim.MASS, dim.VOLUME):
        return Missing("size", solute)
    facts = taken.facts
    if basis == dim.VOLUME_FRACTION and taken.dimension == dim.MASS and facts and facts.fraction:
        taken.through_density()
        figures = min(taken.figures, strength.quantity.figures)
        return _of_mass(solute, facts.fraction * taken.value, figures)
    by_mass = basis in (dim.MASS_FRACTION, dim.MOLALITY)
    whole = taken.measured_as(dim.MASS if by_mass else dim.VOLUME)
    if whole is None:
        return Missing("solution density", solute)
    figures = min(taken.figures, strength.quantity.figures)
    if basis == dim.CONCENTRATION:
        return _of_moles(solute, amount_in_solution(volume=whole, concentration=by), figures)
    if basis == dim.VOLUME_FRACTION:
        return _of_volume(solute, by * whole, figures)
    if basis == dim.MOLALITY:
        if solute.molar_mass is None:
            return Missing("formula", solute)
        return _of_moles(solute, whole * by / (1 + by * solute.molar_mass * 1e-3), figures)
    return _of_mass(solute, by * whole, figures)  # a share of the mass, or a mass in a volume


def _saturated(solute: Substance, taken: _Taken) -> Content | Missing:
    """Work out what a saturated solution holds; a solubility is good for three figures."""
    taken.figures = min(taken.figures, SOLUBILITY_FIGURES)
    if taken.dimension == dim.AMOUNT:
        return _of_moles(solute, taken.value, taken.figures)
    facts = taken.facts
    if facts is None or not facts.solubility:
        return Missing("solubility", solute)
    held = {dim.MASS: facts.fraction, dim.VOLUME: facts.per_volume}.get(taken.dimension)
    if held is None:
        return Missing("solution density", solute)
    taken.rests_on.append(f"solubility {facts.solubility}")
    if (taken.dimension == dim.VOLUME) == ("w/w" in facts.solubility):
        taken.through_density()
    return _of_mass(solute, held * taken.value, taken.figures)


def _mixture(mixture: model.Mixture, taken: _Taken) -> tuple[Content, ...] | Missing:
    """Work out what a mixture by parts holds.

    The parts as the author wrote them give the mass of one batch; what is taken is a share of it.
    Measured by volume, it is a share of the batch's volume: by a density given with the mixture,
    else by the volumes of its parts added up, which liquids that mix do not quite hold to.
    """
    if taken.dimension not in (dim.MASS, dim.VOLUME):
        return Missing("size", None)
    masses = [_mass_of_part(part, mixture.basis) for part in mixture.parts]
    for mass in masses:
        if isinstance(mass, Missing):
            return mass
    kilograms = [mass for mass in masses if not isinstance(mass, Missing)]
    whole = taken.measured_as(dim.MASS)
    if whole is None:
        volume = _volumes_added(mixture, kilograms)
        if volume is None:
            return Missing("density", None)
        whole = taken.value * sum(kilograms) / volume if volume else None
        if len(kilograms) > 1:
            *names, last = (part.substance.name for part in mixture.parts)
            taken.figures = min(taken.figures, ASSUMED_FIGURES)
            taken.rests_on.append(f"volumes of {', '.join(names)} and {last} added up")
    batch = sum(kilograms)
    if not batch or whole is None:
        return Missing("size", None)
    return _all(
        [
            _of_mass(part.substance, whole * mass / batch, taken.figures)
            for part, mass in zip(mixture.parts, kilograms, strict=True)
        ]
    )


def _mass_of_part(part: model.Part, basis: str) -> float | Missing:
    """Give the mass of a part as it is written, kg."""
    size = part.quantity.middle
    if basis == "mass":
        return size
    if basis == "amount":
        molar_mass = part.substance.formula.molar_mass_si if part.substance.formula else None
        return Missing("formula", part.substance) if molar_mass is None else size * molar_mass
    density = part.substance.density
    return Missing("density", None) if density is None else size * density.value.si


def _volumes_added(mixture: model.Mixture, masses: list[float]) -> float | None:
    """Add the volumes of the parts, m3; None where the density of one is not known."""
    whole = 0.0
    for part, mass in zip(mixture.parts, masses, strict=True):
        density = part.substance.density
        if density is None:
            return None
        whole += mass / density.value.si
    return whole


def _all(found: list[Content | Missing]) -> tuple[Content, ...] | Missing:
    for entry in found:
        if isinstance(entry, Missing):
            return entry
    return tuple(entry for entry in found if isinstance(entry, Content))
