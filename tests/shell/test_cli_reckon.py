"""`watchglass reckon`: answers, what they rest on, and what is said of a wrong expression."""

from __future__ import annotations

import io
import json
import sys
from typing import TYPE_CHECKING

import pytest
from hypothesis import given
from hypothesis import strategies as st

from shell.cli_runner import run
from watchglass.shell.cli import main

if TYPE_CHECKING:
    from pathlib import Path

    from watchglass.shell.reckoning.answers import Answer


@pytest.fixture
def say(capsys: pytest.CaptureFixture[str]) -> _Sayer:
    return _Sayer(capsys)


class _Sayer:
    """Runs the command and keeps what it printed."""

    def __init__(self, capsys: pytest.CaptureFixture[str]) -> None:
        self._capsys = capsys
        self.status, self.out, self.err = 0, "", ""

    def __call__(self, *arguments: str) -> str:
        self.status = main(["reckon", *arguments])
        self.out, self.err = self._capsys.readouterr()
        return self.out.removesuffix("\n")

    def wrong(self, *arguments: str) -> str:
        """Run a call that must fail without an answer; give what is said."""
        assert self(*arguments) == ""
        assert self.status == 1
        return self.err


def answer(expression: str) -> Answer:
    from watchglass.base.spans import Source
    from watchglass.shell.reckoning.answers import reckon
    from watchglass.shell.reckoning.names import BenchCatalogue
    from watchglass.shell.shipped import shipped

    source = Source.of("expression", expression)
    return reckon(source, 0, len(source.text), BenchCatalogue.of_shipped(shipped()))


def feed(monkeypatch: pytest.MonkeyPatch, data: bytes) -> None:
    monkeypatch.setattr(sys, "stdin", io.TextIOWrapper(io.BytesIO(data)))


# ------------------------------------------------------------------------------ figures


@pytest.mark.parametrize(
    ("expression", "said"),
    [
        # Standard atomic weights (IUPAC 2021, conventional): 63.546 + 32.06 + 9 × 15.999 + 10 × 1.008
        ("molar-mass(CuSO4·5H2O)", "249.68 g/mol"),
        ("molar-mass(copper(II) sulfate pentahydrate)", "249.68 g/mol"),
        ("molar-mass(Fe(NO3)3)", "241.86 g/mol"),
        ("molar-mass(hydrochloric acid)", "36.458 g/mol"),
        # 2.00 g / 122.12 g/mol
        ("moles(2.00 g benzoic-acid) in mmol", "16.4 mmol"),
        ("moles(2.00 g of benzoic-acid)", "16.4 mmol"),
        # 25 mmol × 58.44 g/mol
        ("mass(25 mmol sodium-chloride)", "1.5 g"),
        ("5.0 g / molar-mass(NaCl) in mmol", "86 mmol"),
        # 15 mL × 3.0 mol/L
        ('moles(15 mL "3.0 M hydrochloric acid")', "45 mmol"),
        ('moles(15 mL of "3.0 M hydrochloric acid")', "45 mmol"),
        ("moles(15 mL 3.0 M HCl)", "45 mmol"),
        ("volume(45 mmol 3.0 M hydrochloric acid)", "15 mL"),
        ("strength(5.0 % w/v sodium-chloride) in mol/L", "0.86 mol/L"),
        ("mass(10 g 37 % w/w hydrochloric-acid)", "10 g"),
        # 72 °F = (72 − 32) × 5/9 °C
        ("convert(72 °F, °C)", "22 °C"),
        ("250.0 mL + 1.000 L", "1250 mL"),
        ("1.50 g - 0.5 g", "1.0 g"),
        ("15 mg + 3 mg", "18 mg"),
        ("2 * 3", "6"),
        ("2 / 3", "0.666667"),
        ("6.02e23 * 2", "1.204 × 10^24"),
        ("mean(1.20 g, 1.30 g, 1.25 g)", "1.25 g"),
        ("log(100)", "2"),
    ],
)
def test_answer_has_unit_and_figures(say: _Sayer, expression: str, said: str) -> None:
    assert say(expression) == said
    assert (say.status, say.err) == (0, "")


@pytest.mark.parametrize(
    ("expression", "said"),
    [
        ("volume(0.100 mol acetic-acid)", "5.73 mL  (density of acetic acid 1.0474 g/mL at 20 °C)"),
        ("mass(25 mL CH3COOH)", "26 g  (`CH3COOH` read as acetic acid; density of acetic acid"),
        ("density(ethanol)", "0.7903 g/mL  (ethanol at 20 °C; "),
        ("melts(benzoic-acid)", "122.3 °C  ("),
        # Concentrated hydrochloric acid of 37 % is sold as 12 mol/L: common practice, no source
        (
            "strength(37 % w/w hydrochloric-acid) in mol/L",
            "12 mol/L  (density of the solution 1.184 g/mL, from the table of aqueous solutions",
        ),
        (
            "mass(100 mL 0.10 M potassium permanganate)",
            "100 g  (density of the solution 0.9982 g/mL, taken to be that of water)",
        ),
        ("moles(100 mL saturated sodium chloride)", "541 mmol  (as much sodium chloride as"),
        ("strength(70 % v/v ethanol)", "12 mol/L  (density of ethanol 0.7903 g/mL at 20 °C)"),
    ],
)
def test_what_a_figure_rests_on_stands_after_it(say: _Sayer, expression: str, said: str) -> None:
    assert say(expression).startswith(said)
    assert say.status == 0


@pytest.mark.parametrize(
    ("expression", "why"),
    [
        ("density(NaCl)", "the catalogue has no density of sodium chloride"),
        ("moles(5 mL C7H6O2)", "the catalogue has no density of C7H6O2"),
        ("melts(C7H6O2)", "the catalogue has no melting point of C7H6O2"),
        ("molar-mass(Tc)", "Tc has no standard atomic weight"),
        ("1 / 0", "there is no such number"),
        ("2 * (1 / 0)", "there is no such number"),
    ],
)
def test_unknown_is_an_answer_that_says_why(say: _Sayer, expression: str, why: str) -> None:
    assert say(expression) == f"unknown: {why}"
    assert (say.status, say.err) == (0, "")


# ------------------------------------------------------------------------------ dilutions


@pytest.mark.parametrize(
    ("expression", "said"),
    [
        # c1 V1 = c2 V2
        ("dilution(12 M hydrochloric acid, 3.0 M, 250 mL)", "62.5 mL, made up to 250 mL"),
        ("dilution(12 M hydrochloric acid, 3.0 M, 1 L)", "250 mL, made up to 1 L"),
        ("dilution(95 % v/v ethanol, 70 % v/v, 100 mL)", "73.7 mL, made up to 100 mL"),
        # 5 g in 100 mL is 0.8556 mol/L
        ("dilution(5.0 % w/v NaCl, 0.10 M, 100 mL)", "11.7 mL, made up to 100 mL"),
        ("dilution(37 % w/w hydrochloric acid, 10 % w/w, 500 g)", "135 g, with 365 g of water"),
        # 0.025 mol × 58.44 g/mol
        ("dilution(NaCl, 0.10 M, 250 mL)", "1.46 g, made up to 250 mL"),
        ("dilution(12 M hydrochloric acid, 3.0 M, 250 mL) in L", "0.0625 L, made up to 250 mL"),
        ("2 * dilution(12 M hydrochloric acid, 3.0 M, 250 mL)", "125 mL"),
    ],
)
def test_dilution_says_what_to_take(say: _Sayer, expression: str, said: str) -> None:
    assert say(expression) == said


def test_stock_by_mass_is_measured_through_its_density(say: _Sayer) -> None:
    # 0.500 mol × 36.46 g/mol / 0.37 / 1.184 g/mL = 41.6 mL
    assert say("dilution(37 % w/w hydrochloric acid, 1.0 M, 500 mL)").startswith(
        "41.6 mL, made up to 500 mL  (density of the solution 1.184 g/mL"
    )


def test_stock_that_is_too_weak_is_said_at_the_strength(say: _Sayer) -> None:
    assert say.wrong("dilution(3.0 M hydrochloric acid, 12 M, 250 mL)").splitlines()[:4] == [
        "error[N167]: `12 M` is stronger than the stock, `3.0 M hydrochloric acid`",
        "  expression:1:35  function-unfit",
        "   1 | dilution(3.0 M hydrochloric acid, 12 M, 250 mL)",
        "     |                                   ^^^^",
    ]


@pytest.mark.parametrize(
    ("expression", "said"),
    [
        ("dilution(1 M HCl, 3.0 g, 2 mL)", "`3.0 g` is a mass; a strength belongs here"),
        ("dilution(1 M HCl, 0.5 M)", "takes a stock, a strength and a volume"),
        ("dilution(12 M HCl, 10 % w/w, 1 L)", "`1 L` is a volume; a mass belongs here"),
        ("dilution(5 mL HCl, 1 M, 1 L)", "without an amount"),
        (
            "dilution(12 M hydrochloric acd, 3.0 M, 1 L)",
            "`hydrochloric acd` is not in the catalogue",
        ),
    ],
)
def test_dilution_of_what_cannot_be_is_refused(say: _Sayer, expression: str, said: str) -> None:
    assert said in say.wrong(expression)
    assert say.err.count("error[") == 1


# ------------------------------------------------------------------------------ equations


@pytest.mark.parametrize(
    ("equation", "said"),
    [
        ("C2H6 + O2 -> CO2 + H2O", "2 C2H6 + 7 O2 -> 4 CO2 + 6 H2O"),
        ("ethanol + O2 -> CO2 + water", "ethanol + 3 O2 -> 2 CO2 + 3 water"),
        (
            "MnO4^- + H^+ + e^- -> Mn^2+ + H2O",
            "MnO4^- + 8 H^+ + 5 e^- -> Mn^2+ + 4 H2O",
        ),
        ("Ca(OH)2 + HCl -> CaCl2 + H2O", "Ca(OH)2 + 2 HCl -> CaCl2 + 2 H2O"),
        (
            "CH4 + 2 O2 -> CO2 + 2 H2O",
            "CH4 + 2 O2 -> CO2 + 2 H2O  (balanced as written)",
        ),
        (
            "2 CH4 + 4 O2 -> 2 CO2 + 4 H2O",
            "2 CH4 + 4 O2 -> 2 CO2 + 4 H2O  (balanced as written)",
        ),
    ],
)
def test_equation_gets_its_coefficients(say: _Sayer, equation: str, said: str) -> None:
    assert say(f"balance({equation})") == said
    assert (say.status, say.err) == (0, "")


@pytest.mark.parametrize(
    ("equation", "said", "help_"),
    [
        (
            "CH4 + N2 -> CO2 + H2O",
            "no coefficients balance the equation",
            "N, which stands on the left",
        ),
        (
            "H2O2 + KMnO4 + H2SO4 -> K2SO4 + MnSO4 + H2O + O2",
            "several balances fit",
            "write coefficients that balance",
        ),
        ("etanol + O2 -> CO2 + H2O", "`etanol` is neither a known substance", "`ethanol`"),
        ("C2H6 + O2", "", ""),
    ],
)
def test_equation_without_one_balance_is_a_finding(
    say: _Sayer, equation: str, said: str, help_: str
) -> None:
    err = say.wrong(f"balance({equation})")

    assert said in err
    assert help_ in err
    assert err.count("error[") == 1


def test_equation_is_no_part_of_a_sum(say: _Sayer) -> None:
    assert "let `balance(…)` stand alone" in say.wrong("2 * balance(H2 + O2 -> H2O)")


# ------------------------------------------------------------------------------ wrong input


def test_formula_with_a_point_is_mended_at_its_column(say: _Sayer) -> None:
    assert say.wrong("molar-mass(CuSO4.5H2O)").splitlines() == [
        "error[K103]: `.` cannot stand in a formula",
        "  expression:1:17  formula-not-read",
        "   1 | molar-mass(CuSO4.5H2O)",
        "     |                 ^",
        "  help: write `CuSO4·5H2O`",
        "",
    ]


def test_several_faults_of_one_expression_are_all_said(say: _Sayer) -> None:
    err = say.wrong("moles(2 g benzoc-acid) + molar-mas(NaCl)")

    assert "`benzoc-acid` is not in the catalogue" in err
    assert "did you mean `benzoic-acid`" in err
    assert "did you mean `molar-mass`?" in err
    assert err.count("error[") == 2


@pytest.mark.parametrize(
    ("expression", "said"),
    [
        ("ph(A)", "`ph` needs a procedure; it is not assessed here"),
        ("pH of A", "`pH` needs a procedure; it is not assessed here"),
        ("recovered(ester in receiver)", "`recovered` needs a procedure"),
        ("titre(end) * 2", "`titre` needs a procedure"),
        ("theoretical-yield(ester)", "`theoretical-yield` needs a procedure"),
        ("ether in funnel", "`funnel` is no unit"),
        ("2 g after label(end)", "there is no procedure here"),
        ("moles(benzoic-acid)", "`benzoic-acid` does not say how much"),
        ("moles(2 g)", "`2 g` does not say of what"),
        ("moles()", "takes 1 value, not 0"),
        ("moles( )", "takes 1 value, not 0"),
        ("moles(2 gg benzoic-acid)", "`gg` is no unit"),
        ("moles(5 N hydrochloric acid)", "normality depends on the reaction"),
        ("moles(20 mL 5 % hydrochloric acid)", "`5 %` does not say of what"),
        ("moles(2,4-dinitrophenol)", "`2,4-dinitrophenol` is not in the catalogue"),
        ("molar-mass(2 g NaCl)", "`molar-mass` takes a substance, not an amount of one"),
        ("density(hydrochloric acid)", "does not say how strong it is"),
        ("strength(benzoic-acid)", "is no solution and has no strength"),
        ("benzoic-acid", "`benzoic-acid` is a substance; a quantity belongs here"),
        ("moles", "`moles` is a function and takes something in parentheses"),
        ("a", "`a` is no quantity"),
        ("5.0 g NaCl", "as in `moles(5.0 g NaCl)`"),
        ("5.0 g in foo", "`foo` is no unit"),
        ("moles of 2 g NaCl", "write `moles(…)`"),
        ("5.0 g in", "a unit is expected after `in`"),
        ("5.0 g in mL", "the value is a mass; `mL` is the unit of a volume"),
        ("melts(benzoic-acid) - 20 °C in °C", "write `in K` for a difference"),
        ("(5.0 g in mg) * 2", "stands at the end of an expression only"),
        ("convert(72 °F, mL)", "a temperature and a volume stand together"),
        ("2 g + 3 mL", "a mass and a volume are added"),
        ("5 g > 3 g", "a comparison has no figure"),
        ('"words"', "words have no figure"),
        ("(1 + 2", "`(` opens here and never closes"),
        ("moles(2 g NaCl", "`(` opens here and never closes"),
        ("1,5 g", "is written with a comma"),
        ("1 +", "the expression ends too early"),
        ("", "the expression ends too early"),
    ],
)
def test_wrong_expression_is_one_finding(say: _Sayer, expression: str, said: str) -> None:
    assert said in say.wrong(expression)
    assert say.err.count("error[") == 1


def test_one_wrong_expression_does_not_keep_the_others(say: _Sayer) -> None:
    assert say("2 * 3", "molr-mass(NaCl)", "3 * 3") == "6\n9"
    assert say.status == 1
    assert "expression 2:1:1" in say.err


# ------------------------------------------------------------------------------ batches


BATCH = b"""\
# a column of amounts
molar-mass(NaCl)

mole(3)
  2 g + 3 g
2 g + 3 mL
"""


def test_batch_answers_a_line_each_and_says_the_lines_that_fail(
    say: _Sayer, monkeypatch: pytest.MonkeyPatch
) -> None:
    feed(monkeypatch, BATCH)

    assert say("-") == "58.440 g/mol\n5 g"

    assert say.status == 1
    assert "standard input:4:1  function-unknown" in say.err
    assert "   6 | 2 g + 3 mL" in say.err
    assert say.err.count("error[") == 2


def test_batch_without_expressions_is_silent(say: _Sayer, monkeypatch: pytest.MonkeyPatch) -> None:
    feed(monkeypatch, b"# nothing\n\n")

    assert say("-") == ""
    assert (say.status, say.err) == (0, "")


def test_batch_that_is_no_text_is_refused(say: _Sayer, monkeypatch: pytest.MonkeyPatch) -> None:
    feed(monkeypatch, b"2 g\n\xff\n")

    assert say("-") == ""
    assert say.status == 2
    assert "0xff" in say.err


# ------------------------------------------------------------------------------ JSON


def test_json_gives_one_object_a_line(say: _Sayer) -> None:
    lines = say(
        "--format", "json", "moles(2.00 g benzoic-acid)", "mole(3)", "density(NaCl)"
    ).splitlines()
    first, second, third = map(json.loads, lines)

    assert say.status == 1
    assert say.err == ""
    assert first.pop("value") == pytest.approx(16.377, abs=1e-3)
    assert first == {
        "version": 1,
        "expression": "moles(2.00 g benzoic-acid)",
        "unit": "mmol",
        "figures": 3,
        "text": "16.4 mmol",
        "assumptions": [],
        "findings": [],
    }
    assert (second["value"], second["unit"], second["text"]) == (None, None, "")
    assert second["findings"][0]["code"] == "N166"
    assert second["findings"][0]["start"] == {"line": 1, "column": 1, "offset": 0}
    assert third["text"] == "unknown: the catalogue has no density of sodium chloride"
    assert (third["value"], third["findings"]) == (None, [])


def test_json_keeps_assumptions_apart_from_the_text(say: _Sayer) -> None:
    said = json.loads(say("--format", "json", "volume(0.100 mol acetic-acid)"))

    assert said["text"] == "5.73 mL"
    assert said["assumptions"] == ["density of acetic acid 1.0474 g/mL at 20 °C"]


# ------------------------------------------------------------------------------ sets


def make_set(folder: Path) -> Path:
    (folder / "substances").mkdir(parents=True)
    (folder / "laboratory.yml").write_text("name: X\n")
    (folder / "stocks.yml").write_text("bench-acid:\n  material: 2.0 M hydrochloric acid\n")
    (folder / "substances/own.yml").write_text(
        "marvel:\n  names: [marvel salt]\n  formula: KBr\n  sources: made up for this test\n"
    )
    return folder


def test_set_lends_its_stocks_and_substances(say: _Sayer, tmp_path: Path) -> None:
    root = str(make_set(tmp_path / "set"))

    # 20 mL × 2.0 mol/L; 1.19 g / 119.00 g/mol
    assert say("--set", root, "moles(20 mL bench-acid)", "moles(1.19 g marvel salt)") == (
        "40 mmol\n10.0 mmol"
    )
    assert say.status == 0


def test_without_the_set_its_names_are_unknown(say: _Sayer) -> None:
    assert "`marvel salt` is not in the catalogue" in say.wrong("moles(1.19 g marvel salt)")


def test_fault_in_a_set_is_said_and_the_rest_answered(say: _Sayer, tmp_path: Path) -> None:
    root = make_set(tmp_path / "set")
    (root / "stocks.yml").write_text(
        "bench-acid:\n  material: 2.0 M hydrochloric acid\n  colour: red\n"
    )

    assert say("--set", str(root), "2 * 3") == "6"
    assert say.status == 1
    assert "stocks.yml:3:3" in say.err


def test_folder_that_is_no_set_is_refused(say: _Sayer, tmp_path: Path) -> None:
    assert say("--set", str(tmp_path), "2 * 3") == ""
    assert say.status == 2
    assert "holds no laboratory.yml" in say.err


# ------------------------------------------------------------------------------ numbers apart from print


def test_value_is_not_rounded_and_figures_say_how_far_it_holds() -> None:
    found = answer("2.00 g / 3.00 mL")

    assert found.value == pytest.approx(2 / 3, rel=1e-12)
    assert (found.unit, found.figures, found.text) == ("g/mL", 3, "0.667 g/mL")


@given(
    st.lists(
        st.sampled_from(
            [
                "moles(",
                "mass(",
                "volume(",
                "strength(",
                "density(",
                "balance(",
                "dilution(",
                "convert(",
                "mean(",
                "ph(",
                ")",
                ",",
                '"',
                "->",
                "of",
                "in",
                "+",
                "-",
                "*",
                "/",
                "^",
                "2",
                "NaCl",
                "HCl",
                "ethanol",
                "2.5_g",
                "3.0_M",
                "37_%_w/w",
                "10_mL",
                "20_°C",
                "g",
                "mL",
                "water",
                "label",
                "µ",
                "é",
            ]
        ),
        max_size=9,
    )
)
def test_any_text_is_answered_or_found_fault_with_inside_it(words: list[str]) -> None:
    text = " ".join(words).replace("_", " ")

    found = answer(text)

    assert bool(found.text) != found.failed
    assert all(0 <= f.span.start <= f.span.end <= max(len(text), 1) for f in found.findings)


def test_nothing_heavy_is_imported_for_a_sum() -> None:
    code = (
        "import sys; from watchglass.shell.cli import main; main(['reckon', '2 * 3']); "
        "print(sorted({'jinja2', 'mkdocs', 'pint', 'markdown_it'} & set(sys.modules)))"
    )

    assert run("-c", code).stdout == "6\n[]\n"
