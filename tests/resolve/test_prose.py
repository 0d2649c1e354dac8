"""What the sentences say: quantities outside marks, words and their marks, places, blocks for acts."""

from __future__ import annotations

import pytest

from builders import faults, judged, only, places, step


@pytest.mark.parametrize(
    ("sentence", "marked"),
    [
        ("Add 5 mL of acid.", ["5 mL"]),
        ("Heat to 65 °C for 5 min.", ["65 °C", "5 min"]),
        ("Wait ca. 5 min.", ["ca. 5 min"]),
        ("Add 2–3 mL, or 2 to 3 mL.", ["2–3 mL", "2 to 3 mL"]),
        ("Cool to -5 °C (at most -2 °C).", ["-5 °C", "-2 °C"]),
        ("**5 mL** and *6 mL* and [7 mL](x.md)", ["5 mL", "6 mL", "7 mL"]),
        ("5\N{NO-BREAK SPACE}mL", ["5\N{NO-BREAK SPACE}mL"]),
        ("> 5 mL", ["5 mL"]),
        ("A 0.1 M solution at 5 mL/min.", ["0.1 M", "5 mL/min"]),
        ("CAS 64-17-5, 5 mL", ["5 mL"]),
    ],
)
def test_quantity_outside_a_mark_is_found(sentence: str, marked: list[str]) -> None:
    found = [f for f in faults(step(sentence)) if f.code.number == "Q114"]

    assert [f.span.text for f in found] == marked


@pytest.mark.parametrize(
    "sentence",
    ["Take 3 drops.", "Step 2M and page 4h.", "The `5 mL` typed.", "pH 7 at most.", "No. 5 g-factor",
     "T5 mL", "Two flasks and 25 students.", "5 in the row", "Use {5 mL} and \\{5\\}.", "1/2 mL"]
)  # fmt: skip
def test_number_that_is_no_quantity_may_stand(sentence: str) -> None:
    assert faults(step(sentence)) == ()


@pytest.mark.parametrize(
    "body",
    ["# Use 5 mL", "| 5 mL |\n|---|\n| b |", ":::before\nUse 5 mL.\n:::", ":::question\nUse 5 mL.\n:::",
     ":::instructor\nUse 5 mL.\n:::", ":::question\nA?\n\n:::answer\n5 mL\n:::\n:::",
     ":::instructor\n[6 g]{5 mL acid}\n:::"]
)  # fmt: skip
def test_heading_table_head_and_free_block_may_hold_quantities(body: str) -> None:
    assert faults(judged(body)) == ()


@pytest.mark.parametrize(
    "body", ["5 mL", "- 5 mL", "| a |\n|---|\n| 5 mL |", ":::caution\n5 mL\n:::", "> 5 mL"]
)
def test_quantity_outside_the_steps_is_found_too(body: str) -> None:
    assert places(faults(judged(body))) == [("Q114", "5 mL")]


def test_quantity_on_the_second_line_is_found_in_its_place() -> None:
    finding = only(judged("Words first,\nthen *some* 5 mL.", ""))

    assert (finding.span.text, finding.span.position()) == ("5 mL", (8, 13))


@pytest.mark.parametrize(
    "sentence",
    [
        "[about 5 mL]{5 mL acid -> A}",
        "[for 5 min]{stir A for 5 min}",
        "[for 300 s]{stir A for 5 min}",
        "[2 mL]{2–3 mL acid -> A}",
        "[2–3 mL]{2–3 mL acid -> A}",
        "[5 mL and 5 min]{5 mL acid -> A; stir A for 5 min}",
        "[to 25 °C]{heat A to 25 °C}",
        "[pour it]{5 mL acid -> A}",
        "[3 drops]{stir A}",
    ],
)
def test_words_may_say_what_their_mark_says(sentence: str) -> None:
    assert faults(step(sentence)) == ()


@pytest.mark.parametrize(
    ("sentence", "code", "marked"),
    [
        ("[about 6 mL]{5 mL acid -> A}", "Q115", "6 mL"),
        ("[1 mL]{2–3 mL acid -> A}", "Q115", "1 mL"),
        ("[1–3 mL]{2–3 mL acid -> A}", "Q115", "1–3 mL"),
        ("[for 5 s]{stir A for 5 min}", "Q115", "5 s"),
        ("[by 20 °C]{heat A by 20 K}", "Q115", "20 °C"),
        ("[*about **6 mL***]{5 mL acid -> A}", "Q115", "6 mL"),
        ("[5 min]{stir A}", "Q114", "5 min"),
        ("[5 mL and 6 g]{5 mL acid -> A}", "Q114", "6 g"),
    ],
)
def test_words_that_say_something_else_are_found(sentence: str, code: str, marked: str) -> None:
    assert places(faults(step(sentence))) == [(code, marked)]


def test_words_that_disagree_point_to_their_mark() -> None:
    finding = only(step("[about 6 mL]{5 mL acid -> A}"))

    assert finding.message == "the words say `6 mL`, the mark `5 mL`"
    assert [r.span.text for r in finding.related] == ["{5 mL acid -> A}"]


@pytest.mark.parametrize(
    "sentence",
    ["{5 mL acid -> A} into {A}.", "{5 mL acid -> A}. Then stir {B}.", "{5 mL acid -> A} and the {B}",
     "{5 mL acid -> A} to the neutral {acid}", "{5 mL acid} into {B}", "{A -> B} into {B}"]
)  # fmt: skip
def test_sentence_may_name_the_vessel_of_its_mark(sentence: str) -> None:
    assert faults(step(sentence)) == ()


@pytest.mark.parametrize(
    ("sentence", "marked"),
    [
        ("{5 mL acid -> A} into {B}.", "B"),
        ("{5 mL acid -> A} to {B}.", "B"),
        ("{A -> B} into {A}.", "A"),
        ("{5 mL from A -> B} into {A}.", "A"),
    ],
)
def test_sentence_that_names_another_vessel_is_found(sentence: str, marked: str) -> None:
    finding = only(step(sentence))

    assert (finding.code.number, finding.span.text) == ("N168", marked)
    assert [r.message.startswith("it goes into") for r in finding.related] == [True]


@pytest.mark.parametrize(
    ("body", "code"),
    [
        ("{stir A}", "N198"),
        ("# {stir A}", "N198"),
        ("> {5 mL acid -> A}", "N198"),
        ("- {A -> B}", "N198"),
        (":::caution\n{stir A}\n:::", "N198"),
        (":::before\n{stir A}\n:::", "N198"),
        ("1. x\n\n   :::before\n   {stir A}\n   :::", "N198"),
        (":::instructor\n{stir A}\n:::", "E110"),
        (":::question\n{stir A}\n:::", "E110"),
        (":::question\nA?\n\n:::answer\n{stir A}\n:::\n:::", "E110"),
        ("1. x\n\n   :::instructor\n   {stir A}\n   :::", "E110"),
    ],
)
def test_act_outside_what_students_do_is_found(body: str, code: str) -> None:
    assert [f.code.number for f in faults(judged(body))] == [code]


@pytest.mark.parametrize(
    "body",
    [":::instructor\n{5 mL acid}, {A}, {= 5 g}\n:::", "{A} and {5 mL}", "1. x\n\n   :::caution\n   {stir A}\n   :::",
     ":::if warm\n1. {stir A}\n:::"]
)  # fmt: skip
def test_mark_that_changes_nothing_may_stand_anywhere(body: str) -> None:
    assert faults(judged(body)) == ()
