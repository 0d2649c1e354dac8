"""One pH for a vessel: closed forms, caps, several families, unknown ratios, what is refused."""

from __future__ import annotations

import math

import pytest

from watchglass.chemistry.equilibrium import (
    Family,
    PhaseSystem,
    charge,
    check,
    solve,
    unknown_ratios,
)

LITRE = 1e-3
ACETIC = Family((4.76,), 0, 0.1)
BENZOIC = Family((4.20,), 0, 0.01, ratio=76.0)
CARBONIC = Family((6.35, 10.33), 0, 0.1, ratio=0.0, cap=33.4, gas=True)
GLYCINE = Family((2.35, 9.78), 1, 0.1)


def ph(
    *families: Family, strong: float = 0.0, aqueous: float = LITRE, organic: float = 0.0
) -> float:
    found = solve(PhaseSystem(families, strong, aqueous, organic)).ph
    assert found is not None
    return found


def test_water_alone_is_neutral() -> None:
    assert ph() == pytest.approx(7.0, abs=1e-9)


@pytest.mark.parametrize(
    ("molar", "expected"), [(12.0, -1.079), (1.0, 0.0), (0.01, 2.0), (1e-12, 7.0)]
)
def test_strong_acid_sets_the_ph_alone(molar: float, expected: float) -> None:
    assert ph(strong=-molar) == pytest.approx(expected, abs=1e-3)


@pytest.mark.parametrize(("molar", "expected"), [(19.0, 15.279), (1.0, 14.0), (0.01, 12.0)])
def test_strong_base_sets_the_ph_alone(molar: float, expected: float) -> None:
    assert ph(strong=molar) == pytest.approx(expected, abs=1e-3)


@pytest.mark.parametrize("molar", [1.0, 1e-2, 1e-4])
def test_weak_acid_has_the_ph_of_the_quadratic(molar: float) -> None:
    k = 10**-4.76
    hydrogen = (-k + math.sqrt(k * k + 4 * k * molar)) / 2

    assert ph(ACETIC._replace(amount=molar)) == pytest.approx(-math.log10(hydrogen), abs=2e-4)


def test_weak_acid_diluted_without_limit_is_water() -> None:
    assert ph(ACETIC._replace(amount=1e-15)) == pytest.approx(7.0, abs=1e-6)


def test_half_neutralised_acid_has_the_ph_of_its_pka() -> None:
    assert ph(ACETIC, strong=0.05) == pytest.approx(4.76, abs=1e-3)


def test_ampholyte_is_near_its_isoelectric_point() -> None:
    assert ph(GLYCINE) == pytest.approx(6.065, abs=0.02)


def test_two_equal_families_are_one_of_the_sum() -> None:
    half = ACETIC._replace(amount=0.05)

    assert ph(half, half, strong=0.03) == pytest.approx(ph(ACETIC, strong=0.03), abs=1e-9)


def test_ion_that_never_changes_counts_as_a_strong_ion() -> None:
    quaternary = Family((), 1, 0.01)

    assert ph(quaternary, ACETIC) == pytest.approx(ph(ACETIC, strong=0.01), abs=1e-9)


def test_hydrogensulfate_gives_its_second_proton_off_in_part() -> None:
    # 0.0100 M sulfuric acid; x = (-(0.01 + K) + sqrt((0.01 + K)^2 + 0.04 K)) / 2, K = 10^-1.99.
    k = 10**-1.99
    x = (-(0.01 + k) + math.sqrt((0.01 + k) ** 2 + 0.04 * k)) / 2
    hydrogensulfate = Family((1.99,), -1, 0.01)

    assert ph(hydrogensulfate) == pytest.approx(-math.log10(0.01 + x), abs=1e-4)


def test_family_without_amount_changes_nothing() -> None:
    none = Family((9.25,), 1, 0.0, ratio=None)
    found = solve(PhaseSystem((none,), 0.0, LITRE, LITRE))

    assert found.ph == pytest.approx(7.0)
    assert found.parts[0][:3] == (0.0, 0.0, 0.0)


def test_water_takes_up_a_half_where_the_ratio_is_one() -> None:
    neutral = Family((), 0, 0.1, ratio=1.0)
    part = solve(PhaseSystem((neutral,), 0.0, LITRE, LITRE)).parts[0]

    assert part[:3] == pytest.approx((0.05, 0.05, 0.0))


def test_organic_liquid_without_limit_leaves_nothing_in_water() -> None:
    part = solve(PhaseSystem((BENZOIC,), 0.0, LITRE, 1e9)).parts[0]

    assert part.aqueous == pytest.approx(0.0, abs=1e-12)


def test_ion_without_neutral_form_stays_in_the_water_whatever_its_ratio() -> None:
    ion = Family((1.99,), -1, 0.01, ratio=None)
    part = solve(PhaseSystem((ion,), 0.0, LITRE, LITRE)).parts[0]

    assert part[:3] == (0.01, 0.0, 0.0)


def test_neutral_form_in_water_is_at_its_cap_where_solid_has_left() -> None:
    acid = Family((4.20,), 0, 0.3, cap=27.8)
    found = solve(PhaseSystem((acid,), 0.0, LITRE)).parts[0]

    assert found.aqueous is not None
    assert found.fractions is not None
    assert found.left is not None
    assert found.aqueous * found.fractions[0] / LITRE == pytest.approx(27.8)
    assert found.aqueous + found.left == pytest.approx(0.3)


def test_saturated_acid_has_the_ph_of_its_solubility() -> None:
    # The free acid is 0.0278 mol/L however much solid lies there: h^2 = K c.
    acid = Family((4.20,), 0, 0.3, cap=27.8)

    assert ph(acid) == pytest.approx((4.20 - math.log10(0.0278)) / 2, abs=1e-4)


def test_more_solid_does_not_change_the_ph() -> None:
    acid = Family((4.20,), 0, 0.3, cap=27.8)

    assert ph(acid) == pytest.approx(ph(acid._replace(amount=0.9)), abs=1e-9)


def test_solid_leaves_only_beyond_the_cap() -> None:
    part = solve(PhaseSystem((Family((4.20,), 0, 0.02, cap=27.8),), 0.0, LITRE)).parts[0]

    assert part.left == 0.0


def test_base_brings_a_solid_acid_into_solution() -> None:
    acid = Family((4.20,), 0, 0.3, cap=27.8)
    part = solve(PhaseSystem((acid,), 0.3, LITRE)).parts[0]

    assert part.left == 0.0


def test_gas_that_left_takes_its_acid_along() -> None:
    closed = CARBONIC._replace(cap=None)

    assert ph(CARBONIC, strong=0.05) > ph(closed, strong=0.05)


def test_acid_drives_carbon_dioxide_out_down_to_its_cap() -> None:
    part = solve(PhaseSystem((CARBONIC,), -0.1, LITRE)).parts[0]

    assert part.aqueous == pytest.approx(0.0334, rel=1e-4)
    assert part.left == pytest.approx(0.0666, rel=1e-4)


def test_cap_of_nought_lets_nothing_into_the_water() -> None:
    part = solve(PhaseSystem((Family((), 0, 0.1, cap=0.0),), 0.0, LITRE)).parts[0]

    assert part[:3] == (0.0, 0.0, 0.1)


def test_solid_leaves_both_layers_at_once() -> None:
    acid = Family((4.20,), 0, 1.0, ratio=10.0, cap=20.0)
    part = solve(PhaseSystem((acid,), -0.1, LITRE, LITRE)).parts[0]

    assert part.organic == pytest.approx(0.2)
    assert part.left == pytest.approx(0.8 - 0.02, abs=2e-4)


# Unknown ratios.

AMINE = Family((4.6,), 1, 0.01)
TWO = PhaseSystem((AMINE,), -0.02, LITRE, LITRE)


def test_unknown_ratio_gives_unknown_parts() -> None:
    part = solve(TWO).parts[0]

    assert part.aqueous is None
    assert part.organic is None


def test_unknown_ratio_does_not_count_without_organic_liquid() -> None:
    found = solve(TWO._replace(organic=0.0))

    assert found.ph is not None
    assert found.parts[0].aqueous == 0.01


def test_ph_lies_between_the_bounds_whatever_the_ratio() -> None:
    found = solve(TWO)
    phs = [
        solve(TWO._replace(families=(AMINE._replace(ratio=ratio),))).ph
        for ratio in (0.0, 1.0, 1e3, 1e9)
    ]

    assert found.ph is None
    assert found.ionic_strength is None
    assert all(here is not None and found.low <= here <= found.high for here in phs)


def test_bounds_are_what_no_and_every_ratio_give() -> None:
    found = solve(TWO)
    none = solve(TWO._replace(families=(AMINE._replace(ratio=0.0),))).ph

    assert found.low == pytest.approx(-math.log10(0.02))  # all the amine in the ether
    assert found.high == pytest.approx(none)


def test_ph_is_told_where_the_unknown_ratio_hardly_bears_on_it() -> None:
    found = solve(TWO._replace(strong=-3.0))

    assert found.ph == pytest.approx(-0.476, abs=0.005)
    assert found.parts[0].aqueous is None
    assert found.parts[0].charge == pytest.approx(1.0, abs=1e-4)


def test_ph_is_told_beside_a_neutral_substance_of_unknown_ratio() -> None:
    neutral = Family((), 0, 0.5, ratio=None)
    found = solve(PhaseSystem((neutral,), -0.1, LITRE, LITRE))

    assert found.ph == pytest.approx(1.0)
    assert found.parts[0].aqueous is None
    assert found.parts[0].left == 0.0


def test_solid_of_a_family_of_unknown_ratio_is_unknown() -> None:
    neutral = Family((), 0, 0.5, ratio=None, cap=10.0)

    assert solve(PhaseSystem((neutral,), 0.0, LITRE, LITRE)).parts[0].left is None


def test_family_that_no_bound_moves_is_told_at_an_unknown_ph() -> None:
    # Fluorenone is neither acid nor base; benzoic acid is all acid from pH 0 to 2.
    fluorenone = Family((), 0, 0.01, ratio=1.0)
    acid = BENZOIC._replace(ratio=1.0)
    found = solve(TWO._replace(families=(AMINE, fluorenone, acid), strong=-0.1))

    assert found.ph is None
    assert found.parts[1].aqueous == pytest.approx(0.005)
    assert found.parts[2].aqueous == pytest.approx(0.005, rel=0.01)


def test_family_that_the_bounds_move_is_unknown_too() -> None:
    other = Family((2.0,), 0, 0.001, ratio=1.0)
    found = solve(TWO._replace(families=(AMINE, other)))

    assert found.ph is None
    assert found.parts[1] == (None, None, None, None, None)


def test_ion_that_hardly_any_of_is_neutral_is_unknown_where_a_high_ratio_draws_it_out() -> None:
    ammonia = Family((9.25,), 1, 0.01)
    acid = Family((3.0,), 0, 1e-4, ratio=1e5)
    found = solve(PhaseSystem((ammonia, acid), 1e-4, LITRE, LITRE))

    assert found.ph is None
    assert found.parts[1].aqueous is None


def test_families_of_unknown_ratio_that_bear_on_the_ph_are_listed() -> None:
    families = (
        AMINE,
        AMINE._replace(ratio=1.0),
        AMINE._replace(amount=0.0),
        Family((), 0, 0.1),
        Family((1.99,), -1, 0.1),
        ACETIC,
    )

    assert unknown_ratios(TWO._replace(families=families)) == (0, 5)


def test_no_ratio_bears_on_the_ph_of_one_liquid() -> None:
    assert unknown_ratios(TWO._replace(organic=0.0)) == ()


# Beyond what is looked for.


@pytest.mark.parametrize(
    ("strong", "low", "high"), [(-200.0, -math.inf, -2.0), (200.0, 16.0, math.inf)]
)
def test_ph_beyond_the_range_is_only_bounded(strong: float, low: float, high: float) -> None:
    found = solve(PhaseSystem((ACETIC,), strong, LITRE))

    assert found.ph is None
    assert (found.low, found.high) == (low, high)
    assert found.parts[0].aqueous == pytest.approx(0.1)


def test_charge_is_nought_at_the_ph_found() -> None:
    families = (BENZOIC, CARBONIC, GLYCINE._replace(ratio=0.0))
    system = PhaseSystem(families, 0.07, LITRE, LITRE)
    found = solve(system).ph
    assert found is not None

    assert charge(system, found) == pytest.approx(0.0, abs=1e-11)


def test_charge_that_hangs_on_an_unknown_ratio_is_refused() -> None:
    with pytest.raises(ValueError, match="unknown ratio"):
        charge(TWO, 7.0)


# Ionic strength.


def test_ionic_strength_of_a_strong_acid_is_its_concentration() -> None:
    assert solve(PhaseSystem((), -0.1, LITRE)).ionic_strength == pytest.approx(100.0)


def test_ionic_strength_counts_strong_ions_that_balance_each_other() -> None:
    brine = PhaseSystem((), 0.0, LITRE, strong_squares=0.2)

    assert solve(brine).ionic_strength == pytest.approx(100.0, rel=1e-5)


def test_ionic_strength_of_sodium_carbonate_is_three_times_its_strength() -> None:
    carbonate = CARBONIC._replace(amount=0.1, cap=None)
    found = solve(PhaseSystem((carbonate,), 0.2, LITRE, strong_squares=0.2)).ionic_strength

    assert found == pytest.approx(300.0, rel=0.03)


# What is refused.


@pytest.mark.parametrize(
    "system",
    [
        TWO._replace(aqueous=0.0),
        TWO._replace(aqueous=math.inf),
        TWO._replace(organic=-1.0),
        TWO._replace(strong=math.nan),
        TWO._replace(strong_squares=-1.0),
        TWO._replace(families=(AMINE._replace(amount=-1.0),)),
        TWO._replace(families=(AMINE._replace(amount=math.nan),)),
        TWO._replace(families=(AMINE._replace(ratio=-1.0),)),
        TWO._replace(families=(AMINE._replace(ratio=math.inf),)),
        TWO._replace(families=(AMINE._replace(cap=-1.0),)),
        TWO._replace(families=(AMINE._replace(pkas=(5.0, 4.0)),)),
    ],
    ids=str,
)
def test_system_that_no_caller_should_make_is_refused(system: PhaseSystem) -> None:
    with pytest.raises(ValueError, match=r"\w"):
        check(system)


def test_solving_checks_its_system() -> None:
    with pytest.raises(ValueError, match="water"):
        solve(TWO._replace(aqueous=0.0))
