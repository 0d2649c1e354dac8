"""`watchglass check`: judge procedures and print what is found."""

from __future__ import annotations

# ruff: noqa: PLC0415 - the stages and renderers are imported once the call is known to be sound
import os
import sys
from pathlib import Path
from typing import TYPE_CHECKING

import click

from watchglass.shell.commands.verdict import Refused, status_of
from watchglass.shell.streams import put, style_of

if TYPE_CHECKING:
    from collections.abc import Callable, Sequence

SET_MARK = "laboratory.yml"
SITE_MARK = "mkdocs.yml"


@click.command()
@click.argument(
    "paths",
    metavar="PATH...",
    nargs=-1,
    required=True,
    type=click.Path(exists=True, path_type=Path),
)
@click.option(
    "--format",
    "form",
    type=click.Choice(["full", "line", "json"]),
    default="full",
    show_default=True,
    help="full shows the lines a finding stands in, line gives each finding one line, json is "
    "for other programs.",
)
@click.option("--strict", is_flag=True, help="Let warnings fail the check too.")
def command(paths: tuple[Path, ...], form: str, *, strict: bool) -> int:
    """Judge procedures and say what is wrong.

    A PATH is a set, the folder that holds laboratory.yml, or one procedure (.md). A procedure is
    judged as part of the set it lies in; where there is none, with the shipped catalogue alone.

    A sound draft passes in silence. Exit status: 0 if there is no error, 1 if there is one, 2 if
    the call cannot be understood.
    """
    for path in paths:
        _refuse_unfit(path)
    from watchglass.shell.pipeline import check_paths

    result = check_paths(paths)
    status = status_of(result.findings, strict=strict)
    if not result.checked and not status and any(path.is_dir() for path in paths):
        raise Refused(f"there is no procedure in {_listed(paths)}")
    put(_renderer(form)(result.findings, style=style_of(sys.stdout, os.environ)))
    return status


def _renderer(form: str) -> Callable[..., str]:
    """Import the one renderer that is needed."""
    render: Callable[..., str]
    match form:
        case "full":
            from watchglass.shell.rendering.full import render
        case "line":
            from watchglass.shell.rendering.line import render
        case _:
            from watchglass.shell.rendering.json_ import render
    return render


def _refuse_unfit(path: Path) -> None:
    """Refuse what is neither a set nor a procedure, and say what would do."""
    if path.is_dir():
        if not (path / SET_MARK).is_file():
            raise Refused(f"`{path}` {_no_set(path)}")
    elif path.suffix != ".md":
        raise Refused(f"`{path}` is no procedure: its name does not end in .md")


def _no_set(path: Path) -> str:
    if (path / SITE_MARK).is_file():
        return f"is a site: check the set it names, or `watchglass build {path}`"
    above = next((up for up in path.absolute().parents if (up / SET_MARK).is_file()), None)
    hint = f"; the set it lies in is `{_from_here(above)}`" if above else ""
    return f"is no set: it holds no {SET_MARK}{hint}"


def _from_here(path: Path) -> str:
    here = Path.cwd()
    return str(path.relative_to(here)) if path.is_relative_to(here) else str(path)


def _listed(paths: Sequence[Path]) -> str:
    return ", ".join(f"`{path}`" for path in paths)
