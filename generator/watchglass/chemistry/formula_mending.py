"""What was likely meant by a text that is no formula: other notations, rewritten as ours.

An offer, never a reading: each rewriting is given back only where it can be read, and where two
are as likely both are named. Rewritings that cannot be mistaken (raised and lowered digits, other
dots, a state in brackets) come first, then charges, bonds, abbreviated groups and letter case.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.chemistry.elements import ELEMENTS, WEIGHTS

if TYPE_CHECKING:
    from collections.abc import Callable, Iterator

#: Longer texts are not tried: the ways to divide letters among symbols grow fast.
_LONGEST = 60
_LONGEST_LETTERS = 24
_MOST_OFFERS = 3
#: A text of small letters alone, longer than this, is a word rather than a formula.
_LONGEST_SMALL = 4

_LINED = str.maketrans("₀₁₂₃₄₅₆₇₈₉₊₋−–•∙⋅●×", "0123456789+---·····")
_RAISED = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻", "0123456789+-")
_RAISED_END = re.compile(r"\^?([⁰¹²³⁴⁵⁶⁷⁸⁹]*[⁺⁻])$")
_PARTED = re.compile(r"(?<=[A-Za-z0-9)\]])\s*[.*·x]\s*([0-9]+(?:\.[0-9]+)?)?\s*(?=[A-Z(\[])")
_WATER = re.compile(r"(?<=[A-Za-z0-9)\]])\s+(?=[0-9.]*H2O$)")
_STATE = re.compile(r"\s*\((?:aq|s|l|g)\)$")
_PARTS_OF_ONE = {"½": "0.5", "¼": "0.25", "¾": "0.75", "1/2": "0.5", "3/2": "1.5", "1/4": "0.25"}
_BOND = re.compile(r"(?<=[A-Za-z0-9)\]])[-=≡](?=[A-Z(\[])")
_GROUPED = re.compile(r"[(\[{]?([0-9]*)([+-]+)([0-9]*)[)\]}]?$")
_CHARGE_END = re.compile(r"^(.*?)([0-9]*)([+-])$")
_ONE_ELEMENT = re.compile(r"[A-Z][a-z]?")
_LETTERS = re.compile(r"[A-Za-z0-9()\[\]·]+")

#: Abbreviations of organic groups that are no element's symbol. Common usage, no source.
_GROUPS = {
    "Me": "CH3",
    "Et": "C2H5",
    "Bu": "C4H9",
    "Ph": "C6H5",
    "Bn": "C7H7",
    "Bz": "C7H5O",
}
_GROUP = re.compile("(" + "|".join(_GROUPS) + ")(?![a-z])([0-9]*)")
_NAMES = frozenset(element.name for element in ELEMENTS.values())
#: Symbols by their letters in small; rare elements would only make offers worse.
_SYMBOLS = {symbol.lower(): symbol for symbol in WEIGHTS if symbol not in ("D", "T")}


def mending(text: str, reads: Callable[[str], bool]) -> str | None:
    """Say how a refused formula is likely to be written.

    Args:
        text: The text that is no formula.
        reads: Tells whether a text is a formula.

    Returns:
        A sentence for the author without its stop, or None where nothing likely reads.
    """
    if len(text) > _LONGEST:
        return None
    plain = _plain(text)
    for offers in ([plain], *_doubtful(plain)):
        fit = [offer for offer in dict.fromkeys(offers) if offer != text and reads(offer)]
        if fit and len(fit) <= _MOST_OFFERS:
            return "write " + " or ".join(f"`{offer}`" for offer in fit)
    counted = re.match(r"([0-9]+)(?=[A-Z(\[])", plain)
    if counted and reads(plain[counted.end() :]):
        return (
            f"put a space after the number in an equation: `{counted[1]} {plain[counted.end() :]}`"
        )
    return None


def _plain(text: str) -> str:
    """Rewrite what has one meaning only: raised and lowered signs, dots, parts of one, states."""
    text = _STATE.sub("", text.strip())
    text = _RAISED_END.sub(lambda found: "^" + found[1].translate(_RAISED), text)
    text = text.translate(_LINED)
    for written, decimal in _PARTS_OF_ONE.items():
        text = text.replace(written, decimal)
    return _WATER.sub("·", _PARTED.sub(lambda found: "·" + (found[1] or ""), text))


def _doubtful(text: str) -> Iterator[list[str]]:
    """Give the rewritings that need a guess, the likeliest kind first."""
    yield list(_charges(text))
    yield [_BOND.sub("", text)]
    yield [_GROUP.sub(_spelt, text)]
    letters = len(text) <= _LONGEST_LETTERS and _LETTERS.fullmatch(text)
    word = text.isalpha() and text.islower() and (len(text) > _LONGEST_SMALL or text in _NAMES)
    if letters and not word:
        yield list(_cased(text, 0))[: _MOST_OFFERS + 1]


def _charges(text: str) -> Iterator[str]:
    """Give the ways to put the charge of a text after `^`."""
    body, caret, written = text.partition("^")
    if not caret:
        body, _, written = text.rpartition(" ")
    grouped = _GROUPED.fullmatch(written)
    if body and grouped:
        # `^(3+)`, `^+3`, `^++` and ` 3+`: the body ends where the caret or the space stands.
        signs, size = grouped[2], grouped[1] + grouped[3]
        if len(set(signs)) == 1:
            number = size or (str(len(signs)) if len(signs) > 1 else "")
            yield f"{body.rstrip()}^{'' if number == '1' else number}{signs[0]}"
        return
    found = _CHARGE_END.match(text)
    if caret or found is None:
        signed = re.match(r"(.+?)([+-])([1-9])$", text)
        if signed and not caret:
            yield f"{signed[1]}^{signed[3].replace('1', '')}{signed[2]}"
        return
    body, digits, sign = found.groups()
    alone = _ONE_ELEMENT.fullmatch(body) is not None
    if len(digits) > 1:
        yield f"{body}{digits[:-1]}^{digits[-1]}{sign}"
    elif digits and alone:
        # `Fe3+` is a charge of three, `O2-` may be either.
        yield f"{body}^{digits.replace('1', '')}{sign}"
    else:
        yield f"{body}{digits}^{sign}"


def _spelt(found: re.Match[str]) -> str:
    atoms = _GROUPS[found[1]]
    return f"({atoms}){found[2]}" if found[2] else atoms


def _cased(text: str, at: int) -> Iterator[str]:
    """Give the ways to read a text as symbols whatever its letter case."""
    if at == len(text):
        yield ""
        return
    if not text[at].isalpha():
        for rest in _cased(text, at + 1):
            yield text[at] + rest
        return
    for size in (1, 2):
        symbol = _SYMBOLS.get(text[at : at + size].lower())
        if symbol is not None and at + size <= len(text):
            for rest in _cased(text, at + size):
                yield symbol + rest
