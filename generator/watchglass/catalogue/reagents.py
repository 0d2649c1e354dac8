"""What a stockroom holds to make stocks from: bottles by their labels, and what is usual of the trade.

A line of `reagents:` in `laboratory.yml` is a material with what else its label says behind commas:
`37 % w/w hydrochloric acid, 1.18 g/mL`, `sodium hydroxide, 97 % w/w`. A density belongs to what is
in the bottle. A strength behind a solution is its strength again, a share by mass behind a substance
its purity. How much the bottle holds, and other words, are remarks.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.base import codes
from watchglass.base import dimensions as dim
from watchglass.base.findings import Finding
from watchglass.base.scan import Fault, read_quantity, starts_quantity
from watchglass.base.yaml import YamlText
from watchglass.catalogue import texts

if TYPE_CHECKING:
    from collections.abc import Iterator

    from watchglass.base.quantities import Quantity

#: What a bottle holds is a remark.
_SIZES = (dim.MASS, dim.VOLUME, dim.COUNT)
#: What is said of a fact that no published source was found for.
PRACTICE = "common practice, no source"
#: What every text book has, so that no one source is named for it.
UNIVERSAL = "universal practice"


class Usual(NamedTuple):
    """A concentrated reagent as the trade sells it.

    Attributes:
        text: Its usual strength, as a material.
        strongest: The strongest sold, or empty where any is.
    """

    text: str
    strongest: str = ""


#: By key of the solute: what is taken where the store lists none of its own. Common practice, no
#: source: 37, 95–98, 68–70, 25–28 (and 35), 85 and 30 (to 50) % are what bottles are labelled.
USUAL = {
    "hydrogen-chloride": Usual("37 % w/w hydrochloric acid", "38 % w/w hydrochloric acid"),
    "sulfuric-acid": Usual("96 % w/w sulfuric acid", "98 % w/w sulfuric acid"),
    "nitric-acid": Usual("69 % w/w nitric acid"),
    "ammonia": Usual("28 % w/w ammonia", "35 % w/w ammonia"),
    "phosphoric-acid": Usual("85 % w/w phosphoric acid"),
    "hydrogen-peroxide": Usual("30 % w/w hydrogen peroxide", "50 % w/w hydrogen peroxide"),
}
#: Solutes whose concentrated solutions fume. Common practice, no source.
FUMING = frozenset(
    ("hydrogen-chloride", "nitric-acid", "ammonia", "acetic-acid", "hydrogen-bromide")
)
#: Acids that heat as they are diluted.
ACIDS = frozenset(("sulfuric-acid", "nitric-acid", "hydrogen-chloride"))
#: Of these the one that boils where water is poured on it.
BOILS_UP = "sulfuric-acid"
#: Solids that heat when they dissolve. Common practice, no source.
HEATING = frozenset(("sodium-hydroxide", "potassium-hydroxide", "calcium-chloride"))


class Label(NamedTuple):
    """What a line of `reagents:` says.

    Attributes:
        described: The material.
        density: Its density, as written, or None.
        strength: Its strength again, or the purity of a substance without one, as written, or None.
    """

    described: YamlText
    density: YamlText | None = None
    strength: YamlText | None = None


def read_reagent(node: YamlText, findings: list[Finding]) -> Label:
    """Part a line of `reagents:` at its commas; a figure that has no place there is a finding."""
    parts = list(_parts(node))
    density: YamlText | None = None
    strength: YamlText | None = None
    for part in parts[1:]:
        if not starts_quantity(part.text, 0):
            continue
        read = read_quantity(part.text)
        if isinstance(read, Fault):
            findings.append(texts.fault_at(part, read))
        elif read.dimension == dim.MASS_CONCENTRATION:
            density = part
        elif read.dimension in (dim.MASS_FRACTION, dim.CONCENTRATION, dim.SHARE):
            strength = part
        elif read.dimension not in _SIZES:
            findings.append(_no_place(part, read))
    return Label(parts[0], density, strength)


def read_purity(node: YamlText, findings: list[Finding]) -> float | None:
    """Read the purity of a substance, a share by mass [-]; a bare per cent is of mass, too."""
    read = read_quantity(node.text)
    if isinstance(read, Fault):
        return None  # said already
    if read.dimension in (dim.MASS_FRACTION, dim.SHARE) and 0 < read.middle <= 1:
        return read.middle
    findings.append(_no_place(node, read))
    return None


def _no_place(part: YamlText, read: Quantity) -> Finding:
    return Finding(
        code=codes.FIELD_UNFIT,
        span=part.span,
        message=f"`{read.text}` is neither a density nor a purity",
        help="behind a reagent stands its density, as `1.18 g/mL`, or its purity, as `97 % w/w`",
    )


def _parts(node: YamlText) -> Iterator[YamlText]:
    """Part a text at commas that are followed by a blank; names of substances have none."""
    start = 0
    for piece in node.text.split(", "):
        left = start + len(piece) - len(piece.lstrip())
        right = start + len(piece.rstrip())
        yield YamlText(node.text[left:right], node.part(left, right))
        start += len(piece) + 2
