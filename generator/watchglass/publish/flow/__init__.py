"""The way through a procedure as a drawing: what goes where, layers, filters, waste.

`tracing` goes through what happens and makes a graph at the `desk`; `finishing` takes out what says
nothing; `layout` finds a place for each box, and `draw` draws. `components` adds what is in the
boxes, for instructors and where a procedure shows it. The student's drawing is made from what the
steps say and from where the layers lie, and from nothing else.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.publish.flow import table
from watchglass.publish.flow.components import Shares
from watchglass.publish.flow.draw import drawn
from watchglass.publish.flow.finishing import finished
from watchglass.publish.flow.tracing import Tracer
from watchglass.publish.shapes import Figure

if TYPE_CHECKING:
    from watchglass.judge.bench.run import Run
    from watchglass.publish.flow.graph import Flow
    from watchglass.resolve.model import Procedure

_SHARES = (
    "Shares are the model's, of all that is brought or could form; those below 3 % are left out."
)


def flow_figures(procedure: Procedure, run: Run | None, *, instructor: bool) -> tuple[Figure, ...]:
    """Draw the way through a procedure.

    Args:
        procedure: With the positions of its layers.
        run: How it went at the bench; None where it did not: then nothing is drawn. With a secret
            sample, instructors are shown how it went with the first candidate, as on the rest of
            their page.
        instructor: Whether the instructor edition is made.

    Returns:
        One figure, or none where nothing is parted or poured from one vessel into another.
    """
    if run is None:
        return ()
    shown = procedure.head.show
    inside = instructor or "components" in shown
    run = run.opened if instructor else run
    flow = flow_of(procedure, run, inside=inside, volumes=instructor or "adjust-volumes" in shown)
    if flow is None:
        return ()
    notes = [table.note(flow)]
    if any(node.components for node in flow.nodes):
        notes.append(_SHARES)
    return (
        Figure(
            name="way-through",
            title="What goes where",
            description=table.description(flow),
            drawing=drawn(flow),
            caption="Each vessel in which something is done, with what comes into it and what leaves it",
            head=table.HEAD,
            rows=table.rows(flow),
            note=" ".join(filter(None, notes)),
        ),
    )


def flow_of(procedure: Procedure, run: Run, *, inside: bool, volumes: bool) -> Flow | None:
    """Give the graph of a procedure; None where there is nothing to show.

    Args:
        procedure: With the positions of its layers.
        run: How it went at the bench.
        inside: Whether components are told.
        volumes: Whether computed volumes are told.
    """
    tracer = Tracer(procedure, volumes=volumes)
    tracer.trace(run.ledger.entries)
    if not tracer.desk.worth:
        return None
    shares = Shares(run.ledger, run.known) if inside else None
    return finished(tracer.desk, run.ledger.entries, shares)
