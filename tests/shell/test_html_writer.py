"""Models as HTML: exact texts, escaping, addresses, and what a student page may not hold."""

from __future__ import annotations

import re

import pytest
from hypothesis import given
from hypothesis import strategies as st

from shell.site_builder import Reading
from watchglass.publish import model as m
from watchglass.shell.site.html import NotForStudents, Writer

STUDENT = Writer("../", instructor=False)
INSTRUCTOR = Writer("../", instructor=True)
HOSTILE = """<script>alert("1")</script>&amp;'"""
SCHEME = re.compile(r"[\x00-\x20]*([A-Za-z][A-Za-z0-9+.\-]*)[\x00-\x20]*:")
ESCAPED = "&lt;script&gt;alert(&quot;1&quot;)&lt;/script&gt;&amp;amp;&#x27;"


@pytest.mark.parametrize(
    ("word", "html"),
    [
        (m.Run("a < b"), "a &lt; b"),
        (m.Raised("2"), "<sup>2</sup>"),
        (m.Lowered("2"), "<sub>2</sub>"),
        (m.LineEnd(), "<br>"),
        (m.CodeRun("x"), "<code>x</code>"),
        (m.Stress(strong=False, children=(m.Run("x"),)), "<em>x</em>"),
        (m.Stress(strong=True, children=(m.Run("x"),)), "<strong>x</strong>"),
        (m.Said("vessel", (m.Run("A"),)), '<span class="said said-vessel">A</span>'),
        (m.Said('"x', (m.Run("A"),)), '<span class="said">A</span>'),
        (m.Picture("pages/a.png", "a"), '<img src="../pages/a.png" alt="a">'),
    ],
)
def test_word_is_written(word: m.Words, html: str) -> None:
    assert STUDENT.words((word,)) == html


def test_blank_has_label_line_and_unit() -> None:
    blank = m.Blank("record-m", "mass", (m.Run("g"),))

    assert STUDENT.words((blank,)) == (
        '<span class="blank" id="record-m"><span class="blank-label">mass</span> '
        '<span class="unseen">(blank to fill in)</span>'
        '<span class="blank-place"><span class="blank-lines"><span class="blank-line"></span></span>'
        ' <span class="blank-unit">g</span></span></span>'
    )


def test_blank_of_three_runs_has_three_lines() -> None:
    html = STUDENT.words((m.Blank("a", "mass", (), 3),))

    assert html.count('class="blank-line"') == 3
    assert "(3 blanks to fill in)" in html


@pytest.mark.parametrize(
    ("expected", "said"),
    [((m.Run("2 g"),), "2 g"), (None, "not assessed")],
)
def test_expected_value_stands_beside_its_blank(
    expected: tuple[m.Words, ...] | None, said: str
) -> None:
    blank = m.Blank("a", "mass", ())
    html = INSTRUCTOR.words((m.ExpectedBlank(blank, expected),))

    assert html == (
        INSTRUCTOR.words((blank,))
        + f' <span class="expected"><span class="expected-name">expected:</span> {said}</span>'
    )


def test_steps_carry_number_and_address() -> None:
    steps = m.StepList((m.StepItem(4, "step-4", (m.Para((m.Run("Stir."),)),)),))

    assert STUDENT.blocks((steps,)) == (
        '<ol class="steps" role="list">\n<li class="step" id="step-4" value="4">'
        '<p class="step-number"><span class="unseen">Step </span>4</p>'
        '<div class="step-body">\n<p>Stir.</p>\n</div></li>\n</ol>'
    )


@pytest.mark.parametrize(
    ("block", "html"),
    [
        (m.Para((m.Run("a"),)), "<p>a</p>"),
        (m.Title(3, "a-b", (m.Run("A b"),)), '<h3 id="a-b">A b</h3>'),
        (m.Title(1, "a", (m.Run("A"),)), '<h2 id="a">A</h2>'),
        (m.Divider(), "<hr>"),
        (m.Listing("a<b"), '<pre class="listing"><code>a&lt;b</code></pre>'),
        (m.Quoted((m.Para((m.Run("a"),)),)), "<blockquote>\n<p>a</p>\n</blockquote>"),
        (m.ItemList(None, ((m.Para((m.Run("a"),)),),)), "<ul>\n<li>a</li>\n</ul>"),
        (m.ItemList(3, ((m.Para((m.Run("a"),)),),)), '<ol start="3">\n<li>a</li>\n</ol>'),
        (
            m.Panel("caution", (m.Para((m.Run("Hot."),)),)),
            (
                '<section class="panel panel-caution" role="note" aria-label="Caution">\n'
                '<p class="panel-name">Caution</p>\n<p>Hot.</p>\n</section>'
            ),
        ),
    ],
)
def test_block_is_written(block: m.Blocks, html: str) -> None:
    assert STUDENT.blocks((block,)) == html


def test_items_of_several_paragraphs_keep_them() -> None:
    item = (m.Para((m.Run("a"),)), m.Para((m.Run("b"),)))

    assert (
        STUDENT.blocks((m.ItemList(None, (item,)),)) == "<ul>\n<li><p>a</p>\n<p>b</p></li>\n</ul>"
    )


def test_table_names_its_columns_and_can_be_reached_from_the_keyboard() -> None:
    grid = m.Grid((None, "right"), ((m.Run("A"),), (m.Run("B"),)), (((m.Run("1"),), ()),))

    assert STUDENT.blocks((grid,)) == (
        '<div class="scrolled" role="group" tabindex="0" aria-label="Table: A, B">\n'
        '<table class="grid">\n<thead><tr><th scope="col">A</th>'
        '<th scope="col" class="to-right">B</th></tr></thead>\n'
        '<tbody>\n<tr><td>1</td><td class="to-right"></td></tr>\n</tbody>\n</table>\n</div>'
    )


def test_table_to_fill_has_ruled_cells_and_more_rows() -> None:
    grid = m.Grid(
        (None, None), ((m.Run("A"),), ()), (((m.Run("1"),), ()),), fill=True, blank_rows=2
    )
    html = STUDENT.blocks((grid,))

    assert html.count("<tr>") == 4
    assert html.count('<td class="to-fill"><span class="unseen">to fill in</span></td>') == 5


# ------------------------------------------------------------------------------ addresses


@pytest.mark.parametrize(
    ("target", "href"),
    [
        ("procedures/oc-04.html#step-4", "../procedures/oc-04.html#step-4"),
        ("#step-4", "#step-4"),
        ("a b.html", "../a%20b.html"),
    ],
)
def test_link_into_the_handbook_is_relative_to_the_page(target: str, href: str) -> None:
    link = m.LinkTo(target, local=True, children=(m.Run("x"),))

    assert STUDENT.words((link,)) == f'<a href="{href}">x</a>'


@pytest.mark.parametrize(
    "target", ["https://example.org/a?b=1", "http://example.org", "MAILTO:a@example.org"]
)
def test_link_outside_is_kept(target: str) -> None:
    link = m.LinkTo(target, local=False, children=(m.Run("x"),))

    assert STUDENT.words((link,)) == f'<a class="outside" href="{target}">x</a>'


@pytest.mark.parametrize("local", [True, False])
@pytest.mark.parametrize(
    "target",
    [
        "javascript:alert(1)",
        "JaVaScRiPt:alert(1)",
        " javascript:alert(1)",
        "java\tscript:alert(1)",
        "java\nscript:alert(1)",
        "\x01javascript:alert(1)",
        "data:text/html,x",
        "vbscript:x",
        "file:///etc/passwd",
        "//example.org/x",
        "\\\\example.org\\x",
        "/\\example.org",
        "",
    ],
)
def test_harmful_address_becomes_plain_words(target: str, *, local: bool) -> None:
    link = m.LinkTo(target, local=local, children=(m.Run("x"),))
    picture = m.Picture(target, "y")

    assert STUDENT.words((link, picture)) == "xy"


def test_picture_from_elsewhere_is_linked_not_fetched() -> None:
    picture = m.Picture("https://example.org/a.png", "a & b")

    assert STUDENT.words((picture,)) == (
        '<a class="outside" href="https://example.org/a.png">a &amp; b</a>'
    )


# ------------------------------------------------------------------------------ what may not be


@pytest.mark.parametrize(
    "word",
    [
        m.Run(HOSTILE),
        m.Raised(HOSTILE),
        m.Lowered(HOSTILE),
        m.CodeRun(HOSTILE),
        m.Picture("a.png", HOSTILE),
        m.Blank("a", HOSTILE, ()),
        m.Blank(HOSTILE, "a", ()),
        m.LinkTo(f"#{HOSTILE.replace(' ', '')}", local=True, children=()),
        m.LinkTo(f"https://{HOSTILE}", local=False, children=()),
    ],
)
def test_hostile_words_come_out_escaped(word: m.Words) -> None:
    html = STUDENT.words((word,))

    assert ESCAPED in html
    assert "script" not in Reading(html).tags


@pytest.mark.parametrize(
    "word",
    [
        m.ExpectedBlank(m.Blank("a", "mass", ()), None),
        m.Said("act", (m.ExpectedBlank(m.Blank("a", "mass", ()), (m.Run("2"),)),)),
    ],
)
def test_student_page_refuses_expected_values(word: m.Words) -> None:
    with pytest.raises(NotForStudents):
        STUDENT.words((word,))


@pytest.mark.parametrize("kind", ["instructor", "answer"])
def test_student_page_refuses_blocks_for_instructors(kind: str) -> None:
    block = m.Panel("question", (m.InstructorPanel(kind, ()),))

    with pytest.raises(NotForStudents):
        STUDENT.blocks((block,))


@given(st.text(st.characters(codec="utf-8", exclude_characters="\r\x00")))
def test_any_text_reads_back_as_it_was(text: str) -> None:
    reading = Reading(STUDENT.blocks((m.Para((m.Run(text), m.CodeRun(text))),)))

    assert reading.text == text + text
    assert reading.tags == ["p", "code"]


@given(st.text(st.characters(codec="utf-8", exclude_characters="\r\x00")))
def test_no_text_makes_an_address_that_runs(target: str) -> None:
    html = STUDENT.words((m.LinkTo(target, local=False, children=()),))

    for href in Reading(html).values("href"):
        scheme = SCHEME.match(href)
        assert scheme is None or scheme[1].lower() in ("http", "https", "mailto")
