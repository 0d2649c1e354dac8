"""What dissolves as what: the kept table is that of the substances, and atoms and charge stay."""

from __future__ import annotations

import json

import pytest

from tools.component_index import make
from watchglass.catalogue.components import PROTON
from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.shell.shipped import DATA, shipped

KEPT: dict[str, dict[str, int]] = json.loads((DATA / "components.json").read_text("utf-8"))[
    "components"
]


def test_kept_table_is_that_of_the_substances() -> None:
    assert (DATA / "components.json").read_text("utf-8") == make()


def formula(component: str) -> Formula:
    """Give the formula of a component: of the substance with that key, or of the ion it writes."""
    substance = shipped().substances.get(component)
    if substance is not None:
        assert substance.formula is not None
        return substance.formula
    read = parse_formula(component)
    assert isinstance(read, Formula), component
    return read


@pytest.mark.parametrize("key", KEPT)
def test_components_have_the_atoms_and_the_charge_of_the_substance(key: str) -> None:
    whole = formula(key)
    atoms: dict[str, float] = {}
    charge = 0
    for component, count in KEPT[key].items():
        part = formula(component)
        charge += count * part.charge
        for element, number in part.composition:
            atoms[element] = atoms.get(element, 0) + count * number

    assert {e: n for e, n in atoms.items() if n} == dict(whole.composition)
    assert charge == whole.charge


@pytest.mark.parametrize(
    ("key", "components"),
    [
        ("hydrogen-chloride", {PROTON: 1, "Cl^-": 1}),
        ("sodium-hydroxide", {"Na^+": 1, "water": 1, PROTON: -1}),
        ("sodium-hydrogencarbonate", {"Na^+": 1, "carbon-dioxide": 1, "water": 1, PROTON: -1}),
        ("sodium-benzoate", {"Na^+": 1, "benzoic-acid": 1, PROTON: -1}),
        ("ammonium-chloride", {"ammonia": 1, PROTON: 1, "Cl^-": 1}),
        ("potassium-hydrogen-phthalate", {"K^+": 1, "phthalic-acid": 1, PROTON: -1}),
    ],
)
def test_common_substances_dissolve_as_chemists_write_them(
    key: str, components: dict[str, int]
) -> None:
    assert KEPT[key] == components
