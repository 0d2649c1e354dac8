"""What the label of a bottle says more than once: strength, density, strength again.

Each is compared with what the others come to. Half a unit of the last place written is allowed on
top of the share that may differ: `1.2 g/mL` is any density from 1.15 to 1.25.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.base.findings import Finding
from watchglass.base.scan import Fault, read_quantity
from watchglass.catalogue import texts
from watchglass.resolve import model
from watchglass.resolve.solutions import LEAST, MOST, density_between, facts_of

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity
    from watchglass.base.yaml import YamlText
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.substances import Substance
    from watchglass.resolve.model import SolutionFacts

#: Differences that are let pass: of two strengths on one label, and of a density from the table [-].
#: Judgement: bottles are labelled to two or three figures, and at 20 or 25 °C.
STRENGTHS_MAY_DIFFER, DENSITY_MAY_DIFFER = 0.02, 0.01
#: What a strength can be given as.
STRENGTHS = (
    dim.CONCENTRATION,
    dim.MASS_CONCENTRATION,
    dim.MASS_FRACTION,
    dim.VOLUME_FRACTION,
    dim.MOLALITY,
)


class Label(NamedTuple):
    """What stands beside a strength: the density and the strength again, as written and as read."""

    density_node: YamlText | None = None
    also_node: YamlText | None = None
    density: Quantity | None = None
    also: Quantity | None = None

    def facts(
        self, composition: model.Composition, catalogue: Catalogue
    ) -> model.SolutionFacts | None:
        """Work out what is known of a material with this label."""
        own = self.density.middle if self.density is not None else None
        figures = self.density.figures if self.density is not None else 4
        return facts_of(composition, own, catalogue, also=self.also, figures=figures)


def read_label(density: YamlText | None, also: YamlText | None, findings: list[Finding]) -> Label:
    """Read `density:` and `also:`; what cannot be read is a finding and counts as not said."""
    at = texts.measured(density, dim.MASS_CONCENTRATION, findings) if density is not None else None
    again = _strength(also, findings) if also is not None else None
    return Label(density, also, at.value if at is not None else None, again)


def _strength(node: YamlText, findings: list[Finding]) -> Quantity | None:
    read = read_quantity(node.text)
    if isinstance(read, Fault):
        findings.append(texts.fault_at(node, read))
        return None
    if read.dimension in STRENGTHS:
        return read
    if read.dimension == dim.SHARE:
        code, said = codes.PERCENT_WITHOUT_BASIS, "does not say of what: by mass or by volume"
        help_ = f"write `{read.text} w/w` for grams in 100 g, `w/v` for grams in 100 mL, or `v/v`"
    elif read.dimension == dim.NUMBER:
        code, said = codes.UNIT_MISSING, "has no unit"
        help_ = f"write the strength with its unit, as in `{read.text} M`"
    else:
        code, said = codes.DIMENSION_WRONG, f"is {read.dimension.words}; a strength belongs here"
        help_ = "write the strength that the label gives beside the first, as in `12.1 M`"
    findings.append(Finding(code=code, span=node.span, message=f"`{read.text}` {said}", help=help_))
    return None


def faults_of_label(
    label: Label, written: str, composition: model.Composition, catalogue: Catalogue
) -> tuple[Finding, ...]:
    """Hold what a label says twice to itself, and its density to the table.

    Args:
        label: What stands beside the strength.
        written: The strength and its substance, as the author wrote them.
        composition: What the material is.
        catalogue: The table of densities.
    """
    facts = label.facts(composition, catalogue)
    strength_known = isinstance(composition, model.Solution | model.Saturated)
    if label.also is not None and label.also_node is not None and not strength_known:
        if isinstance(composition, model.Unknown):
            return ()  # said already, or not known by intent
        return (_no_first_strength(label.also_node, written),)
    found: tuple[Finding, ...] = ()
    if label.also is not None and label.also_node is not None and facts is not None:
        found = _strengths_apart(label.also_node, label.also, written, composition, facts)
    if not found and label.density is not None and label.density_node is not None:
        found = _density_apart(label.density_node, label.density, composition, catalogue)
    return found


def _density_apart(
    node: YamlText, given: Quantity, composition: model.Composition, catalogue: Catalogue
) -> tuple[Finding, ...]:
    """Report a density that is not that of a solution of this strength, or of the pure liquid."""
    if isinstance(composition, model.Pure):
        at = composition.substance.density
        if at is None:
            return ()
        usual, slack = at.value.si, _last_place(at.value)
        temperature = f" at {at.temperature.text}" if at.temperature is not None else ""
        has = f"{composition.substance.name} has {at.value.text}{temperature}"
    else:
        plain = facts_of(composition, None, catalogue)
        if plain is None or plain.density is None or plain.source != "table":
            return ()
        usual, slack = plain.density, 0.0
        has = f"a solution of this strength has {shown(usual / 1000, 4)} g/mL at 20 °C"
    if abs(given.middle - usual) <= DENSITY_MAY_DIFFER * usual + _last_place(given) + slack:
        return ()
    return (_density_finding(node, has),)


def _density_finding(node: YamlText, has: str) -> Finding:
    return Finding(
        code=codes.SOLUTION_DENSITY_DIFFERS,
        span=node.span,
        message=f"`{node.text}` is given; {has}",
        help="compare strength and density with the label; one of the two is of another bottle",
    )


def _no_first_strength(node: YamlText, written: str) -> Finding:
    return Finding(
        code=codes.FIELD_UNFIT,
        span=node.span,
        message=f"`{node.text}` says a strength again, and `{written}` has none",
        help=f"write the strength before the substance, as in `is: {node.text} {written}`,"
        " and take `also:` out",
    )


def _strengths_apart(
    node: YamlText,
    also: Quantity,
    written: str,
    composition: model.Composition,
    facts: SolutionFacts,
) -> tuple[Finding, ...]:
    """Report a second strength that is not the first one in other units."""
    solute: Substance | None = getattr(composition, "solute", None)
    if solute is None:
        return ()
    if isinstance(composition, model.Solution) and (
        facts.density is None or facts.source == "water"
    ):
        between = density_between(composition.strength.quantity, also, solute)
        if between is not None and not LEAST <= between <= MOST:
            said = f"would make a solution of {shown(between / 1000, 2)} g/mL"
            return (_label_finding(node, f"`{written}` and `{node.text}` {said}"),)
    said_again = _in_measure_of(also, solute, facts)
    spread = 0.0
    if isinstance(composition, model.Solution):
        first = composition.strength.quantity
        spread = (first.si_high - first.si) / 2 / first.middle if first.middle else 0.0
    allowed = STRENGTHS_MAY_DIFFER + spread
    if said_again is None or (
        abs(also.middle - said_again) <= allowed * said_again + _last_place(also)
    ):
        return ()
    figure = f"{shown(said_again / also.unit.factor, 3)} {also.unit.symbol}"
    return (
        _label_finding(
            node, f"`{written}` comes to {figure}, and `{node.text}` is said of it, too"
        ),
    )


def _label_finding(node: YamlText, message: str) -> Finding:
    return Finding(
        code=codes.LABEL_DISAGREES,
        span=node.span,
        message=message,
        help="compare strength and density with the label, and mend the one that is wrong",
    )


def _in_measure_of(also: Quantity, solute: Substance, facts: SolutionFacts) -> float | None:
    """Give the strength of a solution in the measure of another, SI."""
    molar_mass = solute.molar_mass * 1e-3 if solute.molar_mass else None
    fraction, per_volume = facts.fraction, facts.per_volume
    if also.dimension == dim.MASS_FRACTION:
        return fraction
    if also.dimension == dim.MASS_CONCENTRATION:
        return per_volume
    if also.dimension == dim.CONCENTRATION and per_volume is not None and molar_mass:
        return per_volume / molar_mass
    if also.dimension == dim.VOLUME_FRACTION and per_volume is not None and solute.density:
        return per_volume / solute.density.value.si
    if also.dimension == dim.MOLALITY and fraction is not None and fraction < 1 and molar_mass:
        return fraction / (1 - fraction) / molar_mass
    return None


def _last_place(quantity: Quantity) -> float:
    """Give half a unit of the last place written and, of a range, half of what it spans, SI."""
    half = 0.5 * quantity.unit.factor * 10.0**quantity.number.last_place
    return half + (quantity.si_high - quantity.si) / 2
