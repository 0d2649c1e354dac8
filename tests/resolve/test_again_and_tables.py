"""Repetitions by number and label, exchanges, and tables of charges."""

from __future__ import annotations

import pytest

from builders import Judged, faults, judged, only, places, step
from watchglass.resolve import model

BEFORE = ("Do {5 mL acid -> A}{label first}.", "Do {stir A for 1 min}{label second}.")


def again(mark: str) -> Judged:
    return step(*BEFORE, f"Now {{stir B; {mark}}}.")


@pytest.mark.parametrize(
    ("mark", "steps", "times", "at_most", "fresh"),
    [
        ("again 1", (1,), 1, None, False),
        ("again 1–2", (1, 2), 1, None, False),
        ("again 1, 2", (1, 2), 1, None, False),
        ("again 2, 1", (2, 1), 1, None, False),
        ("again 1–2, 1", (1, 2), 1, None, False),
        ("again 3", (3,), 1, None, False),
        ("again 1–3", (1, 2, 3), 1, None, False),
        ("again first", (1,), 1, None, False),
        ("again first, second, 2 more times", (1, 2), 2, None, False),
        ("again 1–2, 2 more times, at most 4, fresh", (1, 2), 2, 4, True),
    ],
)
def test_steps_are_named_by_number_or_label(
    mark: str, steps: tuple[int, ...], times: int, at_most: int | None, fresh: bool
) -> None:
    entry = again(mark)
    event = entry.procedure.steps[2].events[-1]

    assert places(faults(entry)) == []
    assert isinstance(event, model.Again)
    assert (event.steps, event.times, event.at_most, event.fresh, event.step) == (
        steps,
        times,
        at_most,
        fresh,
        3,
    )


@pytest.mark.parametrize(
    ("mark", "code", "marked", "message"),
    [
        ("again 2–1", "Q116", "2–1", "the steps run from 2 back to 1"),
        ("again 4", "N165", "4", "there is no step 4 before this place"),
        ("again 0", "N165", "0", "there is no step 0 before this place"),
        ("again 1–9", "N165", "1–9", "there is no step 9 before this place"),
        ("again 999999999", "N165", "999999999", "there is no step 999999999 before this place"),
        ("again frst", "N163", "frst", "`frst` is declared nowhere"),
        ("again acid", "N164", "acid", "`acid` is a material; a label belongs here"),
        ("again 1 with zz as A", "N163", "zz", "`zz` is declared nowhere"),
        ("again 1 with B as zz", "N163", "zz", "`zz` is declared nowhere"),
        ("again 1 with lamp as A", "N164", "lamp", "`lamp` is equipment; a vessel or a material belongs here"),
        ("again 1 with acid as A", "N164", "acid", "`acid` is a material, `A` a vessel: they cannot be exchanged"),
    ],
)  # fmt: skip
def test_repetition_of_what_is_not_there_is_found(
    mark: str, code: str, marked: str, message: str
) -> None:
    finding = only(again(mark))

    assert (finding.code.number, finding.span.text, finding.message) == (code, marked, message)


def test_label_of_a_later_step_cannot_be_repeated() -> None:
    finding = only(step("Do {stir A}, {again later}.", "Do {stir B}{label later}."))

    assert (finding.code.number, finding.span.text) == ("N165", "later")


def test_label_outside_the_steps_cannot_be_repeated() -> None:
    finding = only(judged("Here {label above}.\n\n1. Do {stir A}, {again above}."))

    assert (finding.code.number, finding.message) == (
        "N165",
        "`above` labels no step before this place",
    )


def test_exchanges_are_kept_in_pairs() -> None:
    event = again("again 1 with B, funnel as A").procedure.steps[2].events[-1]

    assert isinstance(event, model.Again)
    assert event.exchanges == (("B", "A"), ("funnel", "A"))


# ------------------------------------------------------------------------------ charge tables


def table(*rows: str, argument: str = "") -> Judged:
    lines = [rows[0], "|---" * (rows[0].count("|") - 1) + "|", *rows[1:]]
    block = "\n".join(f"   {line}" for line in (f":::charge{argument}", *lines, ":::"))
    return judged(f"1. Do:\n\n{block}\n")


def charges(entry: Judged) -> list[tuple[str, str, str, str]]:
    return [
        (portion.material, portion.quantity.text, event.target.name.text, event.ware)
        for event in entry.procedure.steps[0].events
        if isinstance(event, model.Charge)
        for portion in event.portions
        if portion.quantity
    ]


def test_table_charges_column_by_column_and_leaves_empty_cells_out() -> None:
    entry = table(
        "| tube | acid / mL | water / mL |",
        "| tube-1 | 1.0 | 2.0 |",
        "| tube-2 | 2.00 | – |",
        "| tube-3 |  | 0 |",
    )

    assert places(faults(entry)) == []
    assert charges(entry) == [
        ("acid", "1.0 mL", "tube-1", ""),
        ("acid", "2.00 mL", "tube-2", ""),
        ("water", "2.0 mL", "tube-1", ""),
    ]


def test_table_keeps_the_ware_and_reads_counts_ranges_and_marks() -> None:
    entry = table(
        "| {A} | {acid} / drops | water / mL |", "| {A} | 3 | 1–2 |", argument=" by cylinder"
    )

    assert places(faults(entry)) == []
    assert charges(entry) == [
        ("acid", "3 drops", "A", "cylinder"),
        ("water", "1–2 mL", "A", "cylinder"),
    ]


@pytest.mark.parametrize(
    ("rows", "found"),
    [
        (("| v | acid |", "| A | 1.0 |", "| B | 2 |"), [("N123", "acid")]),
        (("| v | acid / zz |", "| A | 1.0 |", "| B | 2 |"), [("Q105", "zz")]),
        (("| v | acid / N |", "| A | 1.0 |", "| B | 2 |"), [("Q106", "N")]),
        (("| v | acid / min |", "| A | 1.0 |", "| B | 2 |"), [("Q109", "min")]),
        (("| v | zz / mL |", "| A | 1.0 |", "| B | 2 |"), [("N163", "zz")]),
        (("| v | lamp / mL |", "| A | 1.0 |"), [("N164", "lamp")]),
        (("| v | acid / mL |", "| zz | 1.0 |", "| lamp | 1 |"), [("N163", "zz"), ("N164", "lamp")]),
        (("| v | acid / mL |", "| A | 1,0 |", "| B | 2 |"), [("Q102", "1,0")]),
        (("| v | acid / mL |", "| A | some |"), [("Q101", "some")]),
        (("| v | acid / mL |", "| A | 1.0 mL |"), [("Q101", "1.0 mL")]),
        (("| v | acid / mL |", "| A | -1 |"), [("Q110", "-1")]),
    ],
)
def test_fault_in_a_table_is_found_once_at_its_cell(
    rows: tuple[str, ...], found: list[tuple[str, str]]
) -> None:
    assert places(faults(table(*rows))) == found


@pytest.mark.parametrize(
    ("block", "marked"),
    [(":::charge\nwords\n:::", ":::charge"), (":::charge\n| v |\n|---|\n| A |\n:::", ":::charge")],
)
def test_block_without_a_table_of_charges_is_found(block: str, marked: str) -> None:
    body = "1. Do:\n\n" + "\n".join(f"   {line}" for line in block.split("\n"))

    assert places(faults(judged(body))) == [("N123", marked)]
