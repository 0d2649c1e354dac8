"""Exact linear algebra for balancing: the null space, and whether it holds a positive vector.

Fractions throughout: a balance is right or wrong, and a float that is nearly nought would have to
be guessed at. The systems are small (some twenty species, some ten elements).
"""

from __future__ import annotations

from fractions import Fraction
from math import gcd, lcm

Matrix = list[list[Fraction]]


def solutions(rows: Matrix, columns: int) -> tuple[tuple[int, ...], ...]:
    """Find a basis of the vectors that every row sends to nought, in smallest whole numbers.

    Args:
        rows: The matrix, row by row; it is not changed.
        columns: Its number of columns; there may be no rows.

    Returns:
        One vector for each free column, in the order of the columns.

    Source:
        Gauss–Jordan elimination.
    """
    reduced, pivots = _reduced(rows, columns)
    basis = []
    for free in (column for column in range(columns) if column not in pivots):
        vector = [Fraction(0)] * columns
        vector[free] = Fraction(1)
        for row, pivot in zip(reduced, pivots, strict=False):
            vector[pivot] = -row[free]
        basis.append(_smallest(vector))
    return tuple(basis)


def positive_solution(rows: Matrix, columns: int) -> bool:
    """Tell whether some vector with all entries above nought is sent to nought by every row.

    The rows are homogeneous, so a vector with all entries > 0 exists where one with all entries
    >= 1 does: x = 1 + y with y >= 0 and A y = -A 1, which is the first phase of the simplex.

    Args:
        rows: The matrix, row by row; it is not changed.
        columns: Its number of columns.

    Source:
        The simplex method with Bland's rule, which cannot run in a circle.
    """
    table: Matrix = []
    for row in rows:
        right = -sum(row, Fraction(0))
        sign = -1 if right < 0 else 1
        table.append([*(sign * entry for entry in row), sign * right])
    basis = [columns + index for index in range(len(table))]
    # The cost of a column is what its artificial variables would take away by entering.
    cost = [sum((row[i] for row in table), Fraction(0)) for i in range(columns + 1)]
    while True:
        entering = next((i for i in range(columns) if cost[i] > 0), None)
        if entering is None:
            return cost[columns] == 0
        ratios = [
            (row[columns] / row[entering], basis[index], index)
            for index, row in enumerate(table)
            if row[entering] > 0
        ]
        _, _, leaving = min(ratios)
        _pivot(table, leaving, entering)
        factor = cost[entering]
        cost = [entry - factor * by for entry, by in zip(cost, table[leaving], strict=True)]
        basis[leaving] = entering


def _reduced(rows: Matrix, columns: int) -> tuple[Matrix, list[int]]:
    """Bring a matrix to its reduced echelon form; give the rows in use and their pivots."""
    table = [list(row) for row in rows]
    pivots: list[int] = []
    for column in range(columns):
        top = len(pivots)
        found = next((i for i in range(top, len(table)) if table[i][column]), None)
        if found is None:
            continue
        table[top], table[found] = table[found], table[top]
        _pivot(table, top, column)
        pivots.append(column)
    return table[: len(pivots)], pivots


def _pivot(table: Matrix, at: int, column: int) -> None:
    """Make one entry 1 and the rest of its column 0."""
    by = table[at][column]
    table[at] = [entry / by for entry in table[at]]
    for index, row in enumerate(table):
        if index != at and row[column]:
            factor = row[column]
            table[index] = [
                entry - factor * other for entry, other in zip(row, table[at], strict=True)
            ]


def _smallest(vector: list[Fraction]) -> tuple[int, ...]:
    scale = lcm(*(entry.denominator for entry in vector))
    whole = [int(entry * scale) for entry in vector]
    divisor = gcd(*whole) or 1
    return tuple(entry // divisor for entry in whole)
