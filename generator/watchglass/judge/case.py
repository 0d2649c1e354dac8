"""What a check of one procedure is given, and what it must not say twice."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base.findings import Severity

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

    from watchglass.base.findings import Finding
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.resolve.model import Procedure
    from watchglass.run.passes import Course
    from watchglass.run.usage import Usage


class Case(NamedTuple):
    """One procedure before its checks.

    Attributes:
        procedure: As resolved.
        course: Its events in the order they happen.
        usage: What is taken of each material.
        catalogue: What its names were looked up in.
        faulty: Whether reading or resolving the body found an error: what is missing then may
            stand in what could not be read, and is not reported again.
    """

    procedure: Procedure
    course: Course
    usage: Mapping[str, Usage]
    catalogue: Catalogue
    faulty: bool


def faulty_body(findings: Iterable[Finding], body_start: int) -> bool:
    """Tell whether an earlier stage found an error in the body."""
    return any(f.code.severity is Severity.ERROR and f.span.start >= body_start for f in findings)
