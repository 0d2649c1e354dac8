"""Reagent to a pH and titrations, worked out by the equation; and why a volume cannot be told."""

from __future__ import annotations

import pytest

from bench_runner import outcomes, ran
from run.bench.shelf import near
from watchglass.run.bench.asked import Answer, Asked
from watchglass.run.bench.ledger import Added

FRONT = """\
materials:
  water: water
  ether: tert-butyl methyl ether
  acid: 0.50 M hydrochloric acid
  alkali: 6.0 M sodium hydroxide
  titrant: 0.10 M sodium hydroxide
  vinegar: 0.10 M acetic acid
  silver: 0.050 M silver nitrate
  brine: 0.10 M sodium chloride
  calcium: 0.10 M calcium chloride
  iodine: 0.010 M iodine
  thiosulfate: 0.050 M sodium thiosulfate
  phosphate: 0.10 M phosphoric acid
  benzoic: benzoic acid
  loose: {contains: {benzoic-acid: 1 mol}}
vessels:
  A: conical flask 250 mL
  B: conical flask 250 mL
  burette: burette 50 mL
reactions:
  silvering: AgNO3 + NaCl -> AgCl + NaNO3
  twice: 2 AgNO3 + CaCl2 -> 2 AgCl + Ca(NO3)2
  unbalanced: AgNO3 + CaCl2 -> AgCl + Ca(NO3)2
"""


def bench(*sentences: str) -> Asked:
    return ran(*sentences, front=FRONT)


def added(asked: Asked) -> Added:
    (found,) = (a for a in outcomes(asked, Added) if isinstance(a, Added))
    return found


# ---------------------------------------------------------------- to a pH


def test_alkali_to_neutral_is_as_much_as_the_acid() -> None:
    # 30 mL x 0.50 M / 6.0 M = 2.5 mL; pH before: -log 0.50 = 0.30.
    asked = bench("{30 mL acid -> A}", "{adjust A to pH 7 with alkali}")

    assert added(asked) == Added("alkali", near(2.5e-6, rel=1e-3), 7.0, near(0.301, abs=1e-3))
    assert asked.ledger.end.vessel("A").ph == near(7.0, abs=0.01)
    assert asked.ledger.end.vessel("A").volume == near(32.5e-6, rel=1e-3)


def test_indicator_stands_for_the_middle_of_its_range() -> None:
    # Methyl red, 4.4 to 6.2 in the catalogue: 5.3.
    assert added(bench("{30 mL acid -> A}", "{adjust A to methyl-red with alkali}")).wanted == (
        near(5.3)
    )


def test_volume_that_the_author_states_is_taken_as_it_is() -> None:
    # 5 mL of 6.0 M are 30 mmol for 15: 15 mmol in 35 mL are left, pH 13.63.
    asked = bench("{30 mL acid -> A}", "{adjust A to pH 10 with 5 mL alkali}")

    assert added(asked) == Added("alkali", near(5e-6), 10.0, near(0.301, abs=1e-3), stated=True)
    assert asked.ledger.end.vessel("A").ph == near(13.632, abs=0.005)


def test_acid_makes_nothing_alkaline() -> None:
    found = added(bench("{30 mL water -> A}", "{adjust A to pH 10 with acid}"))

    assert found.volume is None
    assert found.why == "no amount of it brings the liquid to pH 10"


def test_liquid_without_an_aim_is_left_alone() -> None:
    # Salt is no indicator: it shows no pH to go to.
    asked = bench("{30 mL acid -> A}", "{adjust A to salt with alkali}")

    assert outcomes(asked, Added) == []
    assert asked.ledger.end.vessel("A").volume == near(30e-6)


def test_reagent_that_cannot_be_worked_out_says_why() -> None:
    front = FRONT.replace("alkali: 6.0 M sodium hydroxide", "alkali: 10 % w/w sucrose in ethanol")
    found = added(ran("{30 mL acid -> A}", "{adjust A to pH 7 with alkali}", front=front))

    assert found == Added(
        "alkali",
        None,
        7.0,
        near(0.301, abs=1e-3),
        why="the solution density of sucrose is not known",
    )


def test_solid_acid_takes_its_alkali_as_well() -> None:
    # 1.2212 g of benzoic acid are 10.00 mmol, hardly dissolved in 10 mL; 1.67 mL of 6.0 M.
    asked = bench("{10 mL water -> A} {1.2212 g benzoic -> A}", "{adjust A to pH 8 with alkali}")

    assert added(asked).volume == near(10.0 / 6.0 * 1e-6, rel=2e-3)
    assert asked.ledger.end.vessel("A").solid == {}


def test_ether_has_no_ph_to_be_adjusted() -> None:
    found = added(bench("{30 mL ether -> A}", "{adjust A to pH 10 with alkali}"))

    assert (found.volume, found.why) == (None, "there is no aqueous liquid in it")


def test_unknown_amount_leaves_the_volume_unknown() -> None:
    found = added(bench("{30 mL acid -> A} {all loose -> A}", "{adjust A to pH 7 with alkali}"))

    assert (found.volume, found.why) == (None, "what loose brings is not known")


def test_no_more_than_a_thousand_times_the_liquid_is_poured_in() -> None:
    # 1 mL of 0.50 M acid takes 5 L of 0.10 mM base: five thousand times its volume.
    front = FRONT.replace("alkali: 6.0 M", "alkali: 0.00010 M")
    found = added(ran("{1 mL acid -> A}", "{adjust A to pH 7 with alkali}", front=front))

    assert found.volume is None


@pytest.mark.parametrize(
    ("substance", "why"),
    [
        ("  groups: [aromatic amine]\n  log-p: 1\n", "the pKa of mine is not known"),
        (
            "  base: [6.0]\n",
            "no partition ratio of mine between tert-butyl methyl ether and water is known",
        ),
    ],
)
def test_missing_constant_leaves_the_volume_unknown(substance: str, why: str) -> None:
    files = {
        "substances/mine.yml": "mine:\n  names: [mine]\n  formula: C6H7N\n  state: solid\n"
        + substance
    }
    found = added(
        ran(
            "{10 mL acid -> A} {10 mL ether -> A} {0.50 g own -> A} {shake A}",
            "{adjust A to pH 7 with alkali}",
            front=FRONT.replace("materials:\n", "materials:\n  own: mine\n"),
            files=files,
        )
    )

    assert (found.volume, found.why) == (None, why)


# ---------------------------------------------------------------- titrations


def titrated(sample: str, titrant: str, to: str) -> Asked:
    return bench(
        "{" + sample + " -> A} {50 mL " + titrant + " -> burette}",
        "{titrate A with " + titrant + " from burette " + to + "}{label end}",
    )


def test_titre_of_a_weak_acid_is_its_amount_over_the_strength() -> None:
    # 25 mL x 0.10 M / 0.10 M = 25 mL; at phenolphthalein's 9 it is met within 0.1 %.
    asked = titrated("25 mL vinegar", "titrant", "to phenolphthalein")

    assert asked.titre("end").value == near(25e-6, rel=2e-3)
    assert asked.ledger.end.vessel("burette").volume == near(25e-6, rel=2e-3)
    assert asked.ledger.end.vessel("A").volume == near(50e-6, rel=2e-3)


def test_titration_to_a_ph_stops_there() -> None:
    # Half neutralised at the pKa, 4.76.
    asked = titrated("25 mL vinegar", "titrant", "to pH 4.76")

    assert asked.titre("end").value == near(12.5e-6, rel=5e-3)
    assert added(asked).before == near(2.88, abs=0.01)
    assert added(asked).wanted == near(4.76)


def test_titre_that_the_author_gives_is_drawn_from_the_burette() -> None:
    asked = titrated("25 mL vinegar", "titrant", "giving 10.0 mL")

    assert asked.titre("end") == Answer(near(10e-6))
    assert added(asked).stated
    assert asked.ledger.end.vessel("burette").volume == near(40e-6)
    assert asked.ledger.end.vessel("A").aqueous.amounts["Na^+"] == near(1.0e-3)


def test_no_more_is_drawn_than_the_burette_holds() -> None:
    asked = bench(
        "{25 mL acid -> A} {10 mL titrant -> burette}",
        "{titrate A with titrant from burette giving 30 mL}",
    )

    assert asked.ledger.end.vessel("burette").empty
    assert asked.ledger.end.vessel("A").volume == near(35e-6)


def test_precipitation_titre_goes_by_the_equation() -> None:
    # 10 mL x 0.10 M / 0.050 M = 20 mL.
    asked = titrated("10 mL brine", "silver", "as silvering")

    assert asked.titre("end").value == near(20e-6, rel=1e-4)


def test_titre_counts_the_coefficients_of_both() -> None:
    # 10 mL x 0.10 M of calcium chloride take two silver each: 40 mL of 0.050 M.
    asked = titrated("10 mL calcium", "silver", "as twice")

    assert asked.titre("end").value == near(40e-6, rel=1e-4)


def test_titration_in_a_vessel_without_the_reactant_has_no_titre() -> None:
    asked = titrated("10 mL water", "silver", "as silvering")

    assert asked.titre("end") == Answer(
        None, "the vessel or the burette holds nothing that the reaction takes"
    )
    assert asked.ledger.end.vessel("burette").volume == near(50e-6)


def test_titration_that_goes_nowhere_has_no_titre() -> None:
    asked = titrated("10 mL vinegar", "titrant", "to salt")

    assert asked.titre("end").value is None
    assert asked.titre("end").why


def test_titration_with_an_empty_burette_has_no_titre() -> None:
    asked = bench(
        "{10 mL vinegar -> A}", "{titrate A with titrant from burette to pH 8}{label end}"
    )

    assert asked.titre("end").value is None
    assert asked.titre("end").why == "there is no reagent in the vessel it comes from"


def test_titre_is_that_of_the_last_titration_before_the_label() -> None:
    asked = bench(
        "{50 mL titrant -> burette}",
        "{10 mL vinegar -> A} {titrate A with titrant from burette giving 4 mL}{label one}",
        "{10 mL vinegar -> B} {titrate B with titrant from burette giving 7 mL}{label two}",
    )

    assert asked.titre("one") == Answer(near(4e-6))
    assert asked.titre("two") == Answer(near(7e-6))


def test_titre_of_a_label_before_any_titration_is_unknown() -> None:
    asked = bench("{10 mL vinegar -> A}{label begin}")

    assert asked.titre("begin") == Answer(None, "nothing is titrated before `begin`")
    assert asked.titre("nowhere") == Answer(None, "`nowhere` is never reached")


def test_reagent_that_brings_more_of_what_is_there_reaches_its_ph() -> None:
    # Benzoic acid lies at the bottom: what the reagent brings counts with it, under one solubility.
    front = """\
materials: {salt: 0.50 M sodium benzoate, acid: 1.0 M hydrochloric acid, thin: 0.10 M sodium benzoate}
vessels: {A: beaker 1000 mL}
"""
    asked = ran(
        "{20 mL salt -> A} {10 mL acid -> A} {stir A}",
        "{adjust A to pH 5 with thin} {stir A}",
        front=front,
    )

    assert asked.ledger.end.vessel("A").ph == pytest.approx(5.0, abs=1e-6)
