"""Names: one namespace, what can be none, near ones, and what a place takes."""

from __future__ import annotations

import pytest

from builders import NAMES, faults, judged, only, places, sound, step
from watchglass.read.words import RESERVED, UNIT_CAPITALS


@pytest.mark.parametrize(
    ("front", "code", "marked", "message"),
    [
        ("materials: {5acid: water}", "N160", "5acid", "`5acid` is no name that a mark can hold"),
        ("materials: {acid 2: water}", "N160", "acid 2", "`acid 2` is no name that a mark can hold"),
        ("materials: {tube_1: water}", "N160", "tube_1", "`tube_1` is no name that a mark can hold"),
        ("materials: {'-a': water}", "N160", "'-a'", "`-a` is no name that a mark can hold"),
        ("materials: {'5': water}", "N160", "'5'", "`5` is no name that a mark can hold"),
        ("materials: {g: water}", "N161", "g", "`g` is a unit and can be no name"),
        ("vessels: {M: beaker 50 mL}", "N161", "M", "`M` is a unit and can be no name"),
        ("vessels: {stir: beaker 50 mL}", "N161", "stir", "`stir` is a word of the notation and can be no name"),
        ("equipment: {per: lamp}", "N161", "per", "`per` is a word of the notation and can be no name"),
        ("materials: {a: water}\nvessels: {a: beaker 50 mL}", "N162", "a", "`a` is declared twice: as a material and as a vessel"),
        ("equipment: {a: lamp}\nreactions: {a: HCl + NaOH -> NaCl + H2O}", "N162", "a", "`a` is declared twice: as equipment and as a reaction"),
        ("vessels: {t: {1-3: beaker 50 mL}, t-2: beaker 50 mL}", "N162", "t-2", "`t-2` is declared twice"),
    ],
)  # fmt: skip
def test_name_that_cannot_be_told_apart_is_refused_where_it_is_declared(
    front: str, code: str, marked: str, message: str
) -> None:
    finding = only(judged("Words.", front))

    assert (finding.code.number, finding.span.text) == (code, marked)
    assert finding.message == message


@pytest.mark.parametrize("word", sorted(RESERVED | UNIT_CAPITALS | {"mL", "min", "mol", "rpm"}))
def test_word_of_the_notation_and_unit_can_be_no_name(word: str) -> None:
    finding = only(judged("Words.", f'materials: {{"{word}": water}}'))

    assert finding.code.number == "N161"


@pytest.mark.parametrize(
    "name", ["A", "B", "É", "acid-2", "2-propanol", "9-fluorenone", "F1", "tube-1", "2-3-x", "ABC", "a"]
)  # fmt: skip
def test_name_of_letters_digits_and_hyphens_can_stand(name: str) -> None:
    procedure = sound(
        judged(
            "1. Use {5 mL " + name + " -> Z}.",
            f"materials: {{{name}: water}}\nvessels: {{Z: beaker 50 mL}}",
        )
    )

    assert procedure.names[name] == "material"


def test_second_declaration_points_to_the_first() -> None:
    finding = only(judged("Words.", "materials: {a: water}\nvessels: {a: beaker 50 mL}"))

    assert [(r.span.text, r.message, r.span.position().line) for r in finding.related] == [
        ("a", "it is declared here first", 4)
    ]
    assert finding.span.position().line == 5


def test_reserved_name_that_is_used_all_the_same_is_one_finding() -> None:
    entry = judged("1. Use {5 mL g -> B}.", "materials: {g: water}\nvessels: {B: beaker 50 mL}")

    assert places(faults(entry)) == [("N161", "g")]


#: What stands in the braces of a step, what is underlined, message, help.
UNKNOWN = [
    ("5 mL acidd -> A", "acidd", "`acidd` is declared nowhere", "did you mean `acid`?"),
    ("5 mL zzz -> A", "zzz", "`zzz` is declared nowhere", "declare it under `materials:`"),
    ("5 mL acid -> funel", "funel", "`funel` is declared nowhere", "did you mean `funnel`?"),
    ("5 mL acid -> zzz", "zzz", "`zzz` is declared nowhere", "declare it under `vessels:`"),
    ("A -> tube-4", "tube-4", "`tube-4` is declared nowhere", "did you mean `tube-3` or `tube-2` or `tube-1`?"),
    ("react netral in A", "netral", "`netral` is declared nowhere", "did you mean `neutral`?"),
    ("react zzz in A", "zzz", "`zzz` is declared nowhere", "declare it under `reactions:`"),
    ("discard A to aqueous-acd", "aqueous-acd", "`aqueous-acd` is declared nowhere", "did you mean `aqueous-acid` or `aqueous-base` or `aqueous-organic`?"),
    ("cool A in ice-slt", "ice-slt", "`ice-slt` is declared nowhere", "did you mean `ice-salt`?"),
    ("filter A through coton into B", "coton", "`coton` is declared nowhere", "did you mean `cotton`?"),
    ("adjust A to phenolphtalein with acid", "phenolphtalein", "`phenolphtalein` is declared nowhere", "did you mean `phenolphthalein` or `thymolphthalein`?"),
    ("step ende", "ende", "`ende` is declared nowhere", "name a state that is labelled, as with `{label end}`"),
    ("= spot / 2", "spot", "`spot` is declared nowhere", "name a record that stands before it, as in `{? m: mass in g}`, or write a quantity"),
    ("lampp", "lampp", "`lampp` is declared nowhere", "did you mean `lamp`?"),
    ('5 mL "unobtainium" -> A', '"unobtainium"', "`unobtainium` is declared nowhere", "declare it under `materials:`"),
]  # fmt: skip


@pytest.mark.parametrize(("mark", "marked", "message", "help_"), UNKNOWN)
def test_unknown_name_is_met_with_the_nearest_of_its_kind(
    mark: str, marked: str, message: str, help_: str
) -> None:
    finding = only(step(f"Do {{{mark}}}."))

    assert (finding.code.number, finding.span.text) == ("N163", marked)
    assert (finding.message, finding.help) == (message, help_)


def test_waste_stream_that_is_near_to_none_is_met_with_streams() -> None:
    finding = only(step("Do {discard A to zzz}."))

    assert (finding.help or "").startswith("name a waste stream: `sharps-and-glass`")


@pytest.mark.parametrize(
    ("mark", "marked", "message"),
    [
        ("5 mL A -> B", "A", "`A` is a vessel; a material belongs here"),
        ("5 mL acid -> base", "base", "`base` is a material; a vessel belongs here"),
        ("5 mL acid -> lamp", "lamp", "`lamp` is equipment; a vessel belongs here"),
        (
            "5 mL acid by salt -> A",
            "salt",
            "`salt` is a material; a vessel or equipment belongs here",
        ),
        ("acid -> A", "acid", "`acid` is a material; a vessel belongs here"),
        ("5 mL from acid -> A", "acid", "`acid` is a material; a vessel belongs here"),
        ("stir acid", "acid", "`acid` is a material; a vessel belongs here"),
        ("react A in B", "A", "`A` is a vessel; a reaction belongs here"),
        ("discard A to B", "B", "`B` is a vessel; a waste stream belongs here"),
        ("adjust A to B with acid", "B", "`B` is a vessel; an indicator belongs here"),
        ("adjust A to pH 7 with B", "B", "`B` is a vessel; a material belongs here"),
        ("acid.upper", "acid", "`acid` is a material; a vessel belongs here"),
        ("5 mL acid per g A -> B", "A", "`A` is a vessel; a material belongs here"),
    ],
)
def test_name_of_another_kind_is_told_from_an_unknown_one(
    mark: str, marked: str, message: str
) -> None:
    finding = only(step(f"Do {{{mark}}}."))

    assert (finding.code.number, finding.span.text) == ("N164", marked)
    assert finding.message == message
    assert [r.message for r in finding.related] == ["it is declared here"]


@pytest.mark.parametrize(
    "mark",
    ["ice", "cotton", "filter-paper", "boiling-stones", "stirring-bar", "ph-paper", "ice-salt",
     "water-bath", "aqueous-acid", "lamp", "neutral", "A", "tube-2", "acid", "benzocaine", "A.upper"]
)  # fmt: skip
def test_aid_bath_stream_and_catalogue_key_need_no_declaration(mark: str) -> None:
    assert faults(step(f"Here is {{{mark}}}.")) == ()


def test_broken_front_matter_makes_no_name_unknown() -> None:
    entry = judged("1. Do {5 mL acid -> A} and {stir B}.", "materials: [")

    assert [f.code.number for f in faults(entry)] == ["N140"]


def test_names_that_are_used_are_remembered() -> None:
    procedure = sound(
        step("Do {5 mL acid by cylinder -> A}, {5 mL base -> A} and {react neutral in A}.")
    )

    assert procedure.used == {"acid", "base", "cylinder", "A", "neutral"}


def test_kind_of_every_name_is_kept() -> None:
    kinds = sound(step("Do {stir A}{label end}; {? m: mass in g}.")).names

    assert kinds["acid"] == "material"
    assert kinds["tube-3"] == "vessel"
    assert kinds["lamp"] == "equipment"
    assert kinds["neutral"] == "reaction"
    assert kinds["end"] == "label"
    assert kinds["m"] == "record"


@pytest.mark.parametrize(
    ("sentence", "marked"),
    [("{label acid}", "acid"), ("{? A: mass in g}", "A"), ("{label end}{label end}", "end")],
)
def test_label_and_record_share_the_namespace(sentence: str, marked: str) -> None:
    entry = step(sentence)

    assert places(faults(entry)) == [("N162", marked)]


# ------------------------------------------------------------------------------ families


def test_family_of_vessels_has_its_members() -> None:
    vessels = sound(step("Do {stir tube-1}.")).vessels
    members = [v for v in vessels.values() if v.family == "tube"]

    assert [v.name for v in members] == ["tube-1", "tube-2", "tube-3"]
    assert {v.written for v in members} == {"boiling tube 50 mL"}


def test_family_may_be_named_by_words() -> None:
    vessels = judged(
        "Words.", "vessels: {t: {hot: beaker 50 mL, cold: beaker 100 mL}}"
    ).procedure.vessels

    assert {name: v.written for name, v in vessels.items()} == {
        "t-hot": "beaker 50 mL",
        "t-cold": "beaker 100 mL",
    }


@pytest.mark.parametrize("span", ["5-1", "1-500", "0-200", "1–999999"])
def test_family_that_runs_back_or_too_far_is_refused(span: str) -> None:
    finding = only(judged("Words.", f"vessels: {{t: {{{span}: beaker 50 mL}}}}"))

    assert (finding.code.number, finding.span.text) == ("N160", span)


def test_family_name_alone_names_no_vessel() -> None:
    assert places(faults(step("Do {stir tube}."))) == [("N163", "tube")]


def test_shared_names_of_the_tests_are_sound() -> None:
    assert faults(judged("Words.", NAMES)) == ()
