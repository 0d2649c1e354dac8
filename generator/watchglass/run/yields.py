"""Theoretical yields: what can form of a product from all that is taken of the limiting reactant.

A yield is asked for by the name of a reaction (its first product is meant) or by a product, which
one reaction only makes. It is the mass at full conversion, of all passes together.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.chemistry.stoichiometry import product_amount
from watchglass.resolve.reactions import substances_of
from watchglass.run.roles import roles

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.resolve import model
    from watchglass.run.usage import Usage


class Formed(NamedTuple):
    """So much of a product at most.

    Attributes:
        reaction: Which makes it.
        product: The term of its equation.
        moles: Amount of substance at full conversion, mol.
        mass: The same as a mass, kg; None where the product's formula is not known.
        limiting: Local name of the material that limits.
        figures: Significant figures that may be shown.
    """

    reaction: model.Reaction
    product: model.Species
    moles: float
    mass: float | None
    limiting: str
    figures: int


def makers(
    name: str, procedure: model.Procedure
) -> tuple[tuple[model.Reaction, model.Species], ...]:
    """Find the reactions that make what a name stands for, each with the product in its equation.

    Args:
        name: Of a reaction, a material, or a substance by its catalogue key.
        procedure: Whose reactions are looked through.

    Returns:
        One pair a reaction; none where the name is that of nothing that forms.
    """
    reaction = procedure.reactions.get(name)
    if reaction is not None:
        return ((reaction, reaction.right[0]),) if reaction.right else ()
    material = procedure.materials.get(name)
    keys = {s.key for s in substances_of(material)} if material is not None else {name}
    if len(keys) != 1:
        return ()
    return tuple(
        (reaction, species)
        for reaction in procedure.reactions.values()
        for species in reaction.right
        if species.substance is not None and species.substance.key in keys
    )


def most_formed(
    reaction: model.Reaction,
    product: model.Species,
    procedure: model.Procedure,
    used: Mapping[str, Usage],
) -> Formed | None:
    """Work out how much of a product a reaction can give; None where what limits is not known."""
    if not reaction.balanced:
        return None
    limiting = next(
        (r for r in roles(procedure, used) if r.reaction == reaction.name and r.limiting), None
    )
    if limiting is None:
        return None
    reactant = next((s for s in reaction.left if s.material == limiting.material), None)
    if reactant is None:
        return None
    extent = limiting.moles / float(reactant.coefficient)
    moles = product_amount(extent=extent, coefficient=product.coefficient)
    molar_mass = product.formula.molar_mass_si if product.formula else None
    return Formed(
        reaction,
        product,
        moles,
        moles * molar_mass if molar_mass is not None else None,
        limiting.material,
        limiting.figures,
    )
