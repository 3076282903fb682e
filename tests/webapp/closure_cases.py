"""Closures that are drawn and shown in tests, with demands that are worked by hand."""

from __future__ import annotations

from typing import Any

from loads.assessment import Assessment, assess
from loads.scenario_file import Document, scenario_of

LIMIT = {"value": "77 lb/ft", "source": "engineer of record"}
"""Limit of a log's load. Under 4 ft of water at 62.4 pcf the logs of half a foot carry, from the sill up,
62.4 · 0.5 · (4 − 0.25 − 0.5 i) = 117.0, 101.4, 85.8, 70.2, 54.6, 39.0, 23.4, 7.8 lb/ft: three above it, the
fourth at 0.912 near it, the others below."""


def closure(identifier: str = "C1", **more: Any) -> dict[str, Any]:
    log = {"height": "6 in", "count": 10, "limits": {"line_load": LIMIT}}
    begun = {
        "id": identifier,
        "name": f"Closure {identifier}",
        "sill": "100 ft",
        "bays": 3,
        "bay_width": "8 ft",
    }
    return {**begun, "logs_in_place": 8, "log": log | more.pop("log", {}), **more}


POST = {
    "width": "6 in",
    "height": "5.5 ft",
    "section": {"shape": "rectangle", "thickness": "6 in"},
    "brace": {"height": "3 ft", "angle": "45 deg"},
}


def line(*closures: dict[str, Any], flood: str = "104 ft", **water: str) -> Document:
    levels = {"flood_side": flood, "unit_weight": "62.4 pcf", "fluid": "custom", **water}
    return {"format": 1, "title": "Trial", "datum": "NAVD88", "water": levels, "closure": list(closures)}


def assessed_line(*closures: dict[str, Any], flood: str = "104 ft", **water: str) -> Assessment:
    return assess(scenario_of(line(*closures, flood=flood, **water)))


ODD_CLOSURES: dict[str, Assessment] = {
    "plain": assessed_line(closure()),
    "braced": assessed_line(closure(post=POST)),
    "level brace": assessed_line(closure(post=POST | {"brace": {"height": "3 ft", "angle": "0 deg"}})),
    "unequal": assessed_line(closure(logs_in_place=[8, 0, 10])),
    "open": assessed_line(closure(logs_in_place=0)),
    "one bay, one log": assessed_line(closure(bays=1, logs_in_place=1, log={"count": 1})),
    "sixty bays": assessed_line(closure(bays=60, rated_level="103 ft")),
    "two hundred logs": assessed_line(closure(log={"count": 200, "height": "1 in"}, logs_in_place=60)),
    "twelve bays": assessed_line(
        closure(bays=12, rated_level="103 ft", post=POST), protected_side="101.2 ft"
    ),
    "reverse": assessed_line(closure(), flood="101 ft", protected_side="103.5 ft"),
    "overtopped": assessed_line(closure(), closure("C2", logs_in_place=[7, 8, 8]), flood="106.1 ft"),
    "dry": assessed_line(closure(), flood="90 ft"),
}
