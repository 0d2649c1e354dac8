"""From drafts to boxes: boxes that say nothing are taken out, ends are told, words are put together."""

from __future__ import annotations

from collections import Counter
from typing import TYPE_CHECKING

from watchglass.publish.flow.graph import KEPT, Flow, Kind, Node
from watchglass.publish.flow.wording import (
    place_name,
    portion_words,
    sentence_case,
    times_words,
)
from watchglass.publish.text import NBSP

if TYPE_CHECKING:
    from collections.abc import Callable, Iterable

    from watchglass.publish.flow.desk import Brought, Desk, Draft
    from watchglass.resolve.model import Procedure
    from watchglass.run.bench.ledger import Entry


def finished(
    desk: Desk, entries: Iterable[Entry], components: Callable[[Draft], tuple[str, ...]] | None
) -> Flow:
    """Give the graph of a desk; `components` tells what is in a box, where that may be shown."""
    _ends(desk)
    gone = _contracted(desk)
    gone |= _let_go(desk)
    order = _in_order(desk, gone)
    at = {place: index for index, place in enumerate(order)}
    after_part = {e for s, e in desk.edges if desk.drafts[s].kind is Kind.PART}
    drawn = {start for start, _ in desk.edges}
    nodes = []
    for place in order:
        draft = desk.drafts[place]
        tells = (
            draft.kind is Kind.PART
            or draft.kept
            or (draft.kind is Kind.WASTE and place not in after_part)
        )
        inside = components(draft) if components and tells else ()
        if components and draft.lets_go is not None:
            inside = components(draft.lets_go)
        nodes.append(_node(draft, desk.procedure, inside, drawn=place in drawn))
    edges = tuple(sorted((at[s], at[e]) for s, e in desk.edges))
    return Flow(tuple(nodes), edges, _repeated(entries))


def _ends(desk: Desk) -> None:
    """Tell which boxes are what the procedure keeps at its end."""
    inward: dict[int, list[int]] = {}
    for start, end in desk.edges:
        inward.setdefault(end, []).append(start)
    for name, holder in list(desk.holders.items()):
        if holder.rest is not None and holder.rest[1] == "residue":
            continue  # what is left in a still
        node = desk.tail(name, holder)
        draft = desk.drafts[node]
        parted = name in desk.collected or any(
            desk.drafts[s].kind is Kind.PART for s in inward.get(node, ())
        )
        taken_off = any(line.startswith("evaporate") for line in draft.lines)
        if holder.drawn and not parted:
            continue  # something was taken of it; what is left is of no account
        if draft.kind is Kind.PART or parted or taken_off:
            draft.kept = True
            draft.held, draft.entries, draft.place = True, [], name


def _contracted(desk: Desk) -> set[int]:
    """Take out vessels in which nothing is done: what comes into them tells where it goes."""
    gone: set[int] = set()
    told: set[int] = set()
    for place, draft in enumerate(desk.drafts):
        if draft.kind is not Kind.STAGE or draft.lines:
            continue
        starts = [s for s, e in desk.edges if e == place]
        if len(starts) != 1:
            continue
        source = desk.drafts[starts[0]]
        if source.kind not in (Kind.PART, Kind.CHARGE) or starts[0] in told:
            continue
        if sum(1 for s, _ in desk.edges if s == starts[0]) != 1:
            continue
        told.add(starts[0])
        vessel = place_name(draft.place, desk.procedure)
        if source.kind is Kind.CHARGE:
            source.head = sentence_case(vessel)
        else:
            source.lines.append(f"into {vessel}")
        if draft.kept:
            source.kept, source.place, source.held, source.entries = True, draft.place, True, []
        for edge in [e for e in desk.edges if place in e]:
            del desk.edges[edge]
            if edge[0] == place:
                desk.lead(starts[0], edge[1])
        gone.add(place)
    return gone


def _let_go(desk: Desk) -> set[int]:
    """Have a vessel itself tell where what is left in it goes; a part has the waste below it."""
    gone: set[int] = set()
    for start, end in list(desk.edges):
        source, waste = desk.drafts[start], desk.drafts[end]
        if waste.kind is Kind.WASTE and waste.place and source.kind is Kind.STAGE:
            source.lets_go = waste
            del desk.edges[start, end]
            gone.add(end)
    return gone


def _in_order(desk: Desk, gone: set[int]) -> list[int]:
    """Put boxes in the order they were put up, what is brought before the vessel it goes into."""
    order: list[int] = []
    done: set[int] = set(gone)
    charges: dict[int, list[int]] = {}
    for start, end in desk.edges:
        if desk.drafts[start].kind is Kind.CHARGE:
            charges.setdefault(end, []).append(start)
    for place in range(len(desk.drafts)):
        for one in (*charges.get(place, ()), place):
            if one not in done:
                done.add(one)
                order.append(one)
    return order


def _node(draft: Draft, procedure: Procedure, components: tuple[str, ...], *, drawn: bool) -> Node:
    lines = [_brought(brought, procedure) for brought in draft.brought]
    if draft.kind is Kind.CHARGE:
        lines += _counted(draft.lines)
        lines = [*lines[:1], *(f"+{NBSP}{line}" for line in lines[1:])]
    head = draft.head
    if draft.kind is Kind.STAGE and draft.lines:
        lines.append(", ".join(draft.lines))
    elif draft.kind is not Kind.CHARGE:
        lines += draft.lines
    if draft.kind is Kind.PART:
        head = sentence_case(head)
    if draft.times > 1 and draft.kind is Kind.PART:
        lines.append(f"{draft.times}{NBSP}portions")
    elif draft.times > 1 and draft.kind is Kind.STAGE:
        lines.append(f"done {times_words(draft.times)}")
    fate = KEPT if draft.kept else ""
    if draft.lets_go is not None:
        rest = "what is left" if drawn else "then"
        fate = f"{rest}: {_small(draft.lets_go.head)}"
    phase = draft.phase if draft.phase in ("aqueous", "organic", "solid") else ""
    return Node(
        draft.kind,
        head,
        tuple(lines),
        tuple(sorted(draft.steps or draft.came)),
        phase,
        components,
        fate,
    )


def _counted(lines: Iterable[str]) -> list[str]:
    """Count what is said several times over: `4 × 2.50 mL from the burette`."""
    counts = Counter(lines)
    return [f"{n}{NBSP}×{NBSP}{line}" if n > 1 else line for line, n in counts.items()]


def _small(words: str) -> str:
    return words[:1].lower() + words[1:]


def _brought(brought: Brought, procedure: Procedure) -> str:
    words = portion_words(brought.portion, brought.name, procedure, brought.times)
    return words + brought.more


def _repeated(entries: Iterable[Entry]) -> tuple[tuple[int, ...], int]:
    """Tell which steps are done again with clean vessels, and how often in all."""
    counts: dict[int, set[int]] = {}
    for entry in entries:
        if entry.happening.fresh:
            counts.setdefault(entry.happening.step, set()).add(entry.happening.turn)
    if not counts:
        return (), 1
    return tuple(sorted(counts)), max(len(turns) for turns in counts.values()) + 1
