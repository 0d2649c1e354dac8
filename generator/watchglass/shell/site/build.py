"""Building a site: judged once, every edition built beside, swapped in only when all are whole."""

from __future__ import annotations

import logging
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING

from mkdocs.commands.build import build
from mkdocs.config import load_config
from mkdocs.exceptions import MkDocsException

from watchglass.shell.commands.verdict import Refused
from watchglass.shell.rendering.cells import visible
from watchglass.shell.rendering.tally import Counts
from watchglass.shell.site import folders, source
from watchglass.shell.site.plugin import HandbookPlugin
from watchglass.shell.site.render import START
from watchglass.shell.site.stops import Stops
from watchglass.shell.streams import say

if TYPE_CHECKING:
    from collections.abc import Iterator, Sequence

    from mkdocs.config.defaults import MkDocsConfig

    from watchglass.base.findings import Finding
    from watchglass.shell.pipeline import Analysis

PLUGIN = "watchglass"
PUBLIC = "public"


@dataclass(frozen=True, slots=True, kw_only=True)
class BuildResult:
    """What became of a build.

    Attributes:
        findings: All findings of the set.
        written: The first page of each edition, in the order they were asked for.
        failed: Whether nothing was written.
        pages: Pages of the handbook written, over all editions.
    """

    findings: tuple[Finding, ...]
    written: tuple[Path, ...]
    failed: bool
    pages: int


def build_site(
    site: Path,
    *,
    editions: Sequence[str],
    out: Path | None,
    scale: float | None = None,
    strict: bool,
) -> BuildResult:
    """Build a site's handbook.

    Args:
        site: Folder that holds `mkdocs.yml`.
        editions: `student`, `instructor` or both.
        out: Folder that gets one folder an edition; by default `public` in the site.
        scale: What every procedure is scaled by, whatever it declares; None: as declared.
        strict: Whether warnings, of the set or of MkDocs, stop the build too.

    Raises:
        Refused: The site's configuration does not serve, or a target is not ours to replace.
    """
    stops = Stops()
    stops.begin()
    try:
        with host_log() as log:
            return _build(site, tuple(editions), out or site / PUBLIC, log, scale, strict=strict)
    finally:
        stops.end()


def _build(
    site: Path,
    editions: tuple[str, ...],
    out: Path,
    log: HostLog,
    scale: float | None,
    *,
    strict: bool,
) -> BuildResult:
    first = configured(site, log, None, strict=strict)
    analysis = source.analyse(Path(plugin_of(first).config.set), scale)
    nothing = BuildResult(findings=analysis.findings, written=(), failed=True, pages=0)
    if Counts.of(analysis.findings).fails(strict=strict):
        return nothing
    pairs: list[tuple[Path, Path]] = []
    pages = 0
    try:
        for edition in editions:
            target = (out / edition).absolute()
            pairs.append((folders.stage(target, edition), target))
        for edition, (building, _) in zip(editions, pairs, strict=True):
            config = configured(site, log, building, strict=strict)
            made = build_edition(config, analysis, edition, log)
            if made is None or log.errors:
                return nothing
            pages += made
        folders.swap(pairs)
    except folders.FolderRefused as refused:
        raise Refused(str(refused)) from None
    finally:
        for building, _ in pairs:
            folders.remove(building)
    written = tuple(out / edition / START for edition in editions)
    return BuildResult(findings=analysis.findings, written=written, failed=False, pages=pages)


def build_edition(
    config: MkDocsConfig,
    analysis: Analysis,
    edition: str,
    log: HostLog,
    *,
    preview: str | None = None,
) -> int | None:
    """Build one edition where its configuration says.

    Args:
        config: The site's, with the folder to build in.
        analysis: The set, judged.
        edition: Which edition.
        log: Takes what MkDocs gives up with.
        preview: Address of the preview it is built for, if it is.

    Returns:
        Pages of the handbook written; None where MkDocs gave up.
    """
    plugin = plugin_of(config)
    plugin.given = (analysis, edition)
    config.plugins.on_startup(command="serve" if preview else "build", dirty=False)
    try:
        build(config, serve_url=preview)
    except MkDocsException as error:
        log.heard.append(str(error))
        say(f"{visible(str(error), lines=True)}\n")
        return None
    finally:
        config.plugins.on_shutdown()
    return plugin.written


# ------------------------------------------------------------------------------ configuration


def configured(site: Path, log: HostLog, building: Path | None, *, strict: bool) -> MkDocsConfig:
    """Load `mkdocs.yml`; what MkDocs finds wrong with it is put into one sentence."""
    path = (site / "mkdocs.yml").absolute()
    elsewhere = {} if building is None else {"site_dir": str(building)}
    log.held = []
    try:
        config = load_config(str(path), strict=strict or None, **elsewhere)
    except MkDocsException as error:
        said = "; ".join(log.held) or str(error)
        raise Refused(f"`{site / 'mkdocs.yml'}` does not serve: {said}") from None
    finally:
        held, log.held = log.held, None
    if building is None:
        for line in held:
            say(f"{visible(line, lines=True)}\n")
    if PLUGIN not in config.plugins:
        raise Refused(
            f"`{site / 'mkdocs.yml'}` names no set: write `plugins: [{{{PLUGIN}: {{set: FOLDER}}}}]`"
        )
    return config


def plugin_of(config: MkDocsConfig) -> HandbookPlugin:
    """Give the plugin of a site's configuration."""
    plugin = config.plugins[PLUGIN]
    if not isinstance(plugin, HandbookPlugin):
        raise TypeError("another plugin goes by our name")
    return plugin


# ------------------------------------------------------------------------------ what MkDocs says


class HostLog(logging.Handler):
    """Says MkDocs' warnings and errors on standard error, or holds them while `held` is a list.

    Attributes:
        errors: How many errors there were.
        held: What is held back, or None.
        heard: What was said, in words.
    """

    def __init__(self) -> None:
        super().__init__(logging.WARNING)
        self.errors = 0
        self.held: list[str] | None = None
        self.heard: list[str] = []

    def forget(self) -> None:
        """Begin anew with another build."""
        self.errors = 0
        self.heard = []

    def emit(self, record: logging.LogRecord) -> None:
        """Take one message."""
        message = record.getMessage()
        if self.held is not None:
            self.held.append(message)
            return
        if record.levelno >= logging.ERROR:
            self.errors += 1
        self.heard.append(message)
        say(f"site: {record.levelname.lower()}: {visible(message, lines=True)}\n")


@contextmanager
def host_log() -> Iterator[HostLog]:
    """Listen to MkDocs and keep its log from everybody else."""
    logger = logging.getLogger("mkdocs")
    handler = HostLog()
    passed_on = logger.propagate
    logger.addHandler(handler)
    logger.propagate = False
    try:
        yield handler
    finally:
        logger.removeHandler(handler)
        logger.propagate = passed_on
