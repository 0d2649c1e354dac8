"""The graph drawn: boxes with their words, each a link to its step, and arrows.

Colours and line styles are the style sheet's (`css/figures.css`); the few attributes given here say
the same in black and white, for a reader or printer that has no style sheet.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.publish.flow.graph import Kind
from watchglass.publish.flow.layout import laid_out
from watchglass.publish.flow.measure import LEADING, width, wrapped
from watchglass.publish.flow.wording import step_words
from watchglass.publish.shapes import Shape, length, shape

if TYPE_CHECKING:
    from watchglass.publish.flow.graph import Flow, Node
    from watchglass.publish.flow.layout import Layout

#: The widest that words in a box may be, px; two boxes side by side fit a phone.
MOST = 124.0
_SIDE, _ABOVE, _HEAD = 6.0, 6.0, 7.0
_ROUND = {Kind.STAGE: "3", Kind.PART: "10"}


class Line(NamedTuple):
    """One line of words: `head`, `said` or `inside`."""

    text: str
    kind: str


class Box(NamedTuple):
    """A box with its words broken to fit."""

    lines: tuple[Line, ...]
    width: float
    height: float


def boxed(node: Node) -> Box:
    """Break the words of a box, and give its size."""
    lines = [Line(text, "head") for text in wrapped(node.head, MOST, bold=True)]
    for said in (*node.lines, *filter(None, (node.fate,))):
        lines += [Line(text, "said") for text in wrapped(said, MOST)]
    for inside in node.components:
        lines += [Line(text, "inside") for text in wrapped(inside, MOST)]
    wide = max((width(line.text, bold=line.kind == "head") for line in lines), default=0.0)
    return Box(tuple(lines), wide + 2 * _SIDE, len(lines) * LEADING + 2 * _ABOVE)


def drawn(flow: Flow) -> Shape:
    """Draw a graph."""
    boxes = [boxed(node) for node in flow.nodes]
    layout = laid_out([(box.width, box.height) for box in boxes], flow.edges)
    wide, high = length(layout.width), length(layout.height)
    return shape(
        "svg",
        shape("g", *_arrows(layout), class_="flow-arrows", aria_hidden="true"),
        *(
            _box(node, box, *place)
            for node, box, place in zip(flow.nodes, boxes, layout.boxes, strict=True)
        ),
        class_="drawing flow-drawing",
        text_anchor="middle",
        font_size="12",
        viewBox=f"0 0 {wide} {high}",
        width=wide,
        height=high,
    )


def _arrows(layout: Layout) -> list[Shape]:
    lines: list[str] = []
    heads: list[str] = []
    for points in layout.arrows:
        (x, y), *more = points
        lines.append(f"M{length(x)} {length(y)}")
        for index, (there, down) in enumerate(more):
            last = index == len(more) - 1
            end = down - _HEAD + 1 if last else down
            if index % 2 == 0 or abs(there - x) < 0.05:
                lines.append(f"V{length(end)}")
            else:
                middle = length((y + end) / 2)
                lines.append(
                    f"C{length(x)} {middle} {length(there)} {middle} {length(there)} {length(end)}"
                )
            x, y = there, down
        heads.append(f"M{length(x - 3.5)} {length(y - _HEAD)}h7l-3.5 {length(_HEAD)}z")
    if not lines:
        return []
    return [
        shape("path", class_="flow-line", d="".join(lines), fill="none", stroke="currentColor"),
        shape("path", class_="flow-point", d="".join(heads), fill="currentColor"),
    ]


def _box(node: Node, box: Box, left: float, top: float) -> Shape:
    kinds = f"flow-box flow-{node.kind}" + (f" flow-{node.phase}" if node.phase else "")
    kinds += " flow-kept" if node.kept else ""
    frame = Shape(
        "rect",
        (
            ("x", length(left)),
            ("y", length(top)),
            ("width", length(box.width)),
            ("height", length(box.height)),
            ("rx", _ROUND.get(node.kind, "0")),
            ("fill", "none"),
            ("stroke", "currentColor"),
        ),
    )
    x, y = ("x", length(left + box.width / 2)), top + _ABOVE + LEADING * 0.76
    words = [
        Shape(
            "text",
            (x, ("y", length(y + LEADING * index)), ("class", f"flow-{line.kind}")),
            (line.text,),
        )
        for index, line in enumerate(box.lines)
    ]
    told = Shape("title", (), (f"step {step_words(node.steps)}",))
    link = (("href", f"#step-{node.steps[0]}"), ("class", kinds))
    return Shape("a", link, (told, frame, *words))
