"""Files looked at again and again: what `check --watch` waits for.

Only `stat` is asked of each file, three times a second; new and deleted files count as changes.
"""

from __future__ import annotations

import time
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping
    from pathlib import Path

#: Seconds between two looks.
PAUSE = 0.3
_SUFFIXES = frozenset((".md", ".yml"))


def seen(paths: Iterable[Path]) -> Mapping[str, tuple[int, int]]:
    """Give when each file was changed and how large it is, by path; folders are looked through."""
    found: dict[str, tuple[int, int]] = {}
    for file in _files(paths):
        try:
            status = file.stat()
        except OSError:  # it went between two looks
            continue
        found[str(file)] = status.st_mtime_ns, status.st_size
    return found


def changes(paths: tuple[Path, ...], pause: float = PAUSE) -> Iterator[None]:
    """Give once each time that something changed, without end."""
    before = seen(paths)
    while True:
        time.sleep(pause)
        now = seen(paths)
        if now != before:
            before = now
            yield None


def _files(paths: Iterable[Path]) -> Iterator[Path]:
    for path in paths:
        if path.is_dir():
            for file in sorted(path.rglob("*")):
                if file.suffix in _SUFFIXES and file.is_file():
                    yield file
        else:
            yield path
