"""Findings as a SARIF 2.1.0 log: the OASIS standard for results of analyses.

One run; each kind of finding that occurs is a rule, with the text of its explanation page; what
was accepted is a result with a suppression that carries its reason. Columns count Unicode code
points. Addresses are relative to where `check` was called, with forward slashes, percent-encoded;
a path given from the root is a `file:` address. A fingerprint takes in kind, path, the text
underlined, and the how-manieth of its like it is, so that lines moved above do not make a finding
new. In all messages braces are doubled and what looks like a link is escaped, since the standard
gives both a meaning (3.11.5 and 3.11.6).
"""

from __future__ import annotations

import json
import re
from collections import Counter
from hashlib import sha256
from typing import TYPE_CHECKING, Any
from urllib.parse import quote

from watchglass import __version__
from watchglass.base.findings import Severity
from watchglass.shell.rendering.places import Places
from watchglass.shell.rendering.style import Style
from watchglass.shell.rendering.tally import arrange

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence

    from watchglass.base.findings import Code, Finding
    from watchglass.base.spans import Span

SCHEMA = (
    "https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json"
)
_LEVELS = {Severity.ERROR: "error", Severity.WARNING: "warning", Severity.NOTE: "note"}
_BASE = "%SRCROOT%"
_DRIVE = re.compile(r"[A-Za-z]:/")
_LINK = re.compile(r"\](?=\()")
_Object = dict[str, Any]


def render(
    findings: Iterable[Finding],
    *,
    style: Style,
    accepted: Sequence[tuple[Finding, str]] = (),
) -> str:
    """Render findings as one SARIF log and a line end; it is there without findings too.

    Args:
        findings: What is open.
        style: Not used: JSON has one dress.
        accepted: What was found and accepted, each with its reason.
    """
    del style
    arranged = arrange(findings)
    reasons = {id(finding): reason for finding, reason in accepted}
    everything = [*arranged, *arrange(finding for finding, _ in accepted)]
    rules = sorted({finding.code for finding in everything}, key=lambda code: code.number)
    index = {code.number: place for place, code in enumerate(rules)}
    places = Places()
    met: Counter[tuple[str, str, str]] = Counter()
    log = {
        "$schema": SCHEMA,
        "version": "2.1.0",
        "runs": [
            {
                "tool": {
                    "driver": {
                        "name": "watchglass",
                        "version": __version__,
                        "semanticVersion": __version__,
                        "rules": [_rule(code) for code in rules],
                    }
                },
                "columnKind": "unicodeCodePoints",
                "originalUriBaseIds": {_BASE: {"description": {"text": "where it was run"}}},
                "results": [
                    _result(finding, index, places, met, reasons.get(id(finding)))
                    for finding in everything
                ],
            }
        ],
    }
    return json.dumps(log, indent=2).replace("\x7f", "\\u007f") + "\n"


def _rule(code: Code) -> _Object:
    """Give a kind of finding, with its page: set for reading as text, and as the Markdown it is."""
    from watchglass.shell.explain import page, page_text, parse_explanation  # noqa: PLC0415 - rare

    text = page_text(code)
    opening = parse_explanation(text).sections[0].text.strip() if text else code.summary
    shown = {"text": _message(page(code, style=Style(width=88)))}
    if text:
        shown["markdown"] = _message(text)
    return {
        "id": code.number,
        "name": code.name,
        "shortDescription": {"text": _message(code.summary[0].upper() + code.summary[1:] + ".")},
        "fullDescription": {"text": _message(opening)},
        "help": shown,
        "defaultConfiguration": {"level": _LEVELS[code.severity]},
    }


def _message(text: str) -> str:
    """Write a message so that nothing in it is taken for a placeholder or a link."""
    return _LINK.sub(r"\\]", text.replace("{", "{{").replace("}", "}}"))


def _result(
    finding: Finding,
    index: dict[str, int],
    places: Places,
    met: Counter[tuple[str, str, str]],
    reason: str | None,
) -> _Object:
    message = finding.message
    if finding.help:
        message += f" ({finding.help})"
    result: _Object = {
        "ruleId": finding.code.number,
        "ruleIndex": index[finding.code.number],
        "level": _LEVELS[finding.code.severity],
        "message": {"text": _message(message)},
        "locations": [{"physicalLocation": _place(finding.span, places)}],
        "partialFingerprints": {"text/v1": _fingerprint(finding, met)},
    }
    if finding.related:
        result["relatedLocations"] = [
            {
                "id": number,
                "physicalLocation": _place(related.span, places),
                "message": {"text": _message(related.message)},
            }
            for number, related in enumerate(finding.related)
        ]
    if finding.fix is not None:
        place = _place(finding.fix.span, places)
        replacement = {
            "deletedRegion": place["region"],
            "insertedContent": {"text": finding.fix.text},
        }
        change = {"artifactLocation": place["artifactLocation"], "replacements": [replacement]}
        result["fixes"] = [{"artifactChanges": [change]}]
    if reason is not None:
        result["suppressions"] = [{"kind": "inSource", "justification": reason}]
    return result


def _place(span: Span, places: Places) -> _Object:
    line, column = places.position(span.source, span.start)
    last_line, last_column = places.position(span.source, span.end)
    return {
        "artifactLocation": _address(span.source.name),
        "region": {
            "startLine": line,
            "startColumn": column,
            "endLine": last_line,
            "endColumn": last_column,
        },
    }


def _address(name: str) -> _Object:
    """Give the address of a file; bytes of its name that are no UTF-8 are kept as they are."""
    path = name.encode("utf-8", "surrogateescape")
    if name.startswith("/"):
        return {"uri": "file://" + quote(path)}
    if _DRIVE.match(name):
        return {"uri": "file:///" + quote(path, safe="/:")}
    return {"uri": quote(path), "uriBaseId": _BASE}


def _fingerprint(finding: Finding, met: Counter[tuple[str, str, str]]) -> str:
    parts = (finding.code.number, finding.span.source.name, finding.span.text)
    earlier = met[parts]
    met[parts] += 1
    text = "\0".join((*parts, str(earlier)) if earlier else parts)
    return sha256(text.encode("utf-8", "surrogatepass")).hexdigest()[:32]
