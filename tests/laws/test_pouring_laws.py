"""Drawing, pouring and sorting lose nothing and make nothing, whatever is in the vessel."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from run.bench.shelf import SHELF
from watchglass.run.bench.liquids import liquid_volume, sort
from watchglass.run.bench.pouring import draw, pour
from watchglass.run.bench.state import Phase, Vessel, added

if TYPE_CHECKING:
    from collections.abc import Mapping

LAW = settings(deadline=None, derandomize=True, max_examples=100)
AMOUNTS = st.floats(1e-6, 10.0)
SHARES = st.floats(0.0, 1.0)
PARTS = st.sampled_from(("", "aqueous", "organic", "solid", "liquid"))


def _amounts(*keys: str) -> st.SearchStrategy[dict[str, float]]:
    return st.dictionaries(st.sampled_from(keys), AMOUNTS, max_size=len(keys))


@st.composite
def _phases(draw_: st.DrawFn, *keys: str) -> Phase:
    amounts = draw_(_amounts(*keys))
    return Phase(amounts, liquid_volume(amounts, SHELF))


AQUEOUS = _phases("water", "spirit", "solute", "Na^+", "Cl^-")
ORGANIC = _phases("light", "heavy", "spirit", "solute")
VESSELS = st.builds(
    Vessel,
    name=st.just("A"),
    aqueous=AQUEOUS,
    organic=ORGANIC,
    solid=_amounts("salt", "solute"),
    temperature=st.floats(250.0, 400.0),
)


def whole(vessel: Vessel) -> Mapping[str, float]:
    """Sum what is in all parts of a vessel; solids by names of their own."""
    solid = {f"{key} (solid)": amount for key, amount in vessel.solid.items()}
    return added(added(vessel.aqueous.amounts, vessel.organic.amounts), solid)


@given(VESSELS, PARTS, SHARES)
@LAW
def test_what_is_left_and_what_is_taken_are_the_whole(
    vessel: Vessel, part: str, share: float
) -> None:
    left, taken = draw(vessel, part, share)
    drawn = Vessel("B", aqueous=taken.aqueous, organic=taken.organic, solid=taken.solid)

    assert added(whole(left), whole(drawn)) == pytest.approx(whole(vessel), rel=1e-9, abs=1e-12)
    assert left.volume + taken.volume == pytest.approx(vessel.volume, rel=1e-9, abs=1e-15)


@given(VESSELS, VESSELS)
@LAW
def test_what_is_poured_together_is_the_sum_of_both(one: Vessel, other: Vessel) -> None:
    _, coming = draw(other, "")
    both = pour(one, coming, SHELF)

    assert whole(both) == pytest.approx(added(whole(one), whole(other)), rel=1e-9, abs=1e-12)
    assert both.volume == pytest.approx(one.volume + other.volume, rel=1e-9, abs=1e-15)


@given(VESSELS, VESSELS)
@LAW
def test_temperature_lies_between_those_of_what_is_poured_together(
    one: Vessel, other: Vessel
) -> None:
    _, coming = draw(other, "")
    both = pour(one, coming, SHELF)
    low, high = sorted((one.temperature, other.temperature))

    assert low - 1e-9 <= both.temperature <= high + 1e-9


@given(AQUEOUS, ORGANIC)
@LAW
def test_sorting_twice_is_sorting_once(aqueous: Phase, organic: Phase) -> None:
    once = sort(aqueous, organic, SHELF)
    twice = sort(*once, SHELF)

    for first, second in zip(once, twice, strict=True):
        assert second.amounts == pytest.approx(first.amounts)
        assert second.volume == pytest.approx(first.volume)


@given(AQUEOUS, ORGANIC)
@LAW
def test_ions_are_in_the_water_where_there_are_two_layers(aqueous: Phase, organic: Phase) -> None:
    wet, dry = sort(aqueous, organic, SHELF)

    if wet and dry:
        assert not {"Na^+", "Cl^-", "water"} & dry.amounts.keys()
        assert "light" not in wet.amounts
        assert "heavy" not in wet.amounts
