"""What is to be minded while a stock is made, and what comes before what."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.catalogue.reagents import (
    ACIDS,
    BOILS_UP,
    FUMING,
    HEATING,
    PRACTICE,
    UNIVERSAL,
)
from watchglass.run.recipes.lines import Begin, Care
from watchglass.run.recipes.rounding import about

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.catalogue.substances import Substance
    from watchglass.run.recipes.store import Source

#: Strength from which a solution counts as concentrated, mol/m3. Judgement: bench acid is weaker.
_CONCENTRATED = 6000.0
#: Strength from which dissolving or diluting changes the temperature enough to be waited for, mol/m3.
_WARMING = 500.0
#: Boiling point below which a liquid is handled in the hood, K. Judgement: hexane boils at 342 K.
_VOLATILE = 343.15
#: Share of the solvent that is in the vessel before a concentrated acid is poured, and in which a
#: solid is dissolved before it is made up. Judgement.
_FIRST, _DISSOLVES = 0.5, 0.7


def cautions(
    solute: Substance, source: Source, taken: float | None, made: float | None
) -> Iterator[Care]:
    """Give what is minded before a solute is taken from its source.

    Args:
        solute: What is taken.
        source: What from.
        taken: Strength of the source, mol/m3, or None.
        made: Strength of what is made, mol/m3, or None.
    """
    strong = concentrated(taken)
    if strong and solute.key in FUMING:
        yield Care("in the hood: the concentrated reagent fumes", PRACTICE)
    elif not source.dissolved and volatile(source.substance):
        yield in_hood(source.substance)
    if strong and solute.key == BOILS_UP:
        yield Care("acid into water, slowly, in an ice bath; never water into acid", UNIVERSAL)
    elif strong and solute.key in ACIDS:
        yield Care("acid into water, never water into acid", UNIVERSAL)
    if source.solid and solute.key in HEATING and warms(made):
        yield Care("a little at a time, in an ice bath: it heats as it dissolves", PRACTICE)


def first(solute: Substance, solvent: Substance, taken: float | None, whole: float) -> Begin | None:
    """Give the solvent that is in the vessel before a concentrated acid comes to it."""
    if concentrated(taken) and solute.key in ACIDS:
        return Begin(solvent.name, about(_FIRST * whole))
    return None


def in_hood(liquid: Substance) -> Care:
    """Give the caution of a liquid that boils low."""
    return Care(f"in the hood: {liquid.name} is volatile", PRACTICE)


def when_cold() -> Care:
    """Give the caution that the mark holds at room temperature only."""
    return Care("make up to volume only when it is at room temperature", PRACTICE)


def dissolving(whole: float) -> str:
    """Give the volume in which a solid is dissolved before it is made up, as text."""
    return about(_DISSOLVES * whole)


def concentrated(taken: float | None) -> bool:
    """Tell whether a reagent of so many mol/m3 is concentrated."""
    return taken is not None and taken > _CONCENTRATED


def warms(made: float | None) -> bool:
    """Tell whether making a solution of so many mol/m3 changes its temperature enough to wait."""
    return made is not None and made > _WARMING


def volatile(substance: Substance) -> bool:
    """Tell whether a liquid boils so low that it is poured in the hood."""
    boils = substance.boils
    return substance.state == "liquid" and boils is not None and boils.si < _VOLATILE
