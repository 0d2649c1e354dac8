"""Expectations that need no bench: what follows from the charges alone is tested at the desk.

One that asks for a vessel, a pH or a titre is left to `judge/bench/expected.py`, which leaves these
to here.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.figures import MOST_FIGURES, rounded, shown
from watchglass.base.findings import Finding
from watchglass.read.syntax import Measured
from watchglass.read.terms import Binary, Call, Compare, Expression, Within
from watchglass.run.evaluate import Evaluator, Value

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.quantities import Quantity
    from watchglass.judge.case import Case
    from watchglass.resolve import model

#: Relative slack of a comparison: the last bit of a float decides nothing [-].
_SLACK = 1e-6
#: Unit that a figure is shown in where the expectation names none: its symbol and its SI units.
_UNITS = {
    dim.MASS: ("g", 1e-3),
    dim.VOLUME: ("mL", 1e-6),
    dim.AMOUNT: ("mmol", 1e-3),
    dim.CONCENTRATION: ("mol/L", 1e3),
    dim.SHARE: ("%", 1e-2),
    dim.MOLAR_MASS: ("g/mol", 1e-3),
}


class AtDesk(NamedTuple):
    """An expectation evaluated without a bench.

    Attributes:
        holds: Whether it does.
        reached: What its first computed side comes to, in words.
        wanted: What that is held to, in words.
    """

    holds: bool
    reached: str
    wanted: str


def expectations_at_desk(case: Case) -> Iterator[Finding]:
    """Report expectations that the charges themselves miss, and shares above the whole."""
    for line in case.procedure.expectations:
        beyond = _beyond_whole(line)
        if beyond is not None:
            yield beyond
            continue
        found = at_desk(case, line)
        if found is not None and not found.holds:
            yield Finding(
                code=codes.EXPECTATION_MISSED,
                span=line.span,
                message=f"`{line.written}`: the charges give {found.reached},"
                f" {found.wanted} is expected",
                help="mend the amounts in the steps, or the expectation",
            )


def at_desk(case: Case, line: model.Expectation) -> AtDesk | None:
    """Evaluate an expectation; None where it needs the bench, or a figure that is not known."""
    evaluator = Evaluator(case.procedure, case.usage, case.catalogue, {})
    for record in case.procedure.records:
        if record.name and record.expression is not None:
            evaluator.records[record.name] = evaluator.value(record.expression)
    match line.expression:
        case Compare(operator, left, right, _):
            one, other = evaluator.value(left), evaluator.value(right)
            if not isinstance(one, Value) or not isinstance(other, Value):
                return None
            holds = _holds(operator, one.si, other.si)
            if isinstance(left, Measured):
                return AtDesk(holds, _words(other, left.quantity), left.quantity.text)
            if isinstance(right, Measured):
                return AtDesk(holds, _words(one, right.quantity), right.quantity.text)
            return AtDesk(holds, _words(one, None), _words(other, None))
        case Within(operand, range_, _):
            value = evaluator.value(operand)
            if not isinstance(value, Value):
                return None
            low, high = range_.quantity.si, range_.quantity.si_high
            holds = _holds(">=", value.si, low) and _holds("<=", value.si, high)
            return AtDesk(holds, _words(value, range_.quantity), range_.quantity.text)
        case _:
            return None


def _holds(operator: str, left: float, right: float) -> bool:
    slack = _SLACK * max(abs(left), abs(right))
    match operator:
        case ">=":
            return left >= right - slack
        case "<=":
            return left <= right + slack
        case ">":
            return left > right
        case _:
            return left < right


def _words(value: Value, like: Quantity | None) -> str:
    """Write a value in the unit of what it is held to, with the figures that tell the two apart."""
    figures = max(value.figures, 2)
    if like is not None and like.dimension.exponents == value.dimension.exponents:
        unit = like.unit
        number = (value.si - unit.offset) / unit.factor
        ends = [n.value for n in (like.number, like.second) if n is not None]
        while figures < MOST_FIGURES and any(
            number != end and float(rounded(number, figures)) == end for end in ends
        ):
            figures += 1
        return f"{shown(number, figures)} {unit.symbol}".rstrip()
    symbol, factor = _UNITS.get(value.dimension, ("", 1.0))
    return f"{shown(value.si / factor, figures)} {symbol or value.dimension.si}".removesuffix(" 1")


# ---------------------------------------------------------------- shares above the whole


def _beyond_whole(line: model.Expectation) -> Finding | None:
    """Report a yield or a share that is expected to be more than all there is."""
    match line.expression:
        case Compare(_, left, Measured() as wanted, _) if _is_share(left):
            pass
        case Compare(_, Measured() as wanted, right, _) if _is_share(right):
            pass
        case Within(operand, wanted, _) if _is_share(operand):
            pass
        case _:
            return None
    quantity = wanted.quantity
    if quantity.si_high <= 1 or not quantity.dimension.plain:
        return None
    return Finding(
        code=codes.SHARE_ABOVE_ONE,
        span=wanted.span,
        message=f"`{quantity.text}` is more than the whole",
        help="give a share of at most 100 %",
    )


def _is_share(expression: Expression) -> bool:
    """Tell whether an expression is a share of what is there or of what can form."""
    match expression:
        case Call(function, _, _):
            return function.text == "fraction"
        case Binary("/", Call(top, _, _), Call(bottom, _, _), _):
            return top.text == "recovered" and bottom.text == "theoretical-yield"
        case _:
            return False
