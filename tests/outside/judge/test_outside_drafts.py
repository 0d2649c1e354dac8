"""Published amounts and yields written as drafts: what agrees passes, what does not is found."""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import pytest

from builders import faults, judged, places, sound
from outside.published import cases
from watchglass.run.evaluate import Evaluator, Value
from watchglass.run.roles import roles

VESSEL = "vessels: {flask: round-bottom flask 2000 mL}\n"


def substance(key: str, formula: str, density: float | None = None) -> str:
    """Write a substance of the set's own."""
    lines = [f"{key}:", f"  names: [the {key}]", f'  formula: "{formula}"', "  sources: published"]
    if density is not None:
        lines.insert(3, f"  density: {density:.4g} g/mL")
    return "\n".join(lines) + "\n"


def draft(case: dict[str, Any], stated: str) -> tuple[str, str, dict[str, str]]:
    """Write one line of a published reagent table as a step: body, front matter and files."""
    inputs = case["inputs"]
    density = inputs.get("density_g_per_mL") or case["expected"].get("implied_density_g_per_mL")
    files = {"substances/own.yml": substance("published-reagent", inputs["formula"], density)}
    taken = f"{inputs['mass_g']} g" if "mass_g" in inputs else f"{inputs['volume_mL']} mL"
    figures = f"{taken}, {stated}" if inputs.get("form") != "mass+volume" else (
        f"{taken}, {inputs['volume_mL']} mL, {stated}"
    )  # fmt: skip
    body = f"1. [Add the reagent ({figures})]{{{taken} x -> flask}} to {{flask}}."
    front = f"materials: {{x: published-reagent}}\n{VESSEL}"
    if "limiting_amount_mmol" not in inputs:
        return body, front, files
    # The reactant that limits, and a product that makes the equation balance.
    files["substances/own.yml"] += substance("published-limit", "C2H6O")
    body += f" Add {{{inputs['limiting_amount_mmol']} mmol least -> flask}}."
    front = (
        "materials: {x: published-reagent, least: published-limit}\n"
        f"{VESSEL}reactions: {{r: {{equation: published-reagent + published-limit ->"
        f" published-sum, limiting: least}}}}\n"
    )
    both = f"{inputs['formula']}·C2H6O"
    files["substances/own.yml"] += substance("published-sum", both)
    return body, front, files


def said(case: dict[str, Any]) -> str:
    """Give amount and equivalents as the source prints them."""
    expected = case["expected"]
    text = f"{expected['published_amount_mmol']} mmol"
    if "published_equivalents" in expected:
        text += f", {expected['published_equivalents']} equiv"
    return text


def codes_of(body: str, front: str, files: dict[str, str]) -> list[str]:
    return [f.code.number for f in faults(judged(body, front, files)) if f.code.number != "Q113"]


@pytest.mark.parametrize("case", cases("amounts.json", "reagent_line"))
def test_published_line_of_a_reagent_table_passes_in_silence(case: dict[str, Any]) -> None:
    # S130: al-s24 prints 330 mmol as 1.0 equiv of 330, and so on; sizes are those of a plant.
    assert codes_of(*draft(case, said(case))) == []


@pytest.mark.parametrize("case", cases("amounts.json", "reagent_line"))
def test_published_line_with_an_amount_a_tenth_too_high_is_found(case: dict[str, Any]) -> None:
    amount = case["expected"]["amount_mmol"] * 1.1

    assert codes_of(*draft(case, f"{amount:.4g} mmol")) == ["S131"]


@pytest.mark.parametrize("case", cases("amounts.json", "stated_amount_disagrees"))
def test_published_amount_that_disagrees_is_found_at_its_figure(case: dict[str, Any]) -> None:
    stated = f"{case['inputs']['stated_amount_mmol']} mmol"
    body, front, files = draft(case, stated)
    entry = judged(body, front, files)

    assert places(faults(entry)) == [("S131", stated)]
    (finding,) = faults(entry)
    assert f"{case['expected']['amount_mmol']:.3g} mmol" in finding.message


def test_its_equivalents_agree_as_finely_as_they_are_printed() -> None:
    # ai-s01 prints 1.1 equiv where 1.07 are taken: half a unit of the last figure
    (case,) = (
        c.values[0] for c in cases("amounts.json", "stated_amount_disagrees") if c.id == "ai-s01"
    )
    equivalents = f"{case['inputs']['stated_equivalents']} equiv"

    assert codes_of(*draft(case, equivalents)) == []


# ---------------------------------------------------------------- yields


def evaluated(expression_in_record: str, front: str, body: str, files: dict[str, str]) -> Value:
    """Give the expected value of one record of a sound draft."""
    entry = judged(body + f" Record {{? y: it = {expression_in_record}}}.", front, files)
    procedure = sound(entry)
    (record,) = procedure.records
    assert record.expression is not None
    found = Evaluator(procedure, entry.case.usage, entry.case.catalogue, {}).value(
        record.expression
    )
    assert isinstance(found, Value)
    return found


@pytest.mark.parametrize("case", cases("amounts.json", "theoretical_yield"))
@pytest.mark.parametrize("asked", ["r", "published-product"])
def test_theoretical_yield_of_a_draft_is_the_published_one(
    case: dict[str, Any], asked: str
) -> None:
    body, front, files = equation_draft(case)
    found = evaluated(f"theoretical-yield({asked})", front, body, files)
    relative = case["tolerance"]["theoretical_mass_g"]["rel"]

    wanted = case["expected"]["theoretical_mass_g"] * 1e-3
    assert found.si == pytest.approx(wanted, rel=relative)


@pytest.mark.parametrize("case", cases("amounts.json", "theoretical_yield"))
def test_limiting_reactant_of_a_draft_is_the_published_one(case: dict[str, Any]) -> None:
    body, front, files = equation_draft(case)
    entry = judged(body, front, files)
    found = [r.material for r in roles(entry.procedure, entry.case.usage) if r.limiting]

    left = case["inputs"]["equation"].partition("->")[0]
    terms = [term.split()[-1] for term in left.split("+")]
    assert found == [f"m{terms.index(case['expected']['limiting'])}"]


def equation_draft(case: dict[str, Any]) -> tuple[str, str, dict[str, str]]:
    """Write an equation with what is weighed for it; of what is in excess thrice the mass is taken."""
    left, right = (side.split(" + ") for side in case["inputs"]["equation"].split(" -> "))
    masses = case["inputs"]["masses_g"]
    names: dict[str, str] = {}
    text, materials, charges = "", [], []
    for place, term in enumerate(left):
        formula = term.split()[-1]
        names[formula] = f"published-{place}"
        text += substance(names[formula], formula)
        materials.append(f"m{place}: published-{place}")
        mass = masses.get(formula, 3 * max(masses.values()))
        charges.append(f"{{{mass} g m{place} -> flask}}")
    terms = [_renamed(term, names) for term in left]
    products = []
    for place, term in enumerate(right):
        formula = term.split()[-1]
        key = (
            "published-product" if formula == case["inputs"]["product"] else f"published-by-{place}"
        )
        if key != "published-product" or formula not in names:
            names[formula] = key
            text += substance(key, formula)
        products.append(_renamed(term, names))
    products.sort(key=lambda term: "published-product" not in term)
    equation = " + ".join(terms) + " -> " + " + ".join(products)
    front = f"materials: {{{', '.join(materials)}}}\n{VESSEL}reactions: {{r: {equation}}}\n"
    return f"1. Put {', '.join(charges)} into {{flask}}.", front, {"substances/own.yml": text}


def _renamed(term: str, names: dict[str, str]) -> str:
    *number, formula = term.split()
    return " ".join((*number, names[formula]))


@pytest.mark.parametrize("case", cases("amounts.json", "yield"))
def test_yield_of_a_draft_is_the_published_one(case: dict[str, Any]) -> None:
    body, front, files = yield_draft(case)
    actual = case["inputs"]["actual_mass_g"]
    found = evaluated(f"{actual} g / theoretical-yield(published-product) in %", front, body, files)

    wanted, tolerance = case["expected"]["percent_yield"], case["tolerance"]["percent_yield"]
    assert found.si * 100 == pytest.approx(wanted, abs=tolerance["abs"])


@pytest.mark.parametrize("case", cases("amounts.json", "yield"))
def test_product_that_was_obtained_can_form_and_half_as_much_again_cannot(
    case: dict[str, Any],
) -> None:
    body, front, files = yield_draft(case)
    actual = case["inputs"]["actual_mass_g"]
    doubled = case["expected"]["theoretical_mass_g"] * 1.5
    obtained = judged(body + f" Weigh {{{actual} g published-product}}.", front, files)
    dreamt = judged(body + f" Weigh {{{doubled:.4g} g published-product}}.", front, files)

    assert places(faults(obtained)) == []
    assert places(faults(dreamt)) == [("S135", f"{doubled:.4g} g published-product")]


def yield_draft(case: dict[str, Any]) -> tuple[str, str, dict[str, str]]:
    """Write an equation that makes so much product a mole of what limits, and the rest of it up.

    The sources give formulas of two substances only; what stands beside them makes it balance.
    """
    inputs = case["inputs"]
    start, product = inputs["limiting"]["formula"], inputs["product"]["formula"]
    per = Fraction(inputs["product_per_limiting"]).limit_denominator(12)
    of_start, of_product = per.denominator, per.numerator
    text = substance("published-start", start) + substance("published-product", product)
    text += substance("published-twin", product) + substance("published-rest", start)
    equation = (
        f"{of_start} published-start + {of_product} published-twin ->"
        f" {of_product} published-product + {of_start} published-rest"
    )
    front = (
        "materials: {start: published-start, twin: published-twin}\n"
        f"{VESSEL}reactions: {{r: {{equation: {equation}, limiting: start}}}}\n"
    )
    mass, twin = inputs["limiting"]["mass_g"], 2 * case["expected"]["theoretical_mass_g"]
    body = f"1. Put {{{mass} g start -> flask}} and {{{twin:.4g} g twin -> flask}} into {{flask}}."
    return body, front, {"substances/own.yml": text}
