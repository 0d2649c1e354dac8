"""Typing of expressions: dimensions that go together, what each function takes, units of figures."""

from __future__ import annotations

import pytest

from builders import NAMES, faults, judged, only, places, step, steps
from watchglass.resolve.typing import FUNCTIONS

BEFORE = "Do {5 mL acid -> A; 5 mL base -> B; 1 g salt -> A}{label end}{? own: mass in g}."

# fmt: off
#: An expression, and what its value is; None where that is not known before the bench is run.
SOUND = [
    ("20 °C - 5 °C", "a temperature difference"),
    ("20 °C + 5 K", "a temperature"),
    ("5 g * 3 mL", "a quantity in m^3·kg"),
    ("5 g / 3 mL in g/mL", "a mass per volume"),
    ("5 g in mg", "a mass"),
    ("5 g / 2 g in 1", "a plain number"),
    ("5 g / 2 g in %", "a plain number"),
    ("80 % in 1", "a share"),
    ("mass(acid)", "a mass"),
    ("mass(A)", "a mass"),
    ("mass(5 g acid)", "a mass"),
    ("moles(acid) in mmol", "an amount of substance"),
    ("volume(acid)", "a volume"),
    ("strength(acid) in mol/L", "an amount concentration"),
    ("molar-mass(salt)", "a molar mass"),
    ('molar-mass("NaCl")', "a molar mass"),
    ("molar-mass(benzocaine)", "a molar mass"),
    ("density(ether) in g/mL", "a mass per volume"),
    ("theoretical-yield(neutral) in g", "a mass"),
    ("limiting(neutral)", None),
    ("recovered(salt in A)", "a mass"),
    ("fraction(salt in A)", "a share"),
    ("ph(A)", "a plain number"),
    ("pH of A", "a plain number"),
    ("pH(A) + 1", "a plain number"),
    ("titre(end)", "a volume"),
    ("melts(benzoic-acid)", "a temperature"),
    ("melts(benzoic-acid) in °C", "a temperature"),
    ("melts(benzoic-acid) - 5 K", "a temperature"),
    ("boils(ether) in K", "a temperature"),
    ("mean(5 g, 6 g)", "a mass"),
    ("min(5 g)", "a mass"),
    ("ln(2)", "a plain number"),
    ("ln(5 g / 2 g)", "a plain number"),
    ("ln(80 %)", "a plain number"),
    ("sqrt(4)", "a plain number"),
    ("sqrt(4 cm^2)", "a length"),
    ("sqrt(4 g)", None),
    ("round(5.5 g, 1)", "a mass"),
    ("label(end)", None),
    ("step(end)", "a plain number"),
    ("balance(H2 + O2 -> H2O)", None),
    ("convert(5 g, mg)", "a mass"),
    ("5 g ^ 2", "a quantity in kg^2"),
    ("2 ^ 0.5", "a plain number"),
    ("salt in A", "a share"),
    ("mass(acid) after label(end)", "a mass"),
    ("own * 2", "a mass"),
    ("5 g + own", "a mass"),
    ("5 drops + 3", "a count"),
    ("5 %  + 5 % w/w", "a share"),
    ("80 % + 1", "a share"),
    ("20 °C - 5 °C in K", "a temperature difference"),
    ("recovered(mixture in A)", "a mass"),
    ("fraction(benzocaine in A) * 2", "a plain number"),
    ("mean(own, 5 g)", "a mass"),
    ("round(20 °C, 0)", "a temperature"),
    ("sqrt(4 m^2) in cm", "a length"),
    ("sqrt(4 m^3)", None),
    ("(5 g) * (3 mL)", "a quantity in m^3·kg"),
    ("pH of tube-1", "a plain number"),
]
#: An expression, code, what is underlined, message, help.
FAULTS = [
    ("5 g + 3 mL", "Q112", "5 g + 3 mL", "a mass and a volume are added", "turn one into the other through a density"),
    ("5 g + 3 mmol", "Q112", "5 g + 3 mmol", "a mass and an amount of substance are added", "turn one into the other through a molar mass, as in `moles(…)`"),
    ("5 g - 3 °C", "Q112", "5 g - 3 °C", "a mass and a temperature are taken from each other", None),
    ("20 °C + 5 °C", "Q112", "20 °C + 5 °C", "two temperature points cannot be added", "add a difference in K"),
    ("20 °C * 2", "Q112", "20 °C * 2", "a temperature point is neither multiplied nor divided", None),
    ("- 20 °C", "Q112", "- 20 °C", "a temperature point has no negative", None),
    ("5 g / 3 mL in g", "Q109", "g", "the value is a mass per volume; `g` is the unit of a mass", "name a unit of the value, or mend the expression"),
    ("5 g in 1", "Q109", "1", "the value is a mass; `1` is the unit of a plain number", "name a unit of the value, or mend the expression"),
    ("mass(zz)", "N163", "zz", "`zz` is declared nowhere", "declare it under `materials:`"),
    ("mass(5 g)", "N167", "5 g", "`5 g` does not say of what", "write it as in `moles(acid)`"),
    ("mass(acid) + volume(acid)", "Q112", "mass(acid) + volume(acid)", "a mass and a volume are added", "turn one into the other through a density"),
    ("moles(acid) in g", "Q109", "g", "the value is an amount of substance; `g` is the unit of a mass", "name a unit of the value, or mend the expression"),
    ("strength(acid) in g/L", "Q109", "g/L", "the value is an amount concentration; `g/L` is the unit of a mass per volume", "name a unit of the value, or mend the expression"),
    ("theoretical-yield(A)", "N164", "A", "`A` is a vessel; a reaction or its product belongs here", "name a reaction or its product"),
    ("theoretical-yield(acid)", "N167", "acid", "no reaction makes `acid`", "name a reaction or its product: `neutral`, `sodium-chloride`, `water`"),
    ("theoretical-yield(5 g)", "N167", "5 g", "the name of a reaction or of its product belongs here", None),
    ("recovered(salt)", "N167", "salt", "`recovered` takes a substance in a vessel", "write it as in `recovered(ester in receiver)`"),
    ("recovered(5 g in A)", "N167", "5 g", "a substance stands before `in`", "write it as in `fraction(ester in receiver)`"),
    ("recovered(salt in acid)", "N164", "acid", "`acid` is a material; a vessel belongs here", "name a vessel"),
    ("ph(acid)", "N164", "acid", "`acid` is a material; a vessel belongs here", "name a vessel"),
    ("titre(zz)", "N163", "zz", "`zz` is declared nowhere", "name a label: `end`"),
    ("mean(5 g, 6 mL)", "Q112", "6 mL", "a mass and a volume stand together", "turn one into the other through a density"),
    ("mean()", "N167", "mean()", "`mean` takes 1 value, not 0", "write it as in `mean(a, b)`"),
    ("ln(5 g)", "N167", "5 g", "`ln` takes a plain number, not a mass", "write it as in `ln(2)`"),
    ("log(2, 3)", "N167", "log(2, 3)", "`log` takes 1 value, not 2", "write it as in `log(2)`"),
    ("round(5.5 g)", "N167", "round(5.5 g)", "`round` takes 2 values, not 1", "write it as in `round(v, 2)`"),
    ("round(5.5 g, 1 g)", "N167", "1 g", "`round` takes a plain number, not a mass", "write it as in `round(v, 2)`"),
    ("convert(5 g, mL)", "Q112", "mL", "a mass and a volume stand together", "turn one into the other through a density"),
    ("convert(5 g, zz)", "Q105", "zz", "`zz` is no unit", "take one of the units in the list, such as `g`, `mL`, `mmol`, `min`"),
    ("5 g ^ 0.5", "Q112", "5 g ^ 0.5", "a mass is raised to a power that is no whole number", None),
    ("5 g ^ (2 g)", "Q112", "2 g", "a mass is no exponent", None),
    ("2 ^ (5 g)", "Q112", "5 g", "a mass is no exponent", None),
    ("foo(5 g)", "N166", "foo", "`foo` is no function", "take one of `moles`, `mass`, `volume`, `strength`, `molar-mass`, `density`, `theoretical-yield`, `limiting`, `recovered`, `fraction`, `ph`, `titre`, `melts`, `boils`, `mean`, `min`, `max`, `ln`, `log`, `sqrt`, `round`, `label`, `step`, `balance`, `convert`"),
    ("mas(acid)", "N166", "mas", "`mas` is no function", "did you mean `mass`?"),
    ("(5 g >= 3 g)", "N119", "5 g >= 3 g", "a comparison has no figure to show", "move it to a line of `expect:` in the front matter"),
    ("(5 g >= 3 mL)", "N119", "5 g >= 3 mL", "a comparison has no figure to show", "move it to a line of `expect:` in the front matter"),
    ("salt in acid", "N164", "acid", "`acid` is a material; a vessel belongs here", "name a vessel"),
    ("mass(acid) after end", "N167", "end", "`after` takes a label, as in `after label(end)`", "write it as in `label(end)`"),
    ("mass(acid) after 5", "N167", "5", "`after` takes a label, as in `after label(end)`", "write it as in `label(end)`"),
    ("pH", "N163", "pH", "`pH` is declared nowhere", "name a record: `own`"),
    ("20 °C - 5 °C in °C", "Q109", "°C", "the value is a temperature difference; `°C` is the unit of a temperature", "write `in K` for a difference"),
    ("convert(20 °C - 5 °C, °C)", "Q112", "°C", "a temperature difference and a temperature stand together", None),
    ("mass(acid, base)", "N167", "mass(acid, base)", "`mass` takes 1 value, not 2", "write it as in `mass(acid)`"),
    ("min(5 g, 6 mg, 7 mL)", "Q112", "7 mL", "a mass and a volume stand together", "turn one into the other through a density"),
    ("own + 5 mL", "Q112", "own + 5 mL", "a mass and a volume are added", "turn one into the other through a density"),
    ("1 - own", "Q112", "1 - own", "a plain number and a mass are taken from each other", None),
    ('theoretical-yield("x")', "N167", '"x"', "no reaction makes `x`", "name a reaction or its product: `neutral`, `sodium-chloride`, `water`"),
    ("ln(melts(benzoic-acid))", "N167", "melts(benzoic-acid)", "`ln` takes a plain number, not a temperature", "write it as in `ln(2)`"),
    ("5 g ^ -1 in 1", "Q109", "1", "the value is a quantity in kg^-1; `1` is the unit of a plain number", "name a unit of the value, or mend the expression"),
    ("moles(lamp)", "N164", "lamp", "`lamp` is equipment; a material belongs here", "name a material"),
]
# fmt: on


@pytest.mark.parametrize(("expression", "words"), SOUND)
def test_value_has_its_dimension(expression: str, words: str | None) -> None:
    entry = step(BEFORE, f"Then {{? x: what is found = {expression}}}.")
    dimension = entry.procedure.records[-1].dimension

    assert places(faults(entry)) == []
    assert (dimension.words if dimension else None) == words


@pytest.mark.parametrize(("expression", "code", "marked", "message", "help_"), FAULTS)
def test_what_does_not_go_together_is_one_finding_in_its_place(
    expression: str, code: str, marked: str, message: str, help_: str | None
) -> None:
    finding = only(step(BEFORE, f"Then {{= {expression}}}."))

    assert (finding.code.number, finding.span.text) == (code, marked)
    assert (finding.message, finding.help) == (message, help_)


@pytest.mark.parametrize("name", [n for n in FUNCTIONS if n != "label"])
def test_example_of_each_function_has_the_form_it_asks_for(name: str) -> None:
    front = (
        "materials: {acid: 3.0 M hydrochloric acid, ether: tert-butyl methyl ether,"
        " base: 1.0 M sodium hydroxide}\n"
        "vessels: {flask: beaker 50 mL, receiver: beaker 50 mL}\n"
        "reactions: {ester: HCl + NaOH -> NaCl + H2O}"
    )
    example = FUNCTIONS[name].example.replace("ester in", "acid in")
    body = f"1. Do {{5 mL acid -> flask}}{{label end}}{{? a: one in g}}{{? b: two in g}}{{? v: three in mL}}{{= {example}}}."

    assert places(faults(judged(body, front))) == []


@pytest.mark.parametrize(
    "line",
    [
        "salt in A >= 95 %",
        "salt in A after label(end) >= 95 %",
        "pH of A in 9–11",
        "pH of A after label(end) in 9–11",
        "recovered(salt in A) >= 1.0 g",
        "titre(end) in 20–45 mL",
        "mass(acid) < 100 g",
        "own <= 5 g",
    ],
)
def test_expectation_compares(line: str) -> None:
    entry = judged(steps(BEFORE), f"{NAMES}expect:\n  - {line}\n")

    assert places(faults(entry)) == []
    assert [e.written for e in entry.procedure.expectations] == [line]


@pytest.mark.parametrize(
    ("line", "code", "marked"),
    [
        ("salt in A >= 5 g", "Q112", "salt in A >= 5 g"),
        ("pH of A in 9–11 mL", "Q112", "pH of A in 9–11 mL"),
        ("titre(end) in 20–45 g", "Q112", "titre(end) in 20–45 g"),
        ("titre(ende) in 20–45 mL", "N163", "ende"),
        ("zzz in A >= 95 %", "N163", "zzz"),
        ("salt in zzz >= 95 %", "N163", "zzz"),
        ("salt in A >= ", "N119", ">="),
        ("salt in A", "N119", "salt in A"),
        ("mass(acid)", "N119", "mass(acid)"),
        ("5 g >= 3 g >= 1 g", "N119", ">="),
        ("salt in A >= 1,5 %", "Q102", "1,5"),
    ],
)
def test_expectation_that_cannot_be_met_or_missed_is_found(
    line: str, code: str, marked: str
) -> None:
    entry = judged(steps(BEFORE), f"{NAMES}expect:\n  - '{line}'\n")

    assert places(faults(entry)) == [(code, marked)]


def test_label_may_stand_after_what_names_it() -> None:
    assert faults(step("Then {= titre(end) in mL}.", "Do {stir A}{label end}.")) == ()


def test_record_is_known_to_later_ones_only() -> None:
    assert faults(step("{? a: one in g}, {? b: two in g = a * 2}.")) == ()
    assert places(faults(step("{? b: two in g = a * 2}, {? a: one in g}."))) == [("N163", "a")]


@pytest.mark.parametrize(
    ("record", "code", "marked"),
    [
        ("? x: mass in g = 5 mL", "Q109", "g"),
        ("? x: volume in mL = own", "Q109", "mL"),
        ("? x: share in 1 = 5 g", "Q109", "1"),
        ("? x: rise in °C = 20 °C - 5 °C", "Q109", "°C"),
    ],
)
def test_unit_of_a_record_is_of_the_dimension_of_its_value(
    record: str, code: str, marked: str
) -> None:
    assert places(faults(step(BEFORE, f"Then {{{record}}}."))) == [(code, marked)]


def test_record_keeps_label_unit_step_and_dimension() -> None:
    entry = step("Do {stir A}.", 'Note {? m: mass of it in mg}, {? colour = "red"}, {? Rf in 1}.')
    first, second, third = entry.procedure.records

    assert (first.name, first.label, first.unit, first.step) == ("m", "mass of it", "mg", 2)
    assert first.dimension is not None
    assert first.dimension.words == "a mass"
    assert (second.label, second.unit, second.dimension) == ("colour", "", None)
    assert (third.label, third.unit) == ("Rf", "")
