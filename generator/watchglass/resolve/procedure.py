"""From a syntax tree to a procedure: the one function of this stage."""

from __future__ import annotations

import re
from dataclasses import dataclass
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.fields import Record, Shape, read_fields, unfit
from watchglass.base.findings import Finding
from watchglass.base.yaml import YamlList, YamlMapping, YamlText
from watchglass.catalogue import texts
from watchglass.catalogue.ware import glassware_in, read_vessel
from watchglass.read.expressions import read_expression
from watchglass.read.terms import Compare, Within
from watchglass.resolve import model
from watchglass.resolve.body import BodyReader
from watchglass.resolve.head import FIELDS, read_acceptances, read_head, read_intended
from watchglass.resolve.materials import MaterialReader
from watchglass.resolve.reactions import ReactionReader
from watchglass.resolve.scope import Scope
from watchglass.resolve.typing import Typer

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.spans import Span
    from watchglass.base.yaml import YamlEntry, YamlNode
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.read.syntax import ProcedureSyntax
    from watchglass.resolve.laboratory import Laboratory

_FAMILY = re.compile(r"(\d{1,6})\s*[-–]\s*(\d{1,6})")
MOST_MEMBERS = 200


def resolve(
    syntax: ProcedureSyntax, catalogue: Catalogue, laboratory: Laboratory
) -> tuple[model.Procedure, tuple[Finding, ...]]:
    """Bind every name, check every dimension, turn marks into events.

    Args:
        syntax: The procedure as read.
        catalogue: What materials, vessels and reactions are looked up in.
        laboratory: Baths, waste streams, measures.

    Returns:
        The procedure with all that could be resolved, and the findings of this stage.
    """
    return _Resolver(syntax, catalogue, laboratory).resolve()


@dataclass(slots=True)
class _Resolver:
    syntax: ProcedureSyntax
    catalogue: Catalogue
    laboratory: Laboratory

    def resolve(self) -> tuple[model.Procedure, tuple[Finding, ...]]:
        syntax = self.syntax
        findings: list[Finding] = []
        record: Record | None = None
        if syntax.front is not None:
            record, found = read_fields(syntax.front, FIELDS, "the front matter")
            findings += found
        elif not syntax.front_broken:
            empty = YamlMapping((), syntax.source.span(0, min(3, len(syntax.source.text))))
            record, found = read_fields(empty, FIELDS, "the front matter")
            findings += found
        broken = syntax.front_broken or record is None
        scope = Scope(self.catalogue, self.laboratory, broken=broken)
        record = record or Record({}, {}, syntax.source.span(0, 0))
        materials = self._materials(record, scope, findings)
        vessels = self._vessels(record, scope, findings)
        equipment = self._equipment(record, scope, findings)
        reactions = self._reactions(record, scope, materials, findings)
        body = BodyReader(scope)
        body.read(syntax.body)
        materials |= self._by_key(scope)
        expectations = self._expectations(record, scope, body, findings)
        procedure = model.Procedure(
            syntax=syntax,
            body=syntax.body,
            head=read_head(record, findings),
            materials=materials,
            vessels=vessels,
            equipment=equipment,
            reactions=reactions,
            steps=tuple(body.steps),
            records=tuple(body.records),
            expectations=expectations,
            acceptances=read_acceptances(record, findings),
            intended=read_intended(record),
            labels=body.labels,
            names=scope.kinds,
            used=frozenset(scope.used),
        )
        return procedure, (*findings, *scope.findings)

    def _materials(
        self, record: Record, scope: Scope, findings: list[Finding]
    ) -> dict[str, model.Material]:
        reader = MaterialReader(self.catalogue)
        materials = {}
        for entry in record.mapping("materials") or ():
            if scope.declare(entry.key.text, "material", entry.key.span):
                materials[entry.key.text] = reader.read(entry)
        findings += reader.findings
        return materials

    def _by_key(self, scope: Scope) -> dict[str, model.Material]:
        """Give the materials that the steps name by catalogue key without declaring them."""
        found = {key: (self.catalogue.by_key(key), span) for key, span in scope.undeclared.items()}
        return {
            key: model.Material(
                name=key,
                written=substance.name,
                composition=model.Pure(substance),
                span=span,
                value_span=span,
            )
            for key, (substance, span) in found.items()
            if substance is not None
        }

    def _vessels(
        self, record: Record, scope: Scope, findings: list[Finding]
    ) -> dict[str, model.Vessel]:
        vessels: dict[str, model.Vessel] = {}
        for entry in record.mapping("vessels") or ():
            if isinstance(entry.value, YamlMapping):
                for member in entry.value:
                    self._family(entry, member, scope, vessels, findings)
            elif isinstance(entry.value, YamlText):
                self._vessel(entry.key.text, "", entry, entry.value, scope, vessels, findings)
            else:
                findings.append(unfit(entry.value, f"`{entry.key.text}`", Shape.TEXT_OR_MAPPING))
        return vessels

    def _family(
        self,
        entry: YamlEntry,
        member: YamlEntry,
        scope: Scope,
        vessels: dict[str, model.Vessel],
        findings: list[Finding],
    ) -> None:
        """Read `tube: {1-5: boiling tube 50 mL}`: `tube-1` to `tube-5`."""
        name = entry.key.text
        if not isinstance(member.value, YamlText):
            findings.append(unfit(member.value, f"`{name}`", Shape.TEXT))
            return
        found = _FAMILY.fullmatch(member.key.text)
        if found is None:
            members = [f"{name}-{member.key.text}"]
        elif int(found[1]) <= int(found[2]) < int(found[1]) + MOST_MEMBERS:
            members = [f"{name}-{n}" for n in range(int(found[1]), int(found[2]) + 1)]
        else:
            findings.append(_family_unfit(member.key))
            return
        first, *others = members
        self._vessel(first, name, entry, member.value, scope, vessels, findings)
        for other in others:
            if scope.declare(other, "vessel", member.key.span) and first in vessels:
                pattern = vessels[first]
                vessels[other] = model.Vessel(
                    name=other,
                    type=pattern.type,
                    written=pattern.written,
                    family=name,
                    span=member.key.span,
                )

    def _vessel(
        self,
        name: str,
        family: str,
        entry: YamlEntry,
        value: YamlText,
        scope: Scope,
        vessels: dict[str, model.Vessel],
        findings: list[Finding],
    ) -> None:
        if not scope.declare(name, "vessel", entry.key.span):
            return
        type_, found = read_vessel(value, self.catalogue.glassware)
        findings += found if value.text.strip() else (_vessel_unsaid(name, entry.key.span),)
        vessels[name] = model.Vessel(
            name=name, type=type_, written=value.text, family=family, span=entry.key.span
        )

    def _equipment(
        self, record: Record, scope: Scope, findings: list[Finding]
    ) -> dict[str, model.Equipment]:
        equipment = {}
        for entry in record.mapping("equipment") or ():
            if not isinstance(entry.value, YamlText):
                findings.append(unfit(entry.value, f"`{entry.key.text}`", Shape.TEXT))
            elif scope.declare(entry.key.text, "equipment", entry.key.span):
                equipment[entry.key.text] = model.Equipment(
                    name=entry.key.text,
                    written=entry.value.text,
                    span=entry.key.span,
                    type=glassware_in(entry.value, self.catalogue.glassware),
                )
        return equipment

    def _reactions(
        self,
        record: Record,
        scope: Scope,
        materials: Mapping[str, model.Material],
        findings: list[Finding],
    ) -> dict[str, model.Reaction]:
        reader = ReactionReader(self.catalogue, materials)
        reactions = {}
        for entry in record.mapping("reactions") or ():
            if scope.declare(entry.key.text, "reaction", entry.key.span):
                reactions[entry.key.text] = reader.read(entry)
        findings += reader.findings
        return reactions

    def _expectations(
        self, record: Record, scope: Scope, body: BodyReader, findings: list[Finding]
    ) -> tuple[model.Expectation, ...]:
        expectations = []
        for node in self._lines(record.values.get("expect"), findings):
            source = node.span.source
            text_start = node.part(0, 0).start if node.text else node.span.start
            raw = source.text[text_start : text_start + len(node.text)]
            end = text_start + len(node.text) if raw == node.text else node.span.end
            expression, found = read_expression(source, text_start, end, self.catalogue.measures)
            findings += found
            if expression is not None and not isinstance(expression, Compare | Within):
                findings.append(_no_expectation(expression.span))
            elif expression is not None:
                Typer(scope, body.record_dimensions).type(expression)
                expectations.append(model.Expectation(expression, node.text, node.span))
        return tuple(expectations)

    def _lines(self, node: YamlNode | None, findings: list[Finding]) -> tuple[YamlText, ...]:
        """Give the lines of `expect:`; one that YAML took for something else is a finding."""
        items = node.items if isinstance(node, YamlList) else ()
        findings += [
            _not_a_line(item.span)
            for item in items
            if not isinstance(item, YamlText) or not item.text.strip()
        ]
        return texts.words(node)


def _family_unfit(key: YamlText) -> Finding:
    return Finding(
        code=codes.NAME_UNFIT,
        span=key.span,
        message=f"`{key.text}` numbers no family of vessels",
        help=f"write the first and the last number, as in `1-5`; at most {MOST_MEMBERS} of them",
    )


def _vessel_unsaid(name: str, span: Span) -> Finding:
    return Finding(
        code=codes.FIELD_MISSING,
        span=span,
        message=f"`{name}` does not say what vessel it is",
        help="write type and size, as in `conical flask 100 mL`",
    )


def _not_a_line(span: Span) -> Finding:
    return Finding(
        code=codes.FIELD_UNFIT,
        span=span,
        message="an expectation is one line of text",
        help="write `- pH of A in 9–11`, without a colon; put quotes round it where YAML needs them",
    )


def _no_expectation(span: Span) -> Finding:
    return Finding(
        code=codes.EXPRESSION_NOT_READ,
        span=span,
        message="an expectation compares a value with another, or says in which range it lies",
        help="write it as in `benzocaine in A >= 95 %` or `pH of A in 9–11`",
    )
