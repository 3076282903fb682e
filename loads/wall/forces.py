"""The forces on a wall per unit length, each with value, arm and moment about the toe of the base."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field
from typing import Literal

import numpy as np

from loads.arrays import FloatArray
from loads.diagram import Diagram
from loads.load import SIDES, TOWARD, layer_name
from loads.records.sediment import Sediment
from loads.sediment import sediment_diagrams, unit_weights
from loads.states import Levels
from loads.wall.pressing import Push, still_water_push
from loads.wall.section import Section, area_and_centroid

Cause = Literal["weight", "water", "uplift", "soil", "soil weight"]
UPRIGHT = np.pi / 2


@dataclass(frozen=True, kw_only=True)
class Force:
    """One row of the table of forces.

    Attributes
    ----------
    name
        For example "water, flood side".
    cause
        What kind of force it is.
    direction
        "horizontal", positive toward the protected side, or "vertical", positive up.
    value
        Shape (n,). [N/m]
    moment
        About the toe, positive when it turns the top toward the protected side, shape (n,). [N·m/m]
    """

    name: str
    cause: Cause
    direction: Literal["horizontal", "vertical"]
    value: FloatArray
    moment: FloatArray

    @property
    def arm(self) -> FloatArray:
        """Height above the toe, or distance from it toward the flood side; NaN without a force, (n,). [m]."""
        nil = np.full_like(self.value, np.nan)
        return np.divide(self.moment, self.value, out=nil, where=self.value != 0)


@dataclass(frozen=True, kw_only=True)
class Ground:
    """Soil on both sides of a wall, the same for all states.

    Attributes
    ----------
    layers
        Layers of "flood" and "protected" from the top down.
    passive_share
        Share of the protected side's passive pressure that is relied on. [–]
    surcharge_counts_as_weight
        Whether the load on the ground over the base counts as weight.
    """

    layers: dict[str, Sequence[Sediment]]
    passive_share: float = 0.0
    surcharge_counts_as_weight: bool = False


@dataclass(frozen=True, kw_only=True)
class Waters:
    """Weights per volume of the water of both sides. [N/m³]."""

    flood: float
    protected: float

    def of(self, side: str) -> float:
        """Weight per volume of one side's water. [N/m³]."""
        return self.flood if side == "flood" else self.protected


@dataclass(frozen=True, kw_only=True)
class SoilPush:
    """Pressure of one layer on the upright plane through the end of the base, positive as it acts.

    Attributes
    ----------
    name
        Of the layer.
    side
        "flood" or "protected".
    passive
        True when it is passive resistance.
    diagram
        With the share relied on.
    """

    name: str
    side: str
    passive: bool
    diagram: Diagram = field(repr=False)


def weight_forces(section: Section, states: int) -> list[Force]:
    """Weight of each part of the wall."""
    toe = section.x[:, section.toe]
    rows = []
    for part in section.parts:
        area, across, _ = area_and_centroid(part.x, part.z)
        weight = np.broadcast_to(-area * part.unit_weight, (states,))
        rows.append(_vertical(f"weight, {part.name}", "weight", weight, weight * (toe - across)))
    return rows


def _vertical(name: str, cause: Cause, value: FloatArray, moment: FloatArray) -> Force:
    return Force(name=name, cause=cause, direction="vertical", value=value, moment=moment)


def push_rows(name: str, cause: Cause, push: Push) -> list[Force]:
    """Rows of a push: its horizontal and its vertical part, each where there is one."""
    rows = []
    if np.any(push.horizontal):
        rows.append(
            Force(
                name=name,
                cause=cause,
                direction="horizontal",
                value=push.horizontal,
                moment=push.moment_horizontal,
            )
        )
    if np.any(push.vertical):
        rows.append(_vertical(name, cause, push.vertical, push.moment_vertical))
    return rows


def water_forces(section: Section, levels: Levels, waters: Waters) -> list[Force]:
    """Still water on every wetted face; on the top only what stands over it from both sides."""
    pivot = (section.x[:, section.toe], section.z[:, section.toe])
    rows = []
    for side in SIDES:
        x, z = section.chain(side)
        push = still_water_push(x, z, level=levels.of(side), unit_weight=waters.of(side), pivot=pivot)
        rows += push_rows(f"water, {side} side", "water", push)
    x, z = section.chain("top")
    over = np.minimum(levels.flood_side, levels.protected_side)
    push = still_water_push(x, z, level=over, unit_weight=min(waters.flood, waters.protected), pivot=pivot)
    return rows + push_rows("water over the top", "water", push)


def soil_pushes(ground: Ground, levels: Levels, waters: Waters, bottom: float) -> list[SoilPush]:
    """Pressure of every layer on upright planes through heel and toe, down to `bottom`."""
    pushes = []
    for side in SIDES:
        layers = ground.layers[side]
        diagrams = sediment_diagrams(
            layers, level=levels.of(side), water_unit_weight=waters.of(side), bottom=bottom, tilt=UPRIGHT
        )
        for number, (layer, diagram) in enumerate(zip(layers, diagrams, strict=True), 1):
            resists = layer.pressure == "passive" and side == "protected"
            share = ground.passive_share if resists else 1.0
            pushes.append(
                SoilPush(
                    name=layer_name(layer, number, side),
                    side=side,
                    passive=resists,
                    diagram=diagram.scaled(TOWARD[side] * share),
                )
            )
    return pushes


def soil_forces(pushes: Sequence[SoilPush], base: FloatArray) -> list[Force]:
    """Rows of lateral soil pressure above the base, which is (n,) or (1,). [m]."""
    return [
        Force(
            name=push.name,
            cause="soil",
            direction="horizontal",
            value=push.diagram.shear(base[:, None])[:, 0],
            moment=push.diagram.moment(base[:, None])[:, 0],
        )
        for push in pushes
    ]


def soil_weight_forces(section: Section, ground: Ground, levels: Levels, waters: Waters) -> list[Force]:
    """Effective weight of soil that stands over the base, between the face and the plane through its end."""
    rows = []
    toe = section.x[:, section.toe]
    for side in SIDES:
        x, z = section.chain(side)
        if side == "flood":
            x, z = x[:, ::-1], z[:, ::-1]
        end = x[:, :1]
        layers = ground.layers[side]
        for number, layer in enumerate(layers, 1):
            foot = layers[number].top.value if number < len(layers) else -np.inf
            weight, about = _column((x, z, end, TOWARD[side]), layer, foot, levels.of(side), waters.of(side))
            middle = toe - (end[:, 0] + about)
            name = f"weight of {layer_name(layer, number, side)}"
            rows.append(_vertical(name, "soil weight", -weight, -weight * middle))
        if layers and layers[0].surcharge and ground.surcharge_counts_as_weight:
            rows.append(
                _surcharge(x, z, layers[0], name=f"surcharge, {side} side", toe=toe, states=levels.states)
            )
    return [row for row in rows if np.any(row.value)]


def _surcharge(
    x: FloatArray, z: FloatArray, layer: Sediment, *, name: str, toe: FloatArray, states: int
) -> Force:
    assert layer.surcharge is not None
    reach = _width_at(x, z, layer.top.value) - x[:, 0]
    weight = np.broadcast_to(layer.surcharge.value * np.abs(reach), (states,))
    return _vertical(name, "soil weight", -weight, -weight * (toe - x[:, 0] - reach / 2))


def _width_at(x: FloatArray, z: FloatArray, height: float) -> FloatArray:
    """Where a face that rises from the end of the base reaches an elevation, (m,). [m]."""
    found = x[:, 0].copy()
    for i in range(x.shape[1] - 1):
        rise = z[:, i + 1] - z[:, i]
        share = np.divide(height - z[:, i], rise, out=np.zeros(len(x)), where=rise > 0)
        reached = (z[:, i] <= height) & (rise >= 0)
        share = np.where(rise > 0, np.clip(share, 0, 1), 1.0)
        found = np.where(reached, x[:, i] + (x[:, i + 1] - x[:, i]) * share, found)
    return found


Face = tuple[FloatArray, FloatArray, FloatArray, float]
"""Corners from the end of the base up, x and z, x of that end, and the sign of the way in from it."""


def _column(
    face: Face,
    layer: Sediment,
    foot: float,
    level: FloatArray,
    water: float,
) -> tuple[FloatArray, FloatArray]:
    """Weight of a layer over the base and the distance of its centre from the base's end, each (n,)."""
    top = np.full(len(level), layer.top.value)
    bottom = np.full(len(level), max(foot, float(face[1].min())))
    table = np.clip(level, bottom, top)
    if layer.is_fluid:
        assert layer.fluid_unit_weight is not None
        moist = layer.fluid_unit_weight.value
        submerged = moist - water
    else:
        moist, submerged = unit_weights(layer, water)
    volume, first = (
        moist * above + submerged * below
        for above, below in zip(_band(face, table, top), _band(face, bottom, table), strict=True)
    )
    return volume, np.divide(first, volume, out=np.zeros_like(volume), where=volume != 0)


def _band(face: Face, low: FloatArray, high: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Area between the face and the end plane in a band of elevations, and its moment about that plane."""
    x, z, end, inward = face
    area = np.zeros(len(low))
    first = np.zeros(len(low))
    for i in range(x.shape[1] - 1):
        rise = z[:, i + 1] - z[:, i]
        if not np.any(rise):
            continue
        divisor = np.where(rise != 0, rise, 1.0)
        start = np.clip((low - z[:, i]) / divisor, 0, 1)
        stop = np.clip((high - z[:, i]) / divisor, 0, 1)
        slope = x[:, i + 1] - x[:, i]
        a, b = (x[:, i] - end[:, 0] + slope * share for share in (start, stop))
        height = rise * np.abs(stop - start)
        area = area + height * inward * (a + b) / 2
        first = first + height * inward * (a * a + a * b + b * b) / 6
    return area, first
