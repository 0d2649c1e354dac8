"""The published cases, as parameters of tests."""

from __future__ import annotations

import csv
import json
from pathlib import Path
from typing import Any

import pytest

DATA = Path(__file__).parent / "data"


def cases(file: str, kind: str) -> list[Any]:
    """Give the cases of one kind as parameters, each under its own id."""
    listed = json.loads((DATA / file).read_text(encoding="utf-8"))
    found = [pytest.param(case, id=case["id"]) for case in listed if case["kind"] == kind]
    if not found:
        raise ValueError(f"{file} has no case of kind {kind}")
    return found


def kinds(file: str) -> set[str]:
    """Give the kinds of cases in a file."""
    return {case["kind"] for case in json.loads((DATA / file).read_text(encoding="utf-8"))}


def rows(file: str) -> list[Any]:
    """Give the rows of a table as parameters, each under its name."""
    with (DATA / file).open(encoding="utf-8", newline="") as table:
        return [pytest.param(row, id=row["name"]) for row in csv.DictReader(table)]
