"""Products: what is stated of them against what can form, and yields of what no reaction makes."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.base.findings import Finding, Related, did_you_mean
from watchglass.base.spans import Span
from watchglass.judge.at_hand import front_read
from watchglass.read import syntax
from watchglass.read.terms import Binary, Call, Compare, Expression, Name, Negative, Within, Words
from watchglass.resolve.prose import quantities_in
from watchglass.resolve.reactions import substances_of
from watchglass.resolve.stated import step_sentences
from watchglass.run.yields import Formed, makers, most_formed

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.substances import Substance
    from watchglass.judge.case import Case

#: Share by which a stated product may pass what can form: rounding of both figures [-]. Judgement.
_ROUNDING = 0.02
_FUNCTION = "theoretical-yield"
_OF = re.compile(r"\s*(?:of\s+)?(?:the\s+|your\s+|dry\s+|pure\s+|crude\s+)*", re.IGNORECASE)


# ---------------------------------------------------------------- more than can form


class _Said(NamedTuple):
    """So much of a product, as a step states it."""

    quantity: Quantity
    product: Substance
    span: Span


def more_than_forms(case: Case) -> Iterator[Finding]:
    """Report masses and amounts of a product that are more than can form of it."""
    most = dict(_most(case))
    if not most:
        return
    for said in _stated(case, most):
        formed = most[said.product.key]
        worth = _mass_or_moles(said)
        if worth is None:
            continue
        stated, dimension = worth
        limit = formed.mass if dimension == dim.MASS else formed.moles
        last = 0.5 * said.quantity.unit.factor * 10.0**said.quantity.number.last_place
        if limit is None or stated - last <= limit * (1 + _ROUNDING):
            continue
        yield _too_much(case, said, formed, limit, dimension)


def _most(case: Case) -> Iterator[tuple[str, Formed]]:
    """Give what can form at most, by product: only of what one reaction makes and no step brings."""
    procedure = case.procedure
    brought = {
        substance.key
        for name, used in case.usage.items()
        if used.uses or used.as_needed
        for substance in substances_of(procedure.materials[name])
    }
    for reaction in procedure.reactions.values():
        for species in reaction.right:
            if species.substance is None or species.substance.key in (*brought, "water"):
                continue
            if len(makers(species.substance.key, procedure)) != 1:
                continue
            formed = most_formed(reaction, species, procedure, case.usage)
            if formed is not None:
                yield species.substance.key, formed


def _stated(case: Case, most: dict[str, Formed]) -> Iterator[_Said]:
    products = {key: formed.product.substance for key, formed in most.items()}
    for inlines in step_sentences(case.procedure.syntax.body):
        for place, inline in enumerate(inlines):
            following = inlines[place + 1] if place + 1 < len(inlines) else None
            if isinstance(inline, syntax.Text):
                yield from _in_text(case, inline, products)
            if isinstance(inline, syntax.Marked):
                yield from _in_mark(case, inline, following, products)
                for text in inline.words or ():
                    if isinstance(text, syntax.Text):
                        yield from _in_text(case, text, products)


def _in_mark(
    case: Case,
    marked: syntax.Marked,
    following: syntax.Inline | None,
    products: dict[str, Substance | None],
) -> Iterator[_Said]:
    """Read `{6.5 g isopentyl-acetate}`, and `{6.5 g} of isopentyl acetate`."""
    for act in marked.acts:
        match act:
            case syntax.StatedAct(syntax.Amount(syntax.Measured(quantity, _), name, _, None), span):
                substance = case.catalogue.find(name.text)
                if substance is not None and substance.key in products:
                    yield _Said(quantity, substance, span)
            case syntax.QuantityAct(value, span) if isinstance(following, syntax.Text):
                product = _named(following.text, products)
                if product is not None:
                    yield _Said(value.quantity, product, span)
            case _:
                pass


def _in_text(
    case: Case, text: syntax.Text, products: dict[str, Substance | None]
) -> Iterator[_Said]:
    for quantity, start, end in quantities_in(text, case.catalogue.measures):
        product = _named(text.text[end:], products)
        if product is not None:
            yield _Said(quantity, product, text.span.part(start, end))


def _named(words: str, products: dict[str, Substance | None]) -> Substance | None:
    """Give the product whose name stands at the start of some words."""
    found = _OF.match(words)
    rest = words[found.end() if found else 0 :].casefold()
    for substance in products.values():
        for name in substance.names if substance is not None else ():
            after = rest[len(name) : len(name) + 1]
            if rest.startswith(name.casefold()) and not after.isalnum() and after != "-":
                return substance
    return None


def _mass_or_moles(said: _Said) -> tuple[float, dim.Dimension] | None:
    """Give a stated product as a mass or an amount, SI; a volume through its density."""
    quantity = said.quantity
    if quantity.dimension in (dim.MASS, dim.AMOUNT):
        return quantity.si, quantity.dimension
    if quantity.dimension == dim.VOLUME and said.product.density is not None:
        return quantity.si * said.product.density.value.si, dim.MASS
    return None


def _too_much(
    case: Case, said: _Said, formed: Formed, limit: float, dimension: dim.Dimension
) -> Finding:
    name, unit = said.product.name, said.quantity.unit
    symbol, factor = unit.symbol, unit.factor
    if said.quantity.dimension != dimension:
        symbol, factor = "g", 1e-3
    uses = case.usage[formed.limiting].uses if formed.limiting in case.usage else ()
    return Finding(
        code=codes.MORE_THAN_FORMS,
        span=said.span,
        message=f"`{said.quantity.text}` of {name} is more than can form:"
        f" {shown(limit / factor, max(formed.figures, 2))} {symbol} at most",
        related=(
            *(Related(use.span, f"`{formed.limiting}` limits it") for use in uses[:1]),
            Related(formed.reaction.equation_span, "the reaction that makes it"),
        ),
        help="mend the figure, or what is charged",
    )


# ---------------------------------------------------------------- yields of nothing


def no_product(case: Case) -> Iterator[Finding]:
    """Report `theoretical-yield(X)` where X is made by no reaction, or by several."""
    procedure = case.procedure
    if _FUNCTION not in procedure.syntax.source.text:
        return
    if not front_read(procedure):
        return  # something could not be read, and a finding says so
    for call in _calls(case):
        (thing, *_) = call.arguments or (None,)
        if not isinstance(thing, Name | Words) or thing.text in procedure.reactions:
            continue
        if procedure.names.get(thing.text) not in (None, "material"):
            continue  # of another kind, and a finding says so
        quoted = isinstance(thing, Words) or thing.quoted
        substance = case.catalogue.find(thing.text)
        if substance is None and thing.text not in procedure.names and not quoted:
            continue
        named = thing.text in procedure.names or substance is None
        found = makers(thing.text if named or substance is None else substance.key, procedure)
        if len(found) == 1:
            continue
        made = [
            s.substance.key for r in procedure.reactions.values() for s in r.right if s.substance
        ]
        if found:
            message = f"`{thing.text}` is made by " + " and by ".join(
                f"`{r.name}`" for r, _ in found
            )
            help_: str | None = "name the reaction that is meant"
        else:
            message = f"no reaction makes `{thing.text}`"
            help_ = did_you_mean(thing.text, (*procedure.reactions, *made)) or _any_of(
                (*procedure.reactions, *made)
            )
        yield Finding(code=codes.FUNCTION_UNFIT, span=thing.span, message=message, help=help_)


def _any_of(names: tuple[str, ...]) -> str:
    if not names:
        return "declare the reaction under `reactions:`"
    return "name a reaction or its product: " + ", ".join(f"`{name}`" for name in names[:4])


def _calls(case: Case) -> Iterator[Call]:
    procedure = case.procedure
    for line in procedure.expectations:
        yield from _in_expression(line.expression)
    for record in procedure.records:
        if record.expression is not None:
            yield from _in_expression(record.expression)
    for value in _values(procedure.syntax.body):
        yield from _in_expression(value.expression)


def _values(node: object) -> Iterator[syntax.ValueAct]:
    """Give the figures that the body shows, from whatever node they stand in."""
    waiting = [node]
    while waiting:
        node = waiting.pop()
        if isinstance(node, syntax.ValueAct):
            yield node
        elif isinstance(node, tuple) and not isinstance(node, Span):
            waiting.extend([child for child in node if isinstance(child, tuple)][::-1])


def _in_expression(node: Expression) -> Iterator[Call]:
    match node:
        case Call(function, arguments, _):
            if function.text == _FUNCTION:
                yield node
            for argument in arguments:
                yield from _in_expression(argument)
        case Binary(_, left, right, _) | Compare(_, left, right, _):
            yield from _in_expression(left)
            yield from _in_expression(right)
        case Negative(operand, _) | Within(operand, _, _):
            yield from _in_expression(operand)
        case _:
            pass
