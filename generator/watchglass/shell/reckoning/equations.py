"""`balance(…)`: the coefficients of an equation, or why there are none."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base.yaml import YamlEntry, YamlText
from watchglass.chemistry.equations import Balanced, NotUnique, balance
from watchglass.resolve.reactions import ReactionReader

if TYPE_CHECKING:
    from collections.abc import Sequence
    from fractions import Fraction

    from watchglass.base.findings import Finding
    from watchglass.read.terms import Words
    from watchglass.resolve.model import Reaction, Species
    from watchglass.shell.reckoning.names import BenchCatalogue

_SEVERAL = "several balances fit, and no one of them is a multiple of another"


class Equation(NamedTuple):
    """What became of an equation.

    Attributes:
        text: It with its coefficients, or empty.
        note: What is to be said beside it, or empty.
        why: Why nothing can be said, or empty.
        findings: What is wrong with it.
    """

    text: str = ""
    note: str = ""
    why: str = ""
    findings: tuple[Finding, ...] = ()


def balanced(words: Words, catalogue: BenchCatalogue) -> Equation:
    """Balance an equation of catalogue names and formulas.

    One that balances as written keeps its coefficients, whatever they are.
    """
    node = YamlText(words.text, words.span)
    reader = ReactionReader(catalogue, {})
    reaction = reader.read(YamlEntry(YamlText("equation", words.span), node))
    if reaction.balanced:
        return Equation(_written(reaction, None), note="balanced as written")
    unbalanced = [f for f in reader.findings if f.code == codes.EQUATION_UNBALANCED]
    if len(unbalanced) < len(reader.findings) or not reaction.left:
        return Equation(findings=tuple(reader.findings))
    left = [species.formula for species in reaction.left if species.formula]
    right = [species.formula for species in reaction.right if species.formula]
    if not unbalanced:
        nameless = next(s for s in (*reaction.left, *reaction.right) if s.formula is None)
        return Equation(why=f"the catalogue has no formula of {nameless.written}")
    found = balance(left, right)
    if isinstance(found, Balanced):
        return Equation(_written(reaction, found.coefficients))
    finding = unbalanced[0]
    if isinstance(found, NotUnique):
        help_ = (
            "write coefficients that balance, or part it into the reactions that run side by side"
        )
        return Equation(findings=(replace(finding, message=_SEVERAL, help=help_),))
    said = finding.message.partition(": ")[2]
    message = "no coefficients balance the equation" + (f": as written {said}" if said else "")
    return Equation(findings=(replace(finding, message=message),))


def _written(reaction: Reaction, coefficients: Sequence[int] | None) -> str:
    """Write an equation with other coefficients, or with its own."""
    left, right = reaction.left, reaction.right
    own = [species.coefficient for species in (*left, *right)]
    numbers: Sequence[int | Fraction] = own if coefficients is None else coefficients
    terms = [_term(n, s) for n, s in zip(numbers, (*left, *right), strict=True)]
    return f"{' + '.join(terms[: len(left)])} -> {' + '.join(terms[len(left) :])}"


def _term(number: int | Fraction, species: Species) -> str:
    return species.written if number == 1 else f"{number} {species.written}"
