"""Limits that the checks of the bench go by: one table, each with its source.

`thresholds:` in `laboratory.yml` overrides them by name. "Common practice, no source" is said where
it is so; the rest names what was read.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.fields import Field, Shape
from watchglass.base.findings import Finding, did_you_mean
from watchglass.base.yaml import YamlText
from watchglass.catalogue import texts

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.dimensions import Dimension
    from watchglass.base.yaml import YamlMapping


class Threshold(NamedTuple):
    """One limit: what it measures, its value in SI units, what it says, and where it is from."""

    dimension: Dimension
    value: float
    words: str
    source: str


_PRACTICE = "common practice, no source"
THRESHOLDS: Mapping[str, Threshold] = {
    "funnel-fill": Threshold(
        dim.SHARE,
        0.75,
        "share of a separatory funnel that is filled when it is shaken",
        "two teaching guides: two thirds, three quarters",
    ),
    "funnel-fill-with-gas": Threshold(dim.SHARE, 0.50, "the same, where gas comes off", _PRACTICE),
    "flask-fill": Threshold(
        dim.SHARE,
        2 / 3,
        "share of a flask that is filled when its contents boil",
        "teaching pages of two colleges: one half to two thirds",
    ),
    "flask-fill-with-gas": Threshold(
        dim.SHARE, 0.50, "share of an open flask that is filled when gas foams up", _PRACTICE
    ),
    "gas-in-closed-vessel": Threshold(
        dim.SHARE, 0.10, "gas over the room above the liquid in a closed vessel", _PRACTICE
    ),
    "gas-worth-a-word": Threshold(
        dim.VOLUME, 1e-6, "volume of gas from which a vessel counts as giving gas", _PRACTICE
    ),
    "lost-with-layer": Threshold(
        dim.SHARE, 0.05, "share of a wanted substance in a layer that is thrown away", _PRACTICE
    ),
    "goes-along": Threshold(
        dim.SHARE, 0.50, "share of a second acid or base that leaves with the wanted one", _PRACTICE
    ),
    "rise-with-cooling": Threshold(
        dim.DIFFERENCE, 20.0, "rise of temperature from which an addition is cooled", _PRACTICE
    ),
    "rise-at-most": Threshold(
        dim.DIFFERENCE, 60.0, "rise of temperature that is not run undiluted", _PRACTICE
    ),
    "below-boiling": Threshold(
        dim.DIFFERENCE, 10.0, "how far below its lowest boiling point a mixture stays", _PRACTICE
    ),
    "titre-least": Threshold(
        dim.SHARE,
        0.30,
        "share of a burette that a titre takes at least",
        "USP General Chapter 31, volumetric apparatus",
    ),
    "indicator-error": Threshold(
        dim.SHARE,
        0.01,
        "how far an indicator's change lies from the equivalence point, over the titre",
        _PRACTICE,
    ),
    "solid-in-funnel": Threshold(
        dim.MASS, 1e-5, "mass of a solid in a separatory funnel that is worth a word", _PRACTICE
    ),
    "concentrated-acid": Threshold(
        dim.CONCENTRATION, 6000.0, "strength from which water is not poured into an acid", _PRACTICE
    ),
    "concentrated-base": Threshold(
        dim.CONCENTRATION, 10000.0, "strength from which water is not poured into a base", _PRACTICE
    ),
}
FIELDS: dict[str, Field] = {
    name: Field(Shape.TEXT, f"{limit.words}; {limit.source}", quantity=(limit.dimension,))
    for name, limit in THRESHOLDS.items()
}


def read_thresholds(node: YamlMapping | None, findings: list[Finding]) -> dict[str, float]:
    """Read `thresholds:`; what is not a limit's name, or not of its dimension, is a finding."""
    read: dict[str, float] = {}
    for entry in node or ():
        limit = THRESHOLDS.get(entry.key.text)
        if limit is None:
            findings.append(
                Finding(
                    code=codes.FIELD_UNKNOWN,
                    span=entry.key.span,
                    message=f"`{entry.key.text}` is no limit of a check",
                    help=did_you_mean(entry.key.text, THRESHOLDS)
                    or "name one of " + ", ".join(f"`{name}`" for name in THRESHOLDS),
                )
            )
        elif isinstance(entry.value, YamlText):
            quantity = texts.quantity(entry.value, limit.dimension, findings)
            if quantity is not None:
                read[entry.key.text] = quantity.middle
    return read
