"""Reactions: terms bound to materials, balance, and each fault at its term."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from builders import NAMES, faults, judged, only, places

if TYPE_CHECKING:
    from watchglass.resolve import model

WAS = "  neutral: HCl + NaOH -> NaCl + H2O"


def front(described: str) -> str:
    assert NAMES.count(WAS) == 1
    quoted = described if described[:1] in "{[" else f"'{described}'"
    return NAMES.replace(WAS, f"  neutral: {quoted}")


def reaction(described: str) -> model.Reaction:
    entry = judged("Words.", front(described))
    assert places(faults(entry)) == []
    return entry.procedure.reactions["neutral"]


def bound(side: tuple[model.Species, ...]) -> list[tuple[str, str | None, str]]:
    """Give what each term is bound to: as written, substance, material."""
    return [(s.written, s.substance.key if s.substance else None, s.material) for s in side]


@pytest.mark.parametrize(
    "equation",
    [
        "HCl + NaOH -> NaCl + H2O",
        "acid + base -> salt + water",
        "hydrochloric acid + sodium hydroxide -> sodium chloride + water",
        "hydrogen-chloride + NaOH -> sodium-chloride + H2O",
        "{equation: HCl + NaOH -> NaCl + H2O}",
    ],
)
def test_term_is_bound_by_local_name_name_key_or_formula(equation: str) -> None:
    read = reaction(equation)

    assert [(key, material) for _, key, material in bound(read.left)] == [
        ("hydrogen-chloride", "acid"),
        ("sodium-hydroxide", "base"),
    ]
    assert [(key, material) for _, key, material in bound(read.right)] == [
        ("sodium-chloride", "salt"),
        ("water", "water"),
    ]
    assert read.balanced


@pytest.mark.parametrize(
    ("equation", "left", "right"),
    [
        ("C9H11NO2 + HCl -> C9H12NO2Cl",
         [("C9H11NO2", "benzocaine", "mixture"), ("HCl", "hydrogen-chloride", "acid")],
         [("C9H12NO2Cl", None, "")]),
        ("benzocaine + HCl -> benzocainium-chloride",
         [("benzocaine", "benzocaine", "mixture"), ("HCl", "hydrogen-chloride", "acid")],
         [("benzocainium-chloride", "benzocainium-chloride", "")]),
        ("H^+ + OH^- -> H2O", [("H^+", None, ""), ("OH^-", None, "")], [("H2O", "water", "water")]),
        ("Fe^3+ + e^- -> Fe^2+", [("Fe^3+", None, ""), ("e^-", None, "")], [("Fe^2+", None, "")]),
    ],
)  # fmt: skip
def test_component_of_a_mixture_and_ion_are_bound_as_far_as_they_are_known(
    equation: str,
    left: list[tuple[str, str | None, str]],
    right: list[tuple[str, str | None, str]],
) -> None:
    read = reaction(equation)

    assert (bound(read.left), bound(read.right), read.balanced) == (left, right, True)


def test_coefficients_and_places_are_kept() -> None:
    read = judged("Words.", front("2 HCl + Na2CO3 -> 2 NaCl + H2O + CO2")).procedure.reactions[
        "neutral"
    ]

    assert [s.coefficient for s in (*read.left, *read.right)] == [2, 1, 2, 1, 1]
    assert [s.span.text for s in (*read.left, *read.right)] == [
        "HCl",
        "Na2CO3",
        "NaCl",
        "H2O",
        "CO2",
    ]


#: Description, code, what is underlined, message, help.
FAULTS = [
    ("2 HCl + NaOH -> NaCl + H2O", "S102", "'2 HCl + NaOH -> NaCl + H2O'", "the equation does not balance: the right lacks 1 Cl, 1 H", "add `HCl` on the right"),
    ("HCl + NaOH -> NaCl", "S102", "'HCl + NaOH -> NaCl'", "the equation does not balance: the right lacks 2 H, 1 O", "add `H2O` on the right"),
    ("HCl + Na2CO3 -> NaCl + H2O + CO2", "S102", "'HCl + Na2CO3 -> NaCl + H2O + CO2'", "the equation does not balance: the left lacks 1 H; the right lacks 1 Na", "write `2 HCl + Na2CO3 -> 2 NaCl + H2O + CO2`"),
    ("Fe^3+ -> Fe^2+", "S102", "'Fe^3+ -> Fe^2+'", "the equation does not balance: the charge differs by 1", "add what is missing, or mend a formula"),
    ("HCl + NaOH = NaCl + H2O", "S101", "=", "`=` is no arrow", "write `HCl + NaOH -> NaCl + H2O`"),
    ("HCl + NaOH", "S101", "HCl + NaOH", "the arrow is missing", "write `reactants -> products`"),
    ("-> NaCl", "S101", "->", "nothing stands before the arrow", None),
    ("HCl ->", "S101", "->", "nothing stands after the arrow", None),
    ("HCl + zzz -> NaCl", "S103", "zzz", "`zzz` is neither a known substance nor a formula", "write its formula, or add it to a file in `substances/`"),
    ("HCl + benzocane -> NaCl", "S103", "benzocane", "`benzocane` is neither a known substance nor a formula", "did you mean `benzocaine` or `benzoin` or `benzene`?"),
    ("HCl + Na2Xx -> NaCl", "K103", "Xx", "`Xx` is no element", None),
    ("mixture + HCl -> NaCl", "S103", "mixture", "`mixture` holds several substances", "name the one that reacts: `benzocaine`, `benzoic-acid`"),
    ("{equation: HCl + NaOH -> NaCl + H2O, limiting: salt}", "S113", "salt", "`salt` is no reactant of this equation", "name one of `acid`, `base`"),
    ("{equation: HCl + NaOH -> NaCl + H2O, limiting: baze}", "S113", "baze", "`baze` is no reactant of this equation", "did you mean `base`?"),
    ("{equation: HCl + NaOH -> NaCl + H2O, conversion: 120 %}", "Q117", "120 %", "`120 %` is more than the whole", "give a conversion of at most 100 %"),
    ("{equation: HCl + NaOH -> NaCl + H2O, conversion: 0.8}", "Q109", "0.8", "`0.8` is a plain number; a share belongs here", "write a share, as in `80 %`"),
    ("{equation: HCl + NaOH -> NaCl + H2O, heat: -56 kJ}", "Q109", "-56 kJ", "`-56 kJ` is an energy; an energy per amount belongs here", "write an energy per amount, as in `-56 kJ/mol`"),
    ("{limiting: acid}", "N144", "limiting", "a reaction has no `equation`", "add `equation:` — the equation, by catalogue names or formulas"),
    ("[a]", "N145", "[a]", "a reaction takes a mapping, not a list", "write `key:` and set the fields in on the lines below"),
]  # fmt: skip


@pytest.mark.parametrize(("described", "code", "marked", "message", "help_"), FAULTS)
def test_faulty_reaction_is_one_finding_in_its_place(
    described: str, code: str, marked: str, message: str, help_: str | None
) -> None:
    finding = only(judged("Words.", front(described)))

    assert (finding.code.number, finding.span.text) == (code, marked)
    assert finding.message == message
    assert help_ is None or finding.help == help_


def test_reaction_that_cannot_be_read_has_no_terms_and_is_not_balanced() -> None:
    read = judged("Words.", front("HCl + zzz -> NaCl")).procedure.reactions["neutral"]

    assert (read.left, read.right, read.balanced) == ((), (), False)


def test_limiting_conversion_and_heat_are_kept() -> None:
    read = reaction(
        "{equation: HCl + NaOH -> NaCl + H2O, limiting: acid, conversion: 80 %, heat: -56 kJ/mol}"
    )

    assert read.limiting == "acid"
    assert read.conversion is not None
    assert read.heat is not None
    assert (read.conversion.si, read.heat.si) == (0.8, -56e3)


def test_unknown_heat_is_no_fault_and_none() -> None:
    assert reaction("{equation: HCl + NaOH -> NaCl + H2O, heat: unknown}").heat is None


def test_formula_that_fits_two_materials_is_not_guessed() -> None:
    names = "materials: {one: propan-1-ol, two: propan-2-ol, water: water}"
    entry = judged("Words.", f"{names}\nreactions: {{r: 'C3H8O -> C3H6 + H2O'}}")
    finding = only(entry)

    assert (finding.code.number, finding.span.text) == ("S104", "C3H8O")
    assert finding.message == "`C3H8O` fits `propan-1-ol` and `propan-2-ol`"
    assert [r.span.text for r in finding.related] == ["one", "two"]


def test_formula_that_fits_one_substance_in_two_materials_is_bound_to_the_first() -> None:
    names = "materials: {weak: 1.0 M hydrochloric acid, strong: 6.0 M hydrochloric acid}"
    entry = judged("Words.", f"{names}\nreactions: {{r: 'HCl + NaOH -> NaCl + H2O'}}")

    assert places(faults(entry)) == []
    assert entry.procedure.reactions["r"].left[0].material == "weak"


def test_material_that_could_not_be_read_makes_no_second_finding() -> None:
    entry = judged("Words.", "materials: {x: zzz}\nreactions: {r: 'x + NaOH -> NaCl'}")

    assert places(faults(entry)) == [("K101", "zzz")]


def test_material_of_unknown_composition_cannot_react() -> None:
    entry = judged(
        "Words.", "materials: {x: {composition: unknown}}\nreactions: {r: 'x + NaOH -> NaCl'}"
    )

    assert only(entry).message == "what `x` holds is not known"
