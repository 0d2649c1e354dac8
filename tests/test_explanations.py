"""Every code has its page, and both examples of the page are true."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

import pytest

from cases.harness import PAGES, SECTIONS, above_note, check_files, example, page_path, told
from watchglass.base import codes
from watchglass.base.findings import Finding, Severity
from watchglass.base.spans import Source

if TYPE_CHECKING:
    from watchglass.base.findings import Code

each_code = pytest.mark.parametrize(
    "code", codes.ALL, ids=lambda code: f"{code.number}-{code.name}"
)


def _prose(code: Code) -> str:
    """Give a page without its fenced examples."""
    return re.sub(
        r"^~~~.*?^~~~$", "", page_path(code).read_text("utf-8"), flags=re.MULTILINE | re.DOTALL
    )


@each_code
def test_page_is_there_and_headed_by_number_and_name(code: Code) -> None:
    first = page_path(code).read_text(encoding="utf-8").split("\n", 1)[0]

    assert first == f"# {code.number} {code.name}"


@each_code
def test_page_has_all_sections_in_order(code: Code) -> None:
    assert tuple(re.findall(r"^## (.+)$", _prose(code), re.MULTILINE)) == SECTIONS


@each_code
def test_every_section_but_the_examples_has_words(code: Code) -> None:
    opening, *sections = re.split(r"^## .+$", _prose(code), flags=re.MULTILINE)
    words = [opening.split("\n", 1)[1], sections[0], sections[3], sections[4]]

    assert all(part.strip() for part in words)


@each_code
def test_both_examples_give_the_same_files(code: Code) -> None:
    shown = example(code)

    assert shown.wrong
    assert set(shown.wrong) <= set(shown.mended)


@each_code
def test_wrong_example_gives_this_finding_once_and_nothing_else(code: Code) -> None:
    findings = check_files(example(code).wrong)
    seen = [f for f in findings if f.code == code or f.code.severity > Severity.NOTE]

    assert [f.code.number for f in seen] == [code.number], told(seen)


@each_code
def test_mended_example_is_sound(code: Code) -> None:
    findings = check_files(example(code).mended)
    seen = [f for f in findings if f.code == code or f.code.severity > Severity.NOTE]

    assert not seen, told(seen)


def test_no_page_explains_a_code_that_is_not_there() -> None:
    known = {code.number for code in codes.ALL}

    assert {path.stem for path in PAGES.glob("*.md")} - known == set()


def test_a_note_is_not_above_note() -> None:
    span = Source.of("procedures/t-01.md", "1. Boil.").span(3, 7)
    note = Finding(code=codes.NOT_YET_RUN, span=span, message="`boil` is not yet run")
    warning = Finding(code=codes.MATERIAL_UNUSED, span=span, message="`brine` is never used")

    assert above_note((note, warning)) == (warning,)
