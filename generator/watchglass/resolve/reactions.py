"""Reactions: equations by catalogue names or formulas, bound to the procedure's materials."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.fields import Field, Record, Shape, read_fields
from watchglass.base.findings import Finding, Related, did_you_mean
from watchglass.base.yaml import YamlText
from watchglass.catalogue import texts
from watchglass.chemistry.equations import (
    EquationFault,
    check_balance,
    split_equation,
)
from watchglass.chemistry.formulas import Formula, parse_species
from watchglass.chemistry.suggestions import suggest
from watchglass.resolve.model import (
    Material,
    Mixture,
    Pure,
    Reaction,
    Saturated,
    Secret,
    Solution,
    Species,
    Unknown,
)

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.findings import Code
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span
    from watchglass.base.yaml import YamlEntry
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.substances import Substance
    from watchglass.chemistry.equations import Term, Terms

FIELDS: dict[str, Field] = {
    "equation": Field(Shape.TEXT, "the equation, by catalogue names or formulas", required=True),
    "limiting": Field(Shape.TEXT, "local name of the material that limits it"),
    "conversion": Field(
        Shape.TEXT, "share of the limiting reactant that reacts, as `80 %`", quantity=(dim.SHARE,)
    ),
    "heat": Field(
        Shape.TEXT,
        "heat of reaction per mole of limiting reactant, or `unknown`",
        words=("unknown",),
        quantity=(dim.MOLAR_ENERGY,),
    ),
}


def substances_of(material: Material) -> tuple[Substance, ...]:
    """Give the substances that a material brings into a reaction; solvents are left out."""
    match material.composition:
        case Pure(substance):
            return (substance,)
        case Solution(_, solute, _) | Saturated(solute, _):
            return (solute,)
        case Mixture(parts, _, _):
            return tuple(part.substance for part in parts)
        case Secret(candidates, _, _):
            return tuple(candidates.values())
        case _:
            return ()


def same_salt(one: Substance, other: Substance) -> bool:
    """Tell whether two substances are one, but for water of crystallisation."""
    return (one.hydrate_of or one.key) == (other.hydrate_of or other.key)


def _is_same(one: Substance, other: Substance) -> bool:
    return one.key == other.key


_STATE = re.compile(r"\s*\((?:aq|s|l|g)\)$")
#: A balance with larger coefficients is arithmetic, not a reaction: it is not offered.
_LARGEST_OFFERED = 12


class ReactionReader:
    """Reads the reactions of one procedure; findings gather in it."""

    def __init__(self, catalogue: Catalogue, materials: Mapping[str, Material]) -> None:
        """Read by a catalogue and the procedure's own materials."""
        self.catalogue = catalogue
        self.materials = materials
        self.findings: list[Finding] = []

    def read(self, entry: YamlEntry) -> Reaction:
        """Read one entry of `reactions:`; one that cannot be read has no species."""
        record: Record | None = None
        node: YamlText | None
        if isinstance(entry.value, YamlText):
            node = entry.value
        else:
            record, found = read_fields(entry.value, FIELDS, "a reaction")
            self.findings += found
            node = record.text("equation") if record else None
        sides = self._sides(node) if node else None
        balanced = node is not None and sides is not None and self._balance(node, *sides)
        left, right = sides or ((), ())
        limiting = record.text("limiting") if record else None
        return Reaction(
            name=entry.key.text,
            left=left,
            right=right,
            balanced=balanced,
            span=entry.key.span,
            equation_span=node.span if node else entry.value.span,
            limiting=self._limiting(record, left) if record else "",
            conversion=self._share(record) if record else None,
            heat=self._heat(record) if record else None,
            limiting_span=limiting.span if limiting is not None else None,
        )

    def _sides(self, node: YamlText) -> tuple[tuple[Species, ...], tuple[Species, ...]] | None:
        read = split_equation(node.text)
        if isinstance(read, EquationFault):
            self._add(
                codes.EQUATION_NOT_READ, node.part(read.start, read.end), read.message, read.help
            )
            return None
        left = [self._species(node, term) for term in read.left]
        right = [self._species(node, term) for term in read.right]
        if any(s is None for s in (*left, *right)):
            return None
        return tuple(s for s in left if s), tuple(s for s in right if s)

    def _species(self, node: YamlText, term: Term) -> Species | None:
        """Bind a term: a local material, a catalogue name, or a formula that a material has."""
        span = node.part(term.start, term.end)
        material = self.materials.get(term.text)
        if material is not None:
            held = substances_of(material)
            if len(held) == 1:
                return Species(
                    term.coefficient, term.text, held[0].formula, held[0], material.name, span
                )
            self._no_single(material, held, span)
            return None
        substance = self.catalogue.find(term.text)
        if substance is not None:
            holder = self._holder(substance)
            return Species(term.coefficient, term.text, substance.formula, substance, holder, span)
        formula = parse_species(term.text)
        if isinstance(formula, Formula):
            return self._by_formula(term, formula, span)
        near = did_you_mean(term.text, (*self.materials, *self.catalogue.words()))
        start = term.text.lstrip("0123456789")
        looks_like_formula = start[:1].isupper() and (
            any(c.isupper() or c.isdigit() for c in start[1:]) or start[-1:] in "+-"
        )
        if state := _STATE.search(term.text):
            at = term.start + state.start()
            self._add(
                codes.FORMULA_NOT_READ,
                node.part(at, term.end),
                f"`{state[0].strip()}` is no part of a formula: states of matter are not read",
                f"write `{term.text[: state.start()].rstrip()}`",
            )
        elif looks_like_formula and not near:
            self._add(
                codes.FORMULA_NOT_READ,
                node.part(term.start + formula.start, term.start + formula.end),
                formula.message,
                formula.help,
            )
        else:
            self._add(
                codes.SPECIES_UNKNOWN,
                span,
                f"`{term.text}` is neither a known substance nor a formula",
                near or "write its formula, or add it to a file in `substances/`",
            )
        return None

    def _no_single(self, material: Material, held: tuple[Substance, ...], span: Span) -> None:
        """Report a material that brings several substances, or none that is known."""
        if isinstance(material.composition, Unknown) and not material.composition.declared:
            return  # it could not be read, and a finding says so
        several = f"`{material.name}` holds several substances"
        self._add(
            codes.SPECIES_UNKNOWN,
            span,
            several if held else f"what `{material.name}` holds is not known",
            "name the one that reacts: " + ", ".join(f"`{s.key}`" for s in held)
            if held
            else "name the substance itself, or write its formula",
        )

    def _by_formula(self, term: Term, formula: Formula, span: Span) -> Species | None:
        """Bind a bare formula to the one material whose substance has just these atoms."""
        fits = [
            (material, substance)
            for material in self.materials.values()
            for substance in substances_of(material)
            if substance.formula is not None and _same_atoms(substance.formula, formula)
        ]
        distinct = {substance.key: (material, substance) for material, substance in fits}
        if len(distinct) > 1:
            self.findings.append(
                Finding(
                    code=codes.SPECIES_AMBIGUOUS,
                    span=span,
                    message=f"`{term.text}` fits " + " and ".join(f"`{key}`" for key in distinct),
                    related=tuple(
                        Related(m.span, f"`{s.key}` is in it") for m, s in distinct.values()
                    ),
                    help="write the substance's name in the equation",
                )
            )
            return None
        if fits:
            material, substance = fits[0]
            return Species(term.coefficient, term.text, formula, substance, material.name, span)
        for material in self.materials.values():
            for held in substances_of(material):
                salt = self.catalogue.by_key(held.hydrate_of) if held.hydrate_of else None
                if salt and salt.formula and _same_atoms(salt.formula, formula):
                    return Species(term.coefficient, term.text, formula, salt, material.name, span)
        return Species(term.coefficient, term.text, formula, None, "", span)

    def _holder(self, substance: Substance) -> str:
        """Give the material that holds a substance, or else another hydrate of it."""
        for alike in (_is_same, same_salt):
            for material in self.materials.values():
                if any(alike(held, substance) for held in substances_of(material)):
                    return material.name
        return ""

    def _balance(
        self, node: YamlText, left: tuple[Species, ...], right: tuple[Species, ...]
    ) -> bool:
        """Check atoms and charge; say what is over or missing, and the coefficients that mend it."""
        if any(species.formula is None for species in (*left, *right)):
            return False
        terms_left = [(s.coefficient, s.formula) for s in left if s.formula]
        terms_right = [(s.coefficient, s.formula) for s in right if s.formula]
        checked = check_balance(terms_left, terms_right)
        if checked.balanced:
            return True
        self._add(
            codes.EQUATION_UNBALANCED,
            node.span,
            "the equation does not balance: "
            + _excess(checked.excess_left, checked.charge_excess_left),
            self._mended(left, right, (terms_left, terms_right)),
        )
        return False

    def _mended(
        self, left: tuple[Species, ...], right: tuple[Species, ...], terms: tuple[Terms, Terms]
    ) -> str:
        """Say how the equation might be mended: a forgotten molecule, coefficients, or where to look."""
        found = suggest(*terms)
        if found.lacking is not None:
            side, formula, count = found.lacking.side, found.lacking.formula, found.lacking.count
            many = f"{count} " if count != 1 else ""
            return f"add `{many}{formula.text}` on the {side}"
        if found.coefficients is not None and max(found.coefficients) <= _LARGEST_OFFERED:
            words = [
                f"{count} {species.written}" if count != 1 else species.written
                for count, species in zip(found.coefficients, (*left, *right), strict=True)
            ]
            sides = " + ".join(words[: len(left)]), " + ".join(words[len(left) :])
            return f"write `{sides[0]} -> {sides[1]}`"
        for elements, here in ((found.only_left, "left"), (found.only_right, "right")):
            if elements:
                named = ", ".join(elements)
                return f"see what becomes of {named}, which stands on the {here} only"
        return "add what is missing, or mend a formula"

    def _limiting(self, record: Record, left: tuple[Species, ...]) -> str:
        node = record.text("limiting")
        if node is None:
            return ""
        reacting = [s.material or s.written for s in left]
        if node.text not in reacting and left:
            self._add(
                codes.LIMITING_UNFIT,
                node.span,
                f"`{node.text}` is no reactant of this equation",
                did_you_mean(node.text, reacting)
                or "name one of " + ", ".join(f"`{r}`" for r in reacting),
            )
            return ""
        return node.text

    def _share(self, record: Record) -> Quantity | None:
        node = record.text("conversion")
        if node is None:
            return None
        share = texts.quantity(node, dim.SHARE, self.findings)
        if share is not None and share.si_high > 1:
            self._add(
                codes.SHARE_ABOVE_ONE,
                node.span,
                f"`{share.text}` is more than the whole",
                "give a conversion of at most 100 %",
            )
            return None
        return share

    def _heat(self, record: Record) -> Quantity | None:
        node = record.text("heat")
        if node is None or node.text == "unknown":
            return None
        return texts.quantity(node, dim.MOLAR_ENERGY, self.findings)

    def _add(self, code: Code, span: Span, message: str, help_: str | None) -> None:
        self.findings.append(Finding(code=code, span=span, message=message, help=help_))


def _same_atoms(one: Formula, other: Formula) -> bool:
    return one.charge == other.charge and dict(one.composition) == dict(other.composition)


def _excess(atoms: Mapping[str, object], charge: object) -> str:
    """Say what is missing on which side, in the words of an instructor."""
    right = [f"{count} {element}" for element, count in sorted(atoms.items()) if count > 0]  # type: ignore[operator]
    left = [f"{-count} {element}" for element, count in sorted(atoms.items()) if count < 0]  # type: ignore[operator]
    said = []
    if left:
        said.append("the left lacks " + ", ".join(left))
    if right:
        said.append("the right lacks " + ", ".join(right))
    if charge:
        said.append(f"the charge differs by {abs(charge)}")  # type: ignore[arg-type]
    return "; ".join(said)
