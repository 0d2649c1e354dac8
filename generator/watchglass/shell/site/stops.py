"""A request to end becomes an exception while a site is built, so that it is cleaned up after."""

from __future__ import annotations

import signal
import threading
from typing import TYPE_CHECKING, Any, NoReturn

if TYPE_CHECKING:
    from types import FrameType


class Stops:
    """Turns SIGTERM into `SystemExit` between `begin` and `end`.

    Only in the main thread, and only where nobody else handles the signal: a program that builds
    sites as a part of something larger keeps its own habits.
    """

    def __init__(self) -> None:
        self._earlier: Any = None

    def begin(self) -> None:
        """Take over the signal."""
        if threading.current_thread() is not threading.main_thread():
            return
        if signal.getsignal(signal.SIGTERM) is signal.SIG_DFL:
            self._earlier = signal.signal(signal.SIGTERM, _stop)

    def end(self) -> None:
        """Give it back."""
        if self._earlier is not None:
            signal.signal(signal.SIGTERM, self._earlier)
            self._earlier = None


def _stop(number: int, _frame: FrameType | None) -> NoReturn:
    raise SystemExit(128 + number)
