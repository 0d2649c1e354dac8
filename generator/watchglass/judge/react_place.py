"""A reaction that is run in a vessel where one of its reactants never comes.

What a vessel may hold is told from above: all that was ever charged into it or moved from a vessel
that held it, ions and neutral parents taken apart, and what declared reactions make of that. Only
what cannot be there even so is reported.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding, Related
from watchglass.catalogue.components import PROTON, WATER
from watchglass.judge.at_hand import held_by, needed_for
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.resolve.reactions import substances_of

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.judge.case import Case
    from watchglass.run.passes import Happening

#: What the air and any aqueous reagent bring.
_EVERYWHERE = frozenset((WATER, PROTON, "carbon-dioxide", "oxygen", "nitrogen"))
#: Clauses that name a place where contents may go.
_GOES = frozenset(("into", "on", "through", "from", "in"))


@dataclass(slots=True)
class _Vessels:
    """What each vessel may hold, by component; `unknown` may hold anything."""

    case: Case
    held: dict[str, set[str]] = field(default_factory=dict)
    unknown: set[str] = field(default_factory=set)

    def charge(self, vessel: str, material: model.Material) -> None:
        if not substances_of(material) or isinstance(material.composition, model.Secret):
            self.unknown.add(vessel)
        self.held.setdefault(vessel, set()).update(_brought(self.case, material))

    def move(self, origin: str, target: str) -> None:
        self.held.setdefault(target, set()).update(self.held.get(origin, ()))
        if origin in self.unknown:
            self.unknown.add(target)


def reactant_not_in_vessel(case: Case) -> Iterator[Finding]:
    """Report `react` acts in vessels that a reactant never reaches."""
    reported: set[int] = set()
    vessels = _Vessels(case)
    if case.faulty or case.course.cut is not None or not any(map(_reacts, case.course.happenings)):
        return
    for happening in case.course.happenings:
        _happens(case, happening, vessels)
        event = happening.event
        if not isinstance(event, model.Operation) or not _reacts(happening):
            continue
        reaction = case.procedure.reactions.get(event.reaction)
        name = _vessel_of(event)
        if reaction is None or not reaction.balanced or not name or event.span.start in reported:
            continue
        vessel = happening.name(name)
        missing = _missing(case, vessels, vessel, reaction)
        if missing is None:
            continue
        reported.add(event.span.start)
        yield Finding(
            code=codes.REACTANT_NOT_IN_VESSEL,
            span=event.span,
            message=f"`{reaction.name}` runs in `{vessel}`, and `{missing.written}` never comes into it",
            related=(
                Related(missing.span, "it reacts here"),
                *_elsewhere(case, vessels, missing, vessel),
            ),
            help=f"charge it into `{vessel}` before, or name the vessel that holds it",
        )


def _reacts(happening: Happening) -> bool:
    event = happening.event
    return isinstance(event, model.Operation) and event.verb == "react"


def _vessel_of(event: model.Operation) -> str:
    for clause in event.clauses:
        if clause.word == "in" and isinstance(clause.value, syntax.Place):
            return clause.value.name.text
    return ""


def _happens(case: Case, happening: Happening, vessels: _Vessels) -> None:
    event = happening.event
    match event:
        case model.Charge():
            target = happening.name(event.target.name.text)
            _charged(case, happening, event.portions, (target,), vessels)
            for place in _places(happening, event.clauses):
                vessels.move(target, place)
        case model.Transfer() | model.Aliquot():
            origin, target = (happening.name(p.name.text) for p in (event.origin, event.target))
            vessels.move(origin, target)
        case model.Operation():
            objects = [happening.name(event.object.name.text)] if event.object is not None else []
            places = [*objects, *_places(happening, event.clauses)]
            _charged(case, happening, event.portions, places, vessels)
            reagent = case.procedure.materials.get(happening.name(event.reagent))
            for place in places:
                if reagent is not None:
                    vessels.charge(place, reagent)
            for origin in places:
                for target in places:
                    vessels.move(origin, target)
        case _:
            pass


def _charged(
    case: Case,
    happening: Happening,
    portions: Iterable[model.Portion],
    places: Iterable[str],
    vessels: _Vessels,
) -> None:
    for portion in portions:
        material = case.procedure.materials.get(happening.name(portion.material))
        for place in places:
            if material is not None:  # an aid (ice, boiling stones) brings nothing that reacts
                vessels.charge(place, material)


def _places(happening: Happening, clauses: Iterable[syntax.Clause]) -> Iterator[str]:
    for clause in clauses:
        if clause.word in _GOES and isinstance(clause.value, syntax.Place):
            yield happening.name(clause.value.name.text)


def _brought(case: Case, material: model.Material) -> set[str]:
    """Give the components that a material brings, its solvent's with them."""
    return {c for s in held_by(material) for c in (s.key, *case.catalogue.components(s.key))}


def _missing(
    case: Case, vessels: _Vessels, vessel: str, reaction: model.Reaction
) -> model.Species | None:
    """Give the first reactant that cannot be in a vessel; None where none is certainly missing.

    An empty vessel is a finding of the bench.
    """
    if vessel in vessels.unknown or not vessels.held.get(vessel):
        return None
    there = set(vessels.held.get(vessel, ())) | _EVERYWHERE
    others = [r for r in case.procedure.reactions.values() if r.name != reaction.name]
    grown = True
    while grown:
        grown = False
        for other in others:
            if all(_there(case, s, there) for s in other.left):
                made = {c for s in other.right for c in needed_for(case, s) or ()}
                grown = grown or not made <= there
                there |= made
    return next((s for s in reaction.left if not _there(case, s, there)), None)


def _there(case: Case, species: model.Species, there: set[str]) -> bool:
    needed = needed_for(case, species)
    return needed is None or needed <= there


def _elsewhere(
    case: Case, vessels: _Vessels, species: model.Species, vessel: str
) -> Iterator[Related]:
    """Point to the charge that brings a reactant into another vessel."""
    for happening in case.course.happenings:
        event = happening.event
        if not isinstance(event, model.Charge):
            continue
        target = happening.name(event.target.name.text)
        if target == vessel or not _there(case, species, vessels.held.get(target, set())):
            continue
        for portion in event.portions:
            material = case.procedure.materials.get(happening.name(portion.material))
            if material is not None and _there(case, species, _brought(case, material)):
                yield Related(portion.span, f"it goes into `{target}` here")
                return
