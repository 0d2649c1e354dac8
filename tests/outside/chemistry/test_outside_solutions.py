"""Density tables, labels of concentrated reagents, and preparations."""

from __future__ import annotations

from typing import Any

import pytest

from builders import Judged, faults, judged, places
from outside.published import cases, kinds
from outside.tolerances import within, wrong
from watchglass.base.dimensions import VOLUME
from watchglass.chemistry.densities import DensityTable, density_at, fraction_of_concentration
from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.chemistry.solutions import (
    Portions,
    dilute_by_mass,
    solid_to_weigh,
    solute_amount,
    solute_mass,
    solute_units,
    stock_volume,
    strength_after_dilution,
)
from watchglass.chemistry.stoichiometry import (
    mass_of_amount,
    relative_difference,
    volume_of_amount,
)
from watchglass.chemistry.strengths import (
    AmountConcentration,
    Known,
    MassConcentration,
    MassFraction,
    Molality,
    amount_concentration,
    mass_concentration,
    mass_fraction,
    molality,
)
from watchglass.run.content import contents
from watchglass.shell.shipped import density_tables

#: Litres and millilitres in the files, cubic metres here.
ML = 1e-6
G = 1e-3


def formula(text: str) -> Formula:
    read = parse_formula(text)
    assert isinstance(read, Formula)
    return read


def molar_mass(text: str) -> float:
    mass = formula(text).molar_mass_si
    assert mass is not None
    return mass


def known(inputs: dict[str, Any], key: str = "density_g_per_mL") -> Known:
    return Known(molar_mass=molar_mass(inputs["formula"]), density=inputs[key] * 1e3)


def molarity(percent: float, about: Known) -> float:
    """Express a percentage by mass as mol/L."""
    found = amount_concentration(MassFraction(percent / 100), about)
    assert isinstance(found, AmountConcentration)
    return found.value * 1e-3


def test_every_kind_of_case_is_tested_here() -> None:
    assert kinds("solutions.json") == {
        "table_point",
        "label_to_molarity",
        "label_inconsistent",
        "prepare:dilute_stock",
        "prepare:final_concentration",
        "prepare:solute_mass_for_solution",
        "prepare:percent_dilution_by_mass",
        "prepare:mass_percent_of_impure_solid",
        "prepare:solute_mass_in_volume",
        "prepare:weigh_hydrate",
        "prepare:dilute_concentrated",
        "prepare:percent_basis",
        "prepare:saturated_brine",
    }


@pytest.mark.parametrize("case", cases("solutions.json", "table_point"))
def test_percentage_becomes_the_tabulated_molarity(case: dict[str, Any]) -> None:
    about = known(case["inputs"] | case["expected"])
    found = molarity(case["inputs"]["mass_percent"], about)

    tolerance = case["tolerance"]["molarity_from_percent_and_density"]
    assert within(found, case["expected"]["molarity_mol_per_L"], tolerance)


@pytest.mark.parametrize("case", cases("solutions.json", "table_point"))
def test_tabulated_molarity_becomes_the_percentage(case: dict[str, Any]) -> None:
    about = known(case["inputs"] | case["expected"])
    concentration = AmountConcentration(case["expected"]["molarity_mol_per_L"] * 1e3)
    found = mass_fraction(concentration, about)

    assert isinstance(found, MassFraction)
    tolerance = case["tolerance"]["percent_from_molarity_and_density"]
    assert within(found.value * 100, case["inputs"]["mass_percent"], tolerance)


@pytest.mark.parametrize("case", cases("solutions.json", "table_point"))
def test_percentage_becomes_the_tabulated_molality(case: dict[str, Any]) -> None:
    fraction = MassFraction(case["inputs"]["mass_percent"] / 100)
    found = molality(fraction, Known(molar_mass=molar_mass(case["inputs"]["formula"])))

    assert isinstance(found, Molality)
    expected = case["expected"]["molality_mol_per_kg"]
    assert within(found.value, expected, case["tolerance"]["molality"])


@pytest.mark.parametrize("case", cases("solutions.json", "table_point"))
def test_percentage_becomes_the_tabulated_mass_concentration(case: dict[str, Any]) -> None:
    fraction = MassFraction(case["inputs"]["mass_percent"] / 100)
    found = mass_concentration(fraction, known(case["inputs"] | case["expected"]))

    assert isinstance(found, MassConcentration)
    # No tolerance is stated; the table has five figures.
    assert within(found.value, case["expected"]["mass_concentration_g_per_L"], {"rel": 1e-4})


@pytest.mark.parametrize("case", cases("solutions.json", "label_to_molarity"))
def test_label_of_a_concentrated_reagent_gives_its_molarity(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    about = known(inputs)
    found = molarity(inputs["mass_percent"], about)
    assert about.molar_mass is not None
    assert about.density is not None
    volume = volume_of_amount(
        amount=1.0,
        density=about.density,
        molar_mass=about.molar_mass,
        purity=inputs["mass_percent"] / 100,
    )
    computed = {
        "molarity_mol_per_L": found,
        "published_mol_per_L": found,
        "volume_for_1_mol_mL": volume / ML,
    }

    assert case["expected"].keys() <= computed.keys()
    assert wrong(case, computed) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "label_inconsistent"))
def test_label_that_disagrees_with_itself_shows_by_how_much(case: dict[str, Any]) -> None:
    found = molarity(case["inputs"]["mass_percent"], known(case["inputs"]))
    difference = relative_difference(stated=case["inputs"]["stated_mol_per_L"], computed=found)

    assert wrong(case, {"molarity_mol_per_L": found, "relative_difference": difference}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:dilute_stock"))
def test_stock_is_diluted(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    volume = stock_volume(
        stock=inputs["stock_mol_per_L"] * 1e3,
        target=inputs["target_mol_per_L"] * 1e3,
        volume=inputs["target_volume_mL"] * ML,
    )

    assert isinstance(volume, float)
    assert wrong(case, {"stock_volume_mL": volume / ML}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:final_concentration"))
def test_diluted_stock_has_its_final_concentration(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    found = strength_after_dilution(
        stock=inputs["stock_mol_per_L"],
        volume=inputs["stock_volume_mL"] * ML,
        made_up_to=inputs["final_volume_mL"] * ML,
    )

    assert wrong(case, {"final_mol_per_L": found}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:solute_mass_for_solution"))
def test_solute_is_weighed_for_a_solution(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    amount = solute_amount(
        concentration=inputs["target_mol_per_L"] * 1e3, volume=inputs["volume_mL"] * ML
    )
    mass = mass_of_amount(amount=amount, molar_mass=molar_mass(inputs["formula"]))

    assert wrong(case, {"solute_mass_g": mass / G}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:percent_dilution_by_mass"))
def test_stock_is_diluted_by_mass(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    found = dilute_by_mass(
        stock=inputs["stock_mass_percent"] / 100,
        target=inputs["target_mass_percent"] / 100,
        mass=inputs["target_mass_g"] * G,
    )

    assert isinstance(found, Portions)
    assert wrong(case, {"stock_mass_g": found.stock / G, "water_mass_g": found.diluent / G}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:mass_percent_of_impure_solid"))
def test_impure_solid_is_weighed_for_a_percentage(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    solute = solute_mass(
        fraction=inputs["target_mass_percent"] / 100,
        density=inputs["density_g_per_mL"] * 1e3,
        volume=inputs["volume_mL"] * ML,
    )
    mass = molar_mass(inputs["formula"])
    solid = solid_to_weigh(
        amount=solute / mass, molar_mass=mass, purity=inputs["purity_mass_percent"] / 100
    )

    assert wrong(case, {"solid_mass_g": solid / G}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:solute_mass_in_volume"))
def test_volume_of_a_concentrated_reagent_holds_its_solute(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    solute = solute_mass(
        fraction=inputs["mass_percent"] / 100,
        density=inputs["density_g_per_mL"] * 1e3,
        volume=inputs["volume_mL"] * ML,
    )

    assert wrong(case, {"solute_mass_g": solute / G}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:weigh_hydrate"))
def test_hydrate_is_weighed_with_its_water(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    solute = inputs.get("solute", inputs["formula"])
    units = solute_units(formula(inputs["formula"]), formula(solute))
    assert units is not None
    amount = solute_amount(
        concentration=inputs["target_mol_per_L"] * 1e3, volume=inputs["volume_mL"] * ML
    )
    solid = solid_to_weigh(
        amount=amount, molar_mass=molar_mass(inputs["formula"]), solute_units=units
    )
    anhydrous = mass_of_amount(amount=amount, molar_mass=molar_mass(solute))

    computed = {"solid_mass_g": solid / G, "anhydrous_equivalent_g": anhydrous / G}
    assert wrong(case, computed) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:dilute_concentrated"))
def test_concentrated_acid_is_diluted_by_volume(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    stock = molarity(inputs["stock_mass_percent"], known(inputs, "stock_density_g_per_mL"))
    volume = stock_volume(
        stock=stock, target=inputs["target_mol_per_L"], volume=inputs["volume_mL"] * ML
    )

    assert isinstance(volume, float)
    assert wrong(case, {"stock_volume_mL": volume / ML}) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:percent_basis"))
def test_percentage_in_volume_and_by_mass_differ(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    about = known(inputs, "density_w_w_g_per_mL")
    in_volume = MassConcentration(inputs["percent"] * 10)
    by_mass = mass_concentration(MassFraction(inputs["percent"] / 100), about)
    assert isinstance(by_mass, MassConcentration)
    molarities = [amount_concentration(strength, about) for strength in (in_volume, by_mass)]
    values = [m.value * 1e-3 for m in molarities if isinstance(m, AmountConcentration)]
    volume = inputs["volume_mL"] * ML
    computed = {
        "w_v_solute_mass_g": in_volume.value * volume / G,
        "w_w_solute_mass_g": by_mass.value * volume / G,
        "w_v_molarity": values[0],
        "w_w_molarity": values[1],
    }

    assert case["expected"].keys() == computed.keys()
    assert wrong(case, computed) == {}


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:saturated_brine"))
def test_saturated_brine_holds_salt_and_water(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    volume, density = inputs["volume_mL"] * ML, inputs["density_g_per_mL"] * 1e3
    salt = solute_mass(fraction=inputs["mass_percent"] / 100, density=density, volume=volume)
    computed = {
        "solute_mass_g": salt / G,
        "molarity_mol_per_L": molarity(inputs["mass_percent"], known(inputs)),
        "water_mass_g": (density * volume - salt) / G,
    }

    assert case["expected"].keys() == computed.keys()
    assert wrong(case, computed) == {}


# ------------------------------------------------------------------ our own table of densities

KEYS = {
    "HCl": "hydrogen-chloride",
    "NaOH": "sodium-hydroxide",
    "NaCl": "sodium-chloride",
    "H2SO4": "sulfuric-acid",
    "NH3": "ammonia",
    "C2H4O2": "acetic-acid",
    "HNO3": "nitric-acid",
    "K2CO3": "potassium-carbonate",
    "Na2CO3": "sodium-carbonate",
    "NaHCO3": "sodium-hydrogencarbonate",
    "H3PO4": "phosphoric-acid",
    "KOH": "potassium-hydroxide",
    "NH4Cl": "ammonium-chloride",
    "CaCl2": "calcium-chloride",
    "C6H8O7": "citric-acid",
    "C2H6O": "ethanol",
}
TABLES = density_tables()
POINTS = [
    (key, index) for key, table in TABLES.items() for index in range(1, len(table.points) - 1)
]


@pytest.mark.parametrize("case", cases("solutions.json", "table_point"))
def test_own_table_gives_the_handbooks_density(case: dict[str, Any]) -> None:
    table = TABLES[KEYS[case["inputs"]["formula"]]]
    found = density_at(table, case["inputs"]["mass_percent"] / 100)

    assert found is not None
    tolerance = case["tolerance"]["density_if_the_tool_has_its_own_table"]
    assert within(found / 1000, case["expected"]["density_g_per_mL"], tolerance)


@pytest.mark.parametrize("case", cases("solutions.json", "table_point"))
def test_own_table_gives_the_handbooks_density_from_its_other_points(case: dict[str, Any]) -> None:
    """The curve is not made by the point it is tested with: that one is taken out."""
    table = TABLES[KEYS[case["inputs"]["formula"]]]
    fraction = case["inputs"]["mass_percent"] / 100
    kept = [index for index, (w, _) in enumerate(table.points) if abs(w - fraction) > 1e-9]
    rest = DensityTable(
        tuple(table.points[index] for index in kept), tuple(table.sources[index] for index in kept)
    )
    found = density_at(rest, fraction)

    assert len(rest.points) == len(table.points) - 1
    assert found is not None
    tolerance = case["tolerance"]["density_if_the_tool_has_its_own_table"]
    assert within(found / 1000, case["expected"]["density_g_per_mL"], tolerance)


@pytest.mark.parametrize(("key", "index"), POINTS, ids=str)
def test_point_that_is_left_out_comes_back_from_its_neighbours(key: str, index: int) -> None:
    table = TABLES[key]
    fraction, density = table.points[index]
    rest = DensityTable(
        table.points[:index] + table.points[index + 1 :],
        table.sources[:index] + table.sources[index + 1 :],
    )

    assert density_at(rest, fraction) == pytest.approx(density, rel=0.003)


@pytest.mark.parametrize("key", TABLES)
def test_mass_of_solute_per_volume_only_rises(key: str) -> None:
    table = TABLES[key]
    fractions = [table.most * step / 500 for step in range(501)]
    held = [fraction * (density_at(table, fraction) or 0.0) for fraction in fractions]

    assert held == sorted(held)


@pytest.mark.parametrize("key", TABLES)
def test_concentration_and_fraction_lead_back_to_each_other(key: str) -> None:
    table = TABLES[key]
    fraction = table.most * 0.63
    density = density_at(table, fraction)
    assert density is not None

    assert fraction_of_concentration(table, fraction * density, 1.0) == pytest.approx(fraction)


@pytest.mark.parametrize("key", TABLES)
def test_beyond_a_table_nothing_is_told(key: str) -> None:
    table = TABLES[key]
    top = density_at(table, table.most)
    assert top is not None

    assert density_at(table, table.most * 1.01 + 1e-6) is None
    assert fraction_of_concentration(table, table.most * top * 1.02, 1.0) is None


# ------------------------------------------------------------------ labels and saturation as drafts

NAMES = {
    "C2H4O2": "acetic acid",
    "HCl": "hydrochloric acid",
    "HClO4": "perchloric acid",
    "H3PO4": "phosphoric acid",
    "H2SO4": "sulfuric acid",
    "CH2O2": "formic acid",
    "HNO3": "nitric acid",
    "KOH": "potassium hydroxide",
}


def labelled(inputs: dict[str, Any], molarity_: float) -> Judged:
    """Judge a draft whose one material has the label of a case."""
    strength = f"{inputs['mass_percent']} % w/w {NAMES[inputs['formula']]}"
    says = f"{{is: {strength}, density: {inputs['density_g_per_mL']} g/mL, also: {molarity_} M}}"
    return judged("1. Here is {x}.", f"materials:\n  x: {says}")


@pytest.mark.parametrize("case", cases("solutions.json", "label_to_molarity"))
def test_sound_label_is_not_blamed_and_gives_its_molarity(case: dict[str, Any]) -> None:
    entry = labelled(case["inputs"], case["expected"]["published_mol_per_L"])
    material = entry.procedure.materials["x"]
    found = contents(material, VOLUME, 1e-3, 6)

    assert places(faults(entry)) == []
    assert isinstance(found, tuple)
    expected = case["expected"]["molarity_mol_per_L"]
    assert within(found[0].moles, expected, case["tolerance"]["molarity_mol_per_L"])


@pytest.mark.parametrize("case", cases("solutions.json", "label_to_molarity"))
def test_two_strengths_on_a_label_give_the_density_that_is_not_there(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    strength = f"{inputs['mass_percent']} % w/w {NAMES[inputs['formula']]}"
    says = f"{{is: {strength}, also: {case['expected']['published_mol_per_L']} M}}"
    facts = judged("1. Here is {x}.", f"materials:\n  x: {says}").procedure.materials["x"].solution

    assert facts is not None
    assert facts.density is not None
    # The label of 37 % acid gives 1.2 g/mL, to two figures; the table has 1.184.
    assert facts.density / 1000 == pytest.approx(inputs["density_g_per_mL"], rel=0.015)


@pytest.mark.parametrize("case", cases("solutions.json", "label_inconsistent"))
def test_label_that_disagrees_with_itself_is_found_where_it_says_the_second_strength(
    case: dict[str, Any],
) -> None:
    entry = labelled(case["inputs"], case["inputs"]["stated_mol_per_L"])

    assert case["expected"]["verdict"] == "warn"
    assert places(faults(entry)) == [("S120", f"{case['inputs']['stated_mol_per_L']} M")]


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:saturated_brine"))
def test_brine_by_its_strength_holds_the_salt_of_the_handbook(case: dict[str, Any]) -> None:
    held = salt_in(f"{case['inputs']['mass_percent']} % w/w sodium chloride", case)

    assert within(held, case["expected"]["solute_mass_g"], {"rel": 0.003})


@pytest.mark.parametrize("case", cases("solutions.json", "prepare:saturated_brine"))
def test_saturated_brine_holds_about_as_much(case: dict[str, Any]) -> None:
    # 26.4 % is what dissolves at 20 °C (CRC Handbook, from memory); the case takes 26 %.
    held = salt_in("saturated sodium chloride", case)

    assert within(held, case["expected"]["solute_mass_g"] * 26.4 / 26, {"rel": 0.005})


def salt_in(brine: str, case: dict[str, Any]) -> float:
    """Give the grams of salt in the volume of a case."""
    material = judged("1. Here is {x}.", f"materials:\n  x: {brine}").procedure.materials["x"]
    found = contents(material, VOLUME, case["inputs"]["volume_mL"] * ML, 6)
    assert isinstance(found, tuple)
    return found[0].mass / G


# Spirit by volume: OIML R 22 (International alcoholometric tables, 20 °C), from memory: mass per
# cent and density of mixtures of 40, 50, 70 and 96 % by volume.
@pytest.mark.parametrize(
    ("by_volume", "by_mass", "density"),
    [(40, 33.3, 948.1), (50, 42.4, 930.1), (70, 62.4, 885.6), (96, 93.8, 807.4)],
)
def test_spirit_by_volume_has_its_share_by_mass_and_its_density(
    by_volume: int, by_mass: float, density: float
) -> None:
    spirit = judged("1. Here is {x}.", f"materials:\n  x: {by_volume} % v/v ethanol")
    facts = spirit.procedure.materials["x"].solution

    assert facts is not None
    assert facts.fraction is not None
    assert facts.fraction * 100 == pytest.approx(by_mass, rel=0.003)
    assert facts.density == pytest.approx(density, rel=0.001)


# Sold as concentrated ammonia: 28 % w/w, 0.898 g/mL at 20 °C, 14.76 M (R, table_point above);
# concentrated hydrochloric acid 37 %, 12.0 M and sulfuric acid 96 %, 18.0 M: makers' labels, from
# memory.
@pytest.mark.parametrize(
    ("label", "molar"),
    [
        ("28 % w/w ammonia", 14.76),
        ("37 % w/w hydrochloric acid", 12.0),
        ("96 % w/w sulfuric acid", 18.0),
    ],
)
def test_strength_of_a_concentrated_reagent_is_its_molarity(label: str, molar: float) -> None:
    material = judged("1. Here is {x}.", f"materials:\n  x: {label}").procedure.materials["x"]
    found = contents(material, VOLUME, 1e-3, 6)

    assert isinstance(found, tuple)
    assert found[0].moles == pytest.approx(molar, rel=0.005)
