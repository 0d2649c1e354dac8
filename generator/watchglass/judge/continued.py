"""Products of other procedures (`from:`): what they bring, and what is wrong with the reference."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base.findings import Finding, did_you_mean
from watchglass.resolve import model

if TYPE_CHECKING:
    from collections.abc import Iterator, Mapping

    from watchglass.run.bench.state import Bench, Vessel


class Product(NamedTuple):
    """A procedure whose product others go on with: how it was resolved, and its bench at the end.

    `end` is None where it could not be run.
    """

    procedure: model.Procedure
    end: Bench | None


def codes_continued(procedure: model.Procedure) -> tuple[str, ...]:
    """Give the codes of the procedures whose products a procedure goes on with."""
    return tuple(
        material.composition.code
        for material in procedure.materials.values()
        if isinstance(material.composition, model.Continued)
    )


def carried(procedure: model.Procedure, products: Mapping[str, Product]) -> dict[str, Vessel]:
    """Give what each continued material consists of: the vessel of the other procedure at its end."""
    found: dict[str, Vessel] = {}
    for name, material in procedure.materials.items():
        composition = material.composition
        if not isinstance(composition, model.Continued):
            continue
        product = products.get(composition.code)
        if product is None or product.end is None:
            continue
        vessel = product.end.vessels.get(_vessel(composition, product.procedure))
        if vessel is not None and not vessel.empty:
            found[name] = vessel
    return found


def _vessel(composition: model.Continued, origin: model.Procedure) -> str:
    """Give the vessel meant: as named, else the only one that is declared tared."""
    if composition.vessel:
        return composition.vessel
    tared = [
        name
        for name, vessel in origin.vessels.items()
        if vessel.type is not None and "tared" in vessel.type.states
    ]
    return tared[0] if len(tared) == 1 else ""


def faults_of_continued(
    procedure: model.Procedure, products: Mapping[str, Product]
) -> Iterator[Finding]:
    """Report references that lead to no vessel, and say of products that are not known that they are not."""
    for material in procedure.materials.values():
        composition = material.composition
        if not isinstance(composition, model.Continued):
            continue
        product = products.get(composition.code)
        vessel = _vessel(composition, product.procedure) if product is not None else ""
        if product is not None and vessel not in product.procedure.vessels:
            yield Finding(
                code=codes.PRODUCT_VESSEL_UNKNOWN,
                span=material.value_span,
                message=f"`{vessel}` is no vessel of {composition.code}"
                if vessel
                else f"{composition.code} has no one vessel that is tared",
                help=did_you_mean(vessel, product.procedure.vessels)
                or f"add the vessel that the product is in at the end of {composition.code}, as in"
                " `vessel: vial`",
            )
        elif product is None or product.end is None or product.end.vessel(vessel).empty:
            yield Finding(
                code=codes.NOT_YET_RUN,
                span=material.span,
                message=f"what {composition.code} leaves in `{vessel}` is nothing at its end"
                if product is not None and product.end is not None
                else f"what {composition.code} makes is not known here, and is not followed at the"
                " bench",
            )
