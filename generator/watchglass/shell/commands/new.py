"""`watchglass new`: write a small set and its site to begin with."""

from __future__ import annotations

import os
import sys
from pathlib import Path
from shlex import quote

import click

from watchglass.shell.cli import CLEAN
from watchglass.shell.rendering.cells import visible
from watchglass.shell.streams import put, style_of


@click.command()
@click.argument("folder", metavar="DIR", type=click.Path(path_type=Path))
def command(folder: Path) -> int:
    """Write a small set and its site to begin with.

    DIR is a folder that is empty or not there yet. It gets one procedure that passes the check, the
    facts of a laboratory, stock solutions, a schedule, a page, and in `site` what publishes them
    as a handbook. Change what is there to what is true of your laboratory.
    """
    from watchglass.shell.beginning import write_set  # noqa: PLC0415 - once the call is sound

    write_set(folder)
    put(
        f"watchglass check {_typed(folder)}  judges it; silence means sound\n"
        f"watchglass serve {_typed(folder / 'site')}  shows the handbook while you write\n"
        f"watchglass build {_typed(folder / 'site')}  writes both editions of it\n"
    )
    return CLEAN


def _typed(path: Path) -> str:
    """Give a path as it is typed in a shell."""
    return visible(quote(str(path)), unicode=style_of(sys.stdout, os.environ).unicode)
