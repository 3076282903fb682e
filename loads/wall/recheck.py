"""The second computation of a wall's forces: quadrature along its boundary, and shapely's areas.

Pressures are taken point by point from their definitions; nothing here knows the closed forms of
`loads.wall.pressing`, `loads.wall.uplift` and `loads.diagram`. Only the open lengths of the base are taken
over from the first computation.
"""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise

import numpy as np
import shapely
from shapely import Polygon

from loads.arrays import BoolArray, FloatArray
from loads.load import SIDES, TOWARD
from loads.states import Levels
from loads.wall.recheck_pressure import head_along_base, soil_pressure, soil_unit_weights
from loads.wall.section import Section
from loads.wall.site import Site
from loads.wall.stability import Stability

TOLERANCE = 1e-9
"""Largest difference allowed, as a share of the sum of the forces' magnitudes. [–]"""
_NODES, _WEIGHTS = np.polynomial.legendre.leggauss(3)
_FAR = 1e6


@dataclass(frozen=True, kw_only=True)
class WallRecheck:
    """Figures of the second computation and how far they are from the first.

    Attributes
    ----------
    horizontal, vertical
        Sums of forces, shape (n,). [N/m]
    moment
        About the toe, shape (n,). [N·m/m]
    difference
        Largest difference of the three as a share of the forces' or moments' magnitudes, shape (n,). [–]
    agrees
        Shape (n,).
    """

    horizontal: FloatArray
    vertical: FloatArray
    moment: FloatArray
    difference: FloatArray
    agrees: BoolArray


@dataclass
class _Sum:
    horizontal: FloatArray
    vertical: FloatArray
    moment: FloatArray


def recheck_wall(section: Section, levels: Levels, site: Site, found: Stability) -> WallRecheck:
    """Compute the sums of the forces again and compare; one section, n states."""
    total = _Sum(*(np.zeros(levels.states) for _ in range(3)))
    toe = (float(section.x[0, section.toe]), float(section.z[0, section.toe]))
    _weights(total, section, toe)
    for side in SIDES:
        _water(total, section, side, levels.of(side), site.waters.of(side), toe)
        _soil(total, section, side, levels.of(side), site, toe)
        _soil_weight(total, section, side, levels.of(side), site, toe)
    over = np.minimum(levels.flood_side, levels.protected_side)
    _water(total, section, "top", over, min(site.waters.flood, site.waters.protected), toe)
    _base(total, section, levels, site, found, toe)
    gross = sum((np.abs(row.value) for row in found.forces), np.zeros(levels.states))
    turning = sum((np.abs(row.moment) for row in found.forces), np.zeros(levels.states))
    apart = [
        np.abs(first - second) / np.where(scale > 0, scale, 1.0)
        for first, second, scale in (
            (found.horizontal, total.horizontal, gross),
            (found.vertical, total.vertical, gross),
            (found.moment, total.moment, turning),
        )
    ]
    difference = np.max(apart, axis=0)
    return WallRecheck(
        horizontal=total.horizontal,
        vertical=total.vertical,
        moment=total.moment,
        difference=difference,
        agrees=difference <= TOLERANCE,
    )


def _weights(total: _Sum, section: Section, toe: tuple[float, float]) -> None:
    for part in section.parts:
        shape = Polygon(np.column_stack([part.x[0], part.z[0]]))
        if shape.area > 0:
            weight = shape.area * part.unit_weight
            total.vertical -= weight
            total.moment += weight * (shape.centroid.x - toe[0])


def _press(
    total: _Sum, ends: tuple[FloatArray, ...], share: FloatArray, push: FloatArray, toe: tuple[float, float]
) -> None:
    """Add pressure times length at points of one edge, given as shares of it (n, points)."""
    start, end = ends
    run = end - start
    x, z = start[0] + run[0] * share, start[1] + run[1] * share
    along, up = -run[1] * push, run[0] * push
    total.horizontal += along.sum(axis=1)
    total.vertical += up.sum(axis=1)
    total.moment += (along * (z - toe[1]) - up * (x - toe[0])).sum(axis=1)


def _gauss(breaks: FloatArray) -> tuple[FloatArray, FloatArray]:
    low, high = breaks[:, :-1, None], breaks[:, 1:, None]
    points = (low + high) / 2 + (high - low) / 2 * _NODES
    weights = (high - low) / 2 * _WEIGHTS
    return points.reshape(len(breaks), -1), weights.reshape(len(breaks), -1)


def _water(
    total: _Sum, section: Section, side: str, level: FloatArray, unit_weight: float, toe: tuple[float, float]
) -> None:
    corners = np.stack([part[0] for part in section.chain(side)], axis=1)
    for start, end in pairwise(corners):
        rise = end[1] - start[1]
        surface = (
            np.clip((np.maximum(level, -_FAR) - start[1]) / rise, 0, 1) if rise else np.zeros(len(level))
        )
        breaks = np.column_stack([np.zeros(len(level)), surface, np.ones(len(level))])
        share, weight = _gauss(breaks)
        depth = np.maximum(level[:, None] - (start[1] + rise * share), 0.0)
        _press(total, (start, end), share, unit_weight * depth * weight, toe)


def _base(
    total: _Sum, section: Section, levels: Levels, site: Site, found: Stability, toe: tuple[float, float]
) -> None:
    if site.path.rule == "none":
        return
    corners = np.stack([part[0] for part in section.chain("base")], axis=1)
    unit_weight = max(site.waters.flood, site.waters.protected)
    for number, (start, end) in enumerate(pairwise(corners)):
        run = end[0] - start[0]
        places = [found.cracks.heel, corners[-1, 0] - found.cracks.toe]
        places += [np.full(levels.states, place) for place, _ in site.path.cutoffs]
        places += [np.full(levels.states, site.path.drain[0])] if site.path.drain else []
        columns = [np.zeros(levels.states), np.ones(levels.states)]
        columns += [np.clip((place - start[0]) / run, 0, 1) for place in places] if run > 0 else []
        breaks = np.sort(np.column_stack(columns), axis=1)

        def pressure(share: FloatArray, number: int = number) -> FloatArray:
            head = head_along_base(section, levels, site, found.cracks, number, share)
            z = corners[number, 1] + (corners[number + 1, 1] - corners[number, 1]) * share
            return np.asarray(unit_weight * (head - z))

        inner = [breaks[:, :-1] + np.diff(breaks, axis=1) * part for part in (0.25, 0.75)]
        low, high = (pressure(share) for share in inner)
        bend = np.divide(low, low - high, out=np.zeros_like(low), where=low != high)
        zero = np.clip(inner[0] + (inner[1] - inner[0]) * bend, breaks[:, :-1], breaks[:, 1:])
        share, weight = _gauss(np.sort(np.concatenate([breaks, zero], axis=1), axis=1))
        _press(total, (start, end), share, np.maximum(pressure(share), 0.0) * weight, toe)


def _soil(
    total: _Sum, section: Section, side: str, level: FloatArray, site: Site, toe: tuple[float, float]
) -> None:
    layers = site.ground.layers[side]
    bottom = float(section.base[0])
    for number, layer in enumerate(layers):
        relied = layer.pressure == "passive" and side == "protected"
        share = site.ground.passive_share if relied else 1.0
        top = layer.top.value
        foot = layers[number + 1].top.value if number + 1 < len(layers) and not layer.is_fluid else bottom
        rims = [np.full(len(level), max(bottom, edge)) for edge in (foot, top)]
        rims += [np.clip(level, rims[0], rims[1])]
        rims += [np.full(len(level), max(over.top.value, rims[0][0])) for over in layers]
        breaks = np.sort(np.clip(np.column_stack(rims), rims[0][:, None], rims[1][:, None]), axis=1)
        inner = [breaks[:, :-1] + np.diff(breaks, axis=1) * part for part in (0.25, 0.75)]
        low, high = (
            soil_pressure(layers, number, level, site.waters.of(side), z, floored=False) for z in inner
        )
        bend = np.divide(low, low - high, out=np.zeros_like(low), where=low != high)
        zero = np.clip(inner[0] + (inner[1] - inner[0]) * bend, breaks[:, :-1], breaks[:, 1:])
        z, weight = _gauss(np.sort(np.concatenate([breaks, zero], axis=1), axis=1))
        push = soil_pressure(layers, number, level, site.waters.of(side), z, floored=True)
        push = push * weight * TOWARD[side] * share
        total.horizontal += push.sum(axis=1)
        total.moment += (push * (z - toe[1])).sum(axis=1)


def _soil_weight(
    total: _Sum, section: Section, side: str, level: FloatArray, site: Site, toe: tuple[float, float]
) -> None:
    layers = site.ground.layers[side]
    if not layers:
        return
    x, z = (part[0] for part in section.chain(side))
    face = list(zip(x, z, strict=True))
    end = face[-1] if side == "flood" else face[0]
    crest = face[0] if side == "flood" else face[-1]
    region = Polygon([*face, (end[0], crest[1])]).buffer(0)
    for number, layer in enumerate(layers):
        foot = layers[number + 1].top.value if number + 1 < len(layers) else end[1]
        moist, submerged = soil_unit_weights(layer, site.waters.of(side))
        table = np.clip(level, foot, layer.top.value)
        for weight, low, high in (
            (moist, table, np.full_like(table, layer.top.value)),
            (submerged, np.full_like(table, foot), table),
        ):
            cut = shapely.intersection(region, shapely.box(x.min() - 1, low, x.max() + 1, high))
            area = shapely.area(cut)
            across = np.zeros_like(area)
            across[area > 0] = shapely.get_x(shapely.centroid(cut[area > 0]))
            total.vertical -= area * weight
            total.moment += area * weight * (across - toe[0])
    surcharge = layers[0].surcharge
    if surcharge and site.ground.surcharge_counts_as_weight:
        height = min(layers[0].top.value, crest[1]) - 1e-9
        line = shapely.LineString([(x.min() - 1, height), (x.max() + 1, height)])
        cut = shapely.intersection(region, line)
        total.vertical -= cut.length * surcharge.value
        if cut.length > 0:
            total.moment += cut.length * surcharge.value * (cut.centroid.x - toe[0])
