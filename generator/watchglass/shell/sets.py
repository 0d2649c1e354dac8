"""Sets on disk: finding them, reading their files, nothing outside them."""

from __future__ import annotations

import os
from dataclasses import dataclass, field
from pathlib import Path
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.base.spans import Source

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

MARKER = "laboratory.yml"
MOST_BYTES = 8_000_000
_TEXT = (".md", ".yml", ".yaml")


@dataclass(frozen=True, slots=True)
class SetFiles:
    """The files of a set.

    Attributes:
        sources: Text files by path within the set, sorted.
        files: Paths of all files, pictures included.
        findings: Files that are no text.
    """

    sources: Mapping[str, Source]
    files: frozenset[str]
    findings: tuple[Finding, ...] = field(default=())


def find_set(path: Path) -> Path | None:
    """Find the set a file belongs to: the nearest folder above it that holds `laboratory.yml`."""
    for folder in path.resolve().parents:
        if (folder / MARKER).is_file():
            return folder
    return None


def read_set(root: Path, *, shown: str = "") -> SetFiles:
    """Read a whole set.

    Args:
        root: Its folder.
        shown: What to put before the paths that findings show, such as the folder as it was typed.

    Returns:
        Its files. Symbolic links that lead out of the set are not followed.
    """
    texts: dict[str, bytes] = {}
    files: set[str] = set()
    inside = root.resolve()
    for folder, folders, names in os.walk(root):
        folders[:] = sorted(f for f in folders if not f.startswith("."))
        for name in sorted(names):
            path = Path(folder) / name
            relative = path.relative_to(root).as_posix()
            if name.startswith(".") or not path.resolve().is_relative_to(inside):
                continue
            data = _read(path) if path.suffix in _TEXT else None
            if data is not None:
                texts[relative] = data
            elif path.is_file():
                files.add(relative)
    return from_bytes(texts, frozenset(files), shown=shown)


def _read(path: Path) -> bytes | None:
    """Read a plain file; None for a pipe, a device, a broken link, or a file gone meanwhile."""
    if not path.is_file():
        return None
    try:
        with path.open("rb") as file:
            return file.read(MOST_BYTES + 1)
    except FileNotFoundError:
        return None


def from_bytes(
    texts: Mapping[str, bytes | str], files: Iterable[str] = (), *, shown: str = ""
) -> SetFiles:
    """Make sources of a set's text files; one that is no UTF-8 text gives a finding."""
    sources: dict[str, Source] = {}
    findings: list[Finding] = []
    for path in sorted(texts):
        name = f"{shown}{path}"
        data = texts[path]
        if isinstance(data, str):
            sources[path] = Source.of(name, data)
            continue
        try:
            sources[path] = Source.of(name, data.decode("utf-8"))
        except UnicodeDecodeError as error:
            findings.append(_not_utf8(name, data, error))
    return SetFiles(sources, frozenset(files) | frozenset(texts), tuple(findings))


def _not_utf8(name: str, data: bytes, error: UnicodeDecodeError) -> Finding:
    source = Source.of(name, data.decode("utf-8", errors="replace"))
    before = Source.of(name, data[: error.start].decode("utf-8", errors="replace"))
    at = len(before.text)
    return Finding(
        code=codes.TEXT_NOT_UTF8,
        span=source.span(at, at + 1),
        message=f"the byte {data[error.start]:#04x} cannot stand in UTF-8 text",
        help="save the file as UTF-8; older programs on Windows save another encoding by default",
    )
