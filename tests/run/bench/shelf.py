"""Made-up substances of round figures, so that each density and volume can be followed in the head."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import TYPE_CHECKING, Any

import pytest

from bench_runner import knowledge
from watchglass.run.bench.knowledge import Knowledge, Solubility, Thing
from watchglass.run.bench.state import Phase

if TYPE_CHECKING:
    from collections.abc import Mapping

REAL = knowledge()
ANY = REAL.thing("acetone").substance
WATER = REAL.thing("water")


SALTS: Mapping[str, Mapping[str, int]] = {"salt": {"Na^+": 1, "Cl^-": 1}}


def liquid(
    key: str, density: float | None, molar_mass: float | None = 0.1, **more: object
) -> Thing:
    plain = Thing(key, ANY, molar_mass=molar_mass, liquid=True, density=density)
    return plain._replace(**more)  # type: ignore[arg-type]  # fields by their names


#: 18.015 g/mol and 998.2 kg/m3 as in the catalogue; the others weigh 100 g/mol.
THINGS = (
    WATER,
    liquid("light", 800.0, miscible=False),
    liquid("heavy", 1600.0, miscible=False),
    liquid("close", 1010.0, miscible=False),
    liquid("near", 1040.0, miscible=False),
    liquid("far", 1050.1, miscible=False),
    liquid("slight", 800.0, soluble=(Solubility(1000.0, 298.15),)),
    liquid("spirit", 800.0, miscible=True),
    liquid("blank", None, miscible=False),
    liquid("weightless", 800.0, None, miscible=False),
    Thing("solute", ANY, molar_mass=0.1),
    Thing("Na^+", charge=1, molar_mass=0.023),
    Thing("Cl^-", charge=-1, molar_mass=0.035),
    Thing("H^+", charge=1, molar_mass=0.001),
    Thing("salt", ANY, molar_mass=0.058),
)


@dataclass
class Shelf(Knowledge):
    """What is known of made-up substances."""

    things: dict[str, Thing] = field(default_factory=lambda: {t.key: t for t in THINGS})

    def thing(self, key: str) -> Thing:
        return self.things[key]

    def components(self, substance: str) -> Mapping[str, int]:
        return SALTS.get(substance, {substance: 1})


SHELF = Shelf()


def near(expected: Any, rel: float | None = None, abs: float | None = None) -> Any:  # noqa: A002
    """Give what stands for a float in a record that is compared, `pytest.approx`."""
    return pytest.approx(expected, rel=rel, abs=abs)


#: 998.2 g of water in a litre, 55.41 mol.
LITRE = Phase({"water": 998.2 / 18.015}, 1e-3)


def litres(key: str, volume: float) -> Phase:
    """Give so many litres of a made-up liquid of 100 g/mol."""
    density = SHELF.thing(key).density
    assert density is not None
    return Phase({key: density * volume * 1e-3 / 0.1}, volume * 1e-3)
