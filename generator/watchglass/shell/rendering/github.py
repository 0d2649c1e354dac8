"""Findings as workflow commands, which a forge's build log turns into annotations.

One line a finding: `::error file=…,line=…,endLine=…,col=…,endColumn=…,title=…::message`. Such logs
show ten annotations of a kind a step, so errors come first; a line of plain text counts them all.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base.findings import Severity
from watchglass.shell.rendering.places import Places
from watchglass.shell.rendering.tally import Counts, arrange

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.base.findings import Finding
    from watchglass.shell.rendering.style import Style

_COMMANDS = {Severity.ERROR: "error", Severity.WARNING: "warning", Severity.NOTE: "notice"}


def render(findings: Iterable[Finding], *, style: Style) -> str:
    """Render findings as workflow commands, errors first, and the tally."""
    del style
    arranged = arrange(findings)
    places = Places()
    lines = [_line(f, places) for f in sorted(arranged, key=lambda f: -f.code.severity)]
    counts = Counts.of(arranged)
    if arranged:
        lines.append(f"{counts.errors} errors, {counts.warnings} warnings, {counts.notes} notes")
    return "".join(line + "\n" for line in lines)


def _line(finding: Finding, places: Places) -> str:
    span = finding.span
    line, column = places.position(span.source, span.start)
    last_line, last_column = places.position(span.source, span.end)
    facts = {
        "file": span.source.name,
        "line": str(line),
        "endLine": str(last_line),
        "col": str(column),
        "endColumn": str(last_column),
        "title": f"{finding.code.number} {finding.code.name}",
    }
    said = finding.message + (f" (help: {finding.help})" if finding.help else "")
    properties = ",".join(f"{name}={_property(value)}" for name, value in facts.items())
    return f"::{_COMMANDS[finding.code.severity]} {properties}::{_data(said)}"


def _data(text: str) -> str:
    """Write a message so that it cannot end its line or begin a command."""
    return text.replace("%", "%25").replace("\r", "%0D").replace("\n", "%0A")


def _property(text: str) -> str:
    return _data(text).replace(":", "%3A").replace(",", "%2C")
