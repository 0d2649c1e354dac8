"""The procedure as resolved: every name bound, every dimension known, SI values beside the digits.

What could not be resolved is `Unknown` (a material of unknown composition because it could not be
read) or `None` beside a finding already given: it offends nobody further on and is never nought.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from collections.abc import Mapping
    from fractions import Fraction

    from watchglass.base.dimensions import Dimension
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span
    from watchglass.catalogue.glassware import VesselType
    from watchglass.catalogue.substances import Substance
    from watchglass.chemistry.formulas import Formula
    from watchglass.read import syntax
    from watchglass.read.syntax import Block
    from watchglass.read.terms import Expression


# ---------------------------------------------------------------- materials


class Strength(NamedTuple):
    """How strong a solution is: a quantity whose dimension says on which basis.

    The dimension is one of amount concentration, mass per volume (also % w/v), mass fraction
    (% w/w), volume fraction (% v/v) or molality.
    """

    quantity: Quantity
    span: Span


class Pure(NamedTuple):
    """One substance as it is."""

    substance: Substance


class Solution(NamedTuple):
    """A solute at a strength in a solvent."""

    strength: Strength
    solute: Substance
    solvent: Substance


class Saturated(NamedTuple):
    """A solution that holds as much as it can."""

    solute: Substance
    solvent: Substance


class Part(NamedTuple):
    """One part of a mixture: a substance and how much of it, as a ratio or a strength."""

    substance: Substance
    quantity: Quantity
    span: Span


class Mixture(NamedTuple):
    """Several substances by ratio (`basis` amount, mass or volume), or as strengths in a solvent.

    `basis` is `amount`, `mass`, `volume` or `strength`.
    """

    parts: tuple[Part, ...]
    basis: str
    solvent: Substance | None


class Secret(NamedTuple):
    """One of several; students see the station's code only."""

    candidates: Mapping[str, Substance]
    strength: Strength | None
    solvent: Substance | None


class Continued(NamedTuple):
    """The product of another procedure, by its code."""

    code: str
    vessel: str


class Unknown(NamedTuple):
    """What is in it is not known: declared so, or not readable (then a finding says so)."""

    what: str
    declared: bool


Composition = Pure | Solution | Saturated | Mixture | Secret | Continued | Unknown


class SolutionFacts(NamedTuple):
    """What is known of a solution beside its strength.

    Attributes:
        density: Of the solution, kg/m3, or None.
        fraction: Mass of solute over mass of solution [-], or None.
        per_volume: Mass of solute over volume of solution, kg/m3, or None.
        source: Where the density is from: `given`, `table`, `water` (a dilute solution taken to be
            as dense as water), or empty.
        figures: Significant figures that the density is good for.
        solubility: Of a saturated solution: what dissolves, in the catalogue's words.
    """

    density: float | None
    fraction: float | None
    per_volume: float | None
    source: str
    figures: int = 4
    solubility: str = ""


class Material(NamedTuple):
    """A material of the procedure.

    Attributes:
        name: Its local name.
        written: Its description as the author wrote it.
        composition: What it is.
        provided: What a station is handed, or None.
        provided_span: Where that stands.
        for_class: Whether `provided` is for the whole class.
        stock: Key of the stock it is, or empty.
        solution: What is known of it as a solution, or a density given with it; else None.
        span: Its name in the front matter.
        value_span: Its description there.
    """

    name: str
    written: str
    composition: Composition
    span: Span
    value_span: Span
    provided: Quantity | None = None
    provided_span: Span | None = None
    for_class: bool = False
    stock: str = ""
    solution: SolutionFacts | None = None


class Vessel(NamedTuple):
    """A vessel of the procedure; each member of a family is one of its own.

    `type` is None where it could not be read.
    """

    name: str
    type: VesselType | None
    written: str
    family: str
    span: Span


class Equipment(NamedTuple):
    """A thing that is neither vessel nor material.

    `type` is there where it is written as glassware is (`measuring cylinder 25 mL`).
    """

    name: str
    written: str
    span: Span
    type: VesselType | None = None


# ---------------------------------------------------------------- reactions


class Species(NamedTuple):
    """One term of an equation.

    Attributes:
        coefficient: Its stoichiometric number, > 0.
        written: As the author wrote it.
        formula: Its formula; None where the catalogue has none for it.
        substance: The substance, or None for a bare formula.
        material: Local name of the material that holds it, or empty.
        span: Where it stands.
    """

    coefficient: Fraction
    written: str
    formula: Formula | None
    substance: Substance | None
    material: str
    span: Span


class Reaction(NamedTuple):
    """A reaction of the procedure.

    Attributes:
        name: Its local name.
        left: Reactants in the order written; empty where the equation could not be read.
        right: Products.
        balanced: Whether atoms and charge are conserved.
        limiting: Local name of the material declared limiting, or empty.
        limiting_span: Where it is declared, or None.
        conversion: Declared conversion of the limiting reactant, or None.
        heat: As declared, or None.
        span: Its name.
        equation_span: Its equation.
    """

    name: str
    left: tuple[Species, ...]
    right: tuple[Species, ...]
    balanced: bool
    span: Span
    equation_span: Span
    limiting: str = ""
    conversion: Quantity | None = None
    heat: Quantity | None = None
    limiting_span: Span | None = None


# ---------------------------------------------------------------- events


class Portion(NamedTuple):
    """So much of a material.

    Attributes:
        material: Its local name.
        quantity: How much; None for `all`, `half`, `rest`, which `of_all` then names.
        of_all: `all`, `half`, `rest`, or empty.
        per: For `12 mL ethanol per g crude`: the unit, and the local name it counts.
        span: Where it stands.
    """

    material: str
    quantity: Quantity | None
    of_all: str
    per: tuple[Quantity, str] | None
    span: Span


class Charge(NamedTuple):
    """Materials go into a vessel."""

    portions: tuple[Portion, ...]
    target: syntax.Place
    ware: str
    span: Span
    clauses: tuple[syntax.Clause, ...] = ()


class Transfer(NamedTuple):
    """Contents of a vessel, or one part of them, go into another."""

    origin: syntax.Place
    target: syntax.Place
    clauses: tuple[syntax.Clause, ...]
    span: Span


class Aliquot(NamedTuple):
    """A measured share of a vessel goes into another."""

    quantity: Quantity
    origin: syntax.Place
    target: syntax.Place
    span: Span
    clauses: tuple[syntax.Clause, ...] = ()


class Operation(NamedTuple):
    """A verb of the bench.

    Attributes:
        verb: Which.
        object: The vessel, with a part where one is named; None for `take`, `wait`, `next period`.
        reaction: Local name of the reaction, of `react`.
        portions: Materials it takes with a stated amount (`with 2 g drier`, `rinse … with 10 mL water`).
        reagent: Local name of a material it takes as needed (`adjust … with alkali`), or empty.
        time: Seconds it takes, from `for`, `over` or its own object; None where not said.
        clauses: All its clauses, as read.
        span: Where it stands.
        stated: What `suppose` states, as read; None otherwise.
        subject: What `test` tests for, or empty.
    """

    verb: str
    object: syntax.Place | None
    reaction: str
    portions: tuple[Portion, ...]
    reagent: str
    time: float | None
    clauses: tuple[syntax.Clause, ...]
    span: Span
    stated: syntax.Amount | None = None
    subject: str = ""


class Again(NamedTuple):
    """Steps are done again.

    Attributes:
        steps: Numbers of the steps repeated, in order; its own number means the acts before it.
        times: How many more times.
        fresh: Each pass starts with clean vessels.
        exchanges: Pairs (new, old) of local names; where given, one pass each.
        step: Number of the step it stands in.
        span: Where it stands.
    """

    steps: tuple[int, ...]
    times: int
    at_most: int | None
    fresh: bool
    exchanges: tuple[tuple[str, str], ...]
    step: int
    span: Span


class Labelled(NamedTuple):
    """The state reached here gets a name."""

    name: str
    span: Span


Event = Charge | Transfer | Aliquot | Operation | Again | Labelled


class Step(NamedTuple):
    """One step: its number, where it stands, and its events in text order."""

    number: int
    events: tuple[Event, ...]
    span: Span


# ---------------------------------------------------------------- figures


class RecordEntry(NamedTuple):
    """A blank for the student.

    Attributes:
        name: By which later records use it, or empty.
        label: The words.
        unit: As written; empty for words or a plain number.
        expression: What is expected, or None where it is measured only.
        dimension: Of the expected value; None where unknown.
        step: Number of the step it stands in; 0 outside the steps.
        span: Where it stands.
    """

    name: str
    label: str
    unit: str
    expression: Expression | None
    dimension: Dimension | None
    step: int
    span: Span


class Expectation(NamedTuple):
    """One line of `expect:`."""

    expression: Expression
    written: str
    span: Span


class Acceptance(NamedTuple):
    """A finding looked at and accepted, or a planned reaction, with its reason."""

    word: str
    reason: str
    span: Span


class Head(NamedTuple):
    """The plain facts at the top of a procedure; empty where not given.

    Attributes:
        title: Its title.
        code: Its code and address.
        course: The course it belongs to.
        revision: As written.
        periods: Minutes of each period, with their places.
        group: Who shares a station.
        after: Codes of procedures that come before, with places.
        references: Books and articles, as written.
        read: What to read before, as written.
        scale: What every extensive quantity was multiplied by; as declared until then.
        show: What students may see beyond the default.
    """

    title: str
    code: str
    code_span: Span | None = None
    course: str = ""
    revision: str = ""
    periods: tuple[tuple[Quantity, Span], ...] = ()
    group: str = ""
    after: tuple[tuple[str, Span], ...] = ()
    references: tuple[str, ...] = ()
    read: tuple[str, ...] = ()
    scale: float = 1.0
    show: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True, kw_only=True)
class Procedure:
    """A whole procedure, resolved.

    `syntax` is the file as its author wrote it, `body` what is printed of it: the same blocks, with
    other figures where the procedure is scaled. `positions` tells, by offset of a place that draws a
    layer, where the bench found that layer to lie, which it is, and whether a drop test is due.
    `resized` tells of vessels that scaling took in another size: as they were, as they are. `names` tells for every local name what it is: `material`, `vessel`, `equipment`, `reaction`,
    `label` or `record`.
    """

    syntax: syntax.ProcedureSyntax
    body: tuple[Block, ...]
    head: Head
    materials: Mapping[str, Material]
    vessels: Mapping[str, Vessel]
    equipment: Mapping[str, Equipment]
    reactions: Mapping[str, Reaction]
    steps: tuple[Step, ...]
    records: tuple[RecordEntry, ...]
    expectations: tuple[Expectation, ...]
    acceptances: tuple[Acceptance, ...]
    intended: tuple[Acceptance, ...]
    labels: Mapping[str, int] = field(default_factory=dict)
    names: Mapping[str, str] = field(default_factory=dict)
    used: frozenset[str] = frozenset()
    positions: Mapping[int, tuple[str, str, bool]] = field(default_factory=dict)
    resized: Mapping[str, tuple[str, str]] = field(default_factory=dict)
