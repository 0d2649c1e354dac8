"""What a mark prints where its author gave no words: exact sentences."""

from __future__ import annotations

import pytest

from builders import NAMES, step, student
from watchglass.publish.body import text_of
from watchglass.publish.model import Para, StepList

FRONT = NAMES.replace(
    "  water: water\n",
    "  water: water\n  drier: sodium sulfate, anhydrous\n  phenol: 1 % w/v phenolphthalein in ethanol\n",
)


def said(sentence: str, *others: str) -> str:
    page = student(step(sentence, *others, front=FRONT))
    steps = page.body[0]
    assert isinstance(steps, StepList)
    first = steps.items[0].children[0]
    assert isinstance(first, Para)
    return text_of(first.children).replace("\u2060", "")


@pytest.mark.parametrize(
    ("mark", "words"),
    [
        ("Wait {15 min}.", "Wait 15 min."),
        ("Keep {2–3 mL}.", "Keep 2–3 mL."),
        ("Cool to {-10 to -5 °C}.", "Cool to −10 to −5 °C."),
        ("Weigh {ca. 5 g}.", "Weigh about 5 g."),
        ("Use {2.00 ± 0.05 g}.", "Use 2.00 ± 0.05 g."),
        ("Use {>= 10 mL}.", "Use at least 10 mL."),
        ("Use {1.5e-3 mol}.", "Use 1.5 × 10−3 mol."),
        ("See {A} and {funnel}.", "See flask A and the separatory funnel."),
        ("See {tube-2}.", "See tube 2."),
        ("See {funnel.aqueous}.", "See the aqueous layer."),
        ("Add {15 mL acid -> A}.", "Add 15 mL of 3.0 M hydrochloric acid."),
        ("Add {15 mL acid by cylinder -> A}.", "Add 15 mL of 3.0 M hydrochloric acid, measured with the graduated cylinder."),
        ("Add {2 drops phenol -> A}.", "Add 2 drops of 1 % w/v phenolphthalein in ethanol."),
        ("Add {5 mL acid + 10 mL water -> A}.", "Add 5 mL of 3.0 M hydrochloric acid and 10 mL of water."),
        ("Weigh {all mixture -> A}.", "Weigh all of the mixture."),
        ("Pour {A -> funnel} out.", "Pour the contents of flask A out."),
        ("Draw {funnel.aqueous -> B} off.", "Draw the aqueous layer off."),
        ("Take {10 mL from A -> B}.", "Take 10 mL of the contents of flask A."),
        ("{shake funnel, stoppered, for 1 min; vent funnel}", "Shake the separatory funnel for 1 min, stoppered, then vent it."),
        ("{cool A to 5 °C with ice}", "Cool flask A to 5 °C with ice."),
        ("{dry A with 2 g drier for 10 min}", "Dry flask A with 2 g of anhydrous sodium sulfate for 10 min."),
        ("Add {adjust A to pH 10 with base over 10 min}.", "Add 6.0 M sodium hydroxide until pH 10 over 10 min."),
        ("{titrate A with base from burette to phenolphthalein}", "Titrate flask A with 6.0 M sodium hydroxide from the burette to phenolphthalein."),
        ("{discard A to aqueous-acid}", "Discard flask A to the aqueous-acid waste."),
        ("{discard A to drain}", "Discard flask A to the drain."),
        ("{test A ph}", "Test flask A with pH paper."),
        ("Allow {take 5 min}.", "Allow 5 min."),
        ("{wait 5 min}", "Wait for 5 min."),
        ("[Swirl it]{swirl A} well.", "Swirl it well."),
        ("Here.{label here}", "Here."),
    ],
)  # fmt: skip
def test_mark_prints_itself(mark: str, words: str) -> None:
    assert said(mark) == words


@pytest.mark.parametrize(
    ("again", "words"),
    [
        ("{again 1}", "Repeat step 1."),
        ("{again 1–2}", "Repeat steps 1–2."),
        ("{again 1–2, 2 more times}", "Repeat steps 1–2 twice more."),
        ("{again 1–2, 4 more times, fresh}", "Repeat steps 1–2 4 more times, each time with clean glassware."),
        ("{again first}", "Repeat step 1."),
        ("Add {1 mL acid -> A}; {again 3}", "Add 1 mL of 3.0 M hydrochloric acid; do this once more."),
    ],
)  # fmt: skip
def test_again_says_which_steps_and_how_often(again: str, words: str) -> None:
    page = student(
        step("Add {5 mL acid -> A}.{label first}", "Add {5 mL water -> A}.", again, front=FRONT)
    )
    steps = page.body[0]
    assert isinstance(steps, StepList)
    last = steps.items[2].children[0]
    assert isinstance(last, Para)

    assert text_of(last.children) == words
