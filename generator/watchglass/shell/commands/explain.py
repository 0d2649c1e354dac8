"""`watchglass explain`: print the page of one kind of finding, or the list of all."""

from __future__ import annotations

import os
import sys
from dataclasses import replace

import click

from watchglass.base import codes
from watchglass.base.findings import did_you_mean
from watchglass.shell.cli import CLEAN
from watchglass.shell.commands.verdict import Refused
from watchglass.shell.explain import LINE_WIDTH, listing, page
from watchglass.shell.streams import put, style_of


@click.command()
@click.argument("code", metavar="[CODE]", required=False)
def command(code: str | None) -> int:
    """Say what a finding means.

    CODE is the number or the name of a finding, as `check` prints them. Without it all findings
    there are get listed.
    """
    style = style_of(sys.stdout, os.environ)
    style = replace(style, width=min(style.width, LINE_WIDTH))
    if code is None:
        put(listing(style=style))
        return CLEAN
    found = codes.find(code) or codes.find(code.lower())
    if found is None:
        hint = did_you_mean(code, codes.words())
        raise Refused(
            f"no finding is called `{code}`; "
            + (hint or "`watchglass explain` lists all there are")
        )
    put(page(found, style=style))
    return CLEAN
