"""`watchglass build`: what it asks for and what it says, with the site builder replaced."""

from __future__ import annotations

from pathlib import Path
from types import SimpleNamespace
from typing import TYPE_CHECKING

import pytest

from shell.cli_runner import replace_module
from shell.findings_builder import UNUSED, finding
from watchglass.shell.cli import main

if TYPE_CHECKING:
    from watchglass.base.findings import Finding

BUILDER = "watchglass.shell.site.build"


@pytest.fixture
def site(tmp_path: Path) -> Path:
    """Give a folder that is a site."""
    (tmp_path / "mkdocs.yml").write_text("site_name: X\n")
    return tmp_path


def building(
    monkeypatch: pytest.MonkeyPatch, findings: tuple[Finding, ...] = (), *, failed: bool = False
) -> list[object]:
    """Let the builder give a result; the list fills with what it was asked."""
    asked: list[object] = []

    def build_site(
        site: Path,
        *,
        editions: tuple[str, ...],
        out: Path | None,
        scale: float | None,
        strict: bool,
    ) -> object:
        asked.append((site, editions, out, scale, strict))
        written = () if failed else tuple(site / "public" / e / "index.html" for e in editions)
        return SimpleNamespace(findings=findings, written=written, failed=failed, pages=3)

    replace_module(monkeypatch, BUILDER, build_site=build_site)
    return asked


def test_each_edition_is_told_where_it_can_be_opened(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], site: Path
) -> None:
    building(monkeypatch)

    assert main(["build", str(site)]) == 0

    student, instructor = (site / "public" / e / "index.html" for e in ("student", "instructor"))
    assert capsys.readouterr() == (
        (
            f"student     {student}\n            {student.as_uri()}\n"
            f"instructor  {instructor}\n            {instructor.as_uri()}\n"
        ),
        "",
    )


@pytest.mark.parametrize(
    ("options", "editions", "out", "scale", "strict"),
    [
        ([], ("student", "instructor"), None, None, False),
        (["--edition", "student"], ("student",), None, None, False),
        (["--edition", "instructor"], ("instructor",), None, None, False),
        (["--strict", "--out", "there"], ("student", "instructor"), Path("there"), None, True),
        (["--scale", "0.5"], ("student", "instructor"), None, 0.5, False),
    ],
)
def test_options_are_handed_on(
    monkeypatch: pytest.MonkeyPatch,
    site: Path,
    options: list[str],
    editions: tuple[str, ...],
    out: Path | None,
    scale: float | None,
    *,
    strict: bool,
) -> None:
    asked = building(monkeypatch)

    main(["build", str(site), *options])

    assert asked == [(site, editions, out, scale, strict)]


def test_failed_build_says_so_and_names_no_place(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], site: Path
) -> None:
    building(monkeypatch, (finding("⟦a⟧\n"),), failed=True)

    assert main(["build", str(site)]) == 1

    out, err = capsys.readouterr()
    assert out == ""
    assert err.startswith("error[B120]: ")
    assert err.endswith("1 error in 1 file\nthe handbook was not built\n")


def test_warnings_are_said_on_standard_error_and_do_not_fail(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], site: Path
) -> None:
    building(monkeypatch, (finding("⟦a⟧\n", code=UNUSED),))

    assert main(["build", str(site), "--edition", "student"]) == 0

    out, err = capsys.readouterr()
    assert out.startswith("student  ")
    assert err.startswith("warning[N180]: ")


def test_folder_that_is_no_site_is_refused(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], tmp_path: Path
) -> None:
    asked = building(monkeypatch)
    monkeypatch.chdir(tmp_path)

    assert main(["build", "."]) == 2
    assert capsys.readouterr().err == "`.` is no site: it holds no mkdocs.yml\n"
    assert asked == []
