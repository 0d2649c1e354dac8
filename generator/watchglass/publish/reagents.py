"""The reagent table: computed from the steps, nothing typed in.

One row a material; a mixture's components follow it as rows of their own. What cannot be known is
printed as `unknown`, what the bench decides as `as needed`.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.publish import model as m
from watchglass.publish.names import material_words, solute_words
from watchglass.publish.text import NBSP, formula_words, quantity_words, value_words
from watchglass.resolve import model
from watchglass.run.content import Content, Missing
from watchglass.run.roles import material_contents

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.catalogue.substances import Substance
    from watchglass.run.roles import Role
    from watchglass.run.usage import Total, Usage

_NEEDED = "as needed"
_UNKNOWN = (m.Run("unknown"),)


def reagent_rows(
    procedure: model.Procedure, used: Mapping[str, Usage], found: tuple[Role, ...]
) -> tuple[m.ReagentRow, ...]:
    """Make the table: one row a material in the order declared, components after their mixture."""
    rows: list[m.ReagentRow] = []
    several = len(procedure.reactions) > 1
    for name, material in procedure.materials.items():
        mine = [role for role in found if role.material == name]
        rows += _material(material, used.get(name), mine, several=several)
    return tuple(rows)


def _material(
    material: model.Material, used: Usage | None, found: list[Role], *, several: bool
) -> list[m.ReagentRow]:
    contents = material_contents(material, used)
    substance = _substance(material.composition)
    mixture = isinstance(material.composition, model.Mixture)
    amount: tuple[m.Words, ...] = ()
    solvent = substance is not None and substance.key == "water" and not found
    if not mixture and not solvent:
        amount = _amount(contents, used)
    rows = [
        m.ReagentRow(
            name=solute_words(material),
            local=_local(material),
            formula=_formula(substance),
            molar_mass=_molar_mass(substance),
            used=_used(used),
            portions=_portions(used),
            amount=amount,
            equivalents=() if mixture else _equivalents(found, several=several),
            strength=_strength(material),
            provided=_provided(material),
            rests_on=contents[0].assumptions if isinstance(contents, tuple) and amount else (),
            material=material.name,
            key=substance.key if substance is not None else "",
            stock=material.stock,
        )
    ]
    if mixture and isinstance(contents, tuple):
        rows += [
            _component(
                c, [r for r in found if r.substance == c.substance.key], several, material.name
            )
            for c in contents
        ]
    return rows


def _component(
    content: Content,
    found: list[Role],
    several: bool,  # noqa: FBT001
    material: str,
) -> m.ReagentRow:
    milligrams = content.mass < 1e-3
    return m.ReagentRow(
        name=(m.Run(f"of which {content.substance.name}"),),
        local="",
        formula=_formula(content.substance),
        molar_mass=_molar_mass(content.substance),
        used=value_words(
            shown(content.mass * (1e6 if milligrams else 1e3), content.figures),
            "mg" if milligrams else "g",
        ),
        portions="",
        amount=moles_words(content.moles, content.figures),
        equivalents=_equivalents(found, several=several),
        strength=(),
        provided=(),
        rests_on=content.assumptions,
        material=material,
        key=content.substance.key,
    )


def _local(material: model.Material) -> str:
    """Give the name the steps use, where the reader's words do not say it already."""
    local = material.name.replace("-", " ")
    said = "".join(w.text for w in material_words(material) if isinstance(w, m.Run)).casefold()
    return "" if local.casefold() in said.removeprefix("the ").split(" of ") else local


def _substance(composition: model.Composition) -> Substance | None:
    match composition:
        case (
            model.Pure(substance) | model.Solution(_, substance, _) | model.Saturated(substance, _)
        ):
            return substance
        case _:
            return None


def _formula(substance: Substance | None) -> tuple[m.Words, ...]:
    return formula_words(substance.formula) if substance and substance.formula else ()


def _molar_mass(substance: Substance | None) -> str:
    mass = substance.molar_mass if substance else None
    return f"{mass:.2f}" if mass is not None else ""


def moles_words(moles: float, figures: int) -> tuple[m.Words, ...]:
    """Set an amount of substance: mmol below one mole, which is what a bench works in."""
    if moles < 1e-6:
        return value_words(shown(moles * 1e6, figures), "µmol")
    if moles < 1:
        return value_words(shown(moles * 1e3, figures), "mmol")
    return value_words(shown(moles, figures), "mol")


def _amount(
    contents: tuple[Content, ...] | Missing | None, used: Usage | None
) -> tuple[m.Words, ...]:
    if used is None or (used.as_needed and not used.totals):
        return (m.Run(_NEEDED),) if used and used.as_needed else ()
    if used.as_needed:
        return (m.Run(_NEEDED),)
    if isinstance(contents, Missing):
        return _UNKNOWN
    if contents is None:
        return ()
    return moles_words(contents[0].moles, contents[0].figures)


def _used(used: Usage | None) -> tuple[m.Words, ...]:
    if used is None or not used.uses:
        return (m.Run(_NEEDED),) if used and used.as_needed else (m.Run("–"),)
    parts: list[tuple[m.Words, ...]] = [total_words(total) for total in used.totals]
    if used.unsummed:
        parts.append((m.Run("more in proportion"),))
    words: list[m.Words] = []
    for index, part in enumerate(parts):
        words += (m.Run(" and "), *part) if index else part
    if used.as_needed:
        words = [m.Run(f"{_NEEDED} ("), *words, m.Run(" charged)")]
    return tuple(words)


def total_words(total: Total) -> tuple[m.Words, ...]:
    """Set a sum in the unit of its first part."""
    low = shown(total.low / total.factor, total.figures)
    text = low
    if total.high > total.low * (1 + 1e-9):
        text = f"{low}–{shown(total.high / total.factor, total.high_figures)}"
    if total.dimension == dim.COUNT:
        text = text.rstrip("0").rstrip(".") if "." in text else text
    about = (m.Run(f"about{NBSP}"),) if total.about else ()
    return (*about, *value_words(text, total.symbol))


def _portions(used: Usage | None) -> str:
    """Say how a sum is made up: `2 × 15 mL`, `3 × 0.65 g`; empty for one portion."""
    if used is None or (len(used.uses) == 1 and used.uses[0].times == 1):
        return ""
    parts = []
    for use in used.uses:
        text = use.quantity.text.replace(" ", NBSP) if use.quantity else use.of_all
        parts.append(f"{use.times}{NBSP}×{NBSP}{text}" if use.times > 1 else text)
    return " + ".join(parts)


def _equivalents(found: list[Role], *, several: bool) -> tuple[tuple[str, str, bool], ...]:
    """Give what a material is to each reaction whose limiting reactant can be told."""
    return tuple(
        (
            role.reaction.replace("-", " ") if several else "",
            shown(role.equivalents, role.figures),
            role.limiting,
        )
        for role in found
        if role.equivalents is not None
    )


def _strength(material: model.Material) -> tuple[m.Words, ...]:
    """Give strength or density: what a volume has to be known by."""
    match material.composition:
        case model.Solution(strength, _, solvent):
            in_ = (m.Run(f" in {solvent.name}"),) if solvent.key != "water" else ()
            return (*quantity_words(strength.quantity), *in_)
        case model.Saturated():
            return (m.Run("saturated"),)
        case model.Pure() if material.solution is not None and material.solution.density:
            density = shown(material.solution.density / 1000, material.solution.figures)
            return (*value_words(density, "g/mL"), m.Run(" as given"))
        case model.Pure(substance) if substance.density is not None:
            at = substance.density
            tail = (m.Run(" at "), *quantity_words(at.temperature)) if at.temperature else ()
            return (*quantity_words(at.value), *tail)
        case model.Mixture(parts, _, solvent):
            return (m.Run(_ratio(parts) + (f" in {solvent.name}" if solvent else "")),)
        case model.Unknown():
            return (m.Run("composition unknown"),)
        case model.Continued(code, _):
            return (m.Run(f"from {code}"),)
        case _:
            return ()


def _ratio(parts: tuple[model.Part, ...]) -> str:
    """Give a mixture's ratio, as `1 : 1 : 1 by amount`; strengths as they are."""
    by = {"a mass": "mass", "a volume": "volume", "an amount of substance": "amount"}
    first = parts[0].quantity
    kind = by.get(first.dimension.words)
    if kind is None:
        return ", ".join(part.quantity.text.replace(" ", NBSP) for part in parts)
    return f"{NBSP}:{NBSP}".join(part.quantity.number.text for part in parts) + f" by {kind}"


def _provided(material: model.Material) -> tuple[m.Words, ...]:
    if material.provided is None:
        return ()
    tail = (m.Run(" for the class"),) if material.for_class else ()
    return (*quantity_words(material.provided), *tail)
