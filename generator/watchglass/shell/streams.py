"""The two output streams: results go to standard output, everything said to standard error.

A reader that has had enough (`watchglass check … | head`) is not a fault: `ReaderGone` carries
that up to the one place that ends the program. Whatever the encoding of a terminal, nothing that
is written may fail: characters it lacks are shown as escapes.
"""

from __future__ import annotations

import io
import os
import select
import sys
from typing import TYPE_CHECKING, TextIO

from watchglass.shell.rendering.style import Style

if TYPE_CHECKING:
    from collections.abc import Mapping

_WIDTH_UNKNOWN = 100
_WIDTH_LEAST, _WIDTH_MOST = 40, 120


class ReaderGone(Exception):  # noqa: N818 - it is an event, not an error
    """Nobody reads any more what is written."""


def prepare() -> None:
    """Make sure that no character can make writing fail."""
    for stream in (sys.stdout, sys.stderr):
        if isinstance(stream, io.TextIOWrapper):
            stream.reconfigure(errors="backslashreplace")


def put(text: str) -> None:
    """Write a result to standard output."""
    _write(sys.stdout, text)


def say(text: str) -> None:
    """Write a message to standard error."""
    _write(sys.stderr, text)


def _write(stream: TextIO, text: str) -> None:
    try:
        stream.write(text)
        stream.flush()
    except BrokenPipeError as error:
        raise ReaderGone from error


def nobody_reads() -> bool:
    """Tell whether the reader of an output stream has gone.

    What could not be written is kept and fails again, unless the stream has no buffer; for that
    case the system is asked about the pipe, where it can be.
    """
    try:
        sys.stdout.flush()
        sys.stderr.flush()
        if not hasattr(select, "poll"):
            return False
        poll = select.poll()
        poll.register(sys.stdout, 0)
        poll.register(sys.stderr, 0)
        return any(event & select.POLLERR for _, event in poll.poll(0))
    except BrokenPipeError:
        return True
    except (OSError, ValueError):
        return False


def close_quietly() -> None:
    """Leave nothing behind that Python would try, and fail, to write while it ends."""
    nowhere = os.open(os.devnull, os.O_WRONLY)
    for stream in (sys.stdout, sys.stderr):
        try:
            stream.flush()
        except BrokenPipeError:
            os.dup2(nowhere, stream.fileno())
    os.close(nowhere)


def style_of(stream: TextIO, environment: Mapping[str, str]) -> Style:
    """Decide how text for a stream is dressed.

    Colours are for a terminal that is not `dumb`, and only if `NO_COLOR` is unset or empty.
    """
    terminal = stream.isatty()
    colour = terminal and not environment.get("NO_COLOR") and environment.get("TERM") != "dumb"
    encoding = (getattr(stream, "encoding", None) or "utf-8").lower()
    return Style(
        colour=colour,
        width=_columns(stream) if terminal else _WIDTH_UNKNOWN,
        unicode=encoding.startswith("utf"),
    )


def _columns(stream: TextIO) -> int:
    try:
        columns = os.get_terminal_size(stream.fileno()).columns
    except (OSError, ValueError):
        return _WIDTH_UNKNOWN
    return min(max(columns, _WIDTH_LEAST), _WIDTH_MOST) if columns else _WIDTH_UNKNOWN
