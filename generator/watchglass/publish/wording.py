"""Marks in words: what a reader sees where the author gave no words of their own.

Each verb prints itself, with its clauses in the order written. Labels, and acts that only tell the
bench something (`react`, `suppose`), print nothing.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.catalogue.streams import STREAMS
from watchglass.publish.model import Run, Said
from watchglass.publish.names import PARTS, material_words, thing_name
from watchglass.publish.text import NBSP, joined, quantity_words
from watchglass.read import syntax

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.publish.model import Words
    from watchglass.resolve.model import Procedure

_SILENT = frozenset(("react", "suppose"))
_TIMES = {1: "once more", 2: "twice more", 3: "three more times"}
_STREAM_WORDS = {"drain": "the drain", "ordinary-bin": "the ordinary bin"}
_TESTS = {"ph": "with pH paper", "peroxides": "for peroxides", "oxidant": "for oxidant"}


def mark_words(
    acts: Iterable[syntax.Act], procedure: Procedure, *, step: int
) -> list[tuple[Words, ...]]:
    """Put the acts of one mark into words, one entry an act that prints something.

    The vessel that the act before was done to is `it`.
    """
    parts = []
    before: syntax.Place | None = None
    for act in acts:
        words = act_words(act, procedure, step=step)
        place = act.object if isinstance(act, syntax.VerbAct) else None
        if isinstance(place, syntax.Place) and words:
            if before is not None and _same(place, before):
                words = tuple(
                    Said("vessel", (Run("it"),)) if word == place_words(place, procedure) else word
                    for word in words
                )
            before = place
        if words:
            parts.append(words)
    return parts


def _same(one: syntax.Place, other: syntax.Place) -> bool:
    return one.name.text == other.name.text and one.part == other.part


def act_words(act: syntax.Act, procedure: Procedure, *, step: int) -> tuple[Words, ...]:
    """Put one act into words; empty where it prints nothing."""
    match act:
        case syntax.QuantityAct(value, _):
            return (Said("quantity", quantity_words(value.quantity)),)
        case syntax.NameAct(place, _):
            return (place_words(place, procedure),)
        case syntax.StatedAct(amount, _):
            return amount_words(amount, procedure)
        case syntax.ChargeAct(amounts, _, clauses, _):
            return _and(
                [amount_words(a, procedure) for a in amounts],
                clauses_words(clauses, procedure, charge=True),
            )
        case syntax.TransferAct(origin, _, clauses, _):
            return (contents_words(origin, procedure), *clauses_words(clauses, procedure))
        case syntax.AliquotAct(measure, origin, _, clauses, _):
            said = Said("quantity", quantity_words(measure.quantity))
            return (
                said,
                Run(" of "),
                contents_words(origin, procedure),
                *clauses_words(clauses, procedure),
            )
        case syntax.VerbAct():
            return verb_words(act, procedure)
        case syntax.AgainAct():
            return (Run(_again(act, procedure, step)),)
        case syntax.StepAct(name, _):
            return (Said("step", (Run(f"step{NBSP}{procedure.labels.get(name.text, '?')}"),)),)
        case _:
            return ()


def _and(parts: list[tuple[Words, ...]], tail: tuple[Words, ...]) -> tuple[Words, ...]:
    words: list[Words] = []
    for index, part in enumerate(parts):
        if index:
            words.append(Run(" and " if index == len(parts) - 1 else ", "))
        words += part
    return (*words, *tail)


def place_words(place: syntax.Place, procedure: Procedure) -> Words:
    """Name a vessel, a material, or a part of what a vessel holds."""
    if place.part is not None:
        return Said("vessel", (Run(_layer(place, procedure)),))
    kind = "vessel" if place.name.text in procedure.vessels else "material"
    return Said(kind, thing_name(place.name.text, procedure))


def _layer(place: syntax.Place, procedure: Procedure) -> str:
    """Call a layer by where it lies and what it is, as the bench found it; else as written."""
    found = procedure.positions.get(place.span.start)
    if found is None:
        return PARTS[place.part or "liquid"]
    position, layer, close = found
    test = ", as a drop of water shows," if close else ""
    return f"the {position} ({layer}) layer{test}"


def contents_words(place: syntax.Place, procedure: Procedure) -> Words:
    """Name what is poured out of a vessel."""
    if place.part is not None:
        return Said("vessel", (Run(_layer(place, procedure)),))
    return Said("vessel", (Run("the contents of "), *thing_name(place.name.text, procedure)))


def amount_words(amount: syntax.Amount, procedure: Procedure) -> tuple[Words, ...]:
    """Say how much of what."""
    material = procedure.materials.get(amount.material.text)
    name = material_words(material) if material else thing_name(amount.material.text, procedure)
    if isinstance(amount.measure, str):
        said = {"all": "all of ", "half": "half of ", "rest": "the rest of "}[amount.measure]
        return (Said("quantity", (Run(said),)), Said("material", name))
    quantity = amount.measure.quantity
    of = " of " if quantity.unit.symbol else " "
    words = (Said("quantity", quantity_words(quantity)), Run(of), Said("material", name))
    if amount.per is None:
        return words
    unit, counted = amount.per
    return (
        *words,
        Run(f" for each {unit.quantity.unit.symbol} of "),
        Said("material", thing_name(counted.text, procedure)),
    )


def verb_words(act: syntax.VerbAct, procedure: Procedure) -> tuple[Words, ...]:
    """Put an operation into words."""
    if act.verb in _SILENT:
        return ()
    if act.verb == "next period":
        return (Run("This is the end of the period."),)
    if act.verb == "take" and isinstance(act.object, syntax.Measured):
        return (Said("quantity", quantity_words(act.object.quantity)),)
    if act.verb == "adjust":
        return _adjust(act, procedure)
    words: list[Words] = [Run(act.verb)]
    match act.object:
        case syntax.Place():
            words += (Run(" "), place_words(act.object, procedure))
        case syntax.Measured(quantity, _):
            words += (
                Run(" for " if act.verb == "wait" else " "),
                Said("quantity", quantity_words(quantity)),
            )
        case _:
            pass
    if act.subject is not None:
        words.append(Run(" " + _TESTS.get(act.subject.text.lower(), f"for {act.subject.text}")))
    return (*joined(words), *clauses_words(act.clauses, procedure))


def _adjust(act: syntax.VerbAct, procedure: Procedure) -> tuple[Words, ...]:
    """`adjust A to pH 10 with alkali` prints `6.0 M sodium hydroxide until pH 10`."""
    by = {clause.word: clause for clause in act.clauses}
    words: list[Words] = []
    reagent = by.get("with")
    if reagent is not None:
        words += _value(reagent.value, procedure)
    if (to := by.get("to")) is not None:
        words += (Run(" until "), *_value(to.value, procedure))
    rest = tuple(c for c in act.clauses if c.word not in ("with", "to"))
    return (*words, *clauses_words(rest, procedure))


def clauses_words(
    clauses: Iterable[syntax.Clause], procedure: Procedure, *, charge: bool = False
) -> tuple[Words, ...]:
    """Put clauses into words, each with a blank or a comma before it."""
    words: list[Words] = []
    for clause in sorted(clauses, key=_after_the_rest):
        value = _value(clause.value, procedure)
        match clause.word:
            case "closure" | "setting":
                words += (Run(", "), *value)
            case "by" if charge and isinstance(clause.value, syntax.Place):
                words += (Run(", measured with "), *value)
            case "as" | "because" | "is" | "giving":
                pass
            case "until":
                words += (Run(" until "), *value)
            case _:
                words += (Run(f" {clause.word} "), *value)
    return joined(words)


def _after_the_rest(clause: syntax.Clause) -> bool:
    """Closures and places close the sentence; all else keeps the author's order."""
    return clause.word in ("closure", "setting")


def _value(value: syntax.ClauseValue, procedure: Procedure) -> tuple[Words, ...]:
    match value:
        case syntax.Measured(quantity, _):
            return (Said("quantity", quantity_words(quantity)),)
        case syntax.Ph(quantity, _):
            return (Said("quantity", (Run(f"pH{NBSP}"), *quantity_words(quantity))),)
        case syntax.Amount():
            return amount_words(value, procedure)
        case syntax.Place():
            if value.name.text == "mark":
                return (Run("the mark"),)
            if value.name.text in STREAMS and value.name.text not in procedure.names:
                return (Run(_STREAM_WORDS.get(value.name.text, f"the {value.name.text} waste")),)
            return (place_words(value, procedure),)
        case syntax.Words(text, _):
            return (Run(text),)


def _again(act: syntax.AgainAct, procedure: Procedure, step: int) -> str:
    """Say which steps are done again, how often, and how."""
    numbers: list[str] = []
    own = False
    for item in act.steps:
        first, last = (_number(word, procedure) for word in (item.first, item.last))
        own = own or (first == last == str(step))
        numbers.append(first if first == last else f"{first}–{last}")
    if own and len(numbers) == 1:
        words = f"do this {_times(act)}"
    else:
        plural = len(numbers) > 1 or "–" in numbers[0]
        words = f"repeat step{'s' if plural else ''}{NBSP}" + " and ".join(numbers)
        if act.times > 1:
            words += f" {_times(act)}"
    if act.exchanges:
        new = [_short(name.text, procedure) for name, _ in act.exchanges]
        words += " with " + " and ".join(new)
    if act.fresh:
        words += ", each time with clean glassware"
    if act.at_most:
        words += f", at most {act.at_most} times"
    return words


def _times(act: syntax.AgainAct) -> str:
    return _TIMES.get(act.times, f"{act.times} more times")


def _number(word: str, procedure: Procedure) -> str:
    return word if word.isdigit() else str(procedure.labels.get(word, word))


def _short(name: str, procedure: Procedure) -> str:
    return "".join(w.text for w in thing_name(name, procedure) if isinstance(w, Run))
