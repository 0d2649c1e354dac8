"""Which liquids lie in which layer: sorted anew whenever something is poured.

Water and ions make the aqueous layer; liquids that do not mix with water make another, once there
is more of them than the water dissolves; liquids that mix with both stay where they are until the
layers are shaken. A liquid is aqueous when at least half of it is water by mass.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.catalogue.components import WATER
from watchglass.run.bench.state import EMPTY, Phase, added

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

    from watchglass.run.bench.knowledge import Knowledge, Thing
    from watchglass.run.bench.state import Vessel

#: Water that liquids of another layer, and liquids that mix with water, hold before it parts [kg/kg].
#: Judgement: a few per cent in the solvents of the trade, about its own mass in alcohols and acids.
_HELD_BY_LAYER, _HELD_BY_MISCIBLE = 0.02, 1.0
#: Share of water by mass from which a liquid is aqueous [-].
AQUEOUS_FROM = 0.5


def mass_of(amounts: Mapping[str, float], known: Knowledge) -> float:
    """Give the mass of components, kg; what has no known molar mass is left out."""
    total = 0.0
    for key, amount in amounts.items():
        molar_mass = known.thing(key).molar_mass
        if molar_mass is not None:
            total += amount * molar_mass
    return total


def mass_held(vessel: Vessel, known: Knowledge) -> float:
    """Give the mass of all that a vessel holds, kg; what has no known molar mass is left out."""
    phases = (vessel.aqueous.amounts, vessel.organic.amounts, vessel.solid)
    return sum(mass_of(amounts, known) for amounts in phases)


def liquid_volume(amounts: Mapping[str, float], known: Knowledge) -> float:
    """Give the volume that the liquids among components take by themselves, m3."""
    total = 0.0
    for key, amount in amounts.items():
        volume = known.thing(key).volume
        if volume is not None:
            total += amount * volume
    return total


def sort(aqueous: Phase, organic: Phase, known: Knowledge) -> tuple[Phase, Phase]:
    """Put liquids that were poured together into their layers.

    Args:
        aqueous: What was in the aqueous layer, with what was poured to it.
        organic: Any other liquid.
        known: What is known of the components.

    Returns:
        The aqueous layer and the other; one of them is empty where there is one liquid only.
    """
    water = aqueous.amounts.get(WATER, 0.0) + organic.amounts.get(WATER, 0.0)
    if not water:
        return EMPTY, organic.plus(aqueous)
    if not organic:
        return _alone(aqueous, known)
    if not _parts(aqueous, organic, known):
        return _alone(aqueous.plus(organic), known)
    layering = [known.thing(key) for key in aqueous.amounts if known.thing(key).layers]
    if layering and aqueous.amounts.keys() != {thing.key for thing in layering}:
        aqueous, organic = _moved(aqueous, organic, [thing.key for thing in layering], known)
    wet = [key for key in organic.amounts if _belongs_to_water(known.thing(key))]
    if wet:
        organic, aqueous = _moved(organic, aqueous, wet, known)
    return aqueous, organic


def _alone(liquid: Phase, known: Knowledge) -> tuple[Phase, Phase]:
    """Tell whether a single liquid is aqueous."""
    if not liquid:
        return EMPTY, EMPTY
    water = liquid.amounts.get(WATER, 0.0) * (known.thing(WATER).molar_mass or 0.0)
    if water >= AQUEOUS_FROM * mass_of(liquid.amounts, known):
        return liquid, EMPTY
    return EMPTY, liquid


def _parts(aqueous: Phase, organic: Phase, known: Knowledge) -> bool:
    """Tell whether liquids form two layers: more of one than the other dissolves, and of water, too."""
    together = added(aqueous.amounts, organic.amounts)
    things = [(known.thing(key), amount) for key, amount in together.items()]
    water = known.thing(WATER)
    volume = together[WATER] * (water.volume or 0.0)
    forming, miscible = 0.0, 0.0
    beyond = False
    for thing, amount in things:
        mass = amount * (thing.molar_mass or 0.0)
        if thing.layers:
            forming += mass
            dissolves = thing.solubility(298.15)
            beyond = beyond or dissolves is None or amount > dissolves * volume
        elif not thing.ion and thing.key != WATER and (thing.liquid or thing.miscible):
            miscible += mass
    held = _HELD_BY_LAYER * forming + _HELD_BY_MISCIBLE * miscible
    return beyond and together[WATER] * (water.molar_mass or 0.0) > held


def _belongs_to_water(thing: Thing) -> bool:
    """Tell whether a component can be in the aqueous layer only."""
    if thing.key == WATER or thing.ion:
        return True
    return thing.ratio is None and not thing.measured and bool(thing.miscible)


def _moved(
    origin: Phase, target: Phase, keys: Iterable[str], known: Knowledge
) -> tuple[Phase, Phase]:
    """Move components from one layer to the other, with the volume they take."""
    moving = {key: origin.amounts[key] for key in keys}
    left = {key: amount for key, amount in origin.amounts.items() if key not in moving}
    volume = min(liquid_volume(moving, known), origin.volume) if left else origin.volume
    rest = Phase(left, origin.volume - volume) if left else EMPTY
    return rest, target.plus(Phase(moving, volume))


def carrier(organic: Phase, known: Knowledge) -> Thing | None:
    """Give the solvent of a layer: the largest by volume of the liquids that lie beside water."""
    best: tuple[float, Thing] | None = None
    for key, amount in organic.amounts.items():
        thing = known.thing(key)
        if thing.layers:
            volume = amount * (thing.volume or 0.0)
            if best is None or volume > best[0]:
                best = volume, thing
    return best[1] if best else None
