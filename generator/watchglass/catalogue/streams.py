"""Waste streams a laboratory keeps, by the names procedures use. `laboratory.yml` may add some.

Source: common practice, no source; which of them a laboratory has is for its own waste plan.
"""

from __future__ import annotations

STREAMS: tuple[str, ...] = (
    "sharps-and-glass",
    "special-hold",
    "oxidiser",
    "heavy-metal",
    "halogenated-organic",
    "non-halogenated-organic",
    "aqueous-acid",
    "aqueous-base",
    "aqueous-organic",
    "aqueous-neutral",
    "solid-organic",
    "drain",
    "ordinary-bin",
)
