"""Words in the boxes: portions, acts, vessels, parts. Plain text, with spaces that do not break."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.publish import model as m
from watchglass.publish.names import PARTS, material_words, thing_name, vessel_name
from watchglass.publish.text import NBSP, quantity_words
from watchglass.publish.wording import clauses_words
from watchglass.read import syntax

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.publish.model import Words
    from watchglass.resolve.model import Charge, Operation, Portion, Procedure

_RAISED = str.maketrans("0123456789+-−", "⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻⁻")
_LOWERED = str.maketrans("0123456789", "₀₁₂₃₄₅₆₇₈₉")
_JOINERS = re.compile("[\N{WORD JOINER}\N{ZERO WIDTH SPACE}]")
_OTHER = {"upper": "lower", "lower": "upper", "aqueous": "organic", "organic": "aqueous"}
_REST = {"solid": "liquid", "liquid": "solid", **_OTHER}
_OF_ALL = {"all": "all of ", "half": "half of ", "rest": "the rest of "}
#: Clauses that say where, how hot and how long; the others are for the step to tell.
_SHOWN = {"to", "at", "for", "by", "with", "in", "through"}
_VERBS = {"settle": "let the layers part"}
_NO_CLAUSES = frozenset(("settle", "vent"))


def plain(words: Iterable[Words]) -> str:
    """Set words as plain text; what is raised or lowered stays so where there are signs for it."""
    parts: list[str] = []
    for word in words:
        match word:
            case m.Run(text) | m.CodeRun(text):
                parts.append(text)
            case m.Raised(text):
                parts.append(text.translate(_RAISED))
            case m.Lowered(text):
                parts.append(text.translate(_LOWERED))
            case m.Stress(_, children) | m.LinkTo(_, _, children) | m.Said(_, children):
                parts.append(plain(children))
            case _:
                pass
    return _JOINERS.sub("", "".join(parts))


def sentence_case(words: str) -> str:
    """Begin with a capital and without an article, as a box or a cell does."""
    words = words.removeprefix("the ")
    return words[:1].upper() + words[1:]


def place_name(name: str, procedure: Procedure) -> str:
    """Call a vessel, or whatever stands for one."""
    vessel = procedure.vessels.get(name)
    return vessel_name(vessel, procedure) if vessel else plain(thing_name(name, procedure))


def portion_words(portion: Portion, name: str, procedure: Procedure, times: int) -> str:
    """Say how much of what: `2 × 15 mL of 3.0 M hydrochloric acid`."""
    what = plain(material_words(procedure.materials[name]))
    if portion.quantity is None:
        return _OF_ALL.get(portion.of_all, "") + what
    amount = plain(quantity_words(portion.quantity))
    counted = f"{times}{NBSP}×{NBSP}{amount}" if times > 1 else amount
    of = " of " if portion.quantity.unit.symbol else " "
    if portion.per is None:
        return f"{counted}{of}{what}"
    unit, base = portion.per
    return (
        f"{counted}{of}{what} for each {unit.unit.symbol} of {plain(thing_name(base, procedure))}"
    )


def act_words(event: Operation, procedure: Procedure) -> str:
    """Say what is done, in few words: the verb, how hot, how long."""
    verb = _VERBS.get(event.verb, event.verb)
    if event.verb in _NO_CLAUSES:
        return verb
    kept = [
        clause
        for clause in event.clauses
        if clause.word in _SHOWN and not (clause.word == "with" and event.portions and _adds(event))
    ]
    return verb + plain(clauses_words(kept, procedure))


def _adds(event: Operation) -> bool:
    """Tell whether what an act takes is shown as something brought, not in its own words."""
    return event.verb != "dry"


def heat_words(event: Operation | Charge) -> str:
    """Give the temperature that an act says, or nothing."""
    for clause in event.clauses:
        if clause.word in ("at", "to") and isinstance(clause.value, syntax.Measured):
            quantity = clause.value.quantity
            if quantity.dimension == dim.TEMPERATURE:
                return plain(quantity_words(quantity))
    return ""


def part_words(place: syntax.Place, procedure: Procedure) -> tuple[str, str]:
    """Call a part that is drawn off, and tell its phase: `lower (aqueous) layer`, `aqueous`."""
    part = place.part or "liquid"
    found = procedure.positions.get(place.span.start)
    if found is not None:
        position, layer, _ = found
        return f"{position} ({layer}) layer", layer
    return PARTS[part].removeprefix("the "), part


def rest_words(place: syntax.Place, procedure: Procedure) -> tuple[str, str]:
    """Call what is left when a part is drawn off, and tell its phase."""
    part = place.part or "liquid"
    found = procedure.positions.get(place.span.start)
    if found is not None:
        position, layer, _ = found
        return f"{_OTHER[position]} ({_OTHER[layer]}) layer", _OTHER[layer]
    rest = _REST[part]
    return PARTS[rest].removeprefix("the "), rest


def times_words(times: int) -> str:
    """Say how often, or nothing for once."""
    return "" if times < 2 else "twice" if times == 2 else f"{times}{NBSP}times"


def step_words(steps: tuple[int, ...]) -> str:
    """Write step numbers: runs of three or more with a dash.

    >>> step_words((3, 4, 5, 7, 8))
    '3–5, 7, 8'
    """
    parts: list[str] = []
    run: list[int] = []
    for number in (*steps, 0):
        if run and number == run[-1] + 1:
            run.append(number)
            continue
        if len(run) > 2:
            parts.append(f"{run[0]}–{run[-1]}")
        else:
            parts += map(str, run)
        run = [number]
    return ", ".join(parts)
