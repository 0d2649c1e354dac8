"""How an unbalanced equation might be mended: coefficients, or the molecule that was forgotten.

Given as data, for the caller to put into words and for the author to judge: a balance by atoms is
not yet the reaction that takes place.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from typing import TYPE_CHECKING, Literal

from watchglass.chemistry.equations import Balanced, balance, check_balance
from watchglass.chemistry.formulas import Formula, parse_formula

if TYPE_CHECKING:
    from watchglass.chemistry.equations import Balance, Terms


@dataclass(frozen=True, slots=True)
class Lacking:
    """So many of a small molecule or ion, added to one side, would balance what is written.

    Attributes:
        side: `left` or `right`.
        formula: Of what.
        count: How many, > 0.
    """

    side: Literal["left", "right"]
    formula: Formula
    count: int


@dataclass(frozen=True, slots=True)
class Suggestion:
    """How an unbalanced equation might be mended; as data, the caller finds the words.

    Attributes:
        coefficients: The one set of coefficients, or None where there is none or not one.
        only_left: Elements that stand on the left only.
        only_right: Elements that stand on the right only.
        lacking: What would balance the coefficients as written, or None.
    """

    coefficients: tuple[int, ...] | None
    only_left: tuple[str, ...]
    only_right: tuple[str, ...]
    lacking: Lacking | None


#: What is most often forgotten in an equation, in the order tried. Common practice, no source.
_FORGOTTEN = ("H2O", "CO2", "HCl", "NH3", "NaCl", "H2", "O2", "N2", "SO2", "H^+", "OH^-")


def suggest(left: Terms, right: Terms) -> Suggestion:
    """Work out how an unbalanced equation might be mended.

    Args:
        left: Coefficient and formula of each reactant, as written.
        right: The same of each product.
    """
    formulas = [formula for _, formula in left], [formula for _, formula in right]
    found = balance(*formulas)
    elements = [{symbol for f in side for symbol, _ in f.composition} for side in formulas]
    return Suggestion(
        found.coefficients if isinstance(found, Balanced) else None,
        tuple(sorted(elements[0] - elements[1])),
        tuple(sorted(elements[1] - elements[0])),
        _lacking(check_balance(left, right)),
    )


def _lacking(excess: Balance) -> Lacking | None:
    """Find a forgotten species whose atoms and charge are just what is left over."""
    for text in _FORGOTTEN:
        formula = parse_formula(text)
        if not isinstance(formula, Formula):
            raise TypeError(f"{text} is a constant of ours and must read")
        first, each = formula.composition[0]
        number = Fraction(excess.excess_left.get(first, 0)) / each
        if number == 0 or number.denominator != 1:
            continue
        atoms = {symbol: count * number for symbol, count in formula.composition}
        if atoms == excess.excess_left and formula.charge * number == excess.charge_excess_left:
            return Lacking("right" if number > 0 else "left", formula, abs(int(number)))
    return None
