"""Heat of neutralising, diluting and dissolving, and the temperature that comes of it.

An estimate of the greatest rise: all heat at once, none of it to the glass or the air. Heats are
enthalpies at about 25 °C, J/mol, below nought where heat is given out. Those of one class
(`Heat.order_only`) are right in their order of magnitude only: they choose between ways of working,
no temperature may be printed from them.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

#: Heat capacities by mass, J/(kg K). Common practice, no source; water at 25 °C has 4180.
WATER_CAPACITY = 4180.0
ORGANIC_CAPACITY = 2000.0
#: Of salts and glass, J/(kg K). Common practice, no source.
SOLID_CAPACITY = 800.0
#: Heat that ice takes up in melting, J/kg. IAPWS: 333.4 kJ/kg; from memory.
ICE = 333.4e3

_CRC = "CRC Handbook, from memory"
_FORMATION = "enthalpies of formation, NBS tables, from memory"
_JUDGED = "judgement, no source"


class Heat(NamedTuple):
    """The heat of a process.

    Attributes:
        value: Enthalpy, J/mol; below nought where heat is given out.
        per: What the mole is of.
        source: Where it is from.
        order_only: Whether only its order of magnitude is known.
    """

    value: float
    per: str
    source: str
    order_only: bool = False


#: Proton transfers. The heat of strong acid and base is 55.8 kJ/mol without limit of dilution
#: (CODATA) and rises with strength; 57.1 is usual for solutions of about 1 mol/L.
PROTON_TRANSFERS: Mapping[str, Heat] = {
    "strong acid, strong base": Heat(-57.1e3, "water formed", _CRC),
    "weak acid, strong base": Heat(-56.0e3, "water formed", _CRC),
    "strong acid, ammonia": Heat(-52.0e3, "ammonia", _CRC),
    "strong acid, hydrogencarbonate": Heat(12.7e3, "carbon dioxide given off", _FORMATION),
    "strong acid, carbonate": Heat(-2.3e3, "carbon dioxide given off", _FORMATION),
}
#: Dilution of concentrated reagents to about 1 mol/L.
DILUTIONS: Mapping[str, Heat] = {
    "sulfuric acid": Heat(-73.0e3, "H2SO4, from 98 %", _CRC),
    "hydrochloric acid": Heat(-9.0e3, "HCl, from 12 mol/L, approximate", _CRC),
}
#: Solution in much water.
SOLUTIONS: Mapping[str, Heat] = {
    "sodium hydroxide": Heat(-44.5e3, "solid", _CRC),
    "potassium hydroxide": Heat(-57.6e3, "solid", _CRC),
    "calcium chloride, anhydrous": Heat(-81.3e3, "solid", _CRC),
    "magnesium sulfate, anhydrous": Heat(-91.0e3, "solid", _CRC),
    "sodium carbonate, anhydrous": Heat(-26.7e3, "solid", _CRC),
    "aluminium chloride, anhydrous": Heat(-329.0e3, "solid", _CRC),
    "ammonium nitrate": Heat(25.7e3, "solid", _CRC),
    "ammonium chloride": Heat(14.8e3, "solid", _CRC),
    "sodium hydrogencarbonate": Heat(16.7e3, "solid", _CRC),
    "potassium nitrate": Heat(34.9e3, "solid", _CRC),
}
#: Reactions met at the bench.
REACTIONS: Mapping[str, Heat] = {
    "acetic anhydride, water": Heat(-58.0e3, "anhydride", _CRC),
    "acetyl chloride, water": Heat(-92.0e3, "chloride, approximate", _CRC),
    "hydrogen peroxide, decomposition": Heat(-98.0e3, "H2O2", _CRC),
    "zinc, acid": Heat(-153.9e3, "zinc", _FORMATION),
    "magnesium, acid": Heat(-466.9e3, "magnesium", _FORMATION),
    "hypochlorite or halogen, thiosulfate": Heat(-200.0e3, "oxidant", _JUDGED, order_only=True),
    "arene, nitration": Heat(-140.0e3, "arene; 100 to 150", _JUDGED, order_only=True),
    "alkene, bromine": Heat(-110.0e3, "alkene", _JUDGED, order_only=True),
}


class Released(NamedTuple):
    """Heat given out.

    Attributes:
        heat: Heat, J; below nought where it is taken up.
        order_only: Whether a part of it is known in its order of magnitude only.
    """

    heat: float
    order_only: bool


class Body(NamedTuple):
    """Something that warms or cools with what it is mixed with.

    Attributes:
        mass: Mass, kg, >= 0.
        capacity: Heat capacity by mass, J/(kg K), > 0.
        temperature: Thermodynamic temperature, K, > 0.
    """

    mass: float
    capacity: float
    temperature: float


def released(processes: Iterable[tuple[float, Heat]]) -> Released:
    """Add up the heat that processes give out.

    Args:
        processes: Amount, mol, >= 0, and heat of each.

    Returns:
        What is given out, J.

    Raises:
        ValueError: A negative amount.

    Example:
        >>> released([(0.090, PROTON_TRANSFERS["strong acid, strong base"])])
        Released(heat=5139.0, order_only=False)
    """
    total, rough = 0.0, False
    for amount, heat in processes:
        if amount < 0:
            raise ValueError(f"an amount of {amount} mol")
        total -= amount * heat.value
        rough = rough or (heat.order_only and amount > 0)
    return Released(total, rough)


def neutralisation_heat(*, water: float, weak: float = 0.0) -> float:
    """Work out the heat that neutralising gives out.

    Args:
        water: Water formed by strong acid and strong base, mol, >= 0; `acidbase.water_formed`.
        weak: Water formed by weak acid and strong base, mol, >= 0.

    Returns:
        Heat, J.

    Raises:
        ValueError: A negative amount.

    Source:
        57.1 and 56 kJ per mole of water, CRC Handbook, from memory.
    """
    strong = (water, PROTON_TRANSFERS["strong acid, strong base"])
    return released((strong, (weak, PROTON_TRANSFERS["weak acid, strong base"]))).heat


def heat_capacity(*, water: float = 0.0, organic: float = 0.0, solid: float = 0.0) -> float:
    """Work out the heat capacity of what is in a vessel.

    Args:
        water: Mass of water and of dilute solutions, kg, >= 0.
        organic: Mass of organic liquids, kg, >= 0.
        solid: Mass of solids, kg, >= 0.

    Returns:
        Heat capacity, J/K.

    Raises:
        ValueError: A negative mass.
    """
    if water < 0 or organic < 0 or solid < 0:
        raise ValueError(f"masses of {water}, {organic} and {solid} kg")
    return water * WATER_CAPACITY + organic * ORGANIC_CAPACITY + solid * SOLID_CAPACITY


def temperature_rise(*, heat: float, capacity: float) -> float:
    """Work out how much warmer a vessel becomes.

    Args:
        heat: Heat given out, J; below nought where it is taken up.
        capacity: Heat capacity of what is in the vessel, J/K, > 0.

    Returns:
        Rise, K, a difference; the greatest there can be, since none is lost. Beyond boiling or
        freezing it is no temperature that is reached.

    Raises:
        ValueError: A capacity that is not positive.
    """
    if capacity <= 0:
        raise ValueError(f"a heat capacity of {capacity} J/K")
    return heat / capacity


def mixed_temperature(bodies: Iterable[Body], *, heat: float = 0.0) -> float:
    """Work out the temperature of what is mixed.

    Args:
        bodies: What is put together.
        heat: Heat given out on mixing, J; below nought where it is taken up.

    Returns:
        Thermodynamic temperature, K.

    Raises:
        ValueError: No mass at all, or a value out of its range.

    Source:
        Heat is conserved; nothing boils, melts or is lost to the glass.

    Example:
        >>> mixed_temperature([Body(0.1, 4180.0, 353.15), Body(0.1, 4180.0, 293.15)])
        323.15
    """
    capacity, content = 0.0, heat
    for mass, by_mass, temperature in bodies:
        if mass < 0 or by_mass <= 0 or temperature <= 0:
            raise ValueError(f"{mass} kg of {by_mass} J/(kg K) at {temperature} K")
        capacity += mass * by_mass
        content += mass * by_mass * temperature
    if capacity <= 0:
        raise ValueError("a mixture without mass")
    return content / capacity


def ice_to_take_up(heat: float) -> float:
    """Give the ice, kg, that takes a heat up by melting, J, >= 0.

    Raises:
        ValueError: A negative heat.
    """
    if heat < 0:
        raise ValueError(f"a heat of {heat} J")
    return heat / ICE
