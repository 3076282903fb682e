"""What a worked step consists of: its formula, the numbers that go in, substituted lines, tables and results.

Values are in SI with their kind; how they are written is for whoever shows them.
"""

from __future__ import annotations

from dataclasses import dataclass

Cell = float | str


@dataclass(frozen=True, kw_only=True)
class Term:
    """One number of a step: symbol, what it is, value in SI and kind of quantity."""

    symbol: str
    meaning: str
    value: float
    kind: str


@dataclass(frozen=True, kw_only=True)
class Line:
    """A formula with its numbers substituted.

    Attributes
    ----------
    label
        What the line is about, empty when the step says it.
    pattern
        Text with ``{}`` for each number in turn, for example ``h = L − z₀ = {} − {} = {}``.
    values
        The numbers, each with its kind.
    """

    label: str = ""
    pattern: str
    values: tuple[tuple[float, str], ...]


@dataclass(frozen=True, kw_only=True)
class Table:
    """Rows of a step. Headings with the kind of their column ("text" for words), rows, and a row of sums."""

    headings: tuple[tuple[str, str], ...]
    rows: tuple[tuple[Cell, ...], ...]
    total: tuple[Cell, ...] = ()


@dataclass(frozen=True, kw_only=True)
class Step:
    """One step: title, formula in words and symbols, the numbers that go in, and what comes out."""

    title: str
    formula: str
    terms: tuple[Term, ...] = ()
    lines: tuple[Line, ...] = ()
    table: Table | None = None
    results: tuple[Term, ...] = ()


def term(symbol: str, meaning: str, value: float, kind: str) -> Term:
    """Build a term."""
    return Term(symbol=symbol, meaning=meaning, value=float(value), kind=kind)


def line(pattern: str, *values: tuple[float, str], label: str = "") -> Line:
    """Build a line."""
    return Line(label=label, pattern=pattern, values=tuple((float(value), kind) for value, kind in values))


def column_sum(rows: list[tuple[Cell, ...]], column: int) -> float:
    """Sum of one column of numbers."""
    return float(sum(float(row[column]) for row in rows))
