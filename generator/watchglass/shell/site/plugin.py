"""The MkDocs plugin: MkDocs is host, our engine writes the handbook.

What MkDocs does in order, and what is done here:

    on_startup    stops are turned into exceptions
    on_config     the set is judged; then the site folder is turned to one beside the target
    on_files      our pages and pictures enter as files that MkDocs can link to
    on_nav        the site's own pages are noted
    on_env        the environment is made safe, our pages are written
    on_*_context  MkDocs' pages get the frame
    on_serve      a preview is taught to go on while the set holds errors
    on_post_build what was built is swapped in
    on_shutdown   whatever was not is removed

MkDocs empties the site folder after `on_pre_build`, so what may stop a build must do so before.
`build_site` has judged already and swaps by itself: it says so by `given`.
"""

from __future__ import annotations

import gzip
import logging
import os
import sys
from pathlib import Path
from typing import TYPE_CHECKING, Any
from urllib.parse import urlsplit

from markupsafe import Markup
from mkdocs.config import base, config_options
from mkdocs.exceptions import Abort, PluginError
from mkdocs.plugins import BasePlugin, event_priority
from mkdocs.structure.files import InclusionLevel
from mkdocs.utils import CountHandler

from watchglass.publish.handbook import EDITIONS
from watchglass.publish.search import search_files
from watchglass.shell.pipeline import uncollected
from watchglass.shell.rendering.full import render
from watchglass.shell.rendering.tally import Counts
from watchglass.shell.site import folders, source, theme
from watchglass.shell.site.files import HandbookEntry, HandbookFile, asset_file
from watchglass.shell.site.frame import make_frame, own_pages
from watchglass.shell.site.render import Renderer, context_of, prepare
from watchglass.shell.site.stops import Stops
from watchglass.shell.streams import say, style_of

if TYPE_CHECKING:
    from collections.abc import Callable

    from jinja2 import Environment
    from mkdocs.config.defaults import MkDocsConfig
    from mkdocs.livereload import LiveReloadServer
    from mkdocs.structure.files import Files
    from mkdocs.structure.nav import Navigation
    from mkdocs.structure.pages import Page
    from mkdocs.utils.templates import TemplateContext

    from watchglass.base.findings import Finding
    from watchglass.publish.handbook import HandbookPages
    from watchglass.shell.pipeline import Analysis
    from watchglass.shell.site.render import Frame, NavEntry

_LEFT_OUT = (InclusionLevel.EXCLUDED, InclusionLevel.DRAFT)


class HandbookConfig(base.Config):  # type: ignore[no-untyped-call]
    """Settings of the plugin in `mkdocs.yml`."""

    set = config_options.Dir(exists=True)
    edition = config_options.Choice(EDITIONS, default="student")


class HandbookPlugin(BasePlugin[HandbookConfig]):  # type: ignore[no-untyped-call]
    """Publishes a set of procedures through MkDocs.

    Attributes:
        given: An analysis made already, and the edition to build from it; then nothing is judged,
            redirected or swapped here.
        written: How many pages of the handbook were written.
        open: The findings of the set when it was last judged here.
    """

    given: tuple[Analysis, str] | None = None
    written = 0
    open: tuple[Finding, ...] = ()

    def __init__(self) -> None:
        self._stops = Stops()
        self._previews = False
        self._target: Path | None = None
        self._building: Path | None = None
        self._pages: HandbookPages | None = None
        self._files: list[HandbookFile] = []
        self._own: tuple[NavEntry, ...] = ()
        self._frame: Frame | None = None

    # ------------------------------------------------------------------ before anything is written

    def on_startup(self, *, command: str, dirty: bool) -> None:  # noqa: ARG002 - MkDocs' own shape
        """Note what MkDocs was asked to do; the plugin object lives through all its builds."""
        self._previews = command == "serve"
        if not self._previews:
            self._stops.begin()

    @event_priority(-100)
    def on_config(self, config: MkDocsConfig) -> MkDocsConfig:
        """Judge the set, then turn the site folder to one beside the target."""
        if config.theme.name != theme.NAME:
            raise PluginError(f"the handbook needs `theme: {{name: {theme.NAME}}}` in mkdocs.yml")
        config.use_directory_urls = False
        folder = Path(self.config.set)
        if self.given:
            analysis, edition = self.given
        else:
            edition = self.config.edition
            analysis = self._judged(folder, strict=bool(config.strict))
        self._pages = source.pages(analysis, edition)
        if self._previews:
            config.watch.append(str(folder))
        elif not self.given:
            self._turn_aside(config, edition)
        return config

    def _judged(self, folder: Path, *, strict: bool) -> Analysis:
        analysis = source.analyse(folder)
        self.open = analysis.findings
        said = render(analysis.findings, style=style_of(sys.stderr, os.environ))
        if said:
            say(said)
        if Counts.of(analysis.findings).fails(strict=strict):
            raise Abort("The handbook was not built: its set holds what has to be mended first.")
        return analysis

    def _turn_aside(self, config: MkDocsConfig, edition: str) -> None:
        self._target = Path(config.site_dir)
        try:
            self._building = folders.stage(self._target, edition)
        except folders.FolderRefused as refused:
            raise PluginError(str(refused)) from None
        config.site_dir = str(self._building)

    # ------------------------------------------------------------------ pages enter MkDocs

    def on_files(self, files: Files, *, config: MkDocsConfig) -> Files:
        """Enter our pages and pictures; a page of the site's own may not stand in their place."""
        pages = self._made()
        taken = {f.dest_uri: f.src_uri for f in files if f.inclusion not in _LEFT_OUT}
        self._files = [
            HandbookFile(page, config)
            for page in (
                pages.start,
                *pages.lists,
                *pages.procedures,
                *pages.pages,
                *pages.references,
            )
        ]
        root = self.given[0].root if self.given else Path(self.config.set)
        pictures = [asset_file(root, *pair, config) for pair in pages.assets]
        for file in (*self._files, *pictures):
            earlier = files.get_file_from_path(file.src_uri)
            if earlier is not None and earlier.inclusion in _LEFT_OUT:
                files.remove(earlier)
            if file.dest_uri in taken:
                raise PluginError(
                    f"{taken[file.dest_uri]} in the site's own pages would be written to "
                    f"{file.dest_uri}, which is a page of the handbook; give it another name"
                )
            files.append(file)
        for entered in self._files:
            HandbookEntry(entered, config)
        return files

    def on_nav(self, nav: Navigation, *, config: MkDocsConfig, files: Files) -> Navigation:  # noqa: ARG002 - MkDocs' own shape
        """Keep the navigation: titles of its pages are known only once they are read."""
        self._nav = nav
        return nav

    # ------------------------------------------------------------------ pages are written

    @event_priority(100)
    def on_env(self, env: Environment, *, config: MkDocsConfig, files: Files) -> Environment:  # noqa: ARG002 - MkDocs' own shape
        """Write our pages; MkDocs' own have been read by now and are checked after this."""
        pages = self._made()
        self._frame = make_frame(pages, own_pages(self._nav), config)
        renderer = Renderer(prepare(env), self._frame)
        root = Path(config.site_dir)
        for folder in sorted({(root / file.dest_uri).parent for file in self._files}):
            folder.mkdir(parents=True, exist_ok=True)
        with uncollected():
            for file in self._files:
                html = renderer.render(file.model)
                (root / file.dest_uri).write_bytes(html.encode())
                if isinstance(file.page, HandbookEntry):
                    file.page.keep_places(html)
            for address, text in search_files(pages):
                (root / address).parent.mkdir(parents=True, exist_ok=True)
                (root / address).write_bytes(text.encode())
        self.written = len(self._files)
        return env

    def on_page_context(
        self,
        context: TemplateContext,
        *,
        page: Page,
        config: MkDocsConfig,  # noqa: ARG002 - MkDocs' own shape
        nav: Navigation,  # noqa: ARG002 - MkDocs' own shape
    ) -> TemplateContext:
        """Give a page of the site's own the frame."""
        heading = "<h1" in (page.content or "")
        if page.file.inclusion not in _LEFT_OUT:  # MkDocs adds plain text to a draft's
            page.content = Markup(page.content or "")  # noqa: S704 - MkDocs made it from the owner's text
        return self._framed(context, page.file.dest_uri, heading_in_page=heading)

    def on_template_context(
        self, context: TemplateContext, *, template_name: str, config: MkDocsConfig
    ) -> TemplateContext:
        """Give 404 and the sitemap what they show."""
        dated = bool(os.environ.get("SOURCE_DATE_EPOCH"))
        context = self._framed(context, template_name, dated=dated)
        if template_name == "sitemap.xml":
            entered = [file for file in context["pages"] if file.page is not None]
            context["pages"] = sorted((*entered, *self._files), key=_address)
        elif template_name == "404.html" and config.site_url:
            context["root"] = urlsplit(config.site_url).path.rstrip("/") + "/"  # type: ignore[typeddict-unknown-key]
        return context

    def _framed(self, context: TemplateContext, address: str, **more: object) -> TemplateContext:
        if self._frame is None:
            raise RuntimeError("the frame is asked for before it is made")
        framed: Any = context
        framed.update(context_of(self._frame, address), **more)
        return context

    # ------------------------------------------------------------------ previews

    def on_serve(
        self,
        server: LiveReloadServer,
        *,
        config: MkDocsConfig,  # noqa: ARG002 - MkDocs' own shape
        builder: Callable[..., None],  # noqa: ARG002 - MkDocs' own shape
    ) -> LiveReloadServer:
        """Let `mkdocs serve` show the findings and go on, where it would wait without end."""
        from watchglass.shell.site.preview import keep_serving  # noqa: PLC0415 - previews only

        keep_serving(server, self)
        return server

    # ------------------------------------------------------------------ the end

    @event_priority(-100)
    def on_post_build(self, *, config: MkDocsConfig) -> None:
        """Make the sitemap's copy the same every time; swap in what was built."""
        _settle_sitemap(Path(config.site_dir))
        if self._building is None or self._target is None:
            return
        if config.strict and _warned():
            return  # MkDocs is about to give up; what was built is removed then
        folders.swap([(self._building, self._target)])
        config.site_dir = str(self._target)
        self._building = None

    def on_build_error(self, *, error: Exception) -> None:  # noqa: ARG002 - MkDocs' own shape
        """Remove what was being built; the last good site stands."""
        self._clean_up()

    def on_shutdown(self) -> None:
        """Remove what was being built, if it was not finished, whatever the reason."""
        self._clean_up()
        self._pages, self._files = None, []
        self._stops.end()

    def _clean_up(self) -> None:
        if self._building is not None:
            folders.remove(self._building)
            self._building = None

    def _made(self) -> HandbookPages:
        if self._pages is None:
            raise RuntimeError("pages are asked for before the set is judged")
        return self._pages


def _address(file: Any) -> str:
    return str(file.dest_uri)


def _settle_sitemap(site: Path) -> None:
    """Compress the sitemap again without the time of day that MkDocs puts into it."""
    sitemap, copy = site / "sitemap.xml", site / "sitemap.xml.gz"
    if sitemap.is_file() and copy.is_file():
        copy.write_bytes(gzip.compress(sitemap.read_bytes(), mtime=0))


def _warned() -> bool:
    """Tell whether MkDocs has counted warnings; in strict mode it stops for them at the end."""
    counters = (h for h in logging.getLogger("mkdocs").handlers if isinstance(h, CountHandler))
    return any(handler.get_counts() for handler in counters)
