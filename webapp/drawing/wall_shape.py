"""A wall's section as corners, and what stands and lies about it."""

from __future__ import annotations

import math

import numpy as np

from loads.records.i_wall import IWall
from loads.records.wall import Wall
from loads.wall.i_wall import gap_bottom
from loads.wall.section_of_record import section_of
from webapp.drawing.svg import Point

SHEET = 0.3
"""Thickness at which the sheet of an I-wall is drawn, which nobody enters. [m]"""


def outline_of(wall: Wall | IWall) -> list[Point]:
    """Outline in section, (x from the heel, elevation). [m]."""
    if isinstance(wall, IWall):
        low, high = wall.tip.value, wall.top.value
        return [(0.0, low), (SHEET, low), (SHEET, high), (0.0, high)]
    section = section_of(wall)
    return list(zip(section.x[0].tolist(), section.z[0].tolist(), strict=True))


def outline_across(wall: Wall | IWall) -> list[Point]:
    """Outline in section about its middle; an I-wall as far as it stands out of the ground. [m]."""
    ring = outline_of(wall)
    if isinstance(wall, IWall):
        ground = min(wall.ground("protected"), wall.ground("flood"))
        ring = [(x, max(z, ground)) for x, z in ring]
    across = [x for x, _ in ring]
    middle = (min(across) + max(across)) / 2
    return [(x - middle, z) for x, z in ring]


def width_of_base(wall: Wall | IWall) -> float:
    """Width of the base, of an I-wall that at which its sheet is drawn. [m]."""
    return SHEET if isinstance(wall, IWall) else wall.extent()[2]


def parting(wall: Wall | IWall) -> float:
    """Distance from the heel at which the two sides part: the middle of the top. [m]."""
    ring = outline_of(wall)
    top = max(z for _, z in ring)
    across = [x for x, z in ring if z > top - 1e-9 * max(1.0, abs(top))]
    return (min(across) + max(across)) / 2


def ground_of(wall: Wall | IWall, side: str) -> float:
    """Ground that is drawn on one side: that entered, or up to the base. [m]."""
    ground = wall.ground(side)
    return ground if math.isfinite(ground) or isinstance(wall, IWall) else wall.base.value


def gap_of(wall: Wall | IWall) -> tuple[float, float] | None:
    """Lower and upper end of the gap on the flood side; None without one. [m]."""
    if isinstance(wall, Wall) or wall.gap == "none":
        return None
    low = float(gap_bottom(wall, np.array([wall.tip.value]))[0])
    return low, wall.ground("flood")
