"""Units against published conversions, and what must be refused where it stands."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, Any, NamedTuple

import pytest

from cases.harness import above_note, check_files, told
from outside.published import cases
from outside.tolerances import within
from watchglass.base.scan import Found, scan_quantity

if TYPE_CHECKING:
    from watchglass.base.units import Unit

#: Spellings of the cases that the notation writes in another way.
_WRITTEN = {
    "Δ°C (difference)": "K",
    "K (difference)": "K",
    "cal (thermochemical)": "cal",
    "mmol/L (glucose, M 180.156)": "mmol/L",
    "dm³": "dm^3",
    "cm³": "cm^3",
}
#: By a molar mass, or from turns to a frequency, leads one way only.
_BOTH_WAYS = [c for c in cases("units.json", "convert") if c.id not in ("uc-s20", "uc-s26")]
_MOLAR = re.compile(r"M ([\d.]+)")


class _Refused(NamedTuple):
    """Where a case stands in a procedure, and the finding it must give there."""

    field: str  # lines for the front matter
    step: str
    code: str
    marked: str  # the text that is underlined
    help: str


_SUBSTANCES = "substances/own.yml"
_SAND = "sand:\n  names: [sand]\n  formula: SiO2\n"

_PLACES = {
    "ur-s01": _Refused("", "Record {= 5 g + 3 mL}.", "Q112", "5 g + 3 mL", "density"),
    "ur-s02": _Refused("", "Record {= 10 mmol + 2 g}.", "Q112", "10 mmol + 2 g", "molar mass"),
    "ur-s03": _Refused("", "Record {= 122 M in g/mol}.", "Q109", "g/mol", "unit of the value"),
    "ur-s04": _Refused("acid: 6 N hydrochloric acid", "{acid}", "Q106", "6 N", "`6 M`"),
    "ur-s05": _Refused("", "Warm to {20 °}.", "Q108", "°", "`°C`"),
    "ur-s06": _Refused("", "Warm to {20 C}.", "Q108", "C", "`°C`"),
    "ur-s07": _Refused("", "Record {= 20 °C + 5 °C}.", "Q112", "20 °C + 5 °C", "difference in K"),
    "ur-s08": _Refused("", "Cool to {-5 K}.", "Q111", "-5 K", "absolute zero is -273.15 °C, 0 K"),
    "ur-s09": _Refused("acid: 10 % hydrochloric acid", "{acid}", "Q107", "10 %", "w/w"),
    "ur-s10": _Refused("", "A yield of {-3 %}.", "Q110", "-3 %", "minus sign"),
    "ur-s11": _Refused("", "Add {-5 mL}.", "Q110", "-5 mL", "minus sign"),
    "ur-s12": _Refused(_SUBSTANCES, "density: 1.33 g", "Q109", "1.33 g", "g/mL"),
    "ur-s13": _Refused("", "Add {1,5 g}.", "Q102", "1,5", "`1.5`"),
    "ur-s14": _Refused("", "Add {3 x 10 mL}.", "Q101", "3 x 10", "again"),
    "ur-s15": _Refused("", "Add {5 Mg}.", "Q113", "5 Mg", "`5 mg`"),
}


def _unit(written: str) -> Unit:
    symbol = _WRITTEN.get(written, written)
    found = scan_quantity("1 " + symbol, 0)
    assert isinstance(found, Found)
    assert found.end == len(symbol) + 2
    return found.quantity.unit


def _converted(value: float, origin: str, target: str) -> float:
    if target == "Hz (turns per second)":  # a rotation: the notation keeps turns apart from 1/s
        return value * _unit(origin).factor
    one, other = _unit(origin), _unit(target)
    si = value * one.factor + one.offset
    if (molar := _MOLAR.search(origin)) is not None:
        si *= float(molar[1]) * 1e-3  # mol/m3 to kg/m3
    else:
        assert one.dimension.exponents == other.dimension.exponents
    return (si - other.offset) / other.factor


@pytest.mark.parametrize("case", cases("units.json", "convert"))
def test_conversion_gives_the_published_figure(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    converted = _converted(inputs["value"], inputs["from"], inputs["to"])

    assert within(converted, case["expected"]["value"], case["tolerance"])


@pytest.mark.parametrize("case", _BOTH_WAYS)
def test_conversion_leads_back_to_where_it_began(case: dict[str, Any]) -> None:
    inputs = case["inputs"]
    there = _converted(inputs["value"], inputs["from"], inputs["to"])
    back = _converted(there, inputs["to"], inputs["from"])

    assert within(back, inputs["value"], {"rel": 1e-12, "abs": 1e-10})


@pytest.mark.parametrize("case", cases("units.json", "reject"))
def test_what_cannot_be_meant_is_refused_where_it_stands(case: dict[str, Any]) -> None:
    place = _PLACES[case["id"]]
    files: dict[str, bytes | str] = {}
    field = f"\nmaterials:\n  {place.field}" if place.field else ""
    step = place.step
    if place.field == _SUBSTANCES:
        files[_SUBSTANCES] = f"{_SAND}  {place.step}\n  sources: from memory\n"
        field, step = "", "Wait."
    files["procedures/a.md"] = f"---\ntitle: A\ncode: A-1{field}\n---\n\n1. {step}\n"
    findings = above_note(check_files(files))

    assert [f.code.number for f in findings] == [place.code], told(findings)
    assert findings[0].span.text == place.marked
    assert place.help in (findings[0].help or "")


def test_every_case_of_a_refusal_has_its_place() -> None:
    listed = {param.id for param in cases("units.json", "reject")}

    assert listed == set(_PLACES)
