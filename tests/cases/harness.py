"""One small harness for examples and cases: sets of files as text, checked in memory.

Two kinds of text are read here:

- Explanation pages: each holds a set of files that is wrong and the same set mended, in blocks
  fenced by `~~~` whose info string is `wrong NAME` or `mended NAME`. `wrong-hex NAME` holds bytes
  in hexadecimal; in `wrong-repeat NAME` a line `@repeat 40 "> " "words"` stands for `> ` forty
  times and `words` after it, on one line.
- Case files: procedures with notes. `<!-- error N163 8-13 words -->` on a line of its own speaks
  of the next line that is no note: severity, code, first and last column (from 1, both included;
  a place that runs on is cut at the end of its line), and a part of the message. The notes are
  taken out before the check, and all notes are compared with all findings above note severity.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base.findings import Severity
from watchglass.base.spans import Lines

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping

    from watchglass.base.findings import Code, Finding

CASES = Path(__file__).parent
PAGES = Path(codes.__file__).parent / "explanations"
SECTIONS = ("Why it matters", "Wrong", "Mended", "When it may be accepted", "Source")

_FENCE = re.compile(
    r"^~~~(?P<kind>wrong|mended|wrong-hex|wrong-repeat) (?P<name>\S+)\n(?P<body>.*?)^~~~$",
    re.MULTILINE | re.DOTALL,
)
_REPEAT = re.compile(r'^@repeat (\d+) "([^"\n]*)"(?: "([^"\n]*)")?$', re.MULTILINE)
_NOTE = re.compile(r"[ \t]*<!-- (error|warning) ([A-Z]\d{3}) (\d+)-(\d+) (.*\S) -->[ \t]*")

Files = dict[str, bytes]


def check_files(files: Mapping[str, bytes | str]) -> tuple[Finding, ...]:
    """Check a set given as texts by path; without `laboratory.yml` it has an empty one."""
    from watchglass.shell.pipeline import check_texts

    given = {name: text.encode() if isinstance(text, str) else text for name, text in files.items()}
    return tuple(check_texts({"laboratory.yml": b"", **given}))


def above_note(findings: Iterable[Finding]) -> tuple[Finding, ...]:
    """Leave out what asks for nothing."""
    return tuple(finding for finding in findings if finding.code.severity > Severity.NOTE)


def told(findings: Iterable[Finding]) -> str:
    """Put findings into lines for the message of a failing test."""
    return "\n".join(
        f"{f.span.source.name}:{f.span.position()[0]}:{f.span.position()[1]} "
        f"{f.code.number} {f.code.name}: {f.message} [{f.span.text[:40]!r}]"
        for f in findings
    )


# ------------------------------------------------------------------------------ explanation pages


@dataclass(frozen=True, slots=True)
class Example:
    """The two sets of files of one explanation page."""

    code: Code
    wrong: Files
    mended: Files


def page_path(code: Code) -> Path:
    """Say where the explanation page of a code stands."""
    return PAGES / f"{code.number}.md"


def example(code: Code) -> Example:
    """Read the examples of one page."""
    wrong: Files = {}
    mended: Files = {}
    for found in _FENCE.finditer(page_path(code).read_text(encoding="utf-8")):
        files = mended if found["kind"] == "mended" else wrong
        assert found["name"] not in files, f"{code.number} gives {found['name']} twice"
        files[found["name"]] = _bytes_of(found["kind"], found["body"])
    return Example(code, wrong, mended)


def examples() -> Iterator[Example]:
    """Read the examples of all pages there are, in the order of their numbers."""
    for code in codes.ALL:
        if page_path(code).is_file():
            yield example(code)


def _bytes_of(kind: str, body: str) -> bytes:
    match kind:
        case "wrong-hex":
            return bytes.fromhex(body)
        case "wrong-repeat":
            return _REPEAT.sub(_repeated, body).encode()
        case _:
            return body.encode()


def _repeated(found: re.Match[str]) -> str:
    return found[2] * int(found[1]) + (found[3] or "")


# ------------------------------------------------------------------------------ case files


class Note(NamedTuple):
    """What a case expects of one line, or what was found there.

    `line` counts from 1 in the text without notes; columns are both included.
    """

    line: int
    severity: str
    code: str
    first: int
    last: int
    message: str

    @property
    def place(self) -> tuple[int, str, str, int, int]:
        """All but the message, of which a case gives a part only."""
        return self[:5]

    def written(self) -> str:
        """Write it as it stands in a case file."""
        return f"<!-- {self.severity} {self.code} {self.first}-{self.last} {self.message} -->"


def case_paths() -> list[Path]:
    """Give all case files; each stands in the folder of the stage that finds its fault."""
    return sorted(CASES.glob("*/*.md"))


def take_notes(text: str) -> tuple[str, tuple[Note, ...]]:
    """Take the notes out of a case; give the text that is checked, and the notes."""
    kept: list[str] = []
    notes: list[Note] = []
    for line in text.splitlines(keepends=True):
        if found := _NOTE.fullmatch(line.rstrip("\n")):
            first, last = int(found[3]), int(found[4])
            notes.append(Note(len(kept) + 1, found[1], found[2], first, last, found[5]))
        else:
            kept.append(line)
    return "".join(kept), tuple(notes)


def note_of(finding: Finding) -> Note:
    """Turn a finding into the note that asks for it."""
    lines = Lines(finding.span.source.text)
    start = lines.position(finding.span.start)
    room = len(lines.line(start.line)) - start.column + 1
    width = max(1, min(finding.span.end - finding.span.start, room))
    code = finding.code
    return Note(
        start.line, code.severity.word, code.number, start.column, start.column + width - 1,
        finding.message,
    )  # fmt: skip


def put_notes(text: str, notes: Iterable[Note]) -> str:
    """Put notes into a text without any: the way back from `take_notes`."""
    by_line: dict[int, list[Note]] = {}
    for note in sorted(notes, key=lambda note: (note.line, note.first, note.code)):
        by_line.setdefault(note.line, []).append(note)
    written: list[str] = []
    for number, line in enumerate(text.splitlines(keepends=True), start=1):
        written += [note.written() + "\n" for note in by_line.get(number, ())]
        written.append(line)
    return "".join(written)
