"""Branches are run on a copy of the bench and dropped; expected ones happen."""

from __future__ import annotations

import pytest

from builders import judged, steps

FRONT = """\
materials:
  acid: 1.0 M hydrochloric acid
  base: 1.0 M sodium hydroxide
vessels:
  A: beaker 100 mL
expect:
  - {0}
"""


def body(words: str, branch: str, after: str = "") -> str:
    return (
        "1. Put {20 mL acid -> A} into {A}. {stir A} {label before}\n\n"
        f":::if {words}\n2. {branch}\n:::\n\n3. {{test A ph}}. {after} {{label end}}"
    )


def codes(expectation: str, text: str) -> list[str]:
    entry = judged(text, FRONT.format(expectation))
    return [f.code.number for f in entry.findings if f.code.number not in ("N180", "N181")]


INTO = "Put {30 mL base -> A} in. {stir A} {label inside}"


@pytest.mark.parametrize(
    ("expectation", "missed"),
    [
        ("ph of A after label(inside) >= 13", False),  # 10 mmol of base in 50 mL
        ("ph of A after label(end) <= 0.1", False),  # 1 M acid, as before the branch
        ("ph of A after label(end) >= 7", True),
        ("ph of A <= 0.1", False),
    ],
)
def test_branch_is_judged_and_then_dropped(expectation: str, missed: bool) -> None:
    found = codes(expectation, body("it is too acid", INTO))

    assert found == (["X101"] if missed else [])


@pytest.mark.parametrize(
    ("expectation", "missed"),
    [("ph of A after label(end) >= 13", False), ("ph of A after label(end) <= 7", True)],
)
def test_expected_branch_happens(expectation: str, missed: bool) -> None:
    found = codes(expectation, body("it is too acid, expected", INTO))

    assert found == (["X101"] if missed else [])


def test_fault_in_a_branch_is_found() -> None:
    text = body("it is too acid", INTO.replace("30 mL", "90 mL"))

    assert codes("ph of A after label(end) <= 0.1", text) == ["B120"]


def test_what_a_branch_pours_takes_no_room_after_it() -> None:
    text = body("it is too acid", INTO, after="Add {60 mL base -> A}.")

    assert codes("ph of A after label(before) <= 0.1", text) == []


def test_branch_counts_for_the_prep_room() -> None:
    entry = judged(body("it is too acid", INTO), FRONT.format("ph of A <= 1"))

    (total,) = entry.case.usage["base"].totals
    assert total.low == pytest.approx(30e-6)


def test_last_branch_is_dropped_too() -> None:
    text = "1. Put {20 mL acid -> A} in. {stir A}\n\n:::if needed\n2. Add {30 mL base -> A}. {stir A}\n:::\n"

    assert codes("ph of A <= 0.1", text) == []


def test_branch_within_a_branch_goes_back_one_level() -> None:
    text = (
        "1. Put {20 mL acid -> A} in. {stir A}\n\n"
        ":::if acid\n2. Add {10 mL base -> A}. {stir A}\n\n"
        ":::if still acid\n3. Add {20 mL base -> A}. {stir A} {label inner}\n:::\n\n"
        "4. {stir A} {label outer}\n:::\n\n5. {stir A} {label end}\n"
    )

    assert codes("ph of A after label(inner) >= 12", text) == []
    # 20 mmol of acid and 10 of base in 30 mL: 0.33 mol/L.
    assert codes("ph of A after label(outer) in 0.4–0.6", text) == []
    assert codes("ph of A after label(end) <= 0.1", text) == []


def test_repeated_branch_is_dropped_each_time() -> None:
    text = body("it is too acid", INTO).replace("3. {test A ph}.", "3. {test A ph; again 2}.")

    assert codes("ph of A after label(end) <= 0.1", text) == []


def test_ledger_says_which_entries_are_of_a_branch() -> None:
    entry = judged(body("it is too acid", INTO), FRONT.format("ph of A <= 1"))
    assert entry.run is not None
    branches = {e.happening.step: e.branch for e in entry.run.ledger.entries}

    assert branches == {1: "", 2: "it is too acid", 3: ""}


def test_plain_steps_are_in_no_branch() -> None:
    entry = judged(steps("Put {20 mL acid -> A} in."), FRONT.format("ph of A <= 1"))

    assert entry.run is not None
    assert all(not e.branch for e in entry.run.ledger.entries)
