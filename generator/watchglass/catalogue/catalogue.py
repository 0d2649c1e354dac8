"""The catalogue as one thing to look up in: the shipped tables with a set's additions over them.

The shipped tables hold some hundred substances and are read on every save, so an entry is decoded
only when it is asked for: the file is cut at its top-level keys, and a shipped index tells which
names belong to which key (a test holds the two together). A set's own entries are few and are
decoded at once, since their faults are the author's.
"""

from __future__ import annotations

import re
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding, Related
from watchglass.base.yaml import YamlMapping, read_yaml
from watchglass.catalogue.decode import decode_substance

if TYPE_CHECKING:
    from collections.abc import Callable, Iterable, Iterator, Mapping

    from watchglass.base.spans import Source, Span
    from watchglass.catalogue.glassware import GlasswareType
    from watchglass.catalogue.stocks import Indicator, Stock
    from watchglass.catalogue.substances import Substance
    from watchglass.chemistry.densities import DensityTable
    from watchglass.chemistry.formulas import Formula

_TOP_KEY = re.compile(r"^([^\s#:][^:\n]*):", re.MULTILINE)


class ShippedSubstances:
    """Entries of the shipped tables, decoded when asked for and kept."""

    __slots__ = ("_places", "_read", "names")

    def __init__(self, sources: Iterable[Source], names: Mapping[str, str]) -> None:
        """Cut the tables at their keys.

        Args:
            sources: The shipped files.
            names: Key by case-folded name, for all of them.
        """
        self.names = names
        self._places: dict[str, tuple[Source, int, int]] = {}
        self._read: dict[str, Substance | None] = {}
        for source in sources:
            found = list(_TOP_KEY.finditer(source.text))
            ends = [m.start() for m in found[1:]] + [len(source.text)]
            for match, end in zip(found, ends, strict=True):
                self._places[match[1]] = (source, match.start(), end)

    def __contains__(self, key: str) -> bool:
        """Tell whether there is such a key."""
        return key in self._places

    def keys(self) -> tuple[str, ...]:
        """Give all keys in the order of the files."""
        return tuple(self._places)

    def hydrates(self, key: str) -> tuple[str, ...]:
        """Give the keys of all hydrates of a substance, by a search of the text alone."""
        line = f"\n  hydrate-of: {key}\n"
        return tuple(
            name
            for name, (source, start, end) in self._places.items()
            if source.text.find(line, start, end) >= 0
        )

    def get(self, key: str) -> Substance | None:
        """Decode an entry; None where there is none."""
        if key in self._read:
            return self._read[key]
        place = self._places.get(key)
        substance = None
        if place is not None:
            node, _ = read_yaml(*place)
            if isinstance(node, YamlMapping) and node.entries:
                substance, _ = decode_substance(node.entries[0])
        self._read[key] = substance
        return substance


@dataclass(frozen=True, slots=True, kw_only=True)
class Catalogue:
    """Everything that can be looked up by name.

    Attributes:
        shipped: The shipped substances.
        own: The set's substances by key; they win over the shipped ones.
        own_names: Key by case-folded name of the set's substances.
        glassware: Types of vessel by case-folded name.
        indicators: Indicators by key.
        stocks: The set's stocks by key and case-folded name.
        measures: Countable measures with their size in m3, None where unknown.
        components_: Components of the shipped substances that are not their own; see `components`.
        formulas: Key by formula in Hill order of small shipped substances that share it with none.
        aids: Things that need no declaration, case-folded.
        densities: Gives the densities of aqueous solutions by key of the solute.
    """

    shipped: ShippedSubstances
    own: Mapping[str, Substance] = field(default_factory=dict)
    own_names: Mapping[str, str] = field(default_factory=dict)
    glassware: Mapping[str, GlasswareType] = field(default_factory=dict)
    indicators: Mapping[str, Indicator] = field(default_factory=dict)
    stocks: Mapping[str, Stock] = field(default_factory=dict)
    measures: Mapping[str, float | None] = field(default_factory=dict)
    components_: Mapping[str, Mapping[str, int]] = field(default_factory=dict)
    formulas: Mapping[str, str] = field(default_factory=dict)
    aids: frozenset[str] = frozenset()
    densities: Callable[[], Mapping[str, DensityTable]] = dict

    def density_table(self, key: str) -> DensityTable | None:
        """Give the densities of aqueous solutions of a solute; the table is read when first asked."""
        return self.densities().get(key)

    def by_key(self, key: str) -> Substance | None:
        """Find a substance by its catalogue key only."""
        return self.own.get(key) or self.shipped.get(key)

    def find(self, word: str) -> Substance | None:
        """Find a substance by key, name or synonym; case does not count."""
        exact = self.by_key(word)
        if exact is not None:
            return exact
        folded = " ".join(word.split()).casefold()
        key = self.own_names.get(folded) or self.shipped.names.get(folded)
        return self.by_key(key) if key else None

    def with_atoms(self, formula: Formula) -> tuple[str, ...]:
        """Give the names of all substances with just these atoms and this charge."""
        keys = dict.fromkeys((*self.own, *self.shipped.keys()))
        found = (self.by_key(key) for key in keys)
        return tuple(
            substance.name
            for substance in found
            if substance is not None
            and substance.formula is not None
            and substance.formula.composition == formula.composition
            and substance.formula.charge == formula.charge
        )

    def forms_of(self, substance: Substance) -> tuple[Substance, ...]:
        """Give the anhydrous form and every hydrate of a substance, the lightest first.

        Itself is among them; a substance without hydrates is alone.
        """
        base = substance.hydrate_of or substance.key
        own = (other.key for other in self.own.values() if other.hydrate_of == base)
        keys = dict.fromkeys((base, substance.key, *self.shipped.hydrates(base), *own))
        forms = [found for found in map(self.by_key, keys) if found is not None]
        return tuple(sorted(forms, key=lambda form: form.molar_mass or 0.0))

    def components(self, key: str) -> Mapping[str, int]:
        """Give what one mole of a substance is once it is dissolved."""
        substance = self.own.get(key)
        if substance is not None:
            from watchglass.catalogue.components import components_of  # noqa: PLC0415 - rare

            return components_of(substance, self._by_smiles)
        return self.components_.get(key) or {key: 1}

    def by_formula(self, formula: Formula) -> str | None:
        """Give the key of the common substance that a bare formula stands for."""
        return self.formulas.get(formula.hill())

    def _by_smiles(self, smiles: str) -> str | None:
        for key in dict.fromkeys((*self.own, *self.shipped.keys())):
            substance = self.by_key(key)
            if substance is not None and substance.smiles == smiles:
                return key
        return None

    def words(self) -> tuple[str, ...]:
        """Give every name and key, for near misses."""
        return (
            *self.own_names,
            *self.own,
            *self.shipped.names,
            *self.shipped.keys(),
            *(stock for stock in self.stocks),
        )


def name_index(substances: Iterable[Substance]) -> tuple[dict[str, str], tuple[Finding, ...]]:
    """Map every name to its key; a name that two substances share is a finding at the second."""
    index: dict[str, Substance] = {}
    findings = []
    for substance in substances:
        for name in (substance.key, *substance.names):
            folded = " ".join(name.split()).casefold()
            other = index.get(folded)
            if other is None:
                index[folded] = substance
            elif other is not substance:
                findings.append(
                    Finding(
                        code=codes.SUBSTANCE_NAME_TWICE,
                        span=substance.span,
                        message=f"`{name}` names `{substance.key}` and `{other.key}`",
                        related=(Related(other.span, "it is named here first"),),
                        help="take the name from one of the two",
                    )
                )
    return {name: substance.key for name, substance in index.items()}, tuple(findings)


def shadowed(
    own: Iterable[Substance], stocks: Iterable[Stock], shipped: Mapping[str, str]
) -> Iterator[Finding]:
    """Report names of a set that already mean another shipped substance.

    An entry with a shipped key overrides that substance, which is meant; a name or a stock that
    takes the place of another substance would change what a draft says without a word.

    Args:
        own: The set's substances.
        stocks: The set's stocks.
        shipped: Key by case-folded name of the shipped substances.
    """
    own = tuple(own)
    overridden = {substance.key for substance in own}
    for substance in own:
        for name in (substance.key, *substance.names):
            key = shipped.get(" ".join(name.split()).casefold())
            if key is not None and key != substance.key and key not in overridden:
                yield _taken(name, substance.span, key)
    for stock in stocks:
        for name in (stock.key, *stock.names):
            key = shipped.get(" ".join(name.split()).casefold())
            if key is not None:
                yield _taken(name, stock.span, key)


def _taken(name: str, span: Span, key: str) -> Finding:
    return Finding(
        code=codes.SUBSTANCE_NAME_TWICE,
        span=span,
        message=f"`{name}` already names `{key}` of the shipped catalogue",
        help="take another name, or give the entry that key to override the substance",
    )
