"""What each verb of the bench acts on and which clauses it takes: one table.

A clause's entry names what it takes: `time`, `temperature`, `difference`, `point` (a pH or an
indicator), `vessel`, `thing` (a vessel, equipment, an aid, a bath or a material), `reagent` (a
material, with or without an amount), `reaction`, `stream`, `ware`, `volume`, `share`, `size`
(a mass or a volume), `setting` (a temperature, rate, rotation, pressure or length), `words`.
Several are divided by `|`. Needed clauses are marked `!`.
"""

from __future__ import annotations

from typing import NamedTuple

_COMMON = {
    "for": "time",
    "over": "time",
    "at": "setting",
    "below": "temperature",
    "until": "words",
    "closure": "words",
    "setting": "words",
}


class Verb(NamedTuple):
    """One verb: what its object is (`vessel`, `reaction`, `time`, `thing`, `none`), its clauses."""

    object: str
    clauses: dict[str, str]
    needed: tuple[str, ...] = ()


def _verb(object_: str = "vessel", **clauses: str) -> Verb:
    table = {**_COMMON, **{name.rstrip("_"): takes.rstrip("!") for name, takes in clauses.items()}}
    needed = tuple(name.rstrip("_") for name, takes in clauses.items() if takes.endswith("!"))
    return Verb(object_, table, needed)


_STIR = _verb(with_="thing", by="ware", in_="thing", on="thing")
_HEAT = _verb(
    to="temperature", by="difference|ware", with_="thing", in_="thing", on="thing", under="words"
)

VERBS: dict[str, Verb] = {
    "mix": _STIR,
    "stir": _STIR,
    "swirl": _STIR,
    "shake": _STIR,
    "dissolve": _STIR,
    "settle": _verb(in_="thing"),
    "heat": _HEAT,
    "warm": _HEAT,
    "cool": _HEAT,
    "chill": _HEAT,
    "boil": _HEAT,
    "reflux": _HEAT,
    "react": _verb("reaction", in_="vessel!", to="share"),
    "adjust": _verb(to="point!", with_="reagent!", by="ware", from_="vessel"),
    "titrate": _verb(
        to="point", with_="reagent!", from_="vessel!", by="ware", as_="reaction", giving="volume"
    ),
    "fill": _verb(with_="reagent!", to="volume|mark", by="ware", from_="vessel"),
    "dry": _verb(with_="reagent", by="ware", in_="thing", on="thing"),
    "filter": _verb(on="thing", through="thing", into="vessel!", with_="thing", by="ware"),
    "decant": _verb(into="vessel!", through="thing", from_="thing", on="thing"),
    "evaporate": _verb(
        to="size", leaving="size", into="vessel", with_="thing", by="ware", in_="thing", on="thing"
    ),
    "distil": _verb(
        into="vessel!",
        leaving="size",
        to="temperature",
        with_="thing",
        through="thing",
        from_="vessel",
    ),
    "collect": _verb("thing", into="vessel", from_="thing", on="thing", with_="thing"),
    "weigh": _verb(on="thing", in_="thing", to="size", by="ware"),
    "rinse": _verb("thing", with_="reagent", into="vessel", to="stream"),
    "discard": _verb(to="stream", into="stream|vessel"),
    "vent": _verb(into="thing", to="thing"),
    "test": _verb("thing", with_="thing", on="thing"),
    "take": _verb("time"),
    "wait": _verb("time"),
    "next period": _verb("none"),
    "suppose": _verb("amount", in_="vessel!", is_="words", because="words!"),
}

#: Clauses that a charge, a transfer or an aliquot takes.
MOVING: dict[str, str] = {
    **_COMMON,
    "by": "ware",
    "through": "thing",
    "from": "thing",
    "on": "thing",
    "with": "thing",
}
