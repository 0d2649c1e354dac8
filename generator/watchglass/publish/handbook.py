"""The whole handbook of one edition, as models: start, lists, procedures, pages, pictures."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING, Protocol

from watchglass.judge.sets import leaves_the_set, resolve_link
from watchglass.publish import model as m
from watchglass.publish.pages import (
    Neighbours,
    instructor_page,
    ordinary_page,
    student_page,
)
from watchglass.publish.reference import Use, reference_lists, references
from watchglass.publish.text import quantity_words
from watchglass.resolve.outline import slug

if TYPE_CHECKING:
    from collections.abc import Mapping, Sequence

    from watchglass.base.findings import Finding
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.judge.bench.run import Run as BenchRun
    from watchglass.judge.case import Case
    from watchglass.read.syntax import ProcedureSyntax
    from watchglass.resolve.laboratory import Laboratory
    from watchglass.resolve.model import Acceptance
    from watchglass.resolve.schedule import Slot
    from watchglass.run.cards import Card

NOTICE = (
    "Computed figures are estimates from stated models; they replace no measurement.",
    "Hazards of substances are not yet assessed here: read the safety data sheet of every material.",
    "Data sheets, local codes and the responsible safety officer prevail over this handbook.",
)
WELCOME = "pages/welcome.md"
EDITIONS = ("student", "instructor")


class _Surroundings(Protocol):
    @property
    def catalogue(self) -> Catalogue:
        """The catalogue."""
        ...

    @property
    def laboratory(self) -> Laboratory:
        """The laboratory."""
        ...

    @property
    def schedule(self) -> tuple[Slot, ...]:
        """The schedule."""
        ...


class _Procedure(Protocol):
    @property
    def path(self) -> str:
        """Path within the set."""
        ...

    @property
    def case(self) -> Case:
        """The procedure with its course and usage."""
        ...

    @property
    def run(self) -> BenchRun | None:
        """How it went at the bench."""
        ...

    @property
    def card(self) -> Card:
        """Its digest."""
        ...

    @property
    def findings(self) -> tuple[Finding, ...]:
        """What is open."""
        ...

    @property
    def accepted(self) -> tuple[tuple[Finding, Acceptance], ...]:
        """What is accepted."""
        ...


class _Page(Protocol):
    @property
    def path(self) -> str:
        """Path within the set."""
        ...

    @property
    def syntax(self) -> ProcedureSyntax:
        """The page as read."""
        ...

    @property
    def card(self) -> Card:
        """Its digest."""
        ...


class AnalysedSet(Protocol):
    """What a handbook is made from; the shell's analysis is one."""

    @property
    def surroundings(self) -> _Surroundings:
        """Catalogue, laboratory and schedule."""
        ...

    @property
    def procedures(self) -> Sequence[_Procedure]:
        """The procedures."""
        ...

    @property
    def pages(self) -> Sequence[_Page]:
        """The ordinary pages."""
        ...


@dataclass(frozen=True, slots=True, kw_only=True)
class HandbookPages:
    """Everything one edition shows.

    Attributes:
        edition: `student` or `instructor`.
        laboratory: Name of the laboratory.
        institution: The college.
        start: The first page.
        lists: Procedures by course and by week.
        procedures: One page each; all of the edition's own type.
        pages: Ordinary pages, the welcome page excepted.
        references: Substances and stocks.
        assets: Pictures: path within the set, address in the handbook.
    """

    edition: str
    laboratory: str
    institution: str
    start: m.StartPage
    lists: tuple[m.ListPage, ...]
    procedures: tuple[m.StudentPage, ...] | tuple[m.InstructorPage, ...]
    pages: tuple[m.OrdinaryPage, ...]
    assets: tuple[tuple[str, str], ...]
    references: tuple[m.ReferencePage, ...] = ()


def address_of(code: str) -> str:
    """Give the address of a procedure by its code."""
    return f"procedures/{code.lower()}.html"


def make_handbook(analysis: AnalysedSet, edition: str) -> HandbookPages:
    """Make all pages of one edition.

    Args:
        analysis: The analysed set; without findings of severity error.
        edition: `student` or `instructor`.
    """
    if edition not in EDITIONS:
        raise ValueError(f"no edition is called {edition}")
    return _Maker(analysis, edition).make()


class _Maker:
    def __init__(self, analysis: AnalysedSet, edition: str) -> None:
        self.around = analysis.surroundings
        self.edition = edition
        self.procedures = sorted(
            analysis.procedures, key=lambda p: (p.card.code.casefold(), p.path)
        )
        self.pages = analysis.pages
        self.links = {
            p.card.code.casefold(): m.PageLink(p.card.title, p.card.code, address_of(p.card.code))
            for p in self.procedures
        }
        self.addresses = {p.path: address_of(p.card.code) for p in self.procedures}
        self.addresses |= {
            p.path: "index.html" if p.path == WELCOME else p.path.removesuffix(".md") + ".html"
            for p in self.pages
        }

    def make(self) -> HandbookPages:
        laboratory = self.around.laboratory
        ordinary = {p.path: self._page(p) for p in self.pages}
        welcome = ordinary.pop(WELCOME, None)
        courses, weeks = self._courses(), self._weeks()
        pages = tuple(ordinary.values())
        start = m.StartPage(
            title=laboratory.name or "Laboratory handbook",
            institution=laboratory.institution,
            body=welcome.body if welcome else (),
            courses=courses,
            weeks=weeks,
            pages=tuple(m.PageLink(p.title, "", p.address) for p in pages),
            notice=NOTICE,
        )
        lists = [
            m.ListPage(kind="courses", title="Courses", address="courses.html", groups=courses)
        ]
        if weeks:
            lists.append(
                m.ListPage(kind="weeks", title="Weeks", address="weeks.html", groups=weeks)
            )
        found = references(
            (Use(self.links[p.card.code.casefold()], p.case.procedure) for p in self.procedures),
            self.around.catalogue,
            laboratory,
            instructor=self.edition == "instructor",
        )
        lists += reference_lists(found)
        if self.edition == "instructor" and (accepted := self._accepted()) is not None:
            lists.append(accepted)
        return HandbookPages(
            edition=self.edition,
            laboratory=laboratory.name or "Laboratory handbook",
            institution=laboratory.institution,
            start=start,
            lists=tuple(lists),
            procedures=self._procedure_pages(),
            pages=pages,
            assets=self._assets(),
            references=found,
        )

    def _procedure_pages(self) -> tuple[m.StudentPage, ...] | tuple[m.InstructorPage, ...]:
        places = [self._place(index) for index in range(len(self.procedures))]
        catalogue = self.around.catalogue
        pairs = list(zip(self.procedures, places, strict=True))
        if self.edition == "student":
            return tuple(
                student_page(p.case, p.path, place, catalogue, p.run) for p, place in pairs
            )
        return tuple(
            instructor_page(
                p.case,
                p.path,
                place,
                catalogue,
                findings=p.findings,
                accepted=p.accepted,
                run=p.run,
            )
            for p, place in pairs
        )

    def _place(self, index: int) -> Neighbours:
        entry = self.procedures[index]
        link = [
            self.links[p.card.code.casefold()]
            for p in self.procedures[max(0, index - 1) : index + 2]
        ]
        after = tuple(
            self.links[code.casefold()]
            for code, _ in entry.card.after
            if code.casefold() in self.links
        )
        return Neighbours(
            address=address_of(entry.card.code),
            previous=link[0] if index else None,
            following=link[-1] if index + 1 < len(self.procedures) else None,
            after=after,
            addresses=self.addresses,
        )

    def _page(self, page: _Page) -> m.OrdinaryPage:
        return ordinary_page(
            page.path,
            page.card.title,
            self.addresses[page.path],
            page.syntax,
            self.addresses,
            self.around.catalogue,
            instructor=self.edition == "instructor",
        )

    # ------------------------------------------------------------------ lists

    def _accepted(self) -> m.ListPage | None:
        """List what was found and accepted, by kind of finding, and what is intended."""
        groups: dict[str, list[m.ListEntry]] = {}
        titles: dict[str, str] = {}
        for entry in self.procedures:
            link = self.links[entry.card.code.casefold()]
            for finding, acceptance in entry.accepted:
                code = finding.code
                titles[code.number] = f"{code.number} {code.name}"
                groups.setdefault(code.number, []).append(
                    m.ListEntry(link, f"{finding.message}. Accepted because: {acceptance.reason}")
                )
            for intended in entry.case.procedure.intended:
                titles["~"] = "Intended reactions"
                groups.setdefault("~", []).append(
                    m.ListEntry(link, f"{intended.word}: {intended.reason}")
                )
        if not groups:
            return None
        return m.ListPage(
            kind="accepted",
            title="Accepted",
            address="accepted.html",
            groups=tuple(
                m.ListGroup(titles[key], f"accepted-{slug(titles[key])}", tuple(entries))
                for key, entries in sorted(groups.items())
            ),
        )

    def _entry(self, entry: _Procedure, more: str = "") -> m.ListEntry:
        head = entry.case.procedure.head
        times = [
            "".join(w.text for w in quantity_words(q) if isinstance(w, m.Run))
            for q, _ in head.periods
        ]
        words = [" + ".join(times), head.group, more]
        return m.ListEntry(self.links[entry.card.code.casefold()], " · ".join(filter(None, words)))

    def _courses(self) -> tuple[m.ListGroup, ...]:
        groups: dict[str, list[m.ListEntry]] = {}
        for entry in self.procedures:
            course = entry.case.procedure.head.course or "Other procedures"
            groups.setdefault(course, []).append(self._entry(entry))
        return tuple(
            m.ListGroup(course, f"course-{slug(course)}", tuple(entries))
            for course, entries in sorted(groups.items())
        )

    def _weeks(self) -> tuple[m.ListGroup, ...]:
        by_code = {p.card.code.casefold(): p for p in self.procedures}
        groups: dict[int, list[m.ListEntry]] = {}
        for slot in self.around.schedule:
            for code, _ in slot.procedures:
                entry = by_code.get(code.casefold())
                if entry is not None:
                    groups.setdefault(slot.week, []).append(
                        self._entry(entry, ", ".join(slot.sections))
                    )
        return tuple(
            m.ListGroup(f"Week {week}", f"week-{week}", tuple(entries))
            for week, entries in sorted(groups.items())
        )

    def _assets(self) -> tuple[tuple[str, str], ...]:
        """Collect the pictures that this edition's pages show, and only those."""
        known: Mapping[str, str] = self.addresses
        found: dict[str, str] = {}
        cards = (*(p.card for p in self.procedures), *(p.card for p in self.pages))
        for card in cards:
            for link in card.links:
                if leaves_the_set(link.target):
                    continue
                there, _ = resolve_link(card.path, link.target)
                if there not in known and (self.edition == "instructor" or not link.hidden):
                    found[there] = there
        return tuple(sorted(found.items()))
