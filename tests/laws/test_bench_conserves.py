"""Whatever is done at the bench, atoms, charge and mass are where they were put."""

from __future__ import annotations

from collections import Counter
from typing import TYPE_CHECKING

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from builders import judged, steps, surroundings
from watchglass.run.bench.bench import run_bench
from watchglass.run.bench.knowledge import Knowledge

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.run.bench.ledger import Ledger
    from watchglass.run.bench.state import Bench

FRONT = """\
materials:
  acid: 3.0 M hydrochloric acid
  weak: acetic acid, glacial
  base: 6.0 M sodium hydroxide
  soda: 5.0 % w/v sodium hydrogencarbonate
  salt: sodium chloride
  benzoate: sodium benzoate
  drier: magnesium sulfate, anhydrous
  ether: tert-butyl methyl ether
  heavy: dichloromethane
  spirit: ethanol
  water: water
  mixture: {contains: {benzocaine: 1 mol, benzoic-acid: 1 mol, 9-fluorenone: 1 mol}}
  alcohol: butan-1-ol
vessels:
  A: conical flask 250 mL
  B: conical flask 250 mL
  funnel: separatory funnel 250 mL
  paper: Hirsch funnel 60 mm
  filtrate: filter flask 125 mL
  burette: burette 50 mL
reactions:
  ester: {equation: butan-1-ol + CH3COOH -> butyl-acetate + H2O, conversion: 60 %}
"""
KNOWN = Knowledge(surroundings().catalogue)
VESSELS = st.sampled_from(("A", "B", "funnel"))
LIQUIDS = st.sampled_from(
    ("acid", "weak", "base", "soda", "ether", "heavy", "spirit", "water", "alcohol")
)
SOLIDS = st.sampled_from(("salt", "benzoate", "mixture", "drier"))
AMOUNTS = st.sampled_from(("0.5", "1.0", "3.0", "10", "25"))
PARTS = st.sampled_from(("", ".aqueous", ".organic", ".upper", ".lower"))


def _marks() -> st.SearchStrategy[str]:
    return st.one_of(
        st.builds("{{{} mL {} -> {}}}".format, AMOUNTS, LIQUIDS, VESSELS),
        st.builds("{{{} g {} -> {}}}".format, st.sampled_from(("0.1", "1.0")), SOLIDS, VESSELS),
        st.builds("{{shake {}, stoppered}}".format, VESSELS),
        st.builds("{{settle {}}}".format, VESSELS),
        st.builds(
            lambda origin, part, target: (
                f"{{{origin}{part} -> {target}}}" if origin != target else "{wait 1 min}"
            ),
            VESSELS,
            PARTS,
            VESSELS,
        ),
        st.builds(
            lambda amount, origin, target: (
                f"{{{amount} mL from {origin} -> {target}}}" if origin != target else "{wait 1 min}"
            ),
            AMOUNTS,
            VESSELS,
            VESSELS,
        ),
        st.builds(
            "{{adjust {} to pH {} with {}}}".format,
            VESSELS,
            st.sampled_from(("2", "7", "10")),
            st.sampled_from(("acid", "base")),
        ),
        st.builds("{{filter {} on paper into filtrate}}".format, VESSELS),
        st.builds("{{evaporate {} at 40 °C}}".format, VESSELS),
        st.builds("{{distil {} into filtrate at 90–130 °C, leaving 0.5 mL}}".format, VESSELS),
        st.builds("{{react ester in {}}}".format, VESSELS),
        st.builds("{{cool {} to 2 °C with ice}}".format, VESSELS),
        st.builds("{{discard {}{} to aqueous-acid}}".format, VESSELS, PARTS),
        st.builds("{{rinse {} with 5 mL water into funnel}}".format, st.sampled_from(("A", "B"))),
        st.builds("{{suppose 80 % benzocaine in {} is solid: a trial}}".format, VESSELS),
        st.builds(
            "{{20 mL base -> burette; titrate {} with base from burette to pH 8}}".format, VESSELS
        ),
        st.builds("{{fill {} with water to 100 mL}}".format, VESSELS),
        st.just("{again 1, 2 more times}"),
        st.just("{again 1, fresh}"),
    )


def ledger_of(*sentences: str) -> Ledger:
    entry = judged(steps(*sentences), FRONT)
    return run_bench(entry.procedure, entry.case.course, KNOWN, surroundings().laboratory)


def components(bench: Bench) -> Counter[str]:
    total: Counter[str] = Counter()

    def liquid(amounts: Mapping[str, float]) -> None:
        for key, amount in amounts.items():
            total[key] += amount  # type: ignore[assignment]

    def solid(amounts: Mapping[str, float]) -> None:
        for key, amount in amounts.items():
            for part, count in KNOWN.parts(key).items():
                total[part] += count * amount  # type: ignore[assignment]

    for vessel in bench.vessels.values():
        liquid(vessel.aqueous.amounts)
        liquid(vessel.organic.amounts)
        solid(vessel.solid)
    for sink in bench.sinks.values():
        liquid(sink.liquids)
        solid(sink.solids)
    return total


def atoms(amounts: Mapping[str, float]) -> dict[str, float]:
    total: dict[str, float] = {}
    for key, amount in amounts.items():
        for element, count in KNOWN.thing(key).atoms.items():
            total[element] = total.get(element, 0.0) + count * amount
    return total


def charge(amounts: Mapping[str, float]) -> float:
    return sum(KNOWN.thing(key).charge * amount for key, amount in amounts.items())


def mass(amounts: Mapping[str, float]) -> float:
    return sum((KNOWN.thing(key).molar_mass or 0.0) * amount for key, amount in amounts.items())


@settings(max_examples=150)
@given(st.lists(_marks(), min_size=2, max_size=14))
def test_atoms_charge_and_mass_are_conserved_and_nothing_is_below_nought(marks: list[str]) -> None:
    ledger = ledger_of(*(f"Do {mark}." for mark in marks))

    end = components(ledger.end)
    brought = atoms(ledger.charged)
    for element, amount in atoms(end).items():
        assert amount == pytest.approx(brought[element], rel=1e-9, abs=1e-12)
    assert charge(end) == pytest.approx(0.0, abs=1e-10)
    assert mass(end) == pytest.approx(mass(ledger.charged), rel=1e-9, abs=1e-15)
    for vessel in ledger.end.vessels.values():
        for phase in (vessel.aqueous, vessel.organic):
            assert phase.volume >= -1e-15
            assert all(a >= -1e-12 for k, a in phase.amounts.items() if k != "H^+")
        assert all(a >= 0 for a in vessel.solid.values())
