"""The index of an edition for its offline search: a core, and shards of words by their beginnings.

The core holds a line for each page (title, address, what stands beside it, headings) and is loaded
when the search box is first used. Words of the pages lie in shards, each a range of beginnings and
of bounded size, of which a query loads one for each of its words: however many pages a set has, a
query loads no more. Everything is made from the models of the edition alone, so what is not in its
pages cannot be found in its index. Files are plain scripts, since a page opened from disk may load
no other.
"""

from __future__ import annotations

import json
import re
import unicodedata
from typing import TYPE_CHECKING, NamedTuple

from watchglass.publish import model as m
from watchglass.publish.body import text_of

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator

    from watchglass.publish.handbook import HandbookPages

#: Characters of a shard, about; a single beginning of two letters is never divided.
SHARD = 60_000
_WORD = re.compile(r"[^\W_]+(?:[.,][0-9]+)*")
_MARKS = re.compile(r"[\u0300-\u036f]")


class Entry(NamedTuple):
    """One page in the index.

    Attributes:
        title: Its title.
        address: From the edition's root.
        beside: What stands beside the title in a list of results.
        headings: Text and address within the page.
        words: Folded words of its text, without repeats.
    """

    title: str
    address: str
    beside: str
    headings: tuple[tuple[str, str], ...]
    words: frozenset[str]


def fold(text: str) -> str:
    """Fold text for comparing: case, accents, sub- and superscripts.

    >>> fold("H₂SO₄ µL Crème")
    'h2so4 μl creme'
    """
    plain = unicodedata.normalize("NFKD", text).casefold()
    return _MARKS.sub("", plain)


def words_of(text: str) -> frozenset[str]:
    """Give the folded words of a text.

    >>> sorted(words_of("Add 15.0 mL of 3.0 M acid."))
    ['15.0', '3.0', 'acid', 'add', 'm', 'ml', 'of']
    """
    return frozenset(_WORD.findall(fold(text)))


def search_files(pages: HandbookPages) -> tuple[tuple[str, str], ...]:
    """Make the files of the index.

    Returns:
        Address from the root and content of each: the core, then the shards.
    """
    entries = tuple(_entries(pages))
    shards = tuple(_shards(entries))
    core = {
        "pages": [
            [e.title, e.address, e.beside, [list(heading) for heading in e.headings]]
            for e in entries
        ],
        "shards": [first for first, _ in shards],
    }
    files = [("search/core.js", f"handbookSearch.core({_json(core)});\n")]
    for number, (_, words) in enumerate(shards):
        files.append(
            (f"search/words-{number:03}.js", f"handbookSearch.words({number},{_json(words)});\n")
        )
    return tuple(files)


def _json(value: object) -> str:
    return json.dumps(value, ensure_ascii=True, separators=(",", ":")).replace("</", "<\\/")


def _shards(entries: tuple[Entry, ...]) -> Iterator[tuple[str, dict[str, list[int]]]]:
    """Give each shard with the beginning (two characters) that its first word has."""
    index: dict[str, list[int]] = {}
    for number, entry in enumerate(entries):
        for word in entry.words:
            index.setdefault(word, []).append(number)
    shard: dict[str, list[int]] = {}
    first, size = "", 0
    for word in sorted(index):
        begins = word[:2]
        if shard and size > SHARD and begins != _last(shard)[:2]:
            yield first, shard
            shard, size = {}, 0
        if not shard:
            first = begins if first or size else ""
        shard[word] = index[word]
        size += len(word) + 6 * len(index[word]) + 6
    if shard:
        yield first, shard


def _last(shard: dict[str, list[int]]) -> str:
    return next(reversed(shard))


# ---------------------------------------------------------------- what pages hold


def _entries(pages: HandbookPages) -> Iterator[Entry]:
    for page in pages.procedures:
        yield _procedure(page)
    for ordinary in pages.pages:
        text = " ".join((ordinary.title, *_texts(ordinary.body)))
        headings = tuple((said, place) for _, place, said in ordinary.outline)
        yield Entry(ordinary.title, ordinary.address, "page", headings, words_of(text))
    for reference in pages.references:
        rows = (f"{row.label} {text_of(row.value)}" for row in reference.rows)
        text = " ".join((reference.title, *rows, *reference.lines))
        beside = "stock" if reference.kind == "stock" else "substance"
        yield Entry(reference.title, reference.address, beside, (), words_of(text))
    for page_list in pages.lists:
        groups = " ".join(group.title for group in page_list.groups)
        yield Entry(
            page_list.title, page_list.address, "list", (), words_of(f"{page_list.title} {groups}")
        )


def _procedure(page: m.StudentPage | m.InstructorPage) -> Entry:
    facts = page.facts
    materials = " ".join(
        f"{text_of(row.name)} {row.local} {text_of(row.formula)}" for row in page.reagents
    )
    equipment = " ".join(row.what for row in page.equipment)
    text = " ".join(
        (
            facts.title,
            facts.code,
            facts.course,
            materials,
            equipment,
            *(text_of(line.equation) for line in page.reactions),
            *_texts(page.before),
            *_texts(page.body),
        )
    )
    headings = tuple((said, place) for _, place, said in facts.outline)
    beside = " · ".join(filter(None, (facts.code, facts.course)))
    return Entry(facts.title, facts.address, beside, headings, words_of(text))


def _texts(blocks: Iterable[m.Blocks]) -> Iterator[str]:
    """Give the plain text of blocks."""
    for block in blocks:
        match block:
            case m.Para(children) | m.Title(_, _, children):
                yield text_of(children)
            case m.StepList(items):
                for item in items:
                    yield from _texts(item.children)
            case m.ItemList(_, lists):
                for inside in lists:
                    yield from _texts(inside)
            case m.Quoted(inner) | m.Panel(_, inner) | m.InstructorPanel(_, inner):
                yield from _texts(inner)
            case m.Listing(text):
                yield text
            case m.Grid():
                for row in (block.head, *block.rows):
                    for cell in row:
                        yield text_of(cell)
            case m.Divider():
                pass
