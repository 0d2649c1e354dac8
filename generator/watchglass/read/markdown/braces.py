"""Where a mark begins and ends, and what of a brace is left where no mark is read."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.read.markdown.messages import mark_lost

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.findings import Finding
    from watchglass.base.spans import Source

MAX_MARKS = 5_000

#: A mark: to the first `}` on the line; a pair of double quotes keeps what stands between it.
#: A quote without a partner on the line keeps nothing, so that one slip does not swallow a line.
MARK = re.compile(r'\{(?:[^{}"\n]++|"[^"\n]*+"|"(?![^"\n]*+"))*+\}')

#: A brace and the words after it, where no mark could be read.
OPEN = re.compile(r"\{[^{}\n]*")

_IN_LOST = re.compile(r"\\.|\{[^{}\n]*\}?", re.DOTALL)


def lost_in(source: Source, start: int, end: int, where: str) -> Iterator[Finding]:
    """Report each unescaped `{` in a stretch where no mark is read; `where` as in `mark_lost`."""
    if source.text.find("{", start, end) < 0:
        return
    for found in _IN_LOST.finditer(source.text, start, end):
        words = found[0].rstrip()
        if words.startswith("{"):
            yield mark_lost(source.span(found.start(), found.start() + len(words)), where)
