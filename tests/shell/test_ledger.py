"""`watchglass ledger`: text that a chemist can read, JSON that holds to its schema, and its endings."""

from __future__ import annotations

import json
import re
from pathlib import Path
from typing import Any

import jsonschema
import pytest

from watchglass.shell.cli import main
from watchglass.shell.schemas import schemas

GOLDEN = Path(__file__).parents[1] / "golden" / "procedures"
DRAFT = """\
---
title: Acid and base
code: T-01
materials:
  acid: 0.500 M hydrochloric acid
  base: 1.00 M sodium hydroxide
  sample: {one-of: {A: naphthalene, B: benzoic acid}}
vessels:
  A: beaker 100 mL
---

1. Put {20.0 mL acid -> A} and {0–10.0 mL base -> A, until "clear"} into {A}. {stir A}
"""


def text_of(path: Path, capsys: pytest.CaptureFixture[str], *options: str) -> str:
    assert main(["ledger", str(path), *options]) == 0
    return capsys.readouterr().out


def data_of(path: Path, capsys: pytest.CaptureFixture[str], *options: str) -> dict[str, Any]:
    data: dict[str, Any] = json.loads(text_of(path, capsys, "--format", "json", *options))
    return data


@pytest.fixture
def draft(tmp_path: Path) -> Path:
    path = tmp_path / "a.md"
    path.write_text(DRAFT.replace("  sample: {one-of: {A: naphthalene, B: benzoic acid}}\n", ""))
    return path


@pytest.mark.parametrize("name", ["oc-04", "gc-02", "oc-09"])
def test_data_hold_to_the_documented_schema(name: str, capsys: pytest.CaptureFixture[str]) -> None:
    jsonschema.validate(data_of(GOLDEN / f"{name}.md", capsys), schemas()["ledger"])


def test_every_number_has_a_unit_and_a_known_source(capsys: pytest.CaptureFixture[str]) -> None:
    data = data_of(GOLDEN / "oc-04.md", capsys)

    def numbers(node: object) -> list[dict[str, Any]]:
        if isinstance(node, dict):
            if "value" in node:
                return [node]
            return [n for child in node.values() for n in numbers(child)]
        if isinstance(node, list):
            return [n for child in node for n in numbers(child)]
        return []

    found = numbers(data["runs"])
    assert len(found) > 100
    assert all(n["unit"] for n in found)
    assert {n["from"] for n in found} <= set(data["sources"])


def test_text_shows_step_act_outcome_and_contents(
    draft: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    said = text_of(draft, capsys)

    assert "Step 1" in said
    assert "20.0 mL acid -> A" in said
    assert re.search(r"A: aqueous 20\.0 mL, pH 0\.30: Cl⁻ 10\.0 mmol", said)


def test_open_amount_is_shown_at_both_ends(draft: Path, capsys: pytest.CaptureFixture[str]) -> None:
    runs = data_of(draft, capsys)["runs"]

    assert list(runs) == ["low", "high"]
    volumes = [run["end"]["vessels"]["A"]["aqueous"]["volume"]["value"] for run in runs.values()]
    assert volumes == [pytest.approx(20e-6), pytest.approx(30e-6)]
    assert "high end" in text_of(draft, capsys)


def test_scaled_run_says_so(draft: Path, capsys: pytest.CaptureFixture[str]) -> None:
    data = data_of(draft, capsys, "--scale", "2")

    vessel = data["runs"]["low"]["end"]["vessels"]["A"]
    assert vessel["aqueous"]["volume"]["value"] == pytest.approx(40e-6)
    assert "Scaled by 2" in text_of(draft, capsys, "--scale", "2")


def test_each_candidate_of_a_secret_sample_is_run(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    path = tmp_path / "a.md"
    path.write_text(DRAFT.replace("into {A}. {stir A}", "into {A}; {0.10 g sample -> A}. {stir A}"))

    assert list(data_of(path, capsys)["runs"]) == [
        f"sample is {name}, {end}"
        for name in ("naphthalene", "benzoic acid")
        for end in ("low", "high")
    ]


def test_entries_of_a_branch_name_it(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    path = tmp_path / "a.md"
    body = "\n:::if it is cloudy\n2. Add {5.0 mL acid -> A}.\n:::\n"
    path.write_text(
        DRAFT.replace("  sample: {one-of: {A: naphthalene, B: benzoic acid}}\n", "") + body
    )

    branches = [e["branch"] for e in data_of(path, capsys)["runs"]["low"]["entries"]]
    assert branches == [None, None, None, "it is cloudy"]
    assert "only if it is cloudy" in text_of(path, capsys)


def test_draft_with_errors_is_not_run(draft: Path, capsys: pytest.CaptureFixture[str]) -> None:
    draft.write_text(draft.read_text().replace("20.0 mL", "20.0 mLL"))

    assert main(["ledger", str(draft)]) == 1
    assert "error[Q105" in capsys.readouterr().out


def test_file_that_is_no_procedure_is_refused(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    (tmp_path / "a.yml").write_text("x: 1\n")

    assert main(["ledger", str(tmp_path / "a.yml")]) == 2
    assert "is no procedure" in capsys.readouterr().err


def test_lines_are_no_longer_than_a_terminal(capsys: pytest.CaptureFixture[str]) -> None:
    assert max(map(len, text_of(GOLDEN / "oc-04.md", capsys).splitlines())) <= 100
