"""Evaluating for the calculator: `run`'s evaluator over an empty procedure that holds the materials.

What a figure rests on is kept beside it, and why there is none where there is none: unknown is an
answer of its own.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding
from watchglass.read.syntax import ProcedureSyntax
from watchglass.read.terms import Call, Expression, Measured, Name
from watchglass.resolve import model
from watchglass.run.evaluate import Evaluator, NotKnown, Result, Value
from watchglass.shell.reckoning import of_solution
from watchglass.shell.reckoning.diluting import Diluted, Unclear, Weak, diluted
from watchglass.shell.reckoning.reading import DILUTION

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Source
    from watchglass.catalogue.substances import Substance
    from watchglass.shell.reckoning.names import BenchCatalogue

NO_FIGURE = "there is no such number"
_PROPERTIES = {
    "density": "density",
    "melts": "melting point",
    "boils": "boiling point",
}


@dataclass(slots=True, kw_only=True)
class Reckoner(Evaluator):
    """Evaluates one expression.

    Attributes:
        why: Why there is no figure, in words.
        assumptions: What the figure rests on beside what is written, in the order met.
        findings: What showed itself only when it was worked out.
        dilution: The last dilution worked out.
    """

    why: str = ""
    assumptions: list[str] = field(default_factory=list)
    findings: list[Finding] = field(default_factory=list)
    dilution: Diluted | None = None

    def _call(self, node: Call) -> Result:
        if node.function.text == DILUTION:
            return self._diluted(node)
        return Evaluator._call(self, node)  # noqa: SLF001 - the class above

    # ------------------------------------------------------------------ things

    def _of_thing(self, name: str, thing: Expression) -> Result:
        material, quantity = self._parted(thing)
        if material is None:
            return NotKnown("data")
        found = self._asked(name, thing, material, quantity)
        if isinstance(found, NotKnown):
            self.why = self.why or self._missing(name, material, quantity)
        else:
            self._assume(name, material, quantity)
        return found

    def _parted(self, thing: Expression) -> tuple[model.Material | None, Quantity | None]:
        match thing:
            case Call(Name("amount"), (Measured(quantity, _), Name() as of), _):
                return self.procedure.materials.get(of.text), quantity
            case Name(text, _, _):
                return self.procedure.materials.get(text), None
            case _:
                return None, None

    def _asked(
        self, name: str, thing: Expression, material: model.Material, quantity: Quantity | None
    ) -> Result:
        """Ask the evaluator of procedures; mass and volume of a solution are its own, not the solute's."""
        if isinstance(material.composition, model.Solution | model.Saturated):
            if name == "strength":
                return self._concentration(material)
            if name == "density":
                return of_solution.density(material)
            if name in ("mass", "volume") and quantity is not None:
                return of_solution.measured(name, material, quantity, self._concentration(material))
        return Evaluator._of_thing(self, name, thing)  # noqa: SLF001 - the class above

    def _concentration(self, material: model.Material) -> Result:
        """Give mol/L of a solution, by its density where that is needed."""
        found = self._strength(material)
        return of_solution.concentration(material) if isinstance(found, NotKnown) else found

    def _missing(self, name: str, material: model.Material, quantity: Quantity | None) -> str:
        """Say what is not known."""
        substance = _substance_of(material)
        called = substance.name if substance else material.written
        pure = isinstance(material.composition, model.Pure)
        if name in _PROPERTIES and (pure or name != "density"):
            return f"the catalogue has no {_PROPERTIES[name]} of {called}"
        if substance is not None and substance.molar_mass is None:
            return _without_molar_mass(substance)
        if quantity is not None and quantity.dimension == dim.COUNT:
            return f"how much one of `{quantity.text}` holds is not known"
        if isinstance(material.composition, model.Saturated) and material.solution is None:
            return f"the catalogue does not say how much {called} a saturated solution holds"
        if pure:
            return f"the catalogue has no density of {called}"
        return f"no density is known of `{material.written}`"

    def _assume(self, name: str, material: model.Material, quantity: Quantity | None) -> None:
        """Note the figures of the catalogue that an answer rests on; molar masses are no assumption."""
        substance = _substance_of(material)
        if substance is None:
            return
        if name in ("melts", "boils"):
            self._note(_read_as(material, substance))
            self._note(substance.source(name))
        elif not isinstance(material.composition, model.Pure):
            if isinstance(material.composition, model.Saturated):
                self._note(f"as much {substance.name} as the catalogue says dissolves")
            self._note(of_solution.rests_on(name, material, quantity))
        else:
            volume = quantity is not None and quantity.dimension == dim.VOLUME
            if name == "density" or (name == "volume") != volume:
                self._note(_read_as(material, substance))
                self._rests_on_density(substance, alone=name == "density")

    def _rests_on_density(self, substance: Substance, *, alone: bool) -> None:
        if substance.density is None:
            return
        value, at = substance.density
        where = f"at {at.text}" if at else "at an unsaid temperature"
        if alone:
            source = substance.source("density")
            self._note(f"{substance.name} {where}" + (f"; {source}" if source else ""))
        else:
            self._note(f"density of {substance.name} {value.text} {where}")

    def _note(self, words: str) -> None:
        if words and words not in self.assumptions:
            self.assumptions.append(words)

    # ------------------------------------------------------------------ dilutions

    def _diluted(self, node: Call) -> Result:
        stock, strength, made = node.arguments
        material, _ = self._parted(stock)
        target, whole = self.value(strength), self.value(made)
        if material is None or isinstance(target, NotKnown) or isinstance(whole, NotKnown):
            return NotKnown("data")
        found = diluted(material, target, whole, self._concentration)
        match found:
            case Weak():
                self.findings.append(
                    Finding(
                        code=codes.FUNCTION_UNFIT,
                        span=strength.span,
                        message=f"`{strength.span.text}` is stronger than the stock, "
                        f"`{material.written}`",
                        help="take a stronger stock, or make a weaker solution",
                    )
                )
                return NotKnown("data")
            case Unclear(why):
                self.why = why or self._missing("strength", material, None)
                return NotKnown("data")
            case Diluted(taken, _):
                self.dilution = found
                self._assume_of_dilution(material, target, taken)
                return taken

    def _assume_of_dilution(self, material: model.Material, target: Value, taken: Value) -> None:
        """Note a density that turned one strength into another, or a mass into a volume."""
        match material.composition:
            case _ if taken.dimension != dim.VOLUME:
                pass
            case model.Pure(substance) if target.dimension != dim.VOLUME_FRACTION:
                self._rests_on_density(substance, alone=False)
            case model.Solution(strength, _, _) if strength.quantity.dimension != target.dimension:
                self._note(of_solution.rests_on(DILUTION, material, None))
            case _:
                pass


def reckoner(
    source: Source, materials: Mapping[str, model.Material], catalogue: BenchCatalogue
) -> Reckoner:
    """Make an evaluator over nothing but some materials."""
    procedure = model.Procedure(
        syntax=ProcedureSyntax(source=source, front=None, front_broken=False, body=(), marks=0),
        body=(),
        head=model.Head(title="", code=""),
        materials=materials,
        vessels={},
        equipment={},
        reactions={},
        steps=(),
        records=(),
        expectations=(),
        acceptances=(),
        intended=(),
        names=dict.fromkeys(materials, "material"),
    )
    return Reckoner(procedure=procedure, usage={}, catalogue=catalogue, records={})


def _substance_of(material: model.Material) -> Substance | None:
    match material.composition:
        case model.Pure(substance):
            return substance
        case model.Solution(_, solute, _) | model.Saturated(solute, _):
            return solute
        case _:
            return None


def _read_as(material: model.Material, substance: Substance) -> str:
    """Say which substance a formula was taken for."""
    formula = substance.formula
    if formula is not None and material.written not in (*substance.names, substance.key):
        from watchglass.chemistry.formulas import Formula, parse_formula  # noqa: PLC0415 - rare

        if isinstance(parse_formula(material.written), Formula):
            return f"`{material.written}` read as {substance.name}"
    return ""


def _without_molar_mass(substance: Substance) -> str:
    if substance.formula is None:
        return f"the catalogue has no formula of {substance.name}"
    weightless = ", ".join(substance.formula.weightless)
    return f"{weightless} has no standard atomic weight"
