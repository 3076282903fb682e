"""A pocket calculator: redoes a printed line from its figures, and knows how far rounding may carry it."""

from __future__ import annotations

import ast
import math
import operator
import re
from collections.abc import Callable, Sequence

from webapp.display import CHOICES, MINUS, NO_BREAK, PRINT_DIGITS, THOUSANDS, System
from webapp.step_text import ELEVATION_DECIMALS, POWERS, unit_of

_SUPERSCRIPTS = {"²": "**2", "³": "**3", "⁴": "**4"}
_OPERATORS: dict[type[ast.AST], Callable[..., float]] = {
    ast.Add: operator.add,
    ast.Sub: operator.sub,
    ast.Mult: operator.mul,
    ast.Div: operator.truediv,
    ast.Pow: operator.pow,
    ast.USub: operator.neg,
}
_KEYS: dict[str, Callable[[float], float]] = {
    "sin": math.sin,
    "cos": math.cos,
    "arccos": lambda x: math.acos(max(-1.0, min(1.0, x))),
    "sqrt": lambda x: math.sqrt(max(x, 0.0)),
    "radians": math.radians,
}


def rounding(printed: float, exact: float, kind: str, column: Sequence[float] = ()) -> float:
    """Greatest error of a printed figure, in the unit printed; none when nothing was rounded.

    `column` holds the figures that share its decimals.
    """
    if abs(printed - exact) <= 1e-9 * abs(exact):
        return 0.0
    if kind == "elevation":
        return 0.5 * 10.0**-ELEVATION_DECIMALS
    largest = max(abs(value) for value in (*column, exact))
    return 0.5 * 10.0 ** -max(PRINT_DIGITS - 1 - math.floor(math.log10(largest)), 0)


def redo(
    formula: Callable[..., float], figures: Sequence[float], errors: Sequence[float]
) -> tuple[float, float]:
    """Result of a formula from printed figures, and how far their rounding may carry it."""
    found = formula(*figures)
    tolerance = 1e-9 * abs(found)
    for i, error in enumerate(errors):
        moved = [
            formula(*(figure + change * (i == k) for k, figure in enumerate(figures)))
            for change in (error, -error)
        ]
        tolerance += max(abs(value - found) for value in moved)
    return found, 1.05 * tolerance


def number_of(text: str) -> float:
    """Figure as a person reads it."""
    return float(text.replace(THOUSANDS, "").replace(MINUS, "-"))


def calculator(expression: str, system: System) -> Callable[..., float]:
    """Formula of a printed expression: a function of the figures in it, in their order.

    `#` stands for each figure. Units are left out: those of the working go together without a factor.
    """
    kinds = [*CHOICES[system], *POWERS]
    for unit in sorted({unit_of(kind, system) for kind in kinds} - {"°"}, key=len, reverse=True):
        expression = expression.replace(f"#{NO_BREAK}{unit}", "#")
    expression = re.sub(r"(sin|cos) #°", r"\1(radians(#))", expression)
    expression = expression.replace("√#", "sqrt(#)").replace("√", "sqrt").replace("[", "(").replace("]", ")")
    expression = expression.replace("π", repr(math.pi))
    expression = expression.replace("×", "*").replace("·", "*").replace(MINUS, "-").replace("^", "**")
    for mark, power in _SUPERSCRIPTS.items():
        expression = expression.replace(mark, power)
    count = expression.count("#")
    for i in range(count):
        expression = expression.replace("#", f"x{i}_", 1)
    tree = ast.parse(expression.strip(), mode="eval").body

    def formula(*figures: float) -> float:
        assert len(figures) == count, expression
        return _value(tree, {f"x{i}_": figure for i, figure in enumerate(figures)})

    return formula


def _value(node: ast.AST, figures: dict[str, float]) -> float:
    if isinstance(node, ast.Constant):
        assert isinstance(node.value, int | float)
        return float(node.value)
    if isinstance(node, ast.Name):
        return figures[node.id]
    if isinstance(node, ast.UnaryOp):
        return _OPERATORS[type(node.op)](_value(node.operand, figures))
    if isinstance(node, ast.BinOp):
        return _OPERATORS[type(node.op)](_value(node.left, figures), _value(node.right, figures))
    assert isinstance(node, ast.Call), ast.dump(node)
    assert isinstance(node.func, ast.Name)
    return _KEYS[node.func.id](_value(node.args[0], figures))
