# placeholder: to be overwritten
"""Formulas stub."""
from __future__ import annotations
import re
from dataclasses import dataclass
from functools import lru_cache
from watchglass.chemistry.elements import WEIGHTS
@dataclass(frozen=True, slots=True)
class FormulaFault:
    message: str
    start: int
    end: int
    help: str | None = None
@dataclass(frozen=True, slots=True)
class Formula:
    text: str
    composition: tuple[tuple[str, int], ...]
    charge: int
    @property
    def molar_mass(self) -> float | None:
        return sum(WEIGHTS[e] * n for e, n in self.composition)
_T = re.compile(r"([A-Z][a-z]?)(\d*)|([(\[])|([)\]])(\d*)")
@lru_cache(4096)
def parse_formula(text: str) -> Formula | FormulaFault:
    body, caret, ch = text.partition("^")
    total: dict[str, float] = {}
    charge = 0
    if caret:
        m = re.fullmatch(r"(\d*)([+-])", ch)
        if not m: return FormulaFault("charge", len(body), len(text))
        charge = int(m[1] or 1) * (1 if m[2] == "+" else -1)
    if not body: return FormulaFault("empty", 0, 0)
    for i, unit in enumerate(body.split("·")):
        mult = 1.0
        if i and (m := re.match(r"\d+(\.\d+)?", unit)):
            mult = float(m[0]); unit = unit[m.end():]
        stack: list[dict[str, float]] = [{}]
        at = 0
        if not unit: return FormulaFault("empty unit", 0, len(text))
        while at < len(unit):
            m = _T.match(unit, at)
            if not m: return FormulaFault(f"`{unit[at]}` cannot stand in a formula", at, at + 1)
            at = m.end()
            if m[1]:
                if m[1] not in WEIGHTS: return FormulaFault(f"`{m[1]}` is no element", m.start(), m.end())
                stack[-1][m[1]] = stack[-1].get(m[1], 0) + int(m[2] or 1)
            elif m[3]: stack.append({})
            else:
                if len(stack) < 2: return FormulaFault("bracket", m.start(), m.end())
                top = stack.pop()
                for e, n in top.items(): stack[-1][e] = stack[-1].get(e, 0) + n * int(m[5] or 1)
        if len(stack) > 1: return FormulaFault("bracket open", 0, len(text))
        for e, n in stack[0].items(): total[e] = total.get(e, 0) + n * mult
    return Formula(text, tuple(sorted((e, int(n) if n == int(n) else n) for e, n in total.items())), charge)
