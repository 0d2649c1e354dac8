"""Glassware, measures, indicators and stocks from YAML, and vessels from their description."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.fields import Field, Record, Shape, read_fields
from watchglass.base.findings import Finding, Related, did_you_mean
from watchglass.base.scan import Fault, Found, read_quantity, scan_quantity
from watchglass.base.yaml import YamlMapping, YamlNode, YamlText
from watchglass.catalogue import texts
from watchglass.catalogue.glassware import GlasswareType, VesselType
from watchglass.catalogue.stocks import Indicator, Stock

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.quantities import Quantity
    from watchglass.base.yaml import YamlEntry

GLASSWARE_FIELDS: dict[str, Field] = {
    "names": Field(Shape.TEXT_OR_LIST, "what it is called; the first is shown", required=True),
    "unit": Field(Shape.TEXT, "unit of the nominal size: mL or mm", required=True),
    "sizes": Field(Shape.TEXT_OR_LIST, "nominal sizes made, in that unit"),
    "holds": Field(Shape.TEXT, "true where things can be charged to it"),
    "measures": Field(Shape.TEXT, "approximate, delivers or contains"),
    "source": Field(Shape.TEXT, "where sizes and use are from"),
    "marks": Field(Shape.TEXT, "sizes that measure: a row for each size, class and standard"),
    "note": Field(Shape.TEXT, "a remark"),
}
INDICATOR_FIELDS: dict[str, Field] = {
    "names": Field(Shape.TEXT_OR_LIST, "what it is called", required=True),
    "range": Field(Shape.TEXT, "pH range of its change, as `8.2–10.0`", required=True),
    "acid": Field(Shape.TEXT, "colour below the range"),
    "base": Field(Shape.TEXT, "colour above it"),
    "source": Field(Shape.TEXT, "where it is from"),
}
STOCK_FIELDS: dict[str, Field] = {
    "names": Field(Shape.TEXT_OR_LIST, "further names it goes by"),
    "material": Field(Shape.TEXT, "what it is, as `3.0 M hydrochloric acid`"),
    "contains": Field(
        Shape.MAPPING,
        "its parts, as `{hexane: 3 mL, ethyl acetate: 1 mL}`",
        each=Field(Shape.TEXT, "its part, or its strength", required=True),
    ),
    "in": Field(Shape.TEXT, "what the parts are dissolved in, with their strengths"),
    "density": Field(
        Shape.TEXT, "density of the solution, as `1.18 g/mL`", quantity=(dim.MASS_CONCENTRATION,)
    ),
    "also": Field(Shape.TEXT, "the strength again, as its label has it in other units: `12 M`"),
    "makes": Field(
        Shape.TEXT,
        "how much is made at a time, as `1 L` or `400 g`",
        quantity=(dim.VOLUME, dim.MASS),
    ),
    "from": Field(Shape.TEXT, "key of the stock that it is diluted from"),
    "shelf-life": Field(Shape.TEXT, "how long it keeps"),
    "container": Field(Shape.TEXT, "what it is kept in"),
    "note": Field(Shape.TEXT, "a remark"),
    "notes": Field(Shape.TEXT, "a remark"),
}
_STATES = ("tared", "oven-dried")
_CLASS = re.compile(r"class ([AB])")


def decode_glassware(entry: YamlEntry) -> tuple[GlasswareType | None, tuple[Finding, ...]]:
    """Decode one type of vessel."""
    record, found = read_fields(entry.value, GLASSWARE_FIELDS, "a type of vessel")
    names = _names(record)
    if record is None or not names:
        return None, found
    findings = list(found)
    ware = GlasswareType(
        key=entry.key.text,
        names=names,
        unit=_text(record, "unit") or "mL",
        sizes=tuple(sorted(texts.numbers(record, "sizes", findings))),
        holds=_text(record, "holds") != "false",
        measures=_text(record, "measures"),
        source=_text(record, "source"),
        span=entry.key.span,
        marks=_text(record, "marks"),
    )
    return ware, tuple(findings)


def decode_indicator(entry: YamlEntry) -> tuple[Indicator | None, tuple[Finding, ...]]:
    """Decode one indicator."""
    record, found = read_fields(entry.value, INDICATOR_FIELDS, "an indicator")
    names, findings = _names(record), list(found)
    node = record.text("range") if record else None
    change = texts.quantity(node, dim.NUMBER, findings) if node else None
    if record is None or not names or change is None:
        return None, tuple(findings)
    indicator = Indicator(
        key=entry.key.text,
        names=names,
        range=change,
        acid_colour=_text(record, "acid"),
        base_colour=_text(record, "base"),
        source=_text(record, "source"),
        span=entry.key.span,
    )
    return indicator, tuple(findings)


def decode_stock(entry: YamlEntry) -> tuple[Stock | None, tuple[Finding, ...]]:
    """Decode one stock solution; its material is resolved where it is used."""
    record, found = read_fields(entry.value, STOCK_FIELDS, "a stock")
    material = record.text("material") if record else None
    contains = record.mapping("contains") if record else None
    if record is None or (material is None and contains is None):
        missing = record is not None and not found
        return None, (*found, *((_unsaid(entry),) if missing else ()))
    if material is None and contains is not None:
        material = YamlText(", ".join(e.key.text for e in contains), record.keys["contains"])
    assert material is not None  # noqa: S101 - one of the two is there
    findings, makes = list(found), record.text("makes")
    if contains is not None and "material" in record.keys:
        findings.append(
            Finding(
                code=codes.FIELD_UNFIT,
                span=record.keys["contains"],
                message="`material` and `contains` both say what this stock is",
                related=(Related(record.keys["material"], "said here"),),
                help="leave one of the two",
            )
        )
    if (density := record.text("density")) is not None:
        texts.measured(density, dim.MASS_CONCENTRATION, findings)
    notes = " ".join(filter(None, (_text(record, "note"), _text(record, "notes"))))
    stock = Stock(
        key=entry.key.text,
        names=_names(record),
        material=material,
        notes=notes,
        span=entry.key.span,
        density=record.text("density"),
        makes=_size_made(makes, findings) if makes is not None else None,
        made_from=_text(record, "from"),
        made_from_span=record.keys.get("from"),
        shelf_life=_text(record, "shelf-life"),
        container=_text(record, "container"),
        contains=contains,
        solvent=record.text("in"),
        also=record.text("also"),
    )
    return stock, tuple(findings)


def _size_made(node: YamlText, findings: list[Finding]) -> Quantity | None:
    """Read how much is made at a time: a volume, or a mass; nought of it is a finding."""
    read = read_quantity(node.text)
    by_mass = not isinstance(read, Fault) and read.dimension == dim.MASS
    size = texts.quantity(node, dim.MASS if by_mass else dim.VOLUME, findings)
    if size is not None and size.middle <= 0:
        findings.append(
            Finding(
                code=codes.FIELD_UNFIT,
                span=node.span,
                message=f"`{node.text}` makes nothing",
                help="say how much is made at a time, as `1 L`",
            )
        )
        return None
    return size


def _unsaid(entry: YamlEntry) -> Finding:
    return Finding(
        code=codes.FIELD_MISSING,
        span=entry.key.span,
        message=f"the stock `{entry.key.text}` does not say what it is",
        help="add `material: 3.0 M hydrochloric acid`, or `contains:` with its parts",
    )


def _names(record: Record | None) -> tuple[str, ...]:
    return tuple(item.text for item in texts.words(record.values.get("names"))) if record else ()


def _text(record: Record, name: str) -> str:
    node = record.text(name)
    return node.text.strip() if node else ""


def read_measures(node: YamlNode | None) -> dict[str, float | None]:
    """Read countable measures: each word and its plural with its size in m3, or None: unknown."""
    measures: dict[str, float | None] = {}
    if not isinstance(node, YamlMapping):
        return measures
    for entry in node:
        size: float | None = None
        plural: tuple[str, ...] = ()
        value = entry.value
        if isinstance(value, YamlText):
            size = _size(value)
        elif isinstance(value, YamlMapping):
            given = value.get("size")
            size = _size(given) if isinstance(given, YamlText) else None
            plural = tuple(item.text for item in texts.words(value.get("plural")))
        for word in (entry.key.text, *(plural or (entry.key.text + "s",))):
            measures[word] = size
    return measures


def _size(node: YamlText) -> float | None:
    findings: list[Finding] = []
    read = texts.quantity(node, dim.VOLUME, findings)
    return read.si if read else None


def read_vessel(
    node: YamlText, types: Mapping[str, GlasswareType]
) -> tuple[VesselType | None, tuple[Finding, ...]]:
    """Read `separatory funnel 125 mL, class A`.

    Args:
        node: The description in the front matter.
        types: Glassware types by case-folded name.

    Returns:
        The vessel's type, or None where it could not be read; and the findings.
    """
    head, *remarks = node.text.split(",")
    words = head.strip()
    number = re.search(r"(?<![\w.])[\d.]", head)
    size, findings = None, []
    if number is not None:
        words = head[: number.start()].strip()
        scanned = scan_quantity(node.text, number.start(), len(head))
        if isinstance(scanned, Fault):
            return None, (texts.fault_at(node, scanned),)
        size = scanned.quantity if isinstance(scanned, Found) else None
        if isinstance(scanned, Found) and node.text[scanned.end : len(head)].strip():
            remarks.insert(0, node.text[scanned.end : len(head)])
    ware = types.get(words.casefold())
    if ware is None:
        start = len(head) - len(head.lstrip())
        return None, (
            Finding(
                code=codes.GLASSWARE_UNKNOWN,
                span=node.part(start, start + max(1, len(words))),
                message=f"`{words}` is no vessel of the glassware list"
                if words
                else f"`{node.text.strip()}` does not begin with a type of vessel",
                help=did_you_mean(words, types)
                or "name a type such as `beaker`, `conical flask`, `separatory funnel`",
            ),
        )
    if number is not None and size is not None:
        findings += _size_findings(node, number.start(), size, ware)
    class_, states = _remarks(node, len(head), remarks, findings)
    return VesselType(type=ware, written=words, size=size, class_=class_, states=states), tuple(
        findings
    )


def glassware_in(node: YamlText, types: Mapping[str, GlasswareType]) -> VesselType | None:
    """Read equipment that is glassware (`measuring cylinder 25 mL`); None for other equipment."""
    words = re.split(r"[,\d]", node.text, maxsplit=1)[0].strip()
    return read_vessel(node, types)[0] if words.casefold() in types else None


def _size_findings(node: YamlText, at: int, size: Quantity, ware: GlasswareType) -> list[Finding]:
    span = node.part(at, at + len(size.text))
    wanted = dim.VOLUME if ware.unit == "mL" else dim.LENGTH
    if size.dimension != wanted:
        return [
            Finding(
                code=codes.DIMENSION_WRONG,
                span=span,
                message=f"a {ware.name} is known by its size in {ware.unit}; `{size.text}` is {size.dimension.words}",
                help=f"write it in {ware.unit}, as in `{ware.name} {_plain(ware.sizes[0]) if ware.sizes else '50'} {ware.unit}`",
            )
        ]
    nominal = size.si / (1e-6 if ware.unit == "mL" else 1e-3)
    if ware.sizes and not any(abs(nominal - known) <= 1e-6 * known for known in ware.sizes):
        nearest = sorted(ware.sizes, key=lambda known: abs(known - nominal))[:2]
        made = " and ".join(f"{_plain(known)} {ware.unit}" for known in sorted(nearest))
        return [
            Finding(
                code=codes.SIZE_UNUSUAL,
                span=span,
                message=f"a {ware.name} of {size.text} is not made",
                help=f"take a size that is made; the nearest are {made}",
            )
        ]
    return []


def _plain(value: float) -> str:
    return f"{value:g}"


def _remarks(
    node: YamlText, at: int, remarks: list[str], findings: list[Finding]
) -> tuple[str, tuple[str, ...]]:
    class_, states = "", []
    for remark in remarks:
        words = remark.strip()
        if found := _CLASS.fullmatch(words):
            class_ = found[1]
        elif words in _STATES:
            states.append(words)
        else:
            start = node.text.find(words, min(at, len(node.text)) - len(remark)) if words else at
            start = node.text.find(words) if start < 0 else start
            findings.append(
                Finding(
                    code=codes.FIELD_UNFIT,
                    span=node.part(start, start + max(1, len(words))),
                    message=f"`{words}` says nothing known of a vessel",
                    help=did_you_mean(words, (*_STATES, "class A", "class B"))
                    or "write `tared`, `oven-dried`, `class A` or `class B`",
                )
            )
    return class_, tuple(states)
