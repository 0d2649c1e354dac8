"""Laying out and drawing, over any graph: nothing overlaps, nothing leaves the drawing."""

from __future__ import annotations

from itertools import combinations, pairwise
from typing import TYPE_CHECKING

from hypothesis import given, settings
from hypothesis import strategies as st

from watchglass.publish.flow.draw import MOST, boxed, drawn
from watchglass.publish.flow.graph import Flow, Kind, Node
from watchglass.publish.flow.layout import APART, BETWEEN, MARGIN, Layout, laid_out
from watchglass.publish.flow.measure import width, wrapped
from watchglass.publish.shapes import ATTRIBUTES, ELEMENTS, Shape

if TYPE_CHECKING:
    from collections.abc import Iterator

Sizes = list[tuple[float, float]]
Edges = list[tuple[int, int]]
_SIZE = st.tuples(st.integers(10, 140), st.integers(10, 200)).map(
    lambda s: (float(s[0]), float(s[1]))
)
_WORDS = st.text(st.characters(codec="utf-8", exclude_categories=("Cs", "Cc")), max_size=60)


@st.composite
def graphs(draw: st.DrawFn) -> tuple[Sizes, Edges]:
    """Give any graph without cycles: arrows lead from a box to a later one."""
    sizes = draw(st.lists(_SIZE, min_size=1, max_size=24))
    pairs = list(combinations(range(len(sizes)), 2))
    edges = draw(st.lists(st.sampled_from(pairs), max_size=40, unique=True)) if pairs else []
    return sizes, sorted(edges)


@st.composite
def flows(draw: st.DrawFn) -> Flow:
    """Give any graph of boxes with any words."""
    sizes, edges = draw(graphs())
    node = st.builds(
        Node,
        kind=st.sampled_from(Kind),
        head=_WORDS,
        lines=st.lists(_WORDS, max_size=3).map(tuple),
        steps=st.lists(st.integers(1, 30), min_size=1, max_size=3).map(tuple),
        phase=st.sampled_from(("", "aqueous", "organic", "solid")),
        components=st.lists(_WORDS, max_size=2).map(tuple),
        fate=st.sampled_from(("", "kept")),
    )
    return Flow(tuple(draw(node) for _ in sizes), tuple(edges))


def rectangles(sizes: Sizes, layout: Layout) -> list[tuple[float, float, float, float]]:
    """Give left, top, right and bottom of each box."""
    return [(x, y, x + w, y + h) for (x, y), (w, h) in zip(layout.boxes, sizes, strict=True)]


@given(graphs())
@settings(max_examples=150, deadline=None)
def test_no_two_boxes_come_nearer_than_the_gap(graph: tuple[Sizes, Edges]) -> None:
    sizes, edges = graph
    found = rectangles(sizes, laid_out(sizes, edges))

    near = [
        (a, b)
        for a, b in combinations(found, 2)
        if a[0] < b[2] + APART - 0.01
        and b[0] < a[2] + APART - 0.01
        and a[1] < b[3] - 0.01
        and b[1] < a[3] - 0.01
    ]
    assert near == []


@given(graphs())
@settings(max_examples=150, deadline=None)
def test_every_box_and_every_arrow_is_within_the_drawing(graph: tuple[Sizes, Edges]) -> None:
    sizes, edges = graph
    layout = laid_out(sizes, edges)
    points = [point for arrow in layout.arrows for point in arrow]
    corners = [(left, top) for left, top, _, _ in rectangles(sizes, layout)]
    corners += [(right, foot) for _, _, right, foot in rectangles(sizes, layout)]

    xs, ys = zip(*(points + corners), strict=True)
    assert min(xs) >= MARGIN - 0.01
    assert min(ys) >= MARGIN - 0.01
    assert max(xs) <= layout.width - MARGIN + 0.01
    assert max(ys) <= layout.height - MARGIN + 0.01


@given(graphs())
@settings(max_examples=150, deadline=None)
def test_arrows_lead_from_the_foot_of_a_box_down_to_the_top_of_another(
    graph: tuple[Sizes, Edges],
) -> None:
    sizes, edges = graph
    layout = laid_out(sizes, edges)
    found = rectangles(sizes, layout)
    ends = [(arrow[0], arrow[-1]) for arrow in layout.arrows]
    wanted = [
        (
            ((found[a][0] + found[a][2]) / 2, found[a][3]),
            ((found[b][0] + found[b][2]) / 2, found[b][1]),
        )
        for a, b in edges
    ]

    assert [[round(v, 6) for p in end for v in p] for end in ends] == [
        [round(v, 6) for p in end for v in p] for end in wanted
    ]
    assert all(a[1] <= b[1] for arrow in layout.arrows for a, b in pairwise(arrow))
    assert all(end[1] - start[1] >= BETWEEN - 0.01 for start, end in ends)


@given(graphs())
@settings(max_examples=150, deadline=None)
def test_no_arrow_meets_a_box_on_its_way(graph: tuple[Sizes, Edges]) -> None:
    sizes, edges = graph
    layout = laid_out(sizes, edges)
    found = rectangles(sizes, layout)
    met = []
    for (start, end), arrow in zip(edges, layout.arrows, strict=True):
        for one, other in pairwise(arrow):
            # a bend stays between its two ends, across and down
            left, right = sorted((one[0], other[0]))
            met += [
                (start, end, box)
                for box, (side, top, far, foot) in enumerate(found)
                if side + 0.01 < right
                and left < far - 0.01
                and top + 0.01 < other[1]
                and one[1] < foot - 0.01
            ]
    assert met == []


@given(graphs())
@settings(max_examples=50, deadline=None)
def test_same_graph_gives_the_same_layout(graph: tuple[Sizes, Edges]) -> None:
    assert laid_out(*graph) == laid_out(*graph)


@given(flows())
@settings(max_examples=100, deadline=None)
def test_words_of_any_box_fit_into_it(flow: Flow) -> None:
    for node in flow.nodes:
        box = boxed(node)
        wide = [width(line.text, bold=line.kind == "head") for line in box.lines]
        assert max(wide, default=0.0) < box.width


@given(flows())
@settings(max_examples=50, deadline=None)
def test_drawing_is_made_of_what_the_writer_lets_through(flow: Flow) -> None:
    shapes = [*_all(drawn(flow))]

    assert {shape.element for shape in shapes} <= ELEMENTS
    assert {name for shape in shapes for name, _ in shape.attributes} <= ATTRIBUTES


@given(flows())
@settings(max_examples=50, deadline=None)
def test_frames_are_within_the_view_box(flow: Flow) -> None:
    shape = drawn(flow)
    _, _, wide, high = (float(v) for v in dict(shape.attributes)["viewBox"].split())
    frames = [dict(s.attributes) for s in _all(shape) if s.element == "rect"]

    assert len(frames) == len(flow.nodes)
    assert all(0 <= float(f["x"]) <= wide - float(f["width"]) + 0.2 for f in frames)
    assert all(0 <= float(f["y"]) <= high - float(f["height"]) + 0.2 for f in frames)


def _all(shape: Shape) -> Iterator[Shape]:
    yield shape
    for child in shape.children:
        if isinstance(child, Shape):
            yield from _all(child)


def test_straight_way_is_straight() -> None:
    layout = laid_out([(100.0, 30.0), (60.0, 30.0), (120.0, 40.0)], [(0, 1), (1, 2)])

    assert len({round(x, 6) for arrow in layout.arrows for x, _ in arrow}) == 1


def test_crossing_that_can_be_spared_is_spared() -> None:
    # two boxes, each leading to the one below the other as they are given
    layout = laid_out([(50.0, 20.0)] * 4, [(0, 3), (1, 2)])
    (a, _), (b, _), (c, _), (d, _) = layout.boxes

    assert (a < b) == (d < c)


def test_what_is_brought_in_late_stands_just_above_its_vessel() -> None:
    layout = laid_out([(50.0, 20.0)] * 4, [(0, 1), (1, 2), (3, 2)])

    assert layout.boxes[3][1] == layout.boxes[1][1]


def test_boxes_side_by_side_keep_their_order_but_for_the_longest_way() -> None:
    # 0 leads to 1, 2 and 3; of these 1 and 3 lead on: 1 first, then as they come.
    layout = laid_out([(50.0, 20.0)] * 6, [(0, 1), (0, 2), (0, 3), (1, 4), (3, 5)])
    lefts = [layout.boxes[n][0] for n in (1, 2, 3)]

    assert lefts == sorted(lefts)


def test_drawing_of_nothing_is_empty() -> None:
    assert laid_out([], []).boxes == ()


# ------------------------------------------------------------------------------ words


@given(_WORDS)
def test_no_line_is_wider_than_the_room(words: str) -> None:
    assert all(width(line) <= MOST for line in wrapped(words, MOST))


@given(st.lists(st.text(st.sampled_from("abcdefgh0123"), min_size=1, max_size=9), max_size=9))
def test_words_that_fit_are_never_broken(words: list[str]) -> None:
    assert " ".join(wrapped(" ".join(words), MOST)) == " ".join(words)


def test_long_name_is_broken_where_it_is_joined() -> None:
    assert wrapped("disodium dihydrogenphosphate", MOST) == ["disodium", "dihydrogen-", "phosphate"]


def test_long_name_with_a_hyphen_is_broken_there() -> None:
    assert wrapped("non-halogenated-organic", MOST) == ["non-halogenated-", "organic"]


def test_number_is_not_parted_from_its_unit() -> None:
    assert (
        "15\N{NO-BREAK SPACE}mL"
        in wrapped("portions of hydrogen 15\N{NO-BREAK SPACE}mL of it", MOST)[1]
    )
