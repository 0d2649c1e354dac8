"""The way through a procedure: what becomes a box, what an arrow, and what each edition is told."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING

from builders import golden, judged, step, steps, surroundings
from watchglass.publish.flow import flow_figures, flow_of
from watchglass.publish.flow.graph import Kind
from watchglass.publish.pages import Neighbours, student_page
from watchglass.publish.text import NBSP
from watchglass.run.bench.positions import layer_positions

if TYPE_CHECKING:
    from watchglass.publish.flow.graph import Flow, Node
    from watchglass.publish.shapes import Figure, Shape
    from watchglass.shell.pipeline import Judged

VESSELS = """\
materials:
  acid: 3.0 M hydrochloric acid
  base: 6.0 M sodium hydroxide
  ether: tert-butyl methyl ether
  water: water
  drier: sodium sulfate, anhydrous
  mixture: {contains: {benzocaine: 1 mol, benzoic-acid: 1 mol}, provided: 0.900 g}
vessels:
  A: conical flask 100 mL
  B: conical flask 250 mL
  funnel: separatory funnel 125 mL
  paper: Hirsch funnel 60 mm
  filtrate: filter flask 125 mL
  still: round-bottom flask 50 mL
  burette: burette 50 mL
"""
SHAKEN = (
    "Put {all mixture -> funnel} and {30 mL ether -> funnel} in, add {15 mL acid -> funnel},"
    " {shake funnel, stoppered, for 1 min; vent funnel; settle funnel}."
)


def flow(entry: Judged, *, inside: bool = False, volumes: bool = False) -> Flow:
    found = flow_or_none(entry, inside=inside, volumes=volumes)
    assert found is not None
    return found


def flow_or_none(entry: Judged, *, inside: bool = False, volumes: bool = False) -> Flow | None:
    assert entry.run is not None
    procedure = replace(entry.procedure, positions=layer_positions(entry.run.ledger))
    return flow_of(procedure, entry.run, inside=inside, volumes=volumes)


def figure(entry: Judged, *, instructor: bool = False) -> Figure:
    assert entry.run is not None
    procedure = replace(entry.procedure, positions=layer_positions(entry.run.ledger))
    (found,) = flow_figures(procedure, entry.run, instructor=instructor)
    return found


def said(node: Node) -> str:
    """Give all words of a box on one line, with plain spaces."""
    words = (node.head, *node.lines, *node.components, node.fate)
    return " | ".join(filter(None, words)).replace(NBSP, " ")


def boxes(found: Flow) -> list[str]:
    return [said(node) for node in found.nodes]


def arrows(found: Flow) -> list[tuple[str, str]]:
    """Give the arrows by the first words of the boxes they join."""
    names = [(node.head or node.lines[0]).replace(NBSP, " ") for node in found.nodes]
    return [(names[start], names[end]) for start, end in found.edges]


# ------------------------------------------------------------------------------ boxes and arrows


def test_what_comes_together_stands_in_one_box_before_its_vessel() -> None:
    found = flow(step(SHAKEN, "Draw {funnel.aqueous -> A}.", front=VESSELS))

    assert boxes(found)[:2] == [
        "all of the mixture | + 30 mL of tert-butyl methyl ether | + 15 mL of 3.0 M hydrochloric acid",
        "Separatory funnel | shake for 1 min, vent, let the layers part",
    ]


def test_layers_are_called_by_where_they_lie_and_what_they_are() -> None:
    found = flow(step(SHAKEN, "Draw {funnel.aqueous -> A}.", front=VESSELS))

    assert boxes(found)[2:] == [
        "Lower (aqueous) layer | into flask A | kept",
        "Upper (organic) layer | kept",
    ]


def test_what_is_left_of_two_layers_leads_on_under_its_own_name() -> None:
    found = flow(
        step(
            SHAKEN,
            "Draw {funnel.aqueous -> A}, pour {funnel.organic -> B} and {swirl B}.",
            front=VESSELS,
        )
    )

    assert ("Upper (organic) layer", "Flask B") in arrows(found)


def test_repeated_portions_are_drawn_once_and_counted() -> None:
    found = flow(
        step(
            "Put {30 mL ether -> funnel} in.",
            "Add {15 mL acid -> funnel}, {shake funnel; settle funnel} and draw {funnel.aqueous -> A}.",
            "{again 2, 2 more times}",
            front=VESSELS,
        )
    )

    assert boxes(found) == [
        "30 mL of tert-butyl methyl ether | + 3 × 15 mL of 3.0 M hydrochloric acid",
        "Separatory funnel | shake, let the layers part | done 3 times",
        "Lower (aqueous) layer | into flask A | 3 portions | kept",
        "Upper (organic) layer | kept",
    ]


def test_passes_with_clean_vessels_are_not_counted_as_portions() -> None:
    entry = step(
        "Put {10 mL acid -> A} in, {swirl A} and pour {A -> B}.",
        "{again 1, 2 more times, fresh}",
        front=VESSELS,
    )
    found = flow(entry)

    assert boxes(found)[0] == "10 mL of 3.0 M hydrochloric acid"
    assert found.repeated == ((1,), 3)
    assert figure(entry).note.startswith("Step 1: done 3 times, each time with clean glassware")


def test_what_is_added_after_something_was_done_begins_a_new_box() -> None:
    found = flow(
        step(
            "Put {10 mL acid -> A} in and {swirl A}.",
            "Add {10 mL water -> A}, {boil A} and pour {A -> B}.",
            front=VESSELS,
        )
    )

    assert ("Flask A", "Flask A") in arrows(found)
    assert ("10 mL of water", "Flask A") in arrows(found)


def test_filter_parts_solid_from_filtrate() -> None:
    found = flow(
        step(
            "Put {0.5 g benzoic-acid -> A} and {20 mL water -> A} in, {swirl A}.",
            "{filter A on paper into filtrate}",
            front=VESSELS,
        )
    )

    assert [said(node) for node in found.nodes if node.kind is Kind.PART] == [
        "Solid | on the Hirsch funnel | kept",
        "Filtrate | into the filter flask | kept",
    ]


def test_washing_on_a_filter_is_done_in_one_box_however_many_portions() -> None:
    found = flow(
        step(
            "Put {0.5 g benzoic-acid -> A} and {20 mL water -> A} in, {swirl A}.",
            "{filter A on paper into filtrate}",
            "Wash with {5 mL water at 2 °C -> paper}, then {5 mL water at 2 °C -> paper}.",
            front=VESSELS,
        )
    )

    assert "2 × 5 mL of water at 2 °C" in boxes(found)
    assert "Hirsch funnel | wash, running into the filter flask | kept" in boxes(found)


def test_drying_agent_stays_where_the_liquid_runs_through() -> None:
    found = flow(
        step(
            "Put {20 mL ether -> A} in, {dry A with 2 g drier for 5 min}.",
            "{filter A through cotton into still} and {evaporate still at 40 °C}.",
            front=VESSELS,
        )
    )

    assert "Left on cotton | drying agent" in boxes(found)
    assert "Round-bottom flask | evaporate at 40 °C | kept" in boxes(found)


def test_distillates_are_told_apart_by_their_temperatures() -> None:
    found = flow(
        step(
            "Put {10 mL ethanol -> still} and {10 mL toluene -> still} in.",
            "{distil still into A at 76–80 °C}, {distil still into B at 105–112 °C, leaving 1 mL}.",
            "{discard still to non-halogenated-organic}",
            front=VESSELS,
        )
    )

    assert [said(node) for node in found.nodes if node.kind in (Kind.PART, Kind.WASTE)] == [
        "Distillate | 76–80 °C | into flask A | kept",
        "Distillate | 105–112 °C | into flask B | kept",
        "Residue",
        "Non-halogenated-organic waste",
    ]


def test_waste_below_a_layer_has_a_box_and_a_vessel_tells_its_own() -> None:
    found = flow(
        step(
            SHAKEN,
            "Run {discard funnel.aqueous to aqueous-acid} off, pour {funnel.organic -> B}, {swirl B}.",
            "{discard B to non-halogenated-organic}",
            front=VESSELS,
        )
    )

    assert ("Lower (aqueous) layer", "Aqueous-acid waste") in arrows(found)
    assert boxes(found)[-1] == "Flask B | swirl | then: non-halogenated-organic waste"


def test_rinsing_comes_with_what_it_rinses() -> None:
    found = flow(
        step(
            "Put {0.5 g salt -> A} and {20 mL water -> A} in, {swirl A}.",
            "Pour {A -> B}, {rinse A with 5 mL water into B}, {swirl B}.",
        )
    )

    assert "5 mL of water, rinsing flask A" in boxes(found)


def test_measured_share_has_a_box_of_its_own() -> None:
    found = flow(
        step(
            "Put {50 mL acid -> A} in, {swirl A}.",
            "Carry {10 mL from A -> B}, add {20 mL water -> B}, {swirl B}.",
        )
    )

    assert ("Flask A", "10 mL of it") in arrows(found)
    assert ("10 mL of it", "Flask B") in arrows(found)


def test_portions_from_a_burette_are_counted_beside_the_vessel() -> None:
    found = flow(
        step(
            "Put {50 mL acid -> burette} in; weigh {0.5 g salt -> A}, add {20 mL water -> A}, {swirl A}.",
            "Run in {2.50 mL from burette -> A}, {2.50 mL from burette -> A}, {5.00 mL from burette -> A};"
            " {swirl A}, pour {A -> B}, {swirl B}.",
        )
    )

    assert "2 × 2.50 mL from the burette | + 5.00 mL from the burette" in boxes(found)
    assert [head for head, _ in arrows(found)].count("Burette") == 1


def test_branch_that_is_dropped_is_not_drawn() -> None:
    found = flow(
        judged(
            "1. Put {10 mL acid -> A} in, {swirl A}.\n"
            "2. Pour {A -> B}.\n\n"
            "   :::if it is cloudy\n"
            "   Add {25 mL water -> B} and {boil B}.\n"
            "   :::\n"
        )
    )

    assert "25 mL" not in " ".join(boxes(found))


def test_every_box_leads_to_a_step_that_the_page_has() -> None:
    entry = golden("oc-04")
    links = [link for link in _attributes(figure(entry).drawing, "href") if link]

    numbers = {f"#step-{s.number}" for s in entry.procedure.steps}
    assert len(links) == len(flow(entry).nodes)
    assert set(links) <= numbers


def _attributes(shape: Shape, name: str) -> list[str]:
    found = [value for key, value in shape.attributes if key == name]
    for child in shape.children:
        if not isinstance(child, str):
            found += _attributes(child, name)
    return found


# ------------------------------------------------------------------------------ what gets no figure


def test_plain_titration_gets_no_figure() -> None:
    assert flow_or_none(golden("gc-02")) is None


def test_one_vessel_alone_gets_no_figure() -> None:
    assert flow_or_none(step("Put {10 mL acid -> A} in and {swirl A}.")) is None


def test_solution_poured_into_another_vessel_gets_a_figure() -> None:
    assert flow_or_none(step("Put {10 mL acid -> A} in, {swirl A}, pour {A -> B}.")) is not None


def test_procedure_that_did_not_run_gets_no_figure() -> None:
    entry = golden("oc-04")

    assert flow_figures(entry.procedure, None, instructor=True) == ()


# ------------------------------------------------------------------------------ editions


def test_instructor_is_told_the_main_share_of_each_layer() -> None:
    found = flow(golden("oc-04"), inside=True)
    (layer,) = [n for n in found.nodes if n.head.startswith("Lower") and n.steps == (4,)]

    # 98.3 % of the benzocaine after two portions: worked out independently for this procedure
    assert [words.replace(NBSP, " ") for words in layer.components] == ["benzocaine 98.3 %"]


def test_instructor_is_told_what_is_kept_at_the_end() -> None:
    kept = [n for n in flow(golden("oc-04"), inside=True).nodes if n.fate == "kept"]

    assert {n.components[0].replace(NBSP, " ") for n in kept} == {
        "benzoic acid 57.5 %",
        "9-fluorenone 99.9 %",
        "benzocaine 85.8 %",
    }


def test_student_is_told_no_share_and_no_component() -> None:
    said_to_students = _everything(figure(golden("oc-04")))

    assert "benzocaine" not in said_to_students
    assert "9-fluorenone" not in said_to_students
    assert "flow-inside" not in said_to_students


def test_student_is_told_components_where_the_procedure_shows_them() -> None:
    front = VESSELS + "show: [components]\n"
    entry = step(SHAKEN, "Draw {funnel.aqueous -> A}.", front=front)

    assert "benzocaine 8" in _everything(figure(entry)).replace(NBSP, " ")


def test_student_is_told_no_computed_volume() -> None:
    found = flow(golden("oc-04"))

    assert "6.0 M sodium hydroxide" in boxes(found)


def test_computed_volume_is_told_where_it_may_be() -> None:
    found = flow(golden("oc-04"), volumes=True)

    assert "15.0 mL of 6.0 M sodium hydroxide" in boxes(found)


def test_secret_sample_is_the_sample_in_every_word_that_students_get() -> None:
    entry = judged(
        steps(
            "Put {0.50 g sample -> funnel} and {30 mL ether -> funnel} in, add {20 mL base -> funnel},"
            " {shake funnel; settle funnel}.",
            "Draw {funnel.aqueous -> A}. {suppose 80 % sample in A is dissolved: zqxreason}",
            "Look at it.\n\n   :::instructor\n   zqxnote\n   :::\n",
        ),
        "materials:\n"
        "  sample: {one-of: {zqxletter: naphthalene, B: benzoic acid}, provided: 0.50 g}\n"
        "  ether: tert-butyl methyl ether\n"
        "  base: 0.50 M sodium hydroxide\n"
        "vessels:\n  funnel: separatory funnel 125 mL\n  A: beaker 100 mL\n"
        "show: [components]\n",
    )
    place = Neighbours(address="x", previous=None, following=None, after=(), addresses={})
    page = student_page(entry.case, entry.path, place, surroundings().catalogue, entry.run)
    words = _everything(page.flow[0])

    assert "the sample" in words
    assert "naphthalene" not in words
    assert "benzoic" not in words
    assert "zqx" not in words


def test_table_tells_each_vessel_what_comes_what_happens_and_where_it_goes() -> None:
    shown = figure(golden("oc-09"))

    assert shown.head == ("Step", "From", "What happens", "To")
    assert tuple(cell.replace(NBSP, " ") for cell in shown.rows[2]) == (
        "5",
        "2 × 25 mL of 5.0 % w/v sodium hydrogencarbonate; Upper (organic) layer",
        "Separatory funnel: swirl for 3 min, shake, vent, let the layers part, done twice",
        "Lower (aqueous) layer, 2 portions: Aqueous-neutral waste; Upper (organic) layer: Separatory funnel",
    )


def test_description_tells_what_is_kept_and_what_is_let_go() -> None:
    described = figure(golden("oc-09")).description.replace(NBSP, " ")

    assert "Kept at the end: distillate, 134–143 °C, into the 25 mL conical flask." in described
    assert "Let go: aqueous-acid waste; aqueous-neutral waste; left on cotton." in described


def _everything(shown: Figure) -> str:
    """Give all that a figure holds, words of the drawing joined as they were before they broke."""
    return f"{shown} {' '.join(_words(shown.drawing))}"


def _words(shape: Shape) -> list[str]:
    return [
        word
        for child in shape.children
        for word in ([child] if isinstance(child, str) else _words(child))
    ]
