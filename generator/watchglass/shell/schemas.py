"""JSON Schemas (draft 2020-12) of the YAML files and of the JSON that commands print.

Those of the YAML files are made from the same field tables that the readers use. YAML readers of
editors give bare numbers and dates as such, so every place for text takes them, too.
"""

from __future__ import annotations

import json
from typing import TYPE_CHECKING, Any

from watchglass.base.fields import Field, Shape
from watchglass.catalogue import decode, ware
from watchglass.resolve import head, laboratory, materials, page, reactions, schedule, thresholds

if TYPE_CHECKING:
    from collections.abc import Mapping
    from pathlib import Path

Schema = dict[str, Any]

DRAFT = "https://json-schema.org/draft/2020-12/schema"
#: Text as YAML readers give it: they turn what looks like a number, a truth value or nothing.
_TEXT: Schema = {"type": ["string", "number", "boolean", "null"]}
_LIST: Schema = {"type": "array", "items": _TEXT}
_MAPPING: Schema = {"type": "object"}
_SHAPES: dict[Shape, Schema] = {
    Shape.TEXT: _TEXT,
    Shape.LIST: {"type": "array"},
    Shape.MAPPING: {"type": ["object", "null"]},
    Shape.TEXT_OR_LIST: {"anyOf": [_TEXT, _LIST]},
    Shape.TEXT_OR_MAPPING: {"anyOf": [_TEXT, _MAPPING]},
    Shape.ANY: {},
}


def schemas() -> dict[str, Schema]:
    """Give every schema by name."""
    substance = _record(decode.FIELDS)
    stock = _record(ware.STOCK_FIELDS)
    stock["anyOf"] = [{"required": ["material"]}, {"required": ["contains"]}]
    material = {"anyOf": [_TEXT, _record(materials.FIELDS)]}
    reaction = {"anyOf": [_TEXT, _record(reactions.FIELDS)]}
    limits = {
        "type": ["object", "null"],
        "properties": {
            name: {**_TEXT, "description": f"{limit.words}; {limit.source}"}
            for name, limit in thresholds.THRESHOLDS.items()
        },
        "additionalProperties": False,
    }
    front = _record(
        head.FIELDS,
        materials=_each(material),
        vessels=_each({"anyOf": [_TEXT, _MAPPING]}),
        equipment=_each(_TEXT),
        reactions=_each(reaction),
        accept=_each(_TEXT),
        intended=_each(_TEXT),
    )
    return {
        "procedure": _titled(front, "Front matter of a procedure"),
        "page": _titled(_record(page.FIELDS), "Front matter of a page"),
        "laboratory": _titled(
            _record(laboratory.FIELDS, thresholds=limits, glassware=_each(_TEXT)),
            "laboratory.yml: facts of a teaching laboratory",
        ),
        "stocks": _titled(_each(stock), "stocks.yml: solutions that the prep room keeps"),
        "substances": _titled(_each(substance), "substances/*.yml: additions to the catalogue"),
        "schedule": _titled(
            {"type": ["array", "null"], "items": _record(schedule.FIELDS)},
            "schedule.yml: which procedure runs when",
        ),
        "findings": _titled(_findings(), "What `watchglass check --format json` prints"),
        "ledger": _titled(_ledger(), "What `watchglass ledger --format json` prints"),
    }


def text_of(schema: Schema) -> str:
    """Write a schema."""
    return json.dumps(schema, indent=2, ensure_ascii=False) + "\n"


def write_schemas(folder: Path) -> tuple[Path, ...]:
    """Write every schema into a folder; give the files."""
    folder.mkdir(parents=True, exist_ok=True)
    written = []
    for name, schema in schemas().items():
        path = folder / f"{name}.schema.json"
        path.write_text(text_of(schema), encoding="utf-8")
        written.append(path)
    return tuple(written)


# ---------------------------------------------------------------- of the YAML files


def _titled(schema: Schema, title: str) -> Schema:
    return {"$schema": DRAFT, "title": title, **schema}


def _record(fields: Mapping[str, Field], **inside: Schema) -> Schema:
    """Make the schema of a mapping with known fields."""
    properties = {
        name: {**(inside.get(name) or _SHAPES[field.shape]), "description": field.about}
        for name, field in fields.items()
    }
    schema: Schema = {
        "type": "object",
        "properties": properties,
        "additionalProperties": False,
    }
    required = [name for name, field in fields.items() if field.required]
    if required:
        schema["required"] = required
    return schema


def _each(entry: Schema) -> Schema:
    """Make the schema of a mapping whose keys are the author's."""
    return {"type": ["object", "null"], "additionalProperties": entry}


# ---------------------------------------------------------------- of the JSON outputs

_WHOLE: Schema = {"type": "integer", "minimum": 0}
_MAYBE_TEXT: Schema = {"type": ["string", "null"]}


def _object(**properties: Schema) -> Schema:
    return {"type": "object", "properties": properties, "required": list(properties)}


def _point() -> Schema:
    return _object(line=_WHOLE, column=_WHOLE, offset=_WHOLE)


def _place(**more: Schema) -> Schema:
    return _object(path={"type": "string"}, start=_point(), end=_point(), **more)


def _findings() -> Schema:
    finding = _object(
        code={"type": "string", "pattern": "^[A-Z][0-9]{3}$"},
        name={"type": "string"},
        severity={"enum": ["error", "warning", "note"]},
        message={"type": "string"},
        label=_MAYBE_TEXT,
        path={"type": "string"},
        start=_point(),
        end=_point(),
        related={"type": "array", "items": _place(message={"type": "string"})},
        help=_MAYBE_TEXT,
        fix={"anyOf": [{"type": "null"}, _place(text={"type": "string"})]},
    )
    return _object(
        version={"const": 1},
        tool=_object(name={"const": "watchglass"}, version={"type": "string"}),
        counts=_object(errors=_WHOLE, warnings=_WHOLE, notes=_WHOLE, files=_WHOLE),
        findings={"type": "array", "items": finding},
    )


def _ledger() -> Schema:
    number = _object(
        value={"type": "number"}, unit={"type": "string"}, **{"from": {"type": "string"}}
    )
    maybe: Schema = {"anyOf": [{"type": "null"}, number]}
    amounts: Schema = {"type": "object", "additionalProperties": number}
    words: Schema = {"type": "array", "items": {"type": "string"}}
    phase = {"anyOf": [{"type": "null"}, _object(volume=number, amounts=amounts)]}
    vessel = _object(
        aqueous=phase,
        organic=phase,
        solid=amounts,
        ph=maybe,
        temperature=number,
        closure={"type": "string"},
        place={"type": "string"},
        bath={"type": "string"},
        mixed={"type": "boolean"},
        settled={"type": "boolean"},
        unknown=words,
        not_assessed=words,
    )
    vessels: Schema = {"type": "object", "additionalProperties": vessel}
    sink = _object(volume=number, liquids=amounts, solids=amounts, unknown=words)
    kinds = ["taken", "moved", "added", "reacted", "warmed", "supposed", "not_assessed", "mixed"]
    result = _object(
        vessel={"type": "string"},
        words={"type": "string"},
        kind={"enum": [*kinds, "layers"]},
    )
    entry = _object(
        step=_WHOLE,
        turn=_WHOLE,
        act={"type": "string"},
        start=_WHOLE,
        results={"type": "array", "items": result},
        vessels=vessels,
    )
    run = _object(
        labels={"type": "object", "additionalProperties": _WHOLE},
        charged=amounts,
        entries={"type": "array", "items": entry},
        end=_object(vessels=vessels, sinks={"type": "object", "additionalProperties": sink}),
    )
    return _object(
        version={"const": 1},
        procedure=_object(
            code={"type": "string"}, title={"type": "string"}, path={"type": "string"}
        ),
        model={"type": "string"},
        sources={"type": "object", "additionalProperties": {"type": "string"}},
        components={"type": "object"},
        runs={"type": "object", "additionalProperties": run},
    )
