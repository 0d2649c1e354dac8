"""Dissolving, separating and gas, against figures worked out by hand from the catalogue's constants.

Solubilities: sodium chloride 5407 mol, benzoic acid 23.75 mol in a cubic metre of water at 25 °C,
carbon dioxide 33.4; pKa of benzoic acid 4.20 (`catalogue/data`, with their sources there).
"""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

import pytest

from bench_runner import knowledge, outcomes, ran
from run.bench.shelf import ANY, near
from watchglass.run.bench.knowledge import Solubility, Thing
from watchglass.run.bench.ledger import Moved
from watchglass.run.bench.mixing import Mixed, gas_volume_of

if TYPE_CHECKING:
    from watchglass.run.bench.asked import Asked

KNOWN = knowledge()
FRONT = """\
materials:
  water: water
  brine: 1.0 M sodium chloride
  weak-brine: 0.10 M sodium chloride
  salt: sodium chloride
  calcium: calcium chloride
  ether: tert-butyl methyl ether
  acid: 1.0 M hydrochloric acid
  base: 1.0 M sodium hydroxide
  soda: 0.10 M sodium hydrogencarbonate
  benzoate: 0.20 M sodium benzoate
  benzoic: benzoic acid
  naphthalene: naphthalene
  silica: silica
  spirit: ethanol
  alcohol: butan-1-ol
  phenol: phenol
  vinegar: 0.10 M acetic acid
  epsom: 0.50 M magnesium sulfate
  iodate: potassium iodate
vessels:
  A: conical flask 250 mL
  B: conical flask 250 mL
"""


def bench(*sentences: str) -> Asked:
    return ran(*sentences, front=FRONT)


def last(asked: Asked) -> Mixed:
    found = outcomes(asked, Mixed)[-1]
    assert isinstance(found, Mixed)
    return found


def limit(key: str) -> float:
    """Give a solubility at 25 °C, mol/m3."""
    found = KNOWN.thing(key).solubility(298.15)
    assert found is not None
    return found


# ---------------------------------------------------------------- salts


def test_salt_dissolves_up_to_its_solubility_and_the_rest_lies_there() -> None:
    # 5 g are 85.56 mmol; 10 mL of water take 54.07.
    asked = bench("{10 mL water -> A} {5.0 g salt -> A} {swirl A}")
    there = limit("sodium-chloride") * 10e-6

    assert there == near(54.07e-3, rel=1e-3)
    assert last(asked).dissolved == {"sodium-chloride": near(there, rel=1e-4)}
    assert last(asked).precipitated == {}
    left = asked.ledger.end.vessel("A").solid["sodium-chloride"]
    assert left == near(5.0 / 58.44 - there, rel=1e-3)


def test_salt_that_is_dissolved_already_takes_its_room() -> None:
    # 10 mL of 1.0 M hold 10 mmol.
    asked = bench("{10 mL brine -> A} {5.0 g salt -> A} {swirl A}")

    assert last(asked).dissolved == {
        "sodium-chloride": near(limit("sodium-chloride") * 10e-6 - 10e-3, rel=1e-3)
    }


def test_salt_of_two_chlorides_has_room_by_the_ion_that_is_scarce() -> None:
    # Chloride is there, calcium is not: all of the room is free. 2 g are 18.0 mmol of 67.
    asked = bench("{10 mL brine -> A} {2.0 g calcium -> A} {swirl A}")

    assert last(asked).dissolved == {"calcium-chloride": near(2.0 / 110.98, rel=1e-3)}


def test_room_for_a_salt_of_two_chlorides_counts_half_the_chloride() -> None:
    # 10 g in 10 mL: 67.03 of 90.1 mmol dissolve, and 23.1 stay; nothing more goes the second time.
    asked = bench("{10 mL water -> A} {10 g calcium -> A} {swirl A}", "{swirl A}")
    held = asked.ledger.end.vessel("A")

    assert last(asked).dissolved == {}
    assert held.aqueous.amounts["Ca^2+"] == near(limit("calcium-chloride") * 10e-6)
    assert held.solid["calcium-chloride"] == near(
        10 / 110.98 - limit("calcium-chloride") * 10e-6, rel=1e-3
    )


def test_salt_of_unknown_solubility_is_taken_to_dissolve_and_that_is_said() -> None:
    # 2 g, 214.00 g/mol, in 1 mL.
    asked = bench("{1 mL water -> A} {2.0 g iodate -> A} {swirl A}")

    assert last(asked).dissolved == {"potassium-iodate": near(2.0 / 214.0, rel=1e-3)}
    assert last(asked).why == (
        "the solubility of potassium iodate is not known: it is taken to dissolve",
    )


def test_salt_does_not_dissolve_in_an_ether() -> None:
    asked = bench("{10 mL ether -> A} {1.0 g salt -> A} {swirl A}")

    assert last(asked).dissolved == {}
    assert asked.ledger.end.vessel("A").solid["sodium-chloride"] == near(1 / 58.44, 1e-3)


def test_silica_stays_a_solid_in_anything() -> None:
    asked = bench("{10 mL water -> A} {10 mL ether -> A} {1.0 g silica -> A} {swirl A}")

    assert last(asked).dissolved == {}
    assert asked.ledger.end.vessel("A").solid.keys() == {"silica"}


def test_more_water_dissolves_the_rest() -> None:
    asked = bench("{10 mL water -> A} {5.0 g salt -> A} {swirl A}", "{10 mL water -> A} {swirl A}")

    assert asked.ledger.end.vessel("A").solid == {}
    assert asked.ledger.end.vessel("A").aqueous.amounts["Na^+"] == near(5.0 / 58.44, rel=1e-4)


# ---------------------------------------------------------------- acids that are hardly soluble


def test_benzoic_acid_saturates_water_with_its_neutral_form_and_what_that_gives_off() -> None:
    # [HA] 23.75 mM; [H+] = sqrt(10^-4.20 x 0.02375) = 1.224 mM: pH 2.91; 2.497 mmol in 100 mL.
    asked = bench("{100 mL water -> A} {1.0 g benzoic -> A} {swirl A}")
    neutral = limit("benzoic-acid") * 1e-3
    hydrogen = math.sqrt(10**-4.20 * neutral)

    assert neutral == near(0.02375, rel=1e-3)
    assert last(asked).ph == near(-math.log10(hydrogen), abs=0.005)
    assert last(asked).dissolved == {"benzoic-acid": near((neutral + hydrogen) * 0.1, rel=2e-3)}
    assert last(asked).precipitated == {}


def test_acid_drives_benzoic_acid_out_of_its_salt() -> None:
    # 10 mmol in 50 + 20 mL with 20 mmol of acid: 23.75 mM x 70 mL = 1.66 mmol stay.
    asked = bench("{50 mL benzoate -> A} {20 mL acid -> A} {swirl A}")
    gone = sum(
        found.precipitated.get("benzoic-acid", 0.0)
        for found in outcomes(asked, Mixed)
        if isinstance(found, Mixed)
    )

    stays = limit("benzoic-acid") * 70e-6
    assert gone == near(10e-3 - stays, rel=3e-3)
    assert asked.ledger.end.vessel("A").solid["benzoic-acid"] == near(gone)


def test_solid_goes_into_the_ether_where_there_is_one() -> None:
    asked = bench("{20 mL water -> A} {20 mL ether -> A} {1.0 g naphthalene -> A} {swirl A}")
    held = asked.ledger.end.vessel("A")

    # Ratio 10^3.34: 0.05 % stays in the water.
    assert held.solid == {}
    assert held.organic.amounts["naphthalene"] == near(1.0 / 128.174 * 2187.8 / 2188.8, rel=1e-4)
    assert held.aqueous.amounts["naphthalene"] == near(1.0 / 128.174 / 2188.8, rel=2e-3)


def test_solid_is_shared_by_volume_times_ratio() -> None:
    # Phenol, 10^1.48 = 30.2: with 30 mL of ether and 10 mL of water 90.6 to 1.
    asked = bench("{10 mL water -> A} {30 mL ether -> A} {1.0 g phenol -> A} {swirl A}")
    held = asked.ledger.end.vessel("A")

    assert held.organic.amounts["phenol"] / held.aqueous.amounts["phenol"] == near(
        30.2 * 3, rel=5e-3
    )
    assert last(asked).ratios["phenol"] == "log P"


def test_spirit_takes_its_volume_from_layer_to_layer() -> None:
    # 6 mL of ethanol between 20 mL of ether and 20 mL of water: each layer holds its own liquid and
    # the part of the spirit that is in it, 46.069 g/mol over 0.7903 g/mL a mole.
    asked = bench("{20 mL water -> A} {20 mL ether -> A} {6 mL spirit -> A} {shake A}")
    held = asked.ledger.end.vessel("A")
    molar = 46.069e-6 / 0.7903

    assert held.aqueous.volume == near(20e-6 + held.aqueous.amounts["ethanol"] * molar, rel=1e-4)
    assert held.organic.volume == near(20e-6 + held.organic.amounts["ethanol"] * molar, rel=1e-4)
    assert held.volume == near(46e-6, rel=1e-6)


def test_acid_that_mixes_with_water_is_shared_with_the_ether_all_the_same() -> None:
    # Ratio 10^-0.17 = 0.676, equal volumes: 0.1 M = 1.676 c + sqrt(Ka c), c = 59.1 mM; 0.676 x 59.1
    # = 39.9 mM of 100 in the ether.
    asked = bench("{20 mL vinegar -> A} {20 mL ether -> A} {shake A}")
    held = asked.ledger.end.vessel("A")

    assert held.organic.amounts["acetic-acid"] == near(0.399 * 2e-3, rel=5e-3)


def test_sulfate_stays_in_the_water_though_no_ratio_of_its_acid_is_known() -> None:
    asked = bench("{20 mL epsom -> A} {20 mL ether -> A} {shake A}")
    held = asked.ledger.end.vessel("A")

    assert held.aqueous.amounts["sulfuric-acid"] == near(0.010, rel=1e-3)
    assert held.ph is not None
    assert last(asked).why == ()


# ---------------------------------------------------------------- what is not known

ODD = {
    "substances/mine.yml": (
        "odd-amine:\n  names: [odd amine]\n  formula: C6H7N\n  groups: [aromatic amine]\n"
        "  log-p: 1\n  state: solid\n"
        "plain-amine:\n  names: [plain amine]\n  formula: C6H7N\n  base: [6.0]\n  state: solid\n"
    )
}
ODD_FRONT = """\
materials:
  odd: odd amine
  plain: plain amine
  acid: 0.10 M hydrochloric acid
  ether: tert-butyl methyl ether
vessels: {A: conical flask 250 mL}
"""


def odd(*sentences: str) -> Asked:
    return ran(*sentences, front=ODD_FRONT, files=ODD)


def test_amine_of_unknown_pka_spoils_the_ph_and_its_own_place() -> None:
    asked = odd("{20 mL acid -> A} {20 mL ether -> A} {0.10 g odd -> A} {shake A}")
    held = asked.ledger.end.vessel("A")

    assert held.ph is None
    assert "odd-amine" in held.doubt
    assert "the pKa of odd amine is not known" in last(asked).why


def test_trace_of_unknown_pka_spoils_nothing() -> None:
    # 0.10 mg, 1.07 µmol, beside 4 mmol of ions: 0.03 %, below half a per cent.
    asked = odd("{20 mL acid -> A} {0.10 mg odd -> A} {swirl A}")

    assert asked.ledger.end.vessel("A").ph == near(1.0, abs=0.005)
    assert asked.ledger.end.vessel("A").doubt == frozenset()


def test_amine_of_unknown_ratio_is_kept_where_it_was_and_is_in_doubt() -> None:
    # 1.07 mmol of an amine of pKa 6 against 2 mmol of acid: in the water, were the ratio known.
    asked = odd("{20 mL ether -> A} {0.10 g plain -> A} {swirl A}", "{5 mL acid -> A} {shake A}")
    held = asked.ledger.end.vessel("A")

    assert held.doubt == {"plain-amine"}
    assert held.organic.amounts["plain-amine"] == near(0.10 / 93.129, rel=1e-3)
    assert "plain-amine" not in held.aqueous.amounts
    assert held.ph is None
    assert last(asked).why == (
        "no partition ratio of plain amine between tert-butyl methyl ether and water is known",
    )


def test_author_who_states_where_it_went_clears_the_doubt() -> None:
    asked = odd(
        "{20 mL ether -> A} {0.10 g plain -> A} {5 mL acid -> A} {shake A}",
        "{suppose 90 % plain-amine in A is aqueous: by titration}",
    )
    held = asked.ledger.end.vessel("A")

    assert held.doubt == frozenset()
    assert held.aqueous.amounts["plain-amine"] == near(0.9 * 0.10 / 93.129, rel=1e-3)


def test_doubt_is_kept_while_more_is_mixed_in() -> None:
    asked = odd(
        "{20 mL ether -> A} {0.10 g plain -> A} {5 mL acid -> A} {shake A}",
        "{0.10 g odd -> A} {shake A}",
    )

    assert {"plain-amine", "odd-amine"} <= asked.ledger.end.vessel("A").doubt


# ---------------------------------------------------------------- gas


def test_mole_of_gas_takes_its_molar_volume_at_25_celsius() -> None:
    # R x 298.15 K / 101325 Pa = 24.465 L/mol.
    mixed = Mixed(gas={"carbon-dioxide": 0.6, "ammonia": 0.4})

    assert gas_volume_of(mixed) == near(24.465e-3, rel=1e-4)


def test_other_outcomes_give_no_gas() -> None:
    assert gas_volume_of(Moved("A", "B", "", 1.0)) == 0.0
    assert gas_volume_of(Mixed()) == 0.0


def test_acid_drives_carbon_dioxide_out_but_for_what_water_holds() -> None:
    # 10 mmol in 100 mL with 20 mmol of acid in 20: 33.4 mM x 120 mL = 4.01 mmol stay.
    asked = bench("{100 mL soda -> A} {20 mL acid -> A} {swirl A}")
    air = asked.ledger.end.sinks["air"]

    stays = limit("carbon-dioxide") * 120e-6
    assert air.liquids["carbon-dioxide"] == near(10e-3 - stays, rel=2e-3)
    assert asked.ledger.end.vessel("A").aqueous.amounts["carbon-dioxide"] == near(stays, rel=2e-3)


def test_gas_takes_no_volume_of_liquid_along() -> None:
    asked = bench("{100 mL soda -> A} {20 mL acid -> A} {swirl A}")

    assert asked.ledger.end.sinks["air"].volume == 0.0


def test_little_carbon_dioxide_stays_in_the_water() -> None:
    # 1 mmol in 10 + 90 mL is 10 mM, below 33.4.
    asked = bench("{90 mL water -> A} {10 mL soda -> A} {2 mL acid -> A} {swirl A}")

    assert "air" not in asked.ledger.end.sinks


# ---------------------------------------------------------------- pH


@pytest.mark.parametrize(
    ("acid", "base", "expected"),
    [(20.0, 10.0, 0.4771), (10.0, 10.0, 7.0), (10.0, 20.0, 13.5229)],
)
def test_ph_is_that_of_what_is_left_of_acid_or_base(
    acid: float, base: float, expected: float
) -> None:
    # 10 mmol too much in 30 mL: 0.333 M.
    asked = bench("{" + f"{acid:g} mL acid -> A" + "} {" + f"{base:g} mL base -> A" + "} {swirl A}")

    assert last(asked).ph == near(expected, abs=0.005)


def test_strong_acid_beyond_half_a_mole_a_litre_is_rough() -> None:
    assert last(bench("{20 mL acid -> A} {swirl A}")).rough
    assert not last(bench("{20 mL acid -> A} {80 mL water -> A} {swirl A}")).rough


def test_layer_without_water_has_no_ph() -> None:
    asked = bench("{20 mL ether -> A} {1.0 g benzoic -> A} {swirl A}")

    assert last(asked).ph is None
    assert asked.ledger.end.vessel("A").mixed
    assert not asked.ledger.end.vessel("A").settled
    assert asked.ledger.end.vessel("A").organic.amounts["benzoic-acid"] == near(
        1.0 / 122.123, rel=1e-4
    )
    assert last(asked).dissolved == {"benzoic-acid": near(1.0 / 122.123, rel=1e-4)}


# ---------------------------------------------------------------- constants

STEEP = Thing("x", ANY, soluble=(Solubility(10.0, 300.0), Solubility(1000.0, 320.0)))


@pytest.mark.parametrize(
    ("kelvin", "expected"),
    [
        (250.0, 10.0),
        (300.0, 10.0),
        (305.0, 10**1.5),
        (310.0, 100.0),
        (315.0, 10**2.5),
        (320.0, 1000.0),
        (370.0, 1000.0),
    ],
)
def test_solubility_rises_by_powers_of_ten_between_two_temperatures(
    kelvin: float, expected: float
) -> None:
    assert STEEP.solubility(kelvin) == near(expected)


def test_solubility_that_nobody_gives_is_unknown() -> None:
    assert Thing("x", ANY).solubility(298.15) is None


def test_three_temperatures_are_read_between_the_two_around() -> None:
    three = STEEP._replace(soluble=(*STEEP.soluble, Solubility(1000.0, 340.0)))

    assert three.solubility(330.0) == near(1000.0)
    assert three.solubility(310.0) == near(100.0)


@pytest.mark.parametrize(
    ("thing", "layers"),
    [
        (Thing("x", ANY, liquid=True, miscible=True), False),
        (Thing("x", ANY, liquid=True, miscible=False), True),
        (Thing("x", ANY, liquid=False, miscible=False), False),
        (Thing("water", ANY, liquid=True), False),
        (Thing("x", ANY, liquid=True), True),
        (Thing("x", ANY, liquid=True, ratio=3.1), False),  # log P 0.49
        (Thing("x", ANY, liquid=True, ratio=3.2), True),  # log P 0.51
        (Thing("x", ANY, liquid=True, ratio=0.1, soluble=(Solubility(1.0, 300.0),)), True),
        (Thing("x", ANY, liquid=True, miscible=False, ratio=0.1), True),
    ],
)
def test_liquid_makes_a_layer_unless_it_mixes_with_water(thing: Thing, *, layers: bool) -> None:
    assert thing.layers is layers


@pytest.mark.parametrize(
    ("key", "charge", "mass", "atoms"),
    [
        ("Na^+", 1, 22.990e-3, {"Na": 1.0}),
        ("SO4^2-", -2, 96.06e-3, {"S": 1.0, "O": 4.0}),
        ("H^+", 1, 1.008e-3, {"H": 1.0}),
    ],
)
def test_ion_is_known_by_its_formula(
    key: str, charge: int, mass: float, atoms: dict[str, float]
) -> None:
    found = KNOWN.thing(key)

    assert found.ion
    assert (found.charge, found.atoms) == (charge, atoms)
    assert found.molar_mass == near(mass, rel=1e-3)
    assert KNOWN.parts(key) == {key: 1}


def test_salt_is_known_by_its_parts() -> None:
    assert KNOWN.parts("calcium-chloride") == {"Ca^2+": 1, "Cl^-": 2}
    assert not KNOWN.thing("calcium-chloride").ion


def test_amine_is_charged_when_it_has_taken_its_proton() -> None:
    amine, acid = KNOWN.thing("benzylamine"), KNOWN.thing("benzoic-acid")

    assert (amine.top, amine.pkas) == (1, (9.35,))
    assert (acid.top, acid.pkas) == (0, (4.20,))


def test_measured_ratio_wins_over_log_p_and_only_for_its_solvent() -> None:
    files = {
        "substances/mine.yml": (
            "mine:\n  names: [mine]\n  formula: C9H11NO2\n  log-p: 2\n"
            "  partition: {tert-butyl methyl ether: 40}\n"
        )
    }
    known = knowledge(files)

    assert known.ratio("mine", "tert-butyl-methyl-ether") == (40.0, "measured")
    assert known.ratio("mine", "toluene") == (near(100.0), "log P")
    assert known.ratio("carbon-dioxide", "toluene") == (None, "unknown")


def test_solubility_by_mass_fraction_counts_the_water_in_it() -> None:
    # 20 % w/w: 20 g to 80 g of water, 0.25 x 998.2 g in a litre of water; C9H11NO2 has 165.19 g/mol.
    files = {
        "substances/mine.yml": (
            "mine:\n  names: [mine]\n  formula: C9H11NO2\n"
            "  soluble: {water: [20 % w/w at 60 °C, 16.519 g/L at 20 °C]}\n"
        )
    }
    cold, hot = knowledge(files).thing("mine").soluble

    assert cold == Solubility(near(100.0, rel=1e-3), near(293.15))
    assert hot == Solubility(near(0.25 * 998.2 / 0.16519, rel=1e-3), near(333.15))


def test_solubility_without_a_temperature_is_taken_for_25_celsius() -> None:
    files = {
        "substances/mine.yml": (
            "mine:\n  names: [mine]\n  formula: C9H11NO2\n  soluble: {water: [16.519 g/L]}\n"
        )
    }
    (only,) = knowledge(files).thing("mine").soluble

    assert only == Solubility(near(100.0, rel=1e-3), near(298.15))


def test_amine_of_unknown_pka_is_told_from_a_neutral_substance() -> None:
    files = {
        "substances/mine.yml": (
            "mine:\n  names: [mine]\n  formula: C6H7N\n  groups: [aromatic amine]\n"
            "other:\n  names: [other]\n  formula: C6H6\n  groups: [arene]\n"
        )
    }
    known = knowledge(files)

    assert not known.thing("mine").pkas_known
    assert known.thing("other").pkas_known


# ---------------------------------------------------------------- liquids dissolved in liquids


def test_liquid_that_is_only_dissolved_in_a_layer_parts_between_both() -> None:
    # 2.0 mL of butan-1-ol (log P 0.84) in 40 mL of ether, shaken with 40 mL of water: by Nernst
    # P V(org) / (P V(org) + V(aq)) stays in the ether.
    asked = bench(
        "{40 mL ether -> A} {2.0 mL alcohol -> A} {40 mL water -> A} {shake A, stoppered}"
    )
    vessel = asked.ledger.end.vessel("A")
    ratio = 10**0.84
    stays = vessel.organic.amounts["butan-1-ol"]
    whole = stays + vessel.aqueous.amounts["butan-1-ol"]

    assert whole == near(2.0 * 0.8097 / 74.12, rel=2e-3)  # density 0.8097 g/mL at 20 °C
    # The engine takes the volumes before the alcohol has moved: 42 and 40 mL.
    assert stays / whole == near(ratio * 42 / (ratio * 42 + 40), rel=1e-6)
    assert vessel.volume == near(82e-6, rel=1e-9)
    assert "tert-butyl-methyl-ether" not in vessel.aqueous.amounts, "the solvent keeps to its layer"


def test_second_solvent_keeps_to_its_layer() -> None:
    # A quarter of the layer is no solute: mutual solubility is outside the model.
    asked = bench("{30 mL ether -> A} {10 mL alcohol -> A} {40 mL water -> A} {shake A, stoppered}")

    assert "butan-1-ol" not in asked.ledger.end.vessel("A").aqueous.amounts
