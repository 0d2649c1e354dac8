"""Theoretical yields, worked out by hand: amount of what limits, over its coefficient, times the product's."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from builders import step
from watchglass.run.yields import Formed, makers, most_formed

if TYPE_CHECKING:
    from watchglass.judge.case import Case

FRONT = """\
materials:
  acid: 1.0 M hydrochloric acid
  carbonate: 1.0 M sodium carbonate
  salt: sodium chloride
  mixture: {contains: {sodium-chloride: 1 g, sodium-carbonate: 1 g}}
vessels: {A: beaker 250 mL}
reactions:
  fizz: 2 HCl + Na2CO3 -> 2 NaCl + water + carbon-dioxide
  uneven: HCl + Na2CO3 -> NaCl + carbon-dioxide
"""
TAKEN = "{30 mL acid -> A; 20 mL carbonate -> A}"


def case(*sentences: str, front: str = FRONT) -> Case:
    return step(*sentences, front=front).case


def formed(name: str, *sentences: str, front: str = FRONT) -> Formed | None:
    found = case(*sentences, front=front)
    reaction, product = next(
        (r, p) for r, p in makers(name, found.procedure) if r.name in ("fizz", "other")
    )
    return most_formed(reaction, product, found.procedure, found.usage)


def names(name: str) -> list[tuple[str, str]]:
    return [
        (reaction.name, product.substance.key if product.substance else "")
        for reaction, product in makers(name, case(TAKEN).procedure)
    ]


def test_product_of_two_for_two_of_what_limits_is_as_many_moles() -> None:
    # 30 mmol of acid need 15 of 20 mmol of carbonate: 30 mmol of sodium chloride, 58.44 g/mol.
    found = formed("sodium-chloride", TAKEN)

    assert found is not None
    assert found.moles == pytest.approx(0.030)
    assert found.mass == pytest.approx(0.030 * 58.44e-3, rel=1e-4)
    assert found.limiting == "acid"
    assert found.figures == 2


def test_product_of_one_for_two_of_what_limits_is_half_the_moles() -> None:
    # 15 mmol of carbon dioxide, 44.009 g/mol.
    found = formed("carbon-dioxide", TAKEN)

    assert found is not None
    assert found.moles == pytest.approx(0.015)
    assert found.mass == pytest.approx(0.015 * 44.009e-3, rel=1e-4)


def test_product_of_two_for_one_of_what_limits_is_twice_the_moles() -> None:
    # 10 mmol of carbonate limit: 20 mmol of sodium chloride.
    found = formed("sodium-chloride", "{30 mL acid -> A; 10 mL carbonate -> A}")

    assert found is not None
    assert found.moles == pytest.approx(0.020)
    assert found.limiting == "carbonate"


def test_all_passes_count_towards_the_yield() -> None:
    found = formed("carbon-dioxide", TAKEN, "{again 1, 2 more times}")

    assert found is not None
    assert found.moles == pytest.approx(0.045)


def test_nothing_is_told_where_it_is_not_known_what_limits() -> None:
    assert formed("carbon-dioxide", "{30 mL acid -> A; 3 drops carbonate -> A}") is None


def test_product_without_a_formula_has_moles_and_no_mass() -> None:
    found = case(TAKEN)
    reaction = found.procedure.reactions["fizz"]
    nameless = reaction.right[0]._replace(formula=None)
    told = most_formed(reaction, nameless, found.procedure, found.usage)

    assert told is not None
    assert told.moles == pytest.approx(0.030)
    assert told.mass is None


def test_unbalanced_reaction_forms_nothing_definite() -> None:
    found = case(TAKEN)
    reaction = found.procedure.reactions["uneven"]

    assert most_formed(reaction, reaction.right[0], found.procedure, found.usage) is None


@pytest.mark.parametrize(
    ("name", "makes"),
    [
        ("fizz", [("fizz", "sodium-chloride")]),  # a reaction means its first product
        ("salt", [("fizz", "sodium-chloride"), ("uneven", "sodium-chloride")]),
        ("carbon-dioxide", [("fizz", "carbon-dioxide"), ("uneven", "carbon-dioxide")]),
        ("water", [("fizz", "water")]),
        ("mixture", []),  # two substances: none is meant
        ("acid", []),  # nothing makes it
        ("nowhere", []),
    ],
)
def test_product_is_found_by_reaction_material_or_substance(
    name: str, makes: list[tuple[str, str]]
) -> None:
    assert names(name) == makes
