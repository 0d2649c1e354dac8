"""Filters, stills and driers: what is kept, what runs through, what goes over."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.run.bench.liquids import liquid_volume, sort
from watchglass.run.bench.pouring import Drawn
from watchglass.run.bench.state import EMPTY, NOTHING, TRACE, Phase, Vessel, added

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.run.bench.knowledge import Knowledge

#: What boils above this stays when a solvent is taken off under reduced pressure, K (125 °C at
#: 1 atm). Common practice, no source.
EVAPORATES_BELOW = 398.15
#: How far below the first of two temperatures a substance may boil and still go over with it, K.
_EARLY = 5.0


class Parted(NamedTuple):
    """What an evaporation or a distillation did.

    Attributes:
        vessel: The pot, with what is left.
        over: What went over.
        fore: What boils below the range, and is not in the receiver.
        why: What could not be told, in words.
    """

    vessel: Vessel
    over: Drawn
    fore: Drawn
    why: tuple[str, ...]


def run_through(vessel: Vessel) -> tuple[Vessel, Drawn]:
    """Let the liquids of a vessel run through what holds its solids back."""
    liquid = Drawn(
        vessel.aqueous,
        vessel.organic,
        NOTHING,
        vessel.unknown,
        vessel.doubt,
        vessel.temperature,
        vessel.ph,
        vessel.mixed,
    )
    kept = vessel.emptied()._replace(
        solid=vessel.solid, doubt=vessel.doubt - vessel.stated, stated=vessel.stated
    )
    return kept, liquid


def evaporate(vessel: Vessel, leaving: float | None, known: Knowledge) -> Parted:
    """Take off what boils below `EVAPORATES_BELOW`; dissolved solids stay behind as solids."""
    return _boil_off(vessel, EVAPORATES_BELOW, None, leaving, known)


def distil(
    vessel: Vessel, low: float | None, high: float, leaving: float | None, known: Knowledge
) -> Parted:
    """Take over what boils between two temperatures; what boils lower comes before it.

    Args:
        vessel: The pot.
        low: Where the receiver is put under, K; None: from the start.
        high: Where the distillation ends, K.
        leaving: Volume that stays in the pot, m3, or None.
        known: What is known of the components.
    """
    return _boil_off(vessel, high, low, leaving, known)


def _boil_off(
    vessel: Vessel, high: float, low: float | None, leaving: float | None, known: Knowledge
) -> Parted:
    why: list[str] = []
    stays: dict[str, float] = {}
    goes: dict[str, float] = {}
    first: dict[str, float] = {}
    for phase in (vessel.aqueous, vessel.organic):
        for key, amount in phase.amounts.items():
            thing = known.thing(key)
            if not thing.liquid and not thing.gas:
                stays = added(stays, {key: amount})
            elif thing.gas:
                first = added(first, {key: amount})
            elif thing.boils is None:
                why.append(f"the boiling point of {thing.name} is not known: it is taken to stay")
                stays = added(stays, {key: amount})
            elif thing.boils > high:
                stays = added(stays, {key: amount})
            elif low is not None and thing.boils < low - _EARLY:
                first = added(first, {key: amount})
            else:
                goes = added(goes, {key: amount})
    goes, stays = _left_behind(goes, stays, leaving, known)
    pot = _pot(vessel, stays, known)
    return Parted(pot, _drawn(vessel, goes, known), _drawn(vessel, first, known), tuple(why))


def _left_behind(
    goes: Mapping[str, float], stays: Mapping[str, float], leaving: float | None, known: Knowledge
) -> tuple[dict[str, float], dict[str, float]]:
    """Keep so much liquid in the pot as is to be left, out of what would go over."""
    if leaving is None:
        return dict(goes), dict(stays)
    whole = liquid_volume(goes, known)
    wanted = max(leaving - liquid_volume(stays, known), 0.0)
    share = min(wanted / whole, 1.0) if whole else 0.0
    kept = {key: amount * share for key, amount in goes.items()}
    return added(goes, kept, -1.0), added(stays, kept)


def _pot(vessel: Vessel, stays: Mapping[str, float], known: Knowledge) -> Vessel:
    """Give the pot with what stays: liquids, and what is dissolved while there is liquid left."""
    volume = liquid_volume(stays, known)
    if volume <= 0:
        solid = dict(vessel.solid)
        loose = {}
        for key, amount in stays.items():
            if known.thing(key).ion:
                loose[key] = amount  # a salt gone dry: its ions are kept together as they are
            else:
                solid = added(solid, {key: amount})
        dry = vessel.emptied()._replace(solid=solid, doubt=vessel.doubt, unknown=vessel.unknown)
        return dry._replace(aqueous=Phase(loose, 0.0)) if loose else dry
    phase = Phase(stays, volume)
    aqueous, organic = (phase, EMPTY) if vessel.aqueous and not vessel.organic else (EMPTY, phase)
    return vessel._replace(aqueous=aqueous, organic=organic, mixed=False, ph=None)


def _drawn(vessel: Vessel, amounts: Mapping[str, float], known: Knowledge) -> Drawn:
    amounts = {key: amount for key, amount in amounts.items() if abs(amount) > TRACE}
    if not amounts:
        return Drawn(temperature=vessel.temperature)

    aqueous, organic = sort(Phase(amounts, liquid_volume(amounts, known)), EMPTY, known)
    return Drawn(aqueous, organic, doubt=vessel.doubt & frozenset(amounts), temperature=293.15)
