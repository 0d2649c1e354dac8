"""What can be searched for: the texts of an edition's pages, section by section.

Made from the models of the edition alone, so what is not in its pages cannot be found in its index.
Texts keep what stands high or low in Unicode (`10⁻³`, `cm³`), so that a line of context cannot be
misread; folding makes both spellings one word.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.publish import model as m
from watchglass.publish.body import text_of
from watchglass.publish.text import NBSP

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping

    from watchglass.publish.handbook import HandbookPages

_HIGH = str.maketrans("0123456789+-−", "⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻⁻")
_JOINER = "\N{WORD JOINER}"
_LOW = str.maketrans("0123456789", "₀₁₂₃₄₅₆₇₈₉")


class Piece(NamedTuple):
    """A paragraph, a step, a row: its address within the page (empty: its section's), its text."""

    place: str
    text: str


class Section(NamedTuple):
    """A part of a page: its heading and address (both empty at the top), and what stands in it."""

    heading: str
    place: str
    pieces: tuple[Piece, ...]


class Entry(NamedTuple):
    """One page.

    Attributes:
        title: Its title.
        address: From the edition's root.
        beside: What stands beside the title in a list of results.
        names: What else it is looked for by.
        sections: The first is the top of the page.
    """

    title: str
    address: str
    beside: str
    names: tuple[str, ...]
    sections: tuple[Section, ...]


def search_entries(pages: HandbookPages) -> Iterator[Entry]:
    """Give everything that an edition can be searched for, in a fixed order."""
    weeks = _weeks(pages.lists)
    for page in pages.procedures:
        yield _procedure(page, weeks.get(page.facts.address, ()))
    for ordinary in pages.pages:
        sections = _sections((), ordinary.body)
        yield Entry(ordinary.title, ordinary.address, "Page", (), sections)
    for reference in pages.references:
        yield _reference(reference)
    yield _start(pages.start)
    for page_list in pages.lists:
        if page_list.part == 1 and page_list.kind != "uses":
            yield _list(page_list)


def said(words: Iterable[m.Words]) -> str:
    """Give words as one line of text, what stands high or low in Unicode where there is such."""
    text = "".join(_said(words))
    return text if text.isascii() else text.replace(NBSP, " ").replace(_JOINER, "")


def _said(words: Iterable[m.Words]) -> list[str]:
    parts: list[str] = []
    for word in words:
        match word:
            case m.Run():
                parts.append(word.text)
            case m.Stress() | m.LinkTo() | m.Said():
                parts += _said(word.children)
            case m.Raised():
                parts.append(word.text.translate(_HIGH))
            case m.Lowered():
                parts.append(word.text.translate(_LOW))
            case m.ExpectedBlank():
                parts.append(text_of((word.blank,)))
                if word.expected is not None:
                    parts += [": ", *_said(word.expected)]
            case _:
                parts.append(text_of((word,)))
    return parts


# ---------------------------------------------------------------- kinds of page


def _procedure(page: m.StudentPage | m.InstructorPage, weeks: tuple[str, ...]) -> Entry:
    facts = page.facts
    names = [facts.code, facts.course, *weeks]
    top = []
    for row in page.reagents:
        names += [text_of(row.name), row.local, text_of(row.formula)]
        parts = (said(row.name), said(row.strength), said(row.used))
        top.append(Piece("page.reagents", " ".join(filter(None, parts))))
    top += [Piece("page.equipment", f"{row.count} × {row.what}") for row in page.equipment]
    for reaction in page.reactions:
        both = filter(None, (reaction.equation, reaction.formulas))
        top += [Piece("page.reactions", said(equation)) for equation in both]
    top += [Piece("page.before", said(line)) for line in facts.read]
    top += [Piece("page.references", said(line)) for line in facts.references]
    beside = " · ".join(filter(None, (facts.code, facts.course, *weeks)))
    sections = _sections(tuple(top), (*page.before, *page.body))
    if isinstance(page, m.InstructorPage):
        sections = (*sections, _for_instructors(page))
    return Entry(facts.title, facts.address, beside, tuple(names), sections)


def _for_instructors(page: m.InstructorPage) -> Section:
    pieces = [
        Piece("", " ".join(filter(None, (f.code, f.name, f.message, f.reason))))
        for f in (*page.findings, *page.accepted)
    ]
    pieces += [Piece("", f"{what}: {reason}") for what, reason in page.intended]
    pieces += [Piece("", f"{line.words}: {line.outcome}") for line in page.expectations]
    return Section("For instructors", "page.instructors", tuple(pieces))


def _reference(page: m.ReferencePage) -> Entry:
    """Give a substance or stock: its rows, the stocks that contain it, its recipe."""
    rows = [Piece("", f"{row.label}: {said(row.value)}") for row in page.rows]
    recipe = tuple(Piece("page.recipe", line) for line in page.lines)
    beside = "Stock" if page.kind == "stock" else "Substance"
    if page.formula:
        beside = f"{beside} · {said(page.formula)}"
    sections = (
        Section("", "", (*rows, *(Piece("page.stocks", link.title) for link in page.stocks))),
        *((Section("Recipe", "page.recipe", recipe),) if recipe else ()),
    )
    return Entry(page.title, page.address, beside, page.names, sections)


def _start(page: m.StartPage) -> Entry:
    top = (Piece("", page.institution), *(Piece("page.notice", line) for line in page.notice))
    sections = _sections(top, page.body)
    return Entry(page.title, "index.html", "Start", (), sections)


def _list(page: m.ListPage) -> Entry:
    """Give a list by its title and those of its groups; what it lists is found by itself."""
    named = page.kind in ("courses", "weeks")
    groups = tuple(Section(group.title, group.id, ()) for group in page.groups if named)
    return Entry(page.title, page.address, "List", (), (Section("", "", ()), *groups))


def _weeks(lists: Iterable[m.ListPage]) -> Mapping[str, tuple[str, ...]]:
    """Give the titles of the weeks that each procedure is run in, by its address."""
    found: dict[str, dict[str, None]] = {}
    for page in lists:
        for group in page.groups if page.kind == "weeks" else ():
            for entry in group.entries:
                found.setdefault(entry.link.address, {})[group.title] = None
    return {address: tuple(titles) for address, titles in found.items()}


# ---------------------------------------------------------------- blocks


def _sections(top: tuple[Piece, ...], blocks: tuple[m.Blocks, ...]) -> tuple[Section, ...]:
    """Divide blocks at their headings, wherever these stand."""
    found: list[Section] = []
    heading, place, held = "", "", list(top)
    for part in _parts(blocks, ""):
        if isinstance(part, m.Title):
            found.append(Section(heading, place, tuple(held)))
            heading, place, held = said(part.children), part.id, []
        elif part.text.strip():
            held.append(part)
    return (*found, Section(heading, place, tuple(held)))


def _parts(blocks: Iterable[m.Blocks], place: str) -> Iterator[m.Title | Piece]:
    for block in blocks:
        match block:
            case m.Title():
                yield block
            case m.Para(children):
                yield Piece(place, said(children))
            case m.StepList(items):
                for item in items:
                    yield from _parts(item.children, item.id)
            case m.ItemList(_, lists):
                for inside in lists:
                    yield from _parts(inside, place)
            case m.Quoted(inner) | m.Panel(_, inner) | m.InstructorPanel(_, inner):
                yield from _parts(inner, place)
            case m.Listing(text):
                yield Piece(place, text)
            case m.Grid():
                for row in (block.head, *block.rows):
                    yield Piece(place, " | ".join(filter(None, map(said, row))))
            case m.Divider():
                pass
