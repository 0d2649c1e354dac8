"""Where the themes are: in the wheel inside the package, in a checkout beside the source root.

MkDocs finds a theme by the `__file__` of what an entry point names, and expects a module there.
Ours lies outside any package so that its templates are plain files to read and replace; `handbook`
is an object that answers that one question.
"""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

import watchglass

NAME = "watchglass"


def find_themes() -> Path:
    """Find the folder of themes.

    Raises:
        FileNotFoundError: The package was taken apart: it is in neither place.
    """
    package = Path(watchglass.__file__).resolve().parent
    for folder in (package / "themes", package.parents[1] / "themes"):
        if (folder / "handbook" / "mkdocs_theme.yml").is_file():
            return folder
    raise FileNotFoundError("the themes that belong to this package are missing")


@dataclass(frozen=True)
class _Place:
    """What MkDocs takes for the theme's module."""

    __file__: str


handbook = _Place(str(find_themes() / "handbook" / "__init__.py"))
