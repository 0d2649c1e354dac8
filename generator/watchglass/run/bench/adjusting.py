"""Reagent to a pH, and titrations: how much is needed, and what it does on the way."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.chemistry.equilibrium import unknown_ratios
from watchglass.chemistry.reagents import volume_to_ph
from watchglass.read import syntax
from watchglass.run.bench import reacting
from watchglass.run.bench.bringing import bring
from watchglass.run.bench.ledger import Added
from watchglass.run.bench.mixing import dissolve, prepare
from watchglass.run.bench.pouring import draw
from watchglass.run.bench.state import EMPTY

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.resolve import model
    from watchglass.run.bench.mixing import Prepared
    from watchglass.run.bench.runner import Runner
    from watchglass.run.bench.said import Said
    from watchglass.run.bench.state import Phase, Vessel

#: No more of a reagent is tried than this times what the vessel holds [-].
_MOST = 1000.0


def adjust(runner: Runner, event: model.Operation, said: Said) -> None:
    """Add a reagent until a pH is reached."""
    vessel = runner.vessel(event.object.name.text) if event.object else None
    wanted, _ = _aim(runner, said)
    if vessel is None or wanted is None:
        return
    if event.portions:
        before = _ph(runner, vessel)
        runner.charge(event.portions, vessel.name)
        after = runner.mix(runner.bench.vessel(vessel.name))
        volume = sum(p.quantity.middle for p in event.portions if p.quantity)
        runner.say(
            after.name, Added(event.portions[0].material, volume, wanted, before, stated=True)
        )
        return
    _add(runner, event, vessel, wanted, None)


def titrate(runner: Runner, event: model.Operation, said: Said) -> None:
    """Add titrant from its vessel until the indicator changes, or the named reaction is at its end."""
    vessel = runner.vessel(event.object.name.text) if event.object else None
    source = said.place("from")
    if vessel is None or source is None:
        return
    burette = runner.vessel(source.name.text)
    giving = said.quantity("giving")
    reaction = said.place("as")
    wanted, why = _aim(runner, said)
    before = _ph(runner, vessel)
    if giving is not None:
        volume: float | None = runner.value(giving)
    elif reaction is not None:
        volume, why = _by_reaction(runner, vessel, burette, reaction.name.text)
    elif wanted is None:
        volume = None
        why = why or "it has neither a pH to go to nor a reaction"
    else:
        volume, why = _volume(runner, vessel, burette.aqueous, wanted)
    name = runner.name(event.reagent)
    if volume is not None:
        share = min(volume / burette.volume, 1.0) if burette.volume else 0.0
        left, drawn = draw(burette, "liquid", share)
        runner.put(left)
        runner.pour(vessel.name, drawn)
        if reaction is not None:
            _run(runner, vessel.name, reaction.name.text)
        runner.mix(runner.bench.vessel(vessel.name))
        runner.say(
            vessel.name,
            Added(name, volume, wanted, before, stated=giving is not None),
        )
    else:
        runner.say(vessel.name, Added(name, None, wanted, before, why=why))
    runner.titres.append((len(runner.entries), vessel.name, volume))


def _aim(runner: Runner, said: Said) -> tuple[float | None, str]:
    """Give the pH that an act goes to: as said, or the middle of an indicator's range."""
    to = said.clauses.get("to")
    if isinstance(to, syntax.Ph):
        return to.quantity.middle, ""
    if isinstance(to, syntax.Place):
        indicator = runner.known.catalogue.indicators.get(to.name.text)
        if indicator is not None:
            return indicator.range.middle, ""
        return None, f"{to.name.text} shows no pH"
    return None, ""


def _ph(runner: Runner, vessel: Vessel) -> float | None:
    if not vessel.mixed:
        vessel = runner.mix(vessel)
    return vessel.ph


def _add(
    runner: Runner, event: model.Operation, vessel: Vessel, wanted: float, _said: None
) -> None:
    before = _ph(runner, vessel)
    vessel = runner.bench.vessel(vessel.name)
    name = runner.name(event.reagent)
    material = runner.procedure.materials.get(name)
    if material is None:
        return
    brought = bring(material, dim.VOLUME, 1e-3, runner.known)
    if brought.why:
        runner.say(vessel.name, Added(name, None, wanted, before, why=brought.why))
        return
    volume, why = _volume(runner, vessel, brought.liquid, wanted)
    if volume is None:
        runner.say(vessel.name, Added(name, None, wanted, before, why=why))
        return
    runner.bring(material, dim.VOLUME, volume, vessel.name)
    runner.mix(runner.bench.vessel(vessel.name))
    runner.say(vessel.name, Added(name, volume, wanted, before))


def _prepared(runner: Runner, vessel: Vessel) -> Prepared:
    dissolved, _, _ = dissolve(vessel, runner.known)
    return prepare(dissolved.aqueous, dissolved.organic, dissolved.temperature, runner.known)


def _volume(
    runner: Runner, vessel: Vessel, reagent: Phase, wanted: float
) -> tuple[float | None, str]:
    """Give the volume of a reagent to a pH, or why it cannot be told."""
    if vessel.aqueous.volume <= 0:
        return None, "there is no aqueous liquid in it"
    if vessel.unknown:
        return None, f"what {', '.join(sorted(vessel.unknown))} brings is not known"
    if not reagent:
        return None, "there is no reagent in the vessel it comes from"
    held, coming = _prepared(runner, vessel), prepare(reagent, EMPTY, 298.15, runner.known)
    if held.spoilt or coming.spoilt:
        return None, "; ".join((*held.why, *coming.why))
    if unknown_ratios(held.system):
        return None, "; ".join(held.why)
    volume = volume_to_ph(
        held.system, coming.system, wanted, most=_MOST * max(vessel.aqueous.volume, 1e-6)
    )
    if volume is None:
        return None, f"no amount of it brings the liquid to pH {wanted:g}"
    return volume, ""


def _by_reaction(
    runner: Runner, vessel: Vessel, burette: Vessel, name: str
) -> tuple[float | None, str]:
    """Give the volume of titrant that a reaction's equation asks for."""
    reaction = runner.procedure.reactions.get(runner.name(name))
    if reaction is None or not reaction.balanced:
        return None, "its reaction is not known"
    left = reacting.terms(reaction.left, runner.known)
    if left is None or not burette.volume:
        return None, "a substance of its equation is not known, or there is no titrant"
    there = {**vessel.aqueous.amounts}
    held = [(c, p) for _, c, p in left if _of(there, p) > 0 and not _of(burette.aqueous.amounts, p)]
    from_burette = [(c, p) for _, c, p in left if _of(burette.aqueous.amounts, p) > 0]
    if not held or not from_burette:
        return None, "the vessel or the burette holds nothing that the reaction takes"
    turns = min(_of(there, parts) / count for count, parts in held)
    count, parts = from_burette[0]
    strength = _of(burette.aqueous.amounts, parts) / burette.aqueous.volume
    return turns * count / strength, ""


def _of(there: Mapping[str, float], parts: Mapping[str, float]) -> float:
    return reacting.available(there, parts)


def _run(runner: Runner, name: str, reaction_name: str) -> None:
    reaction = runner.procedure.reactions.get(runner.name(reaction_name))
    if reaction is not None:
        done = reacting.react(runner.bench.vessel(name), reaction, 1.0, runner.known)
        runner.put(done.vessel)
