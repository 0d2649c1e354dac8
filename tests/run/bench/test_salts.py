"""Salts that dissolve in acid, and salts that separate when a declared reaction makes them."""

from __future__ import annotations

import pytest

from bench_runner import ran
from builders import judged, steps

FRONT = """\
materials:
  salt: {salt}
  reagent: {reagent}
  water: water
vessels:
  A: beaker 250 mL
reactions:
  fall: {equation}
"""
NONE = "HCl + NaOH -> NaCl + H2O"


def solid(written: str, *, salt: str, reagent: str, equation: str = NONE) -> dict[str, float]:
    """Give the solids in the beaker at the end, mmol."""
    entry = judged(steps(written), FRONT.format(salt=salt, reagent=reagent, equation=equation))
    assert entry.run is not None, entry.findings
    return {
        key: amount * 1e3
        for key, amount in entry.run.ledger.end.vessel("A").solid.items()
        if amount > 1e-6
    }


@pytest.mark.parametrize(
    ("salt", "reagent", "volume", "left"),
    [
        # 0.500 g of calcium carbonate is 4.996 mmol and takes 9.99 mmol of acid.
        ("calcium carbonate", "0.500 M hydrochloric acid", "40 mL", 0.0),
        ("calcium carbonate", "0.500 M hydrochloric acid", "10 mL", 2.496),
        ("calcium carbonate", "0.500 M acetic acid", "10 mL", 2.496),
        ("calcium carbonate", "0.500 M sodium chloride", "10 mL", 4.995),
        ("calcium carbonate", "0.500 M ammonium chloride", "40 mL", 4.991),
        # 0.500 g of magnesium hydroxide is 8.573 mmol and takes 17.15 mmol of acid.
        ("magnesium hydroxide", "0.500 M hydrochloric acid", "40 mL", 0.0),
        ("magnesium hydroxide", "0.500 M hydrochloric acid", "20 mL", 3.573),
        # Sulfate takes no proton from dilute acid: 0.500 g is 2.142 mmol.
        ("barium sulfate", "0.500 M hydrochloric acid", "40 mL", 2.142),
        ("silver chloride", "0.500 M nitric acid", "40 mL", 3.488),
    ],
)
def test_basic_salt_dissolves_by_as_much_acid_as_there_is(
    salt: str, reagent: str, volume: str, left: float
) -> None:
    found = solid(
        f"Put {{0.500 g salt -> A}} in, add {{{volume} reagent -> A}} and {{stir A}}.",
        salt=salt,
        reagent=reagent,
    )

    assert sum(found.values()) == pytest.approx(left, abs=0.01)


@pytest.mark.parametrize(
    ("salt", "reagent", "equation", "product", "amount"),
    [
        # 10 mL of 0.50 M with an excess of the other: 5.0 mmol.
        (
            "0.50 M sodium sulfate",
            "1.0 M barium chloride",
            "Na2SO4 + BaCl2 -> BaSO4 + 2 NaCl",
            "barium-sulfate",
            5.0,
        ),
        (
            "0.50 M copper(II) sulfate",
            "3.0 M sodium hydroxide",
            "CuSO4 + 2 NaOH -> Cu(OH)2 + Na2SO4",
            "copper-ii-hydroxide",
            5.0,
        ),
        (
            "0.50 M silver nitrate",
            "1.0 M sodium chloride",
            "AgNO3 + NaCl -> AgCl + NaNO3",
            "silver-chloride",
            5.0,
        ),
        # Lead iodide: 0.76 g/L in 20 mL is 0.033 mmol of 5.0.
        (
            "0.50 M lead(II) nitrate",
            "2.0 M potassium iodide",
            "Pb(NO3)2 + 2 KI -> PbI2 + 2 KNO3",
            "lead-ii-iodide",
            4.967,
        ),
    ],
)
def test_salt_of_a_declared_reaction_separates_beyond_its_solubility(
    salt: str, reagent: str, equation: str, product: str, amount: float
) -> None:
    found = solid(
        "Put {10 mL salt -> A} in, add {10 mL reagent -> A}, {react fall in A} and {stir A}.",
        salt=salt,
        reagent=reagent,
        equation=equation,
    )

    assert found.pop(product) == pytest.approx(amount, abs=0.01)
    assert found == {}


def test_soluble_salt_stays_in_solution() -> None:
    found = solid(
        "Put {10 mL salt -> A} in, add {10 mL reagent -> A}, {react fall in A} and {stir A}.",
        salt="0.50 M hydrochloric acid",
        reagent="0.50 M sodium hydroxide",
    )

    assert found == {}


def test_hydroxide_that_fell_dissolves_again_in_acid() -> None:
    front = FRONT.format(
        salt="0.50 M copper(II) sulfate",
        reagent="3.0 M sodium hydroxide",
        equation="CuSO4 + 2 NaOH -> Cu(OH)2 + Na2SO4",
    ).replace("  water: water", "  water: 6.0 M hydrochloric acid")
    entry = judged(
        steps(
            "Put {10 mL salt -> A} in, add {4 mL reagent -> A}, {react fall in A}, {stir A}.",
            "Add {10 mL water -> A} and {stir A}.",
        ),
        front,
    )

    assert entry.run is not None
    assert sum(entry.run.ledger.end.vessel("A").solid.values()) == pytest.approx(0.0, abs=1e-8)


def test_boiling_drives_carbon_dioxide_out() -> None:
    entry = judged(
        steps("Put {0.500 g salt -> A} in, add {40 mL reagent -> A}, {stir A}, {boil A, open}."),
        FRONT.format(salt="calcium carbonate", reagent="0.500 M hydrochloric acid", equation=NONE),
    )

    assert entry.run is not None
    air = entry.run.ledger.end.sinks["air"].liquids["carbon-dioxide"]
    assert air == pytest.approx(4.99e-3, abs=0.03e-3)


SILVER = """\
materials:
  sample: sodium chloride
  silver: 0.20 M silver nitrate
  water: water
vessels:
  A: beaker 400 mL
  paper: Hirsch funnel 60 mm
  filtrate: filter flask 500 mL
reactions:
  fall: "NaCl + AgNO3 -> AgCl + NaNO3"
"""


@pytest.mark.parametrize("volume", [20, 100])
def test_precipitate_is_counted_as_the_solid_whatever_else_brings_its_ions(volume: int) -> None:
    # 0.2000 g of NaCl (58.44 g/mol) is 3.422 mmol, as AgCl (143.32 g/mol) 0.4905 g.
    asked = ran(
        f"{{0.2000 g sample -> A}} {{150 mL water -> A}} {{{volume} mL silver -> A}} {{react fall in A}}",
        "{filter A on paper into filtrate}",
        front=SILVER,
    )
    end = asked.ledger.end
    share, mass = (f("silver-chloride", "paper", end) for f in (asked.share, asked.recovered))

    assert share.value == pytest.approx(1.0, abs=2e-3)
    assert mass.value == pytest.approx(0.4905e-3, rel=2e-3)  # a little stays dissolved
    rest = asked.share("silver-chloride", "filtrate", end)
    assert rest.value == 0.0
