"""Sets and single files taken through the stages. This module directs and computes nothing."""

from __future__ import annotations

import gc
from contextlib import contextmanager
from pathlib import Path
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base.spans import Source
from watchglass.judge.continued import codes_continued
from watchglass.judge.sets import Appointment, judge_set
from watchglass.judge.stocks import judge_stocks
from watchglass.shell.sets import SetFiles, find_set, from_bytes, read_set
from watchglass.shell.stages import (
    Judged,
    JudgedPage,
    Surroundings,
    analyse_page,
    analyse_procedure,
    analyse_procedures,
    product_of,
    surroundings,
)

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping, Sequence

    from watchglass.base.findings import Finding


class Analysis(NamedTuple):
    """A whole set, analysed.

    Attributes:
        root: Its folder.
        surroundings: Catalogue, laboratory, schedule.
        procedures: In the order of their paths.
        pages: In the order of their paths.
        findings: All that is open, of the whole set.
        files: Paths of all its files.
    """

    root: Path
    surroundings: Surroundings
    procedures: tuple[Judged, ...]
    pages: tuple[JudgedPage, ...]
    findings: tuple[Finding, ...]
    files: frozenset[str]


class CheckResult(NamedTuple):
    """What `check` found, and over how many procedures; what was accepted, each with its reason."""

    findings: tuple[Finding, ...]
    checked: int
    accepted: tuple[tuple[Finding, str], ...] = ()


# ------------------------------------------------------------------------------ whole sets


@contextmanager
def uncollected() -> Iterator[None]:
    """Keep the garbage collector still while trees are made: they hold no cycles, and it costs a third."""
    running = gc.isenabled()
    gc.disable()
    try:
        yield
    finally:
        if running:
            gc.enable()


def analyse(files: SetFiles, root: Path, *, scale: float | None = None) -> Analysis:
    """Read, resolve, run and judge a whole set; `scale` overrides what procedures declare."""
    with uncollected():
        return _analyse(files, root, scale)


def _analyse(files: SetFiles, root: Path, scale: float | None) -> Analysis:
    around, found = surroundings(files.sources)
    around = around._replace(scale=scale)
    procedures = analyse_procedures(
        {
            path: source
            for path, source in files.sources.items()
            if path.startswith("procedures/") and path.endswith(".md")
        },
        around,
    )
    pages = tuple(
        analyse_page(path, source, around)
        for path, source in files.sources.items()
        if path.startswith("pages/") and path.endswith(".md")
    )
    cards = (*(p.card for p in procedures), *(p.card for p in pages))
    appointments = [
        Appointment(code=c, span=s) for slot in around.schedule for c, s in slot.procedures
    ]
    findings = [*files.findings, *found]
    findings += [finding for entry in procedures for finding in entry.findings]
    findings += [finding for entry in pages for finding in entry.findings]
    findings += judge_stocks(around.catalogue, around.laboratory)
    findings += judge_set(cards, appointments, files.files)
    return Analysis(
        root=root,
        surroundings=around,
        procedures=procedures,
        pages=pages,
        findings=tuple(dict.fromkeys(findings)),  # a faulty stock is met at each of its uses
        files=files.files,
    )


def analyse_set(root: Path, *, shown: str = "", scale: float | None = None) -> Analysis:
    """Read a set from disk and analyse it; `shown` stands before the paths in findings."""
    return analyse(read_set(root, shown=shown), root, scale=scale)


def check_texts(texts: Mapping[str, bytes | str]) -> tuple[Finding, ...]:
    """Analyse a set given as texts by path."""
    return analyse(from_bytes(texts), Path()).findings


# ------------------------------------------------------------------------------ single files


def check_paths(paths: Sequence[Path], *, scale: float | None = None) -> CheckResult:
    """Check sets and single files; `scale` overrides what procedures declare.

    A single file is checked with the catalogue and laboratory of the set it lies in; what only
    other files show (a code used twice) is left to the check of the set.
    """
    findings: list[Finding] = []
    accepted: list[tuple[Finding, str]] = []
    checked = 0
    singles: dict[Path | None, list[Path]] = {}
    for path in paths:
        if path.is_dir():
            analysis = analyse_set(path, shown=_shown(path), scale=scale)
            findings += analysis.findings
            accepted += [(f, a.reason) for p in analysis.procedures for f, a in p.accepted]
            checked += len(analysis.procedures)
        else:
            singles.setdefault(find_set(path), []).append(path)
    for root, files in singles.items():
        findings += _check_files(root, files, scale, accepted)
        checked += len(files)
    return CheckResult(tuple(findings), checked, tuple(accepted))


def _shown(folder: Path) -> str:
    shown = folder.as_posix()
    return "" if shown == "." else shown.rstrip("/") + "/"


def _check_files(
    root: Path | None,
    paths: Iterable[Path],
    scale: float | None,
    accepted: list[tuple[Finding, str]],
) -> list[Finding]:
    """Check single files of one set; what they accept is added to `accepted`."""
    sources: Mapping[str, Source] = {}
    findings: list[Finding] = []
    if root is not None:
        around_files = read_surroundings(root)
        sources = around_files.sources
        findings += around_files.findings
    around, found = surroundings(sources)
    around = around._replace(scale=scale)
    findings += found
    for path in paths:
        files = from_bytes({path.as_posix(): path.read_bytes()})
        findings += files.findings
        for name, source in files.sources.items():
            inside = path.resolve().relative_to(root).as_posix() if root else ""
            if inside.startswith("pages/"):
                findings += analyse_page(name, source, around).findings
            else:
                judged = _single(name, source, around, root)
                findings += judged.findings
                accepted += [(finding, a.reason) for finding, a in judged.accepted]
    return findings


def judge_file(path: Path, *, scale: float | None = None) -> Judged:
    """Take one procedure through the stages, as part of the set it lies in."""
    root = find_set(path)
    around, _ = surroundings(read_surroundings(root).sources if root is not None else {})
    files = from_bytes({path.as_posix(): path.read_bytes()})
    source = next(iter(files.sources.values()), Source.of(path.as_posix(), ""))
    return _single(path.as_posix(), source, around._replace(scale=scale), root)


def _single(name: str, source: Source, around: Surroundings, root: Path | None) -> Judged:
    """Take a single file through the stages, and before it those of its set that it goes on with."""
    judged = analyse_procedure(name, source, around)
    if root is None or not codes_continued(judged.procedure):
        return judged
    others = {
        path: other
        for path, other in read_set(root).sources.items()
        if path.startswith("procedures/") and path.endswith(".md")
    }
    others = {path: other for path, other in others.items() if other.text != source.text}
    products = {p.procedure.head.code: product_of(p) for p in analyse_procedures(others, around)}
    return analyse_procedure(name, source, around, products)


def read_surroundings(root: Path) -> SetFiles:
    """Read only the YAML files that every procedure of a set is resolved in."""
    texts: dict[str, bytes] = {}
    for pattern in ("laboratory.yml", "stocks.yml", "substances/*.yml"):
        for path in sorted(root.glob(pattern)):
            texts[path.relative_to(root).as_posix()] = path.read_bytes()
    return from_bytes(texts)


__all__ = [
    "Analysis",
    "CheckResult",
    "Judged",
    "JudgedPage",
    "Surroundings",
    "analyse",
    "analyse_page",
    "analyse_procedure",
    "analyse_procedures",
    "analyse_set",
    "check_paths",
    "check_texts",
    "judge_file",
    "read_surroundings",
    "surroundings",
    "uncollected",
]
