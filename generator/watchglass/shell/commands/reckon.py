"""`watchglass reckon`: the notation's expressions worked out at the command line."""

from __future__ import annotations

# ruff: noqa: PLC0415 - catalogue and renderers are imported once the call is known to be sound
import os
import sys
from pathlib import Path
from typing import TYPE_CHECKING

import click

from watchglass.shell.cli import CLEAN, FOUND
from watchglass.shell.commands.verdict import Refused
from watchglass.shell.streams import put, say, style_of

if TYPE_CHECKING:
    from collections.abc import Iterator, Sequence

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Source
    from watchglass.shell.reckoning.answers import Answer
    from watchglass.shell.reckoning.names import BenchCatalogue

SET_MARK = "laboratory.yml"
STANDARD_INPUT = "standard input"


@click.command()
@click.argument("expressions", metavar="EXPR...", nargs=-1, required=True)
@click.option(
    "--set",
    "root",
    metavar="SET",
    type=click.Path(exists=True, file_okay=False, path_type=Path),
    help="Take this set's substances and stocks too.",
)
@click.option(
    "--format",
    "form",
    type=click.Choice(["text", "json"]),
    default="text",
    show_default=True,
    help="text gives each answer one line, json one object a line.",
)
def command(expressions: tuple[str, ...], root: Path | None, form: str) -> int:
    """Work out expressions of the notation.

    EXPR is what may stand after `=` in a mark. In place of local names a material is written out in
    the parentheses, as in front matter: a key or a name of the catalogue, a formula, or a strength
    and a name. Put each EXPR in single quotes; `-` reads one expression a line from standard
    input, blank lines and lines that begin with # passed over.

    \b
      watchglass reckon 'moles(2.00 g benzoic-acid) in mmol'
      watchglass reckon 'moles(15 mL 3.0 M hydrochloric acid)'
      watchglass reckon '5.0 g / molar-mass(NaCl) in mmol'
      watchglass reckon 'balance(C2H6 + O2 -> CO2 + H2O)'
      watchglass reckon 'dilution(12 M hydrochloric acid, 3.0 M, 250 mL)'

    Answers go to standard output, findings to standard error. Exit status: 0 if every expression
    could be read, 1 if one could not, 2 if the call cannot be understood.
    """  # noqa: D301 - click's own sign for lines that are kept
    if root is not None and not (root / SET_MARK).is_file():
        raise Refused(f"`{root}` is no set: it holds no {SET_MARK}")
    status = CLEAN
    catalogue, found = _catalogue(root)
    if found:
        status = FOUND
        _say(found)
    from watchglass.shell.reckoning.answers import reckon

    answered = _object if form == "json" else _line
    for source, start, end in _asked(expressions):
        answer = reckon(source, start, end, catalogue)
        if answer.failed:
            status = FOUND
        answered(answer)
    return status


# ------------------------------------------------------------------------------ what is asked


def _asked(expressions: Sequence[str]) -> Iterator[tuple[Source, int, int]]:
    from watchglass.base.spans import Source

    for number, written in enumerate(expressions, start=1):
        if written == "-":
            yield from _lines(_standard_input())
            continue
        name = "expression" if len(expressions) == 1 else f"expression {number}"
        source = Source.of(name, written)
        yield source, 0, len(source.text)


def _standard_input() -> Source:
    from watchglass.shell.sets import from_bytes

    read = from_bytes({STANDARD_INPUT: sys.stdin.buffer.read()})
    if read.findings:
        _say(read.findings)
        raise Refused("standard input cannot be read")
    return read.sources[STANDARD_INPUT]


def _lines(source: Source) -> Iterator[tuple[Source, int, int]]:
    """Give the lines that hold an expression."""
    start = 0
    for line in source.text.split("\n"):
        if line.strip() and not line.lstrip().startswith("#"):
            yield source, start, start + len(line)
        start += len(line) + 1


def _catalogue(root: Path | None) -> tuple[BenchCatalogue, tuple[Finding, ...]]:
    """Give the catalogue to ask, and what is wrong with a set's own entries in it."""
    from watchglass.shell.reckoning.names import BenchCatalogue

    if root is None:
        from watchglass.shell.shipped import shipped

        return BenchCatalogue.of_shipped(shipped()), ()
    from watchglass.base.findings import Severity
    from watchglass.shell.pipeline import surroundings
    from watchglass.shell.sets import read_set

    files = read_set(root, shown=f"{root.as_posix()}/")
    asked = {path: s for path, s in files.sources.items() if _in_catalogue(path)}
    around, found = surroundings(asked)
    errors = tuple(f for f in found if f.code.severity is Severity.ERROR)
    return BenchCatalogue.over(around.catalogue), errors


def _in_catalogue(path: str) -> bool:
    return path in ("stocks.yml", SET_MARK) or path.startswith("substances/")


# ------------------------------------------------------------------------------ what is said


def _line(answer: Answer) -> None:
    if answer.findings:
        _say(answer.findings)
    if answer.text:
        from watchglass.shell.rendering.cells import visible

        notes = "; ".join(answer.assumptions)
        said = f"{answer.text}  ({notes})" if notes else answer.text
        put(visible(said, unicode=style_of(sys.stdout, os.environ).unicode) + "\n")


def _object(answer: Answer) -> None:
    import json

    from watchglass.shell.rendering.json_ import render

    style = style_of(sys.stdout, os.environ)
    value = {
        "version": 1,
        "expression": answer.expression,
        "value": answer.value,
        "unit": answer.unit,
        "figures": answer.figures,
        "text": answer.text,
        "assumptions": list(answer.assumptions),
        "findings": json.loads(render(answer.findings, style=style))["findings"],
    }
    put(json.dumps(value).replace("\x7f", "\\u007f") + "\n")


def _say(findings: Sequence[Finding]) -> None:
    """Say findings in full, without the sentence that counts files."""
    from watchglass.shell.rendering.full import render

    text = render(findings, style=style_of(sys.stderr, os.environ))
    say(text.rpartition("\n\n")[0] + "\n\n")
