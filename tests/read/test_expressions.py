"""Expressions: what binds tighter, what a word ties, and each fault at its place."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest
from hypothesis import given
from hypothesis import strategies as st

from read.mark_shapes import MEASURES, expressed, spans
from watchglass.base.spans import Source
from watchglass.read.expressions import DEEPEST, MOST_OPERATORS, read_expression

if TYPE_CHECKING:
    from watchglass.base.findings import Finding
    from watchglass.read.terms import Expression


def read(text: str) -> tuple[Expression | None, tuple[Finding, ...], Source]:
    source = Source.of("a.md", "expect: " + text)
    expression, findings = read_expression(source, 8, 8 + len(text), MEASURES)
    return expression, findings, source


# fmt: off
READ = [
    ("1 + 2 * 3", "(1 + (2 * 3))"),
    ("1 * 2 + 3", "((1 * 2) + 3)"),
    ("1 - 2 - 3", "((1 - 2) - 3)"),
    ("1 / 2 / 3", "((1 / 2) / 3)"),
    ("2 ^ 3 ^ 2", "(2 ^ (3 ^ 2))"),
    ("- a ^ 2", "(minus (a ^ 2))"),
    ("-a * b", "((minus a) * b)"),
    ("a * -b", "(a * (minus b))"),
    ("2 ^ -1", "(2 ^ -1)"),
    ("(1 + 2) * 3", "((1 + 2) * 3)"),
    ("6 g/mL * 2 mL", "(6 g/mL * 2 mL)"),
    ("6 g / 2 mL", "(6 g / 2 mL)"),
    ("5 g × 2", "(5 g * 2)"),
    ("5 g · 2", "(5 g * 2)"),
    ("3 × 4", "(3 * 4)"),
    ("a >= 95 %", "(a >= 95 %)"),
    ("a ≥ 5 g + 1 g", "(a >= (5 g + 1 g))"),
    ("benzocaine in A >= 95 %", "((benzocaine held-in A) >= 95 %)"),
    ("benzocaine in A after label(end) >= 95 %", "(((benzocaine held-in A) after label(end)) >= 95 %)"),
    ("pH of A in 9–11", "(pH(A) within 9–11)"),
    ("pH of A after label(x) in 9–11", "((pH(A) after label(x)) within 9–11)"),
    ("ph(A) in 9–11", "(ph(A) within 9–11)"),
    ("titre(end) in 20–45 mL", "(titre(end) within 20–45 mL)"),
    ("recovered(benzocaine in A) / 2", "(recovered((benzocaine held-in A)) / 2)"),
    ("recovered(X on paper) after label(y) >= 1 g", "((recovered((X held-in paper)) after label(y)) >= 1 g)"),
    ("fraction(X in V)", "fraction((X held-in V))"),
    ("mean(a, b, c)", "mean(a, b, c)"),
    ("moles(2.00 g benzoic-acid)", "moles(amount(2.00 g, benzoic-acid))"),
    ("mass(standard) / volume(titrant)", "(mass(standard) / volume(titrant))"),
    ('molar-mass("iron(III) chloride")', "molar-mass(<iron(III) chloride>)"),
    ("balance(C2H6 + (O2) -> CO2)", "balance(<C2H6 + (O2) -> CO2>)"),
    ("round(3.14159, 2)", "round(3.14159, 2)"),
    ("convert(5 g in mg)", "convert((5 g held-in mg))"),
    ("convert(5 g, mg)", "convert(5 g, <mg>)"),
    ("convert(v, J/(g·K)) + 1", "(convert(v, <J/(g·K)>) + 1)"),
    ("convert(v, °C)", "convert(v, <°C>)"),
    ("a - b", "(a - b)"),
    ("a-b", "a-b"),
    ("a − b", "(a - b)"),
    ("5 g - 3 g", "(5 g - 3 g)"),
    ("5 - 3", "(5 - 3)"),
    ("-5 °C + 10 K", "(-5 °C + 10 K)"),
    ("1.5 × 10^3 mL * 2", "(1.5 × 10^3 mL * 2)"),
    ("mass of standard", "mass(standard)"),
    ("a of b", "a(b)"),
    ("X in V in 1–2", "((X held-in V) within 1–2)"),
    ("X in 5 g", "(X within 5 g)"),
    ("X in V - 1", "((X held-in V) - 1)"),
    ("pH of A", "pH(A)"),
    ("a in mL", "(a held-in mL)"),
    ("(-2) ^ 2", "(-2 ^ 2)"),
    ("2 ^ 2", "(2 ^ 2)"),
    ("- (2 ^ 2)", "(minus (2 ^ 2))"),
    ("3–5 mL", "3–5 mL"),
    ("X in 3-5 mL", "(X within 3-5 mL)"),
    ("- 2 ^ 2", "(minus (2 ^ 2))"),
]
FAULTS = [
    ("-2 ^ 2", "N119", "-2", "`-2 ^` does not say whether the sign is raised too"),
    ("3 x 4", "N119", "x 4", "`x 4` cannot follow a whole expression"),
    ("a < b < c", "N119", "<", "two comparisons stand in one expression"),
    ("moles(all benzoic-acid)", "N119", "(", "`,` or `)` is expected at `benzoic-acid)`"),
    ("a −b", "N119", "−", "a minus sign needs a blank on both sides"),
    ("5 g -3 g", "N119", "-", "a minus sign needs a blank on both sides"),
    ("5 -3", "N119", "-", "a minus sign needs a blank on both sides"),
    ("5-3", "N119", "5-3", "`5-3` can be a range or a difference"),
    ("half a", "N119", "a", "`a` cannot follow a whole expression"),
    ("5 of a", "N119", "of", "`of` follows a function's name, as in `pH of A`"),
    ("A.aqueous", "N119", ".aqueous", "`.aqueous` cannot follow a whole expression"),
    ("pH of A.aqueous", "N119", ".aqueous", "`.aqueous` cannot follow a whole expression"),
    ("X in A.aqueous", "N119", ".aqueous", "`.aqueous` cannot follow a whole expression"),
    ("melts(benzoic-acid) in °C", "N119", "°", "`°` cannot stand here"),
    ("(a", "N119", "(", "`(` opens here and never closes"),
    ("a)", "N119", ")", "`)` cannot follow a whole expression"),
    ("a +", "N119", "+", "the expression ends too early"),
    ("* a", "N119", "*", "`*` cannot stand here"),
    ("a b", "N119", "b", "`b` cannot follow a whole expression"),
    ("a,b", "N119", ",b", "`,b` cannot follow a whole expression"),
    ("f(a,)", "N119", ")", "`)` cannot stand here"),
    ("f(,a)", "N119", ",", "`,` cannot stand here"),
    ("convert(v,)", "N119", ")", "something is expected at `)`"),
    ("a ** b", "N119", "**", "`**` is no operator here"),
    ("a // b", "N119", "/", "`/` cannot stand here"),
    ("a = b", "N119", "= b", "`= b` cannot follow a whole expression"),
    ("a == b", "N119", "== b", "`== b` cannot follow a whole expression"),
    ("a != b", "N119", "!= b", "`!= b` cannot follow a whole expression"),
    ("a and b", "N119", "and b", "`and b` cannot follow a whole expression"),
    ('"x', "N111", '"', "a quote opens and never closes"),
    ("1 +", "N119", "+", "the expression ends too early"),
    ("5 g 3 g", "N119", "3 g", "`3 g` cannot follow a whole expression"),
    ("()", "N119", ")", "`)` cannot stand here"),
    ("X in A in 1–2 > 3", "N119", ">", "two comparisons stand in one expression"),
    ("3-5", "N119", "3-5", "`3-5` can be a range or a difference"),
    ("3-5 mL * 2", "N119", "3-5", "`3-5` can be a range or a difference"),
    ("1 < X in 1–2", "N119", "X in 1–2", "two comparisons stand in one expression"),
    ("", "N119", ":", "the expression ends too early"),
]
# fmt: on


@pytest.mark.parametrize(("text", "brackets"), READ)
def test_expression_is_read_as_with_all_its_brackets(text: str, brackets: str) -> None:
    expression, findings, _ = read(text)

    assert findings == ()
    assert expression is not None
    assert expressed(expression) == brackets


@pytest.mark.parametrize(("text", "code", "marked", "message"), FAULTS)
def test_faulty_expression_gives_one_finding_in_its_place(
    text: str, code: str, marked: str, message: str
) -> None:
    expression, (finding,), _ = read(text)

    assert expression is None
    assert (finding.code.number, finding.span.text) == (code, marked)
    assert finding.message == message


@pytest.mark.parametrize("text", [text for text, _ in READ])
def test_node_covers_just_what_it_was_read_from(text: str) -> None:
    expression, _, source = read(text)
    assert expression is not None
    covered = {source.text[span.start : span.end] for span in spans(expression)}

    assert all(part in text for part in covered)
    assert expression.span.text.strip("() ") == text.strip("() ")


def test_as_many_brackets_as_allowed_are_read() -> None:
    text = "(" * (DEEPEST - 1) + "1" + ")" * (DEEPEST - 1)

    assert read(text)[1] == ()
    assert [f.code.number for f in read(f"({text})")[1]] == ["N119"]


def test_as_many_operators_as_allowed_are_read() -> None:
    text = " + ".join("1" * (MOST_OPERATORS + 1))

    assert read(text)[1] == ()
    assert [f.message for f in read(text + " + 1")[1]] == [
        f"the expression has more than {MOST_OPERATORS} operators"
    ]


_PIECES = st.sampled_from(
    ["1", "2.5", "5 g", "15 mL", "9–11", "80 %", "-3", "A", "acid", "2-propanol", "pH", "mass", "label",
     "titre", "(", ")", ",", " + ", " - ", "-", "*", "/", "^", "**", "->", ">=", "<", "≤", " in ", " on ",
     " of ", " after ", '"x"', '"', ".", "=", " ", "\xa0", "é", "½", "1,5", "balance(", "6 N", "°"]
)  # fmt: skip


@given(st.lists(_PIECES, max_size=14).map("".join))
def test_heap_of_pieces_is_read_or_refused_in_its_place(text: str) -> None:
    expression, findings, _ = read(text)
    places = [*spans(expression), *(f.span for f in findings)]

    assert (expression is None) == (len(findings) == 1)
    assert all(0 <= p.start < p.end <= 8 + len(text) for p in places)


@given(st.text(max_size=50))
def test_any_text_is_read_or_refused_in_its_place(text: str) -> None:
    expression, findings, source = read(text)
    places = [*spans(expression), *(f.span for f in findings)]

    assert (expression is None) == (len(findings) == 1)
    assert all(0 <= p.start < p.end <= len(source.text) for p in places)
