"""A preview that follows the files: MkDocs' live reload, with the findings shown in the pages.

The last good pages stay while the set holds errors, since what is written half is mended next: the
set is judged first, a site is built beside, and only one that is whole takes the place of the last.
Whatever goes wrong is said at the top of every page, so nobody waits for a page that does not come.
"""

from __future__ import annotations

import errno
import logging
import os
import shutil
import sys
import tempfile
import webbrowser
from contextlib import contextmanager
from pathlib import Path
from typing import TYPE_CHECKING

from mkdocs.exceptions import MkDocsException
from mkdocs.livereload import LiveReloadServer

from watchglass.shell.commands.verdict import Refused
from watchglass.shell.fault import report
from watchglass.shell.rendering.cells import visible
from watchglass.shell.rendering.full import render
from watchglass.shell.rendering.tally import Counts
from watchglass.shell.site import source
from watchglass.shell.site.build import build_edition, configured, host_log, plugin_of
from watchglass.shell.site.findings_bar import Notice, placed, stand_in
from watchglass.shell.site.stops import Stops
from watchglass.shell.streams import put, say, style_of

if TYPE_CHECKING:
    from collections.abc import Callable, Iterator

    from mkdocs.config.defaults import MkDocsConfig

    from watchglass.base.findings import Finding
    from watchglass.shell.site.build import HostLog
    from watchglass.shell.site.plugin import HandbookPlugin

_NOT_BUILT = "The handbook is not built yet"
_OUR_FAULT = "The program came upon a fault of its own; the terminal says more."


def serve_site(site: Path, *, edition: str, host: str, port: int, open_in_browser: bool) -> None:
    """Serve a site and follow its files until stopped from the keyboard.

    Args:
        site: Folder that holds `mkdocs.yml`.
        edition: `student` or `instructor`.
        host: Address to serve on.
        port: Port; 0 takes any that is free.
        open_in_browser: Whether to open it in a browser.

    Raises:
        Refused: The configuration does not serve, or the address cannot be had.
    """
    stops = Stops()
    stops.begin()
    try:
        with tempfile.TemporaryDirectory(prefix="watchglass-") as folder, host_log() as log:
            preview = _Preview(site, edition, Path(folder), log)
            server = _listening(preview, host, port)
            try:
                with _quiet_server():
                    preview.begin(server, host)
                    _announce(preview, edition, open_in_browser=open_in_browser)
                    server._build_loop()  # type: ignore[no-untyped-call]  # noqa: SLF001 - `serve` would bind again
            except KeyboardInterrupt:
                say("\n")
            finally:
                server.shutdown()
    finally:
        stops.end()


def _listening(preview: _Preview, host: str, port: int) -> LiveReloadServer:
    server = LiveReloadServer(builder=preview.rebuild, host=host, port=port, root=str(preview.root))
    try:
        server.server_bind()
        server.server_activate()
    except (OSError, OverflowError) as error:
        server.server_close()
        why = getattr(error, "strerror", None) or str(error)
        taken = getattr(error, "errno", None) == errno.EADDRINUSE
        raise Refused(
            f"`{host}:{port}` cannot be served on ({why}); "
            + ("another program has the port: " if taken else "")
            + "choose another with --address HOST:PORT"
        ) from None
    return server


def _announce(preview: _Preview, edition: str, *, open_in_browser: bool) -> None:
    put(f"{edition}  {preview.address}\n")
    say("Ctrl-C ends it\n")
    if open_in_browser:
        webbrowser.open(preview.address)


@contextmanager
def _quiet_server() -> Iterator[None]:
    """Keep what the server says of each request off the terminal."""
    logger = logging.getLogger("mkdocs.livereload")
    level = logger.level
    logger.setLevel(logging.ERROR)
    try:
        yield
    finally:
        logger.setLevel(level)


class _Preview:
    """One edition of a site, built anew when its files change.

    Attributes:
        root: What is served: the last good pages.
        notice: What is open now.
        address: Where it is served.
    """

    def __init__(self, site: Path, edition: str, folder: Path, log: HostLog) -> None:
        self.root = folder / "site"
        self.notice = Notice(current=False, built=False)
        self.address = ""
        self._site = site
        self._edition = edition
        self._building = folder / "building"
        self._log = log
        self._built = False
        self._server: LiveReloadServer | None = None

    def begin(self, server: LiveReloadServer, host: str) -> None:
        """Build for the first time and start to watch.

        Raises:
            Refused: `mkdocs.yml` does not serve.
        """
        named = f"[{host}]" if ":" in host else host
        self.address = server.url = f"http://{named}:{server.server_address[1]}/"
        self._server = server
        self.root.mkdir()
        (self.root / "index.html").write_bytes(stand_in(_NOT_BUILT))
        server.error_handler = self._error_page
        show_notice(server, lambda: self.notice)
        self._rebuild()
        server.observer.start()
        server.serve_thread.start()

    def _error_page(self, code: int) -> bytes | None:
        page = self.root / f"{code}.html"
        return page.read_bytes() if page.is_file() else None

    def rebuild(self) -> None:
        """Build anew; whatever goes wrong is noted and said, and the last pages stay."""
        try:
            self._rebuild()
        except Refused as refused:
            say(f"{visible(refused.message, lines=True)}\n")
            self._keep((), refused.message)
        except Exception as error:  # noqa: BLE001 - the preview outlives a fault of ours
            report(error)
            self._keep((), _OUR_FAULT)

    def _rebuild(self) -> None:
        config = configured(self._site, self._log, self._building, strict=False)
        folder = Path(plugin_of(config).config.set)
        self._watch(config, folder)
        analysis = source.analyse(folder)
        findings = analysis.findings
        said = render(findings, style=style_of(sys.stderr, os.environ))
        if said:
            say(said)
        if Counts.of(findings).fails(strict=bool(config.strict)):
            self._keep(findings)
            return
        config.site_url = self.address
        log = self._log
        log.forget()
        made = build_edition(config, analysis, self._edition, log, preview=self.address)
        if made is None or log.errors:
            self._keep(findings, *log.heard)
            return
        self._swap()
        self.notice = Notice(findings)

    def _keep(self, findings: tuple[Finding, ...], *troubles: str) -> None:
        self.notice = Notice(findings, troubles, current=False, built=self._built)

    def _swap(self) -> None:
        """Put what was built in the place of the last pages; requests wait meanwhile."""
        before = self.root.with_name("before")
        shutil.rmtree(before, ignore_errors=True)
        self.root.rename(before)
        self._building.rename(self.root)
        shutil.rmtree(before, ignore_errors=True)
        self._built = True

    def _watch(self, config: MkDocsConfig, folder: Path) -> None:
        """Watch the set, the site's own pages and its configuration; what is watched stays so."""
        server = self._server
        if server is None:
            return
        for path in (folder, Path(config.docs_dir), Path(config.config_file_path or self._site)):
            watched = [Path(known) for known in server._watched_paths]  # noqa: SLF001 - it keeps no other list
            if not any(path.resolve().is_relative_to(known) for known in watched):
                server.watch(str(path.resolve()))


# ------------------------------------------------------------------------------ any server


def show_notice(server: LiveReloadServer, notice: Callable[[], Notice]) -> None:
    """Let a server put what is open at the top of every page it sends, of error pages too."""
    inject: Callable[[bytes, int], bytes] = server._inject_js_into_html  # noqa: SLF001 - there is no other place for it
    missing = server.error_handler

    def with_notice(content: bytes, epoch: int) -> bytes:
        return inject(placed(content, notice().html()), epoch)

    def on_error(code: int) -> bytes | None:
        content = missing(code)
        if content is None and not notice().current:
            content = stand_in("There is no such page yet")
        if content is None:
            return None
        return with_notice(content, server._visible_epoch)  # noqa: SLF001 - as above

    server._inject_js_into_html = with_notice  # type: ignore[method-assign]  # noqa: SLF001
    server.error_handler = on_error


def keep_serving(server: LiveReloadServer, plugin: HandbookPlugin) -> None:
    """Let `mkdocs serve` go on while the set holds errors: it would wait for a build without end."""
    build = server.builder
    state = [Notice(plugin.open)]

    def rebuild() -> None:
        plugin.open = ()
        try:
            build()
        except MkDocsException as error:
            state[0] = _kept(plugin, error)
        else:
            state[0] = Notice(plugin.open)

    server.builder = rebuild
    show_notice(server, lambda: state[0])


def _kept(plugin: HandbookPlugin, error: MkDocsException) -> Notice:
    """Say what keeps the pages back: the findings, or else what MkDocs gave up with."""
    judged = Counts.of(plugin.open).errors > 0
    return Notice(plugin.open, () if judged else (str(error),), current=False)
