"""What expressions ask of the bench: shares, masses, pH, titres, and why there is no answer."""

from __future__ import annotations

import pytest

from bench_runner import asked_of, knowledge, ran
from builders import judged, steps, surroundings
from run.bench.shelf import near
from watchglass.base import dimensions as dim
from watchglass.base.spans import Source
from watchglass.read.expressions import read_expression
from watchglass.read.terms import Compare, Within
from watchglass.run.bench.asked import Answer, Asked, amount_in
from watchglass.run.bench.evaluator import BenchEvaluator, reached_words
from watchglass.run.bench.figures import amount_words, ph_words, share_words, volume_words
from watchglass.run.bench.positions import layer_positions
from watchglass.run.bench.state import Phase, Vessel
from watchglass.run.evaluate import NotKnown, Result, Value

FRONT = """\
materials:
  water: water
  acid: 1.0 M hydrochloric acid
  base: 1.0 M sodium hydroxide
  titrant: 0.10 M sodium hydroxide
  vinegar: 0.10 M acetic acid
  ether: tert-butyl methyl ether
  heavy: dichloromethane
  benzoic: benzoic acid
  salt: sodium chloride
  mixture: {contains: {benzoic-acid: 1 mol, naphthalene: 1 mol}, provided: 1.0 g}
  loose: {contains: {benzoic-acid: 1 mol}}
  nameless: {contains: {odd: 1 mol}}
vessels:
  A: conical flask 250 mL
  B: conical flask 250 mL
  funnel: separatory funnel 250 mL
  burette: burette 50 mL
"""
KNOWN = knowledge()
#: 1 g of benzoic acid in A, a quarter of it drawn to B at step 2; A made alkaline at step 3.
RUN = (
    "{20 mL ether -> A} {1.0 g benzoic -> A} {swirl A}{label begun}",
    "{5 mL from A -> B}{label parted}",
    "{10 mL acid -> funnel} {swirl funnel}{label sour}",
    "{20 mL base -> funnel} {swirl funnel}",
)


def bench(*sentences: str) -> Asked:
    return ran(*sentences, front=FRONT)


def evaluator(*sentences: str, step: int = 0) -> BenchEvaluator:
    entry = judged(steps(*sentences), FRONT)
    asked = asked_of(entry)
    return BenchEvaluator(
        entry.procedure, entry.case.usage, surroundings().catalogue, {}, asked=asked, step=step
    )


def evaluated(expression: str, step: int = 0) -> tuple[Result, str]:
    node, findings = read_expression(Source.of("a.md", expression), 0, len(expression))
    assert findings == ()
    assert node is not None
    asking = evaluator(*RUN, step=step)
    return asking.value(node), asking.why


def value(expression: str, step: int = 0) -> float:
    found, why = evaluated(expression, step)
    assert isinstance(found, Value), why
    return found.si


# ---------------------------------------------------------------- shares and masses


def test_share_is_of_all_that_was_brought() -> None:
    asked = bench(*RUN)

    assert asked.share("benzoic-acid", "B", asked.ledger.end) == Answer(near(0.25, rel=1e-4))
    assert asked.share("benzoic", "A", asked.ledger.end) == Answer(near(0.75, rel=1e-4))


def test_recovered_mass_is_in_kilograms_of_the_neutral_form() -> None:
    asked = bench("{20 mL base -> A} {1.0 g benzoic -> A} {swirl A}")

    assert asked.recovered("benzoic-acid", "A", asked.ledger.end) == Answer(near(1e-3, rel=1e-4))


def test_cation_stands_for_a_salt_of_nothing_else() -> None:
    asked = bench("{1.0 g salt -> A} {10 mL water -> A} {swirl A}", "{5 mL from A -> B}")

    assert asked.component("salt") == "Na^+"
    assert asked.share("salt", "B", asked.ledger.end) == Answer(near(0.5, rel=1e-3))


@pytest.mark.parametrize(
    ("what", "component"),
    [
        ("benzoic", "benzoic-acid"),
        ("naphthalene", "naphthalene"),
        ("sodium-benzoate", "benzoic-acid"),
        ("magnesium-sulfate", "sulfuric-acid"),
        ("calcium-chloride", "Ca^2+"),
        ("mixture", None),
        ("water", None),
        ("nowhere", None),
    ],
)
def test_component_is_the_one_substance_that_is_meant(what: str, component: str | None) -> None:
    assert bench("{1.0 g salt -> A}").component(what) == component


def test_what_is_no_one_substance_has_no_share_and_no_mass() -> None:
    asked = bench(*RUN)
    end = asked.ledger.end

    assert asked.share("mixture", "A", end) == Answer(None, "`mixture` is not one substance")
    assert asked.recovered("mixture", "A", end) == Answer(None, "`mixture` is not one substance")


def test_what_was_never_brought_has_no_share_but_a_mass_of_nought() -> None:
    asked = bench(*RUN)
    end = asked.ledger.end

    assert asked.share("naphthalene", "A", end) == Answer(
        None, "no naphthalene was brought or formed"
    )
    assert asked.recovered("naphthalene", "A", end) == Answer(0.0)


def test_unknown_amount_in_the_vessel_makes_every_answer_unknown() -> None:
    asked = bench("{1.0 g benzoic -> A} {all loose -> A}")
    end, why = asked.ledger.end, "what loose brings is not known"

    assert asked.share("benzoic-acid", "A", end) == Answer(None, why)
    assert asked.recovered("benzoic-acid", "A", end) == Answer(None, why)


def test_doubt_about_a_substance_is_about_that_one_alone() -> None:
    asked = bench(*RUN)
    a = asked.ledger.end.vessel("A")._replace(doubt=frozenset({"benzoic-acid"}))
    end = asked.ledger.end.with_vessels(a)

    assert asked.share("benzoic-acid", "A", end) == Answer(
        None, "where the benzoic acid went cannot be told: a constant is missing"
    )
    assert asked.recovered("naphthalene", "A", end) == Answer(0.0)


def test_amount_counts_both_layers_and_the_parts_of_solids() -> None:
    # 1 + 2 mol, and 0.5 mol of sodium benzoate.
    held = Vessel(
        "A",
        aqueous=Phase({"benzoic-acid": 1.0}),
        organic=Phase({"benzoic-acid": 2.0}),
        solid={"sodium-benzoate": 0.5, "silica": 9.0},
    )

    assert amount_in("benzoic-acid", held, KNOWN) == 3.5
    assert amount_in("Na^+", held, KNOWN) == 0.5


def test_substance_without_a_formula_has_no_mass() -> None:
    files = {"substances/mine.yml": "tar:\n  names: [tar]\n  state: liquid\n"}
    front = "materials: {x: tar}\nvessels: {A: beaker 50 mL}"
    asked = ran("{1.0 g x -> A}", front=front, files=files)

    assert asked.recovered("x", "A", asked.ledger.start).value is None


# ---------------------------------------------------------------- pH


def test_ph_of_a_vessel_is_that_of_its_water() -> None:
    # 10 mmol too much base in 30 mL: 13.52.
    asked = bench(*RUN)

    assert asked.ph("funnel", asked.ledger.end) == Answer(near(13.523, abs=0.005))


def test_vessel_that_was_not_mixed_is_mixed_for_the_answer() -> None:
    asked = bench("{10 mL acid -> A} {10 mL ether -> A}")

    assert not asked.ledger.end.vessel("A").mixed
    assert asked.ph("A", asked.ledger.end) == Answer(near(0.0, abs=0.005))


@pytest.mark.parametrize(
    ("vessel", "why"), [("B", "B is empty"), ("A", "A holds no aqueous liquid")]
)
def test_there_is_no_ph_without_water(vessel: str, why: str) -> None:
    asked = bench("{10 mL ether -> A} {swirl A}")

    assert asked.ph(vessel, asked.ledger.end) == Answer(None, why)


def test_ph_of_an_unknown_mixture_says_why() -> None:
    asked = bench("{10 mL acid -> A} {all loose -> A} {swirl A}")

    assert asked.ph("A", asked.ledger.end) == Answer(None, "what loose brings is not known")


# ---------------------------------------------------------------- moments


def test_moment_of_a_step_is_after_its_latest_pass() -> None:
    asked = bench("{10 mL water -> A}", "{5 mL water -> A}", "{again 1}")

    assert asked.moment(1).vessel("A").volume == near(25e-6)
    assert asked.moment(2).vessel("A").volume == near(15e-6)
    assert asked.moment(0).vessel("A").volume == near(25e-6)
    assert asked.moment(9).vessel("A").volume == near(25e-6)


def test_label_before_everything_is_the_bench_at_the_start() -> None:
    asked = bench("{label begin}{10 mL water -> A}", "{10 mL water -> A}{label filled}", "{A -> B}")
    begin, after = asked.ledger.at("begin"), asked.ledger.at("filled")

    assert begin is asked.ledger.start
    assert after is not None
    assert after.vessel("A").volume == near(20e-6)
    assert asked.ledger.at("nowhere") is None


@pytest.mark.parametrize(
    ("expression", "step", "expected"),
    [
        ("benzoic-acid in A", 0, 0.75),
        ("fraction(benzoic-acid in B)", 0, 0.25),
        ("benzoic-acid in A after label(begun)", 0, 1.0),
        ("benzoic-acid in A after label(parted)", 0, 0.75),
        ("benzoic-acid in A after step(1)", 0, 1.0),
        ("benzoic-acid in A after step(2)", 0, 0.75),
        ("benzoic-acid in A", 1, 1.0),
        ("recovered(benzoic-acid in B)", 0, 0.25e-3),
        ("recovered(benzoic-acid in A)", 1, 1.0e-3),
        ("pH of funnel", 0, 13.523),
        ("pH of funnel after label(sour)", 0, 0.0),
        ("pH of funnel", 3, 0.0),
    ],
)
def test_figure_is_that_of_the_moment_it_speaks_of(
    expression: str, step: int, expected: float
) -> None:
    assert value(expression, step) == near(expected, rel=1e-3, abs=None if expected else 1e-3)


def test_moment_does_not_outlast_its_expression() -> None:
    # 1.00 after the first label, 0.75 at the end.
    asking = evaluator(*RUN)
    words = "(benzoic-acid in A after label(begun)) - (benzoic-acid in A)"
    node, _ = read_expression(Source.of("a.md", words), 0, len(words))
    assert node is not None
    found = asking.value(node)

    assert isinstance(found, Value)
    assert found.si == near(0.25, rel=1e-3)


@pytest.mark.parametrize(
    ("expression", "dimension", "figures"),
    [
        ("benzoic-acid in A", dim.SHARE, 3),
        ("recovered(benzoic-acid in A)", dim.MASS, 3),
        ("pH of funnel", dim.NUMBER, 3),
    ],
)
def test_figure_of_the_model_shows_three_figures(
    expression: str, dimension: dim.Dimension, figures: int
) -> None:
    found, _ = evaluated(expression)

    assert isinstance(found, Value)
    assert (found.dimension, found.figures) == (dimension, figures)


def test_titre_shows_four_figures() -> None:
    asking = evaluator(
        "{10 mL vinegar -> A} {50 mL titrant -> burette}",
        "{titrate A with titrant from burette giving 9.876 mL}{label end}",
    )
    node, _ = read_expression(Source.of("a.md", "titre(end)"), 0, 10)
    assert node is not None

    assert asking.value(node) == Value(near(9.876e-6), dim.VOLUME, 4)


@pytest.mark.parametrize(
    ("expression", "why"),
    [
        ("titre(begun)", "nothing is titrated before `begun`"),
        ("naphthalene in A", "no naphthalene was brought or formed"),
        ("pH of A", "A holds no aqueous liquid"),
        ("benzoic-acid in A after label(nowhere)", "the state it speaks of is never reached"),
    ],
)
def test_figure_that_cannot_be_told_says_why(expression: str, why: str) -> None:
    assert evaluated(expression) == (NotKnown("bench"), why)


# ---------------------------------------------------------------- comparisons


@pytest.mark.parametrize(
    ("condition", "holds"),
    [
        ("benzoic-acid in A >= 75 %", True),
        ("benzoic-acid in A >= 75.1 %", False),
        ("benzoic-acid in A <= 75 %", True),
        ("benzoic-acid in A <= 74.9 %", False),
        ("benzoic-acid in A > 74 %", True),
        ("benzoic-acid in A > 76 %", False),
        ("benzoic-acid in A < 76 %", True),
        ("benzoic-acid in A < 74 %", False),
        ("2 >= 2", True),
        ("2 <= 2", True),
        ("2 > 2", False),
        ("2 < 2", False),
        ("pH of funnel in 13–14", True),
        ("pH of funnel in 12–13", False),
        ("pH of funnel in 13.6–14", False),
        ("naphthalene in A >= 5 %", None),
        ("5 % <= naphthalene in A", None),
        ("pH of A in 1–2", None),
    ],
)
def test_comparison_holds_or_not_or_cannot_be_told(condition: str, *, holds: bool | None) -> None:
    node, findings = read_expression(Source.of("a.md", condition), 0, len(condition))
    assert findings == ()
    assert isinstance(node, Compare | Within)

    assert evaluator(*RUN).holds(node)[0] is holds


# ---------------------------------------------------------------- words


@pytest.mark.parametrize(
    ("share", "words"),
    [
        (0.0, "0.0 %"),
        (0.0004, "< 0.1 %"),
        (0.0006, "0.1 %"),
        (0.5, "50.0 %"),
        (0.9994, "99.9 %"),
        (0.9996, "> 99.9 %"),
        (1.0, "100.0 %"),
        (1.2, "120.0 %"),
    ],
)
def test_share_is_not_rounded_to_all_or_nothing(share: float, words: str) -> None:
    assert share_words(share) == words


@pytest.mark.parametrize(
    ("ph", "words"),
    [(-0.01, "pH below 0"), (0.0, "pH 0.00"), (7.005, "pH 7.00"), (14.2, "pH 14.20")],
)
def test_ph_has_two_places_and_none_below_nought(ph: float, words: str) -> None:
    assert ph_words(ph) == words


@pytest.mark.parametrize(
    ("moles", "words"),
    [(0.0, "0 mmol"), (9.99e-6, "9.99 µmol"), (1e-5, "0.0100 mmol"), (0.25, "250 mmol")],
)
def test_amount_is_in_millimoles_unless_it_is_small(moles: float, words: str) -> None:
    assert amount_words(moles) == words


def test_volume_is_in_millilitres_with_the_figures_asked_for() -> None:
    assert volume_words(1.2345e-5) == "12.3 mL"
    assert volume_words(1.2346e-5, 4) == "12.35 mL"


@pytest.mark.parametrize(
    ("reached", "words"),
    [
        (Value(0.75, dim.SHARE, 3), "75.0 %"),
        (Value(2.5e-5, dim.VOLUME, 4), "25.00 mL"),
        (Value(1.5e-3, dim.MASS, 3), "1.50 g"),
        (Value(7.5, dim.NUMBER, 3), "7.50"),
    ],
)
def test_what_is_reached_is_written_in_the_unit_of_its_kind(reached: Value, words: str) -> None:
    assert reached_words(reached) == words


# ---------------------------------------------------------------- positions


def positions(*sentences: str) -> dict[str, tuple[str, str, bool]]:
    """Give what is known of each place that draws a layer, by the place as written."""
    entry = judged(steps(*sentences), FRONT)
    text = entry.procedure.syntax.source.text
    found = layer_positions(asked_of(entry).ledger)
    return {text[at:].split(" ")[0].rstrip("}"): said for at, said in found.items()}


TWO = "{20 mL water -> funnel} {20 mL ether -> funnel} {settle funnel}"
HEAVY = TWO.replace("ether", "heavy")


@pytest.mark.parametrize(
    ("setting", "place", "said"),
    [
        (TWO, "funnel.aqueous", ("lower", "aqueous", False)),
        (TWO, "funnel.organic", ("upper", "organic", False)),
        (TWO, "funnel.upper", ("upper", "organic", False)),
        (HEAVY, "funnel.aqueous", ("upper", "aqueous", False)),
        (HEAVY, "funnel.lower", ("lower", "organic", False)),
    ],
)
def test_layer_is_told_by_where_it_lies(
    setting: str, place: str, said: tuple[str, str, bool]
) -> None:
    assert positions(setting, "{" + place + " -> A}") == {place: said}


def test_layer_that_is_discarded_or_measured_out_is_told_as_well() -> None:
    assert positions(TWO, "{discard funnel.aqueous to aqueous-neutral}") == {
        "funnel.aqueous": ("lower", "aqueous", False)
    }
    assert positions(TWO, "{5 mL from funnel.organic -> A}") == {}


def test_whole_vessel_has_no_position() -> None:
    assert positions(TWO, "{funnel -> A}") == {}


def test_place_that_draws_different_layers_in_turn_is_not_told() -> None:
    # First over ether, then, with the layer of dichloromethane, from below.
    found = positions(
        TWO, "{funnel.lower -> A}", "{funnel -> B} {20 mL water -> funnel} {20 mL heavy -> funnel}",
        "{again 2}",
    )  # fmt: skip

    assert found == {}
