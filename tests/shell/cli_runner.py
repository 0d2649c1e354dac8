"""Ways to run the command line: as a process of its own, or here with the stages replaced."""

from __future__ import annotations

import os
import subprocess
import sys
from pathlib import Path
from types import ModuleType
from typing import TYPE_CHECKING

import watchglass

if TYPE_CHECKING:
    from collections.abc import Callable

    import pytest

ROOT = str(Path(watchglass.__file__).parents[1])

WITH_FAKE_PIPELINE = """
import sys, types
from watchglass.base.findings import Code, Finding, Severity
from watchglass.base.spans import Source
source = Source.of("a.md", "{100 mL \\u2192 A\\n")
finding = Finding(
    code=Code("N110", "mark-not-closed", Severity.ERROR, "s"),
    span=source.span(0, 11),
    message="a brace at 20 \\u00b0C",
)
module = types.ModuleType("watchglass.shell.pipeline")
module.check_paths = lambda paths, scale=None: types.SimpleNamespace(
    findings=(finding,) * 1, checked=1, accepted=()
)
sys.modules["watchglass.shell.pipeline"] = module
from watchglass.shell.cli import main
status = main(sys.argv[1:])
"""


def run(*arguments: str, **environment: str) -> subprocess.CompletedProcess[str]:
    """Run Python in a process of its own, with the package on its path."""
    kept = {
        name: value
        for name, value in os.environ.items()
        if name not in {"NO_COLOR", "PYTHONIOENCODING", "WATCHGLASS_TRACEBACK"}
    }
    return subprocess.run(  # noqa: S603 - our own interpreter
        [sys.executable, *arguments],
        env={**kept, "PYTHONPATH": ROOT, "PYTHONUTF8": "1", **environment},
        capture_output=True,
        encoding="utf-8",
        check=False,
        timeout=60,
    )


def replace_module(
    monkeypatch: pytest.MonkeyPatch, name: str, **functions: Callable[..., object]
) -> None:
    """Put a module of the given functions in a module's place."""
    module = ModuleType(name)
    for function, body in functions.items():
        setattr(module, function, body)
    monkeypatch.setitem(sys.modules, name, module)
