"""Reading an expression of the calculator: the notation's own grammar, with materials written out.

In a mark a function takes a local name (`moles(acid)`). Here nothing is declared, so what stands in
the parentheses of `moles`, `mass`, `volume`, `strength`, `molar-mass`, `density`, `melts` and `boils`
is `[amount [of]] material`, and a material is written as in front matter: `[strength] substance
[in solvent]`, a stock's name, or a formula; double quotes round it are allowed and not needed.
"""

from __future__ import annotations

import re
from typing import TYPE_CHECKING, NamedTuple, NoReturn

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding
from watchglass.base.scan import BLANKS, Fault, Found, scan_quantity, starts_quantity, unknown_unit
from watchglass.base.yaml import YamlEntry, YamlText
from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.read.cursor import Cursor, StopReading, cut, ends_in_unit
from watchglass.read.expressions import ExpressionReader
from watchglass.read.terms import Call, Expression, Measured, Name
from watchglass.read.words import NAME
from watchglass.resolve import model
from watchglass.resolve.materials import MaterialReader
from watchglass.resolve.typing import FUNCTIONS

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.base.spans import Source, Span
    from watchglass.shell.reckoning.names import BenchCatalogue

DILUTION = "dilution"
#: Functions of a material or substance.
OF_THINGS = frozenset(n for n, f in FUNCTIONS.items() if f.arguments == ("thing",))
#: Functions that ask the bench, or something that only front matter can declare.
OF_PROCEDURES = frozenset(
    name
    for name, function in FUNCTIONS.items()
    if function.arguments[0] in ("held", "vessel", "reaction", "yield", "label")
)
#: Functions whose arguments are no expressions.
_WRITTEN_OUT = frozenset((*OF_THINGS, DILUTION, "balance", "convert"))
_OF_MOLECULES = ("molar-mass", "melts", "boils")
_AMOUNTS = (dim.MASS, dim.VOLUME, dim.AMOUNT, dim.COUNT)
_TIE = re.compile(r"(in|on|after)\b")
_OF = re.compile(r"of\s+")
#: `2,4-dinitrophenol` begins with no quantity.
_LOCANTS = re.compile(r"\d+'?(?:,\d+'?)*-[^\W\d]")
_LIKE_FORMULA = re.compile(r"[\[(]?[A-Z](?=.*[A-Z\d+\-])[^\s]*")


class Asked(NamedTuple):
    """What one line asks.

    Attributes:
        expression: As read; None where it could not be.
        unit: The unit that stands after `in`, or None.
        materials: What stands in parentheses, by its text.
        findings: What is wrong so far.
    """

    expression: Expression | None
    unit: Name | None
    materials: Mapping[str, model.Material]
    findings: tuple[Finding, ...]


def read_asked(source: Source, start: int, end: int, catalogue: BenchCatalogue) -> Asked:
    """Read one expression with the unit it may end in."""
    cursor = Cursor(source, start, end, catalogue.measures)
    reader = _Reader(cursor, catalogue)
    try:
        expression = reader.read()
        unit = None
        if cursor.takes_word("in"):
            span = cursor.rest()
            unit, cursor.at = Name(span.text, span), cursor.end
        if not cursor.done:
            _goes_on(cursor, expression)
    except StopReading as stop:
        return Asked(None, None, reader.materials, (*reader.findings, stop.finding))
    return Asked(expression, unit, reader.materials, tuple(reader.findings))


def _goes_on(cursor: Cursor, expression: Expression) -> NoReturn:
    rest = cut(cursor.rest().text)
    asks = isinstance(expression, Measured) and NAME.match(cursor.text, cursor.at, cursor.end)
    cursor.stop(
        codes.EXPRESSION_NOT_READ,
        cursor.rest(),
        f"`{rest}` cannot follow a whole expression",
        f"say what is asked of it, as in `moles({expression.span.text} {rest})`"
        if asks
        else "put an operator between, or take it out",
    )


class _Reader(ExpressionReader):
    """Reads one expression; materials and their faults gather in it."""

    def __init__(self, cursor: Cursor, catalogue: BenchCatalogue) -> None:
        super().__init__(cursor, unit_follows=True)
        self.catalogue = catalogue
        self.materials: dict[str, model.Material] = {}
        self.findings: list[Finding] = []

    def _argument(self, name: Name, place: int) -> Expression:
        if name.text in OF_THINGS or (name.text == DILUTION and place == 0):
            return self._thing(name.text)
        if name.text in OF_PROCEDURES or name.text.lower() in OF_PROCEDURES:
            return self._raw_words()
        return super()._argument(name, place)

    def _word_tie(self, left: Expression, start: int, binding: int) -> Expression | None:
        cursor = self.cursor
        found = _TIE.match(cursor.text, cursor.at, cursor.end)
        if found is None:
            self._no_parentheses(left)
            return super()._word_tie(left, start, binding)
        word, before = found[1], cursor.at
        if word == "in":
            cursor.at = found.end()
            cursor.blanks()
            if ends_in_unit(cursor):
                cursor.at = before
                return None
            return self._no_unit()
        return self._no_bench(cursor.source.span(*found.span()))

    def _no_parentheses(self, left: Expression) -> None:
        """Refuse `moles of 2 g NaCl`: how far the material goes only a parenthesis tells."""
        cursor = self.cursor
        written = isinstance(left, Name) and left.text in _WRITTEN_OUT
        if written and _OF.match(cursor.text, cursor.at, cursor.end):
            cursor.stop(
                codes.EXPRESSION_NOT_READ,
                left.span,
                f"`{left.span.text}` takes what it is asked of in parentheses",
                f"write `{left.span.text}(…)`",
            )

    def _no_bench(self, word: Span) -> NoReturn:
        self.cursor.stop(
            codes.EXPRESSION_NOT_READ,
            word,
            f"`{word.text}` speaks of a vessel or a state, and there is no procedure here",
            "write it in a procedure, where the bench can be asked",
        )

    def _no_unit(self) -> NoReturn:
        """Say what is wrong with what stands after `in`: here it can only be a unit, at the end."""
        cursor = self.cursor
        if cursor.done:
            cursor.stop(
                codes.EXPRESSION_NOT_READ,
                cursor.rest(),
                "a unit is expected after `in`",
                "write it, as in `in mmol`, or take `in` out",
            )
        rest = cursor.rest().text
        word = re.split(r"\s*[),]", rest)[0]
        span = cursor.source.span(cursor.at, cursor.at + max(1, len(word)))
        found = scan_quantity("1 " + word, 0)
        if isinstance(found, Found) and found.measured and found.end == len(word) + 2:
            cursor.stop(
                codes.EXPRESSION_NOT_READ,
                span,
                f"`in {word}` stands at the end of an expression only",
                f"write `convert(…, {word})` within one",
            )
        fault = unknown_unit(word, span.start)
        cursor.stop(fault.code, span, fault.message, fault.help)

    # ------------------------------------------------------------------ materials

    def _thing(self, function: str) -> Expression:
        """Read `[amount [of]] material` up to the parenthesis that closes."""
        cursor = self.cursor
        start = cursor.at
        cursor.at = end = self._end_of_thing(ends_at_comma=function == DILUTION)
        while end > start and cursor.text[end - 1] in BLANKS:
            end -= 1
        if end == start:
            cursor.stop(
                codes.EXPRESSION_NOT_READ,
                cursor.rest(),
                f"a material is expected{cursor.here()}",
                "name a substance, as in `moles(2.00 g benzoic-acid)`",
            )
        amount = self._amount(start, end)
        if amount is None:
            return self._material(start, end, function)
        rest = amount.span.end
        while rest < end and cursor.text[rest] in BLANKS:
            rest += 1
        if of := _OF.match(cursor.text, rest, end):
            rest = of.end()
        if rest >= end:
            return amount
        name = self._material(rest, end, function)
        return Call(Name("amount", amount.span), (amount, name), amount.span.through(name.span))

    def _end_of_thing(self, *, ends_at_comma: bool) -> int:
        cursor = self.cursor
        at, depth, quoted = cursor.at, 0, False
        while at < cursor.end:
            char = cursor.text[at]
            if char == '"':
                quoted = not quoted
            elif not quoted:
                if char == ")" and depth == 0:
                    break
                apart = cursor.text[at + 1 : at + 2].isspace()
                if char == "," and ends_at_comma and depth == 0 and apart:
                    break
                depth += {"(": 1, ")": -1}.get(char, 0)
            at += 1
        return at

    def _amount(self, start: int, end: int) -> Measured | None:
        """Read an amount; None where a material begins at once, perhaps with its strength."""
        cursor = self.cursor
        text = cursor.text[start:end]
        named = self.catalogue.find(text) or _LOCANTS.match(text)
        if named or not starts_quantity(cursor.text, start):
            return None
        found = scan_quantity(cursor.text, start, end, measures=cursor.measures)
        if isinstance(found, Fault):
            span = cursor.source.span(found.start, found.end)
            cursor.stop(found.code, span, found.message, found.help)
        if not isinstance(found, Found):
            return None
        whole = found.end >= end
        if found.quantity.dimension not in _AMOUNTS and not whole:
            return None
        return Measured(found.quantity, cursor.source.span(start, found.end))

    def _material(self, start: int, end: int, function: str) -> Name:
        text = self.cursor.text
        if text[start] == '"' and text.find('"', start + 1, end) == end - 1 > start + 1:
            start, end = start + 1, end - 1
        span = self.cursor.source.span(start, end)
        if span.text not in self.materials:
            self.materials[span.text] = self._described(span, function)
        return Name(span.text, span, quoted=True)

    def _described(self, span: Span, function: str) -> model.Material:
        """Read a description; what is asked of the molecule alone needs no strength."""
        node = YamlText(span.text, span)
        reader = MaterialReader(self.catalogue)
        known = self.catalogue.find(span.text)
        composition: model.Composition
        if known is not None and function in _OF_MOLECULES:
            composition = model.Pure(known)
        elif known is None and _LOCANTS.match(span.text):
            reader.substance(node)
            composition = model.Unknown(span.text, declared=False)
        else:
            material = reader.read(YamlEntry(node, node))
            self.findings += [self._as_formula(finding) for finding in reader.findings]
            return material
        self.findings += reader.findings
        return model.Material(
            name=span.text,
            written=span.text,
            composition=composition,
            span=span,
            value_span=span,
        )

    def _as_formula(self, finding: Finding) -> Finding:
        """Say of an unknown word that looks like a formula what is wrong with the formula."""
        word = finding.span.text
        if finding.code != codes.SUBSTANCE_UNKNOWN or not _LIKE_FORMULA.fullmatch(word):
            return finding
        read = parse_formula(word)
        near = (finding.help or "").startswith("did you mean")
        if isinstance(read, Formula) or (near and read.help is None):
            return finding
        return Finding(
            code=codes.FORMULA_NOT_READ,
            span=finding.span.part(read.start, read.end),
            message=read.message,
            help=read.help,
        )
