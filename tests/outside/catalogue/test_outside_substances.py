"""The shipped catalogue against figures compiled from handbooks and measured sets, row by row.

Tolerances are those within which the sources agree among themselves: melting and boiling points
3 °C, flash points 6 °C, densities 0.5 %, log P 0.15; pKa by the case's own.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

import pytest

from outside.published import cases, rows
from outside.tolerances import tolerance_of, within
from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.shell.shipped import shipped

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.substances import Substance

ROWS = rows("substances.csv")
#: The table's "melting point" is where these decompose or sublime: the catalogue gives none.
NOT_MELTING = (
    "ammonium chloride",
    "sodium thiosulfate",
    "sodium bisulfite",
    "potassium permanganate",
    "copper(II) sulfate",
)


def named(name: str) -> Substance:
    tables = shipped().substances
    key = tables.names.get(name.casefold())
    assert key is not None, f"{name} is not in the catalogue"
    found = tables.get(key)
    assert found is not None
    return found


def having(*columns: str) -> list[Any]:
    return [p for p in ROWS if all(p.values[0][column] for column in columns)]


def celsius(quantity: Quantity | None) -> float | None:
    return None if quantity is None else quantity.si - 273.15


@pytest.mark.parametrize("row", ROWS)
def test_identity_is_that_of_the_table(row: dict[str, str]) -> None:
    substance = named(row["name"])
    formula = parse_formula(row["formula"])

    assert isinstance(formula, Formula)
    assert substance.formula is not None
    assert substance.cas == row["cas"]
    assert dict(substance.formula.composition) == dict(formula.composition)
    assert substance.molar_mass == pytest.approx(float(row["molar_mass_g_mol"]), abs=0.005)


@pytest.mark.parametrize("row", having("state_20C"))
def test_state_is_that_of_the_table(row: dict[str, str]) -> None:
    assert named(row["name"]).state == row["state_20C"]


@pytest.mark.parametrize("row", having("density_g_mL"))
def test_density_is_that_of_the_table(row: dict[str, str]) -> None:
    density = named(row["name"]).density

    assert density is not None
    assert density.value.si == pytest.approx(1000 * float(row["density_g_mL"]), rel=0.005)


@pytest.mark.parametrize("row", having("density_g_mL"))
def test_temperature_of_a_density_is_given_only_where_the_table_has_it(row: dict[str, str]) -> None:
    density = named(row["name"]).density

    assert density is not None
    assert celsius(density.temperature) == (
        pytest.approx(20) if row["density_T_C"] == "20" else None
    )


@pytest.mark.parametrize("row", [p for p in having("mp_C") if p.id not in NOT_MELTING])
def test_melting_point_is_that_of_the_table(row: dict[str, str]) -> None:
    assert celsius(named(row["name"]).melts) == pytest.approx(float(row["mp_C"]), abs=3)


@pytest.mark.parametrize("name", NOT_MELTING)
def test_what_decomposes_before_it_melts_has_no_melting_point(name: str) -> None:
    assert named(name).melts is None


@pytest.mark.parametrize("row", having("bp_C"))
def test_boiling_point_is_that_of_the_table(row: dict[str, str]) -> None:
    assert celsius(named(row["name"]).boils) == pytest.approx(float(row["bp_C"]), abs=3)


@pytest.mark.parametrize("row", having("flash_point_C"))
def test_flash_point_is_that_of_the_table(row: dict[str, str]) -> None:
    assert celsius(named(row["name"]).flash) == pytest.approx(float(row["flash_point_C"]), abs=6)


@pytest.mark.parametrize("row", having("logP"))
def test_log_p_is_that_of_the_table(row: dict[str, str]) -> None:
    assert named(row["name"]).log_p == pytest.approx(float(row["logP"]), abs=0.15)


@pytest.mark.parametrize("row", having("pKa"))
def test_pka_of_the_table_are_among_those_of_the_substance(row: dict[str, str]) -> None:
    substance = named(row["name"])
    own = (*substance.acid, *substance.base)
    asked = [float(value) for value in row["pKa"].replace(";", " ").split()]

    assert [a for a in asked if not any(abs(a - mine) <= 0.2 for mine in own)] == []


@pytest.mark.parametrize("case", cases("constants.json", "pka"))
def test_published_pka_is_that_of_the_catalogue(case: dict[str, Any]) -> None:
    substance = named(case["inputs"]["substance"])
    sides = {"acid": substance.acid, "conjugate acid": substance.base}
    own = sides.get(case["inputs"]["of"], (*substance.acid, *substance.base))
    allowed = tolerance_of(case, "pka")

    asked = case["expected"]["pka"]
    assert [a for a in asked if not any(within(mine, a, allowed) for mine in own)] == []


@pytest.mark.parametrize("case", cases("constants.json", "logp"))
def test_published_log_p_is_that_of_the_catalogue(case: dict[str, Any]) -> None:
    log_p = named(case["inputs"]["substance"]).log_p

    assert log_p is not None
    assert within(log_p, case["expected"]["logp"], tolerance_of(case, "logp"))
