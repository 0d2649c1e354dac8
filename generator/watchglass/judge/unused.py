"""Materials and vessels that are declared and never used: left over from an earlier draft."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.case import Case


def unused(case: Case) -> Iterator[Finding]:
    """Report declared names that no mark, reaction or expectation takes up."""
    if case.faulty:
        return
    procedure = case.procedure
    for name, material in procedure.materials.items():
        if name not in procedure.used:
            yield Finding(
                code=codes.MATERIAL_UNUSED,
                span=material.span,
                message=f"`{name}` is declared and never used",
                help="take the line out, or say in a step what is done with it",
            )
    families = {
        v.family for v in procedure.vessels.values() if v.family and v.name in procedure.used
    }
    for name, vessel in procedure.vessels.items():
        if name not in procedure.used and vessel.family not in families:
            yield Finding(
                code=codes.VESSEL_UNUSED,
                span=vessel.span,
                message=f"`{name}` is declared and never used",
                help="take the line out, or name it in the step that uses it",
            )
