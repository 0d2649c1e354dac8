"""The reagent table of the three golden procedures, figure by figure.

OC-04: amounts computed independently of this program: each component of 0.900 g of the mixture is
1.925 mmol (318.0 mg, 235.1 mg, 346.9 mg).
"""

from __future__ import annotations

import pytest

from builders import golden, instructor, step, student
from watchglass.publish.body import text_of
from watchglass.publish.model import Lowered, ReagentRow, Run


def rows(name: str) -> dict[str, ReagentRow]:
    return {text_of(row.name): row for row in student(golden(name)).reagents}


def told(row: ReagentRow) -> tuple[str, str, str, str]:
    return text_of(row.used), row.portions.replace("\xa0", " "), text_of(row.amount), row.molar_mass


@pytest.mark.parametrize(
    ("procedure", "name", "expected"),
    [
        ("oc-04", "of which benzocaine", ("318 mg", "", "1.93 mmol", "165.19")),
        ("oc-04", "of which benzoic acid", ("235 mg", "", "1.93 mmol", "122.12")),
        ("oc-04", "of which 9-fluorenone", ("347 mg", "", "1.93 mmol", "180.21")),
        ("oc-04", "tert-butyl methyl ether", ("30 mL", "", "250 mmol", "88.15")),
        ("oc-04", "sodium hydrogencarbonate", ("30 mL", "2 × 15 mL", "18 mmol", "84.01")),
        ("oc-04", "sodium hydroxide", ("as needed", "", "as needed", "40.00")),
        ("gc-02", "potassium hydrogen phthalate", ("1.95 g", "3 × 0.65 g", "9.55 mmol", "204.22")),
        (
            "gc-02",
            "sodium hydroxide",
            ("as needed (150 mL charged)", "3 × 50 mL", "as needed", "40.00"),
        ),
        ("oc-09", "3-methylbutan-1-ol", ("5.0 mL", "", "46 mmol", "88.15")),
        ("oc-09", "glacial acetic acid", ("7.0 mL", "", "120 mmol", "60.05")),
    ],
)
def test_row_is_worked_out_from_the_steps(
    procedure: str, name: str, expected: tuple[str, str, str, str]
) -> None:
    assert told(rows(procedure)[name]) == expected


@pytest.mark.parametrize(
    ("procedure", "name", "equivalents"),
    [
        ("oc-04", "of which benzocaine", (("protonation", "1.00", True),)),
        ("oc-04", "of which benzoic acid", (("gas", "1.00", True),)),
        ("oc-04", "sodium hydrogencarbonate", (("gas", "9.3", False),)),
        ("oc-09", "3-methylbutan-1-ol", (("", "1.0", True),)),
        ("oc-09", "glacial acetic acid", (("", "2.7", False),)),
    ],
)
def test_equivalents_and_the_limiting_reactant(
    procedure: str, name: str, equivalents: tuple[tuple[str, str, bool], ...]
) -> None:
    assert rows(procedure)[name].equivalents == equivalents


def test_a_formula_is_set_with_its_counts_low() -> None:
    row = rows("oc-04")["sodium hydrogencarbonate"]

    assert row.formula == (Run("NaHCO"), Lowered("3"))


def test_the_local_name_stands_where_it_differs() -> None:
    table = rows("oc-04")

    assert table["sodium hydrogencarbonate"].local == "base"
    assert table["water"].local == ""


def test_strength_and_density_stand_beside_the_name() -> None:
    table = rows("oc-04")

    assert text_of(table["sodium hydrogencarbonate"].strength).replace("\u2060", "") == "5.0 % w/v"
    assert text_of(table["tert-butyl methyl ether"].strength) == "0.7408 g/mL at 20 °C"


def resting(material: str, taken: str) -> tuple[tuple[ReagentRow, ...], tuple[str, ...]]:
    """Give the rows of a procedure of one material, and the assumptions its page names."""
    entry = step(
        f"Put {{{taken} x -> A}}.",
        front=f"materials: {{x: {material}}}\nvessels: {{A: beaker 100 mL}}\n",
    )
    page = instructor(entry)
    return page.reagents, tuple(said for said in page.assumptions if said.startswith("x: "))


@pytest.mark.parametrize(
    ("material", "taken", "amount", "rests_on"),
    [
        ("36 % w/w hydrochloric acid", "10 mL", "120 mmol",
         "density of 36 % w/w hydrochloric acid 1.179 g/mL, from the table of aqueous solutions at 20 °C"),
        ("5.0 % w/w copper(II) sulfate", "10 mL", "3.1 mmol",
         "5.0 % w/w copper(II) sulfate taken to be as dense as water"),
        ("saturated sodium chloride", "10.0 mL", "54.1 mmol",
         "solubility 316 g/L at 20 °C of sodium chloride"),
    ],
)  # fmt: skip
def test_amount_that_rests_on_something_says_so_in_table_and_page(
    material: str, taken: str, amount: str, rests_on: str
) -> None:
    (row,), said = resting(material, taken)

    assert text_of(row.amount) == amount
    assert row.rests_on == (rests_on,)
    assert said == (f"x: {rests_on}.",)


@pytest.mark.parametrize(
    ("material", "taken"),
    [
        ("3.0 M hydrochloric acid", "10 mL"),
        ("{is: 36 % w/w hydrochloric acid, density: 1.18 g/mL}", "10 mL"),
        ("36 % w/w hydrochloric acid", "10 g"),
        ("40 % w/w sucrose", "10 mL"),  # unknown rests on nothing
    ],
)
def test_amount_that_rests_on_nothing_but_the_label_says_nothing(material: str, taken: str) -> None:
    (row,), said = resting(material, taken)

    assert row.rests_on == ()
    assert said == ()


def test_volumes_added_up_are_named_with_each_part() -> None:
    (whole, *parts), said = resting("{contains: {ethanol: 3 mL, water: 1 mL}}", "10 mL")

    assert whole.rests_on == ()
    assert [part.rests_on for part in parts] == [("volumes of ethanol and water added up",)] * 2
    assert said == ("x: volumes of ethanol and water added up.",)


def test_density_given_with_a_liquid_stands_beside_it() -> None:
    (row,), _ = resting("{is: ethanol, density: 0.79 g/mL}", "10 mL")

    assert text_of(row.strength) == "0.79 g/mL as given"
