"""What the sentences themselves say: quantities outside marks, and words that differ from their mark."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding, Related
from watchglass.base.scan import Fault, Found, scan_quantity
from watchglass.base.units import REFUSED, UNITS
from watchglass.read import syntax

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping

    from watchglass.base.quantities import Quantity

_NUMBER = re.compile(r"(?<![\w.^/{,–-])(?:ca\. ?)?[-−]?\d")
#: Symbols that are also words or numbers of other things in running text.
_TOO_SHORT = frozenset(("in", "d", "h", "s", "m", "M", "K", "V", "W", "J", "L", "l"))


def quantities_in(
    text: syntax.Text, measures: Mapping[str, float | None]
) -> Iterator[tuple[Quantity, int, int]]:
    """Find quantities in plain words: (quantity, start, end) as offsets in the text."""
    words = text.text
    at = 0
    while found := _NUMBER.search(words, at):
        scanned = scan_quantity(words, found.start(), measures=measures)
        at = found.end()
        if isinstance(scanned, Fault) and scanned.code is codes.UNIT_UNKNOWN:
            spelt = _spelt(words, found.start(), scanned)
            if spelt is not None:
                at = scanned.end
                yield spelt, found.start(), scanned.end
        if isinstance(scanned, Found):
            at = max(at, scanned.end)
            glued = words[scanned.end : scanned.end + 1]
            if scanned.measured and not (glued and (glued.isalnum() or glued == "-")):
                yield scanned.quantity, found.start(), scanned.end


def _spelt(words: str, start: int, fault: Fault) -> Quantity | None:
    """Read `5 minutes` as the quantity it is: only where the unit is spelt out as a word."""
    symbol = REFUSED.get(words[fault.start : fault.end], "")
    if symbol not in UNITS or fault.end - fault.start < 3:
        return None
    meant = scan_quantity(f"{words[start : fault.start].rstrip()} {symbol}", 0)
    if not isinstance(meant, Found):
        return None
    return meant.quantity._replace(text=words[start : fault.end])


def untyped(text: syntax.Text, measures: Mapping[str, float | None]) -> list[Finding]:
    """Report quantities that stand in prose outside a mark."""
    findings = []
    for quantity, start, end in quantities_in(text, measures):
        symbol = quantity.unit.symbol
        if symbol in _TOO_SHORT and text.text[end - len(symbol) - 1 : end - len(symbol)].isdigit():
            continue  # `2M`, `4h`: a name or a step as often as a quantity
        if quantity.dimension == dim.COUNT:
            continue
        findings.append(
            Finding(
                code=codes.QUANTITY_UNTYPED,
                span=text.span.part(start, end),
                message=f"`{quantity.text}` stands outside a mark: it is not checked and not counted",
                help=f"write `{{{_written(quantity)}}}`, or name what is charged, as in `{{{_written(quantity)} … -> …}}`",
            )
        )
    return findings


def _written(quantity: Quantity) -> str:
    """Write a quantity as a mark takes it, with the symbol for a unit that was spelt out."""
    if quantity.text.endswith(quantity.unit.symbol):
        return quantity.text
    return f"{quantity.number.text} {quantity.unit.symbol}"


def disagreements(
    marked: syntax.Marked, measures: Mapping[str, float | None]
) -> tuple[list[Finding], list[Finding]]:
    """Compare the quantities in `[words]` with those of the mark they stand for.

    Returns:
        Findings for words that say another figure than the mark, and for quantities of a dimension
        that the mark does not carry at all.
    """
    held = list(carried(marked.acts))
    wrong: list[Finding] = []
    loose: list[Finding] = []
    for text in texts_in(marked.words or ()):
        for quantity, start, end in quantities_in(text, measures):
            same = [c for c in held if alike(c, quantity)]
            if not same:
                if quantity.dimension != dim.COUNT:
                    loose += untyped(
                        syntax.Text(text.text[start:end], text.span.part(start, end)), measures
                    )
            elif not any(_equal(c, quantity) for c in same):
                wrong.append(
                    Finding(
                        code=codes.WORDS_DISAGREE,
                        span=text.span.part(start, end),
                        message=f"the words say `{quantity.text}`, the mark `{same[0].text}`",
                        related=(Related(marked.mark, "the mark they stand for"),),
                        help=f"write `{same[0].text}` in the words, or mend the mark",
                    )
                )
    return wrong, loose


def texts_in(inlines: Iterable[syntax.Inline]) -> Iterator[syntax.Text]:
    """Give the plain texts among inlines, also within emphasis and links."""
    for inline in inlines:
        if isinstance(inline, syntax.Text):
            yield inline
        elif isinstance(inline, syntax.Emphasis | syntax.Link):
            yield from texts_in(inline.children)


def alike(one: Quantity, other: Quantity) -> bool:
    """Tell whether two quantities are of one dimension, so that they must say the same."""
    return one.dimension == other.dimension or (
        one.dimension.exponents == other.dimension.exponents and not one.dimension.plain
    )


def _equal(one: Quantity, other: Quantity) -> bool:
    """Tell whether two quantities say the same; the mark may be a range that holds the words."""
    low, high = one.si, one.si_high
    margin = 1e-9 * max(abs(low), abs(high), abs(other.si), 1e-30)
    return low - margin <= other.si and other.si_high <= high + margin


def carried(acts: Iterable[syntax.Act]) -> Iterator[Quantity]:
    """Give every quantity that the acts of a mark hold."""
    for act in acts:
        match act:
            case syntax.QuantityAct(value, _):
                yield value.quantity
            case syntax.StatedAct(amount, _):
                yield from _of_value(amount)
            case syntax.ChargeAct(amounts, _, clauses, _):
                for amount in amounts:
                    yield from _of_value(amount)
                yield from _of_clauses(clauses)
            case syntax.TransferAct(_, _, clauses, _):
                yield from _of_clauses(clauses)
            case syntax.AliquotAct(measure, _, _, clauses, _):
                yield measure.quantity
                yield from _of_clauses(clauses)
            case syntax.VerbAct():
                if act.object is not None:
                    yield from _of_value(act.object)
                yield from _of_clauses(act.clauses)
            case _:
                pass


def _of_clauses(clauses: Iterable[syntax.Clause]) -> Iterator[Quantity]:
    for clause in clauses:
        yield from _of_value(clause.value)


def _of_value(value: syntax.ClauseValue) -> Iterator[Quantity]:
    match value:
        case syntax.Measured(quantity, _) | syntax.Ph(quantity, _):
            yield quantity
        case syntax.Amount(syntax.Measured(quantity, _), _, _, per):
            yield quantity
            if per:
                yield per[0].quantity
        case _:
            pass
