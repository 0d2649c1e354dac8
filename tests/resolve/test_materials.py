"""Materials: every form of their description, and what cannot be read."""

from __future__ import annotations

import pytest

from builders import faults, judged, only, places, sound
from watchglass.resolve import model

FILES = {
    "stocks.yml": "hcl-3:\n  names: [dilute acid]\n  material: 3.0 M hydrochloric acid\n"
    "bad:\n  material: 3.0 N hydrochloric acid\nloop:\n  material: loop\n",
    "substances/own.yml": "mystery:\n  names: [mystery]\n  sources: from memory\n",
}

# fmt: off
SOUND = [
    ("water", "pure water"),
    ("tert-butyl methyl ether", "pure tert-butyl-methyl-ether"),
    ("TERT-butyl  methyl ether", "pure tert-butyl-methyl-ether"),
    ("3.0 M hydrochloric acid", "3.0 M hydrogen-chloride in water"),
    ("ca. 0.10 M sodium hydroxide", "ca. 0.10 M sodium-hydroxide in water"),
    ("0.5 mol/L sodium hydroxide", "0.5 mol/L sodium-hydroxide in water"),
    ("5.0 % w/v sodium hydrogencarbonate", "5.0 % w/v sodium-hydrogencarbonate in water"),
    ("98 % w/w sulfuric acid", "98 % w/w sulfuric-acid in water"),
    ("70 % v/v ethanol", "70 % v/v ethanol in water"),
    ("1 % w/v phenolphthalein in ethanol", "1 % w/v phenolphthalein in ethanol"),
    ("0.5 mol/kg sodium chloride", "0.5 mol/kg sodium-chloride in water"),
    ("10 g/L sodium chloride", "10 g/L sodium-chloride in water"),
    ("saturated sodium chloride", "saturated sodium-chloride in water"),
    ("saturated aqueous sodium chloride", "saturated sodium-chloride in water"),
    ("saturated benzoic acid in ethanol", "saturated benzoic-acid in ethanol"),
    ("sodium sulfate, anhydrous", "pure sodium-sulfate"),
    ("acetic acid, glacial", "pure acetic-acid"),
    ("hcl-3", "3.0 M hydrogen-chloride in water"),
    ("dilute acid", "3.0 M hydrogen-chloride in water"),
    ("HCL-3", "3.0 M hydrogen-chloride in water"),
    ("mystery", "pure mystery"),
    ("{composition: unknown, is: tea leaves}", "unknown tea leaves"),
    ("{composition: unknown}", "unknown x"),
    ("{from: OC-03, vessel: tared}", "continued OC-03, tared"),
    ("{one-of: {A: caffeine, B: benzoic-acid}, as: 1 % w/v in ethanol}", "secret {A: caffeine, B: benzoic-acid} 1 % w/v ethanol"),
    ("{one-of: {A: caffeine, B: benzoic-acid}}", "secret {A: caffeine, B: benzoic-acid} None None"),
    ("{one-of: {A: caffeine}, as: in ethanol}", "secret {A: caffeine} None ethanol"),
    ("{contains: {benzocaine: 1 mol, benzoic-acid: 1 mol}}", "mixture by amount benzocaine 1 mol, benzoic-acid 1 mol"),
    ("{contains: {benzocaine: 1 g, benzoic-acid: 2 g}, provided: 3 g}", "mixture by mass benzocaine 1 g, benzoic-acid 2 g"),
    ("{contains: {ethanol: 1 mL, water: 2 mL}}", "mixture by volume ethanol 1 mL, water 2 mL"),
    ("{contains: {sodium-chloride: 0.1 M, potassium-chloride: 0.2 M}, in: water}", "mixture by strength sodium-chloride 0.1 M, potassium-chloride 0.2 M in water"),
    ("{is: 3.0 M hydrochloric acid, provided: 5 g}", "3.0 M hydrogen-chloride in water"),
    ("{is: water, provided: 5 g for the class}", "pure water"),
    ("{is: water, provided: 3 drops}", "pure water"),
    ("ammonia", "pure ammonia"),
    ("5 % w/w hydrochloric acid", "5 % w/w hydrogen-chloride in water"),
    ("2-propanol", "pure propan-2-ol"),
    ("9-fluorenone", "pure 9-fluorenone"),
    ("4.0 M 2-propanol", "4.0 M propan-2-ol in water"),
    ("1–2 M sodium hydroxide", "1–2 M sodium-hydroxide in water"),
]
#: Description, code, what is underlined, message, help.
FAULTS = [
    ("{composition: known}", "N145", "known", "`composition` takes `unknown`, not `known`", "write `composition: unknown`, or say what it is with `contains:` or `is:`"),
    ("{one-of: {A: caffeine, B: zzz}, as: 1 % w/v}", "K101", "zzz", "`zzz` is not in the catalogue", "add it to a file in `substances/`, or name it as the catalogue does"),
    ("{one-of: {A: caffeine}, as: 1 % in ethanol}", "Q107", "1 %", "`1 %` does not say of what: by mass or by volume", "write `1 % w/v in ethanol` for grams in 100 mL, `w/w` for grams in 100 g, or `v/v`"),
    ("{one-of: {A: caffeine}, as: 1 % w/v ethanol}", "K111", "ethanol", "`ethanol` cannot stand here", "write `as: 1 % w/v in ethanol`"),
    ("{one-of: {A: [x]}}", "N145", "[x]", "a candidate is named by one substance", "write `{A: caffeine, B: paracetamol}`"),
    ("{contains: {benzocaine: 1 g, benzoic-acid: 1 mol}}", "Q112", "benzoic-acid", "`1 g` and `1 mol` are not of one kind", "give every part by amount, every part by mass, or every part by volume"),
    ("{contains: {sodium-chloride: 0.1 M}}", "Q112", "sodium-chloride", "`0.1 M` is an amount concentration; a ratio belongs here", "write `1 mol`, `1 g` or `1 mL`, or name the solvent with `in:`"),
    ("{contains: {sodium-chloride: 1 g}, in: water}", "Q112", "sodium-chloride", "`1 g` is no strength, and a solvent is named", "give each part as a strength, as in `0.10 M`, or take `in:` out"),
    ("{contains: {sodium-chloride: 1 °C}}", "Q112", "sodium-chloride", "`1 °C` is a temperature; a ratio belongs here", "write `1 mol`, `1 g` or `1 mL`, or name the solvent with `in:`"),
    ("{contains: {zzz: 1 g}}", "K101", "zzz", "`zzz` is not in the catalogue", "add it to a file in `substances/`, or name it as the catalogue does"),
    ("{contains: {water: [1]}}", "N145", "[1]", "a part of a mixture takes a quantity", "write `{benzoic-acid: 1 mol, naphthalene: 1 mol}`"),
    ("{contains: {}}", "N144", "contains", "`x` does not say what it is", "add `is: 3.0 M hydrochloric acid` or `contains: {…}`"),
    ("{is: hydrochloric acid}", "K111", "hydrochloric acid", "`hydrochloric acid` does not say how strong it is", "write its strength before it, as in `3.0 M hydrochloric acid`"),
    ("{provided: 5 mL}", "N144", "x", "`x` does not say what it is", "add `is: 3.0 M hydrochloric acid` or `contains: {…}`"),
    ("{is: water, provided: 5 °C}", "Q109", "5 °C", "`5 °C` is a temperature; a mass or a volume belongs here", "write what a station is handed, as in `0.900 g`"),
    ("{is: water, provided: 5}", "Q104", "5", "`5` has no unit", "write what a station is handed, as in `5 g`"),
    ("hydrochloric acid", "K111", "hydrochloric acid", "`hydrochloric acid` does not say how strong it is", "write its strength before it, as in `3.0 M hydrochloric acid`"),
    ("aqueous ammonia", "K111", "aqueous ammonia", "`aqueous ammonia` does not say how strong it is", "write its strength before it, as in `3.0 M aqueous ammonia`"),
    ("zzz", "K101", "zzz", "`zzz` is not in the catalogue", "add it to a file in `substances/`, or name it as the catalogue does"),
    ("benzocane", "K101", "benzocane", "`benzocane` is not in the catalogue", "did you mean `benzocaine` or `benzoin` or `benzene`?"),
    ("3.0 M zzz", "K101", "zzz", "`zzz` is not in the catalogue", "add it to a file in `substances/`, or name it as the catalogue does"),
    ("3.0 M hydrochloric acid in zzz", "K101", "zzz", "`zzz` is not in the catalogue", "add it to a file in `substances/`, or name it as the catalogue does"),
    ("3.0 M", "K111", "3.0 M", "`3.0 M` does not say of what substance", "write the substance after the strength"),
    ("3.0 hydrochloric acid", "Q104", "3.0", "`3.0` before `hydrochloric` has no unit", "write the strength with its unit, as in `3.0 M hydrochloric acid`"),
    ("3.0 N hydrochloric acid", "Q106", "3.0 N", "normality depends on the reaction; `N` is the newton", "write the amount concentration: `3.0 M` where one proton or electron counts, less where one molecule gives several"),
    ("5 % hydrochloric acid", "Q107", "5 %", "`5 %` does not say of what: by mass or by volume", "write `5 % w/v hydrochloric acid` for grams in 100 mL, `w/w` for grams in 100 g, or `v/v`"),
    ("150 % w/w hydrochloric acid", "Q117", "150 % w/w", "`150 % w/w` is more than the whole", "give a strength of at most 100 %"),
    ("5 g hydrochloric acid", "Q109", "5 g", "`5 g` is a mass; a strength belongs here", "write the amount in the steps, and here the strength, as in `0.50 M`"),
    ("1,5 M hydrochloric acid", "Q102", "1,5", "`1,5` is written with a comma", "write `1.5`"),
    ("5 zz hydrochloric acid", "Q105", "zz", "`zz` is no unit", "take one of the units in the list, such as `g`, `mL`, `mmol`, `min`"),
    ("3.0 M hydrochloric acid in water in ethanol", "K101", "hydrochloric acid in water", "`hydrochloric acid in water` is not in the catalogue", "did you mean `hydrochloric acid`?"),
    ("saturated zzz", "K101", "zzz", "`zzz` is not in the catalogue", "add it to a file in `substances/`, or name it as the catalogue does"),
    ("saturated", "K101", "saturated", "`saturated` is not in the catalogue", "add it to a file in `substances/`, or name it as the catalogue does"),
    ("NaOH", "K101", "NaOH", "`NaOH` is not in the catalogue", "did you mean `sodium hydroxide`?"),
    ("0.1 M NaOH", "K101", "NaOH", "`NaOH` is not in the catalogue", "did you mean `sodium hydroxide`?"),
    ("[water]", "N145", "[water]", "a material takes a mapping, not a list", "write `key:` and set the fields in on the lines below"),
    ("{water: 1}", "N143", "water", "`water` is no field of a material", "take one of `contains`, `in`, `density`, `also`, `provided`, `composition`, `is`, `from`, `vessel`, `one-of`, `as`"),
    ("{is: {a: b}}", "N145", "{a: b}", "`is` takes text, not a mapping", "write `key: some words`"),
    ("{zz: 1}", "N143", "zz", "`zz` is no field of a material", "take one of `contains`, `in`, `density`, `also`, `provided`, `composition`, `is`, `from`, `vessel`, `one-of`, `as`"),
    ("{is: water, zz: 1}", "N143", "zz", "`zz` is no field of a material", "take one of `contains`, `in`, `density`, `also`, `provided`, `composition`, `is`, `from`, `vessel`, `one-of`, `as`"),
    ("3.0 mollar hydrochloric acid", "Q105", "mollar", "`mollar` is no unit", "take one of the units in the list, such as `g`, `mL`, `mmol`, `min`"),
    ("{one-of: {}}", "N144", "one-of", "`x` does not say what it is", "add `is: 3.0 M hydrochloric acid` or `contains: {…}`"),
]
# fmt: on


def front(description: str) -> str:
    return f"materials:\n  x: {description}\nvessels: {{A: beaker 50 mL}}"


def material(description: str) -> model.Material:
    entry = judged("1. Here is {x}.", front(description), FILES)
    assert places(faults(entry)) == []
    return entry.procedure.materials["x"]


def told(composition: model.Composition) -> str:
    """Write a composition out."""
    match composition:
        case model.Pure(substance):
            return f"pure {substance.key}"
        case model.Solution(strength, solute, solvent):
            return f"{strength.quantity.text} {solute.key} in {solvent.key}"
        case model.Saturated(solute, solvent):
            return f"saturated {solute.key} in {solvent.key}"
        case model.Mixture(parts, basis, solvent):
            listed = ", ".join(f"{p.substance.key} {p.quantity.text}" for p in parts)
            return f"mixture by {basis} {listed}" + (f" in {solvent.key}" if solvent else "")
        case model.Secret(candidates, strength, solvent):
            keys = {letter: substance.key for letter, substance in candidates.items()}
            listed = str(keys).replace("'", "")
            of = strength.quantity.text if strength else None
            return f"secret {listed} {of} {solvent.key if solvent else None}"
        case model.Continued(code, vessel):
            return f"continued {code}, {vessel}"
        case model.Unknown(what, _):
            return f"unknown {what}"


@pytest.mark.parametrize(("description", "composition"), SOUND)
def test_description_is_understood(description: str, composition: str) -> None:
    assert told(material(description).composition) == composition


@pytest.mark.parametrize(("description", "code", "marked", "message", "help_"), FAULTS)
def test_description_that_cannot_be_understood_is_one_finding_in_its_place(
    description: str, code: str, marked: str, message: str, help_: str
) -> None:
    finding = only(judged("1. Here is {x}.", front(description), FILES))

    assert (finding.code.number, finding.span.text) == (code, marked)
    assert (finding.message, finding.help) == (message, help_)


@pytest.mark.parametrize("description", [d for d, *_ in FAULTS if not d.startswith(("{", "["))])
def test_what_is_not_understood_is_unknown_and_not_declared_so(description: str) -> None:
    found = judged("1. Here is {x}.", front(description), FILES).procedure.materials["x"]

    assert found.composition == model.Unknown(description, declared=False)


def test_unknown_by_declaration_is_no_fault_and_known_to_be_so() -> None:
    found = material("{composition: unknown, is: tea leaves}")

    assert found.composition == model.Unknown("tea leaves", declared=True)


@pytest.mark.parametrize("name", ["hcl-3", "HCL-3", "dilute acid", "Dilute Acid"])
def test_stock_is_known_by_key_and_by_name(name: str) -> None:
    assert material(name).stock == "hcl-3"


def test_fault_of_a_stock_is_found_where_the_stock_is_written() -> None:
    finding = only(judged("1. Use {5 mL x -> A}.", front("bad"), FILES))

    assert (finding.span.source.name, finding.span.text) == ("stocks.yml", "3.0 N")


def test_stock_that_names_itself_does_not_turn_round() -> None:
    finding = only(judged("1. Use {5 mL x -> A}.", front("loop"), FILES))

    assert (finding.code.number, finding.span.source.name) == ("K101", "stocks.yml")


@pytest.mark.parametrize(
    ("provided", "text", "for_class"),
    [
        ("0.900 g", "0.900 g", False),
        ("5.0 mL", "5.0 mL", False),
        ("5 mmol", "5 mmol", False),
        ("3 drops", "3 drops", False),
        ("1–2 g", "1–2 g", False),
        ("500 mL for the class", "500 mL", True),
        ("500 mL  for the class ", "500 mL", True),
    ],
)
def test_what_is_provided_is_read(provided: str, text: str, for_class: bool) -> None:
    found = material(f"{{is: water, provided: '{provided}'}}")

    assert found.provided is not None
    assert (found.provided.text, found.for_class) == (text, for_class)


@pytest.mark.parametrize(
    ("provided", "code", "marked"),
    [
        ("5", "Q104", "5"),
        ("5 °C", "Q109", "5 °C"),
        ("5 %", "Q109", "5 %"),
        ("1 000 mL", "Q103", "1 000"),
        ("some", "Q101", "some"),
        ("5 g each", "Q101", "each"),
    ],
)
def test_what_is_provided_is_an_amount(provided: str, code: str, marked: str) -> None:
    entry = judged("1. Use {x}.", front(f"{{is: water, provided: {provided}}}"))

    assert places(faults(entry)) == [(code, marked)]


def test_place_of_a_strength_is_kept_with_it() -> None:
    composition = material("3.0 M hydrochloric acid").composition

    assert isinstance(composition, model.Solution)
    assert composition.strength.span.text == "3.0 M"


def test_sets_own_substance_wins_over_the_shipped_one() -> None:
    files = {"substances/own.yml": "ethanol:\n  names: [spirit]\n  sources: from memory\n"}
    entry = judged("1. Here is {x}.", front("ethanol"), files)
    composition = sound(entry).materials["x"].composition

    assert isinstance(composition, model.Pure)
    assert composition.substance.names == ("spirit",)
