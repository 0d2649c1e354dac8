"""Markers planted wherever only instructors may look are in no byte of a built student edition."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

import pytest

from watchglass.shell.site.build import build_site

if TYPE_CHECKING:
    from pathlib import Path

HIDDEN = {
    "note": "zqxnote",
    "answer": "zqxanswer",
    "nested": "zqxnested",
    "heading": "zqxheading",
    "link": "zqxlink",
    "picture": "zqxpicture",
    "alt": "zqxalt",
    "expected": "zqxexpected",
    "accept": "zqxaccept",
    "intended": "zqxintended",
    "comment": "zqxcomment",
    "candidate": "naphthalene",
    "other": "biphenyl",
    "page": "zqxpage",
    "remark": "zqxremark",
    "stock": "zqxstock",
    "solute": "iodine",
    "own": "zqxown",
}
#: What a candidate or a stock would be found by, had it a page: numbers and formulas.
TRACES = ("91-20-3", "C10H8", "7553-56-2", "molecules-of-two", "page.instructors", "accepted.html")
#: What the expression of a record comes to: 0.4321 g of benzoic acid in the student's own blank.
YIELD = "0.5837"

PROCEDURE = f"""---
title: Finding what stands in the open
code: T-01
course: Testing
time: 5 min
materials:
  acid: benzoic acid          # {HIDDEN["comment"]}
  water: water
  unused: sodium chloride
  base: wash-base
  sample: {{one-of: {{A: {HIDDEN["candidate"]}, B: {HIDDEN["other"]}}}, as: 1 % w/v in ethanol}}
vessels:
  A: beaker 100 mL
reactions:
  salt: benzoic-acid + NaOH -> sodium-benzoate + H2O
expect:
  - benzoic-acid in A >= 12.345 %
accept:
  material-unused: {HIDDEN["accept"]}
intended:
  INC-001: {HIDDEN["intended"]}
---

Plain words for all. seenbyall

1. Put {{0.4321 g acid -> A}} and {{5 mL water -> A}} into {{A}}; add {{1 mL base -> A}} and {{1 mL sample -> A}}. Record {{? colour = "{HIDDEN["expected"]}"}} and {{? own: twice the mass in g = 2 * 0.29185 g}}.

   :::instructor
   In a step: {HIDDEN["nested"]}.
   :::

:::instructor
## About {HIDDEN["heading"]}

{HIDDEN["note"]}, [see](https://example.org/{HIDDEN["link"]}) ![{HIDDEN["alt"]}]({HIDDEN["picture"]}.png)
:::

:::question
What is seen?

:::answer
{HIDDEN["answer"]}
:::
:::
"""
STOCKS = f"""wash-base:
  material: 5.0 % w/v sodium hydrogencarbonate
  note: {HIDDEN["remark"]}
{HIDDEN["stock"]}:
  material: 0.1 M {HIDDEN["solute"]}
"""
SUBSTANCES = f"""{HIDDEN["own"]}:
  names: [molecules-of-two]
"""
PAGE = f"""# A page

For everybody.

:::instructor
{HIDDEN["page"]}
:::
"""


def build(root: Path, editions: tuple[str, ...], **texts: str) -> dict[str, dict[str, bytes]]:
    """Build a site of the planted set, some of its files written otherwise; give all bytes."""
    files = {
        "set/laboratory.yml": f"name: A laboratory # {HIDDEN['comment']}\n",
        "set/procedures/t-01.md": texts.get("procedure", PROCEDURE),
        "set/stocks.yml": texts.get("stocks", STOCKS),
        "set/substances/own.yml": texts.get("substances", SUBSTANCES),
        "set/pages/one.md": texts.get("page", PAGE),
        "site/docs/about.md": "# About\n",
        "site/mkdocs.yml": "site_name: Planted\ntheme: {name: watchglass}\n"
        "plugins: [{watchglass: {set: ../set}}]\n",
    }
    for name, written in files.items():
        (root / name).parent.mkdir(parents=True, exist_ok=True)
        (root / name).write_text(written)
    (root / "set" / "procedures" / f"{HIDDEN['picture']}.png").write_bytes(b"\x89PNG")
    result = build_site(root / "site", editions=editions, out=root / "out", strict=False)
    assert not result.failed, result.findings
    return {
        edition: {
            path.relative_to(root / "out" / edition).as_posix(): path.read_bytes()
            for path in sorted((root / "out" / edition).rglob("*"))
            if path.is_file()
        }
        for edition in editions
    }


@pytest.fixture(scope="module")
def editions(tmp_path_factory: pytest.TempPathFactory) -> dict[str, dict[str, bytes]]:
    return build(tmp_path_factory.mktemp("planted"), ("student", "instructor"))


@pytest.mark.parametrize("word", HIDDEN.values())
def test_marker_is_in_no_byte_and_no_name_of_the_student_edition(
    editions: dict[str, dict[str, bytes]], word: str
) -> None:
    places = [
        name for name, data in editions["student"].items() if word.encode() in data or word in name
    ]

    assert places == []


@pytest.mark.parametrize("trace", TRACES)
def test_trace_of_what_is_hidden_is_in_no_byte_of_the_student_edition(
    editions: dict[str, dict[str, bytes]], trace: str
) -> None:
    assert [n for n, data in editions["student"].items() if trace.encode() in data] == []


def test_student_edition_is_the_same_whatever_is_hidden(
    editions: dict[str, dict[str, bytes]], tmp_path: Path
) -> None:
    other = PROCEDURE.replace("naphthalene", "benzil").replace("biphenyl", "fluorene")
    other = re.sub('zqx[a-z]+(?=["\n.,*`])', "something else altogether", other)
    other = other.replace(HIDDEN["picture"], "another").replace("12.345", "23.456")
    built = build(
        tmp_path,
        ("student",),
        procedure=other,
        stocks=STOCKS.replace("zqxremark", "another").replace("zqxstock", "abc-1"),
        substances=SUBSTANCES.replace("zqxown", "a-salt"),
        page=PAGE.replace("zqxpage", "something else"),
    )

    assert other != PROCEDURE
    assert built["student"] == editions["student"]


@pytest.mark.parametrize("figure", [YIELD, "12.345"])
def test_expected_figure_is_in_no_byte_of_the_student_edition(
    editions: dict[str, dict[str, bytes]], figure: str
) -> None:
    assert [n for n, data in editions["student"].items() if figure.encode() in data] == []


@pytest.mark.parametrize(
    "word",
    [HIDDEN[k] for k in HIDDEN if k not in ("comment", "candidate", "other")] + [YIELD, "12.345"],
)
def test_instructor_edition_shows_it(editions: dict[str, dict[str, bytes]], word: str) -> None:
    places = [
        name
        for name, data in editions["instructor"].items()
        if word.encode() in data or word in name
    ]

    assert places != []


def test_words_for_all_are_in_both_editions(editions: dict[str, dict[str, bytes]]) -> None:
    for pages in editions.values():
        assert b"seenbyall" in pages["procedures/t-01.html"]
