"""The body of a page for one edition: blocks of the syntax tree to blocks of the model.

Two builders share the walk. The student's drops instructors' and answer blocks whole, before
anything in them is looked at, and gives blanks; the instructor's keeps them and gives blanks with
what is expected there.
"""

from __future__ import annotations

import re
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.base.figures import MOST_FIGURES, shown
from watchglass.base.quantities import Kind
from watchglass.base.units import customary
from watchglass.judge.sets import leaves_the_set, resolve_link
from watchglass.publish import model as m
from watchglass.publish.text import NBSP, joined, quantity_words, unit_words, value_words
from watchglass.publish.wording import act_words, mark_words
from watchglass.read import syntax
from watchglass.read.terms import Binary, Call, Compare, Held, Negative
from watchglass.resolve.outline import HIDDEN, headings
from watchglass.run.bench.evaluator import BenchEvaluator
from watchglass.run.evaluate import Evaluator, NotKnown, Value, in_unit

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

    from watchglass.read.terms import Expression
    from watchglass.resolve.model import Procedure

_ROWS = re.compile(r"(\d+)\s+rows?")
_SENTENCE_END = re.compile(r"[.!?]\s*$")
_HIDES = frozenset(("theoretical-yield",))


@dataclass(slots=True)
class BodyBuilder:
    """Builds the body of one page.

    Attributes:
        procedure: What the marks speak of.
        evaluator: Values of figures; of the page's own, since records are filled as they are met.
        addresses: Address of each page by its path within the set.
        path: This page's path.
        instructor: Whether the instructor edition is built.
        runs: How often each step is run, for blanks.
    """

    procedure: Procedure
    evaluator: Evaluator
    addresses: Mapping[str, str]
    path: str
    instructor: bool
    runs: Mapping[int, int] = field(default_factory=dict)
    ids: dict[int, str] = field(default_factory=dict)
    outline: list[tuple[int, str, str]] = field(default_factory=list)
    _blanks: int = 0
    _hidden: int = 0

    def build(self, blocks: tuple[syntax.Block, ...]) -> tuple[m.Blocks, ...]:
        """Build the body, `before` blocks excepted: they are printed first, by `before`."""
        for heading, address in headings(blocks, hidden=self.instructor):
            self.ids[heading.span.start] = address
        return self._blocks(blocks, 0, skip_before=True)

    def before(self, blocks: tuple[syntax.Block, ...]) -> tuple[m.Blocks, ...]:
        """Build the pre-laboratory work."""
        found: list[m.Blocks] = []
        for block in blocks:
            if isinstance(block, syntax.Fenced) and block.kind == "before":
                found += self._blocks(block.children, 0)
        return tuple(found)

    # ------------------------------------------------------------------ blocks

    def _blocks(
        self, blocks: Iterable[syntax.Block], step: int, *, skip_before: bool = False
    ) -> tuple[m.Blocks, ...]:
        result: list[m.Blocks] = []
        for block in blocks:
            if skip_before and isinstance(block, syntax.Fenced) and block.kind == "before":
                continue
            result += self._block(block, step)
        return tuple(result)

    def _block(self, block: syntax.Block, step: int) -> tuple[m.Blocks, ...]:
        match block:
            case syntax.Paragraph(children, _):
                words = self._sentence(children, step)
                return (m.Para(words),) if words else ()
            case syntax.Heading(level, children, span):
                return self._heading(level, children, span.start)
            case syntax.Steps(items, _):
                made = [
                    m.StepItem(i.number, f"step-{i.number}", self._blocks(i.children, i.number))
                    for i in items
                ]
                return (m.StepList(tuple(made)),)
            case syntax.ListBlock(start, items, _):
                return (m.ItemList(start, tuple(self._blocks(i, step) for i in items)),)
            case syntax.Quote(children, _):
                return (m.Quoted(self._blocks(children, step)),)
            case syntax.CodeBlock(text, _, _):
                return (m.Listing(text),)
            case syntax.Rule():
                return (m.Divider(),)
            case syntax.Table():
                return (self._table(block, step),)
            case syntax.Fenced():
                return self._fenced(block, step)

    def _heading(
        self, level: int, children: tuple[syntax.Inline, ...], at: int
    ) -> tuple[m.Blocks, ...]:
        address = self.ids.get(at, f"part-{at}")
        words = self._inlines(children, 0)
        level = min(max(level, 2), 6)
        self.outline.append((level, address, text_of(words)))
        return (m.Title(level, address, words),)

    def _table(
        self, table: syntax.Table, step: int, *, fill: bool = False, rows: int = 0
    ) -> m.Grid:
        return m.Grid(
            table.align,
            tuple(self._inlines(cell.children, step) for cell in table.head),
            tuple(tuple(self._inlines(c.children, step) for c in row) for row in table.rows),
            fill,
            rows,
        )

    def _fenced(self, block: syntax.Fenced, step: int) -> tuple[m.Blocks, ...]:
        if block.kind in HIDDEN:
            if not self.instructor:
                return ()
            return (m.InstructorPanel(block.kind, self._blocks(block.children, step)),)
        if block.kind == "record":
            found = _ROWS.search(block.argument)
            rows = int(found[1]) if found else 0
            made: list[m.Blocks] = []
            for child in block.children:
                if isinstance(child, syntax.Table):
                    made.append(self._table(child, step, fill=True, rows=rows))
                else:
                    made += self._block(child, step)
            return tuple(made)
        children = self._blocks(block.children, step)
        if block.kind in ("caution", "question", "before"):
            return (m.Panel(block.kind, children),)
        return children

    # ------------------------------------------------------------------ inlines

    def _sentence(self, inlines: tuple[syntax.Inline, ...], step: int) -> tuple[m.Words, ...]:
        """Build a paragraph; what a mark says at its start, or after a full stop, is capitalised."""
        result: list[m.Words] = []
        for inline in inlines:
            made = self._inline(inline, step)
            own = isinstance(inline, syntax.Marked) and inline.words is None
            if (
                own
                and made
                and (not text_of(result).strip() or _SENTENCE_END.search(text_of(result[-2:])))
            ):
                made = capitalised(made)
            result += made
            if own and inline is inlines[-1] and made and not _blank(made):
                result.append(m.Run("."))
        return joined(result)

    def _inlines(self, inlines: Iterable[syntax.Inline], step: int) -> tuple[m.Words, ...]:
        return joined([word for inline in inlines for word in self._inline(inline, step)])

    def _inline(self, inline: syntax.Inline, step: int) -> tuple[m.Words, ...]:
        match inline:
            case syntax.Text(text, _):
                return (m.Run(text),)
            case syntax.Break(hard, _):
                return (m.LineEnd(),) if hard else (m.Run("\n"),)
            case syntax.Emphasis(strong, children, _):
                return (m.Stress(strong, self._inlines(children, step)),)
            case syntax.CodeText(text, _):
                return (m.CodeRun(text),)
            case syntax.Link(children, target, _, _):
                return (self._link(target, self._inlines(children, step)),)
            case syntax.Image(alt, target, _, _):
                there, _ = resolve_link(self.path, target)
                return (m.Picture(target if leaves_the_set(target) else there, alt),)
            case syntax.Marked():
                return self._marked(inline, step)

    def _link(self, target: str, children: tuple[m.Words, ...]) -> m.Words:
        if leaves_the_set(target):
            return m.LinkTo(target, False, children)  # noqa: FBT003 - a field of the model
        there, anchor = resolve_link(self.path, target)
        address = self.addresses.get(there, there)
        return m.LinkTo(address + (f"#{anchor}" if anchor else ""), True, children)  # noqa: FBT003

    def _marked(self, marked: syntax.Marked, step: int) -> tuple[m.Words, ...]:
        if marked.words is not None:
            return (m.Said("act", self._inlines(marked.words, step)),)
        figures = (syntax.RecordAct, syntax.ValueAct)
        if any(isinstance(act, figures) for act in marked.acts):
            parts = [words for act in marked.acts if (words := self._act(act, step))]
        else:
            parts = mark_words(marked.acts, self.procedure, step=step)
        result: list[m.Words] = []
        for index, part in enumerate(parts):
            if index:
                result.append(m.Run(", then " if index == len(parts) - 1 else ", "))
            result += part
        return tuple(result)

    def _act(self, act: syntax.Act, step: int) -> tuple[m.Words, ...]:
        match act:
            case syntax.RecordAct():
                return self._record(act, step)
            case syntax.ValueAct(expression, unit, _):
                return self._figure(expression, unit.text if unit else "")
            case _:
                return act_words(act, self.procedure, step=step)

    # ------------------------------------------------------------------ figures

    def _figure(self, expression: Expression, unit: str) -> tuple[m.Words, ...]:
        if (
            not self.instructor
            and _calls(expression, _HIDES)
            and "yield" not in self.procedure.head.show
        ):
            return (m.Said("figure", (m.Run("(see your instructor)"),)),)
        words = self._computed(expression, unit)
        return (m.Said("figure", words or (m.Run("not assessed"),)),)

    def _computed(self, expression: Expression, unit: str) -> tuple[m.Words, ...] | None:
        """Set the value of an expression; a quantity that stands alone as its author wrote it."""
        if isinstance(expression, syntax.Measured):
            quantity = expression.quantity
            if quantity.unit.symbol and unit in ("", quantity.unit.symbol):
                return quantity_words(quantity)
        return self._figures(self.evaluator.value(expression), unit or _unit_of(expression))

    def _figures(self, found: Value | NotKnown, unit: str) -> tuple[m.Words, ...] | None:
        if isinstance(found, NotKnown):
            return None
        unit = unit or customary(found.dimension)
        number = in_unit(found, "" if unit == "1" else unit)
        if number is None:
            return None
        digits = shown(number, found.figures)
        if found.dimension == dim.NUMBER and found.figures >= MOST_FIGURES and "." in digits:
            digits = digits.rstrip("0").rstrip(".")  # numbers alone are exact: 2 × 3 is 6
        return value_words(digits, "" if unit == "1" else unit)

    def _record(self, act: syntax.RecordAct, step: int) -> tuple[m.Words, ...]:
        if isinstance(self.evaluator, BenchEvaluator):
            self.evaluator.step = step
        self._blanks += 1
        name = act.name.text if act.name else ""
        unit = act.unit.text if act.unit and act.unit.text != "1" else ""
        blank = m.Blank(
            f"record-{name or self._blanks}",
            act.label,
            unit_words(unit),
            max(1, self.runs.get(step, 1)) * _ends(act.expression),
        )
        if not self.instructor:
            return (blank,)
        if name:
            self.evaluator.records[name] = (
                self.evaluator.value(act.expression) if act.expression else NotKnown("measured")
            )
        if act.expression is None:
            return (m.ExpectedBlank(blank, (m.Run("measured, nothing expected"),)),)
        if isinstance(act.expression, syntax.Words):
            return (m.ExpectedBlank(blank, (m.Run(act.expression.text),)),)
        return (m.ExpectedBlank(blank, self._computed(act.expression, unit)),)


def _ends(expression: Expression | None) -> int:
    """Count the blanks that a value takes: two for a range."""
    ranged = isinstance(expression, syntax.Measured) and expression.quantity.kind is Kind.RANGE
    return 2 if ranged else 1


def _unit_of(expression: Expression) -> str:
    """Give the unit that an expression itself names: of `convert(v, mL)`."""
    match expression:
        case Call(syntax.Name("convert"), (_, unit), _):
            return unit.span.text
        case _:
            return ""


def _calls(node: Expression, names: frozenset[str]) -> bool:
    """Tell whether an expression calls one of some functions."""
    match node:
        case Call(function, arguments, _):
            return function.text in names or any(_calls(a, names) for a in arguments)
        case Binary(_, left, right, _) | Compare(_, left, right, _) | Held(left, right, _):
            return _calls(left, names) or _calls(right, names)
        case Negative(operand, _):
            return _calls(operand, names)
        case _:
            return False


def _blank(words: tuple[m.Words, ...]) -> bool:
    return isinstance(words[-1], m.Blank | m.ExpectedBlank)


def text_of(words: Iterable[m.Words]) -> str:
    """Give the plain text of words."""
    parts: list[str] = []
    for word in words:
        match word:
            case m.Run(text) | m.Raised(text) | m.Lowered(text) | m.CodeRun(text):
                parts.append(text)
            case m.Stress(_, children) | m.LinkTo(_, _, children) | m.Said(_, children):
                parts.append(text_of(children))
            case m.Blank(_, label, unit, _) | m.ExpectedBlank(m.Blank(_, label, unit, _), _):
                parts.append(label + (f" ({text_of(unit)})" if unit else ""))
            case m.Picture(_, alt):
                parts.append(alt)
            case m.LineEnd():
                parts.append(" ")
    return "".join(parts).replace(NBSP, " ")


def capitalised(words: tuple[m.Words, ...]) -> tuple[m.Words, ...]:
    """Begin words with a capital, where they begin with a small letter of plain prose."""
    first, *rest = words
    match first:
        case m.Run(text) if text[:1].islower():
            return (m.Run(text[0].upper() + text[1:]), *rest)
        case m.Said(kind, children) if children and kind != "material":
            return (m.Said(kind, capitalised(children)), *rest)
        case _:
            return words
