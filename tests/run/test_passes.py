"""The order in which things happen: `again` by step, in its own step, nested, exchanged, bounded."""

from __future__ import annotations

import pytest

from builders import Judged, golden, step
from watchglass.resolve import model


def course(*sentences: str) -> list[str]:
    """Give all that happens as `step.turn act`, in order."""
    return told(step(*sentences))


def told(entry: Judged) -> list[str]:
    return [
        f"{h.step}.{h.turn} {_word(h.event)}{' fresh' if h.fresh else ''}"
        for h in entry.case.course.happenings
    ]


def _word(event: model.Event) -> str:
    match event:
        case model.Operation(verb, place, _, _, _, _, _, _):
            return verb + (f" {place.name.text}" if place else "")
        case model.Charge(portions, target, _, _):
            return f"{portions[0].material}->{target.name.text}"
        case model.Labelled(name, _):
            return f"label {name}"
        case _:
            return type(event).__name__.lower()


def test_steps_happen_in_their_order() -> None:
    assert course("{5 mL acid -> A}{stir A}", "{stir B}") == [
        "1.1 acid->A",
        "1.1 stir A",
        "2.1 stir B",
    ]


def test_any_number_of_repetitions_may_follow_one_another() -> None:
    # Only repetitions within repetitions are cut, never those that stand beside one another.
    entry = step("{stir A}", *["{again 1}"] * 20)

    assert entry.case.course.cut is None
    assert told(entry)[-1] == "1.21 stir A"


@pytest.mark.parametrize(
    ("mark", "after"),
    [
        ("again 1", ["1.2 stir A"]),
        ("again 1–2", ["1.2 stir A", "2.2 stir B"]),
        ("again 2, 1", ["2.2 stir B", "1.2 stir A"]),
        ("again 1, 2 more times", ["1.2 stir A", "1.3 stir A"]),
        ("again 1–2, 2 more times", ["1.2 stir A", "2.2 stir B", "1.3 stir A", "2.3 stir B"]),
        ("again 1, 1 more time, at most 5", ["1.2 stir A"]),
        ("again 1, fresh", ["1.2 stir A fresh"]),
        ("again 1, 1, 2", ["1.2 stir A", "2.2 stir B"]),
    ],
)
def test_repetition_does_its_steps_where_it_stands(mark: str, after: list[str]) -> None:
    happened = course("{stir A}", "{stir B}", f"{{vent funnel; {mark}; heat A}}")

    assert happened == ["1.1 stir A", "2.1 stir B", "3.1 vent funnel", *after, "3.1 heat A"]


def test_own_step_means_what_stands_before() -> None:
    assert course("{stir A; vent A; again 1, 2 more times; heat A}") == [
        "1.1 stir A", "1.1 vent A", "1.2 stir A", "1.2 vent A", "1.3 stir A", "1.3 vent A", "1.1 heat A",
    ]  # fmt: skip


def test_range_that_ends_in_its_own_step_does_only_what_stands_before() -> None:
    assert course("{stir A}", "{vent A; again 1–2; heat A}") == [
        "1.1 stir A", "2.1 vent A", "1.2 stir A", "2.2 vent A", "2.1 heat A",
    ]  # fmt: skip


def test_repetition_within_a_repeated_step_is_done_again_too() -> None:
    assert course("{stir A}", "{vent A; again 1}", "{again 2}") == [
        "1.1 stir A", "2.1 vent A", "1.2 stir A", "2.2 vent A", "1.3 stir A",
    ]  # fmt: skip


def test_exchange_names_one_pass_each() -> None:
    entry = step("{5 mL acid -> tube-1}", "{again 1 with tube-2, tube-3 as tube-1}")
    passes = [(h.turn, h.name("tube-1")) for h in entry.case.course.happenings]

    assert passes == [(1, "tube-1"), (2, "tube-2"), (3, "tube-3")]


def test_single_exchange_lasts_for_all_its_passes() -> None:
    entry = step("{5 mL acid -> A}", "{again 1, 2 more times with B as A}")

    assert [h.name("A") for h in entry.case.course.happenings] == ["A", "B", "B"]


def test_exchange_goes_both_ways() -> None:
    entry = step("{A -> B}", "{again 1 with B as A}")
    last = entry.case.course.happenings[-1]

    assert (last.name("A"), last.name("B"), last.name("funnel")) == ("B", "A", "funnel")


def test_freshness_reaches_into_nested_repetitions() -> None:
    assert course("{stir A}", "{vent A; again 1}", "{again 2, fresh}")[-2:] == [
        "2.2 vent A fresh",
        "1.3 stir A fresh",
    ]


def test_repetitions_that_multiply_are_cut_at_the_one_that_did_it() -> None:
    entry = step("{stir A}", "{again 1, 1000 more times}", "{again 2, 1000 more times}")

    assert entry.case.course.cut is not None
    assert entry.case.course.cut.span.text == "again 1, 1000 more times"
    assert len(entry.case.course.happenings) < 30_000


def test_repetitions_of_nothing_are_cut_too() -> None:
    sentences = ["Words only."]
    sentences += [f"{{again {n}, 1000 more times}}" for n in range(1, 8)]
    entry = step(*sentences)

    assert entry.case.course.cut is not None


def test_many_passes_within_the_bound_are_done() -> None:
    entry = step("{stir A}", "{again 1, 1000 more times}")

    assert entry.case.course.cut is None
    assert len(entry.case.course.happenings) == 1001


def test_titration_is_done_three_times_with_clean_glassware() -> None:
    happened = told(golden("gc-02"))

    assert happened.count("1.1 standard->flask") == 1
    assert [h for h in happened if "standard" in h] == [
        "1.1 standard->flask",
        "1.2 standard->flask fresh",
        "1.3 standard->flask fresh",
    ]
    assert len(happened) == 3 * 9


def test_two_washes_of_the_parting_are_done_twice() -> None:
    happened = told(golden("oc-04"))

    assert [h for h in happened if h.endswith(("acid->funnel", "base->funnel"))] == [
        "3.1 acid->funnel",
        "3.2 acid->funnel",
        "6.1 base->funnel",
        "6.2 base->funnel",
    ]
    assert happened.count("7.2 transfer") == 1


def test_step_without_events_is_counted_as_often_as_it_is_repeated() -> None:
    course = step("Note {? m: mass in g}.", "{again 1, 2 more times}").case.course

    assert (course.happenings, dict(course.turns)) == ((), {1: 3, 2: 1})
