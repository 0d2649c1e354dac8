"""Pages of substances: what is known of each, with its source, and where it is used."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base.figures import shown
from watchglass.publish import model as m
from watchglass.publish.body import text_of
from watchglass.publish.text import NBSP, formula_words, quantity_words

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.substances import Substance

Words = tuple[m.Words, ...]

NOT_CLASSIFIED = (
    "Not classified here: read the supplier's safety data sheet before the bottle is opened."
)
UNKNOWN = "unknown"
NO_SOURCE = "source not given"
#: Where names, numbers, formulas and states of the shipped catalogue are from; see its README.
MEMORY = "from memory"
NUMBERS = "identifier tables or memory; its check digit is verified"
FORMULAS = "identifier tables or memory; its atoms are compared with the structure"
WEIGHTS = "IUPAC standard atomic weights, 2021"
#: What a name is not filed by: places, and how a group or molecule is turned. Common practice of
#: indexes, no source.
_NOT_FILED = re.compile(
    r"^(?:(?:\(?[0-9RSEZ±+−-]+(?:,[0-9RSEZ]+)*['′]?\)?|tert|sec|cis|trans|ortho|meta|para|[omp]"
    r"|[DL]|[NOS](?:,[NOS])*)-)+",
)


def substance_page(
    substance: Substance,
    catalogue: Catalogue,
    addresses: Mapping[str, str],
    used_in: tuple[m.ListEntry, ...],
    stocks: tuple[m.PageLink, ...],
) -> m.ReferencePage:
    """Make the page of a substance.

    Args:
        substance: Which.
        catalogue: What indicators and hydrates are looked up in.
        addresses: Address of each substance that has a page in this edition, by key.
        used_in: All procedures of the edition that use it.
        stocks: Stocks of the edition that contain it.
    """
    formula = formula_words(substance.formula) if substance.formula else ()
    return m.ReferencePage(
        kind="substance",
        title=substance.name,
        address=addresses[substance.key],
        names=tuple(
            filter(None, (*substance.names[1:], substance.key, substance.cas, text_of(formula)))
        ),
        rows=tuple(_rows(substance, catalogue, addresses, formula)),
        used_in=used_in,
        more=None,
        stocks=stocks,
        lines=(),
        remarks=(),
        figure=f"{substance.molar_mass:.2f}{NBSP}g/mol" if substance.molar_mass else "",
        formula=formula,
        count=len(used_in),
    )


def filed(name: str) -> str:
    """Give what a name is filed by in an alphabetical list.

    >>> filed("tert-butyl methyl ether"), filed("2,4-dinitrophenol"), filed("p-xylene")
    ('butyl methyl ether', 'dinitrophenol', 'xylene')
    """
    return _NOT_FILED.sub("", name).casefold() or name.casefold()


def initial(name: str) -> str:
    """Give the letter that a name stands under; `#` where it has none.

    >>> initial("trans-cinnamic acid"), initial("4-(dimethylamino)pyridine")
    ('C', 'D')
    """
    return next((c for c in filed(name) if c.isalpha()), "#").upper()


# ---------------------------------------------------------------- what is known


def _rows(
    substance: Substance, catalogue: Catalogue, addresses: Mapping[str, str], formula: Words
) -> list[m.ReferenceRow]:
    source = substance.source
    mass = substance.molar_mass
    own = substance.key in catalogue.own
    others = ", ".join(substance.names[1:])
    rows = [
        _row("Also called", _text(others), source("names") if own else MEMORY) if others else None,
        _row("CAS number", _text(substance.cas), source("cas") or ("" if own else NUMBERS)),
        _row("Formula", formula, source("formula") or ("" if own else FORMULAS)),
        _row("Molar mass", (m.Run(f"{mass:.2f}{NBSP}g/mol"),) if mass else (), WEIGHTS),
        _hydrate(substance, catalogue, addresses),
        _row("At 20 °C", _text(substance.state), source("state") if own else MEMORY),
        _row("Melts", _quantity(substance.melts), source("melts")),
        _row("Boils at 1 atm", _quantity(substance.boils), source("boils")),
        _row("Flash point", _quantity(substance.flash), source("flash")),
        _density(substance),
        *_strengths(substance),
        _row("log P, octanol–water", _log_p(substance), source("log-p")),
        *_solubilities(substance),
        *_partitions(substance),
        *_indicator(substance, catalogue),
        _hazards(substance),
    ]
    return [row for row in rows if row is not None]


def _row(label: str, value: Words, source: str) -> m.ReferenceRow:
    """Make a row; what is not known is said to be unknown, and has no source."""
    if not value:
        return m.ReferenceRow(label, (m.Run(UNKNOWN),), "")
    return m.ReferenceRow(label, value, source or NO_SOURCE)


def _text(text: str) -> Words:
    return (m.Run(text),) if text else ()


def _quantity(quantity: Quantity | None) -> Words:
    return quantity_words(quantity) if quantity is not None else ()


def _plain(value: float) -> str:
    said = shown(value, 4)
    return (said.rstrip("0").rstrip(".") if "." in said else said).replace("-", "−")


def _hydrate(
    substance: Substance, catalogue: Catalogue, addresses: Mapping[str, str]
) -> m.ReferenceRow | None:
    """Name the anhydrous substance, with a link where this edition has a page of it."""
    if not substance.hydrate_of:
        return None
    parent = catalogue.by_key(substance.hydrate_of)
    name: m.Words = m.Run(parent.name if parent is not None else substance.hydrate_of)
    address = addresses.get(substance.hydrate_of)
    if address is not None:
        name = m.LinkTo(address, local=True, children=(name,))
    return m.ReferenceRow("Hydrate of", (name,), "")


def _density(substance: Substance) -> m.ReferenceRow | None:
    """Give the density of the liquid; a solid has none here, and none is missed."""
    at = substance.density
    if at is None:
        return None if substance.state == "solid" else _row("Density", (), "")
    words = quantity_words(at.value)
    if at.temperature is not None:
        words = (*words, m.Run(" at "), *quantity_words(at.temperature))
    return _row("Density", words, substance.source("density"))


def _strengths(substance: Substance) -> list[m.ReferenceRow]:
    """Give the pKa of its acidic groups and of its conjugate acids; `unknown` where there is neither."""
    rows = [
        m.ReferenceRow(label, (m.Run(", ".join(_plain(v) for v in values)),), source)
        for label, values, source in (
            ("pKa, acidic", substance.acid, substance.source("acid")),
            ("pKa, of conjugate acid", substance.base, substance.source("base")),
        )
        if values
    ]
    return rows or [_row("pKa", (), "")]


def _log_p(substance: Substance) -> Words:
    return (m.Run(_plain(substance.log_p)),) if substance.log_p is not None else ()


def _solubilities(substance: Substance) -> list[m.ReferenceRow]:
    source = substance.source("soluble")
    rows = [
        _row(
            f"Soluble in {solvent.replace('-', ' ')}",
            (m.Run("; ".join(texts).replace(" % ", f"{NBSP}% ")),),
            source,
        )
        for solvent, texts in substance.soluble.items()
    ]
    if "water" not in substance.soluble and substance.key != "water":
        rows.insert(0, _row("Soluble in water", (), ""))
    return rows


def _partitions(substance: Substance) -> list[m.ReferenceRow]:
    """Give measured ratios of the strengths in an organic liquid and in water."""
    source = substance.source("partition")
    return [
        _row(f"Ratio {solvent.replace('-', ' ')} to water", (m.Run(_plain(ratio)),), source)
        for solvent, ratio in substance.partition.items()
    ]


def _indicator(substance: Substance, catalogue: Catalogue) -> list[m.ReferenceRow]:
    indicator = catalogue.indicators.get(substance.key)
    if indicator is None:
        return []
    colours = f"{indicator.acid_colour} below, {indicator.base_colour} above"
    return [
        _row("Turns at pH", quantity_words(indicator.range), indicator.source),
        _row("Colours", (m.Run(colours),), indicator.source),
    ]


def _hazards(substance: Substance) -> m.ReferenceRow:
    """Print a declared classification as declared; what is not declared is not called safe."""
    declared = substance.ghs
    if not declared:
        return m.ReferenceRow("Hazards", (m.Run(NOT_CLASSIFIED),), "")
    classes = ", ".join((*declared.get("classes", ()), *declared.get("statements", ())))
    source = "; ".join(declared.get("source", ()))
    if not classes:
        return m.ReferenceRow("Hazards", (m.Run(NOT_CLASSIFIED),), "")
    return m.ReferenceRow("Hazards as declared", (m.Run(classes),), source or NO_SOURCE)
