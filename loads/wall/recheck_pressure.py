"""Pressures at points, from the definitions of the loads on a wall, for the second computation."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from shapely import LineString

from loads.arrays import FloatArray
from loads.records.sediment import Sediment
from loads.sediment import cohesion_pressure, face_coefficient, unit_weights
from loads.states import Levels
from loads.wall.section import Section
from loads.wall.seepage_path import SeepagePath
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
    x, z = (part[0] for part in section.chain("base"))
    walk = _Walk(x=x, z=z, path=site.path)
    spot = x[edge] + (x[edge + 1] - x[edge]) * share
    at_heel, at_toe = _end_heads(walk, levels, cracks)
    tips = cracks.heel[:, None], x[-1] - x[0] - cracks.toe[:, None]
    here = sum(abs(z[i + 1] - z[i]) for i in range(edge)) + abs(z[edge + 1] - z[edge]) * share
    begin = np.where(tips[0] > 0, walk.loss(tips[0], walk.uprights(tips[0]), beyond=False), 0.0)
    finish = np.where(
        cracks.toe[:, None] > 0, walk.loss(tips[1], walk.uprights(tips[1]), beyond=True), walk.whole()
    )
    upright = bool(x[edge + 1] == x[edge])
    at = walk.loss(spot, here, beyond=upright)
    head = _falling(at, begin, finish, at_heel, at_toe)
    if site.path.drain is not None:
        where, kind, figure = site.path.drain
        place = np.array([[where]])
        drained = walk.loss(place, walk.uprights(place), beyond=False)
        bare = _falling(drained, begin, finish, at_heel, at_toe)
        full = bare if kind == "effectiveness" else at_heel
        kept = at_toe + ((1 - figure) if kind == "effectiveness" else figure) * (full - at_toe)
        upper = _falling(at, begin, drained, at_heel, kept)
        lower = _falling(at, drained, finish, kept, at_toe)
        works = (where > tips[0]) & (where < tips[1])
        head = np.where(works, np.where(spot < where, upper, lower), head)
    past = (spot >= tips[1]) & (cracks.toe[:, None] > 0) if upright else spot > tips[1]
    return np.where(spot < tips[0], at_heel, np.where(past, at_toe, head))


def _end_heads(walk: _Walk, levels: Levels, cracks: Cracks) -> tuple[FloatArray, FloatArray]:
    """Total heads at heel and toe, in a crack that of its side, each (n, 1)."""
    path, base = walk.path, float(walk.z[0])
    higher = np.maximum(levels.flood_side, levels.protected_side)
    outlets = (path.flood_ground, path.protected_ground) if path.creeps else (base, base)
    found = []
    for level, outlet, crack in zip(
        (levels.flood_side, levels.protected_side), outlets, (cracks.heel, cracks.toe), strict=True
    ):
        shut = np.minimum(np.maximum(level, max(outlet, base)), higher)
        gaping = np.minimum(np.maximum(level, base), higher)
        found.append(np.maximum(np.where(crack > 0, gaping, shut), _DEEP)[:, None])
    return found[0], found[1]


@dataclass(frozen=True)
class _Walk:
    """The way of the water along one underside."""

    x: FloatArray
    z: FloatArray
    path: SeepagePath

    def loss(self, place: FloatArray, upright: FloatArray, *, beyond: bool) -> FloatArray:
        """Resistance from the flood-side end to a place of the underside."""
        if not self.path.creeps:
            return np.asarray(place + 0.0)
        buried = max(self.path.flood_ground - float(self.z[0]), 0.0)
        found = self.path.horizontal_share * place + buried + upright
        for where, depth in self.path.cutoffs:
            below = depth - self.hanging(where)
            found = found + 2 * max(below, 0.0) * ((place >= where) if beyond else (place > where))
        return np.asarray(found)

    def hanging(self, where: float) -> float:
        """Depth of the underside below the base at a place."""
        line = LineString(np.column_stack([self.x, self.z]))
        deep = float(self.z.min()) - 1.0
        cut = line.intersection(LineString([(where, deep), (where, float(self.z.max()) + 1.0)]))
        return 0.0 if cut.is_empty else float(self.z[0]) - cut.bounds[1]

    def uprights(self, place: FloatArray) -> FloatArray:
        """Upright contact passed before a place on a level run."""
        found = np.zeros(place.shape)
        for i in range(len(self.x) - 1):
            found = found + np.where(place > self.x[i], 1.0, 0.0) * _part_of(self.x, self.z, i, place)
        return found

    def whole(self) -> FloatArray:
        """Resistance from end to end."""
        width, upright = self.x[-1] - self.x[0], np.abs(np.diff(self.z)).sum()
        found = self.loss(np.array([[width]]), np.array([[upright]]), beyond=True)
        return found + (max(self.path.protected_ground - self.z[0], 0.0) if self.path.creeps else 0.0)


def _falling(
    at: FloatArray, first: FloatArray, last: FloatArray, upper: FloatArray, lower: FloatArray
) -> FloatArray:
    reach = np.where(last > first, last - first, 1.0)
    return np.asarray(upper + (lower - upper) * np.clip((at - first) / reach, 0, 1))


def _part_of(x: FloatArray, z: FloatArray, i: int, place: FloatArray) -> FloatArray:
    """Upright length of one edge that lies before a place."""
    run, rise = x[i + 1] - x[i], abs(z[i + 1] - z[i])
    share = np.clip((place - x[i]) / run, 0, 1) if run > 0 else np.ones(place.shape)
    return np.asarray(rise * share)
