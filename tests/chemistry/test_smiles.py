"""Structures counted: hydrogens left out, aromatic rings, and what is refused."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.chemistry.smiles import Atoms, SmilesFault, count_atoms


@pytest.mark.parametrize(
    ("structure", "expected"),
    [
        ("O", "H2O"),
        ("[H][H]", "H2"),
        ("[OH3+]", "H3O^+"),
        ("[2H]O[2H]", "D2O"),
        ("[3H]O", "HTO"),
        ("[1H]Cl", "HCl"),
        ("CC(=O)[O-].[Na+]", "C2H3NaO2"),
        ("[O--].[Mg++]", "MgO"),
        ("[O-2].[Fe+3]", "FeO^+"),
        ("N#N", "N2"),
        ("S(=O)(=O)(O)O", "H2SO4"),
        ("P(Cl)(Cl)(Cl)(Cl)Cl", "PCl5"),
        ("CN(=O)=O", "CH3NO2"),
        ("C/C=C\\C", "C4H8"),
        ("N[C@@H](C)C(=O)O", "C3H7NO2"),
        ("C=1CCCCC=1", "C6H10"),
        ("C1CC%11CC1CC%11", "C7H12"),
        ("[CH3:1][CH3:2]", "C2H6"),
        ("C$C", "C2"),
    ],
)
def test_open_structure_is_counted(structure: str, expected: str) -> None:
    formula = parse_formula(expected)

    assert isinstance(formula, Formula)
    assert count_atoms(structure) == Atoms(formula.composition, formula.charge)


@pytest.mark.parametrize(
    ("structure", "expected"),
    [
        ("c1ccccc1", "C6H6"),
        ("c1:c:c:c:c:c:1", "C6H6"),
        ("c1ccncc1", "C5H5N"),
        ("c1cc[nH]c1", "C4H5N"),
        ("Cn1cccc1", "C5H7N"),
        ("o1cccc1", "C4H4O"),
        ("c1ccsc1", "C4H4S"),
        ("[se]1cccc1", "C4H4Se"),
        ("c1nnc[nH]1", "C2H3N3"),
        ("C[n+]1ccccc1", "C6H8N^+"),
        ("[O-][n+]1ccccc1", "C5H5NO"),
        ("[cH-]1cccc1.[cH-]1cccc1.[Fe+2]", "C10H10Fe"),
        ("O=c1cc[nH]cc1", "C5H5NO"),
        ("Cn1cnc2c1c(=O)n(C)c(=O)n2C", "C8H10N4O2"),
        ("c1ccc(-c2ccccc2)cc1", "C12H10"),
        ("c1ccc2cc3ccccc3cc2c1", "C14H10"),
        ("c1ccc2[nH]ccc2c1", "C8H7N"),
        ("Oc1ccc(cc1)C1(OC(=O)c2ccccc12)c1ccc(O)cc1", "C20H14O4"),
    ],
)
def test_aromatic_structure_is_counted(structure: str, expected: str) -> None:
    formula = parse_formula(expected)

    assert isinstance(formula, Formula)
    assert count_atoms(structure) == Atoms(formula.composition, formula.charge)


@pytest.mark.parametrize(
    ("structure", "marked", "message"),
    [
        ("", "", "a structure is missing"),
        ("C C", " ", "a structure holds no space"),
        ("C*", "*", "`*` cannot stand in a structure"),
        ("CX", "X", "`X` cannot stand in a structure"),
        ("C(", "(", "`(` is not closed"),
        ("C)", ")", "`)` closes nothing"),
        ("C()", "()", "nothing stands in the brackets"),
        ("(C)", "(", "no atom stands before `(`"),
        ("C((C))", "(", "a branch begins with an atom"),
        ("C(.C)", ".", "a dot stands inside a branch"),
        ("C.", ".", "no atom stands after `.`"),
        (".C", ".", "no atom stands before `.`"),
        ("C=", "=", "the bond `=` leads nowhere"),
        ("C=)", "=", "the bond `=` leads nowhere"),
        ("=C", "=", "the bond `=` begins at no atom"),
        ("C==C", "=", "the bond `=` begins at no atom"),
        ("C:C", ":", "`:` joins aromatic atoms only"),
        ("C:1CC:1", ":1", "`:` joins aromatic atoms only"),
        ("C1CC", "1", "ring `1` is not closed"),
        ("1CC1", "1", "ring `1` begins at no atom"),
        ("C(1CC1)", "1", "ring `1` begins at no atom"),
        ("C11", "1", "ring `1` joins atoms that are joined"),
        ("C12CC12", "2", "ring `2` joins atoms that are joined"),
        ("C=1CC-1", "1", "ring `1` has two kinds of bond"),
        ("[C", "[", "`[` is not closed"),
        ("[]", "[]", "`[]` is no atom"),
        ("[Fe+++]", "[Fe+++]", "`[Fe+++]` is no atom"),
        ("[Xx]", "Xx", "`Xx` is no element"),
        ("[D]", "D", "`D` is no element"),
        ("[13C]", "13C", "isotopes are counted for hydrogen only"),
        ("[HH]", "H", "a hydrogen has no hydrogens"),
        ("C(C)(C)(C)(C)C", "C", "`C` has 5 bonds, more than it can without brackets"),
        ("OCl(=O)(=O)=O", "Cl", "`Cl` has 7 bonds, more than it can without brackets"),
        ("c1cccc1", "c", "the double bonds of the aromatic ring do not come out"),
        ("n1cccc1", "n", "the double bonds of the aromatic ring do not come out"),
        ("c1ccc2c(c1)c1ccccc1c2", "c", "the double bonds of the aromatic ring do not come out"),
    ],
)
def test_structure_that_cannot_be_counted_is_refused(
    structure: str, marked: str, message: str
) -> None:
    fault = count_atoms(structure)

    assert isinstance(fault, SmilesFault)
    assert fault.message == message
    assert structure[fault.start : fault.end] == marked


def test_structure_too_long_is_refused_beyond_the_limit() -> None:
    fault = count_atoms("C" * 601)

    assert fault == SmilesFault("a structure of more than 600 signs", 600, 601)


def test_branches_too_deep_are_refused() -> None:
    fault = count_atoms("C" + "(C" * 101 + ")" * 101)

    assert isinstance(fault, SmilesFault)
    assert fault.message == "more than 100 branches in one another"


@given(st.one_of(st.text(max_size=80), st.text(alphabet="CNOcnos123%()[]=#-+:.@H/\\", max_size=24)))
@settings(deadline=None, derandomize=True, max_examples=800)
def test_any_text_is_counted_or_refused_at_a_place_within_it(text: str) -> None:
    counted = count_atoms(text)

    if isinstance(counted, SmilesFault):
        assert 0 <= counted.start <= counted.end <= len(text)
        assert counted.start < counted.end or not text
    else:
        assert all(count > 0 for _, count in counted.composition)
