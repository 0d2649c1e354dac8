"""Elements: symbols, names and standard atomic weights.

Elements without a stable isotope have no standard atomic weight (thorium, protactinium and uranium
do: their make-up in nature is known). They are known here all the same, without a figure, so that
a formula that holds one is read and only its molar mass is refused. Deuterium and tritium stand
beside the elements under the symbols D and T, as chemists write them.

Source: IUPAC, standard atomic weights 2021; where an interval is published, its conventional value.
Deuterium and tritium: their atomic masses, rounded to six decimals, from memory. Every figure is
compared with two independent libraries in `tests/outside`.
"""

from __future__ import annotations

from types import MappingProxyType
from typing import NamedTuple


class Element(NamedTuple):
    """One element, or one of the two isotopes of hydrogen that have a symbol of their own.

    Attributes:
        number: Atomic number.
        symbol: As it stands in formulas.
        name: English name, spelt as IUPAC spells it.
        weight: Standard atomic weight (number equal to g/mol), or None where there is none.
    """

    number: int
    symbol: str
    name: str
    weight: float | None


_ROWS = (
    Element(1, "H", "hydrogen", 1.008),
    Element(1, "D", "deuterium", 2.014102),
    Element(1, "T", "tritium", 3.016049),
    Element(2, "He", "helium", 4.002602),
    Element(3, "Li", "lithium", 6.94),
    Element(4, "Be", "beryllium", 9.0121831),
    Element(5, "B", "boron", 10.81),
    Element(6, "C", "carbon", 12.011),
    Element(7, "N", "nitrogen", 14.007),
    Element(8, "O", "oxygen", 15.999),
    Element(9, "F", "fluorine", 18.998403162),
    Element(10, "Ne", "neon", 20.1797),
    Element(11, "Na", "sodium", 22.98976928),
    Element(12, "Mg", "magnesium", 24.305),
    Element(13, "Al", "aluminium", 26.9815384),
    Element(14, "Si", "silicon", 28.085),
    Element(15, "P", "phosphorus", 30.973761998),
    Element(16, "S", "sulfur", 32.06),
    Element(17, "Cl", "chlorine", 35.45),
    Element(18, "Ar", "argon", 39.95),
    Element(19, "K", "potassium", 39.0983),
    Element(20, "Ca", "calcium", 40.078),
    Element(21, "Sc", "scandium", 44.955907),
    Element(22, "Ti", "titanium", 47.867),
    Element(23, "V", "vanadium", 50.9415),
    Element(24, "Cr", "chromium", 51.9961),
    Element(25, "Mn", "manganese", 54.938043),
    Element(26, "Fe", "iron", 55.845),
    Element(27, "Co", "cobalt", 58.933194),
    Element(28, "Ni", "nickel", 58.6934),
    Element(29, "Cu", "copper", 63.546),
    Element(30, "Zn", "zinc", 65.38),
    Element(31, "Ga", "gallium", 69.723),
    Element(32, "Ge", "germanium", 72.630),
    Element(33, "As", "arsenic", 74.921595),
    Element(34, "Se", "selenium", 78.971),
    Element(35, "Br", "bromine", 79.904),
    Element(36, "Kr", "krypton", 83.798),
    Element(37, "Rb", "rubidium", 85.4678),
    Element(38, "Sr", "strontium", 87.62),
    Element(39, "Y", "yttrium", 88.905838),
    Element(40, "Zr", "zirconium", 91.224),
    Element(41, "Nb", "niobium", 92.90637),
    Element(42, "Mo", "molybdenum", 95.95),
    Element(43, "Tc", "technetium", None),
    Element(44, "Ru", "ruthenium", 101.07),
    Element(45, "Rh", "rhodium", 102.90549),
    Element(46, "Pd", "palladium", 106.42),
    Element(47, "Ag", "silver", 107.8682),
    Element(48, "Cd", "cadmium", 112.414),
    Element(49, "In", "indium", 114.818),
    Element(50, "Sn", "tin", 118.710),
    Element(51, "Sb", "antimony", 121.760),
    Element(52, "Te", "tellurium", 127.60),
    Element(53, "I", "iodine", 126.90447),
    Element(54, "Xe", "xenon", 131.293),
    Element(55, "Cs", "caesium", 132.90545196),
    Element(56, "Ba", "barium", 137.327),
    Element(57, "La", "lanthanum", 138.90547),
    Element(58, "Ce", "cerium", 140.116),
    Element(59, "Pr", "praseodymium", 140.90766),
    Element(60, "Nd", "neodymium", 144.242),
    Element(61, "Pm", "promethium", None),
    Element(62, "Sm", "samarium", 150.36),
    Element(63, "Eu", "europium", 151.964),
    Element(64, "Gd", "gadolinium", 157.25),
    Element(65, "Tb", "terbium", 158.925354),
    Element(66, "Dy", "dysprosium", 162.500),
    Element(67, "Ho", "holmium", 164.930329),
    Element(68, "Er", "erbium", 167.259),
    Element(69, "Tm", "thulium", 168.934219),
    Element(70, "Yb", "ytterbium", 173.045),
    Element(71, "Lu", "lutetium", 174.9668),
    Element(72, "Hf", "hafnium", 178.486),
    Element(73, "Ta", "tantalum", 180.94788),
    Element(74, "W", "tungsten", 183.84),
    Element(75, "Re", "rhenium", 186.207),
    Element(76, "Os", "osmium", 190.23),
    Element(77, "Ir", "iridium", 192.217),
    Element(78, "Pt", "platinum", 195.084),
    Element(79, "Au", "gold", 196.966570),
    Element(80, "Hg", "mercury", 200.592),
    Element(81, "Tl", "thallium", 204.38),
    Element(82, "Pb", "lead", 207.2),
    Element(83, "Bi", "bismuth", 208.98040),
    Element(84, "Po", "polonium", None),
    Element(85, "At", "astatine", None),
    Element(86, "Rn", "radon", None),
    Element(87, "Fr", "francium", None),
    Element(88, "Ra", "radium", None),
    Element(89, "Ac", "actinium", None),
    Element(90, "Th", "thorium", 232.0377),
    Element(91, "Pa", "protactinium", 231.03588),
    Element(92, "U", "uranium", 238.02891),
    Element(93, "Np", "neptunium", None),
    Element(94, "Pu", "plutonium", None),
    Element(95, "Am", "americium", None),
    Element(96, "Cm", "curium", None),
    Element(97, "Bk", "berkelium", None),
    Element(98, "Cf", "californium", None),
    Element(99, "Es", "einsteinium", None),
    Element(100, "Fm", "fermium", None),
    Element(101, "Md", "mendelevium", None),
    Element(102, "No", "nobelium", None),
    Element(103, "Lr", "lawrencium", None),
    Element(104, "Rf", "rutherfordium", None),
    Element(105, "Db", "dubnium", None),
    Element(106, "Sg", "seaborgium", None),
    Element(107, "Bh", "bohrium", None),
    Element(108, "Hs", "hassium", None),
    Element(109, "Mt", "meitnerium", None),
    Element(110, "Ds", "darmstadtium", None),
    Element(111, "Rg", "roentgenium", None),
    Element(112, "Cn", "copernicium", None),
    Element(113, "Nh", "nihonium", None),
    Element(114, "Fl", "flerovium", None),
    Element(115, "Mc", "moscovium", None),
    Element(116, "Lv", "livermorium", None),
    Element(117, "Ts", "tennessine", None),
    Element(118, "Og", "oganesson", None),
)

#: Every element by its symbol, in the order of the periodic table.
ELEMENTS = MappingProxyType({row.symbol: row for row in _ROWS})

#: Atomic weight by symbol, g/mol, of the elements that have one.
WEIGHTS = MappingProxyType({row.symbol: row.weight for row in _ROWS if row.weight is not None})
