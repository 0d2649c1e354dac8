"""Acts: what each verb acts on, which clauses it takes, what each place takes."""

from __future__ import annotations

import pytest

from builders import faults, only, sound, step
from watchglass.base import dimensions as dim
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.resolve.verbs import VERBS

# fmt: off
SOUND = [
    "5 g ice -> A", "3 drops acid -> A", "5 g acid by lamp -> A", "5 g acid for 5 min -> A",
    "5 g acid through cotton -> A", "5 mL acid per g mixture -> A", "5 mL acid per g neutral -> A",
    "5 g from A -> B", "stir A", "stir A at 5 rpm", "stir A with acid", "stir A with lamp",
    "stir A in ice-salt", "heat A to 330 K", "heat A by 20 K", "heat A at 65 °C", "heat A below 65 K",
    "cool A to -10 °C with ice-salt", "react neutral in A", "react neutral in A to 5 %",
    "adjust A to pH 7 with acid", "adjust A to phenolphthalein with acid", "adjust A to pH 7 with 5 mL acid",
    "titrate A with base from burette to phenolphthalein giving 5 mL",
    "titrate A with base from burette as neutral", "fill A to mark with water", "fill A to 100 mL with water",
    "dry A with 2 g salt", "dry A with salt", "dry A with ice", "filter A on funnel into B",
    "filter A through cotton into B", "decant A into B", "evaporate A to 5 mL",
    "distil A into B at 79–84 °C, leaving 2 mL", "distil A into B to 84 °C", "collect lamp", "weigh A",
    "rinse A with 10 mL water into B", "rinse A with water", "discard A to aqueous-acid", "discard A into B",
    "discard A.upper", "vent A", "test A ph", "test A zz", "test ether peroxides", "take 5 min", "wait 5 min",
    "next period", "suppose 80 % salt in A is solid: reason", "stir A, in hood", 'stir A until "clear"',
    "label x", "A.upper", "lamp", "ice", "aqueous-acid", "neutral", "ice-salt", "benzocaine",
    '"iron(III) chloride"', "adjust A to pH -1 with acid", "react neutral in A to 100 %",
    "stir A for 5 min over 5 min", "stir A with 5 g acid", "discard A.upper to aqueous-acid",
]
#: What stands in the braces, code, what is underlined, message, help.
FAULTS = [
    ("5 acid -> A", "Q104", "5", "`5` of `acid` has no unit", "write the unit, as in `5 mL acid`"),
    ("5 °C acid -> A", "Q109", "5 °C", "`5 °C` is a temperature; a mass, a volume, an amount or a count belongs here", "write how much of it, as in `15 mL acid`"),
    ("5 % acid -> A", "Q109", "5 %", "`5 %` is a share; a mass, a volume, an amount or a count belongs here", "write how much of it, as in `15 mL acid`"),
    ("5 g acid to 5 g -> A", "N116", "to 5 g", "a charge or a transfer takes no `to`", "take one of `at`, `below`, `by`, `for`, `from`, `on`, `over`, `through`, `until`, `with`"),
    ("5 g acid for 5 g -> A", "Q109", "5 g", "`5 g` is a mass; a time belongs here", "write it as in `5 min`"),
    ("11 kg acid -> A", "Q113", "11 kg", "`11 kg` is more than 10 kg", "see whether the unit is meant"),
    ("60 L acid -> A", "Q113", "60 L", "`60 L` is more than 50 L", "see whether the unit is meant"),
    ("5 min from A -> B", "Q109", "5 min", "`5 min` is a time; an aliquot is a volume or a mass", "write `10 mL from …`"),
    ("stir A for 5 mL", "Q109", "5 mL", "`5 mL` is a volume; a time belongs here", "write it as in `5 min`"),
    ("stir A for 5", "Q104", "5", "`5` after `for` has no unit", "write it with its unit, as in `5 min`"),
    ("stir A at 5 mL", "Q109", "5 mL", "`5 mL` is a volume; a temperature, a rate or a length belongs here", "write it as in `40 °C`"),
    ("stir A into B", "N116", "into B", "`stir` takes no `into`", "take one of `at`, `below`, `by`, `for`, `in`, `on`, `over`, `until`, `with`"),
    ("heat A to 5 min", "Q109", "5 min", "`5 min` is a time; a temperature belongs here", "write it as in `65 °C`"),
    ("heat A to 65", "Q104", "65", "`65` after `to` has no unit", "write it with its unit, as in `65 °C`"),
    ("heat A by 20 °C", "Q109", "20 °C", "`20 °C` is a temperature; a temperature difference belongs here", "write a difference in kelvin, as in `20 K`"),
    ("heat A below 5 min", "Q109", "5 min", "`5 min` is a time; a temperature belongs here", "write it as in `65 °C`"),
    ("react neutral", "N118", "react", "`react` lacks `in`", "add `in flask`"),
    ("react neutral in A to 5 mL", "Q109", "5 mL", "`5 mL` is a volume; a share belongs here", "write it as in `80 %`"),
    ("adjust A to pH 7", "N118", "adjust", "`adjust` lacks `with`", "add `with alkali`"),
    ("adjust A with acid", "N118", "adjust", "`adjust` lacks `to`", "add `to pH 10`"),
    ("adjust A to 7 with acid", "N116", "7", "`to` takes a pH or an indicator here", "write it as in `to pH 10`"),
    ("titrate A with base from burette giving 5 g", "Q109", "5 g", "`5 g` is a mass; a volume belongs here", "write it as in `10 mL`"),
    ("titrate A from burette", "N118", "titrate", "`titrate` lacks `with`", "add `with alkali`"),
    ("fill A to 100 g with water", "Q109", "100 g", "`100 g` is a mass; a volume belongs here", "write it as in `10 mL`"),
    ("fill A", "N118", "fill", "`fill` lacks `with`", "add `with alkali`"),
    ("decant A", "N118", "decant", "`decant` lacks `into`", "add `into flask`"),
    ("evaporate A leaving 5 °C", "Q109", "5 °C", "`5 °C` is a temperature; a mass or a volume belongs here", "write it as in `2 mL`"),
    ("distil A", "N118", "distil", "`distil` lacks `into`", "add `into flask`"),
    ("take 5 mL", "Q109", "5 mL", "`5 mL` is a volume; a time belongs here", "write it as in `5 min`"),
    ("take 5", "Q104", "5", "`5` after `take` has no unit", "write it with its unit, as in `5 min`"),
    ("5 min salt", "Q109", "5 min", "`5 min` is a time; a mass, a volume, an amount or a count belongs here", "write how much of it, as in `15 mL salt`"),
    ("titrate A with base", "N118", "titrate", "`titrate` lacks `from`", "add `from flask`"),
    ("filter A on funnel", "N118", "filter", "`filter` lacks `into`", "add `into flask`"),
    ("0 mL acid -> A", "Q119", "0 mL", "`0 mL` of `acid` is nothing", "write how much is taken, or take the mark out"),
    ("0.0 g salt + 5 mL acid -> A", "Q119", "0.0 g", "`0.0 g` of `salt` is nothing", "write how much is taken, or take the mark out"),
    ("adjust A to pH 100 with acid", "Q118", "pH 100", "no solution at the bench has pH 100", "give a pH from -2 to 16"),
    ("adjust A to pH 5 mL with acid", "Q109", "pH 5 mL", "`5 mL` is a volume; a pH is a plain number", "write `pH 5`"),
    ("adjust A to pH 4–17 with acid", "Q118", "pH 4–17", "no solution at the bench has pH 4–17", "give a pH from -2 to 16"),
    ("react neutral in A to 120 %", "Q117", "120 %", "`120 %` is more than the whole", "give a share of at most 100 %"),
    ("stir A at 70000 rpm", "Q113", "70000 rpm", "`70000 rpm` is more than 60000 rpm", "see whether the unit is meant"),
    ("5 g acid over 5 g -> A", "Q109", "5 g", "`5 g` is a mass; a time belongs here", "write it as in `5 min`"),
    ("stir A for acid", "N116", "acid", "`for` takes a time here", "write it as in `for 5 min`"),
    ("stir A at acid", "N116", "acid", "`at` takes a temperature, a rate or a length here", "write it as in `at 40 °C`"),
    ("heat A to acid", "N116", "acid", "`to` takes a temperature here", "write it as in `to 65 °C`"),
    ("heat A under condenser", "N111", "under condenser", "`under condenser` cannot stand here", "write `, under condenser`"),
    ("heat A in 5 min", "N116", "5 min", "`in` takes a thing by its name here", "write it as in `in paper`"),
    ("cool A to 5 min", "Q109", "5 min", "`5 min` is a time; a temperature belongs here", "write it as in `65 °C`"),
    ("stir A by 5 g", "N116", "5 g", "`by` takes a measuring vessel here", "write it as in `by cylinder`"),
    ("discard A to 5 g", "N116", "5 g", "`to` takes a waste stream here", "write it as in `to aqueous-acid`"),
    ("filter A on 5 mL into B", "N116", "5 mL", "`on` takes a thing by its name here", "write it as in `on paper`"),
    ("filter A with 5 °C into B", "N116", "5 °C", "`with` takes a thing by its name here", "write it as in `with paper`"),
    ("rinse lamp with 5 min water", "Q109", "5 min", "`5 min` is a time; a mass, a volume, an amount or a count belongs here", "write how much of it, as in `15 mL water`"),
    ("5 mL from A over 5 g -> B", "Q109", "5 g", "`5 g` is a mass; a time belongs here", "write it as in `5 min`"),
    ("weigh A to 5 °C", "Q109", "5 °C", "`5 °C` is a temperature; a mass or a volume belongs here", "write it as in `2 mL`"),
    ("evaporate A with 5 min", "N116", "5 min", "`with` takes a thing by its name here", "write it as in `with paper`"),
    ("settle A for 5 °C", "Q109", "5 °C", "`5 °C` is a temperature; a time belongs here", "write it as in `5 min`"),
    ("vent A for 5 g", "Q109", "5 g", "`5 g` is a mass; a time belongs here", "write it as in `5 min`"),
    ("fill A to 100 mL", "N118", "fill", "`fill` lacks `with`", "add `with alkali`"),
    ("adjust A to pH 7", "N118", "adjust", "`adjust` lacks `with`", "add `with alkali`"),
    ("adjust A to 5 % with acid", "N116", "5 %", "`to` takes a pH or an indicator here", "write it as in `to pH 10`"),
    ("titrate A with base from burette to 5 mL", "N116", "5 mL", "`to` takes a pH or an indicator here", "write it as in `to pH 10`"),
]
# fmt: on


@pytest.mark.parametrize("mark", SOUND)
def test_sound_act_passes_in_silence(mark: str) -> None:
    assert faults(step(f"Do {{{mark}}}.")) == ()


@pytest.mark.parametrize(("mark", "code", "marked", "message", "help_"), FAULTS)
def test_clause_or_quantity_that_does_not_fit_is_found_where_it_stands(
    mark: str, code: str, marked: str, message: str, help_: str
) -> None:
    finding = only(step(f"Do {{{mark}}}."))

    assert (finding.code.number, finding.span.text) == (code, marked)
    assert (finding.message, finding.help) == (message, help_)


def events(*sentences: str) -> tuple[model.Event, ...]:
    return tuple(e for s in sound(step(*sentences)).steps for e in s.events)


def event(mark: str) -> model.Event:
    (one,) = events(f"Do {{{mark}}}.")
    return one


def test_charge_keeps_its_portions_target_and_ware() -> None:
    charge = event("15 mL acid + all mixture by cylinder -> funnel")
    assert isinstance(charge, model.Charge)
    first, second = charge.portions

    assert (first.material, first.quantity and first.quantity.text, first.of_all) == (
        "acid",
        "15 mL",
        "",
    )
    assert (second.material, second.quantity, second.of_all) == ("mixture", None, "all")
    assert (charge.target.name.text, charge.ware) == ("funnel", "cylinder")


def test_amount_by_another_keeps_unit_and_name() -> None:
    charge = event("12 mL ether per g mixture -> A")
    assert isinstance(charge, model.Charge)
    per = charge.portions[0].per

    assert per is not None
    assert (per[0].unit.symbol, per[0].si, per[1]) == ("g", 1e-3, "mixture")


def test_transfer_keeps_its_part() -> None:
    transfer = event("funnel.aqueous -> A")

    assert isinstance(transfer, model.Transfer)
    assert (transfer.origin.part, transfer.target.name.text) == ("aqueous", "A")


def test_aliquot_keeps_its_measure() -> None:
    aliquot = event("10.0 mL from A -> B")

    assert isinstance(aliquot, model.Aliquot)
    assert (aliquot.quantity.text, aliquot.origin.name.text) == ("10.0 mL", "A")


@pytest.mark.parametrize(
    ("mark", "seconds"),
    [
        ("take 25 min", 1500.0),
        ("wait 30 s", 30.0),
        ("stir A for 5 min", 300.0),
        ("heat A to 65 °C over 10 min", 600.0),
        ("heat A to 65 °C over 10 min for 5 min", 900.0),
        ("reflux A for 1–2 h", 7200.0),
        ("stir A", None),
        ("next period", None),
    ],
)
def test_time_of_an_operation_is_its_longest(mark: str, seconds: float | None) -> None:
    operation = event(mark)

    assert isinstance(operation, model.Operation)
    assert operation.time == seconds


@pytest.mark.parametrize(
    ("mark", "reagent", "portions"),
    [
        ("adjust A to pH 10 with base", "base", []),
        ("titrate A with base from burette to phenolphthalein", "base", []),
        ("adjust A to pH 10 with 5 mL base", "", ["5 mL"]),
        ("dry A with 2 g salt", "", ["2 g"]),
        ("rinse A with 10 mL water into B", "", ["10 mL"]),
        ("filter A through cotton into B", "", []),
    ],
)
def test_reagent_with_and_without_an_amount(mark: str, reagent: str, portions: list[str]) -> None:
    operation = event(mark)
    assert isinstance(operation, model.Operation)

    assert operation.reagent == reagent
    assert [p.quantity.text for p in operation.portions if p.quantity] == portions


def test_reaction_runs_in_its_vessel() -> None:
    operation = event("react neutral in A to 80 %")

    assert isinstance(operation, model.Operation)
    assert operation.reaction == "neutral"
    assert operation.object is not None
    assert operation.object.name.text == "A"


def test_acts_of_a_step_keep_the_order_of_the_text() -> None:
    kinds = [type(e).__name__ for e in events("Do {5 mL acid -> A; stir A}, {A -> B}{label end}.")]

    assert kinds == ["Charge", "Operation", "Transfer", "Labelled"]


def test_step_that_only_names_has_no_events() -> None:
    procedure = sound(step("Take {funnel} and {15 min} and {5 mL acid}.", "Do {stir A}."))

    assert [(s.number, len(s.events)) for s in procedure.steps] == [(1, 0), (2, 1)]


@pytest.mark.parametrize(
    "mark",
    ["5 Mg salt -> A", "5 Mg salt", "5 Mg", "5 Mg from A -> B", "dry A with 5 Mg salt",
     "12 Mg salt per g mixture -> A"]
)  # fmt: skip
def test_quantity_beyond_any_laboratory_is_doubted_wherever_it_stands(mark: str) -> None:
    finding = only(step(f"Do {{{mark}}}."))
    number = "12" if "12" in mark else "5"

    assert (finding.code.number, finding.span.text) == ("Q113", f"{number} Mg")
    assert finding.help == f"see whether `{number} mg` is meant"


@pytest.mark.parametrize("verb", sorted(set(VERBS) - {"suppose", "next period", "take", "wait"}))
def test_every_verb_takes_words_and_a_time(verb: str) -> None:
    target = "neutral in A" if verb == "react" else "A"
    example = {"reagent": "water", "point": "pH 7", "vessel": "B"}
    clauses = [
        f"{word} {example[VERBS[verb].clauses[word].split('|')[0]]}"
        for word in VERBS[verb].needed
        if word != "in"
    ]
    mark = " ".join([verb, target, *clauses, 'for 2 min until "it is done"'])

    assert faults(step(f"Do {{{mark}}}.")) == ()


def test_dimension_of_a_portion_is_kept() -> None:
    charges = events("Do {5 g salt + 5 mL acid + 5 mmol salt + 5 drops acid -> A}.")
    assert isinstance(charges[0], model.Charge)

    assert [p.quantity.dimension for p in charges[0].portions if p.quantity] == [
        dim.MASS,
        dim.VOLUME,
        dim.AMOUNT,
        dim.COUNT,
    ]


def test_clauses_are_kept_as_read() -> None:
    operation = event("stir A at 300 rpm, open")
    assert isinstance(operation, model.Operation)

    assert [c.word for c in operation.clauses] == ["at", "closure"]
    assert isinstance(operation.clauses[0].value, syntax.Measured)
