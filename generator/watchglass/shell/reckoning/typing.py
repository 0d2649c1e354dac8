"""Typing of the calculator's expressions: what marks may hold, less what needs a procedure."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding, did_you_mean
from watchglass.base.scan import Found, scan_quantity, unknown_unit
from watchglass.read.terms import Call, Compare, Expression, Measured, Name, Within, Words
from watchglass.resolve import model
from watchglass.resolve.laboratory import Laboratory
from watchglass.resolve.scope import Scope
from watchglass.resolve.typing import FUNCTIONS, Typer
from watchglass.shell.reckoning.reading import DILUTION, OF_PROCEDURES, OF_THINGS

if TYPE_CHECKING:
    from watchglass.base.dimensions import Dimension
    from watchglass.base.findings import Code
    from watchglass.base.spans import Span
    from watchglass.shell.reckoning.names import BenchCatalogue
    from watchglass.shell.reckoning.reading import Asked

#: What can be asked without a procedure, in the order of the notation.
FUNCTIONS_HERE = (*(name for name in FUNCTIONS if name not in OF_PROCEDURES), DILUTION)
_NEED_AMOUNTS = ("moles", "mass", "volume")
_NO_AMOUNTS = ("molar-mass", "density", "melts", "boils")
_EXAMPLES = {
    "moles": "moles(2.00 g benzoic-acid)",
    "mass": "mass(25 mmol sodium-chloride)",
    "volume": "volume(0.10 mol ethanol)",
    "strength": "strength(5.0 % w/v sodium-chloride)",
    DILUTION: "dilution(12 M hydrochloric acid, 3.0 M, 250 mL)",
}


def typed(asked: Asked, catalogue: BenchCatalogue) -> tuple[Finding, ...]:
    """Check the functions and dimensions of what was read, and the unit it is to be given in."""
    expression = asked.expression
    if expression is None:
        return ()
    scope = Scope(catalogue, Laboratory(), broken=False)
    typer = _BenchTyper(scope, asked, catalogue)
    if isinstance(expression, Compare | Within | Words):
        said = (
            "words have no figure"
            if isinstance(expression, Words)
            else "a comparison has no figure"
        )
        typer.refuse(codes.EXPRESSION_NOT_READ, expression.span, said, "write one side of it alone")
        return tuple(scope.findings)
    dimension = typer.type(expression)
    if asked.unit is not None:
        typer.unit_fits(dimension, asked.unit)
    return tuple(scope.findings)


class _BenchTyper(Typer):
    """Types without records, vessels or reactions."""

    def __init__(self, scope: Scope, asked: Asked, catalogue: BenchCatalogue) -> None:
        super().__init__(scope, {})
        self.asked = asked
        self.catalogue = catalogue

    def refuse(self, code: Code, span: Span, message: str, help_: str | None) -> None:
        """Add a finding."""
        self.scope.findings.append(Finding(code=code, span=span, message=message, help=help_))

    # ------------------------------------------------------------------ names

    def _name(self, name: Name) -> Dimension | None:
        substance = self.catalogue.find(name.text)
        if name.text in FUNCTIONS_HERE:
            example = _EXAMPLES.get(name.text) or FUNCTIONS[name.text].example
            self.refuse(
                codes.EXPRESSION_NOT_READ,
                name.span,
                f"`{name.text}` is a function and takes something in parentheses",
                f"write it as in `{example}`",
            )
        elif substance is not None:
            self.refuse(
                codes.NAME_OF_OTHER_KIND,
                name.span,
                f"`{name.text}` is a substance; a quantity belongs here",
                f"say what is asked of it, as in `molar-mass({name.text})`",
            )
        else:
            self.refuse(
                codes.NAME_UNKNOWN,
                name.span,
                f"`{name.text}` is no quantity",
                did_you_mean(name.text, FUNCTIONS_HERE)
                or "write a number with its unit, or a function such as `moles(2.00 g benzoic-acid)`",
            )
        return None

    def _thing(self, node: Expression) -> None:
        """Check no names: materials were looked up where they were read."""
        if isinstance(node, Measured):
            self._unfit_here(
                node.span,
                f"`{node.span.text}` does not say of what",
                f"write it as in `{_EXAMPLES['moles']}`",
            )

    # ------------------------------------------------------------------ functions

    def _call(self, node: Call) -> Dimension | None:
        name = node.function.text
        if name.lower() in OF_PROCEDURES:
            self.refuse(
                codes.FUNCTION_UNFIT,
                node.span,
                f"`{name}` needs a procedure; it is not assessed here",
                f"write it in a procedure, as in `{{= {FUNCTIONS[name.lower()].example}}}`",
            )
            return None
        if name == "amount":
            return None
        if name not in FUNCTIONS_HERE:
            self.refuse(
                codes.FUNCTION_UNKNOWN,
                node.function.span,
                f"`{name}` is no function",
                did_you_mean(name, FUNCTIONS_HERE)
                or "take one of " + ", ".join(f"`{f}`" for f in FUNCTIONS_HERE),
            )
            return None
        if name == DILUTION:
            return self._dilution(node)
        if name == "balance" and node is not self.asked.expression:
            self.refuse(
                codes.FUNCTION_UNFIT,
                node.span,
                "an equation has no figure to go on with",
                "let `balance(…)` stand alone",
            )
            return None
        if name in OF_THINGS and len(node.arguments) == 1:
            self._of_thing(name, node.arguments[0])
        return super()._call(node)

    def _of_thing(self, name: str, thing: Expression) -> None:
        """Ask for an amount where one is needed, and refuse one where none belongs."""
        match thing:
            case Call(_, (amount, of), _) if name in _NO_AMOUNTS:
                self._unfit_here(
                    amount.span,
                    f"`{name}` takes a substance, not an amount of one",
                    f"write `{name}({of.span.text})`",
                )
            case Name() if self._unread(thing):
                pass
            case Name(_, span, _) if name in _NEED_AMOUNTS:
                self._unfit_here(
                    span,
                    f"`{span.text}` does not say how much",
                    f"write the amount before it, as in `{_EXAMPLES[name]}`",
                )
            case Name(text, span, _) if name == "strength":
                if isinstance(self.asked.materials[text].composition, model.Pure):
                    self._unfit_here(
                        span,
                        f"`{span.text}` is no solution and has no strength",
                        f"write its strength, as in `{_EXAMPLES[name]}`",
                    )
            case _:
                pass

    def _unread(self, thing: Name) -> bool:
        """Tell whether a material could not be read, which is found already."""
        composition = self.asked.materials[thing.text].composition
        return isinstance(composition, model.Unknown) and not composition.declared

    def _dilution(self, node: Call) -> Dimension | None:
        if len(node.arguments) != 3:
            self._unfit_here(
                node.span,
                f"`{DILUTION}` takes a stock, a strength and a volume, each after a comma and a blank",
                f"write it as in `{_EXAMPLES[DILUTION]}`",
            )
            return None
        stock, strength, made = node.arguments
        if not isinstance(stock, Name):
            self._unfit_here(
                stock.span,
                "the stock is what the bottle holds, without an amount",
                f"write it as in `{_EXAMPLES[DILUTION]}`",
            )
            return None
        target, whole = self.type(strength), self.type(made)
        by_mass = target == dim.MASS_FRACTION
        strengths = (
            dim.CONCENTRATION,
            dim.MASS_CONCENTRATION,
            dim.VOLUME_FRACTION,
            dim.MASS_FRACTION,
        )
        if target is not None and target not in strengths:
            self.refuse(
                codes.DIMENSION_WRONG,
                strength.span,
                f"`{strength.span.text}` is {target.words}; a strength belongs here",
                "write the strength that is to be made, as in `3.0 M`",
            )
            return None
        wanted = dim.MASS if by_mass else dim.VOLUME
        if whole is not None and target is not None and whole != wanted:
            self.refuse(
                codes.DIMENSION_WRONG,
                made.span,
                f"`{made.span.text}` is {whole.words}; {wanted.words} belongs here",
                "write the mass that is to be made, as in `250 g`"
                if by_mass
                else "write the volume that is to be made, as in `250 mL`",
            )
        return wanted

    # ------------------------------------------------------------------ units

    def unit_fits(self, dimension: Dimension | None, unit: Name) -> None:
        """Check the unit after `in` against what the value measures."""
        found = scan_quantity("1 " + unit.text, 0)
        if unit.text == "1":
            wanted = dim.NUMBER
        elif isinstance(found, Found):
            wanted = found.quantity.dimension
        else:
            fault = unknown_unit(unit.text, unit.span.start)
            self.refuse(fault.code, unit.span, fault.message, fault.help)
            return
        if dimension is None:
            return
        difference = wanted == dim.TEMPERATURE and dimension == dim.DIFFERENCE
        if wanted.exponents != dimension.exponents or difference:
            self.refuse(
                codes.DIMENSION_WRONG,
                unit.span,
                f"the value is {dimension.words}; `{unit.text}` is the unit of {wanted.words}",
                "write `in K` for a difference"
                if difference
                else "name a unit of the value, or mend the expression",
            )

    def _unfit_here(self, span: Span, message: str, help_: str) -> None:
        self.refuse(codes.FUNCTION_UNFIT, span, message, help_)
