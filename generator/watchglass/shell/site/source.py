"""What a site is made from: the one place that asks the pipeline and publish for it.

They are imported when asked, since MkDocs loads the plugin for every command it has.
"""

from __future__ import annotations

# ruff: noqa: PLC0415 - the stages are imported when a site is really built
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from pathlib import Path

    from watchglass.publish.handbook import HandbookPages
    from watchglass.shell.pipeline import Analysis


def analyse(folder: Path, scale: float | None = None) -> Analysis:
    """Read, run and judge a whole set, scaled by a factor where one is given."""
    from watchglass.shell.pipeline import analyse_set

    return analyse_set(folder, shown=f"{shown(folder)}/", scale=scale)


def pages(analysis: Analysis, edition: str) -> HandbookPages:
    """Make the models of an edition."""
    from watchglass.publish.handbook import make_handbook
    from watchglass.shell.pipeline import uncollected

    with uncollected():
        return make_handbook(analysis, edition)


def shown(folder: Path) -> str:
    """Give a folder's path as a reader would type it from here."""
    from pathlib import Path as _Path

    here = _Path.cwd()
    inside = folder.is_relative_to(here) and folder != here
    return (folder.relative_to(here) if inside else folder).as_posix()
