"""Secret samples on pages: instructors see one worked out, students see no more than what is always true."""

from __future__ import annotations

from typing import TYPE_CHECKING

from builders import judged, steps, surroundings
from watchglass.publish.pages import Neighbours, instructor_page, student_page

if TYPE_CHECKING:
    from watchglass.publish.model import InstructorPage, StudentPage
    from watchglass.shell.pipeline import Judged

PLACE = Neighbours(address="x.html", previous=None, following=None, after=(), addresses={})
FRONT = """\
materials:
  sample: {one-of: {A: naphthalene, B: benzoic acid}, provided: 0.50 g}
  ether: tert-butyl methyl ether
  base: 0.50 M sodium hydroxide
vessels:
  funnel: separatory funnel 125 mL
  A: beaker 100 mL
show: [components]
expect:
  - sample in A after label(out) >= 50 %
"""
BODY = steps(
    "Put {0.50 g sample -> funnel} and {30 mL ether -> funnel} in, add {20 mL base -> funnel}, {shake funnel, stoppered; settle funnel}.",
    "Draw {funnel.aqueous -> A} into {A}.{label out}",
)


def entry() -> Judged:
    return judged(BODY, FRONT)


def student() -> StudentPage:
    e = entry()
    return student_page(e.case, e.path, PLACE, surroundings().catalogue, e.run)


def instructor() -> InstructorPage:
    e = entry()
    return instructor_page(
        e.case,
        e.path,
        PLACE,
        surroundings().catalogue,
        findings=e.findings,
        accepted=(),
        run=e.run,
    )


def test_students_page_names_no_candidate() -> None:
    said = str(student()).casefold()

    assert "naphthalene" not in said
    assert "benzoic" not in said


def test_layer_is_placed_where_every_candidate_leaves_it_there() -> None:
    assert "the lower (aqueous) layer" in str(student())


def test_instructor_sees_the_first_candidate_and_is_told_which() -> None:
    page = instructor()

    assert "naphthalene" in str(page.bench)
    assert any("sample is naphthalene" in line for line in page.assumptions)
    assert any("sample is benzoic acid" in line for line in page.assumptions)


def test_expectation_says_what_became_of_it_with_each_candidate() -> None:
    (line,) = instructor().expectations

    assert "missed" in line.outcome
    assert "as expected" in line.outcome
