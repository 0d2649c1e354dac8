"""Curves of the instructor edition: share against pH and portions, pH against volume, with their numbers."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base.figures import shown
from watchglass.publish.lineplot import Axis, Marker, line_plot
from watchglass.publish.shapes import Figure
from watchglass.run.bench.figures import share_words, volume_words
from watchglass.run.bench.sweeps import (
    ph_by_volume,
    share_by_ph,
    share_by_portions,
    washings,
)

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.resolve import model
    from watchglass.run.bench.knowledge import Knowledge
    from watchglass.run.bench.ledger import Ledger
    from watchglass.run.bench.sweeps import Curve, PhByVolume, ShareByPh, ShareByPortions

#: Rows of a table of a curve with many points.
_ROWS = 12
_NOTE = "By the bench model: ideal, 25 °C, layers in equilibrium."


def plot_figures(
    procedure: model.Procedure, ledger: Ledger, known: Knowledge
) -> tuple[Figure, ...]:
    """Draw the curves that tell what decides a procedure."""
    return tuple(_figures(procedure, ledger, known))


def _figures(procedure: model.Procedure, ledger: Ledger, known: Knowledge) -> Iterator[Figure]:
    for place, washing in enumerate(washings(ledger), start=1):
        by_ph = share_by_ph(washing, ledger, known)
        if by_ph is not None:
            yield _against_ph(by_ph, f"curve-ph-{place}")
        by_portions = share_by_portions(washing, procedure, known)
        if by_portions is not None:
            written = procedure.materials[by_portions.material].written
            yield _against_portions(by_portions, written, f"curve-portions-{place}")
    for place, course in enumerate(ph_by_volume(ledger, procedure, known), start=1):
        written = procedure.materials[course.material].written
        yield _against_volume(course, written, f"curve-volume-{place}")


def _against_ph(found: ShareByPh, name: str) -> Figure:
    layer = f"{found.part} layer"
    here = found.ph if found.ph is not None and 0 <= found.ph <= _MOST_PH else None
    markers = [Marker(here, f"here pH {here:.1f}")] if here is not None else []
    said = "; ".join(_between(curve) for curve in found.curves)
    return Figure(
        name=name,
        title=f"Step {found.step}: share in the {layer} against pH",
        description=f"pH from 0 to 14. {said}."
        + (f" The procedure stands at pH {here:.1f}." if here else ""),
        drawing=line_plot(
            Axis("pH", 0, _MOST_PH), Axis(f"share in the {layer}", 0, 1), found.curves, markers
        ),
        caption=f"Share in the {layer} of {found.vessel} against pH",
        head=("pH", *(curve.name for curve in found.curves)),
        rows=tuple(
            (f"{x:g}", *(share_words(curve.ys[place]) for curve in found.curves))
            for place, x in enumerate(found.curves[0].xs)
            if x == int(x)
        ),
        note=_NOTE,
    )


_MOST_PH = 14.0


def _between(curve: Curve) -> str:
    """Say where a curve begins, ends, and passes one half."""
    first, last = curve.ys[0], curve.ys[-1]
    said = f"{curve.name} goes from {share_words(first)} to {share_words(last)}"
    half = (first + last) / 2
    for place in range(len(curve.xs) - 1):
        low, high = curve.ys[place], curve.ys[place + 1]
        if (low - half) * (high - half) <= 0 and low != high:
            return f"{said}, half of the way at pH {curve.xs[place]:.1f}"
    return said


def _against_portions(found: ShareByPortions, written: str, name: str) -> Figure:
    volume = volume_words(found.volume)
    counts = [int(x) for x in found.curves[0].xs]
    said = "; ".join(
        f"{curve.name}: " + ", ".join(share_words(y) for y in curve.ys) for curve in found.curves
    )
    markers = [Marker(float(found.portions), f"here {found.portions}")]
    return Figure(
        name=name,
        title=f"Step {found.step}: what {volume} of {written} takes in one portion or several",
        description=f"Share drawn off in {counts[0]} to {counts[-1]} equal portions. {said}.",
        drawing=line_plot(
            Axis("portions", 1, float(counts[-1])),
            Axis("share drawn off", 0, 1),
            found.curves,
            [m for m in markers if m.at <= counts[-1]],
            dots=True,
        ),
        caption=f"Share drawn off by {volume} of {written}, divided equally",
        head=("Portions", *(curve.name for curve in found.curves)),
        rows=tuple(
            (str(count), *(share_words(curve.ys[place]) for curve in found.curves))
            for place, count in enumerate(counts)
        ),
        note=_NOTE,
    )


def _against_volume(found: PhByVolume, written: str, name: str) -> Figure:
    curve = found.curve._replace(name="", xs=tuple(x * 1e6 for x in found.curve.xs))
    low, high = min(0.0, *curve.ys), max(_MOST_PH, *curve.ys)
    markers = [Marker(found.volume * 1e6, f"here {volume_words(found.volume)}")]
    if found.aim is not None:
        markers += [Marker(found.aim.si, f"pH {found.aim.text}", upright=False)]
    done = {"adjust": "Bringing", "titrate": "Titrating"}[found.verb]
    return Figure(
        name=name,
        title=f"Step {found.step}: {done.lower()} `{found.vessel}` with {written}".replace("`", ""),
        description=f"pH from {curve.ys[0]:.1f} without reagent to {curve.ys[-1]:.1f} with"
        f" {shown(curve.xs[-1], 3)} mL; the procedure takes {volume_words(found.volume)}.",
        drawing=line_plot(
            Axis("volume / mL", 0, curve.xs[-1]), Axis("pH", low, high), [curve], markers
        ),
        caption=f"pH of {found.vessel} against the volume of {written}",
        head=("Volume / mL", "pH"),
        rows=tuple((shown(x, 3), f"{y:.2f}") for x, y in _some(curve)),
        note=_NOTE,
    )


def _some(curve: Curve) -> list[tuple[float, float]]:
    """Give about a dozen points of a curve, its ends among them."""
    pairs = list(zip(curve.xs, curve.ys, strict=True))
    step = max(1, (len(pairs) - 1) // _ROWS + 1)
    chosen = pairs[::step]
    return chosen if chosen[-1] == pairs[-1] else [*chosen, pairs[-1]]
