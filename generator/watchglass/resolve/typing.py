"""Typing of expressions: names bound, functions known, dimensions that go together.

The table of functions is the documented list of the notation. A dimension of None is one that
cannot be known (a finding stands already, or the function's value has none): it offends nobody.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding, did_you_mean
from watchglass.base.scan import Found, scan_quantity, unknown_unit
from watchglass.read.syntax import Measured, Name, Words
from watchglass.read.terms import After, Binary, Call, Compare, Expression, Held, Negative, Within

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.dimensions import Dimension
    from watchglass.base.findings import Code
    from watchglass.base.spans import Span
    from watchglass.resolve.scope import Scope


class Function(NamedTuple):
    """One function: what its arguments are, and the dimension of its value.

    Arguments: `thing` (a material or substance), `held` (`X in V`), `vessel`, `reaction`, `yield` (a
    reaction, or what it makes), `label`, `step`, `number`, `value`, `same…` (one or more values of one dimension), `equation`, `unit`.
    """

    arguments: tuple[str, ...]
    gives: Dimension | None
    example: str


FUNCTIONS: dict[str, Function] = {
    "moles": Function(("thing",), dim.AMOUNT, "moles(acid)"),
    "mass": Function(("thing",), dim.MASS, "mass(acid)"),
    "volume": Function(("thing",), dim.VOLUME, "volume(acid)"),
    "strength": Function(("thing",), dim.CONCENTRATION, "strength(acid)"),
    "molar-mass": Function(("thing",), dim.MOLAR_MASS, 'molar-mass("CuSO4·5H2O")'),
    "density": Function(("thing",), dim.MASS_CONCENTRATION, "density(ether)"),
    "theoretical-yield": Function(("yield",), dim.MASS, "theoretical-yield(ester)"),
    "limiting": Function(("reaction",), None, "limiting(ester)"),
    "recovered": Function(("held",), dim.MASS, "recovered(ester in receiver)"),
    "fraction": Function(("held",), dim.SHARE, "fraction(ester in receiver)"),
    "ph": Function(("vessel",), dim.NUMBER, "ph(flask)"),
    "titre": Function(("label",), dim.VOLUME, "titre(end)"),
    "melts": Function(("thing",), dim.TEMPERATURE, "melts(benzoic-acid)"),
    "boils": Function(("thing",), dim.TEMPERATURE, "boils(ether)"),
    "mean": Function(("same…",), None, "mean(a, b)"),
    "min": Function(("same…",), None, "min(a, b)"),
    "max": Function(("same…",), None, "max(a, b)"),
    "ln": Function(("number",), dim.NUMBER, "ln(2)"),
    "log": Function(("number",), dim.NUMBER, "log(2)"),
    "sqrt": Function(("value",), None, "sqrt(2)"),
    "round": Function(("value", "number"), None, "round(v, 2)"),
    "label": Function(("label",), None, "label(end)"),
    "step": Function(("label",), dim.NUMBER, "step(end)"),
    "balance": Function(("equation",), None, "balance(H2 + O2 -> H2O)"),
    "convert": Function(("value", "unit"), None, "convert(v, mL)"),
}
_SPELLED = {"pH": "ph", "PH": "ph", "Ph": "ph"}


class Typer:
    """Types expressions in one procedure; findings go to the scope."""

    def __init__(self, scope: Scope, records: Mapping[str, Dimension | None]) -> None:
        """Type by a scope and the dimensions of the records known so far."""
        self.scope = scope
        self.records = records

    def type(self, node: Expression) -> Dimension | None:
        """Give the dimension of an expression's value; None where it cannot be known."""
        match node:
            case Measured(quantity, _):
                return quantity.dimension
            case Words():
                return None
            case Name():
                return self._name(node)
            case Negative(operand, span):
                of = self.type(operand)
                if of == dim.TEMPERATURE:
                    self._clash(span, "a temperature point has no negative")
                return of
            case Binary():
                return self._binary(node)
            case Call():
                return self._call(node)
            case Compare(_, left, right, span):
                self._share(left, right)
                self._same(self.type(left), self.type(right), span, "are compared")
                return None
            case Within(operand, interval, span):
                self._share(operand, interval)
                self._same(self.type(operand), interval.quantity.dimension, span, "are compared")
                return None
            case Held():
                self._held(node)
                return dim.SHARE
            case After(operand, state, _):
                self._state(state)
                return self.type(operand)

    # ------------------------------------------------------------------ names

    def _name(self, name: Name) -> Dimension | None:
        if name.text in self.records:
            self.scope.used.add(name.text)
            return self.records[name.text]
        kind = self.scope.take(name, ("record",), "a record or a quantity")
        del kind
        return None

    def _thing(self, node: Expression) -> None:
        match node:
            case Name(_, _, True) | Words():
                pass  # a name or formula in quotes is looked up where it is evaluated
            case Name():
                self.scope.take(node, ("material", "substance", "label", "vessel"), "a material")
            case Call(Name("amount"), (_, Name() as thing), _):
                self.scope.take(thing, ("material", "substance"))
            case Held():
                self._held(node)
            case Measured(quantity, span):
                self._unfit(span, f"`{quantity.text}` does not say of what", "moles")
            case _:
                self.type(node)

    def _held(self, node: Held) -> None:
        if isinstance(node.substance, Name) and not node.substance.quoted:
            self.scope.take(node.substance, ("material", "substance"))
        elif not isinstance(node.substance, Name | Words):
            self._unfit(node.substance.span, "a substance stands before `in`", "fraction")
        self._of_kind(node.vessel, "vessel")

    def _state(self, node: Expression) -> None:
        match node:
            case Call(Name("label"), (Name() as label,), _):
                self.scope.take(label, ("label",))
            case _:
                self._unfit(node.span, "`after` takes a label, as in `after label(end)`", "label")

    def _of_kind(self, node: Expression, kind: str) -> None:
        if isinstance(node, Name):
            self.scope.take(node, (kind,))
        elif isinstance(node, Call) and node.function.text == "label" and kind == "label":
            self._state(node)
        else:
            self._unfit(node.span, f"the name of a {kind} belongs here", None)

    def _of_yield(self, node: Expression) -> None:
        """Take a reaction, or a product by its local name, its key, or any name in quotes."""
        if isinstance(node, Words) or (isinstance(node, Name) and node.quoted):
            return
        if isinstance(node, Name):
            kinds = ("reaction", "material", "substance")
            self.scope.take(node, kinds, "a reaction or its product")
        else:
            self._unfit(node.span, "the name of a reaction or of its product belongs here", None)

    # ------------------------------------------------------------------ operators

    def _binary(self, node: Binary) -> Dimension | None:
        left, right = self.type(node.left), self.type(node.right)
        if node.operator == "^":
            return self._power(node, left, right)
        if left is None or right is None:
            return None
        if node.operator in "+-":
            return self._sum(node, left, right)
        if dim.TEMPERATURE in (left, right):
            self._clash(node.span, "a temperature point is neither multiplied nor divided")
            return None
        return left.times(right) if node.operator == "*" else left.over(right)

    def _sum(self, node: Binary, left: Dimension, right: Dimension) -> Dimension | None:
        if left == right == dim.TEMPERATURE:
            if node.operator == "-":
                return dim.DIFFERENCE
            self._clash(
                node.span, "two temperature points cannot be added", "add a difference in K"
            )
            return None
        if left == dim.TEMPERATURE and right.exponents == left.exponents:
            return left
        verb = "are added" if node.operator == "+" else "are taken from each other"
        return left if self._same(left, right, node.span, verb) else None

    def _share(self, left: Expression, right: Expression) -> None:
        """What of a substance is somewhere is a share of at most the whole, written with `%`."""
        while isinstance(left, After):
            left = left.operand
        if not (isinstance(left, Held) and isinstance(right, Measured)):
            return
        quantity = right.quantity
        if quantity.dimension == dim.NUMBER:
            self._add(
                codes.UNIT_MISSING,
                right.span,
                f"`{quantity.text}` is no share of a substance",
                f"write `{quantity.text} %`",
            )
        elif quantity.dimension == dim.SHARE and quantity.si_high > 1:
            self._add(
                codes.SHARE_ABOVE_ONE,
                right.span,
                f"`{quantity.text}` is more than the whole",
                "give a share of at most 100 %",
            )

    def _same(self, left: Dimension | None, right: Dimension | None, span: Span, verb: str) -> bool:
        if left is None or right is None:
            return True
        point = (left == dim.TEMPERATURE) == (right == dim.TEMPERATURE)
        if left.exponents == right.exponents and point:
            return True
        help_ = None
        pair = {left.exponents, right.exponents}
        if pair == {dim.MASS.exponents, dim.VOLUME.exponents}:
            help_ = "turn one into the other through a density"
        elif pair == {dim.MASS.exponents, dim.AMOUNT.exponents}:
            help_ = "turn one into the other through a molar mass, as in `moles(…)`"
        self._clash(span, f"{left.words} and {right.words} {verb}", help_)
        return False

    def _power(
        self, node: Binary, left: Dimension | None, right: Dimension | None
    ) -> Dimension | None:
        exponent = node.right
        if right is not None and not right.plain:
            self._clash(node.right.span, f"{right.words} is no exponent")
            return None
        sign = 1
        if isinstance(exponent, Negative):
            sign, exponent = -1, exponent.operand
        if left is None or left.plain:
            return dim.NUMBER if left else None
        if isinstance(exponent, Measured) and exponent.quantity.number.value.is_integer():
            return left.power(sign * int(exponent.quantity.number.value))
        self._clash(node.span, f"{left.words} is raised to a power that is no whole number")
        return None

    # ------------------------------------------------------------------ functions

    def _call(self, node: Call) -> Dimension | None:
        name = _SPELLED.get(node.function.text, node.function.text)
        if name == "amount":
            self._thing(node)
            return None
        function = FUNCTIONS.get(name)
        if function is None:
            self._add(
                codes.FUNCTION_UNKNOWN,
                node.function.span,
                f"`{node.function.text}` is no function",
                did_you_mean(node.function.text, FUNCTIONS)
                or "take one of " + ", ".join(f"`{f}`" for f in FUNCTIONS),
            )
            return None
        variadic = function.arguments[0] == "same…"
        wanted = len(function.arguments)
        given = len(node.arguments)
        if given < 1 or (not variadic and given != wanted):
            self._unfit(
                node.span,
                f"`{name}` takes {wanted} {'value' if wanted == 1 else 'values'}, not {given}",
                name,
            )
            return function.gives
        if variadic:
            return self._alike(node)
        if name == "convert":
            return self._converted(node)
        first: Dimension | None = None
        for argument, kind in zip(node.arguments, function.arguments, strict=True):
            typed = self._argument(argument, kind, name)
            first = first or typed
        return self._gives(name, function, first)

    def _gives(self, name: str, function: Function, first: Dimension | None) -> Dimension | None:
        if function.gives is not None or first is None:
            return function.gives
        if name == "sqrt":
            halves = tuple(e // 2 for e in first.exponents)
            return dim.named(halves) if all(e % 2 == 0 for e in first.exponents) else None
        return first if name == "round" else None

    def _alike(self, node: Call) -> Dimension | None:
        first: Dimension | None = None
        for argument in node.arguments:
            typed = self.type(argument)
            if first is None:
                first = typed
            else:
                self._same(first, typed, argument.span, "stand together")
        return first

    def _argument(self, node: Expression, kind: str, name: str) -> Dimension | None:
        match kind:
            case "thing":
                self._thing(node)
            case "held":
                if isinstance(node, Held):
                    self._held(node)
                else:
                    self._unfit(node.span, f"`{name}` takes a substance in a vessel", name)
            case "vessel" | "reaction" | "label":
                self._of_kind(node, kind)
            case "yield":
                self._of_yield(node)
            case "number":
                typed = self.type(node)
                if typed is not None and not typed.plain:
                    self._unfit(
                        node.span, f"`{name}` takes a plain number, not {typed.words}", name
                    )
            case "value":
                return self.type(node)
            case _:  # an equation: words, read where they are evaluated
                pass
        return None

    def _converted(self, node: Call) -> Dimension | None:
        """Type `convert(v, mL)`: the unit is one of the list, and of the value's dimension."""
        value, unit = node.arguments
        typed = self.type(value)
        found = scan_quantity("1 " + unit.span.text, 0)
        whole = isinstance(found, Found) and found.measured
        if not isinstance(found, Found) or not whole or found.end != len(unit.span.text) + 2:
            fault = unknown_unit(unit.span.text, unit.span.start)
            self._add(fault.code, unit.span, fault.message, fault.help)
            return typed
        self._same(typed, found.quantity.dimension, unit.span, "stand together")
        return typed

    # ------------------------------------------------------------------ findings

    def _clash(self, span: Span, message: str, help_: str | None = None) -> None:
        self._add(codes.DIMENSIONS_CLASH, span, message, help_)

    def _unfit(self, span: Span, message: str, function: str | None) -> None:
        example = f"write it as in `{FUNCTIONS[function].example}`" if function else None
        self._add(codes.FUNCTION_UNFIT, span, message, example)

    def _add(self, code: Code, span: Span, message: str, help_: str | None) -> None:
        self.scope.findings.append(Finding(code=code, span=span, message=message, help=help_))
