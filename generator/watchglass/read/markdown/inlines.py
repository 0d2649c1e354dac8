"""Reading the running text of a file, passage after passage: marks, bounds, what is reported once."""

from __future__ import annotations

from bisect import bisect_right
from typing import TYPE_CHECKING

from watchglass.read import syntax
from watchglass.read.markdown import messages
from watchglass.read.markdown.braces import MAX_MARKS
from watchglass.read.markdown.passage import MAX_DEPTH, read_passage

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Source, Span
    from watchglass.read.markdown import MarkReader
    from watchglass.read.markdown.prose import Prose


class InlineReader:
    """Reads the running text of one file, passage after passage.

    Attributes:
        source: The file.
        findings: What was found so far.
        marks: How many marks were read.
        too_many: True once a mark was one too many, which is reported once.
        too_deep: True once something nested too deeply, which is reported once.
        answered: Offsets of `}` that belong to a brace already reported.
    """

    def __init__(
        self, source: Source, parse_mark: MarkReader, references: Mapping[str, Mapping[str, str]]
    ) -> None:
        """Make ready to read marks with `parse_mark` and links by `references`."""
        self.source = source
        self.parse_mark = parse_mark
        self.references = references
        self.findings: list[Finding] = []
        self.marks = 0
        self.too_many = False
        self.too_deep = False
        self.answered: set[int] = set()

    def read(self, prose: Prose) -> tuple[syntax.Inline, ...]:
        """Read one passage."""
        if not prose.text:
            return ()
        return read_passage(prose, self)

    def has_room(self, mark: Span) -> bool:
        """Tell whether one more mark may be read; report the first that may not."""
        if self.marks < MAX_MARKS:
            return True
        if not self.too_many:
            self.too_many = True
            self.findings.append(messages.too_many_marks(mark, MAX_MARKS))
        return False

    def acts(self, mark: Span) -> tuple[syntax.Act, ...]:
        """Read a mark, braces included in its span."""
        self.marks += 1
        acts, findings = self.parse_mark(self.source, mark.start + 1, mark.end - 1)
        self.findings.extend(findings)
        return acts

    def report_depth(self, span: Span) -> None:
        """Report, once, that something nests too deeply."""
        if not self.too_deep:
            self.too_deep = True
            self.findings.append(
                messages.nested_too_deeply(span, MAX_DEPTH, "brackets and emphasis")
            )

    def take_back(
        self, children: tuple[syntax.Inline, ...], first: int, where: str
    ) -> tuple[syntax.Inline, ...]:
        """Make the marks in nodes plain text again and report each as lost.

        Args:
            children: The nodes.
            first: How many findings there were before they were read; what was found in a mark
                that now is none is forgotten.
            where: As in `mark_lost`.
        """
        lost = _marks_in(children)
        if not lost:
            return children
        starts = [mark.start for mark in lost]
        kept = []
        for finding in self.findings[first:]:
            nearest = lost[bisect_right(starts, finding.span.start) - 1]
            if not nearest.start <= finding.span.start < nearest.end:
                kept.append(finding)
        self.findings[first:] = kept
        return self._plain(children, where)

    def _plain(self, children: tuple[syntax.Inline, ...], where: str) -> tuple[syntax.Inline, ...]:
        given: list[syntax.Inline] = []
        for child in children:
            match child:
                case syntax.Marked():
                    self.marks -= 1
                    self.findings.append(messages.mark_lost(child.mark, where))
                    given.extend(child.words or ())
                    given.append(syntax.Text(child.mark.text, child.mark))
                case syntax.Emphasis():
                    inner = self._plain(child.children, where)
                    given.append(syntax.Emphasis(child.strong, inner, child.span))
                case syntax.Link():
                    inner = self._plain(child.children, where)
                    given.append(syntax.Link(inner, child.target, child.title, child.span))
                case _:
                    given.append(child)
        return tuple(given)


def _marks_in(children: tuple[syntax.Inline, ...]) -> list[Span]:
    marks: list[Span] = []
    for child in children:
        match child:
            case syntax.Marked():
                marks.append(child.mark)
            case syntax.Emphasis() | syntax.Link():
                marks.extend(_marks_in(child.children))
            case _:
                pass
    return marks
