"""Models as HTML text: every word escaped, every address looked at, one function a family.

Texts are joined, not built as trees: a page is some thousand short strings, and this way they cost
little. Class names are ours and stable; looks are the theme's. The writer of a student page meets
no instructor's type: if one is there, it raises, and no page is written.
"""

from __future__ import annotations

from dataclasses import dataclass
from html import escape
from typing import TYPE_CHECKING, assert_never

from watchglass.publish import model as m
from watchglass.publish.body import text_of
from watchglass.publish.shapes import ATTRIBUTES, ELEMENTS
from watchglass.shell.site.urls import harmless, leads_outside, resolved

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.publish.shapes import Figure, Shape

_SAID = frozenset(("quantity", "vessel", "material", "act", "figure", "step"))
_PANELS = {"caution": "Caution", "before": "Before the laboratory", "question": "Question"}
_INSTRUCTOR_PANELS = {"instructor": "For instructors", "answer": "Answer"}
_ALIGN = {"left": "", "center": ' class="to-centre"', "right": ' class="to-right"'}
_BLANK_LINE = '<span class="blank-line"></span>'
_TO_FILL = '<td class="to-fill"><span class="unseen">to fill in</span></td>'


def _role(drawn: Shape) -> str:
    """Give the role of a drawing: a picture has nothing in it to press; one with links is a group."""
    return "group" if _links(drawn) else "img"


def _links(drawn: Shape) -> bool:
    return drawn.element == "a" or any(
        _links(child) for child in drawn.children if not isinstance(child, str)
    )


class NotForStudents(Exception):  # noqa: N818 - names what was met; a fault of ours, never an author's
    """A student page holds what only instructors may see."""


@dataclass(frozen=True, slots=True)
class Writer:
    """Writes the models of one page.

    Attributes:
        root: What leads from the page to the edition's root: empty, `../`, …
        instructor: Whether the page is of the instructor edition.
    """

    root: str
    instructor: bool

    # ------------------------------------------------------------------ words

    def words(self, words: Iterable[m.Words]) -> str:
        """Write words."""
        return "".join([self._word(word) for word in words])

    def _word(self, word: m.Words) -> str:
        match word:
            case m.Run():
                return escape(word.text)
            case m.Said():
                kind = f" said-{word.kind}" if word.kind in _SAID else ""
                return f'<span class="said{kind}">{self.words(word.children)}</span>'
            case m.Lowered():
                return f"<sub>{escape(word.text)}</sub>"
            case m.Raised():
                return f"<sup>{escape(word.text)}</sup>"
            case m.Stress():
                tag = "strong" if word.strong else "em"
                return f"<{tag}>{self.words(word.children)}</{tag}>"
            case m.LinkTo():
                return self._link(word)
            case m.CodeRun():
                return f"<code>{escape(word.text)}</code>"
            case m.LineEnd():
                return "<br>"
            case m.Picture():
                return self._picture(word)
            case m.Blank():
                return self._blank(word)
            case m.ExpectedBlank():
                return self._expected(word)
            case _:
                assert_never(word)

    def _link(self, link: m.LinkTo) -> str:
        inner = self.words(link.children)
        if link.local:
            href = resolved(link.target, self.root)
            return inner if href is None else f'<a href="{escape(href)}">{inner}</a>'
        if not harmless(link.target):
            return inner
        return f'<a class="outside" href="{escape(link.target.strip())}">{inner}</a>'

    def _picture(self, picture: m.Picture) -> str:
        """Write a picture of the set; one from elsewhere would need a network and is only linked."""
        if leads_outside(picture.source):
            return self._link(m.LinkTo(picture.source, local=False, children=(m.Run(picture.alt),)))
        source = resolved(picture.source, self.root)
        if source is None:
            return escape(picture.alt)
        return f'<img src="{escape(source)}" alt="{escape(picture.alt)}">'

    def _blank(self, blank: m.Blank) -> str:
        count = max(1, blank.count)
        told = "blank to fill in" if count == 1 else f"{count} blanks to fill in"
        place = "blank-place" if count == 1 else "blank-place blank-many"
        unit = f' <span class="blank-unit">{self.words(blank.unit)}</span>' if blank.unit else ""
        return (
            f'<span class="blank" id="{escape(blank.id)}">'
            f'<span class="blank-label">{escape(blank.label)}</span> '
            f'<span class="unseen">({told})</span>'
            f'<span class="{place}"><span class="blank-lines">{_BLANK_LINE * count}</span>'
            f"{unit}</span></span>"
        )

    def _expected(self, blank: m.ExpectedBlank) -> str:
        self._for_instructors("an expected value")
        said = "not assessed"
        if blank.expected is not None:
            said = self.words(blank.expected)
        return (
            f"{self._blank(blank.blank)} "
            f'<span class="expected"><span class="expected-name">expected:</span> {said}</span>'
        )

    def _for_instructors(self, what: str) -> None:
        if not self.instructor:
            raise NotForStudents(f"a student page holds {what}")

    # ------------------------------------------------------------------ drawings

    def drawing(self, figure: Figure) -> str:
        """Write the SVG of a figure, with its title and description first, as readers need them."""
        svg = figure.drawing
        name = escape(figure.name)
        told = (
            f'<title id="{name}.title">{escape(figure.title)}</title>'
            f'<desc id="{name}.desc">{escape(figure.description)}</desc>'
        )
        inner = "".join([self._shape(child) for child in svg.children])
        return (
            f'<svg role="{_role(svg)}" aria-labelledby="{name}.title {name}.desc"'
            f"{self._attributes(svg)}>{told}{inner}</svg>"
        )

    def _shape(self, drawn: str | Shape) -> str:
        if isinstance(drawn, str):
            return escape(drawn)
        if drawn.element not in ELEMENTS:
            return ""
        inner = "".join([self._shape(child) for child in drawn.children])
        return f"<{drawn.element}{self._attributes(drawn)}>{inner}</{drawn.element}>"

    def _attributes(self, drawn: Shape) -> str:
        return "".join(
            f' {name}="{escape(value)}"'
            for name, value in drawn.attributes
            if name in ATTRIBUTES and (name != "href" or value.startswith("#"))
        )

    # ------------------------------------------------------------------ blocks

    def blocks(self, blocks: Iterable[m.Blocks]) -> str:
        """Write blocks, one a line."""
        return "\n".join([self._block(block) for block in blocks])

    def _block(self, block: m.Blocks) -> str:
        match block:
            case m.Para():
                return f"<p>{self.words(block.children)}</p>"
            case m.StepList():
                return self._steps(block)
            case m.Title():
                tag = f"h{min(max(block.level, 2), 6)}"
                return f'<{tag} id="{escape(block.id)}">{self.words(block.children)}</{tag}>'
            case m.ItemList():
                return self._items(block)
            case m.Grid():
                return self._grid(block)
            case m.Panel():
                return self._panel(block.kind, _PANELS.get(block.kind, "Note"), block.children)
            case m.InstructorPanel():
                self._for_instructors("a block for instructors")
                name = _INSTRUCTOR_PANELS.get(block.kind, "For instructors")
                return self._panel(block.kind, name, block.children)
            case m.Quoted():
                return f"<blockquote>\n{self.blocks(block.children)}\n</blockquote>"
            case m.Listing():
                return f'<pre class="listing"><code>{escape(block.text)}</code></pre>'
            case m.Divider():
                return "<hr>"
            case _:
                assert_never(block)

    def _steps(self, steps: m.StepList) -> str:
        items = "\n".join(
            [
                f'<li class="step" id="{escape(item.id)}" value="{item.number}">'
                f'<p class="step-number"><span class="unseen">Step </span>{item.number}</p>'
                f'<div class="step-body">\n{self.blocks(item.children)}\n</div></li>'
                for item in steps.items
            ]
        )
        return f'<ol class="steps" role="list">\n{items}\n</ol>'

    def _items(self, items: m.ItemList) -> str:
        tight = all(
            not isinstance(block, m.Para) or index == 0
            for item in items.items
            for index, block in enumerate(item)
        )
        inner = "\n".join([f"<li>{self._item(item, tight=tight)}</li>" for item in items.items])
        if items.start is None:
            return f"<ul>\n{inner}\n</ul>"
        start = f' start="{items.start}"' if items.start != 1 else ""
        return f"<ol{start}>\n{inner}\n</ol>"

    def _item(self, item: tuple[m.Blocks, ...], *, tight: bool) -> str:
        if tight and item and isinstance(item[0], m.Para):
            rest = self.blocks(item[1:])
            return self.words(item[0].children) + (f"\n{rest}" if rest else "")
        return self.blocks(item)

    def _panel(self, kind: str, name: str, children: tuple[m.Blocks, ...]) -> str:
        look = f" panel-{kind}" if kind in _PANELS or kind in _INSTRUCTOR_PANELS else ""
        return (
            f'<section class="panel{look}" role="note" aria-label="{name}">\n'
            f'<p class="panel-name">{name}</p>\n{self.blocks(children)}\n</section>'
        )

    # ------------------------------------------------------------------ tables

    def _grid(self, grid: m.Grid) -> str:
        columns = [text_of(cell).strip() for cell in grid.head]
        named = escape("Table: " + ", ".join(filter(None, columns))) if any(columns) else "Table"
        look = "grid grid-fill" if grid.fill else "grid"
        head = "".join(
            f'<th scope="col"{self._aligned(grid, at)}>{self.words(cell)}</th>'
            for at, cell in enumerate(grid.head)
        )
        rows = [self._row(grid, row) for row in grid.rows]
        if grid.fill:
            rows += [f"<tr>{_TO_FILL * len(grid.head)}</tr>"] * grid.blank_rows
        body = "\n".join(rows)
        return (
            f'<div class="scrolled" role="group" tabindex="0" aria-label="{named}">\n'
            f'<table class="{look}">\n<thead><tr>{head}</tr></thead>\n'
            f"<tbody>\n{body}\n</tbody>\n</table>\n</div>"
        )

    def _row(self, grid: m.Grid, row: tuple[tuple[m.Words, ...], ...]) -> str:
        cells = [
            _TO_FILL
            if grid.fill and not text_of(cell).strip()
            else f"<td{self._aligned(grid, at)}>{self.words(cell)}</td>"
            for at, cell in enumerate(row)
        ]
        return f"<tr>{''.join(cells)}</tr>"

    @staticmethod
    def _aligned(grid: m.Grid, at: int) -> str:
        align = grid.align[at] if at < len(grid.align) else None
        return _ALIGN.get(align or "left", "")
