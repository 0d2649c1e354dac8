"""Exact algebra behind balancing: null spaces and positive vectors, worked out by hand."""

from __future__ import annotations

from fractions import Fraction

import pytest

from watchglass.chemistry.balancing import positive_solution, solutions

Rows = list[list[int]]


def exact(rows: Rows) -> list[list[Fraction]]:
    return [[Fraction(entry) for entry in row] for row in rows]


@pytest.mark.parametrize(
    ("rows", "columns", "basis"),
    [
        ([], 2, ((1, 0), (0, 1))),  # nothing is asked: each column alone
        ([[1, -2]], 2, ((2, 1),)),
        ([[2, -4]], 2, ((2, 1),)),  # no common divisor is left
        ([[1, -1], [1, -2]], 2, ()),  # x = y and x = 2 y: nothing but nought
        ([[0, 1], [2, 0]], 2, ()),  # the first column's pivot stands below
        ([[0, 0], [1, -3]], 2, ((3, 1),)),  # a row of noughts asks nothing
        ([[1, -1, 0], [2, -2, 0]], 3, ((1, 1, 0), (0, 0, 1))),  # a row said twice
        ([[0, 1]], 2, ((1, 0),)),  # a column that nothing asks of, before one that must be nought
        ([[1, -1, 0], [0, 0, 1]], 3, ((1, 1, 0),)),
        ([[2, 0, -1], [0, 3, -1]], 3, ((3, 2, 6),)),  # halves and thirds become sixths
        ([[1, 1]], 2, ((-1, 1),)),  # a sign may be below nought
    ],
)
def test_null_space_is_given_in_smallest_whole_numbers(
    rows: Rows, columns: int, basis: tuple[tuple[int, ...], ...]
) -> None:
    assert solutions(exact(rows), columns) == basis


def test_fractions_of_a_hydrate_are_cleared() -> None:
    # x/2 = y/3: 2 and 3.
    assert solutions([[Fraction(1, 2), Fraction(-1, 3)]], 2) == ((2, 3),)


def test_coefficients_are_integers_and_no_floats() -> None:
    (vector,) = solutions(exact([[2, -4]]), 2)

    assert [type(number) for number in vector] == [int, int]


def test_part_of_an_atom_on_the_right_only_has_no_positive_vector() -> None:
    assert not positive_solution([[Fraction(-1, 4), Fraction(-1, 4)]], 2)


def test_matrix_that_was_given_is_not_changed() -> None:
    rows = exact([[0, 2, -4], [3, 0, -1]])
    solutions(rows, 3)
    positive_solution(rows, 3)

    assert rows == exact([[0, 2, -4], [3, 0, -1]])


@pytest.mark.parametrize(
    ("rows", "columns", "positive"),
    [
        ([], 2, True),
        ([[1, -3]], 2, True),  # 3 and 1
        ([[1, 1]], 2, False),  # an element on the left only
        ([[-1, -3]], 2, False),  # an element on the right only
        ([[1, -1], [1, -2]], 2, False),
        ([[1, -1, 0], [0, 1, -1]], 3, True),  # all alike
        ([[0, 0, 0], [2, 0, -1]], 3, True),  # 1, anything, 2
        ([[2, -1, 1], [0, 0, -1]], 3, False),  # the third must be nought
        ([[1, -1, -1], [-3, 1, 3]], 3, False),  # x = y + z, then y must be nought
        ([[-3, 3, 2], [1, -1, -1]], 3, False),  # x = y + z, then z must be nought
        ([[-2, 1, 1, -1], [-2, 0, 0, 2], [-1, 0, 1, -1]], 4, True),  # 1, 1, 2, 1
    ],
)
def test_vector_with_all_entries_above_nought_is_found_where_there_is_one(
    rows: Rows, columns: int, *, positive: bool
) -> None:
    assert positive_solution(exact(rows), columns) is positive
