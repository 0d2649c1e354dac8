"""What an operation says beside its verb and its vessel."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.read import syntax

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.quantities import Quantity


class Said(NamedTuple):
    """The clauses of an operation by word."""

    clauses: Mapping[str, syntax.ClauseValue]

    def quantity(self, *words: str) -> Quantity | None:
        """Give the quantity of the first of some clauses that has one."""
        for word in words:
            value = self.clauses.get(word)
            if isinstance(value, syntax.Measured):
                return value.quantity
        return None

    def place(self, *words: str) -> syntax.Place | None:
        """Give the place that the first of some clauses names."""
        for word in words:
            value = self.clauses.get(word)
            if isinstance(value, syntax.Place):
                return value
        return None

    def words(self, word: str) -> str:
        """Give the words of a clause, or nothing."""
        value = self.clauses.get(word)
        return value.text if isinstance(value, syntax.Words) else ""
