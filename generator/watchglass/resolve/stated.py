"""Figures that stand beside what a mark takes: `[0.65 g (4.0 mmol, 1.1 equiv) of acid]{0.65 g acid -> A}`.

An instructor gives one portion in several measures. What the mark carries itself is compared word
for word (`prose.py`); what it carries in another dimension is computed from it later, so here it is
only found, with the amounts it may speak of. It is taken for such a figure only where it can be
read in one way:

- in the words of a mark: an amount of substance or equivalents anywhere; a mass where the mark
  takes an amount of substance; a mass or a volume in brackets that hold nothing but figures;
- right after a mark: brackets that hold nothing but figures, typed (`({9.8 mmol})`) or plain.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.quantities import Number
from watchglass.read import syntax
from watchglass.resolve.prose import alike, carried, quantities_in, texts_in

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping

    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span

#: What a portion can be given in.
LISTED = (dim.MASS, dim.VOLUME, dim.AMOUNT)
_EQUIVALENTS = re.compile(
    r"(?<![\w.^/,–-])(\d+(?:\.\d+)?)\s*(?:mol(?:ar)?[ .]+)?(?:equivalents?|equivs?|eq)\b\.?"
)
#: What may stand between figures in brackets without saying more.
_BETWEEN = re.compile(r"(?:[\s,;=/]|\band\b|\bor\b|\babout\b|\bca\.)*")
_BRACKETS = re.compile(r"\(([^()]*)\)")
#: Blocks whose words are not instructions.
_ASIDE = frozenset(("instructor", "answer", "question", "before"))


class Stated(NamedTuple):
    """A figure stated of a portion, in another measure than the mark has.

    Attributes:
        quantity: A mass, volume or amount of substance; None for equivalents.
        equivalents: How many, or None.
        span: Where it stands.
        amounts: The amounts it may speak of: the one it stands behind, or all of the mark.
        typed: Whether it stands in a mark of its own.
        within: Whether it stands in the words of the mark, which are scaled with it.
    """

    quantity: Quantity | None
    equivalents: Number | None
    span: Span
    amounts: tuple[syntax.Amount, ...]
    typed: bool = False
    within: bool = False


class _Figure(NamedTuple):
    """A figure in plain words with its offsets."""

    quantity: Quantity | None
    equivalents: Number | None
    start: int
    end: int


def taken(acts: Iterable[syntax.Act]) -> tuple[syntax.Amount, ...]:
    """Give the amounts that a mark takes of materials, stated and proportional ones left out."""
    found: list[syntax.Amount] = []
    for act in acts:
        if isinstance(act, syntax.ChargeAct):
            found += act.amounts
        if isinstance(act, syntax.ChargeAct | syntax.VerbAct):
            found += _with(act.clauses)
    return tuple(amount for amount in found if amount.per is None)


def _with(clauses: Iterable[syntax.Clause]) -> Iterator[syntax.Amount]:
    for clause in clauses:
        if clause.word == "with" and isinstance(clause.value, syntax.Amount):
            yield clause.value


def in_words(marked: syntax.Marked, measures: Mapping[str, float | None]) -> tuple[Stated, ...]:
    """Find what the words of a mark state of its portions in another measure."""
    if marked.words is None:
        return ()
    amounts = taken(marked.acts)
    if not amounts:
        return ()
    has = tuple(carried(marked.acts))
    by_amount = any(quantity.dimension == dim.AMOUNT for quantity in _quantities(amounts))
    found: list[Stated] = []
    behind: tuple[syntax.Amount, ...] = amounts
    for text in texts_in(marked.words):
        lists = _lists(text, measures)
        for figure in _figures(text, measures):
            quantity = figure.quantity
            if quantity is not None and _like_any(quantity, has):
                behind = _said(quantity, amounts) or amounts
                continue
            if (
                quantity is None
                or quantity.dimension == dim.AMOUNT
                or (quantity.dimension == dim.MASS and by_amount)
                or (quantity.dimension in LISTED and _within(figure, lists))
            ):
                span = text.span.part(figure.start, figure.end)
                found.append(Stated(quantity, figure.equivalents, span, behind, within=True))
    return tuple(found)


def beside(
    inlines: tuple[syntax.Inline, ...], measures: Mapping[str, float | None]
) -> tuple[Stated, ...]:
    """Find what stands in brackets right after a mark and holds nothing but figures."""
    found: list[Stated] = []
    for place, inline in enumerate(inlines):
        if isinstance(inline, syntax.Marked) and (amounts := taken(inline.acts)):
            found += _after(inlines[place + 1 :], amounts, tuple(carried(inline.acts)), measures)
    return tuple(found)


def _after(
    inlines: tuple[syntax.Inline, ...],
    amounts: tuple[syntax.Amount, ...],
    has: tuple[Quantity, ...],
    measures: Mapping[str, float | None],
) -> list[Stated]:
    """Read one pair of brackets at the start of inlines; nothing where it holds more than figures."""
    found: list[Stated] = []
    opened = False
    for inline in inlines:
        if isinstance(inline, syntax.Text):
            text = inline.text
            start = 0
            if not opened:
                start = len(text) - len(text.lstrip())
                if text[start : start + 1] != "(":
                    return []
                start, opened = start + 1, True
            end = text.find(")", start)
            stop = len(text) if end < 0 else end
            figures = [f for f in _figures(inline, measures) if start <= f.start and f.end <= stop]
            if not _only(text, start, stop, figures):
                return []
            found += [
                Stated(f.quantity, f.equivalents, inline.span.part(f.start, f.end), amounts)
                for f in figures
            ]
            if end >= 0:
                return [s for s in found if s.quantity is None or _another(s.quantity, has)]
        elif opened and isinstance(inline, syntax.Marked) and inline.words is None:
            match inline.acts:
                case (syntax.QuantityAct(value, span),):
                    found.append(Stated(value.quantity, None, span, amounts, typed=True))
                case _:
                    return []
        else:
            return []
    return []


def _another(quantity: Quantity, has: tuple[Quantity, ...]) -> bool:
    return quantity.dimension in LISTED and not _like_any(quantity, has)


def _figures(text: syntax.Text, measures: Mapping[str, float | None]) -> list[_Figure]:
    """Give quantities and equivalents of a text in their order."""
    found = [_Figure(q, None, start, end) for q, start, end in quantities_in(text, measures)]
    found += [
        _Figure(None, _number(match[1]), match.start(), match.end())
        for match in _EQUIVALENTS.finditer(text.text)
    ]
    return sorted(found, key=lambda figure: figure.start)


def _number(digits: str) -> Number:
    whole, _, decimals = digits.partition(".")
    figures = len((whole + decimals).lstrip("0")) or 1
    return Number(digits, float(digits), figures, -len(decimals))


def _lists(text: syntax.Text, measures: Mapping[str, float | None]) -> list[tuple[int, int]]:
    """Give the insides of brackets that hold nothing but figures."""
    figures = _figures(text, measures)
    return [
        match.span(1)
        for match in _BRACKETS.finditer(text.text)
        if _only(text.text, *match.span(1), [f for f in figures if _within(f, [match.span(1)])])
    ]


def _only(text: str, start: int, stop: int, figures: Iterable[_Figure]) -> bool:
    """Tell whether a stretch of text is a list of figures and nothing else."""
    at, rest = start, []
    for figure in figures:
        rest.append(text[at : figure.start])
        at = figure.end
    rest.append(text[at:stop])
    return all(_BETWEEN.fullmatch(part) for part in rest)


def _within(figure: _Figure, places: Iterable[tuple[int, int]]) -> bool:
    return any(start <= figure.start and figure.end <= stop for start, stop in places)


def _like_any(quantity: Quantity, has: Iterable[Quantity]) -> bool:
    return any(alike(other, quantity) for other in has)


def _quantities(amounts: Iterable[syntax.Amount]) -> Iterator[Quantity]:
    for amount in amounts:
        if isinstance(amount.measure, syntax.Measured):
            yield amount.measure.quantity


def _said(quantity: Quantity, amounts: tuple[syntax.Amount, ...]) -> tuple[syntax.Amount, ...]:
    """Give the amounts of a mark that a quantity in the words repeats."""
    return tuple(
        amount
        for amount, own in ((a, tuple(_quantities((a,)))) for a in amounts)
        if own and abs(own[0].middle - quantity.middle) <= 1e-9 * abs(own[0].middle)
    )


# ---------------------------------------------------------------- all of a procedure


def stated(
    blocks: Iterable[syntax.Block], measures: Mapping[str, float | None]
) -> Iterator[Stated]:
    """Find all that is stated beside what the steps of a body take."""
    for inlines in step_sentences(blocks):
        for inline in inlines:
            if isinstance(inline, syntax.Marked):
                yield from in_words(inline, measures)
        yield from beside(inlines, measures)


def step_sentences(blocks: Iterable[syntax.Block]) -> Iterator[tuple[syntax.Inline, ...]]:
    """Give the runs of inlines that instruct: those of steps, blocks that do not count left out."""
    for block in blocks:
        match block:
            case syntax.Steps(items, _):
                for item in items:
                    yield from _runs(item.children)
            case syntax.ListBlock(_, groups, _):
                for inner in groups:
                    yield from step_sentences(inner)
            case syntax.Quote(inner, _):
                yield from step_sentences(inner)
            case syntax.Fenced() if block.kind not in _ASIDE:
                yield from step_sentences(block.children)
            case _:
                pass


def _runs(blocks: Iterable[syntax.Block]) -> Iterator[tuple[syntax.Inline, ...]]:
    for block in blocks:
        match block:
            case syntax.Paragraph(children, _):
                yield from _runs_of(children)
            case syntax.Steps(items, _):
                for item in items:
                    yield from _runs(item.children)
            case syntax.ListBlock(_, groups, _):
                for inner in groups:
                    yield from _runs(inner)
            case syntax.Quote(inner, _):
                yield from _runs(inner)
            case syntax.Fenced() if block.kind not in _ASIDE:
                yield from _runs(block.children)
            case syntax.Table():
                for row in block.rows:
                    for cell in row:
                        yield from _runs_of(cell.children)
            case _:
                pass


def _runs_of(inlines: tuple[syntax.Inline, ...]) -> Iterator[tuple[syntax.Inline, ...]]:
    yield inlines
    for inline in inlines:
        if isinstance(inline, syntax.Emphasis | syntax.Link):
            yield from _runs_of(inline.children)
