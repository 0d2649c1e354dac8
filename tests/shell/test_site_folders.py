"""Building beside and swapping in: what is ours is replaced whole, what is not is left alone."""

from __future__ import annotations

import json
import os
from pathlib import Path

import pytest

from shell.site_builder import digest
from watchglass.shell.site.folders import MARKER, FolderRefused, remove, stage, swap

DEAD = 2**22 + 1
"""A number no process can have here: beyond the largest that Linux gives."""


def built(target: Path, text: str, edition: str = "student") -> Path:
    """Stage a folder with one page in it."""
    building = stage(target, edition)
    (building / "index.html").write_text(text)
    return building


def published(target: Path, text: str, edition: str = "student") -> None:
    swap([(built(target, text, edition), target)])


def names(folder: Path) -> list[str]:
    return sorted(path.name for path in folder.iterdir())


def page(target: Path) -> str:
    return (target / "index.html").read_text()


def test_new_site_takes_its_place_and_leaves_nothing_beside(tmp_path: Path) -> None:
    target = tmp_path / "deep" / "student"

    published(target, "one")
    published(target, "two")

    assert page(target) == "two"
    assert names(target.parent) == ["student"]
    assert json.loads((target / MARKER).read_text()) == {
        "tool": "watchglass", "edition": "student", "format": 1,
    }  # fmt: skip


def test_empty_folder_may_be_built_in(tmp_path: Path) -> None:
    target = tmp_path / "student"
    target.mkdir()

    published(target, "one")

    assert page(target) == "one"
    assert names(tmp_path) == ["student"]


def _with_file(target: Path) -> None:
    target.mkdir()
    (target / "thesis.txt").write_text("years of work")


def _with_foreign_marker(target: Path) -> None:
    _with_file(target)
    (target / MARKER).write_text('{"tool": "another"}')


def _with_broken_marker(target: Path) -> None:
    _with_file(target)
    (target / MARKER).write_text("{")


def _with_linked_marker(target: Path) -> None:
    _with_file(target)
    real = target.parent / "real"
    real.write_text('{"tool": "watchglass", "edition": "student"}')
    (target / MARKER).symlink_to(real)


def _as_file(target: Path) -> None:
    target.write_text("a file")


def _as_link(target: Path) -> None:
    real = target.parent / "elsewhere"
    published(real, "one")
    target.symlink_to(real, target_is_directory=True)


def _as_dangling_link(target: Path) -> None:
    target.symlink_to(target.parent / "nowhere")


@pytest.mark.parametrize(
    ("make", "said"),
    [
        (_with_file, "holds files that were not built by watchglass"),
        (_with_foreign_marker, "holds files that were not built by watchglass"),
        (_with_broken_marker, "holds files that were not built by watchglass"),
        (_with_linked_marker, "holds files that were not built by watchglass"),
        (_as_file, "is a file"),
        (_as_link, "is a symbolic link"),
        (_as_dangling_link, "is a symbolic link"),
    ],
)
def test_what_is_not_ours_is_refused_and_untouched(tmp_path: Path, make: object, said: str) -> None:
    target = tmp_path / "student"
    assert callable(make)
    make(target)
    before = digest(tmp_path)

    with pytest.raises(FolderRefused, match=said):
        stage(target, "student")

    assert digest(tmp_path) == before


def test_instructor_edition_is_not_put_where_students_look(tmp_path: Path) -> None:
    target = tmp_path / "public"
    published(target, "for students")

    with pytest.raises(FolderRefused, match="holds the student edition"):
        stage(target, "instructor")

    assert page(target) == "for students"


def test_folder_without_our_marker_is_never_removed(tmp_path: Path) -> None:
    _with_file(tmp_path / "mine")

    remove(tmp_path / "mine")

    assert (tmp_path / "mine" / "thesis.txt").exists()


def test_what_a_killed_build_left_is_cleared(tmp_path: Path) -> None:
    target = tmp_path / "student"
    published(target, "one")
    built(target, "half").rename(tmp_path / f".student.building-{DEAD}")

    remove(stage(target, "student"))

    assert names(tmp_path) == ["student"]
    assert page(target) == "one"


def test_what_a_running_build_makes_is_left_alone(tmp_path: Path) -> None:
    target = tmp_path / "student"
    other = tmp_path / f".student.building-{os.getppid()}"
    built(target, "half").rename(other)

    remove(stage(target, "student"))

    assert page(other) == "half"


def test_lookalike_without_marker_is_left_alone(tmp_path: Path) -> None:
    _with_file(tmp_path / f".student.building-{DEAD}")

    remove(stage(tmp_path / "student", "student"))

    assert (tmp_path / f".student.building-{DEAD}" / "thesis.txt").exists()


def test_site_that_a_killed_swap_moved_aside_is_put_back(tmp_path: Path) -> None:
    target = tmp_path / "student"
    published(target, "one")
    target.rename(tmp_path / f".student.before-{DEAD}")

    remove(stage(target, "student"))

    assert page(target) == "one"
    assert names(tmp_path) == ["student"]


@pytest.mark.parametrize("error", [OSError, KeyboardInterrupt, SystemExit])
@pytest.mark.parametrize("fails_at", [1, 2, 3, 4])
def test_swap_that_fails_puts_every_site_back(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, fails_at: int, error: type[BaseException]
) -> None:
    targets = [tmp_path / "student", tmp_path / "instructor"]
    for target in targets:
        published(target, "good", target.name)
    before = {target.name: digest(target) for target in targets}
    pairs = [(built(target, "new", target.name), target) for target in targets]
    rename, calls = Path.rename, 0

    def failing(self: Path, target: Path) -> Path:
        nonlocal calls
        calls += 1
        if calls == fails_at:
            raise error
        return rename(self, target)

    monkeypatch.setattr(Path, "rename", failing)
    with pytest.raises(error):
        swap(pairs)
    monkeypatch.undo()

    assert {target.name: digest(target) for target in targets} == before
    assert [page(building) for building, _ in pairs] == ["new", "new"]


def test_folder_that_cannot_be_written_beside_is_refused(tmp_path: Path) -> None:
    (tmp_path / "file").write_text("x")

    with pytest.raises(FolderRefused, match="cannot be written to"):
        stage(tmp_path / "file" / "student", "student")
