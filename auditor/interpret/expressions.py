"""Values of expressions: degrees, null for variables without a value, faults instead of crashes."""

from __future__ import annotations

import math
import operator
from collections.abc import Callable
from dataclasses import dataclass

from auditor.interpret.variables import Variables
from auditor.parse.blocks import Expression, Number, Unary, Variable

DEEPEST = 100  # levels of an expression
LARGEST = 1e9  # beyond it a value is no length, angle, count or speed


class ExpressionFault(Exception):  # noqa: N818 - a fault of the program, not of the auditor
    """An expression that has no value: division by zero, root of a negative number …"""


@dataclass(frozen=True, slots=True)
class Calculator:
    """Works out expressions over the variables of a run."""

    variables: Variables
    increment: float | None = None  # ROUND rounds to it (inside a word); None: to whole numbers
    atan_signed: bool = False  # ATAN gives -180..180 instead of 0..360

    def value(self, expression: Expression, depth: int = 0) -> float | None:
        """The value of an expression; None is null.

        Raises
        ------
        ExpressionFault
            When it has none.

        Example
        -------
        >>> from auditor.parse.blocks import Binary
        >>> Calculator(Variables()).value(Binary("+", Number(2, False, "2"), Unary("SQRT", Number(9, False, "9"))))
        5.0
        """
        if depth > DEEPEST:
            raise ExpressionFault("the expression is nested too deep")
        if isinstance(expression, Number):
            return expression.value
        if isinstance(expression, Variable):
            return self.variables.read(self.variable_number(expression, depth))
        if isinstance(expression, Unary):
            return self._unary(expression.name, self.value(expression.argument, depth + 1))
        return self._binary(
            expression.name, self.value(expression.left, depth + 1), self.value(expression.right, depth + 1)
        )

    def variable_number(self, variable: Variable, depth: int = 0) -> int:
        """Which variable ``#..`` names."""
        number = self.value(variable.number, depth + 1)
        if number is None or number < 0 or number > 99_999:
            raise ExpressionFault("the number of a variable is not a number from 0 to 99999")
        return round(number)

    def holds(self, condition: Expression) -> bool:
        """Whether a condition is true."""
        return bool(self.value(condition))

    def _unary(self, name: str, argument: float | None) -> float:
        try:
            if name == "ROUND" and self.increment is not None:
                return _half_up((argument or 0.0) / self.increment) * self.increment
            if name == "ATAN":
                return math.degrees(math.atan(argument or 0.0))
            return _kept(_UNARY[name](argument or 0.0))
        except KeyError:
            raise ExpressionFault(f"{name} is not a function known here") from None
        except (ValueError, OverflowError):
            raise ExpressionFault(f"{name} of {argument or 0.0:g} has no value") from None

    def _binary(self, name: str, left: float | None, right: float | None) -> float:
        if name in ("EQ", "NE"):
            same = left == right if left is None or right is None else math.isclose(left, right, abs_tol=1e-9)
            return float(same == (name == "EQ"))
        one, two = left or 0.0, right or 0.0
        try:
            if name == "ATAN":
                angle = math.degrees(math.atan2(one, two))
                return angle if self.atan_signed or angle >= 0 else angle + 360.0
            return _kept(_BINARY[name](one, two))
        except ZeroDivisionError:
            raise ExpressionFault("division by zero") from None
        except KeyError:
            raise ExpressionFault(f"{name} is not an operation known here") from None
        except (ValueError, OverflowError):
            raise ExpressionFault(f"{one:g} {name} {two:g} has no value") from None


def _kept(value: float) -> float:
    """A result that a control could hold."""
    if not math.isfinite(value) or abs(value) > LARGEST:
        raise OverflowError
    return value


def _half_up(value: float) -> float:
    return math.copysign(math.floor(abs(value) + 0.5), value)


def _outwards(value: float) -> float:
    return math.copysign(math.ceil(abs(value)), value)


def _from_bcd(value: float) -> float:
    return float(int(f"{_whole(value):x}"))


def _to_bcd(value: float) -> float:
    return float(int(str(_whole(value)), 16))


def _whole(value: float) -> int:
    if value < 0:
        raise ValueError
    return round(value)


def _on_bits(combine: Callable[[int, int], int]) -> Callable[[float, float], float]:
    return lambda left, right: float(combine(round(left), round(right)))


def _power(base: float, exponent: float) -> float:
    result = base**exponent if base or exponent >= 0 else math.inf
    if isinstance(result, complex):
        raise ValueError
    return float(result)


_UNARY: dict[str, Callable[[float], float]] = {
    "-": operator.neg,
    "SIN": lambda angle: math.sin(math.radians(angle)),
    "COS": lambda angle: math.cos(math.radians(angle)),
    "TAN": lambda angle: math.tan(math.radians(angle)),
    "ASIN": lambda value: math.degrees(math.asin(value)),
    "ACOS": lambda value: math.degrees(math.acos(value)),
    "SQRT": math.sqrt,
    "ABS": abs,
    "ROUND": _half_up,
    "FIX": lambda value: float(math.trunc(value)),
    "FUP": _outwards,
    "LN": math.log,
    "EXP": math.exp,
    "BIN": _from_bcd,
    "BCD": _to_bcd,
}
_BINARY: dict[str, Callable[[float, float], float]] = {
    "+": operator.add,
    "-": operator.sub,
    "*": operator.mul,
    "/": operator.truediv,
    "MOD": math.fmod,
    "POW": _power,
    "AND": _on_bits(operator.and_),
    "OR": _on_bits(operator.or_),
    "XOR": _on_bits(operator.xor),
    "GT": lambda left, right: float(left > right),
    "GE": lambda left, right: float(left >= right),
    "LT": lambda left, right: float(left < right),
    "LE": lambda left, right: float(left <= right),
}
