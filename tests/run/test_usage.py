"""What the steps take of each material: every pass counted, figures by the coarsest part."""

from __future__ import annotations

import pytest

from builders import NAMES, golden, step
from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.run.usage import Total, Usage, total_of


def used(name: str, *sentences: str, front: str = NAMES) -> Usage:
    return step(*sentences, front=front).case.usage[name]


def total(usage: Usage) -> str:
    """Write the one sum out as it is shown, `low` or `low–high`, with its unit."""
    (one,) = usage.totals
    return written(one)


def written(one: Total) -> str:
    low = shown(one.low / one.factor, one.figures)
    high = shown(one.high / one.factor, one.high_figures)
    about = "about " if one.about else ""
    return f"{about}{low}{'' if low == high else '–' + high} {one.symbol}"


@pytest.mark.parametrize(
    ("sentences", "said"),
    [
        (["{15 mL acid -> A}"], "15 mL"),
        (["{15 mL acid -> A}", "{again 1}"], "30 mL"),
        (["{5 mL acid -> A}", "{again 1, 4 more times}"], "25 mL"),
        (["{0.65 mL acid -> A}", "{again 1, 2 more times}"], "1.95 mL"),
        (["{15 mL acid -> A} and {2.5 mL acid -> B}"], "18 mL"),  # 17.5, no finer than a millilitre
        (["{15.0 mL acid -> A} and {2.5 mL acid -> B}"], "17.5 mL"),
        (["{15 mL acid -> A} and {0.010 L acid -> B}"], "25 mL"),
        (["{0.010 L acid -> A} and {15 mL acid -> B}"], "0.025 L"),
        (["{95 mL acid -> A} and {5 mL acid -> B}"], "100 mL"),
        (["{2–3 mL acid -> A}"], "2–3 mL"),
        (["{9–11 mL acid -> A}"], "9–11 mL"),
        (["{2.0–3 mL acid -> A}", "{again 1}"], "4–6 mL"),
        (["{2–3 mL acid -> A} and {5 mL acid -> B}"], "7–8 mL"),
        (["{ca. 5 mL acid -> A}"], "about 5 mL"),
        (["{2.00 ± 0.05 mL acid -> A}"], "2.00 mL"),
        (["{3 drops acid -> A}", "{again 1, 4 more times}"], "15 drops"),
        (["{1.0 × 10^3 mL acid -> A}"], "1000 mL"),
        (["{rinse A with 10 mL acid into B}", "{again 1}"], "20 mL"),
        (["{adjust A to pH 7 with 5 mL acid}"], "5 mL"),
        (["{5 mL acid}"], ""),
    ],
)  # fmt: skip
def test_sum_is_shown_no_finer_than_its_coarsest_part(sentences: list[str], said: str) -> None:
    usage = used("acid", *sentences)

    assert ", ".join(written(t) for t in usage.totals) == said


def test_mass_and_volume_are_not_added() -> None:
    usage = used("ether", "{5 mL ether -> A} and {2.0 g ether -> B} and {1 mL ether -> B}")

    assert [written(t) for t in usage.totals] == ["6 mL", "2.0 g"]
    assert total_of(usage, dim.MASS) == usage.totals[1]
    assert total_of(usage, dim.AMOUNT) is None


def test_portions_are_kept_in_the_order_written_with_their_passes() -> None:
    usage = used("acid", "{5 mL acid -> A}", "{2 mL acid -> B; again 1, 2 more times}")

    assert [(u.quantity and u.quantity.text, u.times) for u in usage.uses] == [
        ("5 mL", 3),
        ("2 mL", 1),
    ]


@pytest.mark.parametrize(
    ("mark", "said", "unsummed"),
    [
        ("all mixture -> A", "0.900 g", False),
        ("half mixture -> A", "0.450 g", False),
        ("half mixture -> A; half mixture -> B", "0.900 g", False),
        ("0.300 g mixture -> A; rest mixture -> B", "0.300 g", True),
    ],
)
def test_share_of_what_is_provided_counts(mark: str, said: str, unsummed: bool) -> None:
    usage = used("mixture", f"{{{mark}}}")

    assert (total(usage), usage.unsummed) == (said, unsummed)


def test_share_of_what_nobody_knows_is_not_summed() -> None:
    usage = used("salt", "{all salt -> A}")

    assert (usage.totals, usage.unsummed) == ((), True)


def test_amount_by_another_is_not_summed() -> None:
    usage = used("ether", "{12 mL ether per g mixture -> A}")

    assert (usage.totals, usage.unsummed) == ((), True)


def test_reagent_of_an_adjustment_is_taken_as_needed() -> None:
    usage = used("base", "{adjust A to pH 10 with base}")

    assert (usage.uses, usage.totals, usage.as_needed) == ((), (), True)


def test_exchanged_material_is_counted_under_its_own_name() -> None:
    entry = step("{5 mL acid -> A}", "{again 1, 2 more times with base as acid}")

    assert total(entry.case.usage["acid"]) == "5 mL"
    assert total(entry.case.usage["base"]) == "10 mL"


def test_material_that_no_step_takes_is_not_used() -> None:
    assert used("salt", "{stir A}") == Usage("salt", (), (), False, False)


def test_scale_multiplies_the_sum_and_keeps_its_figures() -> None:
    usage = used("acid", "{0.65 mL acid -> A}", front=f"{NAMES}scale: 0.5\n")

    assert total(usage) == "0.325 mL"  # 0.32 mL would change the recipe by 1.5 %


@pytest.mark.parametrize(
    ("name", "said", "as_needed"),
    [
        ("standard", "1.95 g", False),  # 3 × 0.65 g
        ("titrant", "150 mL", True),
        ("water", "210 mL", False),  # 3 × (50 mL + 20 mL)
        ("indicator", "6 drops", False),
    ],
)
def test_titration_takes_three_times_its_portions(name: str, said: str, as_needed: bool) -> None:
    usage = golden("gc-02").case.usage[name]

    assert (total(usage), usage.as_needed) == (said, as_needed)


@pytest.mark.parametrize(
    ("name", "said"),
    [("mixture", "0.900 g"), ("ether", "30 mL"), ("acid", "30 mL"), ("base", "30 mL"), ("drier", "2 g")],
)  # fmt: skip
def test_parting_takes_two_portions_of_acid_and_base(name: str, said: str) -> None:
    assert total(golden("oc-04").case.usage[name]) == said


@pytest.mark.parametrize("name", ["alkali", "strong-acid"])
def test_parting_takes_alkali_and_strong_acid_as_needed(name: str) -> None:
    usage = golden("oc-04").case.usage[name]

    assert (usage.totals, usage.as_needed) == ((), True)


def test_half_of_what_is_provided_is_taken_in_every_pass() -> None:
    # Three halves of 0.900 g, to the milligram that it is given to.
    usage = used("mixture", "{half mixture -> A}", "{again 1, 2 more times}")

    assert total(usage) == "1.350 g"
