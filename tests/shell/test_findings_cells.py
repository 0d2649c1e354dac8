"""Widths of characters, and which are never printed raw."""

from __future__ import annotations

import sys
from unicodedata import category

import pytest
from hypothesis import given
from hypothesis import strategies as st

from watchglass.shell.rendering.cells import lay_out, shown, text_width, visible, width


@pytest.mark.parametrize(
    ("char", "columns"),
    [
        ("a", 1), ("°", 1), ("→", 1), ("·", 1), ("水", 2), ("ｱ", 1), ("Ａ", 2), ("\u0301", 0),
        ("\u20dd", 0), ("\u1160", 0), ("𝒳", 1), ("🧪", 2), ("\u3000", 2), ("\ufe0f", 0),
    ],
)  # fmt: skip
def test_width_is_that_of_a_terminal(char: str, columns: int) -> None:
    assert width(char) == columns


@pytest.mark.parametrize(
    ("char", "text"),
    [
        ("\x1b", "<U+001B>"), ("\x00", "<U+0000>"), ("\x7f", "<U+007F>"), ("\x85", "<U+0085>"),
        ("\u200b", "<U+200B>"), ("\u202e", "<U+202E>"), ("\u2066", "<U+2066>"),
        ("\u2028", "<U+2028>"), ("\ufeff", "<U+FEFF>"), ("\udc80", "<U+DC80>"),
        ("\U000e0041", "<U+E0041>"), ("a", "a"), ("°", "°"), ("\u00a0", "\u00a0"),
    ],
)  # fmt: skip
def test_unsafe_characters_are_shown_by_number(char: str, text: str) -> None:
    assert shown(char) == text


def test_every_unsafe_character_there_is_becomes_printable() -> None:
    unsafe = [char for char in map(chr, range(sys.maxunicode + 1)) if category(char)[0] == "C"]
    raw = [char for char in unsafe if shown(char) == char]

    assert {category(char) for char in raw} <= {"Cn", "Co"}


def test_message_keeps_to_one_line() -> None:
    assert visible("a\nb\tc\rd\x1b") == r"a\nb\tc\rd<U+001B>"


def test_help_may_keep_its_lines() -> None:
    assert visible("a\nb\tc", lines=True) == "a\nb\\tc"


@pytest.mark.parametrize(
    ("line", "columns"),
    [
        ("\tx", (0, 4, 5)),
        ("a\tx", (0, 1, 4, 5)),
        ("水\tx", (0, 2, 4, 5)),
        ("abcd\tx", (0, 1, 2, 3, 4, 8, 9)),
        ("\x1b\tx", (0, 8, 12, 13)),
        ("e\u0301x", (0, 1, 1, 2)),
        ("", (0,)),
    ],
)
def test_tabs_reach_to_the_next_stop(line: str, columns: tuple[int, ...]) -> None:
    assert lay_out(line).columns == columns


@given(st.text())
def test_columns_are_the_width_of_what_is_printed(line: str) -> None:
    row = lay_out(line.replace("\n", ""))

    assert text_width("".join(row.pieces)) == row.width


@given(st.text(min_size=1), st.data())
def test_every_stretch_takes_a_column(line: str, data: st.DataObject) -> None:
    row = lay_out(line)
    start = data.draw(st.integers(0, len(line)))
    first, last = row.stretch(start, data.draw(st.integers(start, len(line))))

    assert 0 <= first < last <= row.width + 1
