"""Which elevations the drawing of a flood line shows."""

from __future__ import annotations

import math
from statistics import median

from webapp.drawing.reading import Reading

_TALLEST = 9.0
"""Elevations shown, in heights of the middling barrier, before outliers are left out."""
_REACH = 0.6
"""How far beyond the barriers a level is still shown, as a share of their range."""
_MARGIN = 0.07


def shown_range(readings: list[Reading], levels: list[float]) -> tuple[float, float]:
    """Lower and upper end of the elevation axis.

    Parameters
    ----------
    readings
        Barriers; their rated and first-limit levels are shown where these are near.
    levels
        Water levels, −inf when dry. [m]

    Returns
    -------
    tuple of float
        Ends; what lies beyond them is said in words. [m]
    """
    if not readings:
        near = [level for level in levels if math.isfinite(level)] or [0.0]
        return min(near) - 1, min(near) + 2
    low, high = _barrier_range(readings)
    reach = max(_REACH * (high - low), 0.3)
    wanted = [level for level in levels if math.isfinite(level)]
    for reading in readings:
        rated, first = reading.record.rated_level, reading.first_limit
        wanted += [rated.value] if rated else []
        wanted += [first.level] if first is not None and first.level is not None else []
    shown = [z for z in wanted if low - reach <= z <= high + reach]
    low, high = min([low, *shown]), max([high, *shown])
    margin = _MARGIN * (high - low)
    return low - margin, high + margin


def _barrier_range(readings: list[Reading]) -> tuple[float, float]:
    bottoms = [reading.face.bottom for reading in readings]
    tops = [reading.drawn_top for reading in readings]
    low, high = min(bottoms), max(tops)
    height = median(top - bottom for top, bottom in zip(tops, bottoms, strict=True))
    if high - low <= _TALLEST * height:
        return low, high
    middle = median((top + bottom) / 2 for top, bottom in zip(tops, bottoms, strict=True))
    half = _TALLEST * height / 2
    near = [i for i, z in enumerate(bottoms) if middle - half <= z and tops[i] <= middle + half]
    if not near:
        return middle - half, middle + half
    return min(bottoms[i] for i in near), max(tops[i] for i in near)
