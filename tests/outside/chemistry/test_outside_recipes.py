"""Published preparations as recipes: a stock, what the store holds, and what is weighed or measured."""

from __future__ import annotations

from typing import Any

import pytest

from builders import surroundings
from outside.published import cases
from outside.tolerances import within, wrong
from watchglass.run.recipes import Measure, PrepRoom, Recipe, Weigh

ML = 1e-6
G = 1e-3
NAMES = {
    "NaCl": "sodium chloride",
    "NaOH": "sodium hydroxide",
    "H2SO4": "sulfuric acid",
    "HCl": "hydrochloric acid",
    "NaHCO3": "sodium hydrogencarbonate",
    "CuSO4·5H2O": "copper(II) sulfate pentahydrate",
    "Na2CO3·10H2O": "sodium carbonate decahydrate",
    "Na2CO3": "sodium carbonate",
}


def prepared(stock: str, *reagents: str, other: str = "") -> Recipe:
    """Work out the recipe of a stock from these reagents."""
    owned = "".join(f"  - {reagent}\n" for reagent in reagents)
    laboratory = f"reagents:\n{owned}" if owned else "{}"
    around = surroundings(
        {"stocks.yml": f"stock: {{{stock}}}\n{other}", "laboratory.yml": laboratory}
    )
    room = PrepRoom(around.catalogue, around.laboratory)
    assert room.store.faults() == ()
    found = room.recipe(around.catalogue.stocks["stock"])
    assert len(found.lines) > 1
    return found


def weighed(found: Recipe) -> list[float]:
    """Give the masses before rounding, g."""
    return [line.exact / G for line in found.lines if isinstance(line, Weigh)]


def measured(found: Recipe) -> list[float]:
    """Give the volumes before rounding, mL."""
    return [line.exact / ML for line in found.lines if isinstance(line, Measure)]


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:dilute_stock"))
def test_stock_is_diluted_from_another(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    found = prepared(
        f"material: {inputs['target_mol_per_L']} M sodium chloride,"
        f" makes: {inputs['target_volume_mL']} mL, from: strong",
        other=f"strong: {{material: {inputs['stock_mol_per_L']} M sodium chloride}}\n",
    )

    assert wrong(case, {"stock_volume_mL": measured(found)[0]}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:final_concentration"))
def test_stock_of_the_final_concentration_takes_the_volume_diluted(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    found = prepared(
        f"material: {case['expected']['final_mol_per_L']} M sucrose,"
        f" makes: {inputs['final_volume_mL']} mL, from: strong",
        other=f"strong: {{material: {inputs['stock_mol_per_L']} M sucrose}}\n",
    )

    tolerance = case["tolerance"]
    assert within(measured(found)[0], inputs["stock_volume_mL"], tolerance)


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:solute_mass_for_solution"))
def test_solid_is_weighed(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    found = prepared(
        f"material: {inputs['target_mol_per_L']} M {NAMES[inputs['formula']]},"
        f" makes: {inputs['volume_mL']} mL"
    )

    assert wrong(case, {"solute_mass_g": weighed(found)[0]}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:percent_dilution_by_mass"))
def test_acid_is_diluted_by_mass(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    found = prepared(
        f"material: {inputs['target_mass_percent']} % w/w nitric acid,"
        f" makes: {inputs['target_mass_g']} g",
        f"{inputs['stock_mass_percent']} % w/w nitric acid",
    )
    water, acid = weighed(found)  # the water is in first

    assert wrong(case, {"stock_mass_g": acid, "water_mass_g": water}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:mass_percent_of_impure_solid"))
def test_impure_solid_is_weighed(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    solid = NAMES[inputs["formula"]]
    found = prepared(
        f"material: {inputs['target_mass_percent']} % w/w {solid},"
        f" makes: {inputs['volume_mL']} mL, density: {inputs['density_g_per_mL']} g/mL",
        f"{solid}, {inputs['purity_mass_percent']} % w/w",
    )

    assert wrong(case, {"solid_mass_g": weighed(found)[0]}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:solute_mass_in_volume"))
def test_concentrated_reagent_holds_its_solute(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    density = inputs["density_g_per_mL"]
    # Made up to ten times its volume, what it holds is in ten times as much.
    grams_per_litre = case["expected"]["solute_mass_g"] / (inputs["volume_mL"] * 10) * 1000
    found = prepared(
        f"material: {grams_per_litre:.6g} g/L hydrochloric acid,"
        f" makes: {inputs['volume_mL'] * 10} mL",
        f"{inputs['mass_percent']} % w/w hydrochloric acid, {density} g/mL",
    )

    assert within(measured(found)[0], inputs["volume_mL"], case["tolerance"])


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:weigh_hydrate"))
def test_hydrate_that_is_owned_is_weighed(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    solid = NAMES[inputs["formula"]]
    solute = NAMES[inputs.get("solute", inputs["formula"])]
    stock = f"material: {inputs['target_mol_per_L']} M {solute}, makes: {inputs['volume_mL']} mL"
    computed = {
        "solid_mass_g": weighed(prepared(stock, solid))[0],
        "anhydrous_equivalent_g": weighed(prepared(stock))[0],
    }

    assert case["expected"].keys() <= computed.keys()
    assert wrong(case, computed) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:dilute_concentrated"))
def test_concentrated_acid_is_measured(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    acid, label = NAMES[inputs["formula"]], f"{inputs['stock_mass_percent']} % w/w"
    stock = f"material: {inputs['target_mol_per_L']} M {acid}, makes: {inputs['volume_mL']} mL"
    by_label = prepared(stock, f"{label} {acid}, {inputs['stock_density_g_per_mL']} g/mL")
    by_table = prepared(stock, f"{label} {acid}")

    assert wrong(case, {"stock_volume_mL": measured(by_label)[0]}) == {}
    assert wrong(case, {"stock_volume_mL": measured(by_table)[0]}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:percent_basis"))
def test_percentages_in_volume_and_by_mass_differ(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    solid, makes = NAMES[inputs["formula"]], f"makes: {inputs['volume_mL']} mL"
    in_volume = prepared(f"material: {inputs['percent']} % w/v {solid}, {makes}")
    by_mass = prepared(f"material: {inputs['percent']} % w/w {solid}, {makes}")
    masses = {
        "w_v_solute_mass_g": weighed(in_volume)[0],
        "w_w_solute_mass_g": weighed(by_mass)[0],
    }
    # What these are in mol/L is tested beside the strengths.
    expected = {name: case["expected"][name] for name in masses}

    assert wrong(case | {"expected": expected}, masses) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:saturated_brine"))
def test_brine_is_weighed_with_its_water(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    found = prepared(
        f"material: {inputs['mass_percent']} % w/w {NAMES[inputs['formula']]},"
        f" makes: {inputs['volume_mL']} mL, density: {inputs['density_g_per_mL']} g/mL"
    )
    salt, water = weighed(found)

    expected = {name: case["expected"][name] for name in ("solute_mass_g", "water_mass_g")}
    assert (
        wrong(case | {"expected": expected}, {"solute_mass_g": salt, "water_mass_g": water}) == {}
    )
