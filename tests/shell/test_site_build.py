"""Whole sites: judged first, built the same by either command, links that lead somewhere."""

from __future__ import annotations

import gzip
import signal
import subprocess
import sys
import time
from pathlib import Path
from urllib.parse import unquote, urlsplit

import pytest

import watchglass
from shell.site_builder import CONFIG, PROCEDURE, Reading, digest, make_site
from watchglass.shell.commands.verdict import Refused
from watchglass.shell.site import source
from watchglass.shell.site.build import BuildResult, build_site
from watchglass.shell.site.render import Renderer

ROOT = Path(watchglass.__file__).parents[1]
BOTH = ("student", "instructor")
OWN = '<a href="procedures/aa-01.html#step-1">'


def build(site: Path, *, strict: bool = False, out: Path | None = None) -> BuildResult:
    return build_site(site, editions=BOTH, out=out, strict=strict)


def mkdocs(site: Path, *options: str) -> subprocess.CompletedProcess[str]:
    return subprocess.run(  # noqa: S603 - our own call
        [sys.executable, "-m", "mkdocs", "build", "-f", str(site / "mkdocs.yml"), *options],
        check=False,
        capture_output=True,
        text=True,
    )


def read(path: Path) -> str:
    return path.read_text("utf-8")


@pytest.fixture(scope="module")
def good(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Give a site built once; tests only look at it."""
    site = make_site(tmp_path_factory.mktemp("good"))
    build(site)
    return site


def test_both_editions_are_written_in_the_sites_public_folder(tmp_path: Path) -> None:
    site = make_site(tmp_path)
    result = build(site)

    assert result.written == (
        site / "public" / "student" / "index.html",
        site / "public" / "instructor" / "index.html",
    )
    assert not result.failed
    assert result.pages == 18
    assert {path.name for path in (site / "public").iterdir()} == {"student", "instructor"}


def test_handbook_has_the_pages_it_should(good: Path) -> None:
    assert set(digest(good / "public" / "student")) == {
        ".watchglass-handbook",
        "404.html",
        "courses.html",
        "css/handbook.css",
        "css/plots.css",
        "css/figures.css",
        "css/print.css",
        "index.html",
        "js/search.js",
        "own.html",
        "pages/notes.html",
        "procedures/aa-01.html",
        "procedures/aa-02.html",
        "search/core.js",
        "search/texts-0.js",
        "search/words-0.js",
        "substances.html",
        "substances/sodium-hydrogencarbonate.html",
        "substances/tert-butyl-methyl-ether.html",
        "substances/water.html",
    }


@pytest.mark.parametrize(
    ("word", "holding"),
    [
        ("KEPT-FROM-STUDENTS", {"aa-01.html", "texts-0.js"}),
        ("13.37", {"aa-01.html", "aa-02.html", "texts-0.js", "words-0.js"}),
    ],
)
def test_what_instructors_see_is_in_no_byte_of_the_students(
    good: Path, word: str, holding: set[str]
) -> None:
    found = {
        (edition, path.name)
        for edition in BOTH
        for path in (good / "public" / edition).rglob("*")
        if path.is_file() and word.encode() in path.read_bytes()
    }

    assert found == {("instructor", name) for name in holding}


def test_own_page_stands_in_the_same_frame_and_links_to_a_step(good: Path) -> None:
    html = read(good / "public" / "student" / "own.html")

    assert OWN in html
    assert '<a href="own.html" aria-current="page">Own page</a>' in html
    assert Reading(html).tags.count("h1") == 1
    assert "<h1" in html


@pytest.mark.parametrize("edition", BOTH)
def test_every_link_leads_to_a_file_and_a_place_on_it(good: Path, edition: str) -> None:
    folder = good / "public" / edition
    pages = {path.resolve(): Reading(read(path)) for path in folder.rglob("*.html")}
    broken = []
    for path, reading in pages.items():
        for address in reading.values("href", "src"):
            parts = urlsplit(address)
            there = (path.parent / unquote(parts.path)).resolve() if parts.path else path
            places = pages[there].values("id") if parts.fragment and there in pages else []
            if (
                parts.scheme
                or not there.is_file()
                or (parts.fragment and parts.fragment not in places)
            ):
                broken.append((path.name, address))

    assert broken == []


@pytest.mark.parametrize("edition", BOTH)
def test_no_id_stands_twice_on_a_page(good: Path, edition: str) -> None:
    for path in (good / "public" / edition).rglob("*.html"):
        ids = Reading(read(path)).values("id")
        assert len(ids) == len(set(ids)), path.name


def test_two_builds_and_mkdocs_itself_give_the_same_bytes(tmp_path: Path) -> None:
    config = CONFIG + "site_url: https://example.org/lab/\n"
    site = make_site(tmp_path, config=config)
    build(site)
    once = digest(site / "public" / "student")
    build(site)
    twice = digest(site / "public" / "student")
    outcome = mkdocs(site, "--quiet", "--strict")

    assert outcome.returncode == 0
    assert outcome.stderr == ""
    assert once == twice == digest(site / "public" / "student")
    assert "sitemap.xml.gz" in once


def test_sitemap_lists_procedures_without_the_day_of_building(tmp_path: Path) -> None:
    site = make_site(tmp_path, config=CONFIG + "site_url: https://example.org/lab/\n")
    build(site)
    sitemap = read(site / "public" / "student" / "sitemap.xml")

    assert "<loc>https://example.org/lab/procedures/aa-01.html</loc>" in sitemap
    assert "lastmod" not in sitemap
    assert (
        gzip.decompress((site / "public/student/sitemap.xml.gz").read_bytes()).decode() == sitemap
    )


def test_page_for_lost_addresses_links_from_the_sites_url(tmp_path: Path) -> None:
    site = make_site(tmp_path, config=CONFIG + "site_url: https://example.org/lab/\n")
    build(site)

    assert 'href="/lab/courses.html"' in read(site / "public" / "student" / "404.html")


# ------------------------------------------------------------------------------ failing


def spoil(site: Path, *, error: bool) -> None:
    """Put an error, or a warning, into the set."""
    place = site.parent / "set" / "procedures" / "aa-01.md"
    old, new = (
        ("-> funnel}", "-> nowhere}") if error else ("vessels:\n", "vessels:\n  A: beaker 50 mL\n")
    )
    place.write_text(PROCEDURE.replace(old, new, 1))


def test_set_with_an_error_leaves_the_last_good_site_as_it_was(tmp_path: Path) -> None:
    site = make_site(tmp_path)
    build(site)
    before = digest(site)
    spoil(site, error=True)
    result = build(site)

    assert result.failed
    assert result.written == ()
    assert [finding.code.name for finding in result.findings] == ["name-unknown"]
    assert digest(site) == before


def test_warning_stops_only_a_strict_build(tmp_path: Path) -> None:
    site = make_site(tmp_path)
    spoil(site, error=False)

    assert build(site, strict=True).failed
    assert not (site / "public").exists()
    assert not build(site).failed


def test_broken_link_on_an_own_page_stops_only_a_strict_build(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    site = make_site(tmp_path)
    (site / "docs" / "own.md").write_text("# Own page\n\n[lost](no.md)\n")

    assert build(site, strict=True).failed
    assert not list((site / "public").iterdir())
    assert "no.md" in capsys.readouterr().err
    assert not build(site).failed


def test_mkdocs_stops_at_an_error_prints_it_and_leaves_the_site(tmp_path: Path) -> None:
    site = make_site(tmp_path)
    build(site)
    before = digest(site)
    spoil(site, error=True)
    outcome = mkdocs(site)

    assert outcome.returncode == 1
    assert "error[N163]: `nowhere` is declared nowhere" in outcome.stderr
    assert "Traceback" not in outcome.stderr
    assert digest(site) == before


def test_strict_mkdocs_that_gives_up_at_the_end_has_swapped_nothing(tmp_path: Path) -> None:
    site = make_site(tmp_path)
    build(site)
    before = digest(site / "public")
    (site / "docs" / "own.md").write_text(
        "# Own page\n\n[lost](procedures/aa-01.md#step-99)\n[x](no.md)\n"
    )
    outcome = mkdocs(site, "--strict")

    assert outcome.returncode == 1
    assert digest(site / "public") == before


def test_place_that_is_not_on_a_procedures_page_is_reported(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    config = CONFIG + "validation: {links: {anchors: warn}}\n"
    site = make_site(tmp_path, config=config)
    (site / "docs" / "own.md").write_text("# Own page\n\n[x](procedures/aa-01.md#step-99)\n")

    assert not build(site).failed
    assert "procedures/aa-01.md#step-99" in capsys.readouterr().err


def test_fault_while_writing_leaves_the_last_good_site_as_it_was(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    site = make_site(tmp_path)
    build(site)
    before = digest(site)
    monkeypatch.setattr(Renderer, "render", _interrupted)

    with pytest.raises(KeyboardInterrupt):
        build(site)

    assert digest(site) == before
    assert {path.name for path in (site / "public").iterdir()} == {"student", "instructor"}


def _interrupted(*_: object) -> str:
    raise KeyboardInterrupt


def test_second_edition_that_fails_keeps_the_first_from_being_swapped_in(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    site = make_site(tmp_path)
    build(site)
    before = digest(site)
    (site.parent / "set" / "pages" / "notes.md").write_text("---\ntitle: New\n---\n\nNew.\n")
    made = source.pages

    def failing(analysis: object, edition: str) -> object:
        if edition == "instructor":
            raise RuntimeError
        return made(analysis, edition)  # type: ignore[arg-type]

    monkeypatch.setattr(source, "pages", failing)
    with pytest.raises(RuntimeError):
        build(site)

    assert digest(site) == before


# ------------------------------------------------------------------------------ being ended

SLOW = """
import sys, time
from pathlib import Path
from watchglass.shell.site.render import Renderer
def slow(self, page):
    print("writing", flush=True)
    time.sleep(60)
Renderer.render = slow
site = Path(sys.argv[2])
if sys.argv[1] == "mkdocs":
    from mkdocs.__main__ import cli
    cli(["build", "-q", "-f", str(site / "mkdocs.yml")])
else:
    from watchglass.shell.site.build import build_site
    build_site(site, editions=("student", "instructor"), out=None, strict=False)
"""


def ended(site: Path, how: str, number: signal.Signals) -> int:
    """Start a build, end it while it writes, and give its status."""
    process = subprocess.Popen(  # noqa: S603 - our own call
        [sys.executable, "-c", SLOW, how, str(site)], stdout=subprocess.PIPE, text=True
    )
    with process:
        assert process.stdout is not None
        assert process.stdout.readline() == "writing\n"
        process.send_signal(number)
        return process.wait(timeout=20)


@pytest.mark.parametrize("how", ["mkdocs", "watchglass"])
def test_build_that_is_asked_to_end_cleans_up(tmp_path: Path, how: str) -> None:
    site = make_site(tmp_path)
    build(site)
    before = digest(site)

    assert ended(site, how, signal.SIGTERM) == 128 + signal.SIGTERM
    assert digest(site) == before
    assert {path.name for path in (site / "public").iterdir()} == {"student", "instructor"}


@pytest.mark.parametrize("how", ["mkdocs", "watchglass"])
def test_killed_build_leaves_the_site_whole_and_the_next_one_clears_up(
    tmp_path: Path, how: str
) -> None:
    site = make_site(tmp_path)
    build(site)
    before = {edition: digest(site / "public" / edition) for edition in BOTH}

    assert ended(site, how, signal.SIGKILL) == -signal.SIGKILL

    left = [path.name for path in (site / "public").iterdir() if path.name.startswith(".")]
    assert left
    assert {edition: digest(site / "public" / edition) for edition in BOTH} == before

    time.sleep(0.01)
    build(site)
    assert {path.name for path in (site / "public").iterdir()} == {"student", "instructor"}


# ------------------------------------------------------------------------------ configuration


@pytest.mark.parametrize(
    ("config", "said"),
    [
        ("site_name: A\ntheme: {name: watchglass}\nplugins: []\n", "names no set"),
        (CONFIG.replace("../set", "../nowhere"), "nowhere"),
        (CONFIG.replace("set: ../set", "sett: ../set"), "set"),
        (CONFIG.replace("{set: ../set}", "{set: ../set, edition: pupil}"), "edition"),
        (CONFIG.replace("name: watchglass", "name: nothing"), "nothing"),
        ("site_name: [\n", "mkdocs.yml"),
        (CONFIG + "docs_dir: nowhere\n", "nowhere"),
    ],
)
def test_configuration_that_does_not_serve_is_refused_in_a_sentence(
    tmp_path: Path, config: str, said: str
) -> None:
    site = make_site(tmp_path, config=config)

    with pytest.raises(Refused) as refused:
        build(site)

    assert said in refused.value.message
    assert not (site / "public").exists()


def test_foreign_folder_is_refused_and_untouched(tmp_path: Path) -> None:
    site = make_site(tmp_path)
    (tmp_path / "out" / "instructor").mkdir(parents=True)
    (tmp_path / "out" / "instructor" / "thesis.txt").write_text("years of work")
    before = digest(tmp_path)

    with pytest.raises(Refused, match="not built by watchglass"):
        build(site, out=tmp_path / "out")

    assert digest(tmp_path) == before


def test_mkdocs_refuses_a_foreign_folder_too(tmp_path: Path) -> None:
    site = make_site(tmp_path)
    (site / "public" / "student").mkdir(parents=True)
    (site / "public" / "student" / "thesis.txt").write_text("years of work")
    outcome = mkdocs(site)

    assert outcome.returncode == 1
    assert "not built by watchglass" in outcome.stderr
    assert "Traceback" not in outcome.stderr
    assert digest(site / "public") == {
        "student/thesis.txt": digest(site / "public")["student/thesis.txt"]
    }


def test_own_page_in_the_place_of_one_of_the_handbooks_is_an_error(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    site = make_site(tmp_path)
    (site / "docs" / "index.md").write_text("# Mine\n")

    assert build(site).failed
    assert (
        "index.md in the site's own pages would be written to index.html" in capsys.readouterr().err
    )


def test_own_page_that_is_left_out_takes_no_place(tmp_path: Path) -> None:
    site = make_site(tmp_path, config=CONFIG + "exclude_docs: index.md\n")
    (site / "docs" / "index.md").write_text("# Mine\n")

    assert not build(site).failed


def test_other_theme_is_refused(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    site = make_site(tmp_path, config=CONFIG.replace("name: watchglass", "name: mkdocs"))

    assert build(site).failed
    assert "the handbook needs `theme: {name: watchglass}`" in capsys.readouterr().err


def test_owner_can_replace_a_template_and_add_a_style(tmp_path: Path) -> None:
    config = CONFIG.replace("{name: watchglass}", "{name: watchglass, custom_dir: mine}")
    site = make_site(tmp_path, config=config + "extra_css: [own.css]\n")
    (site / "mine").mkdir()
    (site / "mine" / "page.html").write_text(
        '{% extends "base.html" %}{% block content %}MINE {{ page.title }}{% endblock %}'
    )
    (site / "mine" / "main.html").write_text(
        '{% extends "base.html" %}{% block content %}OWN {{ page.content }}{% endblock %}'
    )
    (site / "docs" / "own.css").write_text("p { color: blue }")
    build(site)
    public = site / "public" / "student"

    assert "MINE Notes" in read(public / "pages" / "notes.html")
    assert f'OWN <h1 id="own-page">Own page</h1>\n<p>See {OWN}' in read(public / "own.html")
    assert '<link rel="stylesheet" href="../own.css">' in read(public / "pages" / "notes.html")
    assert (public / "own.css").is_file()


def test_owner_can_order_pages_and_sections_in_the_navigation(tmp_path: Path) -> None:
    config = CONFIG + "nav: [{Rules: [{House: own.md}]}, {College: 'https://example.org'}]\n"
    site = make_site(tmp_path, config=config)
    build(site)
    html = read(site / "public" / "student" / "pages" / "notes.html")

    assert '<a href="../own.html">House</a>' in html
    assert '<a href="https://example.org">College</a>' in html


def test_pictures_of_the_set_are_copied_and_shown(tmp_path: Path) -> None:
    site = make_site(tmp_path)
    notes = site.parent / "set" / "pages"
    (notes / "a.png").write_bytes(b"\x89PNG")
    (notes / "notes.md").write_text("---\ntitle: Notes\n---\n\n![A funnel](a.png)\n")
    build(site)
    public = site / "public" / "student"

    assert '<img src="../pages/a.png" alt="A funnel">' in read(public / "pages" / "notes.html")
    assert (public / "pages" / "a.png").read_bytes() == b"\x89PNG"
