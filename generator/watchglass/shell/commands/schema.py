"""`watchglass schema`: the JSON Schemas of the YAML files and of the JSON outputs."""

from __future__ import annotations

# ruff: noqa: PLC0415 - the tables are imported once the call is known to be sound
from pathlib import Path

import click

from watchglass.base.findings import did_you_mean
from watchglass.shell.cli import CLEAN
from watchglass.shell.commands.verdict import Refused
from watchglass.shell.streams import put, say


@click.command()
@click.argument("name", metavar="[NAME]", required=False)
@click.option(
    "--out",
    type=click.Path(file_okay=False, path_type=Path),
    help="Write all schemas into this folder instead, as NAME.schema.json.",
)
def command(name: str | None, out: Path | None) -> int:
    """Print a JSON Schema for editors and other programs.

    NAME is that of a YAML file (laboratory, stocks, schedule, substances), of a front matter
    (procedure, page) or of an output (findings, ledger). Without it the names are listed.
    """
    from watchglass.shell.schemas import schemas, text_of, write_schemas

    if out is not None:
        if name is not None:
            raise Refused("give a NAME, or `--out` for all of them")
        try:
            written = write_schemas(out)
        except OSError as error:
            raise Refused(f"`{out}` cannot be written ({error.strerror})") from error
        say("".join(f"{path}\n" for path in written))
        return CLEAN
    made = schemas()
    if name is None:
        put("".join(f"{known:<12} {schema['title']}\n" for known, schema in made.items()))
        return CLEAN
    if name not in made:
        hint = did_you_mean(name, made)
        raise Refused(f"there is no schema `{name}`; " + (hint or "`watchglass schema` lists them"))
    put(text_of(made[name]))
    return CLEAN
