"""Scenarios with walls for the tests of the options page."""

from __future__ import annotations

from typing import Any

import numpy as np

from loads.barrier import Site
from loads.scenario_file import Document, scenario_of
from webapp.options_candidate import site_in, wall_of
from webapp.options_ranges import ranges_of
from webapp.options_state import Options, grid_of

BLOCK: dict[str, Any] = {
    "id": "W1",
    "name": "Chandler Lane wall",
    "shape": "gravity",
    "base": "90 ft",
    "height": "10 ft",
    "top_width": "4 ft",
    "base_width": "8 ft",
    "unit_weight": "150 pcf",
    "uplift": "none",
    "category": "usual",
    "own_criteria": {"document": "Basis of design", "edition": "rev 2", "sliding": 1.5},
    "foundation": {"friction_coefficient": 0.5},
}
"""Upright on the flood side: W = 150 · 10 · (top + base)/2 and H = 62.4 · head²/2 per foot of wall."""

TEE: dict[str, Any] = {
    "id": "W2",
    "name": "Chandler Lane T-wall",
    "shape": "T",
    "base": "92.00 ft",
    "height": "12 ft",
    "top_width": "1 ft",
    "base_thickness": "2 ft",
    "heel": "7 ft",
    "toe": "3 ft",
    "unit_weight": "150 pcf",
    "key": {"depth": "2 ft", "width": "1 ft 6 in", "position": "0 ft"},
    "uplift": "line of creep",
    "cutoff": [{"position": "0 ft", "depth": "10 ft"}],
    "category": "unusual",
    "criteria": "EM 1110-2-2100 normal ordinary",
    "sediment": [
        {
            "side": "flood",
            "top": "96.0 ft",
            "pressure": "at rest",
            "saturated_unit_weight": "122 pcf",
            "friction_angle": "30 deg",
        },
        {
            "side": "protected",
            "top": "96.0 ft",
            "pressure": "passive",
            "saturated_unit_weight": "122 pcf",
            "friction_angle": "30 deg",
        },
    ],
    "foundation": {
        "friction_angle": "28 deg",
        "soil_friction_angle": "30 deg",
        "saturated_unit_weight": "122 pcf",
        "allowable_bearing": {"value": "3000 psf", "source": "soils report"},
        "bearing_method": "Meyerhof",
        "material": "coarse sand",
        "exit_gradient_factor": 3.0,
    },
    "limits": {"heel_moment": {"value": "5000 lb·ft/ft", "source": "structural note"}, "freeboard": "1 ft"},
}

ELL: dict[str, Any] = {
    "id": "W3",
    "shape": "L",
    "base": "94.00 ft",
    "height": "9 ft",
    "top_width": "1 ft",
    "base_thickness": "1 ft 6 in",
    "heel": "8 ft",
    "unit_weight": "150 pcf",
    "category": "usual",
    "own_criteria": {"document": "Basis of design", "sliding": 1.5, "compression": 100.0, "flotation": 1.3},
    "foundation": {"friction_angle": "27 deg", "adhesion": "100 psf"},
}


def document_of(*walls: dict[str, Any], flood_side: str = "98 ft") -> Document:
    """A scenario of walls with water on the flood side only."""
    return {
        "format": 1,
        "title": "Chandler Lane",
        "datum": "NAVD88",
        "water": {"flood_side": flood_side, "unit_weight": "62.4 pcf"},
        "wall": list(walls),
    }


def options_of(
    table: dict[str, Any], typed: list[tuple[str, str, str, str]], flood_side: str = "98 ft"
) -> tuple[Options, Site]:
    """Grid of a wall over typed ranges, and what it stands in."""
    document = document_of(table, flood_side=flood_side)
    site, record, ranges = site_in(scenario_of(document)), wall_of(document, table), ranges_of(typed)
    grid = grid_of({}, record, site, ranges)
    return Options(document=document, base=table, record=record, ranges=ranges, grid=grid), site


def every(options: Options) -> list[int]:
    """Numbers of the candidates that make a section."""
    return [int(number) for number in np.flatnonzero(options.grid.possible)]
