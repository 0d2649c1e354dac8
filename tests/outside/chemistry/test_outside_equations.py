"""Equations of a textbook, balanced and checked."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

import pytest

from outside.published import cases
from watchglass.chemistry.equations import (
    Balanced,
    EquationText,
    Impossible,
    NotUnique,
    balance,
    check_balance,
    split_equation,
)
from watchglass.chemistry.formulas import Formula, parse_species

if TYPE_CHECKING:
    from fractions import Fraction

    from watchglass.chemistry.equations import Term


def sides(case: dict[str, Any]) -> tuple[list[tuple[Fraction, Formula]], ...]:
    split = split_equation(case["inputs"]["equation"])
    assert isinstance(split, EquationText)
    return [species(term) for term in split.left], [species(term) for term in split.right]


def species(term: Term) -> tuple[Fraction, Formula]:
    formula = parse_species(term.text)
    assert isinstance(formula, Formula)
    return term.coefficient, formula


def balanced(case: dict[str, Any]) -> Balanced | NotUnique | Impossible:
    left, right = sides(case)
    return balance([formula for _, formula in left], [formula for _, formula in right])


@pytest.mark.parametrize("case", cases("equations.json", "balance"))
def test_equation_gets_its_smallest_whole_coefficients(case: dict[str, Any]) -> None:
    assert balanced(case) == Balanced(tuple(case["expected"]["coefficients"]))


@pytest.mark.parametrize("case", cases("equations.json", "balance"))
def test_sides_are_split_into_the_species_in_order(case: dict[str, Any]) -> None:
    split = split_equation(case["inputs"]["equation"])

    assert isinstance(split, EquationText)
    assert [term.text for term in split.left] == case["inputs"]["reactants"]
    assert [term.text for term in split.right] == case["inputs"]["products"]


@pytest.mark.parametrize("case", cases("equations.json", "check"))
def test_written_equation_gets_its_verdict_and_what_is_left_over(case: dict[str, Any]) -> None:
    checked = check_balance(*sides(case))

    assert checked.verdict.value == case["expected"]["verdict"]
    assert checked.excess_left == case["expected"]["excess_left"]
    assert checked.charge_excess_left == case["expected"]["charge_excess_left"]


@pytest.mark.parametrize("case", cases("equations.json", "balance_special"))
def test_equation_without_one_balance_gets_none(case: dict[str, Any]) -> None:
    expected: NotUnique | Impossible = Impossible()
    if case["expected"]["verdict"] == "not_unique":
        expected = NotUnique(case["expected"]["nullity"])

    assert balanced(case) == expected
