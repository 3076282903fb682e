"""A table of the package as text: headings with their unit, rows, and whether the last row sums up."""

from __future__ import annotations

from dataclasses import dataclass

from loads.worked_step import Table
from webapp.display import System
from webapp.step_text import table_cells, unit_of


@dataclass(frozen=True, kw_only=True)
class Heading:
    """Heading of a column: text, unit, and whether its cells are words rather than figures."""

    text: str
    unit: str = ""
    words: bool = False


@dataclass(frozen=True, kw_only=True)
class Grid:
    """Headings and rows of text."""

    headings: tuple[Heading, ...]
    rows: tuple[tuple[str, ...], ...]
    summed: bool = False
    """Whether the last row is a row of sums."""


def words(text: str) -> Heading:
    """Heading of a column of words."""
    return Heading(text=text, words=True)


def grid_of(table: Table, system: System, datum: str) -> Grid:
    """Table of a worked step, one unit to a column, elevations with their datum."""
    headings = tuple(
        Heading(text=text, unit=_unit(kind, system, datum), words=kind == "text")
        for text, kind in table.headings
    )
    rows = tuple(tuple(row) for row in table_cells(table, system))
    return Grid(headings=headings, rows=rows, summed=bool(table.total))


def _unit(kind: str, system: System, datum: str) -> str:
    unit = unit_of(kind, system)
    return f"{unit} {datum}" if kind == "elevation" else unit
