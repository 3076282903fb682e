"""Second computation of an I-wall: force and moment above the tip, by quadrature from the definitions."""

from __future__ import annotations

import numpy as np

from loads.arrays import FloatArray
from loads.records.i_wall import IWall
from loads.sediment import cohesion_pressure, face_coefficient, unit_weights
from loads.states import Levels
from loads.wall.forces import Waters

_NODES, _WEIGHTS = np.polynomial.legendre.leggauss(3)
_DEEP = -1e6


def sheet_sums(
    wall: IWall, levels: Levels, waters: Waters, tip: FloatArray, gradient: FloatArray
) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Net force above the tip, its moment about the tip, and the sum of magnitudes, each (n,).

    The gradient is taken over from the first computation.
    """
    states = levels.states
    grounds = [np.full(states, wall.ground(side)) for side in ("flood", "protected")]
    gap = _gap(wall, tip)
    edges = [np.full(states, wall.top.value), tip, *grounds, gap]
    edges += [np.maximum(level, _DEEP) for level in (levels.flood_side, levels.protected_side)]
    rough = np.sort(np.clip(np.column_stack(edges), tip[:, None], wall.top.value), axis=1)
    zeros = []
    for side in ("flood", "protected"):
        inner = [rough[:, :-1] + np.diff(rough, axis=1) * part for part in (0.25, 0.75)]
        low, high = (
            _soil(wall, side, levels, waters, z=z, gradient=gradient, gap=gap, floored=False) for z in inner
        )
        bend = np.divide(low, low - high, out=np.zeros_like(low), where=low != high)
        zeros.append(np.clip(inner[0] + (inner[1] - inner[0]) * bend, rough[:, :-1], rough[:, 1:]))
    breaks = np.sort(np.concatenate([rough, *zeros], axis=1), axis=1)
    low, high = breaks[:, :-1, None], breaks[:, 1:, None]
    z = ((low + high) / 2 + (high - low) / 2 * _NODES).reshape(states, -1)
    weight = ((high - low) / 2 * _WEIGHTS).reshape(states, -1)
    force, moment, gross = np.zeros(states), np.zeros(states), np.zeros(states)
    for side, sign in (("flood", 1.0), ("protected", -1.0)):
        soil = _soil(wall, side, levels, waters, z=z, gradient=gradient, gap=gap, floored=True)
        if side == "protected":
            soil = soil / wall.passive_factor
        push = sign * (_water(wall, side, levels, waters, z=z, gradient=gradient, gap=gap) + soil) * weight
        force += push.sum(axis=1)
        moment += (push * (z - tip[:, None])).sum(axis=1)
        gross += np.abs(push).sum(axis=1)
    return force, moment, gross


def _gap(wall: IWall, tip: FloatArray) -> FloatArray:
    ground = wall.ground("flood")
    depth = {"none": 0.0, "to tip": np.inf}.get(wall.gap)
    if depth is None:
        assert wall.gap_depth is not None
        depth = wall.gap_depth.value
    return np.maximum(ground - depth, tip)


def _table(wall: IWall, side: str, levels: Levels) -> FloatArray:
    """Level of free water on a side, or of the ground through which it leaves, (n, 1)."""
    higher = np.maximum(levels.flood_side, levels.protected_side)
    level = np.minimum(np.maximum(levels.of(side), wall.ground(side)), higher)
    return np.maximum(level, _DEEP)[:, None]


def _water(
    wall: IWall,
    side: str,
    levels: Levels,
    waters: Waters,
    *,
    z: FloatArray,
    gradient: FloatArray,
    gap: FloatArray,
) -> FloatArray:
    table = _table(wall, side, levels)
    start = gap[:, None] if side == "flood" else wall.ground("protected")
    passed = np.maximum(np.minimum(start, table) - z, 0.0)
    change = -gradient[:, None] if side == "flood" else gradient[:, None]
    wet = (z < table) & (table > _DEEP)
    return np.where(wet, waters.of(side) * (table - z + change * passed), 0.0)


def _soil(
    wall: IWall,
    side: str,
    levels: Levels,
    waters: Waters,
    *,
    z: FloatArray,
    gradient: FloatArray,
    gap: FloatArray,
    floored: bool,
) -> FloatArray:
    layer = wall.layer(side)
    ground = layer.top.value
    coefficient = face_coefficient(layer, np.pi / 2)
    moist, saturated = unit_weights(layer, 0.0)
    table = np.minimum(_table(wall, side, levels), ground)
    wet = np.maximum(table - np.minimum(z, ground), 0.0) * (table > _DEEP)
    whole = np.maximum(ground - z, 0.0)
    seep = (1 - gradient) if side == "flood" else (1 + gradient)
    load = layer.surcharge.value if layer.surcharge else 0.0
    stress = load + moist * (whole - wet) + (saturated - waters.of(side) * seep[:, None]) * wet
    stress = stress + 0.0 * z
    pressure = coefficient * stress - cohesion_pressure(layer, coefficient)
    if not floored:
        return np.asarray(pressure)
    start = np.minimum(gap[:, None], ground) if side == "flood" else ground
    return np.where(z < start, np.maximum(pressure, 0.0), 0.0)
