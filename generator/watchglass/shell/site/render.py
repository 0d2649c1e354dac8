"""Pages of the handbook as HTML: models and the frame go into the theme's templates.

One environment serves our pages and those that MkDocs brings: escaping is on, a name that is not
there is an error and not an empty place, and each template is compiled once. What the frame shows
(name, navigation, edition) is worked out once for a site; only its links depend on the page.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from jinja2 import Environment, FileSystemLoader, StrictUndefined
from markupsafe import Markup

from watchglass.publish import model as m
from watchglass.shell.site.html import NotForStudents, Writer
from watchglass.shell.site.urls import leads_outside, root_of

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence

    from watchglass.publish.shapes import Figure

HandbookPage = (
    m.StudentPage | m.InstructorPage | m.OrdinaryPage | m.ListPage | m.StartPage | m.ReferencePage
)
START = "index.html"
NAMED_MOST = 5
"""Pages that the navigation names; more than these fold away under one word."""


@dataclass(frozen=True, slots=True)
class NavEntry:
    """An entry of the navigation; `address` from the edition's root, or with a scheme."""

    title: str
    address: str


@dataclass(frozen=True, slots=True, kw_only=True)
class Frame:
    """What stands around every page of an edition.

    Attributes:
        laboratory: Its name.
        institution: The college.
        edition: `student` or `instructor`.
        main: Start, courses and weeks.
        lookup: What can be looked up: substances, stocks, accepted findings.
        pages: Ordinary pages of the set and of the site.
        styles: Style sheets of the site's owner, addresses from the root.
        scripts: Scripts of the site's owner, likewise.
    """

    laboratory: str
    institution: str
    edition: str
    main: tuple[NavEntry, ...]
    lookup: tuple[NavEntry, ...] = ()
    pages: tuple[NavEntry, ...] = ()
    styles: tuple[str, ...] = ()
    scripts: tuple[str, ...] = field(default=())

    @property
    def instructor(self) -> bool:
        """Whether this is the instructor edition."""
        return self.edition == "instructor"

    @property
    def folded(self) -> bool:
        """Whether the ordinary pages are too many to name in a row."""
        return len(self.pages) > NAMED_MOST


def prepare(environment: Environment) -> Environment:
    """Make an environment safe: MkDocs' own neither escapes nor minds a missing name."""
    environment.autoescape = True
    environment.undefined = StrictUndefined
    environment.trim_blocks = True
    environment.lstrip_blocks = True
    environment.filters["from_root"] = from_root
    return environment


def make_environment(folders: Sequence[str]) -> Environment:
    """Make an environment over theme folders, the first of them asked first."""
    loader = FileSystemLoader(folders)
    return prepare(Environment(loader=loader, autoescape=True, auto_reload=False))


def from_root(address: str, root: str) -> str:
    """Give an address of the site as seen from a page; an outside one stays."""
    return address if leads_outside(address) else root + address


def context_of(frame: Frame, address: str) -> dict[str, object]:
    """Give what every template takes: the frame, where the page is, and the way to the root."""
    return {"frame": frame, "here": address, "root": root_of(address)}


class Renderer:
    """Renders the pages of one edition."""

    def __init__(self, environment: Environment, frame: Frame) -> None:
        self._environment = environment
        self._frame = frame

    def render(self, page: HandbookPage) -> str:
        """Give the HTML of a page.

        Raises:
            NotForStudents: A student edition's page holds what only instructors may see.
        """
        address = address_of(page)
        if not self._frame.instructor and _for_instructors(page):
            raise NotForStudents(f"{address} is for instructors")
        writer = Writer(root_of(address), instructor=self._frame.instructor)

        def words(models: Iterable[m.Words]) -> Markup:
            return Markup(writer.words(models))  # noqa: S704 - the writer escapes every word

        def blocks(models: Iterable[m.Blocks]) -> Markup:
            return Markup(writer.blocks(models))  # noqa: S704 - the writer escapes every word

        def drawing(figure: Figure) -> Markup:
            return Markup(writer.drawing(figure))  # noqa: S704 - the writer escapes every word

        template = self._environment.get_template(_template(page))
        return template.render(
            context_of(self._frame, address),
            page=page,
            words=words,
            blocks=blocks,
            drawing=drawing,
            extras=page if isinstance(page, m.InstructorPage) else None,
        )


def address_of(page: HandbookPage) -> str:
    """Give a page's address from the edition's root."""
    match page:
        case m.StudentPage() | m.InstructorPage():
            return page.facts.address
        case m.OrdinaryPage() | m.ListPage() | m.ReferencePage():
            return page.address
        case m.StartPage():
            return START


def title_of(page: HandbookPage) -> str:
    """Give a page's title."""
    match page:
        case m.StudentPage() | m.InstructorPage():
            return page.facts.title
        case m.OrdinaryPage() | m.ListPage() | m.StartPage() | m.ReferencePage():
            return page.title


def _for_instructors(page: HandbookPage) -> bool:
    """Tell whether a page as a whole is for instructors: accepted findings, a stock's recipe."""
    match page:
        case m.ListPage():
            return page.kind == "accepted"
        case m.ReferencePage():
            return bool(page.lines)
        case _:
            return False


def _template(page: HandbookPage) -> str:
    match page:
        case m.StudentPage() | m.InstructorPage():
            return "procedure.html"
        case m.OrdinaryPage():
            return "page.html"
        case m.ListPage():
            return "list.html"
        case m.ReferencePage():
            return "reference.html"
        case m.StartPage():
            return "start.html"
