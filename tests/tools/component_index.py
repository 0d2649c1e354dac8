"""Make `catalogue/data/components.json`: what salts, hydrates and strong acids are in solution.

Run by `make catalogue`; a test compares the file with the tables, which are then read in full.
"""

from __future__ import annotations

import json
from typing import TYPE_CHECKING

from watchglass.base.yaml import read_yaml
from watchglass.catalogue.components import components_of, is_neutral
from watchglass.catalogue.decode import decode_substances
from watchglass.shell.shipped import DATA, substance_sources

if TYPE_CHECKING:
    from watchglass.catalogue.substances import Substance

#: Carbon atoms up to which a bare formula is taken for the one substance that has it.
_FEW_CARBONS = 2


def substances() -> list[Substance]:
    """Read all shipped substances."""
    found: list[Substance] = []
    for source in substance_sources():
        node, _ = read_yaml(source)
        found += decode_substances(node)[0]
    return found


def make() -> str:
    """Give the index's text for the tables as they stand."""
    all_ = substances()
    by_smiles = {s.smiles: s.key for s in all_ if s.smiles and is_neutral(s.smiles)}
    components = {s.key: dict(components_of(s, by_smiles.get)) for s in all_}
    formulas: dict[str, list[str]] = {}
    for s in all_:
        if s.formula is not None and dict(s.formula.composition).get("C", 0) <= _FEW_CARBONS:
            formulas.setdefault(s.formula.hill(), []).append(s.key)
    made = {
        "components": {k: c for k, c in sorted(components.items()) if c != {k: 1}},
        "formulas": {f: keys[0] for f, keys in sorted(formulas.items()) if len(keys) == 1},
    }
    return json.dumps(made, ensure_ascii=False, indent=0) + "\n"


if __name__ == "__main__":
    (DATA / "components.json").write_text(make(), "utf-8")
