"""JSON Schemas of the JSON that commands print: what other programs may count on.

Keys may be added without a new version, so none of these forbids keys it does not know.
"""

from __future__ import annotations

from typing import Any

Schema = dict[str, Any]

_WHOLE: Schema = {"type": "integer", "minimum": 0}
_FROM_ONE: Schema = {"type": "integer", "minimum": 1}
_MAYBE_TEXT: Schema = {"type": ["string", "null"]}


def _object(**properties: Schema) -> Schema:
    return {"type": "object", "properties": properties, "required": list(properties)}


def _point() -> Schema:
    return _object(line=_FROM_ONE, column=_FROM_ONE, offset=_WHOLE)


def _place(**more: Schema) -> Schema:
    return _object(path={"type": "string"}, start=_point(), end=_point(), **more)


def findings_schema() -> Schema:
    """Describe what `check --format json` prints."""
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


def ledger_schema() -> Schema:
    """Describe what `ledger --format json` prints."""
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
        branch={"anyOf": [{"type": "null"}, {"type": "string"}]},
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
