"""Stocks that cannot be made from what they say, or not to their strength."""

from __future__ import annotations

import pytest

from watchglass.shell.pipeline import check_texts

STRONG = "strong:\n  material: 3.0 M hydrochloric acid\n"


def found(stocks: str, laboratory: str = "") -> list[tuple[str, str]]:
    """Give code and underlined text of what is found in a file of stocks."""
    texts = {"stocks.yml": stocks} | ({"laboratory.yml": laboratory} if laboratory else {})
    return [(f.code.number, f.span.text) for f in check_texts(texts) if f.code.number[0] in "PKQ"]


def test_stock_made_from_a_stronger_one_passes() -> None:
    assert found(STRONG + "weak:\n  material: 1.0 M hydrochloric acid\n  from: strong\n") == []


def test_source_that_is_no_stock_is_found() -> None:
    assert found("weak:\n  material: 1.0 M hydrochloric acid\n  from: strong\n") == [
        ("P101", "from")
    ]


@pytest.mark.parametrize("count", [1, 2, 3])
def test_circle_is_reported_once(count: int) -> None:
    stocks = "".join(
        f"s{n}:\n  material: {3 - n}.0 M hydrochloric acid\n  from: s{(n + 1) % count}\n"
        for n in range(count)
    )

    assert found(stocks) == [("P101", "from")]


def test_stock_that_leads_into_a_circle_is_not_blamed() -> None:
    stocks = STRONG + "  from: strong\nweak:\n  material: 1.0 M hydrochloric acid\n  from: strong\n"

    assert found(stocks) == [("P101", "from")]


@pytest.mark.parametrize(
    "weak",
    ["3.5 M hydrochloric acid", "1.0 M sodium hydroxide", "saturated sodium chloride"],
)
def test_what_no_dilution_gives_is_found(weak: str) -> None:
    assert found(STRONG + f"weak:\n  material: {weak}\n  from: strong\n") == [("P102", "from")]


def test_other_name_of_the_same_solute_is_the_same() -> None:
    stocks = STRONG + "weak:\n  material: 1.0 M hydrogen chloride in water\n  from: strong\n"

    assert found(stocks) == []


@pytest.mark.parametrize(
    ("made", "balance", "codes"),
    [
        ("25 mL", "", [("P103", "0.10 % w/v methyl orange")]),
        ("100 mL", "", []),
        ("25 mL", "balance: 1 mg", []),
        ("100 mL", "balance: 0.1 g", []),
        ("150 mL", "balance: 0.1 g", [("P103", "0.10 % w/v methyl orange")]),
    ],
)
def test_strength_beyond_the_balance_is_found(
    made: str, balance: str, codes: list[tuple[str, str]]
) -> None:
    stocks = f"dye:\n  material: 0.10 % w/v methyl orange\n  makes: {made}\n"

    assert found(stocks, balance) == codes


@pytest.mark.parametrize(
    ("strength", "made", "codes"),
    [
        # 0.15 g on a balance that weighs 0.01 g is exact; 0.155 g is 3 % off, as is 0.00155 mol of it.
        ("0.62 % w/v", "25 mL", [("P103", "0.62 % w/v methyl orange")]),
        ("ca. 0.62 % w/v", "25 mL", [("P103", "ca. 0.62 % w/v methyl orange")]),
        ("ca. 0.6 % w/v", "25 mL", []),
        ("ca. 0.1 % w/v", "25 mL", []),
        ("0.1 % w/v", "25 mL", [("P103", "0.1 % w/v methyl orange")]),
        # 0.655 g weighed as 0.66 g is 0.8 % off, 0.345 g as 0.34 g 1.4 %.
        ("0.655 % w/v", "100 mL", []),
        ("0.345 % w/v", "100 mL", [("P103", "0.345 % w/v methyl orange")]),
        # 0.374 g weighed as 0.37 g is 1.1 % off: less than half a unit of 0.34, more than of 0.340.
        ("0.34 % w/v", "110 mL", []),
        ("0.340 % w/v", "110 mL", [("P103", "0.340 % w/v methyl orange")]),
    ],
)
def test_figures_of_a_strength_say_how_far_it_may_be_off(
    strength: str, made: str, codes: list[tuple[str, str]]
) -> None:
    stocks = f"dye:\n  material: {strength} methyl orange\n  makes: {made}\n"

    assert found(stocks) == codes


@pytest.mark.parametrize(
    ("material", "reagents", "codes"),
    [
        ("12 M hydrochloric acid", "", []),
        ("14 M hydrochloric acid", "", ["P104"]),
        ("18 M sulfuric acid", "", []),
        ("15 M ammonia", "", []),
        ("17 M ammonia", "", []),
        ("65 % w/w nitric acid", "", []),
        ("6.0 M hydrochloric acid", "[10 % w/w hydrochloric acid]", ["P104"]),
        ("6.0 M hydrochloric acid", "[10 % w/w hydrochloric acid, 31 % w/w hydrochloric acid]", []),
        ("2.0 % w/v methyl orange", "[1.0 % w/v methyl orange]", []),  # dissolved anew
    ],
)
def test_stock_that_is_stronger_than_its_reagent_is_found(
    material: str, reagents: str, codes: list[str]
) -> None:
    stocks = f"a:\n  material: {material}\n"
    laboratory = f"reagents: {reagents}\n" if reagents else ""

    assert [code for code, _ in found(stocks, laboratory)] == codes


def test_stock_beyond_solubility_is_found_where_it_stands_and_not_where_it_is_used() -> None:
    page = "---\ntitle: T\ncode: T-0{0}\nmaterials:\n  a: strong\n---\n\nWith {{a}}.\n"
    texts: dict[str, str | bytes] = {f"procedures/{n}.md": page.format(n) for n in (1, 2)}
    texts["stocks.yml"] = "strong:\n  material: 5.0 M sodium hydrogencarbonate\n"

    assert [
        (f.span.source.name, f.span.text) for f in check_texts(texts) if f.code.number == "S134"
    ] == [("stocks.yml", "5.0 M")]


@pytest.mark.parametrize(
    ("reagent", "expected"),
    [
        ("37 % w/w hydrochloric acid, 1.18 g/mL", []),
        ("sodium hydroxide, 97 % w/w", []),
        ("sodium hydroxide, pellets", []),
        ("potassium iodide, 99.5 % w/w, dried", []),
        ("2,4-dinitrophenylhydrazine", []),
        ("sodium hydroxide, 97 %", []),
        ("sodium hydroxide, 500 g", []),
        ("37 % w/w hydrochloric acid, 12.0 M", []),
        ("12 M hydrochloric acid, 37 % w/w, 1.18 g/mL", []),
        ("sodium hydroxide, 25 °C", [("N145", "25 °C")]),
        ("sodium hydroxide, 3 M", [("N145", "3 M")]),
        ("sodium hydroxide, 97 parts w/w", [("Q105", "parts")]),
        ("37 % w/w hydrochloric acid, 16 M", [("S120", "16 M")]),
        ("37 % w/w hydrochloric acdi", [("K101", "hydrochloric acdi")]),
        ("37 % w/w hydrochloric acid, 1.08 g/mL", [("K120", "1.08 g/mL")]),
    ],
)
def test_list_of_reagents_is_read_where_it_stands(
    reagent: str, expected: list[tuple[str, str]]
) -> None:
    texts: dict[str, str | bytes] = {"laboratory.yml": f"reagents:\n  - {reagent}\n"}

    assert [(f.code.number, f.span.text) for f in check_texts(texts)] == expected


@pytest.mark.parametrize(("makes", "code"), [("400 g", []), ("0 L", ["N145"]), ("4 min", ["Q109"])])
def test_what_is_made_is_a_volume_or_a_mass(makes: str, code: list[str]) -> None:
    texts: dict[str, str | bytes] = {
        "stocks.yml": f"a:\n  material: 10 % w/w sodium chloride\n  makes: {makes}\n"
    }

    assert [f.code.number for f in check_texts(texts)] == code


def test_fault_in_a_stock_that_nothing_uses_is_found() -> None:
    assert found("acid:\n  material: 3.0 M hydrochloric acdi\n") == [("K101", "hydrochloric acdi")]


def test_fault_in_a_stock_that_two_use_is_found_once() -> None:
    page = "---\ntitle: T\ncode: T-0{0}\nmaterials:\n  acid: acid\n---\n\nWords.\n"
    texts: dict[str, str | bytes] = {f"procedures/{n}.md": page.format(n) for n in (1, 2)}
    texts["stocks.yml"] = "acid:\n  material: 3.0 M hydrochloric acdi\n"

    assert [f.code.number for f in check_texts(texts)].count("K101") == 1


def test_stock_that_holds_nothing_does_not_stop_the_check() -> None:
    assert [code for code, _ in found("a:\n  material: 0.000 M hydrochloric acid\n")] == []


@pytest.mark.parametrize(
    ("stock", "expected"),
    [
        ("{container: a bottle}", [("N144", "a")]),
        ("{contains: {hexane: 3 mL, ethyl acetate: 1 mL}}", []),
        ("{contains: {hexxane: 3 mL, ethyl acetate: 1 mL}}", [("K101", "hexxane")]),
        (
            "{material: water, contains: {hexane: 3 mL, ethyl acetate: 1 mL}}",
            [("N145", "contains")],
        ),
        ("{material: 37 % w/w hydrochloric acid, density: 1.18}", [("Q109", "1.18")]),
        ("{material: 37 % w/w hydrochloric acid, density: 1.18 g/mL}", []),
        ("{material: 37 % w/w hydrochloric acid, density: 1.08 g/mL}", [("K120", "1.08 g/mL")]),
    ],
)
def test_description_of_a_stock_is_read_where_it_stands(
    stock: str, expected: list[tuple[str, str]]
) -> None:
    findings = check_texts({"stocks.yml": f"a: {stock}\n"})

    assert [(f.code.number, f.span.text) for f in findings] == expected
