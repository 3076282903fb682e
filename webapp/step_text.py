"""Figures of the working: six digits, one unit for each kind, so that every step can be redone by hand."""

from __future__ import annotations

import math
import re

from loads.worked_step import Cell, Line, Table
from webapp.display import (
    CHOICES,
    MINUS,
    NO_BREAK,
    PLAIN,
    PRINT_DIGITS,
    System,
    fixed,
    from_si_factor,
    in_unit,
    unit_label,
)

POWERS = {"area": (2, "²"), "first moment of area": (3, "³"), "second moment of area": (4, "⁴")}
ELEVATION_DECIMALS = 4
LEAST_ELEVATION_DECIMALS = 2
_EXACT = 1e-9
_NIL = 1e-12
_POWER = re.compile(r"\{\}([²³⁴])")


def unit_of(kind: str, system: System) -> str:
    """Label of the one unit in which a kind stands in the working; empty for ratios and words.

    Examples
    --------
    >>> unit_of("area", "US"), unit_of("moment", "SI"), unit_of("ratio", "US")
    ('ft²', 'kN·m', '')
    """
    if kind in (*PLAIN, "text"):
        return ""
    if kind in POWERS:
        return unit_label("length", system) + POWERS[kind][1]
    return unit_label(kind, system)


def in_working_unit(value: float, kind: str, system: System) -> float:
    """Value in the unit of `unit_of`."""
    if kind in PLAIN:
        return value
    if kind in POWERS:
        return value / from_si_factor(CHOICES[system]["length"]) ** POWERS[kind][0]
    return in_unit(value, kind, system)


def figure(value: float, kind: str, system: System, digits: int = PRINT_DIGITS) -> str:
    """Value without its unit, zeros at the end left out where the figure is exact without them.

    Parameters
    ----------
    value
        In the SI base unit of the kind.
    kind
        A kind of `webapp.display.CHOICES`, "ratio", "area", or a moment of area.
    system
        "US" or "SI".
    digits
        Significant figures.

    Examples
    --------
    >>> figure(1.95072, "length", "US"), figure(4321.09, "force", "US")
    ('6.4', '971.420')
    """
    if not math.isfinite(value):
        return "dry" if kind == "elevation" else "–"
    number = in_working_unit(value, kind, system)
    return fixed(number, decimals_for([number], kind, digits))


def decimals_for(numbers: list[float], kind: str, digits: int = PRINT_DIGITS) -> int:
    """Decimals that show the largest number with so many digits, without those that are zero throughout."""
    largest = max((abs(number) for number in numbers if math.isfinite(number)), default=0.0)
    if largest < _NIL:
        return 0
    decimals = max(digits - 1 - math.floor(math.log10(largest)), 0)
    if kind == "elevation" and digits == PRINT_DIGITS:
        decimals = ELEVATION_DECIMALS
    finite = [number for number in numbers if math.isfinite(number)]
    least = LEAST_ELEVATION_DECIMALS if kind == "elevation" else 0
    while decimals > least and all(abs(round(n, decimals - 1) - n) <= _EXACT * largest for n in finite):
        decimals -= 1
    return decimals


def with_unit(value: float, kind: str, system: System, digits: int = PRINT_DIGITS) -> str:
    """Value with the unit of the working."""
    text, unit = figure(value, kind, system, digits), unit_of(kind, system)
    if not unit or text in ("dry", "–"):
        return text
    return f"{text}{unit}" if unit == "°" else f"{text}{NO_BREAK}{unit}"


def line_text(line: Line, system: System) -> str:
    """Line with its numbers and their units.

    Notes
    -----
    A figure that is raised to a power is put in brackets with its unit. Between figures stand × and / with
    spaces around, so that they are not taken for part of a unit.
    """
    texts = [with_unit(value, kind, system) for value, kind in line.values]
    parts = _POWER.sub(r"({})\1", line.pattern).split(" = ")
    spaced = [part.replace("·", " × ").replace("/", " / ") if "{}" in part else part for part in parts]
    return " = ".join(spaced).format(*texts)


def table_cells(table: Table, system: System) -> list[list[str]]:
    """Cells of a table as text, each column with decimals of its own; a row of sums comes last."""
    rows: list[tuple[Cell, ...]] = [*table.rows, *([table.total] if table.total else [])]
    columns = [_column([row[i] for row in rows], kind, system) for i, (_, kind) in enumerate(table.headings)]
    return [list(cells) for cells in zip(*columns, strict=True)]


def _column(cells: list[Cell], kind: str, system: System) -> list[str]:
    numbers = [in_working_unit(cell, kind, system) for cell in cells if not isinstance(cell, str)]
    decimals = decimals_for(numbers, kind)
    return [_cell(cell, kind, system, decimals) for cell in cells]


def _cell(cell: Cell, kind: str, system: System, decimals: int) -> str:
    if isinstance(cell, str):
        return cell
    if not math.isfinite(cell):
        return "dry" if kind == "elevation" else "–"
    return fixed(in_working_unit(cell, kind, system), decimals)


def show_column(values: list[float], kind: str, system: System, digits: int = PRINT_DIGITS) -> list[str]:
    """Values of a column without their unit, all with the decimals that the largest of them needs.

    Examples
    --------
    >>> show_column([4321.09, 43.2109], "force", "US", 4)
    ['971.4', '9.7']
    """
    decimals = decimals_for([in_working_unit(value, kind, system) for value in values], kind, digits)
    return [_cell(value, kind, system, decimals) for value in values]


def percent(change: float, digits: int = 3) -> str:
    """Change as a percentage with its sign.

    Examples
    --------
    >>> percent(0.1837).replace(NO_BREAK, " ")
    '+18.4 %'
    """
    if not math.isfinite(change):
        return "–"
    number = 100 * change
    decimals = decimals_for([number], "ratio", digits)
    sign = "+" if number > 0 and float(f"{number:.{decimals}f}") != 0 else ""
    return f"{sign}{fixed(number, decimals)}{NO_BREAK}%"


def tiny(value: float) -> str:
    """Relative difference with one digit and a power of ten.

    Examples
    --------
    >>> tiny(2.31e-16), tiny(0.0), tiny(0.3)
    ('2·10⁻¹⁶', '0', '3·10⁻¹')
    """
    if value == 0:
        return "0"
    mantissa, exponent = f"{value:.0e}".split("e")
    raised = str(int(exponent)).replace("-", MINUS).translate(str.maketrans("0123456789−", "⁰¹²³⁴⁵⁶⁷⁸⁹⁻"))
    return f"{mantissa}·10{raised}"
