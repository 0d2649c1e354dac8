"""Cutting off the front matter, and reading whole files."""

from __future__ import annotations

import pytest

from watchglass.base.spans import Source
from watchglass.read.procedure import read_page, read_procedure
from watchglass.read.syntax import Marked, Paragraph


def _names(text: str) -> list[tuple[str, int, str]]:
    _, findings = read_procedure(Source.of("procedures/t-01.md", text))
    return [(f.code.name, f.span.position().line, f.span.text) for f in findings]


@pytest.mark.parametrize("closing", ["---", "...", "---  "])
def test_body_begins_after_the_front_matter(closing: str) -> None:
    source = Source.of("t.md", f"---\ntitle: A\n{closing}\nwords {{15 min}}\n")
    procedure, findings = read_procedure(source)

    assert findings == ()
    assert (procedure.front_broken, procedure.marks) == (False, 1)
    assert procedure.front is not None
    assert procedure.front.span.position().line == 2
    (paragraph,) = procedure.body
    assert isinstance(paragraph, Paragraph)
    assert paragraph.span.position() == (4, 1)
    mark = paragraph.children[1]
    assert isinstance(mark, Marked)
    assert mark.mark.text == "{15 min}"


def test_missing_front_matter_is_reported_at_the_first_line() -> None:
    assert _names("# A\n\nwords\n") == [("front-matter-missing", 1, "# A")]


def test_front_matter_left_open_is_reported_once() -> None:
    assert _names("---\ntitle: A\n\n1. {a\n") == [("front-matter-open", 1, "---")]


def test_front_matter_that_is_a_list_holds_no_fields() -> None:
    assert _names("---\n- a\n---\n") == [("field-unfit", 2, "- a")]


@pytest.mark.parametrize("text", ["words", "---\ntitle: A\n\nwords", "---\n- a\n---\n"])
def test_names_are_unknown_where_the_front_matter_cannot_be_read(text: str) -> None:
    procedure, _ = read_procedure(Source.of("t.md", text))

    assert procedure.front_broken
    assert procedure.front is None


def test_empty_front_matter_is_not_broken() -> None:
    procedure, findings = read_procedure(Source.of("t.md", "---\n---\nwords"))

    assert (procedure.front, procedure.front_broken, findings) == (None, False, ())


@pytest.mark.parametrize("text", ["", "words", "---\ntitle: Waste\n---\nwords"])
def test_page_needs_no_front_matter(text: str) -> None:
    page, findings = read_page(Source.of("pages/waste.md", text))

    assert findings == ()
    assert not page.front_broken
