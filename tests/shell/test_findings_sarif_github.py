"""Findings for other programs: the SARIF standard, and workflow commands of a forge."""

from __future__ import annotations

import json
import re
from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING, Any

import jsonschema
import pytest
from markdown_it import MarkdownIt

from shell.findings_builder import NOT_RUN, UNUSED, finding
from watchglass import __version__
from watchglass.base import codes
from watchglass.shell.explain import page_text
from watchglass.shell.rendering import github, sarif
from watchglass.shell.rendering.style import Style

if TYPE_CHECKING:
    from watchglass.base.findings import Code, Finding

STYLE = Style()
SCHEMA = Path(__file__).parents[1] / "outside" / "data" / "sarif-schema-2.1.0.json"
LEAK = "4. Add ⟦{100 mL ether -> funnel}⟧ after ⟪{50 mL acid -> funnel}⟫.\n"


@cache
def validator() -> jsonschema.Draft7Validator:
    return jsonschema.Draft7Validator(json.loads(SCHEMA.read_text("utf-8")))


def log(*findings: Finding, accepted: tuple[tuple[Finding, str], ...] = ()) -> dict[str, Any]:
    made = json.loads(sarif.render(findings, style=STYLE, accepted=accepted))
    validator().validate(made)
    run: dict[str, Any] = made["runs"][0]
    return run


def result(*findings: Finding) -> dict[str, Any]:
    (only,) = log(*findings)["results"]
    found: dict[str, Any] = only
    return found


def test_log_without_findings_is_valid_and_empty() -> None:
    assert log()["results"] == []


def test_result_names_rule_level_and_place() -> None:
    found = result(finding(LEAK, related=("50 mL was already in it",)))
    region = found["locations"][0]["physicalLocation"]["region"]

    assert (found["ruleId"], found["level"]) == ("B120", "error")
    assert region == {"startLine": 1, "startColumn": 8, "endLine": 1, "endColumn": 32}
    assert found["relatedLocations"][0]["message"]["text"] == "50 mL was already in it"


def test_columns_count_code_points() -> None:
    region = result(finding("\t水 𝒳 ⟦a⟧"))["locations"][0]["physicalLocation"]["region"]

    assert log()["columnKind"] == "unicodeCodePoints"
    assert (region["startColumn"], region["endColumn"]) == (6, 7)


def test_tool_is_named_with_its_version() -> None:
    driver = log()["tool"]["driver"]

    assert (driver["name"], driver["version"]) == ("watchglass", __version__)


def test_braces_are_doubled_since_single_ones_are_placeholders() -> None:
    """SARIF 2.1.0, 3.11.5: within message strings `{` and `}` are written `{{` and `}}`."""
    found = finding(LEAK, message="`{0}` is no mark", related=("see {x}",))

    assert result(found)["message"]["text"] == "`{{0}}` is no mark"
    assert result(found)["relatedLocations"][0]["message"]["text"] == "see {{x}}"


def test_pages_double_their_braces_too() -> None:
    (rule,) = log(finding(LEAK))["tool"]["driver"]["rules"]
    texts = [rule["help"]["text"], rule["help"]["markdown"], rule["fullDescription"]["text"]]

    assert "{{" in rule["help"]["markdown"]
    assert [re.findall(r"(?<!\{)\{(?:\{\{)*(?!\{)", text) for text in texts] == [[], [], []]


@pytest.mark.parametrize("code", codes.ALL, ids=lambda code: code.number)
def test_every_kind_of_finding_makes_a_valid_rule(code: Code) -> None:
    (rule,) = log(finding(LEAK, code=code))["tool"]["driver"]["rules"]

    assert (rule["id"], rule["name"]) == (code.number, code.name)


@pytest.mark.parametrize("code", codes.ALL, ids=lambda code: code.number)
def test_pages_hold_no_html(code: Code) -> None:
    """SARIF 2.1.0, 3.11.4.2: producers shall not emit messages that contain HTML."""
    tokens = MarkdownIt("commonmark").parse(page_text(code) or "")
    inside = [child.type for token in tokens for child in token.children or ()]

    assert not {"html_block", "html_inline"} & {*inside, *(token.type for token in tokens)}


def test_author_s_text_makes_no_link() -> None:
    """SARIF 2.1.0, 3.11.6: `[words](1)` in a message would lead to a related location."""
    text = result(finding(LEAK, message="`[acid](1)` is no mark"))["message"]["text"]

    assert text == r"`[acid\](1)` is no mark"


def test_fix_is_written_as_it_is() -> None:
    change = result(finding(LEAK, fix="{5 mL}"))["fixes"][0]["artifactChanges"][0]

    assert change["replacements"][0]["insertedContent"]["text"] == "{5 mL}"
    assert change["replacements"][0]["deletedRegion"]["startColumn"] == 8


def test_help_stands_with_the_message() -> None:
    text = result(finding(LEAK, help="take a larger funnel"))["message"]["text"]

    assert text.endswith("(take a larger funnel)")


def test_rule_tells_what_its_page_tells() -> None:
    (rule,) = log(finding(LEAK))["tool"]["driver"]["rules"]

    assert rule["id"] == "B120"
    assert "More is poured into a vessel than its nominal size" in rule["fullDescription"]["text"]


@pytest.mark.parametrize(
    ("code", "level"), [(UNUSED, "warning"), (NOT_RUN, "note")], ids=["warning", "note"]
)
def test_severity_becomes_a_level(code: Any, level: str) -> None:
    assert result(finding(LEAK, code=code))["level"] == level


def test_results_point_to_their_rule() -> None:
    run = log(finding(LEAK), finding("⟦x⟧", code=UNUSED), finding("⟦y⟧"))

    for found in run["results"]:
        assert run["tool"]["driver"]["rules"][found["ruleIndex"]]["id"] == found["ruleId"]


def test_fix_is_a_replacement() -> None:
    (change,) = result(finding(LEAK, fix="{50 mL ether -> funnel}"))["fixes"][0]["artifactChanges"]

    assert change["replacements"][0]["insertedContent"]["text"] == "{50 mL ether -> funnel}"


def test_accepted_finding_is_suppressed_with_its_reason() -> None:
    (found,) = log(accepted=((finding(LEAK), "tried last term"),))["results"]

    assert found["suppressions"] == [{"kind": "inSource", "justification": "tried last term"}]


def test_path_is_an_address() -> None:
    uri = result(finding(LEAK, name="mein Satz/oc-04 ä.md"))["locations"][0]["physicalLocation"]

    assert uri["artifactLocation"]["uri"] == "mein%20Satz/oc-04%20%C3%A4.md"


def test_path_from_the_root_is_a_file_address() -> None:
    place = result(finding(LEAK, name="/srv/set a/oc-04.md"))["locations"][0]["physicalLocation"]

    assert place["artifactLocation"] == {"uri": "file:///srv/set%20a/oc-04.md"}


def test_path_on_a_drive_is_a_file_address() -> None:
    place = result(finding(LEAK, name="C:/set/oc-04.md"))["locations"][0]["physicalLocation"]

    assert place["artifactLocation"] == {"uri": "file:///C:/set/oc-04.md"}


def test_file_name_of_another_encoding_keeps_its_bytes() -> None:
    place = result(finding(LEAK, name="s\udce4tze/a.md"))["locations"][0]["physicalLocation"]

    assert place["artifactLocation"]["uri"] == "s%E4tze/a.md"


def test_same_text_twice_gives_two_fingerprints() -> None:
    first, second = log(finding("⟦bas⟧ and bas"), finding("bas and ⟦bas⟧"))["results"]

    assert first["partialFingerprints"] != second["partialFingerprints"]


def test_fingerprint_of_the_second_stays_when_lines_move() -> None:
    def second(before: str) -> Any:
        found = finding(f"{before}⟦bas⟧ and bas"), finding(f"{before}bas and ⟦bas⟧")
        return log(*found)["results"][1]["partialFingerprints"]

    assert second("") == second("\n\n")


def test_fingerprint_stays_when_lines_move() -> None:
    moved = result(finding("\n\n" + LEAK))["partialFingerprints"]

    assert result(finding(LEAK))["partialFingerprints"] == moved


def test_fingerprint_differs_for_other_text() -> None:
    other = result(finding(LEAK.replace("100", "90")))["partialFingerprints"]

    assert result(finding(LEAK))["partialFingerprints"] != other


def test_workflow_command_carries_place_title_and_message() -> None:
    first = github.render([finding(LEAK, help=None)], style=STYLE).splitlines()[0]

    assert first == (
        "::error file=procedures/oc-04.md,line=1,endLine=1,col=8,endColumn=32,"
        "title=B120 funnel-overfilled::the funnel would hold 150 mL; its size is 125 mL"
    )


def test_errors_come_first_and_the_tally_last() -> None:
    lines = github.render(
        [finding("⟦a⟧", code=NOT_RUN), finding("⟦b⟧", code=UNUSED), finding("⟦c⟧")], style=STYLE
    ).splitlines()

    assert [line.split(" ")[0] for line in lines[:3]] == ["::error", "::warning", "::notice"]
    assert lines[3] == "1 error, 1 warning, 1 note in 1 file"


@pytest.mark.parametrize(
    ("message", "written"),
    [("50 % of it", "50 %25 of it"), ("two\nlines", "two%0Alines"), ("::error::x", "::error::x")],
)
def test_message_cannot_end_its_line(message: str, written: str) -> None:
    line = github.render([finding(LEAK, message=message, help=None)], style=STYLE).splitlines()[0]

    assert line.endswith("::" + written)
    assert line.startswith("::error file=")


def test_path_cannot_end_its_property() -> None:
    line = github.render([finding(LEAK, name="a,b:c.md")], style=STYLE)

    assert "file=a%2Cb%3Ac.md,line=" in line


def test_columns_are_left_out_over_several_lines() -> None:
    line = github.render([finding("⟦a\nb⟧")], style=STYLE)

    assert line.startswith("::error file=procedures/oc-04.md,line=1,endLine=2,title=")


def test_author_s_escape_sequences_do_not_reach_the_log() -> None:
    line = github.render([finding(LEAK, message="\x1b[2J\x9b\u202e", name="\x1b.md")], style=STYLE)

    assert "\x1b" not in line
    assert "<U+001B>[2J<U+009B><U+202E>" in line


def test_carriage_return_cannot_end_a_line() -> None:
    line = github.render([finding(LEAK, message="a\rb\r\nc", help=None)], style=STYLE)

    assert "::a%0Db%0D%0Ac\n" in line


def test_nothing_found_prints_nothing_for_the_forge() -> None:
    assert github.render([], style=STYLE) == ""
