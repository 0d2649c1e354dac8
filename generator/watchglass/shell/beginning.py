"""Writing a first set: the files in `beginnings/`, copied beside the target and put there by renaming.

A folder that was not there appears whole or not at all. An empty one that was there stays the same
folder (somebody may be standing in it): the files are moved in, and taken out again if one fails.
"""

from __future__ import annotations

import os
import shutil
from contextlib import suppress
from pathlib import Path

from watchglass.shell.commands.verdict import Refused
from watchglass.shell.schemas import write_schemas

BEGINNINGS = Path(__file__).with_name("beginnings")
"""What a new set holds; it is checked and built by a test. The schemas its files name are made."""


def write_set(target: Path) -> None:
    """Write a small working set and its site.

    Args:
        target: A folder that is empty or not there; folders above it are made.

    Raises:
        Refused: The target is something else, or cannot be written to; nothing was written.
    """
    _refuse_unfit(target)
    try:
        target.parent.mkdir(parents=True, exist_ok=True)
        beside = _beside(target)
        try:
            _copy(BEGINNINGS, beside)
            write_schemas(beside / "schemas")
            if target.is_dir():
                _move_in(beside, target)
            else:
                beside.rename(target)
        finally:
            shutil.rmtree(beside, ignore_errors=True)
    except OSError as error:
        raise Refused(f"`{target}` cannot be written ({error.strerror})") from error


def _refuse_unfit(target: Path) -> None:
    if target.is_symlink():
        raise Refused(f"`{target}` is a symbolic link; name the folder itself")
    if target.is_dir():
        if any(target.iterdir()):
            raise Refused(f"`{target}` holds files already; name a new folder")
    elif target.exists():
        raise Refused(f"`{target}` is a file; name a new folder")


def _beside(target: Path) -> Path:
    absolute = target.absolute().resolve()
    beside = absolute.parent / f".{absolute.name}.new-{os.getpid()}"
    shutil.rmtree(beside, ignore_errors=True)
    return beside


def _copy(origin: Path, target: Path) -> None:
    """Copy contents alone: an installed package may be read-only, a set is there to be written in."""
    target.mkdir()
    for entry in sorted(origin.iterdir()):
        if entry.is_dir():
            _copy(entry, target / entry.name)
        else:
            (target / entry.name).write_bytes(entry.read_bytes())


def _move_in(beside: Path, target: Path) -> None:
    """Move everything into an empty folder; on a fault what was moved is removed again."""
    moved: list[Path] = []
    try:
        for entry in sorted(beside.iterdir()):
            place = target / entry.name
            moved.append(place)
            entry.rename(place)
    except BaseException:
        for place in moved:
            if place.is_dir():
                shutil.rmtree(place, ignore_errors=True)
            else:
                with suppress(OSError):
                    place.unlink()
        raise
