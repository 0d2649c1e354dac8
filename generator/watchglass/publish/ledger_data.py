"""The ledger for other programs: every number with its unit and the model that gave it.

The shape is documented in DEVELOPERS.md and in the JSON Schema `ledger`; `VERSION` rises when a key
goes or changes its meaning.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

from watchglass.publish.bench import MODEL, sentence
from watchglass.run.bench.layers import Layers
from watchglass.run.bench.ledger import Added, Moved, NotAssessed, Reacted, Supposed, Taken, Warmed
from watchglass.run.bench.mixing import Mixed

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.ledger import Ledger, Result
    from watchglass.run.bench.state import Bench, Phase, Sink, Vessel

VERSION = 1
Data = dict[str, Any]

#: What each `from` of a number means.
SOURCES = {
    "written": "as the author wrote it",
    "material": "from what is written of the material: strength, density, molar mass",
    "equilibrium": "acid–base and partition equilibrium, ideal, 25 °C",
    "additive": "additive volumes",
    "solubility": "solubility in water of the neutral form, or of the salt",
    "densities": "densities of the liquids with what is dissolved in them",
    "stoichiometry": "the equation and its conversion",
    "stated": "stated by the author with a reason",
    "heat": "heat of neutralisation and dilution, no loss to the glass",
    "boiling": "boiling points at 1 atm",
}


def ledger_data(
    ledgers: Mapping[str, Ledger], known: Knowledge, code: str, title: str, path: str
) -> Data:
    """Give a procedure's ledgers as plain data.

    Args:
        ledgers: By end of the open amounts: `low`, and `high` where it differs; with a secret
            sample by candidate, too: `sample is caffeine, low`.
        known: Names of the components.
        code: The procedure's code.
        title: Its title.
        path: Of its source.
    """
    return {
        "version": VERSION,
        "procedure": {"code": code, "title": title, "path": path},
        "model": MODEL,
        "sources": SOURCES,
        "components": _components(ledgers, known),
        "runs": {end: _run(ledger, known) for end, ledger in ledgers.items()},
    }


def _number(value: float | None, unit: str, source: str) -> Data | None:
    if value is None:
        return None
    return {"value": value, "unit": unit, "from": source}


def _components(ledgers: Mapping[str, Ledger], known: Knowledge) -> Data:
    keys = {key for ledger in ledgers.values() for key in (*ledger.charged, *ledger.formed)}
    return {
        key: {
            "name": known.thing(key).name,
            "charge": known.thing(key).charge,
            "molar_mass": _number(known.thing(key).molar_mass, "kg/mol", "material"),
        }
        for key in sorted(keys)
    }


def _run(ledger: Ledger, known: Knowledge) -> Data:
    entries = []
    before = ledger.start
    for entry in ledger.entries:
        before = before if entry.since is None else entry.since
        changed = {
            name: _vessel(vessel)
            for name, vessel in entry.bench.vessels.items()
            if vessel is not before.vessels.get(name)
        }
        place = entry.happening.event.span
        entries.append(
            {
                "step": entry.happening.step,
                "turn": entry.happening.turn,
                "act": place.text,
                "start": place.start,
                "branch": entry.branch or None,
                "results": [_result(result, known) for result in entry.results],
                "vessels": changed,
            }
        )
        before = entry.bench
    return {
        "labels": dict(ledger.labels),
        "charged": _amounts(ledger.charged, "material"),
        "entries": entries,
        "end": _bench(ledger.end),
    }


def _bench(bench: Bench) -> Data:
    return {
        "vessels": {n: _vessel(v) for n, v in bench.vessels.items() if not v.empty},
        "sinks": {name: _sink(sink) for name, sink in bench.sinks.items()},
    }


def _amounts(amounts: Mapping[str, float], source: str) -> Data:
    return {key: _number(amount, "mol", source) for key, amount in amounts.items()}


def _phase(phase: Phase) -> Data | None:
    if not phase:
        return None
    return {
        "volume": _number(phase.volume, "m3", "additive"),
        "amounts": _amounts(phase.amounts, "equilibrium"),
    }


def _vessel(vessel: Vessel) -> Data:
    return {
        "aqueous": _phase(vessel.aqueous),
        "organic": _phase(vessel.organic),
        "solid": _amounts(vessel.solid, "solubility"),
        "ph": _number(vessel.ph, "1", "equilibrium"),
        "temperature": _number(vessel.temperature, "K", "written"),
        "closure": vessel.closure,
        "place": vessel.place,
        "bath": vessel.bath,
        "mixed": vessel.mixed,
        "settled": vessel.settled,
        "unknown": sorted(vessel.unknown),
        "not_assessed": sorted(vessel.doubt),
    }


def _sink(sink: Sink) -> Data:
    return {
        "volume": _number(sink.volume, "m3", "additive"),
        "liquids": _amounts(sink.liquids, "equilibrium"),
        "solids": _amounts(sink.solids, "solubility"),
        "unknown": sorted(sink.unknown),
    }


def _result(result: Result, known: Knowledge) -> Data:
    return {
        "vessel": result.vessel,
        "words": sentence(result, known),
        **_outcome(result),
    }


def _outcome(result: Result) -> Data:
    match result.outcome:
        case Taken(material, mass, volume, why):
            return {
                "kind": "taken",
                "material": material,
                "mass": _number(mass, "kg", "written"),
                "volume": _number(volume, "m3", "written"),
                "why": why,
            }
        case Moved(origin, target, part, volume, short, nothing, whole):
            return {
                "kind": "moved",
                "origin": origin,
                "target": target,
                "part": part,
                "volume": _number(volume, "m3", "additive"),
                "short": _number(short, "m3", "additive"),
                "nothing": nothing,
                "whole": whole,
            }
        case Added(material, volume, wanted, before, stated, why):
            return {
                "kind": "added",
                "material": material,
                "volume": _number(volume, "m3", "stated" if stated else "equilibrium"),
                "wanted_ph": wanted,
                "ph_before": before,
                "why": why,
            }
        case Reacted(reaction, extent, limiting, why):
            return {
                "kind": "reacted",
                "reaction": reaction,
                "extent": _number(extent, "mol", "stoichiometry"),
                "limiting": limiting,
                "why": why,
            }
        case Warmed(rise, held, source):
            return {
                "kind": "warmed",
                "rise": _number(rise, "K", "heat"),
                "held_by_bath": held,
                "by": source,
            }
        case Supposed(what, share, outcome, reason, why):
            return {
                "kind": "supposed",
                "what": what,
                "share": _number(share, "1", "stated"),
                "outcome": outcome,
                "reason": reason,
                "why": why,
            }
        case NotAssessed(why):
            return {"kind": "not_assessed", "why": why}
        case Mixed():
            mixed = result.outcome
            return {
                "kind": "mixed",
                "ph": _number(mixed.ph, "1", "equilibrium"),
                "gas": _amounts(mixed.gas, "equilibrium"),
                "precipitated": _amounts(mixed.precipitated, "solubility"),
                "dissolved": _amounts(mixed.dissolved, "solubility"),
                "rough": mixed.rough,
                "ratios": dict(mixed.ratios),
                "why": list(mixed.why),
            }
        case Layers(aqueous, organic, below, close):
            return {
                "kind": "layers",
                "aqueous_density": _number(aqueous, "kg/m3", "densities"),
                "organic_density": _number(organic, "kg/m3", "densities"),
                "below": below or None,
                "drop_test": close,
            }
