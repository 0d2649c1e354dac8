"""`laboratory.yml`: the facts of a teaching laboratory that procedures are judged by."""

from __future__ import annotations

import re
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.fields import Field, Shape, read_fields
from watchglass.base.findings import Finding
from watchglass.base.yaml import YamlMapping, YamlNode, YamlText
from watchglass.catalogue import texts
from watchglass.catalogue.streams import STREAMS
from watchglass.catalogue.ware import read_measures, read_vessel
from watchglass.resolve.thresholds import FIELDS as LIMITS
from watchglass.resolve.thresholds import THRESHOLDS, read_thresholds

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.fields import Record
    from watchglass.base.quantities import Quantity
    from watchglass.catalogue.glassware import GlasswareType, VesselType

_COUNT = re.compile(r"[0-9]{1,6}")
_MEASURE: dict[str, Field] = {
    "size": Field(Shape.TEXT, "what one of them holds", quantity=(dim.VOLUME,)),
    "plural": Field(Shape.TEXT_OR_LIST, "words for several, where an `s` is not enough"),
}
FIELDS: dict[str, Field] = {
    "name": Field(Shape.TEXT, "name of the laboratory"),
    "institution": Field(Shape.TEXT, "the college or school"),
    "stations": Field(Shape.TEXT, "how many stations there are", pattern=_COUNT.pattern),
    "spare": Field(
        Shape.TEXT, "share prepared beyond what the stations need, as `10 %`", quantity=(dim.SHARE,)
    ),
    "temperature": Field(Shape.TEXT, "temperature of the room", quantity=(dim.TEMPERATURE,)),
    "balance": Field(Shape.TEXT, "finest step of the balances, as `0.01 g`", quantity=(dim.MASS,)),
    "glassware": Field(
        Shape.MAPPING,
        "what is owned: `conical flask 100 mL: 60`",
        each=Field(Shape.TEXT, "how many there are", pattern=_COUNT.pattern),
    ),
    "reagents": Field(
        Shape.TEXT_OR_LIST,
        "what the store holds: `37 % w/w hydrochloric acid, 1.18 g/mL`, `sodium hydroxide, 97 % w/w`",
    ),
    "measures": Field(
        Shape.MAPPING,
        "countable measures with their size, as `drop: 0.05 mL`",
        each=Field(
            Shape.TEXT_OR_MAPPING, "what one of them holds", quantity=(dim.VOLUME,), fields=_MEASURE
        ),
    ),
    "baths": Field(
        Shape.MAPPING,
        "baths by name with their temperature",
        each=Field(Shape.TEXT, "its temperature"),
    ),
    "thresholds": Field(Shape.MAPPING, "limits of the checks that differ here", fields=LIMITS),
    "waste": Field(
        Shape.MAPPING,
        "waste streams by name with what goes into them",
        each=Field(Shape.TEXT_OR_LIST, "what goes into it"),
    ),
    "rules": Field(Shape.TEXT_OR_LIST, "local rules, in words"),
}
#: Baths every laboratory has. Common practice, no source.
BATHS = ("ice", "ice-salt", "water-bath", "oil-bath", "sand-bath", "steam-bath", "heating-mantle")


@dataclass(frozen=True, slots=True, kw_only=True)
class Laboratory:
    """The laboratory a set is written for; what is not said is None or empty.

    Attributes:
        name: Its name.
        institution: The college.
        stations: How many stations.
        spare: Share prepared beyond the need [-].
        temperature: Of the room, K; 25 °C where not said.
        balance: Finest step of the balances, kg; 0.01 g where not said.
        glassware: What is owned, with how many.
        reagents: What the store holds of reagents: a material with its density or purity behind a
            comma.
        measures: Countable measures of its own, m3 or None.
        baths: Names of baths.
        streams: Names of waste streams, the common ones included.
        thresholds: Limits of its own, SI, by name.
        rules: Local rules in words.
    """

    name: str = ""
    institution: str = ""
    stations: int | None = None
    spare: float = 0.0
    temperature: float = 298.15
    balance: float = 1e-5
    glassware: tuple[tuple[VesselType, int], ...] = ()
    reagents: tuple[YamlText, ...] = ()
    measures: Mapping[str, float | None] = field(default_factory=dict)
    baths: tuple[str, ...] = BATHS
    streams: tuple[str, ...] = STREAMS
    thresholds: Mapping[str, float] = field(default_factory=dict)
    rules: tuple[str, ...] = ()

    def limit(self, name: str) -> float:
        """Give a limit of the checks, SI: its own, or the one shipped."""
        own = self.thresholds.get(name)
        return THRESHOLDS[name].value if own is None else own


def read_laboratory(
    node: YamlNode | None, types: Mapping[str, GlasswareType]
) -> tuple[Laboratory, tuple[Finding, ...]]:
    """Decode `laboratory.yml`; what cannot be read is as if it were not said."""
    if node is None:
        return Laboratory(), ()
    record, found = read_fields(node, FIELDS, "the laboratory")
    if record is None:
        return Laboratory(), found
    findings = list(found)
    spare = _quantity(record, "spare", dim.SHARE, findings)
    temperature = _quantity(record, "temperature", dim.TEMPERATURE, findings)
    balance = _quantity(record, "balance", dim.MASS, findings)
    laboratory = Laboratory(
        name=_text(record, "name"),
        institution=_text(record, "institution"),
        stations=_count(record.text("stations"), findings),
        spare=spare.si if spare else 0.0,
        temperature=temperature.si if temperature else 298.15,
        balance=balance.si if balance and balance.si > 0 else 1e-5,
        glassware=_owned(record, types, findings),
        reagents=texts.words(record.values.get("reagents")),
        measures=_measures(record, findings),
        baths=(*BATHS, *_keys(record.mapping("baths"))),
        streams=(*STREAMS, *_keys(record.mapping("waste"))),
        thresholds=read_thresholds(record.mapping("thresholds"), findings),
        rules=tuple(item.text for item in texts.words(record.values.get("rules"))),
    )
    return laboratory, tuple(findings)


def _text(record: Record, name: str) -> str:
    node = record.text(name)
    return node.text.strip() if node else ""


def _quantity(
    record: Record, name: str, takes: dim.Dimension, findings: list[Finding]
) -> Quantity | None:
    node = record.text(name)
    return texts.quantity(node, takes, findings) if node else None


def _count(node: YamlText | None, findings: list[Finding]) -> int | None:
    if node is None:
        return None
    if _COUNT.fullmatch(node.text):
        return int(node.text)
    findings.append(
        Finding(
            code=codes.NUMBER_NOT_READ,
            span=node.span,
            message=f"`{node.text}` is not a count",
            help="write a whole number, as in `24`",
        )
    )
    return None


def _owned(
    record: Record, types: Mapping[str, GlasswareType], findings: list[Finding]
) -> tuple[tuple[VesselType, int], ...]:
    owned = []
    for entry in record.mapping("glassware") or ():
        vessel, found = read_vessel(entry.key, types)
        findings += found
        number = _count(entry.value, findings) if isinstance(entry.value, YamlText) else None
        if vessel is not None and number is not None:
            owned.append((vessel, number))
    return tuple(owned)


def _measures(record: Record, findings: list[Finding]) -> dict[str, float | None]:
    node = record.mapping("measures")
    for entry in node or ():
        if isinstance(entry.value, YamlText) and entry.value.text:
            texts.quantity(entry.value, dim.VOLUME, findings)
    return read_measures(node)


def _keys(node: YamlMapping | None) -> tuple[str, ...]:
    return tuple(entry.key.text for entry in node or ())
