"""Contents of a vessel brought to equilibrium: dissolution, one pH, partition, what separates.

The engine is `chemistry/equilibrium.py`; here a vessel is turned into its terms and back. Only the
neutral form of a component partitions; ions stay in the water; what is beyond the solubility of
the neutral form separates as solid, carbon dioxide beyond its own leaves as gas.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.catalogue.components import PROTON, WATER
from watchglass.chemistry.equilibrium import Family, PhaseSystem, solve
from watchglass.chemistry.gases import gas_volume
from watchglass.run.bench.liquids import carrier, sort
from watchglass.run.bench.state import EMPTY, NOTHING, TRACE, Phase, Vessel, added

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.chemistry.equilibrium import Equilibrium
    from watchglass.run.bench.knowledge import Knowledge, Thing

#: Ionic strength beyond which results are rough, mol/m3.
ROUGH_ABOVE = 500.0
#: Share of all acids, bases and ions up to which one of unknown pKa does not spoil the pH [-]: an
#: indicator. Judgement: it moves the pH by less than 0.01.
_SLIGHT = 0.005


class Mixed(NamedTuple):
    """What mixing did.

    Attributes:
        ph: Of the aqueous layer, or None.
        gas: Moles of each component that left as gas.
        precipitated: Moles of each substance that became solid.
        dissolved: Moles of each solid substance that went into solution.
        rough: Whether the ionic strength is beyond what an ideal model is good for.
        why: What could not be told, in words.
        ratios: Where each partition ratio used is from: `measured` or `log P`.
    """

    ph: float | None = None
    gas: Mapping[str, float] = NOTHING
    precipitated: Mapping[str, float] = NOTHING
    dissolved: Mapping[str, float] = NOTHING
    rough: bool = False
    why: tuple[str, ...] = ()
    ratios: Mapping[str, str] = {}


class Prepared(NamedTuple):
    """A vessel in the engine's terms.

    Attributes:
        system: For `solve`.
        keys: The component each family of the system stands for.
        inert: Components of the aqueous layer that are in no family.
        kept: Components of the other layer that do not partition.
        doubt: Components without a constant that they need.
        why: The same in words.
        ratios: Where each partition ratio is from.
        spoilt: Whether the pH cannot be told.
    """

    system: PhaseSystem
    keys: tuple[str, ...]
    inert: Mapping[str, float]
    kept: Mapping[str, float]
    doubt: frozenset[str]
    why: tuple[str, ...]
    ratios: Mapping[str, str]
    spoilt: bool


def dissolve(vessel: Vessel, known: Knowledge) -> tuple[Vessel, dict[str, float], list[str]]:
    """Take solids into the liquids, as far as they dissolve; neutral ones come out again in `mix`.

    Returns:
        The vessel, the moles of each solid that went, and what could not be told.
    """
    if not vessel.solid or not (vessel.aqueous or vessel.organic):
        return vessel, {}, []
    aqueous, organic = vessel.aqueous, vessel.organic
    solid: dict[str, float] = {}
    gone: dict[str, float] = {}
    why: list[str] = []
    for key, amount in vessel.solid.items():
        thing = known.thing(key)
        components = known.components(key)
        salt = len(components) > 1 or thing.molar_mass is None
        goes = 0.0
        into_water = False
        if key in vessel.stated or _inert_solid(thing, salt=salt):
            pass
        elif salt:
            if aqueous:
                goes = min(amount, _room(thing, components, vessel, why, known))
                into_water = True
        elif organic or aqueous:
            goes = amount
            into_water = not organic
        if goes:
            gone[key] = goes
            brought = {k: n * goes for k, n in components.items()}
            if into_water:
                aqueous = Phase(added(aqueous.amounts, brought), aqueous.volume)
            else:
                organic = Phase(added(organic.amounts, brought), organic.volume)
        if amount - goes > TRACE:
            solid[key] = amount - goes
    return vessel._replace(aqueous=aqueous, organic=organic, solid=solid), gone, why


def _inert_solid(thing: Thing, *, salt: bool) -> bool:
    """Tell whether a solid stays one: a metal, silica, charcoal."""
    if salt:
        return False
    substance = thing.substance
    return (
        substance is not None
        and not any(e in thing.atoms for e in ("H",))
        and (thing.ratio is None and not thing.soluble and not thing.pkas)
    )


def _room(
    thing: Thing, components: Mapping[str, int], vessel: Vessel, why: list[str], known: Knowledge
) -> float:
    """Give how much more of a salt an aqueous layer dissolves, mol."""
    limit = thing.solubility(vessel.temperature)
    if limit is None:
        why.append(f"the solubility of {thing.name} is not known: it is taken to dissolve")
        return float("inf")
    there = min(
        (
            vessel.aqueous.amounts.get(key, 0.0) / count
            for key, count in components.items()
            if known.thing(key).ion and key != PROTON
        ),
        default=0.0,
    )
    in_water = max(limit * vessel.aqueous.volume - there, 0.0)
    return in_water + _by_acid(components, vessel.aqueous, known)


#: pKa above which an anion takes a proton from the acids of the bench in passing [-]: carbonates,
#: hydroxides and phosphates dissolve in acid, sulfates and chlorides do not. Judgement.
_TAKES_PROTON = 6.0


def _by_acid(components: Mapping[str, int], aqueous: Phase, known: Knowledge) -> float:
    """Give how much of a basic salt the acid in a layer dissolves, mol: chalk in vinegar.

    Each proton that the anion takes needs one from an acid that is there: a strong one, or one
    with a pKa below 6. Carbon dioxide that forms counts as gone.
    """
    takes = -components.get(PROTON, 0)
    for key, count in components.items():
        takes -= count * sum(1 for pka in known.thing(key).pkas if pka <= _TAKES_PROTON)
    if takes <= 0:
        return 0.0
    there = aqueous.amounts.get(PROTON, 0.0)
    for key, amount in aqueous.amounts.items():
        thing = known.thing(key)
        if thing.top == 0:
            there += amount * sum(1 for pka in thing.pkas if pka <= _TAKES_PROTON)
        else:
            there -= amount * sum(1 for pka in thing.pkas[: thing.top] if pka > _TAKES_PROTON)
    return max(there, 0.0) / takes


def _weight(amounts: Mapping[str, float], known: Knowledge) -> float:
    """Give the amount of all that takes part in the charge balance, mol."""
    total = 0.0
    for key, amount in amounts.items():
        thing = known.thing(key)
        if thing.ion or thing.pkas:
            total += abs(amount)
    return total


#: Share of a layer's volume below which a liquid in it is dissolved there, and no solvent [-]. Judgement.
_DISSOLVED = 0.2


def _solute(thing: Thing, amount: float, layer: Phase, solvent: Thing | None) -> bool:
    """Tell whether a liquid that could be a layer of its own is only dissolved in this one."""
    if thing is solvent or thing.ratio is None or thing.volume is None:
        return False
    return amount * thing.volume < _DISSOLVED * layer.volume


def prepare(aqueous: Phase, organic: Phase, temperature: float, known: Knowledge) -> Prepared:
    """Put two layers into the engine's terms."""
    solvent = carrier(organic, known) if organic else None
    families: list[Family] = []
    keys: list[str] = []
    inert: dict[str, float] = {}
    kept: dict[str, float] = {}
    doubt: set[str] = set()
    why: list[str] = []
    ratios: dict[str, str] = {}
    strong = 0.0
    spoilt = False
    two = bool(solvent)
    weight = _weight(aqueous.amounts, known) + _weight(organic.amounts, known)
    for key in dict.fromkeys((*aqueous.amounts, *organic.amounts)):
        thing = known.thing(key)
        in_water = aqueous.amounts.get(key, 0.0)
        in_other = organic.amounts.get(key, 0.0)
        if thing.ion or key == WATER:
            inert[key] = in_water + in_other
            strong += thing.charge * (in_water + in_other) if key != PROTON else 0.0
            continue
        if (
            thing.layers
            and not thing.pkas
            and two
            and not _solute(thing, in_other, organic, solvent)
        ):
            kept[key] = in_water + in_other
            continue
        if not thing.pkas_known and in_water + in_other > _SLIGHT * weight:
            doubt.add(key)
            spoilt = True
            why.append(f"the pKa of {thing.name} is not known")
        total = in_water + in_other
        ratio: float | None = 0.0
        if two and solvent is not None:
            ratio, source = known.ratio(key, solvent.key)
            if ratio is None and thing.gas:
                ratio, source = 0.0, "left out"
            if ratio is None and in_other <= 0.0 and thing.miscible and thing.pkas:
                ratio, source = 0.0, "left out"  # an inorganic acid stays in the water
            if ratio is None:
                why.append(
                    f"no partition ratio of {thing.name} between {solvent.name} and water is known"
                )
            else:
                ratios[key] = source
        if not thing.pkas and not two and not thing.soluble:
            inert[key] = total
            continue
        cap = (
            None
            if thing.miscible or (thing.layers and not thing.gas)
            else thing.solubility(temperature)
        )
        families.append(
            Family(
                pkas=thing.pkas,
                top=thing.top,
                amount=total,
                ratio=ratio,
                cap=cap,
                gas=thing.gas,
                key=key,
            )
        )
        keys.append(key)
    system = PhaseSystem(
        families=tuple(families),
        strong=strong,
        aqueous=aqueous.volume,
        organic=organic.volume if two else 0.0,
    )
    return Prepared(system, tuple(keys), inert, kept, frozenset(doubt), tuple(why), ratios, spoilt)


def mix(vessel: Vessel, known: Knowledge) -> tuple[Vessel, Mixed]:
    """Bring the contents of a vessel to equilibrium.

    Returns:
        The vessel as it then is, and what happened. What left as gas is in neither layer any more;
        the caller lets it go to the air.
    """
    vessel, dissolved, why = dissolve(vessel, known)
    aqueous, organic = sort(vessel.aqueous, vessel.organic, known)
    if not aqueous:
        settled = vessel._replace(
            aqueous=EMPTY, organic=organic, ph=None, mixed=True, settled=False
        )
        return settled, Mixed(dissolved=dissolved, why=tuple(why))
    prepared = prepare(aqueous, organic, vessel.temperature, known)
    found = solve(prepared.system)
    return _put_back(vessel, aqueous, organic, prepared, found, dissolved, why, known)


def _put_back(
    vessel: Vessel,
    aqueous: Phase,
    organic: Phase,
    prepared: Prepared,
    found: Equilibrium,
    dissolved: Mapping[str, float],
    why: list[str],
    known: Knowledge,
) -> tuple[Vessel, Mixed]:
    """Turn an equilibrium back into layers, solids and gas."""
    water = dict(prepared.inert)
    other = dict(prepared.kept)
    solid = dict(vessel.solid)
    gas: dict[str, float] = {}
    precipitated: dict[str, float] = {}
    lost = set()
    for key, family, part in zip(prepared.keys, prepared.system.families, found.parts, strict=True):
        if part.aqueous is None or part.organic is None or part.left is None:
            # where it goes is not known: it is kept where it was, and said to be in doubt
            lost.add(key)
            if in_water := aqueous.amounts.get(key, 0.0):
                water[key] = in_water
            if in_other := organic.amounts.get(key, 0.0):
                other[key] = in_other
            continue
        if part.aqueous > TRACE:
            water[key] = part.aqueous
        if part.organic > TRACE:
            other[key] = part.organic
        if part.left > TRACE:
            if family.gas:
                gas[key] = part.left
            else:
                precipitated[key] = part.left
                solid = added(solid, {key: part.left})
    moved = 0.0  # liquids take their volume with them from layer to layer
    for key, amount in other.items():
        volume = known.thing(key).volume
        if volume is not None and key not in prepared.kept:
            moved += (amount - organic.amounts.get(key, 0.0)) * volume
    for key, amount in organic.amounts.items():
        volume = known.thing(key).volume
        if volume is not None and key not in other:
            moved -= amount * volume
    unknown = bool(vessel.unknown)
    ph = None if prepared.spoilt or unknown else found.ph
    reasons = [*why, *prepared.why]
    if unknown:
        reasons.append(f"what {', '.join(sorted(vessel.unknown))} brings is not known")
    doubt = vessel.doubt | prepared.doubt | lost
    if prepared.spoilt or unknown:
        doubt |= {
            key
            for key, family in zip(prepared.keys, prepared.system.families, strict=True)
            if family.pkas and prepared.system.organic
        }
    after = vessel._replace(
        aqueous=Phase(water, max(aqueous.volume - moved, 0.0)),
        organic=Phase(other, max(organic.volume + moved, 0.0)) if other else EMPTY,
        solid=solid,
        ph=ph,
        doubt=doubt,
        mixed=True,
        settled=False,
    )
    net = added(precipitated, dissolved, -1.0)
    return after, Mixed(
        ph=ph,
        gas=gas,
        precipitated={key: n for key, n in net.items() if n > 0},
        dissolved={key: -n for key, n in net.items() if n < 0},
        rough=found.ionic_strength is None or found.ionic_strength > ROUGH_ABOVE,
        why=tuple(dict.fromkeys(reasons)),
        ratios=prepared.ratios,
    )


def gas_volume_of(outcome: object) -> float:
    """Give the volume at 25 °C and 1 atm of what left as gas in an outcome, m3; 0 for all others."""
    if not isinstance(outcome, Mixed) or not outcome.gas:
        return 0.0
    return sum(
        gas_volume(amount=amount, temperature=298.15, pressure=101325.0)
        for amount in outcome.gas.values()
        if amount > 0
    )
