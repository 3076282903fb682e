"""Pressures at points, from the definitions of the loads on a wall, for the second computation."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from loads.arrays import FloatArray
from loads.records.sediment import Sediment
from loads.sediment import cohesion_pressure, face_coefficient, unit_weights
from loads.states import Levels
from loads.wall.section import Section
from loads.wall.site import Site
from loads.wall.uplift import Cracks

_DEEP = -1e6


def soil_unit_weights(layer: Sediment, water: float) -> tuple[float, float]:
    """Weight per volume above and below water, the latter less the water's. [N/m³]."""
    if layer.is_fluid:
        assert layer.fluid_unit_weight is not None
        return layer.fluid_unit_weight.value, layer.fluid_unit_weight.value - water
    return unit_weights(layer, water)


def soil_pressure(
    layers: Sequence[Sediment],
    number: int,
    level: FloatArray,
    water: float,
    z: FloatArray,
    *,
    floored: bool,
) -> FloatArray:
    """Pressure of one layer on an upright plane at elevations (n, m), on top of the water, (n, m). [Pa]."""
    layer = layers[number]
    surface = np.maximum(level, _DEEP)[:, None]
    if layer.is_fluid:
        assert layer.fluid_unit_weight is not None
        foot = layers[number + 1].top.value if number + 1 < len(layers) else _DEEP
        own = layer.fluid_unit_weight.value * (layer.top.value - np.maximum(z, foot))
        displaced = np.maximum(np.minimum(surface, layer.top.value) - np.maximum(z, foot), 0.0)
        return np.asarray(own - water * displaced)
    load = layers[0].surcharge
    stress = np.full(z.shape, load.value if load else 0.0)
    for index in range(number + 1):
        over = layers[index]
        if over.is_fluid:
            continue
        foot_of = layers[index + 1].top.value if index < number else _DEEP
        low = np.maximum(z, foot_of)
        wet = np.maximum(np.minimum(surface, over.top.value) - low, 0.0)
        moist, submerged = soil_unit_weights(over, water)
        stress = stress + moist * (over.top.value - low - wet) + submerged * wet
    coefficient = face_coefficient(layer, np.pi / 2)
    pressure = coefficient * stress - cohesion_pressure(layer, coefficient)
    return np.asarray(np.maximum(pressure, 0.0) if floored else pressure)


def head_along_base(
    section: Section, levels: Levels, site: Site, cracks: Cracks, edge: int, share: FloatArray
) -> FloatArray:
    """Total head at shares (n, m) of one edge of the underside, (n, m). [m]."""
    path = site.path
    x, z = (part[0] for part in section.chain("base"))
    spot = x[edge] + (x[edge + 1] - x[edge]) * share
    width = x[-1] - x[0]
    base = float(z[0])
    higher = np.maximum(levels.flood_side, levels.protected_side)
    outlets = (path.flood_ground, path.protected_ground) if path.creeps else (base, base)
    closed = [
        np.minimum(np.maximum(level, max(outlet, base)), higher)
        for level, outlet in zip((levels.flood_side, levels.protected_side), outlets, strict=True)
    ]
    gaping = [
        np.minimum(np.maximum(level, base), higher) for level in (levels.flood_side, levels.protected_side)
    ]
    cracked = (cracks.heel > 0, cracks.toe > 0)
    at_heel, at_toe = (
        np.maximum(np.where(crack, gap, shut), _DEEP)[:, None]
        for crack, gap, shut in zip(cracked, gaping, closed, strict=True)
    )

    def loss(place: FloatArray, upright: FloatArray, *, beyond: bool) -> FloatArray:
        """Resistance from the flood-side end to a place of the underside."""
        across = path.horizontal_share if path.creeps else 1.0
        found = across * place
        if path.creeps:
            found = found + max(path.flood_ground - base, 0.0) + upright
            for where, depth in path.cutoffs:
                found = found + 2 * depth * ((place >= where) if beyond else (place > where))
        return np.asarray(found)

    def uprights(place: FloatArray) -> FloatArray:
        """Upright contact passed before a place on a level run."""
        found = np.zeros(place.shape)
        for i in range(len(x) - 1):
            found = found + np.where(place > x[i], 1.0, 0.0) * _part_of(x, z, i, place)
        return found

    tips = cracks.heel[:, None], width - cracks.toe[:, None]
    here = sum(abs(z[i + 1] - z[i]) for i in range(edge)) + abs(z[edge + 1] - z[edge]) * share
    begin = np.where(cracked[0][:, None], loss(tips[0], uprights(tips[0]), beyond=False), 0.0)
    whole = loss(np.array([[width]]), np.array([[np.abs(np.diff(z)).sum()]]), beyond=True)
    whole = whole + (max(path.protected_ground - base, 0.0) if path.creeps else 0.0)
    finish = np.where(cracked[1][:, None], loss(tips[1], uprights(tips[1]), beyond=True), whole)

    def falling(
        at: FloatArray, first: FloatArray, last: FloatArray, upper: FloatArray, lower: FloatArray
    ) -> FloatArray:
        reach = np.where(last > first, last - first, 1.0)
        return np.asarray(upper + (lower - upper) * np.clip((at - first) / reach, 0, 1))

    at = loss(spot, here, beyond=False)
    head = falling(at, begin, finish, at_heel, at_toe)
    if path.drain is not None:
        where, kind, figure = path.drain
        place = np.array([[where]])
        drained = loss(place, uprights(place), beyond=False)
        if kind == "effectiveness":
            bare = falling(drained, begin, finish, at_heel, at_toe)
            kept = at_toe + (1 - figure) * (bare - at_toe)
        else:
            kept = at_toe + figure * (at_heel - at_toe)
        split = np.where(
            spot < where,
            falling(at, begin, drained, at_heel, kept),
            falling(at, drained, finish, kept, at_toe),
        )
        head = np.where((where > tips[0]) & (where < tips[1]), split, head)
    return np.where(spot < tips[0], at_heel, np.where(spot > tips[1], at_toe, head))


def _part_of(x: FloatArray, z: FloatArray, i: int, place: FloatArray) -> FloatArray:
    """Upright length of one edge that lies before a place."""
    run, rise = x[i + 1] - x[i], abs(z[i + 1] - z[i])
    share = np.clip((place - x[i]) / run, 0, 1) if run > 0 else np.ones(place.shape)
    return np.asarray(rise * share)
