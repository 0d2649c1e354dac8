"""How far to the right each box of a rank goes: trunks upright, nothing wider than it must be.

Boxes that lead on to one another by their longest way, and the places of a long arrow, make a trunk
that is moved as a whole (in the manner of U. Brandes and B. Köpf, Graph Drawing 2001, 31). Trunks
keep their order and distance; each is first put in the middle of where it may be, then moved
towards what it is joined with, never past its neighbours: so boxes never overlap.
"""

from __future__ import annotations

from itertools import pairwise
from operator import sub
from typing import NamedTuple

_SWEEPS = 8
#: Trunks that move less than this, px, have come to rest.
_STILL = 1.0
#: A drawing wider than this, px, has trunks cut to make it narrower; so many at most.
ROOM, _CUTS = 840.0, 8


class Trunks(NamedTuple):
    """Trunks and what keeps them apart.

    Attributes:
        of: For each box the trunk it belongs to.
        right: Of each trunk, by trunk to its right: the least distance of their middles, and the
            rank in which that is needed.
        left: The same by trunk to its left.
        order: All trunks, none before one that stands to its left.
        half: Half the width of the widest box of each.
        joined: For each trunk the boxes of others that arrows join it with.
    """

    of: list[int]
    right: list[dict[int, tuple[float, int]]]
    left: list[dict[int, tuple[float, int]]]
    order: list[int]
    half: list[float]
    joined: list[list[int]]


def placed(
    rows: list[list[int]],
    up: list[list[int]],
    down: list[list[int]],
    widths: list[float],
    gap: float,
) -> list[float]:
    """Give the middle of each box, the leftmost box's left side at nought.

    Args:
        rows: Boxes of each rank in their order.
        up: For each box those above that lead to it, all in the rank before.
        down: For each box those below that it leads to.
        widths: Of each box, px.
        gap: Between two boxes of a rank, px.
    """
    main = _main(rows, up, down)
    trunks = _gathered(rows, main, down, widths, gap)
    low, high, right = _extremes(trunks)
    for _ in range(_CUTS):
        cut = _tightest(rows, main, trunks, low) if right > ROOM else -1
        if cut < 0:
            break
        main[cut] = -1
        trunks = _gathered(rows, main, down, widths, gap)
        low, high, right = _extremes(trunks)
    x = [(one + other) / 2 for one, other in zip(low, high, strict=True)]
    for sweep in range(_SWEEPS):
        before = list(x)
        for trunk in trunks.order if sweep % 2 else reversed(trunks.order):
            joined = trunks.joined[trunk]
            if not joined:
                continue
            wanted = sum([x[trunks.of[node]] for node in joined]) / len(joined)
            least = max([x[n] + d for n, (d, _) in trunks.left[trunk].items()], default=0.0)
            most = min([x[n] - d for n, (d, _) in trunks.right[trunk].items()], default=right)
            least = max(least, trunks.half[trunk])
            most = max(min(most, right - trunks.half[trunk]), least)
            x[trunk] = min(max(wanted, least), most)
        if max(map(abs, map(sub, x, before)), default=0.0) < _STILL:
            break
    start = min((x[t] - trunks.half[t] for t in trunks.order), default=0.0)
    return [x[trunk] - start for trunk in trunks.of]


def _extremes(trunks: Trunks) -> tuple[list[float], list[float], float]:
    """Give where each trunk is when all are pushed left, and right, and how wide the whole is."""
    low = [0.0] * len(trunks.order)
    for trunk in trunks.order:
        low[trunk] = max(
            [trunks.half[trunk], *[low[n] + d for n, (d, _) in trunks.left[trunk].items()]]
        )
    right = max((low[t] + trunks.half[t] for t in trunks.order), default=0.0)
    high = [0.0] * len(trunks.order)
    for trunk in reversed(trunks.order):
        high[trunk] = min(
            [
                right - trunks.half[trunk],
                *[high[n] - d for n, (d, _) in trunks.right[trunk].items()],
            ]
        )
    return low, high, right


def _tightest(rows: list[list[int]], main: list[int], trunks: Trunks, low: list[float]) -> int:
    """Give the box below which a trunk is to be cut, so that the whole may be narrower; -1: none.

    Of the trunks that are pushed from the left and push to the right where all are pushed left, it
    is the one in which the two are farthest from each other; it is cut just above the lower.
    """
    trunk = max(trunks.order, key=lambda t: low[t] + trunks.half[t])
    below, best, found = -1, 0, (-1, -1)
    while True:
        pushes = [
            (one, row)
            for one, (distance, row) in trunks.left[trunk].items()
            if abs(low[one] + distance - low[trunk]) < 1e-6
        ]
        if not pushes:
            break
        one, row = pushes[0]
        if below >= 0 and abs(below - row) > best:
            best, found = abs(below - row), (trunk, max(below, row))
        trunk, below = one, row
    if found[0] < 0:
        return -1
    return next((n for n in rows[found[1] - 1] if trunks.of[n] == found[0] and main[n] >= 0), -1)


def _gathered(
    rows: list[list[int]],
    main: list[int],
    down: list[list[int]],
    widths: list[float],
    gap: float,
) -> Trunks:
    """Gather boxes into trunks."""
    of = [-1] * len(widths)
    half: list[float] = []
    for row in rows:
        for node in row:
            if of[node] < 0:
                of[node] = len(half)
                half.append(0.0)
            half[of[node]] = max(half[of[node]], widths[node] / 2)
            if main[node] >= 0:
                of[main[node]] = of[node]
    right: list[dict[int, tuple[float, int]]] = [{} for _ in half]
    left: list[dict[int, tuple[float, int]]] = [{} for _ in half]
    for rank, row in enumerate(rows):
        for one, other in pairwise(row):
            distance = (widths[one] + widths[other]) / 2 + gap
            beside = right[of[one]]
            if distance > beside.get(of[other], (0.0, 0))[0]:
                beside[of[other]] = left[of[other]][of[one]] = (distance, rank)
    waiting = [len(beside) for beside in left]
    order = [trunk for trunk, count in enumerate(waiting) if not count]
    for trunk in order:
        for other in right[trunk]:
            waiting[other] -= 1
            if not waiting[other]:
                order.append(other)
    joined: list[list[int]] = [[] for _ in half]
    for node, ends in enumerate(down):
        for end in ends:
            if of[end] != of[node]:
                joined[of[node]].append(end)
                joined[of[end]].append(node)
    return Trunks(of, right, left, order, half, joined)


def _main(rows: list[list[int]], up: list[list[int]], down: list[list[int]]) -> list[int]:
    """Give for each box the one below it in its trunk; -1 where its trunk ends.

    It is the one that the longest way goes on to, and which the longest way comes to from there.
    Trunks do not cross: the one that would is cut.
    """
    below, above = [0] * len(up), [0] * len(up)
    for row in reversed(rows):
        for node in row:
            below[node] = 1 + max([below[n] for n in down[node]], default=0)
    for row in rows:
        for node in row:
            above[node] = 1 + max([above[n] for n in up[node]], default=0)
    main = [-1] * len(up)
    for row, following in pairwise(rows):
        at = {node: place for place, node in enumerate(following)}
        last = -1
        for node in row:
            if not down[node]:
                continue
            longest = max(down[node], key=below.__getitem__)
            if max(up[longest], key=above.__getitem__) == node and at[longest] > last:
                main[node] = longest
                last = at[longest]
    return main
