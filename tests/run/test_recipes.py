"""Recipes of stocks: the masses and volumes, what they are measured with, and the cautions."""

from __future__ import annotations

import re

import pytest
from hypothesis import given
from hypothesis import strategies as st

from builders import surroundings
from watchglass.run.recipes import (
    COMMERCIAL,
    Care,
    MakeUp,
    Measure,
    Recipe,
    Unknown,
    Weigh,
    recipe,
)


def made(
    material: str,
    *,
    contains: str = "",
    makes: str = "",
    laboratory: str = "",
    more: str = "",
    other: str = "",
) -> Recipe:
    """Work out the recipe of one stock."""
    said = f"material: {material}" if material else f"contains: {contains}"
    stock = f"stock:\n  {said}\n"
    stock += (f"  makes: {makes}\n" if makes else "") + (f"  {more}\n" if more else "")
    around = surroundings({"stocks.yml": stock + other, "laboratory.yml": laboratory or "{}"})
    catalogue = around.catalogue
    return recipe(catalogue.stocks["stock"], catalogue, around.laboratory)


def only(found: Recipe, kind: type[Weigh | Measure]) -> Weigh | Measure:
    """Give the one line of a kind."""
    (line,) = (line for line in found.lines if isinstance(line, kind))
    return line


def cares(found: Recipe) -> str:
    return "; ".join(line.text for line in found.lines if isinstance(line, Care))


# ---------------------------------------------------------------- masses and volumes


def test_solid_is_weighed_and_made_up() -> None:
    # 0.1 mol of 58.44 g/mol.
    found = made("0.10 M sodium chloride")

    weighed = only(found, Weigh)
    assert weighed.text == "5.84 g"
    assert weighed.exact == pytest.approx(5.844e-3, rel=1e-4)
    assert found.lines[-1] == MakeUp("water", "1 L", "")


def test_hydrate_that_is_owned_is_weighed_in_place_of_the_anhydrous_salt() -> None:
    # "weigh_hydrate" of the published cases: 25.0 mL of 0.100 M from CuSO4·5H2O, 249.68 g/mol.
    laboratory = "reagents: [copper(II) sulfate pentahydrate]\nbalance: 0.0001 g\n"
    found = made("0.100 M copper(II) sulfate", makes="250 mL", laboratory=laboratory)

    weighed = only(found, Weigh)
    assert "pentahydrate" in weighed.name
    assert weighed.text == "6.242 g"


@pytest.mark.parametrize(
    ("label", "volume"),
    [
        # OpenStax Chemistry 2e, ch. 3: 5.00 L of 0.100 M from a stock of 1.59 M takes 0.314 L.
        ("1.59 M potassium hydroxide", 0.3145e-3),
    ],
)
def test_stock_is_diluted_from_a_stronger_one(label: str, volume: float) -> None:
    found = made(
        "0.100 M potassium hydroxide",
        makes="5.00 L",
        more="from: strong",
        other=f"strong:\n  material: {label}\n",
    )

    assert only(found, Measure).exact == pytest.approx(volume, rel=2e-3)
    assert only(found, Measure).name == "strong"


def test_acid_is_diluted_from_the_label_of_the_bottle_owned() -> None:
    # 37 % w/w is 12.0 M with the tabulated density; a 31 % bottle is weaker, so more is taken.
    strong = only(made("1.0 M hydrochloric acid"), Measure)
    weak = only(
        made("1.0 M hydrochloric acid", laboratory="reagents: [31 % w/w hydrochloric acid]"),
        Measure,
    )

    assert strong.exact == pytest.approx(83.2e-6, rel=5e-3)
    assert strong.text == "83.0 mL"
    assert weak.exact > 1.2 * strong.exact


def test_usual_strength_is_named_as_an_assumption() -> None:
    assert any("37 % w/w" in said for said in made("1.0 M hydrochloric acid").assumptions)
    owned = made("1.0 M hydrochloric acid", laboratory="reagents: [37 % w/w hydrochloric acid]")
    assert not any("usual strength" in said for said in owned.assumptions)


@pytest.mark.parametrize("key", COMMERCIAL)
def test_every_usual_reagent_is_worked_out(key: str) -> None:
    assert isinstance(only(made(f"1.0 M {key}"), Measure), Measure)


def test_liquid_solute_is_measured_by_its_density() -> None:
    found = made("1.0 M acetone in water")

    # 58.08 g/mol over 0.784 g/mL.
    assert only(found, Measure).exact == pytest.approx(74e-6, rel=0.01)


def test_saturated_solution_has_solid_left() -> None:
    found = made("saturated sodium chloride")

    weighed, water = only(found, Weigh), only(found, Measure)
    # 35.9 g in 100 g of water near 20 °C (handbook value in the catalogue), a tenth more.
    assert weighed.mass / (water.volume * 998.2) == pytest.approx(0.359 * 1.1, rel=0.02)
    assert "some solid must lie" in cares(found)


def test_mixture_by_volume_is_measured_part_by_part() -> None:
    found = made("", contains="{hexane: 3 mL, ethyl acetate: 1 mL}", makes="1 L")
    measured = [line for line in found.lines if isinstance(line, Measure)]

    assert [(m.name, m.text) for m in measured] == [
        ("hexane", "750 mL"),
        ("ethyl acetate", "250 mL"),
    ]


def test_several_solutes_are_weighed_into_one_solvent() -> None:
    found = made(
        "", contains="{sodium chloride: 0.10 M, sucrose: 0.050 M}", more="in: water", makes="2 L"
    )

    assert [(w.name, w.text) for w in found.lines if isinstance(w, Weigh)] == [
        ("sodium chloride", "11.69 g"),
        ("sucrose", "34.23 g"),
    ]
    assert found.lines[-1] == MakeUp("water", "2 L", "")


def test_share_by_mass_without_density_is_made_by_mass() -> None:
    found = made("10 % w/w malonic acid", makes="500 mL")
    weighed = [line for line in found.lines if isinstance(line, Weigh)]

    assert [(w.name, w.text) for w in weighed] == [
        ("malonic acid", "50.00 g"),
        ("water", "450.0 g"),
    ]
    assert any("by mass" in said for said in found.assumptions)


# ---------------------------------------------------------------- what cannot be told


@pytest.mark.parametrize(
    ("material", "more"),
    [
        ("1.0 M hydrogen sulfide", ""),
        ("1.0 M sodium chloride", "from: nowhere"),
        ("0.000 M sodium chloride", ""),
        ("1.0 M unheard-of salt", ""),
    ],
)
def test_what_cannot_be_worked_out_says_so(material: str, more: str) -> None:
    found = made(material, more=more)

    assert any(isinstance(line, Unknown) and line.why for line in found.lines)
    assert found.reached is None


def test_pure_substance_is_used_as_bought() -> None:
    assert "as it is bought" in cares(made("acetone"))


# ---------------------------------------------------------------- cautions


def test_acid_goes_into_water_when_it_is_concentrated() -> None:
    said = cares(made("3.0 M hydrochloric acid"))

    assert "hood" in said
    assert "never water into acid" in said
    assert "half of the water in first" in said


def test_weak_stock_needs_no_hood() -> None:
    found = made(
        "1.0 M hydrochloric acid",
        more="from: strong",
        other="strong:\n  material: 3.0 M hydrochloric acid\n",
    )

    assert "hood" not in cares(found)
    assert "half" not in cares(found)


def test_sulfuric_acid_is_cooled() -> None:
    assert "ice bath" in cares(made("1.0 M sulfuric acid"))


@pytest.mark.parametrize(("strength", "cooled"), [("3.0 M", True), ("0.10 M", False)])
def test_hydroxide_is_cooled_when_it_is_strong(strength: str, cooled: bool) -> None:
    assert ("ice bath" in cares(made(f"{strength} sodium hydroxide"))) is cooled


def test_acid_comes_after_its_cautions_and_before_the_water() -> None:
    lines = made("3.0 M hydrochloric acid").lines
    kinds = [type(line) for line in lines]

    assert kinds.index(Care) < kinds.index(Measure) < kinds.index(MakeUp)


# ---------------------------------------------------------------- what it is measured with


def test_volumetric_flask_is_named_where_one_is_owned_and_figures_ask_for_it() -> None:
    laboratory = "glassware:\n  volumetric flask 250 mL: 4\n"
    exact = made("0.1000 M sodium chloride", makes="250 mL", laboratory=laboratory)
    rough = made("0.10 M sodium chloride", makes="250 mL", laboratory=laboratory)

    assert exact.lines[-1] == MakeUp("water", "250 mL", "volumetric flask 250 mL")
    assert rough.lines[-1] == MakeUp("water", "250 mL", "")


def test_measured_volume_is_one_that_its_ware_can_give() -> None:
    measured = only(made("1.0 M hydrochloric acid", makes="2 L"), Measure)

    assert isinstance(measured, Measure)
    size = float(re.findall(r"([\d.]+) mL", measured.ware)[0])
    assert measured.volume * 1e6 <= size


# ---------------------------------------------------------------- laws


@given(
    molarity=st.floats(0.05, 3.0).map(lambda x: f"{x:.3g}"),
    litres=st.integers(1, 10),
)
def test_exact_masses_grow_with_strength_and_volume(molarity: str, litres: int) -> None:
    one = only(made(f"{molarity} M sodium chloride"), Weigh)
    many = only(made(f"{molarity} M sodium chloride", makes=f"{litres} L"), Weigh)

    assert many.exact == pytest.approx(litres * one.exact, rel=1e-9)
    assert one.exact == pytest.approx(float(molarity) * 58.44e-3, rel=1e-3)


@given(molarity=st.floats(0.05, 5.0).map(lambda x: f"{x:.2g}"), litres=st.integers(1, 5))
def test_what_is_reached_is_what_is_measured(molarity: str, litres: int) -> None:
    found = made(f"{molarity} M hydrochloric acid", makes=f"{litres} L")
    measured = only(found, Measure)

    assert isinstance(measured, Measure)
    assert found.reached == pytest.approx(measured.volume / measured.exact, rel=1e-9)
    assert abs((found.reached or 0) - 1) <= 0.02


@given(grams=st.floats(1e-3, 900.0))
def test_mass_is_a_whole_number_of_the_steps_of_the_balance(grams: float) -> None:
    found = made(f"{grams:.3g} % w/v sucrose", makes="100 mL")
    for line in found.lines:
        if isinstance(line, Weigh):
            steps = line.mass / 1e-5
            assert steps == pytest.approx(round(steps), abs=1e-6)
            assert float(line.text.removesuffix(" g")) == pytest.approx(line.mass * 1e3, abs=1e-9)
