"""Case files: faults as they are made at a desk, each with its note above the line.

`--update-golden` rewrites the notes with what is found now; the diff is then read like code.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from cases.harness import (
    CASES,
    Note,
    above_note,
    case_paths,
    check_files,
    note_of,
    put_notes,
    take_notes,
    told,
)

if TYPE_CHECKING:
    from pathlib import Path


@pytest.mark.parametrize("path", case_paths(), ids=lambda path: str(path.relative_to(CASES)))
def test_case_gives_just_the_findings_noted(path: Path, request: pytest.FixtureRequest) -> None:
    text, notes = take_notes(path.read_text(encoding="utf-8"))
    name = f"procedures/{path.stem}.md"
    findings = above_note(check_files({name: text}))
    seen = sorted(note_of(finding) for finding in findings)
    if request.config.getoption("--update-golden"):
        path.write_text(put_notes(text, seen), encoding="utf-8")
        return

    assert {f.span.source.name for f in findings} <= {name}, told(findings)
    assert [note.place for note in seen] == [note.place for note in sorted(notes)], told(findings)
    missing = [
        (wanted.message, found.message)
        for wanted, found in zip(sorted(notes), seen, strict=True)
        if wanted.message not in found.message
    ]
    assert missing == []


def test_there_are_cases_for_each_stage_that_finds_faults() -> None:
    assert {path.parent.name for path in case_paths()} >= {"read", "resolve", "judge"}


def test_notes_are_taken_out_and_speak_of_the_next_line() -> None:
    text, notes = take_notes(
        "one\n<!-- error N163 8-13 `acidd` -->\n  <!-- warning Q114 1-2 x -->\ntwo\n"
    )

    assert text == "one\ntwo\n"
    assert notes == (
        Note(2, "error", "N163", 8, 13, "`acidd`"),
        Note(2, "warning", "Q114", 1, 2, "x"),
    )


def test_notes_put_back_stand_where_they_stood() -> None:
    case = "one\n<!-- error N163 8-13 `acidd` -->\n<!-- error N165 20-20 x -->\ntwo\n"

    assert put_notes(*take_notes(case)) == case


def test_other_comments_are_left_in_place() -> None:
    text, notes = take_notes("<!-- error N163 -->\n<!-- to do -->\n")

    assert (text, notes) == ("<!-- error N163 -->\n<!-- to do -->\n", ())
