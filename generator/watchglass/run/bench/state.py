"""What stands on the bench: vessels with their phases, immutable; a new state after every event.

Amounts are moles of components (`catalogue/components.py`), so that atoms and charge are conserved
whatever equilibrium does. Solids are kept as the substances they are.
"""

from __future__ import annotations

from types import MappingProxyType
from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

NOTHING: Mapping[str, float] = MappingProxyType({})

#: Below this an amount is rounding, mol.
TRACE = 1e-15


class Phase(NamedTuple):
    """One liquid layer.

    Attributes:
        amounts: Moles of each component. Those of an aqueous layer may include `H^+` below nought.
        volume: m3, additive: what was poured together.
    """

    amounts: Mapping[str, float] = NOTHING
    volume: float = 0.0

    def __bool__(self) -> bool:
        """Tell whether there is anything in it."""
        return bool(self.amounts)

    def share(self, fraction: float) -> Phase:
        """Give a share of it, 0 to 1."""
        if fraction >= 1.0:
            return self
        if fraction <= 0.0:
            return EMPTY
        return Phase(
            {key: amount * fraction for key, amount in self.amounts.items()},
            self.volume * fraction,
        )

    def plus(self, other: Phase) -> Phase:
        """Pour another layer to it."""
        if not other:
            return self
        if not self:
            return other
        return Phase(added(self.amounts, other.amounts), self.volume + other.volume)


EMPTY = Phase()


def added(
    one: Mapping[str, float], other: Mapping[str, float], times: float = 1.0
) -> dict[str, float]:
    """Add amounts; traces that cancel are dropped."""
    total = dict(one)
    for key, amount in other.items():
        value = total.get(key, 0.0) + times * amount
        if abs(value) <= TRACE:
            total.pop(key, None)
        else:
            total[key] = value
    return total


class Vessel(NamedTuple):
    """One vessel and what it holds.

    Attributes:
        name: Its local name; of a filter, that of the paper.
        capacity: Nominal size, m3; None where it has none or it could not be read.
        aqueous: Layer of which at least half is water by mass.
        organic: Any other liquid.
        solid: Moles of each solid substance.
        temperature: Of the contents, K.
        closure: `open`, `stoppered`, `under condenser`, …
        place: `bench` or `hood`.
        bath: Name of the bath it stands in, or empty.
        ph: Of the aqueous layer; None where there is none, or it is not known.
        unknown: Names of materials in it whose composition or amount is not known.
        doubt: Components of which the model cannot tell how much is here, since a constant of
            theirs is missing.
        mixed: Whether its contents have come to equilibrium since something was added.
        settled: Whether its layers have parted since they were mixed.
        used: Whether it ever held anything: it is not clean.
        remains: `upper` or `lower` where the other of two layers was drawn off and nothing has been
            poured in since; else empty.
        stated: Solids of which the author said that they are solid: they stay so until the contents
            are heated, or come together with another liquid.
    """

    name: str
    capacity: float | None = None
    aqueous: Phase = EMPTY
    organic: Phase = EMPTY
    solid: Mapping[str, float] = NOTHING
    temperature: float = 298.15
    closure: str = "open"
    place: str = "bench"
    bath: str = ""
    ph: float | None = None
    unknown: frozenset[str] = frozenset()
    doubt: frozenset[str] = frozenset()
    mixed: bool = True
    settled: bool = True
    used: bool = False
    remains: str = ""
    stated: frozenset[str] = frozenset()

    @property
    def empty(self) -> bool:
        """Whether nothing is in it."""
        return not (self.aqueous or self.organic or self.solid or self.unknown)

    @property
    def volume(self) -> float:
        """Volume of its liquids, m3."""
        return self.aqueous.volume + self.organic.volume

    def emptied(self) -> Vessel:
        """Give it with nothing in it; it is not clean, and its closure and place stay."""
        return self._replace(
            aqueous=EMPTY,
            organic=EMPTY,
            solid=NOTHING,
            ph=None,
            unknown=frozenset(),
            doubt=frozenset(),
            mixed=True,
            settled=True,
            remains="",
            stated=frozenset(),
        )


class Sink(NamedTuple):
    """What left the bench by one way: a waste stream, the air, a filter, a drying agent's paper.

    Attributes:
        liquids: Moles of components.
        solids: Moles of substances.
        volume: Of the liquids, m3.
        unknown: Names of materials of unknown amount in it.
    """

    liquids: Mapping[str, float] = NOTHING
    solids: Mapping[str, float] = NOTHING
    volume: float = 0.0
    unknown: frozenset[str] = frozenset()


class Bench(NamedTuple):
    """All vessels and all sinks at one moment.

    Attributes:
        vessels: By name.
        sinks: By name: waste streams; `air` for gas and vapour; `cotton` and the like for solids
            that are filtered off and not kept.
    """

    vessels: Mapping[str, Vessel]
    sinks: Mapping[str, Sink] = MappingProxyType({})

    def vessel(self, name: str) -> Vessel:
        """Give a vessel; one never declared is empty and has no size."""
        return self.vessels.get(name) or Vessel(name=name)

    def with_vessels(self, *changed: Vessel) -> Bench:
        """Give the bench with vessels changed."""
        return self._replace(
            vessels={**self.vessels, **{vessel.name: vessel for vessel in changed}}
        )

    def to_sink(
        self,
        name: str,
        *,
        liquids: Iterable[Phase] = (),
        solids: Mapping[str, float] = NOTHING,
        unknown: frozenset[str] = frozenset(),
    ) -> Bench:
        """Give the bench with something let go."""
        sink = self.sinks.get(name, Sink())
        amounts, volume = dict(sink.liquids), sink.volume
        for phase in liquids:
            amounts = added(amounts, phase.amounts)
            volume += phase.volume
        changed = Sink(amounts, added(sink.solids, solids), volume, sink.unknown | unknown)
        return self._replace(sinks={**self.sinks, name: changed})
