"""Equations that balance and do not fit what is on the bench.

A reactant is at hand where a material brings it, or all its ions and neutral parents (`HCl` comes
from hydrochloric acid, lidocainium chloride from lidocaine in it, a hydrate is its salt), or where
another reaction makes it. Ions by themselves come from any acid, base or salt; water and the gases
of the air are everywhere. Nothing is said where the composition of a material is not known.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding, Related
from watchglass.base.yaml import YamlMapping
from watchglass.catalogue.components import PROTON, WATER
from watchglass.resolve import model
from watchglass.resolve.reactions import substances_of

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping

    from watchglass.catalogue.substances import Substance
    from watchglass.chemistry.formulas import Formula
    from watchglass.judge.case import Case
    from watchglass.resolve.model import Reaction, Species

#: What is always there: water, protons, and the gases of the air.
_ALWAYS = frozenset((WATER, PROTON, "carbon-dioxide", "oxygen", "nitrogen"))
_AIR = frozenset(("O2", "N2", "H2O", "CO2"))


def reactant_not_at_hand(case: Case) -> Iterator[Finding]:
    """Report reactants that no material brings and no other reaction makes, one finding a reaction."""
    procedure = case.procedure
    if not _whole(procedure) or not any(used.uses for used in case.usage.values()):
        return  # what is missing may be in what could not be read, or is not written yet
    brought = {
        component
        for material in procedure.materials.values()
        for substance in held_by(material)
        for component in (substance.key, *case.catalogue.components(substance.key))
    }
    for reaction in procedure.reactions.values():
        if not reaction.balanced:
            continue
        others = [r for r in procedure.reactions.values() if r.name != reaction.name]
        products = [species for other in others for species in other.right]
        made = {c for species in products for c in needed_for(case, species) or ()}
        missing = [
            species
            for species in reaction.left
            if not _at_hand(case, species, brought | made, products)
        ]
        if missing:
            yield _finding(reaction, missing)


def _finding(reaction: Reaction, missing: list[Species]) -> Finding:
    first, *others = missing
    free = [s for s in reaction.left if s not in missing and not _free(s)]
    none = not free and len(missing) > 1
    return Finding(
        code=codes.REACTANT_NOT_AT_HAND,
        span=reaction.equation_span if none else first.span,
        message=f"no material brings any reactant of `{reaction.name}`"
        if none
        else f"`{first.written}` reacts here, and no material brings it",
        related=() if none else tuple(Related(s.span, "nor this") for s in others),
        help="declare the material that brings it, or mend the equation",
    )


def _free(species: Species) -> bool:
    """Tell whether a species needs no material: an ion, water, a gas of the air."""
    formula = species.formula
    return formula is not None and (bool(formula.charge) or formula.text in _AIR)


def held_by(material: model.Material) -> tuple[Substance, ...]:
    """Give all substances that a material holds, its solvent with them."""
    solvent = getattr(material.composition, "solvent", None)
    return (*substances_of(material), *((solvent,) if solvent is not None else ()))


def front_read(procedure: model.Procedure) -> bool:
    """Tell whether every material and reaction that is declared was taken up, and every equation read."""
    front = procedure.syntax.front
    for field, read in (("materials", procedure.materials), ("reactions", procedure.reactions)):
        node = front.get(field) if front is not None else None
        if isinstance(node, YamlMapping) and any(e.key.text not in read for e in node):
            return False
    return all(r.left and r.right for r in procedure.reactions.values())


def _whole(procedure: model.Procedure) -> bool:
    """Tell whether all materials are known and all equations were read."""
    return front_read(procedure) and not any(
        isinstance(m.composition, model.Unknown | model.Continued | model.Secret)
        for m in procedure.materials.values()
    )


def _at_hand(case: Case, species: Species, there: set[str], products: Iterable[Species]) -> bool:
    if species.material or _free(species) or _is_equipment(case, species):
        return True
    needed = needed_for(case, species)
    if needed is not None:
        return needed - _ALWAYS <= there
    formula = species.formula
    if formula is None:
        return True
    substances = (case.catalogue.by_key(key) for key in there)
    formulas = [s.formula for s in substances if s is not None]
    return any(_same(formula, other) for other in (*formulas, *(p.formula for p in products)))


def needed_for(case: Case, species: Species) -> set[str] | None:
    """Give what a term of an equation is in solution; None for an ion, or where it is not known."""
    formula = species.formula
    if formula is not None and formula.charge:
        return None
    key = species.substance.key if species.substance is not None else None
    if key is None and formula is not None:
        key = case.catalogue.by_formula(formula)
    if key is None:
        return None
    substance = case.catalogue.by_key(key)
    base = substance.hydrate_of if substance is not None and substance.hydrate_of else key
    components: Mapping[str, int] = case.catalogue.components(base)
    return {c for c in components if c not in (PROTON, WATER)}


def _same(one: Formula, other: Formula | None) -> bool:
    return other is not None and (one.composition, one.charge) == (other.composition, other.charge)


def _is_equipment(case: Case, species: Species) -> bool:
    """Tell whether a reactant stands among the equipment: a foil, an electrode, a cylinder of gas."""
    key = species.substance.key if species.substance is not None else None
    if key is None and species.formula is not None:
        key = case.catalogue.by_formula(species.formula)
    substance = case.catalogue.by_key(key) if key is not None else None
    names = substance.names if substance is not None else (species.written,)
    return any(
        name.casefold() in f"{e.name} {e.written}".casefold()
        for e in case.procedure.equipment.values()
        for name in names
        if len(name) > 2
    )
