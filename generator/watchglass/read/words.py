"""The words of the notation: acts, clauses, parts, closures, and what a name may not be."""

from __future__ import annotations

import re

from watchglass.base.units import UNITS

#: Verbs of the bench. Each is printed as itself.
VERBS = frozenset(
    [
        "mix",
        "stir",
        "swirl",
        "shake",
        "dissolve",
        "settle",
        "heat",
        "warm",
        "cool",
        "chill",
        "boil",
        "reflux",
        "react",
        "adjust",
        "titrate",
        "fill",
        "dry",
        "filter",
        "decant",
        "evaporate",
        "distil",
        "collect",
        "weigh",
        "rinse",
        "discard",
        "vent",
        "test",
        "take",
        "wait",
        "suppose",
    ]
)
#: Words that begin an act without being verbs of the bench.
OTHER_ACTS = frozenset(("again", "label", "step", "next"))
CLAUSE_WORDS = frozenset(
    [
        "by",
        "from",
        "into",
        "through",
        "on",
        "with",
        "to",
        "for",
        "at",
        "over",
        "below",
        "as",
        "giving",
        "leaving",
        "until",
        "in",
    ]
)
MEASURES_OF_ALL = frozenset(("all", "half", "rest"))
PARTS = frozenset(("aqueous", "organic", "upper", "lower", "solid", "liquid"))
CLOSURES = ("open", "stoppered", "under condenser", "under drying tube", "under nitrogen")
SETTINGS = ("in hood", "on steam", "with flame", "on hot plate")
#: Words that tie an act together and so can be no name.
_TIES = frozenset(("per", "of", "after", "is", "and", "or", "period", "mark", "ph", "pH"))

RESERVED = VERBS | OTHER_ACTS | CLAUSE_WORDS | MEASURES_OF_ALL | _TIES

#: A name: begins with a letter, or with a number that a hyphen joins to a letter.
NAME = re.compile(r"(?:[^\W\d_]|\d+(?:-\d+)*-[^\W\d_])[^\W_]*(?:-[^\W_]+)*")
#: Capitals that are units and so can be no name by themselves.
UNIT_CAPITALS = frozenset("CFJKLMNVW")


def reserved(name: str) -> str | None:
    """Say why a name cannot be declared; None where it can."""
    if name in RESERVED:
        return "a word of the notation"
    if name in UNITS or name in UNIT_CAPITALS:
        return "a unit"
    return None
