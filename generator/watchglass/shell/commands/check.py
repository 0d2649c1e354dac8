"""`watchglass check`: judge procedures and print what is found."""

from __future__ import annotations

# ruff: noqa: PLC0415 - the stages and renderers are imported once the call is known to be sound
import os
import sys
from pathlib import Path
from typing import TYPE_CHECKING, NamedTuple

import click

from watchglass.shell.commands.verdict import Refused, status_of
from watchglass.shell.rendering.cells import visible
from watchglass.shell.streams import put, say, style_of

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.shell.pipeline import CheckResult

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
    type=click.Choice(["full", "line", "json", "sarif", "github"]),
    default="full",
    show_default=True,
    help="full shows the lines a finding stands in, line gives each finding one line; json, sarif "
    "(2.1.0) and github (workflow commands) are for other programs.",
)
@click.option("--strict", is_flag=True, help="Let warnings fail the check too.")
@click.option(
    "--scale",
    type=click.FloatRange(min=0, min_open=True, max=1000),
    help="Judge every procedure scaled by this factor, whatever it declares.",
)
@click.option(
    "--limit",
    type=click.IntRange(min=0),
    default=200,
    show_default=True,
    help="Show no more findings than this in full; 0 for all.",
)
@click.option("--watch", is_flag=True, help="Check again each time a file is saved.")
def command(
    paths: tuple[Path, ...],
    form: str,
    scale: float | None,
    limit: int,
    *,
    strict: bool,
    watch: bool,
) -> int:
    """Judge procedures and say what is wrong.

    A PATH is a set, the folder that holds laboratory.yml, or one procedure (.md). A procedure is
    judged as part of the set it lies in; where there is none, with the shipped catalogue alone.

    A sound draft passes in silence. Exit status: 0 if there is no error, 1 if there is one, 2 if
    the call cannot be understood.
    """
    for path in paths:
        _refuse_unfit(path)
    call = _Call(paths, form, scale, limit, strict)
    if not watch:
        return _check(call)
    if form in ("json", "sarif"):
        raise Refused(
            f"--watch prints again and again, and {form} is one document; "
            "take `--format full`, `line` or `github`"
        )
    return _watch(call)


class _Call(NamedTuple):
    """What was asked for."""

    paths: tuple[Path, ...]
    form: str
    scale: float | None
    limit: int
    strict: bool


def _check(call: _Call) -> int:
    text, status = _judged(call)
    put(text)
    return status


def _judged(call: _Call) -> tuple[str, int]:
    """Check once; give what is to be printed, and the status."""
    from watchglass.shell.pipeline import check_paths

    result = check_paths(call.paths, scale=call.scale)
    status = status_of(result.findings, strict=call.strict)
    if not result.checked and not status and any(path.is_dir() for path in call.paths):
        raise Refused(f"there is no procedure in {_listed(call.paths)}")
    return _printed(call, result), status


def _printed(call: _Call, result: CheckResult) -> str:
    style = style_of(sys.stdout, os.environ)
    match call.form:
        case "full":
            from watchglass.shell.rendering import full

            return full.render(result.findings, style=style, limit=call.limit)
        case "line":
            from watchglass.shell.rendering import line

            return line.render(result.findings, style=style)
        case "github":
            from watchglass.shell.rendering import github

            return github.render(result.findings, style=style)
        case "sarif":
            from watchglass.shell.rendering import sarif

            return sarif.render(result.findings, style=style, accepted=result.accepted)
        case _:
            from watchglass.shell.rendering import json_

            return json_.render(result.findings, style=style)


def _watch(call: _Call) -> int:
    """Check, and check again on each save, until Ctrl-C; the status is the last check's."""
    from watchglass.shell.watching import Watch

    watch = Watch(call.paths)
    status = _check(call)
    count = 1
    try:
        while True:
            say("watching for changes; Ctrl-C ends\n")
            watch.wait()
            count += 1
            status = _again(call, count, status)
    except KeyboardInterrupt:
        return status


def _again(call: _Call, count: int, status: int) -> int:
    """Check once more; where that cannot be done (a file went), say why and keep the status.

    It is all worked out before anything is cleared, so that the screen does not stand empty.
    """
    refusal = ""
    try:
        for path in call.paths:
            _refuse_unfit(path)
        text, status = _judged(call)
    except (Refused, OSError) as error:
        text, refusal = "", f"{visible(str(error))}\n"
    terminal = sys.stdout.isatty() and os.environ.get("TERM") != "dumb"
    clear = "\x1b[2J\x1b[3J\x1b[H" if terminal else ""
    put(f"{clear}{'-' * 28} check {count}\n{text}")
    if refusal:
        say(refusal)
    return status


def _refuse_unfit(path: Path) -> None:
    """Refuse what is neither a set nor a procedure, and say what would do."""
    if path.is_dir():
        if not (path / SET_MARK).is_file():
            raise Refused(f"`{path}` {_no_set(path)}")
    elif not path.exists():
        raise Refused(f"`{path}` is not there any more")
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
