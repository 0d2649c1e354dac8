"""Expectations of the experiment against what the bench gives, and where they were decided.

A share that falls short is decided where its substance went another way: in a layer of the other
kind than the one that was kept, or because the acid or base that was to move it was too little or
too weak. The finding stands there, says both figures, and what would mend it where one change of
strength or of the number of portions does.
"""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.base.findings import Finding, Related
from watchglass.catalogue.components import WATER
from watchglass.judge.bench.ends import names_in
from watchglass.judge.bench.mending import Washing, mended
from watchglass.judge.expected import at_desk
from watchglass.read.syntax import Name, Words
from watchglass.read.terms import After, Call, Compare, Held, Within
from watchglass.resolve import model
from watchglass.run.bench.asked import amount_in
from watchglass.run.bench.evaluator import BenchEvaluator
from watchglass.run.bench.figures import share_words
from watchglass.run.bench.layers import layers
from watchglass.run.bench.ledger import Moved
from watchglass.run.evaluate import Value

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.catalogue.substances import Substance
    from watchglass.judge.bench.run import Run
    from watchglass.read.terms import Expression
    from watchglass.run.bench.ledger import Ledger, Moment
    from watchglass.run.bench.state import Vessel


#: Share of a substance in the other layer from which that layer was meant [-].
_MOST = 0.75


class Missed(NamedTuple):
    """An expectation that does not hold.

    Attributes:
        line: Which.
        reached: What it comes to.
        ledger: In which run.
    """

    line: model.Expectation
    reached: Value
    ledger: Ledger


def evaluator(run: Run, ledger: Ledger) -> BenchEvaluator:
    """Give what evaluates expressions of a run."""
    procedure = run.case.procedure
    return BenchEvaluator(
        procedure, run.case.usage, run.known.catalogue, {}, asked=run.asked(ledger)
    )


def missed(run: Run) -> tuple[Missed, ...]:
    """Give the expectations that do not hold at one end of the open amounts or the other."""
    found = []
    for line in run.case.procedure.expectations:
        expression = line.expression
        if not isinstance(expression, Compare | Within) or at_desk(run.case, line) is not None:
            continue
        for ledger in run.ledgers:
            holds, reached = evaluator(run, ledger).holds(expression)
            if holds is False and isinstance(reached, Value):
                found.append(Missed(line, reached, ledger))
                break
    return tuple(found)


def expectations(run: Run) -> Iterator[Finding]:
    """Report expectations that are missed, one finding for all that one act decided."""
    decided: dict[int, Finding] = {}
    for miss in missed(run):
        culprit = _culprit(run, miss)
        if culprit is None:
            yield _plain(run, miss)
            continue
        before = decided.get(culprit.span.start)
        related = Related(miss.line.span, f"so {_says(miss)}")
        if before is None:
            decided[culprit.span.start] = _with(culprit, related)
        else:
            decided[culprit.span.start] = _with(before, related)
    yield from decided.values()


def _with(finding: Finding, related: Related) -> Finding:
    return replace(finding, related=(*finding.related, related))


def _says(miss: Missed) -> str:
    return f"it comes to {_figure(miss.reached)} here"


def _figure(value: Value) -> str:
    if value.dimension == dim.SHARE:
        return share_words(value.si)
    if value.dimension == dim.VOLUME:
        return f"{shown(value.si * 1e6, value.figures)} mL"
    if value.dimension == dim.MASS:
        return f"{shown(value.si * 1e3, value.figures)} g"
    return shown(value.si, value.figures)


def _plain(run: Run, miss: Missed) -> Finding:
    decided = _decided_at(run, miss)
    return Finding(
        code=codes.EXPECTATION_MISSED,
        span=miss.line.span,
        message=f"`{miss.line.written}`: the bench gives {_figure(miss.reached)}",
        related=(Related(decided.span, f"step {decided.entry.happening.step} decides it"),)
        if decided is not None
        else (),
        help="see what decides it with `watchglass ledger`, or mend the expectation",
    )


def _decided_at(run: Run, miss: Missed) -> Moment | None:
    """Give the last event, before the label where one is named, that changed what is asked for."""
    names = names_in(miss.line.expression)
    counts = [miss.ledger.labels[name] for name in names if name in miss.ledger.labels]
    until = max(counts, default=len(miss.ledger.entries))
    vessels = names & run.case.procedure.vessels.keys()
    held = _held(miss.line.expression)
    component = run.asked(miss.ledger).component(held[0]) if held is not None else None
    last = None
    for moment in miss.ledger.moments:
        if moment.place >= until:
            break
        if not vessels and isinstance(event := moment.entry.happening.event, model.Operation):
            last = moment if event.verb == "titrate" else last
        for was, after in moment.vessels():
            if after.name in vessels and _changed(run, was, after, component):
                last = moment
    return last


def _changed(run: Run, was: Vessel, after: Vessel, component: str | None) -> bool:
    """Tell whether an event changed what a vessel holds of a component; of anything, without one."""
    if component is None:
        return (was.aqueous, was.organic, was.solid) != (after.aqueous, after.organic, after.solid)
    before, now = (amount_in(component, vessel, run.known) for vessel in (was, after))
    return abs(now - before) > _SAME * max(before, now)


#: Amounts that differ by less are the same [-].
_SAME = 1e-9


# ---------------------------------------------------------------- where it was decided


def _held(node: Expression) -> tuple[str, str, str] | None:
    """Give substance, vessel and label of a share that is expected."""
    label = ""
    if isinstance(node, Compare):
        node = node.left
    elif isinstance(node, Within):
        node = node.operand
    if isinstance(node, After):
        match node.state:
            case Call(Name("label"), (Name(text, _, _),), _) | Name(text, _, _):
                label = text
            case _:
                pass
        node = node.operand
    if isinstance(node, Held) and isinstance(node.substance, Name | Words):
        vessel = node.vessel
        return node.substance.text, vessel.text if isinstance(vessel, Name) else "", label
    return None


def _culprit(run: Run, miss: Missed) -> Finding | None:
    """Find the act that decided a share, and say what is wrong with it."""
    held = _held(miss.line.expression)
    if held is None:
        return None
    what, vessel, label = held
    component = run.asked(miss.ledger).component(what)
    if component is None:
        return None
    until = miss.ledger.labels.get(label, len(miss.ledger.entries))
    draws = [
        moment
        for moment in miss.ledger.moments
        if moment.place < until and _drawn_into(moment, vessel)
    ]
    weak = _too_weak(run, miss, draws, component)
    if weak is not None:
        return weak
    for moment in draws:
        found = _wrong_layer(run, moment, component, vessel)
        if found is not None:
            return found
    return None


def _drawn_into(moment: Moment, vessel: str) -> bool:
    return any(
        isinstance(result.outcome, Moved)
        and result.outcome.target == vessel
        and result.outcome.part in ("aqueous", "organic")
        for result in moment.entry.results
    )


def _wrong_layer(run: Run, moment: Moment, component: str, target: str) -> Finding | None:
    """Tell whether the other layer held more of what was wanted than the one that was drawn."""
    event = moment.entry.happening.event
    if not isinstance(event, model.Transfer | model.Aliquot):
        return None
    origin = moment.before.vessel(moment.entry.happening.name(event.origin.name.text))
    drawn = next(r.outcome.part for r in moment.entry.results if isinstance(r.outcome, Moved))
    found = layers(origin, run.known)
    if found is None:
        return None
    here = origin.aqueous.amounts.get(component, 0.0)
    there = origin.organic.amounts.get(component, 0.0)
    if drawn == "organic":
        here, there = there, here
    if there < _MOST * (here + there) or not here + there:
        return None
    other = "aqueous" if drawn == "organic" else "organic"
    place = "lower" if found.below == other else "upper"
    name = run.known.thing(component).name
    return Finding(
        code=codes.LAYER_OTHER,
        span=event.origin.span,
        message=f"this is the {drawn} layer: {share_words(there / (here + there))} of the {name} in"
        f" `{origin.name}` is in the {other} one, the {place}",
        help=f"write `{{{origin.name}.{other} -> {target}}}`",
    )


def _too_weak(run: Run, miss: Missed, draws: list[Moment], component: str) -> Finding | None:
    """Tell whether more or stronger acid or base would have moved it."""
    if not draws:
        return None
    reagents = _reagents(run, draws)
    for moment, material in reagents:
        after = [draw for draw in draws if draw.place > moment.place]
        if not after:
            continue
        washing = Washing(material, moment.entry.happening, after[0].entry.happening)
        mend = mended(run, miss.line, washing)
        if mend is None:
            continue
        thing = run.known.thing(component)
        portions = f" in {len(draws)} portions" if len(draws) > 1 else ""
        written = run.case.procedure.materials[material].written
        return Finding(
            code=codes.REAGENT_TOO_WEAK,
            span=moment.span,
            message=f"`{written}` moves {share_words(miss.reached.si)} of the {thing.name}"
            f"{portions}; {mend.words}",
            help=mend.help.replace("STEP", str(moment.entry.happening.step)),
        )
    return None


def _reagents(run: Run, draws: list[Moment]) -> list[tuple[Moment, str]]:
    """Give the charges of aqueous reagents to the vessels that were drawn from, first of each."""
    origins = {
        moment.entry.happening.name(event.origin.name.text)
        for moment in draws
        if isinstance(event := moment.entry.happening.event, model.Transfer | model.Aliquot)
    }
    found: dict[str, Moment] = {}
    for moment in run.ledger.moments:
        if moment.place > draws[-1].place:
            break
        event = moment.entry.happening.event
        if isinstance(event, model.Charge) and event.target.name.text in origins:
            for portion in event.portions:
                if _in_layer(run, portion.material, draws[0]):
                    found.setdefault(portion.material, moment)
    return [(moment, name) for name, moment in found.items()]


def _in_layer(run: Run, name: str, draw: Moment) -> bool:
    """Tell whether a material goes into the layer that is drawn."""
    material = run.case.procedure.materials.get(name)
    part = next((r.outcome.part for r in draw.entry.results if isinstance(r.outcome, Moved)), "")
    solvent: Substance | None = None
    if material is not None:
        match material.composition:
            case model.Solution(_, _, other) | model.Saturated(_, other):
                solvent = other
            case model.Pure(substance):
                solvent = substance
            case _:
                pass
    return solvent is not None and (solvent.key == WATER) == (part == "aqueous")
