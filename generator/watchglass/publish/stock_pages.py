"""Pages of stocks: what each is, what is in it, where it is used, and how the prep room makes it.

The student edition has a page only for stocks that its procedures use, and no recipe, remark or
amount on it: making them is the prep room's business, and a remark may say what students are to
find out.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.publish import model as m
from watchglass.publish.recipes import recipe_lines

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.stocks import Stock
    from watchglass.run.recipes import PrepRoom

NOT_CLASSIFIED = (
    "Not classified here: read the label, and the data sheets of what is in it, before use."
)


def stock_page(
    stock: Stock,
    catalogue: Catalogue,
    room: PrepRoom | None,
    address: str,
    used_in: tuple[m.ListEntry, ...],
    contents: Mapping[str, str],
    stocks: Mapping[str, m.PageLink],
) -> m.ReferencePage:
    """Make the page of a stock.

    Args:
        stock: Which.
        catalogue: What it is looked up in.
        room: What works out the recipe; None in the student edition.
        address: From the edition's root.
        used_in: All procedures of the edition that use it.
        contents: Addresses of the substances in it, by key.
        stocks: The stocks that this edition has pages of, by key.
    """
    instructor = room is not None
    rows = [
        _row("What it is", stock.material.text),
        _contents(contents, catalogue),
        _row("Also called", ", ".join(stock.names[1:])),
        _row("Keeps for", stock.shelf_life) or m.ReferenceRow("Keeps for", (m.Run("unknown"),), ""),
        _row("Container", stock.container),
        _made_from(stock, catalogue, stocks) if instructor else None,
        _row("Remark", stock.notes) if instructor else None,
        m.ReferenceRow("Hazards", (m.Run(NOT_CLASSIFIED),), ""),
    ]
    names = {key: f"stock “{link.title}”" for key, link in stocks.items()}
    made = room.recipe(stock) if room is not None else None
    return m.ReferencePage(
        kind="stock",
        title=title_of(stock),
        address=address,
        names=(*stock.names, stock.key, stock.material.text),
        rows=tuple(row for row in rows if row is not None),
        used_in=used_in,
        more=None,
        stocks=(),
        lines=recipe_lines(made, names) if made is not None else (),
        remarks=made.assumptions if made is not None else (),
        made=made.size if made is not None else "",
        count=len(used_in),
    )


def title_of(stock: Stock) -> str:
    """Give what a stock is called: its first name, else its key in words."""
    name = stock.names[0] if stock.names else stock.key.replace("-", " ")
    return name[:1].upper() + name[1:]


def _row(label: str, text: str) -> m.ReferenceRow | None:
    return m.ReferenceRow(label, (m.Run(text),), "") if text else None


def _made_from(
    stock: Stock, catalogue: Catalogue, stocks: Mapping[str, m.PageLink]
) -> m.ReferenceRow | None:
    parent = catalogue.stocks.get(stock.made_from.casefold())
    page = stocks.get(parent.key) if parent is not None else None
    if page is None:
        return _row("Made from", stock.made_from)
    link = m.LinkTo(page.address, local=True, children=(m.Run(page.title),))
    return m.ReferenceRow("Made from", (link,), "")


def _contents(contents: Mapping[str, str], catalogue: Catalogue) -> m.ReferenceRow | None:
    words: list[m.Words] = []
    for key, address in contents.items():
        substance = catalogue.by_key(key)
        name = m.Run(substance.name if substance is not None else key)
        words += [m.Run(", ")] if words else []
        words.append(m.LinkTo(address, local=True, children=(name,)))
    return m.ReferenceRow("Contains", tuple(words), "") if words else None
