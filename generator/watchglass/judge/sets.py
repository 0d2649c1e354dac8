"""Checks of a whole set: over cards only, never over all procedures at once."""

from __future__ import annotations

from posixpath import dirname, join, normpath, relpath
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base.findings import Finding, Related, did_you_mean, near

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping

    from watchglass.base.spans import Span
    from watchglass.run.cards import Card, LinkOut


class Appointment(NamedTuple):
    """One code named in the schedule, with its place."""

    code: str
    span: Span


def judge_set(
    cards: Iterable[Card], appointments: Iterable[Appointment], files: frozenset[str]
) -> Iterator[Finding]:
    """Make every check of a set.

    Args:
        cards: One a page, in the order of their paths.
        appointments: Codes named in the schedule.
        files: Paths of every file of the set, for pictures.
    """
    cards = tuple(cards)
    codes_known: dict[str, Card] = {}
    for card in cards:
        yield from _code_twice(card, codes_known)
    for card in cards:
        for code, span in (*card.after, *card.continues):
            if code.casefold() == card.code.casefold():
                yield _itself(code, span)
            else:
                yield from _procedure(code, span, codes_known)
    for appointment in appointments:
        yield from _procedure(appointment.code, appointment.span, codes_known)
    pages = {card.path: card for card in cards}
    for card in cards:
        for link in card.links:
            yield from _link(card, link, pages, files)


def _code_twice(card: Card, known: dict[str, Card]) -> Iterator[Finding]:
    if not card.code or card.code_span is None:
        return
    before = known.get(card.code.casefold())
    if before is None or before.code_span is None:
        known[card.code.casefold()] = card
        return
    yield Finding(
        code=codes.CODE_TWICE,
        span=card.code_span,
        message=f"`{card.code}` is the code of `{before.path}` too",
        related=(Related(before.code_span, "it stands here first"),),
        help="give one of the two another code",
    )


def _itself(code: str, span: Span) -> Finding:
    return Finding(
        code=codes.PROCEDURE_UNKNOWN,
        span=span,
        message=f"`{code}` is this procedure itself: nothing comes before its own start",
        help="name another procedure of this set, or take the line out",
    )


def _procedure(code: str, span: Span, known: Mapping[str, Card]) -> Iterator[Finding]:
    if code.casefold() not in known:
        yield Finding(
            code=codes.PROCEDURE_UNKNOWN,
            span=span,
            message=f"no procedure has the code `{code}`",
            help=did_you_mean(code, (card.code for card in known.values()))
            or "name a procedure of this set by its code",
        )


def resolve_link(path: str, target: str) -> tuple[str, str]:
    """Give the path within the set that a relative link leads to, and its anchor."""
    there, _, anchor = target.partition("#")
    if not there:
        return path, anchor
    return normpath(join(dirname(path), there)), anchor


def leaves_the_set(target: str) -> bool:
    """Tell whether a link leads to the web or to a mailbox and not to a page of the set."""
    scheme = target.partition(":")[0]
    return ":" in target and scheme.replace("+", "").isalnum()


def _near_path(path: str, there: str, known: Iterable[str]) -> str | None:
    """Offer the paths, from this file, of files whose names are near to the one that is missing."""
    by_name: dict[str, str] = {}
    for other in known:
        by_name.setdefault(other.rpartition("/")[2], other)
    names = near(there.rpartition("/")[2], by_name)
    paths = [relpath(by_name[name], dirname(path) or ".") for name in names]
    return "did you mean " + " or ".join(f"`{p}`" for p in paths) + "?" if paths else None


def _link(
    card: Card, link: LinkOut, pages: Mapping[str, Card], files: frozenset[str]
) -> Iterator[Finding]:
    if leaves_the_set(link.target):
        return
    there, anchor = resolve_link(card.path, link.target)
    page = pages.get(there)
    if page is None:
        if there not in files or there.startswith(".."):
            near = _near_path(card.path, there, (*pages, *files))
            yield Finding(
                code=codes.LINK_BROKEN,
                span=link.span,
                message=f"`{link.target}` leads nowhere in this set",
                help=near
                or "write the path from this file to the other, as in `../pages/waste.md`",
            )
    elif anchor and anchor not in page.anchors:
        yield Finding(
            code=codes.LINK_BROKEN,
            span=link.span,
            message=f"`{there}` has no place `#{anchor}`",
            help=did_you_mean(anchor, page.anchors) or "name a step, as in `#step-3`, or a heading",
        )
