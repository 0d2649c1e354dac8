"""What an expectation hangs on: the procedure run again with one input a little more, and a little less.

Amounts charged and strengths are changed by a tenth, logarithms of partition ratios by a half: what
a hurried hand, an old bottle and a log P from a table may well be off by (judgement).
"""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING, NamedTuple

from watchglass.read.terms import Compare, Within
from watchglass.resolve import model
from watchglass.run.bench.asked import Asked
from watchglass.run.bench.bench import run_bench
from watchglass.run.bench.evaluator import BenchEvaluator
from watchglass.run.bench.knowledge import Knowledge
from watchglass.run.bench.ledger import Taken
from watchglass.run.bench.mixing import Mixed
from watchglass.run.evaluate import Value

if TYPE_CHECKING:
    from collections.abc import Iterator, Mapping

    from watchglass.base.quantities import Quantity
    from watchglass.resolve.laboratory import Laboratory
    from watchglass.run.bench.ledger import Ledger
    from watchglass.run.bench.state import Vessel
    from watchglass.run.passes import Course
    from watchglass.run.usage import Usage

#: Share by which amounts and strengths are changed, and logarithm by which ratios are [-].
SHARE, LOGARITHM = 0.10, 0.5


class Bench(NamedTuple):
    """What a procedure is run with."""

    procedure: model.Procedure
    course: Course
    usage: Mapping[str, Usage]
    known: Knowledge
    laboratory: Laboratory
    carried: Mapping[str, Vessel]


class Reached(NamedTuple):
    """What an expectation comes to in a run, and whether it holds; None where it is not known."""

    value: Value | None
    holds: bool | None


class Effect(NamedTuple):
    """One input with what an expectation comes to at its low and at its high end.

    Attributes:
        kind: `amount`, `strength` or `log P`.
        of: Local name of the material, or name of the substance.
        low: With less.
        high: With more.
    """

    kind: str
    of: str
    low: Reached
    high: Reached

    @property
    def flips(self) -> bool:
        """Whether the expectation fails at one end."""
        return self.low.holds is False or self.high.holds is False

    @property
    def span(self) -> float:
        """How far apart the ends are, SI."""
        ends = [r.value.si for r in (self.low, self.high) if r.value is not None]
        return max(ends) - min(ends) if ends else 0.0


class Sensitivity(NamedTuple):
    """An expectation, what it comes to, and what each input does to it, the largest effect first."""

    line: model.Expectation
    now: Reached
    effects: tuple[Effect, ...]


def sensitivities(bench: Bench, ledger: Ledger) -> tuple[Sensitivity, ...]:
    """Run a procedure again with each of its inputs changed.

    Args:
        bench: What it is run with.
        ledger: How it went as written.

    Returns:
        One entry for each expectation that the bench can test and that holds as written.
    """
    now = _evaluated(bench, ledger)
    lines = [(line, reached) for line, reached in now if reached.holds]
    if not lines:
        return ()
    changed = [
        (kind, of, _evaluated(*less), _evaluated(*more))
        for kind, of, less, more in _changed(bench, ledger)
    ]
    found = []
    for place, (line, reached) in enumerate(now):
        if not reached.holds:
            continue
        effects = (
            Effect(kind, of, less[place][1], more[place][1]) for kind, of, less, more in changed
        )
        ordered = sorted(effects, key=lambda e: (not e.flips, -e.span))
        found.append(Sensitivity(line, reached, tuple(ordered)))
    return tuple(found)


def _evaluated(bench: Bench, ledger: Ledger) -> list[tuple[model.Expectation, Reached]]:
    """Evaluate every expectation in a run."""
    procedure = bench.procedure
    evaluator = BenchEvaluator(
        procedure,
        bench.usage,
        bench.known.catalogue,
        {},
        asked=Asked(procedure, ledger, bench.known),
    )
    found = []
    for line in procedure.expectations:
        if isinstance(line.expression, Compare | Within):
            holds, reached = evaluator.holds(line.expression)
            found.append((line, Reached(reached if isinstance(reached, Value) else None, holds)))
    return found


_Run = tuple[Bench, "Ledger"]


def _changed(bench: Bench, ledger: Ledger) -> Iterator[tuple[str, str, _Run, _Run]]:
    """Give every input with the runs in which it is less and more."""
    taken = [
        r.outcome.material
        for entry in ledger.entries
        for r in entry.results
        if isinstance(r.outcome, Taken) and not r.outcome.why
    ]
    for name in dict.fromkeys(taken):
        less, more = (_with_amount(bench, name, f) for f in (1 - SHARE, 1 + SHARE))
        yield "amount", name, less, more
        material = bench.procedure.materials[name]
        if isinstance(material.composition, model.Solution):
            less, more = (_with_strength(bench, material, f) for f in (1 - SHARE, 1 + SHARE))
            yield "strength", name, less, more
    for key in _parting(ledger, bench.known):
        name = bench.known.thing(key).name
        less, more = (_with_ratio(bench, key, sign * LOGARITHM) for sign in (-1, 1))
        yield "log P", name, less, more


def _parting(ledger: Ledger, known: Knowledge) -> tuple[str, ...]:
    """Give the substances whose partition ratio was used."""
    keys = (
        key
        for entry in ledger.entries
        for result in entry.results
        if isinstance(result.outcome, Mixed) and result.outcome.ph is not None
        for key, source in result.outcome.ratios.items()
        if source in ("measured", "log P")
    )
    return tuple(
        key
        for key in dict.fromkeys(keys)
        if not known.thing(key).gas and (not known.thing(key).liquid or known.thing(key).layers)
    )


def _run(bench: Bench, factors: Mapping[str, float] | None = None) -> Ledger:
    return run_bench(
        bench.procedure,
        bench.course,
        bench.known,
        bench.laboratory,
        carried=bench.carried,
        factors=factors,
    )


def _with_amount(bench: Bench, name: str, factor: float) -> _Run:
    ledger = _run(bench, {name: factor})
    used = bench.usage.get(name)
    if used is not None:
        bench = bench._replace(usage={**bench.usage, name: _used(used, factor)})
    return bench, ledger


def _used(used: Usage, factor: float) -> Usage:
    """Give what is used of a material, so much more or less of it."""
    uses = (u._replace(quantity=_times(u.quantity, factor)) if u.quantity else u for u in used.uses)
    totals = (t._replace(low=t.low * factor, high=t.high * factor) for t in used.totals)
    return used._replace(uses=tuple(uses), totals=tuple(totals))


def _times(quantity: Quantity, factor: float) -> Quantity:
    """Multiply a quantity; its figures stay."""
    number, second = quantity.number, quantity.second
    return quantity._replace(
        number=number._replace(value=number.value * factor),
        second=second._replace(value=second.value * factor) if second is not None else None,
    )


def _with_strength(bench: Bench, material: model.Material, factor: float) -> _Run:
    composition = material.composition
    assert isinstance(composition, model.Solution)  # noqa: S101 - told before
    changed = _times(composition.strength.quantity, factor)
    other = material._replace(
        composition=composition._replace(strength=composition.strength._replace(quantity=changed))
    )
    procedure = replace(
        bench.procedure, materials={**bench.procedure.materials, material.name: other}
    )
    bench = bench._replace(procedure=procedure)
    return bench, _run(bench)


class _Shifted(Knowledge):
    """What is known, but for the partition ratios of one component.

    Of a compound that gives and takes no protons the solubility in water moves the other way, so
    that what the other liquid can hold stays what it is: solids that a poor log P alone would bring
    out of it are no finding.
    """

    def __init__(self, known: Knowledge, key: str, logarithm: float) -> None:
        """Share what `known` has found so far."""
        self.__dict__.update(known.__dict__)
        self._key, self._factor = key, 10.0**logarithm
        thing = known.thing(key)
        if thing.soluble and not thing.pkas:
            soluble = tuple(
                s._replace(concentration=s.concentration / self._factor) for s in thing.soluble
            )
            self._things = {**self._things, key: thing._replace(soluble=soluble)}

    def ratio(self, key: str, solvent: str) -> tuple[float | None, str]:
        """Give the ratio, shifted for the one component."""
        ratio, source = super().ratio(key, solvent)
        return (ratio * self._factor if ratio and key == self._key else ratio), source


def _with_ratio(bench: Bench, key: str, logarithm: float) -> _Run:
    bench = bench._replace(known=_Shifted(bench.known, key, logarithm))
    return bench, _run(bench)
