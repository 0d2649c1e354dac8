"""Fields of YAML files: unknown ones, missing ones, values of another kind, each at its place."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from watchglass.base.fields import Field, Record, Shape, read_fields
from watchglass.base.spans import Source
from watchglass.base.yaml import read_yaml

if TYPE_CHECKING:
    from watchglass.base.findings import Finding

FIELDS = {
    "title": Field(Shape.TEXT, "its title", required=True),
    "steps": Field(Shape.LIST, "its steps"),
    "time": Field(Shape.TEXT_OR_LIST, "its time"),
    "vessels": Field(Shape.MAPPING, "its vessels"),
    "reaction": Field(Shape.TEXT_OR_MAPPING, "its reaction"),
    "any": Field(Shape.ANY, "anything"),
}


def read(text: str) -> tuple[Record | None, tuple[Finding, ...]]:
    node, findings = read_yaml(Source.of("a.yml", text))
    assert findings == ()
    assert node is not None
    return read_fields(node, FIELDS, "a thing")


@pytest.mark.parametrize(
    ("text", "code", "marked", "message", "help_"),
    [
        ("title: a\ntimes: b", "N143", "times", "`times` is no field of a thing", "did you mean `time`?"),
        ("title: a\nzzz: b", "N143", "zzz", "`zzz` is no field of a thing", "take one of `title`, `steps`, `time`, `vessels`, `reaction`, `any`"),
        ("time: b", "N144", "time", "a thing has no `title`", "add `title:` — its title"),
        ("title:", "N144", "title", "a thing has no `title`", "add `title:` — its title"),
        ("title: [a]", "N145", "[a]", "`title` takes text, not a list", "write `key: some words`"),
        ("title: {a: b}", "N145", "{a: b}", "`title` takes text, not a mapping", "write `key: some words`"),
        ("title: a\nsteps: b", "N145", "b", "`steps` takes a list, not text", "write `key: [one, two]`"),
        ("title: a\nvessels: b", "N145", "b", "`vessels` takes a mapping, not text", "write `key:` and set the fields in on the lines below"),
        ("title: a\ntime: {b: c}", "N145", "{b: c}", "`time` takes text or a list, not a mapping", "write `key: some words` or `key: [one, two]`"),
        ("title: a\nreaction: [b]", "N145", "[b]", "`reaction` takes text or a mapping, not a list", "write `key: some words`, or set fields in on the lines below"),
        ("- a", "N145", "- a", "a thing takes a mapping, not a list", "write `key:` and set the fields in on the lines below"),
    ],
)  # fmt: skip
def test_faulty_field_is_found_at_its_place(
    text: str, code: str, marked: str, message: str, help_: str
) -> None:
    (found,) = read(text)[1]

    assert (found.code.number, found.span.text) == (code, marked)
    assert found.message == message
    assert found.help == help_


def test_field_of_another_kind_is_not_in_the_record_but_its_key_is() -> None:
    record, _ = read("title: [a]\ntime: b")

    assert record is not None
    assert set(record.values) == {"time"}
    assert set(record.keys) == {"title", "time"}


def test_empty_field_fits_every_kind_and_counts_as_absent() -> None:
    record, findings = read("title: a\nsteps:\nvessels:\ntime:")

    assert findings == ()
    assert record is not None
    assert (record.items("steps"), record.mapping("vessels"), record.text("time")) == (
        (),
        None,
        None,
    )


def test_text_counts_as_a_list_of_one() -> None:
    record, _ = read("title: a\ntime: 5 min")

    assert record is not None
    assert [item.span.text for item in record.items("time")] == ["5 min"]


def test_quoted_nothing_is_not_an_empty_field() -> None:
    _, findings = read("title: a\nsteps: ''")

    assert [f.code.number for f in findings] == ["N145"]


def test_misspelt_field_is_not_missing_too() -> None:
    _, findings = read("tittle: a")

    assert [(f.code.number, f.help) for f in findings] == [("N143", "did you mean `title`?")]


def test_several_faults_are_found_in_the_order_written_and_what_is_missing_last() -> None:
    _, findings = read("zzz: a\nsteps: b\nvessels: c")

    assert [f.code.number for f in findings] == ["N143", "N145", "N145", "N144"]
    assert [f.span.text for f in findings] == ["zzz", "b", "c", "zzz"]
