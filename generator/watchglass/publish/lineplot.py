"""A line plot as shapes: two axes with numbers, curves with their names at the end, and markers.

Curves differ by dash as well as by colour, both by class, so that a grey print can be read. The plot
is drawn for a width that a telephone shows whole.
"""

from __future__ import annotations

from math import ceil, floor, log10
from typing import TYPE_CHECKING, NamedTuple

from watchglass.publish.shapes import Shape, length, shape

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.run.bench.sweeps import Curve

#: Size of the drawing and of its margins, in units of the drawing: a CSS pixel where there is room.
WIDTH, HEIGHT = 470.0, 270.0
_LEFT, _RIGHT, _TOP, _BOTTOM = 54.0, 146.0, 14.0, 46.0
_TEXT = 12.0
#: Letters of a curve's name that fit beside the plot.
_NAME = 20


class Axis(NamedTuple):
    """One axis: what it measures, with unit, and where it begins and ends."""

    label: str
    low: float
    high: float


class Marker(NamedTuple):
    """A line across the plot at a value of x (`upright`) or of y, with its words."""

    at: float
    words: str
    upright: bool = True


def ticks(low: float, high: float, count: int = 6) -> tuple[float, ...]:
    """Give round values along an axis.

    >>> ticks(0, 14), ticks(0, 1), ticks(0, 47.5)
    ((0.0, 2.5, 5.0, 7.5, 10.0, 12.5), (0.0, 0.2, 0.4, 0.6, 0.8, 1.0), (0.0, 10.0, 20.0, 30.0, 40.0))
    """
    raw = (high - low) / count
    if raw <= 0:
        return (low,)
    power = 10.0 ** floor(log10(raw))
    step = next(s * power for s in (1, 2, 2.5, 5, 10) if s * power >= raw - 1e-12)
    first = ceil(low / step - 1e-9)
    last = floor(high / step + 1e-9)
    return tuple(round(place * step, 10) for place in range(first, last + 1))


def number(value: float) -> str:
    """Write a tick's number.

    >>> number(2.5), number(10.0), number(-1.0)
    ('2.5', '10', '−1')
    """
    return f"{value:.10g}".replace("-", "−")


def line_plot(
    x: Axis, y: Axis, curves: Sequence[Curve], markers: Sequence[Marker] = (), *, dots: bool = False
) -> Shape:
    """Draw curves.

    Args:
        x: The horizontal axis.
        y: The vertical one.
        curves: With points inside the axes.
        markers: Where the procedure stands.
        dots: Whether each point is marked: for what has no value between whole numbers.
    """
    frame = _Frame(x, y)
    return shape(
        "svg",
        *frame.axes(),
        *(frame.marker(marker) for marker in markers),
        *(
            part
            for place, curve in enumerate(curves)
            for part in frame.curve(place, curve, dots=dots)
        ),
        *frame.names(curves),
        class_="drawing plot",
        viewBox=f"0 0 {length(WIDTH)} {length(HEIGHT)}",
        width=WIDTH,
        height=HEIGHT,
    )


class _Frame(NamedTuple):
    x: Axis
    y: Axis

    def across(self, value: float) -> float:
        return _LEFT + (value - self.x.low) / (self.x.high - self.x.low) * (WIDTH - _LEFT - _RIGHT)

    def up(self, value: float) -> float:
        foot = HEIGHT - _BOTTOM
        return foot - (value - self.y.low) / (self.y.high - self.y.low) * (foot - _TOP)

    def axes(self) -> tuple[Shape, ...]:
        foot, right = HEIGHT - _BOTTOM, WIDTH - _RIGHT
        parts = [
            shape("path", class_="axis", d=f"M{_LEFT} {_TOP}V{foot}H{right}"),
            shape(
                "text", self.x.label, class_="label", text_anchor="middle",
                x=(_LEFT + right) / 2, y=HEIGHT - 8,
            ),
            shape(
                "text", self.y.label, class_="label", text_anchor="middle",
                transform="rotate(-90)", x=-(_TOP + foot) / 2, y=14,
            ),
        ]  # fmt: skip
        for value in ticks(self.x.low, self.x.high, 7):
            at = self.across(value)
            parts.append(shape("line", class_="tick", x1=at, x2=at, y1=foot, y2=foot + 5))
            text = shape("text", number(value), text_anchor="middle", x=at, y=foot + 19)
            parts.append(text)
        for value in ticks(self.y.low, self.y.high, 5):
            at = self.up(value)
            parts.append(shape("line", class_="rule", x1=_LEFT, x2=right, y1=at, y2=at))
            parts.append(
                shape("text", number(value), text_anchor="end", x=_LEFT - 7, y=at + _TEXT / 3)
            )
        return tuple(parts)

    def marker(self, marker: Marker) -> Shape:
        foot, right = HEIGHT - _BOTTOM, WIDTH - _RIGHT
        if marker.upright:
            at = min(max(self.across(marker.at), _LEFT), right)
            late = at > _LEFT + 0.6 * (right - _LEFT)
            return shape(
                "g",
                shape("line", x1=at, x2=at, y1=_TOP, y2=foot),
                shape(
                    "text", marker.words, text_anchor="end" if late else "start",
                    x=at - 5 if late else at + 5, y=_TOP + 10,
                ),
                class_="marker",
            )  # fmt: skip
        at = self.up(marker.at)
        return shape(
            "g",
            shape("line", x1=_LEFT, x2=right, y1=at, y2=at),
            shape("text", marker.words, text_anchor="start", x=_LEFT + 6, y=at - 4),
            class_="marker",
        )

    def curve(self, place: int, curve: Curve, *, dots: bool) -> tuple[Shape, ...]:
        points = [(self.across(a), self.up(b)) for a, b in zip(curve.xs, curve.ys, strict=True)]
        path = "M" + "L".join(f"{length(a)} {length(b)}" for a, b in _fewer(points))
        line = shape("path", shape("title", curve.name), class_=f"curve curve-{place + 1}", d=path)
        if not dots:
            return (line,)
        marks = (
            shape("circle", class_=f"dot curve-{place + 1}", cx=a, cy=b, r=3.0) for a, b in points
        )
        return (line, *marks)

    def names(self, curves: Sequence[Curve]) -> tuple[Shape, ...]:
        """Write each name at the end of its curve, moved apart where ends lie close."""
        if len(curves) == 1 and not curves[0].name:
            return ()
        ends = sorted((self.up(curve.ys[-1]), place) for place, curve in enumerate(curves))
        heights: list[float] = []
        for height, _ in ends:
            heights.append(max(height, heights[-1] + _TEXT * 1.25 if heights else height))
        least = HEIGHT - _BOTTOM
        for place in range(len(heights) - 1, -1, -1):  # those at the foot move up again
            heights[place] = min(heights[place], least)
            least = heights[place] - _TEXT * 1.25
        return tuple(
            shape(
                "text", _short(curves[place].name), class_=f"name curve-{place + 1}",
                x=WIDTH - _RIGHT + 6, y=height + _TEXT / 3,
            )
            for height, (_, place) in zip(heights, ends, strict=True)
        )  # fmt: skip


def _short(name: str) -> str:
    return name if len(name) <= _NAME else name[: _NAME - 1] + "…"


def _fewer(points: list[tuple[float, float]], tolerance: float = 0.2) -> list[tuple[float, float]]:
    """Leave out points that lie on the line between their neighbours, to a fifth of a unit.

    Source: Ramer 1972, Douglas and Peucker 1973.
    """
    if len(points) < 3:
        return points
    (x0, y0), (x1, y1) = points[0], points[-1]
    dx, dy = x1 - x0, y1 - y0
    span = (dx * dx + dy * dy) ** 0.5 or 1.0
    far, at = max(
        (abs(dy * (x - x0) - dx * (y - y0)) / span, place)
        for place, (x, y) in enumerate(points[1:-1], 1)
    )
    if far <= tolerance:
        return [points[0], points[-1]]
    return _fewer(points[: at + 1], tolerance)[:-1] + _fewer(points[at:], tolerance)
