"""Reading formulas strictly: one way, or not at all.

Hand-written, because libraries read too much: `CuSO4.5H2O` loses its water or gains half an atom,
`Fe3+` becomes three atoms of iron, `NaOH + HCl` is summed. Here every sign must have its one place;
the first that has not is the fault, and the span of the fault is that sign.
"""

from __future__ import annotations

import re
from fractions import Fraction
from typing import NamedTuple

from watchglass.chemistry.elements import ELEMENTS

#: A number of atoms; a fraction only where a hydrate's multiplier is one.
Count = int | Fraction

LONGEST = 400
DEEPEST = 8
MOST_DIGITS = 4

# Expressions are compiled where they are used, and `re` keeps them: start-up is felt.
_SIGNS = r"([A-Z][a-z]?)([0-9]*)|([(\[])|([)\]])([0-9]*)"
_MULTIPLIER = r"[0-9]+(?:\.[0-9]+)?"
_CHARGE = r"([1-9][0-9]?)?([+-])"
_BARE_CHARGE = r"[+-]+[0-9]?"
_PARTNER = {")": "(", "]": "["}


class FormulaFault(NamedTuple):
    """Why a text is no formula.

    Attributes:
        message: What is wrong.
        start: Where it begins, as an offset in the text.
        end: Where it ends.
        help: How to write it, or None.
    """

    message: str
    start: int
    end: int
    help: str | None = None


def read_formula(text: str) -> tuple[dict[str, Count], int] | FormulaFault:
    """Read a formula; never raises.

    Args:
        text: The formula and nothing else.

    Returns:
        Number of atoms of each element in the order met, and the charge number; or the first fault.
    """
    if not text or text.isspace():
        return FormulaFault("a formula is missing", 0, len(text))
    if len(text) > LONGEST:
        return FormulaFault(f"a formula of more than {LONGEST} signs", LONGEST, len(text))
    body, caret, _ = text.partition("^")
    if not body:
        return FormulaFault("nothing stands before `^`", 0, 1)
    atoms = _body(text, len(body))
    if isinstance(atoms, FormulaFault):
        return atoms
    charge = _charge(text, len(body)) if caret else 0
    if isinstance(charge, FormulaFault):
        return charge
    return atoms, charge


def _body(text: str, end: int) -> dict[str, Count] | FormulaFault:
    """Read the units between the dots, each with its multiplier, and add up their atoms."""
    units = text[:end].split("·")
    if len(units) == 1 and not text[0].isdigit():
        return _unit(text, 0, end)
    total: dict[str, Count] = {}
    start = 0
    for unit in units:
        stop = start + len(unit)
        times: Count = 1
        found = re.compile(_MULTIPLIER).match(unit)
        if found is not None:
            fault = _unfit_multiplier(text, start, start + found.end(), stop, len(units))
            if fault is not None:
                return fault
            times = int(found[0]) if found[0].isdigit() else Fraction(found[0])
            start += found.end()
        if start == stop:
            side = "after" if start else "before"
            return FormulaFault(f"nothing stands {side} `·`", max(start - 1, 0), max(start, 1))
        atoms = _unit(text, start, stop)
        if isinstance(atoms, FormulaFault):
            return atoms
        for symbol, count in atoms.items():
            total[symbol] = total.get(symbol, 0) + count * times
        start = stop + 1
    return total


def _unfit_multiplier(
    text: str, start: int, end: int, stop: int, units: int
) -> FormulaFault | None:
    """Say what is wrong with a multiplier, or None."""
    written = text[start:end]
    if units == 1 and end < stop:
        return FormulaFault(f"`{written}` multiplies the whole formula", start, end)
    if end == stop:
        return FormulaFault(f"`{written}` has nothing to multiply", start, end)
    if not written.strip("0."):
        return FormulaFault("a multiplier of 0", start, end)
    if end - start > MOST_DIGITS + 1:
        return FormulaFault(f"a multiplier of more than {MOST_DIGITS} digits", start, end)
    if written.startswith("0") and not written.startswith("0."):
        return FormulaFault("a multiplier that begins with 0", start, end)
    return None


def _unit(text: str, start: int, end: int) -> dict[str, Count] | FormulaFault:
    """Read one unit: symbols, counts and brackets; a stack stands for the open brackets."""
    stack: list[dict[str, Count]] = [{}]
    opened: list[int] = []
    token = re.compile(_SIGNS)
    at = start
    while at < end:
        found = token.match(text, at, end)
        if found is None:
            return _unreadable(text, at, end)
        symbol, count, opening, _, times = found.groups()
        if symbol is not None:
            if symbol not in ELEMENTS:
                return FormulaFault(f"`{symbol}` is no element", at, at + len(symbol))
            group: dict[str, Count] = {symbol: 1}
        elif opening is not None:
            if len(opened) == DEEPEST:
                return FormulaFault(f"more than {DEEPEST} brackets in one another", at, at + 1)
            opened.append(at)
            stack.append({})
            at += 1
            continue
        else:
            fault = _unfit_closing(text, at, opened, stack[-1])
            if fault is not None:
                return fault
            opened.pop()
            group, count = stack.pop(), times
        if count and (count[0] == "0" or len(count) > MOST_DIGITS):
            return _unfit_count(text, count, found.end())
        number = int(count) if count else 1
        level = stack[-1]
        for element, atoms in group.items():
            level[element] = level.get(element, 0) + atoms * number
        at = found.end()
    if opened:
        return FormulaFault(f"`{text[opened[-1]]}` is not closed", opened[-1], opened[-1] + 1)
    return stack[0]


def _unfit_closing(
    text: str, at: int, opened: list[int], group: dict[str, Count]
) -> FormulaFault | None:
    """Say what is wrong with a closing bracket, or None."""
    if not opened:
        return FormulaFault(f"`{text[at]}` closes nothing", at, at + 1)
    opening = text[opened[-1]]
    if opening != _PARTNER[text[at]]:
        return FormulaFault(f"`{text[at]}` cannot close `{opening}`", at, at + 1)
    if not group:
        return FormulaFault("nothing stands in the brackets", opened[-1], at + 1)
    return None


def _unfit_count(text: str, count: str, end: int) -> FormulaFault:
    start = end - len(count)
    if text.startswith(".", end):
        return FormulaFault("a count is a whole number", start, end + 1)
    if count.strip("0") == "":
        return FormulaFault("a count of 0", start, end)
    if count[0] == "0":
        return FormulaFault("a count that begins with 0", start, end)
    return FormulaFault(f"a count of more than {MOST_DIGITS} digits", start, end)


def _unreadable(text: str, at: int, end: int) -> FormulaFault:
    """Say why no symbol, count or bracket can be read here."""
    sign = text[at]
    if sign.isspace():
        if " + " in text:
            return FormulaFault("this is a sum of substances, not one formula", 0, len(text))
        return FormulaFault("a formula holds no space", at, at + 1)
    stop = at
    if "0" <= sign <= "9":
        while stop < end and "0" <= text[stop] <= "9":
            stop += 1
        return FormulaFault(f"`{text[at:stop]}` has nothing before it to count", at, stop)
    if re.compile(_BARE_CHARGE).fullmatch(text, at) and at:
        return FormulaFault(f"`{text}` has a charge without `^`", 0, len(text))
    if "a" <= sign <= "z":
        while stop < end and "a" <= text[stop] <= "z":
            stop += 1
        message = f"`{text[at:stop]}` begins without a capital letter, as no element does"
        return FormulaFault(message, at, stop)
    return FormulaFault(f"`{sign}` cannot stand in a formula", at, at + 1)


def _charge(text: str, caret: int) -> int | FormulaFault:
    """Read the charge after `^`: a number of at most two digits, then its sign."""
    written = text[caret + 1 :]
    found = re.compile(_CHARGE).fullmatch(written)
    if found is not None:
        return int(found[1] or 1) * (1 if found[2] == "+" else -1)
    if not written:
        return FormulaFault("no charge stands after `^`", caret, caret + 1)
    signs = sum(written.count(sign) for sign in "+-")
    if "^" in written:
        message = "a formula has one charge, at its end"
    elif signs > 1:
        message = f"`{written}` has more than one sign"
    elif written.isdigit():
        message = f"`{written}` is a charge without its sign"
    else:
        message = f"`{written}` is no charge"
    return FormulaFault(message, caret + 1, len(text))
