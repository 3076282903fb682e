"""The second computation: every load again from its own definition, by Gauss–Legendre quadrature.

Nothing here knows steps, ramps or closed forms. Pressure at a point is what lies above it, added up; faces
are sampled in pieces that end at levels, layer boundaries, zeros of pressure and corners of the outline.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
import shapely
from shapely import Polygon

from loads.arrays import BoolArray, FloatArray
from loads.load import SIDES, TOWARD, Setting, tilt_from
from loads.records.panel import Panel, ring_values
from loads.records.sediment import Sediment
from loads.sediment import cohesion_pressure, face_coefficient, unit_weights

STRAIGHT_TOLERANCE = 1e-9
"""Largest relative difference allowed for faces with straight outlines."""
FITTED_TOLERANCE = 1e-6
"""The same for circles and arcs."""

_RULE, _FINE_RULE = (np.polynomial.legendre.leggauss(points) for points in (4, 24))


@dataclass(frozen=True, kw_only=True)
class Recheck:
    """Figures of the second computation and how far they are from the first.

    Attributes
    ----------
    horizontal, vertical
        Force by the second computation, shape (n,). [N]
    moment
        Moment about the bottom edge by the second computation, shape (n,). [N·m]
    difference
        Largest relative difference of the three in each state, shape (n,). [–]
    agrees
        True where all three agree, shape (n,).
    """

    horizontal: FloatArray
    vertical: FloatArray
    moment: FloatArray
    difference: FloatArray
    agrees: BoolArray


@dataclass(frozen=True, kw_only=True)
class _Ground:
    """What stands and lies against one side of the face."""

    layers: Sequence[Sediment]
    level: FloatArray
    water_unit_weight: float
    tilt: float
    bottom: float

    def foot(self, index: int) -> float:
        return self.layers[index + 1].top.value if index + 1 < len(self.layers) else self.bottom


def _ground(setting: Setting, side: str) -> _Ground:
    return _Ground(
        layers=setting.panel.layers(side),
        level=setting.levels.of(side)[:, None],
        water_unit_weight=setting.fluids[side].unit_weight,
        tilt=tilt_from(side, setting.panel.tilt_angle),
        bottom=setting.panel.bottom.value,
    )


def pressure_at(setting: Setting, z: FloatArray) -> FloatArray:
    """Net pressure from the definition of each load.

    Parameters
    ----------
    setting
        Levels, fluids and panel.
    z
        Elevations, shape (n, m). [m]

    Returns
    -------
    FloatArray
        Shape (n, m), positive toward the protected side. [Pa]
    """
    total = np.zeros_like(z)
    for side in SIDES:
        ground = _ground(setting, side)
        total += TOWARD[side] * ground.water_unit_weight * np.maximum(ground.level - z, 0.0)
        for index, _ in enumerate(ground.layers):
            total += TOWARD[side] * _layer_pressure(ground, index, z)
    return total


def _layer_pressure(ground: _Ground, index: int, z: FloatArray) -> FloatArray:
    layer = ground.layers[index]
    head, foot = layer.top.value, ground.foot(index)
    if layer.is_fluid:
        assert layer.fluid_unit_weight is not None
        mud = layer.fluid_unit_weight.value * np.clip(head - z, 0.0, head - foot)
        wet = np.maximum(np.minimum(ground.level, head) - np.maximum(z, foot), 0.0)
        return np.asarray(mud - ground.water_unit_weight * wet)
    inside = (z < head) & (z >= foot)
    return np.asarray(np.where(inside, np.maximum(_unfloored(ground, index, z), 0.0), 0.0))


def _unfloored(ground: _Ground, index: int, z: FloatArray) -> FloatArray:
    """K σ′v − 2c√K as if tension could act, with σ′v summed over everything above z."""
    load = ground.layers[0].surcharge
    stress = np.full_like(z, load.value if load else 0.0)
    for number in range(index + 1):
        over = ground.layers[number]
        if over.is_fluid:
            continue
        moist, submerged = unit_weights(over, ground.water_unit_weight)
        head = over.top.value
        foot = np.maximum(z, ground.foot(number))
        wet = np.maximum(np.minimum(ground.level, head) - foot, 0.0)
        whole = np.maximum(head - foot, 0.0)
        stress = stress + moist * (whole - wet) + submerged * wet
    coefficient = face_coefficient(ground.layers[index], ground.tilt)
    return coefficient * stress - cohesion_pressure(ground.layers[index], coefficient)


def breaks_between(setting: Setting, bottom: float, top: float, corners: FloatArray) -> FloatArray:
    """Sorted elevations between which the pressure and the outline are smooth, shape (n, m)."""
    states = setting.levels.states
    columns = [np.full(states, value) for value in (bottom, top, *corners)]
    for side in SIDES:
        columns.append(np.where(np.isfinite(setting.levels.of(side)), setting.levels.of(side), bottom))
        layers = setting.panel.layers(side)
        columns += [np.full(states, layer.top.value) for layer in layers]
    rough = np.sort(np.clip(np.column_stack(columns), bottom, top), axis=1)
    extra = [column for side in SIDES for column in _zero_columns(_ground(setting, side), rough)]
    return np.sort(np.concatenate([rough, *extra], axis=1), axis=1) if extra else rough


def _zero_columns(ground: _Ground, rough: FloatArray) -> list[FloatArray]:
    """Elevations at which a layer's pressure passes through zero, within each piece."""
    columns = []
    middle, span = (rough[:, :-1] + rough[:, 1:]) / 2, np.diff(rough, axis=1)
    for index, _ in enumerate(ground.layers):
        if not _may_be_tension(ground, index):
            continue
        lower = _unfloored(ground, index, middle - span / 4)
        upper = _unfloored(ground, index, middle + span / 4)
        slope = (lower - upper) / np.where(span > 0, span / 2, np.inf)
        shift = np.where(slope != 0, (lower + upper) / 2 / np.where(slope != 0, slope, 1.0), 0.0)
        columns.append(np.clip(middle + shift, rough[:, :-1], rough[:, 1:]))
    return columns


def _may_be_tension(ground: _Ground, index: int) -> bool:
    """Whether a layer may come out as tension: it has cohesion, or soil is lighter than water."""
    layer = ground.layers[index]
    if layer.is_fluid:
        return False
    soils = [over for over in ground.layers[: index + 1] if not over.is_fluid]
    lightest = min(unit_weights(over, ground.water_unit_weight)[1] for over in soils)
    return lightest < 0 or bool(layer.cohesion and layer.cohesion.value > 0)


def quadrature_points(
    breaks: FloatArray, rule: tuple[FloatArray, FloatArray] = _RULE
) -> tuple[FloatArray, FloatArray]:
    """Points and weights on every piece, (n, m): exact up to the seventh degree by the usual rule."""
    nodes, weights = rule
    low, high = breaks[:, :-1, None], breaks[:, 1:, None]
    z = (low + high) / 2 + (high - low) / 2 * nodes
    w = (high - low) / 2 * weights
    return z.reshape(len(breaks), -1), w.reshape(len(breaks), -1)


def _straight(setting: Setting, panel: Panel) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Force parts and moment on rectangles, trapezoids and outlines."""
    sine, cosine = math.sin(panel.tilt_angle), math.cos(panel.tilt_angle)
    outline = _outline(panel)
    bottom = panel.bottom.value
    corner_heights = np.unique(shapely.get_coordinates(outline)[:, 1])
    top = bottom + float(corner_heights[-1]) * sine
    breaks = breaks_between(setting, bottom, top, bottom + corner_heights * sine)
    z, w = quadrature_points(breaks)
    height = (z - bottom) / sine
    push = pressure_at(setting, z) * _chords(panel, outline, height) * w / sine
    normal = push.sum(axis=1)
    return normal * sine, -normal * cosine, (push * height).sum(axis=1)


def _outline(panel: Panel) -> Polygon:
    if panel.shape == "outline":
        assert panel.points is not None
        return Polygon(ring_values(panel.points), [ring_values(hole) for hole in panel.holes or ()])
    assert panel.height is not None
    height = panel.height.value
    if panel.shape == "rectangle":
        assert panel.width is not None
        return shapely.box(0.0, 0.0, panel.width.value, height)
    assert panel.bottom_width is not None
    assert panel.top_width is not None
    low, high = panel.bottom_width.value, panel.top_width.value
    corners = [(-low / 2, 0.0), (low / 2, 0.0), (high / 2, height), (-high / 2, height)]
    return Polygon(list(dict.fromkeys(corners)))


def _chords(panel: Panel, outline: Polygon, height: FloatArray) -> FloatArray:
    """Width of the face at heights along it: measured on the shape itself."""
    if panel.shape == "rectangle":
        assert panel.width is not None
        return np.full_like(height, panel.width.value)
    left, _, right, _ = outline.bounds
    flat = height.ravel()
    ends = np.empty((len(flat), 2, 2))
    ends[:, 0, 0], ends[:, 1, 0] = left - 1.0, right + 1.0
    ends[:, :, 1] = flat[:, None]
    shapely.prepare(outline)
    cut: FloatArray = shapely.length(shapely.intersection(shapely.linestrings(ends), outline))
    return cut.reshape(height.shape)


def _circle(setting: Setting, panel: Panel) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Force parts and moment on a disc, sampled by angle so that its round ends are smooth."""
    assert panel.diameter is not None
    sine, cosine = math.sin(panel.tilt_angle), math.cos(panel.tilt_angle)
    radius, bottom = panel.diameter.value / 2, panel.bottom.value
    breaks = breaks_between(setting, bottom, bottom + 2 * radius * sine, np.zeros(0))
    angles = np.arcsin(np.clip((breaks - bottom) / (radius * sine) - 1, -1, 1))
    angle, w = quadrature_points(angles, _FINE_RULE)
    height = radius * (1 + np.sin(angle))
    push = pressure_at(setting, bottom + height * sine) * 2 * radius**2 * np.cos(angle) ** 2 * w
    normal = push.sum(axis=1)
    return normal * sine, -normal * cosine, (push * height).sum(axis=1)


def _arc(setting: Setting, panel: Panel) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Force parts and moment on an arc, every element of it pressed along its own normal."""
    assert panel.width is not None
    arc, bottom = panel.arc_shape(), panel.bottom.value
    top = bottom + arc.height
    breaks = breaks_between(setting, bottom, top, np.zeros(0))
    foot = math.atan2(-arc.centre_z, -arc.bulge * arc.centre_x)
    head = math.atan2(arc.height - arc.centre_z, arc.bulge * (arc.offset - arc.centre_x))
    inner = np.arcsin(np.clip((breaks - bottom - arc.centre_z) / arc.radius, -1, 1))
    angles = np.where(breaks <= bottom, foot, np.where(breaks >= top, head, np.clip(inner, foot, head)))
    angle, w = quadrature_points(angles, _FINE_RULE)
    rise = arc.centre_z + arc.radius * np.sin(angle)
    x = arc.centre_x + arc.bulge * arc.radius * np.cos(angle)
    push = pressure_at(setting, bottom + rise) * panel.width.value * arc.radius * w
    along, up = push * np.cos(angle), arc.bulge * push * np.sin(angle)
    return along.sum(axis=1), up.sum(axis=1), (along * rise - up * x).sum(axis=1)


def recheck(
    setting: Setting,
    *,
    horizontal: FloatArray,
    vertical: FloatArray,
    moment: FloatArray,
    rounding_force: FloatArray,
    reach: float,
) -> Recheck:
    """Compute force and moment a second time and compare.

    Parameters
    ----------
    setting
        Levels, fluids and panel.
    horizontal, vertical, moment
        Figures of the first computation, shape (n,). [N, N, N·m]
    rounding_force
        Force below which a difference is rounding of the numbers that went in, shape (n,). [N]
    reach
        Length of the face from bottom to top, which makes a moment of that force. [m]

    Returns
    -------
    Recheck
        Agreement and both figures. Relative tolerance 1e-9, for circles and arcs 1e-6.
    """
    panel = setting.panel
    again = {"circle": _circle, "arc": _arc}.get(panel.shape, _straight)(setting, panel)
    tolerance = FITTED_TOLERANCE if panel.shape in ("circle", "arc") else STRAIGHT_TOLERANCE
    difference = np.zeros(setting.levels.states)
    agrees = np.ones(setting.levels.states, dtype=bool)
    roundings = (rounding_force, rounding_force, rounding_force * reach)
    for first, second, rounding in zip((horizontal, vertical, moment), again, roundings, strict=True):
        apart = np.abs(first - second)
        larger = np.maximum(np.abs(first), np.abs(second))
        agrees &= apart <= tolerance * larger + rounding
        counted = ~(apart <= rounding)
        difference = np.maximum(difference, np.where(counted, apart / np.where(counted, larger, 1.0), 0.0))
    return Recheck(
        horizontal=again[0], vertical=again[1], moment=again[2], difference=difference, agrees=agrees
    )
