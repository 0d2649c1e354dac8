"""SMILES: the atoms and the charge of a structure, counted.

Only counted: nothing is drawn, named or compared. A catalogue gives formula and structure of the
same substance, and the count tells whether they are. Our own reader of the OpenSMILES language,
for no library that reads it is small; and strict, for a count is worth something only where every
sign of the text was understood. What this reader refuses although the language allows it: `*`,
isotopes but those of hydrogen, `%` with brackets, and a dot inside a branch.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NamedTuple

from watchglass.chemistry.elements import ELEMENTS
from watchglass.chemistry.formulas import hill_order
from watchglass.chemistry.valence import Atom, hydrogens, unmatched

if TYPE_CHECKING:
    from watchglass.chemistry.formulas import Count

LONGEST = 600
DEEPEST = 100
LONGEST_ATOM = 20

# Expressions are compiled where they are used, and `re` keeps them: start-up is felt.
_PLAIN = r"Cl|Br|[BCNOPSFI]|[bcnops]"
_BRACKET = (
    r"\[(?P<isotope>[0-9]+)?(?P<symbol>[A-Z][a-z]?|se|as|[bcnops])(?:@@?)?"
    r"(?P<hydrogens>H[0-9]?)?(?P<charge>\+\+|--|[+-][0-9]?)?(?::[0-9]{1,4})?\]"
)
_RING = r"[0-9]|%[0-9]{2}"
#: Bonds beyond the first that a sign stands for; `:` and none between small letters are aromatic.
_BONDS = {"-": 0, "/": 0, "\\": 0, ":": 0, "=": 1, "#": 2, "$": 3}
_HEAVY = {"1": "H", "2": "D", "3": "T"}


class SmilesFault(NamedTuple):
    """Why a text cannot be counted: what is wrong, where, and how to write it."""

    message: str
    start: int
    end: int
    help: str | None = None


class Atoms(NamedTuple):
    """The count of a structure.

    Attributes:
        composition: Number of atoms of each element, in Hill order; `[2H]` counts as D.
        charge: Charge number of the whole.
    """

    composition: tuple[tuple[str, Count], ...]
    charge: int


def count_atoms(text: str) -> Atoms | SmilesFault:
    """Count atoms and charge of a SMILES string; never raises.

    >>> count_atoms("CC(=O)Oc1ccccc1C(=O)O").composition
    (('C', 9), ('H', 8), ('O', 4))

    Source:
        The OpenSMILES specification; normal valences as there.
    """
    if not text:
        return SmilesFault("a structure is missing", 0, 0)
    if len(text) > LONGEST:
        return SmilesFault(f"a structure of more than {LONGEST} signs", LONGEST, len(text))
    reader = _Reader(text)
    fault = reader.read()
    return fault or _counted(reader.atoms)


def _counted(atoms: list[Atom]) -> Atoms | SmilesFault:
    total: dict[str, Count] = {}
    for atom in atoms:
        number = hydrogens(atom)
        if number is None:
            return SmilesFault(
                f"`{atom.symbol}` has {atom.sigma + atom.pi} bonds, more than it can without brackets",
                atom.start,
                atom.end,
                "look for a bond too many, or write the atom in brackets with its hydrogens",
            )
        total[atom.symbol] = total.get(atom.symbol, 0) + 1
        total["H"] = total.get("H", 0) + number
    lonely = unmatched(atoms)
    if lonely is not None:
        return SmilesFault(
            "the double bonds of the aromatic ring do not come out",
            lonely.start,
            lonely.end,
            "write the hydrogen of a nitrogen in the ring, as `[nH]`, or the ring with `=`",
        )
    return Atoms(hill_order(total), sum(atom.charge for atom in atoms))


class _Ring(NamedTuple):
    """A ring left open: its atom, its bond sign or none, its place."""

    atom: int
    bond: str
    start: int
    end: int


class _Reader:
    """Reads one string into atoms with their bonds counted."""

    __slots__ = ("at", "atoms", "bond", "bonded", "branches", "previous", "rings", "text")

    def __init__(self, text: str) -> None:
        """Begin at the start of a text."""
        self.text = text
        self.at = 0
        self.atoms: list[Atom] = []
        self.previous: int | None = None
        self.bond = ""
        self.branches: list[tuple[int, int]] = []
        self.rings: dict[str, _Ring] = {}
        self.bonded: set[tuple[int, int]] = set()

    def read(self) -> SmilesFault | None:
        """Read to the end, or to the first fault."""
        while self.at < len(self.text):
            fault = self._step()
            if fault is not None:
                return fault
        if self.bond:
            return self._fault(f"the bond `{self.bond}` leads nowhere", self.at - 1, self.at)
        if self.branches:
            start = self.branches[-1][1]
            return self._fault("`(` is not closed", start, start + 1)
        if self.rings:
            number, ring = next(iter(self.rings.items()))
            return self._fault(f"ring `{number}` is not closed", ring.start, ring.end)
        if self.previous is None:
            return self._fault("no atom stands after `.`", self.at - 1, self.at)
        return None

    def _step(self) -> SmilesFault | None:
        sign = self.text[self.at]
        if sign == "[":
            return self._bracket()
        if found := re.compile(_PLAIN).match(self.text, self.at):
            symbol = found[0].capitalize()
            return self._add(Atom(symbol, found[0].islower(), 0, None, self.at, found.end()))
        if found := re.compile(_RING).match(self.text, self.at):
            return self._ring(found[0].lstrip("%").lstrip("0") or "0", found.end())
        if sign in _BONDS:
            if self.bond or self.previous is None:
                return self._fault(f"the bond `{sign}` begins at no atom")
            self.bond = sign
            self.at += 1
            return None
        if sign in "().":
            return self._structure(sign)
        if sign.isspace():
            return self._fault("a structure holds no space")
        return self._fault(f"`{sign}` cannot stand in a structure")

    def _structure(self, sign: str) -> SmilesFault | None:
        """Read the start or end of a branch, or the dot between two parts."""
        if self.bond:
            return self._fault(f"the bond `{self.bond}` leads nowhere", self.at - 1, self.at)
        if sign == ")":
            if not self.branches:
                return self._fault("`)` closes nothing")
            if self.text[self.at - 1] == "(":
                return self._fault("nothing stands in the brackets", self.at - 1, self.at + 1)
            self.previous = self.branches.pop()[0]
        elif self.previous is None:
            return self._fault(f"no atom stands before `{sign}`")
        elif sign == "(":
            if len(self.branches) == DEEPEST:
                return self._fault(f"more than {DEEPEST} branches in one another")
            if self.text[self.at - 1] == "(":
                return self._fault("a branch begins with an atom")
            self.branches.append((self.previous, self.at))
        elif self.branches:
            return self._fault("a dot stands inside a branch")
        else:
            self.previous = None
        self.at += 1
        return None

    def _bracket(self) -> SmilesFault | None:
        closing = self.text.find("]", self.at)
        if closing < 0:
            return self._fault("`[` is not closed")
        found = re.compile(_BRACKET).match(self.text, self.at)
        end = closing + 1
        if found is None:
            shown = self.text[self.at : end] if end - self.at <= LONGEST_ATOM else "[…]"
            example = "write an atom in brackets as `[NH4+]` or `[Fe+3]`"
            return self._fault(f"`{shown}` is no atom", self.at, end, example)
        isotope, written, count, charge = found.group("isotope", "symbol", "hydrogens", "charge")
        symbol = written.capitalize()
        if symbol not in ELEMENTS or symbol in ("D", "T"):
            help_ = "write `[2H]`" if symbol == "D" else "write `[3H]`" if symbol == "T" else None
            return self._fault(f"`{symbol}` is no element", *found.span("symbol"), help_)
        if isotope is not None:
            if symbol != "H" or isotope not in _HEAVY:
                message = "isotopes are counted for hydrogen only"
                return self._fault(message, found.start("isotope"), found.end("symbol"))
            symbol = _HEAVY[isotope]
        number = 0 if count is None else int(count[1:] or 1)
        if symbol in ("H", "D", "T") and number:
            return self._fault("a hydrogen has no hydrogens", *found.span("hydrogens"))
        atom = Atom(symbol, written.islower(), _charge(charge or ""), number, self.at, end)
        return self._add(atom)

    def _add(self, atom: Atom) -> SmilesFault | None:
        index = len(self.atoms)
        self.atoms.append(atom)
        if self.previous is not None and not self._join(self.previous, index, self.bond):
            return self._fault("`:` joins aromatic atoms only", self.at - 1, self.at)
        self.previous = index
        self.bond = ""
        self.at = atom.end
        return None

    def _ring(self, number: str, end: int) -> SmilesFault | None:
        if self.previous is None or self.text[self.at - 1] in "()":
            return self._fault(f"ring `{number}` begins at no atom", self.at, end)
        opened = self.rings.pop(number, None)
        if opened is None:
            start = self.at - len(self.bond)
            self.rings[number] = _Ring(self.previous, self.bond, start, end)
        else:
            pair = (min(opened.atom, self.previous), max(opened.atom, self.previous))
            if pair[0] == pair[1] or pair in self.bonded:
                return self._fault(f"ring `{number}` joins atoms that are joined", self.at, end)
            both = {bond for bond in (opened.bond, self.bond) if bond}
            if len({_BONDS[bond] for bond in both}) > 1:
                return self._fault(f"ring `{number}` has two kinds of bond", self.at, end)
            if not self._join(opened.atom, self.previous, max(both, default="")):
                return self._fault("`:` joins aromatic atoms only", self.at - 1, end)
        self.bond = ""
        self.at = end
        return None

    def _join(self, one: int, other: int, bond: str) -> bool:
        """Join two atoms; false for an aromatic bond between others than aromatic atoms."""
        first, second = self.atoms[one], self.atoms[other]
        if bond == ":" and not (first.aromatic and second.aromatic):
            return False
        self.bonded.add((min(one, other), max(one, other)))
        more = _BONDS.get(bond, 0)
        for atom in (first, second):
            atom.sigma += 1
            atom.pi += more
        if first.aromatic and second.aromatic and bond in ("", ":"):
            first.shared.append(other)
            second.shared.append(one)
        return True

    def _fault(
        self,
        message: str,
        start: int | None = None,
        end: int | None = None,
        help_: str | None = None,
    ) -> SmilesFault:
        """Make a fault; of the sign at hand where no place is given."""
        begin = self.at if start is None else start
        return SmilesFault(message, begin, begin + 1 if end is None else end, help_)


def _charge(text: str) -> int:
    """Read `+`, `--` or `+2`."""
    sign = -1 if text.startswith("-") else 1
    size = text[1:] if text[1:].isdigit() else ""
    return sign * int(size) if size else sign * len(text)
