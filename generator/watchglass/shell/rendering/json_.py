r"""Findings for other programs: one JSON object, versioned.

    {"version": 1,
     "tool": {"name": "watchglass", "version": "0.1.0"},
     "counts": {"errors": 1, "warnings": 0, "notes": 0, "files": 1},
     "findings": [
       {"code": "N110", "name": "mark-not-closed", "severity": "error",
        "message": "…", "label": "…" or null,
        "path": "procedures/oc-04.md",
        "start": {"line": 31, "column": 8, "offset": 902},
        "end": {"line": 31, "column": 32, "offset": 926},
        "related": [{"message": "…", "path": "…", "start": {…}, "end": {…}}],
        "help": "…" or null,
        "fix": {"path": "…", "start": {…}, "end": {…}, "text": "…"} or null}]}

Lines and columns count from 1, offsets from 0. All count Unicode code points in the text with its
byte order mark removed and its line ends made `\n`; an `end` is the first place after the span,
so an empty span has equal ends. `severity` is `error`, `warning` or `note`. Findings are in the
order of their paths and offsets, repeats are dropped, keys stand in the order shown and none is
left out. `path` begins with the path that `check` was given, with forward slashes. Applying a
`fix` replaces what lies between its ends with `text`.

`version` rises when a key is taken away or changes its meaning; keys may be added without, so a
reader should pass over those it does not know. Everything beyond printable ASCII is escaped, so
the output is the same in every locale and harmless on a terminal.
"""

from __future__ import annotations

import json
from typing import TYPE_CHECKING, Any

from watchglass import __version__
from watchglass.shell.rendering.places import Places
from watchglass.shell.rendering.tally import Counts, arrange

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Source, Span
    from watchglass.shell.rendering.style import Style

VERSION = 1
"""Version of the object's shape."""

_Object = dict[str, Any]


def render(findings: Iterable[Finding], *, style: Style) -> str:
    """Render findings as one JSON object and a line end; it is there without findings too."""
    del style  # JSON has one dress; the argument is what makes the three renderers alike
    arranged = arrange(findings)
    counts = Counts.of(arranged)
    places = Places()
    value = {
        "version": VERSION,
        "tool": {"name": "watchglass", "version": __version__},
        "counts": {
            "errors": counts.errors,
            "warnings": counts.warnings,
            "notes": counts.notes,
            "files": counts.files,
        },
        "findings": [_finding(finding, places) for finding in arranged],
    }
    return json.dumps(value, indent=2).replace("\x7f", "\\u007f") + "\n"


def _finding(finding: Finding, places: Places) -> _Object:
    fix = finding.fix
    return {
        "code": finding.code.number,
        "name": finding.code.name,
        "severity": finding.code.severity.word,
        "message": finding.message,
        "label": finding.label,
        **_span(finding.span, places),
        "related": [
            {"message": related.message, **_span(related.span, places)}
            for related in finding.related
        ],
        "help": finding.help,
        "fix": None if fix is None else {**_span(fix.span, places), "text": fix.text},
    }


def _span(span: Span, places: Places) -> _Object:
    return {
        "path": span.source.name,
        "start": _point(span.source, span.start, places),
        "end": _point(span.source, span.end, places),
    }


def _point(source: Source, offset: int, places: Places) -> dict[str, int]:
    line, column = places.position(source, offset)
    return {"line": line, "column": column, "offset": offset}
