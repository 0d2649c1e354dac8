"""JSON Schemas (draft 2020-12) of the YAML files and of the JSON that commands print.

Those of the YAML files are made from the same field tables that the readers use. What they say is
certain: a file that `check` passes in silence holds to its schema. Readers of YAML in editors take
what looks like a number, a truth value or nothing for such, where ours take all text as it is
written; so places for text take those, too.
"""

from __future__ import annotations

import json
import re
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.fields import Field, Shape
from watchglass.base.findings import Finding
from watchglass.base.spans import Source
from watchglass.catalogue import decode, ware
from watchglass.judge.accept import can_be_accepted
from watchglass.resolve import head, laboratory, page, schedule
from watchglass.shell.output_schemas import Schema, findings_schema, ledger_schema

if TYPE_CHECKING:
    from collections.abc import Mapping
    from pathlib import Path

DRAFT = "https://json-schema.org/draft/2020-12/schema"
_TEXT = (Shape.TEXT, Shape.TEXT_OR_LIST, Shape.TEXT_OR_MAPPING, Shape.ANY)
_LIST = (Shape.LIST, Shape.TEXT_OR_LIST, Shape.ANY)
_MAPPING = (Shape.MAPPING, Shape.TEXT_OR_MAPPING, Shape.ANY)
#: A quantity has a digit in it, in our digits; nothing less is said of it, since its units are many.
_DIGIT = "[0-9]"


def schemas() -> dict[str, Schema]:
    """Give every schema by name."""
    made = {
        "procedure": ("Front matter of a procedure", _front_matter()),
        "page": ("Front matter of a page", _record(page.FIELDS)),
        "laboratory": (
            "laboratory.yml: facts of a teaching laboratory",
            {**_record(laboratory.FIELDS), "type": ["object", "null"]},
        ),
        "stocks": ("stocks.yml: solutions that the prep room keeps", _each(_stock())),
        "substances": (
            "substances/*.yml: additions to the catalogue",
            _each(_record(decode.FIELDS)),
        ),
        "schedule": (
            "schedule.yml: which procedure runs when",
            {"type": ["array", "null"], "items": _record(schedule.FIELDS)},
        ),
        "findings": ("What `watchglass check --format json` prints", findings_schema()),
        "ledger": ("What `watchglass ledger --format json` prints", ledger_schema()),
    }
    return {
        name: {"$schema": DRAFT, "title": title, **schema} for name, (title, schema) in made.items()
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
        path.write_text(text_of(schema), encoding="utf-8", newline="\n")
        written.append(path)
    return tuple(written)


def _front_matter() -> Schema:
    """Give the front matter's schema, with the findings that `accept:` can take by name."""
    schema = _record(head.FIELDS)
    reason = head.FIELDS["accept"].each
    assert reason is not None  # noqa: S101 - the table says what stands there
    nowhere = Source.of("", "").span(0, 0)
    accept = schema["properties"]["accept"]
    accept["properties"] = {
        code.name: {**_value(reason), "description": code.summary}
        for code in codes.ALL
        if can_be_accepted(Finding(code=code, span=nowhere, message=""))
    }
    accept["patternProperties"] = {"^[A-Za-z][0-9]{3}$": _value(reason)}
    accept["additionalProperties"] = False
    return schema


def _stock() -> Schema:
    """Give a stock's schema; it says what it is in one of two ways, not in both."""
    one, other = ({"required": [name]} for name in ("material", "contains"))
    rule: Schema = {"if": {"type": "object"}, "then": {"oneOf": [one, other]}}
    return _record(ware.STOCK_FIELDS) | rule


# ---------------------------------------------------------------- from the tables


def _record(fields: Mapping[str, Field]) -> Schema:
    """Make the schema of a mapping with known fields."""
    return {"type": "object", **_inside(fields)}


def _inside(fields: Mapping[str, Field]) -> Schema:
    schema: Schema = {
        "properties": {
            name: {"description": field.about, **_value(field)} for name, field in fields.items()
        },
        "additionalProperties": False,
    }
    required = [name for name, field in fields.items() if field.required]
    return schema | ({"required": required} if required else {})


def _each(entry: Schema) -> Schema:
    """Make the schema of a mapping whose keys are the author's; an empty file is one, too."""
    return {"type": ["object", "null"], "additionalProperties": entry}


def _value(field: Field) -> Schema:
    """Make the schema of what a field takes.

    The kinds of value are told by `type` alone wherever they can be: other keywords say nothing of
    values of another kind, and what a validator reports is plainer than of alternatives.
    """
    kinds: set[str] = set()
    schema: Schema = {}
    if field.shape in _TEXT:
        kinds, schema = _text(field)
    if field.shape in _LIST:
        kinds.add("array")
        schema["items"] = _value(field._replace(shape=Shape.TEXT, required=False))
    if field.shape in _MAPPING:
        kinds.add("object")
        schema |= _mapping(field)
    if not field.required:
        kinds.add("null")
    order = ("object", "array", "string", "integer", "number", "boolean", "null")
    types = [kind for kind in order if kind in kinds]
    if field.words and not field.quantity and not kinds & {"array", "object"}:
        # editors offer the words of an enum
        schema = {"enum": [*field.words, *([] if field.required else [None])]}
    return {"type": types[0] if len(types) == 1 else types, **schema}


def _mapping(field: Field) -> Schema:
    if field.fields is not None:
        return _inside(field.fields)
    if field.each is not None:
        return {"additionalProperties": {"description": field.each.about, **_value(field.each)}}
    return {}


def _text(field: Field) -> tuple[set[str], Schema]:
    """Give the types that text may seem to be to readers of editors, and what else it holds to."""
    patterns = [f"^{word}$" for word in field.words]
    if field.quantity:
        patterns.append(_DIGIT)
        types = {"string", "number"} if dim.NUMBER in field.quantity else {"string"}
        return types, {"pattern": "|".join(patterns)}
    if field.words:
        return {"string"}, {"pattern": "|".join(patterns)}
    if field.pattern:
        types = {"string"}
        schema: Schema = {"pattern": f"^(?:{field.pattern})$"}
        if re.fullmatch(field.pattern, "1"):
            types.add("integer")
            schema |= {} if re.fullmatch(field.pattern, "-1") else {"minimum": 0}
        if re.fullmatch(field.pattern, "true"):
            types.add("boolean")
        return types, schema
    return {"string", "number", "boolean"}, {}
