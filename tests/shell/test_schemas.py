"""JSON Schemas: every field table is in them, the demo holds to them, planted errors do not."""

from __future__ import annotations

import importlib
import json
import pkgutil
from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING, Any

import jsonschema
import pytest
import yaml

import watchglass
from builders import golden, surroundings
from cases.harness import example
from shell.findings_builder import finding
from watchglass.base import codes
from watchglass.base.fields import Field
from watchglass.catalogue import ware
from watchglass.publish.ledger_data import ledger_data
from watchglass.resolve import head
from watchglass.shell.cli import main
from watchglass.shell.rendering import json_
from watchglass.shell.rendering.style import Style
from watchglass.shell.schemas import schemas, write_schemas

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.findings import Code

ROOT = Path(__file__).parents[2]
SETS = [ROOT / "procedures_src", ROOT / "generator/watchglass/shell/beginnings"]
FILES = [path for root in SETS for path in sorted(root.rglob("*.yml")) if path.name != "mkdocs.yml"]
PROCEDURES = [
    *(path for root in SETS for path in sorted((root / "procedures").glob("*.md"))),
    *sorted((ROOT / "tests/golden/procedures").glob("*.md")),
]
PAGES = [path for root in SETS for path in sorted((root / "pages").glob("*.md"))]
#: Tables of files that are shipped and no author writes.
SHIPPED_ONLY = ["GLASSWARE_FIELDS", "INDICATOR_FIELDS"]


class Core(yaml.SafeLoader):
    """Reads as editors do: numbers, truth values and nothing are told from text, dates are not."""


Core.yaml_implicit_resolvers = {
    first: [(tag, form) for tag, form in resolvers if not tag.endswith("timestamp")]
    for first, resolvers in yaml.SafeLoader.yaml_implicit_resolvers.items()
}
each_loader = pytest.mark.parametrize("loader", [Core, yaml.BaseLoader], ids=["typed", "text"])


@cache
def validator(name: str) -> jsonschema.Draft202012Validator:
    return jsonschema.Draft202012Validator(schemas()[name])


def faults(name: str, value: Any) -> list[str]:
    return [error.message for error in validator(name).iter_errors(value)]


def read(text: str, loader: Any = Core) -> Any:
    return yaml.load(text, loader)  # noqa: S506 - our own files, by a safe loader


def front(text: str) -> str:
    return text.split("---\n")[1] if text.startswith("---\n") else ""


def faults_of_file(name: str, text: str | bytes, loader: Any = Core) -> list[str]:
    """Give the faults of a file of a set, by its path there."""
    text = text.decode() if isinstance(text, bytes) else text
    if name.endswith(".yml"):
        schema = "substances" if name.startswith("substances/") else Path(name).stem
        return faults(schema, read(text, loader))
    if not front(text):
        return []
    return faults("page" if name.startswith("pages/") else "procedure", read(front(text), loader))


# ---------------------------------------------------------------- what is sound holds


@pytest.mark.parametrize("name", schemas())
def test_schema_is_one_and_says_what_it_is_for(name: str) -> None:
    jsonschema.Draft202012Validator.check_schema(schemas()[name])

    assert schemas()[name]["title"]


@each_loader
@pytest.mark.parametrize("path", FILES, ids=lambda path: str(path.relative_to(ROOT)))
def test_shipped_yaml_holds_to_its_schema(path: Path, loader: Any) -> None:
    name = f"substances/{path.name}" if path.parent.name == "substances" else path.name

    assert faults_of_file(name, path.read_text("utf-8"), loader) == []


@each_loader
@pytest.mark.parametrize("path", PROCEDURES, ids=lambda path: path.stem)
def test_front_matter_holds_to_its_schema(path: Path, loader: Any) -> None:
    assert faults("procedure", read(front(path.read_text("utf-8")), loader)) == []


@pytest.mark.parametrize("path", PAGES, ids=lambda path: path.stem)
def test_front_matter_of_a_page_holds_to_its_schema(path: Path) -> None:
    assert faults_of_file(f"pages/{path.name}", path.read_text("utf-8")) == []


@each_loader
@pytest.mark.parametrize("code", codes.ALL, ids=lambda code: code.number)
def test_what_is_mended_holds_to_its_schema(code: Code, loader: Any) -> None:
    """Whatever `check` passes in silence, no editor may underline."""
    found = {
        name: faults_of_file(name, text, loader)
        for name, text in example(code).mended.items()
        if name.endswith((".yml", ".md"))
    }

    assert {name: said for name, said in found.items() if said} == {}


@pytest.mark.parametrize("name", ["laboratory", "stocks", "substances", "schedule"])
def test_empty_file_holds_to_its_schema(name: str) -> None:
    assert faults(name, read("# nothing yet")) == []


@pytest.mark.parametrize(
    ("name", "text"),
    [
        ("procedure", "{title: 2026, code: 12, revision: 3}"),
        ("procedure", "{title: A, code: A-1, scale: 0.5, group: , show: yield}"),
        ("procedure", "{title: A, code: A-1, time: [165 min, 2 h]}"),
        ("procedure", "{title: A, code: A-1, vessels: {tube: {1-5: boiling tube 50 mL}}}"),
        ("procedure", "{title: A, code: A-1, accept: {material-unused: shown only, n181: so}}"),
        ("procedure", "{title: A, code: A-1, reactions: {r: {equation: A -> B, heat: unknown}}}"),
        ("procedure", "{title: A, code: A-1, materials: {leaves: {composition: unknown}}}"),
        ("procedure", "{title: A, code: A-1, materials: {x: {is: water, provided: 3 tablets}}}"),
        ("laboratory", "{measures: {drop: 0.05 mL, scoop: , tip: {plural: tips}}}"),
        ("laboratory", "{thresholds: {indicator-error: 1 %, funnel-fill: 60 %}}"),
        ("substances", "{nitric-oxide: {names: NO, acid: 4.20, density: 1.17 g/mL at 20 °C}}"),
        ("schedule", "[{week: 2, procedure: [A-1, 12]}]"),
    ],
)
def test_what_is_sound_and_looks_odd_holds_to_its_schema(name: str, text: str) -> None:
    assert faults(name, read(text)) == []


# ---------------------------------------------------------------- what is wrong does not


@pytest.mark.parametrize(
    ("name", "text", "said"),
    [
        ("laboratory", "nmae: Lower Laboratory", "'nmae' was unexpected"),
        ("laboratory", "stations: {a: 1}", "is not of type 'string'"),
        ("laboratory", "stations: 2.5", "2.5 is not of type"),
        ("laboratory", "stations: many", "does not match"),
        ("laboratory", "temperature: 22", "22 is not of type"),
        ("laboratory", "temperature: warm", "does not match"),
        ("laboratory", "thresholds: {funel-fill: 60 %}", "'funel-fill' was unexpected"),
        ("laboratory", "thresholds: {funnel-fill: 0.6}", "0.6 is not of type"),
        ("laboratory", "measures: {drop: {siez: 0.05 mL}}", "'siez' was unexpected"),
        ("laboratory", "glassware: {beaker 50 mL: many}", "does not match"),
        ("stocks", "brine: {container: a bottle}", "is not valid under any"),
        ("stocks", "brine: {material: brine, contains: {water: 1 g}}", "is valid under each of"),
        ("stocks", "brine: [saturated sodium chloride]", "is not of type 'object'"),
        ("stocks", "brine: {material: brine, makes: 1}", "1 is not of type"),
        ("substances", "x: {cas: 64-17-5}", "'names' is a required property"),
        ("substances", "x: {names: [x], cas: 64175}", "64175 is not of type"),
        ("substances", "x: {names: [x], cas: 64-175}", "does not match"),
        ("substances", "x: {names: [x], soluble: 5 g/L}", "is not of type 'object'"),
        ("substances", "x: {names: [x], state: fluid}", "'fluid' is not one of"),
        ("substances", "x: {names: [x], acid: [strong]}", "does not match"),
        ("substances", "x: {names: }", "None is not of type"),
        ("schedule", "week: 1", "is not of type 'array'"),
        ("schedule", "[{week: second, procedure: A-1}]", "does not match"),
        ("schedule", "[{week: -1, procedure: A-1}]", "less than the minimum"),
        ("procedure", "title: A", "'code' is a required property"),
        ("procedure", "{title: A, code: }", "None is not of type"),
        ("procedure", "{title: A, code: A 1}", "does not match"),
        ("procedure", "{title: A, code: A-1, materails: {x: water}}", "'materails' was"),
        ("procedure", "{title: A, code: A-1, materials: {x: {contians: {a: 1 g}}}}", "'contians'"),
        ("procedure", "{title: A, code: A-1, materials: {x: {contains: {a: 1}}}}", "1 is not of"),
        ("procedure", "{title: A, code: A-1, materials: {x: }}", "None is not of type"),
        ("procedure", "{title: A, code: A-1, materials: {x: {composition: lost}}}", "not one of"),
        ("procedure", "{title: A, code: A-1, reactions: {x: {limiting: a}}}", "'equation' is"),
        ("procedure", "{title: A, code: A-1, vessels: {A: [beaker]}}", "is not of type"),
        ("procedure", "{title: A, code: A-1, vessels: {t: {1-5: [tube]}}}", "is not of type"),
        ("procedure", "{title: A, code: A-1, accept: {material-unsued: so}}", "'material-unsued'"),
        ("procedure", "{title: A, code: A-1, accept: {name-unknown: so}}", "'name-unknown'"),
        ("procedure", "{title: A, code: A-1, accept: {material-unused: }}", "None is not of"),
        ("procedure", "{title: A, code: A-1, show: all}", "does not match"),
        ("procedure", "{title: A, code: A-1, show: [all]}", "'all' is not one of"),
        ("procedure", "{title: A, code: A-1, time: 165}", "165 is not of type"),
        ("page", "titel: A", "'titel' was unexpected"),
    ],
)
def test_planted_error_is_found(name: str, text: str, said: str) -> None:
    (only,) = faults(name, read(text))

    assert said in only


@pytest.mark.parametrize("code", [codes.FIELD_UNKNOWN, codes.FIELD_MISSING, codes.FIELD_UNFIT])
def test_wrong_example_about_fields_does_not_hold_to_its_schema(code: Code) -> None:
    assert any(faults_of_file(name, text) for name, text in example(code).wrong.items())


# ---------------------------------------------------------------- one truth


def _tables() -> Iterator[tuple[str, dict[str, Field]]]:
    """Find every table of fields in the program."""
    for info in pkgutil.walk_packages(watchglass.__path__, "watchglass."):
        if info.name.endswith("__main__"):
            continue
        for name, value in vars(importlib.import_module(info.name)).items():
            if (
                isinstance(value, dict)
                and value
                and all(isinstance(entry, Field) for entry in value.values())
            ):
                yield name, value


TABLES = {id(table): (name, table) for name, table in _tables()}


def _described(schema: Any) -> Iterator[dict[str, str]]:
    """Give the names and descriptions of the properties in a schema and in all it is made of."""
    if isinstance(schema, dict):
        if isinstance(schema.get("properties"), dict):
            yield {name: p.get("description", "") for name, p in schema["properties"].items()}
        for part in schema.values():
            yield from _described(part)


@pytest.mark.parametrize(
    "table",
    [table for name, table in TABLES.values() if name not in SHIPPED_ONLY],
    ids=[f"{name}-{next(iter(t))}" for name, t in TABLES.values() if name not in SHIPPED_ONLY],
)
def test_every_table_of_fields_is_in_a_schema_with_what_each_is_for(
    table: dict[str, Field],
) -> None:
    assert {name: field.about for name, field in table.items()} in list(_described(schemas()))


def test_tables_are_found() -> None:
    found = [table for _, table in TABLES.values()]

    assert head.FIELDS in found
    assert ware.STOCK_FIELDS in found
    assert len(found) >= 10


# ---------------------------------------------------------------- what commands print


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


@pytest.mark.parametrize(
    "text",
    ["", "# no front matter", "1. Put {5 mL watre -> A} and {5 ml {x -> A}.", "---\ntitle: A\n"],
    ids=["empty", "heading", "marks", "open"],
)
def test_what_check_prints_holds_to_its_schema(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], text: str
) -> None:
    draft = tmp_path / "a.md"
    draft.write_text(text)
    main(["check", "--format", "json", str(draft)])
    value = json.loads(capsys.readouterr().out)

    assert value["findings"]
    assert faults("findings", value) == []


def test_what_check_prints_of_a_sound_set_holds_to_its_schema(
    capsys: pytest.CaptureFixture[str],
) -> None:
    main(["check", "--format", "json", str(SETS[1])])
    value = json.loads(capsys.readouterr().out)

    assert faults("findings", value) == []
    assert value["counts"]["errors"] == 0


def test_lines_count_from_one() -> None:
    value = json.loads(json_.render([finding("⟦a⟧")], style=Style()))
    value["findings"][0]["start"]["line"] = 0

    assert faults("findings", value)


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


def test_schemas_go_where_they_can_be_written(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    (tmp_path / "file").write_text("")

    assert main(["schema", "--out", str(tmp_path / "file" / "s")]) == 2
    assert "cannot be written" in capsys.readouterr().err


def test_folder_gets_the_schemas_and_nothing_else(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["schema", "--out", str(tmp_path)]) == 0
    assert capsys.readouterr().out == ""
    assert {p.name for p in tmp_path.iterdir()} == {f"{name}.schema.json" for name in schemas()}


def test_one_name_and_all_of_them_are_not_asked_for_at_once(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["schema", "stocks", "--out", str(tmp_path)]) == 2
    assert "`--out` for all of them" in capsys.readouterr().err


def test_command_lists_prints_and_refuses(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["schema"]) == 0
    assert capsys.readouterr().out.startswith("procedure ")
    assert main(["schema", "stocks"]) == 0
    assert json.loads(capsys.readouterr().out) == schemas()["stocks"]
    assert main(["schema", "stoks"]) == 2
    assert "did you mean `stocks`" in capsys.readouterr().err
