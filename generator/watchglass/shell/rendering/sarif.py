"""Findings as a SARIF 2.1.0 log: the OASIS standard for results of analyses.

One run; each kind of finding that occurs is a rule, with the text of its explanation page; what
was accepted is a result with a suppression that carries its reason. Columns count Unicode code
points. Addresses are relative to where `check` was called, with forward slashes, percent-encoded.
A fingerprint takes in kind, path and the text underlined, so that lines moved above do not make a
finding new.
"""

from __future__ import annotations

import json
from hashlib import sha256
from typing import TYPE_CHECKING, Any
from urllib.parse import quote

from watchglass import __version__
from watchglass.base.findings import Severity
from watchglass.shell.rendering.places import Places
from watchglass.shell.rendering.tally import arrange

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence

    from watchglass.base.findings import Code, Finding
    from watchglass.base.spans import Span
    from watchglass.shell.rendering.style import Style

SCHEMA = (
    "https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json"
)
_LEVELS = {Severity.ERROR: "error", Severity.WARNING: "warning", Severity.NOTE: "note"}
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
    log = {
        "$schema": SCHEMA,
        "version": "2.1.0",
        "runs": [
            {
                "tool": {
                    "driver": {
                        "name": "watchglass",
                        "semanticVersion": __version__,
                        "rules": [_rule(code) for code in rules],
                    }
                },
                "columnKind": "unicodeCodePoints",
                "originalUriBaseIds": {"%SRCROOT%": {"description": {"text": "where it was run"}}},
                "results": [
                    _result(finding, index, places, reasons.get(id(finding)))
                    for finding in everything
                ],
            }
        ],
    }
    return json.dumps(log, indent=2).replace("\x7f", "\\u007f") + "\n"


def _rule(code: Code) -> _Object:
    from watchglass.shell.explain import page_text, parse_explanation  # noqa: PLC0415 - rare

    text = page_text(code)
    opening = parse_explanation(text).sections[0].text.strip() if text else code.summary
    return {
        "id": code.number,
        "name": code.name,
        "shortDescription": {"text": code.summary[0].upper() + code.summary[1:] + "."},
        "fullDescription": {"text": opening},
        "help": {"text": f"`watchglass explain {code.number}` tells more."},
        "defaultConfiguration": {"level": _LEVELS[code.severity]},
    }


def _result(finding: Finding, index: dict[str, int], places: Places, reason: str | None) -> _Object:
    message = finding.message
    if finding.help:
        message += f" ({finding.help})"
    result: _Object = {
        "ruleId": finding.code.number,
        "ruleIndex": index[finding.code.number],
        "level": _LEVELS[finding.code.severity],
        "message": {"text": message},
        "locations": [{"physicalLocation": _place(finding.span, places)}],
        "partialFingerprints": {"text/v1": _fingerprint(finding)},
    }
    if finding.related:
        result["relatedLocations"] = [
            {
                "id": number,
                "physicalLocation": _place(related.span, places),
                "message": {"text": related.message},
            }
            for number, related in enumerate(finding.related)
        ]
    if finding.fix is not None:
        place = _place(finding.fix.span, places)
        result["fixes"] = [
            {
                "artifactChanges": [
                    {
                        "artifactLocation": place["artifactLocation"],
                        "replacements": [
                            {
                                "deletedRegion": place["region"],
                                "insertedContent": {"text": finding.fix.text},
                            }
                        ],
                    }
                ]
            }
        ]
    if reason is not None:
        result["suppressions"] = [{"kind": "inSource", "justification": reason}]
    return result


def _place(span: Span, places: Places) -> _Object:
    line, column = places.position(span.source, span.start)
    last_line, last_column = places.position(span.source, span.end)
    return {
        "artifactLocation": {"uri": quote(span.source.name), "uriBaseId": "%SRCROOT%"},
        "region": {
            "startLine": line,
            "startColumn": column,
            "endLine": last_line,
            "endColumn": last_column,
        },
    }


def _fingerprint(finding: Finding) -> str:
    parts = (finding.code.number, finding.span.source.name, finding.span.text)
    return sha256("\0".join(parts).encode()).hexdigest()[:32]
