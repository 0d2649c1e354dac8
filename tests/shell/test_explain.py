"""Explanation pages: read, set for a terminal, and found by number or name."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from watchglass.base import codes
from watchglass.shell import explain
from watchglass.shell.cli import main
from watchglass.shell.explain import ExampleFile, Section, parse_explanation
from watchglass.shell.rendering.style import Style

if TYPE_CHECKING:
    from collections.abc import Callable

    from watchglass.base.findings import Code

PAGE = """\
# N110 mark-not-closed

A `{` opens a mark, and the line ends before `}`. A mark stands **on one line**, so that a person
who reads the source sees where it ends.

## Why it matters

- What is not closed is not read, and what is not read is not checked, counted or shown to those
  who prepare the bench.
- Text after it may be taken
  for a part of it.

## Wrong

````wrong procedures/a.md
1. Add {15 mL acid -> funnel.

```
{not read}
```
````

```wrong stocks.yml
acid: 3 M
```

## Mended

```mended procedures/a.md
1. Add\t{15 mL acid -> funnel}.
```

## When it may be accepted

Never.

| a | b |
|---|---|

~~~
{15 mL acid -> funnel}
~~~

## Source

The notation, section 4.
"""


@pytest.fixture
def with_page(monkeypatch: pytest.MonkeyPatch) -> None:
    """Let every code have the page above."""
    monkeypatch.setattr(explain, "page_text", lambda _code: PAGE)


def test_page_is_read_in_its_parts() -> None:
    page = parse_explanation(PAGE)

    assert (page.number, page.name) == ("N110", "mark-not-closed")
    assert [section.heading for section in page.sections] == [
        "", "Why it matters", "Wrong", "Mended", "When it may be accepted", "Source",
    ]  # fmt: skip
    assert page.sections[-1] == Section("Source", "The notation, section 4.")


def test_examples_are_read_as_files() -> None:
    page = parse_explanation(PAGE)

    assert page.wrong == (
        ExampleFile("procedures/a.md", "1. Add {15 mL acid -> funnel.\n\n```\n{not read}\n```\n"),
        ExampleFile("stocks.yml", "acid: 3 M\n"),
    )
    assert page.mended == (ExampleFile("procedures/a.md", "1. Add\t{15 mL acid -> funnel}.\n"),)


@pytest.mark.parametrize(
    ("text", "words"),
    [
        ("", "no title"),
        ("N110 mark-not-closed\n", "no title"),
        ("# N110\n", "no title"),
        ("# N110 Mark\n", "no title"),
        ("# N110 mark-not-closed\n\n```wrong a.md\nx\n", "not closed"),
        ("# N110 mark-not-closed\n\n````wrong a.md\nx\n```\n", "not closed"),
        ("# N110 mark-not-closed\n\n```wrong\nx\n```\n", "names no file"),
    ],
)
def test_page_of_another_shape_is_our_mistake(text: str, words: str) -> None:
    with pytest.raises(ValueError, match=words):
        parse_explanation(text)


def test_headings_inside_an_example_are_no_sections() -> None:
    page = parse_explanation("# N110 a-b\n\n## Wrong\n\n```wrong a.md\n## Part\n```\n")

    assert [section.heading for section in page.sections] == ["", "Wrong"]
    assert page.wrong == (ExampleFile("a.md", "## Part\n"),)


@pytest.mark.usefixtures("with_page")
def test_page_is_set_as_it_was_read(golden: Callable[[str, str], None]) -> None:
    text = explain.page(codes.MARK_NOT_CLOSED, style=Style(width=72))

    golden("findings/explain/page.txt", text)


@pytest.mark.usefixtures("with_page")
def test_headings_are_bold_where_there_is_colour() -> None:
    text = explain.page(codes.MARK_NOT_CLOSED, style=Style(colour=True))

    assert "\n\x1b[1mWhy it matters\x1b[0m\n" in text
    assert text.startswith("\x1b[1mN110 mark-not-closed\x1b[0m")


@pytest.mark.usefixtures("with_page")
@pytest.mark.parametrize("word", ["N110", "n110", "mark-not-closed", "Mark-Not-Closed"])
def test_number_and_name_are_both_understood(capsys: pytest.CaptureFixture[str], word: str) -> None:
    assert main(["explain", word]) == 0

    out, err = capsys.readouterr()
    assert out.startswith("N110 mark-not-closed  error, since 0.1\n\nA `{` opens a mark")
    assert err == ""


def test_code_without_a_page_is_summed_up(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(explain, "page_text", lambda _code: None)

    assert explain.page(codes.MARK_NOT_CLOSED, style=Style()) == (
        "N110 mark-not-closed  error, since 0.1\n\na brace opens and never closes\n"
    )


@pytest.mark.parametrize(
    ("word", "message"),
    [
        ("mark-not-close", "no finding is called `mark-not-close`; did you mean `mark-not-closed`"),
        ("xyzzy", "no finding is called `xyzzy`; `watchglass explain` lists all there are\n"),
    ],
)
def test_unknown_word_offers_near_names(
    capsys: pytest.CaptureFixture[str], word: str, message: str
) -> None:
    assert main(["explain", word]) == 2

    out, err = capsys.readouterr()
    assert out == ""
    assert err.startswith(message)


def test_list_holds_every_code_once(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["explain"]) == 0

    rows = [line.split() for line in capsys.readouterr().out.split("\n") if line.startswith("  ")]
    assert sorted(row[0] for row in rows) == [code.number for code in codes.ALL]


def test_list_is_grouped_by_subject() -> None:
    text = explain.listing(style=Style())

    assert text.startswith("Notation\n  N101  text-not-utf8 ")
    assert "\n\nQuantities\n  Q101  number-not-read " in text


@pytest.mark.parametrize("code", codes.ALL, ids=[code.number for code in codes.ALL])
def test_every_letter_stands_for_a_subject(code: Code) -> None:
    assert code.number[0] in explain.SUBJECTS
