"""What words state of a portion in another measure, held to what the mark takes."""

from __future__ import annotations

import pytest

from builders import faults, only, places, step

FRONT = """\
materials:
  amine: benzocaine
  copper: copper(II) sulfate
  hydrate: copper(II) sulfate pentahydrate
  acid: 3.0 M hydrochloric acid
  alcohol: 3-methylbutan-1-ol
  glacial: acetic acid, glacial
  blend: {contains: {benzocaine: 1 mol, benzoic-acid: 1 mol}, provided: 0.900 g}
  leaves: {composition: unknown, is: tea leaves}
vessels: {A: conical flask 100 mL, flask: round-bottom flask 100 mL}
reactions:
  ester: {equation: 3-methylbutan-1-ol + CH3COOH -> isopentyl-acetate + H2O, limiting: alcohol}
"""
# 0.650 g of benzocaine (165.19 g/mol) are 3.935 mmol; 5.0 mL of 3-methylbutan-1-ol (0.81 g/mL) are
# 46 mmol, 7.0 mL of acetic acid (1.049 g/mL) 122 mmol: 2.66 equivalents.


def told(sentence: str) -> list[tuple[str, str]]:
    return [tuple(place) for place in places(faults(step(sentence, front=FRONT)))]


@pytest.mark.parametrize(
    "sentence",
    [
        "[Weigh 0.650 g (3.93 mmol) of it]{0.650 g amine -> A}.",
        "[Weigh 0.650 g (3.9 mmol) of it]{0.650 g amine -> A}.",
        "[Weigh 0.65 g (4.0 mmol) of it]{0.65 g amine -> A}.",
        "[Weigh 0.650 g (4 mmol) of it]{0.650 g amine -> A}.",
        "[Weigh 0.650 g (ca. 4.2 mmol) of it]{0.650 g amine -> A}.",
        "[Weigh 0.650 g (3.9–4.0 mmol) of it]{0.650 g amine -> A}.",
        "[Weigh 0.650 g (3.93 mmol, 1 equiv) of it]{0.650 g amine -> A}.",
        "[Weigh 4.0 mmol of it]{0.65 g amine -> A}.",
        "[Weigh 0.65 g of it]{3.94 mmol amine -> A}.",
        "[Weigh 3 g (19 mmol) of it]{3 g amine -> A}.",
        "[Weigh 2.45 g (9.8 mmol) of it]{2.45 g hydrate -> A}.",
        "[Add 10 mL (30 mmol) of it]{10 mL acid -> A}.",
        "[Add 10 mL (10.5 g) of it]{10 mL acid -> A}.",
        "[Add 10 mL (1.1 g) of it]{10 mL acid -> A}.",
        "[Weigh 0.900 g (3.13 mmol) of it]{0.900 g blend -> A}.",
        "[Add 7.0 mL (7.3 g, 0.12 mol) of it]{7.0 mL glacial -> A}.",
        "[Add 7.3 g (7.0 mL, 0.12 mol) of it]{7.3 g glacial -> A}.",
        "Add {0.650 g amine -> A} ({3.93 mmol}) and go on.",
        "Add {0.650 g amine -> A} (1 equiv) and go on.",
        (
            "[5.0 mL of it (46 mmol) and 7.0 mL of that (0.12 mol, 2.7 equiv)]"
            "{5.0 mL alcohol + 7.0 mL glacial -> flask}."
        ),
        "Add {0.650 g amine -> A} (twice) and go on.",
    ],
)
def test_what_agrees_as_finely_as_it_is_written_passes_in_silence(sentence: str) -> None:
    assert told(sentence) == []


@pytest.mark.parametrize(
    ("sentence", "marked", "figure"),
    [
        ("[Weigh 0.650 g (4.20 mmol) of it]{0.650 g amine -> A}.", "4.20 mmol", "3.93 mmol"),
        ("[Weigh 0.650 g (3.7 mmol) of it]{0.650 g amine -> A}.", "3.7 mmol", "3.9 mmol"),
        ("[Weigh 0.650 g (ca. 5 mmol) of it]{0.650 g amine -> A}.", "ca. 5 mmol", "3.9 mmol"),
        ("[Weigh 0.650 g (4.1–4.3 mmol) of it]{0.650 g amine -> A}.", "4.1–4.3 mmol", "3.9 mmol"),
        ("[Weigh 4.2 mmol of it]{0.650 g amine -> A}.", "4.2 mmol", "3.9 mmol"),
        ("[Weigh 0.70 g of it]{3.94 mmol amine -> A}.", "0.70 g", "0.65 g"),
        ("[Add 10 mL (35 mmol) of it]{10 mL acid -> A}.", "35 mmol", "30 mmol"),
        ("[Add 7.3 g (8.0 mL) of it]{7.3 g glacial -> A}.", "8.0 mL", "7.0 mL"),
        ("Add {0.650 g amine -> A} ({4.20 mmol}) and go on.", "4.20 mmol", "3.93 mmol"),
        ("Add {0.650 g amine -> A} (4.20 mmol) and go on.", "4.20 mmol", "3.93 mmol"),
        (
            (
                "[5.0 mL of it (46 mmol) and 7.0 mL of that (0.15 mol)]"
                "{5.0 mL alcohol + 7.0 mL glacial -> flask}."
            ),
            "0.15 mol",
            "0.12 mol",
        ),
    ],
)
def test_what_disagrees_is_found_at_its_figure_with_the_one_computed(
    sentence: str, marked: str, figure: str
) -> None:
    finding = only(step(sentence, front=FRONT))

    assert (finding.code.number, finding.span.text) == ("S131", marked)
    assert f"is {figure}, and `{marked}` is stated" in finding.message
    assert finding.help == f"write `{figure}`, or mend the mark"


def test_portion_and_material_are_shown_beside_it() -> None:
    finding = only(step("[Weigh 0.650 g (4.20 mmol)]{0.650 g amine -> A}.", front=FRONT))

    assert [r.span.text for r in finding.related] == ["0.650 g amine", "amine"]


def test_two_figures_of_one_portion_make_one_finding() -> None:
    sentence = "[Add 7.0 mL (9.3 g, 0.15 mol)]{7.0 mL glacial -> flask}, {5.0 mL alcohol -> flask}."
    finding = only(step(sentence, front=FRONT))

    assert finding.span.text == "9.3 g"
    assert finding.related[-1].span.text == "0.15 mol"


@pytest.mark.parametrize(
    ("sentence", "said"),
    [
        (
            "[Weigh 2.45 g (9.8 mmol)]{2.45 g copper -> A}.",
            (
                "`9.8 mmol` is what 2.45 g of copper(II) sulfate pentahydrate would be;"
                " `copper` is the anhydrous salt, 15 mmol"
            ),
        ),
        (
            "[Weigh 2.45 g (15.3 mmol)]{2.45 g hydrate -> A}.",
            (
                "`15.3 mmol` is what 2.45 g of copper(II) sulfate would be;"
                " `hydrate` is copper(II) sulfate pentahydrate, 9.81 mmol"
            ),
        ),
        (
            "[Weigh 1.56 g]{9.8 mmol hydrate -> A}.",
            (
                "`1.56 g` is what 9.8 mmol of copper(II) sulfate would be;"
                " `hydrate` is copper(II) sulfate pentahydrate, 2.4 g"
            ),
        ),
    ],
)
def test_figure_of_another_hydrate_is_told_by_name(sentence: str, said: str) -> None:
    assert only(step(sentence, front=FRONT)).message == said


@pytest.mark.parametrize(
    ("equivalents", "found"),
    [
        ("2.7 equiv", False),
        ("2.66 equivalents", False),
        ("3 eq", False),
        ("2.5 equiv", True),
        ("3.2 molar equivalents", True),
    ],
)
def test_equivalents_are_held_to_what_limits_the_reaction(equivalents: str, *, found: bool) -> None:
    sentence = (
        f"[7.0 mL of it ({equivalents})]{{7.0 mL glacial -> flask}}, {{5.0 mL alcohol -> flask}}."
    )

    assert told(sentence) == ([("S131", equivalents)] if found else [])


def test_equivalents_of_a_reagent_outside_the_equation_are_counted_on_the_one_reaction() -> None:
    # 10 mL of 3.0 M are 30 mmol, 0.65 equivalents of 46 mmol
    rest = "{7.0 mL glacial -> flask}, {5.0 mL alcohol -> flask}."

    assert told(f"[10 mL (0.65 equiv)]{{10 mL acid -> flask}}, {rest}") == []
    assert told(f"[10 mL (0.05 equiv)]{{10 mL acid -> flask}}, {rest}") == [("S131", "0.05 equiv")]


@pytest.mark.parametrize(
    ("sentence", "marked"),
    [
        ("[Weigh 0.65 g into the 100 mL flask]{0.65 g amine -> A}.", "100 mL"),
        ("[Weigh 0.65 g (enough for 20 mL)]{0.65 g amine -> A}.", "20 mL"),
        ("Add {0.650 g amine -> A} (it dissolves in 20 mL of water).", "20 mL"),
        ("[Weigh 0.65 g (3.9 mmol)]{0.65 g leaves -> A}.", "3.9 mmol"),
        ("[Weigh 0.650 g (0.55 mL) of it]{0.650 g amine -> A}.", "0.55 mL"),
        ("[Weigh 0.900 g (7.5 mmol) of it]{0.900 g blend -> A}.", "7.5 mmol"),
        ("Add {0.650 g amine -> A} (3.93 mmol) and go on.", "3.93 mmol"),
    ],
)
def test_what_cannot_be_held_to_the_mark_stays_an_untyped_quantity(
    sentence: str, marked: str
) -> None:
    assert told(sentence) == [("Q114", marked)]


def test_amounts_are_compared_as_the_author_wrote_them_whatever_the_scale() -> None:
    sentence = "[Weigh 0.650 g (3.93 mmol) of it]{0.650 g amine -> A}."

    assert places(faults(step(sentence, front=FRONT + "scale: 2\n"))) == []
