"""What the handbook can be looked up in: substances, stocks, and the lists of both.

Everything is made from what the pages of the edition show (`uses.py`): what is not in them has no
page, no entry and no link.
"""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING, NamedTuple

from watchglass.publish import model as m
from watchglass.publish.paging import MOST, address_of_part, in_parts
from watchglass.publish.stock_pages import stock_page, title_of
from watchglass.publish.substance_pages import filed, initial, substance_page
from watchglass.publish.uses import Use, gather
from watchglass.resolve.outline import slug
from watchglass.run.recipes import PrepRoom

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.resolve.laboratory import Laboratory

#: Procedures named on the page of a substance itself; the others stand on pages of their own.
FIRST = 100


class Reference(NamedTuple):
    """Pages of substances and stocks.

    Attributes:
        pages: One a substance or stock, in the order of their lists.
        lists: The two lists; then, of what is used in very many procedures, the further ones.
        substances: Address of each substance's page, by key.
        stocks: Address of each stock's page, by key.
    """

    pages: tuple[m.ReferencePage, ...]
    lists: tuple[m.ListPage, ...]
    substances: Mapping[str, str]
    stocks: Mapping[str, str]


def make_reference(
    uses: Iterable[Use], catalogue: Catalogue, laboratory: Laboratory, *, instructor: bool
) -> Reference:
    """Make the pages of all substances and stocks that an edition's procedures use.

    Args:
        uses: The procedures, in the order of the handbook.
        catalogue: What they were looked up in.
        laboratory: What the store owns, for recipes.
        instructor: Whether the instructor edition is made.
    """
    found = gather(uses, catalogue, instructor=instructor)
    stocks = {stock.key: stock for stock in catalogue.stocks.values()}
    substances = {
        key: substance
        for key in found.substances
        if (substance := catalogue.by_key(key)) is not None
    }
    of_substances = _addresses(substances, "substances")
    of_stocks = _addresses(found.stocks, "stocks")
    stock_links = {
        key: m.PageLink(title_of(stocks[key]), "", address) for key, address in of_stocks.items()
    }
    pages = [
        substance_page(
            substance,
            catalogue,
            of_substances,
            found.substances[key],
            tuple(stock_links[stock] for stock in found.containing.get(key, ())),
        )
        for key, substance in substances.items()
    ]
    pages.sort(key=lambda page: (filed(page.title), page.address))
    room = PrepRoom(catalogue, laboratory) if instructor else None
    made = [
        stock_page(
            stocks[key],
            catalogue,
            room,
            of_stocks[key],
            found.stocks[key],
            {k: of_substances[k] for k in found.contents[key] if k in of_substances},
            stock_links,
        )
        for key in found.stocks
    ]
    made.sort(key=lambda page: (page.title.casefold(), page.address))
    whole = (*pages, *made)
    lists = (*_substance_list(pages), *_stock_list(made), *_further_uses(whole))
    return Reference(tuple(map(_shortened, whole)), lists, of_substances, of_stocks)


def linked(page: m.ReagentRow, found: Reference) -> m.ReagentRow:
    """Make a material's name lead to its substance, and its strength to the stock it is."""
    name, strength = page.name, page.strength
    address = found.substances.get(page.key)
    if address is not None:
        first = name[0]
        before: tuple[m.Words, ...] = ()
        if isinstance(first, m.Run) and first.text.startswith("of which "):
            before = (m.Run("of which "),)
            name = (m.Run(first.text.removeprefix("of which ")), *name[1:])
        name = (*before, m.LinkTo(address, local=True, children=name))
    stock = found.stocks.get(page.stock)
    if stock is not None and strength:
        strength = (m.LinkTo(stock, local=True, children=strength),)
    return replace(page, name=name, strength=strength)


def _addresses(keys: Iterable[str], folder: str) -> dict[str, str]:
    """Give each key an address of its own; two that are spelt alike are numbered."""
    taken: dict[str, int] = {}
    found: dict[str, str] = {}
    for key in sorted(keys):
        stem = slug(key)
        taken[stem] = taken.get(stem, 0) + 1
        number = "" if taken[stem] == 1 else f".{taken[stem]}th"
        found[key] = f"{folder}/{stem}{number}.html"
    return found


# ---------------------------------------------------------------- what is used in very many


def _shortened(page: m.ReferencePage) -> m.ReferencePage:
    if len(page.used_in) <= FIRST:
        return page
    title = f"{page.title}: used in {page.count} procedures, part 2"
    more = m.PageLink(title, "", address_of_part(page.address, 2))
    return replace(page, used_in=page.used_in[:FIRST], more=more)


def _further_uses(pages: Iterable[m.ReferencePage]) -> Iterable[m.ListPage]:
    for page in pages:
        if len(page.used_in) > FIRST:
            rest = m.ListGroup("Used in", "used", page.used_in[FIRST:])
            title = f"{page.title}: used in {page.count} procedures"
            whole = m.ListPage(kind="uses", title=title, address=page.address, groups=(rest,))
            yield from in_parts(whole, MOST, first=2)


# ---------------------------------------------------------------- their lists


def _substance_list(pages: Iterable[m.ReferencePage]) -> tuple[m.ListPage, ...]:
    """List the substances by their initials."""
    groups: dict[str, list[m.ListEntry]] = {}
    for page in pages:
        groups.setdefault(initial(page.title), []).append(_entry(page))
    made = tuple(
        m.ListGroup(letter, f"initial-{slug(letter)}", tuple(entries))
        for letter, entries in sorted(groups.items())
    )
    if not made:
        return ()
    places = tuple(m.PageLink(group.title, "", group.id) for group in made)
    whole = m.ListPage(
        kind="substances",
        title="Substances",
        address="substances.html",
        groups=made,
        places=places,
    )
    return in_parts(whole)


def _stock_list(pages: Iterable[m.ReferencePage]) -> tuple[m.ListPage, ...]:
    entries = tuple(map(_entry, pages))
    if not entries:
        return ()
    group = m.ListGroup("Solutions the prep room keeps", "solutions", entries)
    whole = m.ListPage(kind="stocks", title="Stocks", address="stocks.html", groups=(group,))
    return in_parts(whole)


def _entry(page: m.ReferencePage) -> m.ListEntry:
    used = "" if not page.count else f"in {page.count} procedure{'s' if page.count > 1 else ''}"
    words = page.formula
    if page.kind == "stock":
        words = page.rows[0].value
    remarks = " · ".join(filter(None, (page.figure, used)))
    return m.ListEntry(m.PageLink(page.title, "", page.address), remarks, words)
