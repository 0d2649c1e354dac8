"""Every node stands where it is said to stand, and no brace is lost, whatever was written."""

from __future__ import annotations

from random import Random

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from laws.markdown_documents import Maker, faults, wrong_marks

_SIGNS = st.sampled_from((
    "{", "}", "{a}", "[", "]", "](u)", "[w]{b}", "*", "**", "_", "`", "``", "\\", "\n", "\n\n", "  \n",
    "> ", "- ", "1. ", "    ", "\t", "# ", "---\n", "|", "|-|\n", ":::", ":::question\n", "```\n",
    "[x]: u\n", "<a:b>", "&amp;", "&#0;", "![", '"', "word", " ", "é", "🧪", "\r\n", "\0", "~~~ {r}\n",
))  # fmt: skip


@pytest.mark.parametrize("seed", range(20))
def test_numbered_marks_are_read_where_they_stand(seed: int) -> None:
    maker = Maker(Random(seed))  # noqa: S311 - test material
    documents = [maker.document() for _ in range(20)]

    assert [wrong_marks(text)[1] for text in documents] == [[]] * 20


@pytest.mark.parametrize("seed", range(20))
def test_made_up_documents_break_no_law(seed: int) -> None:
    maker = Maker(Random(1000 + seed))  # noqa: S311 - test material
    documents = [maker.document() for _ in range(20)]

    assert [faults(text) for text in documents] == [[]] * 20


@settings(
    deadline=None, derandomize=True, max_examples=600, suppress_health_check=list(HealthCheck)
)
@given(st.lists(_SIGNS, max_size=40))
def test_heaps_of_signs_break_no_law(signs: list[str]) -> None:
    assert faults("".join(signs)) == []


@settings(deadline=None, derandomize=True, max_examples=200)
@given(st.text(max_size=80))
def test_any_text_breaks_no_law(text: str) -> None:
    assert faults(text) == []
