"""Thrust of layered soil and water against a table and against quadrature of the stresses."""

from __future__ import annotations

import itertools
import math
from collections.abc import Callable
from dataclasses import dataclass
from itertools import pairwise

import pytest
from scipy.integrate import quad

from loads.assessment import Assessed
from loads.diagram import Diagram
from tests.agreement import Agree, printed
from tests.scenes import panel_under, sediment_alone

WATER = 9.80665


@dataclass(frozen=True)
class Soil:
    """A layer: top above the foot in m, weights in kN/m³, friction angle in degrees, cohesion in kPa."""

    top: float
    moist: float
    saturated: float
    friction: float
    cohesion: float = 0.0


@dataclass(frozen=True)
class Case:
    """Layers from the top down, level in m, load on the ground in kPa, and the table's figures."""

    layers: tuple[Soil, ...]
    level: float
    surcharge: float
    pressure: str
    soil: tuple[str, str, str]
    water: tuple[str, str]
    whole: tuple[str, str]


PLAIN = (Soil(8, 18, 19.8, 30), Soil(6, 18.5, 19.5, 26), Soil(3, 19, 20.5, 35))
COHESIVE = (Soil(8, 18, 19.8, 30, 8), Soil(6, 18.5, 19.5, 26, 5), Soil(3, 19, 20.5, 35))
AT_FIVE = ("122.583125", "204.30520833")
CASES = {
    "S1": Case(
        PLAIN,
        5,
        10,
        "active",
        ("179.41644599", "3.2844616486", "589.286436"),
        AT_FIVE,
        ("301.99957099", "793.59164434"),
    ),
    "S2": Case(
        PLAIN,
        5,
        10,
        "at rest",
        ("270.20157683", "3.2235673614", "871.01298407"),
        AT_FIVE,
        ("392.78470183", "1075.3181924"),
    ),
    "S3": Case(
        COHESIVE,
        5,
        0,
        "active",
        ("122.79604844", "2.5837030805", "317.26852862"),
        AT_FIVE,
        ("245.37917344", "521.57373696"),
    ),
    "S4": Case(
        PLAIN,
        8,
        0,
        "passive",
        ("1046.0019007", "2.4187168236", "2529.9823947"),
        ("313.8128", "836.83413333"),
        ("1359.8147007", "3366.816528"),
    ),
}


def computed(case: Case) -> Assessed:
    layers = []
    for number, soil in enumerate(case.layers):
        layer = {
            "side": "flood",
            "top": f"{soil.top} m",
            "moist_unit_weight": f"{soil.moist} kN/m3",
            "saturated_unit_weight": f"{soil.saturated} kN/m3",
            "friction_angle": f"{soil.friction} deg",
            "pressure": case.pressure,
        }
        if soil.cohesion:
            layer["cohesion"] = f"{soil.cohesion} kPa"
        if number == 0:
            layer["surcharge"] = f"{case.surcharge} kPa"
        layers.append(layer)
    wall = {"width": "1 m", "height": "8 m", "sediment": layers}
    return panel_under(wall, flood_side=f"{case.level} m", unit_weight=f"{WATER} kN/m3")


def effective_pressure(case: Case) -> Callable[[float], float]:
    """Pressure of the soil alone in kPa at a height, from stress summed from the ground down."""

    def weight(soil: Soil, z: float) -> float:
        return soil.moist if z > case.level else soil.saturated - WATER

    def layer_at(z: float) -> Soil:
        return [soil for soil in case.layers if soil.top > z][-1]

    def pressure(z: float) -> float:
        marks = sorted({z, case.level, *(soil.top for soil in case.layers)})
        above = [mark for mark in marks if mark >= z]
        stress = case.surcharge
        for low, high in itertools.pairwise(above):
            stress += weight(layer_at((low + high) / 2), (low + high) / 2) * (high - low)
        soil = layer_at(z)
        sine = math.sin(math.radians(soil.friction))
        active = (1 - sine) / (1 + sine)
        ratio = {"at rest": 1 - sine, "active": active, "passive": 1 / active}[case.pressure]
        return max(ratio * stress - 2 * soil.cohesion * math.sqrt(ratio), 0.0)

    return pressure


@pytest.mark.parametrize("name", sorted(CASES))
def test_layers_against_the_table(agree: Agree, name: str) -> None:
    case = CASES[name]
    barrier = computed(case)
    soil, water = sediment_alone(barrier), barrier.by_load["water, flood side"]
    thrust, height, moment = case.soil
    agree(soil.horizontal / 1e3, printed(thrust), what="soil, kN per metre")
    agree(soil.line_of_action, printed(height), what="height of the soil's thrust, m")
    agree(soil.moment / 1e3, printed(moment), what="moment of the soil, kN·m per metre")
    agree(water.horizontal / 1e3, printed(case.water[0]), what="water, kN per metre")
    agree(water.moment / 1e3, printed(case.water[1]), what="moment of the water, kN·m per metre")
    agree(barrier.resultant.horizontal / 1e3, printed(case.whole[0]), what="whole thrust, kN per metre")
    agree(barrier.resultant.moment / 1e3, printed(case.whole[1]), what="whole moment, kN·m per metre")


@pytest.mark.parametrize("name", sorted(CASES))
def test_layers_against_quadrature_of_the_stresses(agree: Agree, name: str) -> None:
    case = CASES[name]
    barrier = computed(case)
    pressure, soil = effective_pressure(case), sediment_alone(barrier)
    parts = Diagram.joined(load.diagram for load in barrier.loads if load.name.startswith("sediment"))
    pieces = list(pairwise(sorted({0.0, *(float(z) for z in parts.knot[0])})))
    force = sum(quad(pressure, low, high)[0] for low, high in pieces)
    moment = sum(quad(lambda z: pressure(z) * z, low, high)[0] for low, high in pieces)
    agree(soil.horizontal / 1e3, force, rel=1e-9, what="soil, kN per metre")
    agree(soil.moment / 1e3, moment, rel=1e-9, what="moment of the soil, kN·m per metre")
