"""Marks that cannot be read: one finding each, at the narrowest place, with what to write."""

from __future__ import annotations

import pytest

from read.mark_shapes import read, written

#: What stands in the braces, code, what is underlined, message, help.
# fmt: off
FAULTS = [
    ("15 mL -> funnel", "N111", "->", "`15 mL` of what?", "name the material before the arrow"),
    ("15", "Q104", "15", "`15` has no unit", "write the unit after it, as in `5 mL`, or take the braces off a plain number"),
    ("15 mLs acid -> funnel", "Q105", "mLs", "`mLs` is not how the unit is written", "write `mL`"),
    ("15 zz acid -> funnel", "Q105", "zz", "`zz` is no unit", "take one of the units in the list, such as `g`, `mL`, `mmol`, `min`"),
    ("15 mL acid funnel", "N111", "funnel", "`->` is expected at `funnel`", "write where it goes, as in `-> funnel`"),
    ("15 mL acid ->", "N111", "->", "a name is expected", None),
    ("15 mL acid -> ", "N111", "->", "a name is expected", None),
    ("15 mL acid -> 5", "N111", "5", "a name is expected at `5`", None),
    ("15 mL acid +", "N111", "+", "an amount is expected after `+`", None),
    ("15 mL acid + x -> A", "N111", "x -> A", "an amount is expected after `+` at `x -> A`", None),
    ("15 mL acid - A", "N111", "- A", "`->` is expected at `- A`", "write where it goes, as in `-> funnel`"),
    ("15 mL acid > A", "N111", ">", "`>` is no arrow", "write `->`"),
    ("15 mL acid by cylinder by pipette -> A", "N117", "by pipette", "`by` stands twice in one act", "keep one of the two"),
    ("15 mL acid by cylinder -> A by pipette", "N117", "by pipette", "`by` stands twice in one act", "keep one of the two"),
    ("15 mL acid -> A, stoppered, open", "N117", "open", "a closure stands twice in one act", "keep one of the two"),
    ("15 mL acid -> A, stopered", "N111", "stopered", "`stopered` is no closure and no place", "did you mean `stoppered`?"),
    ("15 mL acid -> A, zzz", "N111", "zzz", "`zzz` is no closure and no place", "take one of `open`, `stoppered`, `under condenser`, `under drying tube`, `under nitrogen`, `in hood`, `on steam`, `with flame`, `on hot plate`"),
    ("15 mL acid -> A,", "N111", ",", "`,` is no closure and no place", "take one of `open`, `stoppered`, `under condenser`, `under drying tube`, `under nitrogen`, `in hood`, `on steam`, `with flame`, `on hot plate`"),
    ("15 mL acid by -> A", "N111", "-> A", "a name is expected at `-> A`", None),
    ("15 mL acid -> A by", "N111", "by", "nothing follows `by`", "add what it is about"),
    ("stir", "N111", "stir", "`stir` does not say what it is done to", "name the vessel, as in `stir flask`"),
    ("stir A,", "N111", ",", "`,` is no closure and no place", "take one of `open`, `stoppered`, `under condenser`, `under drying tube`, `under nitrogen`, `in hood`, `on steam`, `with flame`, `on hot plate`"),
    ("stir A B", "N111", "B", "`B` cannot stand here", "divide acts with `;`, or take it out"),
    ("stirr A", "N115", "stirr", "`stirr` is no act of the bench", "did you mean `stir`?"),
    ("sitr A for 5 min", "N115", "sitr", "`sitr` is no act of the bench", "did you mean `stir`?"),
    ("zzz A", "N115", "zzz", "`zzz` is no act of the bench", "begin with a verb such as `stir`, an amount or a name"),
    ("funnel.aquous", "N111", "aquous", "`aquous` is no part of what a vessel holds", "did you mean `aqueous`?"),
    ("funnel.zzz", "N111", "zzz", "`zzz` is no part of what a vessel holds", "take one of `aqueous`, `liquid`, `lower`, `organic`, `solid`, `upper`"),
    ("funnel.", "N111", ".", "a part is expected", None),
    ("funnel .aqueous", "N115", "funnel", "`funnel` is no act of the bench", "begin with a verb such as `stir`, an amount or a name"),
    ("stir A for", "N111", "for", "nothing follows `for`", "add what it is about"),
    ("stir A for 5 mins", "Q105", "mins", "`mins` is not how the unit is written", "write `min`"),
    ("stir A until clear", "N111", "clear", "what follows `until` stands in double quotes", 'write `until "clear"`'),
    ('stir A until "clear', "N111", '"', "a quote opens and never closes", 'add `"`'),
    ("take", "N111", "take", "`take` does not say a time", "write `take 5 min`"),
    ("wait for", "N111", "wait", "`wait` does not say a time", "write `wait 5 min`"),
    ("test", "N111", "test", "`test` does not say what it is done to", "name the vessel, as in `test flask`"),
    ("react", "N111", "react", "`react` does not say what it is done to", "name the vessel, as in `react flask`"),
    ("next", "N115", "next", "`next` stands in `next period` only", None),
    ("next week", "N115", "next week", "`next` stands in `next period` only", None),
    ("again", "N111", "again", "`again` does not say which steps", "write `again 3–4`"),
    ("again 3 4", "N111", "4", "`4` cannot stand here", "divide acts with `;`, or take it out"),
    ("again 3–", "N111", "–", "`–` cannot stand here", "divide acts with `;`, or take it out"),
    ("again 3, 0 more times", "N111", "0 more times", "`0 more times` is beyond the passes that are run", "keep to 1 to 1000"),
    ("again 3, 20000 more times", "N111", "20000 more times", "`20000 more times` is beyond the passes that are run", "keep to 1 to 1000"),
    ("again 3, 1001 more times", "N111", "1001 more times", "`1001 more times` is beyond the passes that are run", "keep to 1 to 1000"),
    ("again 3, at most", "N111", "most", "`most` cannot stand here", "divide acts with `;`, or take it out"),
    ("again 3, 2 more times, 3 more times", "N117", "3 more times", "`more times` stands twice in one act", "keep one of the two"),
    ("again x y", "N111", "y", "`y` cannot stand here", "divide acts with `;`, or take it out"),
    ("again with a as b", "N111", "again", "`again` does not say which steps", "write `again 3–4`"),
    ("again 3 with a", "N111", "a", "`as` is expected", "say what is exchanged, as in `with tube-2 as tube-1`"),
    ("again 3 with a as", "N111", "as", "a name is expected", None),
    ("again -3", "N111", "-3", "a step's number or label is expected at `-3`", None),
    ("label", "N111", "label", "a label is expected", None),
    ("label 5", "N111", "5", "a label is expected at `5`", None),
    ("step", "N111", "step", "a label is expected", None),
    ("step 3", "N111", "3", "a label is expected at `3`", None),
    ("label a b", "N111", "b", "`b` cannot stand here", "divide acts with `;`, or take it out"),
    ("=", "N119", "=", "the expression ends too early", "add a number, a name or `(`"),
    ("= ", "N119", "=", "the expression ends too early", "add a number, a name or `(`"),
    ("= )", "N119", ")", "`)` cannot stand here", "write a number, a name or `(`"),
    ("= (5 g", "N119", "(", "`(` opens here and never closes", "add `)`"),
    ("= 5 g +", "N119", "+", "the expression ends too early", "add a number, a name or `(`"),
    ("= 5 g-3 g", "N111", "g-3 g", "`g-3 g` cannot stand here", "divide acts with `;`, or take it out"),
    ("= a -b", "N119", "-", "a minus sign needs a blank on both sides", "write ` - `"),
    ("= a- b", "N119", "-", "a minus sign needs a blank on both sides", "write ` - `"),
    ("= 5 g 3", "N111", "3", "`3` cannot stand here", "divide acts with `;`, or take it out"),
    ("= a b", "N111", "b", "`b` cannot stand here", "divide acts with `;`, or take it out"),
    ("= mass(", "N119", "(", "the expression ends too early", "add a number, a name or `(`"),
    ("= mass(a", "N119", "(", "`(` opens here and never closes", "add `)`"),
    ("= mass(a,", "N119", ",", "the expression ends too early", "add a number, a name or `(`"),
    ("= mass(a b)", "N119", "(", "`,` or `)` is expected at `b)`", "add `)`"),
    ("= a in", "N119", "in", "the expression ends too early", "add a number, a name or `(`"),
    ("= 5 ** 2", "N119", "**", "`**` is no operator here", None),
    ("= a -> b", "N119", "->", "`->` is no operator here", None),
    ("?", "N111", "?", "the record does not say what is recorded", "write a few words, as in `? mass of product in g`"),
    ("? ", "N111", "?", "the record does not say what is recorded", "write a few words, as in `? mass of product in g`"),
    ("? = 5 g", "N111", "?", "the record does not say what is recorded", "write a few words, as in `? mass of product in g`"),
    ("? a in gm", "Q105", "gm", "`gm` is not how the unit is written", "write `g`"),
    ("? a: ", "N111", "?", "the record does not say what is recorded", "write a few words, as in `? mass of product in g`"),
    ("? m: = 5", "N111", "?", "the record does not say what is recorded", "write a few words, as in `? mass of product in g`"),
    ("suppose", "N111", "suppose", "`suppose` begins with a share or an amount", None),
    ("suppose acid in A is x: y", "N111", "acid in A is x: y", "`suppose` begins with a share or an amount", None),
    ("suppose 5 % acid", "N111", "acid", "`suppose` needs a vessel, an outcome and a reason", "write `suppose 80 % product in flask is solid: the reason`"),
    ("suppose 5 % acid in A", "N111", "A", "`suppose` needs a vessel, an outcome and a reason", "write `suppose 80 % product in flask is solid: the reason`"),
    ("suppose 5 % acid in A is x", "N111", "is x", "`suppose` needs a vessel, an outcome and a reason", "write `suppose 80 % product in flask is solid: the reason`"),
    ("suppose 5 % acid in A is: y", "N111", "is: y", "`suppose` needs a vessel, an outcome and a reason", "write `suppose 80 % product in flask is solid: the reason`"),
    ("1,5 mL acid -> A", "Q102", "1,5", "`1,5` is written with a comma", "write `1.5`"),
    ('"acid', "N111", '"', "a quote opens and never closes", 'add `"`'),
    ('5 mL "acid -> A', "N111", '"', "a quote opens and never closes", 'add `"`'),
    ("12 mL ethanol per crude -> A", "Q105", "crude", "`crude` is no unit", "take one of the units in the list, such as `g`, `mL`, `mmol`, `min`"),
    ("12 mL ethanol per zz crude -> A", "Q105", "zz", "`zz` is no unit", "take one of the units in the list, such as `g`, `mL`, `mmol`, `min`"),
    ("12 mL ethanol per g -> A", "N111", "-> A", "a material is expected at `-> A`", None),
    ("adjust A to pH", "N111", "pH", "`pH` needs a number after a blank", "write it as in `to pH 10`"),
    ("adjust A to pH x", "N111", "x", "`pH` needs a number after a blank", "write it as in `to pH 10`"),
    ("adjust A to pH10 with b", "N111", "10 with b", "`pH` needs a number after a blank", "write it as in `to pH 10`"),
    ("5 mL from", "N111", "from", "a name is expected", None),
    ("5 mL from A", "N111", "A", "`->` is expected", "write where it goes, as in `-> funnel`"),
    ("5 mL from A ->", "N111", "->", "a name is expected", None),
    ("->", "N111", "->", "a name is expected at `->`", None),
    ("-> A", "N111", "-> A", "a name is expected at `-> A`", None),
    ("+", "N111", "+", "a name is expected at `+`", None),
    (".", "N111", ".", "a name is expected at `.`", None),
    ("5 mL acid -> A.zzz", "N111", "zzz", "`zzz` is no part of what a vessel holds", "take one of `aqueous`, `liquid`, `lower`, `organic`, `solid`, `upper`"),
    ("{", "N111", "{", "a name is expected at `{`", None),
    ("5 mL acid -> A ; ->", "N111", "->", "a name is expected at `->`", None),
    ("stir A with with b", "N111", "with b", "a name is expected at `with b`", None),
    ("stir A in in b", "N111", "in b", "a name is expected at `in b`", None),
    ("5 g of -> A", "N111", "-> A", "a material is expected at `-> A`", None),
    ("5 g of of x -> A", "N111", "x -> A", "`->` is expected at `x -> A`", "write where it goes, as in `-> funnel`"),
    ("2 - 3 mL acid -> A", "N111", "- 3 mL acid -> A", "a material is expected at `- 3 mL acid -> A`", None),
    ("5 ºC", "Q105", "ºC", "`ºC` is written with another sign than the degree sign", "write `°C`"),
    ("5 °c", "Q108", "°c", "`°c` does not say on which scale", "write `°C` for a temperature"),
    ("room temperature", "N115", "room", "`room` is no act of the bench", "begin with a verb such as `stir`, an amount or a name"),
    ("hot plate", "N115", "hot", "`hot` is no act of the bench", "begin with a verb such as `stir`, an amount or a name"),
    ("over night", "N115", "over", "`over` is no act of the bench", "begin with a verb such as `stir`, an amount or a name"),
    ("", "N112", "{}", "the mark is empty", "write an act in it, or take the braces out"),
    ("  ", "N112", "{  }", "the mark is empty", "write an act in it, or take the braces out"),
]
# fmt: on


@pytest.mark.parametrize(("mark", "code", "marked", "message", "help_"), FAULTS)
def test_faulty_mark_gives_one_finding_in_its_place(
    mark: str, code: str, marked: str, message: str, help_: str | None
) -> None:
    (finding,) = read(mark).findings

    assert (finding.code.number, finding.span.text) == (code, marked)
    assert (finding.message, finding.help) == (message, help_)


#: Faults that end with their act: those of a quote or of the mark itself reach further.
ALONE = [mark for mark, *_ in FAULTS if mark.strip() and ";" not in mark and '"' not in mark]


@pytest.mark.parametrize("mark", ALONE)
def test_faulty_act_is_broken_and_spares_its_neighbours(mark: str) -> None:
    found = read(f"vent A; {mark}; A -> B")

    assert [written(act) for act in found.acts] == ["verb vent A", "broken", "transfer A to B"]
    assert len(found.findings) == 1


@pytest.mark.parametrize(
    ("mark", "acts", "marked"),
    [
        ("stir A;", ["verb stir A", "broken"], [";"]),
        ("; stir A", ["broken", "verb stir A"], [";"]),
        ("stir A;; vent A", ["verb stir A", "broken", "verb vent A"], [";"]),
        (";", ["broken", "broken"], [";", ";"]),
    ],
)
def test_semicolon_with_nothing_beside_it_is_found(
    mark: str, acts: list[str], marked: list[str]
) -> None:
    found = read(mark)

    assert [written(act) for act in found.acts] == acts
    assert [f.span.text for f in found.findings] == marked


def test_clause_that_stands_twice_points_to_its_first_place() -> None:
    (finding,) = read("15 mL acid by cylinder -> A by pipette").findings

    assert finding.code.number == "N117"
    assert [(r.span.text, r.message) for r in finding.related] == [
        ("by cylinder", "it stood here first")
    ]


def test_two_faults_in_two_acts_are_two_findings() -> None:
    assert [f.span.text for f in read("stirr A; 1,5 mL acid -> A").findings] == ["stirr", "1,5"]


def test_long_text_is_cut_in_the_message_but_underlined_whole() -> None:
    (finding,) = read("stir A " + "x" * 200).findings

    assert finding.message == f"`{'x' * 30}…` cannot stand here"
    assert finding.span.text == "x" * 200
