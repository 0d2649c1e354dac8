"""Recipes of stocks: the masses and volumes, what they are measured with, and the cautions."""

from __future__ import annotations

import re

import pytest
from hypothesis import given
from hypothesis import strategies as st

from builders import surroundings
from watchglass.catalogue.reagents import USUAL
from watchglass.chemistry.dilution import Dilution, NotReached
from watchglass.run.recipes import (
    Begin,
    Care,
    Dissolve,
    MakeUp,
    Measure,
    PrepRoom,
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


@pytest.mark.parametrize("key", USUAL)
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


def test_ammonia_of_a_buffer_is_measured_from_its_solution_and_not_weighed() -> None:
    found = made(
        "", contains="{ammonia: 0.50 M, ammonium chloride: 0.50 M}", more="in: water", makes="1 L"
    )

    # 0.5 mol of NH4Cl, 53.49 g/mol; 28 % w/w ammonia is 14.76 M (CRC Handbook, 20 °C).
    assert only(found, Weigh).text == "26.74 g"
    assert only(found, Measure).exact == pytest.approx(0.5 / 14.76 * 1e-3, rel=0.005)
    assert [type(line) for line in found.lines if not isinstance(line, Care)] == [
        Weigh,
        Dissolve,
        Measure,
        MakeUp,
    ]


BUFFER = "{sodium acetate: 1.0 M, acetic acid: 0.50 M}, in: water"


def test_buffer_is_diluted_as_a_whole() -> None:
    found = made(
        "",
        contains="{sodium acetate: 0.10 M, acetic acid: 0.050 M}",
        more="in: water\n  from: strong",
        other=f"strong: {{contains: {BUFFER}}}\n",
        makes="500 mL",
    )

    assert found.lines == (only(found, Measure), MakeUp("water", "500 mL", ""))
    assert only(found, Measure).text == "50.0 mL"


@pytest.mark.parametrize(
    "contains",
    [
        "{sodium acetate: 0.10 M, acetic acid: 0.10 M}",
        "{sodium acetate: 2.0 M, acetic acid: 1.0 M}",
        "{sodium acetate: 0.10 M, sodium chloride: 0.050 M}",
        "{sodium acetate: 0.10 M, acetic acid: 0.050 M, sodium chloride: 0.10 M}",
    ],
)
def test_buffer_that_is_not_the_other_made_weaker_is_not_worked_out(contains: str) -> None:
    found = made(
        "",
        contains=contains,
        more="in: water\n  from: strong",
        other=f"strong: {{contains: {BUFFER}}}\n",
    )

    assert [type(line) for line in found.lines] == [Unknown]


def test_part_that_the_other_stock_does_not_hold_comes_from_the_store() -> None:
    found = made(
        "",
        contains="{sodium acetate: 0.10 M, sodium chloride: 0.10 M}",
        more="in: water\n  from: strong",
        other="strong: {material: 1.0 M sodium acetate}\n",
    )

    assert only(found, Measure).name == "strong"
    assert only(found, Weigh).name == "sodium chloride"


def test_share_by_mass_without_density_is_made_by_mass() -> None:
    found = made("10 % w/w malonic acid", makes="500 mL")
    weighed = [line for line in found.lines if isinstance(line, Weigh)]

    assert [(w.name, w.text) for w in weighed] == [
        ("malonic acid", "49.91 g"),  # of half a litre taken to be as dense as water, 998.2 g/L
        ("water", "449.2 g"),
    ]
    assert any("by mass" in said for said in found.assumptions)


def test_share_by_mass_is_made_by_weighing_both() -> None:
    # 10 % w/w sodium hydroxide has 1.109 g/mL at 20 °C (CRC Handbook): 110.9 g and 998 g.
    weighed = [x for x in made("10 % w/w sodium hydroxide").lines if isinstance(x, Weigh)]

    assert [w.name for w in weighed] == ["sodium hydroxide", "water"]
    assert weighed[0].exact == pytest.approx(0.1109, rel=2e-3)
    assert weighed[0].exact / sum(w.exact for w in weighed) == pytest.approx(0.10, rel=1e-9)


def test_weak_bottle_of_a_solid_is_passed_over_for_the_solid() -> None:
    found = made("20 % w/w malonic acid", laboratory="reagents: [10 % w/w malonic acid]")

    assert [line.name for line in found.lines if isinstance(line, Weigh)] == [
        "malonic acid",
        "water",
    ]
    assert found.too_weak == ""


def test_solvent_is_not_worked_out_where_a_part_is_not_known() -> None:
    found = made(
        "", contains="{sodium chloride: 5 % w/w, sulfur dioxide: 1 % w/w}", more="in: water"
    )

    assert [type(line) for line in found.lines] == [Weigh, Unknown, Unknown]
    assert found.reached is None


def test_molality_is_so_much_in_a_kilogram_of_solvent() -> None:
    weighed = [x for x in made("0.50 mol/kg sucrose").lines if isinstance(x, Weigh)]

    # 342.30 g/mol.
    assert weighed[0].exact / weighed[1].exact == pytest.approx(0.5 * 0.3423, rel=1e-4)


def test_share_by_volume_of_a_liquid_needs_no_density() -> None:
    found = made("70 % v/v ethanol", makes="2 L")

    assert only(found, Measure).text == "1400 mL"
    assert found.lines[-1] == MakeUp("water", "2 L", "")


def test_share_by_volume_is_diluted_by_volume() -> None:
    found = made(
        "48 % v/v ethanol", more="from: spirit", other="spirit:\n  material: 96 % v/v ethanol\n"
    )

    assert only(found, Measure).exact == pytest.approx(0.5e-3, rel=1e-9)


def test_dye_whose_formula_is_not_known_is_diluted_by_the_ratio_of_strengths() -> None:
    around = surroundings(
        {
            "substances/own.yml": "house-dye:\n  names: [house dye]\n  state: solid\n",
            "stocks.yml": "strong:\n  material: 1.0 % w/v house dye\n"
            "stock:\n  material: 0.10 % w/v house dye\n  from: strong\n",
        }
    )
    found = recipe(around.catalogue.stocks["stock"], around.catalogue, around.laboratory)

    assert only(found, Measure).exact == pytest.approx(100e-6, rel=1e-9)


def test_mixture_by_amount_is_weighed() -> None:
    found = made("", contains="{benzoic acid: 1 mol, benzocaine: 1 mol}", makes="10 g")

    # 122.12 and 165.19 g/mol.
    assert [(w.name, w.text) for w in found.lines if isinstance(w, Weigh)] == [
        ("benzoic acid", "4.25 g"),
        ("benzocaine", "5.75 g"),
    ]
    assert found.size == "10 g"


def test_hydrate_of_another_number_of_formula_units_is_counted_by_them() -> None:
    # CaSO4·½H2O, 145.15 g/mol: one of it holds one CaSO4, 136.14 g/mol.
    laboratory = "reagents: [calcium sulfate hemihydrate]\nbalance: 0.0001 g\n"
    found = made("1.0 g/L calcium sulfate", laboratory=laboratory)

    assert only(found, Weigh).exact == pytest.approx(1e-3 * 145.15 / 136.14, rel=1e-3)


def test_anhydrous_salt_takes_the_place_of_the_hydrate_a_stock_is_named_after() -> None:
    laboratory = "reagents: [copper(II) sulfate]\n"
    found = made("10 % w/v copper(II) sulfate pentahydrate", laboratory=laboratory)

    # 100 g of 249.68 g/mol is 63.93 g of 159.61 g/mol.
    assert only(found, Weigh).exact == pytest.approx(0.06393, rel=1e-3)


def test_purity_on_the_label_is_weighed_for() -> None:
    pure = only(made("2.0 M potassium hydroxide"), Weigh)
    owned = made(
        "2.0 M potassium hydroxide", laboratory="reagents: ['potassium hydroxide, 85 % w/w']"
    )

    assert only(owned, Weigh).exact == pytest.approx(pure.exact / 0.85, rel=1e-9)
    assert not any("taken as pure" in said for said in owned.assumptions)


def test_solid_without_a_purity_is_taken_as_pure_and_says_so() -> None:
    assert "sodium chloride taken as pure" in made("0.10 M sodium chloride").assumptions


def test_density_on_the_label_of_a_bottle_counts() -> None:
    # 37 % w/w at 1.18 g/mL: 11.97 mol/L.
    laboratory = "reagents: ['37 % w/w hydrochloric acid, 1.18 g/mL']"
    found = made("1.0 M hydrochloric acid", laboratory=laboratory)

    assert only(found, Measure).exact == pytest.approx(36.458 / (0.37 * 1180) * 1e-3, rel=1e-3)
    assert not any("table" in said for said in found.assumptions)


def test_weak_bottle_is_passed_over_for_a_strong_one() -> None:
    laboratory = "reagents: [10 % w/w hydrochloric acid, 37 % w/w hydrochloric acid]"

    assert only(made("6.0 M hydrochloric acid", laboratory=laboratory), Measure).name.startswith(
        "37"
    )
    assert only(made("1.0 M hydrochloric acid", laboratory=laboratory), Measure).name.startswith(
        "10"
    )


def test_bottle_in_another_solvent_is_not_taken() -> None:
    laboratory = "reagents: [2.0 M hydrogen chloride in diethyl ether]"

    assert "37 %" in only(made("1.0 M hydrochloric acid", laboratory=laboratory), Measure).name
    found = made("0.5 M hydrogen chloride in diethyl ether", laboratory=laboratory)
    assert "in diethyl ether" in only(found, Measure).name


def test_stock_that_is_what_the_bottle_holds_is_used_as_bought() -> None:
    found = made("37 % w/w hydrochloric acid")

    assert [type(line) for line in found.lines] == [Care]
    assert "as it is bought" in cares(found)


# ---------------------------------------------------------------- what cannot be told


@pytest.mark.parametrize(
    ("material", "more"),
    [
        ("1.0 M hydrogen sulfide", ""),
        ("1.0 M sodium chloride", "from: nowhere"),
        ("0.000 M sodium chloride", ""),
        ("1.0 M unheard-of salt", ""),
        ("14 M hydrochloric acid", ""),
        ("0.1 M hydrogen chloride in diethyl ether", ""),
        ("60 % w/w hydrogen peroxide", ""),
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
    assert "hood" in said


def test_water_is_in_the_vessel_before_the_acid() -> None:
    lines = made("3.0 M hydrochloric acid").lines
    kinds = [type(line) for line in lines]

    assert Begin("water", "500 mL") in lines
    assert kinds.index(Begin) < kinds.index(Measure) < kinds.index(MakeUp)


def test_solid_is_dissolved_in_less_than_the_whole_and_made_up_when_cold() -> None:
    lines = made("3.0 M sodium hydroxide", makes="2 L").lines

    assert lines[1:] == (
        lines[1],
        Dissolve("water", "1.4 L"),
        Care("make up to volume only when it is at room temperature", "common practice, no source"),
        MakeUp("water", "2 L", ""),
    )


def test_weak_stock_needs_no_hood() -> None:
    found = made(
        "1.0 M hydrochloric acid",
        more="from: strong",
        other="strong:\n  material: 3.0 M hydrochloric acid\n",
    )

    assert "hood" not in cares(found)
    assert not any(isinstance(line, Begin) for line in found.lines)


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


def test_one_mark_pipette_is_named_where_it_gives_the_volume() -> None:
    laboratory = (
        "glassware:\n  transfer pipette 25 mL, class A: 4\n  volumetric flask 250 mL, class A: 4\n"
    )
    strong = "strong:\n  material: 0.100 M copper(II) sulfate\n"
    exact = made(
        "0.0100 M copper(II) sulfate",
        makes="250 mL",
        laboratory=laboratory,
        more="from: strong",
        other=strong,
    )
    rough = made(
        "0.01 M copper(II) sulfate",
        makes="250 mL",
        laboratory=laboratory,
        more="from: strong",
        other=strong,
    )

    assert only(exact, Measure)[1:3] == ("25.00 mL", "volumetric pipette 25 mL")
    assert "graduated" in only(rough, Measure)[2]


def test_what_no_cylinder_holds_is_measured_in_fillings() -> None:
    found = only(made("6.0 M hydrochloric acid", makes="20 L"), Measure)

    assert isinstance(found, Measure)
    assert found.ware == "graduated cylinder 2000 mL"
    assert found.fillings == 5
    assert found.volume == pytest.approx(found.exact, rel=0.002)


def test_so_little_that_the_balance_does_not_weigh_it_is_one_step_and_not_nought() -> None:
    found = made("1.0 % w/v sucrose", makes="0.1 mL")

    assert only(found, Weigh).text == "0.01 g"
    assert found.reached == pytest.approx(10, rel=1e-6)


# ---------------------------------------------------------------- dilution series


def room(glassware: str) -> PrepRoom:
    around = surroundings(
        {
            "laboratory.yml": f"glassware:\n{glassware}",
            "stocks.yml": "stock:\n  material: 0.100 M copper(II) sulfate\n"
            "air:\n  material: benzoic acid\n",
        }
    )
    return PrepRoom(around.catalogue, around.laboratory)


def test_series_is_made_with_the_pipettes_and_flasks_owned() -> None:
    made_with = room(
        "  transfer pipette 10 mL, class A: 2\n  transfer pipette 25 mL, class A: 2\n"
        "  volumetric flask 100 mL, class A: 9\n  volumetric flask 250 mL, class A: 9\n"
    )
    stock = made_with.store.catalogue.stocks["stock"]
    found = made_with.series(stock, [25.0, 10.0, 3.7])

    assert isinstance(found, tuple)
    first, second, third = found
    assert isinstance(first, Dilution)
    assert isinstance(second, Dilution)
    assert isinstance(third, NotReached)
    assert (first.aliquot, first.flask.volume) == pytest.approx((25e-6, 100e-6))
    # 25 mL in 250 mL is finer than 10 mL in 100 mL: 0.03/25 + 0.12/250 over 0.02/10 + 0.08/100.
    assert (second.aliquot, second.flask.volume) == pytest.approx((25e-6, 250e-6))
    assert second.tolerance == pytest.approx(0.03 / 25 + 0.12 / 250, rel=1e-6)


def test_series_of_what_is_no_solution_is_unknown() -> None:
    made_with = room("  transfer pipette 10 mL: 2\n")

    assert isinstance(made_with.series(made_with.store.catalogue.stocks["air"], [1.0]), Unknown)


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
            assert line.mass > 0
            steps = line.mass / 1e-5
            assert steps == pytest.approx(round(steps), abs=1e-6)
            assert float(line.text.removesuffix(" g")) == pytest.approx(line.mass * 1e3, abs=1e-9)


@given(
    percent=st.floats(0.5, 60.0).map(lambda x: f"{x:.3g}"),
    litres=st.integers(1, 5),
    basis=st.sampled_from(["w/v", "w/w"]),
)
def test_strength_of_what_is_weighed_is_the_one_declared(
    percent: str, litres: int, basis: str
) -> None:
    found = made(f"{percent} % {basis} sucrose", makes=f"{litres} L")
    weighed = [line for line in found.lines if isinstance(line, Weigh)]
    whole = litres if basis == "w/v" else sum(line.exact for line in weighed)

    assert weighed[0].exact / whole == pytest.approx(float(percent) / 100, rel=1e-9)
    assert found.reached == pytest.approx(1.0, abs=2e-3)


@given(
    molarity=st.floats(0.01, 2.9).map(lambda x: f"{x:.3g}"),
    millilitres=st.integers(50, 5000),
)
def test_amount_carried_over_is_the_amount_declared(molarity: str, millilitres: int) -> None:
    found = made(
        f"{molarity} M hydrochloric acid",
        makes=f"{millilitres} mL",
        more="from: strong",
        other="strong:\n  material: 3.0 M hydrochloric acid\n",
    )
    carried = only(found, Measure)

    assert carried.exact * 3.0 == pytest.approx(float(molarity) * millilitres * 1e-6, rel=1e-9)
