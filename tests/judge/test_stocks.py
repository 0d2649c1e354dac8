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
