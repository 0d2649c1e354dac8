"""What is known of each component: charge, mass, pKa, partition, solubility; asked for once each."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import dimensions as dim
from watchglass.base.scan import Found, scan_quantity
from watchglass.catalogue.components import PROTON, WATER
from watchglass.chemistry.formulas import Formula, parse_species

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.substances import Substance

#: Words in `groups` that say a substance gives or takes protons in water.
_ACIDIC = frozenset(("carboxylic acid", "phenol", "sulfonic acid", "mineral acid", "enol"))
_BASIC = frozenset(("amine", "aromatic amine", "ammonia", "strong base", "carboxylate"))
#: octanol–water log P above which a liquid whose miscibility is unknown is taken to form a layer.
_LAYERS_ABOVE = 0.5


class Solubility(NamedTuple):
    """What dissolves in water at a temperature: mol/m3 of solution, and K."""

    concentration: float
    temperature: float


#: Digits of an ion's formula as they are printed, and digits and signs of its charge.
_LOWERED = str.maketrans("0123456789", "₀₁₂₃₄₅₆₇₈₉")
_RAISED = str.maketrans("0123456789+-", "⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻")


class Thing(NamedTuple):
    """One component.

    Attributes:
        key: Its key: a substance's, or an ion's formula.
        substance: The substance, or None for an ion.
        charge: In elementary charges.
        molar_mass: kg/mol; None where the formula is not known.
        atoms: Count of each element; empty where the formula is not known.
        pkas: Of its family, ascending; empty where it is neutral whatever the pH.
        top: Charge of the fully protonated form.
        pkas_known: False where its groups say that it has acidic or basic ones, and no pKa is known.
        liquid: Whether it is a liquid at room temperature.
        gas: Whether it is a gas there.
        density: Of the liquid, kg/m3, or None.
        boils: K, or None.
        miscible: With water in all proportions; None where not known.
        soluble: Solubilities of the neutral form in water, by rising temperature.
        ratio: Octanol–water, neutral form, or None.
        measured: Measured ratio organic/water by key of the solvent.
    """

    key: str
    substance: Substance | None = None
    charge: int = 0
    molar_mass: float | None = None
    atoms: Mapping[str, float] = {}
    pkas: tuple[float, ...] = ()
    top: int = 0
    pkas_known: bool = True
    liquid: bool = False
    gas: bool = False
    density: float | None = None
    boils: float | None = None
    miscible: bool | None = None
    soluble: tuple[Solubility, ...] = ()
    ratio: float | None = None
    measured: Mapping[str, float] = {}

    @property
    def name(self) -> str:
        """What it is called."""
        if self.substance:
            return self.substance.name
        formula, _, charge = self.key.partition("^")
        return formula.translate(_LOWERED) + charge.translate(_RAISED)

    @property
    def ion(self) -> bool:
        """Whether it is an ion that stays one."""
        return self.substance is None

    @property
    def layers(self) -> bool:
        """Whether it is a liquid that forms a layer of its own beside water."""
        if not self.liquid or self.key == WATER or self.miscible:
            return False
        if self.miscible is None and not self.soluble and self.ratio is not None:
            return self.ratio > 10**_LAYERS_ABOVE
        return True

    @property
    def volume(self) -> float | None:
        """Molar volume of the liquid, m3/mol; None where it is no liquid or not known."""
        if not self.liquid or self.density is None or self.molar_mass is None:
            return None
        return self.molar_mass / self.density

    def solubility(self, temperature: float) -> float | None:
        """Give the solubility in water at a temperature, mol/m3; None where none is known.

        Between two known temperatures log(solubility) is taken as straight in T; beyond them the
        nearest stands (said so wherever the figure is shown).
        """
        if not self.soluble:
            return None
        below = [s for s in self.soluble if s.temperature <= temperature]
        above = [s for s in self.soluble if s.temperature > temperature]
        if not below or not above:
            return (below[-1] if below else above[0]).concentration
        low, high = below[-1], above[0]
        along = (temperature - low.temperature) / (high.temperature - low.temperature)
        ratio: float = (high.concentration / low.concentration) ** along
        return low.concentration * ratio


class Knowledge:
    """Looks components up in a catalogue and keeps what it found; one for a whole set."""

    def __init__(self, catalogue: Catalogue) -> None:
        """Begin with nothing asked."""
        self.catalogue = catalogue
        self._things: dict[str, Thing] = {}
        self._components: dict[str, Mapping[str, int]] = {}

    def thing(self, key: str) -> Thing:
        """Give what is known of a component or of a solid substance."""
        found = self._things.get(key)
        if found is None:
            found = self._things[key] = self._look_up(key)
        return found

    def components(self, substance: str) -> Mapping[str, int]:
        """Give the components of one mole of a substance."""
        found = self._components.get(substance)
        if found is None:
            found = self._components[substance] = self.catalogue.components(substance)
        return found

    def parts(self, key: str) -> Mapping[str, int]:
        """Give the components of one mole of a substance, or of an ion."""
        return self.components(key) if self.thing(key).substance is not None else {key: 1}

    def key_of_formula(self, formula: Formula) -> str | None:
        """Give the key of the common substance that a bare formula stands for, or of an ion."""
        if formula.charge:
            return formula.text
        return self.catalogue.by_formula(formula)

    def ratio(self, key: str, solvent: str) -> tuple[float | None, str]:
        """Give the partition ratio organic/water of a neutral form, and where it is from.

        Returns:
            The ratio [-] (None where none is known) and `measured`, `log P` or `unknown`.
        """
        thing = self.thing(key)
        measured = thing.measured.get(solvent)
        if measured is not None:
            return measured, "measured"
        if thing.ratio is not None:
            return thing.ratio, "log P"
        return None, "unknown"

    def _look_up(self, key: str) -> Thing:
        substance = self.catalogue.by_key(key)
        if substance is None:
            return _ion(key)
        formula = substance.formula
        groups = frozenset(substance.groups)
        acid, base = substance.acid, substance.base
        active = bool(groups & _ACIDIC or groups & _BASIC)
        return Thing(
            key=key,
            substance=substance,
            molar_mass=formula.molar_mass_si if formula else None,
            atoms={k: float(v) for k, v in formula.composition} if formula else {},
            pkas=tuple(sorted((*base, *acid))),
            top=len(base),
            pkas_known=bool(acid or base) or not active,
            liquid=substance.state == "liquid" or key == WATER,
            gas=substance.state == "gas",
            density=substance.density.value.si if substance.density else _water(key),
            boils=substance.boils.middle if substance.boils else None,
            miscible=_miscible(substance),
            soluble=_solubilities(substance),
            ratio=10.0**substance.log_p if substance.log_p is not None else None,
            measured=self._ratios(substance),
        )

    def _ratios(self, substance: Substance) -> dict[str, float]:
        ratios = {}
        for name, ratio in substance.partition.items():
            solvent = self.catalogue.find(name)
            ratios[solvent.key if solvent else name] = ratio
        return ratios


def _water(key: str) -> float | None:
    return 998.2 if key == WATER else None  # 20 °C, CRC Handbook


def _ion(key: str) -> Thing:
    formula = parse_species(key)
    if not isinstance(formula, Formula):
        return Thing(key=key, pkas_known=False)
    return Thing(
        key=key,
        charge=formula.charge,
        molar_mass=formula.molar_mass_si if key != PROTON else 1.008e-3,
        atoms={k: float(v) for k, v in formula.composition},
    )


def _miscible(substance: Substance) -> bool | None:
    said = substance.soluble.get("water")
    return "miscible" in said if said else None


def _solubilities(substance: Substance) -> tuple[Solubility, ...]:
    """Read what dissolves in water: mass per litre of solution, or mass share of the saturated one."""
    molar_mass = substance.formula.molar_mass_si if substance.formula else None
    found = []
    for text in substance.soluble.get("water", ()):
        amount, _, at = text.partition(" at ")
        read = scan_quantity(amount, 0)
        if not isinstance(read, Found) or molar_mass is None:
            continue
        temperature = scan_quantity(at, 0) if at else None
        kelvin = temperature.quantity.si if isinstance(temperature, Found) else 298.15
        quantity = read.quantity
        if quantity.dimension == dim.MASS_CONCENTRATION:
            found.append(Solubility(quantity.middle / molar_mass, kelvin))
        elif quantity.dimension == dim.MASS_FRACTION and quantity.middle < 1:
            share = quantity.middle  # per volume of the water in it: solutes add no volume here
            found.append(Solubility(share / (1 - share) * 998.2 / molar_mass, kelvin))
    return tuple(sorted(found, key=lambda s: s.temperature))
