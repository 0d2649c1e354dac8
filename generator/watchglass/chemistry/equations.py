# placeholder: to be overwritten
from __future__ import annotations
import re
from dataclasses import dataclass
from fractions import Fraction
@dataclass(frozen=True, slots=True)
class Term: coefficient: Fraction; text: str; start: int; end: int
@dataclass(frozen=True, slots=True)
class EquationText: left: tuple[Term, ...]; right: tuple[Term, ...]
@dataclass(frozen=True, slots=True)
class EquationFault: message: str; start: int; end: int; help: str | None = None
@dataclass(frozen=True, slots=True)
class Balance:
    excess_left: dict; charge_excess_left: int
    @property
    def balanced(self): return not self.excess_left and not self.charge_excess_left
def split_equation(text):
    m = re.split(r"\s+(->|→|⇌)\s+", text)
    if len(m) != 3: return EquationFault("no arrow", 0, len(text))
    sides = []; at = 0
    for part in (m[0], m[2]):
        terms = []
        for t in part.split(" + "):
            t = t.strip(); s = text.index(t, at); at = s + len(t)
            c = re.match(r"(\d+) (?=\S)", t); n = 1
            if c: n = int(c[1]); s += c.end(); t = t[c.end():]
            terms.append(Term(Fraction(n), t, s, s + len(t)))
        sides.append(tuple(terms))
    return EquationText(*sides)
def check_balance(left, right):
    ex = {}; q = 0
    for sign, side in ((1, left), (-1, right)):
        for c, f in side:
            q += sign * c * f.charge
            for e, n in f.composition: ex[e] = ex.get(e, 0) + sign * c * n
    return Balance({e: n for e, n in ex.items() if n}, q)
def balance(left, right): return None
