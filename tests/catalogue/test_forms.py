"""All forms of one salt: anhydrous and hydrates, shipped and a set's own."""

from __future__ import annotations

import pytest

from builders import surroundings


def forms(name: str, files: dict[str, str] | None = None) -> list[str]:
    catalogue = surroundings(files).catalogue
    substance = catalogue.find(name)
    assert substance is not None
    return [form.key for form in catalogue.forms_of(substance)]


@pytest.mark.parametrize("name", ["sodium carbonate", "sodium carbonate decahydrate"])
def test_forms_are_the_same_from_whichever_is_named_lightest_first(name: str) -> None:
    assert forms(name) == [
        "sodium-carbonate",
        "sodium-carbonate-monohydrate",
        "sodium-carbonate-decahydrate",
    ]


def test_substance_without_hydrates_is_alone() -> None:
    assert forms("ethanol") == ["ethanol"]


def test_hydrate_that_a_set_adds_is_among_them() -> None:
    added = """\
sodium-carbonate-heptahydrate:
  names: [sodium carbonate heptahydrate]
  formula: Na2CO3·7H2O
  hydrate-of: sodium-carbonate
"""
    found = forms("sodium carbonate", {"substances/local.yml": added})

    assert found[2] == "sodium-carbonate-heptahydrate"


def test_search_of_the_text_finds_what_decoding_would() -> None:
    shipped = surroundings().catalogue.shipped
    decoded = [s for s in map(shipped.get, shipped.keys()) if s is not None and s.hydrate_of]

    assert {s.key for s in decoded} == {
        key for s in decoded for key in shipped.hydrates(s.hydrate_of)
    }
    assert len(decoded) > 10
