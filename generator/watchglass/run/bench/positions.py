"""Which layer lies where, at each place that draws one: for the words that are printed."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.resolve import model
from watchglass.run.bench.layers import Layers
from watchglass.run.bench.ledger import Moved

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

    from watchglass.read import syntax
    from watchglass.run.bench.ledger import Entry, Ledger


def layer_positions(ledger: Ledger) -> Mapping[int, tuple[str, str, bool]]:
    """Give, by offset of the place in its source, position, layer and whether a drop test is due.

    A place that draws different layers in different passes, or where no call can be made, is left
    out: nothing is printed of it but what the author wrote.
    """
    found: dict[int, tuple[str, str, bool] | None] = {}
    for entry in ledger.entries:
        place = _place(entry)
        if place is None or place.part is None:
            continue
        said = _said(entry)
        at = place.span.start
        if at in found and found[at] != said:
            said = None
        found[at] = said
    return {at: said for at, said in found.items() if said is not None}


def agreed_positions(ledgers: Iterable[Ledger]) -> Mapping[int, tuple[str, str, bool]]:
    """Give the positions in which several runs agree: what is printed must be true for each of them."""
    first, *others = (layer_positions(ledger) for ledger in ledgers)
    return {
        at: said for at, said in first.items() if all(other.get(at) == said for other in others)
    }


def _place(entry: Entry) -> syntax.Place | None:
    match entry.happening.event:
        case model.Transfer(origin, _, _, _) | model.Aliquot(_, origin, _, _, _):
            return origin
        case model.Operation("discard", place):
            return place
        case _:
            return None


def _said(entry: Entry) -> tuple[str, str, bool] | None:
    layers: Layers | None = None
    for result in entry.results:
        match result.outcome:
            case Layers() as found:
                layers = found
            case Moved(_, _, part) if layers is not None and layers.below and part:
                position = "lower" if part == layers.below else "upper"
                return position, part, layers.close
            case _:
                pass
    return None
