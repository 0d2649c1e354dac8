"""Where boxes go: ranks from top to bottom, few crossings, arrows that meet no box.

The layered method of K. Sugiyama, S. Tagawa and M. Toda, IEEE Trans. Syst. Man Cybern. 11 (1981)
109, in a small form of its own: ranks by the longest path, long arrows through a place of their own
in every rank they pass, order by the mean place of the neighbours, then places that keep the order
and the distance and are as near to the neighbours' mean as may be.

An arrow is straight within a rank, under its box or in its own place, and bends only between
ranks, where no box is. So no arrow meets a box that it does not lead to, whatever the graph.
"""

from __future__ import annotations

from itertools import pairwise
from typing import TYPE_CHECKING, NamedTuple

from watchglass.publish.flow.placing import placed

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence

#: Distances, px: between boxes side by side, between ranks, at the edge, an arrow's own width.
APART, BETWEEN, MARGIN, LANE = 14.0, 26.0, 1.0, 8.0
_SWEEPS = 6


class Layout(NamedTuple):
    """Where everything goes, px.

    Attributes:
        width: Of the whole.
        height: Of the whole.
        boxes: Left and top of each box, in the order given.
        arrows: For each arrow the points it goes through, from the foot of a box to the top of
            another; between an odd point and the next it bends, the other pieces are upright.
    """

    width: float
    height: float
    boxes: tuple[tuple[float, float], ...]
    arrows: tuple[tuple[tuple[float, float], ...], ...]


def laid_out(sizes: Sequence[tuple[float, float]], edges: Sequence[tuple[int, int]]) -> Layout:
    """Lay boxes of these widths and heights out; arrows may make no cycle."""
    ranks = _ranks(len(sizes), edges)
    widths = [size[0] for size in sizes]
    chains = _chains(edges, ranks, widths)
    depth = max(ranks, default=-1) + 1
    rows: list[list[int]] = [[] for _ in range(depth)]
    for node, rank in enumerate(ranks):
        rows[rank].append(node)
    down: list[list[int]] = [[] for _ in ranks]
    up: list[list[int]] = [[] for _ in ranks]
    for chain in chains:
        for one, next_one in pairwise(chain):
            down[one].append(next_one)
            up[next_one].append(one)
    rows = _ordered(rows, up, down)
    x = [MARGIN + middle for middle in placed(rows, up, down, widths, APART)]
    return _drawn(rows, x, widths, sizes, chains)


# ---------------------------------------------------------------- ranks


def _ranks(count: int, edges: Sequence[tuple[int, int]]) -> list[int]:
    """Give each box its rank: below all that lead to it; what nothing leads to, just above its use."""
    after: list[list[int]] = [[] for _ in range(count)]
    waiting = [0] * count
    for start, end in edges:
        after[start].append(end)
        waiting[end] += 1
    first = [node for node in range(count) if not waiting[node]]
    ranks = [0] * count
    ready = list(first)
    for node in ready:
        for end in after[node]:
            ranks[end] = max(ranks[end], ranks[node] + 1)
            waiting[end] -= 1
            if not waiting[end]:
                ready.append(end)
    for node in first:
        if after[node]:
            ranks[node] = min(ranks[end] for end in after[node]) - 1
    return ranks


def _chains(
    edges: Sequence[tuple[int, int]], ranks: list[int], widths: list[float]
) -> list[list[int]]:
    """Give each arrow a place in every rank that it passes."""
    chains = []
    for start, end in edges:
        chain = [start]
        for rank in range(ranks[start] + 1, ranks[end]):
            chain.append(len(ranks))
            ranks.append(rank)
            widths.append(LANE)
        chain.append(end)
        chains.append(chain)
    return chains


# ---------------------------------------------------------------- order


def _ordered(rows: list[list[int]], up: list[list[int]], down: list[list[int]]) -> list[list[int]]:
    """Put each rank into the order with the fewest crossings that is met."""
    rows = _as_walked(rows, up, down)
    best, fewest = [list(row) for row in rows], _crossings(rows, down)
    for sweep in range(_SWEEPS):
        if not fewest:
            break
        downward = sweep % 2 == 0
        toward = up if downward else down
        order = range(1, len(rows)) if downward else range(len(rows) - 2, -1, -1)
        for rank in order:
            beside = rows[rank - 1 if downward else rank + 1]
            at = {node: place for place, node in enumerate(beside)}
            keys, last = {}, -1.0
            for node in rows[rank]:
                near = toward[node]
                if near:
                    last = sum([at[n] for n in near]) / len(near)
                keys[node] = last  # what nothing holds stays beside its neighbour
            rows[rank].sort(key=keys.__getitem__)
        _exchanged(rows, up, down)
        crossings = _crossings(rows, down)
        if crossings < fewest:
            best, fewest = [list(row) for row in rows], crossings
    return best


def _as_walked(
    rows: list[list[int]], up: list[list[int]], down: list[list[int]]
) -> list[list[int]]:
    """Begin with the order in which a walk along the arrows comes to the boxes."""
    met: dict[int, int] = {}
    below = [0] * len(up)  # how long the way is that leads on from each
    for row in reversed(rows):
        for node in row:
            below[node] = 1 + max([below[n] for n in down[node]], default=0)
    roots = [node for row in rows for node in row if not up[node]]
    for root in roots:
        walk = [root]
        while walk:
            node = walk.pop()
            if node in met:
                continue
            met[node] = len(met)
            walk += [n for n in up[node] if n not in met]
            longest = max(down[node], key=lambda n: (below[n], -n), default=-1)
            walk += sorted(down[node], key=lambda n: (n == longest, -n))  # the trunk first
    return [sorted(row, key=met.__getitem__) for row in rows]


def _exchanged(rows: list[list[int]], up: list[list[int]], down: list[list[int]]) -> None:
    """Exchange neighbours within a rank wherever that takes crossings away."""
    for rank, row in enumerate(rows):
        above = {n: i for i, n in enumerate(rows[rank - 1])} if rank else {}
        below = {n: i for i, n in enumerate(rows[rank + 1])} if rank + 1 < len(rows) else {}
        for place in range(len(row) - 1):
            one, other = row[place], row[place + 1]
            now = _pair([above[n] for n in up[one]], [above[n] for n in up[other]])
            now += _pair([below[n] for n in down[one]], [below[n] for n in down[other]])
            then = _pair([above[n] for n in up[other]], [above[n] for n in up[one]])
            then += _pair([below[n] for n in down[other]], [below[n] for n in down[one]])
            if then < now:
                row[place], row[place + 1] = other, one


def _pair(left: list[int], right: list[int]) -> int:
    """Count the crossings of the arrows of two neighbours."""
    return sum(1 for one in left for other in right if one > other)


def _crossings(rows: list[list[int]], down: list[list[int]]) -> int:
    """Count all crossings."""
    count = 0
    for row, below in pairwise(rows):
        at = {node: place for place, node in enumerate(below)}
        ends: list[int] = []
        for node in row:
            own = sorted(at[n] for n in down[node])
            for end in own:
                count += sum(1 for before in ends if before > end)
            ends += own
    return count


# ---------------------------------------------------------------- places


def _drawn(
    rows: list[list[int]],
    x: list[float],
    widths: list[float],
    sizes: Sequence[tuple[float, float]],
    chains: list[list[int]],
) -> Layout:
    top = MARGIN
    tops = [0.0] * len(x)
    feet = [0.0] * len(x)
    boxes = len(sizes)
    for row in rows:
        high = max((sizes[n][1] for n in row if n < boxes), default=0.0)
        for node in row:
            tops[node], feet[node] = top, top + high
        top += high + BETWEEN
    arrows = tuple(_arrow(chain, x, tops, feet, sizes) for chain in chains)
    right = max((x[n] + widths[n] / 2 for row in rows for n in row), default=0.0)
    places = tuple((x[n] - widths[n] / 2, tops[n]) for n in range(boxes))
    return Layout(right + MARGIN, max(top - BETWEEN, 0.0) + MARGIN, places, arrows)


def _arrow(
    chain: list[int],
    x: list[float],
    tops: list[float],
    feet: list[float],
    sizes: Sequence[tuple[float, float]],
) -> tuple[tuple[float, float], ...]:
    """Give the points of an arrow: foot of its box, then foot and top of rank by turns."""
    first = chain[0]
    points = [(x[first], tops[first] + sizes[first][1])]
    for node, following in pairwise(chain):
        points += ((x[node], feet[node]), (x[following], tops[following]))
    return tuple(points)


def overlapping(boxes: Iterable[tuple[float, float, float, float]]) -> bool:
    """Tell whether any two boxes (left, top, width, height) have an inner point in common."""
    known = list(boxes)
    return any(
        a[0] < b[0] + b[2] - 1e-6
        and b[0] < a[0] + a[2] - 1e-6
        and a[1] < b[1] + b[3] - 1e-6
        and b[1] < a[1] + a[3] - 1e-6
        for place, a in enumerate(known)
        for b in known[:place]
    )
