"""The whole handbook of one edition, as models: start, lists, procedures, pages, pictures."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import TYPE_CHECKING, Any, cast

from watchglass.judge.sets import leaves_the_set, resolve_link
from watchglass.publish import model as m
from watchglass.publish.accepted import Accepted, accepted_lists
from watchglass.publish.pages import (
    Neighbours,
    instructor_page,
    ordinary_page,
    student_page,
)
from watchglass.publish.reference import linked, make_reference
from watchglass.publish.text import quantity_words
from watchglass.publish.uses import Use
from watchglass.resolve.outline import slug

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping, Sequence

    from watchglass.publish.analysed import AnalysedPage, AnalysedProcedure, AnalysedSet
    from watchglass.publish.reference import Reference

NOTICE = (
    "Computed figures are estimates from stated models; they replace no measurement.",
    "Hazards of substances are not yet assessed here: read the safety data sheet of every material.",
    "Data sheets, local codes and the responsible safety officer prevail over this handbook.",
)
WELCOME = "pages/welcome.md"
EDITIONS = ("student", "instructor")


@dataclass(frozen=True, slots=True, kw_only=True)
class HandbookPages:
    """Everything one edition shows.

    Attributes:
        edition: `student` or `instructor`.
        laboratory: Name of the laboratory.
        institution: The college.
        start: The first page.
        lists: Procedures by course and by week, substances, stocks; for instructors, what is
            accepted. Long lists come in parts.
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


def _linked(
    pages: tuple[m.StudentPage, ...] | tuple[m.InstructorPage, ...], found: Reference
) -> tuple[m.StudentPage, ...] | tuple[m.InstructorPage, ...]:
    """Make the materials of each page lead to the pages of substances and stocks."""
    every = cast("Iterable[Any]", pages)  # all of the one kind they were
    return tuple(
        replace(page, reagents=tuple(linked(row, found) for row in page.reagents)) for page in every
    )


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
        procedures = self._procedure_pages()
        found = make_reference(
            self._uses(procedures),
            self.around.catalogue,
            laboratory,
            instructor=self.edition == "instructor",
        )
        lookup = (*found.lists, *self._accepted())
        start = m.StartPage(
            title=laboratory.name or "Laboratory handbook",
            institution=laboratory.institution,
            body=welcome.body if welcome else (),
            courses=courses,
            weeks=weeks,
            pages=tuple(m.PageLink(p.title, "", p.address) for p in pages),
            notice=NOTICE,
            lists=tuple(
                m.PageLink(page.title, "", page.address) for page in lookup if page.part == 1
            ),
        )
        lists = [
            m.ListPage(kind="courses", title="Courses", address="courses.html", groups=courses)
        ]
        if weeks:
            lists.append(
                m.ListPage(kind="weeks", title="Weeks", address="weeks.html", groups=weeks)
            )
        lists += lookup
        return HandbookPages(
            edition=self.edition,
            laboratory=laboratory.name or "Laboratory handbook",
            institution=laboratory.institution,
            start=start,
            lists=tuple(lists),
            procedures=_linked(procedures, found),
            pages=pages,
            assets=self._assets(),
            references=found.pages,
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

    def _page(self, page: AnalysedPage) -> m.OrdinaryPage:
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

    def _accepted(self) -> tuple[m.ListPage, ...]:
        """List what was found and accepted; the student edition has no such list."""
        if self.edition != "instructor":
            return ()
        return accepted_lists(
            Accepted(
                self.links[entry.card.code.casefold()], entry.case.procedure, tuple(entry.accepted)
            )
            for entry in self.procedures
        )

    def _uses(self, pages: Sequence[m.StudentPage | m.InstructorPage]) -> Iterator[Use]:
        """Give the procedures with what their pages show of materials."""
        weeks: dict[str, dict[int, None]] = {}
        for slot in sorted(self.around.schedule, key=lambda slot: slot.week):
            for code, _ in slot.procedures:
                weeks.setdefault(code.casefold(), {})[slot.week] = None
        for entry, page in zip(self.procedures, pages, strict=True):
            code = entry.card.code.casefold()
            run = tuple(weeks.get(code, ()))
            yield Use(self.links[code], entry.case.procedure, page.reagents, run)

    def _entry(self, entry: AnalysedProcedure, more: str = "") -> m.ListEntry:
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
