"""YAML as written: every scalar stays text, every node knows its place.

PyYAML's `compose` with the C loader does the reading; its values are never converted, since `0.50`
must keep its nought, `NO` is nitric oxide and `12:30` a time. Anchors, aliases, tags and merges
are refused: they make a file mean what it does not show. PyYAML counts other line ends than
editors do, so only its offsets are used.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, Any, NamedTuple

from watchglass.base import codes
from watchglass.base.findings import Finding, Related
from watchglass.base.scalars import offsets

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.spans import Source, Span

MOST_CHARACTERS = 1_000_000
DEEPEST = 32
_INDENT = re.compile(r"^ {128}", re.MULTILINE)
_DASHES = re.compile(rf"(?:[-?] +){{{DEEPEST}}}")
_SPECIAL = re.compile(r"(?:^|[\s\[{,:-])(?:[&*]\S|!)|^\s*<<\s*:", re.MULTILINE)
_ANCHOR = re.compile(r"&\S+")
_GLUED = re.compile(r"\s*(?:- )?([A-Za-z][\w-]*):(?!//)([^\s:].*)$")
_NO_COLON = re.compile(r"\s*([A-Za-z][\w-]*)[ \t]+(\S.*)$")
_UNPRINTABLE = re.compile(r"[\x00-\x08\x0b-\x1f\x7f-\x84\x86-\x9f\ud800-\udfff\ufffe\uffff]")


class YamlText(NamedTuple):
    """A scalar.

    Attributes:
        text: Its value as text; an empty value (`key:`) is the empty string.
        span: Where it stands, quotes included.
        style: Quote or block character, or empty for a plain scalar.
    """

    text: str
    span: Span
    style: str = ""

    def part(self, start: int, end: int) -> Span:
        """Give the place in the file of characters `start` to `end` of the value.

        Where folding hides the exact place the whole scalar is given.
        """
        end = min(end, len(self.text))
        start, raw = min(start, end), self.span.text
        if not self.style and raw == self.text:
            return self.span.part(start, end)
        table = offsets(raw, self.style, self.text)
        if table is None:
            return self.span
        last = table[start]
        if end > start:
            at = table[end - 1]
            escaped = raw[at : at + 1] == {'"': "\\", "'": "'"}.get(self.style)
            last = table[end] if escaped else at + 1
        return self.span.part(table[start], max(last, table[start]))


class YamlList(NamedTuple):
    """A sequence."""

    items: tuple[YamlNode, ...]
    span: Span


class YamlEntry(NamedTuple):
    """One key with its value."""

    key: YamlText
    value: YamlNode


class YamlMapping(NamedTuple):
    """A mapping, its entries in the order written; no key stands twice."""

    entries: tuple[YamlEntry, ...]
    span: Span

    def get(self, key: str) -> YamlNode | None:
        """Give the value of a key, or None."""
        for entry in self.entries:
            if entry.key.text == key:
                return entry.value
        return None

    def __iter__(self) -> Iterator[YamlEntry]:
        """Go through the entries."""
        return iter(self.entries)


YamlNode = YamlText | YamlList | YamlMapping


def read_yaml(
    source: Source, start: int = 0, end: int | None = None
) -> tuple[YamlNode | None, tuple[Finding, ...]]:
    """Read the YAML in part of a source.

    Args:
        source: The file.
        start: Offset at which the YAML begins (after the `---` of a front matter).
        end: Offset at which it ends; the end of the file by default.

    Returns:
        The document's one node, or None where it is empty or cannot be read; and the findings.
    """
    text = source.text[start:end]
    if fault := _beyond_bounds(source, text, start):
        return None, (fault,)
    import yaml  # noqa: PLC0415 - 20 ms, wanted only where there is something to read

    loader: Any = getattr(yaml, "CSafeLoader", yaml.SafeLoader)
    try:
        if _SPECIAL.search(text) and (refused := _refused(source, text, start, loader)):
            return None, refused
        node = yaml.compose(text, Loader=loader)
    except yaml.YAMLError as error:
        return None, (_syntax(source, text, start, error),)
    if node is None:
        return None, ()
    builder = _Builder(source, start)
    return builder.build(node), tuple(builder.findings)


def _beyond_bounds(source: Source, text: str, start: int) -> Finding | None:
    if len(text) > MOST_CHARACTERS:
        return Finding(
            code=codes.SOURCE_TOO_LARGE,
            span=source.span(start, start + 1),
            message=f"the YAML has {len(text)} characters; {MOST_CHARACTERS} are read",
            help="divide the file",
        )
    if found := _UNPRINTABLE.search(text):
        return Finding(
            code=codes.YAML_NOT_READ,
            span=source.span(start + found.start(), start + found.end()),
            message=f"the character U+{ord(found[0]):04X} cannot stand in YAML",
            help="take it out",
        )
    deep = _INDENT.search(text) or _DASHES.search(text)
    at = deep.start() if deep else _flow_depth(text)
    if at is not None:
        return Finding(
            code=codes.NESTED_TOO_DEEPLY,
            span=source.span(start + at, start + at + 1),
            message=f"the YAML nests deeper than {DEEPEST} levels",
            help="divide it into simpler values",
        )
    return None


def _flow_depth(text: str) -> int | None:
    """Find where brackets nest too deeply; brackets in quotes are counted too, on the safe side."""
    if text.count("[") + text.count("{") <= DEEPEST:
        return None
    depth = 0
    for found in re.finditer(r"[\[\]{}]", text):
        depth = depth + 1 if found[0] in "[{" else max(0, depth - 1)
        if depth > DEEPEST:
            return found.start()
    return None


def _refused(source: Source, text: str, start: int, loader: Any) -> tuple[Finding, ...]:
    """Find anchors, aliases, tags and merges by PyYAML's own events."""
    import yaml  # noqa: PLC0415 - as above

    findings = []
    for event in yaml.parse(text, Loader=loader):
        what = None
        if isinstance(event, yaml.AliasEvent):
            what = "an alias"
        elif getattr(event, "anchor", None):
            what = "an anchor"
        elif getattr(event, "tag", None):
            what = "a tag"
        elif isinstance(event, yaml.ScalarEvent) and event.value == "<<" and not event.style:
            what = "a merge"
        if what:
            at, after = start + _index(event.start_mark), start + _index(event.end_mark)
            if what == "an anchor" and (named := _ANCHOR.match(source.text, at)):
                after = named.end()
            after = min(after, source.text.find("\n", at) % (len(source.text) + 1))
            findings.append(
                Finding(
                    code=codes.YAML_REFUSED,
                    span=source.span(at, max(after, at + 1)),
                    message=f"{what} of YAML is not read here",
                    help="write the value out; put quotes round text that begins with `&`, `*` or `!`",
                )
            )
    return tuple(findings)


def _index(mark: Any) -> int:
    return int(mark.index)


def _syntax(source: Source, text: str, start: int, error: Any) -> Finding:
    """Turn PyYAML's error into a finding at its place, in words for an instructor."""
    mark = getattr(error, "problem_mark", None)
    context = getattr(error, "context_mark", None)
    if mark is None or (context is not None and not text[_index(mark) :].strip()):
        mark = context or mark  # the file ends early: what opened and never closed is at fault
    at = min(_index(mark) if mark else 0, len(text))
    while at > 0 and (at >= len(text) or text[at] == "\n"):
        at -= 1
    problem = str(getattr(error, "problem", None) or "it cannot be read").rstrip(".")
    if slip := _slip(text, at, problem):
        first, last, message, mend = slip
        span = source.span(start + first, start + last)
        return Finding(code=codes.YAML_NOT_READ, span=span, message=message, help=mend)
    problem = problem.removeprefix("but ")
    line_start = text.rfind("\n", 0, at) + 1
    line = text[line_start : text.find("\n", at) if "\n" in text[at:] else len(text)]
    help_ = "see that lists and values are set in by blanks alike"
    if "\t" in line:
        help_ = "set lines in by blanks, not by tabs"
    elif "mapping values are not allowed" in problem or re.search(r":\s\S.*:\s", line):
        help_ = "put quotes round a value that holds `: `"
    elif re.search(r"[:\s][%@`]", line):
        help_ = "put quotes round a value that begins with a sign such as `%`, `@` or a backtick"
    elif "expected" in problem or "while scanning" in problem:
        help_ = "see whether a quote, a bracket or a `:` is missing here or in the line before"
    return Finding(
        code=codes.YAML_NOT_READ,
        span=source.span(start + at, start + min(at + 1, len(text))),
        message=f"the YAML cannot be read: {problem}",
        help=help_,
    )


def _slip(text: str, at: int, problem: str) -> tuple[int, int, str, str] | None:
    """Find the commonest slips, which PyYAML reports a line too low: a colon or a blank forgotten.

    Returns:
        Start and end of what is wrong, the fact, and how to mend it; None for other faults.
    """
    if "expected ':'" not in problem and "mapping values" not in problem:
        return None
    here = text.rfind("\n", 0, at) + 1
    before = text.rfind("\n", 0, max(0, here - 1)) + 1
    for line_start in (before, here):
        end = text.find("\n", line_start)
        line = text[line_start : len(text) if end < 0 else end]
        if found := _GLUED.match(line):
            key = found[1]
            first = line_start + found.start(1)
            return (
                first,
                first + len(key) + 1,
                f"no blank stands after `{key}:`",
                f"write `{key}: {found[2].strip()}`",
            )
        if (found := _NO_COLON.match(line)) and ":" not in line:
            first = line_start + found.start(1)
            return (
                first,
                line_start + len(line.rstrip()),
                f"`{found[1]}` has no colon after it",
                f"write `{found[1]}: {found[2].strip()}`",
            )
    above, this = text[before:here], text[here:].partition("\n")[0]
    if _indent(this) > _indent(above) and re.match(r"\s*[\w-]+:\s+[^\s#|>]", above):
        first = here + _indent(this)
        return (
            here,
            first + 1,
            "the line is set in below one that already has a value",
            "set it in like its neighbours",
        )
    return None


def _indent(line: str) -> int:
    return len(line) - len(line.lstrip(" "))


class _Builder:
    """Turns PyYAML's nodes into ours; the depth is bounded before it begins."""

    def __init__(self, source: Source, start: int) -> None:
        self.source = source
        self.start = start
        self.findings: list[Finding] = []

    def span(self, node: Any) -> Span:
        at, after = self.start + node.start_mark.index, self.start + node.end_mark.index
        text = self.source.text
        while after > at and text[after - 1] in " \n\t":
            after -= 1
        return self.source.span(at, after)

    def build(self, node: Any) -> YamlNode:
        kind = node.id
        if kind == "scalar":
            return YamlText(node.value, self.span(node), node.style or "")
        if kind == "sequence":
            return YamlList(tuple(self.build(item) for item in node.value), self.span(node))
        entries: dict[str, YamlEntry] = {}
        for key_node, value_node in node.value:
            self.entry(key_node, value_node, entries)
        return YamlMapping(tuple(entries.values()), self.span(node))

    def entry(self, key_node: Any, value_node: Any, entries: dict[str, YamlEntry]) -> None:
        known = len(self.findings)
        key = self.build(key_node)
        if not isinstance(key, YamlText):
            if len(self.findings) == known:
                self.findings.append(_mark_as_key(key.span))
            return
        before = entries.get(key.text)
        if before is not None:
            self.findings.append(
                Finding(
                    code=codes.KEY_TWICE,
                    span=key.span,
                    message=f"`{key.text}` stands twice here",
                    related=(Related(before.key.span, "it stood here first"),),
                    help="keep one of the two, or give one another name",
                )
            )
            return
        if (
            re.search(r"->\s*\S", key.text)
            and value_node.start_mark.index == value_node.end_mark.index
        ):
            self.findings.append(_mark_as_key(key.span))
        entries[key.text] = YamlEntry(key, self.build(value_node))


def _mark_as_key(span: Span) -> Finding:
    return Finding(
        code=codes.MARK_IN_YAML,
        span=span,
        message="YAML takes what stands in braces for a mapping of its own",
        help="put quotes round the whole value, or move the mark into a step",
    )
