"""Shape of a barrier as it is seen along the flow, and in section."""

from __future__ import annotations

import math
from itertools import pairwise

import numpy as np
from shapely import Polygon
from shapely.geometry.polygon import orient

from loads.diagram import Diagram
from loads.faces import ArcFace
from loads.panel_checks import Face
from loads.records.panel import Panel, ring_values
from webapp.drawing.svg import Point

_CIRCLE_CORNERS = 48
_ARC_PIECES = 16
_GAUSS = 0.5 / math.sqrt(3)


def front_rings(panel: Panel, face: Face) -> list[list[Point]]:
    """Outline projected on a vertical plane, (across from its middle, elevation), holes after it. [m].

    Circles become polygons, for drawing only.
    """
    bottom, top = face.bottom, face.top
    if panel.shape == "circle":
        assert panel.diameter is not None
        radius, middle, rise = panel.diameter.value / 2, (bottom + top) / 2, (top - bottom) / 2
        turns = [2 * math.pi * corner / _CIRCLE_CORNERS for corner in range(_CIRCLE_CORNERS)]
        return [[(radius * math.sin(turn), middle + rise * math.cos(turn)) for turn in turns]]
    if panel.shape == "outline":
        assert panel.points is not None
        outline = [ring_values(ring) for ring in (panel.points, *(panel.holes or ()))]
        across = [x for x, _ in outline[0]]
        middle, sine = (min(across) + max(across)) / 2, math.sin(panel.tilt_angle)
        return [[(x - middle, bottom + up * sine) for x, up in ring] for ring in outline]
    low, high = (
        (panel.bottom_width, panel.top_width) if panel.shape == "trapezoid" else (panel.width, panel.width)
    )
    assert low is not None
    assert high is not None
    return [
        [
            (-low.value / 2, bottom),
            (low.value / 2, bottom),
            (high.value / 2, top),
            (-high.value / 2, top),
        ]
    ]


def width_of(rings: list[list[Point]]) -> float:
    """Greatest width of an outline. [m]."""
    across = [x for x, _ in rings[0]]
    return max(across) - min(across)


def centre_across(panel: Panel, rings: list[list[Point]], diagram: Diagram, index: int) -> float:
    """Where across the face the resultant acts, from the middle of the outline. [m].

    Every shape but an outline is the same on both sides of its middle. Of an outline, ∫p·(x₂² − x₁²)/2 dz
    over ∫p·(x₂ − x₁) dz, by two-point Gauss quadrature between corners and knots, which is exact there.
    """
    if panel.shape != "outline":
        return 0.0
    one = diagram.take(index)
    shape = orient(Polygon(rings[0], rings[1:]))
    edges = np.array(
        [
            (*start, *end)
            for ring in (shape.exterior, *shape.interiors)
            for start, end in pairwise(ring.coords)
            if start[1] != end[1]
        ]
    )
    x0, z0, x1, z1 = edges.T
    low, high = z0.min(), z0.max()
    ends = np.unique(np.concatenate([z0, z1, np.clip(one.knot[0], low, high)]))
    middle, reach = (ends[:-1] + ends[1:]) / 2, np.diff(ends)
    force = moment = 0.0
    for sign in (-_GAUSS, _GAUSS):
        z = (middle + sign * reach)[:, None]
        within = (np.minimum(z0, z1) < z) & (z < np.maximum(z0, z1))
        x = x0 + (x1 - x0) * (z - z0) / (z1 - z0)
        rising = np.where(within, np.sign(z1 - z0), 0.0)
        weight = one.pressure(z[:, 0])[0] * reach / 2
        force += float(((rising * x).sum(axis=1) * weight).sum())
        moment += float(((rising * x**2 / 2).sum(axis=1) * weight).sum())
    return moment / force if force else 0.0


def section_line(face: Face, low: float, high: float) -> list[Point]:
    """Face in section between two elevations of it, (x from the bottom edge, elevation), upward. [m]."""
    pieces = _ARC_PIECES if isinstance(face, ArcFace) else 1
    heights = [low + (high - low) * piece / pieces for piece in range(pieces + 1)]
    return [(face.x_at(z), z) for z in heights]


def reach_across(face: Face) -> tuple[float, float]:
    """Least and greatest x of the face in section. [m]."""
    across = [x for x, _ in section_line(face, face.bottom, face.top)]
    if isinstance(face, ArcFace):
        turn = face.bottom + face.shape.centre_z
        if face.bottom < turn < face.top:
            across.append(face.x_at(turn))
    return min(across), max(across)
