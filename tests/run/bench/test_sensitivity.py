"""What expectations hang on: inputs that are changed by hand give what the sensitivity says."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from bench_runner import knowledge
from builders import instructor, judged, steps, student
from watchglass.run.bench.sensitivity import Bench, sensitivities

if TYPE_CHECKING:
    from watchglass.run.bench.sensitivity import Effect, Sensitivity
    from watchglass.shell.stages import Judged

KNOWN = knowledge()
FRONT = """\
materials:
  amine: benzocaine
  ether: tert-butyl methyl ether
  acid: {strength} hydrochloric acid
vessels:
  funnel: separatory funnel 125 mL
  A: conical flask 100 mL
expect:
  - benzocaine in A >= {least} %
"""


def wash(*, strength: str, least: str) -> Judged:
    front = FRONT.format(strength=strength, least=least)
    written = steps(
        "{0.60 g amine -> funnel} {30 mL ether -> funnel} {swirl funnel, open}",
        "{10 mL acid -> funnel} {shake funnel, stoppered; vent funnel; settle funnel}",
        "{funnel.aqueous -> A}",
        "{again 2–3}",
    )
    return judged(written, front)


def looked_into(entry: Judged) -> tuple[Sensitivity, ...]:
    run = entry.run
    assert run is not None
    case = run.case
    bench = Bench(case.procedure, case.course, case.usage, run.known, run.laboratory, run.carried)
    return sensitivities(bench, run.ledger)


def effect(found: Sensitivity, kind: str, of: str) -> Effect:
    return next(e for e in found.effects if (e.kind, e.of) == (kind, of))


def reached(entry: Judged) -> float:
    (found,) = looked_into(entry)
    assert found.now.value is not None
    return found.now.value.si


def test_ends_are_what_the_procedure_gives_when_it_is_written_so() -> None:
    (found,) = looked_into(wash(strength="1.00 M", least="60"))
    strength = effect(found, "strength", "acid")

    assert strength.low.value is not None
    assert strength.high.value is not None
    assert strength.low.value.si == pytest.approx(reached(wash(strength="0.90 M", least="50")))
    assert strength.high.value.si == pytest.approx(reached(wash(strength="1.10 M", least="50")))
    assert strength.low.value.si < strength.high.value.si


def test_inputs_are_amounts_strengths_and_the_ratio_that_was_used() -> None:
    (found,) = looked_into(wash(strength="1.00 M", least="60"))

    assert {(e.kind, e.of) for e in found.effects} == {
        ("amount", "amine"),
        ("amount", "ether"),
        ("amount", "acid"),
        ("strength", "acid"),
        ("log P", "benzocaine"),
    }


def test_weak_acid_makes_an_expectation_hang_on_its_strength() -> None:
    entry = wash(strength="1.00 M", least="60")
    now = reached(entry)
    hanging = wash(strength="1.00 M", least=f"{100 * now - 0.5:.1f}")
    (found,) = looked_into(hanging)

    assert effect(found, "strength", "acid").flips
    assert effect(found, "amount", "acid").flips
    assert effect(found, "log P", "benzocaine").flips
    assert found.effects[0].flips, "what flips stands first"
    spans = [e.span for e in found.effects if e.flips]
    assert spans == sorted(spans, reverse=True)


def test_more_of_a_ratio_leaves_less_in_the_water() -> None:
    (found,) = looked_into(wash(strength="1.00 M", least="60"))
    ratio = effect(found, "log P", "benzocaine")

    assert ratio.low.value is not None
    assert ratio.high.value is not None
    assert ratio.low.value.si > ratio.high.value.si


def test_missed_expectation_is_a_finding_and_not_looked_into() -> None:
    entry = wash(strength="0.10 M", least="95")

    assert looked_into(entry) == ()
    assert any(f.code.number in ("X101", "X102", "X103", "X104") for f in entry.findings)


def test_amounts_count_in_expectations_that_ask_no_vessel() -> None:
    front = """\
materials:
  acid: benzoic acid
  base: 1.0 M sodium hydroxide
vessels:
  A: beaker 50 mL
expect:
  - moles(base) / moles(acid) in 0.95–1.15
"""
    # 1.00 g of benzoic acid is 8.19 mmol: 1.01 equivalents of base.
    entry = judged(steps("{1.00 g acid -> A} {8.3 mL base -> A} {stir A}"), front)
    (found,) = looked_into(entry)
    ends = {
        kind: effect(found, kind, of)
        for kind, of in (("amount", "acid"), ("amount", "base"), ("strength", "base"))
        if not (kind == "amount" and of == "acid")
    }

    for changed in ends.values():
        assert changed.low.value is not None
        assert changed.low.value.si == pytest.approx(0.9 * 1.0136, rel=1e-3)
        assert changed.low.holds is False
        assert changed.high.holds is True
    acid = effect(found, "amount", "acid")
    assert acid.low.value is not None
    assert acid.low.value.si == pytest.approx(1.0136 / 0.9, rel=1e-3)
    assert acid.high.holds is False


def test_table_says_what_it_hangs_on_or_that_it_is_robust() -> None:
    weak = instructor(wash(strength="1.00 M", least="60"), bench=True).sensitivity
    strong = instructor(wash(strength="6.00 M", least="40"), bench=True).sensitivity

    (row,) = weak
    assert row.expectation == "benzocaine in A >= 60 %"
    assert row.verdict.startswith("hangs on") or row.verdict == "robust"
    assert [r.verdict for r in strong] == ["robust"]


def test_hanging_table_names_inputs_and_both_ends() -> None:
    now = reached(wash(strength="1.00 M", least="60"))
    entry = wash(strength="1.00 M", least=f"{100 * now - 0.5:.1f}")
    (row,) = instructor(entry, bench=True).sensitivity

    assert row.verdict.startswith("hangs on ")
    assert "the strength of acid" in row.verdict
    words, low, high = next(e for e in row.effects if e[0].startswith("the strength of acid"))
    assert words.replace("\N{NO-BREAK SPACE}", " ") == "the strength of acid, ∓ 10 %"
    assert low.endswith("missed")
    assert not high.endswith("missed")


def test_students_see_none_of_it() -> None:
    entry = wash(strength="1.00 M", least="60")

    assert not hasattr(student(entry), "sensitivity")
