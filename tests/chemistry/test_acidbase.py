"""States of protonation, buffers and ionic strength: limits and what is refused."""

from __future__ import annotations

import math

import pytest

from watchglass.chemistry.acidbase import (
    buffer_base_share,
    buffer_capacity,
    buffer_ph,
    check_pkas,
    hydrogen_ion,
    hydroxide,
    ionic_strength,
    is_rough,
    isoelectric_point,
    mean_charge,
    neutral_fraction,
    state_fractions,
    water_formed,
)


def test_half_is_in_each_form_where_the_ph_is_the_pka() -> None:
    assert state_fractions((4.76,), 4.76) == pytest.approx((0.5, 0.5))


def test_substance_that_is_neither_acid_nor_base_has_one_state() -> None:
    assert state_fractions((), 7.0) == (1.0,)


def test_fractions_hold_far_from_every_pka() -> None:
    assert state_fractions((-9.0, 30.0), 16.0) == pytest.approx((1e-25, 1.0, 1e-14))


def test_middle_form_is_greatest_between_its_two_pkas() -> None:
    at = neutral_fraction((2.5, 4.87), 1, 3.685)

    assert at > neutral_fraction((2.5, 4.87), 1, 3.5)
    assert at > neutral_fraction((2.5, 4.87), 1, 3.9)


def test_family_without_neutral_form_has_no_neutral_fraction() -> None:
    assert neutral_fraction((1.99,), -1, 2.0) == 0.0


@pytest.mark.parametrize(("ph", "charge"), [(-2.0, 0.0), (4.65, -1.0), (9.75, -2.0), (16.0, -3.0)])
def test_phosphoric_acid_loses_one_charge_after_the_other(ph: float, charge: float) -> None:
    assert mean_charge((2.1, 7.2, 12.3), 0, ph) == pytest.approx(charge, abs=0.03)


def test_charge_is_nought_at_the_isoelectric_point() -> None:
    point = isoelectric_point((2.35, 9.78), 1)
    assert point is not None

    assert mean_charge((2.35, 9.78), 1, point) == pytest.approx(0.0, abs=1e-12)


def test_acid_has_no_isoelectric_point() -> None:
    assert isoelectric_point((6.35, 10.33), 0) is None


@pytest.mark.parametrize(
    "pkas", [(5.0, 4.0), (-30.0,), (math.nan,), (math.inf,), (40.0,) * 8], ids=str
)
def test_pkas_that_are_no_family_s_are_refused(pkas: tuple[float, ...]) -> None:
    with pytest.raises(ValueError, match="pKa's"):
        check_pkas(pkas)


def test_neutral_water_has_as_much_of_either_ion() -> None:
    assert hydrogen_ion(7.0) == pytest.approx(1e-4)
    assert hydroxide(7.0) == pytest.approx(1e-4)


def test_hydroxide_that_is_gone_became_water() -> None:
    assert water_formed(hydroxide_before=0.1, hydroxide_after=0.04) == pytest.approx(0.06)


def test_negative_hydroxide_is_refused() -> None:
    with pytest.raises(ValueError, match="negative"):
        water_formed(hydroxide_before=-0.1, hydroxide_after=0.0)


def test_tenfold_base_form_raises_a_buffer_by_one() -> None:
    assert buffer_ph(pka=4.76, acid=0.01, base=0.1) == pytest.approx(5.76)


@pytest.mark.parametrize(("acid", "base"), [(0.0, 1.0), (1.0, 0.0), (-1.0, 1.0)])
def test_buffer_of_one_form_is_refused(acid: float, base: float) -> None:
    with pytest.raises(ValueError, match="buffer"):
        buffer_ph(pka=4.76, acid=acid, base=base)


def test_share_for_a_buffer_gives_its_ph_back() -> None:
    share = buffer_base_share(pka=7.2, ph=6.8)

    assert buffer_ph(pka=7.2, acid=1 - share, base=share) == pytest.approx(6.8)


def test_buffer_capacity_at_the_pka_is_a_quarter_of_ln_10() -> None:
    # Van Slyke: 0.576 of the concentration, where water adds nothing.
    assert buffer_capacity([((7.0,), 0, 100.0)], 7.0) == pytest.approx(57.6, rel=1e-3)


def test_ionic_strength_of_a_salt_of_a_divalent_anion_is_three_times_its_strength() -> None:
    assert ionic_strength([(200.0, 1), (100.0, -2)]) == pytest.approx(300.0)


def test_ions_of_negative_concentration_are_refused() -> None:
    with pytest.raises(ValueError, match="negative"):
        ionic_strength([(-1.0, 1)])


@pytest.mark.parametrize(
    ("strength", "rough"), [(0.0, False), (500.0, False), (500.1, True), (None, True)]
)
def test_figures_are_rough_above_half_a_mole_a_litre(strength: float | None, rough: bool) -> None:
    assert is_rough(strength) is rough
