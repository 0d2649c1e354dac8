"""Long lists in parts: a page stays a page however large the set is, and every part is one link on."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING

from watchglass.publish import model as m

if TYPE_CHECKING:
    from collections.abc import Iterator

#: Entries of one part of a list. A phone shows about a dozen at a time.
MOST = 300


def address_of_part(address: str, part: int) -> str:
    """Give the address of a part; slugs hold no full stop, so it is nobody else's.

    >>> address_of_part("substances/water.html", 2)
    'substances/water.2.html'
    """
    return address if part == 1 else f"{address.removesuffix('.html')}.{part}.html"


def in_parts(page: m.ListPage, most: int = MOST, first: int = 1) -> tuple[m.ListPage, ...]:
    """Cut a list into parts that are linked one to the next.

    Args:
        page: The whole list. Where it has links to its groups, they are made to lead to the parts.
        most: Entries of one part, at most.
        first: Number of the first part, where another page is part 1 of the whole.
    """
    cut = list(_cut(page.groups, most))
    stem = page.address
    where = {
        group.id: address_of_part(stem, number)
        for number, groups in reversed(list(enumerate(cut, first)))
        for group in groups
    }
    places = tuple(
        replace(link, address=f"{where[link.address]}#{link.address}")
        for link in page.places
        if link.address in where
    )
    last = first + len(cut) - 1
    return tuple(
        replace(
            page,
            title=page.title if number == 1 else f"{page.title}, part {number}",
            address=address_of_part(stem, number),
            groups=groups,
            places=places if number == first else (),
            previous=_part(page.title, stem, number - 1) if number > 1 else None,
            following=_part(page.title, stem, number + 1) if number < last else None,
            part=number,
        )
        for number, groups in enumerate(cut, first)
    )


def _part(title: str, stem: str, number: int) -> m.PageLink:
    said = title if number == 1 else f"{title}, part {number}"
    return m.PageLink(said, "", address_of_part(stem, number))


def _cut(groups: tuple[m.ListGroup, ...], most: int) -> Iterator[tuple[m.ListGroup, ...]]:
    """Give the groups of each part; a group that goes on keeps its title."""
    held: list[m.ListGroup] = []
    room = most
    for group in groups:
        entries, continued = group.entries, False
        while entries:
            title = f"{group.title} (continued)" if continued else group.title
            held.append(m.ListGroup(title, group.id, entries[:room]))
            taken = len(entries[:room])
            entries, continued, room = entries[taken:], True, room - taken
            if not room:
                yield tuple(held)
                held, room = [], most
    if held:
        yield tuple(held)
