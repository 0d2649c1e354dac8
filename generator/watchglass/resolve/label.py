"""What the label of a bottle says more than once: strength, density, strength again."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.base.findings import Finding
from watchglass.base.scan import Fault, read_quantity
from watchglass.catalogue import texts

if TYPE_CHECKING:
    from watchglass.base.yaml import YamlText
    from watchglass.resolve import model

#: Differences that are let pass: of two strengths on one label, and of a density from the table [-].
STRENGTHS_MAY_DIFFER, DENSITY_MAY_DIFFER = 0.02, 0.01


def density_against_table(
    node: YamlText, facts: model.SolutionFacts, plain: model.SolutionFacts | None
) -> tuple[Finding, ...]:
    """Report a density that is not that of a solution of this strength.

    Args:
        node: The density as given.
        facts: Of the solution with that density.
        plain: Of the solution by its strength alone.
    """
    if plain is None or plain.density is None or facts.density is None or plain.source != "table":
        return ()
    if abs(facts.density / plain.density - 1) <= DENSITY_MAY_DIFFER:
        return ()
    return (
        Finding(
            code=codes.SOLUTION_DENSITY_DIFFERS,
            span=node.span,
            message=f"`{node.text}` is given; a solution of this strength has"
            f" {shown(plain.density / 1000, 4)} g/mL at 20 °C",
            help="compare strength and density with the label; one of the two is of another bottle",
        ),
    )


def strengths_against_each_other(
    node: YamlText, material: model.Material, facts: model.SolutionFacts
) -> tuple[Finding, ...]:
    """Report a second strength that is not the first one in other units."""
    read = read_quantity(node.text)
    if isinstance(read, Fault):
        return (texts.fault_at(node, read),)
    solute = getattr(material.composition, "solute", None)
    molar_mass = solute.molar_mass * 1e-3 if solute is not None and solute.molar_mass else None
    said = {
        dim.CONCENTRATION: facts.per_volume / molar_mass
        if facts.per_volume is not None and molar_mass
        else None,
        dim.MASS_CONCENTRATION: facts.per_volume,
        dim.MASS_FRACTION: facts.fraction,
    }.get(read.dimension)
    if said is None or abs(read.middle / said - 1) <= STRENGTHS_MAY_DIFFER:
        return ()
    figure = f"{shown(said / read.unit.factor, 3)} {read.unit.symbol}"
    return (
        Finding(
            code=codes.LABEL_DISAGREES,
            span=node.span,
            message=f"`{material.written}` comes to {figure}, and `{node.text}` is said of it, too",
            help="compare strength and density with the label, and mend the one that is wrong",
        ),
    )
