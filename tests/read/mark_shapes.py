"""Marks read and written out again as one line a node: what a test expects, exactly and readably.

`15 mL acid by cylinder -> funnel` reads as `charge [15 mL of acid] to funnel {by cylinder}`.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base.spans import Source, Span
from watchglass.read import syntax as s
from watchglass.read.marks import read_mark
from watchglass.read.terms import After, Binary, Call, Compare, Expression, Held, Negative, Within

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.findings import Finding

MEASURES = {"drop": 5e-8, "drops": 5e-8, "spatula tip": None, "spatula tips": None}


class Read(NamedTuple):
    """What a mark gave."""

    acts: tuple[s.Act, ...]
    findings: tuple[Finding, ...]
    source: Source


def read(inside: str) -> Read:
    """Read what stands between the braces of a mark, in a sentence."""
    source = Source.of("a.md", f"Now {{{inside}}} it.")
    acts, findings = read_mark(source, 5, 5 + len(inside), MEASURES)
    return Read(acts, findings, source)


def shape(inside: str) -> str:
    """Read a mark that has no fault, and write its acts out."""
    found = read(inside)
    assert found.findings == (), [(f.message, f.span.text) for f in found.findings]
    return "; ".join(written(act) for act in found.acts)


def written(act: s.Act) -> str:
    """Write an act out."""
    match act:
        case s.QuantityAct(value, _):
            return f"quantity {value.quantity.text}"
        case s.NameAct(place, _):
            return f"name {_place(place)}"
        case s.StatedAct(amount, _):
            return f"stated [{_amount(amount)}]"
        case s.ChargeAct(amounts, target, clauses, _):
            listed = ", ".join(_amount(a) for a in amounts)
            return f"charge [{listed}] to {_place(target)}{_clauses(clauses)}"
        case s.TransferAct(origin, target, clauses, _):
            return f"transfer {_place(origin)} to {_place(target)}{_clauses(clauses)}"
        case s.AliquotAct(measure, origin, target, clauses, _):
            places = f"{_place(origin)} to {_place(target)}"
            return f"aliquot {measure.quantity.text} of {places}{_clauses(clauses)}"
        case s.VerbAct(verb, _, target, clauses, _, subject):
            of = f" {_value(target)}" if target is not None else ""
            tested = f" for:{subject.text}" if subject else ""
            return f"verb {verb}{of}{tested}{_clauses(clauses)}"
        case s.AgainAct():
            return _again(act)
        case s.LabelAct(name, _):
            return f"label {name.text}"
        case s.StepAct(name, _):
            return f"step {name.text}"
        case s.ValueAct(expression, unit, _):
            return f"value {expressed(expression)}" + (f" in {unit.text}" if unit else "")
        case s.RecordAct():
            return _record(act)
        case s.BrokenAct():
            return "broken"


def _again(act: s.AgainAct) -> str:
    steps = ", ".join(r.first if r.first == r.last else f"{r.first}..{r.last}" for r in act.steps)
    most = f" at most {act.at_most}" if act.at_most is not None else ""
    fresh = " fresh" if act.fresh else ""
    exchanged = "".join(f" {new.text}/{old.text}" for new, old in act.exchanges)
    return f"again {steps} x{act.times}{most}{fresh}{exchanged}"


def _record(act: s.RecordAct) -> str:
    name = f"{act.name.text}: " if act.name else ""
    unit = f" in {act.unit.text}" if act.unit else ""
    expected = f" = {expressed(act.expression)}" if act.expression is not None else ""
    return f"record {name}<{act.label}>{unit}{expected}"


def _name(name: s.Name) -> str:
    return f'"{name.text}"' if name.quoted else name.text


def _place(place: s.Place) -> str:
    return _name(place.name) + (f".{place.part}" if place.part else "")


def _amount(amount: s.Amount) -> str:
    much = amount.measure if isinstance(amount.measure, str) else amount.measure.quantity.text
    per = f" per {amount.per[0].quantity.text} {_name(amount.per[1])}" if amount.per else ""
    return f"{much} of {_name(amount.material)}{per}"


def _clauses(clauses: tuple[s.Clause, ...]) -> str:
    listed = "; ".join(f"{clause.word} {_value(clause.value)}" for clause in clauses)
    return f" {{{listed}}}" if clauses else ""


def _value(value: s.ClauseValue) -> str:
    match value:
        case s.Place():
            return _place(value)
        case s.Measured(quantity, _):
            return f"({quantity.text})"
        case s.Amount():
            return f"[{_amount(value)}]"
        case s.Words(text, _):
            return f"<{text}>"
        case s.Ph(quantity, _):
            return f"pH({quantity.text})"


def expressed(node: Expression) -> str:
    """Write an expression out with every bracket."""
    match node:
        case s.Measured(quantity, _):
            return quantity.text
        case s.Name():
            return _name(node)
        case s.Words(text, _):
            return f"<{text}>"
        case Call(function, arguments, _):
            return f"{function.text}({', '.join(expressed(a) for a in arguments)})"
        case Binary(operator, left, right, _) | Compare(operator, left, right, _):
            return f"({expressed(left)} {operator} {expressed(right)})"
        case Negative(operand, _):
            return f"(minus {expressed(operand)})"
        case Within(operand, ranged, _):
            return f"({expressed(operand)} within {ranged.quantity.text})"
        case Held(substance, vessel, _):
            return f"({expressed(substance)} held-in {expressed(vessel)})"
        case After(operand, state, _):
            return f"({expressed(operand)} after {expressed(state)})"


def spans(node: object) -> Iterator[Span]:
    """Give every place that a node and what it holds carry."""
    if isinstance(node, Span):
        yield node
    elif isinstance(node, tuple):
        for part in node:
            yield from spans(part)
