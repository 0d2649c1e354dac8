"""Dilution series: pairs of pipette and flask, step by step, and what their tolerances add up to."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from watchglass.chemistry.dilution import Dilution, NotReached, Piece, series

ML = 1e-6
#: Class A, ASTM E969-02 and E288-10, from memory.
PIPETTES = tuple(
    Piece(volume * ML, off * ML)
    for volume, off in ((1, 0.006), (5, 0.01), (10, 0.02), (25, 0.03), (50, 0.05))
)
FLASKS = tuple(
    Piece(volume * ML, off * ML)
    for volume, off in ((50, 0.05), (100, 0.08), (250, 0.12), (1000, 0.3))
)


def made(*targets: float, stock: float = 1.0, **more: float) -> tuple[Dilution | NotReached, ...]:
    return series(stock=stock, targets=targets, pipettes=PIPETTES, flasks=FLASKS, **more)  # type: ignore[arg-type]


def one(target: float, **more: float) -> Dilution:
    (found,) = made(target, **more)
    assert isinstance(found, Dilution)
    return found


def test_a_tenth_is_made_with_the_pair_of_the_smallest_tolerance() -> None:
    found = one(0.1)

    # 25 in 250: 0.12 + 0.048 %; 10 in 100: 0.20 + 0.08 %; 2 × 50 in 1000: 0.10 + 0.03 %.
    assert (found.fillings, found.pipette, found.flask) == (2, PIPETTES[4], FLASKS[3])
    assert found.tolerance == pytest.approx(0.001 + 0.0003, rel=1e-9)
    assert found.error == pytest.approx(0, abs=1e-9)


def test_two_fillings_make_a_fifth() -> None:
    # Dilution worked in OpenStax Chemistry 2e, ch. 3: 25.0 mL of 2.04 M in 500 mL is 0.102 M; here
    # the same ratio with what is owned: 50 mL in 1000 mL.
    found = one(0.102, stock=2.04)

    assert found.aliquot == pytest.approx(50 * ML)
    assert found.flask == FLASKS[3]


def test_no_smaller_flask_is_taken_than_is_needed() -> None:
    assert one(0.1, least=500 * ML).flask == FLASKS[3]


def test_what_no_pair_gives_is_made_from_a_solution_before_it() -> None:
    first, second, third = made(0.01, 0.1, 1e-4)

    assert isinstance(first, Dilution)
    assert isinstance(second, Dilution)
    assert isinstance(third, Dilution)
    assert (first.source, second.source) == (-1, -1)
    assert third.source == 0
    assert third.tolerance > first.tolerance


def test_tolerance_of_the_stock_is_carried_on() -> None:
    assert one(0.1, stock_tolerance=0.005).tolerance == pytest.approx(
        one(0.1).tolerance + 0.005, rel=1e-9
    )


def test_what_is_not_reached_has_the_nearest_that_is() -> None:
    (found,) = made(0.37)

    assert isinstance(found, NotReached)
    assert found.nearest is not None
    assert found.nearest.strength == pytest.approx(0.40)


def test_what_may_differ_is_taken() -> None:
    assert one(0.37, may_differ=0.1).strength == pytest.approx(0.40)


def test_stock_itself_and_what_is_stronger_are_not_reached() -> None:
    assert all(isinstance(found, NotReached) for found in made(1.0, 1.2))


def test_without_ware_there_is_no_nearest() -> None:
    (found,) = series(stock=1.0, targets=[0.1], pipettes=(), flasks=FLASKS)

    assert found == NotReached(0.1, None)


@pytest.mark.parametrize(
    "wrong",
    [
        {"stock": 0.0},
        {"targets": [0.0]},
        {"fillings": 0},
        {"may_differ": 0.0},
        {"stock_tolerance": -0.1},
    ],
)
def test_argument_out_of_range_is_refused(wrong: dict[str, object]) -> None:
    arguments = {"stock": 1.0, "targets": [0.1], "pipettes": PIPETTES, "flasks": FLASKS}

    with pytest.raises(ValueError, match=r"stock|strengths"):
        series(**(arguments | wrong))  # type: ignore[arg-type]


@given(
    pipette=st.sampled_from(PIPETTES),
    flask=st.sampled_from(FLASKS),
    stock=st.floats(1e-3, 1e3),
)
def test_every_pair_is_found_again(pipette: Piece, flask: Piece, stock: float) -> None:
    if pipette.volume >= flask.volume:
        return
    target = stock * pipette.volume / flask.volume
    found = one(target, stock=stock)

    assert found.strength == pytest.approx(target, rel=1e-6)
    assert found.tolerance <= (
        pipette.tolerance / pipette.volume + flask.tolerance / flask.volume + 1e-12
    )
