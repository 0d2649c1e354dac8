"""What `&amp;` and `&#8211;` stand for."""

from __future__ import annotations

import re
from html.entities import html5

_ENTITY = re.compile(r"&(?:#[xX]([0-9a-fA-F]{1,6})|#([0-9]{1,7})|([a-zA-Z][a-zA-Z0-9]{1,31}));")
_SURROGATES = range(0xD800, 0xE000)
_LAST_CHARACTER = 0x10FFFF


def entity_at(text: str, position: int) -> tuple[str, int] | None:
    """Read an entity; give what it stands for and the position after it, None where it is none.

    Numbers of no character give U+FFFD, as CommonMark says.
    """
    found = _ENTITY.match(text, position)
    if found is None:
        return None
    hexadecimal, decimal, name = found.groups()
    if name is not None:
        meant = html5.get(name + ";")
        return None if meant is None else (meant, found.end())
    code = int(hexadecimal, 16) if hexadecimal is not None else int(decimal)
    known = 0 < code <= _LAST_CHARACTER and code not in _SURROGATES
    return chr(code) if known else "\ufffd", found.end()
