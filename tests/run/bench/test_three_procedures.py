"""The golden procedures on the bench, against figures worked out independently.

OC-04: ideal, 25 °C, pKa 2.51 and 4.20, log P 1.86, 1.88 and 3.58 as stand-in for the ether, carbon
dioxide leaving above 33.4 mmol/L; worked out with another solver.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from bench_runner import asked_of, golden_ran, outcomes, share
from builders import GOLDEN, surroundings
from watchglass.base.spans import Source
from watchglass.run.bench.ledger import Added
from watchglass.run.bench.mixing import Mixed
from watchglass.shell.pipeline import analyse_procedure

if TYPE_CHECKING:
    from watchglass.run.bench.asked import Asked


def oc_04(acid: str) -> Asked:
    text = (GOLDEN / "oc-04.md").read_text(encoding="utf-8")
    text = text.replace("acid:   3.0 M hydrochloric acid", f"acid:   {acid} hydrochloric acid")
    source = Source.of("procedures/oc-04.md", text)
    return asked_of(analyse_procedure("procedures/oc-04.md", source, surroundings()))


Figures = tuple[float, ...]
STRONG, WEAK = oc_04("3.0 M"), oc_04("0.5 M")
BOTH = pytest.mark.parametrize(
    ("asked", "figures"),
    [
        (STRONG, (-0.461, -0.475, 0.9825, 0.01304, 0.9855, 15.0)),
        (WEAK, (0.360, 0.331, 0.754, 0.013, 0.985, 2.5)),
    ],
    ids=["3.0 M", "0.5 M"],
)


def mixed_in(asked: Asked, vessel: str) -> list[Mixed]:
    return [
        result.outcome
        for entry in asked.ledger.entries
        for result in entry.results
        if result.vessel == vessel and isinstance(result.outcome, Mixed)
    ]


@BOTH
def test_acid_layers_have_their_ph(asked: Asked, figures: Figures) -> None:
    first, second = mixed_in(asked, "funnel")[:2]

    assert first.ph == pytest.approx(figures[0], abs=0.002)
    assert second.ph == pytest.approx(figures[1], abs=0.002)


@BOTH
def test_base_moves_into_the_acid_as_far_as_its_strength_allows(
    asked: Asked, figures: Figures
) -> None:
    assert share(asked, "benzocaine", "A", "base-out") == pytest.approx(figures[2], abs=0.001)


@BOTH
def test_acid_hardly_goes_along(asked: Asked, figures: Figures) -> None:
    assert share(asked, "benzoic-acid", "A", "base-out") == pytest.approx(figures[3], abs=0.001)


@BOTH
def test_mild_base_takes_the_acid(asked: Asked, figures: Figures) -> None:
    assert share(asked, "benzoic-acid", "B", "acid-out") == pytest.approx(figures[4], abs=0.001)


@BOTH
def test_alkali_to_ph_10_is_as_much_as_the_acid_asks_for(asked: Asked, figures: Figures) -> None:
    added = next(a for a in outcomes(asked, Added) if isinstance(a, Added))

    assert added.volume == pytest.approx(figures[5] * 1e-6, rel=0.02)


def test_one_portion_of_strong_acid_moves_seven_eighths() -> None:
    bench = next(
        e.bench for e in STRONG.ledger.entries if e.happening.step == 4 and e.happening.turn == 1
    )

    assert STRONG.share("benzocaine", "A", bench).value == pytest.approx(0.866, abs=0.001)


def test_carbon_dioxide_leaves_in_the_first_wash_only() -> None:
    gas = [
        m.gas.get("carbon-dioxide", 0.0) for m in mixed_in(STRONG, "funnel") if m.ph and m.ph > 7
    ]

    assert gas[0] == pytest.approx(1.28e-3, rel=0.01)
    assert sum(gas[1:]) == pytest.approx(0.0, abs=1e-6)


def test_base_layers_have_their_ph() -> None:
    phs = [m.ph for m in mixed_in(STRONG, "funnel") if m.ph is not None and m.ph > 7]

    assert phs[0] == pytest.approx(7.50, abs=0.01)
    assert phs[-1] == pytest.approx(8.05, abs=0.01)


def test_neutral_compound_is_left_in_the_flask() -> None:
    assert share(STRONG, "9-fluorenone", "tared") > 0.95


def test_titre_of_phthalate_is_its_amount_over_the_strength() -> None:
    asked = golden_ran("gc-02")
    answer = asked.titre("end")

    assert answer.value == pytest.approx(0.65 / 204.22 / 0.10 * 1e-3, rel=0.002)


def test_ester_comes_over_less_what_stays_in_the_still() -> None:
    assert 0.70 <= share(golden_ran("oc-09"), "isopentyl-acetate", "receiver") <= 0.80
