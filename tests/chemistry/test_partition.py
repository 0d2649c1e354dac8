"""Partition and what moves a substance: closed forms, limits and what is refused."""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

import pytest

from watchglass.chemistry.equilibrium import Family, PhaseSystem, solve
from watchglass.chemistry.moving import (
    acid_to_move_amine,
    base_to_move_acid,
    reagent_by_equation,
    volume_to_move,
)
from watchglass.chemistry.partition import (
    acid_distribution_ratio,
    base_distribution_ratio,
    distribution_ratio,
    portions_needed,
    ratio_of_log_p,
    ratio_of_solubilities,
    salted_out,
    share_in_organic,
    share_left,
)

if TYPE_CHECKING:
    from collections.abc import Callable

ETHER, WATER = 50e-6, 20e-6
ANILINE = Family((4.6,), 1, 0.010, ratio=7.9)
ACID = PhaseSystem((), strong=-1.0, aqueous=1e-3)


def test_acid_and_base_closed_forms_mirror_each_other() -> None:
    acid = acid_distribution_ratio(pka=5.0, ratio=9.0, ph=4.0)
    base = base_distribution_ratio(pka=5.0, ratio=9.0, ph=6.0)

    assert acid == pytest.approx(base)


@pytest.mark.parametrize(("ph", "share"), [(0.0, 1.0), (5.0, 0.5), (10.0, 1e-5)])
def test_acid_partitions_by_its_free_form(ph: float, share: float) -> None:
    assert acid_distribution_ratio(pka=5.0, ratio=9.0, ph=ph) == pytest.approx(9 * share, rel=1e-4)


def test_substance_without_pka_partitions_by_its_ratio_alone() -> None:
    assert distribution_ratio(pkas=(), top=0, ratio=9.0, ph=14.0) == 9.0


def test_water_without_organic_liquid_keeps_all() -> None:
    assert share_in_organic(ratio=9.0, organic=0.0, aqueous=1.0) == 0.0


def test_organic_liquid_without_water_keeps_all() -> None:
    assert share_in_organic(ratio=0.0, organic=1.0, aqueous=0.0) == 1.0


def test_no_portions_leave_all() -> None:
    assert share_left(ratio=9.0, portions=[], layer=1.0) == 1.0


def test_many_small_portions_leave_the_exponential() -> None:
    left = share_left(ratio=3.0, portions=[1e-5] * 100_000, layer=1.0)

    assert left == pytest.approx(math.exp(-3.0), rel=1e-4)


def test_share_is_met_by_the_least_number_of_portions() -> None:
    count = portions_needed(ratio=10.0, portion=20.0, layer=100.0, share=0.98)

    assert count == 4
    assert share_left(ratio=10.0, portions=[20.0] * 3, layer=100.0) > 0.02


def test_share_met_to_the_last_bit_needs_no_more_portions() -> None:
    assert portions_needed(ratio=1.0, portion=1.0, layer=1.0, share=0.875) == 3


@pytest.mark.parametrize(
    ("ratio", "share", "count"),
    [(0.0, 0.5, None), (1.0, 1.0, None), (1.0, 0.0, 0), (math.inf, 0.5, 1)],
)
def test_portions_at_the_limits(ratio: float, share: float, count: int | None) -> None:
    assert portions_needed(ratio=ratio, portion=1.0, layer=1.0, share=share) == count


def test_log_p_is_a_decimal_logarithm() -> None:
    assert ratio_of_log_p(2.0) == pytest.approx(100.0)


def test_no_salt_drives_nothing_out() -> None:
    assert salted_out(ratio=9.0, constant=2e-4, salt=0.0) == 9.0


@pytest.mark.parametrize(
    "asked",
    [
        lambda: share_in_organic(ratio=1.0, organic=0.0, aqueous=0.0),
        lambda: share_in_organic(ratio=-1.0, organic=1.0, aqueous=1.0),
        lambda: share_left(ratio=1.0, portions=[1.0], layer=0.0),
        lambda: share_left(ratio=1.0, portions=[-1.0], layer=1.0),
        lambda: portions_needed(ratio=1.0, portion=1.0, layer=1.0, share=1.5),
        lambda: ratio_of_solubilities(organic=1.0, aqueous=0.0),
        lambda: distribution_ratio(pkas=(), top=0, ratio=-1.0, ph=7.0),
        lambda: reagent_by_equation(amount=-1.0),
        lambda: reagent_by_equation(amount=1.0, sites=0),
        lambda: reagent_by_equation(amount=1.0, excess=0.5),
        lambda: acid_to_move_amine(
            amount=1.0, pka=4.6, ratio=1.0, organic=1.0, aqueous=1.0, share=1.0
        ),
        lambda: volume_to_move(PhaseSystem((ANILINE,), 0.0, WATER, ETHER), ACID, 1, 0.5),
        lambda: volume_to_move(PhaseSystem((ANILINE,), 0.0, WATER, ETHER), ACID, 0, 1.5),
        lambda: volume_to_move(
            PhaseSystem((ANILINE._replace(amount=0.0),), 0.0, WATER, ETHER), ACID, 0, 0.5
        ),
        lambda: volume_to_move(
            PhaseSystem((ANILINE._replace(ratio=None),), 0.0, WATER, ETHER), ACID, 0, 0.5
        ),
    ],
)
def test_arguments_that_no_caller_should_pass_are_refused(asked: Callable[[], object]) -> None:
    with pytest.raises(ValueError, match=r"\w"):
        asked()


def test_acid_that_is_told_moves_the_share_of_the_amine() -> None:
    acid = acid_to_move_amine(
        amount=0.010, pka=4.6, ratio=7.9, organic=ETHER, aqueous=WATER, share=0.95
    )
    assert acid is not None
    found = solve(PhaseSystem((ANILINE,), -acid.amount, WATER, ETHER))

    assert found.parts[0].aqueous == pytest.approx(0.0095)
    assert found.ph == pytest.approx(acid.ph)


def test_base_that_is_told_moves_the_share_of_the_acid() -> None:
    base = base_to_move_acid(
        amount=0.008, pka=4.2, ratio=76.0, organic=ETHER, aqueous=WATER, share=0.99
    )
    assert base is not None
    benzoic = Family((4.2,), 0, 0.008, ratio=76.0)
    found = solve(PhaseSystem((benzoic,), base.amount, WATER, ETHER))

    assert found.parts[0].aqueous == pytest.approx(0.00792)
    assert found.ph == pytest.approx(base.ph)


def test_weak_base_needs_more_acid_than_the_equation_asks_for() -> None:
    acid = acid_to_move_amine(
        amount=0.002, pka=1.0, ratio=10.0, organic=ETHER, aqueous=WATER, share=0.95
    )
    assert acid is not None

    assert acid.amount > 10 * reagent_by_equation(amount=0.002)


def test_no_acid_moves_what_takes_up_no_proton() -> None:
    found = acid_to_move_amine(
        amount=0.002, pka=-5.0, ratio=25.0, organic=ETHER, aqueous=WATER, share=0.95
    )

    assert found is None


def test_water_alone_takes_up_what_prefers_it() -> None:
    found = base_to_move_acid(
        amount=0.002, pka=4.2, ratio=0.001, organic=ETHER, aqueous=WATER, share=0.95
    )
    assert found is not None

    assert found.amount == 0.0
    assert found.ph == pytest.approx(2.6, abs=0.02)


def test_volume_that_is_told_moves_the_share() -> None:
    held = PhaseSystem((ANILINE,), 0.0, WATER, ETHER)
    volume = volume_to_move(held, ACID, 0, 0.95)
    assert volume is not None
    after = PhaseSystem((ANILINE,), -1e3 * volume, WATER + volume, ETHER)

    assert solve(after).parts[0].aqueous == pytest.approx(0.0095)


def test_nothing_is_needed_where_the_share_is_in_the_water() -> None:
    held = PhaseSystem((ANILINE,), -0.02, WATER, ETHER)

    assert volume_to_move(held, ACID, 0, 0.95) == 0.0


def test_no_volume_up_to_the_most_moves_the_share() -> None:
    held = PhaseSystem((ANILINE,), 0.0, WATER, ETHER)

    assert volume_to_move(held, ACID, 0, 0.95, most=5e-6) is None
