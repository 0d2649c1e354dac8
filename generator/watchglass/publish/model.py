"""What an edition shows, as models: no markup, no templates, no files.

There are two families of everything that differs by edition. A student type has no field that
could hold an answer, an expected value, a finding or an instructor's block: what is not there
cannot leak. Templates and the HTML writer take these models and add nothing to them.
"""

from __future__ import annotations

from dataclasses import dataclass, field

from watchglass.publish.bench import BenchStep  # noqa: TC001 - templates' tests read the types
from watchglass.publish.shapes import Figure  # noqa: TC001 - likewise

# ---------------------------------------------------------------- words


@dataclass(frozen=True, slots=True)
class Run:
    """Plain words."""

    text: str


@dataclass(frozen=True, slots=True)
class Raised:
    """Superscript."""

    text: str


@dataclass(frozen=True, slots=True)
class Lowered:
    """Subscript."""

    text: str


@dataclass(frozen=True, slots=True)
class LineEnd:
    """A forced line end."""


@dataclass(frozen=True, slots=True)
class CodeRun:
    """Words as typed."""

    text: str


@dataclass(frozen=True, slots=True)
class Stress:
    """Emphasis; `strong` for the stronger kind."""

    strong: bool
    children: tuple[Words, ...]


@dataclass(frozen=True, slots=True)
class LinkTo:
    """A link. `target` is relative to the edition's root for pages of the set, else absolute."""

    target: str
    local: bool
    children: tuple[Words, ...]


@dataclass(frozen=True, slots=True)
class Picture:
    """A picture, with its text alternative."""

    source: str
    alt: str


@dataclass(frozen=True, slots=True)
class Said:
    """A mark in words.

    `kind` is `quantity`, `vessel`, `material`, `act`, `figure` or `step`: set apart by weight only.
    """

    kind: str
    children: tuple[Words, ...]


@dataclass(frozen=True, slots=True)
class Blank:
    """A blank to fill in: a label, a unit, and an id that is one of its own on the page.

    `count` blanks are ruled side by side (two for a range, one a run of a repeated step).
    """

    id: str
    label: str
    unit: tuple[Words, ...]
    count: int = 1


@dataclass(frozen=True, slots=True)
class ExpectedBlank:
    """A blank with what is expected there; instructor edition only. `expected` None: not assessed."""

    blank: Blank
    expected: tuple[Words, ...] | None


Words = (
    Run
    | Raised
    | Lowered
    | LineEnd
    | CodeRun
    | Stress
    | LinkTo
    | Picture
    | Said
    | Blank
    | ExpectedBlank
)


# ---------------------------------------------------------------- blocks


@dataclass(frozen=True, slots=True)
class Para:
    """A paragraph."""

    children: tuple[Words, ...]


@dataclass(frozen=True, slots=True)
class Title:
    """A heading with its address on the page; `level` 2 to 6."""

    level: int
    id: str
    children: tuple[Words, ...]


@dataclass(frozen=True, slots=True)
class StepItem:
    """One step: its number as printed, its address `step-N`, its blocks."""

    number: int
    id: str
    children: tuple[Blocks, ...]


@dataclass(frozen=True, slots=True)
class StepList:
    """Steps in a row."""

    items: tuple[StepItem, ...]


@dataclass(frozen=True, slots=True)
class ItemList:
    """Another list; `start` None for bullets. `tight` where items are single paragraphs."""

    start: int | None
    items: tuple[tuple[Blocks, ...], ...]


@dataclass(frozen=True, slots=True)
class Quoted:
    """A block quote."""

    children: tuple[Blocks, ...]


@dataclass(frozen=True, slots=True)
class Listing:
    """Text as typed."""

    text: str


@dataclass(frozen=True, slots=True)
class Divider:
    """A thematic break."""


@dataclass(frozen=True, slots=True)
class Grid:
    """A table; `fill` where students write in its empty cells (then `blank_rows` more rows)."""

    align: tuple[str | None, ...]
    head: tuple[tuple[Words, ...], ...]
    rows: tuple[tuple[tuple[Words, ...], ...], ...]
    fill: bool = False
    blank_rows: int = 0


@dataclass(frozen=True, slots=True)
class Panel:
    """A block set apart: `kind` is `caution`, `before` or `question`."""

    kind: str
    children: tuple[Blocks, ...]


@dataclass(frozen=True, slots=True)
class InstructorPanel:
    """A block for instructors: `kind` is `instructor` or `answer`. In no student page."""

    kind: str
    children: tuple[Blocks, ...]


Blocks = (
    Para | Title | StepList | ItemList | Quoted | Listing | Divider | Grid | Panel | InstructorPanel
)


# ---------------------------------------------------------------- parts of a procedure page


@dataclass(frozen=True, slots=True)
class PageLink:
    """A link to a page of the handbook: its title, its code and its address from the root."""

    title: str
    code: str
    address: str


@dataclass(frozen=True, slots=True, kw_only=True)
class ReagentRow:
    """One line of the reagent table. Empty text where a figure does not apply.

    Attributes:
        name: The material in the reader's words.
        local: The name the steps use for it, where it differs.
        formula: Its formula, set.
        molar_mass: g/mol, with its figures.
        used: How much the steps use, with unit; `as needed` where the bench decides.
        portions: How that is made up, as `3 × 0.65 g`; empty for one portion.
        amount: Amount of substance, with unit; `unknown` where it cannot be known.
        equivalents: One entry a reaction: (reaction's name or empty, figure, limiting).
        strength: Strength, density or composition.
        provided: What a station is handed.
        rests_on: What the amount rests on beside what is written, each a clause.
        material: Local name of the material that the line belongs to.
        key: Catalogue key of what the line names; empty for mixtures, and for what is kept secret.
        stock: Key of the stock that the material is, or empty.
    """

    name: tuple[Words, ...]
    local: str
    formula: tuple[Words, ...]
    molar_mass: str
    used: tuple[Words, ...]
    portions: str
    amount: tuple[Words, ...]
    equivalents: tuple[tuple[str, str, bool], ...]
    strength: tuple[Words, ...]
    provided: tuple[Words, ...]
    rests_on: tuple[str, ...] = ()
    material: str = ""
    key: str = ""
    stock: str = ""

    @property
    def limiting(self) -> bool:
        """True where it limits a reaction."""
        return any(role[2] for role in self.equivalents)


@dataclass(frozen=True, slots=True)
class EquipmentRow:
    """One line of the equipment list: how many, what, and the names the steps use."""

    count: int
    what: str
    names: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class ReactionLine:
    """A reaction: its name, its equation in words and, where it differs, in formulas."""

    name: str
    equation: tuple[Words, ...]
    formulas: tuple[Words, ...]
    remarks: tuple[str, ...]


@dataclass(frozen=True, slots=True, kw_only=True)
class Facts:
    """The head of a page, the same in both editions."""

    title: str
    code: str
    address: str
    course: str
    revision: str
    time: tuple[str, ...]
    group: str
    after: tuple[PageLink, ...]
    references: tuple[tuple[Words, ...], ...]
    read: tuple[tuple[Words, ...], ...]
    outline: tuple[tuple[int, str, str], ...]  # level, id, text
    previous: PageLink | None
    following: PageLink | None
    scale: str = ""  # `0.5`: what every amount was multiplied by; empty for the size as written
    lang: str = "en"


@dataclass(frozen=True, slots=True, kw_only=True)
class StudentPage:
    """A procedure as students see it."""

    facts: Facts
    before: tuple[Blocks, ...]
    reagents: tuple[ReagentRow, ...]
    equipment: tuple[EquipmentRow, ...]
    reactions: tuple[ReactionLine, ...]
    body: tuple[Blocks, ...]
    flow: tuple[Figure, ...] = ()


@dataclass(frozen=True, slots=True)
class FindingLine:
    """A finding as an instructor reads it on the page."""

    severity: str
    code: str
    name: str
    message: str
    place: str
    help: str
    reason: str  # why it was accepted; empty where it was not


@dataclass(frozen=True, slots=True)
class ExpectationLine:
    """One line of what the experiment is expected to give, and what became of it."""

    words: str
    outcome: str


@dataclass(frozen=True, slots=True)
class SensitivityRow:
    """An expectation, what it comes to, what it hangs on in words, and the inputs that matter.

    `effects` has one entry an input: its words, and what is reached with less and with more of it.
    """

    expectation: str
    reached: str
    verdict: str
    effects: tuple[tuple[str, str, str], ...]


@dataclass(frozen=True, slots=True, kw_only=True)
class InstructorPage:
    """A procedure as instructors see it; `bench` is what every vessel holds after every step."""

    facts: Facts
    before: tuple[Blocks, ...]
    reagents: tuple[ReagentRow, ...]
    equipment: tuple[EquipmentRow, ...]
    reactions: tuple[ReactionLine, ...]
    body: tuple[Blocks, ...]
    findings: tuple[FindingLine, ...]
    accepted: tuple[FindingLine, ...]
    intended: tuple[tuple[str, str], ...]
    expectations: tuple[ExpectationLine, ...]
    assumptions: tuple[str, ...]
    bench: tuple[BenchStep, ...] = ()
    flow: tuple[Figure, ...] = ()
    plots: tuple[Figure, ...] = ()
    sensitivity: tuple[SensitivityRow, ...] = ()


# ---------------------------------------------------------------- other pages


@dataclass(frozen=True, slots=True, kw_only=True)
class OrdinaryPage:
    """A page of the set that is no procedure."""

    title: str
    address: str
    body: tuple[Blocks, ...]
    outline: tuple[tuple[int, str, str], ...] = ()


@dataclass(frozen=True, slots=True)
class ReferenceRow:
    """One fact of a substance or stock: its name, its value (`unknown` in words), its source."""

    label: str
    value: tuple[Words, ...]
    source: str


@dataclass(frozen=True, slots=True)
class ListEntry:
    """One line of a list.

    Attributes:
        link: Where it leads: a page, or a place on one.
        remarks: A few words: time, group, sections.
        words: What is set beside it: a formula, or how much is used.
        reason: Why a finding was accepted; instructors' lists only.
    """

    link: PageLink
    remarks: str
    words: tuple[Words, ...] = ()
    reason: str = ""


@dataclass(frozen=True, slots=True, kw_only=True)
class ReferencePage:
    """A page of a substance or of a stock.

    Attributes:
        kind: `substance` or `stock`.
        title: Its name.
        address: From the edition's root.
        names: What else it is looked for by: other names, numbers, formula, key.
        rows: What is known of it.
        used_in: Procedures that use it, with how much a station uses; the first of them.
        more: Where the others are listed, or None.
        stocks: Stocks that contain it.
        lines: How it is made, in sentences; empty for substances, and in the student edition.
        remarks: What the recipe rests on.
        made: How much the recipe makes; empty where there is none.
        figure: Molar mass, for lists; empty where unknown.
        formula: Its formula, for lists.
        count: How many procedures use it.
    """

    kind: str
    title: str
    address: str
    names: tuple[str, ...]
    rows: tuple[ReferenceRow, ...]
    used_in: tuple[ListEntry, ...]
    more: PageLink | None
    stocks: tuple[PageLink, ...]
    lines: tuple[str, ...]
    remarks: tuple[str, ...]
    made: str = ""
    figure: str = ""
    formula: tuple[Words, ...] = ()
    count: int = 0


@dataclass(frozen=True, slots=True)
class ListGroup:
    """A titled group in a list page: a course, a week, an initial, a kind of finding."""

    title: str
    id: str
    entries: tuple[ListEntry, ...]


@dataclass(frozen=True, slots=True, kw_only=True)
class ListPage:
    """A list, or a part of a long one.

    Attributes:
        kind: `courses`, `weeks`, `substances`, `stocks`, `uses` (of one substance or stock) or
            `accepted` (instructors').
        title: Its title.
        address: From the edition's root.
        groups: What it lists.
        places: Links to the groups, of whatever part they stand in.
        previous: The part before it, or None.
        following: The part after it, or None.
        part: Which part it is, from 1.
    """

    kind: str
    title: str
    address: str
    groups: tuple[ListGroup, ...]
    places: tuple[PageLink, ...] = ()
    previous: PageLink | None = None
    following: PageLink | None = None
    part: int = 1


@dataclass(frozen=True, slots=True, kw_only=True)
class StartPage:
    """The first page: the laboratory, the courses, the pages, the notice.

    `body` is the set's own welcome page where it has one (`pages/welcome.md`), `lists` what can be
    looked up: substances, stocks, accepted findings.
    """

    title: str
    institution: str
    body: tuple[Blocks, ...]
    courses: tuple[ListGroup, ...]
    weeks: tuple[ListGroup, ...]
    pages: tuple[PageLink, ...]
    notice: tuple[str, ...] = field(default=())
    lists: tuple[PageLink, ...] = ()
