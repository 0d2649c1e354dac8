"""How the prep room makes a stock solution: what is weighed or measured, in which order, with what care.

A recipe is worked out from what the stock is and what the store holds: another stock (`from:`), a
concentrated reagent by its label, a solid in the form owned, a pure liquid. Masses are those the
balance can weigh, volumes those a cylinder or pipette can give; the strength that the rounded recipe
really gives stands beside it. What cannot be told is `Unknown`, with its reason, and never left out.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.chemistry.dilution import Piece, series
from watchglass.resolve import model
from watchglass.run.content import Missing, contents
from watchglass.run.recipes.job import Job
from watchglass.run.recipes.lines import (
    Begin,
    Care,
    Dissolve,
    Line,
    MakeUp,
    Measure,
    Recipe,
    Unknown,
    Weigh,
)
from watchglass.run.recipes.making import make
from watchglass.run.recipes.rounding import Rounding
from watchglass.run.recipes.store import Store

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.base.findings import Finding
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.stocks import Stock
    from watchglass.chemistry.dilution import Dilution, NotReached
    from watchglass.resolve.laboratory import Laboratory

__all__ = [
    "Begin",
    "Care",
    "Dissolve",
    "HeldIn",
    "Line",
    "MakeUp",
    "Measure",
    "PrepRoom",
    "Recipe",
    "Unknown",
    "Weigh",
    "recipe",
]


class HeldIn(NamedTuple):
    """What a stock is a solution of: key and name of the solute, and mol/m3 of it."""

    key: str
    name: str
    concentration: float


class PrepRoom:
    """The store, the balance and the glassware that stocks are made with."""

    def __init__(self, catalogue: Catalogue, laboratory: Laboratory) -> None:
        """Take what there is.

        Args:
            catalogue: What substances, stocks and ware are looked up in.
            laboratory: Balance, glassware and reagents owned.
        """
        self.store = Store(catalogue, laboratory)
        self._rounding = Rounding(catalogue, laboratory)

    def recipe(self, stock: Stock, volume: float | None = None) -> Recipe:
        """Work out how a stock is made.

        Args:
            stock: Which.
            volume: How much, m3; as the stock says (`makes:`), else 1 L.
        """
        material, _ = self.store.stock(stock)
        return make(Job(self.store, self._rounding, stock, material, volume))

    def faults_of(self, stock: Stock) -> tuple[Finding, ...]:
        """Give what is wrong in the description of a stock."""
        return self.store.stock(stock)[1]

    def held_in(self, stock: Stock) -> HeldIn | None:
        """Tell what a stock is a solution of; None where it is none, or its strength is unknown."""
        material, _ = self.store.stock(stock)
        composition = material.composition
        if not isinstance(composition, model.Solution | model.Saturated):
            return None
        held = contents(material, dim.VOLUME, 1.0, 6)
        if isinstance(held, Missing):
            return None
        return HeldIn(composition.solute.key, composition.solute.name, held[0].moles)

    def series(
        self, stock: Stock, targets: Sequence[float], least: float = 0.0
    ) -> tuple[Dilution | NotReached, ...] | Unknown:
        """Choose pipettes and flasks that are owned for a dilution series of a stock.

        Args:
            stock: What is diluted.
            targets: Strengths wanted, mol/m3, > 0.
            least: Volume of each that is needed, m3.
        """
        held = self.held_in(stock)
        if held is None or held.concentration <= 0:
            return Unknown(f"how much `{stock.key}` holds is not known")
        pipettes, flasks = (
            tuple(
                Piece(ware.gives.most, ware.gives.tolerance) for ware in self._rounding.owned(kind)
            )
            for kind in ("volumetric-pipette", "volumetric-flask")
        )
        return series(
            stock=held.concentration,
            targets=targets,
            pipettes=pipettes,
            flasks=flasks,
            least=least,
        )


def recipe(
    stock: Stock, catalogue: Catalogue, laboratory: Laboratory, volume: float | None = None
) -> Recipe:
    """Work out how a stock is made; see `PrepRoom`, which does it for several."""
    return PrepRoom(catalogue, laboratory).recipe(stock, volume)
