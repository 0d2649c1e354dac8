"""Substances: what the catalogue knows of each. Absent means unknown, never nought and never safe."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span
    from watchglass.chemistry.formulas import Formula


class At(NamedTuple):
    """A measured value, with the temperature it was measured at where that is said."""

    value: Quantity
    temperature: Quantity | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Substance:
    """One substance.

    Attributes:
        key: Its catalogue key.
        names: What it is called; the first is shown.
        cas: CAS registry number, check digit verified; empty where unknown.
        formula: Its formula, or None.
        smiles: Its structure, or empty.
        state: `solid`, `liquid` or `gas` at 20 °C, or empty where unknown.
        density: Of the liquid.
        melts: Melting point.
        boils: Boiling point at 1 atm.
        flash: Flash point.
        acid: pKa of each acidic group, 25 °C, water.
        base: pKa of each conjugate acid, 25 °C, water.
        log_p: Octanol–water, neutral form.
        partition: Measured ratio organic/water by solvent, as written.
        soluble: What dissolves in a solvent, as written: quantities with `at`, or `miscible`.
        hydrate_of: Key of the anhydrous substance, or empty.
        groups: Functional groups in plain words.
        ghs: Classification as declared (`classes`, `statements`, `source`), or None: unknown.
        sources: Where each value is from, by field; `all` is the default.
        span: Its key in the file.
    """

    key: str
    names: tuple[str, ...]
    span: Span
    cas: str = ""
    formula: Formula | None = None
    smiles: str = ""
    state: str = ""
    density: At | None = None
    melts: Quantity | None = None
    boils: Quantity | None = None
    flash: Quantity | None = None
    acid: tuple[float, ...] = ()
    base: tuple[float, ...] = ()
    log_p: float | None = None
    partition: Mapping[str, float] = field(default_factory=dict)
    soluble: Mapping[str, tuple[str, ...]] = field(default_factory=dict)
    hydrate_of: str = ""
    groups: tuple[str, ...] = ()
    ghs: Mapping[str, tuple[str, ...]] | None = None
    sources: Mapping[str, str] = field(default_factory=dict)

    @property
    def name(self) -> str:
        """The name that is shown."""
        return self.names[0]

    @property
    def molar_mass(self) -> float | None:
        """Molar mass, g/mol; None where the formula is unknown."""
        return self.formula.molar_mass if self.formula else None

    def source(self, value: str) -> str:
        """Say where a value is from; empty where that is not known."""
        return self.sources.get(value) or self.sources.get("all", "")
