"""Pouring: what comes into a vessel, and what is drawn from it, without loss on the way."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.catalogue.components import WATER
from watchglass.run.bench.liquids import sort
from watchglass.run.bench.state import EMPTY, NOTHING, Phase, Vessel, added

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.run.bench.bringing import Brought
    from watchglass.run.bench.knowledge import Knowledge


class Drawn(NamedTuple):
    """What is taken out of a vessel.

    Attributes:
        aqueous: Of its aqueous layer.
        organic: Of its other layer.
        solid: Moles of solid substances.
        unknown: Names of materials of unknown amount that may be in it.
        doubt: Components of which it is not known how much is in it.
        temperature: K.
        ph: Of the aqueous layer, where it is known.
        mixed: Whether it was in equilibrium.
        stated: Solids of which the author said that they are.
    """

    aqueous: Phase = EMPTY
    organic: Phase = EMPTY
    solid: Mapping[str, float] = NOTHING
    unknown: frozenset[str] = frozenset()
    doubt: frozenset[str] = frozenset()
    temperature: float = 298.15
    ph: float | None = None
    mixed: bool = True
    stated: frozenset[str] = frozenset()

    @property
    def volume(self) -> float:
        """Volume of its liquids, m3."""
        return self.aqueous.volume + self.organic.volume


def drawn_from(brought: Brought, temperature: float, known: Knowledge) -> Drawn:
    """Take what a portion brings for something that is poured."""
    aqueous, organic = (
        (brought.liquid, EMPTY) if WATER in brought.liquid.amounts else (EMPTY, brought.liquid)
    )
    aqueous, organic = sort(aqueous, organic, known)
    return Drawn(
        aqueous,
        organic,
        brought.solids,
        brought.unknown,
        temperature=temperature,
        mixed=not aqueous,
    )


def pour(vessel: Vessel, coming: Drawn, known: Knowledge) -> Vessel:
    """Put something into a vessel: its liquids find their layers, nothing is mixed yet."""
    if not (coming.aqueous or coming.organic or coming.solid or coming.unknown):
        return vessel
    aqueous, organic = sort(
        vessel.aqueous.plus(coming.aqueous), vessel.organic.plus(coming.organic), known
    )
    alone = vessel.empty
    return vessel._replace(
        aqueous=aqueous,
        organic=organic,
        solid=added(vessel.solid, coming.solid),
        unknown=vessel.unknown | coming.unknown,
        doubt=vessel.doubt | coming.doubt,
        temperature=_temperature(vessel, coming),
        ph=coming.ph if alone else None,
        mixed=coming.mixed and alone,
        used=True,
        remains="",
        stated=coming.stated if alone else vessel.stated if not coming.volume else frozenset(),
    )


def _temperature(vessel: Vessel, coming: Drawn) -> float:
    """Give the temperature after pouring; a bath holds its own, and solids bring no heat."""
    if vessel.bath or not coming.volume:
        return vessel.temperature if not vessel.empty else coming.temperature
    if not vessel.volume:
        return coming.temperature
    whole = vessel.volume + coming.volume
    return (vessel.temperature * vessel.volume + coming.temperature * coming.volume) / whole


def draw(vessel: Vessel, part: str, share: float = 1.0) -> tuple[Vessel, Drawn]:
    """Take a share of what is in a vessel, or of one part of it, out.

    Args:
        vessel: From which.
        part: `aqueous`, `organic`, `solid`, `liquid`, or empty for all there is.
        share: Of that part, 0 to 1.

    Returns:
        The vessel with what is left, and what was taken.
    """
    liquid = part in ("", "liquid")
    aqueous = vessel.aqueous.share(share) if liquid or part == "aqueous" else EMPTY
    organic = vessel.organic.share(share) if liquid or part == "organic" else EMPTY
    solid: Mapping[str, float] = NOTHING
    if part in ("", "solid"):
        solid = {key: amount * share for key, amount in vessel.solid.items()}
    taken = Drawn(
        aqueous,
        organic,
        solid,
        vessel.unknown,
        vessel.doubt,
        vessel.temperature,
        vessel.ph,
        vessel.mixed,
        vessel.stated if solid else frozenset(),
    )
    left = vessel._replace(
        aqueous=_less(vessel.aqueous, aqueous),
        organic=_less(vessel.organic, organic),
        solid=added(vessel.solid, solid, -1.0),
    )
    if not (left.aqueous or left.organic or left.solid):
        return vessel.emptied(), taken
    if not left.aqueous:
        left = left._replace(ph=None)
    return left, taken


def _less(phase: Phase, taken: Phase) -> Phase:
    """Take a share of a layer away from it."""
    if taken is phase or (taken and taken.amounts is phase.amounts):
        return EMPTY
    if not taken:
        return phase
    return Phase(added(phase.amounts, taken.amounts, -1.0), phase.volume - taken.volume)
