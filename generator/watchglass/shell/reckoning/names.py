"""The catalogue as one asks it at the bench: `hydrochloric-acid` and bare formulas are names too.

A procedure declares its materials; a calculator cannot ask for that. A hyphen may stand for a
blank, and a formula stands for the common substance of that formula, or for itself: then nothing
but its molar mass is known.
"""

from __future__ import annotations

from dataclasses import fields
from typing import TYPE_CHECKING

from watchglass.base.spans import Source
from watchglass.catalogue.catalogue import Catalogue
from watchglass.catalogue.substances import Substance
from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.shell.shipped import density_tables

if TYPE_CHECKING:
    from watchglass.shell.shipped import Shipped

#: Source of the one value of a substance that is known by its formula alone.
_FORMULA_ALONE = "formula as written"


class BenchCatalogue(Catalogue):
    """A catalogue that also finds hyphenated names and formulas."""

    __slots__ = ()

    @classmethod
    def over(cls, catalogue: Catalogue) -> BenchCatalogue:
        """Look up in a catalogue."""
        return cls(**{field.name: getattr(catalogue, field.name) for field in fields(Catalogue)})

    @classmethod
    def of_shipped(cls, shipped: Shipped) -> BenchCatalogue:
        """Look up in the shipped tables alone."""
        return cls(
            shipped=shipped.substances,
            glassware=shipped.glassware,
            indicators=shipped.indicators,
            measures=shipped.measures,
            components_=shipped.components,
            formulas=shipped.formulas,
            aids=shipped.aids,
            densities=density_tables,
        )

    def find(self, word: str) -> Substance | None:
        """Find a substance by what it is called, or by its formula."""
        return self.by_name(word) or self._by_written_formula(word)

    def by_name(self, word: str) -> Substance | None:
        """Find a substance by key, name or synonym; a hyphen may stand for a blank."""
        found = Catalogue.find(self, word)
        if found is None and "-" in word:
            found = Catalogue.find(self, word.replace("-", " "))
        return found

    def _by_written_formula(self, word: str) -> Substance | None:
        formula = parse_formula(word)
        if not isinstance(formula, Formula):
            return None
        key = self.by_formula(formula)
        known = self.by_key(key) if key else None
        if known is not None:
            return known
        span = Source(_FORMULA_ALONE, word).span(0, len(word))
        return Substance(
            key=word, names=(word,), span=span, formula=formula, sources={"all": _FORMULA_ALONE}
        )
