"""Chemical formulas: what was read, or why it could not be.

The notation: counts on the line, `()` and `[]` nested, `·` before a hydrate's water with a whole or
decimal multiplier, the charge at the end after `^` (`SO4^2-`), `D` and `T` for the heavy hydrogens.
`formula_reading` reads it strictly; what is likely meant by a refused text is worked out in
`formula_mending`, and only ever offered, never taken.
"""

from __future__ import annotations

import re
from enum import Enum
from functools import lru_cache
from typing import TYPE_CHECKING, NamedTuple

from watchglass.chemistry.elements import WEIGHTS
from watchglass.chemistry.formula_reading import Count, FormulaFault, read_formula

if TYPE_CHECKING:
    from collections.abc import Mapping

__all__ = [
    "ELECTRON",
    "Count",
    "Formula",
    "FormulaFault",
    "Part",
    "PartKind",
    "hill_order",
    "parse_formula",
    "parse_species",
]

# Expressions are compiled where they are used, and `re` keeps them: start-up is felt.
_PARTS = r"([A-Z][a-z]?|e)|([(\[])|([)\]])|(·)|\^(.+)|(?<![·0-9.])(?!^)([0-9]+)|([0-9.]+)"


class PartKind(Enum):
    """What a part of a formula is; `publish` sets counts low, charges high, the rest on the line."""

    SYMBOL = "symbol"
    OPENING = "opening"
    CLOSING = "closing"
    DOT = "dot"
    CHARGE = "charge"
    COUNT = "count"
    MULTIPLIER = "multiplier"


class Part(NamedTuple):
    """One part of a formula as written; a charge comes without its `^`."""

    kind: PartKind
    text: str


class Formula(NamedTuple):
    """A formula that could be read.

    Attributes:
        text: As written.
        composition: Number of atoms of each element, in Hill order; fractions only where a
            hydrate's multiplier is one.
        charge: Charge number.
    """

    text: str
    composition: tuple[tuple[str, Count], ...]
    charge: int

    @property
    def molar_mass(self) -> float | None:
        """Molar mass, g/mol; None where an element has no standard atomic weight.

        The mass of electrons is neglected, so an ion weighs as much as its atoms, and `e^-` nothing.

        >>> round(parse_formula("CuSO4·5H2O").molar_mass, 3)
        249.677
        """
        total = 0.0
        for symbol, count in self.composition:
            weight = WEIGHTS.get(symbol)
            if weight is None:
                return None
            total += weight * float(count)
        return total

    @property
    def molar_mass_si(self) -> float | None:
        """Molar mass, kg/mol; None where an element has no standard atomic weight."""
        mass = self.molar_mass
        return None if mass is None else mass * 1e-3

    @property
    def weightless(self) -> tuple[str, ...]:
        """Symbols of the elements without a standard atomic weight: why there is no molar mass."""
        return tuple(symbol for symbol, _ in self.composition if symbol not in WEIGHTS)

    @property
    def parts(self) -> tuple[Part, ...]:
        """The formula as written, part by part, for setting it in type."""
        kinds = tuple(PartKind)
        return tuple(
            Part(kinds[found.lastindex - 1], found[found.lastindex])
            for found in re.compile(_PARTS).finditer(self.text)
            if found.lastindex
        )

    def hill(self) -> str:
        """Write the atoms in Hill's order: carbon, hydrogen, then the alphabet; a charge last.

        >>> parse_formula("CH3COO^-").hill()
        'C2H3O2^-'
        """
        atoms = "".join(
            f"{symbol}{'' if count == 1 else _decimal(count)}" for symbol, count in self.composition
        )
        if not self.charge:
            return atoms or self.text
        size = "" if abs(self.charge) == 1 else str(abs(self.charge))
        return f"{atoms or 'e'}^{size}{'+' if self.charge > 0 else '-'}"


#: The electron, a species of half equations only.
ELECTRON = Formula("e^-", (), -1)


@lru_cache(maxsize=4096)
def parse_formula(text: str) -> Formula | FormulaFault:
    """Read the formula of a substance; never raises.

    Args:
        text: The formula and nothing else, not even spaces around it.

    Returns:
        The formula, or the first fault with its place in the text.
    """
    if text == ELECTRON.text:
        message = "`e^-` is the electron, not a substance"
        return FormulaFault(message, 0, len(text), "use it in an equation")
    read = read_formula(text)
    if isinstance(read, FormulaFault):
        # Imported on the first fault: its expressions take longer to compile than all the rest.
        from watchglass.chemistry.formula_mending import mending  # noqa: PLC0415

        return read._replace(help=mending(text, _can_be_read))
    atoms, charge = read
    return Formula(text, hill_order(atoms), charge)


def parse_species(text: str) -> Formula | FormulaFault:
    """Read a species of an equation: a formula, or the electron `e^-`; never raises."""
    return ELECTRON if text == ELECTRON.text else parse_formula(text)


def _can_be_read(text: str) -> bool:
    return not isinstance(read_formula(text), FormulaFault)


def hill_order(atoms: Mapping[str, Count]) -> tuple[tuple[str, Count], ...]:
    """Put atoms in Hill's order; counts of nought are left out, whole fractions made whole.

    Source:
        Hill's system: with carbon, C and H first, then the alphabet; without, the alphabet alone.
    """
    leading = ("C", "H") if atoms.get("C") else ()
    first = [symbol for symbol in leading if symbol in atoms]
    symbols = first + sorted(symbol for symbol in atoms if symbol not in leading)
    return tuple((symbol, _whole(atoms[symbol])) for symbol in symbols if atoms[symbol])


def _whole(count: Count) -> Count:
    return count.numerator if count.denominator == 1 else count


def _decimal(count: Count) -> str:
    """Write a count; the multipliers of hydrates are decimals, so the digits end."""
    return str(count) if isinstance(count, int) else f"{float(count):.12g}"
