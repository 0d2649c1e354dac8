"""Which layer lies below: densities of the layers with what is dissolved in them.

The density of an organic layer is the volume-weighted mean of its liquids' at 20 °C, with expansion;
what is dissolved raises it by about a third of its mass per volume. That of an aqueous layer is
water's, raised by each solute as the tables of solutions have it, or by what it adds in mass.
Rules and thresholds: common practice, no source; checked against the densities of the trade's
solvents.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.catalogue.components import PROTON, WATER
from watchglass.run.bench.liquids import carrier

if TYPE_CHECKING:
    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.state import Phase, Vessel

#: Closer than this no call is made, kg/m3; closer than the second a drop test is asked for.
NO_CALL, DROP_TEST = 20.0, 50.0
#: What a dissolved substance adds to a layer's density per mass and volume [-].
_ORGANIC_SOLUTE = 0.3
_AQUEOUS_SOLUTE = 0.5
#: Ions add more than molecules: about their mass less the volume they take.
_ION_SOLUTE = 0.68
#: What a hydroxide ion adds and a hydrogen ion takes, kg/mol, and ammonia takes per mass [-]: fitted
#: to the densities of 6 M sodium hydroxide, hydrochloric acid and ammonia (`densities.yml`).
_HYDROXIDE, _HYDROGEN, _AMMONIA = 0.0175, 0.007, 0.42
#: Expansion, kg/m3/K: most liquids; liquids denser than water with halogen.
_EXPANSION, _HALOGENATED = 1.1, 1.9


class Layers(NamedTuple):
    """The two layers of a vessel.

    Attributes:
        aqueous: Density of the aqueous layer, kg/m3.
        organic: Density of the other; None where one of its liquids' is not known.
        below: `aqueous` or `organic`; empty where no call can be made.
        close: Whether a drop test is asked for.
    """

    aqueous: float
    organic: float | None
    below: str
    close: bool


def layers(vessel: Vessel, known: Knowledge) -> Layers | None:
    """Tell the layers of a vessel; None where it holds one liquid only."""
    if not vessel.aqueous or not vessel.organic or carrier(vessel.organic, known) is None:
        return None
    water = aqueous_density(vessel.aqueous, known)
    other = organic_density(vessel.organic, vessel.temperature, known)
    if other is None:
        return Layers(water, None, "", close=False)
    apart = other - water
    if abs(apart) < NO_CALL:
        return Layers(water, other, "", close=True)
    return Layers(water, other, "organic" if apart > 0 else "aqueous", close=abs(apart) < DROP_TEST)


def organic_density(phase: Phase, temperature: float, known: Knowledge) -> float | None:
    """Give the density of an organic layer, kg/m3; None where a main liquid's is not known."""
    volume = mass = solutes = 0.0
    for key, amount in phase.amounts.items():
        thing = known.thing(key)
        weight = amount * (thing.molar_mass or 0.0)
        if thing.liquid:
            if thing.density is None:
                return None
            expansion = _HALOGENATED if thing.density > 1150 else _EXPANSION
            density = thing.density - expansion * (temperature - 293.15)
            volume += weight / density
            mass += weight
        else:
            solutes += weight
    if not volume:
        return None
    return mass / volume + _ORGANIC_SOLUTE * solutes / volume


def aqueous_density(phase: Phase, known: Knowledge) -> float:
    """Give the density of an aqueous layer, kg/m3."""
    water = phase.amounts.get(WATER, 0.0) * (known.thing(WATER).molar_mass or 0.0)
    liquids, raised = water / 998.2, 0.0
    mass = water
    for key, amount in phase.amounts.items():
        if key == WATER:
            continue
        if key == PROTON:
            raised -= amount * (_HYDROXIDE if amount < 0 else _HYDROGEN)
            continue
        thing = known.thing(key)
        weight = amount * (thing.molar_mass or 0.0)
        if thing.liquid and thing.density:
            liquids += weight / thing.density
            mass += weight
        elif key == "ammonia":
            raised -= weight * _AMMONIA
        else:
            raised += weight * (_ION_SOLUTE if thing.ion else _AQUEOUS_SOLUTE)
    if not liquids:
        return 998.2
    return mass / liquids + raised / max(phase.volume, liquids)
