"""Markers planted wherever only instructors may look are in no byte of a built student edition."""

from __future__ import annotations

import pytest

from watchglass.shell.site.build import build_site

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
}
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

1. Put {{0.4321 g acid -> A}} and {{5 mL water -> A}} into {{A}}; add {{1 mL sample -> A}}. Record {{? colour = "{HIDDEN["expected"]}"}} and {{? own: twice the mass in g = 2 * 0.29185 g}}.

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
PAGE = f"""# A page

For everybody.

:::instructor
{HIDDEN["page"]}
:::
"""


@pytest.fixture(scope="module")
def editions(tmp_path_factory: pytest.TempPathFactory) -> dict[str, dict[str, bytes]]:
    root = tmp_path_factory.mktemp("planted")
    (root / "set" / "procedures").mkdir(parents=True)
    (root / "set" / "pages").mkdir()
    (root / "site" / "docs").mkdir(parents=True)
    (root / "set" / "laboratory.yml").write_text(f"name: A laboratory # {HIDDEN['comment']}\n")
    (root / "set" / "procedures" / "t-01.md").write_text(PROCEDURE)
    (root / "set" / "procedures" / f"{HIDDEN['picture']}.png").write_bytes(b"\x89PNG")
    (root / "set" / "pages" / "one.md").write_text(PAGE)
    (root / "site" / "docs" / "about.md").write_text("# About\n")
    (root / "site" / "mkdocs.yml").write_text(
        "site_name: Planted\ntheme: {name: watchglass}\nplugins: [{watchglass: {set: ../set}}]\n"
    )
    result = build_site(
        root / "site", editions=("student", "instructor"), out=root / "out", strict=False
    )
    assert not result.failed, result.findings
    return {
        edition: {
            path.relative_to(root / "out" / edition).as_posix(): path.read_bytes()
            for path in sorted((root / "out" / edition).rglob("*"))
            if path.is_file()
        }
        for edition in ("student", "instructor")
    }


@pytest.mark.parametrize("word", HIDDEN.values())
def test_marker_is_in_no_byte_and_no_name_of_the_student_edition(
    editions: dict[str, dict[str, bytes]], word: str
) -> None:
    places = [
        name for name, data in editions["student"].items() if word.encode() in data or word in name
    ]

    assert places == []


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
