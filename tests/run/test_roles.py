"""Equivalents and limiting reactants."""

from __future__ import annotations

import pytest

from builders import golden, step
from watchglass.run.roles import Role, roles

FRONT = """\
materials:
  acid: 1.0 M hydrochloric acid
  base: 1.0 M sodium hydroxide
  carbonate: 1.0 M sodium carbonate
  indicator: 1 % w/v phenolphthalein in ethanol
vessels:
  A: beaker 250 mL
  burette: burette 50 mL
reactions:
"""
NEUTRAL = "  r: HCl + NaOH -> NaCl + H2O\n"
CARBONATE = "  r: 2 HCl + Na2CO3 -> 2 NaCl + H2O + CO2\n"


def found(*sentences: str, reaction: str = NEUTRAL) -> dict[str, Role]:
    case = step(*sentences, front=FRONT + reaction).case
    return {role.material: role for role in roles(case.procedure, case.usage)}


def told(role: Role) -> tuple[float | None, bool]:
    of = role.equivalents
    return (round(of, 9) if of is not None else None, role.limiting)


@pytest.mark.parametrize(
    ("charges", "acid", "base"),
    [
        ("{10 mL acid -> A; 20 mL base -> A}", (1.0, True), (2.0, False)),
        ("{30 mL acid -> A; 20 mL base -> A}", (1.5, False), (1.0, True)),
        ("{20 mL acid -> A; 20 mL base -> A}", (1.0, True), (1.0, True)),
    ],
)
def test_least_amount_limits(
    charges: str, acid: tuple[float, bool], base: tuple[float, bool]
) -> None:
    by = found(charges)

    assert (told(by["acid"]), told(by["base"])) == (acid, base)


@pytest.mark.parametrize(
    ("charges", "acid", "carbonate"),
    [
        ("{10 mL acid -> A; 10 mL carbonate -> A}", (1.0, True), (1.0, False)),
        ("{20 mL acid -> A; 10 mL carbonate -> A}", (2.0, True), (1.0, True)),
        ("{30 mL acid -> A; 10 mL carbonate -> A}", (3.0, False), (1.0, True)),
    ],
)
def test_limit_goes_by_stoichiometric_numbers_and_equivalents_by_moles(
    charges: str, acid: tuple[float, bool], carbonate: tuple[float, bool]
) -> None:
    by = found(charges, reaction=CARBONATE)

    assert (told(by["acid"]), told(by["carbonate"])) == (acid, carbonate)


def test_declared_reactant_is_the_reference_all_the_same() -> None:
    by = found(
        "{30 mL acid -> A; 10 mL base -> A}",
        reaction="  r: {equation: HCl + NaOH -> NaCl + H2O, limiting: acid}\n",
    )

    assert told(by["acid"]) == (1.0, True)
    assert told(by["base"]) == (0.333333333, False)


def test_reactant_of_unknown_amount_leaves_the_others_without_equivalents() -> None:
    by = found("{10 mL acid -> A; 3 drops base -> A}")

    assert set(by) == {"acid"}
    assert told(by["acid"]) == (None, False)


def test_reactant_taken_as_needed_is_in_excess_and_does_not_count() -> None:
    by = found("{10 mL acid -> A; adjust A to pH 10 with base}")

    assert set(by) == {"acid"}
    assert told(by["acid"]) == (1.0, True)


def test_reactant_that_no_step_takes_leaves_the_others_without_equivalents() -> None:
    by = found("{10 mL acid -> A}")

    assert told(by["acid"]) == (None, False)


def test_unbalanced_reaction_has_no_roles() -> None:
    assert (
        found("{10 mL acid -> A; 10 mL base -> A}", reaction="  r: 2 HCl + NaOH -> NaCl + H2O\n")
        == {}
    )


def test_all_passes_count() -> None:
    by = found("{10 mL acid -> A; 10 mL base -> A}", "{again 1, 2 more times}")

    assert by["acid"].moles == pytest.approx(0.030)


def test_figures_are_those_of_the_coarser_of_the_two() -> None:
    by = found("{10.00 mL acid -> A; 5 mL base -> A}")

    assert (by["acid"].figures, by["base"].figures) == (1, 1)


def test_mixture_brings_its_component() -> None:
    case = golden("oc-04").case
    by = {(r.reaction, r.substance): r for r in roles(case.procedure, case.usage)}

    # 30 mL of 3.0 M acid to 1.925 mmol of benzocaine; 30 mL of 5.0 % w/v (84.006 g/mol) to the acid
    assert told(by["protonation", "benzocaine"]) == (1.0, True)
    assert by["protonation", "hydrogen-chloride"].equivalents == pytest.approx(
        90 / 1.9253, rel=1e-3
    )
    assert told(by["gas", "benzoic-acid"]) == (1.0, True)
    assert by["gas", "sodium-hydrogencarbonate"].equivalents == pytest.approx(
        30 * 50 / 84.006 / 1.9253, rel=1e-3
    )


def test_ester_is_limited_by_its_alcohol() -> None:
    case = golden("oc-09").case
    by = {r.substance: r for r in roles(case.procedure, case.usage)}

    # 5.0 mL × 0.810 g/mL / 88.150 g/mol = 45.9 mmol; 7.0 mL × 1.0474 g/mL / 60.052 g/mol = 122 mmol
    assert told(by["3-methylbutan-1-ol"]) == (1.0, True)
    assert by["3-methylbutan-1-ol"].moles == pytest.approx(45.94e-3, rel=1e-3)
    assert by["acetic-acid"].moles == pytest.approx(122.1e-3, rel=1e-3)
    assert by["acetic-acid"].equivalents == pytest.approx(2.657, rel=1e-3)
