"""Figures of things taken: halves, parts of mixtures, products; and those that are not one thing."""

from __future__ import annotations

import pytest

from builders import step, surroundings
from watchglass.base.spans import Source
from watchglass.read.expressions import read_expression
from watchglass.run.evaluate import Evaluator, NotKnown, Result, Value

FRONT = """\
materials:
  sample: {contains: {benzoic-acid: 1 g, naphthalene: 3 g}, provided: 2.00 g}
  other: {contains: {benzoic-acid: 1 g, biphenyl: 3 g}, provided: 2.00 g}
  ether: tert-butyl methyl ether
vessels: {A: beaker 100 mL}
"""


def evaluated(expression: str, *sentences: str) -> Result:
    entry = step(*sentences, front=FRONT)
    node, findings = read_expression(Source.of("a.md", expression), 0, len(expression))
    assert findings == ()
    assert node is not None
    return Evaluator(entry.procedure, entry.case.usage, surroundings().catalogue, {}).value(node)


@pytest.mark.parametrize(
    ("expression", "taken", "expected"),
    [
        ("mass(sample)", "{half sample -> A}", 1.00e-3),
        ("mass(sample)", "{all sample -> A}", 2.00e-3),
        # a quarter of 2.00 g is acid, three quarters naphthalene (128.17 g/mol)
        ("mass(benzoic-acid)", "{all sample -> A}", 0.50e-3),
        ("moles(naphthalene)", "{all sample -> A}", 1.50 / 128.174),
        ("boils(ether)", "{all sample -> A}", 328.35),
        # 10 mL at 0.7408 g/mL, 88.15 g/mol
        ("moles(10.0 mL ether)", "{all sample -> A}", 7.408 / 88.15),
    ],
)
def test_figure_of_a_thing_is_what_one_pass_takes(
    expression: str, taken: str, expected: float
) -> None:
    found = evaluated(expression, taken)

    assert isinstance(found, Value)
    assert found.si == pytest.approx(expected, rel=1e-3)


@pytest.mark.parametrize(
    ("expression", "taken", "why"),
    [
        ("mass(sample)", "{rest sample -> A}", "bench"),
        ("mass(benzoic-acid)", "{all sample -> A; all other -> A}", "data"),  # which of the two?
        ("theoretical-yield(naphthalene)", "{all sample -> A}", "data"),  # nothing makes it
        ("density(ether) / density(sample)", "{all sample -> A}", "data"),
    ],
)
def test_figure_of_what_is_not_one_thing_is_unknown(expression: str, taken: str, why: str) -> None:
    assert evaluated(expression, taken) == NotKnown(why)
