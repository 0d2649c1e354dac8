"""What counts as a change, and `check --watch` from the outside."""

from __future__ import annotations

import os
import signal
import subprocess
import sys
import time
from typing import TYPE_CHECKING

from watchglass.shell.watching import changes, seen

if TYPE_CHECKING:
    from pathlib import Path

SOUND = "---\ntitle: A\ncode: A-1\nmaterials: {water: water}\nvessels: {A: beaker 50 mL}\n---\n\n1. Put {5 mL water -> A} into {A}.\n"


def test_saved_new_and_deleted_files_are_changes(tmp_path: Path) -> None:
    (tmp_path / "a.md").write_text("x")
    first = seen([tmp_path])
    (tmp_path / "b.yml").write_text("y")
    second = seen([tmp_path])
    (tmp_path / "a.md").write_text("longer")
    third = seen([tmp_path])
    (tmp_path / "b.yml").unlink()

    assert first != second != third != seen([tmp_path])


def test_other_files_do_not_count(tmp_path: Path) -> None:
    before = seen([tmp_path])
    (tmp_path / "a.md~").write_text("x")

    assert seen([tmp_path]) == before


def test_change_is_given_once(tmp_path: Path) -> None:
    file = tmp_path / "a.md"
    file.write_text("x")
    waiting = changes((tmp_path,), pause=0.0)
    pid = os.fork()
    if pid == 0:
        time.sleep(0.05)
        file.write_text("changed")
        os._exit(0)
    next(waiting)
    os.waitpid(pid, 0)

    assert seen([tmp_path])[str(file)][1] == len("changed")


def test_watch_checks_again_on_each_save_and_ends_with_the_last_status(tmp_path: Path) -> None:
    draft = tmp_path / "a.md"
    draft.write_text(SOUND)
    environment = {**os.environ, "PYTHONUNBUFFERED": "1"}
    process = subprocess.Popen(  # noqa: S603 - our own interpreter
        [sys.executable, "-m", "watchglass", "check", "--watch", "--format", "line", str(draft)],
        stdout=subprocess.PIPE,
        stderr=subprocess.PIPE,
        text=True,
        env=environment,
    )
    try:
        assert process.stderr is not None
        assert process.stdout is not None
        assert "watching" in process.stderr.readline()
        draft.write_text(SOUND.replace("water ->", "watre ->"))
        printed = process.stdout.readline() + process.stdout.readline()
        assert "N163" in printed
        assert "watching" in process.stderr.readline()
    finally:
        process.send_signal(signal.SIGINT)
        status = process.wait(timeout=60)

    assert status == 1


def test_documents_are_not_printed_again_and_again(tmp_path: Path) -> None:
    draft = tmp_path / "a.md"
    draft.write_text(SOUND)
    done = subprocess.run(  # noqa: S603 - our own interpreter
        [sys.executable, "-m", "watchglass", "check", "--watch", "--format", "sarif", str(draft)],
        capture_output=True,
        text=True,
        check=False,
    )

    assert done.returncode == 2
    assert "one document" in done.stderr
