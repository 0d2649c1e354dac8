"""`watchglass check`: judge procedures and print what is found."""

from __future__ import annotations

# ruff: noqa: PLC0415 - the stages and renderers are imported once the call is known to be sound
import os
import sys
from pathlib import Path
from typing import TYPE_CHECKING, NamedTuple

import click

from watchglass.shell.commands.verdict import Refused, status_of
from watchglass.shell.streams import put, say, style_of

if TYPE_CHECKING:
    from collections.abc import Callable, Sequence

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
        raise Refused(f"--watch prints again and again; {form} is one document")
    return _watch(call)


class _Call(NamedTuple):
    """What was asked for."""

    paths: tuple[Path, ...]
    form: str
    scale: float | None
    limit: int
    strict: bool


def _check(call: _Call) -> int:
    from watchglass.shell.pipeline import check_paths

    result = check_paths(call.paths, scale=call.scale)
    status = status_of(result.findings, strict=call.strict)
    if not result.checked and not status and any(path.is_dir() for path in call.paths):
        raise Refused(f"there is no procedure in {_listed(call.paths)}")
    put(_printed(call, result))
    return status


def _printed(call: _Call, result: CheckResult) -> str:
    style = style_of(sys.stdout, os.environ)
    if call.form == "sarif":
        from watchglass.shell.rendering.sarif import render

        return render(result.findings, style=style, accepted=result.accepted)
    if call.form == "full" and 0 < call.limit < len(result.findings):
        from watchglass.shell.rendering.tally import arrange

        arranged = arrange(result.findings)
        more = len(arranged) - call.limit
        if more > 0:
            text = _renderer("full")(arranged[: call.limit], style=style)
            return text + f"and {more} more findings; `--limit 0` shows all\n"
    return _renderer(call.form)(result.findings, style=style)


def _watch(call: _Call) -> int:
    """Check, and check again on each save, until Ctrl-C; the status is the last check's."""
    from watchglass.shell.watching import changes

    status = _check(call)
    told = "watching for changes; Ctrl-C ends\n"
    say(told)
    try:
        for _ in changes(call.paths):
            if sys.stdout.isatty():
                put("\x1b[2J\x1b[H")
            else:
                put("-" * 40 + "\n")
            try:
                status = _check(call)
            except (Refused, OSError) as error:  # a file went, or the folder is half written
                say(f"{error}\n")
            say(told)
    except KeyboardInterrupt:
        pass
    return status


def _renderer(form: str) -> Callable[..., str]:
    """Import the one renderer that is needed."""
    render: Callable[..., str]
    match form:
        case "full":
            from watchglass.shell.rendering.full import render
        case "line":
            from watchglass.shell.rendering.line import render
        case "github":
            from watchglass.shell.rendering.github import render
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
