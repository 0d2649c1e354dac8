"""The grammar of marks: every form of the notation, read into just these nodes."""

from __future__ import annotations

import pytest

from read.mark_shapes import shape
from watchglass.read.words import CLOSURES, PARTS, SETTINGS, VERBS

# fmt: off
AMOUNTS_READ = [
    ("15 min", "quantity 15 min"),
    ("65 °C", "quantity 65 °C"),
    ("0.1 mg", "quantity 0.1 mg"),
    ("ca. 5 mL", "quantity ca. 5 mL"),
    ("2–3 mL", "quantity 2–3 mL"),
    ("0.900 g mixture", "stated [0.900 g of mixture]"),
    ("half mixture", "stated [half of mixture]"),
    ("all of mixture", "stated [all of mixture]"),
    ("15 mL acid -> funnel", "charge [15 mL of acid] to funnel"),
    ("15 mL of acid -> funnel", "charge [15 mL of acid] to funnel"),
    ("15 mL acid by cylinder -> funnel", "charge [15 mL of acid] to funnel {by cylinder}"),
    ("15 mL acid -> funnel by cylinder", "charge [15 mL of acid] to funnel {by cylinder}"),
    ("15 mL acid → funnel", "charge [15 mL of acid] to funnel"),
    ("10 mL propan-2-ol -> A", "charge [10 mL of propan-2-ol] to A"),
    ("10 mL 2-propanol -> A", "charge [10 mL of 2-propanol] to A"),
    ('10 mL "iron(III) chloride" -> A', 'charge [10 mL of "iron(III) chloride"] to A'),
    ("2 drops indicator -> flask", "charge [2 drops of indicator] to flask"),
    ("1 indicator -> flask", "charge [1 of indicator] to flask"),
    ("15 mL acid + 10 mL water -> A", "charge [15 mL of acid, 10 mL of water] to A"),
    ("all mixture + rest water + half base -> A", "charge [all of mixture, rest of water, half of base] to A"),
    ("12 mL ethanol per g crude -> A", "charge [12 mL of ethanol per g crude] to A"),
    ("1.2 mol base per mol amine -> A", "charge [1.2 mol of base per mol amine] to A"),
    ('2–6 mL ethanol -> flask, until "clear"', "charge [2–6 mL of ethanol] to flask {until <clear>}"),
    ('2–6 mL ethanol -> flask until "clear"', "charge [2–6 mL of ethanol] to flask {until <clear>}"),
    ("5 mL acid -> flask, stoppered, in hood", "charge [5 mL of acid] to flask {closure <stoppered>; setting <in hood>}"),
    ("10 mL from A -> B", "aliquot 10 mL of A to B"),
    ("10 mL from A.aqueous by pipette -> B over 5 min", "aliquot 10 mL of A.aqueous to B {by pipette; over (5 min)}"),
    ('12 mL ethanol per mmol "iron(III) chloride" -> A', 'charge [12 mL of ethanol per mmol "iron(III) chloride"] to A'),
    ("15 mL acid, open, by cylinder -> A", "charge [15 mL of acid] to A {closure <open>; by cylinder}"),
    ("15 mL acid by cylinder -> A, open, on steam", "charge [15 mL of acid] to A {by cylinder; closure <open>; setting <on steam>}"),
    ("all mixture -> weighed", "charge [all of mixture] to weighed"),
    ("5 mL acid -> A , under  drying  tube", "charge [5 mL of acid] to A {closure <under drying tube>}"),
    ("10 mL from A by pipette -> B.lower", "aliquot 10 mL of A to B.lower {by pipette}"),
]
PLACES_READ = [
    ("funnel", "name funnel"),
    ("acid", "name acid"),
    ("A.aqueous", "name A.aqueous"),
    ("tube-1.lower", "name tube-1.lower"),
    ("9-fluorenone", "name 9-fluorenone"),
    ('"iron(III) chloride"', 'name "iron(III) chloride"'),
    ("A -> B", "transfer A to B"),
    ("A.organic -> B through paper", "transfer A.organic to B {through paper}"),
    ("funnel.lower -> A, open", "transfer funnel.lower to A {closure <open>}"),
]
VERBS_READ = [
    ("stir A", "verb stir A"),
    ("stir A for 5 min", "verb stir A {for (5 min)}"),
    ("stir A for 5 min at 300 rpm with bar, open", "verb stir A {for (5 min); at (300 rpm); with bar; closure <open>}"),
    ("shake funnel, stoppered, for 1 min", "verb shake funnel {closure <stoppered>; for (1 min)}"),
    ("heat A to 65 °C over 10 min in water-bath", "verb heat A {to (65 °C); over (10 min); in water-bath}"),
    ("heat A by 20 K", "verb heat A {by (20 K)}"),
    ("reflux A for 60 min, under condenser, on hot plate", "verb reflux A {for (60 min); closure <under condenser>; setting <on hot plate>}"),
    ("cool A to -10 °C with ice-salt", "verb cool A {to (-10 °C); with ice-salt}"),
    ("chill A in ice", "verb chill A {in ice}"),
    ("react ester in flask", "verb react ester {in flask}"),
    ("react ester in flask to 5 %", "verb react ester {in flask; to (5 %)}"),
    ("adjust A to pH 10 with alkali", "verb adjust A {to pH(10); with alkali}"),
    ("adjust A to pH 4–5 with 5 mL alkali over 10 min", "verb adjust A {to pH(4–5); with [5 mL of alkali]; over (10 min)}"),
    ("adjust A to methyl-orange with alkali", "verb adjust A {to methyl-orange; with alkali}"),
    ("titrate flask with titrant from burette to phenolphthalein", "verb titrate flask {with titrant; from burette; to phenolphthalein}"),
    ("titrate flask with titrant as redox giving 23.5 mL", "verb titrate flask {with titrant; as redox; giving (23.5 mL)}"),
    ("fill flask to mark with water", "verb fill flask {to mark; with water}"),
    ("dry A with 2 g drier for 10 min", "verb dry A {with [2 g of drier]; for (10 min)}"),
    ("filter A on paper into filtrate", "verb filter A {on paper; into filtrate}"),
    ("decant A into B", "verb decant A {into B}"),
    ("evaporate A at 40 °C", "verb evaporate A {at (40 °C)}"),
    ("evaporate A leaving 2 mL", "verb evaporate A {leaving (2 mL)}"),
    ("distil pot into one at 79–84 °C, leaving 2 mL", "verb distil pot {into one; at (79–84 °C); leaving (2 mL)}"),
    ("distil pot into one below 100 °C", "verb distil pot {into one; below (100 °C)}"),
    ("collect crystals on paper", "verb collect crystals {on paper}"),
    ("weigh A", "verb weigh A"),
    ("rinse flask with 10 mL water into funnel", "verb rinse flask {with [10 mL of water]; into funnel}"),
    ("discard funnel.aqueous to aqueous-acid", "verb discard funnel.aqueous {to aqueous-acid}"),
    ("vent funnel", "verb vent funnel"),
    ("test A ph", "verb test A for:ph"),
    ("test ether peroxides", "verb test ether for:peroxides"),
    ("test A ph with paper", "verb test A for:ph {with paper}"),
    ("take 25 min", "verb take (25 min)"),
    ("take for 25 min", "verb take (25 min)"),
    ("wait 5 min", "verb wait (5 min)"),
    ("suppose 80 % acetanilide in clear is solid: mean of last year", "verb suppose [80 % of acetanilide] {in clear; is <solid>; because <mean of last year>}"),
    ("suppose 1.2 g salt in A is lost: told so", "verb suppose [1.2 g of salt] {in A; is <lost>; because <told so>}"),
    ("next period", "verb next period"),
    ("stir A.upper for 5 min", "verb stir A.upper {for (5 min)}"),
    ("filter A through cotton into still", "verb filter A {through cotton; into still}"),
    ("filter A with water on paper into flask", "verb filter A {with water; on paper; into flask}"),
    ('heat A below 60 °C until "it melts; then stop"', "verb heat A {below (60 °C); until <it melts; then stop>}"),
    ("decant A through cotton into B", "verb decant A {through cotton; into B}"),
    ("discard A to aqueous-acid, in hood", "verb discard A {to aqueous-acid; setting <in hood>}"),
    ("fill flask to 100 mL with 5 mL water", "verb fill flask {to (100 mL); with [5 mL of water]}"),
    ("adjust A to ph 10 with alkali", "verb adjust A {to pH(10); with alkali}"),
    ("evaporate A to 5 mL on steam-bath", "verb evaporate A {to (5 mL); on steam-bath}"),
    ("distil pot into one over 30 min, with flame", "verb distil pot {into one; over (30 min); setting <with flame>}"),
    ("weigh A on balance to 0.5 g", "verb weigh A {on balance; to (0.5 g)}"),
    ("test A with litmus", "verb test A {with litmus}"),
]
AGAIN_READ = [
    ("again 3", "again 3 x1"),
    ("again 3–4", "again 3..4 x1"),
    ("again 3-4", "again 3..4 x1"),
    ("again 3, 5", "again 3, 5 x1"),
    ("again 3–4, 2 more times", "again 3..4 x2"),
    ("again 3–4, 2 more times, at most 4", "again 3..4 x2 at most 4"),
    ("again 1–4, 2 more times, fresh", "again 1..4 x2 fresh"),
    ("again 2 with tube-2 as tube-1", "again 2 x1 tube-2/tube-1"),
    ("again 2 with tube-2, tube-3 as tube-1", "again 2 x1 tube-2/tube-1 tube-3/tube-1"),
    ("again 2, with tube-2 as tube-1", "again 2 x1 tube-2/tube-1"),
    ("again washing", "again washing x1"),
    ("label end", "label end"),
    ("step washing", "step washing"),
    ("again 3–4, washing, 2 more times, at most 4, fresh with A as B", "again 3..4, washing x2 at most 4 fresh A/B"),
    ("again 3 – 4 , 1 more time", "again 3..4 x1"),
]
FIGURES_READ = [
    ("= 5 g", "value 5 g"),
    ("= mass(standard) in mg", "value mass(standard) in mg"),
    ("= 5 g / 2 mL in g/mL", "value (5 g / 2 mL) in g/mL"),
    ("= moles(2.00 g benzoic-acid) in mmol", "value moles(amount(2.00 g, benzoic-acid)) in mmol"),
    ('= molar-mass("iron(III) chloride")', "value molar-mass(<iron(III) chloride>)"),
    ("= balance(C2H6 + O2 -> CO2 + H2O)", "value balance(<C2H6 + O2 -> CO2 + H2O>)"),
    ("? mass of product", "record <mass of product>"),
    ("? mass of product in g", "record <mass of product> in g"),
    ("? m: mass of product in g = mass(standard)", "record m: <mass of product> in g = mass(standard)"),
    ("? rf: Rf of caffeine = spot / front", "record rf: <Rf of caffeine> = (spot / front)"),
    ("? rf: Rf in 1 = spot / front", "record rf: <Rf> in 1 = (spot / front)"),
    ("? colour in the flask", "record <colour in the flask>"),
    ('? colour = "pale yellow"', "record <colour> = <pale yellow>"),
    ('? "what: you see" in °C', "record <what: you see> in °C"),
    ("? temperature in °C", "record <temperature> in °C"),
    ("? y in % = 5 g / 6 g", "record <y> in % = (5 g / 6 g)"),
    ("? volume = 5 mL in mL", "record <volume> in mL = 5 mL"),
    ('? "a; b"', "record <a; b>"),
    ("= 100 * (5.0 g - 2 g) / 2 g", "value ((100 * (5.0 g - 2 g)) / 2 g)"),
    ("? r: range in °C = melts(benzoic-acid)", "record r: <range> in °C = melts(benzoic-acid)"),
    ("? colour of the tube, in words", "record <colour of the tube, in words>"),
    ("? m-1: mass in mL/g", "record m-1: <mass> in mL/g"),
]
SEVERAL_READ = [
    ("stir A; vent A; A -> B", "verb stir A; verb vent A; transfer A to B"),
]
# fmt: on


@pytest.mark.parametrize(("mark", "nodes"), AMOUNTS_READ)
def test_amount_is_stated_charged_or_taken_as_written(mark: str, nodes: str) -> None:
    assert shape(mark) == nodes


@pytest.mark.parametrize(("mark", "nodes"), PLACES_READ)
def test_name_stands_alone_or_is_poured(mark: str, nodes: str) -> None:
    assert shape(mark) == nodes


@pytest.mark.parametrize(("mark", "nodes"), VERBS_READ)
def test_verb_has_its_object_and_its_clauses(mark: str, nodes: str) -> None:
    assert shape(mark) == nodes


@pytest.mark.parametrize(("mark", "nodes"), AGAIN_READ)
def test_again_says_which_steps_how_often_and_with_what(mark: str, nodes: str) -> None:
    assert shape(mark) == nodes


@pytest.mark.parametrize(("mark", "nodes"), FIGURES_READ)
def test_figure_and_record_have_words_expression_and_unit(mark: str, nodes: str) -> None:
    assert shape(mark) == nodes


@pytest.mark.parametrize(("mark", "nodes"), SEVERAL_READ)
def test_acts_divided_by_semicolons_are_read_in_order(mark: str, nodes: str) -> None:
    assert shape(mark) == nodes


@pytest.mark.parametrize("verb", sorted(VERBS - {"take", "wait", "suppose"}))
def test_each_verb_is_done_to_a_vessel(verb: str) -> None:
    assert shape(f"{verb} flask") == f"verb {verb} flask"


@pytest.mark.parametrize("part", sorted(PARTS))
def test_each_part_can_be_drawn_off(part: str) -> None:
    assert shape(f"funnel.{part} -> A") == f"transfer funnel.{part} to A"


@pytest.mark.parametrize("closure", CLOSURES)
def test_each_closure_stands_after_a_comma(closure: str) -> None:
    assert shape(f"stir A, {closure}") == f"verb stir A {{closure <{closure}>}}"


@pytest.mark.parametrize("setting", SETTINGS)
def test_each_setting_stands_after_a_comma(setting: str) -> None:
    assert (
        shape(f"stir A, {setting}, open") == f"verb stir A {{setting <{setting}>; closure <open>}}"
    )


@pytest.mark.parametrize(
    ("order", "nodes"),
    [
        ("for 5 min with bar at 300 rpm", "for (5 min); with bar; at (300 rpm)"),
        ("at 300 rpm for 5 min with bar", "at (300 rpm); for (5 min); with bar"),
        (", with bar, at 300 rpm, for 5 min", "with bar; at (300 rpm); for (5 min)"),
    ],
)
def test_clauses_stand_in_any_order(order: str, nodes: str) -> None:
    assert shape(f"stir A {order}") == f"verb stir A {{{nodes}}}"


@pytest.mark.parametrize("blank", [" ", "  ", "\t", "\N{NO-BREAK SPACE}", "\N{THIN SPACE}"])
def test_any_blank_divides_words(blank: str) -> None:
    mark = "15 mL acid by cylinder -> funnel".replace(" ", blank)

    assert shape(mark).replace(blank, " ") == "charge [15 mL of acid] to funnel {by cylinder}"
