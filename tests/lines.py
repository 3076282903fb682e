"""Flood lines for tests: the example scenarios, and panels of every shape under every kind of load."""

from __future__ import annotations

from pathlib import Path
from typing import Any

from loads.scenario_file import Document, read_file

SCENARIOS = sorted((Path(__file__).parents[1] / "scenarios").glob("*.toml"))

_SOIL = {
    "saturated_unit_weight": "20 kN/m3",
    "moist_unit_weight": "18 kN/m3",
    "friction_angle": "30 deg",
}
_RECTANGLE = {"width": "3.7 m", "height": "3.1 m"}
_HOLED = {
    "shape": "outline",
    "points": [["0 m", "0 m"], ["3 m", "0 m"], ["2.6 m", "2 m"], ["0.4 m", "2.6 m"]],
    "holes": [[["1 m", "0.5 m"], ["1.8 m", "0.5 m"], ["1.4 m", "1.2 m"]]],
}
_ARC = {"shape": "arc", "width": "4 m", "height": "2.5 m", "offset": "0.6 m", "radius": "3.2 m"}


def _layer(side: str, top: str, pressure: str, **more: object) -> dict[str, Any]:
    fields = {} if "fluid" in pressure else _SOIL
    return {"side": side, "top": top, "pressure": pressure, **fields, **more}


def _entered(side: str, top: str) -> dict[str, Any]:
    layer = _layer(side, top, "entered", pressure_coefficient=0.45)
    del layer["friction_angle"]
    return layer


PANELS: dict[str, dict[str, Any]] = {
    "tilted, at rest, once loaded more": {
        **_RECTANGLE,
        "tilt": "67 deg",
        "sediment": [_layer("flood", "1.9 m", "at rest", overconsolidation_ratio=2.5)],
    },
    "overhanging, at rest on both sides": {
        **_RECTANGLE,
        "tilt": "104 deg",
        "sediment": [_layer("flood", "2.3 m", "at rest"), _layer("protected", "1.2 m", "at rest")],
    },
    "active clay with surcharge": {
        **_RECTANGLE,
        "sediment": [
            _layer("flood", "2.6 m", "active", cohesion="7 kPa", surcharge="6 kPa"),
            _layer("flood", "1.1 m", "active"),
        ],
    },
    "passive clay": {**_RECTANGLE, "sediment": [_layer("protected", "1.4 m", "passive", cohesion="4 kPa")]},
    "rough and leaning, active": {
        **_RECTANGLE,
        "tilt": "80 deg",
        "sediment": [_layer("flood", "2.4 m", "active", wall_friction="14 deg")],
    },
    "rough, passive": {
        **_RECTANGLE,
        "sediment": [_layer("protected", "1.5 m", "passive", wall_friction="8 deg")],
    },
    "fluid mud over soil": {
        **_RECTANGLE,
        "sediment": [
            _layer("flood", "2.2 m", "fluid mud", fluid_unit_weight="12.5 kN/m3"),
            _layer("flood", "1.0 m", "at rest"),
        ],
    },
    "equivalent fluid above the water": {
        **_RECTANGLE,
        "sediment": [_layer("protected", "2.9 m", "equivalent fluid", fluid_unit_weight="13.4 kN/m3")],
    },
    "triangle": {"shape": "trapezoid", "bottom_width": "0 m", "top_width": "2.2 m", "height": "2.7 m"},
    "outline with a hole": {**_HOLED, "tilt": "75 deg"},
    "disc with a bed": {
        "shape": "circle",
        "diameter": "2.4 m",
        "tilt": "70 deg",
        "sediment": [_layer("flood", "1.3 m", "at rest")],
    },
    "disc barely wet": {"shape": "circle", "diameter": "40 m", "tilt": "30 deg"},
    "arc, centre on the protected side": {
        **_ARC,
        "centre": "protected",
        "sediment": [_entered("flood", "1.2 m")],
    },
    "arc, centre on the flood side": {**_ARC, "offset": "-0.4 m", "centre": "flood"},
}

WATERS: dict[str, dict[str, Any]] = {
    "flood side only": {"flood_side": "2.437 m"},
    "both sides": {"flood_side": "2.93 m", "protected_side": "1.271 m"},
    "reverse head": {"flood_side": "1.113 m", "protected_side": "2.618 m"},
    "over the top": {"flood_side": "25 m", "protected_side": "0.87 m"},
}


def line(water: str, *, units: str = "SI") -> Document:
    """All panels as one line with limits on each, in one of `WATERS`."""
    limits = {"force": "90 kN", "moment": "120 kN·m", "pressure": "30 kPa", "freeboard": "0.3 m"}
    panels = [
        {"id": f"T{i}", "name": name, "bottom": "0.213 m", "rated_level": "2.5 m", "limits": limits, **fields}
        for i, (name, fields) in enumerate(PANELS.items())
    ]
    return {
        "format": 1,
        "title": f"Trial line, {water}",
        "datum": "trial datum",
        "units": units,
        "water": WATERS[water],
        "panel": panels,
    }


def documents() -> dict[str, Document]:
    """Every scenario and every trial line, by name."""
    found = {path.stem: read_file(path) for path in SCENARIOS}
    found |= {water: line(water) for water in WATERS}
    return found | {"both sides, US": line("both sides", units="US")}
