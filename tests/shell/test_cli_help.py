"""Help and version, which are answered without importing click."""

from __future__ import annotations

import click
import pytest

from shell.cli_runner import run
from watchglass import __version__
from watchglass.shell import help_text
from watchglass.shell.cli import main
from watchglass.shell.commands import TABLE, root
from watchglass.shell.commands import run as run_by_click


def test_help_kept_ready_is_what_click_prints(capsys: pytest.CaptureFixture[str]) -> None:
    assert run_by_click(["--help"]) == 0

    made = capsys.readouterr().out
    assert made == help_text.HELP, f"put this into shell/help_text.py:\n{made}"


def test_version_kept_ready_is_what_click_prints(capsys: pytest.CaptureFixture[str]) -> None:
    assert run_by_click(["--version"]) == 0
    assert capsys.readouterr().out == help_text.VERSION == f"watchglass {__version__}\n"


def test_help_can_be_shown_anywhere() -> None:
    assert help_text.HELP.isascii()
    assert max(map(len, help_text.HELP.split("\n"))) <= 80


@pytest.mark.parametrize(
    ("arguments", "status", "out", "err"),
    [
        ([], 2, "", help_text.HELP),
        (["-h"], 0, help_text.HELP, ""),
        (["--help"], 0, help_text.HELP, ""),
        (["--version"], 0, help_text.VERSION, ""),
    ],
)
def test_what_is_asked_for_goes_to_standard_output(
    capsys: pytest.CaptureFixture[str], arguments: list[str], status: int, out: str, err: str
) -> None:
    assert main(arguments) == status
    assert capsys.readouterr() == (out, err)


@pytest.mark.parametrize("arguments", [[], ["-h"], ["--help"], ["--version"]])
def test_help_and_version_import_next_to_nothing(arguments: list[str]) -> None:
    code = (
        "import sys; before = set(sys.modules); from watchglass.shell.cli import main; "
        "main(sys.argv[1:]); print(sorted(set(sys.modules) - before), file=sys.stderr)"
    )

    loaded = run("-c", code, *arguments).stderr.rpartition("\n[")[2] or ""

    assert set(loaded.split("'")[1::2]) <= {
        "__future__",
        "watchglass",
        "watchglass.shell",
        "watchglass.shell.cli",
        "watchglass.shell.help_text",
    }


@pytest.mark.parametrize("entry", TABLE, ids=[entry.name for entry in TABLE])
def test_summary_in_the_table_is_the_command_s_own(entry: object) -> None:
    name, summary = entry.name, entry.summary  # type: ignore[attr-defined]
    context = click.Context(root, info_name="watchglass")
    command = root.get_command(context, name)

    assert command is not None
    assert command.name in {name, "command"}
    assert (command.help or "").partition("\n")[0] == summary


@pytest.mark.parametrize("name", [entry.name for entry in TABLE])
def test_help_of_a_command_is_80_columns_wide_everywhere(
    capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch, name: str
) -> None:
    monkeypatch.setenv("COLUMNS", "200")

    assert main([name, "--help"]) == 0

    out = capsys.readouterr().out
    assert out.startswith(f"Usage: watchglass {name} ")
    assert 60 < max(map(len, out.split("\n"))) <= 80
