"""Accepting findings: with a reason, of a kind that can be accepted, and only while they are found."""

from __future__ import annotations

from builders import judged, places

UNUSED = "materials: {x: ethanol, salt: sodium chloride}\nvessels: {A: beaker 50 mL}\n"
BODY = "1. Put {5 mL x -> A} into {A}."


def test_an_accepted_warning_is_taken_out_and_kept_with_its_reason() -> None:
    entry = judged(BODY, UNUSED + "accept: {material-unused: kept for the second term}")

    assert places(entry.findings) == []
    ((finding, acceptance),) = entry.accepted
    assert (finding.code.number, acceptance.reason) == ("N180", "kept for the second term")


def test_a_number_accepts_as_its_name_does() -> None:
    entry = judged(BODY, UNUSED + "accept: {N180: kept for the second term}")

    assert places(entry.findings) == []


def test_an_acceptance_without_effect_is_found() -> None:
    entry = judged(
        BODY,
        "materials: {x: ethanol}\nvessels: {A: beaker 50 mL}\naccept: {time-over-period: long}",
    )

    assert places(entry.findings) == [("N193", "time-over-period")]


def test_what_cannot_be_read_cannot_be_accepted() -> None:
    entry = judged(
        "1. Put {5 mL y -> A} into {A}.",
        "materials: {x: ethanol}\nvessels: {A: beaker 50 mL}\naccept: {name-unknown: no time}",
    )

    found = sorted(places(entry.findings))
    assert found == [("N163", "y"), ("N193", "name-unknown")]


def test_an_acceptance_without_a_reason_is_found() -> None:
    entry = judged(BODY, UNUSED + "accept:\n  material-unused:")

    assert ("N192", "material-unused") in places(entry.findings)


def test_an_unknown_word_is_no_finding() -> None:
    entry = judged(BODY, UNUSED + "accept: {material-unsued: a reason}")

    found = places(entry.findings)
    assert ("N194", "material-unsued") in found
    help_ = next(f.help for f in entry.findings if f.code.number == "N194")
    assert help_
    assert help_.startswith("did you mean `material-unused`")
