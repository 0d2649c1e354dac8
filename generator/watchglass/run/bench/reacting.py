"""Reactions run where the author says so, to their conversion on what is there."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.catalogue.components import PROTON, WATER
from watchglass.run.bench.liquids import liquid_volume, sort
from watchglass.run.bench.state import TRACE, Phase, Vessel, added

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.resolve import model
    from watchglass.run.bench.knowledge import Knowledge


class Run(NamedTuple):
    """What a reaction did in a vessel.

    Attributes:
        vessel: As it then is.
        extent: mol of the equation as written.
        whole: Extent if it ran to the end.
        limiting: Key of the substance that limits, or empty.
        made: mol of each substance formed if it ran to the end, by key.
        why: Why it did not run; empty where it did.
    """

    vessel: Vessel
    extent: float
    whole: float
    limiting: str
    made: Mapping[str, float]
    why: str = ""


def key_of(species: model.Species, known: Knowledge) -> str | None:
    """Give the key of the substance or ion that a term of an equation is."""
    if species.substance is not None:
        return species.substance.key
    if species.formula is None:
        return None
    return known.key_of_formula(species.formula)


def terms(
    species: tuple[model.Species, ...], known: Knowledge
) -> list[tuple[str, float, Mapping[str, int]]] | None:
    """Give key, coefficient and components of each term; None where one is not known."""
    found = []
    for term in species:
        key = key_of(term, known)
        if key is None:
            return None
        found.append((key, float(term.coefficient), known.parts(key)))
    return found


def react(vessel: Vessel, reaction: model.Reaction, conversion: float, known: Knowledge) -> Run:
    """Run a reaction in a vessel.

    Args:
        vessel: Where.
        reaction: Balanced.
        conversion: Share of the limiting reactant that reacts, 0 to 1.
        known: What is known of the components.

    Returns:
        The vessel after it; nothing is mixed anew.
    """
    left, right = terms(reaction.left, known), terms(reaction.right, known)
    if left is None or right is None or not reaction.balanced:
        return Run(vessel, 0.0, 0.0, "", {}, _why_not(reaction, known))
    there = added(vessel.aqueous.amounts, vessel.organic.amounts)
    limiting, whole = "", float("inf")
    for key, coefficient, parts in left:
        held = vessel.solid.get(key, 0.0) + available(there, parts)
        if held / coefficient < whole:
            limiting, whole = key, held / coefficient
    made = {key: coefficient * whole for key, coefficient, _ in right}
    if whole <= TRACE:
        return Run(
            vessel, 0.0, 0.0, limiting, {}, f"there is no {known.thing(limiting).name} in it"
        )
    extent = whole * conversion
    for key, coefficient, parts in left:
        vessel = _taken(vessel, key, coefficient * extent, parts, known)
    gained: dict[str, float] = {}
    fallen: dict[str, float] = {}
    for key, coefficient, parts in right:
        falls = min(_falls(key, parts, coefficient * extent, vessel, known), coefficient * extent)
        if falls > TRACE:
            fallen = added(fallen, {key: falls})
        gained = added(gained, parts, coefficient * extent - falls)
    after = _given(vessel, gained, known)
    return Run(after._replace(solid=added(after.solid, fallen)), extent, whole, limiting, made)


def _why_not(reaction: model.Reaction, known: Knowledge) -> str:
    """Say which substance of an equation the bench does not know."""
    terms_of = (*reaction.left, *reaction.right)
    missing = [f"`{term.written}`" for term in terms_of if key_of(term, known) is None]
    if not missing:
        return "its equation does not balance"
    return f"the catalogue does not know {' and '.join(missing)} of its equation"


def _falls(
    key: str, parts: Mapping[str, int], amount: float, vessel: Vessel, known: Knowledge
) -> float:
    """Give how much of a salt that forms separates, mol: what is beyond its solubility in water.

    What is not salt, and what dissolves in an acid that is there, comes out (or not) when the vessel
    is brought to equilibrium.
    """
    thing = known.thing(key)
    if len(parts) < _SALT or thing.substance is None or thing.substance.state != "solid":
        return 0.0
    limit = thing.solubility(vessel.temperature)
    if limit is None:
        return 0.0
    return max(amount - limit * vessel.aqueous.volume, 0.0)


#: Components from which a substance is a salt: its ions.
_SALT = 2


def available(there: Mapping[str, float], parts: Mapping[str, float]) -> float:
    """Give how much of a substance dissolved components could make up, mol."""
    counted = [key for key in parts if key not in (PROTON, WATER)] or list(parts)
    return min(max(there.get(key, 0.0), 0.0) / parts[key] for key in counted)


def _taken(
    vessel: Vessel, key: str, amount: float, parts: Mapping[str, float], known: Knowledge
) -> Vessel:
    """Take a reactant away: from solution first, the rest from the solid."""
    there = added(vessel.aqueous.amounts, vessel.organic.amounts)
    dissolved = min(available(there, parts), amount)
    solid = dict(vessel.solid)
    if amount - dissolved > TRACE:
        solid = added(solid, {key: -(amount - dissolved)})
    aqueous, organic = vessel.aqueous, vessel.organic
    for part, count in parts.items():
        wanted = count * dissolved
        in_water, in_other = aqueous.amounts.get(part, 0.0), organic.amounts.get(part, 0.0)
        if part in (PROTON, WATER) or not in_other:
            from_water = wanted if in_water or not organic else 0.0
        else:
            from_water = wanted * in_water / (in_water + in_other)
        aqueous = aqueous._replace(amounts=added(aqueous.amounts, {part: -from_water}))
        organic = organic._replace(amounts=added(organic.amounts, {part: from_water - wanted}))
    return vessel._replace(
        aqueous=_resized(vessel.aqueous, aqueous, known),
        organic=_resized(vessel.organic, organic, known),
        solid=solid,
    )


def _resized(before: Phase, after: Phase, known: Knowledge) -> Phase:
    """Give a layer the volume that its liquids have gained or lost."""
    gained = liquid_volume(after.amounts, known) - liquid_volume(before.amounts, known)
    return Phase(after.amounts, max(before.volume + gained, 0.0))


def _given(vessel: Vessel, gained: Mapping[str, float], known: Knowledge) -> Vessel:
    """Put products where liquids of their kind are, and sort the layers anew."""
    aqueous, organic = vessel.aqueous, vessel.organic
    for key, amount in gained.items():
        thing = known.thing(key)
        wet = thing.ion or key == WATER or thing.gas
        if (wet and aqueous) or not organic:
            aqueous = aqueous._replace(amounts=added(aqueous.amounts, {key: amount}))
        else:
            organic = organic._replace(amounts=added(organic.amounts, {key: amount}))
    aqueous = _resized(vessel.aqueous, aqueous, known)
    organic = _resized(vessel.organic, organic, known)
    aqueous, organic = sort(aqueous, organic, known)
    return vessel._replace(aqueous=aqueous, organic=organic, mixed=False, ph=None)
