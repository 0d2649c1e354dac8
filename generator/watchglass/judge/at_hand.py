"""Equations that balance and do not fit what is on the bench."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.catalogue.components import PROTON, WATER
from watchglass.resolve import model
from watchglass.resolve.reactions import substances_of

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.case import Case
    from watchglass.resolve.model import Species

#: What is always at hand: water, and the gases of the air.
_ALWAYS = frozenset((WATER, PROTON, "oxygen", "nitrogen"))
_AIR = frozenset(("O2", "N2", "H2O"))


def reactant_not_at_hand(case: Case) -> Iterator[Finding]:
    """Report reactants that no material brings and no other reaction makes."""
    procedure = case.procedure
    if any(not _readable(m) for m in procedure.materials.values()):
        return  # what is in them may be just this
    brought = {
        component
        for material in procedure.materials.values()
        for substance in substances_of(material)
        for component in case.catalogue.components(substance.key)
    }
    brought |= {
        part.substance.key
        for material in procedure.materials.values()
        if isinstance(material.composition, model.Mixture)
        for part in material.composition.parts
    }
    brought |= {
        component
        for material in procedure.materials.values()
        if (solvent := getattr(material.composition, "solvent", None)) is not None
        for component in case.catalogue.components(solvent.key)
    }
    for reaction in procedure.reactions.values():
        if not reaction.balanced:
            continue
        made = {
            component
            for other in procedure.reactions.values()
            for species in other.right
            for component in _components(case, species)
        }
        for species in reaction.left:
            needed = _components(case, species) - _ALWAYS
            if needed and not needed <= brought | made:
                yield Finding(
                    code=codes.REACTANT_NOT_AT_HAND,
                    span=species.span,
                    message=f"`{species.written}` reacts here, and no material brings it",
                    help="declare the material that brings it, or mend the equation",
                )


def _readable(material: model.Material) -> bool:
    return not isinstance(material.composition, model.Unknown | model.Continued | model.Secret)


def _components(case: Case, species: Species) -> set[str]:
    """Give what a term of an equation is in solution; empty where it is not known or always there."""
    if species.substance is not None:
        return set(case.catalogue.components(species.substance.key))
    formula = species.formula
    if formula is None or formula.charge or formula.text in _AIR:
        return set()
    key = case.catalogue.by_formula(formula)
    return set(case.catalogue.components(key)) if key else set()
