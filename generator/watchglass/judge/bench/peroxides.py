"""Ethers and other peroxide formers that are evaporated or distilled without a test."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding, Related
from watchglass.resolve import model
from watchglass.run.bench.ledger import Taken

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.spans import Span
    from watchglass.judge.bench.run import Run
    from watchglass.run.bench.state import Vessel

_CONCENTRATED = frozenset(("evaporate", "distil"))
#: Share of a liquid from which a component of it counts [-].
_MUCH = 0.10


def peroxide_former_concentrated(run: Run) -> Iterator[Finding]:
    """Report the first evaporation or distillation of each peroxide former that nobody tested.

    A test of the material, or of any vessel that holds it, serves. What a reaction has just made is
    fresh and needs none.
    """
    brought: dict[str, Span] = {}
    told: set[str] = set()
    for moment in run.ledger.moments:
        event = moment.entry.happening.event
        for result in moment.entry.results:
            if isinstance(result.outcome, Taken):
                brought.setdefault(result.outcome.material, moment.span)
        if not isinstance(event, model.Operation) or event.object is None:
            continue
        name = moment.entry.happening.name(event.object.name.text)
        if event.verb == "test" and event.subject == "peroxides":
            told |= _formers_of(run, name, moment.before.vessels.get(name))
        if event.verb not in _CONCENTRATED:
            continue
        vessel = moment.before.vessel(name)
        for key in sorted(_in_vessel(run, vessel) - told):
            charged = _charged_with(run, key, brought)
            if charged is None:
                continue
            told.add(key)
            yield _finding(run, key, moment.span, event.verb, charged)


def _finding(run: Run, key: str, span: Span, verb: str, charged: tuple[str, Span]) -> Finding:
    material, place = charged
    substance = run.known.thing(key).substance
    name = substance.name if substance is not None else key
    done = {"evaporate": "evaporated", "distil": "distilled"}[verb]
    return Finding(
        code=codes.PEROXIDE_FORMER_UNTESTED,
        span=span,
        message=f"{name} forms peroxides on standing, and is {done} here without a test for them",
        related=(Related(place, "it came in here"),),
        help=f"add `{{test {material} peroxides}}` before, with a strip or with acidified iodide; or"
        " take tert-butyl methyl ether or ethyl acetate in its place",
    )


def _formers_of(run: Run, name: str, vessel: Vessel | None) -> set[str]:
    """Give the peroxide formers that a test of a material or of a vessel speaks of."""
    if vessel is not None:
        return _in_vessel(run, vessel)
    return _in_material(run, name)


def _in_vessel(run: Run, vessel: Vessel) -> set[str]:
    whole = vessel.organic.volume
    found = set()
    for key, amount in vessel.organic.amounts.items():
        volume = run.known.thing(key).volume
        if volume and amount * volume >= _MUCH * whole and _forms(run, key):
            found.add(key)
    return found


def _in_material(run: Run, name: str) -> set[str]:
    from watchglass.judge.at_hand import held_by  # noqa: PLC0415 - only where one is concentrated

    material = run.case.procedure.materials.get(name)
    return {s.key for s in held_by(material) if _forms(run, s.key)} if material else set()


def _forms(run: Run, key: str) -> bool:
    from watchglass.catalogue.peroxides import PEROXIDE_FORMERS  # noqa: PLC0415 - as above

    substance = run.known.thing(key).substance
    return substance is not None and substance.cas in PEROXIDE_FORMERS


def _charged_with(run: Run, key: str, brought: dict[str, Span]) -> tuple[str, Span] | None:
    """Give the material that brought a substance, and where; None for what was made here."""
    for name, span in brought.items():
        if key in _in_material(run, name):
            return name, span
    return None
