"""Reagents that cannot do what an act asks of them, and acts that lack their test."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.catalogue.components import PROTON, WATER
from watchglass.judge.bench.run import Run, at, filled_by
from watchglass.resolve import model
from watchglass.run.bench.figures import ph_words
from watchglass.run.bench.ledger import Added, Moved, Taken

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.run.bench.ledger import Moment
    from watchglass.run.bench.state import Phase

_NO_AMOUNT = "no amount of it"


def adjusts_the_wrong_way(run: Run) -> Iterator[Finding]:
    """Report an adjustment that no amount of the reagent brings about."""
    seen: set[int] = set()
    for moment in run.ledger.moments:
        for result in moment.entry.results:
            added = result.outcome
            if (
                not isinstance(added, Added)
                or not added.why.startswith(_NO_AMOUNT)
                or moment.span.start in seen
                or added.wanted is None
            ):
                continue
            seen.add(moment.span.start)
            before = f", which is at {ph_words(added.before)}" if added.before is not None else ""
            up = added.before is not None and added.wanted > added.before
            yield Finding(
                code=codes.REAGENT_WRONG_WAY,
                span=moment.span,
                message=f"no amount of `{added.material}` brings `{result.vessel}`{before}, to pH"
                f" {added.wanted:g}",
                help=f"take {'a base' if up else 'an acid'}, or mend the pH",
            )


def no_test_after_adjusting(run: Run) -> Iterator[Finding]:
    """Report adjusted vessels whose pH is never tested afterwards."""
    waiting: dict[str, Moment] = {}
    tested: dict[str, int] = {}
    for moment in run.ledger.moments:
        event = moment.entry.happening.event
        if not isinstance(event, model.Operation) or event.object is None:
            continue
        name = moment.entry.happening.name(event.object.name.text)
        if event.verb == "adjust":
            waiting[name] = moment
        elif event.verb == "test" and event.subject == "ph":
            tested[name] = moment.place
    for name, moment in waiting.items():
        if tested.get(name, -1) < moment.place:
            yield Finding(
                code=codes.NO_PH_TEST,
                span=moment.span,
                message=f"the pH of `{name}` is adjusted and never tested",
                help=f"add `{{test {name} ph}}` after it",
            )


def water_into_acid(run: Run) -> Iterator[Finding]:
    """Report water or a dilute solution that is poured into a concentrated acid or base."""
    seen: set[int] = set()
    for moment in run.ledger.moments:
        event = moment.entry.happening.event
        if (
            not isinstance(event, model.Charge | model.Transfer | model.Aliquot)
            or moment.span.start in seen
        ):
            continue
        name = moment.entry.happening.name(event.target.name.text)
        vessel = moment.before.vessel(name)
        what = _concentrated(run, vessel.aqueous) or _concentrated(run, vessel.organic)
        if not what or not any(isinstance(r.outcome, Taken | Moved) for r in moment.entry.results):
            continue
        after = moment.entry.bench.vessel(name)
        brought = after.aqueous.plus(after.organic).amounts.get(WATER, 0.0) - (
            vessel.aqueous.plus(vessel.organic).amounts.get(WATER, 0.0)
        )
        if brought * 18.015e-3 < 0.2e-3:
            continue
        if isinstance(event, model.Charge):
            if event.portions and _concentrated_portion(run, event.portions[0]):
                continue
        elif _concentrated(
            run, moment.before.vessel(moment.entry.happening.name(event.origin.name.text)).aqueous
        ):
            continue
        seen.add(moment.span.start)
        yield Finding(
            code=codes.WATER_INTO_ACID,
            span=moment.span,
            message=f"water is poured into {what} in `{name}`",
            related=tuple(
                at(m, "it came in here") for m in filled_by(run.ledger, moment.place, name)[:1]
            ),
            help="put the water into the vessel first and add the acid or base to it, slowly",
        )


def _concentrated(run: Run, phase: Phase) -> str:
    """Name the concentrated acid or base that a liquid is; empty where it is none."""
    if not phase or phase.volume <= 0:
        return ""
    sulfuric = phase.amounts.get("sulfuric-acid", 0.0)
    excess = phase.amounts.get(PROTON, 0.0)
    mass = sum(
        amount * (run.known.thing(key).molar_mass or 0.0) for key, amount in phase.amounts.items()
    )
    if sulfuric and mass and sulfuric * 98.08e-3 >= 0.70 * mass:
        return "concentrated sulfuric acid"
    others = sum(
        amount
        for key, amount in phase.amounts.items()
        if run.known.thing(key).pkas and key != "sulfuric-acid"
    )
    if (excess - others) / phase.volume > run.limit("concentrated-acid"):
        return "concentrated acid"
    if (-excess - others) / phase.volume > run.limit("concentrated-base"):
        return "concentrated alkali"
    return ""


def _concentrated_portion(run: Run, portion: model.Portion) -> bool:
    material = run.case.procedure.materials.get(portion.material)
    if material is None or not isinstance(material.composition, model.Solution):
        return False
    quantity = material.composition.strength.quantity
    return quantity.si >= run.limit("concentrated-acid") or quantity.text.endswith("w/w")
