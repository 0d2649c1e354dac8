"""From what happens to the graph: each act that moves something, as moves at the desk.

An act that is repeated is drawn once and counted; a pass with clean vessels is not drawn again.
Acts of branches (`:::if`) that are dropped are left out.
"""

from __future__ import annotations

from collections import Counter
from typing import TYPE_CHECKING

from watchglass.publish.flow.desk import DISTILLATE, WASH, Desk, Holder
from watchglass.publish.flow.wording import (
    act_words,
    heat_words,
    part_words,
    place_name,
    plain,
    rest_words,
    sentence_case,
)
from watchglass.publish.names import material_words
from watchglass.publish.text import NBSP, quantity_words
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.run.bench.figures import volume_words
from watchglass.run.bench.ledger import Added

if TYPE_CHECKING:
    from collections.abc import Callable, Iterable

    from watchglass.base.quantities import Quantity
    from watchglass.publish.flow.desk import Draft
    from watchglass.resolve.model import Procedure
    from watchglass.run.bench.ledger import Entry
    from watchglass.run.passes import Happening

_Key = tuple[int, tuple[tuple[str, str], ...]]
#: Waste streams that have words of their own.
_STREAMS = {"drain": "Drain", "ordinary-bin": "Ordinary bin"}


class Tracer:
    """Goes through what happens.

    Attributes:
        desk: The graph in the making.
        volumes: Whether computed volumes may be shown.
    """

    def __init__(self, procedure: Procedure, *, volumes: bool) -> None:
        self.procedure = procedure
        self.volumes = volumes
        self.desk = Desk(procedure)
        self.runs_into: dict[str, str] = {}
        self._driers: set[str] = set()
        self._delivered: set[tuple[str, str]] = set()
        self._happening: Happening
        self._entry: Entry

    def trace(self, entries: Iterable[Entry]) -> None:
        """Draw all that happens."""
        kept = [(at, entry) for at, entry in enumerate(entries) if not entry.branch]
        times = Counter(_key(entry.happening) for _, entry in kept if not entry.happening.fresh)
        seen: dict[_Key, list[Draft]] = {}
        for at, entry in kept:
            key = _key(entry.happening)
            drafts = seen.get(key)
            if drafts is not None:
                for draft in drafts:
                    draft.entries.append(at)
                continue
            desk = self.desk
            before = len(desk.drafts)
            desk.step, desk.times, desk.entry = entry.happening.step, times[key] or 1, at
            self._happening, self._entry = entry.happening, entry
            self._event(entry.happening.event)
            seen[key] = [d for d in desk.drafts[before:] if d.entries and not d.held]

    # ------------------------------------------------------------------ helpers

    def _name(self, place: syntax.Place) -> str:
        return self._happening.name(place.name.text)

    def _clause(self, event: model.Operation | model.Transfer, *words: str) -> str | None:
        """Give the name in the first of some clauses that names a place."""
        for clause in event.clauses:
            if clause.word in words and isinstance(clause.value, syntax.Place):
                return self._name(clause.value)
        return None

    def _bring(
        self,
        portions: Iterable[model.Portion],
        target: str,
        *,
        more: str = "",
        washing: bool = False,
    ) -> None:
        for portion in portions:
            name = self._happening.name(portion.material)
            if name in self.procedure.materials:
                self.desk.charge(target, portion, name, more=more, washing=washing)

    def _let_go(self, node: int | None, stream: str) -> None:
        words = _STREAMS.get(stream) or sentence_case(f"{stream} waste")
        self.desk.waste(node, words, stream)

    # ------------------------------------------------------------------ events

    def _event(self, event: model.Event) -> None:
        match event:
            case model.Charge(_, target, _, _, _):
                self._charge(event, self._name(target))
            case model.Transfer(origin, target, _, _):
                self._transfer(event, origin, self._name(target))
            case model.Aliquot(quantity, origin, target, _, _) if self._delivers(origin):
                self._deliver(self._name(origin), self._name(target), quantity)
            case model.Aliquot(quantity, origin, target, _, _):
                name = self._name(origin)
                words = f"{plain(quantity_words(quantity))} of it"
                part = part_words(origin, self.procedure) if origin.part else (words, "")
                lines = (words,) if origin.part else ()
                to = self._name(target)
                self.desk.arrive(to, self.desk.part(name, *part, to, lines))
            case model.Operation(verb, place):
                act = _ACTS.get(verb)
                if act is not None and place is not None:
                    act(self, event, self._name(place))
            case _:
                pass

    def _delivers(self, origin: syntax.Place) -> bool:
        """Tell whether portions come out of a burette or its like."""
        vessel = self.procedure.vessels.get(self._name(origin))
        type_ = vessel.type if vessel is not None else None
        return type_ is not None and type_.type.measures == "delivers"

    def _deliver(self, name: str, target: str, quantity: Quantity) -> None:
        """Let a portion run in from a burette: told beside the vessel, with one arrow in all."""
        holder = self.desk.holders.get(name)
        if holder is None:
            return
        words = f"{plain(quantity_words(quantity))} from {place_name(name, self.procedure)}"
        self.desk.say(target, words)
        holder.drawn = True
        if (name, target) not in self._delivered:
            self._delivered.add((name, target))
            self.desk.lead(holder.node, self.desk.opened(target))

    def _charge(self, event: model.Charge, target: str) -> None:
        below = self.runs_into.get(target)
        heat = heat_words(event)
        more = f" at {heat}" if heat else ""
        if below is None or target not in self.desk.holders:
            self._bring(event.portions, target, more=more)
            return
        self._bring(event.portions, target, more=more, washing=True)
        self.desk.act(target, f"{WASH}, running into {place_name(below, self.procedure)}")

    def _where(self, name: str) -> tuple[str, ...]:
        vessel = self.procedure.vessels.get(name)
        on = "on" if vessel is None or _holds_paper(vessel) else "in"
        return (f"{on} {place_name(name, self.procedure)}",)

    def _transfer(self, event: model.Transfer, origin: syntax.Place, target: str) -> None:
        name = self._name(origin)
        through = self._clause(event, "through")
        if through is not None:
            self.desk.act(name, f"pour through {place_name(through, self.procedure)}")
        if origin.part is None:
            self.desk.arrive(target, self.desk.leave(name))
        else:
            self.desk.arrive(target, self._draw(origin, target))

    def _draw(self, origin: syntax.Place, target: str) -> int | None:
        name = self._name(origin)
        node = self.desk.part(name, *part_words(origin, self.procedure), target)
        holder = self.desk.holders.get(name)
        if holder is not None:
            holder.rest = rest_words(origin, self.procedure)
        return node

    # ------------------------------------------------------------------ acts

    def _plain_act(self, event: model.Operation, name: str) -> None:
        self._bring(event.portions, name)
        self.desk.act(name, act_words(event, self.procedure))

    def _dry(self, event: model.Operation, name: str) -> None:
        self.desk.act(name, act_words(event, self.procedure))
        self._driers.add(name)

    def _fill(self, event: model.Operation, name: str) -> None:
        if event.portions:
            self._bring(event.portions, name)
        elif event.reagent:
            self.desk.say(name, f"{self._reagent(event)} to the mark")

    def _reagent(self, event: model.Operation) -> str:
        name = self._happening.name(event.reagent)
        material = self.procedure.materials.get(name)
        return plain(material_words(material)) if material else name.replace("-", " ")

    def _adjust(self, event: model.Operation, name: str) -> None:
        """Add a reagent as needed: from its vessel, or from the bottle."""
        origin = self._clause(event, "from")
        goal = next((clause for clause in event.clauses if clause.word == "to"), None)
        to = ""
        if goal is not None:
            bare = event._replace(verb="", clauses=(goal,))
            to = act_words(bare, self.procedure)
        holder = self.desk.holders.get(origin or "")
        if origin is not None and holder is not None:
            worth = self.desk.worth
            stage = self.desk.opened(name)
            self.desk.lead(holder.node, stage)
            holder.drawn = True
            self.desk.worth = worth
        else:
            self.desk.say(name, f"{self._volume()}{self._reagent(event)}")
        self.desk.act(name, ("titrate" if event.verb == "titrate" else "bring") + to)

    def _volume(self) -> str:
        for result in self._entry.results:
            if isinstance(result.outcome, Added) and result.outcome.volume and self.volumes:
                return f"{volume_words(result.outcome.volume).replace(' ', NBSP)} of "
        return ""

    def _filter(self, event: model.Operation, name: str) -> None:
        into, on = self._clause(event, "into"), self._clause(event, "on")
        if into is None or name not in self.desk.holders:
            return
        through = self._clause(event, "through")
        by = f" through {place_name(through, self.procedure)}" if through else ""
        self.desk.act(name, event.verb + by)
        if on is None:
            node = self.desk.leave(name)
            self.desk.arrive(into, node)
            if name in self._driers:
                self._driers.discard(name)
                self.desk.stay(node, f"Left on {place_name(through or 'filter', self.procedure)}")
            return
        self.runs_into[on] = into
        solid = self.desk.part(name, "solid", "solid", on, self._where(on))
        liquid = self.desk.part(name, "filtrate", "", into)
        self.desk.holders.pop(name, None)
        if solid is not None:
            self._lay(on, solid)
        self.desk.arrive(into, liquid)

    def _lay(self, on: str, solid: int) -> None:
        """Let a solid lie on a filter; it needs no box of its own until more is done."""
        if on in self.desk.holders:
            self.desk.arrive(on, solid)
        else:
            self.desk.holders[on] = Holder(solid, stage=False)

    def _decant(self, event: model.Operation, name: str) -> None:
        into = self._clause(event, "into")
        if into is None or name not in self.desk.holders:
            return
        self.desk.act(name, "pour the liquid off")
        liquid = self.desk.part(name, "liquid", "", into)
        holder = self.desk.holders.get(name)
        if holder is not None:
            holder.rest = ("what stays behind", "solid")
        self.desk.arrive(into, liquid)

    def _evaporate(self, event: model.Operation, name: str) -> None:
        into = self._clause(event, "into")
        self.desk.act(name, act_words(event, self.procedure))
        if into is not None:
            self._over(event, name, into)

    def _distil(self, event: model.Operation, name: str) -> None:
        into = self._clause(event, "into")
        holder = self.desk.holders.get(name)
        if into is None or holder is None:
            return
        if holder.rest is None or not holder.drawn:
            self.desk.act(name, event.verb)
        self._over(event, name, into)

    def _over(self, event: model.Operation, name: str, into: str) -> None:
        heat = heat_words(event)
        lines = (heat,) if heat else ()
        node = self.desk.part(name, DISTILLATE, "", into, lines)
        holder = self.desk.holders.get(name)
        if holder is not None:
            holder.rest = ("residue", "residue")
        self.desk.arrive(into, node)

    def _collect(self, event: model.Operation, name: str) -> None:
        into = self._clause(event, "into")
        if into is not None:
            self.desk.arrive(into, self.desk.leave(name))
            self.desk.collected.add(into)

    def _rinse(self, event: model.Operation, name: str) -> None:
        into = self._clause(event, "into")
        if into is not None:
            self.desk.arrive(into, self.desk.leave(name))
            self._bring(event.portions, into, more=f", rinsing {place_name(name, self.procedure)}")
        elif name in self.desk.holders:
            self._let_go(self.desk.leave(name), self._clause(event, "to") or "rinsings")

    def _discard(self, event: model.Operation, name: str) -> None:
        to = self._clause(event, "to", "into") or "waste"
        whole = event.object is None or event.object.part is None
        if event.object is None or name not in self.desk.holders:
            return
        node = self.desk.leave(name) if whole else self._draw(event.object, to)
        if to in self.procedure.vessels:
            self.desk.arrive(to, node)
        else:
            self._let_go(node, to)


def _holds_paper(vessel: model.Vessel) -> bool:
    """Tell whether a vessel is a filter, on which things lie."""
    return vessel.type is not None and any(
        word in vessel.type.type.name for word in ("Hirsch", "Büchner", "Buchner", "glass", "paper")
    )


def _key(happening: Happening) -> _Key:
    return happening.event.span.start, tuple(sorted(happening.names.items()))


_ACTS: dict[str, Callable[[Tracer, model.Operation, str], None]] = {
    **dict.fromkeys(
        ("mix", "stir", "swirl", "shake", "dissolve", "settle", "vent", "heat", "warm", "cool"),
        Tracer._plain_act,  # noqa: SLF001 - the table of the class
    ),
    **dict.fromkeys(("chill", "boil", "reflux"), Tracer._plain_act),  # noqa: SLF001
    "dry": Tracer._dry,  # noqa: SLF001
    "fill": Tracer._fill,  # noqa: SLF001
    "adjust": Tracer._adjust,  # noqa: SLF001
    "titrate": Tracer._adjust,  # noqa: SLF001
    "filter": Tracer._filter,  # noqa: SLF001
    "decant": Tracer._decant,  # noqa: SLF001
    "evaporate": Tracer._evaporate,  # noqa: SLF001
    "distil": Tracer._distil,  # noqa: SLF001
    "collect": Tracer._collect,  # noqa: SLF001
    "rinse": Tracer._rinse,  # noqa: SLF001
    "discard": Tracer._discard,  # noqa: SLF001
}
