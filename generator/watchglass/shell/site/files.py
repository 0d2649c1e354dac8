"""Pages of the handbook as MkDocs sees them: addresses that can be linked to, and nothing more.

MkDocs never reads or renders them. It resolves links to them from the site's own pages, checks the
places on them that are linked to, and lists them in the sitemap.
"""

from __future__ import annotations

import re
from html import unescape
from pathlib import PurePosixPath
from typing import TYPE_CHECKING

from mkdocs.structure.files import File, InclusionLevel
from mkdocs.structure.pages import Page

from watchglass.shell.site.render import address_of, title_of

if TYPE_CHECKING:
    from pathlib import Path

    from mkdocs.config.defaults import MkDocsConfig

    from watchglass.shell.site.render import HandbookPage

_ID = re.compile(r'<[^<>]* id="([^"]*)"')


class HandbookFile(File):
    """A page that our engine writes; MkDocs neither reads nor copies it."""

    def __init__(self, page: HandbookPage, config: MkDocsConfig) -> None:
        """Enter a page of the handbook."""
        address = address_of(page)
        _inside(address)
        super().__init__(
            address.removesuffix(".html") + ".md",
            None,
            config.site_dir,
            use_directory_urls=False,
            dest_uri=address,
            inclusion=InclusionLevel.NOT_IN_NAV,
        )
        self.generated_by = "watchglass"
        self.model = page

    def is_documentation_page(self) -> bool:
        """Keep MkDocs from reading and rendering it."""
        return False

    def copy_file(self, dirty: bool = False) -> None:  # noqa: FBT001, FBT002 - MkDocs' own shape
        """Copy nothing: the page is written by our engine."""

    def is_modified(self) -> bool:
        """Tell MkDocs that there is nothing to do."""
        return False


class HandbookEntry(Page):
    """What answers for a page of the handbook: title, address, places on it."""

    def __init__(self, file: HandbookFile, config: MkDocsConfig) -> None:
        """Stand for a file's page."""
        self.written = ""
        super().__init__(title_of(file.model), file, config)

    @property
    def present_anchor_ids(self) -> set[str] | None:  # type: ignore[override]
        """Addresses of places on the page, as it was written."""
        return set(self.written.split("\n")) if self.written else None

    def keep_places(self, html: str) -> None:
        """Keep the ids of what was written; as one text, since there are many pages."""
        self.written = "\n".join(map(unescape, _ID.findall(html)))


def asset_file(root: Path, source: str, address: str, config: MkDocsConfig) -> File:
    """Enter a picture of the set, which MkDocs copies like one of its own."""
    _inside(source)
    _inside(address)
    file = File(address, None, config.site_dir, use_directory_urls=False, dest_uri=address)
    file.generated_by = "watchglass"
    file.abs_src_path = str(root / source)
    return file


def _inside(address: str) -> None:
    """Make sure that nothing is read or written outside: publish gives no other addresses."""
    parts = PurePosixPath(address).parts
    if address.startswith("/") or "\\" in address or ".." in parts or not parts:
        raise ValueError(f"an address leads out of the site: {address!r}")
