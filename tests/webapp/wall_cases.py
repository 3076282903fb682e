"""Walls whose figures are worked out by hand, for tests of pages, drawings and JSON."""

from __future__ import annotations

from typing import Any

from loads.assessment import Assessment, assess
from loads.scenario_file import Document, scenario_of

CRITERIA = {"document": "Basis of design", "edition": "rev 2", "sliding": 1.5, "compression": 100.0}


def block(identifier: str = "B1", **more: Any) -> dict[str, Any]:
    """Block 6 ft wide and 10 ft high of 150 pcf, on bare ground at elevation 0."""
    begun = {
        "id": identifier,
        "name": "Block",
        "shape": "gravity",
        "base": "0 ft",
        "height": "10 ft",
        "top_width": "6 ft",
        "base_width": "6 ft",
        "unit_weight": "150 pcf",
        "uplift": "linear",
        "own_criteria": CRITERIA,
        "foundation": {
            "friction_coefficient": 0.5,
            "friction_coefficient_low": 0.45,
            "friction_coefficient_high": 0.55,
            "allowable_bearing": "4500 psf",
        },
    }
    return {**begun, **more}


def sand(side: str, pressure: str, top: str) -> dict[str, str]:
    return {
        "side": side,
        "top": top,
        "pressure": pressure,
        "saturated_unit_weight": "122 pcf",
        "moist_unit_weight": "112 pcf",
        "friction_angle": "30 deg",
    }


def t_wall(**more: Any) -> dict[str, Any]:
    """T-wall with a range of friction, its base 4 ft in the ground."""
    begun = {
        "id": "T1",
        "name": "T-wall",
        "shape": "T",
        "base": "92 ft",
        "height": "12 ft",
        "top_width": "1 ft 6 in",
        "base_thickness": "2 ft",
        "heel": "7 ft",
        "toe": "3 ft",
        "unit_weight": "150 pcf",
        "own_criteria": CRITERIA | {"flotation": 1.3},
        "sediment": [sand("flood", "at rest", "96 ft"), sand("protected", "passive", "96 ft")],
        "foundation": {
            "friction_angle": {"value": "28 deg", "low": "25 deg", "high": "30 deg"},
            "allowable_bearing": "3000 psf",
        },
    }
    return {**begun, **more}


def i_wall(**more: Any) -> dict[str, Any]:
    begun = {
        "id": "I1",
        "name": "I-wall",
        "top": "104 ft",
        "tip": "78 ft",
        "gap": "to depth",
        "gap_depth": "6 ft",
        "passive_factor": 1.5,
        "sediment": [sand("flood", "active", "98 ft"), sand("protected", "passive", "98 ft")],
    }
    return {**begun, **more}


def line(*walls: dict[str, Any], flood: str, **water: str) -> Document:
    """Scenario of walls; those without a shape are I-walls."""
    levels = {"flood_side": flood, "unit_weight": "62.4 pcf", "fluid": "custom", **water}
    begun: Document = {"format": 1, "title": "Trial", "datum": "NAVD88", "water": levels}
    for wall in walls:
        begun.setdefault("wall" if "shape" in wall else "i_wall", []).append(wall)
    return begun


def assessed(*walls: dict[str, Any], flood: str, **water: str) -> Assessment:
    return assess(scenario_of(line(*walls, flood=flood, **water)))
