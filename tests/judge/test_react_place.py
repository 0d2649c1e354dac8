"""Reactions that run in a vessel where a reactant never comes."""

from __future__ import annotations

import pytest

from builders import faults, only, places, step

FRONT = """\
materials:
  alcohol: 3-methylbutan-1-ol
  acid: acetic acid, glacial
  salt: sodium acetate
  strong: 6.0 M hydrochloric acid
  leaves: {composition: unknown, is: tea leaves}
  copper: copper(II) sulfate pentahydrate
  metal: zinc
vessels:
  flask: round-bottom flask 50 mL
  A: beaker 50 mL
  funnel: separatory funnel 125 mL
  tube: {1-2: boiling tube 50 mL}
reactions:
  ester: 3-methylbutan-1-ol + CH3COOH -> isopentyl-acetate + H2O
  redox: CuSO4 + Zn -> Cu + ZnSO4
  freeing: sodium-acetate + HCl -> CH3COOH + NaCl
"""


def told(*sentences: str) -> list[tuple[str, str]]:
    found = places(faults(step(*sentences, front=FRONT)))
    return [tuple(place) for place in found]


@pytest.mark.parametrize(
    "sentences",
    [
        ("{5.0 mL alcohol -> flask} {7.0 mL acid -> flask} {react ester in flask}",),
        ("{5.0 mL alcohol + 7.0 mL acid -> flask} {react ester in flask}",),
        ("{7.0 mL acid -> A} {5.0 mL alcohol -> flask} {A -> flask} {react ester in flask}",),
        ("{7.0 mL acid -> A} {5.0 mL alcohol -> flask} {5 mL from A -> flask} {react ester in flask}",),
        ("{7.0 mL acid -> A} {5.0 mL alcohol -> flask} {decant A into flask} {react ester in flask}",),
        ("{7.0 mL acid -> A} {5.0 mL alcohol -> flask}", "{rinse A with 5 mL acid into flask} {react ester in flask}"),
        ("{5.0 mL alcohol -> flask} {2 g salt -> flask} {5 mL strong -> flask} {react ester in flask}",),
        ("{5.0 mL alcohol -> flask} {2 g leaves -> flask} {react ester in flask}",),
        ("{1.0 g copper -> A} {0.5 g metal -> A} {react redox in A}",),
        ("{5.0 mL alcohol -> tube-1} {7.0 mL acid -> tube-1} {react ester in tube-1}", "{again 1 with tube-2 as tube-1}"),
        ("{react ester in flask}",),
    ],
)  # fmt: skip
def test_reactant_that_may_have_come_passes_in_silence(sentences: tuple[str, ...]) -> None:
    assert told(*sentences) == []


@pytest.mark.parametrize(
    ("sentence", "missing"),
    [
        ("{5.0 mL alcohol -> flask} {7.0 mL acid -> A} {react ester in flask}", "CH3COOH"),
        ("{5.0 mL alcohol -> flask} {7.0 mL acid -> A} {react ester in A}", "3-methylbutan-1-ol"),
        ("{5.0 mL alcohol -> flask} {react ester in flask} {7.0 mL acid -> flask}", "CH3COOH"),
        ("{1.0 g copper -> A} {react redox in A} {0.5 g metal -> flask}", "Zn"),
    ],
)
def test_reactant_that_never_comes_is_found_at_the_act(sentence: str, missing: str) -> None:
    finding = only(step(sentence, front=FRONT))

    assert finding.code.number == "S133"
    assert finding.span.text.startswith("react ")
    assert f"`{missing}` never comes into it" in finding.message
    assert finding.related[0].span.text == missing


def test_charge_into_another_vessel_is_shown() -> None:
    finding = only(
        step("{5.0 mL alcohol -> flask} {7.0 mL acid -> A} {react ester in flask}", front=FRONT)
    )

    assert (finding.related[-1].span.text, finding.related[-1].message) == (
        "7.0 mL acid",
        "it goes into `A` here",
    )


def test_repeated_act_is_one_finding() -> None:
    found = told("{5.0 mL alcohol -> flask} {7.0 mL acid -> A} {react ester in flask}", "{again 1}")

    assert found == [("S133", "react ester in flask")]
