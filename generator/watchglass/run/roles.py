"""Equivalents and limiting reactants: what each material is to each reaction."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.chemistry.stoichiometry import Reactant, equivalents, limit
from watchglass.resolve.reactions import same_salt
from watchglass.run.content import Content, Missing, contents
from watchglass.run.usage import total_of

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.quantities import Quantity
    from watchglass.resolve import model
    from watchglass.run.usage import Usage


class Role(NamedTuple):
    """What one substance of one material is to a reaction.

    Attributes:
        reaction: The reaction's local name.
        material: The material's local name.
        substance: The substance's key.
        moles: Amount of substance taken over all passes, mol.
        equivalents: Moles over moles of the limiting reactant; None where none can be told.
        limiting: Whether it limits.
        figures: Figures the equivalents may show.
    """

    reaction: str
    material: str
    substance: str
    moles: float
    equivalents: float | None
    limiting: bool
    figures: int


def material_contents(
    material: model.Material, used: Usage | None
) -> tuple[Content, ...] | Missing | None:
    """Work out what all that is taken of a material holds; None where nothing definite is taken."""
    if used is None:
        return None
    total = total_of(used, dim.MASS, dim.VOLUME, dim.AMOUNT)
    if total is None:
        return Missing("size", None) if used.totals else None
    if len([t for t in used.totals if t.dimension != dim.COUNT]) > 1:
        return Missing("sum", None)
    return contents(material, total.dimension, (total.low + total.high) / 2, total.figures)


def portion_contents(material: model.Material, quantity: Quantity) -> tuple[Content, ...] | Missing:
    """Work out what one quantity of a material holds; of a range, its middle."""
    return contents(material, quantity.dimension, quantity.middle, quantity.figures)


def roles(procedure: model.Procedure, used: Mapping[str, Usage]) -> tuple[Role, ...]:
    """Work out equivalents for every reaction of a procedure.

    The limiting reactant is the one with the least amount over its stoichiometric number. It is
    told only where every reactant's amount is known (one taken as needed is in excess by design
    and does not count); a declared one is the reference all the same.
    """
    found = []
    for reaction in procedure.reactions.values():
        if reaction.balanced:
            found += _of_reaction(reaction, procedure, used)
    return tuple(found)


def _of_reaction(
    reaction: model.Reaction, procedure: model.Procedure, used: Mapping[str, Usage]
) -> list[Role]:
    """Compare what is taken of each reactant; one taken as needed is in excess by design."""
    needed = {name for name, usage in used.items() if usage.as_needed}
    species = [s for s in reaction.left if s.material not in needed]
    held = [_held(s, procedure, used) for s in species]
    reactants = [
        Reactant(s.coefficient, content.moles if content else None)
        for s, content in zip(species, held, strict=True)
    ]
    known = None if None in held else limit(reactants)
    index = min(known.indices, key=lambda i: species[i].coefficient) if known else None
    for place, s in enumerate(species):
        if reaction.limiting and s.material == reaction.limiting and held[place]:
            index = place
    reference = held[index] if index is not None else None
    return [
        Role(
            reaction.name,
            s.material,
            content.substance.key,
            content.moles,
            _equivalents(content, reference),
            limiting=place == index
            or (not reaction.limiting and known is not None and place in known.indices),
            figures=min(content.figures, reference.figures) if reference else content.figures,
        )
        for place, (s, content) in enumerate(zip(species, held, strict=True))
        if content is not None
    ]


def _equivalents(content: Content, reference: Content | None) -> float | None:
    """Moles over moles of the limiting reactant, as reagent tables print them."""
    if reference is None or reference.moles <= 0:
        return None
    return equivalents(amount=content.moles, limiting_amount=reference.moles)


def _held(
    species: model.Species, procedure: model.Procedure, used: Mapping[str, Usage]
) -> Content | None:
    """Give what the procedure takes of a species, from the material it is bound to."""
    material = procedure.materials.get(species.material)
    if material is None or species.substance is None:
        return None
    found = material_contents(material, used.get(material.name))
    if not isinstance(found, tuple):
        return None
    substance = species.substance
    exact = next((c for c in found if c.substance.key == substance.key), None)
    return exact or next((c for c in found if same_salt(c.substance, substance)), None)
