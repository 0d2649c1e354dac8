"""The full form: golden files for what is seen, assertions for what must never be."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING

import pytest

from shell.findings_builder import NOT_RUN, OVERFILLED, UNUSED, finding, marked
from watchglass.base.findings import Edit, Finding, Related
from watchglass.base.spans import Lines
from watchglass.shell.rendering.cells import text_width
from watchglass.shell.rendering.full import render
from watchglass.shell.rendering.style import Style

if TYPE_CHECKING:
    from collections.abc import Callable

PLAIN = Style(width=80)
WORDS = "word " * 60

CASES = {
    "one-place": finding(
        "1. Take {the funnel}.\n2. Add ⟦{100 mL ether -> funnel}⟧ and stopper.\n",
        help="wash in two portions of 50 mL, or take the funnel of 250 mL",
    ),
    "related-line": finding(
        "1. Add ⟪{50 mL acid -> funnel}⟫.\n\n3. Add ⟦{100 mL ether -> funnel}⟧.\n",
        related=("50 mL was already in it",),
    ),
    "related-same-line": finding(
        "Add ⟦{100 mL ether -> funnel}⟧ to {⟪funnel⟫} at ⟪once⟫.\n",
        related=("named here too", ""),
    ),
    "related-inside": finding("Add ⟦{100 mL ⟪ether⟫ -> funnel}⟧.\n", related=("floats on water",)),
    "tabs": finding("\t- Add\t⟦{100\tmL}⟧\tat ⟪once⟫.\n", related=("now",)),
    "wide": finding("加 水 ⟦{100 mL 水}⟧ 後 ⟪酸⟫.\n", label="水", related=("酸",)),
    "combining": finding("Ame\u0301lie adds ⟦e\u0301ther⟧ 𝒳 ⟪𝒴⟫\n", related=("𝒴",)),
    "combining-alone": finding("e⟦\u0301⟧ther\n", label="one mark"),
    "combining-first": finding("⟦\u0301⟧ether\n", label="one mark"),
    "last-line-open": finding("first\nAdd {100 mL ⟦⟧", label="a brace is missing"),
    "end-of-file": finding("first\nAdd {100 mL\n⟦⟧", label="a brace is missing"),
    "empty-file": finding("⟦⟧", label="nothing is here"),
    "line-end": finding("Add {100 mL⟦\n⟧next\n", label="the line ends"),
    "three-lines": finding("a\n⟦:::question\n\n  why⟧\n:::\n", label="never closed"),
    "many-lines": finding("⟦:::question\n1\n2\n3\n4\n5\n6\n7\n  why\n⟧:::\n", label="never closed"),
    "long-line": finding(f"{WORDS}⟦{{bad}}⟧ {WORDS}\n"),
    "long-line-apart": finding(
        f"{WORDS}⟦{{bad}}⟧ {WORDS}⟪{{other}}⟫ end\n", related=("the other",)
    ),
    "long-line-wide": finding(f"{'水' * 50}⟦酸⟧{'水' * 50}\n"),
    "long-span": finding(f"Add ⟦{WORDS}⟧.\n"),
    "very-long-line": finding(f"{WORDS * 100}⟦{{bad}}⟧ {WORDS * 100}\n"),
    "long-label": finding(
        f"{'word ' * 10}⟦{{bad}}⟧ end\n", label="words that do not fit beside what they speak of"
    ),
    "control": finding(
        "clear \x1b[2J ⟦\u202e100 mL\u202c⟧ \x07\x7f\x9b \u200b.\n",
        message="the name \x1b[31m`a\nb\tc`\x1b[0m",
        label="turned \u2066round",
        help="type it again\nerror[B999]: not a finding",
    ),
    "help-lines": finding("⟦x⟧\n", help="write it so:\n  title: X\n\n  code: Y"),
    "fix-write": finding("acid: ⟦3.0 N⟧\n", fix="3.0 M"),
    "fix-put-in": finding("{100 mL ⟦⟧\n", fix="}"),
    "fix-take-out": finding("{100 mL}⟦}⟧\n", fix=""),
    "fix-lines": finding("⟦title⟧\n", fix="---\ntitle: X\n---"),
    "warning": finding(
        "⟦water⟧: water\n", code=UNUSED, message="`water` is never used", label=None
    ),
}


@pytest.mark.parametrize("name", CASES)
def test_full_form_is_as_it_was_read(name: str, golden: Callable[[str, str], None]) -> None:
    golden(f"findings/full/{name}.txt", render([CASES[name]], style=PLAIN))


@pytest.mark.parametrize("name", CASES)
def test_no_line_of_source_is_wider_than_the_screen(name: str) -> None:
    lines = render([CASES[name]], style=PLAIN).split("\n")
    sources = [line for line in lines if line.lstrip().partition(" ")[0].isdigit()]

    assert sources
    assert all(text_width(line) <= 80 for line in sources)


@pytest.mark.parametrize("name", CASES)
def test_nothing_unsafe_is_printed_raw(name: str) -> None:
    text = render([CASES[name]], style=PLAIN)

    assert not set(text) & set("\x1b\x07\x7f\x9b\r\t\u202e\u202c\u2066\u200b")


@pytest.mark.parametrize("name", CASES)
def test_a_terminal_without_unicode_gets_ascii(name: str) -> None:
    assert render([CASES[name]], style=Style(width=80, unicode=False)).isascii()


def test_escapes_stand_above_their_carets_without_unicode() -> None:
    text = render([finding("水 ⟦酸⟧ x\n", label="acid")], style=Style(unicode=False))

    assert "   1 | <U+6C34> <U+9178> x\n     |          ^^^^^^^^ acid\n" in text


def test_related_place_of_another_file_has_its_own_address() -> None:
    stocks = marked("a: 1\n⟪acid: 3.0 M⟫\n", "stocks.yml")
    base = finding("Add ⟦{100 mL acid}⟧.\n")
    both = replace(base, related=(Related(stocks.places[0], "its strength"),))

    assert render([both], style=PLAIN) == (
        "error[B120]: the funnel would hold 150 mL; its size is 125 mL\n"
        "  procedures/oc-04.md:1:5  funnel-overfilled\n"
        "   1 | Add {100 mL acid}.\n"
        "     |     ^^^^^^^^^^^^^ 150 mL after this step\n"
        "  stocks.yml:2:1\n"
        "   2 | acid: 3.0 M\n"
        "     | ----------- its strength\n"
        "\n"
        "1 error in 1 file\n"
    )


def test_fix_elsewhere_says_where() -> None:
    here = marked("⟦{x⟧ and ⟪y⟫\n")
    base = Finding(code=OVERFILLED, span=here.fault, message="m", fix=Edit(here.places[0], "y}"))

    assert "  fix: write `y}` for `y` at procedures/oc-04.md:1:8\n" in render([base], style=PLAIN)


def test_notes_take_a_line_each() -> None:
    notes = [
        finding("⟦a⟧ b\n", code=NOT_RUN, message="not yet run"),
        finding("a ⟦b⟧\n", code=NOT_RUN, message="not yet run", help="wait"),
    ]

    assert render(notes, style=PLAIN) == (
        "note[N190 not-yet-run] procedures/oc-04.md:1:1: not yet run\n"
        "note[N190 not-yet-run] procedures/oc-04.md:1:3: not yet run\n"
        "  help: wait\n"
        "\n"
        "2 notes in 1 file\n"
    )


def test_a_blank_line_parts_findings() -> None:
    two = [
        finding("⟦a⟧\n", message="first", label=None, name="a.md"),
        finding("⟦a⟧\n", message="second", label=None, name="b.md"),
    ]

    assert render(two, style=PLAIN) == (
        "error[B120]: first\n  a.md:1:1  funnel-overfilled\n   1 | a\n     | ^\n\n"
        "error[B120]: second\n  b.md:1:1  funnel-overfilled\n   1 | a\n     | ^\n\n"
        "2 errors in 2 files\n"
    )


def test_no_findings_print_nothing() -> None:
    assert render([], style=PLAIN) == ""


def test_red_belongs_to_errors() -> None:
    warned = render([finding("⟦a⟧\n", code=UNUSED)], style=Style(colour=True))
    failed = render([finding("⟦a⟧\n")], style=Style(colour=True))

    assert "\x1b[1;31m" not in warned
    assert failed.startswith("\x1b[1;31merror[B120]\x1b[0m\x1b[1m: the funnel")


def test_colours_change_nothing_else() -> None:
    base = CASES["related-same-line"]
    coloured = render([base], style=Style(width=80, colour=True))
    for sequence in ("\x1b[0m", "\x1b[1m", "\x1b[2m", "\x1b[1;31m"):
        coloured = coloured.replace(sequence, "")

    assert coloured == render([base], style=PLAIN)


def test_a_span_beyond_its_text_is_drawn_in() -> None:
    source = marked("ab\n").source
    text = render([Finding(code=OVERFILLED, span=source.span(1, 99), message="m")], style=PLAIN)

    assert "   1 | ab\n     |  ^\n" in text


def several(number: int) -> list[Finding]:
    """Make findings on one line, each at a place of its own, half of them warnings."""
    source = marked("x " * number).source
    return [
        Finding(
            code=UNUSED if n % 2 else OVERFILLED,
            span=source.span(2 * n, 2 * n + 1),
            message=f"fault {n}",
        )
        for n in range(number)
    ]


def test_no_more_than_the_limit_are_shown_and_all_are_counted() -> None:
    text = render(several(5), style=PLAIN, limit=2)

    assert "fault 1" in text
    assert "fault 2" not in text
    assert text.endswith(
        "\n\n3 more findings not shown; `--limit 0` shows all\n\n3 errors, 2 warnings in 1 file\n"
    )


def test_one_more_is_one_finding() -> None:
    assert "1 more finding not shown" in render(several(3), style=PLAIN, limit=2)


def test_as_many_as_the_limit_are_all_shown() -> None:
    assert "not shown" not in render(several(2), style=PLAIN, limit=2)


def test_repeats_do_not_count_towards_the_limit() -> None:
    assert "not shown" not in render(several(2) * 3, style=PLAIN, limit=2)


def test_without_a_limit_all_are_shown() -> None:
    text = render(several(300), style=PLAIN)

    assert "fault 299" in text
    assert "not shown" not in text


def test_very_long_line_is_taken_out_once_for_all_its_findings(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    """Else printing would grow with the square of a file without line ends."""
    taken = 0
    plain = Lines.line

    def counted(table: Lines, number: int) -> str:
        nonlocal taken
        taken += 1
        return plain(table, number)

    monkeypatch.setattr(Lines, "line", counted)
    render(several(100), style=PLAIN)

    assert taken == 1
