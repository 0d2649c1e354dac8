"""What a station is handed against what the steps take."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.figures import shown
from watchglass.base.findings import Finding, Related
from watchglass.resolve import model
from watchglass.run.usage import total_of

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.judge.case import Case
    from watchglass.run.usage import Usage


def provided(case: Case) -> Iterator[Finding]:
    """Report materials of which more is taken than provided, or `all` of which is never provided."""
    for name, material in case.procedure.materials.items():
        used = case.usage.get(name)
        if used is None:
            continue
        if material.provided is None:
            yield from _all_of_nothing(material, used)
        elif not material.for_class:
            yield from _exceeded(material, used)


def _all_of_nothing(material: model.Material, used: Usage) -> Iterator[Finding]:
    if isinstance(material.composition, model.Continued):
        return  # the product of another procedure: its yield decides
    for use in used.uses:
        if use.of_all:
            yield Finding(
                code=codes.ALL_OF_NOTHING,
                span=use.span,
                message=f"`{use.of_all}` of `{material.name}` is taken, and how much there is stands nowhere",
                related=(Related(material.span, "it is declared here without `provided:`"),),
                help="say what a station is handed, as in `provided: 1.00 g`, or the amount in the step",
            )
            return


def _exceeded(material: model.Material, used: Usage) -> Iterator[Finding]:
    given = material.provided
    span = material.provided_span
    if given is None or span is None:
        return
    total = total_of(used, given.dimension)
    if total is None:
        yield from _incomparable(material, used)
        return
    if total.high <= given.si_high * (1 + 1e-9):
        return
    if all(use.of_all for use in used.uses) and len(used.uses) == 1 and used.uses[0].times == 1:
        return
    figure = shown(total.high / given.unit.factor, max(total.figures, given.figures))
    yield Finding(
        code=codes.PROVIDED_EXCEEDED,
        span=span,
        message=f"the steps take {figure} {given.unit.symbol} of `{material.name}`; `{given.text}` is provided",
        related=tuple(
            Related(use.span, f"taken {use.times} times" if use.times > 1 else "taken here")
            for use in used.uses
        ),
        help=f"provide at least {figure} {given.unit.symbol}, or take less in the steps",
    )


def _incomparable(material: model.Material, used: Usage) -> Iterator[Finding]:
    """Compare a mass provided with a volume used through the density, or say that none is known."""
    given, span = material.provided, material.provided_span
    total = total_of(used, dim.MASS, dim.VOLUME)
    if given is None or span is None or total is None or given.dimension == dim.COUNT:
        return
    if isinstance(material.composition, model.Unknown):
        return
    density = material.solution.density if material.solution is not None else None
    composition = material.composition
    if density is None and isinstance(composition, model.Pure) and composition.substance.density:
        density = composition.substance.density.value.si
    if density is None:
        if not _no_density(material):  # that is a finding of its own
            yield Finding(
                code=codes.PROVIDED_EXCEEDED,
                span=span,
                message=f"`{given.text}` of `{material.name}` is provided, and the steps take {total.dimension.words}:"
                " the two cannot be compared",
                related=tuple(Related(use.span, "taken here") for use in used.uses[:1]),
                help=f"provide {total.dimension.words}, as the steps take it",
            )
        return
    needed = total.high * density if total.dimension == dim.VOLUME else total.high / density
    if needed > given.si_high * (1 + 1e-9):
        figure = shown(needed / given.unit.factor, max(total.figures, given.figures))
        yield Finding(
            code=codes.PROVIDED_EXCEEDED,
            span=span,
            message=f"the steps take {figure} {given.unit.symbol} of `{material.name}`; `{given.text}` is provided",
            related=tuple(Related(use.span, "taken here") for use in used.uses),
            help=f"provide at least {figure} {given.unit.symbol}, or take less in the steps",
        )


def volume_without_density(case: Case) -> Iterator[Finding]:
    """Report what is measured by volume though its density is unknown, so that its amount is too."""
    for name, material in case.procedure.materials.items():
        why = _no_density(material)
        used = case.usage.get(name)
        if not why or used is None:
            continue
        if material.provided is not None and material.provided.dimension == dim.VOLUME:
            span = material.provided_span or material.span
            text = material.provided.text
        else:
            use = next(
                (u for u in used.uses if u.quantity and u.quantity.dimension == dim.VOLUME), None
            )
            if use is None or use.quantity is None:
                continue
            span, text = use.span, use.quantity.text
        yield Finding(
            code=codes.DENSITY_UNKNOWN,
            span=span,
            message=f"`{text}` of `{name}` is a volume, and {why}",
            related=()
            if span is material.span
            else (Related(material.span, "it is declared here"),),
            help="give a mass, as in `0.900 g`, or add the density to the catalogue",
        )


def _no_density(material: model.Material) -> str:
    if material.solution is not None and material.solution.density is not None:
        return ""
    match material.composition:
        case model.Pure(substance) if substance.density is None and substance.state != "gas":
            what = (
                "a solid is weighed" if substance.state == "solid" else "its density is not known"
            )
            return (
                f"{what}: its amount cannot be told without a density"
                if substance.state == "solid"
                else what
            )
        case model.Mixture(parts, basis, _) if basis in ("amount", "mass"):
            if all(part.substance.density for part in parts):
                return ""  # liquids: their volumes are added up
            return "a mixture by parts is weighed: its density is not known"
        case _:
            return ""
