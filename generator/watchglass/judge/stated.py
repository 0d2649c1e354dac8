"""What words state of a portion in another measure, against what the mark beside them takes.

`[0.65 g (4.0 mmol, 1.1 equiv) of it]{0.65 g amine -> A}` says one thing three times. A stated figure
agrees where it is within

- half a unit of the last figure written, or 2 %, whichever is larger (`MAY_DIFFER`): published
  procedures print amounts as finely, and handbooks' densities differ by less;
- half a unit of the last figure of what the mark takes, at most 5 %: `{3 g x}` may be 3.1 g that was
  rounded after the amount was worked out;
- 10 % of an approximation (`ca. 4 mmol`).

A figure that cannot be worked out (no density, no formula, a mixture) is left to no silence: it is
reported as an untyped quantity, as any figure that is not checked.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.base.findings import Finding, Related
from watchglass.base.quantities import Kind
from watchglass.read import syntax
from watchglass.resolve import model, prose
from watchglass.resolve.stated import Stated, stated
from watchglass.run.content import Content, Missing
from watchglass.run.roles import portion_contents, roles

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.base.dimensions import Dimension
    from watchglass.base.quantities import Number, Quantity
    from watchglass.catalogue.substances import Substance
    from watchglass.judge.case import Case

#: Share by which a stated figure may be off [-]. Judgement: the published lines in `tests/outside`
#: lie within 1 %, and the printed figure that is wrong by 3.3 % is found.
MAY_DIFFER = 0.02
#: Most that the rounding of what is taken may excuse [-]. Judgement.
ROUNDING = 0.05
#: Share by which an approximation may be off [-]. Judgement.
ABOUT = 0.10


class _Taken(NamedTuple):
    """A portion with what it is.

    Attributes:
        material: Of what.
        quantity: How much the mark takes.
        contents: What it holds.
    """

    material: model.Material
    quantity: Quantity
    contents: tuple[Content, ...] | Missing


class _Worth(NamedTuple):
    """What a stated figure should be: the value in SI units, its figures, and of what it is said."""

    value: float
    figures: int
    content: Content


def stated_amounts(case: Case) -> Iterator[Finding]:
    """Report figures in words that are not what their mark takes, one finding a portion."""
    found: dict[int, Finding] = {}
    for one in stated(case.procedure.syntax.body, case.catalogue.measures):
        finding = _judged(case, one)
        if finding is None:
            continue
        if finding.code is codes.QUANTITY_UNTYPED:
            yield finding
            continue
        place = one.amounts[0].span.start
        if place in found:
            finding = _with(found[place], Related(one.span, finding.message))
        found[place] = finding
    yield from found.values()


def _with(finding: Finding, related: Related) -> Finding:
    from dataclasses import replace  # noqa: PLC0415 - only where something is wrong

    return replace(finding, related=(*finding.related, related))


def _judged(case: Case, one: Stated) -> Finding | None:
    portions = [p for p in (_taken(case, amount) for amount in one.amounts) if p is not None]
    if one.equivalents is not None:
        return _equivalents(case, one, one.equivalents, portions)
    quantity = one.quantity
    if quantity is None:
        return None
    worths = [worth for portion in portions for worth in _worths(portion, quantity.dimension)]
    if any(_agrees(quantity, w.value, p.quantity) for p in portions for w in worths):
        return None if one.typed or one.within else _untyped(case, one)
    if len(portions) != 1 or len({w.content.substance.key for w in worths}) != 1:
        return None if one.typed else _untyped(case, one)
    return _disagrees(case, one, quantity, portions[0], worths)


def _untyped(case: Case, one: Stated) -> Finding | None:
    """Report a figure that nothing could be held to, as any figure outside a mark."""
    if one.typed:
        return None
    text = syntax.Text(one.span.text, one.span)
    return next(iter(prose.untyped(text, case.catalogue.measures)), None)


def _taken(case: Case, amount: syntax.Amount) -> _Taken | None:
    material = case.procedure.materials.get(amount.material.text)
    if material is None:
        return None
    if isinstance(amount.measure, syntax.Measured):
        quantity: Quantity | None = amount.measure.quantity
    else:
        quantity = material.provided if amount.measure == "all" else None
    if quantity is None:
        return None
    return _Taken(material, quantity, portion_contents(material, quantity))


# ---------------------------------------------------------------- masses, volumes, amounts


def _worths(portion: _Taken, dimension: Dimension) -> Iterator[_Worth]:
    """Give what a portion is in a dimension: of each substance in it, and of a solution itself."""
    if isinstance(portion.contents, Missing):
        return
    for content in portion.contents:
        value = {dim.AMOUNT: content.moles, dim.MASS: content.mass}.get(dimension)
        density = content.substance.density
        if isinstance(portion.material.composition, model.Pure):
            if dimension == dim.VOLUME and density is not None:
                value = content.mass / density.value.si
        elif dimension == dim.VOLUME:
            value = None
        if value is not None:
            yield _Worth(value, content.figures, content)
    whole = _of_solution(portion, dimension)
    if whole is not None and portion.contents:
        yield _Worth(whole, portion.quantity.figures, portion.contents[0])


def _of_solution(portion: _Taken, dimension: Dimension) -> float | None:
    """Give the mass or volume of a solution whose density is known."""
    facts = portion.material.solution
    if facts is None or facts.density is None:
        return None
    measured = portion.quantity
    if dimension == dim.MASS and measured.dimension == dim.VOLUME:
        return measured.middle * facts.density
    if dimension == dim.VOLUME and measured.dimension == dim.MASS:
        return measured.middle / facts.density
    return None


def _agrees(quantity: Quantity, value: float, taken: Quantity) -> bool:
    """Tell whether a stated quantity is a computed one as finely as the two are written, both SI."""
    last = 0.5 * quantity.unit.factor * 10.0**quantity.number.last_place
    share = ABOUT if quantity.kind is Kind.ABOUT else MAY_DIFFER
    allowed = max(last, max(share, _coarse(taken)) * abs(value)) * (1 + 1e-9)
    low, high = quantity.si, quantity.si_high
    if quantity.kind is Kind.TOLERANCE and quantity.second is not None:
        allowed += quantity.second.value * quantity.unit.factor
    if quantity.kind is Kind.BOUND:
        low = low if quantity.bound in (">=", ">") else 0.0
        high = high if quantity.bound in ("<=", "<") else float("inf")
    return low - allowed <= value <= high + allowed


def _coarse(taken: Quantity) -> float:
    """Give half a unit of the last figure of what is taken, as a share of it [-]."""
    size = abs(taken.middle) / taken.unit.factor
    if taken.kind is Kind.RANGE:
        half = (taken.si_high - taken.si) / 2 / taken.unit.factor
    else:
        half = 0.5 * 10.0**taken.number.last_place
    limit = 1.0 if taken.kind is Kind.RANGE else ROUNDING
    return min(half / size, limit) if size else 0.0


def _disagrees(
    case: Case, one: Stated, quantity: Quantity, portion: _Taken, worths: list[_Worth]
) -> Finding:
    nearest = min(worths, key=lambda worth: abs(worth.value - quantity.si))
    figures = max(min(nearest.figures, max(quantity.figures, 2)), 2)
    figure = _figure(nearest.value, figures, quantity)
    what = f"`{portion.quantity.text}` of `{portion.material.name}`"
    held = nearest.content.substance
    form = _other_form(case, quantity, portion, held)
    if form is not None:
        article = "the anhydrous salt" if not held.hydrate_of else held.name
        message = (
            f"`{quantity.text}` is what {portion.quantity.text} of {form.name} would be;"
            f" `{portion.material.name}` is {article}, {figure}"
        )
        help_ = f"declare `{portion.material.name}: {form.name}` if that is weighed, or write `{figure}`"
    else:
        message = f"{what} is {figure}, and `{quantity.text}` is stated"
        help_ = f"write `{figure}`, or mend the mark"
    return Finding(
        code=codes.STATED_AMOUNT_DISAGREES,
        span=one.span,
        message=message,
        related=(
            Related(one.amounts[0].span, "this is taken"),
            Related(portion.material.span, "it is declared here"),
        ),
        help=help_,
    )


def _figure(value: float, figures: int, like: Quantity) -> str:
    return f"{shown(value / like.unit.factor, figures)} {like.unit.symbol}"


def _other_form(
    case: Case, quantity: Quantity, portion: _Taken, held: Substance
) -> Substance | None:
    """Find the hydrate, or the anhydrous form, that a stated figure fits instead."""
    own = held.formula.molar_mass_si if held.formula else None
    by_mass = portion.quantity.dimension == dim.MASS and quantity.dimension == dim.AMOUNT
    by_amount = portion.quantity.dimension == dim.AMOUNT and quantity.dimension == dim.MASS
    if own is None or isinstance(portion.contents, Missing) or not (by_mass or by_amount):
        return None
    (content, *others) = portion.contents
    if others:
        return None
    for form in case.catalogue.forms_of(held):
        mass = form.formula.molar_mass_si if form.formula else None
        if form.key == held.key or mass is None:
            continue
        value = content.moles * own / mass if by_mass else content.mass * mass / own
        if _agrees(quantity, value, portion.quantity):
            return form
    return None


# ---------------------------------------------------------------- equivalents


def _equivalents(
    case: Case, one: Stated, said: Number, portions: Iterable[_Taken]
) -> Finding | None:
    """Hold equivalents to the moles of what limits the reaction; nothing where none is told."""
    worths = [
        (portion, content, *ratio)
        for portion in portions
        if not isinstance(portion.contents, Missing)
        for content in portion.contents
        for ratio in _ratios(case, portion.material, content)
    ]
    if not worths or any(_near(said, ratio, p.quantity) for p, _, ratio, _ in worths):
        return None
    if len({(p.material.name, reaction.name) for p, _, _, reaction in worths}) != 1:
        return None
    portion, content, ratio, reaction = worths[0]
    figure = shown(ratio, max(min(content.figures, 3), 2))
    return Finding(
        code=codes.STATED_AMOUNT_DISAGREES,
        span=one.span,
        message=f"`{portion.quantity.text}` of `{portion.material.name}` is {figure} equivalents of"
        f" what limits `{reaction.name}`, and `{one.span.text}` is stated",
        related=(
            Related(one.amounts[0].span, "this is taken"),
            Related(reaction.equation_span, "the reaction"),
        ),
        help=f"write `{figure} equiv`, or mend the mark",
    )


def _near(said: Number, value: float, taken: Quantity) -> bool:
    last = 0.5 * 10.0**said.last_place
    return abs(said.value - value) <= max(last, max(MAY_DIFFER, _coarse(taken)) * value) * (
        1 + 1e-9
    )


def _ratios(
    case: Case, material: model.Material, content: Content
) -> Iterator[tuple[float, model.Reaction]]:
    """Give the equivalents of a portion: by moles, by the equation, of one portion and of all.

    Both ways of counting are in use, and either may be meant; a reagent outside the equation (a
    catalyst, a base) is counted on the one reaction there is.
    """
    procedure = case.procedure
    told = roles(procedure, case.usage)
    mine = {r.reaction for r in told if r.material == material.name}
    for reaction in procedure.reactions.values():
        if mine and reaction.name not in mine:
            continue
        if not mine and len(procedure.reactions) != 1:
            continue
        limits = next((r for r in told if r.reaction == reaction.name and r.limiting), None)
        if limits is None or limits.moles <= 0:
            continue
        used = case.usage[material.name].uses
        times = {1, sum(use.times for use in used)} if len(used) == 1 else {1}
        own = _coefficient(reaction, material.name)
        of_limiting = _coefficient(reaction, limits.material)
        for count in times:
            ratio = content.moles * count / limits.moles
            yield ratio, reaction
            if own != of_limiting:
                yield ratio * of_limiting / own, reaction


def _coefficient(reaction: model.Reaction, material: str) -> float:
    return next((float(s.coefficient) for s in reaction.left if s.material == material), 1.0)
