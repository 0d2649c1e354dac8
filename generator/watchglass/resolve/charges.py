"""Charge tables: `:::charge` with vessels down the side and `material / unit` along the top."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.base.scan import Fault, read_quantity
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.resolve.acts import PORTIONS, ActReader

if TYPE_CHECKING:
    from watchglass.base.findings import Code
    from watchglass.base.spans import Span
    from watchglass.resolve.scope import Scope

_HEAD = re.compile(r"\s*([^/]+?)\s*/\s*(\S.*?)\s*")
_BY = re.compile(r"\s*by\s+(\S+)\s*")


def charge_table(block: syntax.Fenced, scope: Scope) -> list[model.Event]:
    """Turn each cell of a charge table into a charge, column by column."""
    table = next((b for b in block.children if isinstance(b, syntax.Table)), None)
    if table is None or len(table.head) < 2:
        _add(
            scope,
            codes.BLOCK_ARGUMENT,
            block.opening,
            "a charge block holds no table of charges",
            "write a table whose first column names vessels and whose other heads are `material / unit`",
        )
        return []
    ware = _ware(block, scope)
    vessels = [_vessel(row[0] if row else None, scope) for row in table.rows]
    events: list[model.Event] = []
    for column, head in enumerate(table.head[1:], start=1):
        material = _material(head, scope)
        if material is None:
            continue
        for row, vessel in zip(table.rows, vessels, strict=True):
            if vessel is None or column >= len(row):
                continue
            portion = _portion(row[column], material, scope)
            if portion is not None:
                events.append(model.Charge((portion,), vessel, ware, row[column].span))
    return events


def _ware(block: syntax.Fenced, scope: Scope) -> str:
    found = _BY.fullmatch(block.argument)
    if found is None:
        return ""
    span = block.argument_span.part(found.start(1), found.end(1))
    return (
        found[1] if scope.take(syntax.Name(found[1], span), ("vessel", "equipment", "aid")) else ""
    )


def _plain(cell: syntax.Cell) -> str:
    return "".join(
        i.text if isinstance(i, syntax.Text) else _named(i) for i in cell.children
    ).strip()


def _named(inline: syntax.Inline) -> str:
    if isinstance(inline, syntax.Marked) and len(inline.acts) == 1:
        act = inline.acts[0]
        if isinstance(act, syntax.NameAct):
            return act.place.name.text
        if isinstance(act, syntax.QuantityAct):
            return act.value.quantity.text
    return ""


def _vessel(cell: syntax.Cell | None, scope: Scope) -> syntax.Place | None:
    if cell is None:
        return None
    name = syntax.Name(_plain(cell), cell.span)
    if scope.take(name, ("vessel",)) is None:
        return None
    return syntax.Place(name, None, cell.span)


def _material(cell: syntax.Cell, scope: Scope) -> tuple[syntax.Name, str] | None:
    found = _HEAD.fullmatch(_plain(cell))
    if found is None:
        _add(
            scope,
            codes.BLOCK_ARGUMENT,
            cell.span,
            f"`{_plain(cell)}` does not name a material and a unit",
            "write the head as `acid / mL`",
        )
        return None
    name = syntax.Name(found[1], _part(cell, found.span(1)))
    if scope.take(name, ("material", "aid")) is None:
        return None
    unit = read_quantity(f"1 {found[2]}", measures=scope.catalogue.measures)
    if isinstance(unit, Fault):
        _add(scope, unit.code, _part(cell, found.span(2)), unit.message, unit.help)
        return None
    if unit.dimension not in PORTIONS:
        _add(
            scope,
            codes.DIMENSION_WRONG,
            _part(cell, found.span(2)),
            f"`{found[2]}` is the unit of {unit.dimension.words};"
            " a mass, a volume, an amount or a count belongs here",
            f"write the head as `{found[1]} / mL`",
        )
        return None
    return name, found[2]


def _part(cell: syntax.Cell, at: tuple[int, int]) -> Span:
    """Give the place of part of a cell's words, where the cell is words alone."""
    match cell.children:
        case (syntax.Text(text, span),) if text == text.strip():
            return span.part(*at)
        case _:
            return cell.span


def _portion(
    cell: syntax.Cell, material: tuple[syntax.Name, str], scope: Scope
) -> model.Portion | None:
    text = _plain(cell)
    if text in ("", "-", "–", "—", "0"):
        return None
    read = read_quantity(f"{text} {material[1]}", measures=scope.catalogue.measures)
    if isinstance(read, Fault):
        _add(scope, read.code, cell.span, read.message, read.help)
        return None
    measured = syntax.Measured(read, cell.span)
    return ActReader(scope).portion(syntax.Amount(measured, material[0], cell.span))


def _add(scope: Scope, code: Code, span: Span, message: str, help_: str | None) -> None:
    scope.findings.append(Finding(code=code, span=span, message=message, help=help_))
