"""Order, repeats and counts of findings."""

from __future__ import annotations

from dataclasses import replace

import pytest

from shell.findings_builder import NOT_RUN, OVERFILLED, UNUSED, finding
from watchglass.base.findings import Edit, Finding, Related
from watchglass.shell.rendering.tally import Counts, arrange


def test_findings_are_sorted_by_file_place_and_weight() -> None:
    late = finding("ab ⟦c⟧\n", message="late", name="a.md")
    noted = finding("⟦a⟧b c\n", message="noted", name="a.md", code=NOT_RUN)
    warned = finding("⟦ab⟧ c\n", message="warned", name="a.md", code=UNUSED)
    failed = finding("⟦ab c⟧\n", message="failed", name="a.md")
    other = finding("⟦a⟧\n", message="other", name="b.md")

    arranged = arrange([other, noted, late, warned, failed])

    assert [found.message for found in arranged] == ["failed", "warned", "noted", "late", "other"]


def test_exact_repeats_are_dropped_though_their_sources_differ() -> None:
    assert len(arrange([finding("⟦a⟧\n"), finding("⟦a⟧\n")])) == 1


BASE = finding("⟦a⟧ ⟪b⟫\n", code=UNUSED)


@pytest.mark.parametrize(
    "other",
    [
        replace(BASE, message="m"),
        replace(BASE, label=None),
        replace(BASE, help="h"),
        replace(BASE, code=OVERFILLED),
        replace(BASE, fix=Edit(BASE.span, "")),
        replace(BASE, related=(Related(BASE.span, "r"),)),
    ],
    ids=["message", "label", "help", "code", "fix", "related"],
)
def test_what_differs_in_anything_is_kept(other: Finding) -> None:
    assert len(arrange([BASE, other])) == 2


@pytest.mark.parametrize(
    ("errors", "warnings", "notes", "files", "sentence"),
    [
        (2, 1, 0, 3, "2 errors, 1 warning in 3 files"),
        (1, 0, 0, 1, "1 error in 1 file"),
        (0, 2, 1, 1, "2 warnings, 1 note in 1 file"),
        (0, 0, 0, 0, ""),
    ],
)
def test_counts_are_said_in_a_sentence(
    errors: int, warnings: int, notes: int, files: int, sentence: str
) -> None:
    counts = Counts(errors=errors, warnings=warnings, notes=notes, files=files)

    assert counts.sentence == sentence


@pytest.mark.parametrize(
    ("errors", "warnings", "notes", "strict", "fails"),
    [
        (1, 0, 0, False, True),
        (0, 1, 0, False, False),
        (0, 1, 0, True, True),
        (0, 0, 1, True, False),
        (0, 0, 0, True, False),
    ],
)
def test_notes_never_fail_and_warnings_only_if_strict(
    errors: int, warnings: int, notes: int, *, strict: bool, fails: bool
) -> None:
    counts = Counts(errors=errors, warnings=warnings, notes=notes, files=1)

    assert counts.fails(strict=strict) is fails
