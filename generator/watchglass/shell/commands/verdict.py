"""How a command ends: the status its findings come to, and what it refuses to work on."""

from __future__ import annotations

from typing import TYPE_CHECKING

import click

from watchglass.shell.cli import CLEAN, FOUND
from watchglass.shell.rendering.tally import Counts

if TYPE_CHECKING:
    from collections.abc import Sequence

    from watchglass.base.findings import Finding


class Refused(click.ClickException):
    """A call that is well formed and cannot be done: its message says what would do."""


def status_of(findings: Sequence[Finding], *, strict: bool) -> int:
    """Give 1 if there are errors, or with `strict` warnings; notes never count."""
    return FOUND if Counts.of(findings).fails(strict=strict) else CLEAN
