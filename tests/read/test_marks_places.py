"""Where the parts of a mark stand; and no text between braces that stops the program."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from read.mark_shapes import read, spans
from watchglass.read import syntax
from watchglass.read.words import CLAUSE_WORDS, CLOSURES, OTHER_ACTS, PARTS, SETTINGS, VERBS


def act(mark: str) -> syntax.Act:
    (only,) = read(mark).acts
    return only


def test_charge_stands_in_its_parts() -> None:
    read_ = act("  15 mL of acid + all water by cylinder -> funnel.lower, open ")
    assert isinstance(read_, syntax.ChargeAct)
    first, second = read_.amounts
    assert isinstance(first.measure, syntax.Measured)

    assert read_.span.text == "15 mL of acid + all water by cylinder -> funnel.lower, open"
    assert (first.span.text, first.measure.span.text, first.material.span.text) == (
        "15 mL of acid",
        "15 mL",
        "acid",
    )
    assert (second.span.text, second.material.span.text) == ("all water", "water")
    assert (read_.target.span.text, read_.target.name.span.text) == ("funnel.lower", "funnel")
    assert [clause.span.text for clause in read_.clauses] == ["by cylinder", "open"]


def test_amount_by_the_amount_of_another_stands_in_its_parts() -> None:
    read_ = act("12 mL ethanol per g crude -> A")
    assert isinstance(read_, syntax.ChargeAct)
    (amount,) = read_.amounts
    assert amount.per is not None

    assert amount.span.text == "12 mL ethanol per g crude"
    assert (amount.per[0].span.text, amount.per[1].span.text) == ("g", "crude")


def test_verb_stands_in_its_parts() -> None:
    read_ = act('adjust A to pH 4–5 with 5 mL alkali until "it clears", on steam')
    assert isinstance(read_, syntax.VerbAct)

    assert read_.verb_span.text == "adjust"
    assert [clause.span.text for clause in read_.clauses] == [
        "to pH 4–5",
        "with 5 mL alkali",
        'until "it clears"',
        "on steam",
    ]
    assert [clause.value.span.text for clause in read_.clauses] == [
        "pH 4–5",
        "5 mL alkali",
        '"it clears"',
        "on steam",
    ]


def test_outcome_supposed_stands_in_its_parts() -> None:
    read_ = act("suppose 80 % salt in A is solid:  mean of last year ")
    assert isinstance(read_, syntax.VerbAct)

    assert [clause.span.text for clause in read_.clauses] == ["in A", "solid", "mean of last year"]


def test_repetition_stands_in_its_parts() -> None:
    read_ = act("again 3 – 4, washing, 2 more times with B, C as A")
    assert isinstance(read_, syntax.AgainAct)

    assert [item.span.text for item in read_.steps] == ["3 – 4", "washing"]
    assert [(n.span.text, o.span.text) for n, o in read_.exchanges] == [("B", "A"), ("C", "A")]


def test_record_stands_in_its_parts() -> None:
    read_ = act("? m: mass of salt in mg = mass(salt) / 2")
    assert isinstance(read_, syntax.RecordAct)
    assert read_.name is not None
    assert read_.unit is not None
    assert read_.expression is not None

    assert (read_.name.span.text, read_.unit.span.text) == ("m", "mg")
    assert read_.expression.span.text == "mass(salt) / 2"


def test_second_act_is_counted_from_the_file() -> None:
    acts = read("stir A; vent B").acts

    assert [a.span.text for a in acts] == ["stir A", "vent B"]
    assert acts[1].span.start == len("Now {stir A; ")


_WORDS = st.sampled_from(
    [*sorted(VERBS), *sorted(OTHER_ACTS), *sorted(CLAUSE_WORDS), *CLOSURES, *SETTINGS, *sorted(PARTS),
     "A", "tube-1", "acid", "2-propanol", "5", "5 g", "15 mL", "65 °C", "2–3", "80 %", "ca. 5 mL", "pH",
     "pH 7", "->", "→", "+", "-", " - ", "*", "/", "^", "(", ")", ",", ";", ".", "=", "?", ":", '"', '"x"',
     "per", "of", "all", "half", "rest", "more times", "at most", "fresh", "is", "after", ">=", "<", "{",
     "mass(", "balance(", "in g", "in 1", "1,5", "6 N", "½", "°", "\xa0", "é", "🧪", "0", "-5 K", "period"]
)  # fmt: skip


def _faults_of(inside: str) -> list[str]:
    """Read a mark and list what breaks a law: a place outside it, a fault without its broken act."""
    found = read(inside)
    start, end = len("Now "), len("Now {") + len(inside) + 1
    wrong = [
        f"{span.start}-{span.end} of {node}"
        for node in (*found.acts, *found.findings)
        for span in spans(node if isinstance(node, tuple) else node.span)
        if not start <= span.start <= span.end <= end
    ]
    broken = sum(isinstance(a, syntax.BrokenAct) for a in found.acts)
    if broken != len(found.findings):
        wrong.append(f"{broken} broken acts, {len(found.findings)} findings")
    wrong += [f"empty place: {f.message}" for f in found.findings if not f.span.text]
    return wrong


@given(st.lists(_WORDS, max_size=12).map(" ".join))
def test_heap_of_words_is_read_or_refused_within_its_braces(inside: str) -> None:
    assert _faults_of(inside) == []


@given(st.lists(_WORDS, max_size=12).map("".join))
def test_heap_of_glued_words_is_read_or_refused_within_its_braces(inside: str) -> None:
    assert _faults_of(inside) == []


@given(st.text(st.characters(exclude_characters="\n"), max_size=60))
def test_any_text_is_read_or_refused_within_its_braces(inside: str) -> None:
    assert _faults_of(inside) == []


@pytest.mark.parametrize("opening", ["(", "-", "mass(", "- (", "2 + ("])
@pytest.mark.parametrize("count", [50, 5000])
def test_deep_expression_is_refused_and_not_followed(opening: str, count: int) -> None:
    (finding,) = read("= " + opening * count + "5 g").findings

    assert finding.code.number == "N119"


@pytest.mark.parametrize(
    "inside",
    ["= " + "1 + " * 3000 + "1", "= " + "2 ^ " * 3000 + "2", "stir A" + ", open" * 3000,
     "5 g a + " * 3000 + "5 g a -> A", "again " + "3, " * 3000 + "3", ";" * 3000],
    ids=["sum", "powers", "closures", "amounts", "steps", "semicolons"],
)  # fmt: skip
def test_long_mark_is_read_or_refused(inside: str) -> None:
    assert _faults_of(inside) == []
