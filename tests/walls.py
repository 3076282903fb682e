"""Walls and their results for tests, from tables as a file would hold them."""

from __future__ import annotations

from typing import Any

import numpy as np

from loads.arrays import FloatArray
from loads.records.wall import Wall
from loads.states import DRY, Levels
from loads.wall.section_of_record import section_of
from loads.wall.site_of_record import site_of
from loads.wall.stability import Stability, stability
from loads.wall.wall_result import WallResult, assess_wall
from loads.water import Fluid

GROUND = {"friction_coefficient": 0.75}
TEE: dict[str, Any] = {
    "shape": "T",
    "height": "4 m",
    "top_width": "0.4 m",
    "stem_width": "0.7 m",
    "flood_batter": "0.1 m",
    "base_thickness": "0.5 m",
    "heel": "2 m",
    "toe": "1 m",
    "unit_weight": "24 kN/m3",
    "foundation": {"friction_angle": "30 deg", "saturated_unit_weight": "20 kN/m3"},
}
BLOCK: dict[str, Any] = {
    "shape": "gravity",
    "height": "2 m",
    "top_width": "1.2 m",
    "base_width": "1.2 m",
    "unit_weight": "24 kN/m3",
    "foundation": {"friction_coefficient": 0.5},
}
SOIL: list[dict[str, Any]] = [
    {
        "side": "flood",
        "top": "2 m",
        "pressure": "at rest",
        "saturated_unit_weight": "20 kN/m3",
        "moist_unit_weight": "18 kN/m3",
        "friction_angle": "30 deg",
        "surcharge": "5 kPa",
    },
    {
        "side": "flood",
        "top": "1.2 m",
        "pressure": "active",
        "saturated_unit_weight": "19 kN/m3",
        "friction_angle": "25 deg",
        "cohesion": "6 kPa",
    },
    {
        "side": "protected",
        "top": "1 m",
        "pressure": "passive",
        "saturated_unit_weight": "19 kN/m3",
        "friction_angle": "28 deg",
        "cohesion": "2 kPa",
    },
]


def wall_of(table: dict[str, Any]) -> Wall:
    """Validated record; id and base are filled in."""
    return Wall.model_validate({"id": "W1", "base": "0 m", "foundation": GROUND, **table})


def waters(unit_weight: float = 9810.0) -> dict[str, Fluid]:
    """The same water on both sides."""
    return {side: Fluid(unit_weight=unit_weight, basis="test") for side in ("flood", "protected")}


def states(flood_side: Any, protected_side: Any = DRY) -> Levels:
    """States from numbers or lists."""
    flood = np.atleast_1d(np.asarray(flood_side, float))
    protected = np.broadcast_to(np.asarray(protected_side, float), flood.shape)
    return Levels(flood_side=flood, protected_side=np.array(protected))


def stable(
    table: dict[str, Any], flood_side: Any, protected_side: Any = DRY, unit_weight: float = 9810.0
) -> Stability:
    """Stability of a wall in some states."""
    wall = wall_of(table)
    site = site_of(wall, waters(unit_weight))
    return stability(section_of(wall), states(flood_side, protected_side), site)


def assessed_wall(
    table: dict[str, Any], flood_side: Any, protected_side: Any = DRY, unit_weight: float = 9810.0
) -> WallResult:
    """Result of a wall, which both computations must agree on."""
    result = assess_wall(wall_of(table), states(flood_side, protected_side), waters(unit_weight), 0.9)
    assert not result.withheld, result.recheck.difference
    return result


def uplift_at(found: Stability, x: float) -> float:
    """Pressure under the base at a distance from the heel, within a run. [Pa]."""
    lift = found.uplift
    pieces: list[FloatArray] = [lift.x[0, :-1], lift.x[0, 1:], lift.start[0], lift.end[0]]
    for left, right, start, end in zip(*pieces, strict=True):
        if left < x < right:
            return float(start + (end - start) * (x - left) / (right - left))
    raise AssertionError(x)
