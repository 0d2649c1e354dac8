"""Recipes of stocks as sentences."""

from __future__ import annotations

from typing import TYPE_CHECKING

from watchglass.publish.text import NBSP
from watchglass.run.recipes import Care, MakeUp, Measure, Unknown, Weigh

if TYPE_CHECKING:
    from watchglass.run.recipes import Line, Recipe

#: Share by which a rounded recipe may miss its strength before that is said [-].
_MISSES = 0.001


def recipe_lines(recipe: Recipe) -> tuple[str, ...]:
    """Put a recipe into sentences, in the order of the work."""
    lines = [_line(line) for line in recipe.lines]
    if recipe.reached is not None and abs(recipe.reached - 1) > _MISSES:
        share = f"{(recipe.reached - 1) * 100:+.1f}".replace("-", "−")
        lines.append(f"As rounded it comes to {share}{NBSP}% of the strength declared.")
    return tuple(lines)


def _line(line: Line) -> str:
    match line:
        case Weigh(name, text, _, _):
            return f"Weigh {_joined(text)} of {name}."
        case Measure(name, text, ware, _, _):
            by = f" with the {_joined(ware)}" if ware else ""
            return f"Measure {_joined(text)} of {name}{by}."
        case MakeUp(name, text, ware):
            where = f" in the {_joined(ware)}" if ware else ""
            return f"Make up to {_joined(text)} with {name}{where}, and mix."
        case Care(text, _):
            return f"Take care: {text}."
        case Unknown(why):
            return f"This cannot be worked out: {why}."


def _joined(text: str) -> str:
    return text.replace(" mL", f"{NBSP}mL").replace(" g", f"{NBSP}g").replace(" L", f"{NBSP}L")
