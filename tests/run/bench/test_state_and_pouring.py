"""Pouring and drawing: shares, volumes, temperatures and what is still known afterwards.

A made-up vessel of round figures; every expectation is a sum or a share done in the head.
"""

from __future__ import annotations

import pytest

from bench_runner import knowledge
from run.bench.shelf import near
from watchglass.run.bench.bringing import Brought
from watchglass.run.bench.pouring import Drawn, draw, drawn_from, pour
from watchglass.run.bench.state import EMPTY, Bench, Phase, Sink, Vessel, added

KNOWN = knowledge()
WATER = Phase({"water": 1.0, "Na^+": 0.2, "Cl^-": 0.2}, 20e-6)
ETHER = Phase({"diethyl-ether": 0.5}, 50e-6)
FULL = Vessel(
    "A",
    aqueous=WATER,
    organic=ETHER,
    solid={"sodium-chloride": 0.4},
    temperature=300.0,
    ph=7.0,
    unknown=frozenset({"sample"}),
    doubt=frozenset({"benzocaine"}),
    used=True,
)


# ---------------------------------------------------------------- sums


def test_amounts_of_one_kind_add_and_others_stand_beside() -> None:
    assert added({"a": 1.0, "b": 2.0}, {"b": 3.0, "c": 4.0}) == {"a": 1.0, "b": 5.0, "c": 4.0}


def test_amounts_may_be_taken_away_and_what_cancels_is_gone() -> None:
    assert added({"a": 1.0, "b": 2.0}, {"a": 1.0, "b": 0.5}, -1.0) == {"b": 1.5}


@pytest.mark.parametrize(("rest", "kept"), [(1e-15, False), (3e-15, True), (-3e-15, True)])
def test_what_is_below_the_trace_is_dropped(rest: float, *, kept: bool) -> None:
    assert ("a" in added({}, {"a": rest})) is kept


def test_sums_leave_what_they_are_made_of_alone() -> None:
    one = {"a": 1.0}
    added(one, {"a": 1.0})

    assert one == {"a": 1.0}


# ---------------------------------------------------------------- one layer


def test_quarter_of_a_layer_is_a_quarter_of_everything() -> None:
    part = WATER.share(0.25)

    assert part.amounts == near({"water": 0.25, "Na^+": 0.05, "Cl^-": 0.05})
    assert part.volume == near(5e-6)


@pytest.mark.parametrize("more", [1.0, 1.5])
def test_no_more_than_the_whole_layer_is_taken(more: float) -> None:
    assert WATER.share(more) is WATER


@pytest.mark.parametrize("less", [0.0, -0.5])
def test_nothing_of_a_layer_is_no_layer(less: float) -> None:
    assert WATER.share(less) == EMPTY


def test_layers_poured_together_add_amounts_and_volumes() -> None:
    both = WATER.plus(Phase({"water": 2.0}, 30e-6))

    assert both.amounts == {"water": 3.0, "Na^+": 0.2, "Cl^-": 0.2}
    assert both.volume == near(50e-6)


def test_empty_layer_adds_nothing_on_either_side() -> None:
    assert WATER.plus(EMPTY) is WATER
    assert EMPTY.plus(WATER) is WATER


# ---------------------------------------------------------------- vessels and sinks


def test_vessel_of_a_material_of_unknown_amount_is_not_empty() -> None:
    assert Vessel("A").empty
    assert not Vessel("A", unknown=frozenset({"sample"})).empty
    assert not Vessel("A", solid={"sodium-chloride": 1.0}).empty
    assert not Vessel("A", organic=ETHER).empty
    assert not Vessel("A", aqueous=WATER).empty


def test_volume_of_a_vessel_is_that_of_both_layers() -> None:
    assert FULL.volume == near(70e-6)


def test_emptied_vessel_keeps_its_place_and_forgets_its_contents() -> None:
    standing = FULL._replace(
        capacity=1e-4, closure="stoppered", place="hood", bath="ice", mixed=False, settled=False,
        remains="upper",
    )  # fmt: skip

    assert standing.emptied() == Vessel(
        "A",
        capacity=1e-4,
        closure="stoppered",
        place="hood",
        bath="ice",
        temperature=300.0,
        used=True,
    )


def test_vessel_never_declared_is_empty_and_without_size() -> None:
    assert Bench({}).vessel("tray") == Vessel("tray")


def test_changed_vessel_takes_the_place_of_the_old_one_only() -> None:
    bench = Bench({"A": FULL, "B": Vessel("B")}).with_vessels(Vessel("B", ph=3.0))

    assert bench.vessel("A") is FULL
    assert bench.vessel("B").ph == 3.0


def test_sink_gathers_what_is_let_go_into_it() -> None:
    bench = Bench({}).to_sink("waste", liquids=(WATER, ETHER), unknown=frozenset({"a"}))
    bench = bench.to_sink("waste", liquids=(WATER,), solids={"silica": 2.0})
    bench = bench.to_sink("waste", solids={"silica": 1.0}, unknown=frozenset({"b"}))

    assert bench.sinks["waste"] == Sink(
        {"water": 2.0, "Na^+": 0.4, "Cl^-": 0.4, "diethyl-ether": 0.5},
        {"silica": 3.0},
        near(90e-6),
        frozenset({"a", "b"}),
    )


def test_sinks_are_kept_apart() -> None:
    bench = Bench({}).to_sink("one", solids={"silica": 1.0}).to_sink("other", liquids=(ETHER,))

    assert bench.sinks["one"].liquids == {}
    assert bench.sinks["other"].solids == {}


# ---------------------------------------------------------------- drawing


def test_half_of_everything_leaves_the_other_half() -> None:
    left, taken = draw(FULL, "", 0.5)

    assert taken.aqueous.volume == near(10e-6)
    assert taken.organic.amounts == {"diethyl-ether": 0.25}
    assert taken.solid == {"sodium-chloride": 0.2}
    assert left.aqueous.amounts == near({"water": 0.5, "Na^+": 0.1, "Cl^-": 0.1})
    assert left.organic.volume == near(25e-6)
    assert left.solid == {"sodium-chloride": 0.2}


def test_all_that_is_drawn_leaves_an_empty_vessel() -> None:
    left, taken = draw(FULL, "")

    assert left == FULL.emptied()
    assert taken == Drawn(
        WATER, ETHER, {"sodium-chloride": 0.4}, FULL.unknown, FULL.doubt, 300.0, 7.0, True
    )


@pytest.mark.parametrize(
    ("part", "volume", "solid"),
    [("aqueous", 20e-6, 0.0), ("organic", 50e-6, 0.0), ("liquid", 70e-6, 0.0), ("solid", 0.0, 0.4)],
)
def test_part_is_drawn_and_the_others_stay(part: str, volume: float, solid: float) -> None:
    left, taken = draw(FULL, part)

    assert taken.volume == near(volume)
    assert sum(taken.solid.values()) == near(solid)
    assert left.volume == near(70e-6 - volume)
    assert sum(left.solid.values()) == near(0.4 - solid)


def test_ph_goes_with_the_water_and_is_kept_where_water_is_left() -> None:
    without, _ = draw(FULL, "aqueous")
    some, _ = draw(FULL, "aqueous", 0.5)

    assert without.ph is None
    assert some.ph == 7.0


def test_nothing_drawn_changes_nothing() -> None:
    left, taken = draw(FULL, "aqueous", 0.0)

    assert left == FULL
    assert not taken.aqueous


# ---------------------------------------------------------------- pouring


def test_nothing_poured_leaves_a_clean_vessel_clean() -> None:
    clean = Vessel("A")

    assert pour(clean, Drawn(), KNOWN) is clean


def test_ph_is_still_known_in_a_vessel_that_was_empty() -> None:
    alone = pour(Vessel("B"), Drawn(WATER, ph=3.0), KNOWN)
    together = pour(Vessel("B", aqueous=WATER, ph=7.0), Drawn(WATER, ph=3.0), KNOWN)

    assert (alone.ph, alone.mixed, alone.used) == (3.0, True, True)
    assert (together.ph, together.mixed, together.used) == (None, False, True)


def test_liquid_that_was_not_mixed_is_not_mixed_by_pouring() -> None:
    assert not pour(Vessel("B"), Drawn(WATER, mixed=False), KNOWN).mixed


def test_what_is_not_known_of_either_is_not_known_of_both() -> None:
    held = Vessel("B", aqueous=WATER, unknown=frozenset({"a"}), doubt=frozenset({"x"}))
    coming = Drawn(WATER, unknown=frozenset({"b"}), doubt=frozenset({"y"}))
    both = pour(held, coming, KNOWN)

    assert both.unknown == {"a", "b"}
    assert both.doubt == {"x", "y"}


def test_layer_left_alone_is_forgotten_once_something_is_poured_to_it() -> None:
    left = Vessel("B", organic=ETHER, remains="upper")

    assert pour(left, Drawn(ETHER), KNOWN).remains == ""


def test_solids_add() -> None:
    held = Vessel("B", solid={"sodium-chloride": 0.1, "silica": 1.0})
    both = pour(held, Drawn(solid={"sodium-chloride": 0.4}), KNOWN)

    assert both.solid == {"sodium-chloride": 0.5, "silica": 1.0}


def test_temperatures_mix_by_volume() -> None:
    # 20 mL at 290 K and 60 mL at 330 K: 320 K.
    held = Vessel("B", aqueous=WATER, temperature=290.0)
    coming = Drawn(Phase({"water": 3.0}, 60e-6), temperature=330.0)

    assert pour(held, coming, KNOWN).temperature == near(320.0)


def test_bath_holds_the_temperature_of_what_is_in_it() -> None:
    held = Vessel("B", aqueous=WATER, temperature=273.15, bath="ice")

    assert pour(held, Drawn(WATER, temperature=330.0), KNOWN).temperature == 273.15


def test_empty_vessel_takes_the_temperature_of_what_comes() -> None:
    clean = Vessel("B", temperature=290.0)

    assert pour(clean, Drawn(WATER, temperature=330.0), KNOWN).temperature == 330.0
    assert pour(clean, Drawn(solid={"silica": 1.0}, temperature=330.0), KNOWN).temperature == 330.0


def test_solids_bring_no_heat_to_what_is_there() -> None:
    held = Vessel("B", aqueous=WATER, temperature=290.0)

    assert pour(held, Drawn(solid={"silica": 1.0}, temperature=330.0), KNOWN).temperature == 290.0


def test_solids_alone_take_the_temperature_of_a_liquid_poured_on() -> None:
    held = Vessel("B", solid={"silica": 1.0}, temperature=290.0)

    assert pour(held, Drawn(WATER, temperature=330.0), KNOWN).temperature == 330.0


def test_portion_of_an_aqueous_solution_is_not_in_equilibrium_yet() -> None:
    brought = Brought(WATER, {"silica": 1.0}, frozenset({"sample"}))
    drawn = drawn_from(brought, 280.0, KNOWN)

    assert drawn == Drawn(
        WATER, EMPTY, {"silica": 1.0}, frozenset({"sample"}), temperature=280.0, mixed=False
    )


def test_portion_of_a_solvent_makes_the_other_layer_and_needs_no_mixing() -> None:
    drawn = drawn_from(Brought(ETHER), 280.0, KNOWN)

    assert (drawn.aqueous, drawn.organic, drawn.mixed) == (EMPTY, ETHER, True)
