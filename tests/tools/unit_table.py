"""Make `base/unit_table.py` from `base/units.txt` with pint, the authority for units and factors.

Run by `make units`; `tests/base/test_units.py` compares its answer with the file in the package.
"""

from __future__ import annotations

import re
import sys
from pathlib import Path

BASE = Path(__file__).parents[2] / "generator" / "watchglass" / "base"
ORDER = ("[length]", "[mass]", "[time]", "[temperature]", "[substance]", "[current]", "[turn]")

HEAD = '''"""Factors of the units in `units.txt`, made by pint: do not edit, run `make units`.

One entry a symbol: (factor to the SI unit, offset in SI units, exponents of length, mass, time,
temperature, amount of substance, current and turn).
"""

from __future__ import annotations

TABLE: dict[str, tuple[float, float, tuple[int, ...]]] = {
'''


def make(text: str) -> str:
    """Give the module's text for a definitions file's text."""
    import pint

    registry = pint.UnitRegistry(None)
    registry.load_definitions(text.splitlines())
    lines = []
    for symbol, name in _symbols(text):
        at_nought = registry.Quantity(0.0, name).to_base_units().magnitude
        far = 1e6 if at_nought else 1.0  # far from an offset, so that its digits do not cost any
        at_far = registry.Quantity(far, name).to_base_units().magnitude
        dimension = registry.Unit(name).dimensionality
        exponents = tuple(int(dimension.get(key, 0)) for key in ORDER)
        factor = float(f"{(at_far - at_nought) / far:.14g}")
        lines.append(
            f"    {symbol!r}: ({factor!r}, {float(f'{at_nought:.14g}')!r}, {exponents!r}),\n"
        )
    return HEAD + "".join(lines).replace("'", '"') + "}\n"


def _symbols(text: str) -> list[tuple[str, str]]:
    names: dict[str, str] = {}
    for line in text.splitlines():
        if found := re.match(r"(\w+) = .* = (\S+)$", line):
            names[found[2]] = found[1]
    for line in text.splitlines():
        if found := re.match(r"# \[(\S+)\] (.+)$", line):
            for spelling in found[2].split():
                names[spelling] = names[found[1]]
    return list(names.items())


if __name__ == "__main__":
    made = make((BASE / "units.txt").read_text("utf-8"))
    (BASE / "unit_table.py").write_text(made, "utf-8")
    sys.stdout.write(f"{made.count(chr(10)) - 12} symbols written\n")
