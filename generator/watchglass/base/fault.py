"""Why a quantity could not be read."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from watchglass.base.findings import Code


@dataclass(frozen=True, slots=True)
class Fault:
    """Why a quantity could not be read: offsets in the text scanned."""

    code: Code
    start: int
    end: int
    message: str
    help: str | None = None
