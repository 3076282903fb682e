"""Das: stability of retaining walls from their forces, and seepage around sheet piles."""

from __future__ import annotations

import math
from typing import Literal

import numpy as np
import pytest

from loads.wall.base_pressure import base_pressure
from loads.wall.forces import Force
from loads.wall.seepage import effective_stress_upward, heave_factor
from loads.wall.sliding import sliding_factor
from loads.wall.stability import moment_ratios
from tests.agreement import Agree, printed


def force(direction: Literal["horizontal", "vertical"], value: float, arm: float) -> Force:
    return Force(
        name="printed",
        cause="weight",
        direction=direction,
        value=np.array([value]),
        moment=np.array([value * arm]),
    )


@pytest.mark.source(
    "DasFoundation",
    "published; Ex. 8.1, p. 366: five weights and arms, backfill 117 lb/ft³ at 10°, K 0.294, 12.5 ft base",
)
def test_moment_ratio_of_a_cantilever_wall(agree: Agree) -> None:
    weights = zip((4.05, 1.35, 5.156, 13.01, 1.42), (5.75, 4.67, 6.25, 9.5, 12.5), strict=True)
    slope = math.radians(10)
    height = 6 * math.tan(slope) + 18 + 2.75
    thrust = 0.294 * 0.117 * height**2 / 2 * math.cos(slope)
    forces = [force("vertical", -weight, arm) for weight, arm in weights]
    forces.append(force("horizontal", thrust, height / 3))
    found = moment_ratios(forces, np.array([thrust]), np.array([12.5]))
    agree(found.uplift_overturns, printed("3.47"), what="moment ratio")


@pytest.mark.source(
    "DasFoundation",
    "published; Ex. 8.3, p. 370: height 17.5 ft, 121 lb/ft³, φ 30°, base 10.3 ft on φ 20° and cohesion "
    "1.0 ksf at two "
    "thirds; the six weights are not in the companion notebook: their sum is taken from the printed "
    "pressures and their moment "
    "from the printed ratio",
)
def test_gravity_wall_from_its_sums(agree: Agree) -> None:
    width, thrust = np.array([10.3]), np.array([0.121 * 17.5**2 / 2 / 3])
    normal = (3.51 + 0.67) / 2 * width
    overturning = thrust * 17.5 / 3
    factor = sliding_factor(
        normal=normal,
        coefficient=np.tan(np.radians([20 * 2 / 3])),
        adhesion=np.array([2 / 3]),
        length=width,
        passive=np.zeros(1),
        driving=thrust,
    )
    agree(factor, printed("1.94"), what="sliding factor")
    base = base_pressure(normal, overturning - 3.38 * overturning, width)
    agree(base.toe, printed("3.51"), abs=0.02, why="from the rounded ratio", what="toe, ksf")
    agree(base.heel, printed("0.67"), abs=0.02, why="from the rounded ratio", what="heel, ksf")


@pytest.mark.source(
    "DasGeotechnical",
    "published; Ex. 9.3, p. 236: upward flow, G 2.68, e 0.52, 2 m of soil under 1.5 m of head",
)
def test_effective_stress_with_upward_flow(agree: Agree) -> None:
    water = np.array([9.81])
    saturated = (2.68 + 0.52) / 1.52 * water
    gradient = np.array([1.5 / 2])
    for depth, text in ((1.0, "3.49"), (2.0, "6.97")):
        stress = effective_stress_upward(np.array([depth]), saturated - water, gradient, water)
        agree(stress, printed(text), what=f"effective stress at {depth:g} m, kPa")
    agree(gradient * water, printed("7.36"), what="seepage force, kN/m³")


@pytest.mark.source(
    "DasGeotechnical",
    "published; Ex. 9.4, p. 239: sheet 20 ft deep, C 0.357, heads 30.5 and 5 ft, 112 lb/ft³",
)
def test_heave_beside_a_sheet(agree: Agree) -> None:
    water = np.array([62.4])
    head = np.array([0.357 * (30.5 - 5)])
    factor = heave_factor(np.array([20.0]), 112 - water, head, water)
    agree(factor, printed("1.7"), what="factor against heave")
