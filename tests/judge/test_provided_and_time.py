"""What is provided against what is taken, volumes without density, time against the period."""

from __future__ import annotations

import pytest

from builders import faults, judged, places

VESSEL = "vessels: {A: beaker 100 mL}\n"


def told(materials: str, body: str, more: str = "") -> list[tuple[str, str]]:
    entry = judged(body, f"materials: {{x: {materials}}}\n{VESSEL}{more}")
    return [tuple(place) for place in places(faults(entry))]


@pytest.mark.parametrize(
    ("provided", "taken", "exceeded"),
    [
        ("2.0 g", "{2.0 g x -> A}", False),
        ("2.0 g", "{2.1 g x -> A}", True),
        ("2.0 g", "{1.0 g x -> A} {again 1}", False),
        ("2.0 g", "{1.1 g x -> A} {again 1}", True),
        ("2.0 g", "{all x -> A}", False),
        ("2.0 g for the class", "{9.0 g x -> A}", False),
        ("2.0 g", "{1.5–2.5 g x -> A}", True),
    ],
)
def test_more_taken_than_provided_is_found_at_what_is_provided(
    provided: str, taken: str, *, exceeded: bool
) -> None:
    found = told(f"{{is: sodium chloride, provided: {provided}}}", f"1. Take {taken}.")

    assert found == ([("S111", provided)] if exceeded else [])


@pytest.mark.parametrize(("provided", "exceeded"), [("4.0 g", False), ("3.9 g", True)])
def test_a_volume_taken_is_held_to_a_mass_provided_by_the_density(
    provided: str, *, exceeded: bool
) -> None:
    # 5.0 mL of ethanol of 0.7903 g/mL are 3.95 g
    found = told(f"{{is: ethanol, provided: {provided}}}", "1. Take {5.0 mL x -> A}.")

    assert found == ([("S111", provided)] if exceeded else [])


@pytest.mark.parametrize(("provided", "exceeded"), [("12 g", False), ("11 g", True)])
@pytest.mark.parametrize(
    "material",
    ["36 % w/w hydrochloric acid", "40 % w/w sucrose, density: 1.18 g/mL"],
)
def test_volume_of_a_solution_is_held_to_a_mass_provided_by_its_own_density(
    material: str, provided: str, *, exceeded: bool
) -> None:
    # 10 mL of 1.179 or 1.18 g/mL are 11.8 g
    found = told(f"{{is: {material}, provided: {provided}}}", "1. Take {10.0 mL x -> A}.")

    assert found == ([("S111", provided)] if exceeded else [])


def test_all_of_what_nobody_provides_is_found() -> None:
    assert told("sodium chloride", "1. Take {all x -> A}.") == [("S112", "all x")]


@pytest.mark.parametrize(
    ("material", "code"),
    [
        ("sodium chloride", "S110"),
        ("ethanol", ""),
        ("1.0 M hydrochloric acid", ""),
        ("{contains: {benzoic-acid: 1 g, naphthalene: 1 g}}", "S110"),
        ("{contains: {benzoic-acid: 1 g, naphthalene: 1 g}, density: 1.2 g/mL}", ""),
        ("{contains: {ethanol: 1 mol, water: 1 mol}}", ""),
    ],
)
def test_a_solid_measured_by_volume_has_no_amount(material: str, code: str) -> None:
    found = told(material, "1. Take {5 mL x -> A}.")

    assert [c for c, _ in found] == ([code] if code else [])


@pytest.mark.parametrize(
    ("time", "minutes", "over"),
    [
        ("30 min", "30", False),
        ("30 min", "31", True),
        ("0.5 h", "31", True),
        ("30 min", "20", False),
    ],
)
def test_steps_longer_than_the_period_are_found(time: str, minutes: str, *, over: bool) -> None:
    found = told(
        "water", f"1. Take {{5 mL x -> A}} and {{stir A for {minutes} min}}.", f"time: {time}\n"
    )

    assert found == ([("N195", time)] if over else [])


def test_one_figure_is_the_time_of_each_period() -> None:
    body = "1. Take {5 mL x -> A}.\n2. {stir A for 20 min; next period}\n3. {stir A for 40 min}"

    assert told("water", body, "time: 30 min\n") == [("N195", "30 min")]
    assert told("water", body, "time: [30 min, 45 min]\n") == []


def test_repeated_steps_count_each_time() -> None:
    body = "1. Take {5 mL x -> A} and {stir A for 10 min}.\n2. {again 1, 2 more times}."

    assert told("water", body, "time: 29 min\n") == [("N195", "29 min")]
    assert told("water", body, "time: 30 min\n") == []
