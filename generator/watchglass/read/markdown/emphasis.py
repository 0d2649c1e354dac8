"""Which stars and low lines make emphasis: CommonMark's rules for runs of delimiters.

The runs of one passage form a doubly linked list, so that taking out what lies between a pair
costs nothing; a bound for each kind of closer keeps the search for its opener linear.
"""

from __future__ import annotations

import unicodedata

_ASCII_MARKS = frozenset("!\"#$%&'()*+,-./:;<=>?@[\\]^_`{|}~")


class Run:
    """A run of `*` or `_`.

    Attributes:
        sign: The character.
        place: Position of its first character.
        start: First position that is still plain text.
        end: Position after the last that is.
        length: Characters at first.
        opens: True where it can open emphasis; `closes` likewise.
        openings: Position and width of each opening taken from its end, innermost first.
        closings: Position and width of each closing taken from its start, innermost first.
        before: The run before it that is still in play; `after` likewise.
    """

    __slots__ = (
        "after", "before", "closes", "closings", "end", "length", "openings", "opens", "place",
        "sign", "start",
    )  # fmt: skip

    def __init__(self, text: str, start: int, end: int, before: Run | None) -> None:
        """Look at the characters on both sides of a run, and put it after `before`."""
        self.sign = text[start]
        self.place = start
        self.start, self.end, self.length = start, end, end - start
        self.openings: list[tuple[int, int]] = []
        self.closings: list[tuple[int, int]] = []
        self.before = before
        self.after: Run | None = None
        if before is not None:
            before.after = self
        blank_left, mark_left = _kind(text[start - 1] if start else " ")
        blank_right, mark_right = _kind(text[end] if end < len(text) else " ")
        left = not blank_right and (not mark_right or blank_left or mark_left)
        right = not blank_left and (not mark_left or blank_right or mark_right)
        if self.sign == "*":
            self.opens, self.closes = left, right
        else:
            self.opens = left and (not right or mark_left)
            self.closes = right and (not left or mark_right)


def _kind(character: str) -> tuple[bool, bool]:
    """Tell whether a character is a blank, and whether it is a punctuation mark or symbol."""
    if character.isascii():
        return character in " \t\n\f\r", character in _ASCII_MARKS
    category = unicodedata.category(character)
    return category == "Zs", category[0] in "PS"


def pair(last: Run | None, bottom: Run | None) -> None:
    """Pair the runs after `bottom` up to `last`; each notes what is taken from it."""
    first = last
    while first is not None and first.before is not bottom:
        first = first.before
    if last is bottom or first is None:
        return
    floors: dict[tuple[str, bool, int], int] = {}
    closer: Run | None = first
    while closer is not None:
        closer = _close(closer, bottom, floors) if closer.closes else closer.after
    if bottom is not None:
        bottom.after = None


def _close(closer: Run, bottom: Run | None, floors: dict[tuple[str, bool, int], int]) -> Run | None:
    """Pair one closer with the nearest opener; give the run to look at next."""
    key = (closer.sign, closer.opens, closer.length % 3)
    floor = floors.get(key, 0)
    opener = closer.before
    while opener is not None and opener is not bottom and opener.place >= floor:
        if opener.sign == closer.sign and opener.opens and not _odd(opener, closer):
            return _take(opener, closer)
        opener = opener.before
    floors[key] = closer.place
    following = closer.after
    if not closer.opens:
        _unlink(closer)
    return following


def _odd(opener: Run, closer: Run) -> bool:
    """Tell whether the rule of three keeps two runs apart."""
    if not (opener.closes or closer.opens):
        return False
    return (opener.length + closer.length) % 3 == 0 and closer.length % 3 != 0


def _take(opener: Run, closer: Run) -> Run | None:
    width = 2 if min(opener.end - opener.start, closer.end - closer.start) > 1 else 1
    opener.end -= width
    opener.openings.append((opener.end, width))
    closer.closings.append((closer.start, width))
    closer.start += width
    opener.after, closer.before = closer, opener
    if opener.start == opener.end:
        _unlink(opener)
    if closer.start < closer.end:
        return closer
    following = closer.after
    _unlink(closer)
    return following


def _unlink(run: Run) -> None:
    if run.before is not None:
        run.before.after = run.after
    if run.after is not None:
        run.after.before = run.before
