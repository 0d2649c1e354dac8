"""Heat that an act gives out: neutralisation, dilution of concentrated acid, dissolving of solids.

An estimate of the greatest rise: all heat at once, none lost to the glass. Strong acid and base
give 57.1 kJ per mole of water, a weak acid with strong base about 56 kJ (CRC Handbook, from memory);
integral heats of dilution and of solution in water, kJ/mol (CRC Handbook, from memory). Heat
capacities 4.18 J/g/K for water and dilute solutions, 2.0 for organic liquids (common practice, no
source). Carbonates with acid cool a little, and count as nothing.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.catalogue.components import PROTON, WATER
from watchglass.run.bench.ledger import Warmed
from watchglass.run.bench.liquids import mass_of

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.pouring import Drawn
    from watchglass.run.bench.state import Phase, Vessel

#: J/mol of water formed, by strong and by weak acids.
NEUTRALISATION, WEAK_NEUTRALISATION = 57.1e3, 56.0e3
#: J/mol: dilution of concentrated sulfuric acid to about 1 mol/L.
SULFURIC_DILUTION = 73.0e3
#: Share of sulfuric acid by mass from which it counts as concentrated [-].
_CONCENTRATED = 0.70
#: J/mol given out when a solid dissolves in water; below nought where it cools.
SOLUTION: Mapping[str, float] = {
    "sodium-hydroxide": 44.5e3,
    "potassium-hydroxide": 57.6e3,
    "calcium-chloride": 81.3e3,
    "magnesium-sulfate": 91.0e3,
    "sodium-carbonate": 26.7e3,
    "aluminium-chloride": 329.0e3,
    "ammonium-chloride": -14.8e3,
    "sodium-hydrogencarbonate": -16.7e3,
    "potassium-nitrate": -34.9e3,
}
_WATER_CAPACITY, _ORGANIC_CAPACITY = 4180.0, 2000.0  # J/kg/K
#: A rise below this is not worth a word, K.
_WORTH = 1.0


def on_pouring(vessel: Vessel, coming: Drawn, known: Knowledge) -> Warmed | None:
    """Give the rise when a liquid is poured into another; None where it is nothing to speak of."""
    heat, source = _neutralised(vessel.aqueous, coming.aqueous, known)
    diluted = _diluted(vessel, coming, known)
    if diluted > heat:
        heat, source = diluted, "the dilution of sulfuric acid"
    return _warmed(heat, source, vessel, coming, known)


def on_dissolving(
    vessel: Vessel, dissolved: Mapping[str, float], known: Knowledge
) -> Warmed | None:
    """Give the rise when solids dissolve in the water of a vessel."""
    heat = sum(SOLUTION.get(key, 0.0) * amount for key, amount in dissolved.items())
    names = ", ".join(known.thing(key).name for key in dissolved if SOLUTION.get(key, 0.0) > 0)
    return _warmed(heat, f"dissolving {names}", vessel, None, known)


def _warmed(
    heat: float, source: str, vessel: Vessel, coming: Drawn | None, known: Knowledge
) -> Warmed | None:
    if heat <= 0:
        return None
    capacity = _capacity(vessel.aqueous, vessel.organic, known)
    if coming is not None:
        capacity += _capacity(coming.aqueous, coming.organic, known)
    rise = heat / capacity if capacity else 0.0
    return Warmed(rise, bool(vessel.bath), source) if rise >= _WORTH else None


def _capacity(aqueous: Phase, organic: Phase, known: Knowledge) -> float:
    """Give the heat capacity of liquids, J/K."""
    return _WATER_CAPACITY * mass_of(aqueous.amounts, known) + _ORGANIC_CAPACITY * mass_of(
        organic.amounts, known
    )


def _neutralised(one: Phase, other: Phase, known: Knowledge) -> tuple[float, str]:
    """Give the heat of one liquid's acid with the other's base, J."""
    first, second = _free(one, known), _free(other, known)
    if first * second < 0:
        water = min(abs(first), abs(second))
        left, phase = (abs(second) - water, one) if first > 0 else (abs(first) - water, other)
        base_is_left = (second if first > 0 else first) < 0
        weak = min(left, _weak_acid(phase, known)) if base_is_left else 0.0
        return water * NEUTRALISATION + weak * WEAK_NEUTRALISATION, "neutralisation"
    base, acid = (-first, other) if first < 0 else (-second, one)
    if base > 0:
        return min(base, _weak_acid(acid, known)) * WEAK_NEUTRALISATION, "neutralisation"
    return 0.0, "neutralisation"


def _free(phase: Phase, known: Knowledge) -> float:
    """Give strong acid (above nought) or strong base of a liquid beyond what its families hold, mol."""
    excess = phase.amounts.get(PROTON, 0.0)
    held = sum(
        amount * len(thing.pkas)
        for key, amount in phase.amounts.items()
        if (thing := known.thing(key)).pkas
    )
    if excess > 0:
        return max(excess - held, 0.0)
    return min(excess + held, 0.0)


def _weak_acid(phase: Phase, known: Knowledge) -> float:
    """Give the protons of weak acids that a strong base would still take, mol."""
    total = phase.amounts.get(PROTON, 0.0)
    for key, amount in phase.amounts.items():
        thing = known.thing(key)
        if thing.pkas and thing.top == 0 and not thing.gas:
            total += amount * sum(1 for pka in thing.pkas if pka < 12)
    return max(total, 0.0)


def _diluted(vessel: Vessel, coming: Drawn, known: Knowledge) -> float:
    """Give the heat of concentrated sulfuric acid that meets water, J."""
    heat = 0.0
    liquids = (
        vessel.aqueous.plus(vessel.organic),
        coming.aqueous.plus(coming.organic),
    )
    for acid, water in (liquids, liquids[::-1]):
        sulfuric = acid.amounts.get("sulfuric-acid", 0.0)
        mass = mass_of(acid.amounts, known)
        if not sulfuric or sulfuric * 98.08e-3 < _CONCENTRATED * mass:
            continue
        there = water.amounts.get(WATER, 0.0) * 18.015e-3
        if there > sulfuric * 98.08e-3:
            heat = sulfuric * SULFURIC_DILUTION
    return heat
