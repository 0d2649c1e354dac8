"""The laboratory's and the schedule's files: what is read, and each fault at its value."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from builders import surroundings
from watchglass.base.spans import Source
from watchglass.base.yaml import read_yaml
from watchglass.resolve.laboratory import BATHS, Laboratory, read_laboratory
from watchglass.resolve.schedule import Slot, read_schedule

if TYPE_CHECKING:
    from watchglass.base.findings import Finding


def laboratory(text: str) -> tuple[Laboratory, tuple[Finding, ...]]:
    node, found = read_yaml(Source.of("laboratory.yml", text))
    assert found == ()
    return read_laboratory(node, surroundings().catalogue.glassware)


def schedule(text: str) -> tuple[tuple[Slot, ...], tuple[Finding, ...]]:
    node, found = read_yaml(Source.of("schedule.yml", text))
    assert found == ()
    return read_schedule(node)


def test_facts_of_a_laboratory_are_read() -> None:
    read, findings = laboratory(
        "name: North laboratory\ninstitution: A college\nstations: 24\nspare: 10 %\n"
        "temperature: 21 °C\nglassware: {conical flask 100 mL: 60}\n"
        "measures: {drop: 0.04 mL, scoop: }\nbaths: {dry-ice: -78 °C}\n"
        "waste: {chromium: chromium salts}\nrules: [one, two]\n"
    )

    assert findings == ()
    assert (read.name, read.institution, read.stations) == ("North laboratory", "A college", 24)
    assert (read.spare, read.temperature) == (0.1, 294.15)
    assert [(v.written, v.size and v.size.text, n) for v, n in read.glassware] == [
        ("conical flask", "100 mL", 60)
    ]
    assert read.measures == {"drop": 4e-8, "drops": 4e-8, "scoop": None, "scoops": None}
    assert read.baths == (*BATHS, "dry-ice")
    assert read.streams[-1] == "chromium"
    assert read.rules == ("one", "two")


def test_what_is_not_said_has_its_ordinary_value() -> None:
    assert laboratory("name: A") == (Laboratory(name="A"), ())
    assert Laboratory().temperature == 298.15


def test_temperature_may_be_given_in_kelvin() -> None:
    assert laboratory("temperature: 294 K")[0].temperature == 294.0


@pytest.mark.parametrize(
    ("text", "code", "marked"),
    [
        ("stations: many", "Q101", "many"),
        ("stations: ²", "Q101", "²"),
        ("stations: -5", "Q101", "-5"),
        ("stations: 5.5", "Q101", "5.5"),
        ("stations: '" + "9" * 5000 + "'", "Q101", "'" + "9" * 5000 + "'"),
        ("spare: 10", "Q109", "10"),
        ("spare: 10 g", "Q109", "10 g"),
        ("spare: -5 %", "Q110", "-5 %"),
        ("temperature: 21", "Q109", "21"),
        ("temperature: 21 C", "Q108", "C"),
        ("glassware: {conical flak 100 mL: 60}", "K106", "conical flak"),
        ("glassware: {conical flask 100 mL: many}", "Q101", "many"),
        ("measures: {drop: 5 g}", "Q109", "5 g"),
        ("nam: A", "N143", "nam"),
        ("name: [A]", "N145", "[A]"),
        ("- a", "N145", "- a"),
    ],
)
def test_fault_of_a_laboratory_is_found_at_its_value(text: str, code: str, marked: str) -> None:
    _, (finding,) = laboratory(text)

    assert (finding.code.number, finding.span.text) == (code, marked)


def test_entry_of_the_schedule_is_read() -> None:
    slots, findings = schedule(
        "- week: 2\n  procedure: [A-1, A-2]\n  course: General\n  sections: [Mon, Tue]\n  stations: 24\n"
        "- week: 3\n  procedure: A-3\n  sections: Wed\n"
    )

    assert findings == ()
    assert [
        (s.week, s.course, [c for c, _ in s.procedures], s.sections, s.stations) for s in slots
    ] == [
        (2, "General", ["A-1", "A-2"], ("Mon", "Tue"), 24),
        (3, "", ["A-3"], ("Wed",), None),
    ]
    assert [span.text for _, span in slots[0].procedures] == ["A-1", "A-2"]


@pytest.mark.parametrize(
    ("text", "code", "marked", "kept"),
    [
        ("- week: 0\n  procedure: A", "Q101", "0", 0),
        ("- week: x\n  procedure: A", "Q101", "x", 0),
        ("- week: ²\n  procedure: A", "Q101", "²", 0),
        ("- week: 100000\n  procedure: A", "Q101", "100000", 0),
        ("- week: '" + "0" * 5000 + "1'\n  procedure: A", "Q101", "'" + "0" * 5000 + "1'", 0),
        ("- week: 1\n  procedure: A\n  stations: x", "Q101", "x", 1),
        ("- procedure: A", "N144", "procedure", 0),
        ("- week: 1", "N144", "week", 1),
        ("- week: 1\n  procedure: A\n  weeks: 2", "N143", "weeks", 1),
        ("- a", "N145", "a", 0),
        ("a: b", "N145", "a: b", 0),
    ],
)
def test_fault_of_the_schedule_is_found_at_its_value(
    text: str, code: str, marked: str, kept: int
) -> None:
    slots, (finding,) = schedule(text)

    assert (finding.code.number, finding.span.text) == (code, marked)
    assert len(slots) == kept


def test_no_schedule_is_no_fault() -> None:
    assert read_schedule(None) == ((), ())
