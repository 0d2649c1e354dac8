"""The commands: one module each, imported only when its command is called.

`TABLE` is the list of them, in the order that help shows. Its summaries stand here and not with
the commands, so that help can be printed without importing any; a test holds the two equal.
"""

from __future__ import annotations

from dataclasses import dataclass
from importlib import import_module
from typing import TYPE_CHECKING

import click

from watchglass import __version__
from watchglass.base.findings import did_you_mean
from watchglass.shell.cli import USAGE
from watchglass.shell.rendering.cells import visible
from watchglass.shell.streams import say

if TYPE_CHECKING:
    from collections.abc import Sequence

WIDTH = 80
"""Columns of all help texts; fixed, so that one text can be kept ready (`help_text`)."""


@dataclass(frozen=True, slots=True)
class Entry:
    """A command: its name, the module that holds it as `command`, and one line on what it does."""

    name: str
    module: str
    summary: str


TABLE: tuple[Entry, ...] = (
    Entry("check", "watchglass.shell.commands.check", "Judge procedures and say what is wrong."),
    Entry("build", "watchglass.shell.commands.build", "Build the handbook of a site."),
    Entry("serve", "watchglass.shell.commands.serve", "Show a site in a browser as it is written."),
    Entry(
        "ledger",
        "watchglass.shell.commands.ledger",
        "Show what every vessel holds after every step.",
    ),
    Entry("reckon", "watchglass.shell.commands.reckon", "Work out expressions of the notation."),
    Entry("new", "watchglass.shell.commands.new", "Write a small set and its site to begin with."),
    Entry(
        "schema",
        "watchglass.shell.commands.schema",
        "Print a JSON Schema for editors and other programs.",
    ),
    Entry("explain", "watchglass.shell.commands.explain", "Say what a finding means."),
)
_BY_NAME = {entry.name: entry for entry in TABLE}


class _Commands(click.Group):
    """The group of all commands; a command's module is imported when the command is called."""

    def list_commands(self, ctx: click.Context) -> list[str]:  # noqa: ARG002 - click's own shape
        """Give the names in the order of the table."""
        return list(_BY_NAME)

    def get_command(self, ctx: click.Context, cmd_name: str) -> click.Command | None:
        """Import a command; where there is none, say which may have been meant."""
        entry = _BY_NAME.get(cmd_name)
        if entry is None:
            if cmd_name.startswith("-"):
                return None
            hint = did_you_mean(cmd_name, _BY_NAME)
            raise click.UsageError(
                f"there is no command `{cmd_name}`" + (f"; {hint}" if hint else ""), ctx
            )
        command: click.Command = import_module(entry.module).command
        return command

    def format_commands(
        self,
        ctx: click.Context,  # noqa: ARG002 - click's own shape
        formatter: click.HelpFormatter,
    ) -> None:
        """List the commands from the table, so that none is imported for it."""
        with formatter.section("Commands"):
            formatter.write_dl([(entry.name, entry.summary) for entry in TABLE])


root = _Commands(
    name="watchglass",
    help="Check laboratory procedures and publish them as a handbook.",
    epilog="`watchglass COMMAND --help` tells more about a command.",
    context_settings={
        "help_option_names": ["-h", "--help"],
        "terminal_width": WIDTH,
        "max_content_width": WIDTH,
    },
)
click.version_option(__version__, prog_name="watchglass", message="%(prog)s %(version)s")(root)


def run(arguments: Sequence[str]) -> int:
    """Run a command and give its exit status; a call that cannot be understood is 2.

    Click's own `main` is passed by: it turns a stop from the keyboard and a broken pipe into
    endings of its own, and ours are told apart in `cli`.
    """
    try:
        with root.make_context("watchglass", list(arguments)) as context:
            status: int = root.invoke(context)
            return status
    except click.exceptions.Exit as ending:
        return ending.exit_code
    except click.ClickException as error:
        usage = ""
        if isinstance(error, click.UsageError) and error.ctx is not None:
            usage = error.ctx.get_usage() + "\n"
        say(f"{usage}{visible(error.format_message(), lines=True)}\n")
        return USAGE
