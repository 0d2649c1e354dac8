"""What goes where, as a graph: boxes and the arrows between them, before anything is drawn."""

from __future__ import annotations

from enum import StrEnum
from typing import NamedTuple

#: What becomes of what is there at the end and is no waste.
KEPT = "kept"


class Kind(StrEnum):
    """What a box stands for."""

    CHARGE = "charge"  #: materials that are brought
    STAGE = "stage"  #: a vessel and what is done in it
    PART = "part"  #: a layer, a filtrate, a distillate: what one vessel is parted into
    WASTE = "waste"  #: a waste stream, or what is left behind


class Node(NamedTuple):
    """One box.

    Attributes:
        kind: What it stands for.
        head: Its first words: a vessel, a part, a waste stream; empty for what is brought.
        lines: What follows: portions, acts, where it goes.
        steps: Numbers of the steps it is of, ascending; one at least.
        phase: `aqueous`, `organic`, `solid`, or empty.
        components: What is in it, each with its share; only where that may be shown.
        fate: What becomes of it where no arrow tells: `kept`, `then: aqueous-acid waste`; or empty.
    """

    kind: Kind
    head: str
    lines: tuple[str, ...]
    steps: tuple[int, ...]
    phase: str = ""
    components: tuple[str, ...] = ()
    fate: str = ""

    @property
    def kept(self) -> bool:
        """Whether it is there at the end and is no waste."""
        return self.fate == KEPT


class Flow(NamedTuple):
    """A whole procedure as boxes and arrows.

    Attributes:
        nodes: Boxes, in the order in which the procedure comes to them.
        edges: Arrows, from and to places in `nodes`; without cycles.
        repeated: Numbers of the steps that are done again from the beginning with clean vessels,
            and how often they are done in all; 1 where none are.
    """

    nodes: tuple[Node, ...]
    edges: tuple[tuple[int, int], ...]
    repeated: tuple[tuple[int, ...], int] = ((), 1)
