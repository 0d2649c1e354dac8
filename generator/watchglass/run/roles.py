"""Equivalents and limiting reactants: what each material is to each reaction."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.run.content import Content, Missing, contents
from watchglass.run.usage import total_of

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.resolve import model
    from watchglass.run.usage import Usage


class Role(NamedTuple):
    """What one substance of one material is to a reaction.

    Attributes:
        reaction: The reaction's local name.
        material: The material's local name.
        substance: The substance's key.
        moles: Amount of substance taken over all passes, mol.
        equivalents: Amount over stoichiometric number, relative to the limiting reactant; None
            where no limiting reactant can be told.
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


class _Reactant(NamedTuple):
    material: str
    content: Content
    turns: float  # amount over stoichiometric number, mol


def _of_reaction(
    reaction: model.Reaction, procedure: model.Procedure, used: Mapping[str, Usage]
) -> list[Role]:
    reactants: list[_Reactant] = []
    whole = True
    for species in reaction.left:
        taken = used.get(species.material)
        if taken is not None and taken.as_needed:
            continue
        content = _held(species, procedure, used)
        if content is None:
            whole = False
        else:
            turns = content.moles / float(species.coefficient)
            reactants.append(_Reactant(species.material, content, turns))
    declared = next((r for r in reactants if r.material == reaction.limiting), None)
    first = min(reactants, key=lambda r: r.turns) if reactants and whole else None
    limit = declared or first
    return [
        Role(
            reaction.name,
            r.material,
            r.content.substance.key,
            r.content.moles,
            r.turns / limit.turns if limit and limit.turns > 0 else None,
            limit is not None
            and len(reactants) > 1
            and r.turns <= limit.turns * (1 + 1e-9)
            and (declared is None or r is declared),
            min(r.content.figures, limit.content.figures) if limit else r.content.figures,
        )
        for r in reactants
    ]


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
    return next((c for c in found if c.substance.key == species.substance.key), None)
