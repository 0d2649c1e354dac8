"""Small readers shared by the catalogue's decoders: names, quantities, pKa lists, sources."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding
from watchglass.base.scan import Fault, read_quantity
from watchglass.base.yaml import YamlList, YamlMapping, YamlNode, YamlText
from watchglass.catalogue.substances import At

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

    from watchglass.base.dimensions import Dimension
    from watchglass.base.fields import Record
    from watchglass.base.quantities import Quantity

_AT = re.compile(r"\s+at\s+")
_NUMBER = re.compile(r"-?\d+(?:\.\d+)?")


def words(node: YamlNode | None) -> tuple[YamlText, ...]:
    """Give the texts of a text or a list of texts; other nodes are left out."""
    if isinstance(node, YamlText):
        return (node,) if node.text else ()
    if isinstance(node, YamlList):
        return tuple(item for item in node.items if isinstance(item, YamlText) and item.text)
    return ()


def quantity(
    node: YamlText,
    takes: Dimension,
    findings: list[Finding],
    *,
    start: int = 0,
    end: int | None = None,
    measures: Mapping[str, float | None] | None = None,
) -> Quantity | None:
    """Read a quantity of one dimension from part of a text; a fault is added to the findings."""
    text = node.text[start:end]
    read = read_quantity(text, measures=measures)
    if isinstance(read, Fault):
        findings.append(fault_at(node, read, start))
        return None
    kelvin = takes == dim.TEMPERATURE and read.unit.symbol == "K"
    if read.dimension != takes and not kelvin:
        findings.append(
            Finding(
                code=codes.DIMENSION_WRONG,
                span=node.part(start, start + len(text)),
                message=f"`{read.text}` is {read.dimension.words}; {takes.words} belongs here",
                help=f"write {takes.words}, as in `{EXAMPLES.get(takes.words, '1.0 g')}`",
            )
        )
        return None
    return read


EXAMPLES = {
    "a mass": "2.50 g",
    "a volume": "15 mL",
    "a temperature": "65 °C",
    "a time": "15 min",
    "a mass per volume": "0.79 g/mL",
    "an amount concentration": "0.50 M",
    "a share": "80 %",
    "an amount of substance": "5.0 mmol",
    "a length": "60 mm",
    "a plain number": "2",
    "a temperature difference": "20 K",
    "a rate of flow": "2 mL/min",
    "a pressure": "20 mbar",
    "an energy per amount": "-56 kJ/mol",
}


def fault_at(node: YamlText, fault: Fault, start: int = 0) -> Finding:
    """Turn a fault in a scalar's value into a finding at its place in the file."""
    return Finding(
        code=fault.code,
        span=node.part(start + fault.start, start + fault.end),
        message=fault.message,
        help=fault.help,
    )


def measured(node: YamlText, takes: Dimension, findings: list[Finding]) -> At | None:
    """Read `1.17 g/mL at 20 °C`; the temperature may be left out."""
    found = _AT.search(node.text)
    value = quantity(node, takes, findings, end=found.start() if found else None)
    temperature = None
    if found:
        temperature = quantity(node, dim.TEMPERATURE, findings, start=found.end())
    return At(value, temperature) if value else None


def numbers(record: Record, name: str, findings: list[Finding]) -> tuple[float, ...]:
    """Read a list of plain numbers, such as pKa values."""
    result = []
    for item in words(record.values.get(name)):
        text = item.text.strip()
        if _NUMBER.fullmatch(text):
            result.append(float(text))
        else:
            findings.append(
                Finding(
                    code=codes.NUMBER_NOT_READ,
                    span=item.span,
                    message=f"`{text}` is not a plain number",
                    help=f"write `{name}: [4.20]`",
                )
            )
    return tuple(result)


def text_map(record: Record, name: str) -> dict[str, tuple[str, ...]]:
    """Read a mapping of names to texts or lists of texts."""
    node = record.mapping(name)
    if node is None:
        return {}
    return {entry.key.text: tuple(item.text for item in words(entry.value)) for entry in node}


def sources(record: Record) -> dict[str, str]:
    """Read where values are from: a mapping by field, or one text for all."""
    node = record.values.get("sources")
    if isinstance(node, YamlText) and node.text:
        return {"all": node.text}
    if isinstance(node, YamlMapping):
        return {e.key.text: e.value.text for e in node if isinstance(e.value, YamlText)}
    return {}


def unsourced(fields: Iterable[str], known: Mapping[str, str]) -> tuple[str, ...]:
    """Give the fields that do not say where their value is from."""
    return () if "all" in known else tuple(name for name in fields if name not in known)
