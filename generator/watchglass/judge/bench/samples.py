"""Procedures with secret samples: judged with each candidate, said once."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING

from watchglass.judge.bench.checks import judge_bench

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.base.findings import Finding
    from watchglass.judge.bench.run import Sample


def judge_samples(samples: Sequence[Sample]) -> tuple[Finding, ...]:
    """Judge every run; a finding that not all candidates have names the first that has it."""
    met: dict[tuple[str, int, int], tuple[Finding, str]] = {}
    times: dict[tuple[str, int, int], int] = {}
    for sample in samples:
        own = {(f.code.number, f.span.start, f.span.end): f for f in judge_bench(sample.run)}
        for key, finding in own.items():
            met.setdefault(key, (finding, sample.words))
            times[key] = times.get(key, 0) + 1
    return tuple(
        finding
        if times[key] == len(samples)
        else replace(finding, message=f"{finding.message} (where {words})")
        for key, (finding, words) in met.items()
    )
