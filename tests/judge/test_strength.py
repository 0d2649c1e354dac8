"""Strengths that no solution has: beyond the pure liquid, the gas in water, or what dissolves."""

from __future__ import annotations

import pytest

from builders import faults, judged, only, places


def told(material: str) -> list[tuple[str, str]]:
    front = f"materials:\n  x: {material}\nvessels: {{A: beaker 100 mL}}\n"
    return [tuple(p) for p in places(faults(judged("1. Put {5 mL x -> A} into {A}.", front)))]


@pytest.mark.parametrize(
    "material",
    [
        "18 M sulfuric acid",
        "98 % w/w sulfuric acid",
        "17.4 M acetic acid",
        "16 M nitric acid",
        "12 M hydrochloric acid",
        "12 % w/w hydrochloric acid",
        "37 % w/w hydrochloric acid",
        "42 % w/w hydrochloric acid",
        "15 M ammonia",
        "30 % w/w hydrogen peroxide",
        "17 M ethanol",
        "95 % v/v ethanol",
        "5 M sodium chloride",
        "19 M sodium hydroxide",
        "10 % w/v sodium hydrogencarbonate",
        "1 M copper(II) sulfate pentahydrate",
        "0.050 M iodine",
        "0.5 M benzoic acid",
        "10 M potassium iodide in ethanol",
        "1 % w/v phenolphthalein in ethanol",
        "0.1 % w/v methyl orange",
        "0.5 % w/v starch",
        "saturated sodium chloride",
    ],
)
def test_strength_that_can_be_made_passes_in_silence(material: str) -> None:
    assert told(material) == []


@pytest.mark.parametrize(
    ("material", "marked"),
    [
        ("98 M sulfuric acid", "98 M"),
        ("65 M nitric acid", "65 M"),
        ("20 M ethanol", "20 M"),
        ("90 % w/v ethanol", "90 % w/v"),
        ("37 M hydrochloric acid", "37 M"),
        ("60 % w/w hydrochloric acid", "60 % w/w"),
        ("28 M ammonia", "28 M"),
        ("10 M sodium chloride", "10 M"),
        ("50 % w/w sodium chloride", "50 % w/w"),
        ("5 M sodium hydrogencarbonate", "5 M"),
        ("0.5 M calcium hydroxide", "0.5 M"),
        ("2 M copper(II) sulfate", "2 M"),
        ("2 M copper(II) sulfate pentahydrate", "2 M"),
        ("70 % w/w sodium hydroxide", "70 % w/w"),
    ],
)
def test_strength_that_nothing_has_is_found_where_it_stands(material: str, marked: str) -> None:
    assert told(material) == [("S134", marked)]


@pytest.mark.parametrize(
    ("material", "message", "help_"),
    [
        (
            "98 M sulfuric acid",
            "`98 M` is more than pure sulfuric acid holds: about 19 M",
            "write `98 % w/w sulfuric acid` if that is what the label says, or mend the figure",
        ),
        (
            "37 M hydrochloric acid",
            "`37 M` is more than the strongest solution of hydrogen chloride holds: about 12 M",
            "write `37 % w/w hydrochloric acid` if that is what the label says, or mend the figure",
        ),
        (
            "10 M sodium chloride",
            "`10 M` is more than dissolves of sodium chloride in water: about 5.4 M",
            "write `saturated sodium chloride`, or mend the figure",
        ),
    ],
)
def test_finding_says_the_greatest_strength_and_what_may_be_meant(
    material: str, message: str, help_: str
) -> None:
    front = f"materials:\n  x: {material}\nvessels: {{A: beaker 100 mL}}\n"
    finding = only(judged("1. Put {5 mL x -> A} into {A}.", front))

    assert (finding.message, finding.help) == (message, help_)


def test_stock_of_such_a_strength_is_found_where_the_stock_stands() -> None:
    files = {"stocks.yml": "strong-acid:\n  material: 37 M hydrochloric acid\n"}
    front = "materials: {x: strong-acid}\nvessels: {A: beaker 100 mL}\n"
    finding = only(judged("1. Put {5 mL x -> A} into {A}.", front, files))

    assert (finding.code.number, finding.span.text) == ("S134", "37 M")
    assert finding.span.source.name == "stocks.yml"
