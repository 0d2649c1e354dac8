"""What expressions ask of the bench: shares, masses, pH, titres, at a moment of the ledger.

An answer that needs a figure which is not known is `NotKnown`, with why in words.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.resolve.reactions import substances_of

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.resolve import model
    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.ledger import Ledger
    from watchglass.run.bench.state import Bench, Vessel

#: Figures of what the model gives: shares and recovered masses, titres; a pH has two places.
SHARE_FIGURES, TITRE_FIGURES = 3, 4


class Answer(NamedTuple):
    """A value in SI units, or why there is none."""

    value: float | None
    why: str = ""


class Asked(NamedTuple):
    """Answers questions about one ledger.

    Attributes:
        procedure: What was run.
        ledger: What happened.
        known: What is known of the components.
    """

    procedure: model.Procedure
    ledger: Ledger
    known: Knowledge

    def moment(self, step: int) -> Bench:
        """Give the bench after the last event of a step's latest pass; its end for step 0."""
        if step:
            for entry in reversed(self.ledger.entries):
                if entry.happening.step == step and not entry.branch:
                    return entry.bench
            for entry in reversed(self.ledger.entries):
                if entry.happening.step == step:
                    return entry.bench  # the step stands in a branch as a whole
        return self.ledger.end

    def share(self, what: str, vessel: str, bench: Bench) -> Answer:
        """Give what a vessel holds of a substance, as a share of all that was brought or could form."""
        component = self.component(what)
        if component is None:
            return Answer(None, f"`{what}` is not one substance")
        held = self._held(component, bench.vessel(vessel))
        if held.value is None:
            return held
        salt = self._formed_salt(what)
        if salt is not None:
            there = bench.vessel(vessel).solid.get(salt, 0.0)
            return Answer(there / self.ledger.formed[salt])
        whole = self.ledger.charged.get(component, 0.0) + self.ledger.formed.get(component, 0.0)
        if whole <= 0:
            return Answer(None, f"no {self.known.thing(component).name} was brought or formed")
        return Answer(held.value / whole)

    def recovered(self, what: str, vessel: str, bench: Bench) -> Answer:
        """Give the mass of a substance in a vessel, counted as its neutral form, kg."""
        component = self.component(what)
        if component is None:
            return Answer(None, f"`{what}` is not one substance")
        held = self._held(component, bench.vessel(vessel))
        salt = self._formed_salt(what)
        if salt is not None and held.value is not None:
            held = Answer(bench.vessel(vessel).solid.get(salt, 0.0))
        molar_mass = self.known.thing(salt or component).molar_mass
        if held.value is None or molar_mass is None:
            return held if held.value is None else Answer(None, "its formula is not known")
        return Answer(held.value * molar_mass)

    def ph(self, vessel: str, bench: Bench) -> Answer:
        """Give the pH of the aqueous layer of a vessel."""
        from watchglass.run.bench.mixing import mix  # noqa: PLC0415 - only what was not mixed

        there = bench.vessel(vessel)
        if there.ph is not None:
            return Answer(there.ph)
        if there.empty:
            return Answer(None, f"{vessel} is empty")
        if not there.aqueous and not there.mixed:
            there, _ = mix(there, self.known)
        if not there.aqueous:
            return Answer(None, f"{vessel} holds no aqueous liquid")
        after, mixed = mix(there, self.known)
        return Answer(after.ph, "; ".join(mixed.why))

    def titre(self, label: str) -> Answer:
        """Give the volume of the titration that a label names, m3: the last one before its end."""
        count = self.ledger.labels.get(label)
        if count is None:
            return Answer(None, f"`{label}` is never reached")
        found = [volume for at, _, volume in self.ledger.titres if at < count]
        if not found:
            return Answer(None, f"nothing is titrated before `{label}`")
        if found[-1] is None:
            return Answer(None, self._why_no_titre(count))
        return Answer(found[-1])

    def _why_no_titre(self, count: int) -> str:
        for entry in reversed(self.ledger.entries[:count]):
            for result in entry.results:
                why = getattr(result.outcome, "why", "")
                if why and isinstance(why, str):
                    return why
        return "the titre cannot be told"

    def _held(self, component: str, vessel: Vessel) -> Answer:
        name = self.known.thing(component).name
        if vessel.unknown:
            return Answer(None, f"what {', '.join(sorted(vessel.unknown))} brings is not known")
        if component in vessel.doubt:
            return Answer(None, f"where the {name} went cannot be told: a constant is missing")
        return Answer(amount_in(component, vessel, self.known))

    def _formed_salt(self, what: str) -> str | None:
        """Give the key of a salt that a reaction forms: it is counted as the solid, not by its ions."""
        substance = self.known.catalogue.find(what)
        if substance is None or self.ledger.formed.get(substance.key, 0.0) <= 0:
            return None
        return None if substance.key in self.known.parts(substance.key) else substance.key

    def component(self, what: str) -> str | None:
        """Give the one component, no ion and no water, that a substance or material stands for."""
        material = self.procedure.materials.get(what)
        if material is not None:
            keys = [key for s in substances_of(material) for key in self.known.parts(s.key)]
        else:
            substance = self.known.catalogue.find(what)
            if substance is None:
                return None
            keys = list(self.known.parts(substance.key))
        own = [k for k in dict.fromkeys(keys) if not self.known.thing(k).ion and k != "water"]
        if len(own) != 1:
            own = [k for k in dict.fromkeys(keys) if k != "H^+" and self.known.thing(k).charge > 0]
        return own[0] if len(own) == 1 else None


def amount_in(component: str, vessel: Vessel, known: Knowledge) -> float:
    """Give the moles of a component in all phases of a vessel, solids taken apart."""
    total = vessel.aqueous.amounts.get(component, 0.0) + vessel.organic.amounts.get(component, 0.0)
    for key, amount in vessel.solid.items():
        parts: Mapping[str, int] = known.parts(key)
        total += amount * parts.get(component, 0)
    return total


UNITS_OF = {"share": dim.SHARE, "recovered": dim.MASS, "ph": dim.NUMBER, "titre": dim.VOLUME}
