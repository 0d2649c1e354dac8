"""YAML that is refused, each fault at its place; and no text at all that stops the program."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest
from hypothesis import given
from hypothesis import strategies as st

from watchglass.base import codes
from watchglass.base.spans import Source
from watchglass.base.yaml import (
    DEEPEST,
    MOST_CHARACTERS,
    YamlList,
    YamlMapping,
    YamlNode,
    YamlText,
    read_yaml,
)

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Span


def faults(text: str) -> tuple[Finding, ...]:
    return read_yaml(Source.of("a.yml", text))[1]


def fault(text: str) -> Finding:
    found = faults(text)
    assert len(found) == 1, found
    return found[0]


@pytest.mark.parametrize(
    ("text", "what", "marked"),
    [
        ("a: &x 1", "an anchor", "&x"),
        ("- &x 1", "an anchor", "&x"),
        ("[&x 1]", "an anchor", "&x"),
        ("&x a: 1", "an anchor", "&x"),
        ("a: *x", "an alias", "*x"),
        ("a: {b: *x}", "an alias", "*x"),
        ("a: !t 1", "a tag", "!t 1"),
        ("a: !!str 1", "a tag", "!!str 1"),
        ("a: !<t> 1", "a tag", "!<t> 1"),
        ("a: ! 1", "a tag", "! 1"),
        ("<<: {a: 1}", "a merge", "<<"),
        ("a:\n  <<: b", "a merge", "<<"),
    ],
)
def test_what_makes_a_file_mean_more_than_it_shows_is_refused(
    text: str, what: str, marked: str
) -> None:
    found = fault(text)

    assert found.code is codes.YAML_REFUSED
    assert found.message == f"{what} of YAML is not read here"
    assert found.span.text == marked


def test_anchor_and_its_alias_are_two_findings_in_their_places() -> None:
    assert [f.span.text for f in faults("a: &x 1\nb: *x")] == ["&x", "*x"]


@pytest.mark.parametrize(
    "text",
    ["a: 'b & c'", "a: b & c", "a: 2 * 3", "a: stop!", "a: '!b'", 'a: "*b"', "a: '<<'", "a: b<<c",
     "a: #!b", "a: x !b"],
)  # fmt: skip
def test_signs_within_words_are_words(text: str) -> None:
    assert faults(text) == ()


@pytest.mark.parametrize(
    ("text", "first", "second"),
    [
        ("a: b\na: c", 0, 5),
        ("'a': b\na: c", 0, 7),
        ("x: {a: b, a: c}", 4, 10),
        ("- a: b\n  a: c", 2, 9),
    ],
)
def test_key_that_stands_twice_is_found_at_its_second_place(
    text: str, first: int, second: int
) -> None:
    found = fault(text)

    assert (found.code, found.span.start) == (codes.KEY_TWICE, second)
    assert [related.span.start for related in found.related] == [first]


def test_first_of_two_values_is_kept() -> None:
    node, _ = read_yaml(Source.of("a.yml", "a: b\na: c"))
    assert isinstance(node, YamlMapping)
    value = node.get("a")

    assert isinstance(value, YamlText)
    assert value.text == "b"
    assert len(node.entries) == 1


def test_same_key_in_two_mappings_is_no_fault() -> None:
    assert faults("a: {x: 1}\nb: {x: 1}") == ()


@pytest.mark.parametrize(
    ("text", "start", "help_"),
    [
        ("a: [1", 3, "see whether a quote, a bracket or a `:` is missing"),
        ("a: {b", 3, "see whether a quote, a bracket or a `:` is missing"),
        ("a: 'b", 3, "see whether a quote, a bracket or a `:` is missing"),
        ('a: "b', 3, "see whether a quote, a bracket or a `:` is missing"),
        ("a: 'it's'", 7, "see whether a quote, a bracket or a `:` is missing"),
        ("a:\n\t- b", 3, "set lines in by blanks, not by tabs"),
        ("a: b\n\tc: d", 5, "set lines in by blanks, not by tabs"),
        ("a: b: c", 4, "put quotes round a value that holds `: `"),
        ("title: Acids: a start", 12, "put quotes round a value that holds `: `"),
        ("a: %b", 3, "put quotes round a value that begins with a sign"),
        ("a: @b", 3, "put quotes round a value that begins with a sign"),
        ("a: `b`", 3, "put quotes round a value that begins with a sign"),
        ("---\na: b\n---\nc: d", 9, ""),
        ("a: b\x07", 4, "take it out"),
        ("a: b\ud800", 4, "take it out"),
    ],
)
def test_faulty_yaml_is_found_where_it_goes_wrong(text: str, start: int, help_: str) -> None:
    found = fault(text)

    assert (found.code, found.span.start) == (codes.YAML_NOT_READ, start)
    assert found.span.end == start + 1
    assert help_ in (found.help or "")


def test_fault_in_a_front_matter_is_counted_from_the_file() -> None:
    text = "---\na: 'b\n---\n"
    found = read_yaml(Source.of("a.md", text), 4, 10)[1]

    assert [f.span.start for f in found] == [7]


@pytest.mark.parametrize(
    ("text", "marked"),
    [
        ("a: {15 mL -> x}", "15 mL -> x"),
        ("a: {all y -> x, z: 1}", "all y -> x"),
        ("? [a, b]\n: c", "[a, b]"),
        ("? {a: b}\n: c", "{a: b}"),
        ("{15 mL -> x}: 1", "15 mL -> x"),
    ],
)
def test_mark_without_quotes_is_told_from_a_mapping(text: str, marked: str) -> None:
    found = fault(text)

    assert (found.code, found.span.text) == (codes.MARK_IN_YAML, marked)


@pytest.mark.parametrize("key", ["a: {a -> b: c}", "reaction: A -> B", "a: 'x -> y'"])
def test_arrow_with_a_value_is_no_mark(key: str) -> None:
    assert faults(key) == ()


# ------------------------------------------------------------------------------ bounds


@pytest.mark.parametrize(
    "text",
    [
        "a: " + "[" * (DEEPEST + 1) + "]" * (DEEPEST + 1),
        "[" * 5000,
        "{a: " * 5000,
        "- " * 5000 + "a",
        "? " * 5000 + "a",
        "\n".join(" " * depth + "a:" for depth in range(200)),
    ],
    ids=["brackets", "open brackets", "open braces", "dashes", "question marks", "indents"],
)
def test_deep_nesting_is_refused_before_it_is_read(text: str) -> None:
    assert fault(text).code is codes.NESTED_TOO_DEEPLY


def test_as_many_brackets_as_allowed_are_read() -> None:
    assert faults("a: " + "[" * DEEPEST + "]" * DEEPEST) == ()


def test_many_brackets_side_by_side_are_not_deep() -> None:
    assert faults("a: [" + "[b], " * 500 + "c]") == ()


def test_file_beyond_the_size_is_refused_at_its_start() -> None:
    found = fault("a: " + "b" * MOST_CHARACTERS)

    assert (found.code, found.span.start) == (codes.SOURCE_TOO_LARGE, 0)


@pytest.mark.parametrize("text", ["", " ", "\n\n", "# said", "---\n"])
def test_nothing_is_no_fault(text: str) -> None:
    assert faults(text) == ()


# ------------------------------------------------------------------------------ any text

_PIECES = st.sampled_from(
    ["a", "b: ", ":", "- ", "-", "? ", "\n", "\n  ", "\n    ", "\t", "'", '"', "''", "\\", "\\x4", "[",
     "]", "{", "}", ",", "# x", "&a", "*a", "!t", "!", "|", "|-", ">", "%", "@", "`", "---\n", "...\n",
     "<<", "->", "é", "🧪", "\r\n", "\x85", "\u2028", "\ufeff", "\0", "\ud800", "0.50", "~"]
)  # fmt: skip


def _nodes(node: YamlNode | None) -> Iterator[YamlNode]:
    """Give a node with all it holds."""
    if node is None:
        return
    yield node
    if isinstance(node, YamlList):
        for item in node.items:
            yield from _nodes(item)
    elif isinstance(node, YamlMapping):
        for entry in node:
            yield entry.key
            yield from _nodes(entry.value)


def _outside(text: str) -> list[Span]:
    """Read a text and give every place that is not in it: of findings, nodes, their characters."""
    source = Source.of("a.yml", text)
    node, found = read_yaml(source)
    nodes = tuple(_nodes(node))
    scalars = [n for n in nodes if isinstance(n, YamlText)]
    places = [f.span for f in found] + [n.span for n in nodes]
    places += [s.part(at, at + 1) for s in scalars for at in range(len(s.text))]
    places += [s.part(0, len(s.text) + 5) for s in scalars]
    return [p for p in places if not 0 <= p.start <= p.end <= len(source.text)]


@given(st.lists(_PIECES, max_size=25).map("".join))
def test_heap_of_yaml_signs_is_read_or_refused_within_the_file(text: str) -> None:
    assert _outside(text) == []


@given(st.text(max_size=60))
def test_any_text_is_read_or_refused_within_the_file(text: str) -> None:
    assert _outside(text) == []
