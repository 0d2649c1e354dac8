"""Each finding of reading Markdown, at its exact place; and what is none."""

from __future__ import annotations

import pytest

from read.markdown_trees import places, read, stand_in, walk
from watchglass.base import codes
from watchglass.base.findings import Finding
from watchglass.base.spans import Source
from watchglass.read import syntax
from watchglass.read.markdown import MAX_CHARACTERS, read_body

BRACES = {
    "a {b c\nd": ["1:3 mark-not-closed {b c"],
    "{a\nb}": ["1:1 mark-not-closed {a"],
    "{{a}}": ["1:1 mark-not-closed {"],
    "{a {b}": ["1:1 mark-not-closed {a"],
    "a } b": ["1:3 brace-alone }"],
    "{a}}": ["1:4 brace-alone }"],
    r"\{a\} \\{b}": [],
    '{a "}" b}': [],
    '{a "b} c': [],
    "`{` {a}": [],
    "[x](u{v})": ["1:6 mark-lost {v}"],
    "[x](u '{v}')": ["1:8 mark-lost {v}"],
    "![y{z}](w)": ["1:4 mark-lost {z}"],
    "<http://e.x/{f}>": ["1:13 mark-lost {f}"],
    "[a {b} *c {d}*]{e}": ["1:4 mark-lost {b}", "1:11 mark-lost {d}"],
    "| {a | b} |\n|--|--|": ["1:3 mark-lost {a | b}"],
    "| {a \\| b} |\n|--|": [],
    "|a|\n|-|\n|b|{c}|": ["3:4 mark-lost {c}"],
    "[r]: /u{v}": ["1:8 mark-lost {v}"],
    "``` {r}\nx\n```": ["1:5 mark-lost {r}"],
    "~~~\n{s}\n~~~": [],
    "a\n\n    {b}\n    {c}": ["3:5 mark-lost {b}"],
    "a\n    {b}": [],
    ":::record {a}\n:::": ["1:11 mark-lost {a}"],
}


@pytest.mark.parametrize("text", BRACES)
def test_every_brace_is_read_or_reported_once(text: str) -> None:
    assert places(text) == BRACES[text]


BLOCKS = {
    ":::instuctor\na\n:::": ["1:4 block-unknown instuctor"],
    ":::caution\na": ["1:1 block-not-closed :::caution"],
    "a\n:::": ["2:1 block-end-alone :::"],
    ":::answer\na\n:::": ["1:1 answer-alone :::answer"],
    ":::question\n- :::answer\n  a\n  :::\n:::": [],
    ":::record lots\n:::": ["1:11 block-argument lots"],
    ":::record 201 rows\n:::": ["1:11 block-argument 201 rows"],
    ":::record 0 rows\n:::": ["1:11 block-argument 0 rows"],
    ":::record 1 row\n:::": [],
    ":::record 200 rows\n:::": [],
    ":::record\n:::": [],
    ":::charge pipette\n:::": ["1:11 block-argument pipette"],
    ":::charge by pipette\n:::": [],
    ":::if\n:::": ["1:1 block-argument :::if"],
    ":::if , expected\n:::": ["1:7 block-argument , expected"],
    ":::if it is dry, expected\n:::": [],
    ":::caution hot\n:::": ["1:12 block-argument hot"],
    "> :::caution\n> a\n:::": ["1:3 block-not-closed :::caution"],
    ":::question\n1. a\n   :::": ["1:1 block-not-closed :::question"],
    "words\n:::caution\na\n:::\nwords": [],
    "```\n:::caution\n```": [],
}


@pytest.mark.parametrize("text", BLOCKS)
def test_faults_of_a_block_are_reported_once_each(text: str) -> None:
    assert places(text) == BLOCKS[text]


STEPS = {
    "1. a\n3. b\n4. c\n6. d": ["2:1 step-number-differs 3.", "4:1 step-number-differs 6."],
    "1. a\n1. b\n1. c": ["2:1 step-number-differs 1."],
    "2. a\n3. b": ["1:1 step-number-differs 2."],
    "1) a\n3) b": ["2:1 step-number-differs 3)"],
    "1. a\n\n## B\n\n1. b\n2. c": ["5:1 step-number-differs 1."],
    "1. a\n   5. b\n2. c": [],
    "1. a\n3. b\n3. c\n5. d": ["2:1 step-number-differs 3.", "4:1 step-number-differs 5."],
}


@pytest.mark.parametrize("text", STEPS)
def test_one_slip_in_numbering_is_reported_once(text: str) -> None:
    assert places(text) == STEPS[text]


def test_finding_says_what_was_typed_and_what_to_type() -> None:
    (finding,) = read("1. a\n7. b")[2]

    assert (finding.message, finding.help) == ("step is typed `7.`, counted 2", "type `2.`")
    assert finding.related[0].span.text == "1."


def test_misspelt_block_names_the_nearest_kind() -> None:
    (finding,) = read(":::instuctor\n:::")[2]

    assert finding.message == "`instuctor` is no kind of block"
    assert finding.help == "did you mean `instructor`?"


def test_mark_over_two_lines_asks_for_one_line() -> None:
    (finding,) = read("{15 mL\nacid -> A}")[2]

    assert finding.help == "write the whole mark on one line"


def test_what_was_found_in_a_lost_mark_is_forgotten() -> None:
    def complain(
        source: Source, start: int, end: int
    ) -> tuple[tuple[syntax.Act, ...], tuple[Finding, ...]]:
        finding = Finding(code=codes.MARK_NOT_READ, span=source.span(start, end), message="no")
        return (), (finding,)

    source = Source.of("t.md", "[a {b}]{c}")
    _, marks, findings = read_body(source, 0, complain)

    assert marks == 1
    assert [(f.code.name, f.span.text) for f in findings] == [
        ("mark-lost", "{b}"),
        ("mark-not-read", "c"),
    ]


DEEP = {
    "> " * 40 + "{x}": "1:65 nested-too-deeply",
    "".join("  " * level + "- a\n" for level in range(40)): "33:65 nested-too-deeply",
    ":::if a\n" * 33 + ":::\n" * 33: "33:1 nested-too-deeply",
    "*a " * 33 + "b*" * 33: "1:1 nested-too-deeply",
    "![" * 33 + "a" + "](u)" * 33: "1:1 nested-too-deeply",
}


@pytest.mark.parametrize("text", DEEP, ids=("quotes", "lists", "blocks", "emphasis", "pictures"))
def test_nesting_beyond_the_bound_is_reported_once_and_kept_as_text(text: str) -> None:
    assert [" ".join(place.split(" ")[:2]) for place in places(text)] == [DEEP[text]]
    assert any(isinstance(node, syntax.Text) for node in walk(read(text)[1]))


def test_marks_beyond_the_bound_are_text_and_reported_once() -> None:
    source = Source.of("t.md", "{a} " * 5002)
    blocks, marks, findings = read_body(source, 0, stand_in)

    assert marks == 5000
    assert [(f.code.name, f.span.start) for f in findings] == [("too-many-marks", 20000)]
    assert sum(isinstance(node, syntax.Marked) for node in walk(blocks)) == 5000


def test_file_beyond_the_bound_is_not_read() -> None:
    source = Source.of("t.md", "---\n---\nfirst\n" + "a" * MAX_CHARACTERS)
    blocks, marks, findings = read_body(source, 8, stand_in)

    assert (blocks, marks) == ((), 0)
    assert [(f.code.name, f.span.text) for f in findings] == [("source-too-large", "first")]


UNSAFE = ("javascript:x", "JaVaScRiPt:x", "java&#9;script:x", "vbscript:x", "file:///x", "data:x")


@pytest.mark.parametrize("target", UNSAFE)
def test_address_that_runs_something_makes_no_link(target: str) -> None:
    _, blocks, _ = read(f"[a]({target}) [b]\n\n[b]: {target}")

    assert not any(isinstance(node, syntax.Link) for node in walk(blocks))


@pytest.mark.parametrize(
    "sign", ["[", "*", "_", "`", "{", "}", ">", ":::\n", "![", "&", "<a:", "|"]
)
def test_heap_of_one_sign_is_read_to_its_end(sign: str) -> None:
    source, blocks, _ = read(sign * 20_000)

    assert all(0 <= node.span.end <= len(source.text) for node in walk(blocks))
