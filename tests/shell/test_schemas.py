"""JSON Schemas: every field table is in them, the demo holds to them, planted errors do not."""

from __future__ import annotations

import json
from pathlib import Path
from typing import TYPE_CHECKING, Any

import jsonschema
import pytest
import yaml

from builders import golden, surroundings
from shell.findings_builder import finding
from watchglass.catalogue import decode, ware
from watchglass.publish.ledger_data import ledger_data
from watchglass.resolve import head, laboratory, materials, page, reactions, schedule
from watchglass.shell.cli import main
from watchglass.shell.rendering import json_
from watchglass.shell.rendering.style import Style
from watchglass.shell.schemas import schemas, write_schemas

if TYPE_CHECKING:
    from watchglass.base.fields import Field

ROOT = Path(__file__).parents[2]
SETS = [ROOT / "procedures_src", ROOT / "generator/watchglass/shell/beginnings"]
FILES = [
    (path, "substances" if path.parent.name == "substances" else path.stem)
    for root in SETS
    for path in sorted(root.rglob("*.yml"))
    if path.name != "mkdocs.yml"
]
PROCEDURES = [
    *sorted((ROOT / "procedures_src/procedures").glob("*.md")),
    *sorted((ROOT / "tests/golden/procedures").glob("*.md")),
]


def validator(name: str) -> jsonschema.Draft202012Validator:
    schema = schemas()[name]
    jsonschema.Draft202012Validator.check_schema(schema)
    return jsonschema.Draft202012Validator(schema)


def faults(name: str, value: Any) -> list[str]:
    return [error.message for error in validator(name).iter_errors(value)]


@pytest.mark.parametrize("name", schemas())
def test_schema_is_one_and_says_what_it_is_for(name: str) -> None:
    validator(name)

    assert schemas()[name]["title"]


@pytest.mark.parametrize(("path", "name"), FILES, ids=[str(p.relative_to(ROOT)) for p, _ in FILES])
@pytest.mark.parametrize("loader", [yaml.SafeLoader, yaml.BaseLoader], ids=["safe", "base"])
def test_shipped_yaml_holds_to_its_schema(path: Path, name: str, loader: Any) -> None:
    value = yaml.load(path.read_text("utf-8"), loader)  # noqa: S506 - our own files

    assert faults(name, value) == []


@pytest.mark.parametrize("path", PROCEDURES, ids=lambda path: path.stem)
def test_front_matter_holds_to_its_schema(path: Path) -> None:
    front = path.read_text("utf-8").split("---\n")[1]

    assert faults("procedure", yaml.load(front, yaml.BaseLoader)) == []  # noqa: S506


@pytest.mark.parametrize(
    ("name", "text"),
    [
        ("laboratory", "nmae: Lower Laboratory"),
        ("laboratory", "stations: {a: 1}"),
        ("laboratory", "thresholds: {funel-fill: 60 %}"),
        ("stocks", "brine: {container: a bottle}"),
        ("stocks", "brine: saturated sodium chloride"),
        ("substances", "x: {cas: 64-17-5}"),
        ("substances", "x: {names: [x], soluble: 5 g/L}"),
        ("schedule", "week: 1"),
        ("procedure", "title: A"),
        ("procedure", "{title: A, code: A-1, materails: {x: water}}"),
        ("procedure", "{title: A, code: A-1, materials: {x: {contians: {a: 1 g}}}}"),
        ("procedure", "{title: A, code: A-1, reactions: {x: {limiting: a}}}"),
        ("page", "titel: A"),
    ],
)
def test_planted_error_is_found(name: str, text: str) -> None:
    assert faults(name, yaml.safe_load(text))


def _names(schema: dict[str, Any]) -> set[str]:
    return set(schema["properties"])


@pytest.mark.parametrize(
    ("fields", "schema"),
    [
        (head.FIELDS, schemas()["procedure"]),
        (page.FIELDS, schemas()["page"]),
        (laboratory.FIELDS, schemas()["laboratory"]),
        (ware.STOCK_FIELDS, schemas()["stocks"]["additionalProperties"]),
        (decode.FIELDS, schemas()["substances"]["additionalProperties"]),
        (schedule.FIELDS, schemas()["schedule"]["items"]),
        (
            materials.FIELDS,
            schemas()["procedure"]["properties"]["materials"]["additionalProperties"]["anyOf"][1],
        ),
        (
            reactions.FIELDS,
            schemas()["procedure"]["properties"]["reactions"]["additionalProperties"]["anyOf"][1],
        ),
    ],
)
def test_every_field_is_in_its_schema_with_what_it_is_for(
    fields: dict[str, Field], schema: dict[str, Any]
) -> None:
    assert _names(schema) == set(fields)
    assert all(
        schema["properties"][name]["description"] == field.about for name, field in fields.items()
    )


@pytest.mark.parametrize(
    "found",
    [
        (),
        (finding("⟦a⟧ and ⟪b⟫", related=("there",), help="mend it", fix="c"),),
        (finding("⟦a⟧", label=None),),
    ],
    ids=["none", "all", "bare"],
)
def test_findings_hold_to_their_schema(found: tuple[Any, ...]) -> None:
    assert faults("findings", json.loads(json_.render(found, style=Style()))) == []


def test_findings_without_a_key_do_not() -> None:
    value = json.loads(json_.render([finding("⟦a⟧")], style=Style()))
    del value["findings"][0]["help"]

    assert faults("findings", value)


@pytest.mark.parametrize("name", ["oc-04", "gc-02", "oc-09"])
def test_ledger_holds_to_its_schema(name: str) -> None:
    run = golden(name).run
    assert run is not None
    data = ledger_data({"low": run.ledger}, surroundings().known, "A-1", "A", "a.md")

    assert faults("ledger", json.loads(json.dumps(data))) == []


def test_all_are_written_into_a_folder(tmp_path: Path) -> None:
    paths = write_schemas(tmp_path / "s")

    assert [p.name for p in paths] == [f"{name}.schema.json" for name in schemas()]
    assert all(json.loads(p.read_text("utf-8"))["$schema"] for p in paths)


def test_command_lists_prints_and_refuses(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["schema"]) == 0
    assert capsys.readouterr().out.startswith("procedure ")
    assert main(["schema", "stocks"]) == 0
    assert json.loads(capsys.readouterr().out) == schemas()["stocks"]
    assert main(["schema", "stoks"]) == 2
    assert "did you mean `stocks`" in capsys.readouterr().err
