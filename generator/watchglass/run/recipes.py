"""How the prep room makes a stock solution: what is weighed or measured, in which order, with what care.

A recipe is worked out from what the stock is and what the store holds: another stock (`from:`), a
concentrated reagent by its label, a solid in the form owned, a pure liquid. Masses are those the
balance can weigh, volumes those a cylinder or pipette can give; the strength that the rounded recipe
really gives stands beside it. What cannot be told is `Unknown`, with its reason, and never left out.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.scan import Found, scan_quantity
from watchglass.base.yaml import YamlText
from watchglass.catalogue.measuring import nearest, reach
from watchglass.resolve import model
from watchglass.resolve.label import faults_of_label, read_label
from watchglass.resolve.materials import MaterialReader
from watchglass.run.content import Missing, contents

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.findings import Finding
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.glassware import VesselType
    from watchglass.catalogue.measuring import Reach
    from watchglass.catalogue.stocks import Stock
    from watchglass.catalogue.substances import Substance
    from watchglass.resolve.laboratory import Laboratory

#: Volume made where a stock does not say, m3.
USUAL = 1e-3
#: Concentrated reagents taken where the store lists none of its own. Common practice, no source.
COMMERCIAL = {
    "hydrogen-chloride": "37 % w/w hydrochloric acid",
    "sulfuric-acid": "96 % w/w sulfuric acid",
    "nitric-acid": "69 % w/w nitric acid",
    "ammonia": "28 % w/w ammonia",
    "phosphoric-acid": "85 % w/w phosphoric acid",
    "hydrogen-peroxide": "30 % w/w hydrogen peroxide",
}
#: Solutes whose concentrated solutions fume: hood. Common practice, no source.
_FUMING = frozenset(
    ("hydrogen-chloride", "nitric-acid", "ammonia", "acetic-acid", "hydrogen-bromide")
)
#: Acids that heat as they are diluted: poured into water.
_ACIDS = frozenset(("sulfuric-acid", "nitric-acid", "hydrogen-chloride"))
#: Solids that heat when they dissolve: ice, a little at a time.
_HEATING = frozenset(("sodium-hydroxide", "potassium-hydroxide", "calcium-chloride"))
#: Strength from which a solution counts as concentrated, mol/m3.
_CONCENTRATED = 6000.0
#: Strength from which dissolving or diluting changes the temperature enough to be waited for, mol/m3.
_WARMING = 500.0
#: What is said of a fact that no published source was found for.
PRACTICE = "common practice, no source"
#: More of a solid than dissolves, so that some is left [-].
_EXCESS = 0.1


class Weigh(NamedTuple):
    """So much of a solid: mass as text with unit, and exactly, kg."""

    name: str
    text: str
    mass: float
    exact: float


class Measure(NamedTuple):
    """So much of a liquid: volume as text with unit, what it is measured with, and exactly, m3."""

    name: str
    text: str
    ware: str
    volume: float
    exact: float


class MakeUp(NamedTuple):
    """Bring the whole to a volume or a mass with a solvent."""

    name: str
    text: str
    ware: str


class Care(NamedTuple):
    """A caution, and the words of its source."""

    text: str
    source: str


class Unknown(NamedTuple):
    """What cannot be worked out, and why."""

    why: str


Line = Weigh | Measure | MakeUp | Care | Unknown


class Recipe(NamedTuple):
    """How a stock is made.

    Attributes:
        size: How much is made, as text.
        lines: In the order of the work.
        reached: Strength that it really gives over the one declared [-]; None where unknown.
        assumptions: What the figures rest on.
    """

    size: str
    lines: tuple[Line, ...]
    reached: float | None
    assumptions: tuple[str, ...]


def recipe(
    stock: Stock, catalogue: Catalogue, laboratory: Laboratory, volume: float | None = None
) -> Recipe:
    """Work out how a stock is made.

    Args:
        stock: Which.
        catalogue: What it is looked up in.
        laboratory: Balance, glassware and reagents owned.
        volume: How much, m3; as the stock says (`makes:`), else 1 L.
    """
    return _Maker(catalogue, laboratory).make(stock, volume)


class HeldIn(NamedTuple):
    """What a stock is a solution of: key and name of the solute, and mol/m3 of it."""

    key: str
    name: str
    concentration: float


def held_in(stock: Stock, catalogue: Catalogue, laboratory: Laboratory) -> HeldIn | None:
    """Tell what a stock is a solution of; None where it is none, or its strength is not known."""
    material = _Maker(catalogue, laboratory).material(stock.material, stock)
    composition = material.composition
    if not isinstance(composition, model.Solution | model.Saturated):
        return None
    held = contents(material, dim.VOLUME, 1.0, 6)
    if isinstance(held, Missing):
        return None
    return HeldIn(composition.solute.key, composition.solute.name, held[0].moles)


def faults_of(stock: Stock, catalogue: Catalogue, laboratory: Laboratory) -> tuple[Finding, ...]:
    """Give what is wrong in the description of a stock."""
    maker = _Maker(catalogue, laboratory)
    material = maker.material(stock.material, stock)
    label = read_label(stock.density, stock.also, [])
    maker.findings += faults_of_label(label, material.written, material.composition, catalogue)
    return tuple(maker.findings)


class _Maker:
    def __init__(self, catalogue: Catalogue, laboratory: Laboratory) -> None:
        self.catalogue = catalogue
        self.laboratory = laboratory
        self.assumptions: list[str] = []
        self.findings: list[Finding] = []

    def make(self, stock: Stock, volume: float | None) -> Recipe:
        made = stock.makes.si if stock.makes is not None else USUAL
        whole = volume or made
        material = self.material(stock.material, stock)
        match material.composition:
            case model.Solution():
                lines, reached = self._solution(material, whole, stock)
            case model.Saturated(solute, solvent):
                lines, reached = self._saturated(material, solute, solvent, whole), None
            case model.Mixture(_, "strength", solvent):
                lines, reached = self._several(material, solvent, whole), None
            case model.Mixture(parts, "volume", _):
                lines, reached = self._by_volume(parts, whole), None
            case model.Pure(substance):
                lines, reached = (Care(f"{substance.name} is used as it is bought", ""),), None
            case _:
                lines, reached = (Unknown("what it is made of is not known"),), None
        return Recipe(_litres(whole), tuple(lines), reached, tuple(dict.fromkeys(self.assumptions)))

    # ------------------------------------------------------------------ what there is

    def material(self, text: YamlText, stock: Stock | None = None) -> model.Material:
        """Read what a stock or a reagent is; findings about it stand elsewhere."""
        reader = MaterialReader(self.catalogue)
        composition = reader.of_stock(stock) if stock is not None else reader.described(text)[0]
        self.findings += reader.findings
        density, also = (stock.density, stock.also) if stock is not None else (None, None)
        label = read_label(density, also, self.findings)
        return model.Material(
            name=text.text,
            written=text.text,
            composition=composition,
            span=text.span,
            value_span=text.span,
            solution=label.facts(composition, self.catalogue),
        )

    def _concentrate(self, solute: Substance) -> model.Material | None:
        """Find the concentrated reagent of a solute: owned, else the usual one of the trade."""
        for text in self.laboratory.reagents:
            owned = self.material(text)
            composition = owned.composition
            if isinstance(composition, model.Solution) and composition.solute.key == solute.key:
                return owned
        usual = COMMERCIAL.get(solute.key)
        if usual is None:
            return None
        self.assumptions.append(f"{usual}, the usual strength of the trade; compare with the label")
        return self.material(YamlText(usual, solute.span))

    def _form(self, solute: Substance) -> Substance:
        """Give the form of a solid that the store owns: a hydrate, or the anhydrous one."""
        forms = {form.key: form for form in self.catalogue.forms_of(solute)}
        for text in self.laboratory.reagents:
            composition = self.material(text).composition
            if isinstance(composition, model.Pure) and composition.substance.key in forms:
                return composition.substance
        return solute

    # ------------------------------------------------------------------ solutions

    def _solution(
        self, material: model.Material, whole: float, stock: Stock
    ) -> tuple[tuple[Line, ...], float | None]:
        composition = material.composition
        assert isinstance(composition, model.Solution)  # noqa: S101 - told before
        held = contents(material, dim.VOLUME, whole, 6)
        solvent = composition.solvent
        if composition.strength.quantity.dimension == dim.MASS_FRACTION and isinstance(
            held, Missing
        ):
            return self._by_mass(composition, whole)
        if isinstance(held, Missing):
            return (Unknown(f"the {held.what} of {composition.solute.name} is not known"),), None
        needed = held[0].moles
        if not needed:
            return (Unknown("it holds nothing of what it is named after"),), None
        line, given = self._source(composition.solute, needed, stock)
        lines: list[Line] = []
        if isinstance(line, Unknown):
            return (line,), None
        taken = needed / line.exact if isinstance(line, Measure) and line.exact else 0.0
        lines += self._cares(composition.solute, line, needed / whole, taken)
        if taken > _CONCENTRATED and composition.solute.key in _ACIDS:
            first = f"put about half of the {solvent.name} in first, and pour the acid into it"
            lines.append(Care(first, ""))
        lines.append(line)
        if needed / whole > _WARMING:
            lines.append(Care("make up to volume only when it is at room temperature", PRACTICE))
        ware = self._flask(whole) if composition.strength.quantity.figures >= 3 else ""
        lines.append(MakeUp(solvent.name, _litres(whole), ware))
        return tuple(lines), given / needed if needed else None

    def _source(
        self, solute: Substance, needed: float, stock: Stock
    ) -> tuple[Weigh | Measure | Unknown, float]:
        """Give what brings so many moles of a solute, and how many it brings once rounded."""
        if stock.made_from:
            parent = self.catalogue.stocks.get(stock.made_from.casefold())
            if parent is None or parent.key == stock.key:
                return Unknown(f"the stock `{stock.made_from}` is not known"), 0.0
            return self._measured(self.material(parent.material, parent), parent.key, needed)
        concentrate = self._concentrate(solute)
        if concentrate is not None:
            return self._measured(concentrate, concentrate.written, needed)
        molar_mass = solute.molar_mass
        if solute.state == "liquid" and solute.density is not None and molar_mass:
            exact = needed * molar_mass * 1e-3 / solute.density.value.si
            measure = self._volume(solute.name, exact)
            return measure, needed * measure.volume / exact
        if solute.state == "gas":
            return Unknown(f"no solution of {solute.name} is owned to make it from"), 0.0
        form = self._form(solute)
        if form.molar_mass is None:
            return Unknown(f"the formula of {form.name} is not known"), 0.0
        weigh = self._mass(form.name, needed * form.molar_mass * 1e-3)
        return weigh, needed * weigh.mass / weigh.exact

    def _measured(
        self, source: model.Material, name: str, needed: float
    ) -> tuple[Measure | Unknown, float]:
        held = contents(source, dim.VOLUME, 1e-3, 6)
        if isinstance(held, Missing):
            return Unknown(f"the {held.what} of {name} is not known"), 0.0
        if source.solution is not None and source.solution.source == "table":
            self.assumptions.append("densities of solutions from the table, 20 °C")
        exact = needed / held[0].moles * 1e-3
        measure = self._volume(name, exact)
        return measure, needed * measure.volume / exact

    def _by_mass(
        self, composition: model.Solution, whole: float
    ) -> tuple[tuple[Line, ...], float | None]:
        """Make a solution of a share by mass whose density is not known: both parts are weighed."""
        share = composition.strength.quantity.middle
        mass = whole * 1000.0
        self.assumptions.append("made by mass, since the density of the solution is not known")
        solute = self._mass(composition.solute.name, share * mass)
        solvent = self._mass(composition.solvent.name, (1 - share) * mass)
        reached = solute.mass / (solute.mass + solvent.mass) / share if share else None
        return (solute, solvent), reached

    def _saturated(
        self, material: model.Material, solute: Substance, solvent: Substance, whole: float
    ) -> tuple[Line, ...]:
        held = contents(material, dim.VOLUME, whole, 6)
        if isinstance(held, Missing):
            return (Unknown(f"the {held.what} of {solute.name} is not known"),)
        facts = material.solution
        mass = held[0].mass
        water = (
            whole * facts.density - mass if facts is not None and facts.density else whole * 998.2
        )
        self.assumptions.append("solubility near 20 °C; a tenth more, so that some is left")
        density = solvent.density.value.si if solvent.density is not None else 998.2
        return (
            self._mass(solute.name, mass * (1 + _EXCESS)),
            self._volume(solvent.name, water / density),
            Care("some solid must lie at the bottom when it has stood for a day", ""),
        )

    def _several(
        self,
        material: model.Material,
        solvent: Substance | None,
        whole: float,
    ) -> tuple[Line, ...]:
        held = contents(material, dim.VOLUME, whole, 6)
        if isinstance(held, Missing):
            return (Unknown(f"the {held.what} of a part is not known"),)
        lines: list[Line] = []
        for content in held:
            form = self._form(content.substance)
            if form.state == "liquid" and form.density is not None:
                lines.append(self._volume(form.name, content.mass / form.density.value.si))
            elif form.molar_mass:
                lines.append(self._mass(form.name, content.moles * form.molar_mass * 1e-3))
            else:
                lines.append(Unknown(f"the formula of {form.name} is not known"))
        lines.append(
            MakeUp(solvent.name if solvent else "water", _litres(whole), self._flask(whole))
        )
        return tuple(lines)

    def _by_volume(self, parts: tuple[model.Part, ...], whole: float) -> tuple[Line, ...]:
        total = sum(part.quantity.middle for part in parts)
        self.assumptions.append("volumes add up")
        return tuple(
            self._volume(part.substance.name, whole * part.quantity.middle / total)
            for part in parts
        )

    # ------------------------------------------------------------------ figures

    def _mass(self, name: str, exact: float) -> Weigh:
        """Round a mass to what the balance weighs; four figures are enough."""
        grams = exact * 1e3
        places = min(_places(self.laboratory.balance * 1e3), max(0, 4 - _digits(grams)))
        step = max(self.laboratory.balance * 1e3, 10.0**-places)
        rounded = round(grams / step) * step
        return Weigh(name, f"{rounded:.{places}f} g", rounded * 1e-3, exact)

    def _volume(self, name: str, exact: float) -> Measure:
        """Round a volume to what the smallest vessel that holds it can give."""
        found = self._ware(exact)
        if found is None:
            read = scan_quantity(f"{exact * 1e6:.3g} mL", 0)
            text = read.quantity.text if isinstance(read, Found) else "unknown"
            value = read.quantity.si if isinstance(read, Found) else exact
            return Measure(name, text, "", value, exact)
        ware, gives = found
        value = nearest(exact, gives)
        text = f"{value * 1e6:.{_places(gives.step * 1e6)}f} mL"
        size = ware.size.text if ware.size is not None else ""
        return Measure(name, text, f"{ware.type.name} {size}".strip(), value, exact)

    def _ware(self, volume: float) -> tuple[VesselType, Reach] | None:
        """Give the smallest measuring vessel owned that holds a volume and reads it to 2 %."""
        best: tuple[float, VesselType, Reach] | None = None
        for vessel in self._measuring():
            gives = reach(vessel)
            if gives is None or gives.fixed or not gives.least <= volume <= gives.most:
                continue
            if gives.step > 0.04 * volume:
                continue
            if best is None or gives.most < best[0]:
                best = gives.most, vessel, gives
        return (best[1], best[2]) if best is not None else None

    def _measuring(self) -> Iterator[VesselType]:
        for vessel, count in self.laboratory.glassware:
            if count and vessel.type.key in ("graduated-cylinder", "graduated-pipette"):
                yield vessel
        from watchglass.catalogue.glassware import VesselType  # noqa: PLC0415 - ordinary ware only

        for key in ("graduated-pipette", "graduated-cylinder"):
            kind = self.catalogue.glassware.get(key)
            for size in kind.sizes if kind is not None else ():
                read = scan_quantity(f"{size:g} mL", 0)
                if kind is not None and isinstance(read, Found):
                    yield VesselType(kind, kind.name, read.quantity)

    def _flask(self, whole: float) -> str:
        """Name the volumetric flask of a size, where the laboratory owns it."""
        for vessel, count in self.laboratory.glassware:
            size = vessel.size
            fits = size is not None and abs(size.si - whole) <= 1e-6 * whole
            if count and fits and size is not None and vessel.type.key == "volumetric-flask":
                return f"volumetric flask {size.text}"
        return ""

    def _cares(
        self, solute: Substance, line: Weigh | Measure, made: float, taken: float
    ) -> Iterator[Care]:
        """Give the cautions of making a solution of `made` from one of `taken`, both mol/m3."""
        concentrated = taken > _CONCENTRATED
        if concentrated and solute.key in _FUMING:
            yield Care("in the hood: the concentrated reagent fumes", PRACTICE)
        if concentrated and solute.key == "sulfuric-acid":
            yield Care(
                "acid into water, slowly, in an ice bath; never water into acid",
                "universal practice",
            )
        elif concentrated and solute.key in _ACIDS:
            yield Care("acid into water, never water into acid", "universal practice")
        if isinstance(line, Weigh) and solute.key in _HEATING and made > _WARMING:
            yield Care("a little at a time, in an ice bath: it heats as it dissolves", PRACTICE)


def _places(step: float) -> int:
    """Count the decimal places that a step needs.

    >>> _places(0.5), _places(0.02), _places(1.0), _places(10.0)
    (1, 2, 0, 0)
    """
    return len(f"{step:.6f}".rstrip("0").partition(".")[2])


def _digits(number: float) -> int:
    """Count the digits before the point; none below 1.

    >>> _digits(123.4), _digits(1.0), _digits(0.5)
    (3, 1, 0)
    """
    return len(str(int(number))) if number >= 1 else 0


def _litres(volume: float) -> str:
    """Write a volume in mL, or from a litre on in L.

    >>> _litres(1e-3), _litres(2.5e-4), _litres(2.5e-3)
    ('1 L', '250 mL', '2.5 L')
    """
    if volume >= 1e-3 * (1 - 1e-9):
        return f"{volume * 1e3:.4g} L"
    return f"{volume * 1e6:.4g} mL"
