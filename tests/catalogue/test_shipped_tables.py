"""The shipped tables hold together: every fault a set's own table would get is looked for in ours."""

from __future__ import annotations

import json
from typing import TYPE_CHECKING

import pytest

from tools.name_index import make
from watchglass.base.spans import Source
from watchglass.base.yaml import YamlMapping, read_yaml
from watchglass.catalogue.decode import decode_substances
from watchglass.catalogue.ware import decode_glassware, decode_indicator
from watchglass.shell.shipped import DATA, shipped, substance_sources

if TYPE_CHECKING:
    from watchglass.catalogue.substances import Substance

SOURCES = substance_sources()


def decoded(source: Source) -> tuple[tuple[Substance, ...], list[str]]:
    node, findings = read_yaml(source)
    substances, more = decode_substances(node)
    return substances, [
        f"{f.code.number} {f.span.position().line}: {f.message}" for f in (*findings, *more)
    ]


ALL = tuple(substance for source in SOURCES for substance in decoded(source)[0])


def table(name: str) -> YamlMapping:
    node, findings = read_yaml(Source.of(name, (DATA / name).read_text("utf-8")))
    assert not findings
    assert isinstance(node, YamlMapping)
    return node


@pytest.mark.parametrize("source", SOURCES, ids=lambda source: source.name)
def test_shipped_substances_give_no_finding(source: Source) -> None:
    _, findings = decoded(source)

    assert findings == []


def test_the_catalogue_is_worth_having() -> None:
    assert len(ALL) >= 450


def test_no_cas_number_stands_for_two_substances() -> None:
    numbers = [substance.cas for substance in ALL if substance.cas]

    assert sorted(numbers) == sorted(set(numbers))


def test_groups_are_the_words_that_the_readme_lists() -> None:
    readme = " ".join((DATA / "README.md").read_text("utf-8").split())
    listed = readme.partition("## Words used in `groups`")[2].partition(".")[0].casefold()
    used = {group for substance in ALL for group in substance.groups}

    assert {group for group in used if group not in {w.strip() for w in listed.split(",")}} == set()


def test_every_shipped_liquid_has_a_density() -> None:
    liquids = {s.key for s in ALL if s.state == "liquid"}
    known = {s.key for s in ALL if s.density is not None}

    assert liquids - known == set()


def test_index_of_names_is_that_of_the_tables() -> None:
    assert (DATA / "names.json").read_text("utf-8") == make()


def test_entries_cut_from_the_file_are_those_of_the_whole_file() -> None:
    cut = shipped().substances

    assert cut.keys() == tuple(substance.key for substance in ALL)
    for substance in ALL:
        alone = cut.get(substance.key)
        assert alone is not None
        assert (alone.names, alone.cas, alone.smiles, alone.formula) == (
            substance.names,
            substance.cas,
            substance.smiles,
            substance.formula,
        )


@pytest.mark.parametrize("substance", ALL, ids=lambda substance: substance.key)
def test_every_shipped_value_says_where_it_is_from(substance: Substance) -> None:
    given = [
        name
        for name, value in (
            ("density", substance.density),
            ("melts", substance.melts),
            ("boils", substance.boils),
            ("flash", substance.flash),
            ("acid", substance.acid),
            ("base", substance.base),
            ("log-p", substance.log_p),
            ("soluble", substance.soluble),
        )
        if value
    ]

    assert [name for name in given if not substance.source(name)] == []


@pytest.mark.parametrize(
    "substance", [s for s in ALL if s.hydrate_of], ids=lambda substance: substance.key
)
def test_a_hydrate_is_its_anhydrous_substance_and_water(substance: Substance) -> None:
    anhydrous = shipped().substances.get(substance.hydrate_of)

    assert anhydrous is not None
    assert substance.formula is not None
    assert anhydrous.formula is not None
    more = dict(substance.formula.composition)
    for element, count in dict(anhydrous.formula.composition).items():
        more[element] = more.get(element, 0) - count
    assert more["H"] == 2 * more["O"] > 0
    assert {element for element, count in more.items() if count} == {"H", "O"}


@pytest.mark.parametrize(
    ("name", "key"),
    [
        ("hydrochloric acid", "hydrogen-chloride"),
        ("Sodium bicarbonate", "sodium-hydrogencarbonate"),
        ("acetic acid, glacial", "acetic-acid"),
        ("isopropanol", "propan-2-ol"),
        ("KHP", "potassium-hydrogen-phthalate"),
        ("MTBE", "tert-butyl-methyl-ether"),
    ],
)
def test_a_name_an_instructor_types_finds_its_substance(name: str, key: str) -> None:
    assert shipped().substances.names[name.casefold()] == key


def test_shipped_glassware_gives_no_finding() -> None:
    findings = [f.message for entry in table("glassware.yml") for f in decode_glassware(entry)[1]]

    assert findings == []


@pytest.mark.parametrize("entry", list(table("indicators.yml")), ids=lambda entry: entry.key.text)
def test_an_indicator_is_a_substance_with_a_range_and_a_source(entry: object) -> None:
    indicator, findings = decode_indicator(entry)  # type: ignore[arg-type]

    assert findings == ()
    assert indicator is not None
    assert indicator.key in shipped().substances
    assert 0 < indicator.range.si < indicator.range.si_high < 14
    assert indicator.source


def test_names_index_is_json_of_keys() -> None:
    names = json.loads((DATA / "names.json").read_text("utf-8"))

    assert set(names.values()) == {substance.key for substance in ALL}
