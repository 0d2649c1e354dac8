"""Recipes of stocks as sentences."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.publish.text import NBSP
from watchglass.run.recipes import Begin, Care, Dissolve, MakeUp, Measure, Unknown, Weigh

if TYPE_CHECKING:
    from collections.abc import Mapping

    from watchglass.run.recipes import Line, Recipe

#: Share by which a rounded recipe may miss its strength before that is said [-].
_MISSES = 0.001


def recipe_lines(recipe: Recipe, names: Mapping[str, str] | None = None) -> tuple[str, ...]:
    """Put a recipe into sentences, in the order of the work.

    Args:
        recipe: What is weighed, measured and minded.
        names: What stocks that it is made from are called, by key.
    """
    lines = [_line(line, names or {}) for line in recipe.lines]
    if recipe.reached is not None and abs(recipe.reached - 1) > _MISSES:
        share = f"{(recipe.reached - 1) * 100:+.1f}".replace("-", "−")
        lines.append(f"As rounded it comes to {share}{NBSP}% of the strength declared.")
    return tuple(lines)


def _line(line: Line, names: Mapping[str, str]) -> str:
    match line:
        case Weigh(name, text, _, _):
            return f"Weigh {_joined(text)} of {names.get(name, name)}."
        case Measure(name, text, ware, _, _, fillings):
            by = f" with the {_joined(ware)}" if ware else ""
            often = f", in {fillings} fillings" if ware and fillings > 1 else ""
            return f"Measure {_joined(text)} of {names.get(name, name)}{by}{often}."
        case Begin(name, text):
            return f"Put about {_joined(text)} of {name} in first."
        case Dissolve(name, text):
            return f"Dissolve in about {_joined(text)} of {name}."
        case MakeUp(name, text, ware):
            where = f" in the {_joined(ware)}" if ware else ""
            return f"Make up to {_joined(text)} with {name}{where}, and mix."
        case Care(text, ""):
            return f"{text[:1].upper()}{text[1:]}."
        case Care(text, _):
            return f"Take care: {text}."
        case Unknown(why):
            return f"This cannot be worked out: {why}."


def _joined(text: str) -> str:
    return text.replace(" mL", f"{NBSP}mL").replace(" g", f"{NBSP}g").replace(" L", f"{NBSP}L")
