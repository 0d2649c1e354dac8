"""Pages of substances and stocks, their lists, and the list of what is accepted."""

from __future__ import annotations

from functools import cache
from typing import TYPE_CHECKING

import pytest

from builders import analysis, step, student, surroundings, text
from watchglass.publish.body import text_of
from watchglass.publish.handbook import HandbookPages, make_handbook
from watchglass.publish.model import (
    LinkTo,
    ListEntry,
    ListGroup,
    ListPage,
    PageLink,
    ReferenceRow,
    Run,
)
from watchglass.publish.paging import MOST, in_parts
from watchglass.publish.reference import Reference, make_reference
from watchglass.publish.search import search_files
from watchglass.publish.substance_pages import initial
from watchglass.publish.uses import Use

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
reactions:
  gas: NaHCO3 + HCl -> NaCl + H2O + carbon-dioxide
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
    "  makes: 2 L\n  shelf-life: 1 month\n  note: zqxremark\n"
    "not-used:\n  material: 0.1 M iodine\n",
    "substances/local.yml": "mystery:\n  names: [mystery salt]\n"
    "declared:\n  names: [declared spirit]\n  cas: 64-17-5\n"
    "  ghs: {classes: [Flam. Liq. 2], statements: [H225], source: [a data sheet]}\n",
    "schedule.yml": "- {week: 4, procedure: OC-90}\n- {week: 2, procedure: OC-90}\n",
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
    assert sources["At 20 °C"] == "from memory"


def test_value_without_a_source_says_so() -> None:
    sources = {
        row.label: row.source for row in pages("instructor")["substances/declared.html"].rows
    }

    assert sources["CAS number"] == "source not given"
    assert sources["Formula"] == ""


def test_page_names_the_procedures_that_use_it() -> None:
    page = pages("student")["substances/sodium-hydrogencarbonate.html"]

    assert [entry.link.code for entry in page.used_in] == ["OC-90"]


def test_unclassified_substance_never_looks_safe() -> None:
    page = pages("student")["substances/tert-butyl-methyl-ether.html"]

    assert rows(page)["Hazards"].startswith("Not classified here: read the supplier's")


def test_what_is_not_known_is_shown_as_unknown() -> None:
    known = rows(pages("instructor")["substances/mystery.html"])

    assert {known[k] for k in ("Formula", "Flash point", "pKa", "Soluble in water")} == {"unknown"}


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


def test_amount_that_a_station_uses_stands_beside_the_procedure() -> None:
    (pure,) = pages("student")["substances/tert-butyl-methyl-ether.html"].used_in
    (dissolved,) = pages("student")["substances/sodium-hydrogencarbonate.html"].used_in

    assert text_of(pure.words) == "30 mL"
    assert text_of(dissolved.words).replace("\N{WORD JOINER}", "") == "15 mL of 5.0 % w/v"


def test_weeks_stand_beside_the_procedure() -> None:
    (entry,) = pages("student")["stocks/wash-base.html"].used_in

    assert entry.remarks == "weeks 2, 4"


def test_material_that_no_step_uses_is_said_to_be_listed_only() -> None:
    (entry,) = (
        e for e in pages("student")["substances/water.html"].used_in if e.link.code == "OC-90"
    )

    assert text_of(entry.words) == "on the list, used by no step; as solvent"


def test_substance_of_an_equation_has_a_page() -> None:
    (entry,) = pages("student")["substances/carbon-dioxide.html"].used_in

    assert text_of(entry.words) == "in an equation"


def test_substance_names_the_stocks_that_contain_it_but_not_those_it_only_dissolves() -> None:
    def named(key: str) -> list[str]:
        return [link.address for link in pages("student")[f"substances/{key}.html"].stocks]

    assert named("sodium-hydrogencarbonate") == ["stocks/wash-base.html"]
    assert named("water") == []


def test_instructors_see_candidates_as_candidates() -> None:
    (entry,) = pages("instructor")["substances/naphthalene.html"].used_in

    assert text_of(entry.words) == "one of those that sample may be"


def test_materials_on_a_page_lead_to_their_substance_and_stock() -> None:
    (page,) = handbook("student").procedures
    base = next(row for row in page.reagents if row.material == "base")

    assert [w.target for w in base.name if isinstance(w, LinkTo)] == [
        "substances/sodium-hydrogencarbonate.html"
    ]
    assert [w.target for w in base.strength if isinstance(w, LinkTo)] == ["stocks/wash-base.html"]


def test_secret_sample_leads_nowhere_for_students() -> None:
    (page,) = handbook("student").procedures
    sample = next(row for row in page.reagents if row.material == "sample")

    assert not any(isinstance(word, LinkTo) for word in sample.name)


def test_stock_that_no_procedure_uses_is_the_prep_rooms_alone() -> None:
    assert "stocks/not-used.html" not in pages("student")
    assert pages("instructor")["stocks/not-used.html"].used_in == ()


def test_stock_shows_students_no_remark_and_no_amounts() -> None:
    page = pages("student")["stocks/wash-base.html"]

    assert "zqxremark" not in str(page)
    assert [entry.words for entry in page.used_in] == [()]
    assert rows(pages("instructor")["stocks/wash-base.html"])["Remark"] == "zqxremark"


def test_stock_never_looks_safe() -> None:
    assert rows(pages("student")["stocks/wash-base.html"])["Hazards"].startswith("Not classified")


def test_declared_classification_is_printed_as_declared_with_its_source() -> None:
    page = pages("instructor")["substances/declared.html"]
    row = next(row for row in page.rows if row.label.startswith("Hazards"))

    assert row == ReferenceRow("Hazards as declared", (Run("Flam. Liq. 2, H225"),), "a data sheet")


def test_accepted_finding_of_the_front_matter_leads_to_the_part_for_instructors() -> None:
    (page,) = (p for p in handbook("instructor").lists if p.kind == "accepted")
    unused = page.groups[0].entries[0]

    assert page.groups[0].title.startswith("material-unused (")
    assert unused.link.address == "procedures/oc-90.html#page.instructors"
    assert unused.reason == "kept for the demonstration"


def test_accepted_finding_of_a_step_leads_to_it() -> None:
    written = text(
        "1. Look.\n2. Put {110 mL water -> A} into {A}.",
        "materials: {water: water}\nvessels: {A: beaker 100 mL}\n"
        "accept: {vessel-overfilled: a demonstration}",
    )
    made = make_handbook(analysis({"procedures/t-01.md": written}), "instructor")
    (page,) = (p for p in made.lists if p.kind == "accepted")

    assert page.groups[0].entries[0].link.address == "procedures/t-01.html#step-2"


def used_by(count: int) -> Reference:
    """Give what is looked up in a set of so many procedures that all use water."""
    given = one_use()
    many = [
        given._replace(link=PageLink(f"Procedure {n}", f"P-{n}", f"procedures/p-{n}.html"))
        for n in range(count)
    ]
    around = surroundings()
    return make_reference(many, around.catalogue, around.laboratory, instructor=False)


def one_use() -> Use:
    entry = step("Put {5 mL water -> A} into {A}.")
    return Use(
        PageLink("A procedure", "T-01", "procedures/t-01.html"),
        entry.procedure,
        student(entry).reagents,
        (),
    )


def test_uses_of_what_is_used_everywhere_are_continued_on_further_pages() -> None:
    found = used_by(1000)
    page = next(p for p in found.pages if p.address == "substances/water.html")
    further = [p for p in found.lists if p.address.startswith("substances/water.")]

    assert page.count == 1000
    assert page.more is not None
    assert [p.address for p in further] == [
        "substances/water.2.html", "substances/water.3.html", "substances/water.4.html",
    ]  # fmt: skip
    assert page.more.address == further[0].address
    assert max(len(g.entries) for p in further for g in p.groups) <= MOST
    assert len(page.used_in) + sum(len(g.entries) for p in further for g in p.groups) == 1000


def test_further_parts_lead_to_one_another() -> None:
    parts = [p for p in used_by(1000).lists if p.address.startswith("substances/water.")]

    assert [p.previous.address for p in parts if p.previous] == [
        "substances/water.html", "substances/water.2.html", "substances/water.3.html",
    ]  # fmt: skip
    assert parts[-1].following is None


def test_list_leads_to_the_part_in_which_a_group_stands() -> None:
    entries = tuple(ListEntry(PageLink(f"{n}", "", "x.html"), "") for n in range(5))
    whole = ListPage(
        kind="substances",
        title="Substances",
        address="substances.html",
        groups=(ListGroup("A", "initial-a", entries), ListGroup("B", "initial-b", entries)),
        places=(PageLink("A", "", "initial-a"), PageLink("B", "", "initial-b")),
    )
    parts = in_parts(whole, 4)

    assert [link.address for link in parts[0].places] == [
        "substances.html#initial-a", "substances.2.html#initial-b",
    ]  # fmt: skip
    assert [[(g.title, len(g.entries)) for g in p.groups] for p in parts] == [
        [("A", 4)], [("A (continued)", 1), ("B", 3)], [("B (continued)", 2)],
    ]  # fmt: skip


@pytest.mark.parametrize(
    ("name", "letter"),
    [
        ("tert-butyl methyl ether", "B"),
        ("trans-cinnamic acid", "C"),
        ("2,4-dinitrophenylhydrazine", "D"),
        ("p-xylene", "X"),
        ("N,N-dimethylformamide", "D"),
        ("(R)-limonene", "L"),
        ("4-(dimethylamino)pyridine", "D"),
        ("ortho-vanillin", "V"),
        ("paracetamol", "P"),
        ("oleic acid", "O"),
        ("2", "#"),
    ],
)
def test_names_are_filed_by_their_first_letter_that_counts(name: str, letter: str) -> None:
    assert initial(name) == letter
