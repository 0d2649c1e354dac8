"""Reading what stands in a paragraph, heading or table cell: words, emphasis, links, marks.

One pass from left to right lays out items: stretches of plain text, runs of `*` and `_`, opening
brackets, and nodes that are ready. A closing bracket looks back at its opening one and may turn
what lies between into a link, a picture or the words of a mark. What is left when the text ends
is built into nodes. This is CommonMark's own strategy; no character is looked at much more than
once, whatever the author wrote.
"""

from __future__ import annotations

import re
from bisect import bisect_left
from typing import TYPE_CHECKING

from watchglass.read import syntax
from watchglass.read.markdown import messages
from watchglass.read.markdown.braces import MARK, OPEN, lost_in
from watchglass.read.markdown.building import Built, Opener, build, plain_text
from watchglass.read.markdown.emphasis import Run, pair
from watchglass.read.markdown.entities import entity_at
from watchglass.read.markdown.links import Tail, address_at, tail_of

if TYPE_CHECKING:
    from collections.abc import Callable, Mapping

    from watchglass.base.spans import Span
    from watchglass.read.markdown.building import Item
    from watchglass.read.markdown.inlines import InlineReader
    from watchglass.read.markdown.prose import Prose

#: How deep emphasis, links, pictures and words nest.
MAX_DEPTH = 32

#: How far below an open brace its end is looked for, in characters; only the help depends on it.
_NEARBY = 400

_SPECIAL = re.compile(r"[\\`*_\[\]!<&{}\n]")
_ESCAPABLE = frozenset("!\"#$%&'()*+,-./:;<=>?@[\\]^_`{|}~")
_TICKS = re.compile("`+")


def read_passage(prose: Prose, reader: InlineReader) -> tuple[syntax.Inline, ...]:
    """Read a paragraph, heading or cell; marks and findings go by way of `reader`."""
    return _Passage(reader, prose).read()


class _Passage:
    """One passage while it is read."""

    __slots__ = (
        "brackets",
        "items",
        "last",
        "link_floor",
        "owed",
        "prose",
        "reader",
        "text",
        "ticks",
    )

    def __init__(self, reader: InlineReader, prose: Prose) -> None:
        self.reader = reader
        self.prose = prose
        self.text = prose.text
        self.items: list[Item] = []
        self.brackets: list[Opener] = []
        self.last: Run | None = None
        # Brackets below this place in the stack hold a link already and can be none themselves.
        self.link_floor = 0
        # Braces reported as not closed, whose `}` may yet come and is then no second fault.
        self.owed = 0
        self.ticks: dict[int, list[int]] | None = None

    def read(self) -> tuple[syntax.Inline, ...]:
        text, items = self.text, self.items
        search, handlers = _SPECIAL.search, _HANDLERS
        position = 0
        while (found := search(text, position)) is not None:
            at = found.start()
            if at > position:
                items.append((position, at))
            position = handlers[text[at]](self, at)
        if position < len(text):
            items.append((position, len(text)))
        return self.build(0, None)[0]

    def build(self, first: int, bottom: Run | None) -> tuple[tuple[syntax.Inline, ...], int]:
        """Build the items from `first` on; give the nodes and how deep they nest."""
        if self.last is not bottom:
            pair(self.last, bottom)
            self.last = bottom
        return build(self.items[first:] if first else self.items, self)

    # -- what the builder asks for -----------------------------------------------------------

    def span(self, start: int, end: int) -> Span:
        prose = self.prose
        return self.reader.source.span(prose.at(start), prose.end(end))

    def too_deep(self, depth: int, start: int, end: int) -> bool:
        """Tell whether a node of this depth is one too many."""
        if depth <= MAX_DEPTH:
            return False
        self.reader.report_depth(self.span(start, end))
        return True

    # -- characters ---------------------------------------------------------------------------

    def plain(self, start: int, end: int) -> int:
        self.items.append((start, end))
        return end

    def line_end(self, at: int) -> int:
        start, items = at, self.items
        if items and type(last := items[-1]) is tuple and last[1] == at:
            begin = last[0]
            while start > begin and self.text[start - 1] == " ":
                start -= 1
            if start < at:
                items.pop()
                if start > begin:
                    items.append((begin, start))
        items.append(syntax.Break(at - start > 1, self.span(start, at + 1)))
        return at + 1

    def backslash(self, at: int) -> int:
        following = self.text[at + 1 : at + 2]
        if following == "\n":
            self.items.append(syntax.Break(True, self.span(at, at + 2)))  # noqa: FBT003
            return at + 2
        if following in _ESCAPABLE:
            return self.plain(at + 1, at + 2)
        return self.plain(at, at + 1)

    def tick(self, at: int) -> int:
        text = self.text
        found = _TICKS.match(text, at)
        end = found.end() if found else at + 1
        if self.ticks is None:
            self.ticks = {}
            for run in _TICKS.finditer(text):
                self.ticks.setdefault(run.end() - run.start(), []).append(run.start())
        starts = self.ticks.get(end - at, [])
        index = bisect_left(starts, end)
        if index == len(starts):
            return self.plain(at, end)
        close = starts[index]
        words = text[end:close].replace("\n", " ")
        if words.startswith(" ") and words.endswith(" ") and words.strip(" "):
            words = words[1:-1]
        after = close + end - at
        self.items.append(syntax.CodeText(words, self.span(at, after)))
        return after

    def delimiter(self, at: int) -> int:
        text, end = self.text, at + 1
        sign = text[at]
        while text.startswith(sign, end):
            end += 1
        self.last = Run(text, at, end, self.last)
        self.items.append(self.last)
        return end

    def ampersand(self, at: int) -> int:
        found = entity_at(self.text, at)
        if found is None:
            return self.plain(at, at + 1)
        meant, end = found
        self.items.append(syntax.Text(meant, self.span(at, end)))
        return end

    def angle(self, at: int) -> int:
        tail = address_at(self.text, at)
        if tail is None:
            return self.plain(at, at + 1)
        words = syntax.Text(self.text[at + 1 : tail.end - 1], self.span(at + 1, tail.end - 1))
        self.items.append(syntax.Link((words,), tail.target, "", self.span(at, tail.end)))
        self.lose(at, tail.end, "autolink")
        return tail.end

    # -- brackets ------------------------------------------------------------------------------

    def bang(self, at: int) -> int:
        if self.text.startswith("[", at + 1):
            return self.open(at, at + 2)
        return self.plain(at, at + 1)

    def bracket(self, at: int) -> int:
        return self.open(at, at + 1)

    def open(self, at: int, after: int) -> int:
        if self.brackets:
            self.brackets[-1].inner = True
        opener = Opener(at, after, len(self.items), self.last, len(self.reader.findings))
        self.brackets.append(opener)
        self.items.append(opener)
        return after

    def close(self, at: int) -> int:
        if not self.brackets:
            return self.plain(at, at + 1)
        opener = self.brackets.pop()
        inactive = len(self.brackets) < self.link_floor
        self.link_floor = min(self.link_floor, len(self.brackets))
        mark = MARK.match(self.text, at + 1) if self.text.startswith("{", at + 1) else None
        tail = None
        if opener.image or not inactive:
            tail = tail_of(self.text, opener.after, at, self.reader.references, inner=opener.inner)
        if tail is not None and not (tail.bare and mark):
            return self.link(opener, at, tail)
        if mark is not None:
            return self.words(opener, at, mark.end())
        return self.plain(at, at + 1)

    def link(self, opener: Opener, at: int, tail: Tail) -> int:
        children, depth = self.build(opener.index + 1, opener.run)
        if self.too_deep(depth + 1, opener.start, tail.end):
            return self.give_up(at)
        del self.items[opener.index :]
        span = self.span(opener.start, tail.end)
        if opener.image:
            children = self.reader.take_back(children, opener.findings, "image")
            image = syntax.Image(plain_text(children), tail.target, tail.title, span)
            self.items.append(Built(image, depth + 1))
        else:
            link = syntax.Link(children, tail.target, tail.title, span)
            self.items.append(Built(link, depth + 1))
            self.link_floor = len(self.brackets)
        self.lose(at, tail.end, "link")
        return tail.end

    def words(self, opener: Opener, at: int, end: int) -> int:
        """Close the words of a mark that ends at `end`."""
        mark = self.span(at + 1, end)
        if not self.reader.has_room(mark):
            return self.plain(at, at + 1)
        children, depth = self.build(opener.index + 1, opener.run)
        start = opener.after - 1
        if self.too_deep(depth + 1, start, end):
            return self.give_up(at)
        children = self.reader.take_back(children, opener.findings, "words")
        acts = self.reader.acts(mark)
        del self.items[opener.index :]
        if opener.image:
            self.items.append((opener.start, start))
        marked = syntax.Marked(children, acts, mark, self.span(start, end))
        self.items.append(Built(marked, depth + 1))
        return end

    def give_up(self, at: int) -> int:
        """Leave a bracket plain that closes too deep a nest, and with it all those around."""
        self.brackets.clear()
        self.link_floor = 0
        return self.plain(at, at + 1)

    # -- braces --------------------------------------------------------------------------------

    def brace(self, at: int) -> int:
        found = MARK.match(self.text, at)
        if found is None:
            self.report_open(at)
            return self.plain(at, at + 1)
        span = self.span(at, found.end())
        if not self.reader.has_room(span):
            return self.plain(at, found.end())
        self.items.append(syntax.Marked(None, self.reader.acts(span), span, span))
        return found.end()

    def report_open(self, at: int) -> None:
        reader, text = self.reader, self.text
        found = OPEN.match(text, at)
        end = found.end() if found else at + 1
        row_end = self.prose.row_end
        if row_end is not None:
            start = self.prose.at(at)
            whole = MARK.match(reader.source.text, start, row_end)
            if whole is not None:
                reader.findings.append(
                    messages.mark_lost(reader.source.span(start, whole.end()), "cut")
                )
                reader.answered.add(whole.end() - 1)
                return
        self.owed += 1
        words = self.span(at, at + len(text[at:end].rstrip()))
        later = "}" in text[end : end + _NEARBY]
        reader.findings.append(
            messages.mark_not_closed(words, inner=text.startswith("{", end), later=later)
        )

    def brace_end(self, at: int) -> int:
        if self.owed:
            self.owed -= 1
        elif self.prose.at(at) not in self.reader.answered:
            self.reader.findings.append(messages.brace_alone(self.span(at, at + 1)))
        return self.plain(at, at + 1)

    def lose(self, start: int, end: int, where: str) -> None:
        span = self.span(start, end)
        self.reader.findings.extend(lost_in(span.source, span.start, span.end, where))


_HANDLERS: Mapping[str, Callable[[_Passage, int], int]] = {
    "\n": _Passage.line_end,
    "\\": _Passage.backslash,
    "`": _Passage.tick,
    "*": _Passage.delimiter,
    "_": _Passage.delimiter,
    "&": _Passage.ampersand,
    "<": _Passage.angle,
    "!": _Passage.bang,
    "[": _Passage.bracket,
    "]": _Passage.close,
    "{": _Passage.brace,
    "}": _Passage.brace_end,
}
