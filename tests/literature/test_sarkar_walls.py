"""Sarkar (Strength of Materials), Lal and Dighe: walls under water without uplift."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
import pytest

from loads.earth_pressure import active_coefficient_rankine
from loads.wall.base_pressure import base_pressure
from tests.agreement import Agree, printed
from tests.scenes import FOOT, POUND
from tests.walls import stable

DRY_BASE: dict[str, Any] = {"shape": "gravity", "uplift": "none", "crack": "not opened"}


def wall(**table: Any) -> dict[str, Any]:
    return DRY_BASE | table


@pytest.mark.source(
    "SarkarStrength", "published; Ex. 14.3, p. 327: 6 m, top 1 m, base 4 m, water 5.5 m, 22.4 and 10 kN/m³"
)
def test_stresses_under_a_trapezoid(agree: Agree) -> None:
    table = wall(height="6 m", top_width="1 m", base_width="4 m", unit_weight="22.4 kN/m3")
    base = stable(table, 5.5, unit_weight=10e3).base
    agree(base.linear_toe / 1e3, printed("112.38"), what="greatest, kPa")
    agree(base.linear_heel / 1e3, printed("55.62"), what="least, kPa")


@pytest.mark.source(
    "SarkarStrength",
    "published; Ex. 14.4, p. 329, corrected: printed 500.62 kN, because the companion notebook squares the "
    "unit weight "
    "in place of the weight",
)
def test_resultant_of_weight_and_water(agree: Agree) -> None:
    table = wall(height="10 m", top_width="2 m", base_width="5 m", unit_weight="25 kN/m3")
    found = stable(table, 10.0, unit_weight=10e3)
    agree(np.hypot(found.horizontal, found.vertical) / 1e3, printed("1007.8"), what="resultant, kN/m")


@pytest.mark.source(
    "SarkarStrength",
    "published; Ex. 14.8, p. 334: 10 m, top 1 m, base 7 m, batter 1 m under water, 19.62 kN/m³",
)
def test_water_on_a_battered_face(agree: Agree) -> None:
    table = wall(
        height="10 m", top_width="1 m", base_width="7 m", flood_batter="1 m", unit_weight="19.62 kN/m3"
    )
    base = stable(table, 10.0).base
    why = "printed with the eccentricity rounded to 1.07 m, exact 1.0686 m"
    agree(base.linear_toe, printed("228373"), abs=150, why=why, what="greatest, N/m²")
    agree(base.linear_heel, printed("9870.06"), abs=150, why=why, what="least, N/m²")
    agree(base.linear_toe, 228233, digits=6, what="greatest with the exact eccentricity, N/m²")


@pytest.mark.source(
    "SarkarStrength",
    "published; Ex. 14.13, p. 341, corrected: 6 m, top 1 m, base 3 m, soil 18 kN/m³ at 20°, φ 30°, "
    "masonry 24 kN/m³; "
    "the companion notebook takes the triangle at a wrong arm",
)
def test_masonry_wall_under_sloping_ground(agree: Agree) -> None:
    K = active_coefficient_rankine(np.radians([30.0]), np.radians([20.0]))
    thrust = K * 18 * 6**2 / 2
    table = wall(height="6 m", top_width="1 m", base_width="3 m", unit_weight="24 kN/m3")
    (weight,) = [row for row in stable(table, -9.0).forces if row.cause == "weight"]
    slope = math.radians(20)
    normal = -weight.value / 1e3 + thrust * math.sin(slope)
    moment = weight.moment / 1e3 + thrust * math.cos(slope) * 2 - thrust * math.sin(slope) * 3
    base = base_pressure(normal, moment, np.array([3.0]))
    agree(base.toe, 153.55, digits=5, what="toe, kPa")
    agree(base.heel, 69.05, digits=4, what="heel, kPa")


@pytest.mark.source(
    "Lal", "published; Ex. 1.16, p. 25: 42 ft, top 8 ft, base 25 ft, 150 lb/ft³, water to the top"
)
def test_resultant_on_a_dam_in_feet(agree: Agree) -> None:
    table = wall(height="42 ft", top_width="8 ft", base_width="25 ft", unit_weight="150 pcf")
    found = stable(table, 42 * FOOT, unit_weight=62.4 * POUND / FOOT**3)
    resultant = np.hypot(found.horizontal, found.vertical) / POUND * FOOT
    agree(resultant, printed("117500"), abs=150, why="slide-rule figures", what="resultant, lb/ft")


@pytest.mark.source("Dighe", "published; Ex. 1.10, p. 17: brick wall 3 ft by 15 ft, 140 lb/ft³, no tension")
def test_depth_of_water_without_tension(agree: Agree) -> None:
    table = wall(height="15 ft", top_width="3 ft", base_width="3 ft", unit_weight="140 pcf")
    depths = np.linspace(6.6, 6.8, 2001)
    heel = stable(table, depths * FOOT, unit_weight=62.4 * POUND / FOOT**3).base.linear_heel
    agree(depths[np.argmin(np.abs(heel))], printed("6.72"), what="depth, ft")
