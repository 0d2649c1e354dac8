"""A small site with a set of its own, and ways to look at what was built from it."""

from __future__ import annotations

import hashlib
from html.parser import HTMLParser
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from pathlib import Path

PROCEDURE = """\
---
title: Washing an ether layer
code: AA-01
course: Washing
materials:
  ether: tert-butyl methyl ether
  base:  5.0 % w/v sodium hydrogencarbonate
vessels:
  funnel: separatory funnel 125 mL
---

## A. The wash

1. Put {30 mL ether -> funnel} and {15 mL base -> funnel} into {funnel}.
   Record {? mass of the layer in g = 13.37 g}.

::: instructor
KEPT-FROM-STUDENTS
:::

See [the notes](../pages/notes.md).
"""
SECOND = (
    PROCEDURE.replace("AA-01", "AA-02").replace("ether layer", "ether again").split("::: inst")[0]
)
CONFIG = """\
site_name: A
use_directory_urls: false
site_dir: public/student
theme: {name: watchglass}
plugins: [{watchglass: {set: ../set}}]
"""


def make_site(folder: Path, *, config: str = CONFIG) -> Path:
    """Write a set and a site that publishes it; give the site."""
    texts = {
        "set/laboratory.yml": "name: The Laboratory\ninstitution: A College\n",
        "set/procedures/aa-01.md": PROCEDURE,
        "set/procedures/aa-02.md": SECOND,
        "set/pages/notes.md": "---\ntitle: Notes\n---\n\nSee [the wash](../procedures/aa-01.md#step-1).\n",
        "site/docs/own.md": "# Own page\n\nSee [the wash](procedures/aa-01.md#step-1).\n",
        "site/mkdocs.yml": config,
    }
    for path, text in texts.items():
        place = folder / path
        place.parent.mkdir(parents=True, exist_ok=True)
        place.write_text(text, encoding="utf-8")
    return folder / "site"


def digest(folder: Path) -> dict[str, str]:
    """Give every file of a folder with a digest of its bytes."""
    return {
        path.relative_to(folder).as_posix(): hashlib.sha256(path.read_bytes()).hexdigest()
        for path in sorted(folder.rglob("*"))
        if path.is_file()
    }


class Reading(HTMLParser):
    """What a browser would see of a page: elements, links, ids, text."""

    def __init__(self, html: str) -> None:
        """Read a page."""
        super().__init__()
        self.tags: list[str] = []
        self.attributes: list[tuple[str, str]] = []
        self.texts: list[str] = []
        self.feed(html)
        self.close()

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        """Note an element."""
        self.tags.append(tag)
        self.attributes += [(name, value or "") for name, value in attrs]

    def handle_data(self, data: str) -> None:
        """Note text."""
        self.texts.append(data)

    @property
    def text(self) -> str:
        """All its text."""
        return "".join(self.texts)

    def values(self, *names: str) -> list[str]:
        """Give the values of attributes by name, in order."""
        return [value for name, value in self.attributes if name in names]
