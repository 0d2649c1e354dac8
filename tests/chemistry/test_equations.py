"""Equations: splitting by spaces, faults in their place, balances that conserve."""

from __future__ import annotations

from fractions import Fraction

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from watchglass.chemistry.equations import (
    Balanced,
    EquationFault,
    EquationText,
    Impossible,
    NotUnique,
    Verdict,
    balance,
    check_balance,
    split_equation,
)
from watchglass.chemistry.formulas import ELECTRON, Formula, parse_formula
from watchglass.chemistry.suggestions import Lacking, suggest


def formula(text: str) -> Formula:
    read = parse_formula(text)
    assert isinstance(read, Formula)
    return read


def formulas(*texts: str) -> list[Formula]:
    return [formula(text) for text in texts]


def terms(*pairs: tuple[int, str]) -> list[tuple[int, Formula]]:
    return [(number, formula(text)) for number, text in pairs]


@pytest.mark.parametrize(
    ("text", "left", "right"),
    [
        ("2 NaOH + H2SO4 -> Na2SO4 + 2 H2O", ["2 NaOH", "1 H2SO4"], ["1 Na2SO4", "2 H2O"]),
        ("1/2 O2 + H2 → H2O", ["1/2 O2", "1 H2"], ["1 H2O"]),
        ("N2 + 3 H2 <=> 2 NH3", ["1 N2", "3 H2"], ["2 NH3"]),
        ("NH4^+ + OH^- ⇌ NH3 + H2O", ["1 NH4^+", "1 OH^-"], ["1 NH3", "1 H2O"]),
        ("2 3-methylbutan-1-ol -> 2-propanol", ["2 3-methylbutan-1-ol"], ["1 2-propanol"]),
        ("iron(III) chloride -> (+)-limonene", ["1 iron(III) chloride"], ["1 (+)-limonene"]),
        ("N,N-dimethylaniline -> 1,2-diol", ["1 N,N-dimethylaniline"], ["1 1,2-diol"]),
        ("  A\n +  2\tB  ->  C ", ["1 A", "2 B"], ["1 C"]),
    ],
)
def test_equation_is_split_into_coefficients_and_species(
    text: str, left: list[str], right: list[str]
) -> None:
    split = split_equation(text)

    assert isinstance(split, EquationText)
    assert [f"{term.coefficient} {term.text}" for term in split.left] == left
    assert [f"{term.coefficient} {term.text}" for term in split.right] == right


@pytest.mark.parametrize(
    ("text", "marked", "message", "help_"),
    [
        ("", "", "the arrow is missing", "write `reactants -> products`"),
        ("A + B", "A + B", "the arrow is missing", "write `reactants -> products`"),
        ("A->B", "->", "`->` needs a space on both sides", "write `A -> B`"),
        ("A →B", "→", "`→` needs a space on both sides", "write `A -> B`"),
        ("A = B", "=", "`=` is no arrow", "write `A -> B`"),
        ("A --> B", "-->", "`-->` is no arrow", "write `A -> B`"),
        ("A => B", "=>", "`=>` is no arrow", "write `A -> B`"),
        ("A ⇄ B", "⇄", "`⇄` is no arrow", "write `A -> B`"),
        ("A -> B -> C", "->", "a second arrow", "write one equation for each step"),
        ("-> B", "->", "nothing stands before the arrow", None),
        ("A -> ", "->", "nothing stands after the arrow", None),
        ("A + -> B", "+", "a species is missing beside `+`", None),
        ("+ A -> B", "+", "a species is missing beside `+`", None),
        ("A + + B -> C", "+", "a species is missing beside `+`", None),
        ("A +B -> C", "+", "`+` needs a space on both sides", None),
        ("A+ B -> C", "+", "`+` needs a space on both sides", None),
        ("2 -> B", "2", "`2` counts no species", None),
        ("0 A -> B", "0", "`0` is no coefficient", None),
        ("0.5 O2 -> B", "0.5", "`0.5` is no coefficient", "write `1/2 O2`"),
        ("½ O2 -> B", "½", "`½` is no coefficient", "write `1/2 O2`"),
        ("A + 0 B -> C", "0", "`0` is no coefficient", None),
        ("A -> 2.5 B", "2.5", "`2.5` is no coefficient", "write `5/2 B`"),
        ("A -> B + 3", "3", "`3` counts no species", None),
        ("A -> B <=> C", "<=>", "a second arrow", "write one equation for each step"),
        ("A -> B + ", "+", "a species is missing beside `+`", None),
        ("=> B", "=>", "`=>` is no arrow", "write ` -> `"),
        ("A =>", "=>", "`=>` is no arrow", "write ` -> `"),
        (
            "1/0 A -> B",
            "1/0",
            "`1/0` is no coefficient",
            "use whole numbers, or fractions such as `1/2`",
        ),
    ],
)
def test_equation_fault_says_what_is_wrong_and_where(
    text: str, marked: str, message: str, help_: str | None
) -> None:
    fault = split_equation(text)

    assert isinstance(fault, EquationFault)
    assert text[fault.start : fault.end] == marked
    assert fault.end - fault.start == len(marked)
    assert (fault.message, fault.help) == (message, help_)


def test_equation_at_the_limits_is_split() -> None:
    longest = split_equation("A" * 1995 + " -> B")
    widest = split_equation(" + ".join("A" * 20) + " -> B")

    assert isinstance(longest, EquationText)
    assert isinstance(widest, EquationText)
    assert len(widest.left) == 20


def test_equation_too_long_is_refused_beyond_the_limit() -> None:
    fault = split_equation("A" * 2001)

    assert fault == EquationFault("an equation of more than 2000 signs", 2000, 2001)


def test_side_of_too_many_species_is_refused() -> None:
    fault = split_equation("A" + " + A" * 20 + " -> B")

    assert isinstance(fault, EquationFault)
    assert fault.message == "more than 20 species on one side"


def test_fraction_of_oxygen_balances() -> None:
    checked = check_balance(
        [(Fraction(1, 2), formula("O2")), (1, formula("H2"))], terms((1, "H2O"))
    )

    assert checked.verdict is Verdict.BALANCED
    assert checked.balanced


def test_mass_and_charge_may_both_be_out() -> None:
    checked = check_balance(terms((1, "Fe^3+"), (1, "OH^-")), terms((1, "FeOH")))

    assert checked.verdict is Verdict.CHARGE_UNBALANCED
    assert checked.charge_excess_left == 2


def test_loss_of_a_proton_is_out_in_mass_and_charge() -> None:
    checked = check_balance(terms((1, "NH4^+")), terms((1, "NH3")))

    assert checked.verdict is Verdict.MASS_AND_CHARGE_UNBALANCED
    assert checked.excess_left == {"H": 1}


def test_half_equation_counts_its_electrons() -> None:
    found = balance([formula("Fe^3+"), ELECTRON], [formula("Fe^2+")])

    assert found == Balanced((1, 1, 1))


def test_hydrate_with_half_a_water_gets_whole_coefficients() -> None:
    found = balance(formulas("CaSO4·0.5H2O", "H2O"), formulas("CaSO4·2H2O"))

    assert found == Balanced((2, 3, 2))


def test_balance_with_a_species_that_takes_no_part_is_impossible() -> None:
    # Helium has to be nought, and a species with nought is not in the equation.
    assert balance(formulas("H2", "O2", "He"), formulas("H2O")) == Impossible()


def test_balance_runs_the_same_with_its_sides_exchanged() -> None:
    assert balance(formulas("H2O"), formulas("H2", "O2")) == Balanced((2, 2, 1))


def test_balance_with_a_species_on_the_wrong_side_is_impossible() -> None:
    assert balance(formulas("H2", "H2O"), formulas("O2")) == Impossible()


def test_several_solutions_none_of_them_positive_are_impossible() -> None:
    # Two independent balances, but helium has nowhere to go in any of them.
    found = balance(formulas("KClO3", "HCl", "He"), formulas("KCl", "Cl2", "ClO2", "H2O"))

    assert found == Impossible()


def test_two_reactions_in_one_equation_have_no_one_balance() -> None:
    found = balance(formulas("C", "O2"), formulas("CO", "CO2"))

    assert found == NotUnique(2)


def test_suggestion_gives_coefficients_where_they_are_unique() -> None:
    found = suggest(terms((1, "H2"), (1, "O2")), terms((1, "H2O")))

    assert found.coefficients == (2, 1, 2)


def test_suggestion_names_the_forgotten_water() -> None:
    found = suggest(terms((1, "C2H4O2"), (1, "C2H6O")), terms((1, "C4H8O2")))

    assert found.coefficients is None
    assert found.lacking == Lacking("right", formula("H2O"), 1)


def test_suggestion_names_a_forgotten_reactant_on_the_left() -> None:
    found = suggest(terms((1, "NaOH")), terms((1, "NaCl"), (1, "H2O")))

    assert found.lacking == Lacking("left", formula("HCl"), 1)
    assert found.only_right == ("Cl",)
    assert found.only_left == ()


def test_suggestion_offers_no_part_of_a_molecule() -> None:
    # Half an O2 would do, but a molecule is whole.
    found = suggest(terms((1, "H2O2")), terms((1, "H2O")))

    assert found.lacking is None


def test_suggestion_never_mends_a_charge_with_electrons() -> None:
    found = suggest(terms((1, "C6H5NH2"), (1, "H^+")), terms((1, "C6H5NH3")))

    assert found.lacking is None


NOISE = st.text(alphabet="AB2 +->→=<½/0.(\n", max_size=30)


@given(st.one_of(st.text(max_size=80), NOISE))
@settings(deadline=None, derandomize=True, max_examples=600)
def test_any_text_is_split_or_refused_at_a_place_within_it(text: str) -> None:
    split = split_equation(text)

    if isinstance(split, EquationFault):
        assert 0 <= split.start <= split.end <= len(text)
        assert split.start < split.end or not text
    else:
        for term in (*split.left, *split.right):
            assert text[term.start : term.end] == term.text == term.text.strip() != ""
            assert term.coefficient > 0


SPECIES = st.lists(
    st.tuples(st.sampled_from(["H", "C", "O", "Na", "Cl"]), st.integers(1, 4)),
    min_size=1,
    max_size=3,
    unique_by=lambda atom: atom[0],
).map(lambda atoms: formula("".join(f"{symbol}{count}" for symbol, count in atoms)))
SIDE = st.lists(SPECIES, min_size=1, max_size=4)


@given(SIDE, SIDE)
@settings(deadline=None, derandomize=True, max_examples=400)
def test_found_balance_always_conserves(left: list[Formula], right: list[Formula]) -> None:
    found = balance(left, right)

    if isinstance(found, Balanced):
        numbers = found.coefficients
        assert min(numbers) > 0
        assert check_balance(
            list(zip(numbers, left, strict=False)),
            list(zip(numbers[len(left) :], right, strict=True)),
        ).balanced


@given(
    st.lists(SPECIES, min_size=2, max_size=4), st.lists(st.integers(1, 5), min_size=4, max_size=4)
)
@settings(deadline=None, derandomize=True, max_examples=200)
def test_equation_that_has_a_balance_is_never_called_impossible(
    left: list[Formula], numbers: list[int]
) -> None:
    atoms: dict[str, int] = {}
    for number, each in zip(numbers, left, strict=False):
        for symbol, count in each.composition:
            atoms[symbol] = atoms.get(symbol, 0) + number * int(count)
    right = [formula("".join(f"{symbol}{count}" for symbol, count in atoms.items()))]

    assert not isinstance(balance(left, right), Impossible)
