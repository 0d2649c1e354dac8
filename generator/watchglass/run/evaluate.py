"""Evaluating expressions: figures that need no bench now; what needs one is unknown, and says so.

Values carry SI numbers, a dimension and the figures they may show. `mass(standard)` is what one
pass takes: a figure named in a step means that step's latest pass.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.base.figures import CATALOGUE_FIGURES, MOST_FIGURES
from watchglass.base.scan import Found, scan_quantity
from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.read.syntax import Measured, Name, Words
from watchglass.read.terms import Binary, Call, Expression, Negative
from watchglass.resolve import model
from watchglass.run.content import Content, contents
from watchglass.run.usage import Use

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.dimensions import Dimension
    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.substances import Substance
    from watchglass.run.usage import Usage


@dataclass(frozen=True, slots=True)
class Value:
    """A number in SI units with its dimension and figures."""

    si: float
    dimension: Dimension
    figures: int


@dataclass(frozen=True, slots=True)
class NotKnown:
    """Why there is no value: `bench` (it needs the bench), `measured`, `data`, `words`."""

    why: str


Result = Value | NotKnown
_NEEDS_BENCH = frozenset(("recovered", "fraction", "ph", "titre", "label", "step", "balance"))
_ONE_ARGUMENT = {"ln": math.log, "log": math.log10, "sqrt": math.sqrt}


@dataclass(slots=True)
class Evaluator:
    """Evaluates expressions of one procedure; `records` gives the expected values so far."""

    procedure: model.Procedure
    usage: Mapping[str, Usage]
    catalogue: Catalogue
    records: dict[str, Result]

    def value(self, node: Expression) -> Result:
        """Evaluate an expression; unknown where any part is."""
        match node:
            case Measured(quantity, _):
                figures = MOST_FIGURES if quantity.dimension == dim.NUMBER else quantity.figures
                return Value(quantity.middle, quantity.dimension, figures)
            case Name(text, _, _):
                return self.records.get(text, NotKnown("measured"))
            case Negative(operand, _):
                found = self.value(operand)
                return (
                    Value(-found.si, found.dimension, found.figures)
                    if isinstance(found, Value)
                    else found
                )
            case Binary():
                return self._binary(node)
            case Call():
                return self._call(node)
            case _:
                return NotKnown("bench")

    def _binary(self, node: Binary) -> Result:
        left, right = self.value(node.left), self.value(node.right)
        if isinstance(left, NotKnown):
            return left
        if isinstance(right, NotKnown):
            return right
        figures = min(left.figures, right.figures)
        try:
            match node.operator:
                case "+":
                    return _sum(left, right, 1)
                case "-":
                    return _sum(left, right, -1)
                case "*":
                    return Value(left.si * right.si, left.dimension.times(right.dimension), figures)
                case "/":
                    return Value(left.si / right.si, left.dimension.over(right.dimension), figures)
                case _:
                    raised = left.si**right.si
                    if isinstance(raised, complex):
                        return NotKnown("data")
                    power = left.dimension.power(round(right.si))
                    return Value(raised, power, left.figures)
        except (ZeroDivisionError, OverflowError, ValueError):
            return NotKnown("data")

    def _call(self, node: Call) -> Result:
        name = (
            node.function.text.lower() if node.function.text.lower() == "ph" else node.function.text
        )
        if name in _NEEDS_BENCH:
            return NotKnown("bench")
        if name in ("mean", "min", "max", "ln", "log", "sqrt", "round"):
            return self._arithmetic(name, node)
        if name == "theoretical-yield":
            return self._theoretical_yield(node.arguments[0])
        if name == "convert":
            return self.value(node.arguments[0])
        if not node.arguments:
            return NotKnown("data")
        return self._of_thing(name, node.arguments[0])

    def _arithmetic(self, name: str, node: Call) -> Result:
        values = [self.value(argument) for argument in node.arguments]
        known = [value for value in values if isinstance(value, Value)]
        if len(known) < len(values) or not known:
            return next((v for v in values if isinstance(v, NotKnown)), NotKnown("data"))
        first = known[0]
        figures = min(value.figures for value in known)
        numbers = [value.si for value in known]
        try:
            if name == "mean":
                return Value(sum(numbers) / len(numbers), first.dimension, figures)
            if name in ("min", "max"):
                return Value({"min": min, "max": max}[name](numbers), first.dimension, figures)
            if name == "round":
                return Value(round(first.si, round(numbers[1])), first.dimension, first.figures)
            dimension = dim.NUMBER
            if name == "sqrt":
                dimension = dim.named(tuple(e // 2 for e in first.dimension.exponents))
            return Value(_ONE_ARGUMENT[name](first.si), dimension, figures)
        except (ValueError, OverflowError, IndexError):
            return NotKnown("data")

    # ------------------------------------------------------------------ things

    def _of_thing(self, name: str, thing: Expression) -> Result:
        if name == "molar-mass":
            return self._molar_mass(thing)
        if name in ("density", "melts", "boils"):
            return self._property(name, thing)
        component = self._component(thing)
        if component is not None:
            return self._from_content(name, component)
        taken = self._taken(thing)
        if isinstance(taken, NotKnown):
            return taken
        return self._measure(name, *taken)

    def _component(self, thing: Expression) -> Content | None:
        """Give what one pass takes of a substance that stands in just one mixture."""
        if not isinstance(thing, Name) or thing.text in self.procedure.names:
            return None
        substance = self.catalogue.find(thing.text)
        held = []
        for material in self.procedure.materials.values():
            if substance is None or not isinstance(material.composition, model.Mixture):
                continue
            taken = self._taken(Name(material.name, thing.span))
            if isinstance(taken, NotKnown):
                continue
            held += [c for c in self._contents(*taken) if c.substance.key == substance.key]
        return held[0] if len(held) == 1 else None

    def _contents(self, material: model.Material, use: Use) -> tuple[Content, ...]:
        quantity = use.quantity or material.provided
        if quantity is None or use.of_all in ("half", "rest"):
            return ()
        found = contents(material, quantity.dimension, quantity.middle, quantity.figures)
        return found if isinstance(found, tuple) else ()

    def _substance(self, thing: Expression) -> Substance | None:
        text = thing.text if isinstance(thing, Name | Words) else ""
        material = self.procedure.materials.get(text)
        if material is not None:
            match material.composition:
                case (
                    model.Pure(substance)
                    | model.Solution(_, substance, _)
                    | model.Saturated(substance, _)
                ):
                    return substance
                case _:
                    return None
        return self.catalogue.find(text) if text else None

    def _molar_mass(self, thing: Expression) -> Result:
        substance = self._substance(thing)
        formula = substance.formula if substance else None
        if formula is None and isinstance(thing, Name | Words):
            read = parse_formula(thing.text)
            formula = read if isinstance(read, Formula) else None
        mass = formula.molar_mass if formula else None
        if mass is None:
            return NotKnown("data")
        return Value(mass * 1e-3, dim.MOLAR_MASS, CATALOGUE_FIGURES)

    def _property(self, name: str, thing: Expression) -> Result:
        material = self.procedure.materials.get(thing.text) if isinstance(thing, Name) else None
        if name == "density" and material is not None:
            whole = _density(material)
            if whole is not None or not isinstance(material.composition, model.Pure):
                return whole or NotKnown("data")  # never that of what is dissolved in it
        substance = self._substance(thing)
        if substance is None:
            return NotKnown("data")
        if name == "density":
            at = substance.density
            quantity = at.value if at else None
        else:
            quantity = substance.melts if name == "melts" else substance.boils
        if quantity is None:
            return NotKnown("data")
        return Value(quantity.middle, quantity.dimension, quantity.figures)

    def _taken(self, thing: Expression) -> tuple[model.Material, Use] | NotKnown:
        """Give the material and the one portion of it that a pass takes, or a stated amount."""
        match thing:
            case Call(Name("amount"), (Measured(quantity, span), Name() as of), _):
                material = self.procedure.materials.get(of.text) or self._loose(of)
                return (material, Use(quantity, "", 0, span)) if material else NotKnown("data")
            case Name(text, _, _):
                material = self.procedure.materials.get(text)
                used = self.usage.get(text)
                if material is None or used is None or not used.uses:
                    return NotKnown(
                        "bench" if self.procedure.names.get(text) == "label" else "data"
                    )
                if used.unsummed or len(used.uses) > 1:
                    return NotKnown("bench")
                return material, used.uses[0]
            case _:
                return NotKnown("bench")

    def _loose(self, of: Name) -> model.Material | None:
        substance = self.catalogue.find(of.text)
        if substance is None:
            return None
        return model.Material(
            name=of.text,
            written=of.text,
            composition=model.Pure(substance),
            span=of.span,
            value_span=of.span,
        )

    def _measure(self, name: str, material: model.Material, use: Use) -> Result:
        quantity = use.quantity or material.provided
        if quantity is None:
            return NotKnown("data")
        share = {"half": 0.5, "rest": math.nan}.get(use.of_all, 1.0)
        if math.isnan(share):
            return NotKnown("bench")
        value = quantity.middle * share
        if (name, quantity.dimension) in (("mass", dim.MASS), ("volume", dim.VOLUME)):
            return Value(value, quantity.dimension, quantity.figures)
        if name == "strength":
            return self._strength(material)
        if name != "moles" and isinstance(material.composition, model.Solution | model.Saturated):
            return _of_solution(name, material, value, quantity)  # not of what is dissolved in it
        found = contents(material, quantity.dimension, value, quantity.figures)
        if not isinstance(found, tuple) or len(found) != 1:
            return NotKnown("data")
        return self._from_content(name, found[0])

    def _from_content(self, name: str, content: Content) -> Result:
        if name == "moles":
            return Value(content.moles, dim.AMOUNT, content.figures)
        if name == "mass":
            return Value(content.mass, dim.MASS, content.figures)
        density = content.substance.density
        if name == "volume" and density is not None:
            return Value(content.mass / density.value.si, dim.VOLUME, content.figures)
        return NotKnown("data")

    def _strength(self, material: model.Material) -> Result:
        """Give the amount of solute in a volume of a solution, by its density where that is needed."""
        if not isinstance(material.composition, model.Solution | model.Saturated):
            return NotKnown("data")
        held = contents(material, dim.VOLUME, 1.0, MOST_FIGURES)
        if not isinstance(held, tuple):
            return NotKnown("data")
        return Value(held[0].moles, dim.CONCENTRATION, held[0].figures)

    def _theoretical_yield(self, node: Expression) -> Result:
        """Mass of a product, named itself or by its reaction, at full conversion of what limits."""
        from watchglass.run.yields import makers, most_formed  # noqa: PLC0415 - they stand above

        name = node.text if isinstance(node, Name | Words) else ""
        if name not in self.procedure.names and (substance := self.catalogue.find(name)):
            name = substance.key
        found = makers(name, self.procedure)
        if len(found) != 1:
            return NotKnown("data")
        formed = most_formed(*found[0], self.procedure, self.usage)
        if formed is None or formed.mass is None:
            return NotKnown("data")
        return Value(formed.mass, dim.MASS, formed.figures)


def _density(material: model.Material) -> Value | None:
    """Give the density of a material as a whole, where it is given or a table has it."""
    facts = material.solution
    if facts is None or facts.density is None:
        return None
    return Value(facts.density, dim.MASS_CONCENTRATION, facts.figures)


def _of_solution(name: str, material: model.Material, value: float, measured: Quantity) -> Result:
    """Give the volume of a mass of a solution, or the mass of a volume."""
    whole = _density(material)
    wanted = dim.MASS if name == "mass" else dim.VOLUME
    if whole is None or {measured.dimension, wanted} != {dim.MASS, dim.VOLUME}:
        return NotKnown("data")
    found = value * whole.si if wanted == dim.MASS else value / whole.si
    return Value(found, wanted, min(measured.figures, whole.figures))


def _place(value: Value) -> int | None:
    """Give the power of ten, in SI units, of the last figure of a value; None for an exact number."""
    if value.dimension.plain and value.figures >= MOST_FIGURES:
        return None
    size = _size(value)
    return math.floor(math.log10(size) + 1e-9) - value.figures + 1 if size > 0 else None


def _size(value: Value) -> float:
    """Give the size that a value's figures are counted on: of a temperature its degrees Celsius."""
    return abs(value.si - 273.15) if value.dimension == dim.TEMPERATURE else abs(value.si)


def _sum(left: Value, right: Value, sign: int) -> Value:
    """Add or take away: the last figure is that of the coarser of the two."""
    points = left.dimension == right.dimension == dim.TEMPERATURE
    total = Value(
        left.si + sign * right.si,
        dim.DIFFERENCE if points and sign < 0 else left.dimension,
        MOST_FIGURES,
    )
    known = [place for place in (_place(left), _place(right)) if place is not None]
    size = _size(total)
    if not known:
        figures = min(left.figures, right.figures)
    elif size <= 0:
        figures = 1
    else:
        figures = max(1, min(MOST_FIGURES, math.floor(math.log10(size) + 1e-9) - max(known) + 1))
    return Value(total.si, total.dimension, figures)


def in_unit(value: Value, symbol: str) -> float | None:
    """Give a value in a unit; None where the unit does not fit it."""
    if not symbol:
        return value.si
    found = scan_quantity("1 " + symbol, 0)
    if (
        not isinstance(found, Found)
        or found.quantity.dimension.exponents != value.dimension.exponents
    ):
        return None
    unit = found.quantity.unit
    return (value.si - unit.offset) / unit.factor
