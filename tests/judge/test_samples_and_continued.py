"""Secret samples, judged with each candidate, and products of other procedures, followed at the bench."""

from __future__ import annotations

from pathlib import Path

import pytest

from builders import judged, steps
from watchglass.shell.pipeline import Judged, analyse, check_paths
from watchglass.shell.sets import from_bytes

# ---------------------------------------------------------------- secret samples

SAMPLES = """\
materials:
  sample: {{one-of: {0}, provided: 0.50 g}}
  ether: tert-butyl methyl ether
  base: 0.50 M sodium hydrogencarbonate
vessels:
  funnel: separatory funnel 125 mL
  A: beaker 100 mL
{1}"""
WASH = steps(
    "Put {0.50 g sample -> funnel} and {30 mL ether -> funnel} in, {swirl funnel, open}; add"
    " {20 mL base -> funnel}, {shake funnel, stoppered; settle funnel}.",
    "Draw {funnel.lower -> A} into {A}. {label drawn}",
)


def messages(candidates: str, code: str, expect: str = "") -> list[str]:
    entry = judged(WASH, SAMPLES.format(candidates, f"expect: ['{expect}']\n" if expect else ""))
    return [f.message for f in entry.findings if f.code.number == code]


def test_fault_with_one_candidate_names_it() -> None:
    (said,) = messages("{A: naphthalene, B: benzoic acid}", "B122")

    assert said.endswith("(where `sample` is benzoic acid)")


def test_fault_with_every_candidate_is_said_once_and_names_none() -> None:
    (said,) = messages("{A: salicylic acid, B: benzoic acid}", "B122")

    assert "where" not in said


def test_candidates_without_the_fault_are_sound() -> None:
    assert messages("{A: naphthalene, B: biphenyl}", "B122") == []


def test_expectation_holds_for_every_candidate_or_is_missed() -> None:
    acids, mixed = "{A: salicylic acid, B: benzoic acid}", "{A: naphthalene, B: benzoic acid}"
    expect = "sample in A after label(drawn) >= 50 %"

    assert messages(acids, "X101", expect) == []
    found = messages(mixed, "X101", expect) + messages(mixed, "B127", expect)
    assert any("naphthalene" in said for said in found)


def test_two_secrets_meet_each_of_their_candidates() -> None:
    front = SAMPLES.format("{A: naphthalene, B: benzoic acid, C: biphenyl}", "").replace(
        "vessels:", "  other: {one-of: {X: biphenyl, Y: naphthalene}}\nvessels:"
    )
    entry = judged(WASH, front)

    assert entry.run is not None
    assert [sample.words for sample in entry.run.samples] == [
        "`sample` is naphthalene and `other` is biphenyl",
        "`sample` is benzoic acid and `other` is naphthalene",
        "`sample` is biphenyl and `other` is biphenyl",
    ]


def test_run_that_students_may_see_does_not_know_the_sample() -> None:
    entry = judged(WASH, SAMPLES.format("{A: naphthalene, B: benzoic acid}", ""))

    assert entry.run is not None
    assert entry.run.ledger.entries[0].bench.vessel("funnel").unknown == {"sample"}


# ---------------------------------------------------------------- products of others

MAKE = """\
---
title: Making it
code: OC-1
materials:
  acid: benzoic acid
vessels:
  vial: sample vial 20 mL, tared
  spare: sample vial 20 mL
---

1. Put {1.00 g acid -> vial} into {vial}; {spare} stays empty. {collect vial}
"""
USE = """\
---
title: Going on
code: OC-2
materials:
  crude: {{from: OC-1{vessel}}}
  base: 0.50 M sodium hydroxide
vessels:
  A: beaker 100 mL
expect:
  - ph of A {expect}
---

1. Put {{{amount} -> A}} and {{30 mL base -> A}} into {{A}}; {{stir A}}. {{collect A}}
"""


def use(amount: str = "all crude", expect: str = ">= 7", vessel: str = ", vessel: vial") -> str:
    return USE.format(amount=amount, expect=expect, vessel=vessel)


def second(*texts: str) -> Judged:
    """Analyse a set; give the procedure OC-2."""
    files = {f"procedures/{n}.md": text for n, text in enumerate(texts)}
    analysis = analyse(from_bytes(files), Path())
    (found,) = (p for p in analysis.procedures if p.procedure.head.code == "OC-2")
    return found


def found(judged_: Judged) -> list[str]:
    return [f.code.number for f in judged_.findings]


@pytest.mark.parametrize(
    ("amount", "expect"),
    [
        # 1.00 g of 122.12 g/mol is 8.19 mmol; 15.0 mmol of base in 30 mL.
        ("all crude", "in 13.2–13.5"),  # 6.8 mmol left: 0.227 mol/L
        ("0.50 g crude", "in 13.5–13.7"),  # 10.9 mmol left: 0.364 mol/L
    ],
)
def test_product_brings_what_the_other_procedure_left(amount: str, expect: str) -> None:
    assert found(second(MAKE, use(amount, expect))) == []
    assert found(second(MAKE, use(amount, "<= 12"))) == ["X101"]


@pytest.mark.parametrize("order", [(0, 1), (1, 0)])
def test_order_of_the_files_does_not_matter(order: tuple[int, int]) -> None:
    texts = (MAKE, use(expect="in 13.2–13.5"))

    assert found(second(*(texts[place] for place in order))) == []


def test_only_tared_vessel_is_meant_where_none_is_named() -> None:
    assert found(second(MAKE, use(expect="in 13.2–13.5", vessel=""))) == []


@pytest.mark.parametrize(
    ("vessel", "codes"),
    [(", vessel: vail", ["N200"]), (", vessel: spare", ["N190"])],
)
def test_vessel_that_is_none_or_empty_is_told(vessel: str, codes: list[str]) -> None:
    assert found(second(MAKE, use(vessel=vessel))) == codes


def test_procedure_with_errors_leaves_nothing_known() -> None:
    assert found(second(MAKE.replace("1.00 g", "1.00 gg"), use())) == ["N190"]


def test_chain_of_three_is_followed() -> None:
    third = use(expect=">= 7").replace("OC-2", "OC-3").replace("OC-1", "OC-2")
    third = third.replace("vessel: vial", "vessel: A").replace("30 mL base", "5 mL base")
    files = {"procedures/a.md": third, "procedures/b.md": use(), "procedures/c.md": MAKE}
    analysis = analyse(from_bytes(files), Path())

    assert [f.code.number for f in analysis.findings] == []


def test_circle_ends() -> None:
    circle = MAKE.replace("acid: benzoic acid", "acid: {from: OC-2, vessel: A}").replace(
        "1.00 g acid", "1.00 g acid"
    )

    assert "N190" in found(second(circle, use()))


def test_single_file_is_checked_with_the_procedure_it_goes_on_with(tmp_path: Path) -> None:
    (tmp_path / "laboratory.yml").write_text("name: A\n")
    (tmp_path / "procedures").mkdir()
    (tmp_path / "procedures" / "a.md").write_text(MAKE)
    draft = tmp_path / "procedures" / "b.md"
    draft.write_text(use(expect="<= 12"))

    assert [f.code.number for f in check_paths([draft]).findings] == ["X101"]
