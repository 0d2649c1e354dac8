"""The frame of an edition's pages, from the handbook's models and the site's configuration."""

from __future__ import annotations

from typing import TYPE_CHECKING

from mkdocs.structure.nav import Link, Section
from mkdocs.structure.pages import Page

from watchglass.shell.site.render import START, Frame, NavEntry

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from mkdocs.config.defaults import MkDocsConfig
    from mkdocs.structure import StructureItem
    from mkdocs.structure.nav import Navigation

    from watchglass.publish.handbook import HandbookPages

_IN_MAIN = ("courses", "weeks")


def make_frame(pages: HandbookPages, own: Iterable[NavEntry], config: MkDocsConfig) -> Frame:
    """Make the frame: Start, the lists (of a long one its first part), pages of the set, pages of the site's own.

    Args:
        pages: The edition.
        own: Pages of the site's own; those that the frame names already are left out.
        config: MkDocs' configuration, for the owner's style sheets and scripts.
    """
    main = [NavEntry("Start", START)]
    first = [page for page in pages.lists if page.part == 1]
    main += [NavEntry(page.title, page.address) for page in first if page.kind in _IN_MAIN]
    lookup = [NavEntry(page.title, page.address) for page in first if page.kind not in _IN_MAIN]
    named = {entry.address for entry in (*main, *lookup)}
    others: list[NavEntry] = []
    for entry in (*(NavEntry(page.title, page.address) for page in pages.pages), *own):
        if entry.address not in named:
            named.add(entry.address)
            others.append(entry)
    return Frame(
        laboratory=pages.laboratory,
        institution=pages.institution,
        edition=pages.edition,
        main=tuple(main),
        lookup=tuple(lookup),
        pages=tuple(others),
        styles=tuple(config.extra_css),
        scripts=tuple(str(script) for script in config.extra_javascript),
    )


def own_pages(nav: Navigation) -> tuple[NavEntry, ...]:
    """Give the pages and links of MkDocs' navigation, its sections laid flat."""
    return tuple(_flat(nav.items))


def _flat(items: Iterable[StructureItem]) -> Iterator[NavEntry]:
    for item in items:
        match item:
            case Section():
                yield from _flat(item.children)
            case Page():
                yield NavEntry(str(item.title), item.file.url)
            case Link():
                yield NavEntry(item.title, item.url)
            case _:
                pass
