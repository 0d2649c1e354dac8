"""The one-line form and JSON, which other programs read."""

from __future__ import annotations

import json
from typing import TYPE_CHECKING

from shell.findings_builder import NOT_RUN, UNUSED, finding
from watchglass.base.findings import Edit, Finding
from watchglass.base.spans import Source
from watchglass.shell.rendering import json_, line
from watchglass.shell.rendering.style import Style

if TYPE_CHECKING:
    from collections.abc import Callable

STYLE = Style()

SEVERAL = (
    finding("⟦water⟧: water\n", code=UNUSED, message="`water` is never used", label=None),
    finding(
        "\t水 e\u0301 ⟪𝒳⟫\n⟦{x⟧\n:::",
        label="opens",
        related=("beside",),
        help="close it",
        fix="{x}",
    ),
    finding("⟦⟧", code=NOT_RUN, message="a\nb\tc \x1b[2J\x7f\x9b\u202e", label=None, name="z.md"),
    finding("⟦a\nb⟧\nc", help="first\nsecond", name="pages/a b.md"),
)


def test_line_form_is_as_it_was_read(golden: Callable[[str, str], None]) -> None:
    golden("findings/several.line.txt", line.render(SEVERAL, style=STYLE))


def test_json_is_as_it_was_read(golden: Callable[[str, str], None]) -> None:
    golden("findings/several.json", json_.render(SEVERAL, style=STYLE))


def test_line_form_has_code_name_and_help() -> None:
    text = line.render([finding("a\n b ⟦c⟧\n", help="mend it")], style=STYLE)

    assert text == (
        "procedures/oc-04.md:2:4: error[B120 funnel-overfilled]: "
        "the funnel would hold 150 mL; its size is 125 mL (help: mend it)\n"
    )


def test_line_form_gives_every_finding_one_line() -> None:
    assert line.render(SEVERAL, style=STYLE).count("\n") == len(SEVERAL)


def test_line_form_without_findings_is_empty() -> None:
    assert line.render([], style=STYLE) == ""


def test_json_without_findings_is_still_an_object() -> None:
    value = json.loads(json_.render([], style=STYLE))

    assert value["version"] == 1
    assert value["counts"] == {"errors": 0, "warnings": 0, "notes": 0, "files": 0}
    assert value["findings"] == []


def test_json_is_printable_ascii() -> None:
    text = json_.render(SEVERAL, style=STYLE)

    assert text.replace("\n", "").isascii()
    assert text.replace("\n", "").isprintable()


def test_json_gives_the_author_s_characters_back() -> None:
    messages = [
        found["message"] for found in json.loads(json_.render(SEVERAL, style=STYLE))["findings"]
    ]

    assert "a\nb\tc \x1b[2J\x7f\x9b\u202e" in messages


def test_json_offsets_count_code_points_without_mark_and_carriage_returns() -> None:
    source = Source.of("a.md", "\ufeffx\r\n𝒳y\r\n")
    found = Finding(
        code=UNUSED, span=source.span(3, 4), message="m", fix=Edit(source.span(3, 3), "z")
    )

    value = json.loads(json_.render([found], style=STYLE))["findings"][0]

    assert value["start"] == {"line": 2, "column": 2, "offset": 3}
    assert value["end"] == {"line": 2, "column": 3, "offset": 4}
    assert value["fix"] == {
        "path": "a.md",
        "start": {"line": 2, "column": 2, "offset": 3},
        "end": {"line": 2, "column": 2, "offset": 3},
        "text": "z",
    }


def test_json_keys_stand_in_their_documented_order() -> None:
    value = json.loads(json_.render(SEVERAL, style=STYLE))

    assert list(value) == ["version", "tool", "counts", "findings"]
    assert list(value["findings"][0]) == [
        "code", "name", "severity", "message", "label", "path", "start", "end", "related", "help",
        "fix",
    ]  # fmt: skip
