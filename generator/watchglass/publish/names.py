"""What things are called in sentences: vessels, materials, layers."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.publish.model import Run
from watchglass.publish.text import NBSP, joined, quantity_words
from watchglass.resolve import model

if TYPE_CHECKING:
    from watchglass.publish.model import Words
    from watchglass.resolve.model import Material, Procedure, Vessel

_MARKED = re.compile(r"[A-Z]\d*|[A-Za-z]*\d+")
_INVERTED = re.compile(
    r"(.+), (anhydrous|glacial|concentrated|dried|absolute|dihydrate|monohydrate)"
)
PARTS = {
    "aqueous": "the aqueous layer",
    "organic": "the organic layer",
    "upper": "the upper layer",
    "lower": "the lower layer",
    "solid": "the solid",
    "liquid": "the liquid",
}


def vessel_name(vessel: Vessel, procedure: Procedure) -> str:
    """Call a vessel as a person at the bench would, told apart from its like.

    A vessel with a letter or number for a name keeps it (`flask A`); one of its kind alone is
    `the separatory funnel`; otherwise the size tells, or at last the author's own name.
    """
    if vessel.type is None:
        return vessel.name
    noun = vessel.type.type.name
    if vessel.family:
        return f"{_head(noun)}{NBSP}{vessel.name.removeprefix(vessel.family + '-')}"
    if _MARKED.fullmatch(vessel.name):
        return f"{_head(noun)}{NBSP}{vessel.name}"
    written = vessel.type.written or noun
    alike = [
        v for v in procedure.vessels.values() if v.type and v.type.type.key == vessel.type.type.key
    ]
    if len(alike) == 1:
        return f"the {written}"
    same_size = [v for v in alike if v.type and _size(v) == _size(vessel)]
    if len(same_size) == 1 and vessel.type.size is not None:
        return f"the {vessel.type.size.text.replace(' ', NBSP)} {written}"
    tared = [v for v in alike if v.type and "tared" in v.type.states]
    if "tared" in vessel.type.states and len(tared) == 1:
        return f"the tared {written}"
    return f"the {written} “{vessel.name}”"


def _head(noun: str) -> str:
    return noun.rpartition(" ")[2]


def _size(vessel: Vessel) -> float | None:
    return vessel.type.size.si if vessel.type and vessel.type.size else None


def vessel_short(vessel: Vessel) -> str:
    """Give the type and size of a vessel for lists."""
    return vessel.written.replace(" mL", f"{NBSP}mL").replace(" mm", f"{NBSP}mm")


def material_words(material: Material) -> tuple[Words, ...]:
    """Call a material as the reader knows it: strength and substance, or its own name."""
    match material.composition:
        case model.Solution(strength, _, _):
            return joined((*quantity_words(strength.quantity), Run(" "), *solute_words(material)))
        case model.Saturated() if material.written.startswith("saturated"):
            return joined((Run("saturated "), *solute_words(material)))
        case _:
            return solute_words(material)


def solute_words(material: Material) -> tuple[Words, ...]:
    """Call a material without its strength, for where the strength stands beside it."""
    written = material.written
    match material.composition:
        case model.Solution(strength, solute, _):
            if written.startswith(strength.quantity.text):
                return (Run(_upright(written.removeprefix(strength.quantity.text).strip())),)
            return (Run(solute.name),)
        case model.Saturated():
            return (Run(_upright(written.removeprefix("saturated").strip())),)
        case model.Mixture() | model.Continued():
            return (Run(f"the {material.name.replace('-', ' ')}"),)
        case model.Secret():
            return (Run("the sample"),)
        case _:
            return (Run(_upright(written or material.name)),)


def _upright(written: str) -> str:
    """Turn `sodium sulfate, anhydrous` into `anhydrous sodium sulfate`."""
    found = _INVERTED.fullmatch(written)
    return f"{found[2]} {found[1]}" if found else written


def thing_name(name: str, procedure: Procedure) -> tuple[Words, ...]:
    """Call anything that has a local name, or an aid, a bath or a catalogue key."""
    if name in procedure.vessels:
        return (Run(vessel_name(procedure.vessels[name], procedure)),)
    if name in procedure.materials:
        return material_words(procedure.materials[name])
    if name in procedure.equipment:
        written = procedure.equipment[name].written
        return (Run(f"the {written.partition(',')[0]}"),)
    return (Run(name.replace("-", " ")),)
