"""What is measured against the ware it is measured with: figures, largest and smallest volume.

A volume is judged where the draft names the ware: `by cylinder`, or a burette, pipette or cylinder
it is drawn `from`, or the flask that is filled `to` a stated volume. The draft is judged as its
author wrote it, since scaled figures are made to suit the ware.
"""

from __future__ import annotations

import re
from math import floor, log10
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding, Related
from watchglass.base.quantities import Kind
from watchglass.base.scan import Found, scan_quantity
from watchglass.read import syntax
from watchglass.resolve import model

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.base.findings import Code
    from watchglass.base.quantities import Number, Quantity
    from watchglass.base.spans import Span
    from watchglass.catalogue.measuring import Reach
    from watchglass.judge.case import Case

_SAME = 1e-6
#: How far an approximation may lie from what ware with one mark gives [-]. Judgement.
_ABOUT = 0.1
_BALANCE = re.compile(r"\b(?:balance|scales?)\b", re.IGNORECASE)
_FIGURE = re.compile(r"(?<![\w.])\d")


class _Measured(NamedTuple):
    """A quantity and what it is measured with; `filled` where ware is filled to it."""

    quantity: Quantity
    span: Span
    ware: str
    filled: bool = False


class _Fault(NamedTuple):
    code: Code
    message: str
    help: str


def measuring(case: Case) -> Iterator[Finding]:
    """Report volumes and masses that the ware named for them cannot give as they are written."""
    found: dict[tuple[str, str, str], tuple[_Fault, list[_Measured]]] = {}
    for measured in _all(case.procedure):
        fault = _fault(case.procedure, measured)
        if fault is not None:
            key = (fault.code.number, measured.ware, measured.quantity.text)
            found.setdefault(key, (fault, []))[1].append(measured)
    for fault, places in found.values():
        first, *others = places
        ware = case.procedure.vessels.get(first.ware) or case.procedure.equipment[first.ware]
        yield Finding(
            code=fault.code,
            span=first.span,
            message=fault.message,
            related=(
                Related(ware.span, "it is declared here"),
                *(Related(other.span, "and here") for other in others),
            ),
            help=fault.help,
        )


# ---------------------------------------------------------------- what is measured


def _all(procedure: model.Procedure) -> Iterator[_Measured]:
    for step in procedure.steps:
        for event in step.events:
            match event:
                case model.Charge():
                    ware = event.ware or _drawn(procedure, event.clauses)
                    yield from _portions(event.portions, ware)
                case model.Aliquot():
                    ware = _named(event.clauses, "by") or _source(procedure, event.origin)
                    yield _Measured(event.quantity, _within(event.span, event.quantity), ware)
                case model.Operation():
                    yield from _operation(procedure, event)
                case _:
                    pass


def _operation(procedure: model.Procedure, event: model.Operation) -> Iterator[_Measured]:
    by = _named(event.clauses, "by")
    yield from _portions(event.portions, by)
    for clause in event.clauses:
        if not isinstance(clause.value, syntax.Measured):
            continue
        if clause.word == "giving":
            ware = by or _drawn(procedure, event.clauses)
            yield _Measured(clause.value.quantity, clause.value.span, ware)
        elif clause.word == "to" and event.verb == "fill" and event.object is not None:
            ware = event.object.name.text
            yield _Measured(clause.value.quantity, clause.value.span, ware, filled=True)


def _portions(portions: Iterable[model.Portion], ware: str) -> Iterator[_Measured]:
    for portion in portions:
        if portion.quantity is not None and portion.per is None:
            yield _Measured(portion.quantity, _within(portion.span, portion.quantity), ware)


def _named(clauses: Iterable[syntax.Clause], word: str) -> str:
    for clause in clauses:
        if clause.word == word and isinstance(clause.value, syntax.Place):
            return clause.value.name.text
    return ""


def _drawn(procedure: model.Procedure, clauses: Iterable[syntax.Clause]) -> str:
    for clause in clauses:
        if clause.word == "from" and isinstance(clause.value, syntax.Place):
            return _source(procedure, clause.value)
    return ""


def _source(procedure: model.Procedure, place: syntax.Place) -> str:
    """Give a vessel that measures what is drawn from it; a bottle or a flask does not."""
    vessel = procedure.vessels.get(place.name.text)
    delivers = vessel and vessel.type and vessel.type.type.measures == "delivers"
    return place.name.text if delivers else ""


def _within(span: Span, quantity: Quantity) -> Span:
    at = span.text.find(quantity.text)
    return span.part(at, at + len(quantity.text)) if at >= 0 else span


# ---------------------------------------------------------------- what it can give


def _fault(procedure: model.Procedure, measured: _Measured) -> _Fault | None:
    ware = procedure.vessels.get(measured.ware) or procedure.equipment.get(measured.ware)
    if ware is None:
        return None
    if measured.quantity.dimension == dim.MASS:
        return _weighed(measured, ware.written)
    if measured.quantity.dimension != dim.VOLUME or ware.type is None or ware.type.size is None:
        return None
    from watchglass.catalogue.measuring import reach  # noqa: PLC0415 - its table is read when asked

    known = reach(ware.type)
    if known is None:
        return None
    what = f"{_one(ware.type.written)} of {ware.type.size.text}"
    return (
        (_one_mark(measured, known, what) if known.fixed else _size(measured, known, what))
        or _figures(measured, known.step, _finest(known), what)
        or _tolerance(measured, known, what)
    )


def _finest(known: Reach) -> int:
    from watchglass.catalogue.measuring import finest_place  # noqa: PLC0415 - as above

    return finest_place(known) - 6


def _one_mark(measured: _Measured, known: Reach, what: str) -> _Fault | None:
    quantity = measured.quantity
    off = _ABOUT if quantity.kind is Kind.ABOUT else _SAME
    if quantity.si * (1 - off) <= known.most <= quantity.si_high * (1 + off):
        return None
    times = quantity.si / known.most
    if times > 1.5 and abs(times - round(times)) < _SAME and not measured.filled:
        one = _plain(known.most, quantity.unit.factor)
        return _Fault(
            codes.WARE_TOO_SMALL,
            f"`{quantity.text}` is {round(times)} fillings of `{measured.ware}`, {what}",
            f"write {round(times)} charges of {one} {quantity.unit.symbol}, or name a larger one",
        )
    verb = "is filled to its mark" if measured.filled else "has one mark"
    return _Fault(
        codes.ONE_MARK_OTHER_VOLUME,
        f"`{quantity.text}` is not what `{measured.ware}` measures: {what} {verb} and gives nothing else",
        "name one of that size" + ("" if measured.filled else ", or a graduated pipette"),
    )


def _size(measured: _Measured, known: Reach, what: str) -> _Fault | None:
    quantity = measured.quantity
    symbol, factor = quantity.unit.symbol, quantity.unit.factor
    if measured.filled:
        return None
    if quantity.si_high > known.most * (1 + _SAME):
        return _Fault(
            codes.WARE_TOO_SMALL,
            f"`{quantity.text}` is more than `{measured.ware}` measures at once: it is {what}",
            f"name a larger one, or charge at most {_plain(known.most, factor)} {symbol} at a time",
        )
    loose = quantity.kind in (Kind.ABOUT, Kind.RANGE)
    if not loose and quantity.si_high < known.least * (1 - _SAME):
        return _Fault(
            codes.WARE_TOO_LARGE,
            f"`{quantity.text}` is too little for `{measured.ware}`: {what} is good to"
            f" {_plain(known.tolerance, factor)} {symbol} at best",
            f"name a smaller one; this one serves from {_plain(known.least, factor)} {symbol} up",
        )
    return None


def _figures(measured: _Measured, step: float, finest: int, what: str) -> _Fault | None:
    """Compare the last written digit with the last that the ware gives.

    Args:
        measured: The quantity and its ware.
        step: Finest step of the ware, SI.
        finest: Power of ten of the last digit that it gives, SI.
        what: The ware in words.
    """
    quantity = measured.quantity
    scale = round(log10(quantity.unit.factor))
    numbers = _numbers(quantity)
    if all(_place(n) + scale >= finest or _on_a_mark(n, quantity, step) for n in numbers):
        return None
    text = quantity.text
    for number in numbers:
        text = text.replace(number.text, _rounded(number, finest - scale), 1)
    given = _plain(10.0**finest, quantity.unit.factor)
    return _Fault(
        codes.MORE_FIGURES_THAN_WARE,
        f"`{quantity.text}` has more figures than `{measured.ware}` can give:"
        f" {what} gives the volume to {given} {quantity.unit.symbol}"
        if quantity.dimension == dim.VOLUME
        else f"`{quantity.text}` has more figures than `{measured.ware}` can give: it is {what}",
        f"write `{text}`, or name finer ware",
    )


def _tolerance(measured: _Measured, known: Reach, what: str) -> _Fault | None:
    quantity = measured.quantity
    if quantity.kind is not Kind.TOLERANCE or quantity.second is None:
        return None
    asked, factor = quantity.second.value * quantity.unit.factor, quantity.unit.factor
    if asked >= known.tolerance * (1 - _SAME):
        return None
    good = _plain(known.tolerance, factor)
    return _Fault(
        codes.MORE_FIGURES_THAN_WARE,
        f"`{quantity.text}` is closer than `{measured.ware}` can hold: {what} is good to"
        f" {good} {quantity.unit.symbol} at best",
        f"write `{quantity.number.text} ± {good} {quantity.unit.symbol}`, or name better ware",
    )


def _weighed(measured: _Measured, words: str) -> _Fault | None:
    """Hold a mass to the balance it is weighed on, where its words say what it reads to."""
    at = _FIGURE.search(words)
    if at is None or not _BALANCE.search(words):
        return None
    read = scan_quantity(words, at.start())
    if not isinstance(read, Found) or read.quantity.dimension != dim.MASS:
        return None
    step = read.quantity.si
    finest = floor(log10(step) + 1e-9) if step > 0 else -99
    return _figures(measured, step, finest, _one(words))


# ---------------------------------------------------------------- digits


def _numbers(quantity: Quantity) -> tuple[Number, ...]:
    second = quantity.second if quantity.kind is Kind.RANGE else None
    return (quantity.number, second) if second is not None else (quantity.number,)


def _place(number: Number) -> int:
    """Give the power of ten of the last digit; noughts that end a whole number say nothing."""
    noughts = len(number.text) - len(number.text.rstrip("0"))
    whole = number.text.isdigit() and number.value > 0
    return number.last_place + noughts if whole else number.last_place


def _on_a_mark(number: Number, quantity: Quantity, step: float) -> bool:
    """Tell whether a number names a graduation or half of one, without a nought behind the point."""
    if "." in number.text and number.text.endswith("0"):
        return number.value == 0
    steps = number.value * quantity.unit.factor / step
    return abs(steps - round(steps)) < _SAME * max(1.0, steps)


def _rounded(number: Number, place: int) -> str:
    if place >= 0:
        return f"{round(number.value / 10**place) * 10**place:g}"
    return f"{number.value:.{-place}f}"


def _one(words: str) -> str:
    return f"{'an' if words[:1].lower() in 'aeio' else 'a'} {words}"


def _plain(value: float, factor: float) -> str:
    return f"{float(f'{value / factor:.6g}'):g}"
