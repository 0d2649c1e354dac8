"""pH, partition and titration against published answers and an independent solver.

Each case names its source. Those "derived, solver" were computed by another program in the same
model: 25 °C, Kw = 1.0e-14, ideal, only the neutral form partitions, additive volumes.
"""

from __future__ import annotations

from typing import Any, NamedTuple

import pytest

from outside.published import cases, kinds
from outside.tolerances import within, wrong
from watchglass.chemistry.equilibrium import Equilibrium, Family, PhaseSystem, solve
from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.chemistry.gases import gas_volume
from watchglass.chemistry.heat import (
    PROTON_TRANSFERS,
    REACTIONS,
    Heat,
    heat_capacity,
    released,
    temperature_rise,
)
from watchglass.chemistry.moving import reagent_by_equation
from watchglass.chemistry.partition import (
    acid_distribution_ratio,
    base_distribution_ratio,
    distribution_ratio,
    ratio_of_solubilities,
    salted_out,
    share_in_organic,
    share_left,
)
from watchglass.chemistry.reagents import volume_to_ph
from watchglass.chemistry.stoichiometry import amount_of_mass
from watchglass.chemistry.titration import concentration_by_titre, titre_by_equation

FILE = "acid_base_extraction.json"
ML = 1e-6
MMOL = 1e-3
G = 1e-3
KELVIN = 273.15


def amount(formula: str, grams: float) -> float:
    """Turn grams of a formula into mol."""
    read = parse_formula(formula)
    assert isinstance(read, Formula)
    assert read.molar_mass_si is not None
    return amount_of_mass(mass=grams * G, molar_mass=read.molar_mass_si)


def family(given: dict[str, Any]) -> Family:
    cap = given.get("cap_mol_per_L")
    return Family(
        pkas=tuple(given["pka"]),
        top=given["charge_of_fully_protonated"],
        amount=given["mmol"] * MMOL,
        ratio=given.get("K", 0.0),
        cap=None if cap is None else cap * 1e3,
        key=given["name"],
    )


def system(inputs: dict[str, Any], aqueous: str) -> PhaseSystem:
    return PhaseSystem(
        families=tuple(family(given) for given in inputs["families"]),
        strong=inputs["strong_cation_minus_strong_anion_mmol"] * MMOL,
        aqueous=inputs[aqueous] * ML,
        organic=inputs.get("organic_mL", 0.0) * ML,
    )


def test_every_kind_of_case_is_tested_here() -> None:
    assert kinds(FILE) == {
        "pH",
        "two_layers",
        "volume_to_pH",
        "distribution_ratio",
        "multiple_extraction",
        "K_from_solubilities",
        "acid_to_move_amine",
        "base_to_move_acid",
        "gas_evolved",
        "titration",
        "titrant_volume",
        "salting_out",
    }


@pytest.mark.parametrize("case", cases(FILE, "pH"))
def test_solution_has_its_ph(case: dict[str, Any]) -> None:
    found = solve(system(case["inputs"], "volume_mL")).ph

    assert found is not None
    assert wrong(case, {"pH": found, "printed_pH": found}) == {}


@pytest.mark.parametrize("case", cases(FILE, "two_layers"))
def test_two_layers_have_their_ph(case: dict[str, Any]) -> None:
    found = solve(system(case["inputs"], "aqueous_mL")).ph

    assert found is not None
    assert wrong(case, {"pH": found}) == {}


@pytest.mark.parametrize("case", cases(FILE, "two_layers"))
def test_two_layers_share_out_their_families(case: dict[str, Any]) -> None:
    held = system(case["inputs"], "aqueous_mL")
    parts = solve(held).parts
    out = {}
    for here, part in zip(held.families, parts, strict=True):
        assert part.aqueous is not None
        assert part.organic is not None
        assert part.left is not None
        computed = {
            "in_water_mmol": part.aqueous / MMOL,
            "in_organic_mmol": part.organic / MMOL,
            "out_of_solution_mmol": part.left / MMOL,
            "fraction_in_water": part.aqueous / here.amount,
        }
        expected = case["expected"][here.key]
        assert expected.keys() == computed.keys()
        for key, value in computed.items():
            name = "amounts_mmol" if key.endswith("_mmol") else key
            if not within(value, expected[key], case["tolerance"][name]):
                out[here.key, key] = (value, expected[key])

    assert out == {}


@pytest.mark.parametrize("case", cases(FILE, "volume_to_pH"))
def test_reagent_reaches_the_ph_at_its_volume(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    sign = {"NaOH": 1, "HCl": -1}[inputs["titrant"]]
    reagent = PhaseSystem((), strong=sign * inputs["titrant_mol_per_L"], aqueous=1e-3)
    found = volume_to_ph(system(inputs, "start_mL"), reagent, inputs["target_pH"])

    assert found is not None
    assert wrong(case, {"volume_mL": found / ML}) == {}


@pytest.mark.parametrize("case", cases(FILE, "distribution_ratio"))
def test_distribution_ratio_follows_the_ph(case: dict[str, Any]) -> None:
    inputs, expected = case["inputs"], case["expected"]
    top = {"acid": 0, "base": 1, "ampholyte": 1}[inputs["type"]]
    pkas = inputs.get("pka") or inputs["pka_conjugate_acid"]
    found = [
        distribution_ratio(pkas=pkas, top=top, ratio=inputs["K"], ph=ph) for ph in inputs["pH"]
    ]

    assert len(found) == len(expected["D"])
    assert [
        pair
        for pair in zip(found, expected["D"], strict=True)
        if not within(*pair, case["tolerance"])
    ] == []


@pytest.mark.parametrize("case", cases(FILE, "distribution_ratio"))
def test_distribution_ratio_is_that_of_the_solver(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    top = {"acid": 0, "base": 1, "ampholyte": 1}[inputs["type"]]
    pkas = tuple(inputs.get("pka") or inputs["pka_conjugate_acid"])
    # A trace of it beside so much strong acid or base that this alone sets the pH.
    ph = inputs["pH"][0]
    strong = 1e-3 * (1e-14 * 10**ph - 10**-ph) * 1e3
    trace = Family(pkas, top, 1e-15, ratio=inputs["K"])
    part = solve(PhaseSystem((trace,), strong=strong, aqueous=1e-3, organic=1e-3)).parts[0]

    assert part.aqueous is not None
    assert part.organic is not None
    assert within(part.organic / part.aqueous, case["expected"]["D"][0], case["tolerance"])


def test_extracted_percentages_are_those_of_the_textbook() -> None:
    (case,) = [c.values[0] for c in cases(FILE, "distribution_ratio") if c.id == "ab-s090"]
    inputs = case["inputs"]
    found = [
        100
        * share_in_organic(
            ratio=acid_distribution_ratio(pka=5.0, ratio=3.0, ph=ph),
            organic=inputs["organic_mL"] * ML,
            aqueous=inputs["water_mL"] * ML,
        )
        for ph in inputs["pH"]
    ]

    # Analytical Chemistry 2.1, ch. 7
    assert found == pytest.approx(case["expected"]["percent_extracted"], rel=0.005)


def test_half_of_a_base_is_free_where_the_ph_is_its_pka() -> None:
    assert base_distribution_ratio(pka=7.9, ratio=275.0, ph=7.9) == pytest.approx(137.5)


@pytest.mark.parametrize("case", cases(FILE, "multiple_extraction"))
def test_portions_leave_their_share(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    left = share_left(
        ratio=inputs["K_org_over_aq"],
        portions=[portion * ML for portion in inputs["portions_mL"]],
        layer=inputs["water_mL"] * ML,
    )
    grams = inputs.get("solute_in_water_g", 0.0)
    computed = {
        "left_in_water_g": grams * left,
        "extracted_g": grams * (1 - left),
        "fraction_left": left,
        "percent_extracted": 100 * (1 - left),
    }

    assert case["expected"].keys() <= computed.keys()
    assert wrong(case, computed) == {}


@pytest.mark.parametrize("case", cases(FILE, "K_from_solubilities"))
def test_solubilities_give_a_ratio(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    ratio = ratio_of_solubilities(
        organic=inputs["solubility_organic_g_per_L"], aqueous=inputs["solubility_water_g_per_L"]
    )
    share = share_in_organic(
        ratio=ratio, organic=inputs["organic_mL"] * ML, aqueous=inputs["water_mL"] * ML
    )

    assert wrong(case, {"K_org_over_aq": ratio, "percent_extracted": 100 * share}) == {}


@pytest.mark.parametrize("case", cases(FILE, "acid_to_move_amine"))
def test_equation_asks_for_so_much_acid(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    amine = amount(inputs["formula"], inputs["mass_g"])
    acid = reagent_by_equation(amount=amine, sites=inputs["basic_sites"])
    with_excess = reagent_by_equation(
        amount=amine, sites=inputs["basic_sites"], excess=inputs["excess_factor"]
    )
    computed = {
        "amine_mmol": amine / MMOL,
        "acid_mmol_stoichiometric": acid / MMOL,
        "acid_volume_mL_with_excess": with_excess / (inputs["acid_mol_per_L"] * 1e3) / ML,
    }

    assert case["expected"].keys() == computed.keys()
    assert wrong(case, computed) == {}


@pytest.mark.parametrize("case", cases(FILE, "base_to_move_acid"))
def test_equation_asks_for_so_much_base(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    acid = amount(inputs["formula"], inputs["mass_g"])
    base = reagent_by_equation(amount=acid, sites=inputs["acidic_sites"])
    computed = {
        "acid_mmol": acid / MMOL,
        "base_mmol": base / MMOL,
        "base_volume_mL": base / (inputs["base_mol_per_L"] * 1e3) / ML,
    }

    assert case["expected"].keys() == computed.keys()
    assert wrong(case, computed) == {}


#: Formula of what gives the gas off, and how much gas each of it gives.
GAS = {"NaHCO3_g": ("NaHCO3", 1.0), "benzoic_acid_g": ("C7H6O2", 1.0), "HgO_g": ("HgO", 0.5)}


@pytest.mark.parametrize("case", cases(FILE, "gas_evolved"))
def test_gas_takes_up_its_volume(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    (key,) = inputs.keys() & GAS.keys()
    formula, gas = GAS[key]
    evolved = amount(formula, inputs[key]) * gas
    volume = gas_volume(
        amount=evolved,
        temperature=inputs["temperature_C"] + KELVIN,
        pressure=inputs["pressure_Pa"],
    )
    computed = {"gas_mmol": evolved / MMOL, "volume_mL": volume / ML}

    assert case["expected"].keys() == computed.keys()
    assert wrong(case, computed) == {}


@pytest.mark.parametrize("case", cases(FILE, "titration"))
def test_titre_gives_the_concentration(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    found = concentration_by_titre(
        titre=inputs["titrant_mL"] * ML,
        titrant=inputs["titrant_mol_per_L"] * 1e3,
        sample=inputs["sample_mL"] * ML,
        ratio=1 / inputs["analyte_per_titrant"],
    )

    assert wrong(case, {"mol_per_L": found / 1e3}) == {}


#: Sample in mol, titrant in mol/m3, titrant for each mole: what the cases say in words.
TITRATED = {
    "ab-s125": (amount("NaHCO3", 2.50), 600.0, 1.0),
    "ab-s129": (15.00e-6 * 150.0, 330.0, 2.0),
}


@pytest.mark.parametrize("case", cases(FILE, "titrant_volume"))
def test_equation_gives_the_titre(case: dict[str, Any]) -> None:
    sample, titrant, ratio = TITRATED[case["id"]]
    found = titre_by_equation(amount=sample, titrant=titrant, ratio=ratio)

    assert wrong(case, {"volume_mL": found / ML}) == {}


@pytest.mark.parametrize("case", cases(FILE, "salting_out"))
def test_salt_drives_a_substance_out(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    ratio = salted_out(
        ratio=inputs["K_without_salt"],
        constant=inputs["Ks_L_per_mol"] * 1e-3,
        salt=inputs["salt_mol_per_L"] * 1e3,
    )
    portions, layer = [inputs["organic_mL"] * ML], inputs["water_mL"] * ML
    computed = {
        "K_with_salt": ratio,
        "fraction_left_without": share_left(
            ratio=inputs["K_without_salt"], portions=portions, layer=layer
        ),
        "fraction_left_with": share_left(ratio=ratio, portions=portions, layer=layer),
    }

    assert case["expected"].keys() == computed.keys()
    assert wrong(case, computed) == {}


# Parting benzocaine, benzoic acid and 9-fluorenone (1.925 mmol each) in 30 mL of an ether with two
# portions of 15 mL of acid, then two of 5.0 % w/v sodium hydrogencarbonate. The expected figures
# were computed by another program in the same model: pKa 2.51 and 4.20 (IUPAC digitised data), log P
# 1.86, 1.88 and 3.58 in octan-1-ol (Hansch, SYRRES) as stand-in, CO2 leaves above 33.4 mmol/L.

EACH = 1.925e-3
BENZOCAINE = Family((2.51,), 1, EACH, ratio=10**1.86)
BENZOIC = Family((4.20,), 0, EACH, ratio=10**1.88)
FLUORENONE = Family((), 0, EACH, ratio=10**3.58)
CARBONIC = Family((6.35, 10.33), 0, 0.0, ratio=0.0, cap=33.4, gas=True)
ETHER, PORTION = 30e-6, 15e-6
#: Mol of hydrogencarbonate in a portion: 50 g/L of 84.006 g/mol.
SODA = 15e-6 * 50.0 / 84.006e-3


class Parting(NamedTuple):
    """Equilibria of the portions, in their order, acid first."""

    acid: tuple[Equilibrium, Equilibrium]
    base: tuple[Equilibrium, Equilibrium]


def parted(molarity: float) -> Parting:
    """Draw two portions of acid off the ether, then two of hydrogencarbonate."""
    families: tuple[Family, ...] = (BENZOCAINE, BENZOIC, FLUORENONE, CARBONIC)
    found = []
    for strong, carbonate in ((-molarity * 1e3 * PORTION, 0.0),) * 2 + ((SODA, SODA),) * 2:
        *others, carbonic = families
        here = (*others, carbonic._replace(amount=carbonate))
        layer = solve(PhaseSystem(here, strong=strong, aqueous=PORTION, organic=ETHER))
        found.append(layer)
        families = tuple(
            one._replace(amount=part.organic or 0.0)
            for one, part in zip(here, layer.parts, strict=True)
        )
    return Parting((found[0], found[1]), (found[2], found[3]))


def gone(layers: tuple[Equilibrium, ...], place: int) -> float:
    """Give the share of one family in layers drawn off, in per cent."""
    return 100 * sum(layer.parts[place].aqueous or 0.0 for layer in layers) / EACH


EITHER = pytest.mark.parametrize("molarity", [3.0, 0.5])


@pytest.mark.parametrize(("molarity", "ph"), [(3.0, (-0.461, -0.475)), (0.5, (0.360, 0.331))])
def test_acid_layers_have_their_ph(molarity: float, ph: tuple[float, float]) -> None:
    assert [layer.ph for layer in parted(molarity).acid] == pytest.approx(ph, abs=0.0006)


@pytest.mark.parametrize(("molarity", "shares"), [(3.0, (86.6, 98.3)), (0.5, (49.6, 75.4))])
def test_acid_takes_its_share_of_the_weak_base(
    molarity: float, shares: tuple[float, float]
) -> None:
    acid = parted(molarity).acid

    assert (gone(acid[:1], 0), gone(acid, 0)) == pytest.approx(shares, abs=0.06)


@EITHER
def test_little_benzoic_acid_goes_into_the_acid(molarity: float) -> None:
    assert gone(parted(molarity).acid, 1) == pytest.approx(1.3, abs=0.06)


@EITHER
def test_hydrogencarbonate_takes_the_benzoic_acid(molarity: float) -> None:
    base = parted(molarity).base

    assert (gone(base[:1], 1), gone(base, 1)) == pytest.approx((91.8, 98.5), abs=0.06)


@EITHER
def test_base_layers_have_their_ph(molarity: float) -> None:
    assert [layer.ph for layer in parted(molarity).base] == pytest.approx((7.50, 8.05), abs=0.006)


@EITHER
def test_first_base_layer_gives_carbon_dioxide_off(molarity: float) -> None:
    gas = parted(molarity).base[0].parts[3].left

    assert gas is not None
    assert gas / MMOL == pytest.approx(1.28, abs=0.006)
    volume = gas_volume(amount=gas, temperature=298.15, pressure=101325)
    assert volume / ML == pytest.approx(31, abs=0.5)


@pytest.mark.parametrize(("molarity", "alkali"), [(3.0, 15.0), (0.5, 2.5)])
def test_alkali_makes_the_acid_layers_basic(molarity: float, alkali: float) -> None:
    acid = parted(molarity).acid
    families = tuple(
        one._replace(amount=sum(layer.parts[place].aqueous or 0.0 for layer in acid))
        for place, one in enumerate((BENZOCAINE, BENZOIC, FLUORENONE))
    )
    held = PhaseSystem(families, strong=-2 * molarity * 1e3 * PORTION, aqueous=2 * PORTION)
    volume = volume_to_ph(held, PhaseSystem((), strong=6.0, aqueous=1e-3), 10.0)

    assert volume is not None
    assert volume / ML == pytest.approx(alkali, abs=0.06)


def test_neutralising_the_acid_layers_warms_them_by_tens_of_kelvin() -> None:
    water = PROTON_TRANSFERS["strong acid, strong base"]
    heat = released([(0.090, water)]).heat
    # 30 mL of 3 M acid and 15 mL of 6 M alkali: densities 1.047 and 1.21, CRC Handbook, from memory.
    rise = temperature_rise(heat=heat, capacity=heat_capacity(water=0.0314 + 0.0182))

    assert 20 < rise < 30


# Heats against enthalpies of formation. CODATA key values (Cox, Wagman, Medvedev 1989), kJ/mol:
# CO2(g) -393.51 and CO3^2-(aq) -675.23 read; the others from memory.

H2O, OH, CO2, HCO3, CO3, ZINC_ION = -285.83, -230.015, -393.51, -689.93, -675.23, -153.39


@pytest.mark.parametrize(
    ("heat", "formation", "near"),
    [
        (PROTON_TRANSFERS["strong acid, strong base"], H2O - OH, 1.5),
        (PROTON_TRANSFERS["strong acid, hydrogencarbonate"], H2O + CO2 - HCO3, 2.5),
        (PROTON_TRANSFERS["strong acid, carbonate"], H2O + CO2 - CO3, 2.5),
        (REACTIONS["zinc, acid"], ZINC_ION, 1.0),
    ],
)
def test_heats_are_near_those_of_formation(heat: Heat, formation: float, near: float) -> None:
    assert heat.value / 1e3 == pytest.approx(formation, abs=near)
