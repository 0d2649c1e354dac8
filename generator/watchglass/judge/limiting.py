"""A reactant that is declared limiting, and is not."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base.figures import shown
from watchglass.base.findings import Finding, Related
from watchglass.run.roles import roles

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.spans import Span
    from watchglass.judge.case import Case
    from watchglass.resolve import model
    from watchglass.run.roles import Role

#: Share by which another reactant may be less before it counts as the limiting one [-].
_SAME = 0.01


def not_limiting(case: Case) -> Iterator[Finding]:
    """Report reactions whose declared limiting reactant is in excess of another."""
    found = roles(case.procedure, case.usage)
    for reaction in case.procedure.reactions.values():
        if not reaction.limiting:
            continue
        turns = {
            role.material: (role, role.moles / _coefficient(reaction, role))
            for role in found
            if role.reaction == reaction.name
        }
        declared = turns.get(reaction.limiting)
        if declared is None:
            continue
        least, (role, least_turns) = min(turns.items(), key=lambda item: item[1][1])
        if least == reaction.limiting or least_turns >= declared[1] * (1 - _SAME):
            continue
        yield Finding(
            code=codes.NOT_LIMITING,
            span=reaction.equation_span,
            message=f"`{reaction.limiting}` is declared limiting with {_mmol(declared[0])};"
            f" `{least}` is less, {_mmol(role)}",
            related=(
                *_taken(case, reaction.limiting, declared[0]),
                *_taken(case, least, role),
            ),
            help=f"declare `limiting: {least}`, or take more of `{least}`",
        )


def _coefficient(reaction: model.Reaction, role: Role) -> float:
    for species in reaction.left:
        if species.material == role.material:
            return float(species.coefficient)
    return 1.0


def _mmol(role: Role) -> str:
    return f"{shown(role.moles * 1e3, min(max(role.figures, 2), 4))} mmol"


def _taken(case: Case, name: str, role: Role) -> tuple[Related, ...]:
    uses = case.usage[name].uses if name in case.usage else ()
    spans: list[Span] = [use.span for use in uses[:1]]
    return tuple(Related(span, f"{_mmol(role)} of `{name}`") for span in spans)
