"""Checks of the stocks that a set keeps: where each is made from, and whether it can be made at all."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.figures import shown
from watchglass.base.findings import Finding, Related, did_you_mean
from watchglass.run.recipes import faults_of, held_in, recipe

if TYPE_CHECKING:
    from collections.abc import Iterator, Mapping

    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.stocks import Stock
    from watchglass.resolve.laboratory import Laboratory

#: Share by which a stock may miss its strength for the sake of round figures [-]. Judgement: what a
#: class's own pipetting spreads.
_MISSES = 0.02


def judge_stocks(catalogue: Catalogue, laboratory: Laboratory) -> Iterator[Finding]:
    """Check every stock of a set; what is wrong in its description may be known from its use as well."""
    stocks = {stock.key: stock for stock in catalogue.stocks.values()}
    for stock in stocks.values():
        yield from faults_of(stock, catalogue, laboratory)
        found = tuple(_source(stock, stocks, catalogue, laboratory))
        yield from found or _strength(stock, catalogue, laboratory)


def _source(
    stock: Stock, stocks: Mapping[str, Stock], catalogue: Catalogue, laboratory: Laboratory
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
    own, other = (held_in(s, catalogue, laboratory) for s in (stock, parent))
    if own is None or other is None:
        return  # not known, or its material is at fault and says so
    if own.key != other.key:
        why = f"it holds {other.name}, not {own.name}"
    elif own.concentration > other.concentration * (1 + _MISSES):
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


def _strength(stock: Stock, catalogue: Catalogue, laboratory: Laboratory) -> Iterator[Finding]:
    """Report a stock that misses its strength once rounded to what can be weighed and measured."""
    made = recipe(stock, catalogue, laboratory)
    if made.reached is None or abs(made.reached - 1) <= _MISSES:
        return
    share = shown(abs(made.reached - 1) * 100, 2)
    yield Finding(
        code=codes.STOCK_OFF_STRENGTH,
        span=stock.material.span,
        message=f"{made.size} of `{stock.key}` cannot be made to its strength: what can be weighed and"
        f" measured comes to {share} % {'more' if made.reached > 1 else 'less'}",
        help="make more at a time (`makes:`), make it from a weaker stock (`from:`), or weigh finer"
        " (`balance:` in laboratory.yml)",
    )


def _molar(concentration: float) -> str:
    return f"{shown(concentration / 1000, 3)} M"
