"""Drawings of the package at a stated scale, from the program's own drawing functions only."""

from __future__ import annotations

import math
import re
from collections import defaultdict
from dataclasses import dataclass

from markupsafe import Markup

from loads.assessment import Assessment, Barrier
from loads.units import to_si
from webapp.display import CHOICES, MINUS, THOUSANDS, System
from webapp.drawing.line import line_drawing
from webapp.drawing.palette import PRINT
from webapp.drawing.section import barrier_drawing

ROOM: dict[System, float] = {"US": 180.0, "SI": 175.0}
"""Width between the margins of the sheet. [mm]"""
_TICK = re.compile(
    rf'<text x="([\d.]+)" y="([\d.]+)"[^>]*text-anchor="end"[^>]*>([{MINUS}{THOUSANDS}\d.]+)</text>'
)
_BOX = re.compile(r'viewBox="0 0 ([\d.]+) ')
_ROUND = (1.0, 1.2, 1.5, 2.0, 2.5, 3.0, 4.0, 5.0, 6.0, 8.0, 10.0)
_MOST_SHRUNK = 1.08


@dataclass(frozen=True, kw_only=True)
class Drawing:
    """A drawing at a scale.

    Attributes
    ----------
    svg
        Built by `webapp.drawing`, which escapes every text in it.
    width
        Printed width. [mm]
    ratio
        How many times smaller than the barrier, for example 50; None when the drawing has no axis to tell.
    """

    svg: Markup
    width: float
    ratio: float | None

    @property
    def scale(self) -> str:
        """The scale in words."""
        if self.ratio is None:
            return "Elevations as on the axis; no scale is stated"
        return f"Scale 1 : {self.ratio:g}, up and across"


def flood_line_drawing(assessment: Assessment, system: System) -> Markup:
    """Flood line across the page."""
    return Markup(line_drawing(assessment, system=system, palette=PRINT))  # noqa: S704  built and escaped there


def round_ratio(least: float) -> float:
    """Number of a scale, not below `least`: that of a usual scale where one is near, else of two digits.

    Examples
    --------
    >>> round_ratio(47.2), round_ratio(43.2), round_ratio(8.1)
    (50.0, 44.0, 8.1)
    """
    power = 1.0
    while power * 10 <= least:
        power *= 10
    while power > least:
        power /= 10
    share = least / power * (1 - 1e-9)
    usual = next(value for value in _ROUND if value >= share)
    return power * (usual if usual <= share * _MOST_SHRUNK else math.ceil(share * 10) / 10)


def section_drawing(barrier: Barrier, system: System, datum: str) -> Drawing:
    """Section and pressure of one barrier, at a round scale and as wide as the page allows."""
    svg = barrier_drawing(barrier, system=system, palette=PRINT, datum=datum)
    markup = Markup(svg)  # noqa: S704  built and escaped there
    metre = metre_on_axis(svg, system)
    if metre is None:
        return Drawing(svg=markup, width=ROOM[system], ratio=None)
    ratio = round_ratio(1000 / (metre * ROOM[system]))
    return Drawing(svg=markup, width=1000 / (metre * ratio), ratio=ratio)


def metre_on_axis(svg: str, system: System) -> float | None:
    """Height of one metre as a share of a drawing's width, read off its elevation axis; None without one."""
    ticks: dict[str, list[tuple[float, float]]] = defaultdict(list)
    for x, y, label in _TICK.findall(svg):
        ticks[x].append((float(y), float(label.replace(MINUS, "-").replace(THOUSANDS, ""))))
    axis = max(ticks.values(), key=len, default=[])
    box = _BOX.search(svg)
    if len(axis) < 2 or box is None:
        return None
    (lower, low), (upper, high) = min(axis, key=lambda tick: tick[1]), max(axis, key=lambda tick: tick[1])
    unit = CHOICES[system]["elevation"].unit
    return (lower - upper) / to_si(high - low, unit, "length") / float(box[1])
