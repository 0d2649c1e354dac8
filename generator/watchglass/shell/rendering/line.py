r"""One line a finding: for editors that jump to a place, and for searching and counting.

The form is `path:line:column: severity[NUMBER name]: message (help: …)`. Line and column count
from 1. Line ends inside a message are written as `\n`, so that a line is always a finding.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.shell.rendering.cells import visible
from watchglass.shell.rendering.places import Places
from watchglass.shell.rendering.tally import arrange

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.base.findings import Finding
    from watchglass.shell.rendering.style import Style


def render(findings: Iterable[Finding], *, style: Style) -> str:
    """Render findings, a line each; colours and width are not used."""
    places = Places()
    return "".join(_line(finding, places, style) for finding in arrange(findings))


def _line(finding: Finding, places: Places, style: Style) -> str:
    code = finding.code
    text = (
        f"{places.address(finding.span)}: {code.severity.word}[{code.number} {code.name}]: "
        f"{finding.message}"
    )
    if finding.help is not None:
        text += f" (help: {finding.help})"
    return visible(text, unicode=style.unicode) + "\n"
