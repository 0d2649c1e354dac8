"""Equipment and reactions of a procedure, as lists."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.publish import model as m
from watchglass.publish.names import vessel_short
from watchglass.publish.text import formula_words, quantity_words

if TYPE_CHECKING:
    from watchglass.resolve.model import Procedure, Reaction, Species


def equipment_rows(procedure: Procedure) -> tuple[m.EquipmentRow, ...]:
    """Count the vessels by type and size; equipment that is no vessel follows as written."""
    groups: dict[str, list[str]] = {}
    for vessel in procedure.vessels.values():
        groups.setdefault(vessel_short(vessel), []).append(vessel.name)
    rows = [m.EquipmentRow(len(names), what, tuple(names)) for what, names in groups.items()]
    rows += [m.EquipmentRow(1, e.written, (e.name,)) for e in procedure.equipment.values()]
    return tuple(rows)


def reaction_lines(procedure: Procedure) -> tuple[m.ReactionLine, ...]:
    """Set each reaction in names and, where names are used, in formulas."""
    return tuple(_reaction(r) for r in procedure.reactions.values() if r.left)


def _reaction(reaction: Reaction) -> m.ReactionLine:
    remarks = []
    if reaction.limiting:
        remarks.append(f"limited by {reaction.limiting.replace('-', ' ')}")
    if reaction.conversion is not None:
        said = "".join(w.text for w in quantity_words(reaction.conversion) if isinstance(w, m.Run))
        remarks.append(f"taken to {said} conversion")
    named = any(
        s.substance is not None and s.formula is not None and s.written != s.formula.text
        for s in (*reaction.left, *reaction.right)
    )
    return m.ReactionLine(
        reaction.name.replace("-", " "),
        _side_words(reaction, formulas=False),
        _side_words(reaction, formulas=True) if named else (),
        tuple(remarks),
    )


def _side_words(reaction: Reaction, *, formulas: bool) -> tuple[m.Words, ...]:
    words: list[m.Words] = []
    for side in (reaction.left, reaction.right):
        if words:
            words.append(m.Run(" → "))
        for index, species in enumerate(side):
            if index:
                words.append(m.Run(" + "))
            if species.coefficient != 1:
                words.append(m.Run(f"{species.coefficient} "))
            words += _species(species, formulas=formulas)
    return tuple(words)


def _species(species: Species, *, formulas: bool) -> tuple[m.Words, ...]:
    is_formula = species.formula is not None and species.written == species.formula.text
    if species.formula is not None and (formulas or is_formula):
        return formula_words(species.formula)
    return (m.Run(species.substance.name if species.substance else species.written),)
