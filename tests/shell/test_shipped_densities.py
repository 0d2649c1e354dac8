"""The table of densities is read by those who need it only."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from builders import step
from watchglass.shell import shipped

if TYPE_CHECKING:
    from collections.abc import Iterator

VESSEL = "vessels: {A: beaker 100 mL}\n"


@pytest.fixture(autouse=True)
def _unread() -> Iterator[None]:
    shipped.density_tables.cache_clear()
    yield
    shipped.density_tables.cache_clear()


def read_for(material: str) -> bool:
    """Judge a draft of one material, and tell whether the table was read."""
    step("Put {5.0 mL x -> A}.", "Keep {A}.", front=f"materials: {{x: {material}}}\n{VESSEL}")
    return shipped.density_tables.cache_info().misses > 0


@pytest.mark.parametrize(
    "material", ["ethanol", "water", "{contains: {ethanol: 1 mL, water: 1 mL}}"]
)
def test_draft_without_a_solution_does_not_read_the_table(material: str) -> None:
    assert not read_for(material)


def test_solution_by_mass_reads_it() -> None:
    assert read_for("37 % w/w hydrochloric acid")
