"""A base (or acid) that takes a second acid (or base) along with the one it is meant for."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.judge.bench.run import Run, at, filled_by
from watchglass.resolve import model
from watchglass.run.bench.figures import share_words
from watchglass.run.bench.ledger import Moved

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.run.bench.knowledge import Thing
    from watchglass.run.bench.ledger import Moment
    from watchglass.run.bench.state import Vessel

#: Difference of pKa from which a milder reagent tells two acids apart.
_APART = 3.0
#: Amount that is worth a finding, mol.
_WORTH = 1e-6


def goes_along(run: Run) -> Iterator[Finding]:
    """Report aqueous layers drawn from an extraction that carry two acids, or two bases.

    Only where both came in with one material (the mixture that is to be parted), so that a wash
    meant to take everything acidic out of a product is left alone.
    """
    seen: set[int] = set()
    mixtures = _mixtures(run)
    for moment in run.ledger.moments:
        event = moment.entry.happening.event
        if not isinstance(event, model.Transfer) or moment.span.start in seen:
            continue
        if not any(
            isinstance(r.outcome, Moved) and r.outcome.part == "aqueous"
            for r in moment.entry.results
        ):
            continue
        vessel = moment.before.vessel(moment.entry.happening.name(event.origin.name.text))
        if not vessel.organic or vessel.ph is None:
            continue
        taken = _taken(run, vessel)
        for keys in mixtures:
            both = [thing for thing in taken if thing.key in keys]
            pair = _pair(both)
            if pair is not None:
                seen.add(moment.span.start)
                yield _finding(run, moment, vessel, *pair)
                break


def _mixtures(run: Run) -> list[frozenset[str]]:
    return [
        frozenset(part.substance.key for part in material.composition.parts)
        for material in run.case.procedure.materials.values()
        if isinstance(material.composition, model.Mixture)
    ]


def _taken(run: Run, vessel: Vessel) -> list[Thing]:
    """Give what is ionised in the aqueous layer, most of what the vessel holds of it."""
    found = []
    for key, amount in vessel.aqueous.amounts.items():
        thing = run.known.thing(key)
        whole = amount + vessel.organic.amounts.get(key, 0.0)
        most = amount > max(run.limit("goes-along") * whole, _WORTH)
        if thing.pkas and key not in vessel.doubt and most:
            found.append(thing)
    return found


def _pair(things: list[Thing]) -> tuple[Thing, Thing] | None:
    """Give two acids, or two bases, whose pKa are apart: the stronger first."""
    for kind in (0, 1):
        alike = sorted((t for t in things if (t.top > 0) == bool(kind)), key=lambda t: t.pkas[0])
        if len(alike) > 1 and alike[-1].pkas[0] - alike[0].pkas[0] >= _APART:
            return (alike[0], alike[-1]) if not kind else (alike[-1], alike[0])
    return None


def _finding(run: Run, moment: Moment, vessel: Vessel, first: Thing, second: Thing) -> Finding:
    amount = vessel.aqueous.amounts[second.key]
    whole = amount + vessel.organic.amounts.get(second.key, 0.0)
    acid = second.top == 0
    charges = filled_by(run.ledger, moment.place, vessel.name)
    middle = (first.pkas[0] + second.pkas[0]) / 2
    return Finding(
        code=codes.GOES_ALONG,
        span=moment.span,
        message=f"{share_words(amount / whole)} of the {second.name} (pKa {second.pkas[0]:g}) leaves"
        f" with the {first.name} (pKa {first.pkas[0]:g})",
        related=tuple(at(m, "what takes it came in here") for m in charges[-1:]),
        help=(
            f"take a milder base, with a layer near pH {middle + 1:.0f}, such as sodium hydrogencarbonate"
            if acid
            else f"take a milder acid, with a layer near pH {middle:.0f}"
        ),
    )
