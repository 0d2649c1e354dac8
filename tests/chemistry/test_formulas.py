"""Formulas: what is read, and each fault with its place, its words and its help."""

from __future__ import annotations

from fractions import Fraction

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from watchglass.chemistry.elements import WEIGHTS
from watchglass.chemistry.formulas import (
    ELECTRON,
    Formula,
    FormulaFault,
    PartKind,
    parse_formula,
    parse_species,
)


def formula(text: str) -> Formula:
    read = parse_formula(text)
    assert isinstance(read, Formula)
    return read


@pytest.mark.parametrize(
    ("text", "marked", "message"),
    [
        ("", "", "a formula is missing"),
        ("  ", "  ", "a formula is missing"),
        ("Xx2O", "Xx", "`Xx` is no element"),
        ("Na2Q", "Q", "`Q` is no element"),
        ("h2o", "h", "`h` begins without a capital letter, as no element does"),
        ("Ca(OH2", "(", "`(` is not closed"),
        ("CaOH)2", ")", "`)` closes nothing"),
        ("Fe(CN]6", "]", "`]` cannot close `(`"),
        ("Na()2", "()", "nothing stands in the brackets"),
        ("NaCl·", "·", "nothing stands after `·`"),
        ("·H2O", "·", "nothing stands before `·`"),
        ("CuSO4··5H2O", "·", "nothing stands after `·`"),
        ("CuSO4·5", "5", "`5` has nothing to multiply"),
        ("CuSO4·0H2O", "0", "a multiplier of 0"),
        ("CuSO4·05H2O", "05", "a multiplier that begins with 0"),
        ("CuSO4·123456H2O", "123456", "a multiplier of more than 4 digits"),
        ("2NaOH", "2", "`2` multiplies the whole formula"),
        ("H2O^", "^", "no charge stands after `^`"),
        ("^2-", "^", "nothing stands before `^`"),
        ("SO4^+-", "+-", "`+-` has more than one sign"),
        ("Fe^3", "3", "`3` is a charge without its sign"),
        ("Fe^0+", "0+", "`0+` is no charge"),
        ("Na^+Cl^-", "+Cl^-", "a formula has one charge, at its end"),
        ("C0H4", "0", "a count of 0"),
        ("C04", "04", "a count that begins with 0"),
        ("C12345", "12345", "a count of more than 4 digits"),
        ("Fe0.95O", "0.", "a count is a whole number"),
        ("(2H)", "2", "`2` has nothing before it to count"),
        ("NaOH + HCl", "NaOH + HCl", "this is a sum of substances, not one formula"),
        ("Na Cl", " ", "a formula holds no space"),
        ("Na2,CO3", ",", "`,` cannot stand in a formula"),
        ("Fe3+", "Fe3+", "`Fe3+` has a charge without `^`"),
        ("Ca+2", "Ca+2", "`Ca+2` has a charge without `^`"),
        ("+", "+", "`+` cannot stand in a formula"),
        ("e^-", "e^-", "`e^-` is the electron, not a substance"),
        ("((((((((((H))))))))))", "(", "more than 8 brackets in one another"),
        ("Na + Cl", "Na + Cl", "this is a sum of substances, not one formula"),
        ("NaCl ", " ", "a formula holds no space"),
        ("Nacl", "cl", "`cl` begins without a capital letter, as no element does"),
        ("Naxyz", "xyz", "`xyz` begins without a capital letter, as no element does"),
        ("CuSO4·.5H2O", ".", "`.` cannot stand in a formula"),
        ("CuSO4·0.0H2O", "0.0", "a multiplier of 0"),
        ("NaCl·2", "2", "`2` has nothing to multiply"),
        ("3", "3", "`3` has nothing to multiply"),
        ("1.5H2O", "1.5", "`1.5` multiplies the whole formula"),
        ("2(", "2", "`2` multiplies the whole formula"),
        ("C12.5H2", ".", "`.` cannot stand in a formula"),
        ("C00", "00", "a count of 0"),
        ("H2O+", "H2O+", "`H2O+` has a charge without `^`"),
        ("Cr2O7--", "Cr2O7--", "`Cr2O7--` has a charge without `^`"),
        ("Fe^100+", "100+", "`100+` is no charge"),
        ("Fe^x", "x", "`x` is no charge"),
        ("Fe^++", "++", "`++` has more than one sign"),
    ],
)
def test_fault_says_what_is_wrong_and_where(text: str, marked: str, message: str) -> None:
    fault = parse_formula(text)

    assert isinstance(fault, FormulaFault)
    assert fault.message == message
    assert text[fault.start : fault.end] == marked
    assert fault.end - fault.start == len(marked)


@pytest.mark.parametrize(
    ("text", "meant"),
    [
        ("CuSO4.5H2O", "CuSO4·5H2O"),
        ("CuSO4*5H2O", "CuSO4·5H2O"),
        ("CuSO4 x 5H2O", "CuSO4·5H2O"),
        ("CuSO4 · 5H2O", "CuSO4·5H2O"),
        ("CuSO4 5H2O", "CuSO4·5H2O"),
        ("CaSO4.0.5H2O", "CaSO4·0.5H2O"),
        ("CaSO4·½H2O", "CaSO4·0.5H2O"),
        ("CaSO4·1/2H2O", "CaSO4·0.5H2O"),
        ("H₂SO₄", "H2SO4"),
        ("SO₄²⁻", "SO4^2-"),
        ("SO4^2−", "SO4^2-"),
        ("SO4 2-", "SO4^2-"),
        ("SO42-", "SO4^2-"),
        ("NH4+", "NH4^+"),
        ("Na+", "Na^+"),
        ("Fe3+", "Fe^3+"),
        ("Fe+3", "Fe^3+"),
        ("Fe^+3", "Fe^3+"),
        ("Fe^(3+)", "Fe^3+"),
        ("Fe^+++", "Fe^3+"),
        ("Ca^++", "Ca^2+"),
        ("SO4^--", "SO4^2-"),
        ("Na^(+)", "Na^+"),
        ("Hg22+", "Hg2^2+"),
        (" H2O", "H2O"),
        ("NaCl(aq)", "NaCl"),
        ("h2o", "H2O"),
        ("nacl", "NaCl"),
        ("NAOH", "NaOH"),
        ("HCL", "HCl"),
        ("EtOH", "C2H5OH"),
        ("Ph3P", "(C6H5)3P"),
        ("CH3-CH2-OH", "CH3CH2OH"),
        ("CH2=CH2", "CH2CH2"),
    ],
)
def test_other_notation_is_refused_with_the_way_to_write_it(text: str, meant: str) -> None:
    fault = parse_formula(text)

    assert isinstance(fault, FormulaFault)
    assert fault.help == f"write `{meant}`"


@pytest.mark.parametrize(
    "text", ["NaCl.", "Fe(CN]6", "Fe0.95O", "C-14", "propan-2-ol", "zinc", "brine", "A" * 300]
)
def test_no_help_is_made_up_where_nothing_likely_reads(text: str) -> None:
    fault = parse_formula(text)

    assert isinstance(fault, FormulaFault)
    assert fault.help is None


def test_two_readings_as_likely_are_both_named() -> None:
    fault = parse_formula("co2")

    assert isinstance(fault, FormulaFault)
    assert fault.help == "write `CO2` or `Co2`"


def test_number_before_a_formula_is_shown_how_to_stand_in_an_equation() -> None:
    fault = parse_formula("2NaOH")

    assert isinstance(fault, FormulaFault)
    assert fault.help == "put a space after the number in an equation: `2 NaOH`"


@pytest.mark.parametrize(
    ("text", "molar_mass"),
    [
        ("C" * 400, 400 * 12.011),
        ("((((((((H))))))))", 1.008),
        ("H9999", 9999 * 1.008),
        ("NaCl·9999H2O", 58.44 + 9999 * 18.015),
        ("NaCl·0.25H2O", 58.44 + 0.25 * 18.015),
        ("NaCl·99.75H2O", 58.44 + 99.75 * 18.015),
    ],
    ids=["signs", "brackets", "count", "multiplier", "quarter", "decimals"],
)
def test_formula_at_the_limit_is_read(text: str, molar_mass: float) -> None:
    # IUPAC's abridged atomic weights of H, C, O, Na and Cl: 1.008, 12.011, 15.999, 22.990, 35.45.
    assert formula(text).molar_mass == pytest.approx(molar_mass, rel=1e-5)


@pytest.mark.parametrize(
    ("text", "charge"),
    [("Na^+", 1), ("Cl^-", -1), ("Fe^3+", 3), ("P3O10^5-", -5), ("Na^99-", -99)],
)
def test_charge_is_read_with_its_sign(text: str, charge: int) -> None:
    assert formula(text).charge == charge


def test_formula_too_long_is_refused_beyond_the_limit() -> None:
    fault = parse_formula("C" * 401)

    assert fault == FormulaFault("a formula of more than 400 signs", 400, 401)


def test_half_a_water_leaves_a_fraction_of_oxygen() -> None:
    hemihydrate = formula("CaSO4·0.5H2O")

    assert dict(hemihydrate.composition)["O"] == Fraction(9, 2)
    assert hemihydrate.hill() == "CaHO4.5S"


def test_whole_multiples_stay_integers() -> None:
    assert formula("CuSO4·5H2O").composition == (("Cu", 1), ("H", 10), ("O", 9), ("S", 1))


def test_molar_mass_in_si_units_is_a_thousandth() -> None:
    assert formula("H2O").molar_mass_si == pytest.approx(0.018015, abs=1e-12)


def test_element_without_atomic_weight_has_no_molar_mass_and_is_named() -> None:
    chloride = formula("RaCl2")

    assert chloride.molar_mass is None
    assert chloride.molar_mass_si is None
    assert chloride.weightless == ("Ra",)


def test_ion_weighs_as_much_as_its_atoms() -> None:
    assert formula("NH4^+").molar_mass == formula("NH4").molar_mass


@pytest.mark.parametrize(
    ("text", "hill"),
    [
        ("CH3COONa", "C2H3NaO2"),
        ("H2SO4", "H2O4S"),
        ("HCl", "ClH"),
        ("CHDO", "CHDO"),
        ("SO4^2-", "O4S^2-"),
        ("NH4^+", "H4N^+"),
    ],
)
def test_hill_order_puts_carbon_first_only_where_there_is_some(text: str, hill: str) -> None:
    assert formula(text).hill() == hill


def test_parts_tell_counts_from_multipliers_and_charge() -> None:
    parts = formula("2K3[Fe(CN)6]·1.5H2O^2-").parts

    assert [(part.kind, part.text) for part in parts] == [
        (PartKind.MULTIPLIER, "2"),
        (PartKind.SYMBOL, "K"),
        (PartKind.COUNT, "3"),
        (PartKind.OPENING, "["),
        (PartKind.SYMBOL, "Fe"),
        (PartKind.OPENING, "("),
        (PartKind.SYMBOL, "C"),
        (PartKind.SYMBOL, "N"),
        (PartKind.CLOSING, ")"),
        (PartKind.COUNT, "6"),
        (PartKind.CLOSING, "]"),
        (PartKind.DOT, "·"),
        (PartKind.MULTIPLIER, "1.5"),
        (PartKind.SYMBOL, "H"),
        (PartKind.COUNT, "2"),
        (PartKind.SYMBOL, "O"),
        (PartKind.CHARGE, "2-"),
    ]


def test_electron_is_a_species_without_mass() -> None:
    electron = parse_species("e^-")

    assert electron == ELECTRON
    assert electron.molar_mass == 0
    assert electron.hill() == "e^-"


def test_species_is_otherwise_a_formula() -> None:
    assert parse_species("NaOH") == parse_formula("NaOH")


SYMBOLS = st.sampled_from(sorted(WEIGHTS))
GROUPS = st.lists(st.tuples(SYMBOLS, st.integers(1, 20)), min_size=1, max_size=6).map(
    lambda atoms: "".join(f"{symbol}{count}" for symbol, count in atoms)
)
NOISE = st.text(alphabet="CHONaFeSx0123456789()[]·.^+- *₂²⁻½/=e", max_size=24)


@given(st.one_of(st.text(max_size=80), NOISE))
@settings(deadline=None, derandomize=True, max_examples=600)
def test_any_text_is_read_or_refused_at_a_place_within_it(text: str) -> None:
    read = parse_formula(text)

    if isinstance(read, FormulaFault):
        assert 0 <= read.start <= read.end <= len(text)
        assert read.start < read.end or not text
    else:
        assert "".join(part.text for part in read.parts) == text.replace("^", "")


@given(GROUPS, GROUPS, st.integers(1, 30))
@settings(deadline=None, derandomize=True, max_examples=200)
def test_molar_masses_add_up(one: str, other: str, times: int) -> None:
    first, second = formula(one).molar_mass, formula(other).molar_mass
    assert first is not None
    assert second is not None

    assert formula(f"{one}({other}){times}").molar_mass == pytest.approx(first + times * second)
    assert formula(f"{one}·{times}{other}").molar_mass == pytest.approx(first + times * second)


@given(GROUPS)
@settings(deadline=None, derandomize=True, max_examples=200)
def test_hill_order_is_read_back_as_the_same_atoms(text: str) -> None:
    read = formula(text)

    again = formula(read.hill())

    assert again.composition == read.composition
