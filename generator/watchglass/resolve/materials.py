"""Materials: `3.0 M hydrochloric acid`, mixtures, secrets, what continues another procedure."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.fields import Field, Record, Shape, read_fields
from watchglass.base.findings import Finding, did_you_mean
from watchglass.base.quantities import Kind
from watchglass.base.scan import (
    Fault,
    Found,
    read_quantity,
    scan_quantity,
    starts_quantity,
    unknown_unit,
)
from watchglass.base.yaml import YamlMapping, YamlNode, YamlText
from watchglass.catalogue import texts
from watchglass.chemistry.formulas import Formula, parse_formula
from watchglass.resolve import label
from watchglass.resolve.model import (
    Composition,
    Continued,
    Material,
    Mixture,
    Part,
    Pure,
    Saturated,
    Secret,
    Solution,
    Strength,
    Unknown,
)

if TYPE_CHECKING:
    from watchglass.base.findings import Code
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span
    from watchglass.base.yaml import YamlEntry
    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.stocks import Stock
    from watchglass.catalogue.substances import Substance

_HANDED = (dim.MASS, dim.VOLUME, dim.AMOUNT, dim.COUNT)
_PART = Field(
    Shape.TEXT,
    "its part in the ratio, or its strength",
    required=True,
    quantity=(dim.AMOUNT, dim.MASS, dim.VOLUME, *label.STRENGTHS),
)
FIELDS: dict[str, Field] = {
    "contains": Field(
        Shape.MAPPING, "substances with their ratio, or strengths with `in:`", each=_PART
    ),
    "in": Field(Shape.TEXT, "the solvent of what it contains"),
    "density": Field(
        Shape.TEXT,
        "its density, as its label has it: `1.18 g/mL`",
        quantity=(dim.MASS_CONCENTRATION,),
    ),
    "also": Field(
        Shape.TEXT,
        "the strength again, as its label has it in other units: `12 M`",
        quantity=label.STRENGTHS,
    ),
    "provided": Field(Shape.TEXT, "what a station is handed, as `0.900 g`", quantity=_HANDED),
    "composition": Field(
        Shape.TEXT, "`unknown` where nobody can say what is in it", words=("unknown",)
    ),
    "is": Field(Shape.TEXT, "what it is, in words or as a material"),
    "from": Field(Shape.TEXT, "code of the procedure whose product it is"),
    "vessel": Field(Shape.TEXT, "how that product comes, as `tared`"),
    "one-of": Field(
        Shape.MAPPING,
        "candidates by letter; students see the station's code only",
        each=Field(Shape.TEXT, "the substance", required=True),
    ),
    "as": Field(Shape.TEXT, "strength and solvent of the sample, as `1 % w/v in ethanol`"),
}
_BASES = {dim.AMOUNT: "amount", dim.MASS: "mass", dim.VOLUME: "volume"}
_FOR_CLASS = re.compile(r"\s+for the class\s*$")
_SATURATED = re.compile(r"saturated\s+(?:aqueous\s+)?")
_IN = re.compile(r"\s+in\s+")
_WATER = "water"


class MaterialReader:
    """Reads the materials of one procedure; findings gather in it."""

    def __init__(self, catalogue: Catalogue) -> None:
        """Read by a catalogue."""
        self.catalogue = catalogue
        self.findings: list[Finding] = []

    def read(self, entry: YamlEntry) -> Material:
        """Read one entry of `materials:`; what cannot be read is unknown, with a finding."""
        material = self._read(entry)
        mapping = entry.value if isinstance(entry.value, YamlMapping) else None
        stock = self.catalogue.stocks.get(material.stock.casefold()) if material.stock else None
        density = _text(mapping, "density") or (stock.density if stock is not None else None)
        also = _text(mapping, "also") or (stock.also if stock is not None else None)
        beside = label.read_label(density, also, self.findings)
        if mapping is not None:
            own = label.read_label(_text(mapping, "density"), _text(mapping, "also"), [])
            written = material.written or material.name
            self.findings += label.faults_of_label(
                own, written, material.composition, self.catalogue
            )
        return material._replace(solution=beside.facts(material.composition, self.catalogue))

    def _read(self, entry: YamlEntry) -> Material:
        name, value = entry.key.text, entry.value
        if isinstance(value, YamlText):
            said = bool(value.text.strip())
            composition, stock = (
                self.described(value) if said else self._unsaid(name, entry.key.span)
            )
            return Material(
                name=name,
                written=value.text,
                composition=composition,
                span=entry.key.span,
                value_span=value.span,
                stock=stock,
            )
        record, found = read_fields(value, FIELDS, "a material")
        self.findings += found
        if record is None or (found and not record.values):
            return Material(
                name=name,
                written="",
                composition=Unknown(name, declared=False),
                span=entry.key.span,
                value_span=value.span,
            )
        return self._mapped(entry, record)

    def _mapped(self, entry: YamlEntry, record: Record) -> Material:
        composition, stock, written = self._composition(entry, record)
        provided, for_class, span = None, False, None
        if (node := record.text("provided")) is not None:
            span = node.span
            ends = _FOR_CLASS.search(node.text)
            for_class = ends is not None
            provided = self._provided(node, ends.start() if ends else None)
        return Material(
            name=entry.key.text,
            written=written,
            composition=composition,
            span=entry.key.span,
            value_span=record.span,
            provided=provided,
            provided_span=span,
            for_class=for_class,
            stock=stock,
        )

    def _composition(self, entry: YamlEntry, record: Record) -> tuple[Composition, str, str]:
        name = entry.key.text
        is_ = record.text("is")
        for field in ("contains", "one-of"):
            if (node := record.mapping(field)) is not None and not node.entries:
                self._unsaid(name, record.keys[field])
                return Unknown(name, declared=False), "", ""
        if (contains := record.mapping("contains")) is not None:
            written = ", ".join(e.key.text for e in contains)
            return self._contains(contains, record.text("in")), "", written
        if (candidates := record.mapping("one-of")) is not None:
            return self._secret(candidates, record.text("as")), "", "one of several"
        if (origin := record.text("from")) is not None:
            vessel = record.text("vessel")
            return Continued(origin.text, vessel.text if vessel else ""), "", f"from {origin.text}"
        if (composition := record.text("composition")) is not None:
            if composition.text != "unknown":
                self._add(
                    codes.FIELD_UNFIT,
                    composition.span,
                    f"`composition` takes `unknown`, not `{composition.text}`",
                    "write `composition: unknown`, or say what it is with `contains:` or `is:`",
                )
            return Unknown(is_.text if is_ else name, declared=True), "", is_.text if is_ else name
        if is_ is not None:
            described, stock = self.described(is_)
            return described, stock, is_.text
        if record.keys and not (set(record.keys) - set(record.values)):
            self._unsaid(name, entry.key.span)
        return Unknown(name, declared=False), "", ""

    def _unsaid(self, name: str, span: Span) -> tuple[Composition, str]:
        self._add(
            codes.FIELD_MISSING,
            span,
            f"`{name}` does not say what it is",
            "add `is: 3.0 M hydrochloric acid` or `contains: {…}`",
        )
        return Unknown(name, declared=False), ""

    def described(self, node: YamlText, *, seen: tuple[str, ...] = ()) -> tuple[Composition, str]:
        """Read `[strength] substance [in solvent]` or a stock's name.

        Returns:
            What it is, and the key of the stock it is, or empty.
        """
        text = node.text
        stock = self.catalogue.stocks.get(text) or self.catalogue.stocks.get(text.casefold())
        if stock is not None and stock.key not in seen:
            return self.of_stock(stock, seen=seen), stock.key
        unknown = Unknown(text, declared=False)
        if saturated := _SATURATED.match(text):
            found = self._substance_in(node, saturated.end())
            return (Saturated(*found) if found else unknown), ""
        if not starts_quantity(text, 0) or self.catalogue.find(text):
            found = self._substance_in(node, 0)
            if found is None:
                return unknown, ""
            return self._pure(node, *found), ""
        scanned = scan_quantity(text, 0)
        if not isinstance(scanned, Found):
            if isinstance(scanned, Fault):
                self.findings.append(texts.fault_at(node, scanned))
            return unknown, ""
        start = scanned.end + len(text[scanned.end :]) - len(text[scanned.end :].lstrip())
        if not scanned.measured and (fault := self._misspelt_unit(text, start)):
            self.findings.append(texts.fault_at(node, fault))
            return unknown, ""
        strength = self._strength(node, scanned.quantity)
        found = self._substance_in(node, start) if text[start:] else None
        if not text[start:]:
            self._nothing(node)
        if strength is None or found is None:
            return unknown, ""
        return Solution(strength, *found), ""

    def of_stock(self, stock: Stock, *, seen: tuple[str, ...] = ()) -> Composition:
        """Read what a stock is: its parts, or its description."""
        if stock.contains is not None:
            return self._contains(stock.contains, stock.solvent)
        return self.described(stock.material, seen=(*seen, stock.key))[0]

    def _misspelt_unit(self, text: str, start: int) -> Fault | None:
        """Tell a unit that is none, in `3.0 mollar hydrochloric acid`, from one that is missing."""
        word, _, rest = text[start:].partition(" ")
        if self.catalogue.find(text[start:]) or not self.catalogue.find(rest):
            return None
        return unknown_unit(word, start)

    def _pure(self, node: YamlText, substance: Substance, solvent: Substance) -> Composition:
        written = node.text.casefold()
        if substance.state == "gas" and ("acid" in written or "aqueous" in written):
            self._add(
                codes.MATERIAL_NOT_READ,
                node.span,
                f"`{node.text}` does not say how strong it is",
                f"write its strength before it, as in `3.0 M {node.text}`",
            )
            return Unknown(node.text, declared=False)
        del solvent
        return Pure(substance)

    def _strength(self, node: YamlText, quantity: Quantity) -> Strength | None:
        span = node.part(0, len(quantity.text))
        if quantity.dimension in label.STRENGTHS:
            if (
                quantity.dimension in (dim.MASS_FRACTION, dim.VOLUME_FRACTION)
                and quantity.si_high > 1
            ):
                self._add(
                    codes.SHARE_ABOVE_ONE,
                    span,
                    f"`{quantity.text}` is more than the whole",
                    "give a strength of at most 100 %",
                )
                return None
            return Strength(quantity, span)
        rest = node.text[len(quantity.text) :].strip()
        if quantity.dimension == dim.SHARE:
            self._add(
                codes.PERCENT_WITHOUT_BASIS,
                span,
                f"`{quantity.text}` does not say of what: by mass or by volume",
                f"write `{quantity.text} w/v {rest}` for grams in 100 mL, `w/w` for grams in 100 g, or `v/v`",
            )
        elif not quantity.unit.symbol:
            word = rest.split()[0] if rest else ""
            self._add(
                codes.UNIT_MISSING,
                span,
                f"`{quantity.text}` before `{word}` has no unit",
                f"write the strength with its unit, as in `{quantity.text} M {rest}`",
            )
        else:
            self._add(
                codes.DIMENSION_WRONG,
                span,
                f"`{quantity.text}` is {quantity.dimension.words}; a strength belongs here",
                "write the amount in the steps, and here the strength, as in `0.50 M`",
            )
        return None

    def _nothing(self, node: YamlText) -> None:
        self._add(
            codes.MATERIAL_NOT_READ,
            node.span,
            f"`{node.text}` does not say of what substance",
            "write the substance after the strength",
        )

    def _substance_in(self, node: YamlText, start: int) -> tuple[Substance, Substance] | None:
        """Read a substance, and its solvent where one is named; water otherwise."""
        text = node.text[start:].strip()
        end = start + len(node.text[start:].rstrip())
        whole = self.catalogue.find(text)
        water = self.catalogue.by_key(_WATER)
        if whole is not None:
            return whole, water or whole
        parts = list(_IN.finditer(node.text, start, end))
        if not parts:
            self._unknown(node, start, end)
            return None
        cut = parts[-1]
        solute = self.substance(node, start, cut.start())
        solvent = self.substance(node, cut.end(), end)
        return (solute, solvent) if solute and solvent else None

    def substance(self, node: YamlText, start: int = 0, end: int | None = None) -> Substance | None:
        """Look up a substance named in part of a text; unknown is a finding."""
        stop = len(node.text) if end is None else end
        found = self.catalogue.find(node.text[start:stop].strip())
        if found is None:
            self._unknown(node, start, stop)
        return found

    def _unknown(self, node: YamlText, start: int, end: int) -> None:
        word = node.text[start:end].strip()
        self._add(
            codes.SUBSTANCE_UNKNOWN,
            node.part(start, end),
            f"`{word}` is not in the catalogue",
            did_you_mean(word, (w for w in self.catalogue.words() if w != word))
            or self._by_formula(word)
            or "add it to a file in `substances/`, or name it as the catalogue does",
        )

    def _by_formula(self, word: str) -> str | None:
        """Offer the substances of a formula that was written for a name."""
        formula = parse_formula(word)
        if not isinstance(formula, Formula):
            return None
        names = self.catalogue.with_atoms(formula)[:3]
        return "did you mean " + " or ".join(f"`{n}`" for n in names) + "?" if names else None

    def _provided(self, node: YamlText, end: int | None) -> Quantity | None:
        read = read_quantity(node.text[:end], measures=self.catalogue.measures)
        if isinstance(read, Fault):
            self.findings.append(texts.fault_at(node, read))
            return None
        if read.dimension == dim.NUMBER:
            self._add(
                codes.UNIT_MISSING,
                node.part(0, len(read.text)),
                f"`{read.text}` has no unit",
                f"write what a station is handed, as in `{read.text} g`",
            )
            return None
        if read.dimension not in (dim.MASS, dim.VOLUME, dim.AMOUNT, dim.COUNT):
            self._add(
                codes.DIMENSION_WRONG,
                node.part(0, len(read.text)),
                f"`{read.text}` is {read.dimension.words}; a mass or a volume belongs here",
                "write what a station is handed, as in `0.900 g`",
            )
            return None
        return read

    def _contains(self, node: YamlMapping, solvent_node: YamlText | None) -> Composition:
        solvent = self.substance(solvent_node) if solvent_node else None
        parts = []
        whole = True
        for entry in node:
            substance = self.substance(entry.key)
            quantity = self._part(entry.value)
            if substance is None or quantity is None:
                whole = False
            else:
                parts.append(Part(substance, quantity, entry.key.span))
        if not whole or not parts or (solvent_node and solvent is None):
            return Unknown("a mixture", declared=False)
        return self._based(node, parts, solvent)

    def _part(self, node: YamlNode) -> Quantity | None:
        if not isinstance(node, YamlText):
            self._add(
                codes.FIELD_UNFIT,
                node.span,
                "a part of a mixture takes a quantity",
                "write `{benzoic-acid: 1 mol, naphthalene: 1 mol}`",
            )
            return None
        read = read_quantity(node.text)
        if isinstance(read, Fault):
            self.findings.append(texts.fault_at(node, read))
            return None
        return read

    def _based(
        self, node: YamlMapping, parts: list[Part], solvent: Substance | None
    ) -> Composition:
        bases = {_BASES.get(p.quantity.dimension) or _strength_basis(p.quantity) for p in parts}
        if len(bases) == 1 and None not in bases:
            basis = next(iter(bases))
            if basis and (basis == "strength") == (solvent is not None):
                return Mixture(tuple(parts), basis, solvent)
        first = parts[0].quantity
        odd = next((p for p in parts if p.quantity.dimension != first.dimension), parts[0])
        if len(bases) > 1:
            message = f"`{first.text}` and `{odd.quantity.text}` are not of one kind"
            help_ = "give every part by amount, every part by mass, or every part by volume"
        elif solvent is not None:
            message = f"`{first.text}` is no strength, and a solvent is named"
            help_ = "give each part as a strength, as in `0.10 M`, or take `in:` out"
        else:
            message = f"`{first.text}` is {first.dimension.words}; a ratio belongs here"
            help_ = "write `1 mol`, `1 g` or `1 mL`, or name the solvent with `in:`"
        del node
        self._add(codes.DIMENSIONS_CLASH, odd.span, message, help_)
        return Unknown("a mixture", declared=False)

    def _secret(self, node: YamlMapping, as_: YamlText | None) -> Composition:
        candidates = {}
        for entry in node:
            if isinstance(entry.value, YamlText):
                substance = self.substance(entry.value)
                if substance is not None:
                    candidates[entry.key.text] = substance
            else:
                self._add(
                    codes.FIELD_UNFIT,
                    entry.value.span,
                    "a candidate is named by one substance",
                    "write `{A: caffeine, B: paracetamol}`",
                )
        strength, solvent = None, None
        if as_ is not None:
            strength, solvent = self._sample(as_)
        return Secret(candidates, strength, solvent)

    def _sample(self, node: YamlText) -> tuple[Strength | None, Substance | None]:
        scanned = scan_quantity(node.text, 0)
        if isinstance(scanned, Fault):
            self.findings.append(texts.fault_at(node, scanned))
            return None, None
        strength, at = None, 0
        if isinstance(scanned, Found):
            strength, at = self._strength(node, scanned.quantity), scanned.end
        rest = node.text[at:]
        found = re.match(r"\s*in\s+", rest)
        if found is None:
            if rest.strip():
                self._add(
                    codes.MATERIAL_NOT_READ,
                    node.part(at + len(rest) - len(rest.lstrip()), len(node.text)),
                    f"`{rest.strip()}` cannot stand here",
                    "write `as: 1 % w/v in ethanol`",
                )
            return strength, self.catalogue.by_key(_WATER)
        return strength, self.substance(node, at + found.end())

    def _add(self, code: Code, span: Span, message: str, help_: str) -> None:
        self.findings.append(Finding(code=code, span=span, message=message, help=help_))


def _text(mapping: YamlMapping | None, field: str) -> YamlText | None:
    """Give a field's text where there is one; a value of another kind is reported elsewhere."""
    node = mapping.get(field) if mapping is not None else None
    return node if isinstance(node, YamlText) and node.text.strip() else None


def _strength_basis(quantity: Quantity) -> str | None:
    if quantity.dimension in label.STRENGTHS and quantity.kind is not Kind.BOUND:
        return "strength"
    return None
