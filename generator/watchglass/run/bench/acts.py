"""What each verb of the bench does: one table of functions, each from a runner and an operation."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.read import syntax
from watchglass.resolve.reactions import substances_of
from watchglass.run.bench import adjusting, reacting, separating
from watchglass.run.bench.layers import layers
from watchglass.run.bench.ledger import Moved, NotAssessed, Reacted, Result, Supposed
from watchglass.run.bench.pouring import draw, pour
from watchglass.run.bench.said import Said
from watchglass.run.bench.state import NOTHING, Phase, added

if TYPE_CHECKING:
    from collections.abc import Callable, Mapping

    from watchglass.resolve import model
    from watchglass.run.bench.runner import Runner
    from watchglass.run.bench.state import Vessel

_FLAMES = ("on steam", "with flame", "on hot plate")


def act(runner: Runner, event: model.Operation) -> None:
    """Carry out an operation."""
    said = Said({clause.word: clause.value for clause in event.clauses})
    if event.object is not None:
        _place_and_closure(runner, event.object.name.text, said)
    handler = _ACTS.get(event.verb)
    if handler is not None:
        handler(runner, event, said)


def _place_and_closure(runner: Runner, name: str, said: Said) -> None:
    vessel = runner.vessel(name)
    closure, setting = said.words("closure"), said.words("setting")
    if closure:
        vessel = vessel._replace(closure=closure)
    if setting == "in hood":
        vessel = vessel._replace(place="hood")
    if closure or setting:
        runner.put(vessel)


def _object(runner: Runner, event: model.Operation) -> Vessel:
    assert event.object is not None  # noqa: S101 - the table of verbs asks for a vessel
    return runner.vessel(event.object.name.text)


# ---------------------------------------------------------------- mixing and temperature


def _mix(runner: Runner, event: model.Operation, _said: Said) -> None:
    vessel = _object(runner, event)
    runner.charge(event.portions, vessel.name)
    vessel = runner.bench.vessel(vessel.name)
    if event.verb == "dissolve":
        vessel = vessel._replace(stated=frozenset())
    runner.mix(vessel)


def _temperature(runner: Runner, event: model.Operation, said: Said) -> None:
    vessel = _object(runner, event)
    quantity = said.quantity("to", "at")
    bath = said.place("with", "in", "on")
    kelvin = vessel.temperature
    if quantity is not None and quantity.dimension == dim.TEMPERATURE:
        kelvin = quantity.middle
    elif (by := said.quantity("by")) is not None:
        kelvin += by.middle if event.verb in ("heat", "warm") else -by.middle
    elif event.verb in ("boil", "reflux"):
        kelvin = _boiling(runner, vessel) or kelvin
    elif bath is not None and bath.name.text == "ice":
        kelvin = 273.15
    cooled = event.verb in ("cool", "chill")
    held = bath.name.text if bath is not None else ("" if not cooled else vessel.bath)
    stated = vessel.stated if kelvin <= vessel.temperature else frozenset()
    vessel = vessel._replace(temperature=kelvin, bath=held, mixed=False, stated=stated)
    runner.put(vessel)
    if not vessel.empty:
        runner.mix(vessel)


def _boiling(runner: Runner, vessel: Vessel) -> float | None:
    """Give the lowest boiling point of what makes up a tenth of the liquid or more, K."""
    points = []
    for phase in (vessel.aqueous, vessel.organic):
        for key, amount in phase.amounts.items():
            thing = runner.known.thing(key)
            volume = thing.volume
            if volume and thing.boils and amount * volume >= 0.1 * phase.volume:
                points.append(thing.boils)
    return min(points, default=None)


def _settle(runner: Runner, event: model.Operation, _said: Said) -> None:
    vessel = _object(runner, event)._replace(settled=True)
    runner.put(vessel)
    found = layers(vessel, runner.known)
    if found is not None:
        runner.results.append(Result(vessel.name, found))


# ---------------------------------------------------------------- reactions and reagents


def _react(runner: Runner, event: model.Operation, said: Said) -> None:
    vessel = _object(runner, event)
    reaction = runner.procedure.reactions.get(runner.name(event.reaction))
    if reaction is None:
        return
    to = said.quantity("to")
    share = to if to is not None else reaction.conversion
    done = reacting.react(vessel, reaction, share.middle if share else 1.0, runner.known)
    for key, amount in done.made.items():
        for part, count in runner.known.parts(key).items():
            runner.formed[part] = runner.formed.get(part, 0.0) + count * amount
        if key not in runner.known.parts(key):  # a salt: its ions may come with others as well
            runner.formed[key] = runner.formed.get(key, 0.0) + amount
    runner.put(done.vessel)
    runner.say(vessel.name, Reacted(reaction.name, done.extent, done.limiting, done.why))
    if not done.why:
        runner.mix(done.vessel)


def _fill(runner: Runner, event: model.Operation, said: Said) -> None:
    vessel = _object(runner, event)
    to = said.quantity("to")
    whole = to.middle if to is not None else vessel.capacity
    material = runner.procedure.materials.get(runner.name(event.reagent))
    if event.portions:
        runner.charge(event.portions, vessel.name)
    elif whole is None or material is None:
        runner.say(vessel.name, NotAssessed("how much it takes to fill it is not known"))
        return
    elif whole > vessel.volume:
        runner.bring(material, dim.VOLUME, whole - vessel.volume, vessel.name)
    runner.mix(runner.bench.vessel(vessel.name))


def _dry(runner: Runner, event: model.Operation, _said: Said) -> None:
    vessel = _object(runner, event)
    runner.charge(event.portions, vessel.name)
    if event.reagent:
        runner.charge((), vessel.name)


# ---------------------------------------------------------------- separations


def _filter(runner: Runner, event: model.Operation, said: Said) -> None:
    vessel = _object(runner, event)
    into, on = said.place("into"), said.place("on")
    if into is None:
        return
    target = runner.name(into.name.text)
    if not vessel.mixed:
        vessel = runner.mix(vessel)
    kept, liquid = separating.run_through(vessel)
    runner.put(kept.emptied())
    if on is not None:
        paper = runner.vessel(on.name.text)
        paper = paper._replace(
            solid=added(paper.solid, kept.solid),
            temperature=vessel.temperature,
            doubt=paper.doubt | kept.doubt,
            unknown=paper.unknown | kept.unknown,
            stated=paper.stated | kept.stated,
            used=True,
        )
        runner.put(paper)
        runner.runs_into[paper.name] = target
    elif kept.solid:
        through = said.place("through")
        name = through.name.text if through else "filter"
        runner.bench = runner.bench.to_sink(name, solids=kept.solid)
    runner.say(vessel.name, Moved(vessel.name, target, "liquid", liquid.volume))
    runner.pour(target, liquid)


def _decant(runner: Runner, event: model.Operation, said: Said) -> None:
    vessel, into = _object(runner, event), said.place("into")
    if into is None:
        return
    kept, liquid = separating.run_through(vessel)
    runner.put(kept)
    target = runner.name(into.name.text)
    runner.say(vessel.name, Moved(vessel.name, target, "liquid", liquid.volume))
    runner.pour(target, liquid)


def _evaporate(runner: Runner, event: model.Operation, said: Said) -> None:
    vessel = _object(runner, event)
    left = said.quantity("leaving", "to")
    leaving = left.middle if left is not None and left.dimension == dim.VOLUME else None
    parted = separating.evaporate(vessel, leaving, runner.known)
    _goes_over(runner, vessel, parted, said)


def _distil(runner: Runner, event: model.Operation, said: Said) -> None:
    vessel = _object(runner, event)
    at, to = said.quantity("at"), said.quantity("to")
    left = said.quantity("leaving")
    leaving = left.middle if left is not None and left.dimension == dim.VOLUME else None
    low = at.si if at is not None and at.si_high > at.si else None
    high = at.si_high if at is not None else to.middle if to is not None else None
    if high is None:
        runner.say(vessel.name, NotAssessed("no temperature is given for what goes over"))
        return
    parted = separating.distil(vessel, low, high, leaving, runner.known)
    _goes_over(runner, vessel, parted, said)


def _goes_over(runner: Runner, vessel: Vessel, parted: separating.Parted, said: Said) -> None:
    runner.put(parted.vessel)
    for why in parted.why:
        runner.say(vessel.name, NotAssessed(why))
    into = said.place("into")
    target = runner.name(into.name.text) if into is not None else "air"
    fore, over = parted.fore, parted.over
    if fore.aqueous or fore.organic:
        runner.bench = runner.bench.to_sink(
            "forerun" if into else "air", liquids=(fore.aqueous, fore.organic)
        )
    runner.say(vessel.name, Moved(vessel.name, target, "", over.volume, whole=False))
    if into is None:
        runner.bench = runner.bench.to_sink("air", liquids=(over.aqueous, over.organic))
    else:
        runner.pour(target, over)


def _collect(runner: Runner, event: model.Operation, said: Said) -> None:
    vessel, into = _object(runner, event), said.place("into")
    if into is not None:
        runner.move(vessel, "solid" if vessel.solid else None, runner.name(into.name.text))


def _rinse(runner: Runner, event: model.Operation, said: Said) -> None:
    vessel = _object(runner, event)
    runner.charge(event.portions, vessel.name)
    vessel = runner.bench.vessel(vessel.name)
    into, to = said.place("into"), said.place("to")
    if into is not None:
        runner.move(vessel, None, runner.name(into.name.text))
    else:
        _let_go(runner, vessel, "", to.name.text if to is not None else "rinsings")


def _discard(runner: Runner, event: model.Operation, said: Said) -> None:
    vessel, to = _object(runner, event), said.place("to", "into")
    part = event.object.part if event.object else None
    name = to.name.text if to is not None else "waste"
    if name in runner.bench.vessels:
        runner.move(vessel, part, runner.name(name))
        return
    which = runner.part(vessel, part)
    if which is None:
        runner.say(vessel.name, NotAssessed("which layer lies below cannot be told"))
        return
    found = layers(vessel, runner.known)
    if part is not None and found is not None:
        runner.results.append(Result(vessel.name, found))
    _let_go(runner, vessel, which, name)


def _let_go(runner: Runner, vessel: Vessel, part: str, stream: str) -> None:
    found = layers(vessel, runner.known) if part else None
    left, drawn = draw(vessel, part)
    if found is not None and found.below:
        left = left._replace(remains="upper" if part == found.below else "lower")
    nothing = not (drawn.aqueous or drawn.organic or drawn.solid or drawn.unknown)
    runner.put(left)
    runner.bench = runner.bench.to_sink(
        stream,
        liquids=(drawn.aqueous, drawn.organic),
        solids=drawn.solid,
        unknown=drawn.unknown,
    )
    runner.say(vessel.name, Moved(vessel.name, stream, part, drawn.volume, nothing=nothing))


# ---------------------------------------------------------------- what is stated, and time


def _suppose(runner: Runner, event: model.Operation, said: Said) -> None:
    vessel = _object(runner, event)
    amount = event.stated
    outcome, reason = said.words("is"), said.words("because")
    if amount is None or not isinstance(amount.measure, syntax.Measured):
        return
    word = amount.material.text
    quantity = amount.measure.quantity
    share = quantity.middle if quantity.dimension == dim.SHARE else None
    keys = _keys(runner, word)
    changed, why = vessel, "only a share can be supposed"
    if share is not None:
        changed, why = _as_stated(runner, vessel, keys, share, outcome)
    runner.put(changed)
    runner.say(vessel.name, Supposed(word, share, outcome, reason, why))


def _keys(runner: Runner, word: str) -> tuple[str, ...]:
    """Give the components of a substance or material that is named."""
    material = runner.procedure.materials.get(runner.name(word))
    substance = None if material else runner.known.catalogue.by_key(word)
    if substance is not None:
        return tuple(k for k in runner.known.parts(substance.key) if not runner.known.thing(k).ion)
    if material is None:
        return ()
    keys = (key for s in substances_of(material) for key in runner.known.parts(s.key))
    return tuple(key for key in dict.fromkeys(keys) if not runner.known.thing(key).ion)


def _as_stated(
    runner: Runner, vessel: Vessel, keys: tuple[str, ...], share: float, outcome: str
) -> tuple[Vessel, str]:
    """Put a share of some components where the author says that they are."""
    if outcome not in ("solid", "dissolved", "aqueous", "organic", "gone"):
        return vessel, f"`{outcome}` is no outcome that the bench knows"
    for key in keys:
        whole = (
            vessel.aqueous.amounts.get(key, 0.0)
            + vessel.organic.amounts.get(key, 0.0)
            + vessel.solid.get(key, 0.0)
        )
        if whole <= 0:
            return vessel, f"there is no {runner.known.thing(key).name} in it"
        there = share * whole
        rest = whole - there
        vessel = _without(vessel, key)._replace(stated=vessel.stated - {key})
        if outcome == "gone":
            runner.bench = runner.bench.to_sink("supposed", liquids=(Phase({key: there}, 0.0),))
            vessel = _dissolved(vessel, key, rest)
        elif outcome == "solid":
            vessel = vessel._replace(
                solid=added(vessel.solid, {key: there}), stated=vessel.stated | {key}
            )
            vessel = _dissolved(vessel, key, rest)
        elif outcome == "dissolved":
            vessel = vessel._replace(solid=added(vessel.solid, {key: rest}))
            vessel = _dissolved(vessel, key, there)
        else:
            first, second = (there, rest) if outcome == "aqueous" else (rest, there)
            aqueous = vessel.aqueous._replace(amounts=added(vessel.aqueous.amounts, {key: first}))
            organic = vessel.organic._replace(amounts=added(vessel.organic.amounts, {key: second}))
            vessel = vessel._replace(aqueous=aqueous, organic=organic)
        vessel = vessel._replace(doubt=vessel.doubt - {key}, mixed=True)
    return vessel, "" if keys else "it is not known which substance is meant"


def _without(vessel: Vessel, key: str) -> Vessel:
    def bare(amounts: Mapping[str, float]) -> dict[str, float]:
        return {k: v for k, v in amounts.items() if k != key}

    return vessel._replace(
        aqueous=vessel.aqueous._replace(amounts=bare(vessel.aqueous.amounts)),
        organic=vessel.organic._replace(amounts=bare(vessel.organic.amounts)),
        solid=bare(vessel.solid),
    )


def _dissolved(vessel: Vessel, key: str, amount: float) -> Vessel:
    """Put a component into the liquid there is, the organic one first."""
    if vessel.organic.volume or not vessel.aqueous.volume:
        organic = vessel.organic._replace(amounts=added(vessel.organic.amounts, {key: amount}))
        return vessel._replace(organic=organic)
    aqueous = vessel.aqueous._replace(amounts=added(vessel.aqueous.amounts, {key: amount}))
    return vessel._replace(aqueous=aqueous)


def _test(runner: Runner, event: model.Operation, _said: Said) -> None:
    if event.object is None or event.object.name.text not in runner.procedure.vessels:
        return
    vessel = _object(runner, event)
    if event.subject == "ph" and not vessel.mixed and not vessel.empty:
        runner.mix(vessel)


def _next_period(runner: Runner, _event: model.Operation, _said: Said) -> None:
    runner.put(
        *(
            vessel._replace(temperature=runner.room, bath="")
            for vessel in runner.bench.vessels.values()
        )
    )


_ACTS: dict[str, Callable[[Runner, model.Operation, Said], None]] = {
    "mix": _mix,
    "stir": _mix,
    "swirl": _mix,
    "shake": _mix,
    "dissolve": _mix,
    "settle": _settle,
    "heat": _temperature,
    "warm": _temperature,
    "cool": _temperature,
    "chill": _temperature,
    "boil": _temperature,
    "reflux": _temperature,
    "react": _react,
    "adjust": adjusting.adjust,
    "titrate": adjusting.titrate,
    "fill": _fill,
    "dry": _dry,
    "filter": _filter,
    "decant": _decant,
    "evaporate": _evaporate,
    "distil": _distil,
    "collect": _collect,
    "rinse": _rinse,
    "discard": _discard,
    "test": _test,
    "suppose": _suppose,
    "next period": _next_period,
}
__all__ = ["NOTHING", "Said", "act", "pour"]
