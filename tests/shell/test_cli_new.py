"""`watchglass new`: a set that is sound and builds, or nothing."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from shell.site_builder import digest
from watchglass.shell import beginning
from watchglass.shell.cli import main
from watchglass.shell.pipeline import analyse_set
from watchglass.shell.schemas import schemas as schemas_by_name

if TYPE_CHECKING:
    from pathlib import Path


def written(folder: Path) -> list[str]:
    return sorted(p.relative_to(folder).as_posix() for p in folder.rglob("*") if p.is_file())


def test_new_set_is_checked_in_silence(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["new", str(tmp_path / "set")]) == 0
    capsys.readouterr()

    assert main(["check", "--strict", str(tmp_path / "set")]) == 0
    assert capsys.readouterr() == ("", "")


def test_new_set_gives_no_note_either(tmp_path: Path) -> None:
    main(["new", str(tmp_path / "set")])

    analysis = analyse_set(tmp_path / "set")

    assert analysis.findings == ()
    assert [entry.procedure.head.code for entry in analysis.procedures] == ["FL-01"]
    assert analysis.procedures[0].run is not None


def test_new_site_builds_both_editions_without_a_word(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    main(["new", str(tmp_path / "set")])
    capsys.readouterr()

    assert main(["build", "--strict", str(tmp_path / "set/site")]) == 0

    assert capsys.readouterr().err == ""
    for edition in ("student", "instructor"):
        page = tmp_path / f"set/site/public/{edition}/procedures/fl-01.html"
        assert "How sour is vinegar?" in page.read_text("utf-8")


def test_set_is_still_sound_beside_what_was_built_in_it(tmp_path: Path) -> None:
    main(["new", str(tmp_path / "set")])
    main(["build", str(tmp_path / "set/site")])

    assert analyse_set(tmp_path / "set").findings == ()


def test_files_that_a_beginner_needs_are_all_there(tmp_path: Path) -> None:
    main(["new", str(tmp_path / "set")])

    schemas = [f"schemas/{name}.schema.json" for name in sorted(schemas_by_name())]
    assert [path for path in written(tmp_path / "set") if path not in schemas] == [
        "laboratory.yml",
        "pages/welcome.md",
        "procedures/fl-01.md",
        "schedule.yml",
        "site/docs/about.md",
        "site/mkdocs.yml",
        "stocks.yml",
    ]
    assert [p.name for p in tmp_path.iterdir()] == ["set"]


def test_what_to_do_next_is_said_in_three_lines(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["new", str(tmp_path / "my set")]) == 0

    lines = capsys.readouterr().out.splitlines()
    assert [" ".join(line.split()[:2]) for line in lines] == [
        "watchglass check",
        "watchglass serve",
        "watchglass build",
    ]
    assert f"'{tmp_path / 'my set'}'" in lines[0]
    assert f"'{tmp_path / 'my set' / 'site'}'" in lines[1]


def test_folder_that_holds_something_is_refused_and_kept(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    (tmp_path / "mine").mkdir()
    (tmp_path / "mine/notes.txt").write_text("x")
    before = digest(tmp_path)

    assert main(["new", str(tmp_path / "mine")]) == 2

    assert "holds files already" in capsys.readouterr().err
    assert digest(tmp_path) == before


def test_file_is_refused(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (tmp_path / "mine").write_text("x")

    assert main(["new", str(tmp_path / "mine")]) == 2
    assert "is a file" in capsys.readouterr().err
    assert (tmp_path / "mine").read_text() == "x"


def test_link_is_refused(tmp_path: Path) -> None:
    (tmp_path / "real").mkdir()
    (tmp_path / "link").symlink_to(tmp_path / "real")

    assert main(["new", str(tmp_path / "link")]) == 2
    assert list((tmp_path / "real").iterdir()) == []


def test_empty_folder_that_one_stands_in_is_filled_and_stays_the_same(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    (tmp_path / "here").mkdir()
    monkeypatch.chdir(tmp_path / "here")
    same = (tmp_path / "here").stat().st_ino

    assert main(["new", "."]) == 0

    assert (tmp_path / "here").stat().st_ino == same
    assert "procedures/fl-01.md" in written(tmp_path / "here")


def test_folders_above_are_made(tmp_path: Path) -> None:
    assert main(["new", str(tmp_path / "a/b/set")]) == 0
    assert (tmp_path / "a/b/set/laboratory.yml").is_file()


def test_set_can_be_written_to_though_the_package_cannot(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    origin = tmp_path / "origin"
    origin.mkdir()
    (origin / "laboratory.yml").write_text("name: X\n")
    (origin / "laboratory.yml").chmod(0o444)
    monkeypatch.setattr(beginning, "BEGINNINGS", origin)

    main(["new", str(tmp_path / "set")])

    assert (tmp_path / "set/laboratory.yml").stat().st_mode & 0o200


@pytest.mark.parametrize("there", [False, True], ids=["new folder", "empty folder"])
def test_write_that_fails_leaves_nothing(
    tmp_path: Path,
    monkeypatch: pytest.MonkeyPatch,
    capsys: pytest.CaptureFixture[str],
    *,
    there: bool,
) -> None:
    origin = tmp_path / "origin"
    (origin / "a").mkdir(parents=True)
    (origin / "a/one.md").write_text("x")
    monkeypatch.setattr(beginning, "BEGINNINGS", origin)
    monkeypatch.setattr(type(origin), "read_bytes", _full_disk)
    if there:
        (tmp_path / "set").mkdir()

    assert main(["new", str(tmp_path / "set")]) == 2

    assert "cannot be written (No space left" in capsys.readouterr().err
    assert sorted(p.name for p in tmp_path.iterdir()) == ["origin", *(["set"] if there else [])]
    assert not there or list((tmp_path / "set").iterdir()) == []


def _full_disk(_path: Path) -> bytes:
    raise OSError(28, "No space left on device")


def test_move_that_fails_half_way_empties_the_folder_again(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    (tmp_path / "set").mkdir()
    rename = type(tmp_path).rename

    def fails_at_schedule(path: Path, target: Path) -> Path:
        if path.name == "schedule.yml":
            raise OSError(5, "Input/output error")
        return rename(path, target)

    monkeypatch.setattr(type(tmp_path), "rename", fails_at_schedule)

    assert main(["new", str(tmp_path / "set")]) == 2

    assert list((tmp_path / "set").iterdir()) == []
    assert [p.name for p in tmp_path.iterdir()] == ["set"]
