"""What makes a separatory funnel hard to use: a solid at the tap, and an emulsion."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.figures import shown
from watchglass.base.findings import Finding
from watchglass.judge.bench.run import drawn_from
from watchglass.resolve import model
from watchglass.run.bench.figures import share_words

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.bench.run import Run
    from watchglass.run.bench.knowledge import Thing
    from watchglass.run.bench.state import Vessel

_FUNNEL = "separatory-funnel"
#: Carbon atoms and log P from which an ionised acid is taken for a soap. Judgement: laurate is one,
#: octanoate hardly.
_SOAP_CARBONS, _SOAP_RATIO = 10, 1e4
_CHAIN = "C" * _SOAP_CARBONS
#: Concentration of a soap from which layers part slowly, mol/m3. Judgement: about the critical
#: micelle concentration of laurate and dodecyl sulfate (8–25 mM, from memory), a tenth of it.
_SOAPY = 1.0


def solid_in_funnel(run: Run) -> Iterator[Finding]:
    """Report a layer that is drawn from a separatory funnel while a solid stands in it."""
    seen: set[str] = set()
    for moment in run.ledger.moments:
        place = drawn_from(moment)
        name = moment.entry.happening.name(place.name.text) if place is not None else ""
        if place is None or not place.part or name in seen or not _is_funnel(run, name):
            continue
        vessel = moment.before.vessel(name)
        there = _solids(run, vessel)
        if not there:
            continue
        seen.add(name)
        key, mass = there[0]
        whole = vessel.solid[key] / run.ledger.charged.get(key, float("inf"))
        share = f", {share_words(whole)} of what was charged," if 0 < whole <= 1 else ""
        yield Finding(
            code=codes.SOLID_IN_FUNNEL,
            span=moment.span,
            message=f"{shown(mass * 1e3, 2)} g of {run.known.thing(key).name}{share} stands as a solid"
            f" in `{name}` when this layer is drawn",
            help="take more solvent, or filter before it goes into the funnel: a solid blocks the tap"
            " and hides the boundary",
        )


def _solids(run: Run, vessel: Vessel) -> list[tuple[str, float]]:
    """Give the solids worth a word, key and mass in kg, the most first."""
    masses = [
        (key, amount * molar_mass)
        for key, amount in vessel.solid.items()
        if (molar_mass := run.known.thing(key).molar_mass) is not None
    ]
    return sorted(
        ((key, mass) for key, mass in masses if mass > run.limit("solid-in-funnel")),
        key=lambda held: -held[1],
    )


def emulsion_to_expect(run: Run) -> Iterator[Finding]:
    """Report two layers that are shaken with a soap between them."""
    seen: set[str] = set()
    for moment in run.ledger.moments:
        event = moment.entry.happening.event
        if not isinstance(event, model.Operation) or event.verb != "shake" or event.object is None:
            continue
        name = moment.entry.happening.name(event.object.name.text)
        vessel = moment.entry.bench.vessel(name)
        if name in seen or not (vessel.aqueous and vessel.organic) or vessel.unknown:
            continue
        for key, amount in vessel.aqueous.amounts.items():
            thing = run.known.thing(key)
            if amount > _SOAPY * vessel.aqueous.volume and _soap(thing, vessel.ph):
                seen.add(name)
                yield Finding(
                    code=codes.EMULSION_TO_EXPECT,
                    span=moment.span,
                    message=f"{thing.name} is a soap at this pH: shaken, the layers of `{name}` hardly"
                    " part",
                    help=f"write `swirl {name}` in place of `shake`, or add brine before",
                )
                break


def _soap(thing: Thing, ph: float | None) -> bool:
    if thing.atoms.get("C", 0) < _SOAP_CARBONS or "N" in thing.atoms:
        return False
    if thing.ion:
        return thing.charge < 0
    if thing.substance is not None and "[O-]" in thing.substance.smiles:
        return _CHAIN in thing.substance.smiles  # a salt that is not taken apart
    acid = thing.top == 0 and bool(thing.pkas)
    aromatic = thing.substance is not None and "c" in thing.substance.smiles
    if not acid or aromatic or ph is None or (thing.ratio or 0.0) < _SOAP_RATIO:
        return False
    return ph > thing.pkas[0] + 1


def _is_funnel(run: Run, name: str) -> bool:
    vessel = run.case.procedure.vessels.get(name)
    return vessel is not None and vessel.type is not None and vessel.type.type.key == _FUNNEL
