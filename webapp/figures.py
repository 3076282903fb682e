"""Figures that people explore: plain dictionaries for plotly, pure functions of a result."""

from __future__ import annotations

import math
from itertools import pairwise
from typing import Any

from loads.assessment import Assessed
from webapp.display import System, elevation, in_unit, show, unit_label

WATER, INK = "#0072B2", "#1d2733"


def pressure_figure(barrier: Assessed, system: System, index: int = 0) -> dict[str, Any]:
    """Net pressure against elevation, to be read off at any elevation.

    Returns
    -------
    dict
        A plotly figure; pressures and elevations in the units shown, five significant figures.
    """
    rows = barrier.diagram.rows(barrier.face.bottom, barrier.face.top, index)
    steps = _filled(rows)
    pressure = [float(f"{in_unit(p, 'pressure', system):.5g}") for _, p in steps]
    height = [round(in_unit(z, "elevation", system), 4) for z, _ in steps]
    units = unit_label("pressure", system), unit_label("elevation", system)
    line = {
        "type": "scatter",
        "mode": "lines",
        "x": pressure,
        "y": height,
        "fill": "tozerox",
        "fillcolor": "rgba(0,114,178,.15)",
        "line": {"color": WATER, "width": 2},
        "hovertemplate": f"%{{y:.2f}} {units[1]}<br>%{{x:.4~g}} {units[0]}<extra></extra>",
    }
    layout = {
        "height": 380,
        "margin": {"l": 60, "r": 20, "t": 10, "b": 50},
        "xaxis": {"title": {"text": f"net pressure, {units[0]}, positive toward the protected side"}},
        "yaxis": {"title": {"text": f"elevation, {units[1]}"}},
        "hovermode": "y unified",
        "showlegend": False,
    }
    return {"data": [line], "layout": layout}


def _filled(rows: list[tuple[float, float]]) -> list[tuple[float, float]]:
    """Corners with points between them, so that every elevation can be read."""
    points: list[tuple[float, float]] = []
    for (low, p_low), (high, p_high) in pairwise(rows):
        count = max(1, math.ceil((high - low) / (rows[-1][0] - rows[0][0]) * 60))
        points += [
            (low + (high - low) * i / count, p_low + (p_high - p_low) * i / count) for i in range(count)
        ]
    return [*points, rows[-1]]


def pressure_text(barrier: Assessed, system: System, index: int = 0) -> str:
    """Say what the figure shows."""
    rows = barrier.diagram.rows(barrier.face.bottom, barrier.face.top, index)
    corners = "; ".join(f"{show(p, 'pressure', system)} at {elevation(z, system)}" for z, p in rows)
    return f"Net pressure against elevation: {corners}."
