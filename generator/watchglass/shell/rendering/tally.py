"""Order and number of findings: what every renderer and every exit status starts from."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

from watchglass.base.findings import Severity

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence

    from watchglass.base.findings import Edit, Finding
    from watchglass.base.spans import Span

_Place = tuple[str, int, int]


def arrange(findings: Iterable[Finding]) -> tuple[Finding, ...]:
    """Sort findings by file, place and weight (errors first), and drop exact repeats.

    Two findings are the same if all that is printed of them is; whether they hold the same
    `Source` object does not matter, since several workers may have read one file.
    """
    kept: dict[tuple[object, ...], Finding] = {}
    for finding in findings:
        kept.setdefault(_identity(finding), finding)
    return tuple(sorted(kept.values(), key=_order))


def _order(finding: Finding) -> tuple[str, int, int, int, str, str]:
    path, start, end = _place(finding.span)
    code = finding.code
    return path, start, -code.severity, end, code.number, finding.message


def _identity(finding: Finding) -> tuple[object, ...]:
    return (
        finding.code.number,
        _place(finding.span),
        finding.message,
        finding.label,
        tuple((_place(related.span), related.message) for related in finding.related),
        finding.help,
        _edit(finding.fix),
    )


def _edit(fix: Edit | None) -> object:
    return None if fix is None else (_place(fix.span), fix.text)


def _place(span: Span) -> _Place:
    return span.source.name, span.start, span.end


@dataclass(frozen=True, slots=True, kw_only=True)
class Counts:
    """How many findings of each weight there are, and in how many files."""

    errors: int
    warnings: int
    notes: int
    files: int

    @classmethod
    def of(cls, findings: Sequence[Finding]) -> Counts:
        """Count findings that are arranged already."""
        weights = [finding.code.severity for finding in findings]
        return cls(
            errors=weights.count(Severity.ERROR),
            warnings=weights.count(Severity.WARNING),
            notes=weights.count(Severity.NOTE),
            files=len({finding.span.source.name for finding in findings}),
        )

    def fails(self, *, strict: bool) -> bool:
        """Tell whether a check fails: errors do, warnings only if strict, notes never."""
        return self.errors > 0 or (strict and self.warnings > 0)

    @property
    def sentence(self) -> str:
        """Say the counts, as `2 errors, 1 warning in 3 files`; empty where there is nothing."""
        numbers = ((self.errors, "error"), (self.warnings, "warning"), (self.notes, "note"))
        parts = [_counted(number, word) for number, word in numbers if number]
        return f"{', '.join(parts)} in {_counted(self.files, 'file')}" if parts else ""


def _counted(number: int, word: str) -> str:
    return f"{number} {word}" if number == 1 else f"{number} {word}s"
