"""Structures counted against formulas from elsewhere, CAS numbers and gas volumes."""

from __future__ import annotations

from typing import Any

import pytest

from outside.published import cases, rows
from outside.tolerances import wrong
from watchglass.chemistry.cas import check_digit_holds
from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.chemistry.gases import gas_volume
from watchglass.chemistry.smiles import Atoms, count_atoms


@pytest.mark.parametrize("row", rows("structures.csv"))
def test_structure_has_the_atoms_of_the_formula(row: dict[str, str]) -> None:
    formula = parse_formula(row["formula"])

    assert isinstance(formula, Formula)
    assert count_atoms(row["smiles"]) == Atoms(formula.composition, 0)


@pytest.mark.parametrize("row", rows("structures.csv"))
def test_cas_number_ends_in_its_check_digit(row: dict[str, str]) -> None:
    assert check_digit_holds(row["cas"])


@pytest.mark.parametrize("case", cases("gas_volumes.json", "ideal_gas_volume"))
def test_mole_of_gas_takes_up_its_volume(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    volume = gas_volume(
        amount=inputs["amount_mol"],
        temperature=inputs["temperature_C"] + 273.15,
        pressure=inputs["pressure_Pa"],
    )

    assert wrong(case, {"volume_L": volume * 1e3}) == {}
