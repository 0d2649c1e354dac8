"""Ordinary pages: marks there may only name or state."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base.fields import Field, Shape, read_fields
from watchglass.resolve.body import BodyReader
from watchglass.resolve.scope import Scope

if TYPE_CHECKING:
    from watchglass.base.findings import Finding
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.read.syntax import ProcedureSyntax
    from watchglass.resolve.laboratory import Laboratory

FIELDS: dict[str, Field] = {"title": Field(Shape.TEXT, "the page's title")}


def resolve_page(
    syntax: ProcedureSyntax, catalogue: Catalogue, laboratory: Laboratory
) -> tuple[Finding, ...]:
    """Check the marks of an ordinary page; it has no names of its own."""
    findings: list[Finding] = []
    if syntax.front is not None:
        _, found = read_fields(syntax.front, FIELDS, "the front matter of a page")
        findings += found
    scope = Scope(catalogue, laboratory, broken=syntax.front_broken)
    BodyReader(scope).read(syntax.body, free=True)
    return (*findings, *scope.findings)
