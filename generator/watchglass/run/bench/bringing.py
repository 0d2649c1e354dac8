"""What a portion of a material brings: liquid components with their volume, and solids.

Solutions bring their solvent too. Its amount follows from the density of the solution where that
is known; else the dissolved is taken to add mass and no volume, and the solvent to fill the whole.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.resolve import model
from watchglass.run.bench.liquids import mass_held
from watchglass.run.bench.state import NOTHING, Phase, added
from watchglass.run.content import Missing, contents

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

    from watchglass.base.dimensions import Dimension
    from watchglass.catalogue.substances import Substance
    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.state import Vessel
    from watchglass.run.content import Content

_WATER_DENSITY = 998.2  # kg/m3, 20 °C, CRC Handbook


class Brought(NamedTuple):
    """What comes into a vessel.

    Attributes:
        liquid: Components that come as liquid or dissolved, with their volume.
        solids: Moles of substances that come as solids.
        unknown: Names of materials of which it is not known what or how much they bring.
        why: Why, in words; empty where all is known.
    """

    liquid: Phase = Phase()
    solids: Mapping[str, float] = NOTHING
    unknown: frozenset[str] = frozenset()
    why: str = ""


def bring(
    material: model.Material, dimension: Dimension, value: float, known: Knowledge
) -> Brought:
    """Work out what so much of a material brings.

    Args:
        material: What it is.
        dimension: Mass, volume or amount of substance.
        value: How much, SI.
        known: What is known of the components.
    """
    found = contents(material, dimension, value, 6)
    if isinstance(found, Missing):
        return _not_known(material, found)
    match material.composition:
        case model.Pure() | model.Mixture(_, "amount" | "mass" | "volume", _):
            return _neat(found, known)
        case model.Solution(_, _, solvent) | model.Saturated(_, solvent):
            return _dissolved(found, solvent, dimension, value, known, material.solution)
        case model.Mixture(_, _, solvent) if solvent is not None:
            return _dissolved(found, solvent, dimension, value, known, material.solution)
        case _:
            return Brought(unknown=frozenset((material.name,)), why="its composition is not known")


def carried_portion(
    material: model.Material,
    vessel: Vessel,
    dimension: Dimension,
    value: float,
    known: Knowledge,
) -> Brought:
    """Work out what so much of another procedure's product brings: a share of what its vessel held."""
    whole = {dim.MASS: mass_held(vessel, known), dim.VOLUME: vessel.volume}.get(dimension, 0.0)
    if not whole:
        return Brought(
            unknown=frozenset((material.name,)), why="how much of it there is is not known"
        )
    share = value / whole
    liquid = Phase(
        added(
            {key: amount * share for key, amount in vessel.aqueous.amounts.items()},
            {key: amount * share for key, amount in vessel.organic.amounts.items()},
        ),
        vessel.volume * share,
    )
    solids = {key: amount * share for key, amount in vessel.solid.items()}
    return Brought(liquid, solids, unknown=vessel.unknown)


def _not_known(material: model.Material, missing: Missing) -> Brought:
    of = f" of {missing.substance.name}" if missing.substance else ""
    why = {
        "composition": "its composition is not known",
        "size": "its size is not known",
        "sum": "it is measured in several ways",
    }.get(missing.what, f"the {missing.what}{of} is not known")
    return Brought(unknown=frozenset((material.name,)), why=why)


def _neat(found: Iterable[Content], known: Knowledge) -> Brought:
    """Bring substances as they are: each a liquid, or a solid."""
    liquid, solids = Phase(), dict(NOTHING)
    for content in found:
        thing = known.thing(content.substance.key)
        if thing.liquid:
            volume = content.moles * (thing.volume or 0.0)
            amounts = _components(content.substance, content.moles, known)
            liquid = liquid.plus(Phase(amounts, volume))
        else:
            solids = added(solids, {content.substance.key: content.moles})
    return Brought(liquid, solids)


def _dissolved(
    found: Iterable[Content],
    solvent: Substance,
    dimension: Dimension,
    value: float,
    known: Knowledge,
    facts: model.SolutionFacts | None,
) -> Brought:
    """Bring a solution: its solutes, and the solvent that makes up the rest."""
    amounts: dict[str, float] = {}
    mass = taken = 0.0
    for content in found:
        amounts = added(amounts, _components(content.substance, content.moles, known))
        mass += content.mass
        taken += content.moles * (known.thing(content.substance.key).volume or 0.0)
    density = facts.density or 0.0 if facts is not None and facts.source != "water" else 0.0
    base = known.thing(solvent.key).density or _WATER_DENSITY
    if dimension == dim.MASS:
        rest = max(value - mass, 0.0)
        volume = value / density if density else rest / base + taken
    else:
        volume = value if dimension == dim.VOLUME else taken
        rest = max(volume * density - mass, 0.0) if density else max(volume - taken, 0.0) * base
    molar_mass = known.thing(solvent.key).molar_mass
    if molar_mass:
        amounts = added(amounts, _components(solvent, rest / molar_mass, known))
    return Brought(Phase(amounts, volume))


def _components(substance: Substance, moles: float, known: Knowledge) -> dict[str, float]:
    return {key: count * moles for key, count in known.components(substance.key).items()}
