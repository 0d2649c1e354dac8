"""Substances from YAML: each field from its text as written, every fault at its place."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.fields import Field, Record, Shape, read_fields
from watchglass.base.findings import Finding
from watchglass.base.yaml import YamlEntry, YamlMapping, YamlText
from watchglass.catalogue import texts
from watchglass.catalogue.plausible import implausible
from watchglass.catalogue.substances import At, Substance
from watchglass.chemistry.cas import FORM, check_digit_holds
from watchglass.chemistry.formulas import Formula, FormulaFault, parse_formula
from watchglass.chemistry.smiles import SmilesFault, count_atoms

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity

_STATES = ("solid", "liquid", "gas")
FIELDS: dict[str, Field] = {
    "names": Field(Shape.TEXT_OR_LIST, "what it is called; the first is shown", required=True),
    "cas": Field(Shape.TEXT, "CAS registry number; its check digit is verified", pattern=FORM),
    "formula": Field(Shape.TEXT, "formula, as `CuSO4·5H2O` or `SO4^2-`"),
    "smiles": Field(Shape.TEXT, "structure; its atoms must be those of the formula"),
    "state": Field(Shape.TEXT, "solid, liquid or gas at 20 °C", words=_STATES),
    "density": Field(
        Shape.TEXT,
        "density of the liquid, as `0.789 g/mL at 20 °C`",
        quantity=(dim.MASS_CONCENTRATION,),
    ),
    "melts": Field(Shape.TEXT, "melting point, as `122 °C`", quantity=(dim.TEMPERATURE,)),
    "boils": Field(Shape.TEXT, "boiling point at 1 atm", quantity=(dim.TEMPERATURE,)),
    "flash": Field(Shape.TEXT, "flash point", quantity=(dim.TEMPERATURE,)),
    "acid": Field(
        Shape.TEXT_OR_LIST, "pKa of each acidic group, 25 °C, in water", quantity=(dim.NUMBER,)
    ),
    "base": Field(
        Shape.TEXT_OR_LIST, "pKa of each conjugate acid, 25 °C, in water", quantity=(dim.NUMBER,)
    ),
    "log-p": Field(
        Shape.TEXT, "octanol–water partition of the neutral form", quantity=(dim.NUMBER,)
    ),
    "partition": Field(
        Shape.MAPPING,
        "measured ratio organic/water by solvent",
        each=Field(Shape.TEXT, "organic over water", quantity=(dim.NUMBER,)),
    ),
    "soluble": Field(
        Shape.MAPPING,
        "what dissolves in a solvent, or `miscible`",
        each=Field(Shape.TEXT_OR_LIST, "as `12 g/L at 100 °C`, or `miscible`"),
    ),
    "hydrate-of": Field(Shape.TEXT, "key of the anhydrous substance"),
    "groups": Field(Shape.TEXT_OR_LIST, "functional groups in plain words"),
    "ghs": Field(
        Shape.MAPPING,
        "classification as declared by the supplier, with its source",
        each=Field(Shape.TEXT_OR_LIST, "classes, statements, source"),
    ),
    "sources": Field(
        Shape.TEXT_OR_MAPPING,
        "where each value is from",
        each=Field(Shape.TEXT, "where it is from"),
    ),
}
_SOURCED = ("density", "melts", "boils", "flash", "acid", "base", "log-p", "partition", "soluble")


def decode_substance(entry: YamlEntry) -> tuple[Substance | None, tuple[Finding, ...]]:
    """Decode one entry of a `substances/*.yml` file.

    Returns:
        The substance with every field that could be read (None where the entry is no mapping or
        names nothing), and the findings.
    """
    record, found = read_fields(entry.value, FIELDS, "a substance")
    findings = list(found)
    if record is None:
        return None, tuple(findings)
    names = tuple(item.text for item in texts.words(record.values.get("names")))
    if not names:
        return None, tuple(findings)
    formula = _formula(record, findings)
    substance = Substance(
        key=entry.key.text,
        names=names,
        span=entry.key.span,
        cas=_cas(record, findings),
        formula=formula,
        smiles=_smiles(record, formula, findings),
        state=_state(record, findings),
        density=_measured(record, findings),
        melts=_temperature(record, "melts", findings),
        boils=_temperature(record, "boils", findings),
        flash=_temperature(record, "flash", findings),
        acid=texts.numbers(record, "acid", findings),
        base=texts.numbers(record, "base", findings),
        log_p=next(iter(texts.numbers(record, "log-p", findings)), None),
        partition=_partition(record, findings),
        soluble=texts.text_map(record, "soluble"),
        hydrate_of=_text(record, "hydrate-of"),
        groups=tuple(item.text for item in texts.words(record.values.get("groups"))),
        ghs=texts.text_map(record, "ghs") or None,
        sources=texts.sources(record),
    )
    findings += implausible(record, substance)
    findings += _without_source(entry, record, substance)
    return substance, tuple(findings)


def decode_substances(node: object) -> tuple[tuple[Substance, ...], tuple[Finding, ...]]:
    """Decode a whole `substances/*.yml` file; entries that cannot be read are left out."""
    if node is None:
        return (), ()
    if not isinstance(node, YamlMapping):
        _, findings = read_fields(node, {}, "a file of substances")  # type: ignore[arg-type]
        return (), findings
    substances: list[Substance] = []
    findings_all: list[Finding] = []
    for entry in node:
        substance, found = decode_substance(entry)
        findings_all += found
        if substance is not None:
            substances.append(substance)
    return tuple(substances), tuple(findings_all)


def _text(record: Record, name: str) -> str:
    node = record.text(name)
    return node.text.strip() if node else ""


def _formula(record: Record, findings: list[Finding]) -> Formula | None:
    node = record.text("formula")
    if node is None:
        return None
    read = parse_formula(node.text)
    if isinstance(read, FormulaFault):
        findings.append(
            Finding(
                code=codes.FORMULA_NOT_READ,
                span=node.part(read.start, read.end),
                message=read.message,
                help=read.help,
            )
        )
        return None
    return read


def _cas(record: Record, findings: list[Finding]) -> str:
    node = record.text("cas")
    if node is None:
        return ""
    if not check_digit_holds(node.text):
        findings.append(
            Finding(
                code=codes.CAS_WRONG,
                span=node.span,
                message=f"`{node.text}` is no CAS number: its check digit does not hold",
                help="compare it with the label; two digits are often changed about",
            )
        )
        return ""
    return node.text


def _smiles(record: Record, formula: Formula | None, findings: list[Finding]) -> str:
    node = record.text("smiles")
    if node is None:
        return ""
    counted = count_atoms(node.text)
    if isinstance(counted, SmilesFault):
        findings.append(
            Finding(
                code=codes.SMILES_NOT_READ,
                span=node.part(counted.start, counted.end),
                message=counted.message,
                help=counted.help,
            )
        )
        return ""
    if formula is not None and dict(counted.composition) != dict(formula.composition):
        other = record.text("formula")
        findings.append(
            Finding(
                code=codes.FORMULA_AND_SMILES_DIFFER,
                span=other.span if other else node.span,
                message=f"the formula has {_atoms(formula.composition)}, the SMILES {_atoms(counted.composition)}",
                help="mend whichever of the two is wrong",
            )
        )
    return node.text


def _atoms(composition: object) -> str:
    pairs = sorted(dict(composition).items())  # type: ignore[call-overload]
    return " ".join(f"{element}{count if count != 1 else ''}" for element, count in pairs)


def _state(record: Record, findings: list[Finding]) -> str:
    node = record.text("state")
    if node is None or node.text in _STATES:
        return node.text if node else ""
    findings.append(
        Finding(
            code=codes.FIELD_UNFIT,
            span=node.span,
            message=f"`{node.text}` is no state of matter",
            help="write `solid`, `liquid` or `gas`",
        )
    )
    return ""


def _measured(record: Record, findings: list[Finding]) -> At | None:
    node = record.text("density")
    return texts.measured(node, dim.MASS_CONCENTRATION, findings) if node else None


def _temperature(record: Record, name: str, findings: list[Finding]) -> Quantity | None:
    node = record.text(name)
    return texts.quantity(node, dim.TEMPERATURE, findings) if node else None


def _partition(record: Record, findings: list[Finding]) -> dict[str, float]:
    result = {}
    for entry in record.mapping("partition") or ():
        if isinstance(entry.value, YamlText):
            read = texts.quantity(entry.value, dim.NUMBER, findings)
            if read is not None:
                result[entry.key.text] = read.si
    return result


def _without_source(entry: YamlEntry, record: Record, substance: Substance) -> list[Finding]:
    missing = texts.unsourced(
        (name for name in _SOURCED if name in record.values), substance.sources
    )
    if not missing:
        return []
    said = ", ".join(f"`{name}`" for name in missing)
    return [
        Finding(
            code=codes.SOURCE_MISSING,
            span=record.keys.get(missing[0], entry.key.span),
            message=f"{said} of `{substance.key}` does not say where it is from"
            if len(missing) == 1
            else f"{said} of `{substance.key}` do not say where they are from",
            help=f"add `sources: {{{missing[0]}: …}}`; `from memory` is an answer",
        )
    ]
