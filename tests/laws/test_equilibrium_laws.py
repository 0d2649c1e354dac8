"""Whatever is in a vessel: charge balances, amounts are conserved, acid lowers the pH."""

from __future__ import annotations

import math

import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from watchglass.chemistry.acidbase import mean_charge, state_fractions
from watchglass.chemistry.equilibrium import PH_RANGE, Family, PhaseSystem, charge, solve
from watchglass.chemistry.moving import acid_to_move_amine, base_to_move_acid
from watchglass.chemistry.partition import share_in_organic, share_left
from watchglass.chemistry.reagents import volume_to_ph, with_reagent
from watchglass.chemistry.titration import equivalence_points

PKAS = st.lists(st.floats(-3, 15), max_size=4).map(lambda found: tuple(sorted(found)))
AMOUNTS = st.one_of(st.just(0.0), st.floats(1e-9, 1.0))
RATIOS = st.one_of(st.just(0.0), st.floats(1e-6, 1e6))
CAPS = st.one_of(st.none(), st.floats(1e-3, 1e4))
VOLUMES = st.floats(1e-6, 1e-2)
CHARGES = st.one_of(st.just(0.0), st.floats(-1e-2, 1e-2))
PHS = st.floats(*PH_RANGE)


@st.composite
def _families(draw: st.DrawFn) -> Family:
    pkas = draw(PKAS)
    # Mostly families with a neutral form, as most are; some are ions whatever the pH.
    top = draw(st.integers(-1, len(pkas) + 1))
    return Family(
        pkas=pkas,
        top=top,
        amount=draw(AMOUNTS) * 1e-2,
        ratio=draw(RATIOS),
        cap=draw(CAPS),
    )


@st.composite
def _systems(draw: st.DrawFn) -> PhaseSystem:
    return PhaseSystem(
        families=tuple(draw(st.lists(_families(), max_size=4))),
        strong=draw(CHARGES),
        aqueous=draw(VOLUMES),
        organic=draw(st.one_of(st.just(0.0), VOLUMES)),
    )


SYSTEMS = _systems()
LAW = settings(deadline=None, derandomize=True, max_examples=200)


def _size(system: PhaseSystem) -> float:
    """Give the charges that a balance is made of, mol: what a residual is small against."""
    ions = sum(f.amount * max(abs(f.top), abs(f.top - len(f.pkas))) for f in system.families)
    return abs(system.strong) + ions + system.aqueous * 1e-4


@given(SYSTEMS)
@LAW
def test_charge_balances_at_the_ph_found(system: PhaseSystem) -> None:
    found = solve(system).ph
    assume(found is not None)
    assert found is not None

    hydrogen, hydroxide = system.aqueous * 10 ** (3 - found), system.aqueous * 10 ** (found - 11)
    assert abs(charge(system, found)) <= 1e-10 * (_size(system) + hydrogen + hydroxide)


@given(SYSTEMS, PHS, PHS)
@LAW
def test_charge_falls_as_the_ph_rises(system: PhaseSystem, one: float, other: float) -> None:
    low, high = sorted((one, other))
    lower, higher = charge(system, high), charge(system, low)

    assert lower <= higher + 1e-12 * (_size(system) + abs(lower) + abs(higher))


@given(SYSTEMS)
@LAW
def test_amounts_are_conserved_with_what_has_left(system: PhaseSystem) -> None:
    found = solve(system)
    assume(found.ph is not None)

    there = [sum(part[:3]) for part in found.parts]  # type: ignore[arg-type]  # all are known
    assert there == pytest.approx(
        [family.amount for family in system.families], rel=1e-9, abs=1e-30
    )


@given(SYSTEMS)
@LAW
def test_no_part_is_below_nought_or_above_the_whole(system: PhaseSystem) -> None:
    found = solve(system)
    assume(found.ph is not None)

    shares = [
        (amount or 0.0) / family.amount
        for family, part in zip(system.families, found.parts, strict=True)
        if family.amount
        for amount in part[:3]
    ]
    assert all(0 <= share <= 1 + 1e-12 for share in shares)


@given(SYSTEMS)
@LAW
def test_neutral_form_is_at_or_below_its_cap(system: PhaseSystem) -> None:
    found = solve(system)
    over = [
        (family, part)
        for family, part in zip(system.families, found.parts, strict=True)
        if family.cap is not None and part.aqueous and part.fractions
        if 0 <= family.top <= len(family.pkas)
        if part.aqueous * part.fractions[family.top] > family.cap * system.aqueous * (1 + 1e-9)
    ]

    assert over == []


@given(SYSTEMS, st.floats(1e-3, 1e3))
@LAW
def test_twice_of_everything_changes_no_ph_and_no_share(system: PhaseSystem, scale: float) -> None:
    larger = PhaseSystem(
        families=tuple(f._replace(amount=f.amount * scale) for f in system.families),
        strong=system.strong * scale,
        aqueous=system.aqueous * scale,
        organic=system.organic * scale,
    )
    one, other = solve(system), solve(larger)
    assume(one.ph is not None)
    assert one.ph is not None

    assert other.ph == pytest.approx(one.ph, abs=1e-6)


@given(SYSTEMS, st.floats(1e-9, 1e-3))
@LAW
def test_acid_lowers_the_ph(system: PhaseSystem, acid: float) -> None:
    before, after = solve(system).ph, solve(system._replace(strong=system.strong - acid)).ph
    assume(before is not None and after is not None)
    assert before is not None
    assert after is not None

    assert after <= before + 1e-11


@given(SYSTEMS, st.permutations(range(4)))
@LAW
def test_order_of_the_families_does_not_count(system: PhaseSystem, order: list[int]) -> None:
    assume(len(system.families) == 4)
    turned = system._replace(families=tuple(system.families[place] for place in order))
    one, other = solve(system).ph, solve(turned).ph
    assume(one is not None)

    assert other == pytest.approx(one, abs=1e-6)


@given(SYSTEMS, st.integers(0, 3), RATIOS)
@LAW
def test_bounds_of_an_unknown_ratio_hold_the_ph_of_every_ratio(
    system: PhaseSystem, place: int, ratio: float
) -> None:
    assume(place < len(system.families))
    families = list(system.families)
    families[place] = families[place]._replace(ratio=None)
    unknown = solve(system._replace(families=tuple(families)))
    families[place] = families[place]._replace(ratio=ratio)
    known = solve(system._replace(families=tuple(families))).ph
    assume(known is not None)
    assert known is not None

    assert unknown.low - 1e-9 <= known <= unknown.high + 1e-9


@given(SYSTEMS, st.lists(_families(), max_size=2), st.floats(0, 13))
@LAW
def test_strong_reagent_reaches_every_ph_on_its_side(
    held: PhaseSystem, brought: list[Family], wanted: float
) -> None:
    # 10 mol/L of acid or base, whichever goes that way, with some families beside it.
    strong = -10.0 if charge(held, wanted) > 0 else 10.0
    reagent = PhaseSystem(tuple(f._replace(amount=f.amount / 10) for f in brought), strong, 1e-3)
    volume = volume_to_ph(held, reagent, wanted)
    assert volume is not None
    system = with_reagent(held, reagent, volume)

    hydrogen, hydroxide = system.aqueous * 10 ** (3 - wanted), system.aqueous * 10 ** (wanted - 11)
    assert abs(charge(system, wanted)) <= 1e-9 * (_size(system) + hydrogen + hydroxide)


@given(
    st.floats(1e-5, 1e-2),
    st.floats(2, 12),
    st.floats(1, 1e4),
    st.floats(0.1, 10),
    st.floats(0.01, 0.999),
)
@LAW
def test_acid_that_is_told_moves_its_share(
    amount: float, pka: float, ratio: float, volumes: float, share: float
) -> None:
    water = 2e-5
    acid = acid_to_move_amine(
        amount=amount, pka=pka, ratio=ratio, organic=water * volumes, aqueous=water, share=share
    )
    assume(acid is not None)
    assert acid is not None
    amine = Family((pka,), 1, amount, ratio)
    part = solve(PhaseSystem((amine,), -acid.amount, water, water * volumes)).parts[0]

    assert part.aqueous is not None
    # More than the share only where water alone does it.
    assert part.aqueous >= share * amount * (1 - 1e-6)
    assert acid.amount == 0 or part.aqueous == pytest.approx(share * amount, rel=1e-6)


@given(st.floats(1e-5, 1e-2), st.floats(2, 12), st.floats(1, 1e4), st.floats(0.1, 10))
@LAW
def test_larger_share_takes_more_base(
    amount: float, pka: float, ratio: float, volumes: float
) -> None:
    few, many = (
        base_to_move_acid(
            amount=amount, pka=pka, ratio=ratio, organic=2e-5 * volumes, aqueous=2e-5, share=share
        )
        for share in (0.90, 0.99)
    )
    assume(few is not None and many is not None)
    assert few is not None
    assert many is not None

    assert few.amount <= many.amount


@given(st.floats(0, 1e4), st.floats(1e-6, 1), st.floats(1e-6, 1), st.integers(1, 20))
@LAW
def test_several_portions_leave_no_more_than_one(
    ratio: float, volume: float, layer: float, count: int
) -> None:
    one = share_left(ratio=ratio, portions=[volume], layer=layer)
    several = share_left(ratio=ratio, portions=[volume / count] * count, layer=layer)

    assert several <= one * (1 + 1e-12)


@given(st.floats(0, 1e6), VOLUMES, VOLUMES)
@LAW
def test_what_one_layer_lacks_the_other_has(ratio: float, organic: float, aqueous: float) -> None:
    taken = share_in_organic(ratio=ratio, organic=organic, aqueous=aqueous)

    assert taken + share_left(ratio=ratio, portions=[organic], layer=aqueous) == pytest.approx(1.0)


@given(PKAS, PHS)
@LAW
def test_fractions_add_up_to_one(pkas: tuple[float, ...], ph: float) -> None:
    fractions = state_fractions(pkas, ph)

    assert sum(fractions) == pytest.approx(1.0)
    assert all(0 <= fraction <= 1 for fraction in fractions)


@given(PKAS, st.integers(-1, 5), PHS, PHS)
@LAW
def test_mean_charge_falls_as_the_ph_rises(
    pkas: tuple[float, ...], top: int, one: float, other: float
) -> None:
    low, high = sorted((one, other))

    assert mean_charge(pkas, top, high) <= mean_charge(pkas, top, low) + 1e-12


@given(st.floats(3, 9), st.floats(1e-4, 1e-2))
@LAW
def test_slope_of_a_titration_is_steepest_beside_its_equivalence_point(
    pka: float, amount: float
) -> None:
    held = PhaseSystem((Family((pka,), 0, amount),), 0.0, 50e-6)
    alkali = PhaseSystem((), 1.0, 1e-3)
    points = equivalence_points(held, alkali)
    assert points is not None
    (point,) = points
    half = volume_to_ph(held, alkali, pka)

    assert point.volume == pytest.approx(amount / 1e3)
    assert point.ph is not None
    assert point.ph > max(pka, 7.0)
    assert point.jump is not None
    assert half is None or half <= point.volume
    assert math.isfinite(point.jump)
