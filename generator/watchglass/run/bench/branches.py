"""Branches of a procedure (`:::if the solid is coloured`): run on a copy of the bench, then dropped.

A branch that is `expected` is no branch for the bench: it happens.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NamedTuple

from watchglass.read import syntax

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.base.dimensions import Dimension
    from watchglass.run.bench.state import Bench

_EXPECTED = re.compile(r",\s*expected\s*$")


class Branch(NamedTuple):
    """A branch that is dropped: where it begins and ends in its source, and its words."""

    start: int
    end: int
    words: str


Branches = tuple[Branch, ...]


class Kept(NamedTuple):
    """What is put back when a branch is dropped."""

    bench: Bench
    charged: dict[str, float]
    formed: dict[str, float]
    runs_into: dict[str, str]
    taken: dict[tuple[str, Dimension], float]
    titres: int


def dropped_branches(blocks: Iterable[syntax.Block]) -> Branches:
    """Give every branch that is not expected, at whatever depth, in the order they begin."""
    return tuple(
        Branch(block.span.start, block.span.end, block.argument.strip())
        for block in _fenced(blocks)
        if not _EXPECTED.search(block.argument)
    )


def branches_at(branches: Branches, place: int) -> Branches:
    """Give the branches that a place stands in, the outermost first."""
    if not branches:
        return ()
    return tuple(branch for branch in branches if branch.start <= place < branch.end)


def _fenced(blocks: Iterable[syntax.Block]) -> Iterator[syntax.Fenced]:
    for block in blocks:
        match block:
            case syntax.Fenced(kind, _, _, children, _, _):
                if kind == "if":
                    yield block
                yield from _fenced(children)
            case syntax.Quote(children, _):
                yield from _fenced(children)
            case syntax.Steps(items, _):
                for item in items:
                    yield from _fenced(item.children)
            case _:
                pass
