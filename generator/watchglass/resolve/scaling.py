"""A procedure scaled: every extensive quantity multiplied, every vessel taken a size that fits.

The procedure is resolved as its author wrote it, and scaled afterwards: what is wrong with the
draft is found in the author's own figures. `procedure.syntax` stays as read; `procedure.body` is
what is printed. Extensive are masses, volumes, amounts of substance and counts of what is charged,
drawn, provided, given off or left; strengths, temperatures, times and shares are not, nor is
`12 mL ethanol per g crude`, nor a quantity that stands in a mark by itself (`weigh to {0.1 mg}`),
save where it states a portion once more (`{0.65 g acid -> A} ({5.3 mmol})`).
"""

from __future__ import annotations

from dataclasses import dataclass, field, replace
from math import inf
from typing import TYPE_CHECKING, TypeVar

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding
from watchglass.base.scaling import EXTENSIVE, scaled
from watchglass.base.scan import Found, scan_quantity
from watchglass.base.spans import Span
from watchglass.read import syntax
from watchglass.read.terms import Compare, Within
from watchglass.resolve import model
from watchglass.resolve.prose import quantities_in
from watchglass.resolve.stated import stated

if TYPE_CHECKING:
    from collections.abc import Iterator, Mapping

    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.glassware import VesselType
    from watchglass.read.terms import Expression
    from watchglass.resolve.laboratory import Laboratory

#: Clauses whose quantity goes with the size of the batch.
_EXTENSIVE_CLAUSES = frozenset(("with", "giving", "leaving"))
#: Two sizes that differ by less are one [-].
_SAME = 1e-6
#: Sizes that a finding names.
_NAMED = 4
#: Rounding beyond this is worth a word to the author [-].
_CHANGED = 0.02

_Node = TypeVar("_Node")


def rescale(
    procedure: model.Procedure, factor: float, catalogue: Catalogue, laboratory: Laboratory
) -> tuple[model.Procedure, tuple[Finding, ...]]:
    """Scale a resolved procedure.

    Args:
        procedure: As resolved, at the size its author wrote.
        factor: Greater than 0 [-].
        catalogue: Countable measures.
        laboratory: The glassware owned and the balance.

    Returns:
        The procedure at its new size (`head.scale` is the factor) and the findings: vessels that
        are not owned in the size needed, amounts that can no longer be measured.
    """
    if factor == 1.0:
        return replace(procedure, head=procedure.head._replace(scale=1.0)), ()
    beside = frozenset(one.span.start for one in stated(procedure.body, catalogue.measures))
    scaler = _Scaler(factor, procedure, catalogue, laboratory, beside)
    vessels = {name: scaler.vessel(vessel) for name, vessel in procedure.vessels.items()}
    scaler.vessels = vessels
    result = replace(
        procedure,
        head=procedure.head._replace(scale=factor),
        materials={name: scaler.material(m) for name, m in procedure.materials.items()},
        vessels=vessels,
        resized={
            name: (vessel.written, vessels[name].written)
            for name, vessel in procedure.vessels.items()
            if vessel.written != vessels[name].written and name in procedure.used
        },
        steps=tuple(
            step._replace(events=tuple(scaler.event(e) for e in step.events))
            for step in procedure.steps
        ),
        expectations=tuple(scaler.line(e) for e in procedure.expectations),
        body=scaler.node(procedure.body),
    )
    return result, tuple(scaler.findings)


@dataclass(slots=True)
class _Scaler:
    factor: float
    procedure: model.Procedure
    catalogue: Catalogue
    laboratory: Laboratory
    #: Where a portion is stated once more, in another measure.
    beside: frozenset[int] = frozenset()
    vessels: Mapping[str, model.Vessel] = field(default_factory=dict)
    findings: list[Finding] = field(default_factory=list)
    _reported: set[int] = field(default_factory=set)

    # ------------------------------------------------------------------ quantities

    def quantity(self, quantity: Quantity, span: Span | None = None, ware: str = "") -> Quantity:
        """Scale a quantity where it is extensive; `span` is where a finding about it would stand."""
        if quantity.dimension not in EXTENSIVE:
            return quantity
        step = self._step(quantity, ware)
        found = scaled(quantity, self.factor, step=step)
        # What was too coarse before is the author's own doing and is judged by other checks.
        if found.change > _CHANGED and span and quantity.dimension != dim.COUNT:
            self._too_small(quantity, found.quantity, span)
        return found.quantity

    def _step(self, quantity: Quantity, ware: str) -> float | None:
        """Give the finest step that can be measured; where the author's is finer, it is theirs."""
        least = None
        if quantity.dimension == dim.MASS:
            least = self.laboratory.balance
        elif (
            quantity.dimension == dim.VOLUME and (vessel := self.vessels.get(ware)) and vessel.type
        ):
            from watchglass.catalogue.measuring import reach  # noqa: PLC0415 - its tables are read when asked

            found = reach(vessel.type)
            least = found.step if found else None
        if least is None:
            return None
        written = quantity.unit.factor * 10.0**quantity.number.last_place
        return min(least, written)

    def _too_small(self, before: Quantity, after: Quantity, span: Span) -> None:
        if span.start in self._reported:
            return
        self._reported.add(span.start)
        self.findings.append(
            Finding(
                code=codes.SCALED_BEYOND_MEASURE,
                span=span,
                message=f"`{before.text}` times {self.factor:.4g} cannot be measured:"
                f" the nearest is {after.text}",
                help="scale by a larger factor, or prepare a solution of it and measure that",
            )
        )

    # ------------------------------------------------------------------ declarations

    def material(self, material: model.Material) -> model.Material:
        """Scale what is provided."""
        if material.provided is None:
            return material
        return material._replace(provided=self.quantity(material.provided, material.provided_span))

    def vessel(self, vessel: model.Vessel) -> model.Vessel:
        """Take the smallest size owned that holds as much more as is charged more.

        Where none is so large it is the largest: whether what comes into it has room is for the
        bench to say. Ware with one mark has to be of just the size: where there is none, that is
        reported, and it is taken to be of that size. What delivers is filled again.
        """
        type_ = vessel.type
        if type_ is None or type_.size is None or type_.size.dimension != dim.VOLUME:
            return vessel
        needed = scaled(type_.size, self.factor).quantity
        sizes = sorted({size.si: size for size in self._sizes(type_)}.items())
        if self._one_mark(type_):
            fitting = [size for si, size in sizes if abs(si - needed.si) <= _SAME * needed.si]
        else:
            fitting = [size for si, size in sizes if si >= needed.si * (1 - _SAME)]
            if self.factor < 1 and type_.size.si < (fitting[0].si if fitting else inf):
                fitting = [type_.size]  # what the author has serves a smaller batch, too
            if not fitting:
                largest = [size for si, size in sizes if si > type_.size.si]
                delivers = type_.type.measures == "delivers"
                fitting = [type_.size] if delivers or not largest else largest[-1:]
        if not fitting:
            self._not_owned(vessel, type_, needed, [size for _, size in sizes])
        size = fitting[0] if fitting else needed
        written = vessel.written.replace(type_.size.text, size.text, 1)
        return vessel._replace(type=type_._replace(size=size), written=written)

    def _one_mark(self, type_: VesselType) -> bool:
        """Tell whether a vessel measures one volume only: a volumetric flask, a pipette with one mark."""
        if not type_.type.measures:
            return False
        from watchglass.catalogue.measuring import reach  # noqa: PLC0415 - its tables are read when asked

        found = reach(type_)
        return found is not None and found.fixed

    def _sizes(self, type_: VesselType) -> Iterator[Quantity]:
        """Give the sizes of a type that the laboratory owns; those made, where it lists none."""
        for owned, count in self.laboratory.glassware:
            fits = not type_.class_ or owned.class_ == type_.class_
            if count and fits and owned.size and owned.type.key == type_.type.key:
                yield owned.size
        if not self.laboratory.glassware:
            for size in type_.type.sizes:
                read = scan_quantity(f"{size:g} {type_.type.unit}", 0)
                if isinstance(read, Found):
                    yield read.quantity

    def _not_owned(
        self, vessel: model.Vessel, type_: VesselType, needed: Quantity, sizes: list[Quantity]
    ) -> None:
        if not self._used(vessel):
            return
        there = ", ".join(size.text for size in sizes[-_NAMED:]) if sizes else ""
        self.findings.append(
            Finding(
                code=codes.SIZE_NOT_OWNED,
                span=vessel.span,
                message=f"scaled by {self.factor:.4g}, `{vessel.name}` has to be a"
                f" {type_.written} of {needed.text}; "
                + (f"there is {there}" if there else "none is owned in any size"),
                help="scale by another factor, do the step in portions, or list the size under"
                " `glassware:` in laboratory.yml",
            )
        )

    def _used(self, vessel: model.Vessel) -> bool:
        """Tell whether a vessel, or another of its family, is used; of a family the first speaks."""
        if not vessel.family:
            return vessel.name in self.procedure.used
        if vessel.span.start in self._reported:
            return False
        self._reported.add(vessel.span.start)
        family = (v.name for v in self.procedure.vessels.values() if v.family == vessel.family)
        return any(name in self.procedure.used for name in family)

    # ------------------------------------------------------------------ events

    def event(self, event: model.Event) -> model.Event:
        """Scale what an event takes."""
        match event:
            case model.Charge():
                portions = tuple(self._portion(p, event.ware) for p in event.portions)
                clauses = tuple(self.node(c) for c in event.clauses)
                return event._replace(portions=portions, clauses=clauses)
            case model.Aliquot():
                return event._replace(quantity=self.quantity(event.quantity, event.span))
            case model.Operation():
                clauses = tuple(self.node(c) for c in event.clauses)
                return event._replace(
                    portions=tuple(self._portion(p) for p in event.portions),
                    clauses=clauses,
                    time=next((t for c in clauses if (t := _over(c)) is not None), event.time),
                )
            case model.Transfer():
                return event._replace(clauses=tuple(self.node(c) for c in event.clauses))
            case _:
                return event

    def _portion(self, portion: model.Portion, ware: str = "") -> model.Portion:
        if portion.quantity is None or portion.per is not None:
            return portion
        quantity = self.quantity(portion.quantity, portion.span, ware)
        return portion._replace(quantity=quantity)

    def line(self, line: model.Expectation) -> model.Expectation:
        """Scale the bare mass, volume or amount that something is expected to reach."""
        after = self.expectation(line.expression)
        written = line.written
        for before, now in zip(_held(line.expression), _held(after), strict=True):
            written = written.replace(before.text, now.text, 1)
        return line._replace(expression=after, written=written)

    def expectation(self, expression: Expression) -> Expression:
        """Scale what stands alone on a side of a comparison, or is the range something lies in."""
        match expression:
            case Compare(_, left, right, _):
                return expression._replace(left=self._bare(left), right=self._bare(right))
            case Within(_, range_, _):
                return expression._replace(range=self._measured(range_))
            case _:
                return expression

    def _bare(self, expression: Expression) -> Expression:
        return self._measured(expression) if isinstance(expression, syntax.Measured) else expression

    def _measured(self, measured: syntax.Measured, ware: str = "") -> syntax.Measured:
        return measured._replace(quantity=self.quantity(measured.quantity, None, ware))

    # ------------------------------------------------------------------ what is printed

    def node(self, node: _Node) -> _Node:
        """Scale all that is under a node of the syntax tree; it keeps its shape and its places."""
        result: object = node
        match node:
            case Span() | str() | int() | None:
                pass
            case syntax.Amount():
                result = self._amount(node)
            case syntax.ChargeAct():
                result = self._charge(node)
            case syntax.AliquotAct():
                result = node._replace(measure=self._measured(node.measure))
            case syntax.Clause(word, syntax.Measured() as value, _):
                if word in _EXTENSIVE_CLAUSES:
                    result = node._replace(value=self._measured(value))
                elif word == "over" and self.factor > 1:  # added at the same rate
                    longer = scaled(value.quantity, self.factor).quantity
                    result = node._replace(value=value._replace(quantity=longer))
            case syntax.QuantityAct(value, span) if span.start in self.beside:
                result = node._replace(value=self._measured(value))
            case syntax.QuantityAct() | syntax.ValueAct() | syntax.RecordAct() | syntax.Measured():
                pass
            case syntax.Marked(words, acts, _, _) if words is not None:
                after = tuple(self.node(act) for act in acts)
                pairs = list(zip(carried(acts), carried(after), strict=True))
                result = node._replace(acts=after, words=self._words(words, pairs))
            case syntax.Fenced("charge"):
                result = self._charge_table(node)
            case tuple():
                made = [self.node(child) for child in node]
                result = type(node)(*made) if hasattr(node, "_fields") else tuple(made)
            case _:
                pass
        return result  # type: ignore[return-value]

    def _amount(self, amount: syntax.Amount, ware: str = "") -> syntax.Amount:
        if amount.per is not None or not isinstance(amount.measure, syntax.Measured):
            return amount
        return amount._replace(measure=self._measured(amount.measure, ware))

    def _charge(self, act: syntax.ChargeAct) -> syntax.ChargeAct:
        ware = next(
            (
                c.value.name.text
                for c in act.clauses
                if c.word == "by" and isinstance(c.value, syntax.Place)
            ),
            "",
        )
        return act._replace(
            amounts=tuple(self._amount(a, ware) for a in act.amounts),
            clauses=tuple(self.node(c) for c in act.clauses),
        )

    def _words(
        self, words: tuple[syntax.Inline, ...], pairs: list[tuple[Quantity, Quantity]]
    ) -> tuple[syntax.Inline, ...]:
        """Say in the reader's words what the mark now says."""
        changed = [(before, after) for before, after in pairs if before != after]
        if not changed:
            return words
        return tuple(self._inline(word, changed) for word in words)

    def _inline(
        self, inline: syntax.Inline, changed: list[tuple[Quantity, Quantity]]
    ) -> syntax.Inline:
        match inline:
            case syntax.Text():
                return inline._replace(text=self._text(inline, changed))
            case syntax.Emphasis() | syntax.Link():
                children = tuple(self._inline(child, changed) for child in inline.children)
                return inline._replace(children=children)
            case _:
                return inline

    def _text(self, text: syntax.Text, changed: list[tuple[Quantity, Quantity]]) -> str:
        made, at = [], 0
        for quantity, start, end in quantities_in(text, self.catalogue.measures):
            after = self._said(quantity, changed)
            if after is None and text.span.start + start in self.beside:
                after = scaled(quantity, self.factor).quantity
            if after is not None:
                made += [text.text[at:start], after.text]
                at = end
        return "".join((*made, text.text[at:]))

    def _said(
        self, quantity: Quantity, changed: list[tuple[Quantity, Quantity]]
    ) -> Quantity | None:
        """Give what a quantity in words becomes: what the mark's own became, or an amount beside it."""
        for before, after in changed:
            if before.dimension == quantity.dimension and _same(before, quantity):
                return after
        if quantity.dimension in (dim.AMOUNT, dim.MASS):
            return scaled(quantity, self.factor).quantity
        return None

    def _charge_table(self, block: syntax.Fenced) -> syntax.Fenced:
        """Scale the numbers in the cells of a table of charges, each as its portion was."""
        portions = {
            portion.span.start: portion
            for step in self.procedure.steps
            for event in step.events
            if isinstance(event, model.Charge)
            for portion in event.portions
        }
        wares = {
            portion.span.start: event.ware
            for step in self.procedure.steps
            for event in step.events
            if isinstance(event, model.Charge)
            for portion in event.portions
        }

        def cell(cell: syntax.Cell) -> syntax.Cell:
            portion = portions.get(cell.span.start)
            if portion is None or portion.quantity is None:
                return cell
            after = self.quantity(portion.quantity, None, wares[cell.span.start])
            digits = after.text.removesuffix(after.unit.symbol).rstrip()
            return cell._replace(children=(syntax.Text(digits, cell.span),))

        children = tuple(
            child._replace(rows=tuple(tuple(cell(c) for c in row) for row in child.rows))
            if isinstance(child, syntax.Table)
            else child
            for child in block.children
        )
        return block._replace(children=children)


def carried(acts: tuple[syntax.Act, ...]) -> Iterator[Quantity]:
    """Give the extensive quantities that acts hold, in the order of the text."""
    for act in acts:
        yield from _held(act)


def _held(node: object) -> Iterator[Quantity]:
    match node:
        case Span() | str() | int() | None:
            return
        case syntax.Measured(quantity, _):
            if quantity.dimension in EXTENSIVE:
                yield quantity
        case tuple():
            for child in node:
                yield from _held(child)
        case _:
            return


def _same(one: Quantity, other: Quantity) -> bool:
    margin = 1e-9 * max(abs(one.si_high), abs(other.si_high), 1e-30)
    return abs(one.si - other.si) <= margin and abs(one.si_high - other.si_high) <= margin


def _over(clause: syntax.Clause) -> float | None:
    """Give the time over which something is added, s; None for other clauses."""
    if clause.word != "over" or not isinstance(clause.value, syntax.Measured):
        return None
    return clause.value.quantity.si
