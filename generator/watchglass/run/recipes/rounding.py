"""Masses that the balance can weigh, and volumes with the ware that can measure them."""

from __future__ import annotations

from math import ceil
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base.figures import shown
from watchglass.base.scan import Found, scan_quantity
from watchglass.catalogue.glassware import VesselType
from watchglass.catalogue.measuring import nearest, reach
from watchglass.run.recipes.lines import Measure, Weigh

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.measuring import Reach
    from watchglass.resolve.laboratory import Laboratory

_ML = 1e-6
#: Ware that measures any volume up to its size, the finest first.
_GRADUATED = ("graduated-pipette", "graduated-cylinder")
#: Share of a volume that a step of the ware may be [-]: half a step is then 2 %.
_COARSEST = 0.04
#: How often a one-mark pipette is filled at most for one volume. Judgement.
_FILLINGS = 2


class _Ware(NamedTuple):
    vessel: VesselType
    gives: Reach


class Rounding:
    """Rounds to what a laboratory can weigh and measure."""

    def __init__(self, catalogue: Catalogue, laboratory: Laboratory) -> None:
        """Take balance and glassware from a laboratory, ordinary ware from the glassware list."""
        self.catalogue = catalogue
        self.laboratory = laboratory
        self._ordinary: tuple[_Ware, ...] | None = None

    def mass(self, name: str, exact: float) -> Weigh:
        """Round a mass to what the balance weighs, at least one step; four figures are enough.

        Args:
            name: Of what.
            exact: As worked out, kg.
        """
        grams, balance = exact * 1e3, self.laboratory.balance * 1e3
        places = min(_places(balance), max(0, 4 - _digits(grams)))
        step = max(balance, 10.0**-places)
        rounded = max(1, round(grams / step)) * step if grams > 0 else 0.0
        return Weigh(name, f"{rounded:.{places}f} g", rounded * 1e-3, exact)

    def volume(self, name: str, exact: float, *, fine: bool = False) -> Measure:
        """Round a volume to what the smallest vessel that holds it can give.

        Args:
            name: Of what.
            exact: As worked out, m3.
            fine: Whether a pipette of one mark or a burette is worth its while.
        """
        found = (self._exactly(exact) if fine else None) or self._smallest(exact, fine=fine)
        fillings = 1
        if found is None:
            found = self._largest(exact)
        if found is None:
            return Measure(name, f"{shown(exact / _ML, 3)} mL", "", exact, exact)
        value = nearest(exact, found.gives)
        fillings = max(1, ceil(value / found.gives.most - 1e-9))
        places = _places(_step(found) / _ML)
        size = found.vessel.size.text if found.vessel.size is not None else ""
        ware = f"{found.vessel.type.name} {size}".strip()
        return Measure(name, f"{value / _ML:.{places}f} mL", ware, value, exact, fillings)

    def flask(self, whole: float) -> str:
        """Name the volumetric flask of a size, m3, where the laboratory owns it."""
        for vessel, count in self.laboratory.glassware:
            size = vessel.size
            fits = size is not None and abs(size.si - whole) <= 1e-6 * whole
            if count and fits and size is not None and vessel.type.key == "volumetric-flask":
                return f"volumetric flask {size.text}"
        return ""

    def owned(self, *kinds: str) -> Iterator[_Ware]:
        """Give the measuring ware owned of some types."""
        for vessel, count in self.laboratory.glassware:
            gives = reach(vessel) if count and vessel.type.key in kinds else None
            if gives is not None:
                yield _Ware(vessel, gives)

    def _exactly(self, volume: float) -> _Ware | None:
        """Give a pipette of one mark that gives the volume in one filling or two."""
        found = (
            (volume / ware.gives.most, ware)
            for ware in self.owned("volumetric-pipette")
            if any(
                abs(volume - count * ware.gives.most) <= ware.gives.tolerance
                for count in range(1, _FILLINGS + 1)
            )
        )
        best = min(found, key=lambda pair: pair[0], default=None)
        return best[1] if best is not None else None

    def _smallest(self, volume: float, *, fine: bool) -> _Ware | None:
        """Give the smallest measuring vessel that holds a volume and reads it to 2 %."""
        kinds = ("burette", *_GRADUATED) if fine else _GRADUATED
        every = (*self.owned(*kinds), *self._ordinary_ware())
        fit = [
            ware
            for ware in every
            if ware.gives.least <= volume <= ware.gives.most
            and ware.gives.step <= _COARSEST * volume
        ]
        if fine:
            return min(fit, key=lambda ware: (ware.gives.step, ware.gives.most), default=None)
        return min(fit, key=lambda ware: ware.gives.most, default=None)

    def _largest(self, volume: float) -> _Ware | None:
        """Give the largest cylinder, owned or ordinary, for a volume that none holds."""
        every = (*self.owned("graduated-cylinder"), *self._ordinary_ware())
        return max(
            (ware for ware in every if ware.gives.most < volume),
            key=lambda ware: ware.gives.most,
            default=None,
        )

    def _ordinary_ware(self) -> tuple[_Ware, ...]:
        if self._ordinary is None:
            self._ordinary = tuple(self._read_ordinary())
        return self._ordinary

    def _read_ordinary(self) -> Iterator[_Ware]:
        for key in _GRADUATED:
            kind = self.catalogue.glassware.get(key)
            for size in kind.sizes if kind is not None else ():
                read = scan_quantity(f"{size:g} mL", 0)
                if kind is None or not isinstance(read, Found):
                    continue
                vessel = VesselType(kind, kind.name, read.quantity)
                gives = reach(vessel)
                if gives is not None:
                    yield _Ware(vessel, gives)


def _step(ware: _Ware) -> float:
    """Give the step in which a volume is written, m3; of a pipette with one mark 0.01 mL."""
    return 0.01 * _ML if ware.gives.fixed else ware.gives.step


def volume_text(volume: float) -> str:
    """Write a volume in mL, or from a litre on in L.

    >>> volume_text(1e-3), volume_text(2.5e-4), volume_text(2.5e-3)
    ('1 L', '250 mL', '2.5 L')
    """
    if volume >= 1e-3 * (1 - 1e-9):
        return f"{volume * 1e3:.4g} L"
    return f"{volume * 1e6:.4g} mL"


def about(volume: float) -> str:
    """Write a volume that is poured by eye, to two figures.

    >>> about(1.75e-3), about(6.9e-4)
    ('1.8 L', '690 mL')
    """
    return volume_text(float(f"{volume:.2g}"))


def mass_text(mass: float) -> str:
    """Write how much is made by mass, in g, or from a kilogram on in kg.

    >>> mass_text(0.4), mass_text(1.25)
    ('400 g', '1.25 kg')
    """
    return f"{mass:.4g} kg" if mass >= 1 - 1e-9 else f"{mass * 1e3:.4g} g"


def _places(step: float) -> int:
    """Count the decimal places that a step needs.

    >>> _places(0.5), _places(0.02), _places(1.0), _places(10.0)
    (1, 2, 0, 0)
    """
    return len(f"{step:.6f}".rstrip("0").partition(".")[2])


def _digits(number: float) -> int:
    """Count the digits before the point; none below 1.

    >>> _digits(123.4), _digits(1.0), _digits(0.5)
    (3, 1, 0)
    """
    return len(str(int(number))) if number >= 1 else 0
