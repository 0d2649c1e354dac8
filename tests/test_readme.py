"""README's quick tour is true: its wrong draft gives just the output that stands below it."""

from __future__ import annotations

import re
from pathlib import Path

from watchglass.shell.pipeline import check_texts
from watchglass.shell.rendering.full import render
from watchglass.shell.rendering.style import Style

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
