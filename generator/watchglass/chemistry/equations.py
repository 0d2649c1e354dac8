"""Equations of reactions: split as text, then checked and balanced by their formulas.

Two steps, because the species of an equation may be names that only a catalogue knows:
`split_equation` finds arrow, sides, coefficients and the text of each species with its place; the
caller turns those texts into formulas; `check_balance` and `balance` then work on formulas alone.
Names hold digits, commas, hyphens and brackets, so the rule is one of spaces: the arrow and each
`+` between species have spaces on both sides, and a coefficient is a number with a space after it.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from enum import Enum
from fractions import Fraction
from typing import TYPE_CHECKING, NamedTuple

from watchglass.chemistry.balancing import positive_solution, solutions
from watchglass.chemistry.formulas import hill_order

if TYPE_CHECKING:
    from collections.abc import Mapping, Sequence

    from watchglass.chemistry.balancing import Matrix
    from watchglass.chemistry.formulas import Count, Formula

    #: The terms of a side: how many, and of what.
    Terms = Sequence[tuple[Fraction | int, Formula]]

LONGEST = 2000
MOST_SPECIES = 20

# Expressions are compiled where they are used, and `re` keeps them: start-up is felt.
_ARROW = r"(?<!\S)(->|→|<=>|⇌)(?!\S)"
_LIKE_ARROW = r"<?[-=]*[-=]>|<-+>?|[→⇌⇒⟶⟹⇄⇋↔]|(?<!\S)=+(?!\S)"
_PLUS = r"(?<!\S)\+(?!\S)"
_TIGHT_PLUS = r"(?<=\s)\+(?=\S)|(?<=\S)\+(?=\s+\S)"
_COEFFICIENT = r"([1-9][0-9]{0,5})(?:/([1-9][0-9]{0,5}))?\s+(?=\S)"
_LIKE_COEFFICIENT = r"([0-9]+(?:[./,][0-9]+)?|[½¼¾⅓⅔])(\s+(?=\S)|$)"
_DECIMALS = {"0.5": "1/2", "1.5": "3/2", "2.5": "5/2", "½": "1/2", "¼": "1/4", "¾": "3/4"}


class Term(NamedTuple):
    """One species of an equation as text.

    Attributes:
        coefficient: Its stoichiometric number, > 0; 1 where none is written.
        text: The species: a formula or a name.
        start: Where the species begins in the equation, after its coefficient.
        end: Where it ends.
    """

    coefficient: Fraction
    text: str
    start: int
    end: int


class EquationText(NamedTuple):
    """An equation split into its terms, in the order written."""

    left: tuple[Term, ...]
    right: tuple[Term, ...]


class EquationFault(NamedTuple):
    """Why a text is no equation: what is wrong, where, and how to write it."""

    message: str
    start: int
    end: int
    help: str | None = None


class Verdict(Enum):
    """What an equation conserves."""

    BALANCED = "balanced"
    MASS_UNBALANCED = "mass_unbalanced"
    CHARGE_UNBALANCED = "charge_unbalanced"
    MASS_AND_CHARGE_UNBALANCED = "mass_and_charge_unbalanced"


class Balance(NamedTuple):
    """What is left over when the right side is taken from the left.

    Attributes:
        excess_left: Atoms of each element, left less right; only what is not nought.
        charge_excess_left: Charge number, left less right.
    """

    excess_left: Mapping[str, Count]
    charge_excess_left: Count

    @property
    def verdict(self) -> Verdict:
        """What is conserved and what is not."""
        match bool(self.excess_left), bool(self.charge_excess_left):
            case False, False:
                return Verdict.BALANCED
            case True, False:
                return Verdict.MASS_UNBALANCED
            case False, True:
                return Verdict.CHARGE_UNBALANCED
            case _:
                return Verdict.MASS_AND_CHARGE_UNBALANCED

    @property
    def balanced(self) -> bool:
        """Whether atoms and charge are conserved."""
        return self.verdict is Verdict.BALANCED


class Balanced(NamedTuple):
    """The one set of smallest whole coefficients: left side first, in the order given."""

    coefficients: tuple[int, ...]


class NotUnique(NamedTuple):
    """Several balances that are no multiples of one another; none of them is the answer.

    Attributes:
        nullity: How many are independent.
    """

    nullity: int


@dataclass(frozen=True, slots=True)
class Impossible:
    """No positive coefficients conserve atoms and charge."""


def split_equation(text: str) -> EquationText | EquationFault:
    """Split an equation into terms; never raises.

    Args:
        text: Such as `2 NaOH + H2SO4 -> Na2SO4 + 2 H2O`; species may be names. The arrow is
            `->`, `→`, `<=>` or `⇌`; coefficients are whole or fractions such as `1/2`.

    Returns:
        The terms with their places, or the first fault.
    """
    if len(text) > LONGEST:
        return EquationFault(f"an equation of more than {LONGEST} signs", LONGEST, len(text))
    arrows = list(re.compile(_ARROW).finditer(text))
    if not arrows:
        return _without_arrow(text)
    if len(arrows) > 1:
        return EquationFault(
            "a second arrow", arrows[1].start(), arrows[1].end(), "write one equation for each step"
        )
    arrow = arrows[0]
    left = _side(text, 0, arrow.start(), arrow)
    if isinstance(left, EquationFault):
        return left
    right = _side(text, arrow.end(), len(text), arrow)
    if isinstance(right, EquationFault):
        return right
    return EquationText(left, right)


def _without_arrow(text: str) -> EquationFault:
    found = re.compile(_LIKE_ARROW).search(text)
    if found is None:
        return EquationFault("the arrow is missing", 0, len(text), "write `reactants -> products`")
    if found[0] in ("->", "→", "<=>", "⇌"):
        message = f"`{found[0]}` needs a space on both sides"
    else:
        message = f"`{found[0]}` is no arrow"
    start, end = found.span()
    mended = f"{text[:start].rstrip()} -> {text[end:].lstrip()}".strip()
    help_ = f"write `{mended}`" if len(mended) <= 120 and "->" in mended[1:-2] else "write ` -> `"
    return EquationFault(message, start, end, help_)


def _side(
    text: str, start: int, end: int, arrow: re.Match[str]
) -> tuple[Term, ...] | EquationFault:
    """Read the terms of one side."""
    if not text[start:end].strip():
        where = "before" if start == 0 else "after"
        return EquationFault(f"nothing stands {where} the arrow", *arrow.span())
    pluses = [found.span() for found in re.compile(_PLUS).finditer(text, start, end)]
    if len(pluses) >= MOST_SPECIES:
        return EquationFault(f"more than {MOST_SPECIES} species on one side", start, end)
    terms: list[Term] = []
    at = start
    for stop, following in (*pluses, (end, end)):
        if not text[at:stop].strip():
            plus = (stop, following) if stop < end else pluses[-1]
            return EquationFault("a species is missing beside `+`", *plus)
        term = _term(text, at, stop)
        if isinstance(term, EquationFault):
            return term
        terms.append(term)
        at = following
    return tuple(terms)


def _term(text: str, start: int, end: int) -> Term | EquationFault:
    """Read one species with its coefficient; there is more than spaces between the ends."""
    written = text[start:end]
    start += len(written) - len(written.lstrip())
    end -= len(written) - len(written.rstrip())
    tight = re.compile(_TIGHT_PLUS).search(text, start, end)
    if tight is not None:
        return EquationFault("`+` needs a space on both sides", *tight.span())
    found = re.compile(_COEFFICIENT).match(text, start, end)
    if found is not None:
        coefficient = Fraction(int(found[1]), int(found[2] or 1))
        return Term(coefficient, text[found.end() : end], found.end(), end)
    like = re.compile(_LIKE_COEFFICIENT).match(text, start, end)
    if like is None:
        return Term(Fraction(1), text[start:end], start, end)
    number, stop = like[1], like.end(1)
    if stop == end:
        return EquationFault(f"`{number}` counts no species", start, stop)
    if number in _DECIMALS:
        help_: str | None = f"write `{_DECIMALS[number]} {text[like.end() : end]}`"
    else:
        help_ = None if number.startswith("0") else "use whole numbers, or fractions such as `1/2`"
    return EquationFault(f"`{number}` is no coefficient", start, stop, help_)


def check_balance(left: Terms, right: Terms) -> Balance:
    """Count atoms and charge on both sides with the coefficients as written.

    Args:
        left: Coefficient and formula of each reactant.
        right: The same of each product.

    Returns:
        What is left over; nothing where the equation is balanced.
    """
    atoms: dict[str, Count] = {}
    charge: Count = 0
    for sign, side in ((1, left), (-1, right)):
        for coefficient, formula in side:
            number = sign * coefficient
            charge += number * formula.charge
            for symbol, count in formula.composition:
                atoms[symbol] = atoms.get(symbol, 0) + number * count
    return Balance(dict(hill_order(atoms)), charge or 0)


def balance(left: Sequence[Formula], right: Sequence[Formula]) -> Balanced | NotUnique | Impossible:
    """Find the coefficients that conserve atoms and charge, by exact linear algebra.

    A balance by atoms alone need not be the reaction that takes place, and coefficients that
    already balance are never to be replaced by these.

    Args:
        left: Formulas of the reactants.
        right: Formulas of the products.

    Returns:
        The smallest whole coefficients where they are unique and all above nought.

    Source:
        The null space of the matrix of atoms and charges; fractions throughout, no rounding.
    """
    matrix = _matrix(left, right)
    basis = solutions(matrix, len(left) + len(right))
    if not basis:
        return Impossible()
    if len(basis) > 1:
        feasible = positive_solution(matrix, len(left) + len(right))
        return NotUnique(len(basis)) if feasible else Impossible()
    vector = basis[0]
    if any(number <= 0 for number in vector):
        return Impossible()
    return Balanced(vector)


def _matrix(left: Sequence[Formula], right: Sequence[Formula]) -> Matrix:
    """Write a row for each element and one for charge, a column for each species."""
    signed = [(1, formula) for formula in left] + [(-1, formula) for formula in right]
    symbols = sorted({symbol for _, formula in signed for symbol, _ in formula.composition})
    rows = [
        [Fraction(sign * dict(formula.composition).get(symbol, 0)) for sign, formula in signed]
        for symbol in symbols
    ]
    rows.append([Fraction(sign * formula.charge) for sign, formula in signed])
    return rows
