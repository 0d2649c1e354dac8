"""What there is to make a stock from: other stocks, bottles of the store, the usual of the trade."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.yaml import YamlText
from watchglass.catalogue.reagents import USUAL, read_purity, read_reagent
from watchglass.chemistry.solutions import solute_units
from watchglass.resolve import model
from watchglass.resolve.label import faults_of_label, read_label
from watchglass.resolve.materials import MaterialReader
from watchglass.run.content import Missing, contents

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.findings import Finding
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.stocks import Stock
    from watchglass.catalogue.substances import Substance
    from watchglass.resolve.laboratory import Laboratory

#: Share by which a strength may pass that of its reagent: bottles are labelled to two figures [-].
SLACK = 0.02
_WATER = "water"
_WORDS = {"solution density": "density of the solution"}


class Source(NamedTuple):
    """What a solute is taken from.

    Attributes:
        name: What it is called in the recipe.
        material: What it is.
        substance: The solute as it is in there: a hydrate, or the anhydrous form.
        purity: Share by mass of the substance in it, where it is one substance [-].
        assumption: What is taken for granted of it, or empty.
    """

    name: str
    material: model.Material
    substance: Substance
    purity: float = 1.0
    assumption: str = ""

    @property
    def dissolved(self) -> bool:
        """Whether it is a solution, and not the substance itself."""
        return not isinstance(self.material.composition, model.Pure)

    @property
    def solid(self) -> bool:
        """Whether it is weighed: what is not known to be a liquid counts as a solid."""
        return not self.dissolved and self.substance.state != "liquid"


class NoSource(NamedTuple):
    """Why there is nothing to take it from; and the reagent that is too weak, in words, or empty."""

    why: str
    too_weak: str = ""


class Store:
    """Reads stocks and reagents, and finds what a solute can be taken from."""

    def __init__(self, catalogue: Catalogue, laboratory: Laboratory) -> None:
        """Take what the laboratory owns and the set keeps."""
        self.catalogue = catalogue
        self.laboratory = laboratory
        self._bottles: tuple[Source, ...] | None = None
        self._found: tuple[Finding, ...] = ()

    # ------------------------------------------------------------------ reading

    def stock(self, stock: Stock) -> tuple[model.Material, tuple[Finding, ...]]:
        """Read what a stock is, and what is wrong in its description."""
        reader = MaterialReader(self.catalogue)
        composition = reader.of_stock(stock)
        return self._material(stock.material, composition, stock.density, stock.also, reader)

    def bottles(self) -> tuple[Source, ...]:
        """Give what the store lists, as far as it can be read."""
        if self._bottles is None:
            findings: list[Finding] = []
            self._bottles = tuple(self._read_bottles(findings))
            self._found = tuple(findings)
        return self._bottles

    def faults(self) -> tuple[Finding, ...]:
        """Give what is wrong in the list of reagents."""
        self.bottles()
        return self._found

    def _read_bottles(self, findings: list[Finding]) -> Iterator[Source]:
        for node in self.laboratory.reagents:
            label = read_reagent(node, findings)
            reader = MaterialReader(self.catalogue)
            composition, _ = reader.described(label.described)
            pure = isinstance(composition, model.Pure)
            also = label.strength if not pure else None
            material, found = self._material(
                label.described, composition, label.density, also, reader
            )
            findings += found
            match composition:
                case model.Pure(substance):
                    said = read_purity(label.strength, findings) if label.strength else None
                    taken = f"{substance.name} taken as pure" if said is None else ""
                    yield Source(substance.name, material, substance, said or 1.0, taken)
                case model.Solution(_, solute, _) | model.Saturated(solute, _):
                    yield Source(label.described.text, material, solute)
                case _:
                    pass  # not read, or a mixture: nothing is taken from it

    def _material(
        self,
        text: YamlText,
        composition: model.Composition,
        density: YamlText | None,
        also: YamlText | None,
        reader: MaterialReader,
    ) -> tuple[model.Material, tuple[Finding, ...]]:
        findings = list(reader.findings)
        label = read_label(density, also, findings)
        material = model.Material(
            name=text.text,
            written=text.text,
            composition=composition,
            span=text.span,
            value_span=text.span,
            solution=label.facts(composition, self.catalogue),
        )
        findings += faults_of_label(label, text.text, composition, self.catalogue)
        return material, tuple(findings)

    # ------------------------------------------------------------------ what there is of a solute

    def source(
        self,
        stock: Stock,
        solute: Substance,
        solvent: Substance,
        strength: float | None,
        share: float | None = None,
    ) -> Source | NoSource:
        """Find what a solute is taken from.

        Args:
            stock: What is made; it may say itself what from.
            solute: What is needed.
            solvent: What it is dissolved in.
            strength: How strong the stock is, kg/m3 of the solute; None where that is not known.
            share: The same as a share by mass [-], or None.
        """
        if stock.made_from:
            parent = self._parent(stock, solute, solvent)
            if isinstance(parent, Source) or stock.contains is None:
                return parent  # of a mixture, what the other stock does not hold is taken elsewhere
        aqueous = solvent.key == _WATER
        usual = USUAL.get(solute.key) if aqueous or solute.state != "gas" else None
        weak: Source | None = None
        for bottle in self.bottles():
            if not self._holds(bottle, solute) or _solvent(bottle, solvent) != solvent.key:
                continue
            if self.strong_enough(bottle, solute, strength, share):
                return bottle
            weak = weak or bottle
        if weak is not None and (usual is not None or solute.state == "gas"):
            return NoSource(f"{weak.name} is weaker than what is to be made of it", weak.name)
        if usual is not None:
            return self._of_the_trade(solute, strength, share)
        if solute.state == "gas":
            inside = "" if aqueous else f" in {solvent.name}"
            return NoSource(f"no solution of {solute.name}{inside} is owned to make it from")
        return self._itself(solute)

    def strong_enough(
        self, source: Source, solute: Substance, strength: float | None, share: float | None
    ) -> bool:
        """Tell whether a source can give a strength, kg/m3 or [-]; what is not known can."""
        if not source.dissolved:
            return True
        compared = (
            (share, self.share(source, solute)),
            (strength, self.per_volume(source, solute)),
        )
        for asked, held in compared:
            if asked is not None and held is not None:
                return asked <= held * (1 + SLACK)
        return True

    def per_volume(self, source: Source, solute: Substance) -> float | None:
        """Give the mass of a solute in a volume of its source, kg/m3; None where that is not known."""
        return self._held(source, solute, dim.VOLUME)

    def share(self, source: Source, solute: Substance) -> float | None:
        """Give the share by mass of a solute in its source [-]; None where that is not known."""
        return self._held(source, solute, dim.MASS)

    def missing(self, source: Source) -> str:
        """Say what is not known of a source."""
        held = contents(source.material, dim.VOLUME, 1.0, 6)
        what = held.what if isinstance(held, Missing) else "formula"
        return f"the {_WORDS.get(what, what)} of {source.name} is not known"

    def _held(self, source: Source, solute: Substance, of: dim.Dimension) -> float | None:
        as_solute = self.as_form(1.0, source.substance, solute)
        if not source.dissolved and of == dim.MASS:
            return source.purity * as_solute if as_solute is not None else None
        held = contents(source.material, of, 1.0, 6)
        if isinstance(held, Missing) or as_solute is None:
            return None
        return held[0].mass * source.purity * as_solute

    def as_form(self, mass: float, have: Substance, want: Substance) -> float | None:
        """Give the mass of one form of a salt that holds as much of it as a mass of another.

        Args:
            mass: Of the form at hand, kg.
            have: The form at hand.
            want: The form it is counted as: itself, its anhydrous salt, or another hydrate.

        Returns:
            Mass, kg; None where a formula is not known.
        """
        if have.key == want.key:
            return mass
        base = self.catalogue.by_key(have.hydrate_of or have.key)
        if base is None or base.formula is None or have.formula is None or want.formula is None:
            return None
        of_have = solute_units(have.formula, base.formula)
        of_want = solute_units(want.formula, base.formula)
        if not of_have or not of_want or not have.molar_mass or not want.molar_mass:
            return None
        return mass / have.molar_mass * float(of_have / of_want) * want.molar_mass

    def mixture(self, stock: Stock) -> tuple[str, model.Mixture] | None:
        """Give the key and the parts of the mixture of solutes that a stock is diluted from."""
        parent = self.catalogue.stocks.get(stock.made_from.casefold()) if stock.made_from else None
        if parent is None or parent.key == stock.key:
            return None
        composition = self.stock(parent)[0].composition
        if isinstance(composition, model.Mixture) and composition.basis == "strength":
            return parent.key, composition
        return None

    # ------------------------------------------------------------------ where it is looked for

    def _holds(self, source: Source, solute: Substance) -> bool:
        base = solute.hydrate_of or solute.key
        return (source.substance.hydrate_of or source.substance.key) == base

    def _parent(self, stock: Stock, solute: Substance, solvent: Substance) -> Source | NoSource:
        parent = self.catalogue.stocks.get(stock.made_from.casefold())
        if parent is None or parent.key == stock.key:
            return NoSource(f"the stock `{stock.made_from}` is not known")
        material, _ = self.stock(parent)
        match material.composition:
            case model.Solution(_, held, _) | model.Saturated(held, _) | model.Pure(held):
                source = Source(parent.key, material, held)
                if self._holds(source, solute):
                    if _solvent(source, solvent) == solvent.key:
                        return source
                    return NoSource(f"the stock `{parent.key}` is not in {solvent.name}")
            case _:
                pass
        return NoSource(f"the stock `{parent.key}` does not hold {solute.name}")

    def _of_the_trade(
        self, solute: Substance, strength: float | None, share: float | None
    ) -> Source | NoSource:
        usual = USUAL[solute.key]
        bottle = self._read(usual.text, solute)
        if not self.strong_enough(bottle, solute, strength, share):
            if usual.strongest:
                strongest = self._read(usual.strongest, solute)
                if not self.strong_enough(strongest, solute, strength, share):
                    why = f"{strongest.name}, the strongest that is sold, is weaker"
                    return NoSource(why, strongest.name)
            return NoSource(f"{bottle.name}, the usual of the trade, is weaker; list what is owned")
        said = f"{bottle.name}, the usual strength of the trade; compare with the label"
        return bottle._replace(assumption=said)

    def _read(self, text: str, solute: Substance) -> Source:
        node = YamlText(text, solute.span)
        reader = MaterialReader(self.catalogue)
        composition, _ = reader.described(node)
        material, _ = self._material(node, composition, None, None, reader)
        return Source(text, material, solute)

    def _itself(self, solute: Substance) -> Source:
        material = model.Material(
            name=solute.name,
            written=solute.name,
            composition=model.Pure(solute),
            span=solute.span,
            value_span=solute.span,
        )
        return Source(solute.name, material, solute, 1.0, f"{solute.name} taken as pure")


def _solvent(source: Source, wanted: Substance) -> str:
    """Give the key of what a source is dissolved in; what is dissolved in nothing suits any."""
    match source.material.composition:
        case model.Solution(_, _, solvent) | model.Saturated(_, solvent):
            return solvent.key
        case _:
            return wanted.key
