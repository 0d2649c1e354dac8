"""The student's models hold nothing of the instructor's; the instructor's hold everything."""

from __future__ import annotations

from dataclasses import fields, is_dataclass
from typing import TYPE_CHECKING

import pytest

from builders import golden, instructor, judged, student
from watchglass.publish import model as m
from watchglass.publish.body import text_of

if TYPE_CHECKING:
    from collections.abc import Iterator

BODY = """\
Before all.

:::instructor
## Hidden part

A word of HIDDEN.
:::

## Open part

1. Put {2.50 g salt -> A} into {A}. Record {? m: mass in g = mass(salt)} and {? half: half of it in g = m / 2}.

:::question
Asked.

:::answer
HIDDEN answer.
:::
:::
"""
FRONT = "materials: {salt: sodium chloride}\nvessels: {A: beaker 50 mL}\nexpect: [m >= 2.00 g]"


def parts(value: object) -> Iterator[object]:
    yield value
    if is_dataclass(value):
        for field in fields(value):
            yield from parts(getattr(value, field.name))
    elif isinstance(value, tuple):
        for item in value:
            yield from parts(item)


@pytest.mark.parametrize("name", ["oc-04", "gc-02", "oc-09"])
def test_no_instructor_type_is_anywhere_in_a_student_page(name: str) -> None:
    hidden = (m.InstructorPanel, m.ExpectedBlank, m.FindingLine, m.ExpectationLine)

    assert [part for part in parts(student(golden(name))) if isinstance(part, hidden)] == []


def test_hidden_words_are_in_the_instructors_model_only() -> None:
    entry = judged(BODY, FRONT)

    assert "HIDDEN" not in repr(student(entry))
    assert repr(instructor(entry)).count("HIDDEN") == 2


def test_a_hidden_heading_leaves_no_trace_in_the_students_outline() -> None:
    entry = judged(BODY, FRONT)

    assert [text for _, _, text in student(entry).facts.outline] == ["Open part"]
    assert [t for _, _, t in instructor(entry).facts.outline] == ["Hidden part", "Open part"]


def test_a_record_is_a_blank_for_students_and_an_expected_value_for_instructors() -> None:
    entry = judged(BODY, FRONT)
    blanks = [part for part in parts(student(entry)) if isinstance(part, m.Blank)]
    expected = [part for part in parts(instructor(entry)) if isinstance(part, m.ExpectedBlank)]

    assert [(b.label, text_of(b.unit)) for b in blanks] == [("mass", "g"), ("half of it", "g")]
    assert [text_of(e.expected or ()) for e in expected] == ["2.50 g", "1.25 g"]


def test_expectations_are_not_assessed_before_the_bench_is_run() -> None:
    (line,) = instructor(judged(BODY, FRONT)).expectations

    assert line.words == "m >= 2.00 g"
    assert line.outcome.startswith("not assessed")
