"""Drawings as models: the shapes of an SVG as plain data, and the figure they stand in.

Nothing here is markup. The writer of the site turns shapes into SVG and lets through only the
elements and attributes that a drawing needs (`ELEMENTS`, `ATTRIBUTES`), so no word of an author
can become one. Colours are the theme's: shapes carry classes, never a colour.
"""

from __future__ import annotations

from dataclasses import dataclass

#: Elements of SVG 2 that drawings are made of.
ELEMENTS = frozenset(
    ("svg", "g", "title", "desc", "path", "rect", "circle", "line", "text", "tspan", "a")
)
#: Attributes that they may carry.
ATTRIBUTES = frozenset(
    (
        *("class", "id", "role", "viewBox", "width", "height", "x", "y", "dx", "dy", "rx", "r"),
        *("cx", "cy", "x1", "x2", "y1", "y2", "d", "transform", "text-anchor", "href"),
        *("aria-hidden", "aria-labelledby", "dominant-baseline", "fill", "stroke", "font-size"),
    )
)


@dataclass(frozen=True, slots=True)
class Shape:
    """One element: its name, its attributes in order, and what is in it: words and shapes."""

    element: str
    attributes: tuple[tuple[str, str], ...] = ()
    children: tuple[str | Shape, ...] = ()


@dataclass(frozen=True, slots=True, kw_only=True)
class Figure:
    """A drawing with what those read who do not see it.

    Attributes:
        name: Its place on the page, unique there; a drawing's own places begin with it.
        title: What it shows, a few words.
        description: What is to be seen in it, in sentences.
        drawing: The `svg` element, without title and description: the writer puts them in.
        caption: Caption of the table of its figures.
        head: Column heads of that table.
        rows: Its rows, each as long as the head.
        note: What the figures rest on, or empty.
    """

    name: str
    title: str
    description: str
    drawing: Shape
    caption: str
    head: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]
    note: str = ""


def shape(element: str, *children: str | Shape, **attributes: str | float) -> Shape:
    """Make a shape; lengths are written to a tenth of a unit, a name's underscores as hyphens.

    >>> shape("line", x1=0, x2=12.34, text_anchor="end", class_="axis").attributes
    (('x1', '0'), ('x2', '12.3'), ('text-anchor', 'end'), ('class', 'axis'))
    """
    return Shape(
        element,
        tuple((_name(name), length(value)) for name, value in attributes.items()),
        children,
    )


def length(value: str | float) -> str:
    """Write a length to a tenth, without a needless nought.

    >>> length(3.0), length(-0.04), length("auto")
    ('3', '0', 'auto')
    """
    if isinstance(value, str):
        return value
    text = f"{value:.1f}".removesuffix(".0")
    return "0" if text == "-0" else text


def _name(name: str) -> str:
    return name.rstrip("_").replace("_", "-")
