"""What everybody at the bench knows. Common practice, no source, unless one is named."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from bench_runner import outcomes, ph, ran, share
from watchglass.run.bench.layers import Layers
from watchglass.run.bench.ledger import Added
from watchglass.run.bench.mixing import Mixed

if TYPE_CHECKING:
    from watchglass.run.bench.asked import Asked

FRONT = """\
materials:
  strong: 3.0 M hydrochloric acid
  weak: 0.5 M hydrochloric acid
  hydroxide: 6.0 M sodium hydroxide
  soda: 5.0 % w/v sodium hydrogencarbonate
  dilute-soda: 1.0 M sodium hydroxide
  water: water
  ether: tert-butyl methyl ether
  heavy: dichloromethane
  acetone: acetone
  spirit: ethanol
  acid-and-phenol: {contains: {benzoic-acid: 1 mol, phenol: 1 mol}}
  amine: {contains: {benzylamine: 1 mol, biphenyl: 1 mol}}
  aromatic-amine: {contains: {benzocaine: 1 mol, biphenyl: 1 mol}}
  carbonate: sodium carbonate, anhydrous
  acetic: 0.10 M acetic acid
  ammonia: 0.10 M ammonia
  titrant: 0.10 M sodium hydroxide
vessels:
  funnel: separatory funnel 250 mL
  A: conical flask 250 mL
  burette: burette 50 mL
"""


def bench(*sentences: str) -> Asked:
    return ran(*sentences, front=FRONT)


def gas(asked: Asked) -> float:
    return sum(m.gas.get("carbon-dioxide", 0.0) for m in outcomes(asked, Mixed))  # type: ignore[attr-defined]


def layer(asked: Asked) -> Layers:
    return next(o for o in reversed(outcomes(asked, Layers)) if isinstance(o, Layers))


SHAKEN = "{30 mL ether -> funnel} {0.50 g acid-and-phenol -> funnel} {20 mL SODA -> funnel} {shake funnel} {settle funnel} {funnel.aqueous -> A}"


def test_hydrogencarbonate_takes_the_carboxylic_acid_and_leaves_the_phenol() -> None:
    asked = bench(SHAKEN.replace("SODA", "soda"))

    assert share(asked, "benzoic-acid", "A") > 0.9
    assert share(asked, "phenol", "A") < 0.1


def test_hydroxide_takes_both() -> None:
    asked = bench(SHAKEN.replace("SODA", "dilute-soda"))

    assert share(asked, "benzoic-acid", "A") > 0.99
    assert share(asked, "phenol", "A") > 0.95


def test_hydrogencarbonate_wash_of_an_acid_makes_gas_and_hydroxide_none() -> None:
    assert gas(bench(SHAKEN.replace("SODA", "soda"))) > 1e-4
    assert gas(bench(SHAKEN.replace("SODA", "dilute-soda"))) == 0


@pytest.mark.parametrize(("acid", "enough"), [("weak", True), ("strong", True)])
def test_half_molar_acid_is_enough_for_an_aliphatic_amine(acid: str, enough: bool) -> None:
    asked = bench(
        "{30 mL ether -> funnel} {0.50 g amine -> funnel} {15 mL " + acid + " -> funnel}"
        " {shake funnel} {settle funnel} {funnel.aqueous -> A}"
    )

    assert (share(asked, "benzylamine", "A") > 0.98) is enough


@pytest.mark.parametrize(("acid", "enough"), [("weak", False), ("strong", True)])
def test_benzocaine_needs_three_molar_acid(acid: str, enough: bool) -> None:
    asked = bench(
        "{30 mL ether -> funnel} {0.50 g aromatic-amine -> funnel} {15 mL " + acid + " -> funnel}"
        " {shake funnel} {settle funnel} {funnel.aqueous -> A}"
    )

    assert (share(asked, "benzocaine", "A") > 0.8) is enough


@pytest.mark.parametrize("water", ["weak", "soda", "water"])
def test_ethers_float(water: str) -> None:
    asked = bench("{30 mL ether -> funnel} {15 mL " + water + " -> funnel} {settle funnel}")

    assert layer(asked).below == "aqueous"


@pytest.mark.parametrize("water", ["weak", "soda", "water"])
def test_dichloromethane_sinks(water: str) -> None:
    asked = bench("{30 mL heavy -> funnel} {15 mL " + water + " -> funnel} {settle funnel}")

    assert layer(asked).below == "organic"


@pytest.mark.parametrize("solvent", ["acetone", "spirit"])
def test_solvents_that_mix_with_water_give_no_layers(solvent: str) -> None:
    asked = bench("{20 mL " + solvent + " -> funnel} {20 mL water -> funnel} {settle funnel}")

    assert outcomes(asked, Layers) == []


def test_half_molar_acid_takes_a_twelfth_of_its_volume_of_six_molar_hydroxide() -> None:
    asked = bench("{30 mL weak -> A} {adjust A to pH 7 with hydroxide}")
    (added,) = [a for a in outcomes(asked, Added) if isinstance(a, Added)]

    assert added.volume == pytest.approx(2.5e-6, rel=0.01)


def test_equivalence_of_a_weak_acid_lies_above_seven() -> None:
    # OpenStax Chemistry 2e, ch. 14.7: 25.00 mL of 0.100 M acetic acid, pH 8.72 at equivalence.
    asked = bench("{25 mL acetic -> A} {25 mL titrant -> A} {swirl A}")

    assert ph(asked, "A") == pytest.approx(8.72, abs=0.05)


def test_equivalence_of_a_weak_base_lies_below_seven() -> None:
    # half-diluted 0.10 M ammonium, pKa 9.25: pH = (9.25 - log 0.05) / 2
    asked = bench("{10 mL ammonia -> A} {2 mL weak -> A} {swirl A}")

    assert 5.0 < ph(asked, "A") < 5.5


def test_layer_changes_its_place_with_the_solvent() -> None:
    light = bench(
        "{30 mL ether -> funnel} {15 mL water -> funnel} {settle funnel} {funnel.lower -> A}"
    )
    heavy = bench(
        "{30 mL heavy -> funnel} {15 mL water -> funnel} {settle funnel} {funnel.lower -> A}"
    )

    assert light.ledger.end.vessel("A").aqueous
    assert heavy.ledger.end.vessel("A").organic
