"""A reactant that is declared limiting, and is not.

Compared are moles over coefficient, of all passes. Nothing is said where what reacts is not what
is charged: of a reactant that another reaction makes, that is drawn from a stock solution as an
aliquot, that is taken as needed or in proportion, or of water, which every solution brings.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base.figures import shown
from watchglass.base.findings import Finding, Related
from watchglass.resolve import model
from watchglass.resolve.reactions import same_salt, substances_of
from watchglass.run.roles import material_contents

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.case import Case

#: Share by which two amounts may differ and still be meant as equal [-]: that is how finely amounts
#: are printed. Judgement, as in `stated.py`.
_SAME = 0.02


class _Amount(NamedTuple):
    """What the steps take of a reactant: mol, mol over its coefficient, figures, materials."""

    species: model.Species
    moles: float
    turns: float
    figures: int
    materials: tuple[str, ...]


def not_limiting(case: Case) -> Iterator[Finding]:
    """Report reactions whose declared limiting reactant is in excess of another."""
    if any(isinstance(h.event, model.Aliquot) for h in case.course.happenings):
        return
    for reaction in case.procedure.reactions.values():
        if not reaction.limiting or not reaction.balanced:
            continue
        amounts = [a for s in reaction.left if (a := _amount(case, reaction, s)) is not None]
        declared = next((a for a in amounts if a.species.material == reaction.limiting), None)
        if declared is None:
            continue
        least = min(amounts, key=lambda amount: amount.turns)
        if least.turns * (1 + _margin(least)) >= declared.turns * (1 - _margin(declared)):
            continue
        yield _finding(case, reaction, declared, least)


def _margin(amount: _Amount) -> float:
    """Give half a unit of the last figure of an amount as a share of it, 2 % at least [-]."""
    size = amount.moles
    digits = float(f"{size:e}".partition("e")[0])
    return max(_SAME / 2, 0.5 * 10.0 ** (1 - amount.figures) / digits)


def _amount(case: Case, reaction: model.Reaction, species: model.Species) -> _Amount | None:
    """Sum what all materials bring of a reactant; None where it cannot be told."""
    substance = species.substance
    if substance is None or substance.key == "water" or _made(case, reaction, substance.key):
        return None
    moles, figures, materials = 0.0, 6, []
    for name, material in case.procedure.materials.items():
        if not any(same_salt(held, substance) for held in substances_of(material)):
            continue
        used = case.usage.get(name)
        if used is None or not (used.uses or used.as_needed):
            continue
        found = material_contents(material, used)
        if used.as_needed or used.unsummed or not isinstance(found, tuple):
            return None
        for content in found:
            if same_salt(content.substance, substance):
                moles += content.moles
                figures = min(figures, content.figures)
        materials.append(name)
    if moles <= 0:
        return None
    return _Amount(species, moles, moles / float(species.coefficient), figures, tuple(materials))


def _made(case: Case, reaction: model.Reaction, key: str) -> bool:
    return any(
        species.substance is not None and species.substance.key == key
        for other in case.procedure.reactions.values()
        if other.name != reaction.name
        for species in other.right
    )


def _finding(case: Case, reaction: model.Reaction, declared: _Amount, least: _Amount) -> Finding:
    other = least.species.material or least.materials[0]
    return Finding(
        code=codes.NOT_LIMITING,
        span=reaction.limiting_span or reaction.equation_span,
        message=f"`{reaction.limiting}` is declared limiting with {_words(declared)};"
        f" of `{other}` there is less: {_words(least)}",
        related=(*_taken(case, declared), *_taken(case, least)),
        help=f"write `limiting: {other}`, or take more of `{other}`",
    )


def _words(amount: _Amount) -> str:
    """Write an amount, and what it is worth where its coefficient is not 1."""
    figures = max(amount.figures, 2)
    words = f"{shown(amount.moles * 1e3, figures)} mmol"
    if amount.species.coefficient != 1:
        words += f", enough for {shown(amount.turns * 1e3, figures)} mmol of the equation"
    return words


def _taken(case: Case, amount: _Amount) -> Iterator[Related]:
    for name in amount.materials:
        for use in case.usage[name].uses:
            yield Related(use.span, f"`{name}` is taken here")
