"""What is drawn from a vessel that does not hold it; layers that do not exist or are named wrongly."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.judge.bench.run import Moment, Run, moments
from watchglass.resolve import model
from watchglass.run.bench.figures import volume_words
from watchglass.run.bench.layers import layers
from watchglass.run.bench.ledger import Moved

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.read import syntax
    from watchglass.run.bench.state import Vessel

_LAYERED = ("aqueous", "organic", "upper", "lower")


def drawn_from_nothing(run: Run) -> Iterator[Finding]:
    """Report transfers out of what is empty, and aliquots larger than what is there."""
    seen: set[int] = set()
    for moment in moments(run.ledger):
        for result in moment.entry.results:
            moved = result.outcome
            if not isinstance(moved, Moved) or moment.span.start in seen:
                continue
            vessel = moment.before.vessel(moved.origin)
            if moved.nothing and not moved.part and not vessel.unknown:
                seen.add(moment.span.start)
                yield Finding(
                    code=codes.VESSEL_EMPTY,
                    span=moment.span,
                    message=f"`{moved.origin}` is empty here: nothing comes out of it",
                    related=(),
                    help="see in which vessel it is, or what was to be charged before",
                )
            elif moved.short > 1e-9 and moved.volume:
                seen.add(moment.span.start)
                yield Finding(
                    code=codes.MORE_THAN_THERE,
                    span=moment.span,
                    message=f"{volume_words(moved.volume + moved.short)} is taken from"
                    f" `{moved.origin}`, which holds {volume_words(moved.volume)}",
                    help="take less, or charge more before",
                )


#: Verbs that make no sense with an empty vessel.
_NEED_CONTENTS = frozenset(
    (
        "adjust",
        "titrate",
        "filter",
        "decant",
        "evaporate",
        "distil",
        "settle",
        "shake",
        "test",
        "collect",
    )
)


def done_with_nothing(run: Run) -> Iterator[Finding]:
    """Report acts on vessels into which nothing has come."""
    seen: set[str] = set()
    for moment in moments(run.ledger):
        event = moment.entry.happening.event
        if (
            not isinstance(event, model.Operation)
            or event.verb not in _NEED_CONTENTS
            or event.object is None
            or event.portions
        ):
            continue
        name = moment.entry.happening.name(event.object.name.text)
        vessel = moment.before.vessels.get(name)
        if vessel is None or not vessel.empty or name in seen or _delivers(run, name):
            continue
        seen.add(name)
        yield Finding(
            code=codes.VESSEL_EMPTY,
            span=moment.span,
            message=f"`{name}` is empty here",
            help="see in which vessel it is, or what was to be charged before",
        )


def _delivers(run: Run, name: str) -> bool:
    vessel = run.case.procedure.vessels.get(name)
    return (
        vessel is not None and vessel.type is not None and vessel.type.type.measures == "delivers"
    )


def no_such_layer(run: Run) -> Iterator[Finding]:
    """Report a layer that is named where there is one liquid only, or two that cannot be told apart."""
    seen: set[int] = set()
    for moment in moments(run.ledger):
        place = _place(moment)
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


def _place(moment: Moment) -> syntax.Place | None:
    match moment.entry.happening.event:
        case model.Transfer(origin, _, _, _) | model.Aliquot(_, origin, _, _, _):
            return origin
        case model.Operation("discard", place):
            return place
        case _:
            return None


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
