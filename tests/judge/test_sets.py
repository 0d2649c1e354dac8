"""Checks of a whole set: codes, links, what comes before, the schedule."""

from __future__ import annotations

import pytest

from builders import analysis, places

PLAIN = "---\ntitle: {title}\ncode: {code}\n{more}---\n\n{body}\n"


def page(code: str, body: str = "1. Look.", more: str = "") -> str:
    return PLAIN.format(title=f"About {code}", code=code, more=more, body=body)


def found(files: dict[str, str]) -> list[tuple[str, str]]:
    return [tuple(place) for place in places(analysis(files).findings)]


def test_a_sound_set_is_silent() -> None:
    files = {
        "procedures/a.md": page(
            "A-1", "## Part\n\n1. See [B](b.md#step-1) and [home](../pages/w.md)."
        ),
        "procedures/b.md": page("B-1", more="after: [A-1]\n"),
        "pages/w.md": "# Welcome\n\nSee [A](../procedures/a.md#part).\n",
        "schedule.yml": "- {week: 2, procedure: A-1}\n",
    }

    assert found(files) == []


def test_a_code_used_twice_is_found_at_the_second() -> None:
    files = {"procedures/a.md": page("A-1"), "procedures/b.md": page("a-1")}
    findings = analysis(files).findings

    assert [tuple(place) for place in places(findings)] == [("N191", "a-1")]
    assert findings[0].related[0].span.source.name == "procedures/a.md"


@pytest.mark.parametrize(
    ("more", "marked"),
    [
        ("after: [Z-9]\n", "Z-9"),
        ("after: [A-1]\n", "A-1"),
        ("materials: {x: {from: Z-9}}\nvessels: {vial: beaker 50 mL}\n", "{from: Z-9}"),
    ],
)
def test_a_procedure_that_is_not_there_is_found(more: str, marked: str) -> None:
    body = "1. Put {all x -> vial} into {vial}." if "from" in more else "1. Look."

    seen = found({"procedures/a.md": page("A-1", body, more)})

    assert [place for place in seen if place[0] != "N190"] == [("N197", marked)]


def test_the_schedule_is_held_to_the_procedures() -> None:
    files = {
        "procedures/a.md": page("OC-11"),
        "schedule.yml": "- {week: 2, procedure: [OC-11, OC-12]}\n",
    }
    (finding,) = analysis(files).findings

    assert (finding.code.number, finding.span.text) == ("N197", "OC-12")
    assert finding.help == "did you mean `OC-11`?"


@pytest.mark.parametrize(
    "target", ["c.md", "b.md#nowhere", "b.md#step-2", "../../x.md", "nothing.png"]
)
def test_a_link_that_leads_nowhere_is_found(target: str) -> None:
    files = {
        "procedures/a.md": page("A-1", f"1. See [this]({target})."),
        "procedures/b.md": page("B-1"),
    }

    assert [code for code, _ in found(files)] == ["N196"]


def test_a_near_path_is_offered_from_the_file_that_links() -> None:
    files = {"procedures/oc-04.md": page("A-1"), "pages/w.md": "[x](oc-04.md)\n"}
    (finding,) = analysis(files).findings

    assert finding.help == "did you mean `../procedures/oc-04.md`?"


@pytest.mark.parametrize("target", ["https://example.org/x", "mailto:a@example.org", "#part"])
def test_links_out_and_within_are_left_alone(target: str) -> None:
    assert found({"procedures/a.md": page("A-1", f"## Part\n\n1. See [this]({target}).")}) == []
