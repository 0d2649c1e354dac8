"""What is drawn from a vessel that does not hold it; layers that do not exist or are named wrongly."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.judge.bench.run import drawn_from
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.run.bench.figures import volume_words
from watchglass.run.bench.layers import layers
from watchglass.run.bench.ledger import Moved

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.bench.run import Run
    from watchglass.run.bench.ledger import Moment
    from watchglass.run.bench.state import Vessel

#: Less than is missing by rounding, m3 (1 µL).
_LEAST_SHORT = 1e-9
_LAYERED = ("aqueous", "organic", "upper", "lower")


#: Verbs that make no sense with an empty vessel.
_NEED_CONTENTS = frozenset(
    (
        *("adjust", "titrate", "filter", "decant", "evaporate", "distil"),
        *("settle", "shake", "test", "collect"),
    )
)


def drawn_from_nothing(run: Run) -> Iterator[Finding]:
    """Report what is done with an empty vessel, and more drawn from one than it holds.

    Each vessel is reported once, and not where its emptiness follows from what was reported
    before: what would have come from there, or a titre that took more than the burette had.
    """
    told: set[str] = set()
    for moment in run.ledger.moments:
        told |= _overdrawn(moment)
        moves = [r.outcome for r in moment.entry.results if isinstance(r.outcome, Moved)]
        for moved in moves:
            finding = _drawn(moment, moved)
            if finding is None:
                continue
            if moved.origin not in told:
                yield finding
            told |= {moved.origin, moved.target}
        told |= _receiver(moment)
        name = _needing(run, moment)
        if name and not moves and name not in told:
            told.add(name)
            yield Finding(
                code=codes.VESSEL_EMPTY,
                span=moment.span,
                message=f"`{name}` is empty here",
                help="see in which vessel it is, or what was to be charged before",
            )


def _drawn(moment: Moment, moved: Moved) -> Finding | None:
    if moved.nothing and not moved.part and not moment.before.vessel(moved.origin).unknown:
        return Finding(
            code=codes.VESSEL_EMPTY,
            span=moment.span,
            message=f"`{moved.origin}` is empty here: nothing comes out of it",
            help="see in which vessel it is, or what was to be charged before",
        )
    if moved.short > _LEAST_SHORT and moved.volume:
        return Finding(
            code=codes.MORE_THAN_THERE,
            span=moment.span,
            message=f"{volume_words(moved.volume + moved.short)} is taken from"
            f" `{moved.origin}`, which holds {volume_words(moved.volume)}",
            help="take less, or charge more before",
        )
    return None


def _receiver(moment: Moment) -> set[str]:
    """Give the flask a distillation goes into.

    The bench knows no overlap: where it gives nothing, as between two fractions, something comes.
    """
    event = moment.entry.happening.event
    if not isinstance(event, model.Operation) or event.verb != "distil":
        return set()
    return {
        moment.entry.happening.name(clause.value.name.text)
        for clause in event.clauses
        if clause.word == "into" and isinstance(clause.value, syntax.Place)
    }


def _needing(run: Run, moment: Moment) -> str:
    """Give the empty vessel with which an act makes no sense, or nothing."""
    event = moment.entry.happening.event
    if (
        not isinstance(event, model.Operation)
        or event.verb not in _NEED_CONTENTS
        or event.object is None
        or event.portions
    ):
        return ""
    name = moment.entry.happening.name(event.object.name.text)
    vessel = moment.before.vessels.get(name)
    return name if vessel is not None and vessel.empty and not _delivers(run, name) else ""


def _overdrawn(moment: Moment) -> set[str]:
    """Give the burette that a titre took more from than it held."""
    event = moment.entry.happening.event
    if not isinstance(event, model.Operation) or event.verb != "titrate":
        return set()
    return {
        name
        for clause in event.clauses
        if clause.word == "from" and isinstance(clause.value, syntax.Place)
        for name in (moment.entry.happening.name(clause.value.name.text),)
        if moment.entry.bench.vessel(name).empty
    }


def _delivers(run: Run, name: str) -> bool:
    vessel = run.case.procedure.vessels.get(name)
    return (
        vessel is not None and vessel.type is not None and vessel.type.type.measures == "delivers"
    )


def no_such_layer(run: Run) -> Iterator[Finding]:
    """Report a layer that is named where there is one liquid only, or two that cannot be told apart."""
    seen: set[int] = set()
    for moment in run.ledger.moments:
        place = drawn_from(moment)
        if place is None or place.part not in _LAYERED or moment.span.start in seen:
            continue
        vessel = moment.before.vessel(moment.entry.happening.name(place.name.text))
        if vessel.unknown or vessel.empty:
            continue
        found = layers(vessel, run.known)
        if found is None and not _only(vessel, place.part):
            seen.add(moment.span.start)
            yield _one_liquid(run, vessel, place)
        elif found is not None and not found.below and place.part in ("upper", "lower"):
            seen.add(moment.span.start)
            yield Finding(
                code=codes.LAYERS_TOO_CLOSE,
                span=place.span,
                message=f"which layer of `{vessel.name}` lies below cannot be told: their densities"
                " are within 0.02 g/mL, or one is not known",
                help=f"name the layer, as in `{vessel.name}.aqueous`, and say how it is told: a drop"
                " of water falls into it",
            )


def _only(vessel: Vessel, part: str) -> bool:
    """Tell whether the one liquid there is may be called so."""
    if part in ("upper", "lower"):
        return part == vessel.remains
    return bool(vessel.organic if part == "organic" else vessel.aqueous)


def _one_liquid(run: Run, vessel: Vessel, place: syntax.Place) -> Finding:
    mixing = [
        key
        for key in (*vessel.aqueous.amounts, *vessel.organic.amounts)
        if (thing := run.known.thing(key)).liquid and thing.miscible and key != "water"
    ]
    names = ", ".join(run.known.thing(key).name for key in mixing)
    why = f": {names} and water mix" if names else ""
    return Finding(
        code=codes.LAYER_ABSENT,
        span=place.span,
        message=f"there is no {place.part} layer in `{vessel.name}`, which holds one liquid{why}",
        help="take a solvent that does not mix with water, or draw off the whole liquid"
        if names
        else "name the vessel alone, or see what was to be charged before",
    )
