"""The commonest slips in YAML are reported where they were made, not where the reader stumbles."""

from __future__ import annotations

import pytest

from watchglass.base.spans import Source
from watchglass.base.yaml import read_yaml


@pytest.mark.parametrize(
    ("text", "place", "message", "mend"),
    [
        (
            "title: T\nacid 3.0 M\ncode: X\n",
            (2, 1),
            "`acid` has no colon after it",
            "write `acid: 3.0 M`",
        ),
        ("title:T\ncode: X\n", (1, 1), "no blank stands after `title:`", "write `title: T`"),
        (
            "m:\n  acid:3.0 M\n  b: c\n",
            (2, 3),
            "no blank stands after `acid:`",
            "write `acid: 3.0 M`",
        ),
        (
            "m:\n  a: b\n    acid: c\n",
            (3, 1),
            "the line is set in below one that already has a value",
            "set it in like its neighbours",
        ),
    ],
)
def test_slip_is_found_on_its_own_line(
    text: str, place: tuple[int, int], message: str, mend: str
) -> None:
    node, findings = read_yaml(Source.of("x.yml", text))
    (finding,) = findings

    assert node is None
    assert (finding.code.number, tuple(finding.span.position())) == ("N140", place)
    assert (finding.message, finding.help) == (message, mend)
