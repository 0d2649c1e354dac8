"""The theme is found, in a checkout and inside the package, and MkDocs takes it."""

from __future__ import annotations

from pathlib import Path

import pytest
from mkdocs.utils import get_theme_dir

import watchglass
from watchglass.shell.site import theme


def test_checkout_has_its_themes_beside_the_source_root() -> None:
    assert theme.find_themes() == Path(__file__).parents[2] / "themes"


def test_themes_inside_the_package_go_first(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    inside = tmp_path / "watchglass" / "themes"
    (inside / "handbook").mkdir(parents=True)
    (inside / "handbook" / "mkdocs_theme.yml").write_text("locale: en\n")
    monkeypatch.setattr(watchglass, "__file__", str(tmp_path / "watchglass" / "__init__.py"))

    assert theme.find_themes() == inside


def test_package_without_its_themes_says_so(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(watchglass, "__file__", str(tmp_path / "a" / "watchglass" / "__init__.py"))

    with pytest.raises(FileNotFoundError):
        theme.find_themes()


def test_mkdocs_finds_the_theme_by_its_name() -> None:
    assert Path(get_theme_dir(theme.NAME)) == theme.find_themes() / "handbook"


@pytest.mark.parametrize("name", ["handbook.css", "print.css"])
def test_styles_fetch_nothing(name: str) -> None:
    style = (theme.find_themes() / "handbook" / "css" / name).read_text("utf-8")

    assert "url(" not in style
    assert "@import" not in style
    assert "@font-face" not in style
