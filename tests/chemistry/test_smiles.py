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
        ("C[2H]", "CH3D"),
        ("C1CC1C2CC2", "C6H10"),  # a number closed may begin another ring
        ("C1CC1C1CC1", "C6H10"),
        ("C%01CC1", "C3H6"),
        ("C0CC0", "C3H6"),
        ("C1CC=1", "C3H4"),
        ("C=1CC1", "C3H4"),
        ("C(C)(C)(C)C", "C5H12"),
        ("[NH4+].[Cl-]", "H4ClN"),
        ("[Fe+2]", "Fe^2+"),
        ("[Fe++]", "Fe^2+"),
        ("[PH]", "HP"),
        ("[CH0]", "C"),
        ("CS(C)=O", "C2H6OS"),
        ("CN=[N+]=[N-]", "CH3N3"),
        ("OB(O)O", "H3BO3"),
        ("FC(Cl)(Br)I", "CBrClFI"),
        ("C\\C=C/C", "C4H8"),
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
        ("C[2HH]", "H", "a hydrogen has no hydrogens"),
        ("C[3HH2]", "H2", "a hydrogen has no hydrogens"),
        ("[4H]", "4H", "isotopes are counted for hydrogen only"),
        ("C[2D]", "D", "`D` is no element"),
        ("[T]", "T", "`T` is no element"),
        ("c1ccccc1:C", ":", "`:` joins aromatic atoms only"),
        ("C:c1ccccc1", ":", "`:` joins aromatic atoms only"),
        ("C()C", "()", "nothing stands in the brackets"),
        ("C11C", "1", "ring `1` joins atoms that are joined"),
        ("C1C1C", "1", "ring `1` joins atoms that are joined"),
        ("C=1CC-1C", "1", "ring `1` has two kinds of bond"),
        ("C1CCC", "1", "ring `1` is not closed"),
        ("CC%12CC", "%12", "ring `12` is not closed"),
        ("C1CC2CCC2", "1", "ring `1` is not closed"),
        ("CC[C(C)]C", "[C(C)]", "`[C(C)]` is no atom"),
        ("C[CCCCCCCCCCCCCCCCCC]", "[CCCCCCCCCCCCCCCCCC]", "`[CCCCCCCCCCCCCCCCCC]` is no atom"),
        ("C[CCCCCCCCCCCCCCCCCCC]", "[CCCCCCCCCCCCCCCCCCC]", "`[…]` is no atom"),
        ("N(C)(C)(C)(C)(C)C", "N", "`N` has 6 bonds, more than it can without brackets"),
        ("CC(.", ".", "a dot stands inside a branch"),
        ("C..C", ".", "no atom stands before `.`"),
        ("CC)C", ")", "`)` closes nothing"),
        ("CC(CC(C", "(", "`(` is not closed"),
        ("C(C)(C)(C)(C)C", "C", "`C` has 5 bonds, more than it can without brackets"),
        ("OCl(=O)(=O)=O", "Cl", "`Cl` has 7 bonds, more than it can without brackets"),
        ("c1cccc1", "c", "the double bonds of the aromatic ring do not come out"),
        ("C%11%11C", "%11", "ring `11` joins atoms that are joined"),
        ("C=%11CC-%11", "%11", "ring `11` has two kinds of bond"),
        (
            "O.[cH]1[cH][cH][cH][cH]1",
            "[cH]",
            "the double bonds of the aromatic ring do not come out",
        ),
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
    assert fault.end - fault.start == len(marked)


@pytest.mark.parametrize(
    ("structure", "help_"),
    [
        ("[D]", "write `[2H]`"),
        ("[T]", "write `[3H]`"),
        ("[Xx]", None),
        ("[nh4]", "write an atom in brackets as `[NH4+]` or `[Fe+3]`"),
        ("C C", None),
        (
            "C(C)(C)(C)(C)C",
            "look for a bond too many, or write the atom in brackets with its hydrogens",
        ),
        (
            "n1cccc1",
            "write the hydrogen of a nitrogen in the ring, as `[nH]`, or the ring with `=`",
        ),
    ],
)
def test_refused_structure_is_shown_how_to_be_written(structure: str, help_: str | None) -> None:
    fault = count_atoms(structure)

    assert isinstance(fault, SmilesFault)
    assert fault.help == help_


@pytest.mark.parametrize(
    ("structure", "carbons"),
    [("C" * 600, 600), ("C" + "(C" * 100 + ")" * 100, 101)],
    ids=["signs", "branches"],
)
def test_structure_at_the_limit_is_counted(structure: str, carbons: int) -> None:
    counted = count_atoms(structure)

    assert isinstance(counted, Atoms)
    assert dict(counted.composition)["C"] == carbons


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
