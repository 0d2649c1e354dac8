"""Fields of the YAML files: small specifications, one table a file, and the reader for them.

A specification says what a mapping may hold; the reader gives every fault at its key: unknown
fields with near names, missing ones, values of another kind. Decoding the text of a field is the
caller's. From the same tables the schemas for editors are made.
"""

from __future__ import annotations

from enum import Enum
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base.findings import Finding, did_you_mean, near
from watchglass.base.yaml import YamlList, YamlMapping, YamlNode, YamlText

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.dimensions import Dimension
    from watchglass.base.spans import Span


class Shape(Enum):
    """What kind of value a field takes."""

    TEXT = "text"
    LIST = "a list"
    MAPPING = "a mapping"
    TEXT_OR_LIST = "text or a list"
    TEXT_OR_MAPPING = "text or a mapping"
    ANY = "any value"


_TAKES: dict[Shape, tuple[type, ...]] = {
    Shape.TEXT: (YamlText,),
    Shape.LIST: (YamlList,),
    Shape.MAPPING: (YamlMapping,),
    Shape.TEXT_OR_LIST: (YamlText, YamlList),
    Shape.TEXT_OR_MAPPING: (YamlText, YamlMapping),
    Shape.ANY: (YamlText, YamlList, YamlMapping),
}


class Field(NamedTuple):
    """One field of a mapping.

    Attributes:
        shape: What it takes.
        about: What it is for, in a line; shown by schemas.
        required: Whether it must be there and say something.
        words: The only words that its text may be; beside `quantity`, words that may stand instead.
        pattern: What its whole text must match: a regular expression of ASCII that Python and
            JSON Schema read alike, without anchors.
        quantity: The dimensions of the quantity that its text is; without a plain number among
            them the text has a unit.
        each: What stands under each of the author's own keys, where it takes a mapping.
        fields: The fields of its mapping, where they are known ones.

    `words`, `pattern` and `quantity` hold for each entry of a list, too. They, `each` and `fields`
    are what schemas say beyond the reader here: the texts themselves are read, and their faults
    found, by the decoder of each file, from the same constants.
    """

    shape: Shape
    about: str
    required: bool = False
    words: tuple[str, ...] = ()
    pattern: str = ""
    quantity: tuple[Dimension, ...] = ()
    each: Field | None = None
    fields: Mapping[str, Field] | None = None


class Record(NamedTuple):
    """A mapping read by a specification: only fields of the right shape are in it."""

    values: Mapping[str, YamlNode]
    keys: Mapping[str, Span]
    span: Span

    def text(self, name: str) -> YamlText | None:
        """Give a field that takes text; an empty one counts as absent."""
        value = self.values.get(name)
        return value if isinstance(value, YamlText) and value.text else None

    def items(self, name: str) -> tuple[YamlNode, ...]:
        """Give the entries of a field that takes a list; text counts as a list of one."""
        value = self.values.get(name)
        if isinstance(value, YamlList):
            return value.items
        if isinstance(value, YamlText) and value.text:
            return (value,)
        return ()

    def mapping(self, name: str) -> YamlMapping | None:
        """Give a field that takes a mapping."""
        value = self.values.get(name)
        return value if isinstance(value, YamlMapping) else None


def read_fields(
    node: YamlNode, fields: Mapping[str, Field], what: str
) -> tuple[Record | None, tuple[Finding, ...]]:
    """Read a mapping by its specification.

    Args:
        node: What stands there.
        fields: The fields by name.
        what: What the mapping is, with its article, for messages.

    Returns:
        The record, or None where the node is no mapping; and the findings.
    """
    if not isinstance(node, YamlMapping):
        return None, (unfit(node, what, Shape.MAPPING),)
    findings: list[Finding] = []
    values: dict[str, YamlNode] = {}
    keys: dict[str, Span] = {}
    meant: set[str] = set()  # fields that a misspelt one was to be: not reported as missing too
    for entry in node:
        name = entry.key.text
        field = fields.get(name)
        if field is None and "->" in name:
            continue  # a mark without quotes: reported where the YAML was read
        if field is None:
            meant.update(near(name, fields, most=1))
            findings.append(
                Finding(
                    code=codes.FIELD_UNKNOWN,
                    span=entry.key.span,
                    message=f"`{name}` is no field of {what}",
                    help=did_you_mean(name, fields)
                    or "take one of " + ", ".join(f"`{f}`" for f in fields),
                )
            )
        elif isinstance(entry.value, _TAKES[field.shape]) or _empty(entry.value):
            values[name], keys[name] = entry.value, entry.key.span
        else:
            keys[name] = entry.key.span
            findings.append(unfit(entry.value, f"`{name}`", field.shape))
    for name, field in fields.items():
        if name in meant and name not in keys:
            continue
        if field.required and (name not in keys or (name in values and _empty(values[name]))):
            findings.append(
                Finding(
                    code=codes.FIELD_MISSING,
                    span=keys.get(name) or _top(node),
                    message=f"{what} has no `{name}`",
                    help=f"add `{name}:` — {field.about}",
                )
            )
    return Record(values, keys, node.span), tuple(findings)


def unfit(node: YamlNode, what: str, shape: Shape) -> Finding:
    """Give the finding for a value of another kind than its place takes."""
    found = {YamlText: "text", YamlList: "a list", YamlMapping: "a mapping"}[type(node)]
    return Finding(
        code=codes.FIELD_UNFIT,
        span=node.span,
        message=f"{what} takes {shape.value}, not {found}",
        help="write " + _EXAMPLES[shape],
    )


_EXAMPLES = {
    Shape.TEXT: "`key: some words`",
    Shape.LIST: "`key: [one, two]`",
    Shape.MAPPING: "`key:` and set the fields in on the lines below",
    Shape.TEXT_OR_LIST: "`key: some words` or `key: [one, two]`",
    Shape.TEXT_OR_MAPPING: "`key: some words`, or set fields in on the lines below",
    Shape.ANY: "a value",
}


def _empty(node: YamlNode) -> bool:
    return isinstance(node, YamlText) and not node.text and not node.style


def _top(node: YamlMapping) -> Span:
    return node.entries[0].key.span if node.entries else node.span
