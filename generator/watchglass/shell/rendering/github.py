"""Findings as workflow commands, which a forge's build log turns into annotations.

One line a finding: `::error file=…,line=…,endLine=…,col=…,endColumn=…,title=…::message`. Columns
are left out where a finding runs over several lines: the command takes them on one line only. Such
logs show ten annotations of a kind a step, so errors come first; a line of plain text counts them
all.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base.findings import Severity
from watchglass.shell.rendering.cells import visible
from watchglass.shell.rendering.places import Places
from watchglass.shell.rendering.tally import Counts, arrange

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.base.findings import Finding
    from watchglass.shell.rendering.style import Style

_COMMANDS = {Severity.ERROR: "error", Severity.WARNING: "warning", Severity.NOTE: "notice"}
_SIGNS = {"%": "%25", "\r": "%0D", "\n": "%0A"}


def render(findings: Iterable[Finding], *, style: Style) -> str:
    """Render findings as workflow commands, errors first, and the tally."""
    arranged = arrange(findings)
    places = Places()
    lines = [_line(f, places, style) for f in sorted(arranged, key=lambda f: -f.code.severity)]
    if arranged:
        lines.append(Counts.of(arranged).sentence)
    return "".join(line + "\n" for line in lines)


def _line(finding: Finding, places: Places, style: Style) -> str:
    span = finding.span
    line, column = places.position(span.source, span.start)
    last_line, last_column = places.position(span.source, span.end)
    facts = {"file": span.source.name, "line": str(line), "endLine": str(last_line)}
    if line == last_line:
        facts |= {"col": str(column), "endColumn": str(last_column)}
    facts["title"] = f"{finding.code.number} {finding.code.name}"
    said = finding.message + (f" (help: {finding.help})" if finding.help else "")
    properties = ",".join(f"{name}={_property(value, style)}" for name, value in facts.items())
    return f"::{_COMMANDS[finding.code.severity]} {properties}::{_data(said, style)}"


def _data(text: str, style: Style) -> str:
    """Write a message so that it can neither end its line nor steer the terminal it is read on."""
    parts = re.split(r"([%\r\n])", text)
    return "".join(_SIGNS.get(part) or visible(part, unicode=style.unicode) for part in parts)


def _property(text: str, style: Style) -> str:
    return _data(text, style).replace(":", "%3A").replace(",", "%2C")
