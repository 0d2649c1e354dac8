"""The stages in order, over single procedures. This module directs and computes nothing."""

from __future__ import annotations

from types import MappingProxyType
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base.yaml import YamlMapping, read_yaml
from watchglass.catalogue.catalogue import Catalogue, name_index, shadowed
from watchglass.catalogue.decode import decode_substances
from watchglass.catalogue.plausible import differing
from watchglass.catalogue.ware import decode_stock
from watchglass.judge.accept import can_be_accepted, settle
from watchglass.judge.bench.checks import judge_bench
from watchglass.judge.bench.run import Run, Sample
from watchglass.judge.bench.samples import judge_samples
from watchglass.judge.case import Case, faulty_body
from watchglass.judge.checks import judge
from watchglass.judge.continued import Product, carried, codes_continued, faults_of_continued
from watchglass.read.procedure import read_page, read_procedure
from watchglass.resolve.laboratory import Laboratory, read_laboratory
from watchglass.resolve.model import Secret
from watchglass.resolve.page import resolve_page
from watchglass.resolve.procedure import resolve
from watchglass.resolve.scaling import rescale
from watchglass.resolve.schedule import Slot, read_schedule
from watchglass.resolve.secrets import Opened, opened
from watchglass.run.bench.bench import has_open_amounts, run_bench
from watchglass.run.bench.knowledge import Knowledge
from watchglass.run.cards import page_card, procedure_card
from watchglass.run.passes import run_through
from watchglass.run.usage import usage
from watchglass.shell.shipped import density_tables, shipped

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Source
    from watchglass.base.yaml import YamlNode
    from watchglass.catalogue.stocks import Stock
    from watchglass.catalogue.substances import Substance
    from watchglass.read.syntax import ProcedureSyntax
    from watchglass.resolve.model import Acceptance, Procedure
    from watchglass.run.bench.state import Vessel
    from watchglass.run.cards import Card


class Surroundings(NamedTuple):
    """What every procedure of a set is resolved in.

    Attributes:
        catalogue: Substances, stocks, glassware.
        laboratory: Its facts.
        schedule: Which procedure runs when.
        known: What is known of each component, asked for once.
        scale: What every procedure is scaled by, whatever it declares itself; None: as declared.
    """

    catalogue: Catalogue
    laboratory: Laboratory
    schedule: tuple[Slot, ...]
    known: Knowledge
    scale: float | None = None


class Judged(NamedTuple):
    """One procedure with what was found.

    Attributes:
        path: Of its source within the set.
        case: The procedure with its course and usage.
        run: How it went at the bench; None where an error stands before that.
        findings: What is open.
        accepted: What was found and accepted.
        card: Its digest.
    """

    path: str
    case: Case
    run: Run | None
    findings: tuple[Finding, ...]
    accepted: tuple[tuple[Finding, Acceptance], ...]
    card: Card

    @property
    def procedure(self) -> Procedure:
        """The procedure."""
        return self.case.procedure


class JudgedPage(NamedTuple):
    """One ordinary page with what was found."""

    path: str
    syntax: ProcedureSyntax
    findings: tuple[Finding, ...]
    card: Card


def surroundings(sources: Mapping[str, Source]) -> tuple[Surroundings, tuple[Finding, ...]]:
    """Decode the catalogue additions, stocks, laboratory and schedule of a set."""
    base = shipped()
    findings: list[Finding] = []
    nodes: dict[str, YamlNode | None] = {}
    for path, source in sources.items():
        if path.endswith(".yml"):
            nodes[path], found = read_yaml(source)
            findings += found
    own: list[Substance] = []
    for path, node in nodes.items():
        if path.startswith("substances/"):
            substances, found = decode_substances(node)
            own += substances
            findings += found
    names, found = name_index(own)
    findings += found
    stocks, found = _stocks(nodes.get("stocks.yml"))
    findings += found
    findings += shadowed(own, dict.fromkeys(stocks.values()), base.substances.names)
    findings += differing(own, base.substances, tuple(findings))
    laboratory, found = read_laboratory(nodes.get("laboratory.yml"), base.glassware)
    findings += found
    schedule, found = read_schedule(nodes.get("schedule.yml"))
    findings += found
    catalogue = Catalogue(
        shipped=base.substances,
        own={substance.key: substance for substance in own},
        own_names=names,
        glassware=base.glassware,
        indicators=base.indicators,
        stocks=stocks,
        measures={**base.measures, **laboratory.measures},
        components_=base.components,
        formulas=base.formulas,
        densities=density_tables,
        aids=base.aids,
    )
    around = Surroundings(
        catalogue=catalogue,
        laboratory=laboratory,
        schedule=schedule,
        known=Knowledge(catalogue),
    )
    return around, tuple(findings)


def _stocks(node: YamlNode | None) -> tuple[dict[str, Stock], tuple[Finding, ...]]:
    from watchglass.base.fields import Shape, unfit  # noqa: PLC0415 - only for a faulty file

    stocks: dict[str, Stock] = {}
    findings: list[Finding] = []
    if node is not None and not isinstance(node, YamlMapping):
        return {}, (unfit(node, "the file of stocks", Shape.MAPPING),)
    for entry in node or ():
        stock, found = decode_stock(entry)
        findings += found
        if stock is not None:
            for name in (stock.key, *stock.names):
                stocks.setdefault(name.casefold(), stock)
    return stocks, tuple(findings)


def analyse_procedures(sources: Mapping[str, Source], around: Surroundings) -> tuple[Judged, ...]:
    """Take procedures through the stages; those that go on with the product of another come after it."""
    done = {path: analyse_procedure(path, source, around) for path, source in sources.items()}
    waiting = [path for path, judged in done.items() if codes_continued(judged.procedure)]
    while waiting:
        held = {done[path].procedure.head.code for path in waiting}
        ready = [p for p in waiting if not held.intersection(codes_continued(done[p].procedure))]
        if not ready:
            break  # they go round in a circle: the check of the set says so
        products = {
            judged.procedure.head.code: product_of(judged)
            for path, judged in done.items()
            if path not in waiting
        }
        for path in ready:
            done[path] = analyse_procedure(path, sources[path], around, products)
        waiting = [path for path in waiting if path not in ready]
    return tuple(done.values())


def product_of(judged: Judged) -> Product:
    """Give what others may go on with."""
    return Product(judged.procedure, judged.run.ledger.end if judged.run is not None else None)


def analyse_procedure(
    path: str,
    source: Source,
    around: Surroundings,
    products: Mapping[str, Product] = MappingProxyType({}),
) -> Judged:
    """Take one procedure through the stages; `products` are those of others, by code."""
    syntax, found = read_procedure(source, around.catalogue.measures)
    procedure, more = resolve(syntax, around.catalogue, around.laboratory)
    earlier = (*found, *more)
    faulty = faulty_body(earlier, syntax.front.span.end if syntax.front else 0)
    draft = case = _run(procedure, around, faulty=faulty)
    factor = procedure.head.scale if around.scale is None else around.scale
    if (factor, procedure.head.scale) != (1.0, 1.0):
        scaled, more = rescale(procedure, factor, around.catalogue, around.laboratory)
        earlier = (*earlier, *more)
        case = _run(scaled, around, faulty=faulty)
    found = (*earlier, *judge(case, draft), *faults_of_continued(case.procedure, products))
    run: Run | None = None
    if all(can_be_accepted(f) for f in found):  # else there is no knowing what was meant
        brought = carried(case.procedure, products)
        run = _at_the_bench(case, around, brought)
        samples = tuple(
            Sample(
                _letters(way, case),
                _at_the_bench(case._replace(procedure=way.procedure), around, brought),
            )
            for way in opened(case.procedure, around.catalogue)
        )
        run = run._replace(samples=samples)
        found = (*found, *(judge_samples(samples) if samples else judge_bench(run)))
    settled = settle(found, procedure.acceptances)
    return Judged(
        path=path,
        case=case,
        run=run,
        findings=settled.open,
        accepted=settled.accepted,
        card=procedure_card(path, case.procedure),
    )


def _letters(way: Opened, case: Case) -> str:
    """Name the candidates of a way: `sample` is caffeine."""
    said = []
    for name, letter in way.letters.items():
        composition = case.procedure.materials[name].composition
        if isinstance(composition, Secret):
            said.append(f"`{name}` is {composition.candidates[letter].name}")
    return " and ".join(said)


def _run(procedure: Procedure, around: Surroundings, *, faulty: bool) -> Case:
    """Run a procedure through its passes and sum what it takes."""
    course = run_through(procedure)
    return Case(procedure, course, usage(procedure, course), around.catalogue, faulty)


def _at_the_bench(case: Case, around: Surroundings, brought: Mapping[str, Vessel]) -> Run:
    """Run a procedure at the bench, at both ends of its open amounts where it has any."""
    going = case.procedure, case.course, around.known, around.laboratory
    ledger = high = run_bench(*going, carried=brought)
    if has_open_amounts(case.procedure):
        high = run_bench(*going, carried=brought, high=True)
    return Run(case, ledger, high, around.known, around.laboratory, carried=brought)


def analyse_page(path: str, source: Source, around: Surroundings) -> JudgedPage:
    """Take one ordinary page through the stages."""
    syntax, found = read_page(source, around.catalogue.measures)
    more = resolve_page(syntax, around.catalogue, around.laboratory)
    return JudgedPage(
        path=path, syntax=syntax, findings=(*found, *more), card=page_card(path, syntax)
    )
