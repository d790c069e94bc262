"""Monomials in k and epsilon: which powers of two quantities give a third, and their evaluation.

Powers are formed by products and roots only, in an order that does not depend on array sizes, so
one case and a million cases give the same bits.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from fractions import Fraction
from functools import cache

import numpy as np

from closures.quantities import algebraic, quantity
from walllaw.arrays import Floats

CONSTANTS = {"C_mu", "C_L"}  # and plain numbers: combined first, whatever their shape
_ORDER = {"intensity": 0, "velocity": 1}  # their product recurs: form it first

Factors = tuple[tuple[str, Fraction], ...]


def exponents(name: str) -> Mapping[str, Fraction]:
    """Return the exponents of a quantity by base."""
    monomial = quantity(name).monomial
    if monomial is None:  # a caller's mistake, not a user's: callers go through INPUTS
        raise KeyError(name)
    return monomial


def k_epsilon(name: str) -> tuple[Fraction, Fraction]:
    """Return the exponents of k and of epsilon."""
    monomial = exponents(name)
    return monomial.get("k", Fraction(0)), monomial.get("epsilon", Fraction(0))


@cache
def plan(wanted: str, first: str, second: str) -> Factors:
    """Return the factors (base, exponent) that give one quantity from two others.

    Examples
    --------
    >>> plan("omega", "k", "nu_t")
    (('k', Fraction(1, 1)), ('nu_t', Fraction(-1, 1)))
    """
    w, a, b = exponents(wanted), exponents(first), exponents(second)
    (ak, ae), (bk, be), (wk, we) = (k_epsilon(n) for n in (first, second, wanted))
    det = ak * be - ae * bk
    x = (wk * be - we * bk) / det
    y = (ak * we - ae * wk) / det
    factors = {first: x, second: y}
    for base in sorted(({*w} | {*a} | {*b}) - {"k", "epsilon"}):
        power = (
            w.get(base, Fraction(0)) - x * a.get(base, Fraction(0)) - y * b.get(base, Fraction(0))
        )
        factors[base] = factors.get(base, Fraction(0)) + power
    return tuple((base, power) for base, power in factors.items() if power)


@dataclass(frozen=True, slots=True, eq=False, repr=False)
class Term:
    """Bases that share an exponent: (product of above / product of below)**(power/root)."""

    above: tuple[str, ...]
    below: tuple[str, ...]
    power: int
    root: int


def _terms(factors: Iterable[tuple[str, Fraction]]) -> tuple[Term, ...]:
    groups: dict[Fraction, tuple[list[str], list[str]]] = {}
    for base, power in sorted(factors, key=lambda f: _ORDER.get(f[0], 2)):
        groups.setdefault(abs(power), ([], []))[power < 0].append(base)
    terms = [
        Term(tuple(above), tuple(below), power.numerator, power.denominator)
        for power, (above, below) in sorted(groups.items())
    ]
    return tuple(sorted(terms, key=lambda term: not term.above))  # no reciprocal where avoidable


Program = tuple[tuple[Term, ...], tuple[Term, ...]]


@cache
def compiled(wanted: str, first: str, second: str) -> Program:
    """Return the terms of constants and the terms of variables of a plan."""
    factors = plan(wanted, first, second)
    constant = [f for f in factors if f[0] in CONSTANTS or f[0][0].isdigit()]
    return _terms(constant), _terms(f for f in factors if f not in constant)


class Block:
    """The quantities of one block of points, with the products and powers already formed."""

    def __init__(self, values: Mapping[str, Floats]) -> None:
        self._values = values
        self._formed: dict[tuple[tuple[str, ...], int], Floats] = {}

    def _product(self, names: tuple[str, ...]) -> Floats:
        if len(names) == 1:
            return self._values[names[0]]
        key = (names, 1)
        if key not in self._formed:
            self._formed[key] = self._product(names[:-1]) * self._values[names[-1]]
        return self._formed[key]

    def _whole_power(self, names: tuple[str, ...], power: int) -> Floats:
        if power == 1:
            return self._product(names)
        key = (names, power)
        if key not in self._formed:
            half = self._whole_power(names, power // 2)
            square = half * half
            self._formed[key] = square * self._product(names) if power % 2 else square
        return self._formed[key]

    def _term(self, term: Term) -> Floats:
        if not (term.above and term.below) and term.root == 1:
            return self._whole_power(term.above or term.below, term.power)
        base = self._product(term.above or term.below)
        if term.above and term.below:
            base = base / self._product(term.below)
        return _rational_power(base, term.power, term.root)

    def _evaluate(self, terms: tuple[Term, ...]) -> Floats | None:
        """Multiply the terms, always in the same order."""
        result: Floats | None = None
        for term in terms:
            factor = self._term(term)
            if term.above:
                result = factor if result is None else result * factor
            else:
                result = 1.0 / factor if result is None else result / factor
        return result

    def scale(self, program: Program) -> Floats:
        """Return the factor that holds constants only."""
        scale = self._evaluate(program[0])
        return np.ones(1) if scale is None else scale

    def monomial(self, program: Program, scale: Floats, out: Floats | None = None) -> Floats:
        """Return scale times the product of the variables."""
        body = self._evaluate(program[1])
        return np.multiply(scale, np.ones(1) if body is None else body, out=out)


def _rational_power(x: Floats, power: int, root: int) -> Floats:
    """Return x**(power/root) for positive x by products and roots."""
    while root % 2 == 0:
        x, root = np.sqrt(x), root // 2
    if root == 3:
        x = np.cbrt(x)
    result = x
    for bit in bin(power)[3:]:
        result = result * result
        if bit == "1":
            result = result * x
    return result


@cache
def numbers() -> dict[str, Floats]:
    """Return the plain numbers of the table as arrays of one value."""
    bases = {base for name in algebraic() for base in exponents(name) if base[0].isdigit()}
    return {base: np.array([float(Fraction(base))]) for base in bases}
