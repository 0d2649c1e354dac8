"""A procedure scaled: what is multiplied, what is not, and what the shelf must hold."""

from __future__ import annotations

import pytest

from builders import NAMES, faults, judged, only, places, sound, step, student, surroundings, text
from watchglass.base.spans import Source
from watchglass.publish.body import text_of
from watchglass.publish.model import Para, StepList
from watchglass.resolve import model
from watchglass.shell.pipeline import analyse_procedure

OWNED = """\
name: Lower Laboratory
glassware:
  conical flask 100 mL: 10
  conical flask 250 mL: 10
  conical flask 500 mL: 10
  separatory funnel 125 mL: 10
  separatory funnel 250 mL: 10
  graduated cylinder 25 mL: 10
  graduated cylinder 50 mL: 10
  burette 50 mL: 10
  boiling tube 50 mL: 10
"""


def scaled(sentence: str, factor: str, laboratory: str = "", front: str = NAMES) -> model.Procedure:
    files = {"laboratory.yml": laboratory} if laboratory else None
    return sound(step(sentence, front=f"{front}scale: {factor}\n", files=files))


def said(sentence: str, factor: str) -> str:
    page = student(step(sentence, front=f"{NAMES}scale: {factor}\n"))
    steps = page.body[0]
    assert isinstance(steps, StepList)
    first = steps.items[0].children[0]
    assert isinstance(first, Para)
    return text_of(first.children)


def size(procedure: model.Procedure, name: str) -> str:
    type_ = procedure.vessels[name].type
    assert type_ is not None
    assert type_.size is not None
    return type_.size.text


@pytest.mark.parametrize(
    ("sentence", "factor", "words"),
    [
        ("Add {15 mL acid -> A}.", "2", "Add 30 mL of 3.0 M hydrochloric acid."),
        (
            "Put in {2.0 g salt + 5 mL water -> A}.",
            "0.5",
            "Put in 1.0 g of sodium chloride and 2.5 mL of water.",
        ),
        ("Add {2–3 mL acid -> A}.", "2", "Add 4–6 mL of 3.0 M hydrochloric acid."),
        ("[Add 15 mL of the acid]{15 mL acid -> A}.", "2", "Add 30 mL of the acid."),
        (
            "[Add 5.0 g (6.8 mL, 57 mmol) of it]{5.0 g ether -> A}.",
            "2",
            "Add 10 g (13.6 mL, 114 mmol) of it.",
        ),
        ("Add {2.0 g salt -> A} ({34 mmol}).", "2", "Add 4.0 g of sodium chloride (68 mmol)."),
        ("Weigh {2.0 g salt -> A} to {1 mg}.", "2", "Weigh 4.0 g of sodium chloride to 1 mg."),
        (
            "[Add **2.0 g** (34 mmol) of salt]{2.0 g salt -> A}.",
            "2",
            "Add 4.0 g (68 mmol) of salt.",
        ),
        ("Wait {15 min} at {65 °C}.", "2", "Wait 15 min at 65 °C."),
        ("Weigh to {0.1 mg}.", "2", "Weigh to 0.1 mg."),
        ("Add {3 drops acid -> A}.", "2", "Add 6 drops of 3.0 M hydrochloric acid."),
        ("Use {0.900 g mixture}.", "2", "Use 1.80 g of the mixture."),
    ],
)
def test_page_says_the_scaled_amounts(sentence: str, factor: str, words: str) -> None:
    assert said(sentence, factor) == words


def test_amount_per_amount_is_not_scaled() -> None:
    procedure = scaled("Add {12 mL ether per g mixture -> A} to {0.1 g mixture}.", "2")

    charge = procedure.steps[0].events[0]
    assert isinstance(charge, model.Charge)
    assert charge.portions[0].quantity is not None
    assert charge.portions[0].quantity.text == "12 mL"


def test_aliquot_and_stated_titre_are_scaled() -> None:
    procedure = scaled(
        "Put {50 mL acid -> A}, take {10.00 mL from A -> B} and"
        " {titrate B with base from burette to pH 7, giving 5.2 mL}.",
        "2",
    )

    aliquot, titration = procedure.steps[0].events[1:]
    assert isinstance(aliquot, model.Aliquot)
    assert aliquot.quantity.text == "20.00 mL"
    assert isinstance(titration, model.Operation)
    giving = next(c for c in titration.clauses if c.word == "giving")
    assert "10.4 mL" in str(giving.value)


def test_what_is_provided_is_scaled() -> None:
    provided = scaled("Put {all mixture -> A}.", "2").materials["mixture"].provided

    assert provided is not None
    assert provided.text == "1.80 g"


def test_table_of_charges_is_scaled_in_model_and_on_the_page() -> None:
    body = (
        "1. Fill the tubes.\n\n   :::charge\n   | tube | acid / mL | water / mL |\n   |---|---|---|\n"
        "   | tube-1 | 1.0 | 4.0 |\n   | tube-2 | 2.5 | - |\n   :::"
    )
    entry = judged(body, f"{NAMES}scale: 2\n")

    charges = [e for e in entry.procedure.steps[0].events if isinstance(e, model.Charge)]
    assert [p.quantity.text for c in charges for p in c.portions if p.quantity] == [
        "2.0 mL",
        "5.0 mL",
        "8.0 mL",
    ]
    page = str(student(entry).body)
    assert "'2.0'" in page
    assert "'5.0'" in page
    assert "'2.5'" not in page


def test_expectation_of_a_mass_is_scaled() -> None:
    front = f"{NAMES}expect:\n  - recovered(benzocaine in A) >= 0.10 g\nscale: 3\n"
    procedure = scaled("Put {all mixture -> A}.", "3", front=front.replace("scale: 3\n", ""))

    assert procedure.expectations[0].written == "recovered(benzocaine in A) >= 0.30 g"


@pytest.mark.parametrize(
    ("factor", "name", "wanted"),
    [
        ("2", "funnel", "250 mL"),
        ("1.5", "funnel", "250 mL"),
        ("2", "A", "250 mL"),
        ("3", "A", "500 mL"),
        ("2", "B", "500 mL"),
        ("2", "cylinder", "50 mL"),
        ("0.5", "B", "250 mL"),
    ],
)
def test_vessel_is_taken_in_the_smallest_size_owned_that_serves(
    factor: str, name: str, wanted: str
) -> None:
    front = NAMES.replace("  burette: burette 50 mL\n", "").replace(
        "  tube: {1-3: boiling tube 50 mL}\n", ""
    )
    if factor == "3":
        front = (
            front.replace("  funnel: separatory funnel 125 mL\n", "")
            .replace("  B: conical flask 250 mL\n", "")
            .replace("  cylinder: graduated cylinder 25 mL\n", "")
        )
    procedure = scaled("Put {15 mL acid -> A}.", factor, OWNED, front)

    assert size(procedure, name) == wanted


FLASK = "materials: {water: water}\nvessels: {flask: volumetric flask 100 mL}\n"
FLASKS = "glassware:\n  volumetric flask 100 mL: 4\n  volumetric flask 250 mL: 4\n"


def test_flask_with_one_mark_in_a_size_that_is_not_owned_is_told() -> None:
    front = f"{FLASK}scale: 2\n"
    entry = step("{fill flask with water to mark}.", front=front, files={"laboratory.yml": FLASKS})

    finding = only(entry)
    assert finding.code.name == "size-not-owned"
    assert "200 mL" in finding.message
    assert "100 mL, 250 mL" in finding.message


def test_flask_with_one_mark_changes_to_the_size_that_is_owned() -> None:
    front = f"{FLASK}scale: 2.5\n"
    entry = step("{fill flask with water to mark}.", front=front, files={"laboratory.yml": FLASKS})

    assert faults(entry) == ()
    assert size(entry.procedure, "flask") == "250 mL"


FUNNEL = "materials: {water: water}\nvessels: {funnel: separatory funnel 125 mL}\n"


@pytest.mark.parametrize(
    ("factor", "volume", "codes"),
    [("3", "20 mL", []), ("10", "20 mL", []), ("10", "30 mL", ["B120"])],
)
def test_other_vessel_is_the_largest_owned_and_told_only_when_it_runs_over(
    factor: str, volume: str, codes: list[str]
) -> None:
    front = f"{FUNNEL}scale: {factor}\n"
    entry = step(f"Put {{{volume} water -> funnel}}.", front=front, files={"laboratory.yml": OWNED})

    assert size(entry.procedure, "funnel") == "250 mL"
    assert [f.code.number for f in entry.findings if f.code.number != "N180"] == codes


@pytest.mark.parametrize(("asked", "said"), [(None, 0.5), (1.0, 1.0), (2.0, 2.0)])
def test_factor_asked_for_wins_over_the_one_declared(asked: float | None, said: float) -> None:
    source = Source.of(
        "procedures/t-01.md", text("1. Put {15 mL acid -> A}.", f"{NAMES}scale: 0.5\n")
    )
    entry = analyse_procedure(source.name, source, surroundings()._replace(scale=asked))

    assert entry.procedure.head.scale == said


def test_sizes_made_count_where_the_laboratory_lists_none() -> None:
    assert size(scaled("Put {15 mL acid -> A}.", "2"), "A") == "200 mL"


def test_amount_too_small_to_weigh_is_told_once() -> None:
    entry = step("Put {0.12 g salt -> A}.", front=f"{NAMES}scale: 0.1\n")

    assert [p.code for p in places(faults(entry))] == ["B111"]


def test_better_balance_weighs_it() -> None:
    entry = step(
        "Put {0.12 g salt -> A}.",
        front=f"{NAMES}scale: 0.1\n",
        files={"laboratory.yml": "balance: 1 mg\n"},
    )

    assert places(faults(entry)) == []


def test_figures_of_the_draft_are_judged_as_written() -> None:
    entry = step("[Add 10 mL]{15 mL acid -> A}.", front=f"{NAMES}scale: 2\n")

    assert "`15 mL`" in only(entry).message


@pytest.mark.parametrize(("factor", "said"), [("2", "20 min"), ("3", "30 min"), ("0.5", "10 min")])
def test_addition_keeps_its_rate_in_a_larger_batch(factor: str, said: str) -> None:
    entry = step("Add {15 mL acid over 10 min -> A}.", front=f"{NAMES}scale: {factor}\n")

    assert said in str(student(entry).body).replace("\\xa0", " ")


@pytest.mark.parametrize(("factor", "codes"), [("1", []), ("3", ["N195"])])
def test_longer_addition_may_no_longer_fit_the_period(factor: str, codes: list[str]) -> None:
    front = f"{NAMES}time: 60 min\nscale: {factor}\n"
    entry = step("Add {15 mL acid over 25 min -> A}. {take 20 min}", front=front)

    assert [p.code for p in places(faults(entry))] == codes


def test_procedure_tells_which_vessels_it_takes_in_another_size() -> None:
    entry = step(
        "Put {30 mL water -> funnel}.", front=f"{FUNNEL}scale: 2\n", files={"laboratory.yml": OWNED}
    )

    assert entry.procedure.resized == {
        "funnel": ("separatory funnel 125 mL", "separatory funnel 250 mL")
    }
