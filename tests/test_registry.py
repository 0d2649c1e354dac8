"""The registry of findings: numbers, names and summaries keep to their form."""

from __future__ import annotations

import re
from collections import Counter
from typing import TYPE_CHECKING

import pytest

from watchglass.base import codes

if TYPE_CHECKING:
    from watchglass.base.findings import Code

#: Subjects by letter, as the registry's own docstring lists them.
LETTERS = "NQKSBXHWEP"

#: A name states the fault; it neither gives an order nor says merely that something is wrong.
ORDERS = ("check-", "use-", "do-", "invalid-", "avoid-", "bad-", "no-")
EMPTY_ENDS = ("-error", "-warning", "-problem")

each_code = pytest.mark.parametrize(
    "code", codes.ALL, ids=lambda code: f"{code.number}-{code.name}"
)


def test_registry_is_not_empty() -> None:
    assert len(codes.ALL) >= 80


def test_numbers_are_unique() -> None:
    twice = [n for n, count in Counter(code.number for code in codes.ALL).items() if count > 1]

    assert twice == []


def test_names_are_unique() -> None:
    twice = [n for n, count in Counter(code.name for code in codes.ALL).items() if count > 1]

    assert twice == []


def test_codes_are_sorted_by_number() -> None:
    numbers = [code.number for code in codes.ALL]

    assert numbers == sorted(numbers)


@each_code
def test_number_is_a_known_letter_and_three_digits(code: Code) -> None:
    assert re.fullmatch(rf"[{LETTERS}][1-9]\d\d", code.number)


@each_code
def test_name_is_words_joined_by_hyphens(code: Code) -> None:
    assert re.fullmatch(r"[a-z]+(?:-[a-z0-9]+)*", code.name)


@each_code
def test_name_states_the_fault(code: Code) -> None:
    assert not code.name.startswith(ORDERS)
    assert not code.name.endswith(EMPTY_ENDS)


@each_code
def test_summary_is_one_short_line_in_lower_case_without_stop(code: Code) -> None:
    summary = code.summary

    assert 10 <= len(summary) <= 72
    assert "\n" not in summary
    assert not summary.endswith((".", "!", "?"))
    assert summary[0].islower() or summary.split()[0] in {"YAML", "CAS", "SMILES"}


@each_code
def test_code_is_found_by_number_in_either_case_and_by_name(code: Code) -> None:
    assert codes.find(code.number) is code
    assert codes.find(code.number.lower()) is code
    assert codes.find(code.name) is code


def test_unknown_word_finds_no_code() -> None:
    assert codes.find("B000") is None
    assert codes.find("") is None


def test_every_constant_of_the_registry_is_in_the_list() -> None:
    constants = {name for name in vars(codes) if name.isupper() and not name.startswith("_")} - {
        "ALL"
    }

    assert len(constants) == len(codes.ALL)
