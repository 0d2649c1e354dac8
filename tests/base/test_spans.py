"""Sources, spans, lines and columns; near names."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from watchglass.base.findings import did_you_mean, near
from watchglass.base.spans import Lines, Position, Source


@pytest.mark.parametrize(
    ("text", "kept"),
    [
        ("a\r\nb", "a\nb"),
        ("a\rb", "a\nb"),
        ("\ufeffa", "a"),
        ("a\ufeffb", "a\ufeffb"),
        ("a\r\n\r\nb\n", "a\n\nb\n"),
        ("a\x0bb\u2028c", "a\x0bb\u2028c"),
    ],
)
def test_source_keeps_what_counts_as_a_line(text: str, kept: str) -> None:
    assert Source.of("a", text).text == kept


@pytest.mark.parametrize(
    ("offset", "position"),
    [(0, (1, 1)), (2, (1, 3)), (3, (2, 1)), (4, (3, 1)), (5, (3, 2)), (6, (3, 3))],
)
def test_line_and_column_count_from_one(offset: int, position: tuple[int, int]) -> None:
    assert Lines("ab\n\n🧪c").position(offset) == Position(*position)


def test_line_is_given_without_its_end() -> None:
    lines = Lines("ab\n\ncd")

    assert [lines.line(n) for n in (1, 2, 3)] == ["ab", "", "cd"]
    assert [lines.start(n) for n in (1, 2, 3)] == [0, 3, 4]
    assert len(lines) == 3


def test_text_that_ends_in_a_line_end_has_an_empty_last_line() -> None:
    lines = Lines("ab\n")

    assert (len(lines), lines.line(2), lines.position(3)) == (2, "", Position(2, 1))


@given(st.text("ab\n", max_size=30), st.data())
def test_position_and_start_lead_back_to_the_offset(text: str, data: st.DataObject) -> None:
    offset = data.draw(st.integers(0, len(text)))
    lines = Lines(text)
    line, column = lines.position(offset)

    assert lines.start(line) + column - 1 == offset


def test_spans_are_cut_and_joined() -> None:
    source = Source.of("a", "stir the flask")
    flask = source.span(9, 14)

    assert flask.text == "flask"
    assert flask.part(1, 3).text == "la"
    assert source.span(0, 4).through(flask).text == "stir the flask"
    assert flask.position() == Position(1, 10)


@pytest.mark.parametrize(
    ("word", "known", "found"),
    [
        ("acidd", ["acid", "base"], ("acid",)),
        ("ACID", ["acid", "base"], ("acid",)),
        ("flsk", ["flask", "funnel"], ("flask",)),
        ("xyz", ["acid", "base"], ()),
        ("", ["acid"], ()),
        ("tube-2", ["tube-1", "tube-3", "tube-4", "tube-5"], ("tube-5", "tube-4", "tube-3")),
    ],
)
def test_near_names_are_few_and_near(word: str, known: list[str], found: tuple[str, ...]) -> None:
    assert near(word, known) == found


def test_near_names_are_put_into_a_question() -> None:
    assert did_you_mean("acd", ["acid", "base"]) == "did you mean `acid`?"
    assert did_you_mean("xyz", ["acid", "base"]) is None
