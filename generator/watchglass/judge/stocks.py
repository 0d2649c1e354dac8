"""Checks of the stocks that a set keeps: where each is made from, and whether it can be made at all."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.figures import shown
from watchglass.base.findings import Finding, Related, did_you_mean
from watchglass.base.quantities import Kind
from watchglass.judge.strength import beyond
from watchglass.resolve import model
from watchglass.run.recipes import PrepRoom
from watchglass.run.recipes.store import SLACK

if TYPE_CHECKING:
    from collections.abc import Iterator, Mapping

    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.stocks import Stock
    from watchglass.resolve.laboratory import Laboratory

#: Shares by which a stock may miss its strength for the sake of round figures, of one declared to
#: many figures and of one to few [-]. Judgement: what a class's own pipetting spreads.
_FINE, _COARSE = 0.01, 0.02


def judge_stocks(catalogue: Catalogue, laboratory: Laboratory) -> Iterator[Finding]:
    """Check the store and every stock of a set.

    What is wrong in the description of a stock may be known from its use as well.
    """
    room = PrepRoom(catalogue, laboratory)
    yield from room.store.faults()
    stocks = {stock.key: stock for stock in catalogue.stocks.values()}
    for stock in stocks.values():
        yield from room.faults_of(stock)
        found = (
            *beyond(room.store.stock(stock)[0], catalogue),
            *_source(stock, stocks, catalogue, room),
        )
        yield from found or _made(stock, room)


def _source(
    stock: Stock, stocks: Mapping[str, Stock], catalogue: Catalogue, room: PrepRoom
) -> Iterator[Finding]:
    """Report a `from:` that leads nowhere, back to itself, or to what cannot give the stock."""
    if not stock.made_from or stock.made_from_span is None:
        return
    parent = catalogue.stocks.get(stock.made_from.casefold())
    if parent is None:
        yield Finding(
            code=codes.STOCK_SOURCE_UNKNOWN,
            span=stock.made_from_span,
            message=f"`{stock.made_from}` is no stock of this set",
            help=did_you_mean(stock.made_from, stocks) or "name the key of another stock",
        )
        return
    circle = _circle(stock, catalogue)
    if circle:
        if stock.key != next(key for key in stocks if key in circle):
            return  # reported once
        yield Finding(
            code=codes.STOCK_SOURCE_UNKNOWN,
            span=stock.made_from_span,
            message=f"`{stock.key}` is made from itself",
            related=(Related(parent.span, f"by way of `{parent.key}`"),)
            if parent.key != stock.key
            else (),
            help="say of one of them what it is really made from, or leave `from:` out",
        )
        return
    own, other = (room.held_in(s) for s in (stock, parent))
    if own is None or other is None:
        return  # not known, or its material is at fault and says so
    if own.key != other.key:
        why = f"it holds {other.name}, not {own.name}"
    elif own.concentration > other.concentration * (1 + SLACK):
        why = f"it is weaker: {_molar(other.concentration)} against {_molar(own.concentration)}"
    else:
        return
    yield Finding(
        code=codes.STOCK_NOT_FROM_SOURCE,
        span=stock.made_from_span,
        message=f"`{stock.key}` cannot be made from `{parent.key}`: {why}",
        related=(Related(parent.material.span, "what that is"),),
        help="name a stronger stock of the same substance, or leave `from:` out",
    )


def _circle(stock: Stock, catalogue: Catalogue) -> set[str]:
    """Give the keys of the stocks on the way from a stock back to itself; empty where none leads back."""
    seen: set[str] = set()
    step: Stock | None = stock
    while step is not None and step.key not in seen:
        seen.add(step.key)
        step = catalogue.stocks.get(step.made_from.casefold()) if step.made_from else None
    return seen if step is not None and step.key == stock.key else set()


def _made(stock: Stock, room: PrepRoom) -> Iterator[Finding]:
    """Report a stock that is stronger than its reagent, or that misses its strength as rounded."""
    made = room.recipe(stock)
    if made.too_weak:
        yield Finding(
            code=codes.STOCK_STRONGER_THAN_REAGENT,
            span=stock.material.span,
            message=f"`{stock.key}` is stronger than what it is made from: {made.too_weak}",
            help="mend the strength, or list a stronger bottle under `reagents:` in laboratory.yml",
        )
    if made.reached is None or abs(made.reached - 1) <= _allowed(stock, room):
        return
    share = shown(abs(made.reached - 1) * 100, 2)
    yield Finding(
        code=codes.STOCK_OFF_STRENGTH,
        span=stock.material.span,
        message=f"{made.size} of `{stock.key}` cannot be made to its strength: what can be weighed and"
        f" measured comes to {share} % {'more' if made.reached > 1 else 'less'}",
        help="make more at a time (`makes:`), make it from a weaker stock (`from:`), weigh finer"
        " (`balance:` in laboratory.yml), or write the strength with fewer figures",
    )


def _allowed(stock: Stock, room: PrepRoom) -> float:
    """Give the share by which a stock may miss its strength [-]."""
    match room.store.stock(stock)[0].composition:
        case model.Solution(strength, _, _):
            return _half_a_unit(strength.quantity)
        case model.Mixture(parts, "strength", _):
            return min(_half_a_unit(part.quantity) for part in parts)
        case _:
            return _COARSE


def _half_a_unit(strength: Quantity) -> float:
    """Give what half a unit of the last figure is of a strength, within limits [-].

    A strength that is said to be about so much may miss it by as much as its figures allow.
    """
    half = 0.5 * strength.unit.factor * 10.0**strength.number.last_place
    share = (half + (strength.si_high - strength.si) / 2) / (strength.middle or 1.0)
    return max(_FINE, share if strength.kind is Kind.ABOUT else min(share, _COARSE))


def _molar(concentration: float) -> str:
    return f"{shown(concentration / 1000, 3)} M"
