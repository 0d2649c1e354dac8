"""The shipped catalogue: its files are read here and handed to the pure stages as text."""

from __future__ import annotations

import json
from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base.spans import Source
from watchglass.base.yaml import YamlMapping, YamlText, read_yaml
from watchglass.catalogue.catalogue import ShippedSubstances
from watchglass.catalogue.texts import words
from watchglass.catalogue.ware import decode_glassware, decode_indicator, read_measures

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.catalogue.glassware import GlasswareType
    from watchglass.catalogue.stocks import Indicator
    from watchglass.chemistry.densities import DensityTable

DATA = Path(__file__).parents[1] / "catalogue" / "data"


class Shipped(NamedTuple):
    """The shipped tables, decoded but for the substances, which wait until they are asked for."""

    substances: ShippedSubstances
    glassware: Mapping[str, GlasswareType]
    indicators: Mapping[str, Indicator]
    measures: Mapping[str, float | None]
    aids: frozenset[str]
    components: Mapping[str, Mapping[str, int]]
    formulas: Mapping[str, str]


def substance_sources() -> tuple[Source, ...]:
    """Read the shipped substance files, in the order of their names."""
    paths = sorted((DATA / "substances").glob("*.yml"))
    return tuple(Source.of(f"catalogue/{p.name}", p.read_text("utf-8")) for p in paths)


@cache
def shipped() -> Shipped:
    """Load the shipped tables, once a process."""
    names = json.loads((DATA / "names.json").read_text("utf-8"))
    glassware: dict[str, GlasswareType] = {}
    for entry in _mapping("glassware.yml"):
        ware, _ = decode_glassware(entry)
        if ware is not None:
            for name in (ware.key, *ware.names):
                glassware.setdefault(name.casefold(), ware)
    indicators: dict[str, Indicator] = {}
    for entry in _mapping("indicators.yml"):
        indicator, _ = decode_indicator(entry)
        if indicator is not None:
            indicators[indicator.key] = indicator
    return Shipped(
        substances=ShippedSubstances(substance_sources(), names),
        glassware=glassware,
        indicators=indicators,
        measures=read_measures(_node("measures.yml")),
        aids=_aids(),
        **json.loads((DATA / "components.json").read_text("utf-8")),
    )


@cache
def density_tables() -> Mapping[str, DensityTable]:
    """Read the densities of aqueous solutions, once a process and when first asked."""
    from watchglass.catalogue.densities import read_densities  # noqa: PLC0415 - rare

    return read_densities((DATA / "densities.yml").read_text("utf-8"))


def _node(name: str) -> YamlMapping:
    source = Source.of(f"catalogue/{name}", (DATA / name).read_text("utf-8"))
    node, findings = read_yaml(source)
    if findings or not isinstance(node, YamlMapping):
        raise RuntimeError(f"the shipped table {name} cannot be read: {findings}")
    return node


def _mapping(name: str) -> YamlMapping:
    return _node(name)


def _aids() -> frozenset[str]:
    aids: set[str] = set()
    for entry in _node("aids.yml"):
        aids.add(entry.key.text.casefold())
        value = entry.value
        names = value.get("names") if isinstance(value, YamlMapping) else value
        if isinstance(names, YamlText) and names.text in ("", "true"):
            continue
        aids.update(item.text.casefold() for item in words(names))
    return frozenset(aids)
