"""Walking the body in reading order: acts to events in their step, records, labels, prose.

Labels are declared in a first pass, since an expectation or a figure may name one that comes
later; everything else follows the order of the text.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding, Related
from watchglass.base.scan import Found, scan_quantity
from watchglass.read import syntax
from watchglass.read.terms import Compare, Within
from watchglass.resolve import model, prose, stated
from watchglass.resolve.acts import ActReader
from watchglass.resolve.charges import charge_table
from watchglass.resolve.scope import KINDS
from watchglass.resolve.typing import Typer

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.base.dimensions import Dimension
    from watchglass.base.findings import Code
    from watchglass.base.spans import Span
    from watchglass.read.terms import Expression
    from watchglass.resolve.scope import Scope

_HIDDEN = frozenset(("instructor", "answer"))
#: Blocks in which quantities may stand in plain words.
_FREE = frozenset(("instructor", "answer", "question", "before"))
_MOVES = (
    syntax.ChargeAct | syntax.TransferAct | syntax.AliquotAct | syntax.VerbAct | syntax.AgainAct
)


@dataclass(slots=True)
class Walk:
    """Where the walk stands."""

    step: int = 0
    block: str = ""  # the innermost `:::` block that matters
    free: bool = False  # quantities may stand in plain words
    hidden: str = ""
    last_target: tuple[str, Span] | None = None
    tie: bool = False  # the text just read ended in `into` or `to`


@dataclass(slots=True)
class BodyReader:
    """Reads the body of one procedure into steps, records and labels."""

    scope: Scope
    steps: list[model.Step] = field(default_factory=list)
    records: list[model.RecordEntry] = field(default_factory=list)
    labels: dict[str, int] = field(default_factory=dict)
    numbers: set[int] = field(default_factory=set)
    record_dimensions: dict[str, Dimension | None] = field(default_factory=dict)
    _events: list[model.Event] = field(default_factory=list)

    def read(self, blocks: tuple[syntax.Block, ...], *, free: bool = False) -> None:
        """Read the whole body; `free` where quantities may stand in plain words throughout."""
        for step, marked in _marks(blocks, 0):
            for act in marked.acts:
                if isinstance(act, syntax.LabelAct) and self.scope.declare(
                    act.name.text, "label", act.name.span
                ):
                    self.labels[act.name.text] = step
        self._blocks(blocks, Walk(free=free))

    # ------------------------------------------------------------------ blocks

    def _blocks(self, blocks: Iterable[syntax.Block], walk: Walk) -> None:
        for block in blocks:
            match block:
                case syntax.Paragraph(children, _):
                    walk.last_target, walk.tie = None, False
                    self._inlines(children, walk)
                case syntax.Heading(_, children, _):
                    self._inlines(children, _within(walk, free=True))
                case syntax.Steps(items, _):
                    for item in items:
                        self._step(item, walk)
                case syntax.ListBlock(_, items, _):
                    for children in items:
                        self._blocks(children, walk)
                case syntax.Quote(children, _):
                    self._blocks(children, walk)
                case syntax.Table():
                    self._table(block, walk)
                case syntax.Fenced():
                    self._fenced(block, walk)
                case syntax.CodeBlock() | syntax.Rule():
                    pass

    def _step(self, item: syntax.Step, walk: Walk) -> None:
        before, self._events = self._events, []
        self.numbers.add(item.number)
        self._blocks(item.children, Walk(step=item.number, free=walk.free, hidden=walk.hidden))
        self.steps.append(model.Step(item.number, tuple(self._events), item.span))
        self._events = before

    def _table(self, table: syntax.Table, walk: Walk) -> None:
        for cell in table.head:
            self._inlines(cell.children, _within(walk, free=True))
        for row in table.rows:
            for cell in row:
                self._inlines(cell.children, walk)

    def _fenced(self, block: syntax.Fenced, walk: Walk) -> None:
        inner = _within(walk, free=block.kind in _FREE)
        inner.block = block.kind
        if block.kind in _HIDDEN or (block.kind == "question" and not walk.hidden):
            inner.hidden = block.kind
        if block.kind == "charge":
            if self._may_happen(block.opening, inner):
                self._events += charge_table(block, self.scope)
            return
        self._blocks(block.children, inner)

    # ------------------------------------------------------------------ inlines

    def _inlines(self, inlines: tuple[syntax.Inline, ...], walk: Walk) -> None:
        measures = self.scope.catalogue.measures
        # What is stated of a portion in another measure is verified later: `judge/stated.py`.
        later = stated.beside(inlines, measures) if walk.step and not walk.free else ()
        places = {one.span.start for one in later}
        for inline in inlines:
            match inline:
                case syntax.Text():
                    words = inline.text.rstrip()
                    walk.tie = words.endswith((" into", " to")) or words in ("into", "to")
                    if not words.endswith(("into", "to")):
                        walk.last_target = None
                    if not walk.free:
                        untyped = prose.untyped(inline, measures)
                        self._found(f for f in untyped if f.span.start not in places)
                case syntax.Emphasis(_, children, _) | syntax.Link(children, _, _, _):
                    self._inlines(children, walk)
                case syntax.Marked():
                    self._marked(inline, walk)
                case _:
                    pass

    def _marked(self, marked: syntax.Marked, walk: Walk) -> None:
        if marked.words is not None:
            measures = self.scope.catalogue.measures
            wrong, loose = prose.disagreements(marked, measures)
            later = stated.in_words(marked, measures) if walk.step and not walk.free else ()
            places = {one.span.start for one in later}
            loose = [finding for finding in loose if finding.span.start not in places]
            self._found(wrong if walk.free else wrong + loose)
        for act in marked.acts:
            self._places(act, walk)
            self._act(act, walk)

    def _places(self, act: syntax.Act, walk: Walk) -> None:
        """Hold `{… -> funnel} into {B}` against each other."""
        if isinstance(act, syntax.ChargeAct | syntax.TransferAct | syntax.AliquotAct):
            walk.last_target = (act.target.name.text, act.target.span)
        elif isinstance(act, syntax.NameAct) and walk.tie and walk.last_target:
            said, place = walk.last_target
            name = act.place.name.text
            if name != said and self.scope.kind(name) == "vessel":
                self._add(
                    codes.PLACES_DIFFER,
                    act.place.span,
                    f"the sentence says `{name}`, the mark before it `{said}`",
                    "name the same vessel in both",
                    (Related(place, f"it goes into `{said}`"),),
                )
            walk.last_target = None

    def _act(self, act: syntax.Act, walk: Walk) -> None:
        if isinstance(act, _MOVES) and not self._may_act(act, walk):
            return
        reader = ActReader(self.scope)
        event: model.Event | None = None
        match act:
            case syntax.ChargeAct():
                event = reader.charge(act)
            case syntax.TransferAct():
                event = reader.transfer(act)
            case syntax.AliquotAct():
                event = reader.aliquot(act)
            case syntax.VerbAct():
                event = reader.operation(act)
            case syntax.AgainAct():
                event = self._again(act, walk)
            case syntax.LabelAct(name, span):
                if walk.step and name.text in self.labels:
                    event = model.Labelled(name.text, span)
            case syntax.QuantityAct(value, span):
                reader.plausible(value.quantity, span)
            case syntax.NameAct(place, _):
                self._mention(place)
            case syntax.StatedAct(amount, _):
                reader.portion(amount)
            case syntax.StepAct(name, _):
                self.scope.take(name, ("label",))
            case syntax.ValueAct(expression, unit, span):
                self._value(expression, unit, span)
            case syntax.RecordAct():
                self._record(act, walk)
            case syntax.BrokenAct():
                pass
        if event is not None:
            self._events.append(event)

    def _may_act(self, act: syntax.Act, walk: Walk) -> bool:
        return self._may_happen(act.span, walk)

    def _may_happen(self, span: Span, walk: Walk) -> bool:
        if walk.hidden:
            self._add(
                codes.ACT_IN_HIDDEN_BLOCK,
                span,
                f"something happens at the bench in a `:::{walk.hidden}` block",
                "move the mark into a step that students see, or take the braces out",
            )
            return False
        if not walk.step or walk.block == "before":
            self._add(
                codes.ACT_WITHOUT_PLACE,
                span,
                "something happens at the bench outside the numbered steps",
                "move the mark into a step, or take the braces out",
            )
            return False
        return True

    def _mention(self, place: syntax.Place) -> None:
        kinds = (
            ("vessel",)
            if place.part
            else (
                "vessel",
                "material",
                "equipment",
                "reaction",
                "aid",
                "bath",
                "stream",
                "substance",
                "record",
            )
        )
        self.scope.take(place.name, kinds, "a vessel" if place.part else "a vessel or a material")

    # ------------------------------------------------------------------ again

    def _again(self, act: syntax.AgainAct, walk: Walk) -> model.Again | None:
        steps: list[int] = []
        for item in act.steps:
            first = self._number(item.first, item, walk)
            last = first if item.last == item.first else self._number(item.last, item, walk)
            if first is None or last is None:
                return None
            if last < first:
                self._add(
                    codes.RANGE_REVERSED,
                    item.span,
                    f"the steps run from {first} back to {last}",
                    f"write `{last}–{first}`",
                )
                return None
            steps += range(first, last + 1)
        for new, old in act.exchanges:
            self._exchanged(new, old)
        exchanges = tuple((new.text, old.text) for new, old in act.exchanges)
        return model.Again(
            tuple(dict.fromkeys(steps)),
            act.times,
            act.at_most,
            act.fresh,
            exchanges,
            walk.step,
            act.span,
        )

    def _exchanged(self, new: syntax.Name, old: syntax.Name) -> None:
        """Check that two names stand for things of one kind."""
        kinds = ("vessel", "material")
        one, other = self.scope.take(new, kinds), self.scope.take(old, kinds)
        if one and other and one != other:
            self._add(
                codes.NAME_OF_OTHER_KIND,
                new.span,
                f"`{new.text}` is {KINDS[one]}, `{old.text}` {KINDS[other]}: they cannot be exchanged",
                "exchange a vessel for a vessel, a material for a material",
            )

    def _number(self, word: str, item: syntax.StepRange, walk: Walk) -> int | None:
        """Give the number of a step named by number or label; only earlier steps can be repeated."""
        if word.isdigit():
            number = int(word) if len(word) <= 5 else 0
            if number in self.numbers and number <= walk.step:
                return number
            self._add(
                codes.STEP_UNKNOWN,
                item.span,
                f"there is no step {word} before this place",
                f"name steps from 1 to {walk.step}",
            )
            return None
        if word in self.labels:
            self.scope.used.add(word)
            if 0 < self.labels[word] <= walk.step:
                return self.labels[word]
            self._add(
                codes.STEP_UNKNOWN,
                item.span,
                f"`{word}` labels no step before this place",
                "name a step that stands before, by its number or its label",
            )
            return None
        self.scope.take(syntax.Name(word, item.span), ("label",))
        return None

    # ------------------------------------------------------------------ figures

    def _value(
        self, expression: Expression, unit: syntax.Name | None, span: Span
    ) -> Dimension | None:
        typer = Typer(self.scope, self.record_dimensions)
        if isinstance(expression, Compare | Within):
            self._add(
                codes.EXPRESSION_NOT_READ,
                expression.span,
                "a comparison has no figure to show",
                "move it to a line of `expect:` in the front matter",
            )
            return None
        typed = typer.type(expression)
        if unit is not None and typed is not None:
            self._unit_fits(typed, unit)
        del span
        return typed

    def _unit_fits(self, typed: Dimension, unit: syntax.Name) -> None:
        if unit.text == "1":
            wanted: Dimension | None = dim.NUMBER
        else:
            found = scan_quantity("1 " + unit.text, 0)
            wanted = found.quantity.dimension if isinstance(found, Found) else None
        if wanted is None:
            return
        if wanted.exponents != typed.exponents:
            self._add(
                codes.DIMENSION_WRONG,
                unit.span,
                f"the value is {typed.words}; `{unit.text}` is the unit of {wanted.words}",
                "name a unit of the value, or mend the expression",
            )
        elif wanted == dim.TEMPERATURE and typed == dim.DIFFERENCE:
            self._add(
                codes.DIMENSION_WRONG,
                unit.span,
                f"the value is {typed.words}; `{unit.text}` is the unit of {wanted.words}",
                "write `in K` for a difference",
            )

    def _record(self, act: syntax.RecordAct, walk: Walk) -> None:
        typed: Dimension | None = None
        if act.expression is not None:
            typed = self._value(act.expression, act.unit, act.span)
        elif act.unit is not None and act.unit.text != "1":
            found = scan_quantity("1 " + act.unit.text, 0)
            typed = found.quantity.dimension if isinstance(found, Found) else None
        name = act.name
        if name is not None and self.scope.declare(name.text, "record", name.span):
            self.record_dimensions[name.text] = typed
        self.records.append(
            model.RecordEntry(
                name=name.text if name else "",
                label=act.label,
                unit=act.unit.text if act.unit and act.unit.text != "1" else "",
                expression=act.expression,
                dimension=typed,
                step=walk.step,
                span=act.span,
            )
        )

    # ------------------------------------------------------------------ findings

    def _found(self, findings: Iterable[Finding]) -> None:
        self.scope.findings.extend(findings)

    def _add(
        self, code: Code, span: Span, message: str, help_: str, related: tuple[Related, ...] = ()
    ) -> None:
        self.scope.findings.append(
            Finding(code=code, span=span, message=message, help=help_, related=related)
        )


def _within(walk: Walk, *, free: bool) -> Walk:
    return Walk(walk.step, walk.block, walk.free or free, walk.hidden)


def _marks(blocks: Iterable[syntax.Block], step: int) -> Iterator[tuple[int, syntax.Marked]]:
    """Give every mark of the body with the number of its step."""
    for block in blocks:
        match block:
            case syntax.Paragraph(children, _) | syntax.Heading(_, children, _):
                yield from ((step, marked) for marked in marks_in(children))
            case syntax.Steps(items, _):
                for item in items:
                    yield from _marks(item.children, item.number)
            case syntax.ListBlock(_, items, _):
                for inner in items:
                    yield from _marks(inner, step)
            case syntax.Quote(inner, _):
                yield from _marks(inner, step)
            case syntax.Fenced():
                yield from _marks(block.children, step)
            case syntax.Table():
                for row in (block.head, *block.rows):
                    for cell in row:
                        yield from ((step, marked) for marked in marks_in(cell.children))
            case syntax.CodeBlock() | syntax.Rule():
                pass


def marks_in(inlines: Iterable[syntax.Inline]) -> Iterator[syntax.Marked]:
    """Give the marks among inlines, also within emphasis and links."""
    for inline in inlines:
        if isinstance(inline, syntax.Marked):
            yield inline
        elif isinstance(inline, syntax.Emphasis | syntax.Link):
            yield from marks_in(inline.children)
