"""Reagent to a pH, curves and equivalence points: closed forms, limits and what is refused."""

from __future__ import annotations

import math

import pytest

from watchglass.chemistry.equilibrium import Family, PhaseSystem, solve
from watchglass.chemistry.reagents import volume_to_ph, with_reagent
from watchglass.chemistry.titration import (
    concentration_by_titre,
    equivalence_points,
    titration_curve,
    titration_error,
    titre_by_equation,
)

ML = 1e-6
ACETIC = Family((4.76,), 0, 2.5e-3, key="acetic")
CARBONATE = Family((6.35, 10.33), 0, 1e-3, key="carbonic")
ALKALI = PhaseSystem((), strong=0.1, aqueous=1e-3)
ACID = PhaseSystem((), strong=-0.1, aqueous=1e-3)
SAMPLE = PhaseSystem((ACETIC,), 0.0, 25e-6)
SODA = PhaseSystem((CARBONATE,), 2e-3, 25e-6)


def test_reagent_brings_its_ions_families_and_water() -> None:
    reagent = PhaseSystem((ACETIC._replace(amount=0.2),), 0.1, 1e-3)
    found = with_reagent(SAMPLE, reagent, 10e-6)

    assert found.strong == pytest.approx(0.001)
    assert found.aqueous == pytest.approx(35e-6)
    assert [family.amount for family in found.families] == pytest.approx([4.5e-3])


def test_families_without_key_stay_apart() -> None:
    bare = ACETIC._replace(key="")
    held, reagent = PhaseSystem((bare,), 0.0, 1e-3), PhaseSystem((bare,), 0.0, 1e-3)

    assert len(with_reagent(held, reagent, 1e-3).families) == 2


def test_constants_of_the_vessel_hold_for_a_family_in_both() -> None:
    reagent = PhaseSystem((ACETIC._replace(ratio=None),), 0.0, 1e-3)
    held = PhaseSystem((ACETIC._replace(ratio=2.0),), 0.0, 1e-3, 1e-3)

    assert with_reagent(held, reagent, 1e-3).families[0].ratio == 2.0


@pytest.mark.parametrize(
    ("held", "poured", "both"), [(0.1, 0.2, 0.2), (None, 0.2, None), (0.1, None, None)]
)
def test_sum_of_squares_is_known_where_both_are(
    held: float | None, poured: float | None, both: float | None
) -> None:
    found = with_reagent(
        SAMPLE._replace(strong_squares=held), ALKALI._replace(strong_squares=poured), 0.5e-3
    )

    assert found.strong_squares == pytest.approx(both)


def test_volume_that_is_told_brings_the_ph() -> None:
    volume = volume_to_ph(SAMPLE, ALKALI, 8.2)
    assert volume is not None

    assert solve(with_reagent(SAMPLE, ALKALI, volume)).ph == pytest.approx(8.2)


def test_half_the_alkali_brings_the_pka() -> None:
    assert volume_to_ph(SAMPLE, ALKALI, 4.76) == pytest.approx(12.5e-6, rel=1e-3)


def test_ph_that_is_there_already_needs_nothing() -> None:
    assert volume_to_ph(PhaseSystem((), 0.0, 1e-3), ALKALI, 7.0) == pytest.approx(0.0, abs=1e-18)


def test_alkali_does_not_make_acid() -> None:
    assert volume_to_ph(SAMPLE, ALKALI, 2.0) is None


def test_no_volume_of_weak_alkali_passes_its_own_ph() -> None:
    assert volume_to_ph(SAMPLE, ALKALI, 13.5) is None


def test_water_reaches_a_ph_by_diluting() -> None:
    # 1 mL of 0.1 M acid to pH 2: ten times the volume.
    acid = PhaseSystem((), -1e-4, 1e-6)
    water = PhaseSystem((), 0.0, 1e-3)

    assert volume_to_ph(acid, water, 2.0) == pytest.approx(9e-6, rel=1e-6)


def test_no_more_than_the_most_is_tried() -> None:
    assert volume_to_ph(SAMPLE, ALKALI, 8.2, most=20e-6) is None


def test_solid_dissolves_before_the_ph_is_passed() -> None:
    solid = Family((4.20,), 0, 10e-3, cap=27.8)
    held = PhaseSystem((solid,), 0.0, 10e-6)
    volume = volume_to_ph(held, ALKALI._replace(strong=1.0), 7.0)

    # Little of it is still acid at pH 7: all 10 mmol are neutralised.
    assert volume == pytest.approx(10e-6, rel=3e-3)


def test_buffer_as_reagent_reaches_a_ph_on_its_own_side() -> None:
    buffer = PhaseSystem((Family((7.2,), 0, 1.0),), 0.5, 1e-3)
    volume = volume_to_ph(PhaseSystem((), -1e-3, 1e-4), buffer, 7.0)
    assert volume is not None

    after = with_reagent(PhaseSystem((), -1e-3, 1e-4), buffer, volume)
    assert solve(after).ph == pytest.approx(7.0)


def test_reagent_of_a_family_in_the_vessel_shares_its_cap() -> None:
    # Sodium benzoate into acid: what is beyond the solubility of the acid is solid from both.
    benzoic = Family((4.20,), 0, 1e-3, cap=27.8, key="benzoic")
    held = PhaseSystem((benzoic,), -5e-3, 10e-6)
    reagent = PhaseSystem((benzoic._replace(amount=1.0),), 1.0, 1e-3)
    volume = volume_to_ph(held, reagent, 3.0)
    assert volume is not None

    assert solve(with_reagent(held, reagent, volume)).ph == pytest.approx(3.0)


def test_volume_that_hangs_on_an_unknown_ratio_is_refused() -> None:
    with pytest.raises(ValueError, match="unknown ratio"):
        volume_to_ph(SAMPLE._replace(organic=1e-5), ALKALI, 7.0)


@pytest.mark.parametrize("most", [-1.0, math.inf, math.nan])
def test_most_that_is_no_volume_is_refused(most: float) -> None:
    with pytest.raises(ValueError, match="no more than"):
        volume_to_ph(SAMPLE, ALKALI, 8.2, most=most)


def test_reagent_of_two_liquids_is_refused() -> None:
    with pytest.raises(ValueError, match="two liquids"):
        with_reagent(SAMPLE, ALKALI._replace(organic=1e-3), 1e-6)


def test_negative_volume_is_refused() -> None:
    with pytest.raises(ValueError, match="volume"):
        with_reagent(SAMPLE, ALKALI, -1e-6)


def test_curve_begins_at_the_sample_and_passes_the_pka() -> None:
    curve = titration_curve(SAMPLE, ALKALI, [0.0, 12.5e-6, 25e-6, 50e-6])

    assert [point.ph for point in curve] == pytest.approx([2.88, 4.76, 8.73, 12.52], abs=0.01)


def test_curve_is_unknown_where_a_ratio_is() -> None:
    (point,) = titration_curve(SAMPLE._replace(organic=1e-5), ALKALI, [12.5e-6])

    assert point.ph is None


def test_acetic_acid_has_one_equivalence_point() -> None:
    points = equivalence_points(SAMPLE, ALKALI)
    assert points is not None

    assert [point.volume for point in points] == pytest.approx([25e-6])
    assert points[0].ph == pytest.approx(8.73, abs=0.01)
    assert points[0].jump == pytest.approx(2.0, abs=0.1)


def test_carbonate_takes_two_acids_one_after_the_other() -> None:
    points = equivalence_points(SODA, ACID)
    assert points is not None

    assert [point.volume for point in points] == pytest.approx([10e-6, 20e-6])
    assert points[0].ph == pytest.approx(8.34, abs=0.01)


def test_strong_acid_comes_before_the_weak_one() -> None:
    points = equivalence_points(SAMPLE._replace(strong=-1e-3), ALKALI)
    assert points is not None

    assert [point.volume for point in points] == pytest.approx([10e-6, 35e-6])


def test_protons_of_one_pka_leave_together() -> None:
    held = SAMPLE._replace(families=(ACETIC, ACETIC._replace(key="twin")))
    points = equivalence_points(held, ALKALI)
    assert points is not None

    assert [point.volume for point in points] == pytest.approx([50e-6])


def test_protons_of_one_pka_leave_together_before_those_of_another() -> None:
    # 1 and 2 mmol at pKa 4, then 1 mmol at 9: 30 and 40 mL of 0.100 M.
    families = tuple(Family((pka,), 0, n) for pka, n in ((4.0, 1e-3), (9.0, 1e-3), (4.0, 2e-3)))
    points = equivalence_points(PhaseSystem(families, 0.0, 1e-3), PhaseSystem((), 0.1, 1e-3))
    assert points is not None

    assert [point.volume for point in points] == pytest.approx([30e-6, 40e-6])


def test_strong_acid_alone_has_one_equivalence_point_at_seven() -> None:
    points = equivalence_points(PhaseSystem((), -1e-3, 10e-6), ALKALI)
    assert points is not None

    assert points[0].volume == pytest.approx(10e-6)
    assert points[0].ph == pytest.approx(7.0)


def test_nothing_is_ahead_of_the_wrong_titrant() -> None:
    assert equivalence_points(PhaseSystem((), -1e-3, 10e-6), ACID) == ()


def test_water_has_no_equivalence_point() -> None:
    assert equivalence_points(PhaseSystem((), 0.0, 1e-3), ALKALI) == ()


def test_weak_titrant_has_no_equivalence_points_told() -> None:
    assert equivalence_points(SODA, SAMPLE._replace(strong=1e-3)) is None


def test_equivalence_point_of_unknown_ph_has_no_jump() -> None:
    points = equivalence_points(SAMPLE._replace(organic=1e-5), ALKALI)
    assert points is not None

    assert points[0].volume == pytest.approx(25e-6)
    assert points[0][1:] == (None, None)


def test_change_before_the_equivalence_point_is_an_error_below_nought() -> None:
    early = volume_to_ph(SAMPLE, ALKALI, 4.4)  # methyl orange
    assert early is not None

    assert titration_error(titre=early, equivalence=25e-6) == pytest.approx(-0.69, abs=0.01)


def test_titre_and_concentration_are_each_other_s_inverse() -> None:
    titre = titre_by_equation(amount=2.5e-3, titrant=100.0, ratio=2.0)
    found = concentration_by_titre(titre=titre, titrant=100.0, sample=25e-6, ratio=2.0)

    assert found == pytest.approx(100.0)


def test_titre_without_titrant_is_refused() -> None:
    with pytest.raises(ValueError, match="titrated"):
        titre_by_equation(amount=1.0, titrant=0.0)


def test_concentration_without_sample_is_refused() -> None:
    with pytest.raises(ValueError, match="mol/m3"):
        concentration_by_titre(titre=1.0, titrant=1.0, sample=0.0)


def test_error_without_equivalence_point_is_refused() -> None:
    with pytest.raises(ValueError, match="titre"):
        titration_error(titre=1.0, equivalence=0.0)
