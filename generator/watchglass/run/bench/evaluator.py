"""Expressions that ask the bench: shares, recovered masses, pH and titres at a moment of the ledger.

Without a ledger `run/evaluate.py` answers what needs none; here the rest is answered too. A figure
named in a step means that step's latest pass.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.read.syntax import Name, Words
from watchglass.read.terms import After, Call, Compare, Expression, Held, Within
from watchglass.run.bench.asked import SHARE_FIGURES, TITRE_FIGURES, Asked
from watchglass.run.bench.figures import share_words
from watchglass.run.evaluate import Evaluator, NotKnown, Result, Value

if TYPE_CHECKING:
    from watchglass.base.dimensions import Dimension
    from watchglass.run.bench.asked import Answer
    from watchglass.run.bench.state import Bench

#: Relative and absolute slack of a comparison: the last bit of a float decides nothing.
_SLACK = 1e-6


@dataclass(slots=True, kw_only=True)
class BenchEvaluator(Evaluator):
    """Evaluates expressions with a ledger.

    Attributes:
        asked: Answers questions about the ledger.
        step: Number of the step in which a figure stands; 0 for the end of the procedure.
        why: Why the last figure that could not be told is not known, in words.
    """

    asked: Asked
    step: int = 0
    why: str = ""
    _bench: Bench | None = field(default=None)

    def value(self, node: Expression) -> Result:
        """Evaluate an expression; unknown where any part is."""
        match node:
            case After(operand, state, _):
                return self._after(operand, state)
            case Held(substance, vessel, _):
                return self._answer(
                    self.asked.share(_text(substance), _text(vessel), self._moment()),
                    dim.SHARE,
                    SHARE_FIGURES,
                )
            case _:
                return Evaluator.value(self, node)

    def holds(self, node: Compare | Within) -> tuple[bool | None, Result]:
        """Test a comparison.

        Returns:
            Whether it holds (None where a side is not known), and what its left side comes to.
        """
        match node:
            case Compare(operator, left, right, _):
                reached, wanted = self.value(left), self.value(right)
                if isinstance(reached, NotKnown) or isinstance(wanted, NotKnown):
                    return None, reached
                return _compares(operator, reached.si, wanted.si), reached
            case Within(operand, range_, _):
                reached = self.value(operand)
                if isinstance(reached, NotKnown):
                    return None, reached
                low, high = range_.quantity.si, range_.quantity.si_high
                return (
                    _compares(">=", reached.si, low) and _compares("<=", reached.si, high),
                    reached,
                )

    def _call(self, node: Call) -> Result:
        name = node.function.text.lower()
        arguments = node.arguments
        if name in ("fraction", "recovered") and arguments and isinstance(arguments[0], Held):
            held = arguments[0]
            if name == "fraction":
                return self.value(held)
            return self._answer(
                self.asked.recovered(_text(held.substance), _text(held.vessel), self._moment()),
                dim.MASS,
                SHARE_FIGURES,
            )
        if name == "ph" and arguments:
            return self._answer(
                self.asked.ph(_text(arguments[0]), self._moment()), dim.NUMBER, SHARE_FIGURES
            )
        if name == "titre" and arguments:
            return self._answer(self.asked.titre(_text(arguments[0])), dim.VOLUME, TITRE_FIGURES)
        reached = Evaluator._call(self, node)  # noqa: SLF001 - the class above
        if name == "moles" and isinstance(reached, NotKnown) and len(arguments) == 1:
            return self._brought(arguments[0], reached)
        return reached

    def _brought(self, of: Expression, otherwise: NotKnown) -> Result:
        """Give the amount of a substance that was brought in all, as with a product of another day."""
        component = self.asked.component(_text(of))
        amount = self.asked.ledger.charged.get(component, 0.0) if component is not None else 0.0
        return Value(amount, dim.AMOUNT, SHARE_FIGURES) if amount > 0 else otherwise

    def _after(self, operand: Expression, state: Expression) -> Result:
        bench = self._state(state)
        if bench is None:
            self.why = "the state it speaks of is never reached"
            return NotKnown("bench")
        before = self._bench
        self._bench = bench
        try:
            return self.value(operand)
        finally:
            self._bench = before

    def _state(self, state: Expression) -> Bench | None:
        match state:
            case Call(Name("label"), (of,), _):
                return self.asked.ledger.at(_text(of))
            case Call(Name("step"), (of,), _):
                return self.asked.moment(_number(of))
            case Name(text, _, _):
                return self.asked.ledger.at(text)
            case _:
                return None

    def _moment(self) -> Bench:
        return self._bench if self._bench is not None else self.asked.moment(self.step)

    def _answer(self, answer: Answer, dimension: Dimension, figures: int) -> Result:
        if answer.value is None:
            self.why = answer.why
            return NotKnown("bench")
        return Value(answer.value, dimension, figures)


def reached_words(value: Value) -> str:
    """Write what an expectation comes to."""
    if value.dimension == dim.SHARE:
        return share_words(value.si)
    if value.dimension == dim.VOLUME:
        return f"{shown(value.si * 1e6, value.figures)} mL"
    if value.dimension == dim.MASS:
        return f"{shown(value.si * 1e3, value.figures)} g"
    return shown(value.si, value.figures)


def _text(node: Expression) -> str:
    return node.text if isinstance(node, Name | Words) else ""


def _number(node: Expression) -> int:
    quantity = getattr(node, "quantity", None)
    return round(quantity.si) if quantity is not None else 0


def _compares(operator: str, left: float, right: float) -> bool:
    slack = _SLACK * max(abs(left), abs(right), 1e-30)
    match operator:
        case ">=":
            return left >= right - slack
        case "<=":
            return left <= right + slack
        case ">":
            return left > right
        case _:
            return left < right
