"""The ledger as text: each step with what was done, what it did, and what the vessels hold."""

from __future__ import annotations

from textwrap import wrap
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.publish.bench import BenchStep, Holding

WIDTH = 100


def render(title: str, steps: Iterable[BenchStep], notes: Iterable[str], width: int = WIDTH) -> str:
    """Write a ledger as lines no longer than `width`."""
    lines = [title, "=" * min(len(title), width), ""]
    for note in notes:
        lines += [*wrap(note, width), ""]
    for step in steps:
        turn = f", pass {step.turn}" if step.turn > 1 else ""
        branch = f", only if {step.branch}: the bench is put back after it" if step.branch else ""
        lines += wrap(f"Step {step.number}{turn}{branch}", width, subsequent_indent="  ")
        for act in step.acts:
            lines += wrap(act.written, width, initial_indent="  ", subsequent_indent="    ")
            for said in act.did:
                lines += wrap(said, width, initial_indent="      ", subsequent_indent="        ")
        lines += list(_holdings(step.after, width))
        lines.append("")
    return "\n".join(lines).rstrip("\n") + "\n"


def _holdings(holdings: Iterable[Holding], width: int) -> Iterator[str]:
    for holding in holdings:
        head = " ".join(filter(None, (holding.phase, holding.size)))
        facts = ", ".join(filter(None, (head, holding.ph)))
        contents = "; ".join(
            f"{c.name} {c.amount}" + (f" ({c.share})" if c.share else "") for c in holding.contents
        )
        text = f"{holding.vessel}: {facts}" + (f": {contents}" if contents else "")
        yield from wrap(text, width, initial_indent="  | ", subsequent_indent="  |   ")
        for remark in holding.remarks:
            yield from wrap(remark, width, initial_indent="  | ! ", subsequent_indent="  |   ")
