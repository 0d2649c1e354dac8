"""Lets `python -m watchglass` do what `watchglass` does."""

from watchglass.shell.cli import entry

if __name__ == "__main__":
    entry()
