"""Pages of substances and stocks, the list of what is accepted, and the search index."""

from __future__ import annotations

import json
from functools import cache
from typing import TYPE_CHECKING

import pytest

from builders import analysis
from watchglass.publish.body import text_of
from watchglass.publish.handbook import HandbookPages, make_handbook
from watchglass.publish.search import SHARD, Entry, _shards, fold, search_files, words_of

if TYPE_CHECKING:
    from watchglass.publish.model import ReferencePage

PROCEDURE = """---
title: Washing an ether layer
code: OC-90
course: Practice
materials:
  ether: tert-butyl methyl ether
  base: wash-base
  sample: {one-of: {A: naphthalene, B: biphenyl}, as: 1 % w/v in ethanol}
  spare: water
vessels:
  funnel: separatory funnel 125 mL
accept:
  material-unused: kept for the demonstration
intended:
  INC-001: carbon dioxide, swirled open
---

## The first wash

1. Put {30 mL ether -> funnel} and {15 mL base -> funnel} into {funnel}, and {1 mL sample -> funnel}.

:::instructor
A zqxsecret word.
:::
"""
FILES: dict[str, str | bytes] = {
    "procedures/oc-90.md": PROCEDURE,
    "stocks.yml": "wash-base:\n  names: [wash alkali]\n  material: 5.0 % w/v sodium hydrogencarbonate\n"
    "  makes: 2 L\n  shelf-life: 1 month\n",
    "substances/local.yml": "mystery:\n  names: [mystery salt]\n",
}


@cache
def handbook(edition: str) -> HandbookPages:
    return make_handbook(analysis(FILES), edition)


def pages(edition: str) -> dict[str, ReferencePage]:
    return {page.address: page for page in handbook(edition).references}


def rows(page: ReferencePage) -> dict[str, str]:
    return {row.label: text_of(row.value) for row in page.rows}


def test_substance_that_is_used_has_a_page_with_its_values() -> None:
    page = pages("student")["substances/tert-butyl-methyl-ether.html"]
    known = rows(page)

    assert known["Molar mass"] == "88.15 g/mol"
    assert known["Boils at 1 atm"] == "55.2 °C"
    assert known["CAS number"] == "1634-04-4"


def test_value_says_where_it_is_from() -> None:
    page = pages("student")["substances/tert-butyl-methyl-ether.html"]
    sources = {row.label: row.source for row in page.rows}

    assert sources["Density"]
    assert sources["Boils at 1 atm"]


def test_page_names_the_procedures_that_use_it() -> None:
    page = pages("student")["substances/sodium-hydrogencarbonate.html"]

    assert [link.code for link in page.used_in] == ["OC-90"]


def test_unclassified_substance_never_looks_safe() -> None:
    page = pages("student")["substances/tert-butyl-methyl-ether.html"]

    assert "Not assessed here" in rows(page)["Hazards"]


def test_what_is_not_known_is_shown_as_unknown() -> None:
    assert rows(pages("instructor")["substances/mystery.html"])["Formula"] == "unknown"


@pytest.mark.parametrize("word", ["naphthalene", "biphenyl"])
def test_candidate_of_a_secret_is_nowhere_in_the_student_edition(word: str) -> None:
    files = "".join(text for _, text in search_files(handbook("student")))

    assert word not in str(handbook("student").references).casefold()
    assert word not in str(handbook("student").lists).casefold()
    assert word not in files.casefold()
    assert f"substances/{word}.html" in pages("instructor")


def test_stock_has_its_recipe_in_the_instructor_edition_only() -> None:
    address = "stocks/wash-base.html"

    assert pages("student")[address].lines == ()
    assert pages("instructor")[address].made == "2 L"
    assert any(
        "Weigh 100.0 g" in line.replace("\xa0", " ") for line in pages("instructor")[address].lines
    )


def test_accepted_findings_are_listed_with_reason_for_instructors_only() -> None:
    (accepted,) = (p for p in handbook("instructor").lists if p.kind == "accepted")
    said = str(accepted)

    assert "kept for the demonstration" in said
    assert "carbon dioxide, swirled open" in said
    assert all(p.kind != "accepted" for p in handbook("student").lists)


def test_lists_lead_to_every_page() -> None:
    listed = {
        entry.link.address
        for page in handbook("instructor").lists
        if page.kind in ("substances", "stocks")
        for group in page.groups
        for entry in group.entries
    }

    assert listed == set(pages("instructor"))


# ---------------------------------------------------------------- search


def index(edition: str) -> tuple[dict[str, object], dict[str, list[int]]]:
    files = dict(search_files(handbook(edition)))
    core = json.loads(files.pop("search/core.js").removeprefix("handbookSearch.core(")[:-3])
    words: dict[str, list[int]] = {}
    for text in files.values():
        words |= json.loads(text.split(",", 1)[1][:-3])
    return core, words


def found(edition: str, word: str) -> list[str]:
    core, words = index(edition)
    pages_: list[list[str]] = core["pages"]  # type: ignore[assignment]
    return [pages_[number][1] for number in words.get(word, [])]


@pytest.mark.parametrize(
    ("word", "address"),
    [
        ("ether", "procedures/oc-90.html"),
        ("oc", "procedures/oc-90.html"),
        ("funnel", "procedures/oc-90.html"),
        ("nahco3", "substances/sodium-hydrogencarbonate.html"),
        ("1634", "substances/tert-butyl-methyl-ether.html"),
        ("alkali", "stocks/wash-base.html"),
    ],
)
def test_word_of_a_page_leads_to_it(word: str, address: str) -> None:
    assert address in found("student", word)


def test_instructors_words_are_in_their_index_only() -> None:
    assert found("instructor", "zqxsecret") == ["procedures/oc-90.html"]
    assert found("student", "zqxsecret") == []


def test_headings_are_in_the_core() -> None:
    core, _ = index("student")

    assert "The first wash" in json.dumps(core)


def test_two_indexes_are_the_same() -> None:
    assert search_files(handbook("student")) == search_files(
        make_handbook(analysis(FILES), "student")
    )


def test_script_cannot_be_ended_by_a_word() -> None:
    files = FILES | {"procedures/oc-90.md": PROCEDURE.replace("ether layer", "layer </script>")}
    made = dict(search_files(make_handbook(analysis(files), "student")))

    assert "</script" not in made["search/core.js"]


def test_many_words_are_divided_into_shards_by_their_beginnings() -> None:
    words = frozenset(f"{a}{b}word{n}" for a in "abcdefgh" for b in "xyz" for n in range(200))
    entries = tuple(Entry(f"P{n}", f"p{n}.html", "", (), words) for n in range(5))
    shards = list(_shards(entries))

    assert len(shards) > 2
    assert [first for first, _ in shards] == sorted(first for first, _ in shards)
    assert sum(len(held) for _, held in shards) == len(words)
    beginnings = [{word[:2] for word in held} for _, held in shards]
    assert all(not one & other for one in beginnings for other in beginnings if one is not other)
    assert all(len(json.dumps(held)) < 3 * SHARD for _, held in shards)


@pytest.mark.parametrize(
    ("text", "folded"),
    [
        ("H₂SO₄", "h2so4"),
        ("µL", "μl"),
        ("Crème", "creme"),
        ("25.00", "25.00"),
        ("Straße", "strasse"),
    ],
)
def test_words_are_folded_as_people_type_them(text: str, folded: str) -> None:
    assert fold(text) == folded


def test_numbers_keep_their_points() -> None:
    assert "15.0" in words_of("take 15.0 mL")
