"""The bench in one line: run a procedure of some steps and ask it."""

from __future__ import annotations

from typing import TYPE_CHECKING

from builders import NAMES, golden, judged, steps, surroundings
from watchglass.run.bench.asked import Asked
from watchglass.run.bench.bench import run_bench
from watchglass.run.bench.knowledge import Knowledge

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.run.bench.ledger import Ledger
    from watchglass.shell.pipeline import Judged

_KNOWN: dict[int, Knowledge] = {}


def knowledge(files: Mapping[str, str] | None = None) -> Knowledge:
    """Give what is known of components: of the shipped catalogue, kept; of a set's, made anew."""
    around = surroundings(files)
    return _KNOWN.setdefault(id(around.catalogue), Knowledge(around.catalogue))


def asked_of(entry: Judged, files: Mapping[str, str] | None = None, *, high: bool = False) -> Asked:
    """Run a procedure and give what answers questions about it."""
    known = knowledge(files)
    laboratory = surroundings(files).laboratory
    ledger = run_bench(entry.procedure, entry.case.course, known, laboratory, high=high)
    return Asked(entry.procedure, ledger, known)


def ran(
    *sentences: str,
    front: str = NAMES,
    files: Mapping[str, str] | None = None,
    high: bool = False,
) -> Asked:
    """Run steps."""
    return asked_of(judged(steps(*sentences), front, files), files, high=high)


def golden_ran(name: str) -> Asked:
    """Run one of the three golden procedures."""
    return asked_of(golden(name))


def share(asked: Asked, what: str, vessel: str, label: str = "") -> float:
    """Give a share that must be known."""
    bench = asked.ledger.at(label) if label else asked.ledger.end
    assert bench is not None
    answer = asked.share(what, vessel, bench)
    assert answer.value is not None, answer.why
    return answer.value


def ph(asked: Asked, vessel: str, label: str = "") -> float:
    """Give a pH that must be known."""
    bench = asked.ledger.at(label) if label else asked.ledger.end
    assert bench is not None
    answer = asked.ph(vessel, bench)
    assert answer.value is not None, answer.why
    return answer.value


def outcomes(asked: Asked, kind: type) -> list[object]:
    """Give the outcomes of one kind, in order."""
    ledger: Ledger = asked.ledger
    return [
        result.outcome
        for entry in ledger.entries
        for result in entry.results
        if isinstance(result.outcome, kind)
    ]
