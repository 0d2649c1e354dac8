"""Ordinary procedures of the trade, written for this: none of them gets a finding, nor needs an `accept`."""

from __future__ import annotations

from pathlib import Path

import pytest

from builders import surroundings
from watchglass.base.findings import Severity
from watchglass.base.spans import Source
from watchglass.shell.pipeline import analyse_procedure

SOUND = sorted((Path(__file__).parent / "sound").glob("*.md"))


def test_there_are_ten_of_them() -> None:
    assert len(SOUND) >= 10


@pytest.mark.parametrize("path", SOUND, ids=lambda path: path.stem)
def test_ordinary_procedure_is_silent(path: Path) -> None:
    source = Source.of(f"procedures/{path.name}", path.read_text("utf-8"))
    entry = analyse_procedure(source.name, source, surroundings())

    said = [f"{f.code.number} {f.span.text!r}: {f.message}" for f in entry.findings]
    assert said == []
    assert entry.run is not None
    assert "accept:" not in source.text


@pytest.mark.parametrize("path", SOUND, ids=lambda path: path.stem)
def test_ordinary_procedure_is_run_without_anything_unknown(path: Path) -> None:
    source = Source.of(f"procedures/{path.name}", path.read_text("utf-8"))
    entry = analyse_procedure(source.name, source, surroundings())

    assert entry.run is not None
    unknown = {
        name: vessel.unknown
        for name, vessel in entry.run.ledger.end.vessels.items()
        if vessel.unknown
    }
    assert unknown == {}
    assert all(f.code.severity is not Severity.NOTE for f in entry.findings)
