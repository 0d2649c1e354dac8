"""A procedure in one line: the plainest surroundings, and what each stage makes of them."""

from __future__ import annotations

from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING, NamedTuple

from watchglass.base.findings import Severity
from watchglass.base.spans import Source
from watchglass.judge.accept import settle
from watchglass.publish.pages import Neighbours, instructor_page, student_page
from watchglass.shell.pipeline import Analysis, Judged, Surroundings, analyse, analyse_procedure
from watchglass.shell.pipeline import surroundings as read_surroundings
from watchglass.shell.sets import from_bytes

if TYPE_CHECKING:
    from collections.abc import Iterable, Mapping

    from watchglass.base.findings import Finding
    from watchglass.publish.model import InstructorPage, StudentPage
    from watchglass.resolve import model

GOLDEN = Path(__file__).parent / "golden" / "procedures"

#: Names that most tests can do with; none of them is reported unused by `faults`.
NAMES = """\
materials:
  acid: 3.0 M hydrochloric acid
  base: 6.0 M sodium hydroxide
  salt: sodium chloride
  ether: tert-butyl methyl ether
  water: water
  mixture: {contains: {benzocaine: 1 mol, benzoic-acid: 1 mol}, provided: 0.900 g}
vessels:
  A: conical flask 100 mL
  B: conical flask 250 mL
  funnel: separatory funnel 125 mL
  cylinder: graduated cylinder 25 mL
  burette: burette 50 mL
  tube: {1-3: boiling tube 50 mL}
equipment: {lamp: UV lamp 254 nm}
reactions:
  neutral: HCl + NaOH -> NaCl + H2O
"""
_UNUSED = frozenset(("N180", "N181"))


class Place(NamedTuple):
    """A finding as tests compare it: its code and what it underlines."""

    code: str
    marked: str


def text(body: str, front: str = NAMES) -> str:
    """Write a procedure: title, code, further lines of front matter, and a body."""
    return f"---\ntitle: A procedure\ncode: T-01\n{front.rstrip()}\n---\n\n{body}\n"


def steps(*written: str) -> str:
    """Number sentences as steps."""
    return "\n".join(f"{number}. {words}" for number, words in enumerate(written, start=1))


@cache
def _plain() -> Surroundings:
    return read_surroundings({})[0]


def surroundings(files: Mapping[str, str] | None = None) -> Surroundings:
    """Give the shipped catalogue, with a set's own YAML files where there are any."""
    if not files:
        return _plain()
    return read_surroundings({path: Source.of(path, words) for path, words in files.items()})[0]


def judged(body: str, front: str = NAMES, files: Mapping[str, str] | None = None) -> Judged:
    """Take one procedure through all stages."""
    source = Source.of("procedures/t-01.md", text(body, front))
    return analyse_procedure("procedures/t-01.md", source, surroundings(files))


def step(*sentences: str, front: str = NAMES, files: Mapping[str, str] | None = None) -> Judged:
    """Take a procedure of these steps through all stages."""
    return judged(steps(*sentences), front, files)


def faults(entry: Judged) -> tuple[Finding, ...]:
    """Give what is to be mended at the desk.

    No notes, nothing of names that a test leaves unused, and nothing of the bench: a sentence that
    tries one act out makes no procedure. `at_the_bench` gives what goes wrong there.
    """
    return tuple(
        f
        for f in entry.findings
        if f.code.severity > Severity.NOTE and f.code.number not in _UNUSED and not of_bench(f)
    )


def of_bench(finding: Finding) -> bool:
    """Tell whether a finding is of what happens at the bench."""
    number = finding.code.number
    return number[0] == "X" or (number[0] == "B" and number >= "B120")


def at_the_bench(entry: Judged) -> tuple[Finding, ...]:
    """Give what goes wrong at the bench, in the order found; the desk must find nothing."""
    assert places(faults(entry)) == []
    return tuple(f for f in entry.findings if of_bench(f))


def places(findings: Iterable[Finding]) -> list[Place]:
    """Give codes and what they underline, in the order found."""
    return [Place(f.code.number, f.span.text) for f in findings]


def only(entry: Judged) -> Finding:
    """Give the one finding of a procedure."""
    (finding,) = faults(entry)
    return finding


def sound(entry: Judged) -> model.Procedure:
    """Give a procedure that has no fault."""
    assert places(faults(entry)) == []
    return entry.procedure


def golden(name: str) -> Judged:
    """Take one of the three golden procedures through all stages."""
    path = f"procedures/{name}.md"
    source = Source.of(path, (GOLDEN / f"{name}.md").read_text(encoding="utf-8"))
    return analyse_procedure(path, source, surroundings())


def analysis(files: Mapping[str, str | bytes]) -> Analysis:
    """Take a whole set through all stages; without `laboratory.yml` it has an empty one."""
    return analyse(from_bytes({"laboratory.yml": "", **files}), Path())


# ------------------------------------------------------------------------------ pages

ALONE = Neighbours(
    address="procedures/t-01.html", previous=None, following=None, after=(), addresses={}
)


def student(entry: Judged, files: Mapping[str, str] | None = None) -> StudentPage:
    """Make the page that students see."""
    return student_page(entry.case, entry.path, ALONE, surroundings(files).catalogue)


def instructor(
    entry: Judged, files: Mapping[str, str] | None = None, *, bench: bool = False
) -> InstructorPage:
    """Make the page that instructors see; with all that the bench gives where asked."""
    settled = settle(entry.findings, entry.procedure.acceptances)
    return instructor_page(
        entry.case,
        entry.path,
        ALONE,
        surroundings(files).catalogue,
        findings=settled.open,
        accepted=entry.accepted,
        run=entry.run if bench else None,
    )


# ------------------------------------------------------------------------------ planted words

#: One word for each place that only instructors may see; it stands nowhere else in the set.
PLANTED = {
    place: f"zqx{place.replace(' ', '')}"
    for place in (
        "note", "note in a step", "note in a list", "note in a quote", "note in a table", "answer",
        "answer in a step", "heading", "emphasis", "code", "listing", "link", "link words",
        "title of a link", "picture", "alternative text", "expected words", "reason accepted",
        "reason intended", "comment", "comment in the laboratory", "station", "page note",
        "page heading", "branch",
    )
}  # fmt: skip
#: Figures that are expected of the student's own work, and nowhere given.
PLANTED_FIGURES = ("0.5837", "12.345", "0.7719")
_P = PLANTED
_PLANTED_PROCEDURE = f"""\
---
title: What stands in the open   # {_P["comment"]}
code: T-01
course: Testing
materials:
  acid: benzoic acid
  unused: sodium chloride
  sample:
    one-of: {{{_P["station"]}-1: naphthalene, {_P["station"]}-2: biphenyl}}
    as: 1 % w/v in ethanol
vessels:
  A: beaker 100 mL
expect:
  - benzoic-acid in A >= 12.345 %
accept:
  material-unused: {_P["reason accepted"]}
intended:
  INC-001: {_P["reason intended"]}
---

Words for all: seenbyall.

1. Put {{0.4321 g acid -> A}} and {{1 mL sample -> A}} into {{A}}. Record {{? colour = "{_P["expected words"]}"}}
   and {{? own: twice the mass in g = 2 * 0.29185 g}} and {{? own-2: more in g = own + 0.1882 g}}.

   :::instructor
   {_P["note in a step"]}
   :::

   :::question
   What is seen?

   :::answer
   {_P["answer in a step"]}
   :::
   :::

:::instructor
## {_P["heading"]}

{_P["note"]} *{_P["emphasis"]}* `{_P["code"]}`
[{_P["link words"]}](https://example.org/{_P["link"]} "{_P["title of a link"]}")
![{_P["alternative text"]}]({_P["picture"]}.png)

- {_P["note in a list"]}

> {_P["note in a quote"]}

| a | b |
|---|---|
| c | {_P["note in a table"]} |

    {_P["listing"]}

:::question
Is it so?

:::answer
{_P["branch"]}
:::
:::
:::

:::question
What is seen?

:::answer
{_P["answer"]}
:::
:::
"""
_PLANTED_PAGE = f"""\
# A page

For all: seenbyall.

:::instructor
## {_P["page heading"]}

{_P["page note"]}
:::
"""


def planted_set() -> dict[str, str | bytes]:
    """Give a sound set with a word of its own in every place that only instructors may see."""
    return {
        "laboratory.yml": f"name: A laboratory   # {_P['comment in the laboratory']}\n",
        "procedures/t-01.md": _PLANTED_PROCEDURE,
        f"procedures/{_P['picture']}.png": b"PNG",
        "pages/one.md": _PLANTED_PAGE,
    }
