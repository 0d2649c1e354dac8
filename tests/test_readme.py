"""README's quick tour is true: its wrong draft gives just the output that stands below it."""

from __future__ import annotations

import re
from pathlib import Path
from typing import TYPE_CHECKING

from watchglass.shell.cli import main
from watchglass.shell.pipeline import check_texts
from watchglass.shell.rendering.full import render
from watchglass.shell.rendering.style import Style

if TYPE_CHECKING:
    import pytest

README = (Path(__file__).parents[1] / "README.md").read_text("utf-8")


def block(language: str) -> str:
    found = re.search(rf"^```{language}\n(.*?)^```$", README, re.MULTILINE | re.DOTALL)
    assert found
    return found[1]


def test_the_wrong_draft_gives_the_findings_printed() -> None:
    findings = check_texts({"procedures/draft.md": block("markdown")})
    printed = render(findings, style=Style()).replace("procedures/draft.md", "draft.md")

    assert printed.strip() == block("text").strip()


def test_the_mended_draft_passes_in_silence() -> None:
    mended = (
        block("markdown")
        .replace("5.0 % sodium", "5.0 % w/v sodium")
        .replace("mL bas ->", "mL base ->")
        .replace("15 mL of water", "20 mL of ether")
    )

    assert check_texts({"procedures/draft.md": mended}) == ()


BENCH = block("procedure")


def test_the_draft_that_fails_at_the_bench_gives_the_finding_printed() -> None:
    findings = check_texts({"procedures/draft.md": BENCH})
    printed = render(findings, style=Style()).replace("procedures/draft.md", "draft.md")

    assert printed.strip() == block("finding").strip()


def test_what_the_finding_advises_mends_it() -> None:
    mended = BENCH.replace("0.50 M", "2.0 M").replace(
        "3. Pour", "3. Do it {again 2, 1 more time}.\n4. Pour"
    )

    assert check_texts({"procedures/draft.md": mended}) == ()


def test_the_ledger_is_the_one_printed(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (tmp_path / "draft.md").write_text(BENCH)

    assert main(["ledger", str(tmp_path / "draft.md")]) == 0
    assert block("ledger").strip() in capsys.readouterr().out
