"""Three sound procedures, and one slip in one of them at a time: each gives one finding.

The sound texts stand in `golden/procedures/`. Each slip is one an instructor makes at a desk; what
follows from it elsewhere in the text (a material no longer used, a step without contents) must not
be reported beside it.
"""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

import pytest

from cases.harness import above_note, check_files, told

if TYPE_CHECKING:
    from watchglass.base.findings import Finding

PROCEDURES = Path(__file__).parent / "golden" / "procedures"
PARTING = "procedures/oc-04.md"
PROTONATION = "benzocaine + HCl -> benzocainium-chloride"


def _sound(name: str) -> str:
    return (PROCEDURES / name).read_text(encoding="utf-8")


def _parting_with(old: str, new: str) -> str:
    """Give the parting of a base, an acid and a neutral compound with one slip in it."""
    text = _sound("oc-04.md")
    assert text.count(old) == 1
    return text.replace(old, new)


def _one_finding(text: str) -> Finding:
    findings = above_note(check_files({PARTING: text}))
    assert len(findings) == 1, told(findings)
    return findings[0]


def _line_of(finding: Finding) -> str:
    return finding.span.source.text.splitlines()[finding.span.position().line - 1].strip()


@pytest.mark.parametrize("name", ["oc-04.md", "gc-02.md", "oc-09.md"])
def test_sound_procedure_passes_in_silence(name: str) -> None:
    findings = above_note(check_files({f"procedures/{name}": _sound(name)}))

    assert findings == (), told(findings)


def test_three_sound_procedures_make_a_sound_set() -> None:
    names = ("oc-04.md", "gc-02.md", "oc-09.md")
    findings = above_note(check_files({f"procedures/{name}": _sound(name) for name in names}))

    assert findings == (), told(findings)


def test_volume_of_a_weighed_mixture_needs_a_density() -> None:
    finding = _one_finding(_parting_with("provided: 0.900 g", "provided: 0.900 mL"))

    assert finding.code.number == "S110"
    assert finding.span.text == "0.900 mL"
    assert "density" in finding.message


def test_per_cent_of_what_is_asked() -> None:
    slip = _parting_with("base:   5.0 % w/v sodium", "base:   5.0 % sodium")
    finding = _one_finding(slip)

    assert finding.code.number == "Q107"
    assert finding.span.text == "5.0 %"
    assert _line_of(finding) == "base:   5.0 % sodium hydrogencarbonate"
    assert "w/v" in (finding.help or "")


def test_normality_is_refused_with_the_amount_concentration_in_the_help() -> None:
    slip = _parting_with("\n  acid:   3.0 M hydrochloric", "\n  acid:   3.0 N hydrochloric")
    finding = _one_finding(slip)

    assert finding.code.number == "Q106"
    assert finding.span.text == "3.0 N"
    assert _line_of(finding) == "acid:   3.0 N hydrochloric acid"
    assert "`3.0 M`" in (finding.help or "")


def test_protonation_without_the_acid_lacks_hydrogen_and_chlorine() -> None:
    finding = _one_finding(_parting_with(PROTONATION, "benzocaine -> benzocainium-chloride"))

    assert finding.code.number == "S102"
    assert finding.span.text == "benzocaine -> benzocainium-chloride"
    assert "the left lacks 1 Cl, 1 H" in finding.message


def test_misspelt_material_is_met_with_the_nearest_name() -> None:
    finding = _one_finding(_parting_with("{15 mL acid by", "{15 mL acidd by"))

    assert finding.code.number == "N163"
    assert finding.span.text == "acidd"
    assert _line_of(finding).startswith("3. Add {15 mL acidd by cylinder -> funnel}.")
    assert "did you mean `acid`" in (finding.help or "")
