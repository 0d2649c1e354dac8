"""Clauses and places: what stands round an act's object."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NoReturn

from watchglass.base import codes, units
from watchglass.base.findings import Finding, Related, did_you_mean
from watchglass.base.quantities import Kind, Number, Quantity
from watchglass.base.scan import unknown_unit
from watchglass.base.units import REFUSED
from watchglass.read import syntax
from watchglass.read.cursor import StopReading
from watchglass.read.words import CLAUSE_WORDS, CLOSURES, MEASURES_OF_ALL, NAME, PARTS, SETTINGS

if TYPE_CHECKING:
    from watchglass.read.cursor import Cursor

_PH = re.compile(r"p[Hh](?![^\W\d]|-)")
_ALL_COMMA = tuple(sorted((*CLOSURES, *SETTINGS), key=len, reverse=True))


def read_place(cursor: Cursor) -> syntax.Place:
    """Read `funnel`, `funnel.aqueous` or `tube-1.lower`."""
    start = cursor.at
    name = cursor.name("a name")
    if cursor.at == name.span.end and cursor.takes("."):
        part = cursor.name("a part")
        if part.text not in PARTS:
            cursor.stop(
                codes.MARK_NOT_READ,
                part.span,
                f"`{part.text}` is no part of what a vessel holds",
                did_you_mean(part.text, PARTS)
                or "take one of " + ", ".join(f"`{p}`" for p in sorted(PARTS)),
            )
        return syntax.Place(name, part.text, cursor.span(start))
    return syntax.Place(name, None, cursor.span(start))


def read_object(cursor: Cursor) -> syntax.Place:
    """Read the place that a verb or a clause is about, where no clause word can stand."""
    if cursor.peek_word() in CLAUSE_WORDS:
        cursor.stop(codes.MARK_NOT_READ, cursor.rest(), f"a name is expected{cursor.here()}")
    return read_place(cursor)


def read_clauses(
    cursor: Cursor, earlier: tuple[syntax.Clause, ...] = ()
) -> tuple[syntax.Clause, ...]:
    """Read clauses as long as they follow; each at most once in an act.

    Args:
        cursor: Where they stand.
        earlier: Those of the same act that stood before its arrow.

    Returns:
        The earlier ones and those read here.
    """
    clauses = list(earlier)
    while not cursor.done:
        start = cursor.at
        if cursor.text[start] == ",":
            clause = _after_comma(cursor)
        else:
            word = cursor.peek_word()
            if word not in CLAUSE_WORDS:
                break
            cursor.takes_word(word)
            value = _value(cursor, word)
            clause = syntax.Clause(word, value, cursor.span(start))
        if clause is None:
            continue
        for before in clauses:
            if before.word == clause.word:
                _twice(clause, before)
        clauses.append(clause)
    return tuple(clauses)


def _twice(clause: syntax.Clause, before: syntax.Clause) -> NoReturn:
    said = "a closure" if clause.word == "closure" else f"`{clause.word}`"
    raise StopReading(
        Finding(
            code=codes.CLAUSE_TWICE,
            span=clause.span,
            message=f"{said} stands twice in one act",
            related=(Related(before.span, "it stood here first"),),
            help="keep one of the two",
        )
    )


def _after_comma(cursor: Cursor) -> syntax.Clause | None:  # noqa: RET503 - `stop` never returns
    """Read `, open`, `, in hood`; or a comma that only divides clauses."""
    cursor.takes(",")
    start = cursor.at
    text = cursor.text
    for words in _ALL_COMMA:
        pattern = words.replace(" ", r"\s+") + r"(?![\w-])"
        if found := re.compile(pattern).match(text, start, cursor.end):
            cursor.at = found.end()
            kind = "closure" if words in CLOSURES else "setting"
            value = syntax.Words(words, cursor.source.span(start, found.end()))
            cursor.blanks()
            return syntax.Clause(kind, value, value.span)
    if cursor.peek_word() in CLAUSE_WORDS:
        return None
    rest = cursor.rest()
    word = cursor.peek_word()
    cursor.stop(
        codes.MARK_NOT_READ,
        cursor.source.span(start, start + len(word)) if word else rest,
        f"`{word or rest.text}` is no closure and no place",
        did_you_mean(rest.text, _ALL_COMMA)
        or "take one of " + ", ".join(f"`{w}`" for w in CLOSURES + SETTINGS),
    )


def _value(cursor: Cursor, word: str) -> syntax.ClauseValue:
    start = cursor.at
    if cursor.done:
        cursor.stop(
            codes.MARK_NOT_READ, cursor.rest(), f"nothing follows `{word}`", "add what it is about"
        )
    if cursor.text[start] == '"':
        return cursor.quoted()
    if word == "to" and (found := _PH.match(cursor.text, start, cursor.end)):
        cursor.at = found.end()
        apart = cursor.text[cursor.at : cursor.at + 1].isspace()
        cursor.blanks()
        measured = cursor.quantity() if apart else None
        if measured is None:
            cursor.stop(
                codes.MARK_NOT_READ,
                cursor.source.span(start, found.end())
                if cursor.at >= cursor.end
                else cursor.rest(),
                "`pH` needs a number after a blank",
                "write it as in `to pH 10`",
            )
        return syntax.Ph(measured.quantity, cursor.span(start))
    if word == "until":
        cursor.stop(
            codes.MARK_NOT_READ,
            cursor.rest(),
            "what follows `until` stands in double quotes",
            f'write `until "{cursor.rest().text}"`',
        )
    if (all_of := cursor.peek_word()) in MEASURES_OF_ALL:
        cursor.takes_word(all_of)
        cursor.takes_word("of")
        name = cursor.name("a material")
        return syntax.Amount(all_of, name, cursor.span(start))
    measured = cursor.quantity()
    if measured is None:
        return read_object(cursor)
    following = NAME.match(cursor.text, cursor.at, cursor.end)
    if following and (following[0] == "of" or following[0] not in CLAUSE_WORDS):
        return read_amount(cursor, start, measured)
    return measured


# ------------------------------------------------------------------------------ amounts


def read_amount(cursor: Cursor, start: int, measured: syntax.Measured) -> syntax.Amount:
    """Read the material after a quantity, and `per …` where it follows."""
    cursor.takes_word("of")
    name = _material_after(cursor, measured)
    per = None
    if cursor.takes_word("per"):
        per = (_unit_as_quantity(cursor), cursor.name("a material"))
    return syntax.Amount(measured, name, cursor.span(start), per)


def _unit_as_quantity(cursor: Cursor) -> syntax.Measured:
    """Read the bare unit after `per` as one of it."""
    word = cursor.name("a unit")
    unit = units.UNITS.get(word.text)
    if unit is None:
        fault = unknown_unit(word.text, word.span.start)
        cursor.stop(fault.code, word.span, fault.message, fault.help)
    quantity = Quantity(word.text, Kind.EXACT, Number("1", 1.0, 1, 0), unit)
    return syntax.Measured(quantity, word.span)


def _material_after(cursor: Cursor, measured: syntax.Measured) -> syntax.Name:
    """Read a material's name; two words in a row mean that the first was to be a unit."""
    name = cursor.name("a material")
    if measured.quantity.unit.symbol or name.quoted:
        return name
    following = NAME.match(cursor.text, cursor.at, cursor.end)
    tied = following and (following[0] in CLAUSE_WORDS or following[0] == "per")
    if name.text in REFUSED or (following and not tied):
        fault = unknown_unit(name.text, name.span.start)
        cursor.stop(fault.code, name.span, fault.message, fault.help)
    return name
