"""The syntax tree of a procedure: what an author wrote, with places, before anything is known of it.

Three layers of node: blocks (paragraphs, steps, tables, fenced `:::` blocks), inlines (text,
emphasis, marks) and acts (what stands in a mark). Each union is closed, so that a `match` over it
can be checked. What could not be read is a `BrokenAct`, reported once where it was found.

Nodes are named tuples: as frozen as data classes and a good deal quicker to define, which is felt
at every start of a command.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING, NamedTuple

from watchglass.read.terms import Measured as Measured
from watchglass.read.terms import Name as Name
from watchglass.read.terms import Words as Words

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Source, Span
    from watchglass.base.yaml import YamlMapping
    from watchglass.read.terms import Expression


# ---------------------------------------------------------------- inside a mark


class Amount(NamedTuple):
    """How much of a material.

    Attributes:
        measure: A quantity, or one of the words `all`, `half`, `rest`.
        material: The material's name.
        per: For `12 mL ethanol per g crude`: the unit as a quantity of one, and what it counts.
        span: The whole.
    """

    measure: Measured | str
    material: Name
    span: Span
    per: tuple[Measured, Name] | None = None


class Place(NamedTuple):
    """A vessel, or a part of what it holds (`aqueous organic upper lower solid liquid`)."""

    name: Name
    part: str | None
    span: Span


class Ph(NamedTuple):
    """`pH 10` or `pH 4–5` after `to`; the quantity is a plain number or range."""

    quantity: Quantity
    span: Span


ClauseValue = Place | Measured | Amount | Words | Ph


class Clause(NamedTuple):
    """One clause of an act.

    `word` is `by from into through on with to for at over below as giving leaving until in is`, or
    `closure` (value: `open`, `stoppered`, `under condenser`, …) or `setting` (value: `in hood`,
    `on steam`, `with flame`, `on hot plate`) for what stands after a comma. Of `suppose` the
    reason is the clause `because`.
    """

    word: str
    value: ClauseValue
    span: Span


class QuantityAct(NamedTuple):
    """A typed quantity: checked and shown; nothing happens."""

    value: Measured
    span: Span


class NameAct(NamedTuple):
    """Names a vessel, a material, or a part of what a vessel holds."""

    place: Place
    span: Span


class StatedAct(NamedTuple):
    """An amount that is stated, not used."""

    amount: Amount
    span: Span


class ChargeAct(NamedTuple):
    """Amounts go into a vessel."""

    amounts: tuple[Amount, ...]
    target: Place
    clauses: tuple[Clause, ...]
    span: Span


class TransferAct(NamedTuple):
    """All of a vessel, or one part of it, goes into another."""

    origin: Place
    target: Place
    clauses: tuple[Clause, ...]
    span: Span


class AliquotAct(NamedTuple):
    """A measured share of a vessel goes into another."""

    measure: Measured
    origin: Place
    target: Place
    clauses: tuple[Clause, ...]
    span: Span


class VerbAct(NamedTuple):
    """A verb of the bench with its object and clauses.

    `object` is None for `wait`, `take`, `next period`; for `take 25 min` and `wait 5 min` it is
    the time; for `suppose` an Amount. `test` keeps what is tested for in `subject`.
    """

    verb: str
    verb_span: Span
    object: Place | Measured | Amount | None
    clauses: tuple[Clause, ...]
    span: Span
    subject: Name | None = None


class StepRange(NamedTuple):
    """`3–4`, `5`, or a label: which steps are meant."""

    first: str
    last: str
    span: Span


class AgainAct(NamedTuple):
    """Steps are done again.

    Attributes:
        steps: Which; one entry a comma-separated item.
        times: How many more times (1 where nothing is said).
        at_most: The count that prep reckons with, where given.
        fresh: Each pass starts with clean vessels.
        exchanges: Pairs (new, old) of names.
    """

    steps: tuple[StepRange, ...]
    times: int
    at_most: int | None
    fresh: bool
    exchanges: tuple[tuple[Name, Name], ...]
    span: Span


class LabelAct(NamedTuple):
    """Gives a name to the state reached here."""

    name: Name
    span: Span


class StepAct(NamedTuple):
    """Shows the number of a labelled step."""

    name: Name
    span: Span


class ValueAct(NamedTuple):
    """A computed figure."""

    expression: Expression
    unit: Name | None
    span: Span


class RecordAct(NamedTuple):
    """A blank for the student; `expression` gives the instructor's expected value."""

    name: Name | None
    label: str
    unit: Name | None
    expression: Expression | None
    span: Span


class BrokenAct(NamedTuple):
    """What could not be read; it has been reported and offends nobody further on."""

    span: Span


Act = (
    QuantityAct
    | NameAct
    | StatedAct
    | ChargeAct
    | TransferAct
    | AliquotAct
    | VerbAct
    | AgainAct
    | LabelAct
    | StepAct
    | ValueAct
    | RecordAct
    | BrokenAct
)


# ---------------------------------------------------------------- inlines


class Text(NamedTuple):
    """Plain characters. `span` covers them in the source when they stand there as they are.

    Where an escape or an entity stands between, the reader starts a new node, so that text and
    source agree character by character within one node; an entity's node has the entity's span.
    """

    text: str
    span: Span


class Break(NamedTuple):
    """End of a line; `hard` where the author forced it."""

    hard: bool
    span: Span


class Emphasis(NamedTuple):
    """`*words*`, or `**words**` where `strong`."""

    strong: bool
    children: tuple[Inline, ...]
    span: Span


class CodeText(NamedTuple):
    """Words in backticks; never read for marks."""

    text: str
    span: Span


class Link(NamedTuple):
    """A link; `target` as written, unescaped."""

    children: tuple[Inline, ...]
    target: str
    title: str
    span: Span


class Image(NamedTuple):
    """A picture of the set; `alt` is plain text."""

    alt: str
    target: str
    title: str
    span: Span


class Marked(NamedTuple):
    """A mark, with the reader's words where the author gave them: `[words]{mark}`.

    Attributes:
        words: Inlines in the square brackets, or None where the mark prints its own wording.
        acts: What stands in the braces.
        mark: Span of the braces with what is in them.
        span: The whole, words included.
    """

    words: tuple[Inline, ...] | None
    acts: tuple[Act, ...]
    mark: Span
    span: Span


Inline = Text | Break | Emphasis | CodeText | Link | Image | Marked


# ---------------------------------------------------------------- blocks


class Paragraph(NamedTuple):
    """A paragraph."""

    children: tuple[Inline, ...]
    span: Span


class Heading(NamedTuple):
    """A heading: a part of the procedure. Level 1 to 6."""

    level: int
    children: tuple[Inline, ...]
    span: Span


class Step(NamedTuple):
    """One step.

    Attributes:
        number: As counted through the whole procedure.
        written: As typed.
        number_span: Where it was typed, with its `.` or `)`.
    """

    number: int
    written: int
    number_span: Span
    children: tuple[Block, ...]
    span: Span


class Steps(NamedTuple):
    """A numbered list at the top level (or in `:::if`): steps of the procedure."""

    items: tuple[Step, ...]
    span: Span


class ListBlock(NamedTuple):
    """Any other list; `start` is its first number, or None for bullets."""

    start: int | None
    items: tuple[tuple[Block, ...], ...]
    span: Span


class Quote(NamedTuple):
    """A block quote."""

    children: tuple[Block, ...]
    span: Span


class CodeBlock(NamedTuple):
    """Fenced or indented code."""

    text: str
    info: str
    span: Span


class Rule(NamedTuple):
    """A thematic break."""

    span: Span


class Cell(NamedTuple):
    """A table cell."""

    children: tuple[Inline, ...]
    span: Span


class Table(NamedTuple):
    """A table; `align` has one of `left right center` or None for each column."""

    align: tuple[str | None, ...]
    head: tuple[Cell, ...]
    rows: tuple[tuple[Cell, ...], ...]
    span: Span


class Fenced(NamedTuple):
    """A block between `:::kind argument` and `:::`.

    `kind` is one of `instructor caution before question answer record if charge`.
    `argument` is what stands after it on the line.
    """

    kind: str
    argument: str
    argument_span: Span
    children: tuple[Block, ...]
    opening: Span
    span: Span


Block = Paragraph | Heading | Steps | ListBlock | Quote | CodeBlock | Rule | Table | Fenced


@dataclass(frozen=True, slots=True, kw_only=True)
class ProcedureSyntax:
    """A whole file as read.

    Attributes:
        source: The file.
        front: The front matter, or None where there is none or it could not be read.
        front_broken: True where it could not be read: names are then unknown, not wrong.
        body: The blocks.
        marks: How many marks the body holds.
    """

    source: Source
    front: YamlMapping | None
    front_broken: bool
    body: tuple[Block, ...]
    marks: int
