"""The unit table is what pint makes of the definitions, and agrees with pint's own registry."""

from __future__ import annotations

import math
from functools import cache
from typing import Any

import pytest

from tools.unit_table import BASE, make
from watchglass.base import dimensions as dim
from watchglass.base import units
from watchglass.base.scan import Found, scan_quantity
from watchglass.base.units import REFUSED, UNITS, Unit

#: Symbols that pint's own registry spells in another way.
_PINTS = {
    "M": "molar", "mM": "millimolar", "µM": "micromolar", "μM": "micromolar", "uM": "micromolar",
    "nM": "nanomolar", "Å": "angstrom", "in": "inch", "d": "day", "h": "hour", "°C": "degC",
    "℃": "degC", "°F": "degF", "℉": "degF", "rpm": "turn/minute", "L": "liter", "l": "liter",
    "oz": "ounce", "lb": "pound", "min": "minute",
    "Torr": "torr",
}  # fmt: skip

#: Measured by pint in other dimensions: no share, and an angle is none of its base quantities.
_WITHOUT = {"%", "‰", "ppm", "ppb"}
_LINEAR = sorted(s for s, u in UNITS.items() if not u.offset and s not in _WITHOUT)

COMPOUNDS = [
    "g/mL", "g/cm^3", "kg/m^3", "mg/L", "g/L", "mg/dL", "mol/L", "mmol/mL", "mmol/L", "µmol/L",
    "mol/m^3", "g/mol", "kg/mol", "kg/kmol", "J/mol", "kJ/mol", "kcal/mol", "J/(g·K)",
    "J/(mol·K)", "kJ/(kg·K)", "mL/min", "L/h", "mL/h", "g/h", "cm^2", "cm^3", "mm^2", "m^-1",
    "mol/kg", "W/m^2", "V/cm", "mg/(kg·d)", "kg·m^2/s^2", "g·cm/s", "mbar·L/s", "mol·L^-1·s^-1",
]  # fmt: skip


@cache
def registry() -> Any:
    """Give pint's own registry: its definitions, not ours."""
    import pint

    return pint.UnitRegistry()


def unit(symbol: str) -> Unit:
    """Read a unit as it stands after a number."""
    found = scan_quantity("1 " + symbol, 0)
    assert isinstance(found, Found)
    assert found.end == len(symbol) + 2
    return found.quantity.unit


def pints(expression: str) -> float:
    """Give pint's factor to SI units; a turn is counted as itself."""
    measured = registry().Quantity(1.0, expression)
    turns = "turn" in str(measured.units)
    return float((measured.to("turn/second") if turns else measured.to_base_units()).magnitude)


def test_table_is_what_the_maker_makes_of_the_definitions() -> None:
    made = make((BASE / "units.txt").read_text(encoding="utf-8"))

    assert (BASE / "unit_table.py").read_text(encoding="utf-8") == made


@pytest.mark.parametrize("symbol", _LINEAR)
def test_symbol_is_worth_what_pint_says(symbol: str) -> None:
    assert math.isclose(UNITS[symbol].factor, pints(_PINTS.get(symbol, symbol)), rel_tol=1e-12)


@pytest.mark.parametrize("symbol", COMPOUNDS)
def test_compound_is_worth_what_pint_says(symbol: str) -> None:
    spelled = symbol.replace("·", "*")

    assert math.isclose(unit(symbol).factor, pints(spelled), rel_tol=1e-12)


@pytest.mark.parametrize("symbol", ["°C", "°F", "℃", "℉", "degC", "degF"])
@pytest.mark.parametrize("reading", [-40.0, 0.0, 20.0, 37.0, 100.0, 451.0])
def test_temperature_point_is_what_pint_says(symbol: str, reading: float) -> None:
    kelvin = registry().Quantity(reading, _PINTS.get(symbol, symbol)).to("kelvin").magnitude
    point = UNITS[symbol]

    assert math.isclose(reading * point.factor + point.offset, kelvin, rel_tol=1e-12)
    assert point.dimension == dim.TEMPERATURE


@pytest.mark.parametrize(
    ("symbol", "factor"), [("%", 0.01), ("‰", 0.001), ("ppm", 1e-6), ("ppb", 1e-9)]
)
def test_share_is_a_plain_factor(symbol: str, factor: float) -> None:
    assert UNITS[symbol] == Unit(symbol, dim.SHARE, factor)


@pytest.mark.parametrize(
    ("basis", "dimension", "factor"),
    [
        ("w/w", dim.MASS_FRACTION, 0.01),
        ("v/v", dim.VOLUME_FRACTION, 0.01),
        ("w/v", dim.MASS_CONCENTRATION, 10.0),  # 1 g in 100 mL is 10 kg in a cubic metre
    ],
)
def test_basis_of_a_percentage_decides_its_dimension(
    basis: str, dimension: dim.Dimension, factor: float
) -> None:
    assert unit(f"% {basis}") == Unit(f"% {basis}", dimension, factor)


@pytest.mark.parametrize("symbol", ["A", "turn"])
def test_bare_symbol_of_the_ampere_and_the_turn_is_left_to_names(symbol: str) -> None:
    assert symbol not in UNITS


@pytest.mark.parametrize("word", sorted(REFUSED))
def test_refused_spelling_is_no_unit_and_points_to_one(word: str) -> None:
    assert word not in UNITS
    assert REFUSED[word] in UNITS


@pytest.mark.parametrize("symbol", ["g/mL", "mol/L", "mg/mL", "g/L", "mg/dL", "J/(g·K)"])
def test_factor_of_a_compound_carries_no_stray_last_bits(symbol: str) -> None:
    factor = unit(symbol).factor

    assert factor == float(f"{factor:.12g}")


@pytest.mark.parametrize(
    ("one", "other", "divide"),
    [("°C", "min", True), ("g", "°C", True), ("%", "min", False), ("mL", "%", False)],
)
def test_point_and_share_enter_no_compound(one: str, other: str, divide: bool) -> None:
    assert units.compound(UNITS[one], UNITS[other], symbol="x", divide=divide) is None


@pytest.mark.parametrize("symbol", ["°C", "%"])
def test_point_and_share_are_raised_to_no_power(symbol: str) -> None:
    assert units.power(UNITS[symbol], 2, symbol="x") is None


@pytest.mark.parametrize(("digits", "exponent"), [("2", 2), ("-1", -1), ("²", 2), ("⁻¹", -1)])
def test_exponent_is_read_in_plain_and_raised_digits(digits: str, exponent: int) -> None:
    assert units.exponent_of(digits) == exponent


def test_symbol_stands_for_one_thing_only() -> None:
    lines = (BASE / "units.txt").read_text(encoding="utf-8").splitlines()
    symbols = [line.rpartition(" = ")[2] for line in lines if " = " in line and line[0] != "#"]
    spellings = [w for line in lines if line.startswith("# [") for w in line.split("] ")[1].split()]

    assert len(set(symbols)) == len(symbols)
    assert len(set(spellings)) == len(spellings)
