"""What is measured against the ware named for it: figures, one filling, least volume, one mark."""

from __future__ import annotations

import pytest

from builders import faults, places, step

FRONT = """\
materials: {acid: 3.0 M hydrochloric acid, salt: sodium chloride, water: water}
vessels:
  A: beaker 250 mL
  B: volumetric flask 100 mL
  pot: round-bottom flask 100 mL
  cylinder: graduated cylinder 25 mL
  burette: burette 50 mL
  graduated: graduated pipette 10 mL
  pipette: transfer pipette 25 mL, class A
  unsized: graduated cylinder
  cup: {1-3: beaker 50 mL}
equipment:
  small: measuring cylinder 10 mL
  scales: balance reading to 0.01 g
  fine: analytical balance, 0.1 mg
  spatula: spatula
"""


def told(sentence: str) -> list[tuple[str, str]]:
    return [tuple(place) for place in places(faults(step(sentence, front=FRONT)))]


def helped(sentence: str) -> str:
    (finding,) = faults(step(sentence, front=FRONT))
    return finding.help or ""


@pytest.mark.parametrize(
    "sentence",
    [
        "{12 mL acid by cylinder -> A}",
        "{15.0 mL acid by cylinder -> A}",
        "{2.5 mL acid by cylinder -> A}",
        "{25 mL acid by cylinder -> A}",
        "{ca. 10 mL acid by cylinder -> A}",
        "{ca. 1 mL acid by cylinder -> A}",
        "{1–2 mL acid by cylinder -> A}",
        "{0–3 mL acid by cylinder -> A}",
        "{0.015 L acid by cylinder -> A}",
        "{5.0 mL acid by graduated -> A}",
        "{5.00 mL acid by graduated -> A}",
        "{25.00 mL acid by pipette -> A}",
        "{25 mL acid by pipette -> A}",
        "{ca. 24 mL acid by pipette -> A}",
        "{12.34 mL acid from burette -> A}",
        "{12.34 mL from burette -> A}",
        "{100 mL water by A -> B}",
        "{125 mL water by A -> B}",
        "{12.345 mL acid from pot -> A}",
        "{12.345 mL from pot -> A}",
        "{12.345 mL acid -> A}",
        "{12.345 mL acid by unsized -> A}",
        "{12.345 mL acid by pot -> A}",
        "{12.345 mL acid by spatula -> A}",
        "{0.17 g salt by scales -> A}",
        "{0.1705 g salt by fine -> A}",
        "{1.2345 g salt by spatula -> A}",
        "{15.0 ± 0.5 mL acid by cylinder -> A}",
        "{fill B with water to mark}",
        "{fill B with water to 100.00 mL}",
        "{3 drops acid by cylinder -> A}",
    ],
)
def test_what_the_ware_can_give_is_left_alone(sentence: str) -> None:
    assert told(sentence) == []


@pytest.mark.parametrize(
    ("sentence", "marked"),
    [
        ("{15.00 mL acid by cylinder -> A}", "15.00 mL"),
        ("{ca. 15.25 mL acid by cylinder -> A}", "ca. 15.25 mL"),
        ("{12.5–15.75 mL acid by cylinder -> A}", "12.5–15.75 mL"),
        ("{0.01500 L acid by cylinder -> A}", "0.01500 L"),
        ("{5.00 mL acid by small -> A}", "5.00 mL"),
        ("{12.345 mL acid from burette -> A}", "12.345 mL"),
        ("{12.345 mL from burette -> A}", "12.345 mL"),
        ("{titrate A with acid from burette, giving 12.345 mL}", "12.345 mL"),
        ("{25.000 mL acid by pipette -> A}", "25.000 mL"),
        ("{fill A with water to 100.0 mL}", "100.0 mL"),
        ("{fill A with 15.00 mL water by cylinder}", "15.00 mL"),
        ("{15.0 ± 0.01 mL acid by cylinder -> A}", "15.0 ± 0.01 mL"),
        ("{0.1705 g salt by scales -> A}", "0.1705 g"),
    ],
)
def test_a_digit_that_the_ware_cannot_give_is_found(sentence: str, marked: str) -> None:
    assert told(sentence) == [("B100", marked)]


def test_more_than_one_filling_is_found() -> None:
    assert told("{30 mL acid by cylinder -> A}") == [("B101", "30 mL")]


def test_fillings_of_a_pipette_are_counted() -> None:
    assert told("{50.00 mL acid by pipette -> A}") == [("B101", "50.00 mL")]
    assert "2 charges of 25 mL" in helped("{50.00 mL acid by pipette -> A}")


@pytest.mark.parametrize(
    "sentence", ["{1 mL acid by cylinder -> A}", "{0.1 mL acid by graduated -> A}"]
)
def test_too_little_for_the_ware_is_found(sentence: str) -> None:
    assert [code for code, _ in told(sentence)] == ["B102"]


@pytest.mark.parametrize(
    "sentence", ["{20.00 mL acid by pipette -> A}", "{fill B with water to 50 mL}"]
)
def test_ware_with_one_mark_gives_no_other_volume(sentence: str) -> None:
    assert [code for code, _ in told(sentence)] == ["B103"]


def test_help_says_how_to_write_the_figure() -> None:
    assert "`15.0 mL`" in helped("{15.00 mL acid by cylinder -> A}")


def test_same_slip_in_several_charges_is_one_finding_with_all_places() -> None:
    entry = step(
        "{15.00 mL acid by cylinder -> cup-1} {15.00 mL acid by cylinder -> cup-2} {15.00 mL acid by cylinder -> cup-3}",
        front=FRONT,
    )
    (finding,) = faults(entry)

    assert [related.span.text for related in finding.related] == [
        "cylinder",
        "15.00 mL",
        "15.00 mL",
    ]


def test_cells_of_a_charge_table_are_held_to_its_ware() -> None:
    entry = step(
        "Charge them.\n\n   :::charge by cylinder\n\n   | | acid / mL |\n   |---|---|\n   | cup-1 | 5.00 |\n   | cup-2 | 5.0 |\n\n   :::",
        front=FRONT,
    )

    assert [tuple(place) for place in places(faults(entry))] == [("B100", "5.00")]


def test_draft_is_judged_as_written_and_not_as_scaled() -> None:
    front = FRONT + "scale: 0.1\n"

    assert "B102" not in [
        f.code.number for f in faults(step("{10 mL acid by cylinder -> A}", front=front))
    ]
