"""What a handbook is made from: a set that has been analysed. The shell's analysis is one."""

from __future__ import annotations

from typing import TYPE_CHECKING, Protocol

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.base.findings import Finding
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.judge.bench.run import Run as BenchRun
    from watchglass.judge.case import Case
    from watchglass.read.syntax import ProcedureSyntax
    from watchglass.resolve.laboratory import Laboratory
    from watchglass.resolve.model import Acceptance
    from watchglass.resolve.schedule import Slot
    from watchglass.run.cards import Card


class SetSurroundings(Protocol):
    """What its procedures stand in."""

    @property
    def catalogue(self) -> Catalogue:
        """The catalogue."""
        ...

    @property
    def laboratory(self) -> Laboratory:
        """The laboratory."""
        ...

    @property
    def schedule(self) -> tuple[Slot, ...]:
        """The schedule."""
        ...


class AnalysedProcedure(Protocol):
    """A procedure and what became of it."""

    @property
    def path(self) -> str:
        """Path within the set."""
        ...

    @property
    def case(self) -> Case:
        """The procedure with its course and usage."""
        ...

    @property
    def run(self) -> BenchRun | None:
        """How it went at the bench."""
        ...

    @property
    def card(self) -> Card:
        """Its digest."""
        ...

    @property
    def findings(self) -> tuple[Finding, ...]:
        """What is open."""
        ...

    @property
    def accepted(self) -> tuple[tuple[Finding, Acceptance], ...]:
        """What is accepted."""
        ...


class AnalysedPage(Protocol):
    """An ordinary page."""

    @property
    def path(self) -> str:
        """Path within the set."""
        ...

    @property
    def syntax(self) -> ProcedureSyntax:
        """The page as read."""
        ...

    @property
    def card(self) -> Card:
        """Its digest."""
        ...


class AnalysedSet(Protocol):
    """What a handbook is made from; the shell's analysis is one."""

    @property
    def surroundings(self) -> SetSurroundings:
        """Catalogue, laboratory and schedule."""
        ...

    @property
    def procedures(self) -> Sequence[AnalysedProcedure]:
        """The procedures."""
        ...

    @property
    def pages(self) -> Sequence[AnalysedPage]:
        """The ordinary pages."""
        ...
