"""What follows the brackets of a link or picture, and addresses in angle brackets."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NamedTuple

from markdown_it.common.utils import normalizeReference
from markdown_it.helpers import parseLinkDestination, parseLinkTitle

if TYPE_CHECKING:
    from collections.abc import Mapping

#: Longest label of a link definition, by CommonMark.
_LONGEST_LABEL = 999

_BLANKS = re.compile(r"[ \t\n]*")
_LABEL = re.compile(r"\[((?:[^\\\[\]]|\\.){0,999})\]", re.DOTALL)
_ADDRESS = re.compile(r"<([a-zA-Z][a-zA-Z0-9+.\-]{1,31}:[^<>\x00-\x20]*)>")
_PART = r"[a-zA-Z0-9](?:[a-zA-Z0-9-]{0,61}[a-zA-Z0-9])?"
_MAIL = re.compile(rf"<([a-zA-Z0-9.!#$%&'*+/=?^_`{{|}}~-]++@{_PART}(?:\.{_PART})*)>")
_CONTROLS = re.compile(r"[\x00-\x20\x7f-\x9f]+")
_UNSAFE = re.compile(r"(?:vbscript|javascript|file|data):", re.IGNORECASE)
_PICTURE = re.compile(r"data:image/(?:gif|png|jpeg|webp);", re.IGNORECASE)


class Tail(NamedTuple):
    """What follows a link's words.

    Attributes:
        end: Position after it.
        target: Address as written, escapes and entities resolved.
        title: Title likewise, or empty.
        bare: True for `[words]` alone, which a definition elsewhere makes a link.
    """

    end: int
    target: str
    title: str
    bare: bool = False


def is_safe(target: str) -> bool:
    """Tell whether an address may be linked to: one that runs a script or opens a file may not."""
    # Browsers drop blanks and control characters before they look at the scheme.
    plain = _CONTROLS.sub("", target)
    return _UNSAFE.match(plain) is None or _PICTURE.match(plain) is not None


def tail_of(
    text: str,
    opening: int,
    closing: int,
    references: Mapping[str, Mapping[str, str]],
    *,
    inner: bool,
) -> Tail | None:
    """Read what makes brackets a link.

    Args:
        text: The running text.
        opening: Position after `[`.
        closing: Position of `]`.
        references: The link definitions by normalised label.
        inner: True where the brackets hold other brackets, and so are no label.

    Returns:
        None where these are no more than brackets.
    """
    after = closing + 1
    if text.startswith("(", after) and (tail := _inline(text, after + 1)) is not None:
        return tail
    if not references:
        return None
    label = text[opening:closing] if closing - opening <= _LONGEST_LABEL and not inner else ""
    end, bare = after, True
    if (found := _LABEL.match(text, after)) is not None:
        end, bare = found.end(), False
        label = found[1] or label
        # `[words][unknown]` is no link, and neither is `[words]` then.
    known = references.get(normalizeReference(label)) if label.strip() else None
    if known is None:
        return None
    return Tail(end, known["href"], known["title"], bare)


def _inline(text: str, position: int) -> Tail | None:
    """Read `address "title")`."""
    stop = len(text)
    position = _skip(text, position)
    if position >= stop:
        return None
    destination = parseLinkDestination(text, position, stop)
    target = title = ""
    if destination.ok:
        target = destination.str
        if not is_safe(target):
            return None
        blank = destination.pos
        position = _skip(text, blank)
        if position > blank:
            found = parseLinkTitle(text, position, stop)
            if found.ok:
                title = found.str
                position = _skip(text, found.pos)
    if not text.startswith(")", position):
        return None
    return Tail(position + 1, target, title)


def _skip(text: str, position: int) -> int:
    found = _BLANKS.match(text, position)
    return found.end() if found else position


def address_at(text: str, position: int) -> Tail | None:
    """Read an address in angle brackets; its words are what stands between them."""
    if (found := _ADDRESS.match(text, position)) is not None:
        return Tail(found.end(), found[1], "") if is_safe(found[1]) else None
    if (found := _MAIL.match(text, position)) is not None:
        return Tail(found.end(), "mailto:" + found[1], "")
    return None
