"""Terms and expressions: the nodes that marks and expressions share."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from watchglass.base.quantities import Quantity
    from watchglass.base.spans import Span


class Name(NamedTuple):
    """A name as written: local name or catalogue key; `quoted` where it stood in double quotes."""

    text: str
    span: Span
    quoted: bool = False


class Measured(NamedTuple):
    """A quantity with its place."""

    quantity: Quantity
    span: Span


class Words(NamedTuple):
    """Text in double quotes or plain words, as after `until`."""

    text: str
    span: Span


class Call(NamedTuple):
    """A function with its arguments; `pH of A` is `ph(A)`."""

    function: Name
    arguments: tuple[Expression, ...]
    span: Span


class Binary(NamedTuple):
    """`+ - * / ^` between two expressions; `*` for every sign of multiplication."""

    operator: str
    left: Expression
    right: Expression
    span: Span


class Negative(NamedTuple):
    """A minus sign before an expression."""

    operand: Expression
    span: Span


class Compare(NamedTuple):
    """`>= > <= <` between two expressions."""

    operator: str
    left: Expression
    right: Expression
    span: Span


class Within(NamedTuple):
    """`… in 9–11`: a value lies in a range."""

    operand: Expression
    range: Measured
    span: Span


class Held(NamedTuple):
    """`X in V` or `X on V`: a substance in a vessel."""

    substance: Expression
    vessel: Expression
    span: Span


class After(NamedTuple):
    """`… after label(x)`: a value at the state with that label."""

    operand: Expression
    state: Expression
    span: Span


Expression = Measured | Name | Words | Call | Binary | Negative | Compare | Within | Held | After
