"""The same as rows and sentences, for those who would rather read or listen."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.publish.flow.graph import Kind
from watchglass.publish.flow.wording import step_words
from watchglass.publish.text import NBSP

if TYPE_CHECKING:
    from watchglass.publish.flow.graph import Flow, Node

HEAD = ("Step", "From", "What happens", "To")
_NUMBERS = ("no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine")


def rows(flow: Flow) -> tuple[tuple[str, ...], ...]:
    """Give a row for each vessel in which something is done, and for each thing that is kept."""
    before: list[list[int]] = [[] for _ in flow.nodes]
    after: list[list[int]] = [[] for _ in flow.nodes]
    for start, end in flow.edges:
        before[end].append(start)
        after[start].append(end)
    made = []
    for place, node in enumerate(flow.nodes):
        to = "; ".join(
            [*(_goal(n, flow, after) for n in after[place]), *filter(None, (node.fate,))]
        )
        if node.kind is Kind.STAGE:
            origin = "; ".join(dict.fromkeys(_origin(flow.nodes[n]) for n in before[place]))
            done = ", ".join((*node.lines, *node.components))
        elif node.kind is Kind.CHARGE and node.head and _parted(place, flow, after):
            origin, done = _materials(node), ""
        else:
            continue
        said = ": ".join(filter(None, (node.head, done)))
        made.append((step_words(node.steps), origin, said, to))
    return tuple(made)


def _parted(place: int, flow: Flow, after: list[list[int]]) -> bool:
    """Tell whether something is taken of what stands in a vessel in which nothing else is done."""
    return any(flow.nodes[n].kind is not Kind.STAGE for n in after[place])


def _origin(node: Node) -> str:
    if node.kind is Kind.CHARGE:
        return ": ".join(filter(None, (node.head, _materials(node))))
    return node.head


def _materials(node: Node) -> str:
    return "; ".join(line.removeprefix(f"+{NBSP}") for line in node.lines)


def _goal(place: int, flow: Flow, after: list[list[int]]) -> str:
    """Say where something goes: a part with where it leads, a vessel, a waste stream."""
    node = flow.nodes[place]
    if node.kind is not Kind.PART:
        return node.head
    words = ", ".join((node.head, *node.lines))
    if node.components:
        words += f" ({', '.join(node.components)})"
    ends = [*(flow.nodes[n].head for n in after[place]), *filter(None, (node.fate,))]
    return f"{words}: {', '.join(ends)}" if ends else words


def description(flow: Flow) -> str:
    """Say in sentences what is to be seen."""
    vessels = list(dict.fromkeys(n.head for n in flow.nodes if n.kind is Kind.STAGE))
    kept = [_named(n) for n in flow.nodes if n.kept]
    waste = list(
        dict.fromkeys(
            n.fate.partition(": ")[2] or _small(n.head)
            for n in flow.nodes
            if n.kind is Kind.WASTE or ": " in n.fate
        )
    )
    charges = sum(1 for n in flow.nodes if n.kind is Kind.CHARGE)
    said = [
        f"Boxes joined by arrows, from top to bottom; {_count(charges, 'box')} of what is brought in.",
        f"The vessels are: {', '.join(_small(v) for v in vessels)}.",
    ]
    if kept:
        said.append(f"Kept at the end: {'; '.join(kept)}.")
    if waste:
        said.append(f"Let go: {'; '.join(waste)}.")
    return " ".join(said)


def _named(node: Node) -> str:
    lines = node.lines if node.kind is Kind.PART else ()
    return ", ".join(filter(None, (_small(node.head), *lines)))


def _small(words: str) -> str:
    """Begin small, unless the word stands for itself: `Hirsch`, `pH`, a single letter."""
    if words.startswith(("Hirsch", "Büchner")) or not words[1:2].islower():
        return words
    return words[:1].lower() + words[1:]


def _count(number: int, noun: str) -> str:
    word = _NUMBERS[number] if number < len(_NUMBERS) else str(number)
    return f"{word} {noun}" + ("" if number == 1 else "es")


def note(flow: Flow) -> str:
    """Say which steps are done again from the beginning."""
    steps, times = flow.repeated
    if times < 2:
        return ""
    many = "twice" if times == 2 else f"{times} times"
    plural = "s" if len(steps) > 1 else ""
    return f"Step{plural} {step_words(steps)}: done {many}, each time with clean glassware; drawn once."
