"""Files looked at again and again: what `check --watch` waits for.

Only `stat` is asked of each file, three times a second; new and deleted files count as changes.
Pictures count too, since a procedure that shows one is judged by whether it is there; hidden files
and the copies that editors leave (`a.md~`) do not.
"""

from __future__ import annotations

import os
import time
from typing import TYPE_CHECKING

from watchglass.shell.sets import find_set

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping
    from pathlib import Path

#: Seconds between two looks.
PAUSE = 0.3
_AROUND = ("laboratory.yml", "stocks.yml", "substances")

Seen = dict[str, tuple[int, int]]


class Watch:
    """What was seen of some files when it was last looked at them.

    It is looked at them once at the beginning: what changes from then on is never missed, be it
    while a check of them runs.
    """

    def __init__(self, paths: Iterable[Path]) -> None:
        """Begin with what is there now.

        Args:
            paths: Sets, whose folders are looked through, and single files, for which the files of
                the set that they are resolved in count too.
        """
        self.paths = _with_surroundings(paths)
        self._before = seen(self.paths)

    def changed(self) -> bool:
        """Tell whether anything changed since the last look."""
        now = seen(self.paths)
        before, self._before = self._before, now
        return now != before

    def wait(self, pause: float = PAUSE) -> None:
        """Come back once something changed, looking every `pause` seconds."""
        while not self.changed():
            time.sleep(pause)


def seen(paths: Iterable[Path]) -> Mapping[str, tuple[int, int]]:
    """Give when each file was changed (ns) and how large it is (bytes), by path."""
    found: Seen = {}
    for path in paths:
        if path.is_dir():
            _look_through(str(path), found)
        else:
            try:
                status = path.stat()
            except OSError:  # it is not there just now
                continue
            found[str(path)] = status.st_mtime_ns, status.st_size
    return found


def _look_through(folder: str, found: Seen) -> None:
    folders = [folder]
    while folders:
        try:
            entries = os.scandir(folders.pop())
        except OSError:  # it went between two looks
            continue
        with entries:
            for entry in entries:
                if entry.name.startswith(".") or entry.name.endswith("~"):
                    continue
                try:
                    if entry.is_dir(follow_symlinks=False):
                        folders.append(entry.path)
                    else:
                        status = entry.stat()
                        found[entry.path] = status.st_mtime_ns, status.st_size
                except OSError:
                    continue


def _with_surroundings(paths: Iterable[Path]) -> tuple[Path, ...]:
    """Add to single files what they are resolved in: facts, stocks and substances of their set."""
    watched: dict[Path, None] = {}
    for path in paths:
        watched[path] = None
        root = None if path.is_dir() else find_set(path)
        if root is not None:
            watched |= dict.fromkeys(root / name for name in _AROUND)
    return tuple(watched)
