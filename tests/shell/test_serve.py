"""`watchglass serve`: pages that follow the files, and findings that stand in the pages."""

from __future__ import annotations

import os
import signal
import socket
import subprocess
import sys
import time
from contextlib import contextmanager
from typing import TYPE_CHECKING
from urllib.error import HTTPError, URLError
from urllib.request import urlopen

import pytest

from shell.cli_runner import ROOT
from shell.site_builder import Reading, digest, make_site
from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.base.spans import Source
from watchglass.shell.cli import main
from watchglass.shell.site.build import build_site
from watchglass.shell.site.findings_bar import Notice, placed, stand_in

if TYPE_CHECKING:
    from collections.abc import Callable, Iterator
    from pathlib import Path

PATIENCE = 90.0
"""Seconds after which a page that does not come is taken never to come."""
WRONG = ("{15 mL base -> funnel}", "{15 mL bas -> funnel}")
PAGE = "procedures/aa-01.html"


class Served:
    """A server in a process of its own."""

    def __init__(self, process: subprocess.Popen[str], address: str) -> None:
        """Keep the process and where it serves."""
        self.process = process
        self.address = address

    def fetch(self, path: str = "") -> str:
        """Give what the server sends, an error page too; empty while it does not answer."""
        try:
            with urlopen(self.address + path, timeout=PATIENCE) as answer:  # noqa: S310 - our own server
                return str(answer.read().decode())
        except HTTPError as error:
            return error.read().decode()
        except URLError:
            return ""

    def until(self, holds: Callable[[str], bool], path: str = "") -> str:
        """Fetch a page until something holds of it."""
        deadline = time.monotonic() + PATIENCE
        page = ""
        while time.monotonic() < deadline:
            page = self.fetch(path)
            if holds(page):
                return page
            time.sleep(0.1)
        raise AssertionError(f"it never came to hold of {path}:\n{page}")


@contextmanager
def started(arguments: list[str], log: Path) -> Iterator[subprocess.Popen[str]]:
    """Run a server, and stop it in the end whatever happens."""
    with (
        log.open("w") as said,
        subprocess.Popen(  # noqa: S603 - our own interpreter
            [sys.executable, "-m", *arguments],
            env={**os.environ, "PYTHONPATH": ROOT, "PYTHONUTF8": "1"},
            stdout=subprocess.PIPE,
            stderr=said,
            encoding="utf-8",
        ) as process,
    ):
        try:
            yield process
        finally:
            process.kill()


@contextmanager
def served(site: Path, *options: str) -> Iterator[Served]:
    """Serve a site on a free port."""
    call = ["watchglass", "serve", str(site), "--address", "127.0.0.1:0", *options]
    with started(call, site.parent / "said.txt") as process:
        assert process.stdout is not None
        announced = process.stdout.readline().split()
        assert len(announced) == 2, (site.parent / "said.txt").read_text()
        yield Served(process, announced[1])


def replace(path: Path, old: str, new: str) -> None:
    """Write a file anew as an editor does."""
    text = path.read_text(encoding="utf-8")
    assert old in text
    beside = path.with_name(f".{path.name}.swp")
    beside.write_text(text.replace(old, new), encoding="utf-8")
    beside.replace(path)


def procedure_of(site: Path) -> Path:
    return site.parent / "set/procedures/aa-01.md"


def test_finding_comes_into_the_page_and_goes_when_it_is_mended(tmp_path: Path) -> None:
    site = make_site(tmp_path)

    with served(site) as server:
        first = server.fetch(PAGE)
        replace(procedure_of(site), *WRONG)
        wrong = server.until(lambda page: "preview-findings" in page, PAGE)
        replace(procedure_of(site), *reversed(WRONG))
        server.until(lambda page: page and "preview-findings" not in page, PAGE)

    assert "preview-findings" not in first
    assert "15 mL base" not in wrong
    assert "Washing an ether layer" in wrong
    assert "<code>bas</code> is declared nowhere" in wrong
    assert "did you mean <code>base</code>" in wrong
    assert "procedures/aa-01.md:14:43" in wrong
    assert "N163" in wrong


def test_page_follows_what_is_written(tmp_path: Path) -> None:
    site = make_site(tmp_path)

    with served(site) as server:
        assert "Added just now" not in server.fetch(PAGE)
        replace(procedure_of(site), "## A. The wash", "Added just now.\n\n## A. The wash")

        server.until(lambda page: "Added just now" in page, PAGE)


def test_first_start_with_errors_shows_them_and_then_the_pages(tmp_path: Path) -> None:
    site = make_site(tmp_path)
    replace(procedure_of(site), *WRONG)

    with served(site) as server:
        start, inner = server.fetch(), server.fetch(PAGE)
        replace(procedure_of(site), *reversed(WRONG))
        mended = server.until(lambda page: "preview-findings" not in page, PAGE)

    assert "The handbook is not built yet" in start
    assert "is declared nowhere" in start
    assert "is declared nowhere" in inner
    assert "livereload" in inner
    assert "Washing an ether layer" in mended


def test_broken_configuration_is_said_in_the_page(tmp_path: Path) -> None:
    site = make_site(tmp_path)

    with served(site) as server:
        replace(site / "mkdocs.yml", "{set: ../set}", "{set: ../sets}")
        page = server.until(lambda page: "preview-findings" in page, PAGE)

    assert "does not serve" in page
    assert "Washing an ether layer" in page


def test_edition_served_is_the_one_asked_for(tmp_path: Path) -> None:
    site = make_site(tmp_path)

    with served(site, "--edition", "student") as server:
        page = server.fetch(PAGE)

    assert "KEPT-FROM-STUDENTS" not in page
    assert "Washing an ether layer" in page


def test_instructors_see_their_edition_where_none_is_named(tmp_path: Path) -> None:
    site = make_site(tmp_path)

    with served(site) as server:
        assert "KEPT-FROM-STUDENTS" in server.fetch(PAGE)


def test_address_that_leads_nowhere_gets_the_handbooks_own_page(tmp_path: Path) -> None:
    site = make_site(tmp_path)

    with served(site) as server:
        assert "There is no such page" in server.fetch("nowhere.html")


def test_nothing_is_written_into_set_or_site(tmp_path: Path) -> None:
    site = make_site(tmp_path)
    before = digest(site), digest(site.parent / "set")

    with served(site) as server:
        server.fetch(PAGE)

    assert (digest(site), digest(site.parent / "set")) == before


def test_no_preview_script_is_in_a_built_site(tmp_path: Path) -> None:
    site = make_site(tmp_path)

    with served(site) as server:
        assert "livereload" in server.fetch(PAGE)
        build_site(site, editions=("instructor",), out=None, strict=False)

    built = [p.read_text("utf-8") for p in (site / "public").rglob("*.html")]
    assert built
    assert not [page for page in built if "livereload" in page or "preview-findings" in page]


@pytest.mark.parametrize(("stop", "status"), [(signal.SIGINT, 0), (signal.SIGTERM, 143)])
def test_stopped_server_ends_cleanly_and_leaves_nothing(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, stop: signal.Signals, status: int
) -> None:
    site = make_site(tmp_path)
    (tmp_path / "scratch").mkdir()
    monkeypatch.setenv("TMPDIR", str(tmp_path / "scratch"))

    with served(site) as server:
        server.fetch()
        kept = list((tmp_path / "scratch").iterdir())
        server.process.send_signal(stop)
        ended = server.process.wait(PATIENCE)

    assert kept
    assert ended == status
    assert list((tmp_path / "scratch").iterdir()) == []
    assert "Traceback" not in (tmp_path / "said.txt").read_text()


def test_port_in_use_is_said_and_refused(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    site = make_site(tmp_path)
    with socket.socket() as other:
        other.bind(("127.0.0.1", 0))
        other.listen()
        address = f"127.0.0.1:{other.getsockname()[1]}"

        assert main(["serve", str(site), "--address", address]) == 2

    out, err = capsys.readouterr()
    assert out == ""
    assert f"`{address}` cannot be served on" in err
    assert "--address HOST:PORT" in err


@pytest.mark.parametrize("address", ["8000", "127.0.0.1", ":8000", "127.0.0.1:port", "a:70000"])
def test_address_that_is_none_is_refused(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], address: str
) -> None:
    assert main(["serve", str(make_site(tmp_path)), "--address", address]) == 2
    assert "write it as in 127.0.0.1:8000" in capsys.readouterr().err


def test_folder_that_is_no_site_is_refused(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["serve", str(tmp_path)]) == 2
    assert "holds no mkdocs.yml" in capsys.readouterr().err


def test_mkdocs_own_preview_goes_on_while_the_set_holds_errors(tmp_path: Path) -> None:
    site = make_site(tmp_path)
    with socket.socket() as free:
        free.bind(("127.0.0.1", 0))
        address = f"127.0.0.1:{free.getsockname()[1]}"
    call = ["mkdocs", "serve", "-f", str(site / "mkdocs.yml"), "-a", address]

    with started(call, tmp_path / "said.txt") as process:
        server = Served(process, f"http://{address}/")
        server.until(lambda page: "Washing an ether layer" in page, PAGE)
        replace(procedure_of(site), *WRONG)
        wrong = server.until(lambda page: "preview-findings" in page, PAGE)
        replace(procedure_of(site), *reversed(WRONG))
        server.until(lambda page: page and "preview-findings" not in page, PAGE)

    assert "Washing an ether layer" in wrong
    assert "is declared nowhere" in wrong


# ------------------------------------------------------------------------------ the bar itself


def _finding(message: str, code: codes.Code = codes.NAME_UNKNOWN) -> Finding:
    return Finding(code=code, span=Source.of("a.md", "abc\n").span(1, 2), message=message)


def test_bar_is_a_named_region_with_a_heading() -> None:
    bar = Notice((_finding("a `b` is wrong"),), current=False).html()

    read = Reading(bar)
    assert read.tags[:2] == ["section", "h2"]
    assert read.values("aria-labelledby") == read.values("id") == ["preview-findings"]
    assert "To be mended: 1 error in 1 file" in read.text


def test_words_of_a_finding_cannot_become_markup() -> None:
    bar = Notice((_finding("<script>alert(`<b>`)</script>"),), current=False).html()

    assert "script" not in Reading(bar).tags
    assert "b" not in Reading(bar).tags


def test_notes_alone_are_no_bar() -> None:
    assert Notice((_finding("x", codes.NOT_YET_RUN),)).html() == ""


def test_warnings_beside_current_pages_fold_away() -> None:
    bar = Notice((_finding("x", codes.STEP_NUMBER_DIFFERS),)).html()

    assert "details" in Reading(bar).tags
    assert "up to date" in bar


def test_bar_stands_first_in_the_body() -> None:
    page = placed(stand_in("A"), "<section>bar</section>").decode()

    assert page.index("<body>") < page.index("bar") < page.index("<main")
    assert page.index("<style>") < page.index("</head>")


def test_page_without_a_notice_stays_as_it_is() -> None:
    assert placed(stand_in("A"), "") == stand_in("A")
