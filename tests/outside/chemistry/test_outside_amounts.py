"""Reagent tables, yields and limiting reactants of published procedures."""

from __future__ import annotations

from typing import Any

import pytest

from outside.published import cases
from outside.tolerances import wrong
from watchglass.chemistry.equations import EquationText, split_equation
from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.chemistry.stoichiometry import (
    Limit,
    Reactant,
    amount_of_mass,
    amount_of_volume,
    equivalents,
    left_over,
    limit,
    mass_of_amount,
    product_amount,
    relative_difference,
    yield_fraction,
)


def molar_mass(text: str) -> float:
    formula = parse_formula(text)
    assert isinstance(formula, Formula)
    assert formula.molar_mass_si is not None
    return formula.molar_mass_si


def amount(inputs: dict[str, Any]) -> float:
    """Work out an amount from a mass, or where there is none from a volume, mol."""
    mass = molar_mass(inputs["formula"])
    if "mass_g" in inputs:
        return amount_of_mass(mass=inputs["mass_g"] * 1e-3, molar_mass=mass)
    volume, density = inputs["volume_mL"] * 1e-6, inputs["density_g_per_mL"] * 1e3
    return amount_of_volume(volume=volume, density=density, molar_mass=mass)


@pytest.mark.parametrize("case", cases("amounts.json", "reagent_line"))
def test_reagent_line_has_its_amount_and_equivalents(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    found = amount(inputs)
    computed = {
        "amount_mmol": found * 1e3,
        "published_amount_mmol": found * 1e3,
        "molar_mass_g_per_mol": molar_mass(inputs["formula"]) * 1e3,
    }
    if "limiting_amount_mmol" in inputs:
        ratio = equivalents(amount=found, limiting_amount=inputs["limiting_amount_mmol"] * 1e-3)
        computed |= {"equivalents": ratio, "published_equivalents": ratio}

    assert case["expected"].keys() <= computed.keys() | {"implied_density_g_per_mL"}
    assert wrong(case, computed) == {}


@pytest.mark.parametrize("case", cases("amounts.json", "stated_amount_disagrees"))
def test_printed_amount_differs_from_the_computed_one(case: dict[str, Any]) -> None:
    found = amount(case["inputs"])
    stated = case["inputs"]["stated_amount_mmol"] * 1e-3
    difference = relative_difference(stated=stated, computed=found)

    assert wrong(case, {"amount_mmol": found * 1e3, "relative_difference": difference}) == {}


@pytest.mark.parametrize("case", cases("amounts.json", "yield"))
def test_yield_is_the_published_one(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    product = product_amount(
        extent=amount(inputs["limiting"]), coefficient=inputs["product_per_limiting"]
    )
    mass = mass_of_amount(amount=product, molar_mass=molar_mass(inputs["product"]["formula"]))
    fraction = yield_fraction(actual=inputs["actual_mass_g"] * 1e-3, theoretical=mass)
    computed = {
        "theoretical_mass_g": mass * 1e3,
        "percent_yield": fraction * 100,
        "published_percent": fraction * 100,
    }

    assert case["expected"].keys() == computed.keys()
    assert wrong(case, computed) == {}


@pytest.mark.parametrize("case", cases("amounts.json", "theoretical_yield"))
def test_theoretical_yield_follows_from_the_limiting_reactant(case: dict[str, Any]) -> None:
    inputs, expected = case["inputs"], case["expected"]
    split = split_equation(inputs["equation"])
    assert isinstance(split, EquationText)
    reactants = [
        Reactant(
            term.coefficient,
            amount({"formula": term.text, "mass_g": inputs["masses_g"][term.text]})
            if term.text in inputs["masses_g"]
            else None,
        )
        for term in split.left
    ]
    limiting = limit(reactants)
    assert isinstance(limiting, Limit)
    product = next(term for term in split.right if term.text == inputs["product"])
    moles = product_amount(extent=limiting.extent, coefficient=product.coefficient)
    mass = mass_of_amount(amount=moles, molar_mass=molar_mass(product.text))
    computed = {"theoretical_mass_g": mass * 1e3, "published_theoretical_mass_g": mass * 1e3}
    if inputs["actual_mass_g"] is not None:
        fraction = yield_fraction(actual=inputs["actual_mass_g"] * 1e-3, theoretical=mass)
        computed |= {"percent_yield": fraction * 100, "published_percent": fraction * 100}

    assert [split.left[index].text for index in limiting.indices] == [expected["limiting"]]
    assert expected.keys() <= computed.keys() | {"limiting", "left_over_g"}
    assert wrong(case, computed) == {}


def test_nitrogen_is_left_over_from_silicon_nitride() -> None:
    (case,) = (c.values[0] for c in cases("amounts.json", "theoretical_yield") if c.id == "at-s03")
    masses = case["inputs"]["masses_g"]
    silicon, nitrogen = (amount({"formula": f, "mass_g": masses[f]}) for f in ("Si", "N2"))
    reactants = [Reactant(3, silicon), Reactant(2, nitrogen)]
    limiting = limit(reactants)
    assert limiting is not None
    rest = left_over(reactants, limiting.extent)

    assert rest[0] == 0
    assert rest[1] is not None
    mass = mass_of_amount(amount=rest[1], molar_mass=molar_mass("N2"))
    # The source prints 0.17 g: two figures, so half of the last one is allowed.
    assert abs(mass * 1e3 - case["expected"]["left_over_g"]["N2"]) <= 0.005


@pytest.mark.parametrize(
    "case",
    [
        c
        for c in cases("amounts.json", "reagent_line")
        if c.values[0]["inputs"]["form"] == "mass+volume"
    ],
)
def test_mass_and_volume_printed_together_imply_the_density(case: dict[str, Any]) -> None:
    density = case["inputs"]["mass_g"] / case["inputs"]["volume_mL"]
    by_volume = amount(
        {
            "formula": case["inputs"]["formula"],
            "volume_mL": case["inputs"]["volume_mL"],
            "density_g_per_mL": case["expected"]["implied_density_g_per_mL"],
        }
    )

    assert wrong(case, {"implied_density_g_per_mL": density, "amount_mmol": by_volume * 1e3}) == {}
