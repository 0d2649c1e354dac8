"""What measuring ware can give, held to the tables of the standards and to how ware is read."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from watchglass.base.spans import Source
from watchglass.base.yaml import YamlMapping, YamlText, read_yaml
from watchglass.catalogue.measuring import Reach, finest_place, nearest, reach, rows
from watchglass.catalogue.ware import read_vessel
from watchglass.shell.shipped import shipped

if TYPE_CHECKING:
    from watchglass.catalogue.glassware import GlasswareType, VesselType
    from watchglass.catalogue.measuring import Row

TYPES = {ware.key: ware for ware in shipped().glassware.values()}
EVERY_ROW = [(ware, row) for ware in TYPES.values() for row in rows(ware.marks)]


def vessel(words: str) -> VesselType:
    node, _ = read_yaml(Source.of("vessels", f"one: {words}\n"))
    assert isinstance(node, YamlMapping)
    value = node.entries[0].value
    assert isinstance(value, YamlText)
    found, findings = read_vessel(value, shipped().glassware)
    assert findings == ()
    assert found is not None
    return found


def reached(words: str) -> Reach:
    found = reach(vessel(words))
    assert found is not None
    return found


# ASTM E1272-02(2012), table read; class A of ISO 385 and of ISO 648 as read in makers' guides
@pytest.mark.parametrize(
    ("words", "tolerance"),
    [
        ("graduated cylinder 10 mL, class A", 0.10e-6),
        ("graduated cylinder 25 mL, class A", 0.17e-6),
        ("graduated cylinder 25 mL, class B", 0.34e-6),
        ("graduated cylinder 250 mL, class B", 2.0e-6),
        ("burette 50 mL, class A", 0.05e-6),
        ("transfer pipette 25 mL, class A", 0.03e-6),
        ("volumetric flask 100 mL, class B", 0.16e-6),
        ("graduated pipette 10 mL, class B", 0.1e-6),
    ],
)
def test_tolerance_is_that_of_the_standard(words: str, tolerance: float) -> None:
    assert reached(words).tolerance == pytest.approx(tolerance)


# how finely ware is read: common practice, no source
@pytest.mark.parametrize(
    ("words", "place"),
    [
        ("graduated cylinder 5 mL", -2),
        ("graduated cylinder 10 mL", -1),
        ("graduated cylinder 25 mL", -1),
        ("graduated cylinder 100 mL", -1),
        ("graduated cylinder 250 mL", 0),
        ("burette 50 mL", -2),
        ("burette 50 mL, class B", -2),
        ("transfer pipette 25 mL", -2),
        ("volumetric flask 100 mL, class B", -1),
        ("volumetric flask 250 mL", -1),
        ("graduated pipette 10 mL", -2),
        ("micropipette 0.2 mL", -3),
        ("syringe 10 mL", -1),
        ("beaker 250 mL", 1),
    ],
)
def test_last_digit_is_what_can_be_read_and_the_tolerance_leaves(words: str, place: int) -> None:
    assert finest_place(reached(words)) == place


def test_without_a_class_the_finer_class_counts() -> None:
    assert reached("volumetric flask 100 mL") == reached("volumetric flask 100 mL, class A")


def test_source_names_standard_and_class_and_how_it_is_known() -> None:
    assert (
        reached("graduated cylinder 25 mL, class B").source
        == "ASTM E1272-02(2012), class B, read in the standard"
    )


@pytest.mark.parametrize(
    ("words", "fixed"),
    [
        ("transfer pipette 10 mL", True),
        ("volumetric flask 100 mL", True),
        ("micropipette 1 mL", False),
        ("burette 25 mL", False),
        ("beaker 20 mL", False),
    ],
)
def test_ware_with_one_mark_is_known(words: str, *, fixed: bool) -> None:
    found = reached(words)

    assert found.fixed is fixed
    assert (found.least == found.most) is fixed


@pytest.mark.parametrize(
    "words",
    [
        "round-bottom flask 100 mL",
        "separatory funnel 125 mL",
        "graduated cylinder",
        "watch glass 75 mm",
    ],
)
def test_nothing_is_said_of_what_does_not_measure_or_has_no_size(words: str) -> None:
    assert reach(vessel(words)) is None


@pytest.mark.parametrize(
    ("words", "asked", "given"),
    [
        ("graduated cylinder 50 mL", 22.3e-6, 22.5e-6),
        ("graduated cylinder 50 mL", 0.1e-6, 0.5e-6),
        ("burette 50 mL", 12.347e-6, 12.34e-6),
        ("transfer pipette 25 mL", 37.6e-6, 50e-6),
        ("transfer pipette 25 mL", 3e-6, 25e-6),
    ],
)
def test_nearest_volume_is_whole_steps_or_fillings(words: str, asked: float, given: float) -> None:
    assert nearest(asked, reached(words)) == pytest.approx(given, rel=1e-9)


@pytest.mark.parametrize(
    ("ware", "row"),
    EVERY_ROW,
    ids=[f"{w.key} {r.size:g} {r.class_} {r.standard}" for w, r in EVERY_ROW],
)
def test_every_row_of_the_table_is_of_a_size_made_and_plausible(
    ware: GlasswareType, row: Row
) -> None:
    assert row.size in ware.sizes
    assert row.class_ in ("", "A", "B")
    assert row.trust in ("R", "R2", "M", "J")
    assert 0 < row.tolerance <= 0.1 * row.size
    assert row.graduation is None or 0 < row.graduation <= row.size / 2


@pytest.mark.parametrize("key", sorted(key for key, ware in TYPES.items() if ware.measures))
def test_every_type_that_measures_has_rows_or_is_known_to_have_none(key: str) -> None:
    assert bool(TYPES[key].marks) is (key != "dispenser")


@pytest.mark.parametrize(
    ("one", "other"),
    [
        ("conical flask 250 mL", "Erlenmeyer flask 250 mL"),
        ("measuring cylinder 50 mL", "graduated cylinder 50 mL"),
        ("separating funnel 125 mL", "separatory funnel 125 mL"),
        ("bulb pipette 25 mL", "transfer pipette 25 mL"),
        ("Mohr pipette 10 mL", "graduated pipette 10 mL"),
        ("addition funnel 60 mL", "dropping funnel 60 mL"),
        ("Buchner funnel 60 mm", "Büchner funnel 60 mm"),
        ("suction flask 250 mL", "filter flask 250 mL"),
        ("buret 50 mL", "burette 50 mL"),
        ("transfer pipet 25 mL", "volumetric pipette 25 mL"),
        ("three-necked round-bottom flask 250 mL", "round-bottom flask 250 mL"),
    ],
)
def test_two_names_of_the_trade_mean_one_type(one: str, other: str) -> None:
    assert vessel(one).type is vessel(other).type
