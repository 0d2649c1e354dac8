"""Values of a substance that cannot well be: against its state, each other, and the shipped table.

The limits are judgement from the ranges that common substances span; each says so beside it. They
are wide: what they find is a wrong unit, two values changed about, or a hydrate's name with the
formula of another.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Sequence

    from watchglass.base.fields import Record
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span
    from watchglass.catalogue.catalogue import ShippedSubstances
    from watchglass.catalogue.substances import At, Substance

#: Density that a substance of each state may well have, kg/m3. Liquids: pentane 626 to
#: diiodomethane 3325 at 20 °C; solids: aerogels and foams left out, to osmium; gases at 1 atm: to
#: tungsten hexafluoride. From memory, rounded outwards.
_DENSITIES = {
    "liquid": (500.0, 4000.0),
    "solid": (300.0, 23000.0),
    "gas": (0.08, 20.0),
    "": (0.08, 23000.0),
}
#: Metals that are liquid, or melt in the hand.
_MOLTEN = frozenset(("Hg", "Ga", "Cs", "Rb"))
#: Room for supercooled liquids and for room temperatures that are not 20 °C, K. Judgement.
_ROOM, _SLACK = 293.15, 12.0
#: A figure of a set that differs from the shipped one by more is worth a word. Judgement.
_DENSITY_APART, _POINT_APART = 0.05, 5.0
#: Liquids lose about a thousandth of their density a kelvin [1/K]. Common practice, no source.
_EXPANSION = 0.0012

_WATERS = {
    "hemi": 0.5,
    "mono": 1.0,
    "sesqui": 1.5,
    "di": 2.0,
    "tri": 3.0,
    "tetra": 4.0,
    "penta": 5.0,
    "hexa": 6.0,
    "hepta": 7.0,
    "octa": 8.0,
    "nona": 9.0,
    "deca": 10.0,
    "undeca": 11.0,
    "dodeca": 12.0,
}
_HYDRATE = re.compile(r"\b([a-z]+)hydrate\b")
_WATER_PART = re.compile(r"[·•∙⋅*.]\s*(\d*\.?\d*)\s*H2O")


def implausible(record: Record, substance: Substance) -> list[Finding]:
    """Report values of one entry that cannot well be.

    Args:
        record: The entry as written, for the places.
        substance: The same, decoded.
    """
    return [
        *_density(record, substance),
        *_order(record, substance),
        *_state(record, substance),
        *_water(record, substance),
    ]


def _density(record: Record, substance: Substance) -> Iterator[Finding]:
    density = substance.density
    if density is None:
        return
    state = substance.state
    if state == "gas" and _as_liquid(density, substance.boils):
        state = "liquid"
    low, high = _DENSITIES[state]
    elements = (
        {element for element, _ in substance.formula.composition} if substance.formula else set()
    )
    if state == "liquid" and elements and elements <= _MOLTEN:
        low, high = _DENSITIES["solid"]
    value = density.value
    if low <= value.si <= high:
        return
    what = f"a {state}'s density" if state else "a density"
    yield _doubt(
        record,
        "density",
        f"{what} of {value.text} cannot well be",
        _other_unit(value, low, high),
    )


def _as_liquid(density: At, boils: Quantity | None) -> bool:
    """Tell whether a gas's density is said to be that of the liquid, below its boiling point."""
    return bool(boils and density.temperature and density.temperature.si <= boils.si_high + 1)


def _other_unit(value: Quantity, low: float, high: float) -> str:
    """Say which unit would make a density plausible: a factor of a thousand is the usual slip."""
    number = value.number.text
    for factor, unit in ((1.0, "kg/m^3"), (1000.0, "g/mL")):
        if unit != value.unit.symbol and low <= value.number.value * factor <= high:
            given = number if unit == "g/mL" else f"{value.number.value / 1000:.6g}"
            return f"write `{given} g/mL` if {unit} was meant, or look it up again"
    return "look at the unit and at the point"


def _order(record: Record, substance: Substance) -> Iterator[Finding]:
    melts, boils, flash = substance.melts, substance.boils, substance.flash
    if melts and boils and melts.si > boils.si_high:
        yield _doubt(
            record,
            "melts",
            f"it melts at {melts.text}, above where it boils ({boils.text})",
            "see whether the two are changed about",
        )
    if flash and boils and flash.si > boils.si_high:
        yield _doubt(
            record,
            "flash",
            f"it flashes at {flash.text}, above where it boils ({boils.text})",
            "see whether the two are changed about",
        )


def _state(record: Record, substance: Substance) -> Iterator[Finding]:
    melts, boils, state = substance.melts, substance.boils, substance.state
    if melts and boils and melts.si > boils.si_high:
        return  # that is told already
    warm, cold = _ROOM + _SLACK, _ROOM - _SLACK
    if melts and state == "liquid" and melts.si > warm:
        yield _doubt(
            record,
            "state",
            f"a liquid does not melt at {melts.text}",
            "write `state: solid`, or mend `melts`",
        )
    elif melts and state == "solid" and melts.si_high < cold:
        yield _doubt(
            record,
            "state",
            f"a solid does not melt at {melts.text}",
            "write `state: liquid`, or mend `melts`",
        )
    if boils and state in ("liquid", "solid") and boils.si_high < cold:
        yield _doubt(
            record,
            "state",
            f"a {state} does not boil at {boils.text}",
            "write `state: gas`, or mend `boils`",
        )
    elif boils and state == "gas" and boils.si > warm:
        yield _doubt(
            record,
            "state",
            f"a gas does not boil at {boils.text}",
            "write `state: liquid`, or mend `boils`",
        )


def _water(record: Record, substance: Substance) -> Iterator[Finding]:
    """Hold the words `anhydrous` and `…hydrate` of the names to the formula."""
    formula = record.text("formula")
    if substance.formula is None or formula is None:
        return
    part = _WATER_PART.search(formula.text)
    held = float(part[1] or 1) if part else 0.0
    for name in substance.names:
        named = _HYDRATE.search(name.lower())
        meant = _WATERS.get(named[1]) if named else None
        if meant is not None and meant != held:
            if part is None and _holds(substance, meant):
                continue  # the water is not set apart in the formula
            said = f"has {meant:g} H2O by its name, {held:g} by its formula"
        elif meant is None and held and "anhydrous" in name.lower():
            said = f"has no water by its name, {held:g} H2O by its formula"
        else:
            continue
        yield Finding(
            code=codes.HYDRATE_UNFIT,
            span=formula.span,
            message=f"`{name}` {said}",
            help="give the formula of the form on the bottle, as in `CuSO4·5H2O`, or mend the name",
        )
        return


def _holds(substance: Substance, waters: float) -> bool:
    atoms = dict(substance.formula.composition) if substance.formula else {}
    return atoms.get("H", 0) >= 2 * waters and atoms.get("O", 0) >= waters


def _doubt(record: Record, name: str, message: str, help_: str) -> Finding:
    node = record.text(name)
    span: Span = node.span if node else record.span
    return Finding(code=codes.VALUE_IMPLAUSIBLE, span=span, message=message, help=help_)


# ---------------------------------------------------------------- a set against the shipped table


def differing(
    own: Sequence[Substance], shipped: ShippedSubstances, told: Iterable[Finding] = ()
) -> Iterator[Finding]:
    """Report overriding entries whose figures are far from the shipped ones.

    Args:
        own: The set's substances.
        shipped: The shipped tables; only what is overridden is decoded.
        told: What was found in the entries so far: one with a finding is not held to be right.
    """
    overriding = [substance for substance in own if substance.key in shipped]
    if not overriding:
        return
    places = [(finding.span.source.name, finding.span.start) for finding in told]
    for substance in overriding:
        other = shipped.get(substance.key)
        if other is None or any(_inside(place, substance, own) for place in places):
            continue
        for what, mine, theirs in _apart(substance, other):
            yield Finding(
                code=codes.DIFFERS_FROM_SHIPPED,
                span=substance.span,
                message=f"`{substance.key}` has {what} {mine} here and {theirs} in the shipped catalogue",
                help="look both up again; if this one is another substance, give it a key of its own",
            )


def _inside(place: tuple[str, int], substance: Substance, own: Iterable[Substance]) -> bool:
    """Tell whether a place lies in a substance's entry: from its key to the next one's."""
    name, start = place
    after = [
        other.span.start
        for other in own
        if other.span.source.name == name and other.span.start > substance.span.start
    ]
    return name == substance.span.source.name and substance.span.start <= start < min(
        after, default=start + 1
    )


def _apart(mine: Substance, theirs: Substance) -> Iterator[tuple[str, str, str]]:
    if mine.cas and theirs.cas and mine.cas != theirs.cas:
        yield "the CAS number", mine.cas, theirs.cas
    if (
        mine.formula
        and theirs.formula
        and dict(mine.formula.composition) != dict(theirs.formula.composition)
    ):
        yield "the formula", mine.formula.text, theirs.formula.text
    if mine.density and theirs.density and _densities_apart(mine.density, theirs.density):
        yield "the density", _at(mine.density), _at(theirs.density)
    for what, one, other in (
        ("the melting point", mine.melts, theirs.melts),
        ("the boiling point", mine.boils, theirs.boils),
    ):
        if (
            one
            and other
            and not one.si - _POINT_APART <= other.middle <= one.si_high + _POINT_APART
        ):
            yield what, one.text, other.text


def _densities_apart(one: At, other: At) -> bool:
    warmer = 0.0
    if one.temperature and other.temperature:
        warmer = abs(one.temperature.si - other.temperature.si)
    allowed = _DENSITY_APART + _EXPANSION * warmer
    return abs(one.value.si - other.value.si) > allowed * other.value.si


def _at(density: At) -> str:
    return density.value.text + (f" at {density.temperature.text}" if density.temperature else "")
