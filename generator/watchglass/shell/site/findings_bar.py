"""What a preview says at the top of its pages: the findings that are open, in plain HTML.

It is put into pages as they are sent to the browser, never into files, so no built site holds any
of it. The pages below it are those last built.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from html import escape
from typing import TYPE_CHECKING

from watchglass.base.findings import Severity
from watchglass.shell.rendering.cells import visible
from watchglass.shell.rendering.places import Places
from watchglass.shell.rendering.tally import Counts, arrange

if TYPE_CHECKING:
    from watchglass.base.findings import Finding

_BODY = re.compile(rb"<body[^>]*>")
_CODE = re.compile(r"`([^`\n]+)`")
_STYLE = b"""\
<style>
.preview-findings { margin: 0; padding: 0.8rem 1.2rem; border-bottom: 0.3rem double currentColor;
  background: var(--tint, #e8eeec); color: var(--ink, #1b2024); font: 1rem/1.5 sans-serif; }
.preview-findings h2 { margin: 0 0 0.4rem; font-size: 1.15rem; }
.preview-findings p { margin: 0.2rem 0; }
.preview-findings li { margin: 0.6rem 0; }
.preview-findings code { font-size: 0.95em; overflow-wrap: anywhere; }
@media print { .preview-findings { display: none; } }
</style>
"""


@dataclass(frozen=True, slots=True)
class Notice:
    """What is open.

    Attributes:
        findings: Of the set.
        troubles: What else keeps the site from being built, in sentences.
        current: Whether the pages are what the files say now.
        built: Whether there are any pages yet.
    """

    findings: tuple[Finding, ...] = ()
    troubles: tuple[str, ...] = ()
    current: bool = True
    built: bool = True

    def shown(self) -> tuple[Finding, ...]:
        """Give the findings to show, in order; notes only beside what keeps the pages back."""
        least = Severity.WARNING if self.current else Severity.NOTE
        return tuple(f for f in arrange(self.findings) if f.code.severity >= least)

    def html(self) -> str:
        """Write the bar; empty where nothing is to be said."""
        shown = self.shown()
        if not shown and not self.troubles and self.current:
            return ""
        places = Places()
        items = "".join([_trouble(words) for words in self.troubles])
        items += "".join([_item(finding, places) for finding in shown])
        listed = f"<ol>\n{items}</ol>\n" if items else ""
        if self.current:
            listed = f"<details><summary>Show them</summary>\n{listed}</details>\n"
        return (
            '<section class="preview-findings" aria-labelledby="preview-findings">\n'
            f'<h2 id="preview-findings">{escape(self._heading(shown))}</h2>\n'
            f"<p>{self._state()}</p>\n{listed}</section>\n"
        )

    def _heading(self, shown: tuple[Finding, ...]) -> str:
        said = Counts.of(shown).sentence or "The site cannot be built"
        return f"To be mended: {said}" if not self.current else said

    def _state(self) -> str:
        if self.current:
            return "The pages are up to date."
        if self.built:
            return "The pages below are as they were last built. They follow as soon as this is mended."
        return "There are no pages yet. They appear as soon as this is mended."


def placed(content: bytes, bar: str) -> bytes:
    """Put a bar into a page, first thing in its body."""
    if not bar:
        return content
    found = _BODY.search(content)
    at = found.end() if found else 0
    content = content[:at] + b"\n" + bar.encode() + content[at:]
    return content.replace(b"</head>", _STYLE + b"</head>", 1)


def stand_in(heading: str) -> bytes:
    """Make the page that stands in for one there is none of."""
    return (
        '<!doctype html>\n<html lang="en">\n<head>\n<meta charset="utf-8">\n'
        f"<title>{escape(heading)}</title>\n"
        '<meta name="viewport" content="width=device-width, initial-scale=1">\n</head>\n'
        f'<body>\n<main id="content">\n<h1>{escape(heading)}</h1>\n</main>\n</body>\n</html>\n'
    ).encode()


def _item(finding: Finding, places: Places) -> str:
    code = finding.code
    help_ = f"<p>Help: {_words(finding.help)}</p>" if finding.help else ""
    return (
        f"<li><p><code>{escape(visible(places.address(finding.span)))}</code> "
        f"<strong>{code.severity.word} {code.number}</strong> {escape(code.name)}</p>\n"
        f"<p>{_words(finding.message)}</p>{help_}</li>\n"
    )


def _trouble(words: str) -> str:
    return f"<li><p>{_words(words)}</p></li>\n"


def _words(text: str) -> str:
    return _CODE.sub(r"<code>\1</code>", escape(visible(text, lines=True)))
