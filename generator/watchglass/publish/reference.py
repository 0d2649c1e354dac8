"""Pages of substances and stocks: what is known of each, with its source, and where it is used.

The student edition shows what its own procedures show: a candidate of a secret sample has no page,
no entry and no link there. Recipes of stocks are the prep room's and stand in the instructor edition.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base.figures import shown
from watchglass.publish import model as m
from watchglass.publish.recipes import recipe_lines
from watchglass.publish.text import NBSP, formula_words, quantity_words
from watchglass.resolve import model
from watchglass.resolve.outline import slug
from watchglass.resolve.reactions import substances_of
from watchglass.run.recipes import recipe

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.stocks import Stock
    from watchglass.catalogue.substances import Substance
    from watchglass.resolve.laboratory import Laboratory

NOT_CLASSIFIED = (
    "Not assessed here. Read the supplier's safety data sheet before the bottle is opened."
)
UNKNOWN = "unknown"


class Use(NamedTuple):
    """A procedure that a page of a substance or stock points to."""

    link: m.PageLink
    procedure: model.Procedure


def references(
    uses: Iterable[Use],
    catalogue: Catalogue,
    laboratory: Laboratory,
    *,
    instructor: bool,
) -> tuple[m.ReferencePage, ...]:
    """Make the pages of all substances and stocks that an edition's procedures use.

    Args:
        uses: The procedures with their links, in the order of the handbook.
        catalogue: What they were looked up in.
        laboratory: What the store owns, for recipes.
        instructor: Whether the instructor edition is made.
    """
    uses = tuple(uses)
    stocks = {stock.key: stock for stock in catalogue.stocks.values()}
    by_substance: dict[str, dict[str, m.PageLink]] = {}
    by_stock: dict[str, dict[str, m.PageLink]] = {key: {} for key in stocks}
    for use in uses:
        for key in _substances(use.procedure, instructor=instructor):
            by_substance.setdefault(key, {})[use.link.code] = use.link
        for material in use.procedure.materials.values():
            if material.stock in by_stock:
                by_stock[material.stock][use.link.code] = use.link
    for own in catalogue.own:
        if instructor:
            by_substance.setdefault(own, {})
    pages = [
        _substance(substance, tuple(links.values()), catalogue)
        for key, links in sorted(by_substance.items())
        if (substance := catalogue.by_key(key)) is not None
    ]
    pages.sort(key=lambda page: page.title.casefold())
    made = [
        _stock(stock, tuple(by_stock[key].values()), catalogue, laboratory, instructor=instructor)
        for key, stock in sorted(stocks.items())
    ]
    return (*pages, *made)


def _substances(procedure: model.Procedure, *, instructor: bool) -> tuple[str, ...]:
    """Give the keys of what a procedure names openly: its materials and its equations."""
    keys: dict[str, None] = {}
    for material in procedure.materials.values():
        if isinstance(material.composition, model.Secret) and not instructor:
            continue
        for substance in substances_of(material):
            keys[substance.key] = None
        solvent = getattr(material.composition, "solvent", None)
        if solvent is not None:
            keys[solvent.key] = None
    for reaction in procedure.reactions.values():
        for species in (*reaction.left, *reaction.right):
            if species.substance is not None:
                keys[species.substance.key] = None
    return tuple(keys)


def address_of_substance(key: str) -> str:
    """Give the address of a substance's page from the edition's root."""
    return f"substances/{slug(key)}.html"


def address_of_stock(key: str) -> str:
    """Give the address of a stock's page from the edition's root."""
    return f"stocks/{slug(key)}.html"


# ---------------------------------------------------------------- substances


def _substance(
    substance: Substance, links: tuple[m.PageLink, ...], catalogue: Catalogue
) -> m.ReferencePage:
    rows = [
        _row("Also called", (m.Run(", ".join(substance.names[1:])),), "")
        if len(substance.names) > 1
        else None,
        _row("CAS number", _text(substance.cas), substance.source("cas")),
        _row(
            "Formula",
            formula_words(substance.formula) if substance.formula else None,
            substance.source("formula"),
        ),
        _row(
            "Molar mass",
            (m.Run(f"{substance.molar_mass:.2f}{NBSP}g/mol"),) if substance.molar_mass else None,
            "IUPAC standard atomic weights, 2021" if substance.molar_mass else "",
        ),
        _row("At 20 °C", _text(substance.state), ""),
        _row("Melts", _quantity(substance.melts), substance.source("melts")),
        _row("Boils at 1 atm", _quantity(substance.boils), substance.source("boils")),
        _row("Flash point", _quantity(substance.flash), substance.source("flash")),
        _density(substance),
        _numbers("pKa, acidic", substance.acid, substance.source("acid")),
        _numbers("pKa, of conjugate acid", substance.base, substance.source("base")),
        _numbers(
            "log P, octanol–water",
            (substance.log_p,) if substance.log_p is not None else (),
            substance.source("log-p"),
        ),
        *_solubilities(substance),
        *_indicator(substance, catalogue),
        _hazards(substance),
    ]
    return m.ReferencePage(
        kind="substance",
        title=substance.name,
        address=address_of_substance(substance.key),
        rows=tuple(row for row in rows if row is not None),
        used_in=links,
        lines=(),
        remarks=(),
    )


def _row(label: str, value: tuple[m.Words, ...] | None, source: str) -> m.ReferenceRow:
    return m.ReferenceRow(label, value or (m.Run(UNKNOWN),), source if value else "")


def _text(text: str) -> tuple[m.Words, ...] | None:
    return (m.Run(text),) if text else None


def _quantity(quantity: object) -> tuple[m.Words, ...] | None:
    return quantity_words(quantity) if quantity is not None else None  # type: ignore[arg-type]


def _density(substance: Substance) -> m.ReferenceRow | None:
    if substance.state != "liquid" and substance.density is None:
        return None
    at = substance.density
    if at is None:
        return _row("Density", None, "")
    words = quantity_words(at.value)
    if at.temperature is not None:
        words = (*words, m.Run(" at "), *quantity_words(at.temperature))
    return _row("Density", words, substance.source("density"))


def _numbers(label: str, values: tuple[float, ...], source: str) -> m.ReferenceRow | None:
    if not values:
        return None
    said = ", ".join(shown(value, 4).rstrip("0").rstrip(".") for value in values)
    return _row(label, (m.Run(said),), source)


def _solubilities(substance: Substance) -> list[m.ReferenceRow]:
    source = substance.source("soluble")
    return [
        _row(
            f"Soluble in {solvent}", (m.Run("; ".join(texts).replace(" % ", f"{NBSP}% ")),), source
        )
        for solvent, texts in substance.soluble.items()
    ]


def _indicator(substance: Substance, catalogue: Catalogue) -> list[m.ReferenceRow]:
    indicator = catalogue.indicators.get(substance.key)
    if indicator is None:
        return []
    return [
        _row("Turns at pH", quantity_words(indicator.range), indicator.source),
        _row(
            "Colours",
            (m.Run(f"{indicator.acid_colour} below, {indicator.base_colour} above"),),
            indicator.source,
        ),
    ]


def _hazards(substance: Substance) -> m.ReferenceRow:
    declared = substance.ghs
    if not declared:
        return m.ReferenceRow("Hazards", (m.Run(NOT_CLASSIFIED),), "")
    classes = ", ".join((*declared.get("classes", ()), *declared.get("statements", ())))
    source = "; ".join(declared.get("source", ()))
    return m.ReferenceRow("Hazards as declared", (m.Run(classes),), source)


# ---------------------------------------------------------------- stocks


def _stock(
    stock: Stock,
    links: tuple[m.PageLink, ...],
    catalogue: Catalogue,
    laboratory: Laboratory,
    *,
    instructor: bool,
) -> m.ReferencePage:
    rows = [
        m.ReferenceRow("What it is", (m.Run(stock.material.text),), ""),
        _maybe("Also called", ", ".join(stock.names)),
        _maybe("Keeps for", stock.shelf_life),
        _maybe("Container", stock.container),
        _maybe("Remark", stock.notes) if instructor else None,
    ]
    made = recipe(stock, catalogue, laboratory) if instructor else None
    return m.ReferencePage(
        kind="stock",
        title=_title(stock),
        address=address_of_stock(stock.key),
        rows=tuple(row for row in rows if row is not None),
        used_in=links,
        lines=recipe_lines(made) if made is not None else (),
        remarks=made.assumptions if made is not None else (),
        made=made.size if made is not None else "",
    )


def _maybe(label: str, text: str) -> m.ReferenceRow | None:
    return m.ReferenceRow(label, (m.Run(text),), "") if text else None


def _title(stock: Stock) -> str:
    name = stock.names[0] if stock.names else stock.key.replace("-", " ")
    return name[:1].upper() + name[1:]


# ---------------------------------------------------------------- their lists


def reference_lists(pages: Iterable[m.ReferencePage]) -> tuple[m.ListPage, ...]:
    """Make the lists of substances, by initial, and of stocks."""
    groups: dict[str, list[m.ListEntry]] = {}
    stocks: list[m.ListEntry] = []
    for page in pages:
        used = len(page.used_in)
        remark = "" if not used else "in 1 procedure" if used == 1 else f"in {used} procedures"
        entry = m.ListEntry(m.PageLink(page.title, "", page.address), remark)
        if page.kind == "stock":
            stocks.append(entry)
        else:
            initial = next((c for c in page.title if c.isalpha()), "#").upper()
            groups.setdefault(initial, []).append(entry)
    lists = []
    if groups:
        lists.append(
            m.ListPage(
                kind="substances",
                title="Substances",
                address="substances.html",
                groups=tuple(
                    m.ListGroup(initial, f"initial-{slug(initial) or 'other'}", tuple(entries))
                    for initial, entries in sorted(groups.items())
                ),
            )
        )
    if stocks:
        group = m.ListGroup("Solutions the prep room keeps", "solutions", tuple(stocks))
        lists.append(
            m.ListPage(kind="stocks", title="Stocks", address="stocks.html", groups=(group,))
        )
    return tuple(lists)


def by_key(pages: Iterable[m.ReferencePage]) -> Mapping[str, m.ReferencePage]:
    """Give pages by their address."""
    return {page.address: page for page in pages}
