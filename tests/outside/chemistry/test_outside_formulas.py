"""Formulas against published molar masses, and texts that must be refused."""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import molmass
import periodictable
import pytest

from outside.published import cases, rows
from outside.tolerances import tolerance_of, within
from watchglass.chemistry.elements import ELEMENTS, WEIGHTS
from watchglass.chemistry.formulas import Formula, FormulaFault, parse_formula


@pytest.mark.parametrize("case", cases("formulas.json", "molar_mass"))
def test_molar_mass_is_the_published_one(case: dict[str, Any]) -> None:
    formula = parse_formula(case["inputs"]["formula"])

    assert isinstance(formula, Formula)
    assert formula.molar_mass is not None
    expected = case["expected"]["molar_mass_g_per_mol"]
    assert within(formula.molar_mass, expected, tolerance_of(case, "molar_mass_g_per_mol"))


@pytest.mark.parametrize("case", cases("formulas.json", "molar_mass"))
def test_composition_and_charge_are_exact(case: dict[str, Any]) -> None:
    formula = parse_formula(case["inputs"]["formula"])

    assert isinstance(formula, Formula)
    expected = {e: Fraction(str(n)) for e, n in case["expected"]["composition"].items()}
    assert dict(formula.composition) == expected
    assert formula.charge == case["expected"]["charge"]


@pytest.mark.parametrize("case", cases("formulas.json", "malformed_formula"))
def test_malformed_formula_is_refused(case: dict[str, Any]) -> None:
    assert isinstance(parse_formula(case["inputs"]["formula"]), FormulaFault)


@pytest.mark.parametrize("case", cases("formulas.json", "notation_variant"))
def test_variant_is_refused_with_what_it_means_or_read_so(case: dict[str, Any]) -> None:
    read = parse_formula(case["inputs"]["formula"])
    meant = case["expected"]["means"]

    if isinstance(read, Formula):
        expected = case["expected"]["either"][1]["molar_mass_g_per_mol"]
        assert read.molar_mass is not None
        assert within(read.molar_mass, expected, tolerance_of(case, "molar_mass_g_per_mol"))
    else:
        assert read.help == f"write `{meant}`"


@pytest.mark.parametrize("row", rows("structures.csv"))
def test_formula_of_a_common_substance_has_its_molar_mass(row: dict[str, str]) -> None:
    formula = parse_formula(row["formula"])

    assert isinstance(formula, Formula)
    assert formula.molar_mass is not None
    # The table gives three decimals.
    assert abs(formula.molar_mass - float(row["molar_mass_g_mol"])) <= 0.00051


@pytest.mark.parametrize("row", rows("structures.csv"))
def test_formula_in_hill_order_is_written_back(row: dict[str, str]) -> None:
    formula = parse_formula(row["formula"])

    assert isinstance(formula, Formula)
    assert formula.hill() == row["formula"]


@pytest.mark.parametrize("symbol", sorted(WEIGHTS.keys() - {"D", "T"}))
def test_atomic_weight_agrees_with_periodictable(symbol: str) -> None:
    # periodictable 2 has the same table of 2021, so all digits must agree.
    assert WEIGHTS[symbol] == getattr(periodictable, symbol).mass


@pytest.mark.parametrize("symbol", sorted(WEIGHTS.keys() - {"D", "T"}))
def test_atomic_weight_agrees_with_molmass(symbol: str) -> None:
    # molmass works its weights out from isotopes: sulfur, the widest apart, is off by 1.5e-4.
    assert within(WEIGHTS[symbol], molmass.ELEMENTS[symbol].mass, {"rel": 1.6e-4})


@pytest.mark.parametrize("symbol", ["D", "T"])
def test_heavy_hydrogen_agrees_with_periodictable(symbol: str) -> None:
    assert within(WEIGHTS[symbol], getattr(periodictable, symbol).mass, {"abs": 1e-6})


@pytest.mark.parametrize("element", [e for e in periodictable.elements if e.number], ids=str)
def test_symbol_and_number_agree_with_periodictable(element: Any) -> None:
    assert ELEMENTS[element.symbol].number == element.number
