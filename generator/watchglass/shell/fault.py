"""What is said when the program itself is at fault: one calm message instead of a traceback."""

from __future__ import annotations

import os
import sys
import traceback
from pathlib import Path

import watchglass

_HOME = Path(watchglass.__file__).parent


def report(error: BaseException) -> None:
    """Say on standard error what happened and where; with the traceback if it is asked for.

    The exception's own words are kept for the traceback: they may quote what an author wrote, and
    the message is meant to be passed on without a second thought.
    """
    if os.environ.get("WATCHGLASS_TRACEBACK") == "1":
        traceback.print_exception(error)
    sys.stderr.write(
        f"watchglass {watchglass.__version__} came upon a fault of its own: "
        f"{type(error).__name__} at {_where(error)}\n"
        "This is not your mistake. Please report it, with this message and the input that led to"
        " it.\nWith WATCHGLASS_TRACEBACK=1 in the environment the whole traceback is shown.\n"
    )


def _where(error: BaseException) -> str:
    """Give the innermost place in our own code, as `run/bench.py:120`."""
    place = "an unknown place"
    for frame in traceback.extract_tb(error.__traceback__):
        path = Path(frame.filename)
        if path.is_relative_to(_HOME):
            place = f"{path.relative_to(_HOME.parent).as_posix()}:{frame.lineno}"
    return place
