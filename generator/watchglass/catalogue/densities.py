"""The table of densities of aqueous solutions, read when the first solution asks for it."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.chemistry.densities import WATER, DensityTable

if TYPE_CHECKING:
    from collections.abc import Iterator, Mapping

_LINE = re.compile(r"^([a-z0-9-]+):\s*(.+)$", re.MULTILINE)


def read_densities(text: str) -> Mapping[str, DensityTable]:
    """Read `densities.yml`: a table by key of the solute."""
    return {found[1]: _table(found[2]) for found in _LINE.finditer(text)}


def _table(words: str) -> DensityTable:
    points, sources = [(0.0, WATER)], [""]
    for share, density, source in _entries(words):
        points.append((share / 100.0, density * 1000.0))
        sources.append(source)
    return DensityTable(tuple(points), tuple(sources))


def _entries(words: str) -> Iterator[tuple[float, float, str]]:
    for entry in words.split(","):
        share, density, source = entry.split()
        yield float(share), float(density), source
