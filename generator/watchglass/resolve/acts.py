"""Acts to events: names bound, clauses checked against the table of verbs, dimensions checked."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding, Related, did_you_mean
from watchglass.read import syntax
from watchglass.resolve import model
from watchglass.resolve.verbs import MOVING, VERBS

if TYPE_CHECKING:
    from watchglass.base.dimensions import Dimension
    from watchglass.base.findings import Code
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span
    from watchglass.resolve.scope import Scope

_HOLDERS = ("vessel",)
_WARE = ("vessel", "equipment", "aid")
_THINGS = ("vessel", "equipment", "aid", "bath", "material")
_REAGENTS = ("material", "aid")
PORTIONS = (dim.MASS, dim.VOLUME, dim.AMOUNT, dim.COUNT)
_SETTINGS = (
    dim.TEMPERATURE,
    dim.RATE,
    dim.ROTATION,
    dim.FREQUENCY,
    dim.PRESSURE,
    dim.LENGTH,
    dim.VOLTAGE,
    dim.CURRENT,
    dim.POWER,
)
_LARGEST: dict[Dimension, tuple[float, str]] = {
    dim.MASS: (10.0, "10 kg"),
    dim.VOLUME: (0.05, "50 L"),
    dim.AMOUNT: (1e3, "1 kmol"),
    dim.ROTATION: (1000.0, "60000 rpm"),
    dim.TIME: (3e6, "five weeks"),
    dim.TEMPERATURE: (2300.0, "2000 °C"),
}
_LOWEST_PH, _HIGHEST_PH = -2, 16
_SINGLE: dict[str, tuple[Dimension, ...]] = {
    "time": (dim.TIME,),
    "temperature": (dim.TEMPERATURE,),
    "difference": (dim.DIFFERENCE,),
    "share": (dim.SHARE,),
    "volume": (dim.VOLUME,),
    "size": (dim.MASS, dim.VOLUME),
    "setting": _SETTINGS,
}
_NAMES: dict[str, tuple[str, ...]] = {
    "vessel": _HOLDERS,
    "thing": _THINGS,
    "ware": _WARE,
    "reaction": ("reaction",),
    "stream": ("stream",),
    "point": ("indicator",),
}
_EXAMPLE = {
    "time": "5 min",
    "temperature": "65 °C",
    "difference": "20 K",
    "share": "80 %",
    "volume": "10 mL",
    "size": "2 mL",
    "setting": "40 °C",
    "point": "pH 10",
    "vessel": "flask",
    "stream": "aqueous-acid",
    "thing": "paper",
    "ware": "cylinder",
    "reaction": "ester",
    "reagent": "alkali",
}


class ActReader:
    """Turns acts into events in one procedure; findings go to the scope."""

    def __init__(self, scope: Scope) -> None:
        """Read by a scope."""
        self.scope = scope

    # ------------------------------------------------------------------ moving

    def charge(self, act: syntax.ChargeAct) -> model.Charge | None:
        """Resolve a charge; None where its vessel is unknown."""
        portions = [p for p in (self.portion(a) for a in act.amounts) if p]
        known = self._place(act.target)
        ware = self._moving(act.clauses)
        if not known or not portions:
            return None
        return model.Charge(tuple(portions), act.target, ware, act.span, act.clauses)

    def portion(self, amount: syntax.Amount) -> model.Portion | None:
        """Resolve so much of a material."""
        kind = self._reagent_kind(amount.material)
        per = self._per(amount)
        if isinstance(amount.measure, str):
            if kind is None:
                return None
            return model.Portion(amount.material.text, None, amount.measure, per, amount.span)
        quantity = amount.measure.quantity
        span = amount.measure.span
        fits = quantity.dimension in PORTIONS
        bare = quantity.dimension == dim.NUMBER
        if bare and kind == "material":
            self._add(
                codes.UNIT_MISSING,
                span,
                f"`{quantity.text}` of `{amount.material.text}` has no unit",
                f"write the unit, as in `{quantity.text} mL {amount.material.text}`",
            )
            return None
        if not fits and not bare:
            self._add(
                codes.DIMENSION_WRONG,
                span,
                f"`{quantity.text}` is {quantity.dimension.words}; a mass, a volume, an amount or a count belongs here",
                f"write how much of it, as in `15 mL {amount.material.text}`",
            )
            return None
        if quantity.si_high == 0:
            self._add(
                codes.QUANTITY_NOUGHT,
                span,
                f"`{quantity.text}` of `{amount.material.text}` is nothing",
                "write how much is taken, or take the mark out",
            )
            return None
        self.plausible(quantity, span)
        return model.Portion(amount.material.text, quantity, "", per, amount.span) if kind else None

    def _reagent_kind(self, name: syntax.Name) -> str | None:
        """Use a material: a local name, an aid, or a catalogue key as it stands."""
        if self.scope.kind(name.text) is None and self.scope.catalogue.by_key(name.text):
            self.scope.undeclared.setdefault(name.text, name.span)
            return "material"
        return self.scope.take(name, _REAGENTS, "a material")

    def _per(self, amount: syntax.Amount) -> tuple[Quantity, str] | None:
        if amount.per is None:
            return None
        unit, counted = amount.per
        if self.scope.take(counted, ("material", "reaction"), "a material") is None:
            return None
        return unit.quantity, counted.text

    def transfer(self, act: syntax.TransferAct) -> model.Transfer | None:
        """Resolve the pouring of a vessel into another."""
        origin, target = self._place(act.origin), self._place(act.target)
        self._moving(act.clauses)
        if not (origin and target):
            return None
        return model.Transfer(act.origin, act.target, act.clauses, act.span)

    def aliquot(self, act: syntax.AliquotAct) -> model.Aliquot | None:
        """Resolve the taking of a measured share."""
        quantity = act.measure.quantity
        if quantity.dimension not in (dim.VOLUME, dim.MASS):
            self._add(
                codes.DIMENSION_WRONG,
                act.measure.span,
                f"`{quantity.text}` is {quantity.dimension.words}; an aliquot is a volume or a mass",
                "write `10 mL from …`",
            )
        self.plausible(quantity, act.measure.span)
        origin, target = self._place(act.origin), self._place(act.target)
        self._moving(act.clauses)
        if not (origin and target):
            return None
        return model.Aliquot(quantity, act.origin, act.target, act.span, act.clauses)

    def _moving(self, clauses: tuple[syntax.Clause, ...]) -> str:
        """Check the clauses of a charge or transfer; give the ware it is measured by."""
        ware = ""
        for clause in clauses:
            takes = MOVING.get(clause.word)
            if takes is None:
                self._unfit(clause, "a charge or a transfer", MOVING)
                continue
            self._clause("a charge", clause, takes)
            if clause.word == "by" and isinstance(clause.value, syntax.Place):
                ware = clause.value.name.text
        return ware

    def _place(self, place: syntax.Place) -> bool:
        return self.scope.take(place.name, _HOLDERS) is not None

    # ------------------------------------------------------------------ verbs

    def operation(self, act: syntax.VerbAct) -> model.Operation | None:
        """Resolve a verb of the bench."""
        verb = VERBS[act.verb]
        known = self._object(act, verb.object)
        portions: list[model.Portion] = []
        reagent = ""
        for clause in act.clauses:
            takes = verb.clauses.get(clause.word)
            if takes is None:
                self._unfit(clause, f"`{act.verb}`", verb.clauses)
            elif takes == "reagent" or (
                clause.word == "with" and isinstance(clause.value, syntax.Amount)
            ):
                portion, name = self._reagent(clause)
                portions += [portion] if portion else []
                reagent = reagent or name
            else:
                self._clause(f"`{act.verb}`", clause, takes)
        self._needed(act, verb.needed)
        if not known:
            return None
        reaction = (
            act.object.name.text
            if verb.object == "reaction" and isinstance(act.object, syntax.Place)
            else ""
        )
        return model.Operation(
            act.verb,
            self._vessel(act, verb.object),
            reaction,
            tuple(portions),
            reagent,
            _time(act),
            act.clauses,
            act.span,
            act.object if isinstance(act.object, syntax.Amount) else None,
            act.subject.text.lower() if act.subject else "",
        )

    def _object(self, act: syntax.VerbAct, takes: str) -> bool:
        target = act.object
        match takes:
            case "none":
                return True
            case "time":
                if isinstance(target, syntax.Measured):
                    return self._dimension(f"`{act.verb}`", target, "time")
            case "amount":
                return not isinstance(target, syntax.Amount) or self._supposed(target)
            case _:
                kinds = {"reaction": ("reaction",), "thing": _THINGS}.get(takes, _HOLDERS)
                if isinstance(target, syntax.Place):
                    return self.scope.take(target.name, kinds) is not None
        return False

    def _supposed(self, amount: syntax.Amount) -> bool:
        return self.scope.take(amount.material, ("material", "substance")) is not None

    def _vessel(self, act: syntax.VerbAct, takes: str) -> syntax.Place | None:
        if takes in ("vessel", "thing") and isinstance(act.object, syntax.Place):
            return act.object
        for clause in act.clauses:
            if clause.word == "in" and isinstance(clause.value, syntax.Place):
                return clause.value
        return None

    def _reagent(self, clause: syntax.Clause) -> tuple[model.Portion | None, str]:
        match clause.value:
            case syntax.Amount() as amount:
                return self.portion(amount), ""
            case syntax.Place(name, None, _):
                kind = self._reagent_kind(name)
                return None, name.text if kind else ""
            case _:
                self._wrong_value(clause, "a material, with or without an amount", "alkali")
                return None, ""

    def _needed(self, act: syntax.VerbAct, needed: tuple[str, ...]) -> None:
        given = {clause.word for clause in act.clauses}
        for word in needed:
            if word not in given:
                takes = VERBS[act.verb].clauses[word].split("|")[0]
                example = _EXAMPLE.get(takes, "…")
                self._add(
                    codes.CLAUSE_MISSING,
                    act.verb_span,
                    f"`{act.verb}` lacks `{word}`",
                    f"add `{word} {example}`",
                )

    # ------------------------------------------------------------------ clauses

    def _clause(self, what: str, clause: syntax.Clause, takes: str) -> None:
        """Check what stands in a clause against what its place takes."""
        kinds = takes.split("|")
        value = clause.value
        if "words" in kinds:
            return
        match value:
            case syntax.Measured():
                single = next((k for k in kinds if k in _SINGLE), None)
                if single is None:
                    self._wrong_value(clause, self._takes(kinds), _EXAMPLE.get(kinds[0], "…"))
                else:
                    self._dimension(f"`{clause.word}`", value, single)
            case syntax.Ph(quantity, span):
                if "point" not in kinds:
                    self._wrong_value(clause, self._takes(kinds), _EXAMPLE.get(kinds[0], "…"))
                else:
                    self._ph(quantity, span)
            case syntax.Amount():
                if "thing" in kinds or "size" in kinds or "volume" in kinds:
                    self.portion(value)
                else:
                    self._wrong_value(clause, self._takes(kinds), _EXAMPLE.get(kinds[0], "…"))
            case syntax.Place(name, part, _):
                if name.text == "mark" and "mark" in kinds:
                    return
                named = next((k for k in kinds if k in _NAMES), None)
                if named is None:
                    self._wrong_value(clause, self._takes(kinds), _EXAMPLE.get(kinds[0], "…"))
                else:
                    allowed = tuple(n for k in kinds if k in _NAMES for n in _NAMES[k])
                    self.scope.take(name, allowed)
                del part
            case _:
                self._wrong_value(clause, self._takes(kinds), _EXAMPLE.get(kinds[0], "…"))
        del what

    def _takes(self, kinds: list[str]) -> str:
        words = {
            "time": "a time",
            "temperature": "a temperature",
            "difference": "a temperature difference",
            "point": "a pH or an indicator",
            "vessel": "a vessel",
            "thing": "a thing by its name",
            "reaction": "a reaction",
            "stream": "a waste stream",
            "ware": "a measuring vessel",
            "volume": "a volume",
            "share": "a share",
            "size": "a mass or a volume",
            "setting": "a temperature, a rate or a length",
            "mark": "`mark`",
        }
        return " or ".join(words.get(kind, kind) for kind in kinds)

    def _dimension(self, what: str, value: syntax.Measured, takes: str) -> bool:
        quantity = value.quantity
        allowed = _SINGLE[takes]
        dimension = quantity.dimension
        if dim.TEMPERATURE in allowed and quantity.unit.symbol == "K":
            return True
        if dimension in allowed:
            if dimension == dim.SHARE and quantity.si_high > 1:
                self._add(
                    codes.SHARE_ABOVE_ONE,
                    value.span,
                    f"`{quantity.text}` is more than the whole",
                    "give a share of at most 100 %",
                )
            self.plausible(quantity, value.span)
            return True
        if not quantity.unit.symbol:
            self._add(
                codes.UNIT_MISSING,
                value.span,
                f"`{quantity.text}` after {what} has no unit",
                f"write it with its unit, as in `{_EXAMPLE[takes]}`",
            )
        else:
            help_ = f"write it as in `{_EXAMPLE[takes]}`"
            if dimension == dim.TEMPERATURE and dim.DIFFERENCE in allowed:
                help_ = f"write a difference in kelvin, as in `{quantity.number.text} K`"
            self._add(
                codes.DIMENSION_WRONG,
                value.span,
                f"`{quantity.text}` is {dimension.words}; {self._takes([takes])} belongs here",
                help_,
            )
        return False

    def plausible(self, quantity: Quantity, span: Span) -> None:
        """Doubt a quantity that no teaching laboratory handles: `5 Mg` for 5 mg."""
        limit = _LARGEST.get(quantity.dimension)
        if limit and quantity.si_high > limit[0]:
            symbol = quantity.unit.symbol
            meant = symbol[0].lower() + symbol[1:] if symbol[:1] == "M" and symbol != "M" else ""
            self._add(
                codes.SIZE_IMPLAUSIBLE,
                span,
                f"`{quantity.text}` is more than {limit[1]}",
                f"see whether `{quantity.number.text} {meant}` is meant"
                if meant
                else "see whether the unit is meant",
            )

    def _ph(self, quantity: Quantity, span: Span) -> None:
        """A pH is a plain number within what a teaching laboratory's solutions reach."""
        if quantity.dimension != dim.NUMBER:
            self._add(
                codes.DIMENSION_WRONG,
                span,
                f"`{quantity.text}` is {quantity.dimension.words}; a pH is a plain number",
                f"write `pH {quantity.number.text}`",
            )
        elif not (quantity.si >= _LOWEST_PH and quantity.si_high <= _HIGHEST_PH):
            self._add(
                codes.PH_BEYOND_SCALE,
                span,
                f"no solution at the bench has pH {quantity.text}",
                f"give a pH from {_LOWEST_PH} to {_HIGHEST_PH}",
            )

    def _wrong_value(self, clause: syntax.Clause, wanted: str, example: str) -> None:
        self._add(
            codes.CLAUSE_UNFIT,
            clause.value.span,
            f"`{clause.word}` takes {wanted} here",
            f"write it as in `{clause.word} {example}`",
        )

    def _unfit(self, clause: syntax.Clause, what: str, taken: dict[str, str]) -> None:
        said = (
            clause.value.text
            if isinstance(clause.value, syntax.Words) and clause.word in ("closure", "setting")
            else clause.word
        )
        known = [word for word in taken if word not in ("closure", "setting", "is", "because")]
        self._add(
            codes.CLAUSE_UNFIT,
            clause.span,
            f"{what} takes no `{said}`",
            did_you_mean(said, known)
            or "take one of " + ", ".join(f"`{word}`" for word in sorted(known)),
        )

    def _add(
        self,
        code: Code,
        span: Span,
        message: str,
        help_: str | None,
        related: tuple[Related, ...] = (),
    ) -> None:
        self.scope.findings.append(
            Finding(code=code, span=span, message=message, help=help_, related=related)
        )


def _time(act: syntax.VerbAct) -> float | None:
    """Give the seconds an operation takes: `for`, `over`, or the object of `take` and `wait`."""
    if isinstance(act.object, syntax.Measured) and act.object.quantity.dimension == dim.TIME:
        return act.object.quantity.si_high
    seconds = [
        clause.value.quantity.si_high
        for clause in act.clauses
        if clause.word in ("for", "over")
        and isinstance(clause.value, syntax.Measured)
        and clause.value.quantity.dimension == dim.TIME
    ]
    return sum(seconds) if seconds else None
