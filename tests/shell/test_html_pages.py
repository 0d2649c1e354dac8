"""Whole pages through the theme: escaping in every field, landmarks, headings, editions."""

from __future__ import annotations

import dataclasses
import re
import types
import typing
from itertools import pairwise

import pytest

from shell.site_builder import Reading
from watchglass.publish import model as m
from watchglass.shell.site.html import NotForStudents
from watchglass.shell.site.render import Frame, NavEntry, Renderer, make_environment
from watchglass.shell.site.theme import find_themes

HOSTILE = """<b onclick="x">&'{{ 7*7 }}"""
FRAME = Frame(
    laboratory="Laboratory",
    institution="College",
    edition="student",
    main=(NavEntry("Start", "index.html"), NavEntry("Courses", "courses.html")),
    pages=(NavEntry("Safety", "pages/safety.html"),),
)
ENVIRONMENT = make_environment([str(find_themes() / "handbook")])
PAGES = (
    m.StudentPage, m.InstructorPage, m.OrdinaryPage, m.ListPage, m.StartPage, m.ReferencePage,
)  # fmt: skip
_SMALL: tuple[object, ...] = (m.Para((m.Run(HOSTILE),)),)


def hostile(kind: typing.Any) -> typing.Any:
    """Make a value of a type with hostile text wherever a text may stand."""
    if kind is str:
        return HOSTILE
    if kind in (int, bool):
        return kind(1)
    if dataclasses.is_dataclass(kind):
        hints = typing.get_type_hints(kind)
        made = {f.name: hostile(hints[f.name]) for f in dataclasses.fields(kind)}
        if "address" in made:
            made["address"] = "procedures/x.html"
        return typing.cast("typing.Any", kind)(**made)
    origin, arguments = typing.get_origin(kind), typing.get_args(kind)
    if origin is tuple:
        if arguments[-1] is not Ellipsis:
            return tuple(hostile(argument) for argument in arguments)
        return (hostile(arguments[0]), hostile(arguments[0]))
    if origin in (types.UnionType, typing.Union):
        if m.Run in arguments:
            return m.Run(HOSTILE)
        if m.Para in arguments:
            return m.Para((m.Run(HOSTILE),))
        return hostile(arguments[0])
    raise TypeError(kind)


def render(page: typing.Any, frame: Frame = FRAME) -> str:
    made_up = isinstance(page, m.ReferencePage) and page.title == HOSTILE  # it has a recipe, too
    instructor = isinstance(page, m.InstructorPage) or made_up
    edition = "instructor" if instructor else frame.edition
    return Renderer(ENVIRONMENT, dataclasses.replace(frame, edition=edition)).render(page)


@pytest.mark.parametrize("kind", PAGES)
def test_hostile_text_in_every_field_stays_text(kind: type) -> None:
    html = render(hostile(kind))
    reading = Reading(html)

    assert "<b" not in html.replace("<body>", "").replace("<br>", "").replace("<blockquote>", "")
    assert "onclick" not in [name for name, _ in reading.attributes]
    assert HOSTILE in reading.text


def test_hostile_frame_stays_text() -> None:
    frame = Frame(
        laboratory=HOSTILE,
        institution=HOSTILE,
        edition="student",
        main=(NavEntry(HOSTILE, HOSTILE),),
        pages=(NavEntry(HOSTILE, HOSTILE),) * 9,
        styles=(HOSTILE,),
        scripts=(HOSTILE,),
    )
    reading = Reading(render(m.OrdinaryPage(title="T", address="t.html", body=()), frame))

    assert "b" not in reading.tags
    assert "onclick" not in [name for name, _ in reading.attributes]


@pytest.mark.parametrize("kind", PAGES)
def test_page_has_its_landmarks_and_one_main_heading(kind: type) -> None:
    reading = Reading(render(hostile(kind)))

    assert reading.tags.count("main") == 1
    assert reading.tags.count("h1") == 1
    assert reading.tags.count("footer") == 1
    assert reading.values("lang")[0] == "en"
    assert "#content" in reading.values("href")
    assert "content" in reading.values("id")


@pytest.mark.parametrize("kind", PAGES)
def test_headings_leave_out_no_level(kind: type) -> None:
    levels = [
        int(tag[1]) for tag in Reading(render(hostile(kind))).tags if re.fullmatch("h[1-6]", tag)
    ]

    assert levels[0] == 1
    assert all(after <= before + 1 for before, after in pairwise(levels))


@pytest.mark.parametrize("kind", PAGES)
def test_no_page_fetches_or_runs_anything(kind: type) -> None:
    html = render(hostile(kind))
    reading = Reading(html)

    assert not {"iframe", "object", "embed", "style"} & set(reading.tags)
    (script,) = re.findall("<script[^>]*>[^<]*", html)
    assert re.fullmatch(r'<script src="([./]*)js/search\.js" data-root="\1">', script)
    assert not [name for name, _ in reading.attributes if name.startswith("on") or name == "style"]
    assert "http" not in "".join(reading.values("href", "src"))


def page_of(kind: type, **changes: object) -> typing.Any:
    return dataclasses.replace(hostile(kind), **changes)


@pytest.mark.parametrize(
    "block",
    [
        m.InstructorPanel("answer", (m.Para((m.Run("KEPT"),)),)),
        m.Para((m.ExpectedBlank(m.Blank("a", "b", ()), (m.Run("KEPT"),)),)),
    ],
)
@pytest.mark.parametrize("part", ["before", "body"])
def test_no_student_page_is_made_of_what_instructors_see(part: str, block: m.Blocks) -> None:
    with pytest.raises(NotForStudents):
        render(page_of(m.StudentPage, **{part: (block,)}))


def test_instructor_edition_is_named_as_such_on_every_page() -> None:
    html = render(
        m.OrdinaryPage(title="T", address="t.html", body=()),
        dataclasses.replace(FRAME, edition="instructor"),
    )

    assert "Instructor edition" in Reading(html).text
    assert 'content="noindex"' in html


def test_student_edition_says_nothing_of_another() -> None:
    html = render(m.OrdinaryPage(title="T", address="t.html", body=()))

    assert "nstructor" not in html


ROW = m.ReagentRow(
    name=(m.Run("butan-1-ol"),),
    local="alcohol",
    formula=(m.Run("C"), m.Lowered("4"), m.Run("H"), m.Lowered("10"), m.Run("O")),
    molar_mass="74.12",
    used=(m.Run("7.45 g"),),
    portions="",
    amount=(m.Run("101 mmol"),),
    equivalents=(("", "1.00", True),),
    strength=(),
    provided=(),
)


def test_limiting_reactant_is_marked_in_words_and_weight() -> None:
    html = render(page_of(m.StudentPage, reagents=(ROW,)))

    assert '<tr role="row" class="limiting">' in html
    assert '1.00 <strong class="limits">limiting</strong>' in html


def test_caption_speaks_of_a_limiting_reactant_only_where_there_is_one() -> None:
    none = dataclasses.replace(ROW, equivalents=(("", "1.00", False),))

    assert "in bold" in render(page_of(m.StudentPage, reagents=(ROW,)))
    assert "in bold" not in render(page_of(m.StudentPage, reagents=(none,)))


def test_columns_that_no_material_fills_are_left_out() -> None:
    bare = dataclasses.replace(ROW, formula=(), molar_mass="", amount=(), equivalents=())
    html = render(page_of(m.StudentPage, reagents=(bare,)))

    assert re.findall(r'<th role="columnheader"[^>]*>(.*?)</th>', html) == ["Material", "Used"]


def test_row_of_materials_says_each_figure_with_its_name() -> None:
    html = render(page_of(m.StudentPage, reagents=(ROW,)))

    assert re.findall(r'data-name="(.*?)"', html) == [
        "Formula", "M in g/mol", "Used", "n", "Equivalents",
    ]  # fmt: skip


def test_current_page_is_marked_in_the_navigation() -> None:
    html = render(m.OrdinaryPage(title="T", address="pages/safety.html", body=()))

    assert '<a href="../pages/safety.html" aria-current="page">Safety</a>' in html
    assert html.count("aria-current") == 1


def test_many_pages_fold_away_in_the_navigation() -> None:
    frame = dataclasses.replace(
        FRAME, pages=tuple(NavEntry(f"P{n}", f"p{n}.html") for n in range(9))
    )
    html = render(m.OrdinaryPage(title="T", address="t.html", body=()), frame)

    assert "<summary>Pages</summary>" in html
    assert html.count('href="p') == 9


def test_what_can_be_looked_up_folds_away_under_one_word() -> None:
    frame = dataclasses.replace(FRAME, lookup=(NavEntry("Substances", "substances.html"),))
    html = render(m.OrdinaryPage(title="T", address="substances.html", body=()), frame)

    assert "<summary>Look up</summary>" in html
    assert '<a href="substances.html" aria-current="page">Substances</a>' in html


SUBSTANCE = m.ReferencePage(
    kind="substance",
    title="sulfuric acid",
    address="substances/sulfuric-acid.html",
    names=(),
    rows=(m.ReferenceRow("Boils at 1 atm", (m.Run("337 °C"),), "from memory"),),
    used_in=(m.ListEntry(m.PageLink("A wash", "AA-01", "procedures/aa-01.html"), "week 3"),),
    more=None,
    stocks=(),
    lines=(),
    remarks=(),
)


def test_source_of_a_value_stands_beside_it() -> None:
    html = render(SUBSTANCE)

    assert re.search(r"337 °C</td>\s*<td[^>]*>from memory</td>", html)


def test_page_of_a_substance_leads_to_procedures_and_back_to_the_list() -> None:
    links = Reading(render(SUBSTANCE)).values("href")

    assert "../procedures/aa-01.html" in links
    assert "../substances.html" in links


@pytest.mark.parametrize(("edition", "said"), [("student", False), ("instructor", True)])
def test_only_instructors_are_told_that_there_is_no_recipe(edition: str, said: bool) -> None:
    stock = dataclasses.replace(SUBSTANCE, kind="stock", address="stocks/a.html")
    html = render(stock, dataclasses.replace(FRAME, edition=edition))

    assert ("No recipe can be worked out" in html) is said


def test_part_of_a_long_list_leads_to_the_others() -> None:
    page = m.ListPage(
        kind="uses",
        title="water: used in 900 procedures, part 3",
        address="substances/water.3.html",
        groups=(),
        previous=m.PageLink("part 2", "", "substances/water.2.html"),
        following=m.PageLink("part 4", "", "substances/water.4.html"),
        part=3,
    )
    html = render(page)

    assert '<a class="previous" rel="prev" href="../substances/water.2.html">' in html
    assert '<a class="following" rel="next" href="../substances/water.4.html">' in html


@pytest.mark.parametrize(
    "page",
    [
        m.ListPage(kind="accepted", title="T", address="accepted.html", groups=()),
        dataclasses.replace(SUBSTANCE, kind="stock", lines=("Weigh it.",)),
    ],
)
def test_no_student_page_is_made_of_findings_or_recipes(page: m.ListPage | m.ReferencePage) -> None:
    with pytest.raises(NotForStudents):
        render(page)
