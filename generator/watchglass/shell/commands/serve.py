"""`watchglass serve`: a preview of a site that follows its files."""

from __future__ import annotations

from pathlib import Path

import click

from watchglass.shell.cli import CLEAN
from watchglass.shell.commands.verdict import Refused

SITE_MARK = "mkdocs.yml"
MOST_PORTS = 65535


def _address(_ctx: click.Context, param: click.Parameter, value: str) -> tuple[str, int]:
    """Part host and port."""
    host, colon, port = value.rpartition(":")
    host = host.removeprefix("[").removesuffix("]")
    if not colon or not host or not port.isdecimal() or int(port) > MOST_PORTS:
        raise click.BadParameter(
            f"`{value}` is no address; write it as in 127.0.0.1:8000", param=param
        )
    return host, int(port)


@click.command()
@click.argument(
    "site", metavar="SITE", type=click.Path(exists=True, file_okay=False, path_type=Path)
)
@click.option(
    "--edition",
    type=click.Choice(["student", "instructor"]),
    default="instructor",
    show_default=True,
    help="Which edition to show.",
)
@click.option(
    "--address",
    metavar="HOST:PORT",
    callback=_address,
    default="127.0.0.1:8000",
    show_default=True,
    help="Where to serve it; port 0 takes any that is free.",
)
@click.option("--open", "open_", is_flag=True, help="Open it in a browser.")
def command(site: Path, edition: str, address: tuple[str, int], *, open_: bool) -> int:
    """Show a site in a browser as it is written.

    SITE is a folder whose mkdocs.yml names the set. The pages are built anew whenever a file of the
    set or of the site changes, and the browser follows. While the set holds errors the last good
    pages stay, and the findings stand at the top of each. Nothing is written into the site.

    Ctrl-C ends it. Exit status: 0 when it was ended so, 2 if the call cannot be understood or the
    address cannot be had.
    """
    if not (site / SITE_MARK).is_file():
        raise Refused(f"`{site}` is no site: it holds no {SITE_MARK}")
    from watchglass.shell.site.preview import (  # noqa: PLC0415 - once the call is sound
        serve_site,
    )

    host, port = address
    serve_site(site, edition=edition, host=host, port=port, open_in_browser=open_)
    return CLEAN
