"""One expression to one answer: a figure with its unit, a balanced equation, or that it is unknown."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.figures import MOST_FIGURES, shown
from watchglass.base.findings import Severity
from watchglass.base.units import UNITS, customary
from watchglass.read.terms import Binary, Call, Expression, Measured, Name, Negative, Words
from watchglass.run.evaluate import NotKnown, Value, in_unit
from watchglass.shell.reckoning.equations import balanced
from watchglass.shell.reckoning.evaluating import NO_FIGURE, reckoner
from watchglass.shell.reckoning.reading import DILUTION, read_asked
from watchglass.shell.reckoning.typing import typed

if TYPE_CHECKING:
    from watchglass.base.dimensions import Dimension
    from watchglass.base.findings import Finding
    from watchglass.base.spans import Source
    from watchglass.shell.reckoning.evaluating import Reckoner
    from watchglass.shell.reckoning.names import BenchCatalogue
    from watchglass.shell.reckoning.reading import Asked

UNKNOWN = "unknown"
_KEEPS_UNIT = ("mean", "min", "max", "round")


class Answer(NamedTuple):
    """The answer to one expression.

    Attributes:
        expression: As written.
        value: The number, in `unit`, not rounded; None where it is unknown or no number.
        unit: Its unit; empty for a plain number, None where there is no number.
        figures: Significant figures that hold, or None.
        text: What is printed; empty where there are findings.
        assumptions: What the figure rests on beside what is written.
        findings: What is wrong; then there is no answer.
    """

    expression: str
    value: float | None = None
    unit: str | None = None
    figures: int | None = None
    text: str = ""
    assumptions: tuple[str, ...] = ()
    findings: tuple[Finding, ...] = ()

    @property
    def failed(self) -> bool:
        """Whether something is wrong with the expression."""
        return any(f.code.severity is Severity.ERROR for f in self.findings)


def reckon(source: Source, start: int, end: int, catalogue: BenchCatalogue) -> Answer:
    """Answer the expression in part of a source."""
    written = source.text[start:end].strip()
    asked = read_asked(source, start, end, catalogue)
    found = (*asked.findings, *typed(asked, catalogue))
    if found or asked.expression is None:
        return Answer(written, findings=found)
    match asked.expression:
        case Call(Name("balance"), (Words() as equation,), _):
            return _balanced(written, equation, catalogue)
        case expression:
            return _figured(
                written, expression, asked, reckoner(source, asked.materials, catalogue)
            )


def _balanced(written: str, equation: Words, catalogue: BenchCatalogue) -> Answer:
    found = balanced(equation, catalogue)
    text = found.text or (f"{UNKNOWN}: {found.why}" if found.why else "")
    notes = (found.note,) if found.note else ()
    return Answer(written, text=text, assumptions=notes, findings=found.findings)


def _figured(written: str, expression: Expression, asked: Asked, reckoner: Reckoner) -> Answer:
    value = reckoner.value(expression)
    if reckoner.findings:
        return Answer(written, findings=tuple(reckoner.findings))
    if isinstance(value, NotKnown):
        why = reckoner.why or NO_FIGURE
        return Answer(written, text=f"{UNKNOWN}: {why}")
    unit = asked.unit.text if asked.unit else _own_unit(expression, value.dimension)
    unit = customary(value.dimension) if unit is None else unit
    unit = "" if unit == "1" else unit
    number = in_unit(value, unit)
    if number is None:
        raise RuntimeError(f"`{unit}` was checked to be a unit of {value.dimension.words}")
    text = _set(number, unit, value)
    if isinstance(expression, Call) and expression.function.text == DILUTION:
        text += _made_up(expression, reckoner)
    return Answer(
        written,
        value=float(f"{number:.14g}"),
        unit=unit,
        figures=min(value.figures, MOST_FIGURES),
        text=text,
        assumptions=tuple(reckoner.assumptions),
    )


def _set(number: float, unit: str, value: Value) -> str:
    digits = shown(number, value.figures)
    if value.dimension == dim.NUMBER and value.figures >= MOST_FIGURES and "." in digits:
        mantissa, times, power = digits.partition(" ×")
        digits = mantissa.rstrip("0").rstrip(".") + times + power
    return f"{digits} {unit}".rstrip()


def _made_up(expression: Call, reckoner: Reckoner) -> str:
    """Say what a dilution is filled up with."""
    made = expression.arguments[2]
    diluted = reckoner.dilution
    if diluted is None or diluted.diluent is None:
        return f", made up to {made.span.text}"
    unit = _own_unit(made, diluted.diluent.dimension) or "g"
    number = in_unit(diluted.diluent, unit)
    return f", with {_set(number or 0.0, unit, diluted.diluent)} of water"


def _own_unit(node: Expression, dimension: Dimension) -> str | None:
    """Give the unit that an expression itself is written in, where its value is of that dimension."""
    match node:
        case Call(Name("convert"), (_, unit), _):
            return unit.span.text
        case Call(Name(name), (first, *_), _) if name in _KEEPS_UNIT:
            return _own_unit(first, dimension)
        case Call(Name("dilution"), (_, _, made), _) if dimension != dim.VOLUME:
            return _own_unit(made, dimension)
        case Negative(operand, _):
            return _own_unit(operand, dimension)
        case Binary("+" | "-" | "*" | "/", left, right, _):
            return _own_unit(left, dimension) or _own_unit(right, dimension)
        case Measured(quantity, _) if quantity.unit.symbol and quantity.dimension == dimension:
            symbol = quantity.unit.symbol
            return symbol if dimension != dim.COUNT or symbol in UNITS else None
        case _:
            return None
