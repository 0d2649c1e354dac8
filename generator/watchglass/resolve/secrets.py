"""Secret samples (`one-of`) opened: the procedure as it is for each candidate."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING, NamedTuple

from watchglass.resolve import model
from watchglass.resolve.solutions import facts_of

if TYPE_CHECKING:
    from watchglass.catalogue.catalogue import Catalogue


class Opened(NamedTuple):
    """A procedure with its secrets opened.

    Attributes:
        letters: For each secret material the letter of its candidate.
        procedure: With what it then is.
    """

    letters: dict[str, str]
    procedure: model.Procedure


def opened(procedure: model.Procedure, catalogue: Catalogue) -> tuple[Opened, ...]:
    """Open the secrets of a procedure: as many ways as the longest of them has candidates.

    Several secrets are opened side by side, each running through its candidates in turn: every
    candidate is met, not every combination. Empty where there is no secret, or one without
    candidates.
    """
    secrets = {
        name: composition
        for name, material in procedure.materials.items()
        if isinstance(composition := material.composition, model.Secret)
    }
    if not secrets or not all(secret.candidates for secret in secrets.values()):
        return ()
    ways = max(len(secret.candidates) for secret in secrets.values())
    return tuple(_way(procedure, secrets, place, catalogue) for place in range(ways))


def _way(
    procedure: model.Procedure, secrets: dict[str, model.Secret], place: int, catalogue: Catalogue
) -> Opened:
    letters: dict[str, str] = {}
    materials = dict(procedure.materials)
    for name, secret in secrets.items():
        letter, substance = list(secret.candidates.items())[place % len(secret.candidates)]
        letters[name] = letter
        composition: model.Composition = model.Pure(substance)
        if secret.strength is not None and secret.solvent is not None:
            composition = model.Solution(secret.strength, substance, secret.solvent)
        materials[name] = materials[name]._replace(
            composition=composition, solution=facts_of(composition, None, catalogue)
        )
    return Opened(letters, replace(procedure, materials=materials))
