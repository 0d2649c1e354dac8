"""What all tests share: golden files, the option that rewrites them, how properties are tried."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

import pytest
from hypothesis import settings

if TYPE_CHECKING:
    from collections.abc import Callable

GOLDEN = Path(__file__).parent / "golden"

# Nothing is left to chance, and a slow machine is no fault; long runs are made by hand.
settings.register_profile("ci", deadline=None, derandomize=True, max_examples=200)
settings.load_profile("ci")


def pytest_addoption(parser: pytest.Parser) -> None:
    parser.addoption(
        "--update-golden",
        action="store_true",
        help="rewrite the golden files with what is made now; read the diff like code",
    )


@pytest.fixture
def golden(request: pytest.FixtureRequest) -> Callable[[str, str], None]:
    """Compare a text with the golden file at a path under `tests/golden`, byte for byte."""
    update = bool(request.config.getoption("--update-golden"))

    def compare(path: str, text: str) -> None:
        place = GOLDEN / path
        if update:
            place.parent.mkdir(parents=True, exist_ok=True)
            place.write_bytes(text.encode())
        assert place.is_file(), f"{path} is missing: run with --update-golden, then read it"
        assert text == place.read_bytes().decode()

    return compare
