"""Findings for a person: the fact, the place, the lines it stands in, and how to mend it.

    error[B120]: the separatory funnel would hold 150 mL; its size is 125 mL
      procedures/oc-04.md:31:8  funnel-overfilled
       31 | 4. Add {100 mL ether -> funnel} and stopper.
          |        ^^^^^^^^^^^^^^^^^^^^^^^^ 150 mL after this step
       27 | 3. Add {50 mL acid -> funnel}.
          |        ---------------------- 50 mL was already in it
      help: wash in two portions of 50 mL, or take the funnel of 250 mL

    1 error in 1 file

The name stands beside the place, since it is what `accept:` takes. A note asks for nothing, so it
takes one line and no excerpt. Without findings the text is empty: a sound draft passes in silence.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base.findings import Severity
from watchglass.shell.rendering.cells import visible
from watchglass.shell.rendering.excerpt import excerpt
from watchglass.shell.rendering.places import Places
from watchglass.shell.rendering.tally import Counts, arrange

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.base.findings import Edit, Finding
    from watchglass.shell.rendering.style import Style

_RECOGNISED = 60
"""Characters of a replaced text that are shown."""


def render(findings: Iterable[Finding], *, style: Style, limit: int = 0) -> str:
    """Render findings in full, with the sentence that counts them at the end.

    Args:
        findings: In any order.
        style: How the text is dressed.
        limit: Show no more than this many, and say how many more there are; 0 for all. The
            sentence counts all in any case.
    """
    arranged = arrange(findings)
    if not arranged:
        return ""
    places = Places()
    lines: list[str] = []
    after_note = True
    for finding in arranged[: limit or None]:
        note = finding.code.severity is Severity.NOTE
        if lines and not (note and after_note):
            lines.append("")
        lines.extend(_note(finding, places, style) if note else _finding(finding, places, style))
        after_note = note
    more = len(arranged) - limit
    if limit and more > 0:
        lines += ["", f"{more} more finding{'s' * (more > 1)} not shown; `--limit 0` shows all"]
    lines += ["", style.strong(Counts.of(arranged).sentence)]
    return "\n".join(lines) + "\n"


def _note(finding: Finding, places: Places, style: Style) -> Iterator[str]:
    code = finding.code
    address = visible(places.address(finding.span), unicode=style.unicode)
    message = visible(finding.message, unicode=style.unicode)
    yield f"{code.severity.word}[{code.number} {code.name}] {address}: {message}"
    yield from _help(finding, style)


def _finding(finding: Finding, places: Places, style: Style) -> Iterator[str]:
    code = finding.code
    dress = style.alarm if code.severity is Severity.ERROR else style.strong
    message = visible(finding.message, unicode=style.unicode)
    address = visible(places.address(finding.span), unicode=style.unicode)
    yield dress(f"{code.severity.word}[{code.number}]") + style.strong(f": {message}")
    yield f"  {address}  {style.faint(code.name)}"
    yield from excerpt(finding, places, style)
    yield from _help(finding, style)
    if finding.fix is not None:
        yield from _fix(finding, finding.fix, places, style)


def _help(finding: Finding, style: Style) -> Iterator[str]:
    if finding.help is None:
        return
    first, *more = visible(finding.help, unicode=style.unicode, lines=True).split("\n")
    yield f"  {style.strong('help:')} {first}"
    for line in more:
        yield f"        {line}".rstrip()


def _fix(finding: Finding, fix: Edit, places: Places, style: Style) -> Iterator[str]:
    """Say what the fix does in a sentence; a text of several lines is shown below it."""
    old = _short(visible(fix.span.text, unicode=style.unicode), style)
    new = visible(fix.text, unicode=style.unicode)
    several = "\n" in fix.text
    here = (fix.span.source.name, fix.span.start) == (finding.span.source.name, finding.span.start)
    where = "" if here else f" at {places.address(fix.span)}"
    where = visible(where, unicode=style.unicode)
    match (bool(old), bool(new)):
        case (True, False):
            said = f"take out `{old}`{where}"
        case (False, _):
            said = f"put in{where}:" if several else f"put in `{new}`{where}"
        case _:
            said = f"replace `{old}`{where} by:" if several else f"write `{new}` for `{old}`{where}"
    yield f"  {style.strong('fix:')} {said}"
    if several:
        for line in fix.text.split("\n"):
            yield f"       {visible(line, unicode=style.unicode)}".rstrip()


def _short(text: str, style: Style) -> str:
    """Keep both ends of a long text; what is replaced need only be recognised."""
    if len(text) <= _RECOGNISED:
        return text
    half = _RECOGNISED // 2
    return f"{text[:half]} {style.cut} {text[-half:]}"
