"""Where substances and stocks are used, as far as an edition's own pages show it.

Everything here is made from the pages of the edition and from what they show of their procedures:
a candidate of a secret sample is used nowhere as far as the student edition knows.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

from watchglass.publish import model as m
from watchglass.publish.text import NBSP, joined
from watchglass.resolve import model
from watchglass.resolve.materials import MaterialReader
from watchglass.resolve.reactions import substances_of

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Mapping

    from watchglass.catalogue.catalogue import Catalogue
    from watchglass.catalogue.stocks import Stock

Words = tuple[m.Words, ...]


class Use(NamedTuple):
    """A procedure of the edition.

    Attributes:
        link: To its page.
        procedure: What its page is made from.
        rows: The table of materials on its page.
        weeks: When it is run.
    """

    link: m.PageLink
    procedure: model.Procedure
    rows: tuple[m.ReagentRow, ...]
    weeks: tuple[int, ...]


class Uses(NamedTuple):
    """What is used where; entries in the order of the handbook.

    Attributes:
        substances: By key: the procedures, with how much of it a station uses.
        stocks: By key: likewise.
        contents: By stock: keys of the substances in it, its solvent last.
        containing: By substance: the stocks that contain it, solvents left out.
    """

    substances: Mapping[str, tuple[m.ListEntry, ...]]
    stocks: Mapping[str, tuple[m.ListEntry, ...]]
    contents: Mapping[str, tuple[str, ...]]
    containing: Mapping[str, tuple[str, ...]]


def gather(uses: Iterable[Use], catalogue: Catalogue, *, instructor: bool) -> Uses:
    """Gather what the procedures of an edition use.

    Args:
        uses: The procedures, in the order of the handbook.
        catalogue: What they were looked up in.
        instructor: Whether everything the set has is wanted, used or not, and the candidates of
            secret samples. Students see what their procedures show.
    """
    substances: dict[str, list[m.ListEntry]] = {}
    stocks: dict[str, list[m.ListEntry]] = {}
    known = {stock.key: stock for stock in catalogue.stocks.values()}
    if instructor:
        substances = {key: [] for key in catalogue.own}
        stocks = {key: [] for key in known}
    for use in uses:
        weeks = weeks_words(use.weeks)
        for key, words in _substances(use, instructor=instructor).items():
            substances.setdefault(key, []).append(m.ListEntry(use.link, weeks, words))
        for key, words in _stocks(use, instructor=instructor).items():
            if key in known:
                stocks.setdefault(key, []).append(m.ListEntry(use.link, weeks, words))
    contents: dict[str, tuple[str, ...]] = {}
    containing: dict[str, list[str]] = {}
    for key in sorted(stocks):
        solutes, solvents = stock_contents(known[key], catalogue)
        contents[key] = (*solutes, *solvents)
        for substance in contents[key]:
            substances.setdefault(substance, [])
        for substance in solutes:
            containing.setdefault(substance, []).append(key)
    return Uses(
        {key: tuple(entries) for key, entries in substances.items()},
        {key: tuple(entries) for key, entries in stocks.items()},
        contents,
        {key: tuple(keys) for key, keys in containing.items()},
    )


def weeks_words(weeks: tuple[int, ...]) -> str:
    """Say when a procedure is run.

    >>> weeks_words((3,)), weeks_words((3, 5))
    ('week 3', 'weeks 3, 5')
    """
    if not weeks:
        return ""
    said = ", ".join(str(week) for week in weeks)
    return f"week {said}" if len(weeks) == 1 else f"weeks {said}"


def stock_contents(stock: Stock, catalogue: Catalogue) -> tuple[tuple[str, ...], tuple[str, ...]]:
    """Give the keys of what is in a stock, and of what that is dissolved in."""
    composition = MaterialReader(catalogue).of_stock(stock)
    return _dissolved(composition), _solvents(composition)


# ---------------------------------------------------------------- one procedure


def _substances(use: Use, *, instructor: bool) -> dict[str, Words]:
    """Give what a procedure names openly, with how much of it a station uses."""
    found: dict[str, list[Words]] = {}
    solvents: dict[str, None] = {}
    for name, material in use.procedure.materials.items():
        composition = material.composition
        if isinstance(composition, model.Secret):
            if instructor:
                for candidate in composition.candidates.values():
                    said: Words = (m.Run(f"one of those that {_spaced(name)} may be"),)
                    found.setdefault(candidate.key, []).append(said)
                solvents |= dict.fromkeys(_solvents(composition))
            continue
        rows = {row.key: row for row in use.rows if row.material == name}
        for substance in substances_of(material):
            said = _amount(rows.get(substance.key), composition)
            found.setdefault(substance.key, []).append(said)
        solvents |= dict.fromkeys(_solvents(composition))
    for key in solvents:
        found.setdefault(key, []).append((m.Run("as solvent"),))
    for key in _in_equations(use.procedure):
        if key not in found:
            found[key] = [(m.Run("in an equation"),)]
    return {key: _listed(parts) for key, parts in found.items()}


def _stocks(use: Use, *, instructor: bool) -> dict[str, Words]:
    """Give the stocks that a procedure uses; how much of each is told to instructors."""
    found: dict[str, list[Words]] = {}
    for row in use.rows:
        if row.stock:
            found.setdefault(row.stock, []).append(row.used if instructor else ())
    return {key: _listed(parts) for key, parts in found.items()}


def _amount(row: m.ReagentRow | None, composition: model.Composition) -> Words:
    """Say how much is used: of a solution with its strength, of a mixture's part as computed."""
    if row is None:
        return (m.Run("in a mixture"),)
    if m.Run("–") in row.used:
        return (m.Run("on the list, used by no step"),)
    match composition:
        case model.Solution():
            return (*row.used, m.Run(" of "), *row.strength)
        case model.Saturated():
            return (*row.used, m.Run(" of a saturated solution"))
        case model.Mixture():
            return (*row.used, m.Run(" in a mixture"))
        case _:
            return row.used


def _in_equations(procedure: model.Procedure) -> Iterator[str]:
    for reaction in procedure.reactions.values():
        for species in (*reaction.left, *reaction.right):
            if species.substance is not None:
                yield species.substance.key


def _dissolved(composition: model.Composition) -> tuple[str, ...]:
    match composition:
        case model.Pure(substance):
            return (substance.key,)
        case model.Solution(_, solute, _) | model.Saturated(solute, _):
            return (solute.key,)
        case model.Mixture(parts, _, _):
            return tuple(dict.fromkeys(part.substance.key for part in parts))
        case _:
            return ()


def _solvents(composition: model.Composition) -> tuple[str, ...]:
    match composition:
        case model.Solution(_, _, solvent) | model.Saturated(_, solvent):
            return (solvent.key,)
        case model.Mixture(_, _, solvent) | model.Secret(_, _, solvent) if solvent is not None:
            return (solvent.key,)
        case _:
            return ()


def _listed(parts: list[Words]) -> Words:
    """Join what is said of one thing, each once: `15 mL of 3.0 M; as solvent`."""
    words: list[m.Words] = []
    for part in dict.fromkeys(filter(None, parts)):
        words += [m.Run("; "), *part] if words else part
    return joined(words)


def _spaced(name: str) -> str:
    return name.replace("-", NBSP)
