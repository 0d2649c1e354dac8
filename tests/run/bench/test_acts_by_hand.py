"""Each act on the bench, with sums that are done in the head: volumes, sinks, temperatures, names.

Densities and solubilities that a figure hangs on are the catalogue's and named where they count.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, TypeVar

import pytest

from bench_runner import knowledge, outcomes, ran
from run.bench.shelf import near
from watchglass.run.bench.layers import Layers
from watchglass.run.bench.ledger import Moved, NotAssessed, Reacted, Supposed, Taken, Warmed

if TYPE_CHECKING:
    from watchglass.run.bench.asked import Asked
    from watchglass.run.bench.state import Sink, Vessel

KNOWN = knowledge()
FRONT = """\
materials:
  water: water
  brine: 1.0 M sodium chloride
  ether: tert-butyl methyl ether
  heavy: dichloromethane
  spirit: ethanol
  toluene: toluene
  salt: sodium chloride
  silica: silica
  acid: 3.0 M hydrochloric acid
  alkali: 3.0 M sodium hydroxide
  benzoic: benzoic acid
  neutral: benzil
  sample: {contains: {benzoic-acid: 1 mol}, provided: 2.00 g}
  loose: {contains: {benzoic-acid: 1 mol}}
  alcohol: butan-1-ol
  vinegar: acetic acid, glacial
  acetate: butyl acetate
vessels:
  A: conical flask 250 mL
  B: conical flask 250 mL
  C1: conical flask 250 mL
  funnel: separatory funnel 250 mL
  flask: volumetric flask 100 mL
  burette: burette 50 mL
  paper: Hirsch funnel 60 mm
  filtrate: filter flask 125 mL
reactions:
  ester: {equation: butan-1-ol + CH3COOH -> butyl-acetate + H2O, conversion: 60 %}
  hydrolysis: butyl-acetate + water -> butan-1-ol + acetic-acid
"""
Kind = TypeVar("Kind")


def bench(*sentences: str) -> Asked:
    return ran(*sentences, front=FRONT)


def told(asked: Asked, kind: type[Kind]) -> list[Kind]:
    return [found for found in outcomes(asked, kind) if isinstance(found, kind)]


def vessel(asked: Asked, name: str) -> Vessel:
    return asked.ledger.end.vessel(name)


def sink(asked: Asked, name: str) -> Sink:
    return asked.ledger.end.sinks[name]


def grams(asked: Asked, name: str, key: str) -> float:
    """Give the mass of a substance that lies in a vessel as a solid, g."""
    molar_mass = KNOWN.thing(key).molar_mass
    assert molar_mass is not None
    return vessel(asked, name).solid.get(key, 0.0) * molar_mass * 1e3


# ---------------------------------------------------------------- what is taken


def test_portion_is_entered_as_mass_or_as_volume_as_it_was_measured() -> None:
    asked = bench("{10 mL water -> A} {2.0 g salt -> A}")

    assert told(asked, Taken) == [
        Taken("water", None, near(10e-6)),
        Taken("salt", near(2e-3), None),
    ]


def test_half_and_rest_make_up_what_is_provided() -> None:
    # 1.00 g into A, 0.25 g and what is left, 0.75 g, into B.
    asked = bench("{half sample -> A} {0.25 g sample -> B} {rest sample -> C1}")

    assert grams(asked, "A", "benzoic-acid") == near(1.00, rel=1e-4)
    assert grams(asked, "B", "benzoic-acid") == near(0.25, rel=1e-4)
    assert grams(asked, "C1", "benzoic-acid") == near(0.75, rel=1e-4)


def test_all_that_is_provided_is_two_grams() -> None:
    assert grams(bench("{all sample -> A}"), "A", "benzoic-acid") == near(2.0, rel=1e-4)


def test_all_of_what_nobody_knows_is_an_unknown_amount() -> None:
    asked = bench("{all loose -> A} {1.0 g salt -> A}")

    assert vessel(asked, "A").unknown == {"loose"}
    assert vessel(asked, "A").used
    assert grams(asked, "A", "sodium-chloride") == near(1.0, rel=1e-4)
    assert told(asked, Taken)[0] == Taken("loose", None, None, "how much is taken is not known")


def test_amount_for_each_gram_follows_what_was_taken() -> None:
    # 3 mL for each gram of 2.0 g.
    asked = bench("{2.0 g salt -> A} {3 mL water per g salt -> B}")

    assert vessel(asked, "B").volume == near(6e-6)


def test_amount_for_each_two_grams_is_half_of_that() -> None:
    asked = bench("{2.0 g salt -> A} {3 mL water per kg salt -> B}")

    assert vessel(asked, "B").volume == near(6e-9)


def test_burette_is_filled_to_its_mark_and_no_further() -> None:
    asked = bench("{60 mL brine -> burette}", "{10 mL brine -> burette}")

    assert vessel(asked, "burette").volume == near(50e-6)
    assert asked.ledger.charged["Na^+"] == near(0.050)


def test_flask_takes_more_than_its_mark() -> None:
    assert vessel(bench("{300 mL brine -> A}"), "A").volume == near(300e-6)


def test_what_is_charged_counts_the_parts_of_salts() -> None:
    # 5.844 g of sodium chloride are 0.1 mol.
    charged = bench("{5.844 g salt -> A}").ledger.charged

    assert charged["Na^+"] == near(0.1, rel=1e-4)
    assert charged["Cl^-"] == near(0.1, rel=1e-4)


def test_warm_portion_brings_its_temperature() -> None:
    # 10 mL at 80 °C and 30 mL at 20 °C: 35 °C; rooms are at 20 or 25.
    asked = bench("{10 mL water at 80 °C -> A}")

    assert vessel(asked, "A").temperature == near(353.15)


def test_portion_of_unknown_amount_hides_none_after_it() -> None:
    asked = bench("{all loose + 1.0 g salt -> A}")

    assert grams(asked, "A", "sodium-chloride") == near(1.0, rel=1e-4)


def test_unknown_amount_poured_to_a_known_ph_leaves_it_unknown() -> None:
    asked = bench("{20 mL acid -> A} {swirl A}", "{all loose -> A}")

    assert vessel(asked, "A").ph is None
    assert vessel(asked, "A").used


def test_vessel_that_held_only_an_unknown_amount_is_not_clean() -> None:
    assert vessel(bench("{all loose -> B}"), "B").used


@pytest.mark.parametrize(("high", "millilitres"), [(False, 2.0), (True, 6.0)])
def test_open_amount_is_run_at_one_end_or_the_other(high: bool, millilitres: float) -> None:
    asked = ran("{2–6 mL water -> A}", front=FRONT, high=high)

    assert vessel(asked, "A").volume == near(millilitres * 1e-6)


def test_portion_that_cannot_be_worked_out_is_entered_with_its_reason() -> None:
    (taken,) = told(bench("{5 mL benzoic -> A}"), Taken)

    assert taken == Taken("benzoic", None, near(5e-6), "the density of benzoic acid is not known")


# ---------------------------------------------------------------- filling


def test_flask_is_filled_to_its_mark() -> None:
    asked = bench("{30 mL brine -> flask} {fill flask with water}")

    assert vessel(asked, "flask").volume == near(100e-6, rel=1e-4)
    assert vessel(asked, "flask").aqueous.amounts["Na^+"] == near(0.030)


def test_vessel_is_filled_to_what_is_said_and_not_to_its_size() -> None:
    asked = bench("{30 mL brine -> A} {fill A with water to 50 mL}")

    assert vessel(asked, "A").volume == near(50e-6, rel=1e-4)


def test_vessel_that_is_full_already_takes_nothing() -> None:
    asked = bench("{60 mL brine -> A} {fill A with water to 50 mL}")

    assert vessel(asked, "A").volume == near(60e-6, rel=1e-4)


def test_filling_a_vessel_of_no_known_size_is_not_assessed() -> None:
    (found,) = told(bench("{fill paper with water}"), NotAssessed)

    assert found.why == "how much it takes to fill it is not known"


# ---------------------------------------------------------------- temperature


def test_heat_of_neutralising_warms_the_vessel_by_what_is_told() -> None:
    asked = bench("{50 mL acid -> A}", "{50 mL alkali -> A}")
    (warmed,) = told(asked, Warmed)
    room = asked.ledger.start.vessel("A").temperature

    # 0.150 mol x 57.1 kJ/mol = 8.57 kJ in some 108 g at 4.18 J/(g K): 19 K.
    assert warmed.rise == near(19.0, abs=0.5)
    assert vessel(asked, "A").temperature == near(room + warmed.rise)


def test_bath_takes_the_heat_up() -> None:
    asked = bench("{50 mL acid -> A} {cool A to 5 °C with ice}", "{50 mL alkali -> A}")

    assert [warmed.held for warmed in told(asked, Warmed)] == [True]
    assert vessel(asked, "A").temperature == near(278.15)


@pytest.mark.parametrize(
    ("act", "celsius"),
    [
        ("heat A to 60 °C", 60.0),
        ("cool A to 5 °C", 5.0),
        ("warm A to 40–50 °C", 45.0),
        ("cool A with ice", 0.0),
        ("cool A in ice", 0.0),
        ("boil A for 5 min", 100.0),
    ],
)
def test_temperature_is_what_the_act_says(act: str, celsius: float) -> None:
    asked = bench("{100 mL water -> A}", "{" + act + "}")

    assert vessel(asked, "A").temperature == near(celsius + 273.15)


def test_mixture_boils_at_the_lowest_of_what_makes_up_a_tenth() -> None:
    # tert-Butyl methyl ether boils at 55.2 °C, toluene at 110.6.
    mostly = bench("{5 mL ether -> A} {95 mL toluene -> A} {reflux A for 5 min}")
    partly = bench("{11 mL ether -> A} {89 mL toluene -> A} {reflux A for 5 min}")

    assert vessel(mostly, "A").temperature == near(383.75)
    assert vessel(partly, "A").temperature == near(328.35)


def test_bath_is_remembered_until_it_is_heated_again() -> None:
    cooled = bench("{100 mL water -> A} {cool A to 5 °C with ice}")
    again = bench("{100 mL water -> A} {cool A to 5 °C with ice} {cool A to 2 °C}")
    heated = bench("{100 mL water -> A} {cool A to 5 °C with ice} {heat A to 40 °C}")

    assert vessel(cooled, "A").bath == "ice"
    assert vessel(again, "A").bath == "ice"
    assert vessel(heated, "A").bath == ""


def test_next_period_finds_everything_at_room_temperature() -> None:
    asked = bench("{100 mL water -> A} {cool A to 5 °C with ice}", "{next period}")

    assert vessel(asked, "A").temperature == asked.ledger.start.vessel("A").temperature
    assert vessel(asked, "A").bath == ""


# ---------------------------------------------------------------- moving


@pytest.mark.parametrize(
    ("solvent", "part", "aqueous", "organic"),
    [
        ("ether", "lower", 20.0, 0.0),
        ("ether", "upper", 0.0, 30.0),
        ("heavy", "lower", 0.0, 30.0),
        ("heavy", "upper", 20.0, 0.0),
    ],
)
def test_layer_is_drawn_by_where_it_lies(
    solvent: str, part: str, aqueous: float, organic: float
) -> None:
    asked = bench(
        "{20 mL water -> funnel} {30 mL " + solvent + " -> funnel}", "{funnel." + part + " -> A}"
    )

    assert vessel(asked, "A").aqueous.volume == near(aqueous * 1e-6)
    assert vessel(asked, "A").organic.volume == near(organic * 1e-6)
    assert vessel(asked, "funnel").volume == near((50 - aqueous - organic) * 1e-6)


@pytest.mark.parametrize(
    ("drawn", "remains"), [("aqueous", "upper"), ("organic", "lower"), ("lower", "upper")]
)
def test_what_remains_is_known_by_where_it_lay(drawn: str, remains: str) -> None:
    asked = bench("{20 mL water -> funnel} {30 mL ether -> funnel}", "{funnel." + drawn + " -> A}")

    assert vessel(asked, "funnel").remains == remains


@pytest.mark.parametrize(("word", "moved"), [("upper", True), ("lower", False)])
def test_layer_that_was_left_alone_is_still_the_upper_one(word: str, *, moved: bool) -> None:
    asked = bench(
        "{20 mL water -> funnel} {30 mL ether -> funnel} {funnel.lower -> A}",
        "{funnel." + word + " -> B}",
    )

    assert bool(vessel(asked, "B").organic) is moved
    assert len(told(asked, NotAssessed)) == (0 if moved else 1)


def test_aqueous_layer_left_alone_is_the_lower_one() -> None:
    asked = bench(
        "{20 mL water -> funnel} {30 mL ether -> funnel} {funnel.upper -> A}",
        "{funnel.lower -> B}",
    )

    assert vessel(asked, "B").aqueous.volume == near(20e-6)


def test_layers_are_entered_where_a_part_is_drawn_and_not_where_all_is() -> None:
    part = bench("{20 mL water -> funnel} {30 mL ether -> funnel} {funnel.aqueous -> A}")
    whole = bench("{20 mL water -> funnel} {30 mL ether -> funnel} {funnel -> A}")

    assert [found.below for found in told(part, Layers)] == ["aqueous"]
    assert [r.vessel for r in part.ledger.entries[-1].results][:2] == ["funnel", "funnel"]
    assert told(whole, Layers) == []


def test_all_goes_from_vessel_to_vessel_and_is_entered() -> None:
    asked = bench("{20 mL water -> A} {1.0 g silica -> A}", "{A -> B}")

    assert vessel(asked, "A").empty
    assert vessel(asked, "B").volume == near(20e-6)
    assert grams(asked, "B", "silica") == near(1.0)
    assert told(asked, Moved) == [Moved("A", "B", "", near(20e-6))]


def test_nothing_that_is_moved_is_entered_as_nothing() -> None:
    (moved,) = told(bench("{A -> B}"), Moved)

    assert moved == Moved("A", "B", "", 0.0, nothing=True)


def test_solids_alone_are_something_that_is_moved() -> None:
    (moved,) = told(bench("{1.0 g silica -> A}", "{A -> B}"), Moved)

    assert not moved.nothing


def test_what_pours_through_something_leaves_its_solids_there() -> None:
    asked = bench("{20 mL water -> A} {1.0 g silica -> A}", "{A through cotton -> B}")

    assert vessel(asked, "B").solid == {}
    assert vessel(asked, "B").volume == near(20e-6)
    assert vessel(asked, "A").empty
    assert sink(asked, "filter").solids["silica"] == near(1.0 / 60.083, rel=1e-4)


# ---------------------------------------------------------------- aliquots


def test_aliquot_takes_its_share_of_what_is_dissolved() -> None:
    # 10 of 40 mL of 1.0 M: 10 mmol.
    asked = bench("{40 mL brine -> A}", "{10 mL from A -> B}")

    assert vessel(asked, "B").aqueous.amounts["Na^+"] == near(0.010)
    assert vessel(asked, "A").volume == near(30e-6)
    assert told(asked, Moved) == [Moved("A", "B", "", near(10e-6), whole=False)]


def test_aliquot_of_more_than_there_is_takes_all_and_says_what_is_short() -> None:
    asked = bench("{40 mL brine -> A}", "{50 mL from A -> B}")
    (moved,) = told(asked, Moved)

    assert vessel(asked, "A").empty
    assert moved.volume == near(40e-6)
    assert moved.short == near(10e-6)


def test_aliquot_of_a_layer_is_measured_by_that_layer() -> None:
    # 10 of 30 mL of ether; the 20 mL of water stay.
    asked = bench("{20 mL water -> A} {30 mL ether -> A}", "{10 mL from A.organic -> B}")

    assert vessel(asked, "B").organic.volume == near(10e-6)
    assert vessel(asked, "A").aqueous.volume == near(20e-6)
    assert vessel(asked, "A").organic.volume == near(20e-6)


def test_aliquot_out_of_an_empty_vessel_is_short_of_all() -> None:
    (moved,) = told(bench("{10 mL from A -> B}"), Moved)

    assert moved == Moved("A", "B", "", 0.0, near(10e-6), nothing=True)


def test_weighed_aliquot_is_of_the_solid() -> None:
    asked = bench("{2.0 g salt -> A}", "{0.50 g from A -> B}")

    assert grams(asked, "B", "sodium-chloride") == near(0.5)
    assert grams(asked, "A", "sodium-chloride") == near(1.5, rel=1e-4)


def test_weighed_aliquot_leaves_the_liquid_above_the_solid() -> None:
    asked = bench(WET, "{0.50 g from A -> B}")

    assert grams(asked, "B", "silica") == near(0.5)
    assert vessel(asked, "B").volume == 0.0
    assert vessel(asked, "A").volume == near(20e-6)


def test_weighed_aliquot_of_a_liquid_is_by_its_mass() -> None:
    # 40 mL of ethanol at 0.7903 g/mL are 31.61 g; 7.903 g are 10 mL.
    asked = bench("{40 mL spirit -> A}", "{7.903 g from A -> B}")

    assert vessel(asked, "B").volume == near(10e-6, rel=1e-4)


# ---------------------------------------------------------------- filtering


WET = "{20 mL water -> A} {1.0 g silica -> A}"


def test_filter_keeps_the_solid_on_its_paper_and_lets_the_liquid_through() -> None:
    asked = bench(WET, "{cool A to 5 °C}", "{filter A on paper into filtrate}")

    assert vessel(asked, "A").empty
    assert grams(asked, "paper", "silica") == near(1.0)
    assert vessel(asked, "paper").temperature == near(278.15)
    assert vessel(asked, "paper").used
    assert vessel(asked, "filtrate").volume == near(20e-6)
    assert vessel(asked, "filtrate").solid == {}
    assert told(asked, Moved) == [Moved("A", "filtrate", "liquid", near(20e-6))]


def test_washing_on_the_paper_runs_on_into_the_flask_below() -> None:
    asked = bench(WET, "{filter A on paper into filtrate}", "{5 mL water -> paper}")

    assert vessel(asked, "paper").volume == 0.0
    assert grams(asked, "paper", "silica") == near(1.0)
    assert vessel(asked, "filtrate").volume == near(25e-6)


def test_solid_held_back_by_cotton_is_not_kept() -> None:
    asked = bench(WET, "{filter A through cotton into B}")

    assert sink(asked, "cotton").solids["silica"] == near(1.0 / 60.083, rel=1e-4)
    assert vessel(asked, "B").volume == near(20e-6)


def test_solid_that_nothing_is_said_of_goes_with_the_filter() -> None:
    asked = bench(WET, "{filter A into B}")

    assert sink(asked, "filter").solids["silica"] == near(1.0 / 60.083, rel=1e-4)


def test_decanting_leaves_the_solid_behind() -> None:
    asked = bench(WET, "{decant A into B}")

    assert grams(asked, "A", "silica") == near(1.0)
    assert vessel(asked, "A").volume == 0.0
    assert vessel(asked, "B").volume == near(20e-6)
    assert told(asked, Moved) == [Moved("A", "B", "liquid", near(20e-6))]


def test_collecting_takes_the_solid() -> None:
    asked = bench(WET, "{collect A into B}")

    assert grams(asked, "B", "silica") == near(1.0)
    assert vessel(asked, "A").volume == near(20e-6)


def test_collecting_takes_the_liquid_where_there_is_no_solid() -> None:
    asked = bench("{20 mL water -> A}", "{collect A into B}")

    assert vessel(asked, "B").volume == near(20e-6)


# ---------------------------------------------------------------- stills


def test_solvent_taken_off_goes_into_the_air() -> None:
    asked = bench("{20 mL ether -> A}", "{evaporate A at 40 °C}")

    assert vessel(asked, "A").empty
    assert sink(asked, "air").volume == near(20e-6)
    assert told(asked, Moved) == [Moved("A", "air", "", near(20e-6), whole=False)]


def test_solvent_taken_off_may_leave_a_volume() -> None:
    asked = bench("{20 mL ether -> A}", "{evaporate A at 40 °C, leaving 5 mL}")

    assert vessel(asked, "A").volume == near(5e-6)


def test_solvent_taken_off_to_a_volume_leaves_it() -> None:
    asked = bench("{20 mL ether -> A}", "{evaporate A to 5 mL}")

    assert vessel(asked, "A").volume == near(5e-6)
    assert sink(asked, "air").volume == near(15e-6)


def test_distillate_is_caught_and_what_boils_lower_is_the_forerun() -> None:
    # tert-Butyl methyl ether boils at 55, toluene at 111 °C.
    asked = bench(
        "{20 mL ether -> A} {30 mL toluene -> A}", "{distil A into B at 105–115 °C, leaving 2 mL}"
    )

    assert sink(asked, "forerun").volume == near(20e-6)
    assert vessel(asked, "B").volume == near(28e-6)
    assert vessel(asked, "A").volume == near(2e-6)
    assert told(asked, Moved) == [Moved("A", "B", "", near(28e-6), whole=False)]


def test_distillation_up_to_a_temperature_begins_at_the_start() -> None:
    asked = bench("{20 mL ether -> A} {30 mL toluene -> A}", "{distil A into B to 80 °C}")

    assert vessel(asked, "B").volume == near(20e-6)
    assert vessel(asked, "A").volume == near(30e-6)
    assert "forerun" not in asked.ledger.end.sinks


def test_distillation_without_a_temperature_is_not_assessed() -> None:
    asked = bench("{20 mL ether -> A}", "{distil A into B}")

    assert vessel(asked, "A").volume == near(20e-6)
    assert [found.why for found in told(asked, NotAssessed)] == [
        "no temperature is given for what goes over"
    ]


# ---------------------------------------------------------------- rinsing and letting go


def test_rinsing_takes_along_what_was_left() -> None:
    asked = bench("{1.0 g benzoic -> A}", "{rinse A with 5 mL ether into B}")

    assert vessel(asked, "A").empty
    assert vessel(asked, "B").volume == near(5e-6)
    assert grams(asked, "B", "benzoic-acid") == near(1.0, rel=1e-4)


def test_rinsings_without_an_aim_are_let_go() -> None:
    asked = bench("{rinse A with 5 mL ether}")

    assert vessel(asked, "A").empty
    assert sink(asked, "rinsings").volume == near(5e-6)


TWO = "{20 mL water -> funnel} {30 mL ether -> funnel}"


def test_discarded_layer_goes_to_its_stream_and_the_other_stays() -> None:
    asked = bench(TWO, "{discard funnel.aqueous to aqueous-neutral}")

    assert sink(asked, "aqueous-neutral").volume == near(20e-6)
    assert vessel(asked, "funnel").organic.volume == near(30e-6)
    assert vessel(asked, "funnel").remains == "upper"
    assert told(asked, Moved) == [Moved("funnel", "aqueous-neutral", "aqueous", near(20e-6))]
    assert len(told(asked, Layers)) == 1


def test_layer_discarded_into_a_vessel_is_poured_there() -> None:
    asked = bench(TWO, "{discard funnel.aqueous into B}")

    assert vessel(asked, "B").aqueous.volume == near(20e-6)
    assert vessel(asked, "B").organic.volume == 0.0
    assert vessel(asked, "funnel").organic.volume == near(30e-6)


def test_upper_layer_discarded_leaves_the_lower() -> None:
    asked = bench(TWO, "{discard funnel.upper to organic}")

    assert sink(asked, "organic").liquids.keys() == {"tert-butyl-methyl-ether"}
    assert vessel(asked, "funnel").remains == "lower"


def test_what_is_discarded_without_a_stream_is_waste() -> None:
    asked = bench("{1.0 g silica -> A}", "{discard A}")

    assert sink(asked, "waste").solids["silica"] == near(1.0 / 60.083, rel=1e-4)
    assert vessel(asked, "A").empty
    assert not told(asked, Moved)[0].nothing


def test_layer_that_cannot_be_told_is_not_discarded() -> None:
    asked = bench("{20 mL water -> A}", "{discard A.upper to organic}")

    assert vessel(asked, "A").volume == near(20e-6)
    assert [found.why for found in told(asked, NotAssessed)] == [
        "which layer lies below cannot be told"
    ]


# ---------------------------------------------------------------- reactions


def test_reaction_runs_to_its_conversion_on_what_limits() -> None:
    # 8.09 g (10 mL at 0.809) of butan-1-ol, 74.123 g/mol: 0.1091 mol, less than the acid's; 60 %.
    asked = bench("{10 mL alcohol -> A} {20 mL vinegar -> A}", "{react ester in A}")
    (ran_,) = told(asked, Reacted)

    assert ran_.reaction == "ester"
    assert ran_.limiting == "butan-1-ol"
    assert ran_.extent == near(0.6 * 8.09 / 74.123, rel=1e-4)
    assert asked.ledger.formed["butyl-acetate"] == near(8.09 / 74.123, rel=1e-4)
    assert asked.share("butyl-acetate", "A", asked.ledger.end).value == near(0.6)
    assert asked.share("butan-1-ol", "A", asked.ledger.end).value == near(0.4)


def test_acid_limits_where_there_is_less_of_it() -> None:
    # 3 mL of 1.0474 g/mL and 60.052 g/mol: 52.3 mmol.
    asked = bench("{10 mL alcohol -> A} {3 mL vinegar -> A}", "{react ester in A}")
    (ran_,) = told(asked, Reacted)

    assert ran_.limiting == "acetic-acid"
    assert ran_.extent == near(0.6 * 3.1422 / 60.052, rel=1e-4)


def test_conversion_may_be_said_where_the_reaction_runs() -> None:
    asked = bench("{10 mL alcohol -> A} {20 mL vinegar -> A}", "{react ester in A to 10 %}")

    assert asked.share("butyl-acetate", "A", asked.ledger.end).value == near(0.1)


def test_yields_of_two_runs_add() -> None:
    asked = bench(
        "{10 mL alcohol -> A} {20 mL vinegar -> A} {react ester in A}",
        "{10 mL alcohol -> B} {20 mL vinegar -> B} {react ester in B}",
    )

    assert asked.ledger.formed["butyl-acetate"] == near(2 * 8.09 / 74.123, rel=1e-4)


def test_reaction_without_its_reactant_does_not_run() -> None:
    (ran_,) = told(bench("{10 mL alcohol -> A}", "{react ester in A}"), Reacted)

    assert ran_ == Reacted("ester", 0.0, "acetic-acid", "there is no acetic acid in it")


def test_water_that_reacts_is_gone_from_the_water_with_its_volume() -> None:
    # 5 mL of butyl acetate are 4.4045 g, 37.92 mmol: 0.684 mL of water and all 5 mL of ester go,
    # 3.474 mL of butanol and 2.174 mL of acetic acid come.
    asked = bench("{20 mL water -> A} {5 mL acetate -> A} {react hydrolysis in A}")
    held = vessel(asked, "A")
    water = held.aqueous.amounts["water"] + held.organic.amounts.get("water", 0.0)

    assert water == near(20 * 0.9982 / 18.015 - 0.03792, rel=1e-4)
    assert held.volume == near(24.964e-6, rel=1e-4)


def test_liquids_that_form_and_go_change_the_volume_by_their_own() -> None:
    # 0.06549 mol: gone 91.62 + 57.33 mL/mol, come 131.86 + 18.05 mL/mol: 0.063 mL more in 30.
    asked = bench("{10 mL alcohol -> A} {20 mL vinegar -> A}", "{react ester in A}")

    assert vessel(asked, "A").volume == near(30.063e-6, rel=2e-4)


# ---------------------------------------------------------------- what the author states

SUPPOSED = (
    "{10 mL water -> funnel} {10 mL ether -> funnel} {1.0 g benzoic -> funnel} {shake funnel}"
)


def suppose(share: str, outcome: str) -> Asked:
    return bench(
        SUPPOSED, "{suppose " + share + " benzoic-acid in funnel is " + outcome + ": mean}"
    )


def moles(asked: Asked, where: str) -> float:
    held = vessel(asked, "funnel")
    if where == "solid":
        return held.solid.get("benzoic-acid", 0.0) * 122.123
    layer = held.aqueous if where == "aqueous" else held.organic
    return layer.amounts.get("benzoic-acid", 0.0) * 122.123


def test_share_supposed_solid_is_solid_and_the_rest_in_the_ether() -> None:
    asked = suppose("80 %", "solid")

    assert moles(asked, "solid") == near(0.8, rel=1e-4)
    assert moles(asked, "organic") == near(0.2, rel=1e-4)
    assert moles(asked, "aqueous") == 0.0


def test_share_supposed_dissolved_is_in_the_ether_and_the_rest_solid() -> None:
    asked = suppose("80 %", "dissolved")

    assert moles(asked, "organic") == near(0.8, rel=1e-4)
    assert moles(asked, "solid") == near(0.2, rel=1e-4)


def test_share_supposed_in_one_layer_leaves_the_rest_in_the_other() -> None:
    wet, dry = suppose("80 %", "aqueous"), suppose("80 %", "organic")

    assert (moles(wet, "aqueous"), moles(wet, "organic")) == near((0.8, 0.2), rel=1e-4)
    assert (moles(dry, "aqueous"), moles(dry, "organic")) == near((0.2, 0.8), rel=1e-4)


def test_share_supposed_gone_has_left_the_bench() -> None:
    asked = suppose("80 %", "gone")

    assert moles(asked, "organic") == near(0.2, rel=1e-4)
    assert sink(asked, "supposed").liquids["benzoic-acid"] * 122.123 == near(0.8, rel=1e-4)
    assert sink(asked, "supposed").volume == 0.0


def test_what_is_supposed_is_known_where_the_model_could_not_tell() -> None:
    asked = bench(SUPPOSED)
    assert vessel(asked, "funnel").mixed

    after = suppose("80 %", "solid")

    assert vessel(after, "funnel").doubt == frozenset()
    assert vessel(after, "funnel").mixed is True


def test_what_is_supposed_is_entered_with_its_reason() -> None:
    assert told(suppose("80 %", "solid"), Supposed) == [
        Supposed("benzoic-acid", near(0.8), "solid", "mean")
    ]


def test_only_a_share_can_be_supposed() -> None:
    asked = bench(SUPPOSED, "{suppose 0.5 g benzoic-acid in funnel is solid: mean}")
    (stated,) = told(asked, Supposed)

    assert (stated.share, stated.why) == (None, "only a share can be supposed")
    assert moles(asked, "solid") == 0.0


def test_nothing_can_be_supposed_of_what_is_not_there() -> None:
    asked = bench("{10 mL water -> A}", "{suppose 80 % benzoic-acid in A is solid: mean}")
    (stated,) = told(asked, Supposed)

    assert stated.why == "there is no benzoic acid in it"


def test_material_may_be_supposed_by_its_local_name() -> None:
    asked = bench(
        "{1.0 g benzoic -> A} {10 mL ether -> A}", "{suppose 50 % benzoic in A is solid: m}"
    )

    assert grams(asked, "A", "benzoic-acid") == near(0.5, rel=1e-4)


# ---------------------------------------------------------------- layers that part


def test_layers_have_parted_once_they_are_left_to_settle() -> None:
    shaken = bench("{20 mL water -> A} {20 mL ether -> A} {shake A}")
    settled = bench("{20 mL water -> A} {20 mL ether -> A} {shake A} {settle A}")

    assert vessel(shaken, "A").settled is False
    assert vessel(settled, "A").settled is True
    assert [found.below for found in told(settled, Layers)] == ["aqueous"]


# ---------------------------------------------------------------- of which vessel


@pytest.mark.parametrize(
    "act",
    [
        "{A -> B}",
        "{A.upper -> B}",
        "{10 mL from A -> B}",
        "{10 mL from A.upper -> B}",
        "{evaporate A at 40 °C}",
        "{distil A into B to 80 °C}",
        "{distil A into B}",
        "{filter A into B}",
        "{discard A.upper to organic}",
        "{discard A}",
    ],
)
def test_first_thing_that_is_said_of_an_act_is_of_its_vessel(act: str) -> None:
    entry = bench("{20 mL ether -> A}", act).ledger.entries[-1]

    assert entry.results
    assert entry.results[0].vessel == "A"


def test_liquid_that_stays_for_want_of_a_boiling_point_is_said_of_its_vessel() -> None:
    files = {
        "substances/mine.yml": "mine:\n  names: [mine]\n  formula: C6H6\n  state: liquid\n"
        "  density: 0.9 g/mL\n"
    }
    front = "materials: {x: mine}\nvessels: {A: beaker 50 mL}"
    entry = ran(
        "{20 mL x -> A}", "{evaporate A at 40 °C}", front=front, files=files
    ).ledger.entries[-1]

    assert [(r.vessel, type(r.outcome)) for r in entry.results] == [
        ("A", NotAssessed),
        ("A", Moved),
    ]


def test_testing_the_ph_mixes_what_was_not_mixed() -> None:
    asked = bench("{20 mL acid -> A} {20 mL ether -> A}", "{test A ph}")

    assert vessel(asked, "A").mixed
    assert vessel(asked, "A").ph is not None


# ---------------------------------------------------------------- closures and places


def test_closure_lasts_until_it_is_changed() -> None:
    asked = bench("{10 mL water -> A} {swirl A, stoppered} {settle A}")
    again = bench("{10 mL water -> A} {swirl A, stoppered} {swirl A, open}")

    assert vessel(asked, "A").closure == "stoppered"
    assert vessel(again, "A").closure == "open"


def test_hood_is_where_the_vessel_stays() -> None:
    asked = bench("{10 mL water -> A} {swirl A, in hood} {settle A}")

    assert vessel(asked, "A").place == "hood"
    assert vessel(bench("{10 mL water -> A} {swirl A}"), "A").place == "bench"
    assert vessel(asked, "A").closure == "open"


# ---------------------------------------------------------------- passes


def test_fresh_pass_begins_with_clean_vessels_and_sets_the_old_contents_aside() -> None:
    asked = bench("{10 mL water -> A} {1.0 g silica -> B}", "{again 1, fresh}")

    assert vessel(asked, "A").volume == near(10e-6)
    assert grams(asked, "B", "silica") == near(1.0)
    assert sink(asked, "set aside").volume == near(10e-6)
    assert sink(asked, "set aside").solids["silica"] == near(1.0 / 60.083, rel=1e-4)


def test_pass_that_is_not_fresh_goes_on_in_the_same_vessels() -> None:
    asked = bench("{10 mL water -> A}", "{again 1}")

    assert vessel(asked, "A").volume == near(20e-6)
    assert asked.ledger.end.sinks == {}


def test_burette_is_not_emptied_for_a_fresh_pass() -> None:
    asked = bench("{30 mL brine -> burette}", "{10 mL water -> A}", "{again 2, fresh}")

    assert vessel(asked, "burette").volume == near(30e-6)


def test_clean_vessel_keeps_its_size_and_stands_at_room_temperature() -> None:
    asked = bench("{10 mL water -> A} {heat A to 60 °C}", "{10 mL water -> B}", "{again 2, fresh}")

    assert vessel(asked, "A") == asked.ledger.start.vessel("A")


def test_names_are_exchanged_for_a_pass() -> None:
    asked = bench("{10 mL water -> A}", "{again 1 with B as A}")

    assert vessel(asked, "A").volume == near(10e-6)
    assert vessel(asked, "B").volume == near(10e-6)


STATED = (
    "{0.50 g neutral -> A} {20 mL spirit -> A}",
    "{swirl A, open} {suppose 80 % benzil in A is solid: by trial}",
)


def test_solid_that_is_stated_stays_solid_in_the_cold_and_on_the_paper() -> None:
    asked = bench(
        *STATED,
        "{chill A to 5 °C with ice} {filter A on paper into filtrate}",
        "{5 mL spirit -> paper}",
    )

    whole = 0.50e-3 / 0.210232  # mol; molar mass of benzil 210.232 g/mol
    assert vessel(asked, "paper").solid["benzil"] == near(0.8 * whole)
    assert vessel(asked, "filtrate").organic.amounts["benzil"] == near(0.2 * whole)


@pytest.mark.parametrize(
    "act", ["{heat A to 60 °C}", "{10 mL spirit -> A} {swirl A, open}", "{dissolve A}"]
)
def test_solid_that_is_stated_goes_when_heated_or_in_more_liquid(act: str) -> None:
    asked = bench(*STATED, act)

    assert not vessel(asked, "A").solid


def test_solid_that_is_stated_stays_one_when_it_is_poured_over() -> None:
    asked = bench(*STATED, "{A -> B} {swirl B, open}")

    assert vessel(asked, "B").solid["benzil"] == near(0.8 * 0.50e-3 / 0.210232)


def test_layer_that_is_not_poured_through_a_filter_stays() -> None:
    asked = bench(
        "{20 mL water -> funnel} {20 mL ether -> funnel} {shake funnel; settle funnel}",
        "{funnel.organic through cotton -> A}",
    )

    assert vessel(asked, "A").volume == near(20e-6)
    assert vessel(asked, "funnel").volume == near(20e-6)


def test_salt_gone_dry_is_not_adjusted() -> None:
    asked = bench("{20 mL brine -> A} {evaporate A}", "{adjust A to pH 3 with acid}")

    assert vessel(asked, "A").volume == 0


def test_what_warms_itself_by_dissolving_is_mixed_anew() -> None:
    # Sodium chloride takes next to no heat; benzoic acid dissolves at the temperature there is.
    once = bench("{50 mL water -> A} {1.0 g benzoic -> A} {stir A}")
    twice = bench("{50 mL water -> A} {1.0 g benzoic -> A} {stir A}", "{stir A}")

    assert vessel(twice, "A").solid["benzoic-acid"] == near(vessel(once, "A").solid["benzoic-acid"])
