"""The loads on a barrier, by cause. A new load is one module and one line in `LOADS`."""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass

from loads.diagram import Diagram
from loads.records.panel import Panel
from loads.records.sediment import Sediment
from loads.sediment import sediment_diagrams
from loads.states import Levels
from loads.water import Fluid, water_diagram

SIDES = ("flood", "protected")
TOWARD = {"flood": 1.0, "protected": -1.0}
"""Sign of a push from each side: positive toward the protected side."""


@dataclass(frozen=True, kw_only=True)
class Load:
    """One cause's part of the net pressure.

    Attributes
    ----------
    name
        For example "water, flood side".
    diagram
        Signed pressure, positive toward the protected side.
    """

    name: str
    diagram: Diagram


@dataclass(frozen=True, kw_only=True)
class Setting:
    """Everything that loads a barrier from outside: levels, fluids, and the face with its sediment."""

    levels: Levels
    fluids: dict[str, Fluid]
    panel: Panel


def water_loads(setting: Setting) -> list[Load]:
    """Still water on either side."""
    return [
        Load(
            name=f"water, {side} side",
            diagram=water_diagram(setting.levels.of(side), setting.fluids[side].unit_weight).scaled(
                TOWARD[side]
            ),
        )
        for side in SIDES
    ]


def sediment_loads(setting: Setting) -> list[Load]:
    """Sediment layers on either side."""
    loads = []
    for side in SIDES:
        layers = setting.panel.layers(side)
        diagrams = sediment_diagrams(
            layers,
            level=setting.levels.of(side),
            water_unit_weight=setting.fluids[side].unit_weight,
            bottom=setting.panel.bottom.value,
            tilt=tilt_from(side, setting.panel.tilt_angle),
        )
        loads += [
            Load(name=layer_name(layer, number, side), diagram=diagram.scaled(TOWARD[side]))
            for number, (layer, diagram) in enumerate(zip(layers, diagrams, strict=True), 1)
        ]
    return loads


def tilt_from(side: str, tilt: float) -> float:
    """Tilt of a face as the soil of one side meets it: below 90° the soil lies over the face. [rad]."""
    return tilt if side == "flood" else math.pi - tilt


def layer_name(layer: Sediment, number: int, side: str) -> str:
    """Name of a layer's load."""
    own = f" ({layer.name})" if layer.name else ""
    return f"sediment {number}{own}, {side} side"


LOADS: Sequence[Callable[[Setting], list[Load]]] = (water_loads, sediment_loads)
"""Every load there is. The net pressure is their sum."""


def loads_on(setting: Setting) -> list[Load]:
    """Loads of a setting, each by its cause."""
    return [load for build in LOADS for load in build(setting)]
