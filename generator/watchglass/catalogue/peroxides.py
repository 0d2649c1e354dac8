"""Liquids that form explosive peroxides on standing, by class.

Classes after the storage table of the US National Research Council's Prudent Practices in the
Laboratory, as an appendix of a university safety manual gives it: A without concentration, B when
concentrated, D may. Alcohols and hydrocarbons that the same lists call slow are not here: teaching
stores have them fresh. tert-Butyl methyl ether, ethyl acetate and the other resistant liquids are
not here either.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from collections.abc import Mapping

_LIST = "storage table after Prudent Practices (National Research Council), read in a copy"
_MEMORY = "supplier data and Prudent Practices (National Research Council, 2011), from memory"


class PeroxideFormer(NamedTuple):
    """Its class (`A`, `B` or `D`) and where that is from."""

    class_: str
    source: str


#: By CAS number.
PEROXIDE_FORMERS: Mapping[str, PeroxideFormer] = {
    "108-20-3": PeroxideFormer("A", _LIST),  # diisopropyl ether
    "60-29-7": PeroxideFormer("B", _LIST),  # diethyl ether
    "109-99-9": PeroxideFormer("B", _LIST),  # tetrahydrofuran
    "123-91-1": PeroxideFormer("B", _LIST),  # 1,4-dioxane
    "110-71-4": PeroxideFormer("B", _LIST),  # 1,2-dimethoxyethane
    "111-96-6": PeroxideFormer("B", _LIST),  # diglyme
    "105-57-7": PeroxideFormer("B", _LIST),  # acetal
    "98-82-8": PeroxideFormer("B", _LIST),  # cumene
    "110-83-8": PeroxideFormer("B", _LIST),  # cyclohexene
    "91-17-8": PeroxideFormer("B", _LIST),  # decahydronaphthalene
    "119-64-2": PeroxideFormer("B", _LIST),  # tetrahydronaphthalene
    "77-73-6": PeroxideFormer("B", _LIST),  # dicyclopentadiene
    "96-37-7": PeroxideFormer("B", _LIST),  # methylcyclopentane
    "96-47-9": PeroxideFormer("B", _MEMORY),  # 2-methyltetrahydrofuran
    "142-96-1": PeroxideFormer("B", _MEMORY),  # dibutyl ether
    "110-00-9": PeroxideFormer("B", _MEMORY),  # furan
    "5989-27-5": PeroxideFormer("D", _MEMORY),  # d-limonene
    "557-40-4": PeroxideFormer("D", _LIST),  # diallyl ether
    "1746-13-0": PeroxideFormer("D", _LIST),  # allyl phenyl ether
    "931-88-4": PeroxideFormer("D", _LIST),  # cyclooctene
    "112-58-3": PeroxideFormer("D", _LIST),  # dihexyl ether
}
