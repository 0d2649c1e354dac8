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


# ------------------------------------------------------------------ slips seen at the bench

SWIRL = (
    "[Swirl the open funnel until the bubbling stops]{swirl funnel, open, for 2 min}, [then stopper,"
    " shake gently and vent after every turn]{shake funnel, stoppered, for 1 min; vent funnel}"
)


def test_solvent_that_mixes_with_water_gives_no_layer() -> None:
    finding = _one_finding(_parting_with("ether:  tert-butyl methyl ether", "ether:  acetone"))

    assert finding.code.name == "layer-absent"
    assert "acetone and water mix" in finding.message


def test_small_funnel_is_too_full_only_where_gas_comes_off() -> None:
    slip = _parting_with("funnel: separatory funnel 125 mL", "funnel: separatory funnel 60 mL")
    finding = _one_finding(slip)

    assert finding.code.name == "vessel-too-full"
    assert _line_of(finding).startswith("6. Add {15 mL base -> funnel}")
    assert "45.0 mL of 60 mL" in finding.message


def test_shaking_before_the_gas_is_out_closes_it_in() -> None:
    finding = _one_finding(
        _parting_with(
            SWIRL,
            "[Shake]{shake funnel, stoppered, for 1 min}, then {swirl funnel, open, for 2 min}",
        )
    )

    assert finding.code.name == "gas-in-closed-vessel"
    assert "about 31 mL of gas" in finding.message


def test_upper_layer_is_the_wrong_one() -> None:
    finding = _one_finding(
        _parting_with("4. Draw {funnel.aqueous -> A}", "4. Draw {funnel.upper -> A}")
    )

    assert finding.code.name == "other-layer-drawn"
    assert "aqueous one, the lower" in finding.message
    assert "`{funnel.aqueous -> A}`" in (finding.help or "")


def test_basic_layer_in_the_acid_flask_is_found_where_it_is_poured() -> None:
    slip = _parting_with(
        "draw {funnel.aqueous -> B} into {B}", "draw {funnel.aqueous -> A} into {A}"
    )
    finding = _one_finding(slip)

    assert finding.code.name == "opposites-poured-together"
    assert _line_of(finding).startswith("7.")
    assert any("`B` is empty here" in related.message for related in finding.related)


def test_hydroxide_takes_the_phenol_along() -> None:
    text = _parting_with("5.0 % w/v sodium hydrogencarbonate", "5.0 % w/v sodium hydroxide")
    finding = _one_finding(
        text.replace("9-fluorenone: 1 mol}", "9-fluorenone: 1 mol, phenol: 1 mol}")
    )

    assert finding.code.name == "second-goes-along"
    assert "phenol" in finding.message
    assert "hydrogencarbonate" in (finding.help or "")


def test_ph_that_misses_its_own_expectation_is_the_only_finding() -> None:
    finding = _one_finding(_parting_with("adjust A to pH 10 with", "adjust A to pH 7 with"))

    assert finding.code.name == "expectation-missed"
    assert "7.00" in finding.message


def test_weak_acid_is_told_with_the_strength_that_would_do() -> None:
    finding = _one_finding(
        _parting_with("acid:   3.0 M hydrochloric", "acid:   0.5 M hydrochloric")
    )

    assert finding.code.name == "reagent-too-weak"
    assert _line_of(finding).startswith("3. Add {15 mL acid")
    assert "75.4 % of the benzocaine in 2 portions" in finding.message
    assert "M would move 9" in finding.message


def test_alkali_without_ice_gives_out_heat() -> None:
    slip = _parting_with("[Stand the flask in ice]{cool A to 5 °C with ice}. ", "")
    finding = _one_finding(slip)

    assert finding.code.name == "heat-without-cooling"
    assert "25 K" in finding.message
