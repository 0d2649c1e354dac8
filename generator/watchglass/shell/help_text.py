"""What the bare program, `--help` and `--version` print, kept ready.

Written down so that these answers need no import of click; `tests/shell/test_cli_help.py` holds
them equal to what click makes of the commands, and says what to put here when they change.
"""

from __future__ import annotations

from watchglass import __version__

VERSION = f"watchglass {__version__}\n"

HELP = """\
Usage: watchglass [OPTIONS] COMMAND [ARGS]...

  Check laboratory procedures and publish them as a handbook.

Options:
  --version   Show the version and exit.
  -h, --help  Show this message and exit.

Commands:
  check    Judge procedures and say what is wrong.
  build    Build the handbook of a site.
  serve    Show a site in a browser as it is written.
  ledger   Show what every vessel holds after every step.
  reckon   Work out expressions of the notation.
  new      Write a small set and its site to begin with.
  schema   Print a JSON Schema for editors and other programs.
  explain  Say what a finding means.

  `watchglass COMMAND --help` tells more about a command.
"""
