"""Cards: the title, code, links and anchors of a page, wherever a link stands in it."""

from __future__ import annotations

import pytest

from builders import analysis, judged
from watchglass.run.cards import Card, procedure_card

FRONT = """\
after: [A-1, B-2]
materials:
  crude: {from: C-3}
  water: water
vessels: {A: beaker 50 mL}
"""


def card(body: str, front: str = FRONT) -> Card:
    return procedure_card("procedures/t-01.md", judged(body, front).procedure)


def links(body: str) -> list[tuple[str, bool]]:
    return [(link.target, link.hidden) for link in card(body).links]


def page(text: str, path: str = "pages/first-aid.md") -> Card:
    return next(p.card for p in analysis({path: text}).pages if p.path == path)


def test_card_of_a_procedure_has_its_head() -> None:
    found = card("## A part\n\n1. Look.\n")

    assert (found.path, found.kind) == ("procedures/t-01.md", "procedure")
    assert (found.title, found.code) == ("A procedure", "T-01")
    assert found.code_span is not None
    assert found.code_span.text == "T-01"
    assert [(code, span.text) for code, span in found.after] == [("A-1", "A-1"), ("B-2", "B-2")]
    assert [(code, span.text) for code, span in found.continues] == [("C-3", "{from: C-3}")]
    assert {"a-part", "step-1"} <= found.anchors


@pytest.mark.parametrize(
    ("body", "hidden"),
    [
        ("See [it](x.md).", False),
        ("## See [it](x.md)", False),
        ("1. See [it](x.md).", False),
        ("- See [it](x.md).", False),
        ("> See [it](x.md).", False),
        ("*See [it](x.md)*", False),
        ("![it](x.md)", False),
        ("| a |\n|---|\n| [it](x.md) |", False),
        ("| [it](x.md) |\n|---|\n| a |", False),
        (":::caution\nSee [it](x.md).\n:::", False),
        (":::question\nSee [it](x.md).\n:::", False),
        (":::instructor\nSee [it](x.md).\n:::", True),
        (":::question\nWhy?\n\n:::answer\nSee [it](x.md).\n:::\n:::", True),
        (":::instructor\n- *See* [it](x.md).\n:::", True),
        (":::instructor\n> See [it](x.md).\n:::", True),
        (":::instructor\n| a |\n|---|\n| [it](x.md) |\n:::", True),
        (":::instructor\n:::caution\nSee [it](x.md).\n:::\n:::", True),
        ("Pour [from [it](x.md)]{5 mL water -> A}.", False),
        ("    code\n\n---\n\nSee [it](x.md).", False),
    ],
)
def test_link_is_found_wherever_it_stands_and_known_as_hidden(body: str, *, hidden: bool) -> None:
    assert links(body) == [("x.md", hidden)]


def test_picture_within_a_link_counts_as_well() -> None:
    assert links("[![it](a.png)](x.md)") == [("x.md", False), ("a.png", False)]


def test_links_are_in_the_order_of_the_text() -> None:
    assert [target for target, _ in links("See [a](a.md).\n\n1. [b](b.md)\n\n- [c](c.md)")] == [
        "a.md",
        "b.md",
        "c.md",
    ]


def test_code_and_rules_hold_no_links() -> None:
    assert links("    [it](x.md)\n\n---\n\n`[it](x.md)`") == []


@pytest.mark.parametrize(
    ("text", "title"),
    [
        ("---\ntitle: Help\n---\n\n# First aid\n", "Help"),
        ("# First *aid*\n\n## Burns\n", "First aid"),
        ("Look.\n\n## Burns\n", "Burns"),
        ("Look.\n", "First aid"),
        ("---\ntitle: ''\n---\n\nLook.\n", "First aid"),
    ],
)
def test_page_is_titled_by_its_front_matter_its_heading_or_its_name(text: str, title: str) -> None:
    assert page(text).title == title


def test_card_of_a_page_has_neither_code_nor_what_comes_before() -> None:
    found = page("# First aid\n\nSee [it](x.md).\n\n## Burns\n")

    assert (found.kind, found.code, found.after, found.continues) == ("page", "", (), ())
    assert "burns" in found.anchors
    assert [link.target for link in found.links] == ["x.md"]
