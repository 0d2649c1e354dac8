"""Every value of YAML knows where it stands, down to the character."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from watchglass.base.spans import Source
from watchglass.base.yaml import YamlList, YamlMapping, YamlNode, YamlText, read_yaml


def scalar(text: str, start: int = 0) -> YamlText:
    """Read a file and give the value of its field `k`."""
    node, findings = read_yaml(Source.of("a.yml", text), start)
    assert findings == ()
    assert isinstance(node, YamlMapping)
    value = node.get("k")
    assert isinstance(value, YamlText)
    return value


def stands(value: YamlText) -> list[str]:
    """Give for each character of a value what stands at its place in the file."""
    return [value.part(at, at + 1).text for at in range(len(value.text))]


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("k: plain words", "plain words"),
        ("k:    plain words   # said", "plain words"),
        ("k: 0.50", "0.50"),
        ("k: NO", "NO"),
        ("k: 12:30", "12:30"),
        ("k: 1e3", "1e3"),
        ("k: ~", "~"),
        ("k: null", "null"),
        ("k: 2026-09-01", "2026-09-01"),
        ("k: a#b", "a#b"),
        ("k: 'quoted # words'", "quoted # words"),
        ('k: "quoted: words"', "quoted: words"),
        ("{k: in flow, l: m}", "in flow"),
        ("{l: [m, n], k: in flow}", "in flow"),
        ("k: µL – ½ é", "µL – ½ é"),
        ("k: 🧪 flask", "🧪 flask"),
        ("l: 🧪🧪\nk: after it", "after it"),
        ("'k': key in quotes", "key in quotes"),
        ("# said\n\nk: x", "x"),
    ],
)
def test_character_that_stands_as_it_is_has_its_own_place(text: str, value: str) -> None:
    read = scalar(text)

    assert read.text == value
    assert stands(read) == list(value)


@pytest.mark.parametrize(
    ("text", "value", "places"),
    [
        ("k: 'it''s'", "it's", ["i", "t", "''", "s"]),
        (r'k: "a\tb"', "a\tb", ["a", "\\t", "b"]),
        (r'k: "a\"b"', 'a"b', ["a", r"\"", "b"]),
        (r'k: "a\\b"', "a\\b", ["a", r"\\", "b"]),
        (r'k: "\u00b5L"', "µL", [r"\u00b5", "L"]),
        (r'k: "\x41b"', "Ab", [r"\x41", "b"]),
        (r'k: "\U0001F9EA b"', "🧪 b", [r"\U0001F9EA", " ", "b"]),
    ],
)
def test_escape_stands_where_it_is_written(text: str, value: str, places: list[str]) -> None:
    read = scalar(text)

    assert read.text == value
    assert stands(read) == places


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("k: one\n  two", "one two"),
        ("k: one\n  two\n\n  three", "one two\nthree"),
        ("k: 'one\n  two'", "one two"),
        ("k: 'one\n\n  two'", "one\ntwo"),
        ('k: "one\n  two"', "one two"),
        ('k: "one \\\n   two"', "one two"),
        ("k: |\n  one\n  two\n", "one\ntwo\n"),
        ("k: |-\n  one\n    in\n  two\n", "one\n  in\ntwo"),
        ("k: |\n\n  one\n\n  two\n", "\none\n\ntwo\n"),
        ("l:\n  k: 5\nk: |\n  µL 🧪\n", "µL 🧪\n"),
    ],
)
def test_letter_of_a_value_over_several_lines_has_its_own_place(text: str, value: str) -> None:
    read = scalar(text)
    letters = [(c, p) for c, p in zip(value, stands(read), strict=True) if c not in " \n"]

    assert read.text == value
    assert [place for _, place in letters] == [letter for letter, _ in letters]


def test_words_on_the_second_line_are_underlined_there() -> None:
    read = scalar("k: one two\n  three four")
    span = read.part(14, 18)

    assert read.text[14:18] == "four"
    assert (span.text, span.position()) == ("four", (2, 9))


def test_part_over_a_fold_goes_from_its_first_to_its_last_character() -> None:
    assert scalar("k: one\n  two").part(2, 5).text == "e\n  t"


def test_folded_block_is_given_whole() -> None:
    read = scalar("k: >\n  one\n  two\n")

    assert read.text == "one two\n"
    assert read.part(4, 7) == read.span
    assert read.span.text == ">\n  one\n  two"


@pytest.mark.parametrize("end", ["\r\n", "\r", "\n"])
def test_line_ends_move_no_place(end: str) -> None:
    read = scalar(f"a: b{end}{end}k: five{end}")

    assert stands(read) == list("five")
    assert read.span.position() == (3, 4)


def test_byte_order_mark_moves_no_place() -> None:
    read = scalar("\ufeffk: five")

    assert (read.span.text, read.span.start) == ("five", 3)


@pytest.mark.parametrize("other", ["\x85", "\u2028", "\u2029"])
def test_other_line_ends_of_yaml_do_not_count_as_lines(other: str) -> None:
    node, _ = read_yaml(Source.of("a.yml", f"a: 'x{other}y'\nk: five"))
    assert isinstance(node, YamlMapping)
    value = node.get("k")

    assert isinstance(value, YamlText)
    assert (value.span.text, value.span.position()) == ("five", (2, 4))


def test_offset_of_a_front_matter_is_counted_from_the_file() -> None:
    text = "---\nk: 'it''s'\n---\nbody"
    read = scalar(text[: text.index("---", 3)], 4)

    assert read.span.text == "'it''s'"
    assert read.part(3, 4).start == text.index("s'")


def test_empty_value_has_a_place_and_no_characters() -> None:
    read = scalar("k:\nl: m")

    assert (read.text, read.style, read.span.text) == ("", "", "")


def test_empty_quotes_are_no_empty_value() -> None:
    assert scalar("k: ''").style == "'"


def test_part_of_no_characters_stands_before_the_next_one() -> None:
    read = scalar("k: 'it''s'")
    span = read.part(4, 4)

    assert (span.start, span.end) == (9, 9)


def test_keys_and_items_have_their_places() -> None:
    node, _ = read_yaml(Source.of("a.yml", "first: [one, 'two']\nsecond: {a: b}\n"))
    assert isinstance(node, YamlMapping)
    items = node.get("first")

    assert [entry.key.span.text for entry in node] == ["first", "second"]
    assert isinstance(items, YamlList)
    assert [item.span.text for item in items.items] == ["one", "'two'"]
    assert items.span.text == "[one, 'two']"


def _scalars(node: YamlNode | None) -> list[YamlText]:
    match node:
        case YamlText():
            return [node]
        case YamlList(items, _):
            return [scalar for item in items for scalar in _scalars(item)]
        case YamlMapping(entries, _):
            return [s for entry in entries for s in (entry.key, *_scalars(entry.value))]
        case None:
            return []


_WORDS = st.text(
    st.characters(codec="utf-8", exclude_categories=["Cs", "Cc", "Zl", "Zp"], exclude_characters="\ufeff\ufffe\uffff"),
    min_size=1, max_size=20,
)  # fmt: skip


@given(_WORDS)
def test_any_words_in_single_quotes_are_found_character_by_character(words: str) -> None:
    read = scalar("k: '" + words.replace("'", "''") + "'")

    assert read.text == words
    assert stands(read) == [c.replace("'", "''") for c in words]


@given(st.lists(_WORDS, max_size=4))
def test_any_list_in_double_quotes_is_found_character_by_character(listed: list[str]) -> None:
    quoted = ['"' + w.replace("\\", "\\\\").replace('"', '\\"') + '"' for w in listed]
    node, findings = read_yaml(Source.of("a.yml", "- " + "\n- ".join(quoted) if quoted else ""))

    assert findings == ()
    assert [s.text for s in _scalars(node)] == listed
    assert [s.part(0, len(s.text)).text for s in _scalars(node)] == [q[1:-1] for q in quoted]
