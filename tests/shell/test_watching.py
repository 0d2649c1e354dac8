"""What counts as a change, and `check --watch` from the outside."""

from __future__ import annotations

import os
import pty
import select
import shutil
import signal
import subprocess
import sys
import threading
from contextlib import contextmanager
from typing import TYPE_CHECKING

import pytest

from watchglass.shell.watching import Watch, seen

if TYPE_CHECKING:
    from collections.abc import Iterator
    from pathlib import Path

SOUND = "---\ntitle: A\ncode: A-1\nmaterials: {water: water}\nvessels: {A: beaker 50 mL}\n---\n\n1. Put {5 mL water -> A} into {A}.\n"
FAULTY = SOUND.replace("water ->", "watre ->")
RULE = "-" * 28
CLEAR = "\x1b[2J"


# ---------------------------------------------------------------- what counts as a change


def test_saved_file_is_a_change(tmp_path: Path) -> None:
    (tmp_path / "a.md").write_text("x")
    watch = Watch([tmp_path])
    (tmp_path / "a.md").write_text("longer")

    assert watch.changed()


def test_save_of_the_same_length_is_a_change(tmp_path: Path) -> None:
    file = tmp_path / "a.md"
    file.write_text("x")
    watch = Watch([file])
    file.write_text("y")
    os.utime(file, ns=(0, 1))

    assert watch.changed()


def test_new_file_in_a_new_folder_is_a_change(tmp_path: Path) -> None:
    watch = Watch([tmp_path])
    (tmp_path / "procedures").mkdir()
    (tmp_path / "procedures" / "b.md").write_text("y")

    assert watch.changed()


def test_deleted_file_is_a_change(tmp_path: Path) -> None:
    (tmp_path / "b.yml").write_text("y")
    watch = Watch([tmp_path])
    (tmp_path / "b.yml").unlink()

    assert watch.changed()


def test_picture_is_a_change_since_procedures_show_it(tmp_path: Path) -> None:
    watch = Watch([tmp_path])
    (tmp_path / "flask.svg").write_text("x")

    assert watch.changed()


@pytest.mark.parametrize("name", [".a.md.swp", "a.md~", ".git/index"])
def test_what_editors_leave_is_no_change(tmp_path: Path, name: str) -> None:
    watch = Watch([tmp_path])
    (tmp_path / name).parent.mkdir(exist_ok=True)
    (tmp_path / name).write_text("x")

    assert not watch.changed()


def test_change_is_given_once(tmp_path: Path) -> None:
    watch = Watch([tmp_path])
    (tmp_path / "a.md").write_text("x")

    assert [watch.changed(), watch.changed()] == [True, False]


def test_change_before_the_first_look_is_not_missed(tmp_path: Path) -> None:
    """A file may be saved while the first check still runs."""
    file = tmp_path / "a.md"
    file.write_text("x")
    watch = Watch([file])
    file.write_text("saved meanwhile")

    watch.wait(pause=0.0)


def test_stocks_of_the_set_around_a_single_file_count(tmp_path: Path) -> None:
    (tmp_path / "laboratory.yml").write_text("name: A\n")
    (tmp_path / "procedures").mkdir()
    draft = tmp_path / "procedures" / "a.md"
    draft.write_text(SOUND)
    watch = Watch([draft])
    (tmp_path / "stocks.yml").write_text("brine: {material: saturated sodium chloride}\n")

    assert watch.changed()


def test_other_procedures_around_a_single_file_do_not_count(tmp_path: Path) -> None:
    (tmp_path / "laboratory.yml").write_text("name: A\n")
    draft = tmp_path / "a.md"
    draft.write_text(SOUND)
    watch = Watch([draft])
    (tmp_path / "b.md").write_text(SOUND)

    assert not watch.changed()


def test_folder_that_links_to_itself_is_looked_through_once(tmp_path: Path) -> None:
    (tmp_path / "a.md").write_text("x")
    (tmp_path / "again").symlink_to(tmp_path)

    assert [name for name in seen([tmp_path]) if name.endswith(".md")] == [str(tmp_path / "a.md")]


def test_file_that_is_not_there_is_not_seen(tmp_path: Path) -> None:
    assert seen([tmp_path / "a.md"]) == {}


# ---------------------------------------------------------------- the command from outside


@contextmanager
def watching(*arguments: str, **streams: object) -> Iterator[subprocess.Popen[str]]:
    """Run `check --watch` until the block ends; what hangs is ended after a minute."""
    process = subprocess.Popen(  # noqa: S603 - our own interpreter
        [sys.executable, "-m", "watchglass", "check", "--watch", *arguments],
        **{"stdout": subprocess.PIPE, "stderr": subprocess.PIPE, **streams},  # type: ignore[call-overload]
        text=True,
    )
    last = threading.Timer(60, process.kill)
    last.start()
    try:
        yield process
    finally:
        last.cancel()
        process.kill()
        process.wait()
        for stream in (process.stdout, process.stderr):
            if stream is not None:
                stream.close()


def save(file: Path, text: str) -> None:
    """Save at one stroke, so that a look between two writes does not count as a check."""
    hidden = file.with_name(".saving")
    hidden.write_text(text)
    hidden.replace(file)


def heard(process: subprocess.Popen[str]) -> str:
    """Read on standard error up to the line that says it is watching; give what came before."""
    assert process.stderr is not None
    lines: list[str] = []
    while True:
        line = process.stderr.readline()
        if not line:
            pytest.fail("it ended: " + "".join(lines))
        if line.startswith("watching"):
            return "".join(lines)
        lines.append(line)


def stopped(process: subprocess.Popen[str]) -> tuple[int, str]:
    """Press Ctrl-C; give the status and the rest of standard output."""
    process.send_signal(signal.SIGINT)
    rest, _ = process.communicate()
    return process.returncode, rest


def test_each_save_is_checked_and_the_last_status_stays(tmp_path: Path) -> None:
    draft = tmp_path / "a.md"
    draft.write_text(SOUND)
    with watching("--format", "line", str(draft)) as process:
        heard(process)
        save(draft, FAULTY)
        heard(process)
        status, printed = stopped(process)

    assert status == 1
    assert printed.startswith(f"{RULE} check 2\n{draft.as_posix()}:8:14: error[N163 ")
    assert CLEAR not in printed


def test_mended_draft_ends_clean(tmp_path: Path) -> None:
    draft = tmp_path / "a.md"
    draft.write_text(FAULTY)
    with watching(str(draft)) as process:
        heard(process)
        save(draft, SOUND)
        heard(process)
        status, printed = stopped(process)

    assert status == 0
    assert printed.endswith(f"1 error in 1 file\n{RULE} check 2\n")


def test_half_written_file_is_another_check(tmp_path: Path) -> None:
    draft = tmp_path / "a.md"
    draft.write_text(SOUND)
    with watching("--format", "line", str(draft)) as process:
        heard(process)
        save(draft, SOUND[:40])
        heard(process)
        save(draft, SOUND)
        heard(process)
        status, printed = stopped(process)

    assert status == 0
    assert f"{RULE} check 2\n{draft.as_posix()}:" in printed
    assert printed.endswith(f"{RULE} check 3\n")


def test_deleted_draft_is_said_and_waited_for(tmp_path: Path) -> None:
    draft = tmp_path / "a.md"
    draft.write_text(SOUND)
    with watching(str(draft)) as process:
        heard(process)
        draft.unlink()
        said = heard(process)
        save(draft, FAULTY)
        heard(process)
        status, _ = stopped(process)

    assert said == f"`{draft}` is not there any more\n"
    assert status == 1


def test_new_procedure_of_a_set_is_checked(tmp_path: Path) -> None:
    (tmp_path / "laboratory.yml").write_text("name: A\n")
    (tmp_path / "procedures").mkdir()
    (tmp_path / "procedures" / "a.md").write_text(SOUND)
    with watching("--format", "github", str(tmp_path)) as process:
        heard(process)
        save(tmp_path / "procedures" / "b.md", FAULTY.replace("A-1", "B-1"))
        heard(process)
        status, printed = stopped(process)

    assert status == 1
    assert "::error file=" in printed


def test_set_that_lost_its_folder_is_said(tmp_path: Path) -> None:
    root = tmp_path / "set"
    (root / "procedures").mkdir(parents=True)
    (root / "laboratory.yml").write_text("name: A\n")
    (root / "procedures" / "a.md").write_text(SOUND)
    with watching(str(root)) as process:
        heard(process)
        shutil.rmtree(root)
        said = heard(process)

    assert "is no set" in said or "not there any more" in said


def read_up_to(terminal: int, last: str) -> str:
    """Read what comes on a terminal, in as many pieces as it comes in, up to some words."""
    printed = b""
    while last.encode() not in printed and select.select([terminal], [], [], 20)[0]:
        printed += os.read(terminal, 100_000)
    return printed.decode()


def test_terminal_is_cleared_before_each_new_check(tmp_path: Path) -> None:
    draft = tmp_path / "a.md"
    draft.write_text(FAULTY)
    ours, theirs = pty.openpty()
    try:
        with watching(str(draft), stdout=theirs) as process:
            heard(process)
            save(draft, FAULTY + "\n")
            heard(process)
            printed = read_up_to(ours, f"{RULE} check 2")
    finally:
        os.close(ours)
        os.close(theirs)

    assert printed.count(CLEAR) == 1
    assert printed.index("N163") < printed.index(CLEAR) < printed.index(f"{RULE} check 2")


@pytest.mark.parametrize("form", ["json", "sarif"])
def test_documents_are_not_printed_again_and_again(tmp_path: Path, form: str) -> None:
    draft = tmp_path / "a.md"
    draft.write_text(SOUND)
    with watching("--format", form, str(draft)) as process:
        printed, said = process.communicate()

    assert (process.returncode, printed) == (2, "")
    assert f"{form} is one document" in said
