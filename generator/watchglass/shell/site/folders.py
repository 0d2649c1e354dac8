"""What is built where: beside the target, marked as ours, and swapped in whole.

    public/student                    the last good site
    public/.student.building-4711     what process 4711 is building
    public/.student.before-4711       the last good site while process 4711 swaps

Every folder made here carries a marker file, and a folder without one is never emptied, replaced
or removed. A build that dies leaves its building folder behind; the next one clears it, and puts
a site back that was on its way aside. MkDocs empties the folder it builds in but keeps what begins
with a dot, so the marker outlives that.
"""

from __future__ import annotations

import json
import os
import re
import shutil
from contextlib import suppress
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from collections.abc import Iterator, Sequence
    from pathlib import Path

MARKER = ".watchglass-handbook"
FORMAT = 1
_TOOL = "watchglass"
_LEFT = re.compile(r"(?P<kind>building|before)-(?P<pid>\d{1,10})")


class FolderRefused(Exception):  # noqa: N818 - said to the caller, as a sentence
    """A folder that may not be built in; the message says why and what would do."""


def refuse_unfit(target: Path, edition: str) -> None:
    """Refuse a target that is not ours to replace.

    A folder with another edition is refused too: what is published for students must not turn
    into the instructors' edition by a changed setting.

    Raises:
        FolderRefused: It is a link, a file, or a folder that holds something else.
    """
    if target.is_symlink():
        raise FolderRefused(f"`{target}` is a symbolic link; name the folder itself")
    if not target.exists():
        return
    if not target.is_dir():
        raise FolderRefused(f"`{target}` is a file; name a folder to build in")
    there = _edition_in(target)
    if there is None and any(target.iterdir()):
        raise FolderRefused(
            f"`{target}` holds files that were not built by watchglass (there is no {MARKER}); "
            "name another folder, or empty this one"
        )
    if there not in (None, edition):
        raise FolderRefused(
            f"`{target}` holds the {there} edition; "
            f"the {edition} edition is not put in its place: name another folder, or remove this one"
        )


def stage(target: Path, edition: str) -> Path:
    """Make an empty folder beside a target to build in, and clear what killed builds left.

    Raises:
        FolderRefused: The target is not ours to replace, or nothing can be written beside it.
    """
    _outside(target)
    clear_leftovers(target)
    refuse_unfit(target, edition)
    building = _beside(target, "building")
    try:
        target.parent.mkdir(parents=True, exist_ok=True)
        remove(building)
        building.mkdir()
        _mark(building, edition)
    except OSError as error:
        raise FolderRefused(
            f"`{target.parent}` cannot be written to ({error.strerror}); name another folder"
        ) from error
    return building


def swap(pairs: Sequence[tuple[Path, Path]]) -> None:
    """Put built folders in their targets' places: all of them, or none.

    Each step is a rename, so a target is absent only between two of them; whatever goes wrong in
    between, an interruption included, every last good site is put back.

    Args:
        pairs: What was built, and where it belongs.

    Raises:
        OSError: A rename failed; everything is as it was.
    """
    done: list[tuple[Path, Path]] = []
    try:
        for building, target in pairs:
            done.append((building, target))
            _put_in_place(building, target)
    except BaseException:
        for building, target in reversed(done):
            _put_back(building, target)
        raise
    for _, target in pairs:
        remove(_beside(target, "before"))


def remove(folder: Path) -> None:
    """Remove a folder of ours; one that is not, or is a link, is left alone."""
    if not folder.is_symlink() and folder.is_dir() and _removable(folder):
        shutil.rmtree(folder, ignore_errors=True)


def clear_leftovers(target: Path) -> None:
    """Clear what builds of a target left that were killed; put back a site that was moved aside."""
    for kind, folder in sorted(_leftovers(target), reverse=True):
        if kind == "before" and not target.exists() and not target.is_symlink():
            folder.rename(target)
        else:
            remove(folder)


def _put_in_place(building: Path, target: Path) -> None:
    before = _beside(target, "before")
    remove(before)
    if target.exists():
        target.rename(before)
    building.rename(target)


def _put_back(building: Path, target: Path) -> None:
    before = _beside(target, "before")
    if not building.exists() and target.exists():
        target.rename(building)
    if before.exists() and not target.exists():
        before.rename(target)


def _beside(target: Path, kind: str) -> Path:
    return target.parent / f".{target.name}.{kind}-{os.getpid()}"


def _outside(target: Path) -> None:
    if not target.name:
        raise FolderRefused(f"`{target}` cannot be built in; name another folder")


def _leftovers(target: Path) -> Iterator[tuple[str, Path]]:
    start = f".{target.name}."
    if not target.parent.is_dir():
        return
    for folder in target.parent.iterdir():
        found = _LEFT.fullmatch(folder.name.removeprefix(start))
        if not folder.name.startswith(start) or found is None:
            continue
        if not folder.is_symlink() and folder.is_dir() and not _alive(int(found["pid"])):
            yield found["kind"], folder


def _alive(pid: int) -> bool:
    """Tell whether a process is running; our own pid on a leftover is an earlier life's."""
    if pid == os.getpid():
        return False
    try:
        os.kill(pid, 0)
    except ProcessLookupError:
        return False
    except (PermissionError, OverflowError):
        return True
    return True


def _mark(folder: Path, edition: str) -> None:
    said = {"tool": _TOOL, "edition": edition, "format": FORMAT}
    (folder / MARKER).write_text(json.dumps(said) + "\n", encoding="utf-8")


def _edition_in(folder: Path) -> str | None:
    """Read a folder's marker; None where there is none of ours."""
    marker = folder / MARKER
    if marker.is_symlink():
        return None
    with suppress(OSError, ValueError):
        said = json.loads(marker.read_text("utf-8"))
        if isinstance(said, dict) and said.get("tool") == _TOOL:
            return str(said.get("edition"))
    return None


def _removable(folder: Path) -> bool:
    return _edition_in(folder) is not None or not any(folder.iterdir())
