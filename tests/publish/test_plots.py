"""Curves on instructors' pages: what is drawn, what the tables say, and that students have none."""

from __future__ import annotations

from itertools import pairwise
from typing import TYPE_CHECKING

import pytest

from builders import golden, instructor, student
from watchglass.publish.lineplot import HEIGHT, WIDTH, Axis, Marker, line_plot, number, ticks
from watchglass.run.bench.sweeps import Curve

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.publish.shapes import Figure, Shape

RISING = Curve("rising", (0.0, 5.0, 10.0), (0.0, 0.5, 1.0))
FALLING = Curve("falling", (0.0, 5.0, 10.0), (1.0, 0.9, 0.0))


def parts(shown: Shape) -> Iterator[Shape]:
    yield shown
    for part in shown.children:
        if not isinstance(part, str):
            yield from parts(part)


def drawn(shown: Shape, name: str, class_: str = "") -> list[Shape]:
    return [
        p
        for p in parts(shown)
        if p.element == name and (not class_ or class_ in str(dict(p.attributes).get("class", "")))
    ]


def points(path: Shape) -> list[tuple[float, float]]:
    text = str(dict(path.attributes)["d"])
    pairs = text.removeprefix("M").split("L")
    return [(float(a), float(b)) for a, b in (pair.split() for pair in pairs)]


def words(shown: Shape) -> list[str]:
    return [part for p in drawn(shown, "text") for part in p.children if isinstance(part, str)]


# ---------------------------------------------------------------- the plot itself


def test_points_stand_where_their_values_are_on_the_axes() -> None:
    plot = line_plot(Axis("x", 0, 10), Axis("y", 0, 1), [RISING, FALLING])
    (frame,) = drawn(plot, "path", "axis")
    left, top = (float(n) for n in str(dict(frame.attributes)["d"])[1:].split("V")[0].split())
    foot, right = (float(n) for n in str(dict(frame.attributes)["d"]).split("V")[1].split("H"))

    rising, falling = (points(p) for p in drawn(plot, "path", "curve-"))
    assert rising == [(left, foot), (right, top)]  # the middle lies on the line: left out
    middle = (left + right) / 2
    assert falling == [
        (left, top),
        (pytest.approx(middle), pytest.approx(foot - 0.9 * (foot - top), abs=0.1)),
        (right, foot),
    ]


def test_everything_lies_inside_the_drawing() -> None:
    plot = line_plot(
        Axis("volume / mL", 0, 47.5),
        Axis("pH", 0, 14),
        [Curve("a", (0.0, 47.5), (0.0, 14.0)), Curve("b", (0.0, 47.5), (0.1, 13.9))],
        [Marker(47.5, "here 47.5 mL"), Marker(8.3, "pH 8.3", upright=False)],
    )

    for shown in (*drawn(plot, "text"), *drawn(plot, "line")):
        for name, value in shown.attributes:
            if name in ("x", "x1", "x2"):
                assert -HEIGHT <= float(str(value)) <= WIDTH
            if name in ("y", "y1", "y2"):
                assert 0 <= float(str(value)) <= HEIGHT


def test_names_at_close_ends_stand_apart_and_within() -> None:
    curves = [Curve(f"substance {n}", (0.0, 1.0), (0.0, 0.001 * n)) for n in range(5)]
    plot = line_plot(Axis("x", 0, 1), Axis("y", 0, 1), curves)
    heights = sorted(float(str(dict(t.attributes)["y"])) for t in drawn(plot, "text", "name"))

    assert len(heights) == 5
    assert all(b - a >= 12 for a, b in pairwise(heights))
    assert heights[-1] < HEIGHT


def test_curves_differ_by_class_and_carry_their_name() -> None:
    plot = line_plot(Axis("x", 0, 10), Axis("y", 0, 1), [RISING, FALLING], dots=True)
    classes = [dict(p.attributes)["class"] for p in drawn(plot, "path", "curve-")]

    assert classes == ["curve curve-1", "curve curve-2"]
    assert {"rising", "falling"} <= set(words(plot))
    assert len(drawn(plot, "circle")) == 6
    titles = [t.children for t in drawn(plot, "title")]
    assert titles == [("rising",), ("falling",)]


def test_long_name_is_cut_in_the_drawing() -> None:
    plot = line_plot(Axis("x", 0, 10), Axis("y", 0, 1), [RISING._replace(name="n" * 40), FALLING])

    assert f"{'n' * 19}…" in words(plot)


@pytest.mark.parametrize(
    ("low", "high", "expected"),
    [
        (0.0, 14.0, (0.0, 2.5, 5.0, 7.5, 10.0, 12.5)),
        (1.0, 5.0, (1.0, 2.0, 3.0, 4.0, 5.0)),
        (-1.0, 1.0, (-1.0, -0.5, 0.0, 0.5, 1.0)),
        (3.0, 3.0, (3.0,)),
    ],
)
def test_ticks_are_round(low: float, high: float, expected: tuple[float, ...]) -> None:
    assert ticks(low, high) == expected


def test_number_of_a_tick_has_a_minus_sign() -> None:
    assert [number(-0.5), number(0.30000000000000004), number(20.0)] == ["−0.5", "0.3", "20"]


# ---------------------------------------------------------------- on the pages


def figures(name: str) -> dict[str, Figure]:
    return {figure.name: figure for figure in instructor(golden(name), bench=True).plots}


def test_separation_has_curves_for_each_washing_that_decides_it() -> None:
    shown = figures("oc-04")
    titles = [figure.title for figure in shown.values()]

    assert any("share in the aqueous layer against pH" in t for t in titles)
    assert any("in one portion or several" in t for t in titles)
    assert any("against the volume" in f.caption for f in shown.values())
    for figure in shown.values():
        assert figure.description
        assert figure.note.startswith("By the bench model")
        assert figure.rows, "every curve has its table"
        assert all(len(row) == len(figure.head) for row in figure.rows)


def test_table_of_portions_has_the_share_that_the_procedure_reaches() -> None:
    # OC-04 takes benzocaine out with two portions of 3 M acid: 98.3 %.
    shown = next(f for f in figures("oc-04").values() if "3.0 M hydrochloric acid" in f.title)
    place = shown.head.index("benzocaine")

    assert shown.head[0] == "Portions"
    assert [row[0] for row in shown.rows] == ["1", "2", "3", "4", "5"]
    assert shown.rows[1][place] == "98.3 %"
    assert "here 2" in words(shown.drawing)


def test_titration_has_its_curve_with_the_end_marked() -> None:
    (shown,) = figures("gc-02").values()

    assert shown.head == ("Volume / mL", "pH")
    assert any(w.startswith("here 31.8") for w in words(shown.drawing))
    assert float(shown.rows[0][1]) < 5
    assert float(shown.rows[-1][1]) > 11.5


def test_students_have_no_curves() -> None:
    assert not hasattr(student(golden("oc-04")), "plots")
