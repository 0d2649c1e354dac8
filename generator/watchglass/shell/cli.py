"""The command line's door: what is answered at once, what is handed on, and how the program ends.

Help and version are what is asked for most, and importing click takes longer than everything else
such a call does. So they are printed from `help_text`, which a test holds equal to click's own
answer; all else goes to the commands, of which only the one called is imported.

Exit status: 0 nothing of severity error, 1 errors (with `--strict` warnings too), 2 a call that
cannot be understood, 3 a fault of ours, 130 stopped from the keyboard, 141 the reader went away.
"""

from __future__ import annotations

# ruff: noqa: PLC0415 - every import waits until it is needed; that is what this module is for
import sys

CLEAN, FOUND, USAGE, OUR_FAULT, STOPPED, UNREAD = 0, 1, 2, 3, 130, 141

TYPE_CHECKING = False
if TYPE_CHECKING:
    from collections.abc import Sequence


def entry() -> None:
    """Run as a program: what the console script and `python -m watchglass` call."""
    sys.exit(main())


def main(argv: Sequence[str] | None = None) -> int:
    """Run one command.

    Args:
        argv: The arguments after the program's name; by default those of the process.

    Returns:
        The exit status; see the module.
    """
    arguments = sys.argv[1:] if argv is None else list(argv)
    try:
        if arguments in ([], ["--help"], ["-h"], ["--version"]):
            return _at_once(arguments)
        return _run(arguments)
    except KeyboardInterrupt:
        return STOPPED
    except BrokenPipeError as error:
        return _broken_pipe(error)
    except Exception as error:  # noqa: BLE001 - the last door: every fault of ours ends here
        return _our_fault(error)


def _at_once(arguments: list[str]) -> int:
    from watchglass.shell import help_text

    if not arguments:
        sys.stderr.write(help_text.HELP)
        return USAGE
    sys.stdout.write(help_text.VERSION if arguments == ["--version"] else help_text.HELP)
    sys.stdout.flush()
    return CLEAN


def _run(arguments: list[str]) -> int:
    from watchglass.shell import commands, streams

    streams.prepare()
    try:
        return commands.run(arguments)
    except streams.ReaderGone:
        streams.close_quietly()
        return UNREAD


def _broken_pipe(error: BrokenPipeError) -> int:
    """End quietly if it is our own output that nobody reads; any other pipe is a fault of ours."""
    from watchglass.shell import streams

    if not streams.nobody_reads():
        return _our_fault(error)
    streams.close_quietly()
    return UNREAD


def _our_fault(error: Exception) -> int:
    from watchglass.shell.fault import report

    report(error)
    return OUR_FAULT
