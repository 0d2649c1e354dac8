"""Densities of solutions between the points of a table: limits, smoothness, and the way back."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from watchglass.catalogue.densities import read_densities
from watchglass.chemistry.densities import (
    WATER,
    DensityTable,
    density_at,
    fraction_of_concentration,
)
from watchglass.shell.shipped import density_tables

TABLES = density_tables()
INNER = [(key, index) for key, table in TABLES.items() for index in range(1, len(table.points) - 1)]
KEYS = st.sampled_from(sorted(TABLES))
SHARES = st.floats(min_value=0.0, max_value=1.0)


def ideal(*fractions: float, solute: float = 2000.0) -> DensityTable:
    """Make the table of a solute whose volume adds up with the water's."""
    points = [(w, 1 / ((1 - w) / WATER + w / solute)) for w in (0.0, *fractions)]
    return DensityTable(tuple(points), ("",) * len(points))


def known(table: DensityTable, fraction: float) -> float:
    density = density_at(table, fraction)
    assert density is not None
    return density


@pytest.mark.parametrize(
    "table", [ideal(0.4), ideal(0.1, 0.4), ideal(0.1, 0.2, 0.4), ideal(0.05, 0.1, 0.2, 0.3, 0.4)]
)
@pytest.mark.parametrize("fraction", [0.0, 0.03, 0.1, 0.17, 0.29, 0.4])
def test_volumes_that_add_up_give_the_mixture_rule_exactly(
    table: DensityTable, fraction: float
) -> None:
    expected = 1 / ((1 - fraction) / WATER + fraction / 2000.0)

    assert density_at(table, fraction) == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize("key", TABLES)
def test_curve_begins_at_water_and_goes_through_every_point(key: str) -> None:
    table = TABLES[key]

    assert table.points[0] == (0.0, 998.2)
    assert [density_at(table, w) for w, _ in table.points] == pytest.approx(
        [density for _, density in table.points], rel=1e-12
    )


@pytest.mark.parametrize("key", TABLES)
def test_every_point_names_its_source(key: str) -> None:
    table = TABLES[key]

    assert len(table.sources) == len(table.points)
    assert set(table.sources[1:]) <= set("RMLPE")


@pytest.mark.parametrize("fraction", [-0.01, 0.4 + 1e-6, 1.0])
def test_nothing_is_told_outside_the_table(fraction: float) -> None:
    assert density_at(ideal(0.1, 0.4), fraction) is None


@pytest.mark.parametrize(("key", "index"), INNER, ids=str)
def test_curve_has_no_step_and_no_corner_at_its_points(key: str, index: int) -> None:
    table, step = TABLES[key], 1e-6
    fraction, density = table.points[index]
    before, after = known(table, fraction - step), known(table, fraction + step)

    assert before == pytest.approx(density, rel=1e-5)
    assert after - density == pytest.approx(density - before, abs=1e-10 * density)


@given(KEYS, SHARES, SHARES)
def test_stronger_solution_holds_more_in_a_volume(key: str, one: float, other: float) -> None:
    table = TABLES[key]
    low, high = sorted((one * table.most, other * table.most))

    assert low * known(table, low) <= high * known(table, high)


@given(KEYS, SHARES)
def test_concentration_leads_back_to_the_mass_fraction(key: str, share: float) -> None:
    table, molar_mass = TABLES[key], 0.040
    fraction = share * table.most
    concentration = fraction * known(table, fraction) / molar_mass

    back = fraction_of_concentration(table, concentration, molar_mass)

    assert back == pytest.approx(fraction, rel=1e-6, abs=1e-12)


@given(KEYS, SHARES)
def test_density_stays_between_the_lightest_and_the_heaviest_point_or_near(
    key: str, share: float
) -> None:
    table = TABLES[key]
    densities = [density for _, density in table.points]

    # Acetic acid and sulfuric acid have a maximum between two points.
    assert min(densities) * 0.999 <= known(table, share * table.most) <= max(densities) * 1.001


def test_nothing_dissolved_is_water() -> None:
    table = ideal(0.1, 0.4)

    assert density_at(table, 0.0) == pytest.approx(WATER)
    assert fraction_of_concentration(table, 0.0, 0.058) == pytest.approx(0.0, abs=1e-12)


def test_concentration_beyond_the_table_is_not_told() -> None:
    table = ideal(0.1, 0.4)
    most = 0.4 * known(table, 0.4) / 0.058

    assert fraction_of_concentration(table, most * 1.001, 0.058) is None


def test_file_is_read_line_by_line_with_its_letters() -> None:
    tables = read_densities("# a remark: none\nsome-salt: 5 1.0340 M, 10 1.0707 R\n")

    assert tables == {
        "some-salt": DensityTable(((0.0, 998.2), (0.05, 1034.0), (0.1, 1070.7)), ("", "M", "R"))
    }
