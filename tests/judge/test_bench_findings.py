"""Findings of the bench one by one: a draft that has the fault, and the like that is sound."""

from __future__ import annotations

import pytest

from builders import judged, steps


def found(code: str, front: str, *written: str, laboratory: str = "") -> list[str]:
    """Give the messages of a code."""
    files = {"laboratory.yml": laboratory} if laboratory else None
    entry = judged(steps(*written), front, files)
    return [f.message for f in entry.findings if f.code.number == code]


# ---------------------------------------------------------------- indicators


TITRATION = """\
materials:
  sample: {sample}
  titrant: {titrant}
vessels:
  flask: conical flask 250 mL
  burette: burette 50 mL
"""
TITRATE = (
    "Fill {{burette}} with {{50 mL titrant -> burette}}; put {{25.00 mL sample -> flask}} into {{flask}}.",
    "{{titrate flask with titrant from burette to {0}}}",
)


@pytest.mark.parametrize(
    ("sample", "titrant", "indicator", "wrong"),
    [
        # Textbook pairs: weak acid with phenolphthalein, weak base with methyl red or orange.
        ("0.100 M acetic acid", "0.100 M sodium hydroxide", "phenolphthalein", False),
        ("0.100 M acetic acid", "0.100 M sodium hydroxide", "methyl-orange", True),
        ("0.100 M acetic acid", "0.100 M sodium hydroxide", "bromothymol-blue", True),
        ("0.100 M ammonia", "0.100 M hydrochloric acid", "methyl-red", False),
        ("0.100 M ammonia", "0.100 M hydrochloric acid", "phenolphthalein", True),
        ("0.100 M hydrochloric acid", "0.100 M sodium hydroxide", "methyl-orange", False),
        ("0.100 M hydrochloric acid", "0.100 M sodium hydroxide", "phenolphthalein", False),
        ("0.0500 M sodium carbonate", "0.100 M hydrochloric acid", "methyl-orange", False),
        ("0.100 M ammonium chloride", "0.100 M sodium hydroxide", "thymolphthalein", True),
    ],
)
def test_indicator_away_from_the_equivalence_point_is_found(
    sample: str, titrant: str, indicator: str, wrong: bool
) -> None:
    front = TITRATION.format(sample=sample, titrant=titrant)
    said = found("X107", front, *(line.format(indicator) for line in TITRATE))

    assert bool(said) is wrong


def test_equivalence_point_is_told_with_its_ph() -> None:
    # Acetate of 0.050 mol/L: pH = 7 + (4.76 + log10 0.050) / 2 = 8.73.
    front = TITRATION.format(sample="0.100 M acetic acid", titrant="0.100 M sodium hydroxide")
    (said,) = found("X107", front, *(line.format("methyl-orange") for line in TITRATE))

    assert "25.0 mL and pH 8.7" in said


def test_titrant_that_gives_no_sharp_change_is_told() -> None:
    front = TITRATION.format(sample="0.100 M ammonium chloride", titrant="0.100 M sodium hydroxide")
    (said,) = found("X107", front, *(line.format("thymolphthalein") for line in TITRATE))

    assert "nowhere sharply" in said


def test_laboratory_can_allow_more() -> None:
    front = TITRATION.format(sample="0.100 M acetic acid", titrant="0.100 M sodium hydroxide")
    written = [line.format("bromothymol-blue") for line in TITRATE]

    assert found("X107", front, *written, laboratory="thresholds: {indicator-error: 10 %}") == []


# ---------------------------------------------------------------- peroxides


ETHER = """\
materials:
  acid: benzoic acid
  ether: {0}
vessels:
  flask: round-bottom flask 100 mL, tared
  still: round-bottom flask 100 mL
"""
DISSOLVE = (
    "Put {0.50 g acid -> flask} and {30 mL ether -> flask} into {flask}; {swirl flask, open}."
)


@pytest.mark.parametrize("ether", ["diethyl ether", "tetrahydrofuran", "1,4-dioxane"])
@pytest.mark.parametrize(
    "act", ["evaporate flask, in hood", "distil flask at 30–110 °C into still"]
)
def test_peroxide_former_is_not_concentrated_untested(ether: str, act: str) -> None:
    (said,) = found("B135", ETHER.format(ether), DISSOLVE, f"{{{act}}}")

    assert ether in said


@pytest.mark.parametrize(
    "ether", ["tert-butyl methyl ether", "ethyl acetate", "dichloromethane", "ethanol"]
)
def test_resistant_solvent_needs_no_test(ether: str) -> None:
    assert found("B135", ETHER.format(ether), DISSOLVE, "{evaporate flask, in hood}") == []


@pytest.mark.parametrize("tested", ["test ether peroxides", "test flask peroxides"])
def test_test_of_bottle_or_vessel_serves(tested: str) -> None:
    front = ETHER.format("diethyl ether")

    assert found("B135", front, DISSOLVE, f"{{{tested}}}", "{evaporate flask, in hood}") == []


def test_test_after_the_evaporation_is_too_late() -> None:
    front = ETHER.format("diethyl ether")

    assert found("B135", front, DISSOLVE, "{evaporate flask, in hood}", "{test ether peroxides}")


def test_traces_of_a_peroxide_former_do_not_count() -> None:
    front = ETHER.format("diethyl ether").replace("vessels", "  toluene: toluene\nvessels")
    steps_ = "Put {0.50 g acid -> flask}, {2 mL ether -> flask} and {50 mL toluene -> flask} in."

    assert found("B135", front, steps_, "{swirl flask, open}", "{evaporate flask, in hood}") == []


# ---------------------------------------------------------------- funnels


SALT = """\
materials:
  salt: 0.50 M sodium benzoate
  strong: 3.0 M hydrochloric acid
  ether: tert-butyl methyl ether
vessels:
  funnel: separatory funnel 125 mL
  A: beaker 100 mL
"""
ACIDIFY = "Put {30 mL salt -> funnel} and {8 mL strong -> funnel} in and {swirl funnel, open}."


def test_solid_at_the_tap_is_found_with_its_mass() -> None:
    # 15 mmol of benzoic acid is 1.83 g; 3.4 g/L stays in 38 mL of water, so about 1.7 g separates.
    (said,) = found("B136", SALT, ACIDIFY, "Draw {funnel.aqueous -> A} into {A}.")

    assert said.startswith("1.7 g of benzoic acid")


def test_solid_that_the_solvent_takes_up_is_no_matter() -> None:
    more = "Add {40 mL ether -> funnel} and {swirl funnel, open; settle funnel}."

    assert found("B136", SALT, ACIDIFY, more, "Draw {funnel.aqueous -> A} into {A}.") == []


def test_solid_in_a_beaker_is_no_matter() -> None:
    beaker = ACIDIFY.replace("funnel", "A")

    assert found("B136", SALT, beaker, "{decant A into funnel}") == []


SOAP = """\
materials:
  soap: {0}
  ether: tert-butyl methyl ether
vessels:
  funnel: separatory funnel 125 mL
"""


@pytest.mark.parametrize(
    ("soap", "verb", "slow"),
    [
        ("0.050 M sodium dodecyl sulfate", "shake", True),
        ("0.050 M sodium dodecyl sulfate", "swirl", False),
        ("0.00001 M sodium dodecyl sulfate", "shake", False),
        ("0.050 M sodium acetate", "shake", False),
        ("0.050 M sodium benzoate", "shake", False),
        ("0.050 M sodium hydrogencarbonate", "shake", False),
    ],
)
def test_soap_that_is_shaken_is_found(soap: str, verb: str, slow: bool) -> None:
    charge = "Put {30 mL ether -> funnel} and {20 mL soap -> funnel} in."

    assert bool(found("B137", SOAP.format(soap), charge, f"{{{verb} funnel}}")) is slow


# ---------------------------------------------------------------- vessels used again


AGAIN = """\
materials:
  strong: 1.00 M hydrochloric acid
  weak: 0.100 M sodium hydroxide
  ether: tert-butyl methyl ether
  drier: anhydrous magnesium sulfate
  water: water
vessels:
  flask: {0}
  A: beaker 250 mL
  B: beaker 250 mL
"""
TWICE = (
    "Put {40 mL strong -> flask} in and pour {flask -> A} out.",
    "Put {40 mL weak -> flask} in and pour {flask -> B} out.",
)


@pytest.mark.parametrize(
    ("vessel", "matters"),
    [
        ("volumetric flask 100 mL", True),
        ("burette 50 mL", True),
        ("conical flask 100 mL, tared", True),
        ("conical flask 100 mL, oven-dried", True),
        ("conical flask 100 mL", False),
        ("beaker 100 mL", False),
    ],
)
def test_vessel_used_again_unrinsed_is_found_where_it_matters(vessel: str, matters: bool) -> None:
    assert bool(found("B138", AGAIN.format(vessel), *TWICE)) is matters


@pytest.mark.parametrize(
    "rinse", ["with 10 mL water into A", "with 10 mL water to aqueous-neutral"]
)
def test_rinsed_vessel_is_clean(rinse: str) -> None:
    first, second = TWICE
    front = AGAIN.format("volumetric flask 100 mL")

    assert found("B138", front, first, f"{{rinse flask {rinse}}}", second) == []


def test_same_liquid_again_needs_no_rinse() -> None:
    first, _ = TWICE

    assert found("B138", AGAIN.format("volumetric flask 100 mL"), first, first) == []


def test_fresh_pass_begins_with_clean_vessels() -> None:
    first, second = TWICE
    front = AGAIN.format("volumetric flask 100 mL")

    assert found("B138", front, first, "{again 1, 2 more times, fresh}") == []
    assert found("B138", front, f"{first} {second}", "{again 1, fresh}") != []


def test_dried_liquid_does_not_run_into_what_held_water() -> None:
    front = AGAIN.format("conical flask 100 mL")
    wet = "Put {20 mL water -> flask} in and pour {flask -> A} out."
    dry = "Put {20 mL ether -> B} in, {dry B with 1 g drier} and {decant B into flask}."

    assert found("B138", front, wet, dry) != []
    assert found("B138", front, dry) == []


# ---------------------------------------------------------------- products


ESTER = """\
materials:
  alcohol: 3-methylbutan-1-ol
  acid: acetic acid
  water: water
vessels:
  flask: round-bottom flask 50 mL
  vial: sample vial 20 mL
reactions:
  ester: {equation: "3-methylbutan-1-ol + acetic acid -> isopentyl acetate + water", limiting: alcohol}
"""
MAKE = "Put {5.0 mL alcohol -> flask} and {8.0 mL acid -> flask} in, {reflux flask, under condenser; react ester in flask}."


@pytest.mark.parametrize(
    ("end", "lost"),
    [
        ("{discard flask to non-halogenated-organic}", True),
        ("{discard flask to non-halogenated-organic} and {weigh vial}", True),
        ("{collect flask}", False),
        ("Pour {flask -> vial} over; {collect vial}.", False),
        ("{weigh flask}", False),
        ("Leave it.", False),
    ],
)
def test_product_that_nobody_takes_up_is_found(end: str, lost: bool) -> None:
    assert bool(found("B139", ESTER, MAKE, end)) is lost


def test_lost_product_points_to_where_it_formed() -> None:
    entry = judged(steps(MAKE, "{discard flask to non-halogenated-organic}"), ESTER)
    (finding,) = (f for f in entry.findings if f.code.number == "B139")

    assert "isopentyl acetate" in finding.message
    assert "react ester" in finding.related[0].span.text


# ---------------------------------------------------------------- too weak, and what would do

WASHING = """\
materials:
  mixture: {{contains: {{benzocaine: 1 g, biphenyl: 1 g}}, provided: 1.00 g}}
  ether: tert-butyl methyl ether
  acid: {acid} hydrochloric acid
vessels:
  funnel: separatory funnel 125 mL
  A: conical flask 100 mL
expect:
  - benzocaine in A after label(out) >= {share} %
"""
WASH = (
    "Dissolve {1.00 g mixture -> funnel} in {30 mL ether -> funnel}; {swirl funnel, open}.",
    "Add {15 mL acid -> funnel}, {shake funnel, stoppered; settle funnel}, draw {funnel.aqueous -> A}.{label out}",
)


@pytest.mark.parametrize(
    ("acid", "share", "advice", "mended_acid", "more"),
    [
        ("0.50 M", 60, "1.0 M would move", "1.0 M", ()),
        ("3.0 M", 95, "one portion more would move", "3.0 M", ("{again 2, 1 more time}",)),
        ("0.50 M", 95, "2.0 M, and one portion more, would", "2.0 M", ("{again 2, 1 more time}",)),
    ],
)
def test_strength_or_portions_that_would_do_are_told_and_do(
    acid: str, share: int, advice: str, mended_acid: str, more: tuple[str, ...]
) -> None:
    (said,) = found("X102", WASHING.format(acid=acid, share=share), *WASH)
    assert advice in said

    mended = judged(steps(*WASH, *more), WASHING.format(acid=mended_acid, share=share))
    assert [f.code.number for f in mended.findings if f.code.number[0] == "X"] == []


def test_what_no_acid_and_no_four_portions_mend_is_only_missed() -> None:
    front = WASHING.format(acid="0.50 M", share=95).replace("benzocaine in A", "biphenyl in A")

    assert found("X102", front, *WASH) == []
    assert len(found("X101", front, *WASH)) + len(found("B127", front, *WASH)) == 1


# ---------------------------------------------------------------- where it was decided

MIXED = """\
materials:
  acid: 1.0 M hydrochloric acid
  base: 1.0 M sodium hydroxide
vessels:
  A: beaker 100 mL
  burette: burette 50 mL
expect:
  - {0}
"""


@pytest.mark.parametrize(
    ("expectation", "act"),
    [
        ("ph of A after label(end) <= 1", "5 mL base -> A"),
        ("ph of A after label(first) >= 7", "20 mL acid -> A"),
        ("titre(end) >= 40 mL", "titrate A with base from burette to ph 7"),
    ],
)
def test_missed_expectation_points_to_the_act_that_decided(expectation: str, act: str) -> None:
    entry = judged(
        steps(
            "Put {20 mL acid -> A} in.{label first}",
            "Fill {burette} with {50 mL base -> burette}; {titrate A with base from burette to ph 7}.",
            "Add {5 mL base -> A}. {label end} Look at {A}.",
        ),
        MIXED.format(expectation),
    )
    (missed,) = (f for f in entry.findings if f.code.number == "X101")

    assert [r.span.text for r in missed.related] == [act]
    assert "decides it" in missed.related[0].message


# ---------------------------------------------------------------- fractions


FRACTIONS = """\
materials:
  blend: {contains: {ethyl-acetate: 1 mL, butyl-acetate: 1 mL}, provided: 30 mL}
vessels:
  still: round-bottom flask 50 mL
  early: conical flask 25 mL
  middle: conical flask 25 mL
  spare: conical flask 25 mL
"""


def test_flask_between_two_fractions_may_be_emptied_though_the_bench_puts_nothing_there() -> None:
    said = found(
        "B123",
        FRACTIONS,
        "Put {30 mL blend -> still} into {still}; {distil still into early at 76–80 °C}.",
        "{distil still into middle at 80–120 °C, leaving 1 mL}",
        "{discard middle to non-halogenated-organic} {discard spare to non-halogenated-organic}",
    )

    assert said == ["`spare` is empty here: nothing comes out of it"]


# ---------------------------------------------------------------- gases of declared reactions


GASES = """\
materials:
  acid: 2.0 M hydrochloric acid
  zinc: zinc
  peroxide: 3.0 % w/w hydrogen peroxide
vessels:
  A: conical flask 100 mL
reactions:
  hydrogen: "Zn + 2 H^+ -> Zn^2+ + H2"
  oxygen: "2 H2O2 -> 2 H2O + O2"
"""


@pytest.mark.parametrize(
    ("written", "volume"),
    [
        # 1.0 g of zinc (65.38 g/mol) gives 15.3 mmol of hydrogen: 374 mL at 25 °C.
        ("{1.0 g zinc -> A} {30 mL acid -> A} {react hydrogen in A}", "370 mL"),
        # 30 mL of 3.0 % w/w peroxide (1.01 g/mL) hold 26.7 mmol: half as much oxygen, 327 mL.
        ("{30 mL peroxide -> A} {react oxygen in A}", "330 mL"),
    ],
)
def test_hydrogen_and_oxygen_of_a_declared_reaction_are_gas(written: str, volume: str) -> None:
    closed = written.replace("} {react", "} {swirl A, stoppered} {react")

    (said,) = found("B122", GASES, closed + " {collect A}")
    assert volume in said
    assert found("B122", GASES, written + " {collect A}") == []


# ---------------------------------------------------------------- what comes in by pouring; the order of tests


STRONG = """\
materials:
  acid: 98 % w/w sulfuric acid
  weak: 1.0 M hydrochloric acid
  base: 1.0 M sodium hydroxide
  water: water
vessels:
  A: beaker 250 mL
  B: beaker 250 mL
"""


def test_water_poured_over_from_another_vessel_into_acid_is_found() -> None:
    said = found("B131", STRONG, "{20 mL acid -> A} {50 mL water -> B} {B -> A} {collect A}")

    assert said == ["water is poured into concentrated sulfuric acid in `A`"]


def test_acid_poured_over_into_water_is_in_order() -> None:
    assert not found("B131", STRONG, "{20 mL acid -> A} {50 mL water -> B} {A -> B} {collect B}")


@pytest.mark.parametrize(
    ("written", "wrong"),
    [
        ("{test A ph} {adjust A to pH 7 with base}", True),
        ("{adjust A to pH 7 with base} {test A ph}", False),
        ("{adjust A to pH 5 with base} {test A ph} {adjust A to pH 7 with base}", True),
    ],
)
def test_ph_is_tested_after_the_adjustment_and_not_before(written: str, *, wrong: bool) -> None:
    assert bool(found("X106", STRONG, "{20 mL weak -> A}", written + " {collect A}")) is wrong
