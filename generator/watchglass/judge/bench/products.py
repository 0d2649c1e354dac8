"""Products that a reaction makes and nobody takes up."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding, Related
from watchglass.catalogue.components import WATER
from watchglass.judge.bench.ends import asked_for, kept
from watchglass.resolve import model
from watchglass.run.bench.figures import share_words
from watchglass.run.bench.ledger import Moved, Reacted

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.bench.run import Run
    from watchglass.run.bench.ledger import Moment
    from watchglass.run.bench.state import Sink, Vessel

#: Sinks from which a product may still be had: passes whose vessels were set aside.
_KEPT_SINKS = frozenset(("set aside",))
#: Share of a product that is to be taken up [-]. Judgement.
_MOST = 0.5


def product_not_collected(run: Run) -> Iterator[Finding]:
    """Report products of which more than half is thrown away, or left where nobody takes it up.

    Of interest are the organic products of reactions whose limiting reactant is declared: those are
    preparations. A draft that does not speak of ends yet is left alone.
    """
    if not _speaks_of_ends(run):
        return
    for reaction, (moment, keys) in _made(run).items():
        lost = {key: _lost(run, key) for key in keys}
        shares = {
            key: sum(there.values()) / run.ledger.formed[key]
            for key, there in lost.items()
            if run.ledger.formed.get(key)
        }
        if not shares or min(shares.values()) <= _MOST:
            continue  # one of its products is taken up: the others are what is left over
        key = max(shares, key=lambda k: run.known.thing(k).molar_mass or 0.0)
        place = max(lost[key], key=lost[key].__getitem__)
        last = _last_into(run, place) or moment
        sink = place in run.ledger.end.sinks
        yield Finding(
            code=codes.PRODUCT_NOT_COLLECTED,
            span=last.span,
            message=f"{run.known.thing(key).name}, the product of `{reaction}`, is never collected:"
            f" {share_words(shares[key])} of it "
            + (f"goes to {place}" if sink else f"stays in `{place}`"),
            related=(Related(moment.span, "it forms here"),),
            help="say where the product is taken up, as in `{collect dish}`, or weigh it",
        )


def _made(run: Run) -> dict[str, tuple[Moment, tuple[str, ...]]]:
    """Give, for each preparation that ran, the moment and its organic products."""
    made: dict[str, tuple[Moment, tuple[str, ...]]] = {}
    for moment in run.ledger.moments:
        for result in moment.entry.results:
            done = result.outcome
            if not isinstance(done, Reacted) or done.why or not done.extent:
                continue
            reaction = run.case.procedure.reactions.get(done.reaction)
            if reaction is not None and reaction.limiting and reaction.name not in made:
                keys = (s.substance.key for s in reaction.right if s.substance is not None)
                made[reaction.name] = moment, tuple(k for k in keys if _organic(run, k))
    return made


def _organic(run: Run, key: str) -> bool:
    thing = run.known.thing(key)
    return key != WATER and not thing.gas and bool(thing.atoms.get("C"))


def _lost(run: Run, key: str) -> dict[str, float]:
    """Give how much of a component is where nobody takes it up, mol, by vessel or sink."""
    asked = asked_for(run) | _collected(run)
    found = {
        name: _in_vessel(vessel, key)
        for name, vessel in run.ledger.end.vessels.items()
        if name not in asked and not kept(run, vessel)
    }
    found |= {
        name: _in_sink(sink, key)
        for name, sink in run.ledger.end.sinks.items()
        if name not in _KEPT_SINKS
    }
    return {name: amount for name, amount in found.items() if amount > 0}


def _in_vessel(vessel: Vessel, key: str) -> float:
    return (
        vessel.aqueous.amounts.get(key, 0.0)
        + vessel.organic.amounts.get(key, 0.0)
        + vessel.solid.get(key, 0.0)
    )


def _in_sink(sink: Sink, key: str) -> float:
    return sink.liquids.get(key, 0.0) + sink.solids.get(key, 0.0)


def _collected(run: Run) -> frozenset[str]:
    return frozenset(
        event.object.name.text
        for step in run.case.procedure.steps
        for event in step.events
        if isinstance(event, model.Operation) and event.verb == "collect" and event.object
    )


def _speaks_of_ends(run: Run) -> bool:
    verbs = {
        event.verb
        for step in run.case.procedure.steps
        for event in step.events
        if isinstance(event, model.Operation)
    }
    return bool(verbs & {"discard", "collect", "weigh"})


def _last_into(run: Run, place: str) -> Moment | None:
    found = None
    for moment in run.ledger.moments:
        for result in moment.entry.results:
            if isinstance(result.outcome, Moved) and result.outcome.target == place:
                found = moment
    return found
