"""How the program ends when things go otherwise, and what its streams can bear."""

from __future__ import annotations

import io
import os
import subprocess
import sys
from typing import TYPE_CHECKING

import pytest

import watchglass
from shell.cli_runner import ROOT, WITH_FAKE_PIPELINE, replace_module, run
from watchglass.shell.cli import main
from watchglass.shell.streams import style_of

if TYPE_CHECKING:
    from collections.abc import Callable
    from pathlib import Path

PIPELINE = "watchglass.shell.pipeline"
TO_THE_END = WITH_FAKE_PIPELINE + "\nsys.exit(status)\n"


@pytest.fixture
def draft(tmp_path: Path) -> str:
    """Give the path of a procedure."""
    path = tmp_path / "a.md"
    path.write_text("1. Stir.\n")
    return str(path)


def failing(error: BaseException) -> Callable[..., object]:
    """Make a stage that raises."""

    def check_paths(_paths: object, *, scale: float | None = None) -> object:
        del scale
        raise error

    return check_paths


def test_fault_of_ours_ends_with_3_and_one_calm_message(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], draft: str
) -> None:
    monkeypatch.delenv("WATCHGLASS_TRACEBACK", raising=False)
    replace_module(monkeypatch, PIPELINE, check_paths=failing(KeyError("acid")))

    assert main(["check", draft]) == 3

    out, err = capsys.readouterr()
    assert out == ""
    assert err.startswith(
        f"watchglass {watchglass.__version__} came upon a fault of its own: "
        "KeyError at watchglass/shell/commands/check.py:"
    )
    assert "Please report it" in err
    assert "Traceback" not in err


def test_traceback_is_shown_if_asked_for(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], draft: str
) -> None:
    monkeypatch.setenv("WATCHGLASS_TRACEBACK", "1")
    replace_module(monkeypatch, PIPELINE, check_paths=failing(KeyError("acid")))

    assert main(["check", draft]) == 3
    assert "Traceback (most recent call last)" in capsys.readouterr().err


@pytest.mark.parametrize(
    ("error", "status"),
    [(KeyboardInterrupt(), 130), (EOFError(), 3), (BrokenPipeError(), 3), (RecursionError(), 3)],
    ids=["keyboard", "end of file", "pipe of a worker", "recursion"],
)
def test_status_tells_our_faults_from_a_stop(
    monkeypatch: pytest.MonkeyPatch, draft: str, error: BaseException, status: int
) -> None:
    replace_module(monkeypatch, PIPELINE, check_paths=failing(error))

    assert main(["check", draft]) == status


@pytest.mark.parametrize(
    "arguments", [["--help"], ["check", "--help"], ["explain"], ["check", "{draft}"]]
)
def test_reader_that_goes_away_is_no_fault(draft: str, arguments: list[str]) -> None:
    reading, writing = os.pipe()
    os.close(reading)
    try:
        done = subprocess.run(  # noqa: S603 - our own interpreter
            [sys.executable, "-c", TO_THE_END, *(word.format(draft=draft) for word in arguments)],
            env={**os.environ, "PYTHONPATH": ROOT},
            stdout=writing,
            stderr=subprocess.PIPE,
            check=False,
            timeout=60,
        )
    finally:
        os.close(writing)

    assert (done.returncode, done.stderr) == (141, b"")


def test_status_is_that_of_the_process(draft: str) -> None:
    assert run("-c", TO_THE_END, "check", draft).returncode == 1
    assert run("-m", "watchglass", "check").returncode == 2


@pytest.mark.parametrize("form", ["full", "line", "json"])
def test_terminal_of_ascii_gets_escapes(draft: str, form: str) -> None:
    done = run(
        "-c", TO_THE_END, "check", "--format", form, draft, PYTHONUTF8="0", PYTHONIOENCODING="ascii"
    )

    assert (done.returncode, done.stderr) == (1, "")
    assert done.stdout.isascii()
    assert {"full": "<U+2192>", "line": "<U+00B0>", "json": "\\u00b0"}[form] in done.stdout


def test_carets_still_fit_on_a_terminal_of_ascii(draft: str) -> None:
    done = run("-c", TO_THE_END, "check", draft, PYTHONUTF8="0", PYTHONIOENCODING="ascii")

    assert "   1 | {100 mL <U+2192> A\n     | ^^^^^^^^^^^^^^^^^^\n" in done.stdout


class Terminal(io.StringIO):
    """A stream that says it is a terminal."""

    def isatty(self) -> bool:
        return True


@pytest.mark.parametrize(
    ("environment", "colour"),
    [
        ({}, True),
        ({"TERM": "xterm-256color"}, True),
        ({"NO_COLOR": ""}, True),
        ({"NO_COLOR": "1"}, False),
        ({"NO_COLOR": "0"}, False),
        ({"TERM": "dumb"}, False),
    ],
)
def test_colour_is_for_terminals_that_want_it(environment: dict[str, str], *, colour: bool) -> None:
    assert style_of(Terminal(), environment).colour is colour


def test_a_file_or_pipe_gets_no_colour_and_a_fixed_width() -> None:
    style = style_of(io.StringIO(), {"TERM": "xterm"})

    assert (style.colour, style.width) == (False, 100)


LOADED = WITH_FAKE_PIPELINE + "\nprint(sorted({name.partition('.')[0] for name in sys.modules}))\n"


def test_check_imports_neither_templates_nor_site_nor_units(draft: str) -> None:
    loaded = run("-c", LOADED, "check", draft).stdout.rpartition("\n[")[2]

    assert "'click'" in loaded
    assert not {"jinja2", "mkdocs", "pint", "json", "markdown"} & set(loaded.split("'"))


REALLY_LOADED = """
import sys
from watchglass.shell.cli import main
main(sys.argv[1:])
print(sorted({name.partition('.')[0] for name in sys.modules}))
"""


def test_the_stages_import_neither_templates_nor_site_nor_units(draft: str) -> None:
    pytest.importorskip(PIPELINE)

    done = run("-c", REALLY_LOADED, "check", draft)

    assert not {"jinja2", "mkdocs", "pint", "markdown"} & set(done.stdout.split("'"))
    assert "fault of its own" not in done.stderr


def test_a_command_is_imported_only_when_called(draft: str) -> None:
    code = WITH_FAKE_PIPELINE + "\nprint([n for n in sys.modules if '.commands.' in n])\n"

    loaded = run("-c", code, "check", draft).stdout

    assert "watchglass.shell.commands.check" in loaded
    assert "watchglass.shell.commands.build" not in loaded
    assert "watchglass.shell.commands.explain" not in loaded
