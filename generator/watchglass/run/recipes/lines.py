"""The lines of a recipe: what is weighed, measured, dissolved, made up to, and minded."""

from __future__ import annotations

from typing import NamedTuple


class Weigh(NamedTuple):
    """So much of something on the balance: mass as text with unit, and as rounded and exactly, kg."""

    name: str
    text: str
    mass: float
    exact: float


class Measure(NamedTuple):
    """So much of a liquid.

    Attributes:
        name: Of what.
        text: Volume with unit.
        ware: What it is measured with, or empty.
        volume: As rounded, m3.
        exact: As worked out, m3.
        fillings: How often the vessel is filled for it.
    """

    name: str
    text: str
    ware: str
    volume: float
    exact: float
    fillings: int = 1


class Begin(NamedTuple):
    """So much of the solvent is in the vessel before anything else comes to it."""

    name: str
    text: str


class Dissolve(NamedTuple):
    """What was weighed is dissolved in so much of the solvent."""

    name: str
    text: str


class MakeUp(NamedTuple):
    """Bring the whole to a volume with a solvent."""

    name: str
    text: str
    ware: str


class Care(NamedTuple):
    """A caution or a remark, and the words of its source; empty where it needs none."""

    text: str
    source: str


class Unknown(NamedTuple):
    """What cannot be worked out, and why."""

    why: str


Line = Weigh | Measure | Begin | Dissolve | MakeUp | Care | Unknown


class Recipe(NamedTuple):
    """How a stock is made.

    Attributes:
        size: How much is made, as text.
        lines: In the order of the work.
        reached: Strength that it really gives over the one declared [-], of several the one that is
            farthest off; None where unknown.
        assumptions: What the figures rest on.
        too_weak: The reagent that is weaker than what is to be made of it, in words, or empty.
    """

    size: str
    lines: tuple[Line, ...]
    reached: float | None
    assumptions: tuple[str, ...]
    too_weak: str = ""
