"""Procedure pages, one builder an edition, and ordinary pages."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

from watchglass.base.figures import shown
from watchglass.base.spans import Lines
from watchglass.publish import model as m
from watchglass.publish.bench import MODEL, bench_steps
from watchglass.publish.body import BodyBuilder
from watchglass.publish.flow import flow_figures
from watchglass.publish.lists import equipment_rows, reaction_lines
from watchglass.publish.reagents import reagent_rows
from watchglass.publish.text import quantity_words
from watchglass.read.terms import Compare, Within
from watchglass.resolve import model
from watchglass.run.bench.evaluator import BenchEvaluator, reached_words
from watchglass.run.bench.positions import agreed_positions
from watchglass.run.evaluate import Evaluator, NotKnown
from watchglass.run.roles import material_contents, roles

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.findings import Finding
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.judge.bench.run import Run as BenchRun
    from watchglass.judge.case import Case
    from watchglass.publish.shapes import Figure
    from watchglass.read.syntax import ProcedureSyntax
    from watchglass.resolve.model import Acceptance, Expectation

ASSUMPTIONS = (
    "Amounts are plain stoichiometry, by the IUPAC 2021 standard atomic weights (conventional values).",
    "Volumes become masses by the catalogue's densities, at the temperature given there.",
    "Volumes of solutions are taken as measured; a strength is that of the label.",
    "Computed figures are estimates. Hazards and what must not meet are not assessed.",
)


@dataclass(frozen=True, slots=True, kw_only=True)
class Neighbours:
    """Where a page stands in the handbook."""

    address: str
    previous: m.PageLink | None
    following: m.PageLink | None
    after: tuple[m.PageLink, ...]
    addresses: Mapping[str, str]


def _facts(case: Case, place: Neighbours, outline: list[tuple[int, str, str]]) -> m.Facts:
    head = case.procedure.head
    return m.Facts(
        title=head.title,
        code=head.code,
        address=place.address,
        course=head.course,
        revision=head.revision,
        time=tuple(_plain(quantity_words(quantity)) for quantity, _ in head.periods),
        group=head.group,
        after=place.after,
        references=tuple((m.Run(text),) for text in head.references),
        read=tuple((m.Run(text),) for text in head.read),
        outline=tuple(outline),
        previous=place.previous,
        following=place.following,
        scale="" if head.scale == 1.0 else shown(head.scale, 4),
    )


def _plain(words: tuple[m.Words, ...]) -> str:
    return "".join(w.text for w in words if isinstance(w, m.Run))


def _builder(
    case: Case,
    path: str,
    place: Neighbours,
    catalogue: Catalogue,
    run: BenchRun | None,
    *,
    instructor: bool,
) -> BodyBuilder:
    procedure = case.procedure
    evaluator = Evaluator(procedure, case.usage, catalogue, {})
    if run is not None:
        ledgers = [s.run.ledger for s in run.samples] or [run.ledger]
        procedure = replace(procedure, positions=agreed_positions(ledgers))
        if instructor:
            evaluator = BenchEvaluator(
                procedure, case.usage, catalogue, {}, asked=run.opened.asked()
            )
    return BodyBuilder(procedure, evaluator, place.addresses, path, instructor, case.course.turns)


def student_page(
    case: Case, path: str, place: Neighbours, catalogue: Catalogue, run: BenchRun | None = None
) -> m.StudentPage:
    """Make the page that students see; of the bench it takes where layers lie, and nothing else."""
    builder = _builder(case, path, place, catalogue, run, instructor=False)
    blocks = case.procedure.body
    body = builder.build(blocks)
    return m.StudentPage(
        facts=_facts(case, place, builder.outline),
        before=builder.before(blocks),
        reagents=reagent_rows(case.procedure, case.usage, roles(case.procedure, case.usage)),
        equipment=equipment_rows(case.procedure),
        reactions=reaction_lines(case.procedure),
        body=body,
        flow=flow_figures(builder.procedure, run, instructor=False),
    )


def instructor_page(
    case: Case,
    path: str,
    place: Neighbours,
    catalogue: Catalogue,
    *,
    findings: tuple[Finding, ...],
    accepted: tuple[tuple[Finding, Acceptance], ...],
    run: BenchRun | None = None,
) -> m.InstructorPage:
    """Make the page that instructors see."""
    builder = _builder(case, path, place, catalogue, run, instructor=True)
    blocks = case.procedure.body
    body = builder.build(blocks)
    lines = Lines(case.procedure.syntax.source.text)
    return m.InstructorPage(
        facts=_facts(case, place, builder.outline),
        before=builder.before(blocks),
        reagents=reagent_rows(case.procedure, case.usage, roles(case.procedure, case.usage)),
        equipment=equipment_rows(case.procedure),
        reactions=reaction_lines(case.procedure),
        body=body,
        findings=tuple(_finding(f, lines, "") for f in findings),
        accepted=tuple(_finding(f, lines, a.reason) for f, a in accepted),
        intended=tuple((entry.word, entry.reason) for entry in case.procedure.intended),
        expectations=tuple(
            _expectation(e, case, catalogue, run) for e in case.procedure.expectations
        ),
        assumptions=_assumptions(case, run),
        bench=bench_steps(run.opened.ledger, run.known) if run is not None else (),
        flow=flow_figures(builder.procedure, run, instructor=True),
        plots=_plots(run),
        sensitivity=_sensitivity(run),
    )


def _plots(run: BenchRun | None) -> tuple[Figure, ...]:
    if run is None:
        return ()
    from watchglass.publish.plots import plot_figures  # noqa: PLC0415 - of instructors' pages alone

    shown_run = run.opened
    return plot_figures(shown_run.case.procedure, shown_run.ledger, run.known)


def _sensitivity(run: BenchRun | None) -> tuple[m.SensitivityRow, ...]:
    if run is None or not run.case.procedure.expectations:
        return ()
    from watchglass.publish.sensitivity import sensitivity_rows  # noqa: PLC0415 - as above

    return sensitivity_rows(run.opened)


def _expectation(
    line: Expectation, case: Case, catalogue: Catalogue, run: BenchRun | None
) -> m.ExpectationLine:
    """Say what became of an expectation: the figure reached, at both ends where they differ."""
    if run is None or not isinstance(line.expression, Compare | Within):
        return m.ExpectationLine(line.written, "not assessed")
    said: list[str] = []
    runs = [sample.run for sample in run.samples] or [run]
    pairs = [(one, ledger) for one in runs for ledger in one.ledgers]
    for one, ledger in pairs:
        evaluator = BenchEvaluator(
            one.case.procedure, case.usage, catalogue, {}, asked=one.asked(ledger)
        )
        holds, reached = evaluator.holds(line.expression)
        if holds is None or isinstance(reached, NotKnown):
            said.append("not assessed" + (f": {evaluator.why}" if evaluator.why else ""))
        else:
            said.append(f"{reached_words(reached)}, {'as expected' if holds else 'missed'}")
    return m.ExpectationLine(line.written, " to ".join(dict.fromkeys(said)))


def _assumptions(case: Case, run: BenchRun | None) -> tuple[str, ...]:
    """Give what the figures of a page rest on."""
    found = [*ASSUMPTIONS]
    if run is not None:
        found.append(MODEL)
        found += [_which_sample(run)] if run.samples else []
    found += [
        f"scaled: {name} is a {now} in place of a {was}."
        for name, (was, now) in case.procedure.resized.items()
    ]
    for name, material in case.procedure.materials.items():
        held = material_contents(material, case.usage.get(name))
        for content in held if isinstance(held, tuple) else ():
            found += [f"{name}: {words}." for words in content.assumptions]
    return tuple(dict.fromkeys(found))


def _which_sample(run: BenchRun) -> str:
    first, *others = (sample.words.replace("`", "") for sample in run.samples)
    also = f" Run and judged as well: {'; '.join(others)}." if others else ""
    return f"What the vessels hold is worked out where {first}.{also}"


def _finding(finding: Finding, lines: Lines, reason: str) -> m.FindingLine:
    place = lines.position(finding.span.start)
    return m.FindingLine(
        finding.code.severity.word,
        finding.code.number,
        finding.code.name,
        finding.message,
        f"line {place.line}, column {place.column}",
        finding.help or "",
        reason,
    )


def ordinary_page(
    path: str,
    title: str,
    address: str,
    syntax: ProcedureSyntax,
    addresses: Mapping[str, str],
    catalogue: Catalogue,
    *,
    instructor: bool,
) -> m.OrdinaryPage:
    """Make an ordinary page; its first heading is its title and is not repeated."""
    empty = _no_procedure(syntax)
    evaluator = Evaluator(empty, {}, catalogue, {})
    builder = BodyBuilder(empty, evaluator, addresses, path, instructor)
    body = builder.build(syntax.body)
    if body and isinstance(body[0], m.Title) and _plain_title(body[0]) == title:
        body = body[1:]
    return m.OrdinaryPage(title=title, address=address, body=body, outline=tuple(builder.outline))


def _plain_title(block: m.Title) -> str:
    return _plain(block.children)


def _no_procedure(syntax: ProcedureSyntax) -> model.Procedure:
    return model.Procedure(
        syntax=syntax,
        body=(),
        head=model.Head(title="", code=""),
        materials={},
        vessels={},
        equipment={},
        reactions={},
        steps=(),
        records=(),
        expectations=(),
        acceptances=(),
        intended=(),
    )
