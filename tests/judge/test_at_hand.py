"""Equations against the materials that the procedure has."""

from __future__ import annotations

import pytest

from builders import faults, judged, places


def told(materials: str, equation: str, more: str = "") -> list[tuple[str, str]]:
    names = [m.partition(":")[0].strip() for m in materials.split(";")]
    charges = ", ".join(f"{{1.0 mmol {name} -> A}}" for name in names)
    front = (
        "materials:\n" + "".join(f"  {m.strip()}\n" for m in materials.split(";"))
        + f"vessels: {{A: beaker 100 mL}}\nreactions:\n  one: {equation}\n{more}"
    )  # fmt: skip
    found = places(faults(judged(f"1. Put {charges} into {{A}}.", front)))
    return [tuple(place) for place in found]


@pytest.mark.parametrize(
    ("materials", "equation"),
    [
        ("base: benzocaine; acid: 3.0 M hydrochloric acid", "benzocaine + HCl -> benzocainium-chloride"),
        ("copper: copper(II) sulfate pentahydrate; metal: zinc", "CuSO4 + Zn -> Cu + ZnSO4"),
        ("copper: copper(II) sulfate; metal: zinc", "CuSO4·5H2O + Zn -> Cu + ZnSO4 + 5 H2O"),
        ("silver: silver nitrate; halide: potassium chloride", "Ag^+ + Cl^- -> AgCl"),
        ("metal: magnesium; acid: 1.0 M hydrochloric acid", "Mg + 2 H^+ -> Mg^2+ + H2"),
        ("metal: magnesium", "2 Mg + O2 -> 2 MgO"),
        ("salt: sodium benzoate; acid: 1.0 M hydrochloric acid", "benzoic-acid + NaOH -> sodium-benzoate + H2O\n  base: NaCl + H2O -> NaOH + HCl"),
        ("salt: lidocaine; acid: 1.0 M hydrochloric acid", "lidocainium-chloride + NaOH -> lidocaine + NaCl + H2O\n  other: NaCl + H2O -> NaOH + HCl"),
        ("metal: {composition: unknown, is: a metal}; acid: 1.0 M hydrochloric acid", "Zn + 2 HCl -> ZnCl2 + H2"),
        ("copper: copper(II) sulfate", "CuSO4 + Zn -> Cu + ZnSO4\nequipment: {foil: zinc foil}"),
    ],
)  # fmt: skip
def test_reactant_that_is_brought_made_or_everywhere_passes_in_silence(
    materials: str, equation: str
) -> None:
    assert told(materials, equation) == []


@pytest.mark.parametrize(
    ("materials", "equation", "marked"),
    [
        ("copper: copper(II) sulfate; metal: zinc", "CuSO4 + Mg -> Cu + MgSO4", "Mg"),
        ("silver: silver nitrate; halide: potassium chloride", "AgNO3 + NaCl -> AgCl + NaNO3", "NaCl"),
        ("salt: sodium benzoate; acid: 1.0 M sulfuric acid", "sodium-benzoate + HCl -> benzoic-acid + NaCl", "HCl"),
        ("alcohol: butan-1-ol", "butan-1-ol + CH3COOH -> butyl-acetate + H2O", "CH3COOH"),
    ],
)  # fmt: skip
def test_reactant_that_nothing_brings_is_found_in_the_equation(
    materials: str, equation: str, marked: str
) -> None:
    assert told(materials, equation) == [("S132", marked)]


def test_reaction_of_another_experiment_is_one_finding() -> None:
    equation = "butan-1-ol + CH3COOH -> butyl-acetate + H2O"

    assert told("salt: sodium chloride", equation) == [("S132", equation)]


def test_what_a_reaction_makes_itself_does_not_bring_its_reactants() -> None:
    assert told("salt: potassium nitrate", "NaCl + KNO3 -> NaNO3 + KCl") == [("S132", "NaCl")]


def test_material_that_could_not_be_read_makes_no_second_finding() -> None:
    front = "materials: {a: zzz, b: zinc}\nvessels: {A: beaker 100 mL}\nreactions: {r: 'CuSO4 + Zn -> Cu + ZnSO4'}"
    found = places(faults(judged("1. Put {1.0 g b -> A} into {A}.", front)))

    assert [tuple(p) for p in found] == [("K101", "zzz")]


def test_draft_without_steps_is_not_judged_yet() -> None:
    front = "materials: {b: zinc}\nvessels: {A: beaker 100 mL}\nreactions: {r: 'CuSO4 + Zn -> Cu + ZnSO4'}"

    assert places(faults(judged("1. Look.", front))) == []
