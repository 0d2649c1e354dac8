"""What a substance is once it is dissolved: neutral parents, ions, and protons over or under.

The bench counts in *components*, so that whatever equilibrium does, atoms and charge stay where
they are: sodium benzoate is a sodium ion, a benzoic acid and one proton too few. A component is

- the key of a neutral substance: a parent acid or base in its neutral form, water, a solvent;
- an ion that takes no part in acid–base equilibrium, written as `Na^+`, `SCN^-`;
- `H^+`: protons over (or, below nought, under) what the neutral parents have.

Strong acids (pKa below −1) are written as their ions. Carbonates count as carbon dioxide and water,
sulfites as sulfur dioxide and water, sulfates and phosphates as their acids.

Salts are told by the fragments of their SMILES, an organic ion by the parent whose SMILES it is
with a proton added or taken (the catalogue's README). For the shipped substances the answers are
kept in a table that a test compares; a set's own are worked out when the set is read.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from collections.abc import Callable, Mapping

    from watchglass.catalogue.substances import Substance

PROTON = "H^+"
WATER = "water"

#: pKa below which an acid is taken for its ions alone.
STRONG = -1.0

_SULFATE, _CARBONATE, _PHOSPHATE = "sulfuric-acid", "carbon-dioxide", "phosphoric-acid"

#: Fragments of SMILES that stand for ions (and water), each with its components.
FRAGMENTS: Mapping[str, Mapping[str, int]] = {
    "O": {WATER: 1},
    "[Li+]": {"Li^+": 1},
    "[Na+]": {"Na^+": 1},
    "[K+]": {"K^+": 1},
    "[Mg+2]": {"Mg^2+": 1},
    "[Ca+2]": {"Ca^2+": 1},
    "[Ba+2]": {"Ba^2+": 1},
    "[Al+3]": {"Al^3+": 1},
    "[Fe+2]": {"Fe^2+": 1},
    "[Fe+3]": {"Fe^3+": 1},
    "[Cu+2]": {"Cu^2+": 1},
    "[Zn+2]": {"Zn^2+": 1},
    "[Ag+]": {"Ag^+": 1},
    "[Pb+2]": {"Pb^2+": 1},
    "[Mn+2]": {"Mn^2+": 1},
    "[F-]": {"F^-": 1},
    "[Cl-]": {"Cl^-": 1},
    "[Br-]": {"Br^-": 1},
    "[I-]": {"I^-": 1},
    "[OH-]": {WATER: 1, PROTON: -1},
    "[O-2]": {WATER: 1, PROTON: -2},
    "[NH4+]": {"ammonia": 1, PROTON: 1},
    "[BH4-]": {"BH4^-": 1},
    "[N+](=O)([O-])[O-]": {"NO3^-": 1},
    "C(#N)[S-]": {"SCN^-": 1},
    "[O-][I](=O)=O": {"IO3^-": 1},
    "[O-][Mn](=O)(=O)=O": {"MnO4^-": 1},
    "[O-][Cr](=O)(=O)O[Cr](=O)(=O)[O-]": {"Cr2O7^2-": 1},
    "O=S([O-])([O-])=S": {"S2O3^2-": 1},
    "[O-]S(=O)S(=O)(=O)[O-]": {"S2O5^2-": 1},
    "[O-]S(=O)(=O)[O-]": {_SULFATE: 1, PROTON: -2},
    "OS(=O)(=O)[O-]": {_SULFATE: 1, PROTON: -1},
    "C(=O)([O-])[O-]": {_CARBONATE: 1, WATER: 1, PROTON: -2},
    "C(=O)(O)[O-]": {_CARBONATE: 1, WATER: 1, PROTON: -1},
    "[O-]S(=O)[O-]": {"sulfur-dioxide": 1, WATER: 1, PROTON: -2},
    "OS(=O)[O-]": {"sulfur-dioxide": 1, WATER: 1, PROTON: -1},
    "OP(=O)(O)[O-]": {_PHOSPHATE: 1, PROTON: -1},
    "OP(=O)([O-])[O-]": {_PHOSPHATE: 1, PROTON: -2},
    "[O-]P(=O)([O-])[O-]": {_PHOSPHATE: 1, PROTON: -3},
    "N(=O)[O-]": {"nitrous-acid": 1, PROTON: -1},
}
#: Strong acids by key, as their ions.
STRONG_ACIDS: Mapping[str, Mapping[str, int]] = {
    "hydrogen-chloride": {PROTON: 1, "Cl^-": 1},
    "hydrogen-bromide": {PROTON: 1, "Br^-": 1},
    "nitric-acid": {PROTON: 1, "NO3^-": 1},
}
_NITRO = "[N+](=O)[O-]"
_PLUS = re.compile(r"\[(N|n)H?\d?\+\]")


def parent_of(fragment: str) -> tuple[str, int]:
    """Turn the SMILES of an organic ion back into that of its parent.

    Returns:
        The parent's SMILES, and how many protons the ion has more than it.

    >>> parent_of("CCOC(=O)C1=CC=C(C=C1)[NH3+]"), parent_of("CC(=O)[O-]")
    (('CCOC(=O)C1=CC=C(C=C1)N', 1), ('CC(=O)O', -1))
    """
    held = fragment.replace(_NITRO, "\0")
    bare, gained = _PLUS.subn(lambda found: found[1], held)
    lost = bare.count("[O-]")
    bare = bare.replace("[O-]", "O")
    return bare.replace("\0", _NITRO), gained - lost


def is_neutral(smiles: str) -> bool:
    """Tell whether a SMILES is one neutral molecule (nitro groups and zwitterions count as such)."""
    plain = smiles.replace(_NITRO, "")
    return "." not in plain and not re.search(r"[+-]\d?\]", plain)


def components_of(
    substance: Substance, by_smiles: Callable[[str], str | None]
) -> Mapping[str, int]:
    """Work out the components of a substance.

    Args:
        substance: Any.
        by_smiles: Gives the key of the neutral substance with a SMILES, or None.

    Returns:
        Moles of each component a mole of the substance. One with an ion that is not known here (a
        dye's, a hypochlorite) is a component of its own: its pKa values hold for it as it stands.
    """
    if substance.key in STRONG_ACIDS:
        return STRONG_ACIDS[substance.key]
    if not substance.smiles or is_neutral(substance.smiles):
        return {substance.key: 1}
    total: dict[str, int] = {}
    for fragment in substance.smiles.split("."):
        found = FRAGMENTS.get(fragment)
        if found is None:
            smiles, protons = parent_of(fragment)
            key = by_smiles(smiles)
            if key is None:
                return {substance.key: 1}
            found = {key: 1, PROTON: protons} if protons else {key: 1}
        for component, count in found.items():
            total[component] = total.get(component, 0) + count
    return {component: count for component, count in total.items() if count}
