"""`watchglass build`: judge a site's set and build its handbook."""

from __future__ import annotations

# ruff: noqa: PLC0415 - the site's host is imported once the call is known to be sound
import os
import sys
from pathlib import Path
from typing import TYPE_CHECKING

import click

from watchglass.shell.cli import FOUND
from watchglass.shell.commands.verdict import Refused, status_of
from watchglass.shell.rendering.cells import visible
from watchglass.shell.rendering.full import render
from watchglass.shell.streams import put, say, style_of

if TYPE_CHECKING:
    from collections.abc import Iterator, Sequence

EDITIONS = ("student", "instructor")
SITE_MARK = "mkdocs.yml"


@click.command()
@click.argument(
    "site", metavar="SITE", type=click.Path(exists=True, file_okay=False, path_type=Path)
)
@click.option(
    "--edition",
    type=click.Choice([*EDITIONS, "both"]),
    default="both",
    show_default=True,
    help="Which edition to build.",
)
@click.option(
    "--out",
    metavar="DIR",
    type=click.Path(file_okay=False, path_type=Path),
    help="Folder to build in; by default the one the site names.",
)
@click.option(
    "--scale",
    type=click.FloatRange(min=0, min_open=True, max=1000),
    help="Scale every procedure by this factor, whatever it declares.",
)
@click.option("--strict", is_flag=True, help="Let warnings stop the build too.")
def command(
    site: Path, edition: str, out: Path | None, scale: float | None, *, strict: bool
) -> int:
    """Build the handbook of a site.

    SITE is a folder whose mkdocs.yml names the set. Its procedures are judged first; nothing is
    built while they hold errors. Findings go to standard error, the place of each edition to
    standard output.

    Exit status: 0 if the handbook was built, 1 if it was not, 2 if the call cannot be understood.
    """
    if not (site / SITE_MARK).is_file():
        raise Refused(f"`{site}` is no site: it holds no {SITE_MARK}")
    from watchglass.shell.site.build import build_site

    editions = EDITIONS if edition == "both" else (edition,)
    result = build_site(site, editions=editions, out=out, scale=scale, strict=strict)
    style = style_of(sys.stderr, os.environ)
    said = render(result.findings, style=style)
    if said:
        say(said)
    status = status_of(result.findings, strict=strict)
    if result.failed:
        say(style.strong("the handbook was not built") + "\n")
        return FOUND
    put("".join(f"{line}\n" for line in _places(editions, result.written)))
    return status


def _places(editions: Sequence[str], written: Sequence[Path]) -> Iterator[str]:
    """Say where each edition can be opened: as a path, and as an address for a browser."""
    wide = max(map(len, editions))
    unicode = style_of(sys.stdout, os.environ).unicode
    for edition, page in zip(editions, written, strict=True):
        yield f"{edition:<{wide}}  {visible(str(page), unicode=unicode)}"
        yield f"{'':<{wide}}  {page.absolute().as_uri()}"
