"""What solutions and mixtures hold and bring along, each figure worked out on paper.

Molar masses: NaCl 58.44, ethanol 46.07, water 18.015, benzoic acid 122.12, sucrose 342.30, glucose
180.16, acetone 58.08 g/mol; densities at 20 to 25 °C as the catalogue has them: ethanol 0.7903,
acetone 0.7917, water 0.9982 g/mL.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from bench_runner import knowledge, ran
from builders import judged, steps
from watchglass.base import dimensions as dim
from watchglass.run.bench.bringing import Brought, bring
from watchglass.run.content import Content, Missing, contents

if TYPE_CHECKING:
    from watchglass.base.dimensions import Dimension
    from watchglass.resolve import model

KNOWN = knowledge()
SI = {dim.MASS: 1e-3, dim.VOLUME: 1e-6, dim.AMOUNT: 1e-3, dim.COUNT: 1.0}


def material(description: str) -> model.Material:
    return judged("1. Here is {x}.", f"materials:\n  x: {description}").procedure.materials["x"]


def held(description: str, value: float, dimension: Dimension) -> tuple[Content, ...] | Missing:
    """Work out what so many g, mL or mmol hold."""
    return contents(material(description), dimension, value * SI[dimension], 6)


def mmol(description: str, value: float, dimension: Dimension) -> list[float]:
    found = held(description, value, dimension)
    assert not isinstance(found, Missing)
    return [content.moles * 1e3 for content in found]


def brought(description: str, value: float, dimension: Dimension) -> Brought:
    return bring(material(description), dimension, value * SI[dimension], KNOWN)


LABELLED = "{is: 10 % w/w benzoic acid in ethanol, density: 0.820 g/mL}"


@pytest.mark.parametrize(
    ("description", "value", "dimension", "expected"),
    [
        # 2 mol in 1000 g of water and 116.88 g of salt: 100 g hold 2 x 100 / 1116.88.
        ("2.0 mol/kg sodium chloride", 100.0, dim.MASS, [179.07]),
        # By the density that is given: 10 mL x 0.80 / 58.08.
        ("{is: acetone, density: 0.80 g/mL}", 10.0, dim.VOLUME, [137.74]),
        ("acetone", 10.0, dim.VOLUME, [136.31]),  # and by the catalogue's: 7.917 g
        ("saturated sodium chloride", 5.0, dim.AMOUNT, [5.0]),
        ("2.0 M glucose", 5.0, dim.AMOUNT, [5.0]),
        # 100 mL are 82.0 g, a tenth of it acid.
        (LABELLED, 100.0, dim.VOLUME, [67.146]),
        (LABELLED, 82.0, dim.MASS, [67.146]),
        # 46.07 g in 58.29 mL and 36.03 g in 36.09 mL: 10 of 94.39 mL.
        ("{contains: {ethanol: 1 mol, water: 2 mol}}", 10.0, dim.VOLUME, [105.95, 211.9]),
        # 46.07 and 36.03 g: 82.1 g.
        ("{contains: {ethanol: 1 mol, water: 2 mol}}", 8.21, dim.MASS, [100.0, 200.0]),
        # With a density of its own no volumes are added: 10 mL are 9.0 g.
        (
            "{contains: {ethanol: 1 mol, water: 2 mol}, density: 0.90 g/mL}",
            10.0,
            dim.VOLUME,
            [109.62, 219.25],
        ),
        # 3 and 1 mL: 2.3709 and 0.9982 g in 4 mL.
        ("{contains: {ethanol: 3 mL, water: 1 mL}}", 4.0, dim.VOLUME, [51.464, 55.409]),
        ("{contains: {ethanol: 3 mL, water: 1 mL}}", 3.3691, dim.MASS, [51.464, 55.409]),
        # 1 and 3 g.
        ("{contains: {ethanol: 1 g, water: 3 g}}", 4.0, dim.MASS, [21.707, 166.53]),
    ],
)
def test_amounts_are_those_worked_out_on_paper(
    description: str, value: float, dimension: Dimension, expected: list[float]
) -> None:
    assert mmol(description, value, dimension) == pytest.approx(expected, rel=3e-4)


@pytest.mark.parametrize(
    ("description", "dimension", "missing"),
    [
        ("{contains: {ethanol: 1 mol, water: 2 mol}}", dim.AMOUNT, "size"),
        ("{contains: {ethanol: 1 mol, water: 2 mol}}", dim.COUNT, "size"),
        ("{contains: {benzoic-acid: 1 mol, ethanol: 1 mol}}", dim.VOLUME, "density"),
        ("{contains: {benzoic-acid: 1 mL, ethanol: 1 mL}}", dim.MASS, "density"),
        ("acetone", dim.COUNT, "size"),
        ("benzoic acid", dim.VOLUME, "density"),
        ("2.0 M glucose", dim.COUNT, "size"),
        ("2.0 M glucose", dim.MASS, "solution density"),
    ],
)
def test_what_is_missing_is_named(description: str, dimension: Dimension, missing: str) -> None:
    found = held(description, 10.0, dimension)

    assert isinstance(found, Missing)
    assert found.what == missing


@pytest.mark.parametrize(
    ("description", "dimension"),
    [
        ("tar", dim.MASS),
        ("tar", dim.AMOUNT),
        ("tar", dim.VOLUME),
        ("1.0 M tar", dim.VOLUME),
        ("2.0 mol/kg tar", dim.MASS),
        ("{contains: {tar: 1 mol, ethanol: 1 mol}}", dim.MASS),
        ("{contains: {tar: 1 g, ethanol: 1 g}}", dim.MASS),
    ],
)
def test_substance_without_a_formula_has_no_amount(description: str, dimension: Dimension) -> None:
    files = {"substances/mine.yml": "tar:\n  names: [tar]\n  state: liquid\n  density: 1.1 g/mL\n"}
    entry = judged("1. Here is {x}.", f"materials:\n  x: {description}", files)
    found = contents(entry.procedure.materials["x"], dimension, 1e-3, 6)

    assert isinstance(found, Missing)
    assert found.what == "formula"
    assert found.substance is not None
    assert found.substance.key == "tar"


@pytest.mark.parametrize(
    ("description", "dimension", "assumption"),
    [
        (
            "{contains: {ethanol: 3 mL, water: 1 mL}}",
            dim.VOLUME,
            "volumes of ethanol and water added up",
        ),
        (
            "36 % w/w hydrochloric acid",
            dim.VOLUME,
            (
                "density of 36 % w/w hydrochloric acid 1.179 g/mL, from the table of aqueous"
                " solutions at 20 °C"
            ),
        ),
        (
            "{contains: {ethanol: 3 mL, acetone: 1 mL, water: 1 mL}}",
            dim.VOLUME,
            "volumes of ethanol, acetone and water added up",
        ),
    ],
)
def test_figure_says_what_it_rests_on_and_shows_no_more_than_that_allows(
    description: str, dimension: Dimension, assumption: str
) -> None:
    found = held(description, 10.0, dimension)

    assert not isinstance(found, Missing)
    assert [content.assumptions for content in found] == [(assumption,)] * len(found)
    assert {content.figures for content in found} == {2}  # those of the percentage or the sum


@pytest.mark.parametrize(
    ("description", "dimension"),
    [
        (LABELLED, dim.VOLUME),  # the author's own density
        ("{contains: {ethanol: 3 mL, water: 1 mL}}", dim.MASS),
        ("acetone", dim.VOLUME),
    ],
)
def test_figure_that_rests_on_nothing_else_says_nothing(
    description: str, dimension: Dimension
) -> None:
    found = held(description, 10.0, dimension)

    assert not isinstance(found, Missing)
    assert {content.assumptions for content in found} == {()}


# ---------------------------------------------------------------- with the solvent


@pytest.mark.parametrize(
    ("description", "value", "dimension", "amounts", "millilitres"),
    [
        # 82.0 g: 8.2 g of acid, 73.8 g of ethanol.
        (LABELLED, 100.0, dim.VOLUME, {"benzoic-acid": 67.146, "ethanol": 1601.9}, 100.0),
        (LABELLED, 41.0, dim.MASS, {"benzoic-acid": 33.573, "ethanol": 800.97}, 50.0),
        # No density is known: the sugar takes no room, water fills the whole.
        ("1.0 M glucose", 10.0, dim.VOLUME, {"glucose": 10.0, "water": 554.09}, 10.0),
        # 10 g of sugar and 90 g of water, which is 90.16 mL.
        ("10 % w/w glucose", 100.0, dim.MASS, {"glucose": 55.506, "water": 4995.8}, 90.16),
        # 5 mL of acetone (3.9585 g) and 5 mL of water.
        ("50 % v/v acetone", 10.0, dim.VOLUME, {"acetone": 68.156, "water": 277.05}, 10.0),
        # 1 g of acid a 100 mL takes no room in the ethanol.
        (
            "1.0 % w/v benzoic acid in ethanol",
            10.0,
            dim.VOLUME,
            {"benzoic-acid": 0.81885, "ethanol": 171.55},
            10.0,
        ),
    ],
)
def test_solution_brings_its_solvent_along(
    description: str,
    value: float,
    dimension: Dimension,
    amounts: dict[str, float],
    millilitres: float,
) -> None:
    found = brought(description, value, dimension)

    assert {key: n * 1e3 for key, n in found.liquid.amounts.items()} == pytest.approx(
        amounts, rel=3e-4
    )
    assert found.liquid.volume == pytest.approx(millilitres * 1e-6, rel=3e-4)
    assert found.solids == {}
    assert (found.unknown, found.why) == (frozenset(), "")


def test_several_solutes_share_one_solvent() -> None:
    # 10 mL with 1 mmol of each, which take no room: 9.982 g of water.
    found = brought("{contains: {glucose: 0.10 M, sucrose: 0.10 M}, in: water}", 10.0, dim.VOLUME)

    assert {key: n * 1e3 for key, n in found.liquid.amounts.items()} == pytest.approx(
        {"glucose": 1.0, "sucrose": 1.0, "water": 554.09}, rel=3e-4
    )
    assert found.liquid.volume == pytest.approx(10e-6)


def test_product_of_another_procedure_is_not_known() -> None:
    assert brought("{from: Z-9}", 10.0, dim.MASS) == Brought(
        unknown=frozenset({"x"}), why="its composition is not known"
    )


def test_mixture_brings_solids_as_solids_and_liquids_with_their_volume() -> None:
    # 1 g of benzoic acid to 3 g of ethanol: 8.188 and 65.12 mmol, 3.796 mL.
    found = brought("{contains: {benzoic-acid: 1 g, ethanol: 3 g}}", 4.0, dim.MASS)

    assert found.solids == {"benzoic-acid": pytest.approx(8.1884e-3, rel=1e-4)}
    assert found.liquid.amounts == {"ethanol": pytest.approx(65.12e-3, rel=1e-4)}
    assert found.liquid.volume == pytest.approx(3.796e-6, rel=1e-4)


def test_solids_by_volume_of_their_parts_are_solids_too() -> None:
    found = brought("{contains: {ethanol: 3 mL, water: 1 mL}}", 4.0, dim.VOLUME)

    assert found.solids == {}
    assert found.liquid.volume == pytest.approx(4e-6, rel=1e-4)


@pytest.mark.parametrize(
    ("description", "dimension", "why"),
    [
        ("{contains: {ethanol: 1 mol, water: 2 mol}}", dim.AMOUNT, "its size is not known"),
        ("benzoic acid", dim.VOLUME, "the density of benzoic acid is not known"),
        ("2.0 M glucose", dim.MASS, "the solution density of glucose is not known"),
    ],
)
def test_portion_that_cannot_be_told_is_unknown_and_says_why(
    description: str, dimension: Dimension, why: str
) -> None:
    found = brought(description, 10.0, dimension)

    assert found == Brought(unknown=frozenset({"x"}), why=why)


def test_scale_of_a_batch_does_not_change_its_strength() -> None:
    # Twice the procedure: twice the volume of the same 1.0 M.
    body = steps("{10 mL x -> A}")
    plain = "materials: {x: 1.0 M glucose}\nvessels: {A: beaker 100 mL}\n"
    one = ran("{10 mL x -> A}", front=plain).ledger.charged["glucose"]
    entry = judged(body, plain + "scale: 2\n")

    assert one == pytest.approx(0.010)
    (portion,) = entry.case.usage["x"].totals
    assert portion.low == pytest.approx(20e-6)
