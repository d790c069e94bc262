"""Numbers of the tables: fractions, decimals and expressions, evaluated without rounding twice.

A table holds ``"5/9"``, ``"0.0828"`` or ``"beta/beta_star - sigma*kappa**2/sqrt(beta_star)"``.
Fractions and decimals stay exact until the one rounding to double precision.
"""

from __future__ import annotations

import ast
import math
import operator
from collections.abc import Callable, Mapping
from fractions import Fraction

from walllaw.errors import TableError

Number = Fraction | float
_DIGITS = 60  # of a literal; no printed number is longer
_POWER = 999  # largest power of ten of a literal: beyond lies no double
_BITS = 10_000  # of an exact power; a longer one is a mistake and would take for ever

_BINARY: dict[type[ast.operator], Callable[[Number, Number], Number]] = {
    ast.Add: operator.add,
    ast.Sub: operator.sub,
    ast.Mult: operator.mul,
    ast.Div: operator.truediv,
}
_FUNCTIONS: dict[str, Callable[[float], float]] = {
    "sqrt": math.sqrt,
    "exp": math.exp,
    "log": math.log,
    "cos": math.cos,
    "acos": math.acos,
}


def _literal(text: str) -> Fraction:
    power = text.lower().partition("e")[2]
    if len(text) > _DIGITS or abs(int(power or "0")) > _POWER:
        raise TableError(f"expression {text[:_DIGITS]!r}: not a number of usual size")
    return Fraction(text)


def _power(base: Number, exponent: Number) -> Number:
    if isinstance(base, Fraction):
        bits = max(base.numerator.bit_length(), base.denominator.bit_length())
        if abs(float(exponent)) * bits > _BITS:
            raise TableError("expression: the power is too large")
    result: Number | complex = base**exponent
    if isinstance(result, complex):
        raise TableError("expression: a fractional power of a negative number")
    return result


def _value(node: ast.expr, known: Mapping[str, Number], literal: str) -> Number:
    match node:
        case ast.Constant(value=bool()):
            pass
        case ast.Constant(value=int() | float()):
            return _literal(literal[node.col_offset : node.end_col_offset])
        case ast.Name(id=name):
            if name == "pi":
                return math.pi
            if name in known:
                return known[name]
            raise TableError(f"expression {literal!r}: {name!r} is not known")
        case ast.UnaryOp(op=ast.USub(), operand=operand):
            return -_value(operand, known, literal)
        case ast.BinOp(left=left, op=op, right=right) if type(op) in _BINARY:
            return _BINARY[type(op)](_value(left, known, literal), _value(right, known, literal))
        case ast.BinOp(left=left, op=ast.Pow(), right=right):
            return _power(_value(left, known, literal), _value(right, known, literal))
        case ast.Call(func=ast.Name(id=name), args=[argument], keywords=[]) if name in _FUNCTIONS:
            return _FUNCTIONS[name](float(_value(argument, known, literal)))
    raise TableError(f"expression {literal!r}: only numbers, names, + - * / ** and functions")


def evaluate(text: str, known: Mapping[str, Number] | None = None) -> Number:
    """Return the value of a number, a fraction or an expression of named numbers.

    Parameters
    ----------
    text : str
        ``"5/9"``, ``"1e-5"``, or an expression; the functions sqrt, exp, log, cos, acos and the
        name pi are known.
    known : mapping of str to number, optional
        Values of the names.

    Returns
    -------
    Fraction or float
        Exact as long as no function and no fractional power is used.

    Raises
    ------
    TableError
        If the text is anything else.

    Examples
    --------
    >>> evaluate("5/9")
    Fraction(5, 9)
    >>> float(evaluate("beta/beta_star - 1", {"beta": evaluate("0.0828"), "beta_star": 0.09}))
    -0.07999999999999996
    """
    try:
        body = ast.parse(text.strip(), mode="eval").body
        result = _value(body, known or {}, text.strip())
        if not math.isfinite(float(result)):
            raise TableError(f"expression {text!r}: not finite")
        return result
    except (SyntaxError, ZeroDivisionError, OverflowError, RecursionError, ValueError) as error:
        if isinstance(error, TableError):
            raise
        raise TableError(f"expression {text!r}: {error}") from None
