"""The explanation pages of findings: read, and set for a terminal.

A page stands in `watchglass/base/explanations/` under the number of its code. It is Markdown of
one shape: `# NUMBER name`, what is wrong, then sections under `##`. Examples are fenced blocks
whose info string is `wrong FILE` or `mended FILE`; tests check and run them. The pages are our
own text and use few forms, so simple rules for lines do here what a Markdown library would; and
they are read only when asked for, so no other command pays for them.
"""

from __future__ import annotations

import re
import textwrap
from dataclasses import dataclass
from importlib import resources
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.shell.rendering.cells import visible

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.base.findings import Code
    from watchglass.shell.rendering.style import Style

LINE_WIDTH = 88
"""Columns that a page fills at most."""

SUBJECTS = {
    "N": "Notation",
    "Q": "Quantities",
    "K": "Catalogue",
    "S": "Stoichiometry",
    "B": "Bench and vessels",
    "X": "Acid–base and partition",
    "H": "Hazards",
    "W": "Waste",
    "E": "Editions",
    "P": "Prep and print",
}
"""What the letters of the codes stand for, in the order of the stages."""

_TITLE = re.compile(r"# ([A-Z]\d{3}) ([a-z0-9]+(?:-[a-z0-9]+)*)")
_FENCE = re.compile(r"(`{3,}|~{3,})[ ]*(.*)")
_ITEM = re.compile(r"(?:[-*]|\d+[.)])[ ]+")


@dataclass(frozen=True, slots=True)
class ExampleFile:
    """One file of an example: its path within a set, and its text with the last line end."""

    name: str
    text: str


@dataclass(frozen=True, slots=True)
class Section:
    """A part of a page: its heading, empty for what stands before the first, and its Markdown."""

    heading: str
    text: str


@dataclass(frozen=True, slots=True, kw_only=True)
class Explanation:
    """One page.

    Attributes:
        number: The code's number, from the title.
        name: The code's name, from the title.
        sections: Its parts in order, the opening first.
        wrong: The files that give the finding.
        mended: The same files mended, which give nothing.
    """

    number: str
    name: str
    sections: tuple[Section, ...]
    wrong: tuple[ExampleFile, ...]
    mended: tuple[ExampleFile, ...]


@dataclass(frozen=True, slots=True)
class _Fence:
    info: str
    lines: tuple[str, ...]


def parse_explanation(text: str) -> Explanation:
    """Read an explanation page.

    Args:
        text: The page; its first line is `# NUMBER name`.

    Returns:
        The page in its parts.

    Raises:
        ValueError: The title is not of that form, a fence stays open, or the info string of an
            example names no file. The pages are ours, so each of these is our mistake.
    """
    first, _, rest = text.partition("\n")
    title = _TITLE.fullmatch(first.rstrip())
    if title is None:
        raise ValueError(f"the first line is no title of a finding: {first!r}")
    sections: list[Section] = []
    heading = ""
    body: list[str] = []
    examples: dict[str, list[ExampleFile]] = {"wrong": [], "mended": []}
    for part in _parts(rest.split("\n")):
        if isinstance(part, _Fence):
            _note_example(part, examples)
            body += part.lines
        elif part.startswith("## "):
            sections.append(Section(heading, "\n".join(body).strip("\n")))
            heading, body = part[3:].strip(), []
        else:
            body.append(part)
    sections.append(Section(heading, "\n".join(body).strip("\n")))
    return Explanation(
        number=title[1],
        name=title[2],
        sections=tuple(sections),
        wrong=tuple(examples["wrong"]),
        mended=tuple(examples["mended"]),
    )


def _note_example(fence: _Fence, examples: dict[str, list[ExampleFile]]) -> None:
    kind, _, name = fence.info.partition(" ")
    if kind not in examples:
        return
    if not name.strip():
        raise ValueError(f"an example names no file: {fence.info!r}")
    text = "".join(f"{line}\n" for line in fence.lines[1:-1])
    examples[kind].append(ExampleFile(name.strip(), text))


def _parts(lines: Iterable[str]) -> Iterator[str | _Fence]:
    """Give lines of prose one by one, and fenced blocks whole with their fences."""
    opened = info = ""
    held: list[str] = []
    for line in lines:
        if opened:
            held.append(line)
            if line.startswith(opened) and not line.strip(opened[0] + " "):
                yield _Fence(info, tuple(held))
                opened = ""
        elif fence := _FENCE.fullmatch(line):
            opened, info, held = fence[1], fence[2].strip(), [line]
        else:
            yield line
    if opened:
        raise ValueError(f"a fenced block is not closed: {held[0]!r}")


def page_text(code: Code) -> str | None:
    """Read the page of a code from the package; None where there is none yet."""
    place = resources.files("watchglass.base") / "explanations" / f"{code.number}.md"
    return place.read_text(encoding="utf-8") if place.is_file() else None


def page(code: Code, *, style: Style) -> str:
    """Set the page of a code for a terminal; without one, what the registry says of it."""
    head = style.strong(f"{code.number} {code.name}")
    lines = [f"{head}  {style.faint(f'{code.severity.word}, since {code.since}')}"]
    text = page_text(code)
    if text is None:
        return "\n".join([*lines, "", code.summary, ""])
    for section in parse_explanation(text).sections:
        if section.heading:
            lines += ["", style.strong(section.heading)]
        if section.text:
            lines += ["", *_set(section.text, style)]
    return "\n".join(line.rstrip() for line in lines) + "\n"


def _set(text: str, style: Style) -> Iterator[str]:
    """Set the Markdown of one section: paragraphs wrapped, blocks indented."""
    paragraph: list[str] = []
    for part in _parts(text.split("\n")):
        if isinstance(part, str) and part.strip() and not part.startswith("|"):
            if _ITEM.match(part):
                yield from _wrapped(paragraph, style)
                paragraph = []
            paragraph.append(part.strip())
            continue
        yield from _wrapped(paragraph, style)
        paragraph = []
        if isinstance(part, _Fence):
            yield from _block(part, style)
        else:
            yield _safe(part, style)
    yield from _wrapped(paragraph, style)


def _wrapped(lines: list[str], style: Style) -> Iterator[str]:
    if not lines:
        return
    item = _ITEM.match(lines[0])
    hanging = " " * len(item[0]) if item else ""
    text = " ".join(lines).replace("**", "")
    yield from textwrap.wrap(
        _safe(text, style),
        width=style.width,
        subsequent_indent=hanging,
        break_long_words=False,
        break_on_hyphens=False,
    )


def _block(fence: _Fence, style: Style) -> Iterator[str]:
    kind, _, name = fence.info.partition(" ")
    if kind in {"wrong", "mended"}:
        yield style.faint(f"  {name.strip()}")
    for line in fence.lines[1:-1]:
        yield f"    {_safe(line.expandtabs(4), style)}"


def _safe(text: str, style: Style) -> str:
    return visible(text, unicode=style.unicode)


def listing(*, style: Style) -> str:
    """List all findings there are, by subject, each with its summary."""
    wide = max(len(code.name) for code in codes.ALL)
    blocks = []
    for letter, subject in SUBJECTS.items():
        found = [code for code in codes.ALL if code.number.startswith(letter)]
        if found:
            rows = "".join(
                f"  {code.number}  {code.name:<{wide}}  {code.severity.word:<7}  {code.summary}\n"
                for code in found
            )
            blocks.append(style.strong(_safe(subject, style)) + "\n" + rows)
    return "\n".join(blocks)
