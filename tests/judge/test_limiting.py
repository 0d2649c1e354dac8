"""A reactant that is declared limiting, against what the steps take of the others."""

from __future__ import annotations

import pytest

from builders import faults, only, places, step

FRONT = """\
materials:
  alcohol: 3-methylbutan-1-ol
  acid: acetic acid, glacial
  anhydride: acetic anhydride
  iron: 0.100 M iron(III) chloride
  alkali: 0.100 M sodium hydroxide
  water: water
vessels: {A: conical flask 100 mL, B: conical flask 100 mL, burette: burette 50 mL}
reactions:
"""
ESTER = "  ester: {equation: 3-methylbutan-1-ol + CH3COOH -> isopentyl-acetate + H2O, limiting: alcohol}"
IRON = "  iron-out: {equation: FeCl3 + 3 NaOH -> Fe(OH)3 + 3 NaCl, limiting: LIMITING}"


def told(sentence: str, reactions: str = ESTER) -> list[tuple[str, str]]:
    entry = step(sentence, front=f"{FRONT}{reactions}\n")
    return [tuple(p) for p in places(faults(entry)) if p.code != "N180"]


def test_less_of_another_reactant_is_found_at_what_is_declared_with_both_figures() -> None:
    entry = step("Put {5.0 mL alcohol -> A}, {1.5 mL acid -> A}.", front=f"{FRONT}{ESTER}\n")
    finding = only(entry)

    # 5.0 mL x 0.81 g/mL / 88.15 g/mol; 1.5 mL x 1.05 g/mL / 60.05 g/mol
    assert (finding.code.number, finding.span.text) == ("S130", "alcohol")
    assert "with 46 mmol; of `acid` there is less: 26 mmol" in finding.message
    assert [r.span.text for r in finding.related] == ["5.0 mL alcohol", "1.5 mL acid"]
    assert finding.help == "write `limiting: acid`, or take more of `acid`"


@pytest.mark.parametrize(
    "sentence",
    [
        "Put {5.0 mL alcohol -> A}, {7.0 mL acid -> A}.",
        "Put {46 mmol alcohol -> A}, {46 mmol acid -> A}.",
        "Put {46.0 mmol alcohol -> A}, {45.6 mmol acid -> A}.",
        "Put {5.0 mL alcohol -> A}, {1.5 mL acid -> A}, {5.5 mL acid -> A}.",
        "Put {5.0 mL alcohol -> A}.",
        "Put {50 mL alcohol -> A}, {5.0 mL from A -> B}, {1.5 mL acid -> B}.",
        "Put {5.0 mL alcohol -> A}, {1.5 mL acid -> A}, {adjust A to pH 4 with acid}.",
    ],
)
def test_more_as_much_or_what_cannot_be_told_passes_in_silence(sentence: str) -> None:
    assert told(sentence) == []


@pytest.mark.parametrize(
    ("limiting", "volume", "found"),
    [("iron", "35 mL", False), ("iron", "20 mL", True), ("alkali", "20 mL", False)],
)
def test_amounts_are_divided_by_their_coefficients(
    limiting: str, volume: str, *, found: bool
) -> None:
    sentence = f"Put {{10.0 mL iron -> A}}, {{{volume} alkali -> A}}."
    reaction = IRON.replace("LIMITING", limiting)

    assert told(sentence, reaction) == ([("S130", limiting)] if found else [])


def test_water_is_never_said_to_be_less() -> None:
    reaction = "  r: {equation: acetic-anhydride + H2O -> 2 CH3COOH, limiting: anhydride}"

    assert told("Put {5.0 mL anhydride -> A}, {0.2 mL water -> A}.", reaction) == []


def test_what_another_reaction_makes_is_not_counted() -> None:
    reactions = f"{ESTER}\n  quench: acetic-anhydride + H2O -> 2 CH3COOH"
    sentence = "Put {5.0 mL alcohol -> A}, {1.0 mL acid -> A}, {5.0 mL anhydride -> A}."

    assert told(sentence, reactions) == []
