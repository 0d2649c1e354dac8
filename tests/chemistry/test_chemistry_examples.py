"""The examples in the docstrings run, and nothing but the standard library is imported."""

from __future__ import annotations

import ast
import doctest
import importlib
import pkgutil
import sys

import pytest

import watchglass.chemistry

MODULES = sorted(
    f"watchglass.chemistry.{found.name}"
    for found in pkgutil.iter_modules(watchglass.chemistry.__path__)
)


@pytest.mark.parametrize("name", MODULES)
def test_examples_give_what_they_say(name: str) -> None:
    result = doctest.testmod(importlib.import_module(name))

    assert result.failed == 0


@pytest.mark.parametrize("name", MODULES)
def test_only_the_standard_library_is_imported(name: str) -> None:
    spec = importlib.util.find_spec(name)
    assert spec is not None
    assert spec.origin is not None
    with open(spec.origin, encoding="utf-8") as file:  # noqa: PTH123 - a path as text is at hand
        tree = ast.parse(file.read())
    imported = {node.module for node in ast.walk(tree) if isinstance(node, ast.ImportFrom)} | {
        alias.name
        for node in ast.walk(tree)
        if isinstance(node, ast.Import)
        for alias in node.names
    }

    strange = {
        module
        for module in imported
        if not str(module).startswith("watchglass.chemistry.")
        and str(module).partition(".")[0] not in sys.stdlib_module_names
    }
    assert strange == set()
