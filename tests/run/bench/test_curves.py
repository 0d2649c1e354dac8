"""Curves against closed forms: Nernst's distribution, portions, and a titration that can be done by hand."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from bench_runner import asked_of, knowledge, ran
from builders import golden, judged, steps
from run.bench.shelf import near
from watchglass.run.bench.sweeps import (
    MOST_PORTIONS,
    Washing,
    ph_by_volume,
    share_by_ph,
    share_by_portions,
    washings,
)

if TYPE_CHECKING:
    from watchglass.run.bench.asked import Asked
    from watchglass.run.bench.sweeps import Curve

KNOWN = knowledge()
FRONT = """\
materials:
  neutral: 0.10 M acetophenone in ether
  toluene: {contains: {diethyl-ether: 1 mL}, provided: 100 mL}
  ether: diethyl ether
  acid: benzoic acid
  amine: benzocaine
  caffeine: caffeine
  chloroform: dichloromethane
  water: water
  base: 5.0 % w/v sodium hydrogencarbonate
  alkali: 0.100 M sodium hydroxide
  weak: 0.100 M acetic acid
vessels:
  funnel: separatory funnel 250 mL
  A: beaker 250 mL
  burette: burette 50 mL
"""
WASH = "{shake funnel, stoppered; vent funnel; settle funnel}"


def bench(*sentences: str) -> Asked:
    return ran(*sentences, front=FRONT)


def only_washing(asked: Asked) -> Washing:
    (washing,) = washings(asked.ledger)
    return washing


def curve(curves: tuple[Curve, ...], name: str) -> Curve:
    return next(c for c in curves if c.name == name)


# ---------------------------------------------------------------- which washings there are


def test_portions_of_one_material_are_one_washing() -> None:
    asked = bench(
        "{0.50 g acid -> funnel} {30 mL ether -> funnel} {swirl funnel, open}",
        f"{{15 mL base -> funnel}} {WASH} {{funnel.aqueous -> A}}",
        "{again 2, 2 more times}",
        f"{{20 mL water -> funnel}} {WASH} {{funnel.aqueous -> A}}",
    )

    first, second = washings(asked.ledger)
    assert (first.material, first.part, first.step) == ("base", "aqueous", 2)
    assert first.volumes == [near(15e-6)] * 3
    assert (second.material, second.volumes) == ("water", [near(20e-6)])


def test_draw_from_one_liquid_is_no_washing() -> None:
    asked = bench("{0.10 g acid -> funnel} {30 mL ether -> funnel} {funnel.organic -> A}")

    assert washings(asked.ledger) == ()


# ---------------------------------------------------------------- share against pH


@pytest.mark.parametrize(("part", "swapped"), [("aqueous", False), ("organic", True)])
def test_share_against_ph_is_nernst_with_the_neutral_fraction(part: str, swapped: bool) -> None:
    # Benzoic acid, pKa 4.20, log P 1.88 (catalogue); 20 mL of ether, 40 mL of water.
    # D = P / (1 + 10^(pH - pKa)); share in the ether = D V(org) / (D V(org) + V(aq)).
    draw = "{funnel.aqueous -> A}" if part == "aqueous" else "{funnel.organic -> A}"
    asked = bench(
        "{0.10 g acid -> funnel} {20 mL ether -> funnel} {swirl funnel, open}",
        f"{{40 mL base -> funnel}} {WASH} {draw}",
    )
    found = share_by_ph(only_washing(asked), asked.ledger, KNOWN)
    assert found is not None
    assert found.part == part

    acid = curve(found.curves, "benzoic acid")
    volumes = asked.ledger.entries[-2].bench.vessel("funnel")
    for ph, share in zip(acid.xs, acid.ys, strict=True):
        d = 10**1.88 / (1 + 10 ** (ph - 4.20))
        organic = d * volumes.organic.volume / (d * volumes.organic.volume + volumes.aqueous.volume)
        assert share == pytest.approx(organic if swapped else 1 - organic, abs=1e-9)


def test_base_goes_the_other_way() -> None:
    asked = asked_of(golden("oc-04"))
    by_ph = [share_by_ph(w, asked.ledger, KNOWN) for w in washings(asked.ledger)]
    amines = [
        curve(found.curves, "benzocaine")
        for found in by_ph
        if found and any(c.name == "benzocaine" for c in found.curves)
    ]

    assert amines
    for amine in amines:
        assert amine.ys[0] > 0.5
        assert amine.ys[-1] < 0.1
        assert list(amine.ys) == sorted(amine.ys, reverse=True)


def test_neutral_compound_alone_has_no_curve() -> None:
    asked = bench(
        "{0.20 g 9-fluorenone -> funnel} {20 mL water -> funnel} {20 mL chloroform -> funnel}",
        f"{WASH} {{funnel.organic -> A}}",
    )

    assert share_by_ph(only_washing(asked), asked.ledger, KNOWN) is None


# ---------------------------------------------------------------- share against portions


def test_portions_follow_the_closed_form() -> None:
    # What stays in the water after n portions is (V / (V + D V(org) / n))^n; caffeine neither
    # ionises nor separates here, and dichloromethane takes next to no water.
    asked = bench(
        "{0.20 g caffeine -> funnel} {20 mL water -> funnel} {swirl funnel, open}",
        f"{{15 mL chloroform -> funnel}} {WASH} {{funnel.organic -> A}}",
        "{again 2, 2 more times}",
    )
    washing = only_washing(asked)
    found = share_by_portions(washing, judged(steps("{A}"), FRONT).procedure, KNOWN)
    assert found is not None
    assert (found.portions, found.volume) == (3, near(45e-6))

    caffeine = curve(found.curves, "caffeine")
    ratio, _ = KNOWN.ratio("caffeine", "dichloromethane")
    assert ratio is not None
    water = 20e-6
    assert caffeine.xs == (1.0, 2.0, 3.0, 4.0, 5.0)
    assert len(caffeine.xs) == MOST_PORTIONS
    for count, share in zip(caffeine.xs, caffeine.ys, strict=True):
        left = (water / (water + ratio * 45e-6 / count)) ** count
        assert share == pytest.approx(1 - left, rel=2e-2)
    assert list(caffeine.ys) == sorted(caffeine.ys)


def test_portions_give_what_the_ledger_gives_where_the_procedure_stands() -> None:
    asked = asked_of(golden("oc-04"))
    procedure = golden("oc-04").procedure
    washing = next(w for w in washings(asked.ledger) if w.material == "acid")
    found = share_by_portions(washing, procedure, KNOWN)
    assert found is not None

    # OC-04's expectation on benzocaine in A: 98.3 % by two portions of 3 M acid.
    benzocaine = curve(found.curves, "benzocaine")
    assert found.portions == 2
    assert benzocaine.ys[1] == pytest.approx(0.983, abs=0.001)
    assert benzocaine.ys[0] < benzocaine.ys[1] < benzocaine.ys[2]


def test_first_contact_of_both_liquids_has_no_curve_against_portions() -> None:
    asked = bench(
        "{0.20 g caffeine -> funnel} {15 mL chloroform -> funnel}",
        "{20 mL water -> funnel}",
        f"{WASH} {{funnel.organic -> A}}",
    )
    washing = only_washing(asked)

    assert share_by_portions(washing, judged(steps("{A}"), FRONT).procedure, KNOWN) is None


# ---------------------------------------------------------------- pH against volume


def test_weak_acid_stands_at_its_pka_half_way_and_at_the_hydrolysis_at_the_end() -> None:
    # Acetic acid 0.100 M, 25 mL, pKa 4.76, with sodium hydroxide 0.100 M.
    written = (
        "{25 mL weak -> A} {50 mL alkali -> burette}",
        "{titrate A with alkali from burette to phenolphthalein}",
    )
    asked = bench(*written)
    (found,) = ph_by_volume(asked.ledger, judged(steps(*written), FRONT).procedure, KNOWN)

    assert (found.verb, found.vessel, found.material, found.step) == ("titrate", "A", "alkali", 2)
    assert found.volume == pytest.approx(25.0e-6, rel=0.01)
    assert found.aim is not None
    points = dict(zip(found.curve.xs, found.curve.ys, strict=True))
    start, half, after = _at(points, 0.0), _at(points, 12.5e-6), _at(points, found.curve.xs[-1])
    assert start == pytest.approx(2.88, abs=0.02)  # (4.76 + 1) / 2
    assert half == pytest.approx(4.76, abs=0.05)
    assert after == pytest.approx(12.3, abs=0.1)
    assert found.curve.xs[-1] == near(1.5 * found.volume)
    assert list(found.curve.ys) == sorted(found.curve.ys)
    steepest = max(b - a for a, b in zip(found.curve.ys, found.curve.ys[1:], strict=False))
    assert steepest < 1.5, "points lie closer where the curve is steep"


def _at(points: dict[float, float], volume: float) -> float:
    return points[min(points, key=lambda x: abs(x - volume))]


def test_adjusting_has_its_aim_and_nothing_is_drawn_for_a_vessel_without_water() -> None:
    written = ("{0.10 g acid -> A} {50 mL water -> A}", "{adjust A to pH 9 with alkali}")
    asked = bench(*written)
    (found,) = ph_by_volume(asked.ledger, judged(steps(*written), FRONT).procedure, KNOWN)

    assert found.verb == "adjust"
    assert found.aim is not None
    assert found.aim.si == near(9.0)
    assert found.volume == pytest.approx(8.19e-6, rel=0.01)  # 0.100 g / 122.12 g/mol / 0.100 M
