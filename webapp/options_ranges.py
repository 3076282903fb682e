"""Dimensions of a wall that options go through, and the ranges typed for them. No Streamlit."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.problems import Problem, ScenarioError
from loads.quantity import UnreadableQuantityError, read_quantity
from loads.records.wall import Wall
from loads.units import from_si
from loads.wall.section_of_record import dimensions_of
from webapp.display import System

MOST_CANDIDATES = 100_000
"""Most candidates of one map."""
START_COUNT = 21
_DECIMALS = 6
_FIRST = {"gravity": ("base_width", "top_width"), "T": ("heel", "toe"), "L": ("base_thickness", "height")}
_UNITS: Mapping[System, tuple[str, float]] = {"US": ("ft", 0.25), "SI": ("m", 0.05)}


@dataclass(frozen=True, kw_only=True)
class Range:
    """Values of one dimension.

    Attributes
    ----------
    name
        As `dimensions_of` calls it.
    unit
        In which they are typed.
    texts
        Each value as it would be typed.
    values
        The same. [m]
    """

    name: str
    unit: str
    texts: tuple[str, ...]
    values: FloatArray


def label(name: str) -> str:
    """Name of a dimension in words.

    Examples
    --------
    >>> label("base_width")
    'Base width'
    """
    return name.replace("_", " ").capitalize()


def dimension_names(record: Wall) -> list[str]:
    """Dimensions that may vary, those that usually do first; the base stays where it is."""
    first = _FIRST.get(record.shape, ())
    if record.shape == "L":
        first = ("heel" if record.heel and record.heel.value else "toe", *first)
    names = [name for name in dimensions_of(record) if name != "base"]
    return [*first, *(name for name in names if name not in first)]


def value_of(record: Wall, name: str) -> str:
    """Value of a dimension as typed, or as it follows from what was typed."""
    entered = (
        getattr(record.key, name.removeprefix("key_")) if name.startswith("key_") else getattr(record, name)
    )
    if entered is not None:
        return str(entered.text)
    assert record.top_width is not None
    unit = record.top_width.unit
    return _text(from_si(float(dimensions_of(record)[name][0]), unit, "length"), unit)


def start_of(record: Wall, name: str, system: System) -> tuple[str, str, str]:
    """Low, high and count that a range begins with: from six to fourteen tenths of the value that stands."""
    unit, step = _UNITS[system]
    value = from_si(float(dimensions_of(record)[name][0]), unit, "length")
    low, high = max(math.floor(0.6 * value / step), 1) * step, math.ceil(1.4 * value / step) * step
    if value == 0:
        low, high = 0.0, 8 * step
    return _text(low, unit), _text(max(high, low + step), unit), str(START_COUNT)


def _text(value: float, unit: str) -> str:
    return f"{round(value, _DECIMALS):.12g} {unit}"


def range_of(name: str, low: str, high: str, count: str) -> Range:
    """Read a typed range.

    Parameters
    ----------
    name
        Dimension.
    low, high
        Ends with their units; values between them are even in the unit of the low end.
    count
        How many values, both ends among them.

    Raises
    ------
    ScenarioError
        With everything that is wrong with it.

    Examples
    --------
    >>> range_of("heel", "6 ft", "7 ft", "3").texts
    ('6 ft', '6.5 ft', '7 ft')
    """
    problems, ends = [], []
    for end, typed in (("low", low), ("high", high)):
        try:
            ends.append(read_quantity(typed.strip(), "length"))
        except UnreadableQuantityError as error:
            problems.append(Problem(path=f"{label(name)}, {end}", value=f'"{typed}"', rule=str(error)))
    if not count.strip().isdecimal() or not 2 <= int(count) <= MOST_CANDIDATES:
        rule = f"it must be a whole number from 2 to {MOST_CANDIDATES}"
        problems.append(Problem(path=f"{label(name)}, count", value=f'"{count}"', rule=rule))
    if len(ends) == 2 and not 0 <= ends[0][0] < ends[1][0]:
        rule = "it must be more than the low one, and neither may be negative"
        problems.append(Problem(path=f"{label(name)}, high", value=f'"{high}"', rule=rule))
    if problems:
        raise ScenarioError(problems)
    unit = ends[0][1]
    first, last = (from_si(value, unit, "length") for value, _ in ends)
    texts = tuple(_text(float(value), unit) for value in np.linspace(first, last, int(count)))
    values = np.array([read_quantity(text, "length")[0] for text in texts])
    return Range(name=name, unit=unit, texts=texts, values=values)


def ranges_of(typed: Sequence[tuple[str, str, str, str]]) -> list[Range]:
    """Read all ranges and hold the number of candidates against the most that one map takes.

    Raises
    ------
    ScenarioError
        With everything that is wrong, or too many candidates.
    """
    total = math.prod(int(count) for *_, count in typed if count.strip().isdecimal())
    if total > MOST_CANDIDATES:
        rule = f"a map takes at most {MOST_CANDIDATES}; type smaller counts or vary fewer dimensions"
        raise ScenarioError([Problem(path="the ranges", value=f"{total} candidates", rule=rule)])
    ranges: list[Range] = []
    problems: list[Problem] = []
    for name, low, high, count in typed:
        try:
            ranges.append(range_of(name, low, high, count))
        except ScenarioError as error:
            problems += error.problems
    if problems:
        raise ScenarioError(problems)
    return ranges
