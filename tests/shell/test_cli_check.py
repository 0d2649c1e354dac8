"""`watchglass check`: what it accepts, what it prints and how it ends."""

from __future__ import annotations

import json
from types import SimpleNamespace
from typing import TYPE_CHECKING

import pytest

from shell.cli_runner import replace_module
from shell.findings_builder import NOT_RUN, OVERFILLED, UNUSED, finding
from watchglass.shell.cli import main

if TYPE_CHECKING:
    from collections.abc import Sequence
    from pathlib import Path

    from watchglass.base.findings import Code, Finding

PIPELINE = "watchglass.shell.pipeline"


@pytest.fixture
def draft(tmp_path: Path) -> str:
    """Give the path of a procedure in a set."""
    (tmp_path / "set" / "procedures").mkdir(parents=True)
    (tmp_path / "set" / "laboratory.yml").write_text("name: X\n")
    path = tmp_path / "set" / "procedures" / "a.md"
    path.write_text("1. Stir.\n")
    return str(path)


def judged(
    monkeypatch: pytest.MonkeyPatch, findings: tuple[Finding, ...] = (), checked: int = 1
) -> list[Sequence[Path]]:
    """Let the stages find what is given; the list fills with what they were asked to check."""
    asked: list[Sequence[Path]] = []

    def check_paths(paths: Sequence[Path], *, scale: float | None = None) -> object:
        del scale
        asked.append(paths)
        return SimpleNamespace(findings=findings, checked=checked, accepted=())

    replace_module(monkeypatch, PIPELINE, check_paths=check_paths)
    return asked


@pytest.mark.parametrize("form", ["full", "line"])
def test_sound_draft_passes_in_silence(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], draft: str, form: str
) -> None:
    judged(monkeypatch)

    assert main(["check", "--format", form, draft]) == 0
    assert capsys.readouterr() == ("", "")


@pytest.mark.parametrize(
    ("code", "options", "status"),
    [
        (OVERFILLED, [], 1),
        (OVERFILLED, ["--strict"], 1),
        (UNUSED, [], 0),
        (UNUSED, ["--strict"], 1),
        (NOT_RUN, [], 0),
        (NOT_RUN, ["--strict"], 0),
    ],
)
def test_status_follows_the_weight_of_findings(
    monkeypatch: pytest.MonkeyPatch, draft: str, code: Code, options: list[str], status: int
) -> None:
    judged(monkeypatch, (finding("⟦a⟧\n", code=code),))

    assert main(["check", *options, draft]) == status


def test_findings_are_results_and_go_to_standard_output(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], draft: str
) -> None:
    judged(monkeypatch, (finding("⟦a⟧\n"),))

    main(["check", draft])

    out, err = capsys.readouterr()
    assert out.startswith("error[B120]: the funnel would hold 150 mL")
    assert out.endswith("1 error in 1 file\n")
    assert err == ""


def test_line_form_has_no_summary(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], draft: str
) -> None:
    judged(monkeypatch, (finding("⟦a⟧\n", message="m"),))

    main(["check", "--format", "line", draft])

    assert capsys.readouterr().out == (
        "procedures/oc-04.md:1:1: error[B120 funnel-overfilled]: m\n"
    )


def test_json_form_is_an_object_without_findings_too(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], draft: str
) -> None:
    judged(monkeypatch)

    assert main(["check", "--format", "json", draft]) == 0
    assert json.loads(capsys.readouterr().out)["findings"] == []


def test_paths_are_handed_on_as_given(
    monkeypatch: pytest.MonkeyPatch, tmp_path: Path, draft: str
) -> None:
    asked = judged(monkeypatch)

    main(["check", str(tmp_path / "set"), draft])

    assert asked == [(tmp_path / "set", tmp_path / "set" / "procedures" / "a.md")]


@pytest.mark.parametrize(
    ("path", "words"),
    [
        ("nowhere.md", "does not exist"),
        (".", "`.` is no set: it holds no laboratory.yml\n"),
        ("site", "`site` is a site: check the set it names, or `watchglass build site`\n"),
        ("set/procedures", "holds no laboratory.yml; the set it lies in is `set`\n"),
        ("set/laboratory.yml", "is no procedure: its name does not end in .md\n"),
    ],
)
def test_unfit_path_is_refused_with_what_would_do(
    monkeypatch: pytest.MonkeyPatch,
    capsys: pytest.CaptureFixture[str],
    tmp_path: Path,
    draft: str,
    path: str,
    words: str,
) -> None:
    asked = judged(monkeypatch)
    (tmp_path / "site").mkdir()
    (tmp_path / "site" / "mkdocs.yml").write_text("site_name: X\n")
    monkeypatch.chdir(tmp_path)

    status = main(["check", draft, path])

    out, err = capsys.readouterr()
    assert (status, out, asked) == (2, "", [])
    assert words in err


def test_empty_set_is_refused(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], tmp_path: Path, draft: str
) -> None:
    judged(monkeypatch, checked=0)
    monkeypatch.chdir(tmp_path)

    assert main(["check", "set"]) == 2
    assert capsys.readouterr().err == "there is no procedure in `set`\n"
    assert draft


def test_set_that_cannot_be_read_shows_its_findings(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], tmp_path: Path, draft: str
) -> None:
    judged(monkeypatch, (finding("⟦a⟧\n", name="laboratory.yml"),), checked=0)

    assert main(["check", str(tmp_path / "set")]) == 1
    assert "laboratory.yml:1:1" in capsys.readouterr().out
    assert draft


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        (["check"], "Missing argument 'PATH...'"),
        (["check", "--form", "full", "a.md"], "No such option"),
        (["check", "--format", "xml", "."], "'xml' is not one of"),
        (["--nothing"], "No such option"),
        (["chek", "a.md"], "there is no command `chek`; did you mean `check`?"),
        (["xyzzy"], "there is no command `xyzzy`\n"),
    ],
)
def test_call_that_cannot_be_understood_ends_with_2(
    capsys: pytest.CaptureFixture[str], arguments: list[str], words: str
) -> None:
    assert main(arguments) == 2

    out, err = capsys.readouterr()
    assert out == ""
    assert words in err


def test_file_names_are_shown_harmless(capsys: pytest.CaptureFixture[str], tmp_path: Path) -> None:
    path = tmp_path / "a\x1b[2J.txt"
    path.write_text("x")

    assert main(["check", str(path)]) == 2
    assert "a<U+001B>[2J.txt` is no procedure" in capsys.readouterr().err


def test_two_hundred_are_shown_in_full(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], draft: str
) -> None:
    judged(monkeypatch, tuple(finding("⟦a⟧", message=f"fault {n}") for n in range(201)))

    assert main(["check", draft]) == 1
    assert capsys.readouterr().out.endswith(
        "1 more finding not shown; `--limit 0` shows all\n\n201 errors in 1 file\n"
    )


def test_limit_of_nought_shows_all(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str], draft: str
) -> None:
    judged(monkeypatch, tuple(finding("⟦a⟧", message=f"fault {n}") for n in range(201)))
    main(["check", "--limit", "0", draft])

    assert capsys.readouterr().out.count("error[B120]") == 201


@pytest.mark.parametrize(
    ("form", "sign"),
    [("line", "error[B120 "), ("json", '"B120"'), ("sarif", '"ruleId": "B120"'), ("github", "::e")],
)
def test_other_programs_are_given_all(
    monkeypatch: pytest.MonkeyPatch,
    capsys: pytest.CaptureFixture[str],
    draft: str,
    form: str,
    sign: str,
) -> None:
    judged(monkeypatch, tuple(finding("⟦a⟧", message=f"fault {n}") for n in range(9)))
    main(["check", "--limit", "2", "--format", form, draft])

    assert capsys.readouterr().out.count(sign) == 9


def test_accepted_findings_reach_the_log_with_their_reason(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    draft = tmp_path / "a.md"
    draft.write_text(
        "---\ntitle: A\ncode: A-1\nmaterials: {water: water, salt: sodium chloride}\n"
        "vessels: {A: beaker 50 mL}\naccept: {material-unused: shown at the desk only}\n---\n\n"
        "1. Put {5 mL water -> A} into {A}.\n"
    )

    assert main(["check", "--format", "sarif", str(draft)]) == 0
    (found,) = json.loads(capsys.readouterr().out)["runs"][0]["results"]
    assert found["suppressions"][0]["justification"] == "shown at the desk only"
