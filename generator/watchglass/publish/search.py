"""The index of an edition for its offline search: a core, words, and texts.

The core holds a line for each page (title, address, what stands beside it, folded names, headings)
and is loaded when the search box is first used: titles, codes, materials, names, numbers and
headings are found with it alone. All other words lie in shards, each a range of the alphabet; a
query loads those that its words lie in. Texts lie in shards of their own, by pages, and are loaded
for the results that are shown, to show them in their context.

A shard ends at the first word past `SHARD` characters, and one word takes no more characters than
a quarter of the number of sections, so a shard stays small however large the set is. Files are plain
scripts: a page opened from disk may load no other.
"""

from __future__ import annotations

import json
import re
import unicodedata
from array import array
from base64 import b64encode
from typing import TYPE_CHECKING

from watchglass.publish.search_entries import search_entries

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping, Sequence

    from watchglass.publish.handbook import HandbookPages
    from watchglass.publish.search_entries import Entry

#: Characters of a shard of words or texts, about.
SHARD = 48_000
_WORD = re.compile(r"[^\W_]+(?:[.,][0-9]+)*")
_MARKS = re.compile(r"[\u0300-\u036f]")


def fold(text: str) -> str:
    """Fold text for comparing: case, accents, sub- and superscripts. `search.js` does the same.

    >>> fold("H₂SO₄ µL Crème")
    'h2so4 μl creme'
    """
    if text.isascii():
        return text.lower()
    plain = unicodedata.normalize("NFKD", text).casefold()
    return _MARKS.sub("", plain)


def words_of(text: str) -> frozenset[str]:
    """Give the folded words of a text.

    >>> sorted(words_of("Add 15.0 mL of 3.0 M acid."))
    ['15.0', '3.0', 'acid', 'add', 'm', 'ml', 'of']
    """
    return frozenset(_WORD.findall(fold(text)))


def search_files(pages: HandbookPages) -> Iterator[tuple[str, str]]:
    """Make the files of the index, one after the other: address from the root, and content."""
    return index_files(search_entries(pages))


def index_files(entries: Iterable[Entry]) -> Iterator[tuple[str, str]]:
    """Make the files of the index of some pages: shards of texts, shards of words, the core.

    Pages are taken one by one and not kept: a large set is indexed in little more than its words.
    """
    index: dict[str, array[int]] = {}
    lines: list[list[object]] = []
    texts: list[int] = []
    words: list[str] = []
    for first, held in _text_shards(_noted(entries, index, lines)):
        yield (
            f"search/texts-{len(texts)}.js",
            f"handbookSearch.texts({len(texts)},{_json(held)});\n",
        )
        texts.append(first)
    for shard in _word_shards(index):
        yield (
            f"search/words-{len(words)}.js",
            f"handbookSearch.words({len(words)},{_json(shard)});\n",
        )
        words.append(next(iter(shard)))
    core = {"pages": lines, "words": words, "texts": texts}
    yield "search/core.js", f"handbookSearch.core({_json(core)});\n"


def _noted(
    entries: Iterable[Entry], index: dict[str, array[int]], lines: list[list[object]]
) -> Iterator[Entry]:
    """Pass pages on, each with its words noted by number of section, and its line for the core."""
    number = 0
    for entry in entries:
        for section in entry.sections:
            text = " ".join((section.heading, *(piece.text for piece in section.pieces)))
            for word in words_of(text):
                where = index.get(word)
                if where is None:
                    where = index[word] = array("L")
                where.append(number)
            number += 1
        lines.append(_line(entry))
        yield entry


def _json(value: object) -> str:
    return json.dumps(value, ensure_ascii=True, separators=(",", ":")).replace("</", "<\\/")


def _line(entry: Entry) -> list[object]:
    """Give a page in the core; its names are folded here, so that a browser need not."""
    names = sorted(words_of(" ".join((entry.title, entry.beside, *entry.names))))
    headings = [text for s in entry.sections[1:] for text in (s.heading, s.place)]
    return [entry.title, entry.address, entry.beside, " ".join(names), headings]


# ---------------------------------------------------------------- words


def _word_shards(index: Mapping[str, Sequence[int]]) -> Iterator[dict[str, list[int] | str]]:
    """Divide the alphabet into shards: for each word, where it stands."""
    shard: dict[str, list[int] | str] = {}
    size = 0
    for word in sorted(index, key=_as_browsers_sort):
        shard[word] = where = posted(index[word])
        size += len(word) + 6 + (len(where) if isinstance(where, str) else len(_json(where)))
        if size > SHARD:
            yield shard
            shard, size = {}, 0
    if shard:
        yield shard


def _as_browsers_sort(word: str) -> bytes:
    """Give what a browser compares texts by: units of UTF-16, not code points."""
    return word.encode("utf-16-be")


def posted(sections: Sequence[int]) -> list[int] | str:
    """Give numbers of sections, rising, in few characters.

    Returns:
        The first number and then the steps from each to the next; or, where that is shorter, a bit
        a section (lowest first in each byte), in base 64.

    >>> posted([3, 4, 9])
    [3, 1, 5]
    >>> posted(range(16))
    '//8='
    """
    steps = [b - a for a, b in zip((0, *sections), sections, strict=False)]
    if len(steps) * 12 <= sections[-1]:  # rare: bits would hardly be shorter
        return steps
    bits = bytearray(sections[-1] // 8 + 1)
    for number in sections:
        bits[number // 8] |= 1 << number % 8
    coded = b64encode(bytes(bits)).decode()
    return coded if len(coded) + 2 < len(_json(steps)) else steps


# ---------------------------------------------------------------- texts


def _text_shards(entries: Iterable[Entry]) -> Iterator[tuple[int, list[object]]]:
    """Divide the pages into shards: number of the first page, and each page's sections of pieces."""
    first, size = 0, 0
    shard: list[object] = []
    for number, entry in enumerate(entries):
        pieces = [
            [text for piece in section.pieces for text in (piece.place, piece.text)]
            for section in entry.sections
        ]
        shard.append(pieces)
        size += sum(len(text) + 3 for section in pieces for text in section)
        if size > SHARD:
            yield first, shard
            first, size, shard = number + 1, 0, []
    if shard:
        yield first, shard
