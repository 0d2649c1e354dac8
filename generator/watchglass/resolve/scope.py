"""Names: one namespace for materials, vessels, equipment, reactions, labels and records.

A scope is filled once, while the front matter is resolved, and then only asked. It remembers
which names were used, so that unused ones can be told.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.findings import Finding, Related, did_you_mean
from watchglass.read.words import NAME, reserved

if TYPE_CHECKING:
    from collections.abc import Iterable

    from watchglass.base.spans import Span
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.read.syntax import Name
    from watchglass.resolve.laboratory import Laboratory

KINDS = {
    "material": "a material",
    "vessel": "a vessel",
    "equipment": "equipment",
    "reaction": "a reaction",
    "label": "a label",
    "record": "a record",
    "aid": "an aid",
    "bath": "a bath",
    "stream": "a waste stream",
    "substance": "a substance",
    "indicator": "an indicator",
}


class Scope:
    """What each name means in one procedure."""

    def __init__(self, catalogue: Catalogue, laboratory: Laboratory, *, broken: bool) -> None:
        """Begin empty.

        Args:
            catalogue: Substances, aids and indicators that need no declaration.
            laboratory: Baths and waste streams.
            broken: Whether the front matter could not be read: then no name is reported unknown.
        """
        self.catalogue = catalogue
        self.laboratory = laboratory
        self.broken = broken
        self.findings: list[Finding] = []
        self.used: set[str] = set()
        self.undeclared: dict[str, Span] = {}  # catalogue keys used as materials, with first places
        self.kinds: dict[str, str] = {}
        self._places: dict[str, Span] = {}

    def declare(self, name: str, kind: str, span: Span) -> bool:
        """Add a name; a finding and False where it cannot be one or stands already."""
        if "->" in name:
            return False  # a mark without quotes: reported where the YAML was read
        if not NAME.fullmatch(name):
            self.findings.append(
                Finding(
                    code=codes.NAME_UNFIT,
                    span=span,
                    message=f"`{name}` is no name that a mark can hold",
                    help="put quotes round a value that holds a comma; a name has letters, digits and hyphens"
                    if " " in name and name.startswith("for ")
                    else "use letters, digits and hyphens, beginning with a letter, as in `acid-2`",
                )
            )
            return False
        why = reserved(name)
        if why and not (kind == "record" and why == "a unit"):
            self.findings.append(
                Finding(
                    code=codes.NAME_RESERVED,
                    span=span,
                    message=f"`{name}` is {why} and can be no name",
                    help=f"take another name, such as `{name.lower()}-{'1' if kind == 'vessel' else 'a'}`",
                )
            )
            self.kinds.setdefault(name, kind)
            self._places.setdefault(name, span)
            return False
        before = self._places.get(name)
        if before is not None:
            self.findings.append(
                Finding(
                    code=codes.NAME_TWICE,
                    span=span,
                    message=f"`{name}` is declared twice: as {KINDS[self.kinds[name]]} and as {KINDS[kind]}"
                    if self.kinds[name] != kind
                    else f"`{name}` is declared twice",
                    related=(Related(before, "it is declared here first"),),
                    help="give one of the two another name",
                )
            )
            return False
        self.kinds[name] = kind
        self._places[name] = span
        return True

    def kind(self, name: str) -> str | None:
        """Tell what a name is, without reporting it; local names win over what is built in."""
        if name in self.kinds:
            return self.kinds[name]
        folded = name.replace("-", " ").casefold()
        if folded in self.catalogue.aids or name.casefold() in self.catalogue.aids:
            return "aid"
        if name in self.laboratory.baths:
            return "bath"
        if name in self.laboratory.streams:
            return "stream"
        return None

    def take(self, name: Name, kinds: Iterable[str], wanted: str = "") -> str | None:
        """Use a name where certain kinds are taken.

        Returns:
            Its kind, or None where it is unknown or of another kind; then a finding is given,
            save where the front matter could not be read.
        """
        allowed = tuple(kinds)
        kind = self.kind(name.text)
        if kind is None and "indicator" in allowed and name.text in self.catalogue.indicators:
            kind = "indicator"
        if kind is None and "substance" in allowed and self.catalogue.find(name.text):
            kind = "substance"
        if kind in self.kinds.values() or name.text in self.kinds:
            self.used.add(name.text)
        if kind is None:
            self._unknown(name, allowed)
            return None
        if kind not in allowed:
            wanted = wanted or " or ".join(KINDS[k] for k in allowed[:2])
            self.findings.append(
                Finding(
                    code=codes.NAME_OF_OTHER_KIND,
                    span=name.span,
                    message=f"`{name.text}` is {KINDS[kind]}; {wanted} belongs here",
                    related=self._declared(name.text),
                    help=did_you_mean(name.text, self._of(allowed)) or f"name {wanted}",
                )
            )
            return None
        return kind

    def _declared(self, name: str) -> tuple[Related, ...]:
        place = self._places.get(name)
        return (Related(place, "it is declared here"),) if place else ()

    def _of(self, kinds: tuple[str, ...]) -> list[str]:
        return [name for name, kind in self.kinds.items() if kind in kinds]

    def _unknown(self, name: Name, allowed: tuple[str, ...]) -> None:
        if self.broken:
            return
        known = self._known(allowed)
        self.findings.append(
            Finding(
                code=codes.NAME_UNKNOWN,
                span=name.span,
                message=f"`{name.text}` is declared nowhere",
                help=did_you_mean(name.text, known or self.kinds) or _how(allowed, known),
            )
        )

    def _known(self, allowed: tuple[str, ...]) -> list[str]:
        """Give the names that could stand in a place."""
        known = self._of(allowed)
        if "stream" in allowed:
            known += self.laboratory.streams
        if "bath" in allowed:
            known += self.laboratory.baths
        if "aid" in allowed:
            known += self.catalogue.aids
        if "indicator" in allowed:
            known += self.catalogue.indicators
        return known


_DECLARED = {
    "material": "declare it under `materials:`",
    "vessel": "declare it under `vessels:`",
    "equipment": "declare it under `equipment:`",
    "reaction": "declare it under `reactions:`",
}
_MADE = {
    "label": "name a state that is labelled, as with `{label end}`",
    "record": "name a record that stands before it, as in `{? m: mass in g}`, or write a quantity",
}


def _how(allowed: tuple[str, ...], known: list[str]) -> str:
    """Say how a name that is nothing near to any known one comes to be."""
    first = allowed[0]
    if first in _DECLARED:
        return _DECLARED[first]
    if known:
        return f"name {KINDS[first]}: " + ", ".join(f"`{name}`" for name in known[:8])
    return _MADE.get(first, f"name {KINDS[first]}")
