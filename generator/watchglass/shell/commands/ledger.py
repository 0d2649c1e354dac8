"""`watchglass ledger`: the bench after every step of one procedure."""

from __future__ import annotations

# ruff: noqa: PLC0415 - the stages are imported once the call is known to be sound
import os
import sys
from pathlib import Path
from typing import TYPE_CHECKING

import click

from watchglass.shell.cli import CLEAN, FOUND
from watchglass.shell.commands.verdict import Refused
from watchglass.shell.streams import put, style_of

if TYPE_CHECKING:
    from watchglass.judge.bench.run import Run
    from watchglass.run.bench.ledger import Ledger
    from watchglass.shell.pipeline import Judged


@click.command()
@click.argument(
    "path", metavar="FILE", type=click.Path(exists=True, dir_okay=False, path_type=Path)
)
@click.option(
    "--format",
    "form",
    type=click.Choice(["text", "json"]),
    default="text",
    show_default=True,
    help="text is for reading, json carries every number with its unit and model.",
)
@click.option(
    "--scale",
    type=click.FloatRange(min=0, min_open=True, max=1000),
    help="Scale the procedure by this factor, whatever it declares.",
)
def command(path: Path, form: str, scale: float | None) -> int:
    """Show what every vessel holds after every step.

    FILE is one procedure (.md); it is run as part of the set it lies in. A procedure with errors
    that stand before the bench is not run: they are printed instead.
    """
    if path.suffix != ".md":
        raise Refused(f"`{path}` is no procedure: its name does not end in .md")
    from watchglass.shell.pipeline import judge_file

    judged = judge_file(path, scale=scale)
    if judged.run is None:
        from watchglass.shell.rendering.full import render

        put(render(judged.findings, style=style_of(sys.stdout, os.environ)))
        return FOUND
    runs = _runs(judged.run)
    put(_json(judged, judged.run, runs) if form == "json" else _text(judged, judged.run, runs))
    return CLEAN


def _runs(run: Run) -> list[tuple[str, str, Ledger]]:
    """Give what was run: its key in JSON, what is said of it, and its ledger."""
    each = [(sample.words.replace("`", ""), sample.run) for sample in run.samples] or [("", run)]
    found: list[tuple[str, str, Ledger]] = []
    for words, one in each:
        beside = f"{words}, " if words else ""
        said = [f"With a secret sample: {words}."] if words else []
        found.append((f"{beside}low", " ".join(said), one.ledger))
        if one.high is not one.ledger:
            said.append("Open amounts at their high end; what stands above is at their low end.")
            found.append((f"{beside}high", " ".join(said), one.high))
    return found


def _text(judged: Judged, run: Run, runs: list[tuple[str, str, Ledger]]) -> str:
    from watchglass.publish.bench import MODEL, bench_steps
    from watchglass.shell.rendering.ledger_text import render

    head = judged.procedure.head
    title = f"{head.code}  {head.title}"
    texts = []
    resized = judged.procedure.resized
    sizes = [f"`{name}` is a {now}, not a {was}" for name, (was, now) in resized.items()]
    scaled = f"Scaled by {head.scale:.4g}" + (f": {'; '.join(sizes)}." if sizes else ".")
    for place, (_, said, ledger) in enumerate(runs):
        notes = [*([] if place else [MODEL]), *([said] if said else [])]
        if not place and head.scale != 1:
            notes.insert(0, scaled)
        texts.append(render(title, bench_steps(ledger, run.known), notes))
    return "\n".join(texts)


def _json(judged: Judged, run: Run, runs: list[tuple[str, str, Ledger]]) -> str:
    import json

    from watchglass.publish.ledger_data import ledger_data

    ledgers = {key: ledger for key, _, ledger in runs}
    head = judged.procedure.head
    data = ledger_data(ledgers, run.known, head.code, head.title, judged.path)
    return json.dumps(data, indent=1) + "\n"
