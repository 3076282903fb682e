"""Scenarios written as a file would hold them, and what the program makes of them."""

from __future__ import annotations

import math
from itertools import pairwise
from typing import Any

import numpy as np

from loads.assessment import Assessed, assess
from loads.diagram import Diagram
from loads.faces import Resultant
from loads.records.scenario import Scenario
from loads.scenario_file import Document, parse_document, scenario_of, write_document
from loads.states import DRY, Levels

FOOT, POUND = 0.3048, 0.45359237 * 9.80665


def scene(*panels: dict[str, Any], flood_side: str = "1 m", **water: Any) -> Document:
    """Document of panels in one water."""
    numbered = [{"id": f"P{number}", "bottom": "0 m", **panel} for number, panel in enumerate(panels, 1)]
    head = {"format": 1, "title": "Trial", "datum": "trial datum"}
    return {**head, "water": {"flood_side": flood_side, **water}, "panel": numbered}


def filed(document: Document) -> Scenario:
    """Write a document as a file, read it back and validate it."""
    return scenario_of(parse_document(write_document(document)))


def assessed(document: Document, levels: Levels | None = None) -> Assessed:
    """Only barrier of a document, which both computations must agree on."""
    (barrier,) = assess(filed(document), levels).barriers
    assert isinstance(barrier, Assessed), barrier
    return barrier


def panel_under(panel: dict[str, Any], **water: Any) -> Assessed:
    """One panel in water."""
    return assessed(scene(panel, **water))


def levels(flood_side: list[float], protected_side: list[float] | None = None) -> Levels:
    """Many states; a dry protected side when nothing is said of it."""
    other = [DRY] * len(flood_side) if protected_side is None else protected_side
    return Levels(flood_side=np.array(flood_side), protected_side=np.array(other))


def sediment_alone(barrier: Assessed) -> Resultant:
    """Force and moment of all sediment of a barrier without its water."""
    parts = [load.diagram for load in barrier.loads if load.name.startswith("sediment")]
    return barrier.face.resultant(Diagram.joined(parts))


def arm(found: Resultant) -> float:
    """Distance of the resultant of a plane face from its bottom edge, along the face. [m]."""
    return float(found.moment[0] / found.total[0])


def along_chords(points: list[tuple[float, float]], width: str) -> list[dict[str, Any]]:
    """Plane panels from point to point of a curved face, (x toward the protected side, z up) in metres."""
    panels = []
    for (x, z), (next_x, next_z) in pairwise(points):
        tilt = math.degrees(math.atan2(next_z - z, next_x - x))
        size = {"width": width, "height": f"{math.hypot(next_x - x, next_z - z)!r} m"}
        panels.append({"bottom": f"{z!r} m", "tilt": f"{tilt!r} deg", **size})
    return panels


def chain_force(points: list[tuple[float, float]], width: str, **water: Any) -> tuple[float, float, float]:
    """Horizontal and vertical force, and moment about the first point, of panels from point to point."""
    barriers = assess(filed(scene(*along_chords(points, width), **water))).barriers
    parts = [barrier.resultant for barrier in barriers if isinstance(barrier, Assessed)]
    assert len(parts) == len(points) - 1
    across, up, turning = 0.0, 0.0, 0.0
    for (x, z), part in zip(points, parts, strict=False):
        across += float(part.horizontal[0])
        up += float(part.vertical[0])
        turning += float(part.moment[0] + part.horizontal[0] * z - part.vertical[0] * x)
    return across, up, turning
