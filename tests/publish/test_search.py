"""The search index: what it holds in each edition, how it is divided, how words are folded."""

from __future__ import annotations

import json
from base64 import b64decode
from functools import cache
from itertools import accumulate
from typing import Any

import pytest

from builders import analysis
from watchglass.publish.handbook import HandbookPages, make_handbook
from watchglass.publish.model import Lowered, Raised, Run
from watchglass.publish.search import SHARD, fold, index_files, posted, search_files, words_of
from watchglass.publish.search_entries import Entry, Piece, Section, said

PROCEDURE = """---
title: Washing an ether layer
code: OC-90
course: Practice
materials:
  ether: tert-butyl methyl ether
  base: wash-base
  sample: {one-of: {A: naphthalene, B: biphenyl}, as: 1 % w/v in ethanol}
vessels:
  funnel: separatory funnel 125 mL
---

Some words before. Crème.

## The first wash

1. Put {30 mL ether -> funnel} and {15 mL base -> funnel} into {funnel}, and {1 mL sample -> funnel}.
2. Swirl it gently.

:::instructor
## Of zqxheading

A zqxsecret word.
:::

:::question
Why?

:::answer
zqxanswer
:::
:::
"""
FILES: dict[str, str | bytes] = {
    "procedures/oc-90.md": PROCEDURE,
    "stocks.yml": "wash-base:\n  names: [wash alkali]\n  material: 5.0 % w/v sodium hydrogencarbonate\n"
    "  note: zqxnote\n",
    "schedule.yml": "- {week: 4, procedure: OC-90, course: Practice}\n",
    "pages/safety.md": "# Safety\n\nWear goggles.\n\n## Fire\n\nShout.\n",
}


@cache
def handbook(edition: str) -> HandbookPages:
    return make_handbook(analysis(FILES), edition)


class Index:
    """An index as a browser has it once every shard is loaded."""

    def __init__(self, files: dict[str, str]) -> None:
        """Read the files."""
        self.core: dict[str, Any] = json.loads(
            files["search/core.js"].removeprefix("handbookSearch.core(")[:-3]
        )
        self.shards = [
            _given(files[f"search/words-{n}.js"]) for n in range(len(self.core["words"]))
        ]
        self.texts = [_given(files[f"search/texts-{n}.js"]) for n in range(len(self.core["texts"]))]
        self.words: dict[str, Any] = {k: v for shard in self.shards for k, v in shard.items()}
        self.sections = [
            (page[1], ["", *page[4][1::2]][at])
            for page in self.core["pages"]
            for at in range(1 + len(page[4]) // 2)
        ]

    def names(self, address: str) -> list[str]:
        """Give the folded names of a page."""
        return next(page[3].split() for page in self.core["pages"] if page[1] == address)

    def found(self, word: str) -> list[tuple[str, str]]:
        """Give page and place of the sections that a word stands in."""
        return [self.sections[n] for n in numbers(self.words.get(word, []))]


def _given(text: str) -> Any:
    return json.loads(text.split(",", 1)[1][:-3])


def numbers(where: list[int] | str) -> list[int]:
    """Read numbers of sections back."""
    if isinstance(where, list):
        return list(accumulate(where))
    bits = b64decode(where)
    return [n for n in range(8 * len(bits)) if bits[n // 8] >> n % 8 & 1]


@cache
def index(edition: str) -> Index:
    return Index(dict(search_files(handbook(edition))))


@pytest.mark.parametrize(
    ("word", "where"),
    [
        ("creme", ("procedures/oc-90.html", "")),
        ("swirl", ("procedures/oc-90.html", "the-first-wash")),
        ("goggles", ("pages/safety.html", "")),
        ("shout", ("pages/safety.html", "fire")),
        ("1634", ("substances/tert-butyl-methyl-ether.html", "")),
    ],
)
def test_word_leads_to_the_section_it_stands_in(word: str, where: tuple[str, str]) -> None:
    assert where in index("student").found(word)


@pytest.mark.parametrize(
    ("word", "address"),
    [
        ("oc", "procedures/oc-90.html"),
        ("ether", "procedures/oc-90.html"),
        ("practice", "procedures/oc-90.html"),
        ("week", "procedures/oc-90.html"),
        ("nahco3", "procedures/oc-90.html"),
        ("nahco3", "substances/sodium-hydrogencarbonate.html"),
        ("mtbe", "substances/tert-butyl-methyl-ether.html"),
        ("1634", "substances/tert-butyl-methyl-ether.html"),
        ("alkali", "stocks/wash-base.html"),
    ],
)
def test_names_are_found_with_the_core_alone(word: str, address: str) -> None:
    assert word in index("student").names(address)


def test_step_of_a_text_can_be_led_to() -> None:
    assert ["step-2", "Swirl it gently."] in [
        section[at : at + 2]
        for shard in index("student").texts
        for page in shard
        for section in page
        for at in range(0, len(section), 2)
    ]


@pytest.mark.parametrize("word", ["zqxsecret", "zqxheading", "zqxanswer", "zqxnote"])
def test_instructors_words_are_in_their_index_only(word: str) -> None:
    assert index("instructor").found(word)
    assert word not in "".join(text for _, text in search_files(handbook("student")))


@pytest.mark.parametrize("word", ["naphthalene", "biphenyl", "91-20-3", "c10h8"])
def test_candidate_of_a_secret_is_in_no_index_of_the_student_edition(word: str) -> None:
    assert word not in "".join(text for _, text in search_files(handbook("student"))).casefold()


def test_two_indexes_are_the_same() -> None:
    again = make_handbook(analysis(FILES), "student")

    assert list(search_files(handbook("student"))) == list(search_files(again))


def test_script_cannot_be_ended_by_a_word() -> None:
    files = FILES | {"procedures/oc-90.md": PROCEDURE.replace("ether layer", "layer </script>")}
    made = "".join(text for _, text in search_files(make_handbook(analysis(files), "student")))

    assert "</script" not in made
    assert "<\\/script" in made


def test_every_file_is_plain_ascii() -> None:
    assert all(text.isascii() for _, text in search_files(handbook("instructor")))


# ---------------------------------------------------------------- large sets


def many(pages: int) -> list[Entry]:
    """Make pages that share some words and have some of their own."""
    texts = [
        " ".join(["the", "mL", *(f"w{(n * k) % 9973}x" for k in range(1, 60)), f"own{n}"])
        for n in range(pages)
    ]
    return [
        Entry(f"P{n}", f"p{n}.html", "", (), (Section("", "", (Piece("step-1", text),)),))
        for n, text in enumerate(texts)
    ]


def test_no_shard_grows_with_the_set() -> None:
    files = dict(index_files(many(3000)))
    sizes = [len(text) for name, text in files.items() if name != "search/core.js"]

    assert len(sizes) > 10
    assert max(sizes) < 1.3 * SHARD


def test_shards_are_named_by_their_first_words_in_the_order_of_a_browser() -> None:
    held = Index(dict(index_files(many(800))))
    firsts = held.core["words"]

    assert firsts == sorted(firsts, key=lambda word: word.encode("utf-16-be"))
    assert all(first in shard for first, shard in zip(firsts, held.shards, strict=True))
    assert held.core["texts"][0] == 0


def test_texts_are_counted_on_from_shard_to_shard() -> None:
    held = Index(dict(index_files(many(800))))
    starts = [0, *accumulate(len(shard) for shard in held.texts)]

    assert held.core["texts"] == starts[:-1]
    assert starts[-1] == 800


@pytest.mark.parametrize(
    "sections",
    [[0], [5], [0, 1, 2, 3], list(range(1000)), list(range(0, 1000, 3)), list(range(7, 9000, 90))],
)
def test_numbers_of_sections_are_read_back_as_they_were(sections: list[int]) -> None:
    assert numbers(posted(sections)) == sections


def test_word_that_stands_everywhere_takes_a_bit_a_section() -> None:
    assert len(posted(range(60_000))) <= 60_000 / 6 + 4


# ---------------------------------------------------------------- words


@pytest.mark.parametrize(
    ("text", "folded"),
    [
        ("H₂SO₄", "h2so4"),
        ("µL", "μl"),
        ("Crème", "creme"),
        ("25.00", "25.00"),
        ("Straße", "strasse"),
        ("ΟΣ", "οσ"),
    ],
)
def test_words_are_folded_as_people_type_them(text: str, folded: str) -> None:
    assert fold(text) == folded


def test_numbers_keep_their_points() -> None:
    assert "15.0" in words_of("take 15.0 mL")


def test_powers_are_not_flattened_in_a_context() -> None:
    assert said((Run("10"), Raised("−3"), Run(" mol of H"), Lowered("2"))) == "10⁻³ mol of H₂"
