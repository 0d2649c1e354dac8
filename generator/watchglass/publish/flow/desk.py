"""The desk at which a graph is made: which box each vessel's contents come from, and what leads on.

Every act of a procedure is one or a few of the moves here. A vessel's box stays open, so that what
comes in and what is done join it, until something is done and more comes in, or a part is drawn.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.publish.flow.graph import Kind
from watchglass.publish.flow.wording import place_name, sentence_case

if TYPE_CHECKING:
    from watchglass.resolve.model import Portion, Procedure


#: What is done by pouring on to a filter.
WASH = "wash"
#: What goes over is called.
DISTILLATE = "distillate"


@dataclass(slots=True)
class Brought:
    """So much of a material: as written, by which name in this pass, how often, and what else is said."""

    portion: Portion
    name: str
    times: int
    more: str = ""


@dataclass(slots=True)
class Draft:
    """A box in the making.

    Attributes:
        kind: What it stands for.
        head: Its first words.
        phase: `aqueous`, `organic`, `solid`, or empty.
        place: The vessel or waste stream that it is of, or that what it stands for goes to.
        lines: What follows the head.
        brought: Materials, of a charge.
        steps: Numbers of its steps.
        came: Numbers of the steps in which something came to it.
        times: How often what it stands for is done.
        entries: Places in the ledger where what it stands for moves; shared by a part and what
            that part leaves behind.
        held: Whether it is what the place holds after the last of the entries, or at the end where
            there are none, and not what came there.
        kept: Whether it is there at the end and is no waste.
        lets_go: Box of the waste that what is left in a vessel goes to; None where it goes on.
    """

    kind: Kind
    head: str
    phase: str = ""
    place: str = ""
    lines: list[str] = field(default_factory=list)
    brought: list[Brought] = field(default_factory=list)
    steps: set[int] = field(default_factory=set)
    came: set[int] = field(default_factory=set)
    times: int = 1
    entries: list[int] = field(default_factory=list)
    held: bool = False
    kept: bool = False
    lets_go: Draft | None = None


@dataclass(slots=True)
class Holder:
    """What a vessel holds, as a place in the graph.

    Attributes:
        node: The box that its contents come from.
        stage: Whether that box is one of the vessel itself.
        drawn: Whether a part of them has been taken since.
        rest: What is left then is called, and its phase; None where it needs no box of its own.
        entries: Of the part that was drawn.
    """

    node: int
    stage: bool
    drawn: bool = False
    rest: tuple[str, str] | None = None
    entries: list[int] = field(default_factory=list)


class Desk:
    """A graph in the making.

    Attributes:
        step: Number of the step that is at its turn.
        times: How often the act that is at its turn is done.
        entry: Its place in the ledger.
        worth: Whether anything was parted or poured from one vessel into another.
        collected: Vessels that a product was collected in.
    """

    def __init__(self, procedure: Procedure) -> None:
        self.procedure = procedure
        self.drafts: list[Draft] = []
        self.edges: dict[tuple[int, int], None] = {}
        self.holders: dict[str, Holder] = {}
        self.step = 0
        self.times = 1
        self.entry = 0
        self.worth = False
        self.collected: set[str] = set()
        self._charges: dict[int, int] = {}

    # ------------------------------------------------------------------ boxes

    def new(self, kind: Kind, head: str, **more: object) -> int:
        """Put up a box of this step; give its place."""
        draft = Draft(kind, head, steps={self.step}, **more)  # type: ignore[arg-type]
        self.drafts.append(draft)
        return len(self.drafts) - 1

    def lead(self, start: int, end: int) -> None:
        """Draw an arrow."""
        if start != end:
            self.edges[start, end] = None

    def _stage(self, name: str) -> int:
        head = sentence_case(place_name(name, self.procedure))
        node = self.new(Kind.STAGE, head, place=name)
        self.drafts[node].steps, self.drafts[node].came = set(), {self.step}
        return node

    # ------------------------------------------------------------------ moves

    def opened(self, name: str, *, washing: bool = False) -> int:
        """Give the box of a vessel that something can come into; a new one where one is needed."""
        holder = self.holders.get(name)
        if holder is not None and holder.stage:
            done = self.drafts[holder.node].lines
            if (not done and not holder.drawn) or (
                washing and len(done) == 1 and done[0].startswith(WASH)
            ):
                self.drafts[holder.node].came.add(self.step)
                return holder.node
        node = self._stage(name)
        if holder is not None:
            self.lead(self.tail(name, holder), node)
        self.holders[name] = Holder(node, stage=True)
        return node

    def tail(self, name: str, holder: Holder) -> int:
        """Give the box that leads on from what a vessel holds; what a part left gets one of its own."""
        if holder.rest is None:
            return holder.node
        words, phase = holder.rest
        node = self.new(
            Kind.PART,
            words,
            phase=phase,
            place=name,
            entries=holder.entries,
            held=True,
        )
        self.drafts[node].steps = {max(self.drafts[holder.node].steps | {0})}
        self.lead(holder.node, node)
        holder.node, holder.rest, holder.drawn, holder.stage = node, None, False, False
        return node

    def charge(
        self, name: str, portion: Portion, material: str, *, more: str = "", washing: bool = False
    ) -> int:
        """Bring so much of a material into a vessel; what comes together stands in one box."""
        stage = self.opened(name, washing=washing)
        at = self._charges.get(stage)
        if at is None:
            at = self._charges[stage] = self.new(Kind.CHARGE, "", place=name)
            self.lead(at, stage)
        charge = self.drafts[at]
        charge.steps.add(self.step)
        for brought in charge.brought:
            if _alike(brought, portion, material) and brought.more == more:
                brought.times += self.times
                return stage
        charge.brought.append(Brought(portion, material, self.times, more))
        return stage

    def say(self, name: str, line: str) -> None:
        """Have a line beside what is brought into a vessel."""
        stage = self.opened(name)
        at = self._charges.get(stage)
        if at is None:
            at = self._charges[stage] = self.new(Kind.CHARGE, "", place=name)
            self.lead(at, stage)
        self.drafts[at].lines.append(line)

    def act(self, name: str, words: str) -> None:
        """Do something to what a vessel holds; nothing is done to an empty one."""
        holder = self.holders.get(name)
        if holder is None:
            return
        node = holder.node if holder.stage and not holder.drawn else self.opened(name)
        draft = self.drafts[node]
        draft.steps.add(self.step)
        draft.times = max(draft.times, self.times)
        if words not in draft.lines[-1:]:
            draft.lines.append(words)

    def part(
        self, name: str, words: str, phase: str, target: str, lines: tuple[str, ...] = ()
    ) -> int | None:
        """Draw a part off; give its box. None where the vessel holds nothing."""
        holder = self.holders.get(name)
        if holder is None:
            return None
        self.worth = True
        if holder.rest is not None and holder.rest[1] == phase:
            node = self.tail(name, holder)  # the other part, all that was left
            del self.holders[name]
            return node
        if not holder.stage:
            self.opened(name)
            holder = self.holders[name]
        node = self.new(
            Kind.PART,
            words,
            phase=phase,
            place=target,
            times=self.times,
            lines=list(lines),
            entries=[self.entry],
        )
        self.drafts[holder.node].steps.add(self.step)
        self.lead(holder.node, node)
        holder.drawn = True
        holder.entries = self.drafts[node].entries
        return node

    def stay(self, node: int | None, where: str) -> None:
        """Let a drying agent stay on what the liquid runs through."""
        if node is not None:
            self.lead(node, self.new(Kind.WASTE, where, lines=["drying agent"]))

    def leave(self, name: str) -> int | None:
        """Empty a vessel; give the box that its contents come from. None where it holds nothing."""
        holder = self.holders.pop(name, None)
        return None if holder is None else self.tail(name, holder)

    def arrive(self, name: str, node: int | None) -> None:
        """Let what comes from a box run into a vessel."""
        if node is not None:
            self.worth = True
            self.lead(node, self.opened(name))

    def waste(self, node: int | None, words: str, place: str) -> None:
        """Let what comes from a box go."""
        if node is not None:
            self.lead(node, self.new(Kind.WASTE, words, place=place, entries=[self.entry]))


def _alike(brought: Brought, portion: Portion, material: str) -> bool:
    """Tell whether a portion is as much of the same as one before, in so many words."""
    one, other = brought.portion.quantity, portion.quantity
    return (
        brought.name == material
        and one is not None
        and other is not None
        and one.text == other.text
        and brought.portion.per == portion.per
    )
