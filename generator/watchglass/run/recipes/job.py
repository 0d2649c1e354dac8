"""One stock that is made: how much of it, what there is to make it from, and what comes to light."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.chemistry.densities import WATER
from watchglass.run.recipes.lines import Care, Line, Unknown
from watchglass.run.recipes.store import SLACK

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence

    from watchglass.catalogue.stocks import Stock
    from watchglass.catalogue.substances import Substance
    from watchglass.resolve import model
    from watchglass.run.recipes.lines import Measure, Weigh
    from watchglass.run.recipes.rounding import Rounding
    from watchglass.run.recipes.store import Source, Store
    from watchglass.run.recipes.strengths import Part

#: Volume made where a stock does not say, m3.
USUAL_SIZE = 1e-3
#: Share by which a stock may be weaker than what is bought and yet be that [-].
AS_BOUGHT = 0.01
#: Figures of a strength from which volumetric ware is worth its while. Judgement.
FINE = 3


class Taken(NamedTuple):
    """How one solute is taken.

    Attributes:
        line: What is weighed or measured; or why not.
        source: What from; None where there is nothing.
        made: Strength that is made, mol/m3, or None.
        strong: Strength of the source, mol/m3, or None.
    """

    line: Weigh | Measure | Unknown
    source: Source | None = None
    made: float | None = None
    strong: float | None = None


class Job:
    """The making of one stock; assumptions gather in it.

    Attributes:
        store: What there is to make it from.
        rounding: What can be weighed and measured.
        stock: The stock.
        material: What it is.
        mass: How much is made, kg; None where that is said by volume.
        volume: How much is made, m3; None where that is said by mass.
        assumptions: What the figures rest on, so far.
        too_weak: A reagent that is weaker than what is to be made of it, or empty.
        reached: Real strength over that declared [-], or None.
    """

    def __init__(
        self,
        store: Store,
        rounding: Rounding,
        stock: Stock,
        material: model.Material,
        volume: float | None,
    ) -> None:
        """Take what is to be made.

        Args:
            store: What there is to make it from.
            rounding: What can be weighed and measured.
            stock: The stock.
            material: What it is.
            volume: How much, m3; None for as much as the stock says, or 1 L.
        """
        self.store, self.rounding, self.stock, self.material = store, rounding, stock, material
        makes = stock.makes
        by_mass = volume is None and makes is not None and makes.dimension == dim.MASS
        self.mass = makes.middle if makes is not None and by_mass else None
        self.volume = None if by_mass else volume or (makes.middle if makes else USUAL_SIZE)
        self.assumptions: list[str] = []
        self.too_weak = ""
        self.reached: float | None = None

    def whole_volume(self) -> float | None:
        """Give the volume that is made, m3; None where only its mass is known."""
        if self.volume is not None:
            return self.volume
        facts = self.material.solution
        if self.mass is None or facts is None or not facts.density:
            return None
        self._assume_density(facts)
        return self.mass / facts.density

    def whole_mass(self, solvent: Substance) -> float:
        """Give the mass that is made, kg; of what has no known density that of so much solvent."""
        if self.mass is not None:
            return self.mass
        facts = self.material.solution
        volume = self.volume or 0.0
        if facts is not None and facts.density:
            self._assume_density(facts)
            return volume * facts.density
        own = solvent.density
        said = "for how much is made, taken to be as dense as its solvent"
        self.assumptions.append(f"made by mass; {said}")
        return volume * (own.value.middle if own is not None else WATER)

    def _assume_density(self, facts: model.SolutionFacts) -> None:
        written = self.material.written
        if facts.source == "water":
            self.assumptions.append(f"{written} taken to be as dense as water")
        elif facts.source == "table":
            self.assumptions.append(
                f"density of {written} from the table of aqueous solutions, 20 °C"
            )

    def assume(self, found: Iterable[Taken]) -> None:
        """Note what the sources are taken to be."""
        for one in found:
            if one.source is None:
                continue
            self.assumptions.append(one.source.assumption)
            facts = one.source.material.solution
            if one.source.dissolved and facts is not None and facts.source == "table":
                self.assumptions.append(
                    f"density of {one.source.material.written} from the table of aqueous"
                    " solutions, 20 °C"
                )

    def reach(self, ratios: Iterable[float]) -> None:
        """Keep the ratio of real to declared strength that is farthest from 1."""
        self.reached = max(ratios, key=lambda ratio: abs(ratio - 1), default=None)


def as_bought(job: Job, parts: Sequence[Part], found: Sequence[Taken]) -> Sequence[Line] | None:
    """Tell a stock that is what the bottle holds; None where it is made."""
    source = found[0].source
    if len(parts) > 1 or source is None or not source.dissolved or job.stock.made_from:
        return None
    made, strong = found[0].made, found[0].strong
    if made is None or strong is None or not -AS_BOUGHT <= made / strong - 1 <= SLACK:
        return None
    job.assumptions = [source.assumption]
    return (Care(f"it is used as it is bought: {source.name}", ""),)


def weak(found: Sequence[Taken]) -> Unknown:
    """Say that what it is made from is weaker than what is to be made."""
    names = " and ".join(one.source.name for one in found if one.source is not None)
    return Unknown(f"it would take more of {names} than there is room for")


def only_unknown(found: Sequence[Taken]) -> Sequence[Line] | None:
    """Give why nothing at all can be worked out; None where something can."""
    lines = [one.line for one in found if isinstance(one.line, Unknown)]
    return lines if len(lines) == len(found) else None
