"""Hydrogens that a structure leaves unwritten, and whether its aromatic rings can be.

A SMILES string leaves out the hydrogens of common atoms: each atom has as many as bring its bonds
to the next normal valence. Aromatic atoms share their double bonds, so they are counted with one
bond less to give away, and afterwards the double bonds are really set: a ring where they do not
fit (`c1cccc1`, `n1cccc1`) has another number of hydrogens than its letters say and is refused.
"""

from __future__ import annotations

from dataclasses import dataclass, field

#: Normal valences of the atoms that may stand without brackets.
#: Source: the OpenSMILES specification, "organic subset".
NORMAL_VALENCES: dict[str, tuple[int, ...]] = {
    "B": (3,),
    "C": (4,),
    "N": (3, 5),
    "O": (2,),
    "P": (3, 5),
    "S": (2, 4, 6),
    "F": (1,),
    "Cl": (1,),
    "Br": (1,),
    "I": (1,),
}
#: Valence of an aromatic atom by its charge; atoms of one column alike.
#: Source: the octet rule: an aromatic carbon ion of either sign has three bonds, N+ has four.
_AROMATIC_VALENCES = {
    "B": {0: 3, -1: 4},
    "C": {0: 4, 1: 3, -1: 3},
    "N": {0: 3, 1: 4, -1: 2},
    "P": {0: 3, 1: 4, -1: 2},
    "As": {0: 3, 1: 4, -1: 2},
    "O": {0: 2, 1: 3},
    "S": {0: 2, 1: 3},
    "Se": {0: 2, 1: 3},
}
#: Attempts at setting double bonds before a structure is given up as too large.
_MOST_ATTEMPTS = 2_000


@dataclass(slots=True)
class Atom:
    """An atom while its string is read.

    Attributes:
        symbol: Element, with its capital; D and T for the heavy hydrogens.
        aromatic: Written with a small letter.
        charge: Charge number.
        hydrogens: Hydrogens written in its brackets; None for an atom without brackets.
        start: Where it stands in the text.
        end: Where it ends.
        sigma: Number of neighbours.
        pi: Bonds beyond the first to each neighbour.
        shared: Aromatic neighbours by aromatic bonds, as indices.
    """

    symbol: str
    aromatic: bool
    charge: int
    hydrogens: int | None
    start: int
    end: int
    sigma: int = 0
    pi: int = 0
    shared: list[int] = field(default_factory=list)


def hydrogens(atom: Atom) -> int | None:
    """Count the hydrogens of an atom, written or not.

    Returns:
        Their number, or None where an atom without brackets has more bonds than it can.
    """
    if atom.hydrogens is not None:
        return atom.hydrogens
    bonds = atom.sigma + atom.pi
    valences = NORMAL_VALENCES[atom.symbol]
    if atom.aromatic:
        # Beyond the lowest valence no hydrogen is meant: `s` with its oxygens, `n` with a group.
        return max(0, valences[0] - bonds - 1) if bonds <= valences[-1] else None
    return next((valence - bonds for valence in valences if valence >= bonds), None)


def unmatched(atoms: list[Atom]) -> Atom | None:
    """Set the double bonds of the aromatic atoms.

    Args:
        atoms: All atoms of the structure, bonds counted.

    Returns:
        None where they fit; else an aromatic atom that is left without its double bond.

    Source:
        A perfect matching of the atoms that want a double bond, searched with the atom of fewest
        free neighbours first.
    """
    free = {index: atom for index, atom in enumerate(atoms) if atom.aromatic and _wants(atom)}
    left = set(free)
    trail: list[tuple[int, list[int], int]] = []
    for _ in range(_MOST_ATTEMPTS):
        if not left:
            return None
        index = min(left, key=lambda i: (sum(j in left for j in free[i].shared), i))
        choices = [j for j in free[index].shared if j in left]
        while not choices:
            if not trail:
                return free[index]
            index, choices, partner = trail.pop()
            left |= {index, partner}
        partner = choices[0]
        trail.append((index, choices[1:], partner))
        left -= {index, partner}
    return free[min(left)]


def _wants(atom: Atom) -> bool:
    """Tell whether an aromatic atom has a bond left for a double bond in the ring."""
    valence = _AROMATIC_VALENCES.get(atom.symbol, {}).get(atom.charge, 0)
    return valence - atom.sigma - atom.pi - (hydrogens(atom) or 0) >= 1
