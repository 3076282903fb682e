"""Das: thrusts of soil and water in layers, from a scenario to the resultant."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
import pytest

from loads.assessment import Assessed
from tests.agreement import Agree, printed
from tests.scenes import FOOT, POUND, panel_under, sediment_alone

DRY = "-9 m"


def layer(top: str, saturated: str, pressure: str, **more: Any) -> dict[str, Any]:
    return {"side": "flood", "top": top, "saturated_unit_weight": saturated, "pressure": pressure, **more}


def behind(*layers: dict[str, Any], height: str, level: str, unit: str = "1 m") -> Assessed:
    wall = {"width": unit, "height": height, "sediment": list(layers)}
    weight = "62.4 pcf" if unit == "1 ft" else "9.81 kN/m3"
    return panel_under(wall, flood_side=level, unit_weight=weight)


@pytest.mark.source(
    "DasGeotechnical",
    "published; Ex. 13.1, p. 430: at rest, φ′ 30°, OCR 2, 10 ft of 100 lb/ft³ over 5 ft of 122.4 under water",
)
def test_soil_at_rest_above_and_below_water(agree: Agree) -> None:
    sand = layer("15 ft", "122.4 pcf", "at rest", moist_unit_weight="100 pcf", friction_angle="30 deg")
    found = behind(
        sand | {"overconsolidation_ratio": 2.0}, height="15 ft", level="5 ft", unit="1 ft"
    ).resultant
    agree(found.line_of_action / FOOT, printed("4.8"), what="height of the resultant, ft")


@pytest.mark.source("DasGeotechnical", "published; Ex. 13.2, p. 449: Rankine, φ′ 36°, 16 kN/m³, 6 m")
@pytest.mark.parametrize(
    ("pressure", "thrust", "slack"), [("active", "74.8", 0.05), ("passive", "1109.2", 0.2)]
)
def test_dry_sand(agree: Agree, pressure: str, thrust: str, slack: float) -> None:
    found = behind(
        layer("6 m", "16 kN/m3", pressure, friction_angle="36 deg"), height="6 m", level=DRY
    ).resultant
    why = "the companion notebook takes 57.3 degrees to the radian, which is 0.01 %"
    agree(
        found.horizontal / 1e3, printed(thrust), abs=slack, why=why, what=f"{pressure} thrust, kN per metre"
    )
    agree(found.line_of_action, printed("2.000"), what="height of the thrust, m (a third of 6 m)")


@pytest.mark.source(
    "DasGeotechnical",
    "published; Ex. 13.5, p. 453: clay, φ 0°, cohesion 10 kPa, 16.5 kN/m³, 6 m; after the crack",
)
def test_clay_after_the_tension_crack(agree: Agree) -> None:
    clay = layer("6 m", "16.5 kN/m3", "active", friction_angle="0 deg", cohesion="10 kPa")
    agree(
        behind(clay, height="6 m", level=DRY).resultant.horizontal / 1e3,
        printed("189.1"),
        what="thrust, kN per metre",
    )


@pytest.mark.source(
    "DasFoundation",
    "published; Ex. 7.2, p. 321: φ′ 26°, cohesion 14.36 kPa, 17.4 kN/m³, 6 m; after the crack",
)
def test_soil_with_cohesion_and_friction_after_the_crack(agree: Agree) -> None:
    soil = layer("6 m", "17.4 kN/m3", "active", friction_angle="26 deg", cohesion="14.36 kPa")
    barrier = behind(soil, height="6 m", level=DRY)
    agree(barrier.resultant.horizontal / 1e3, printed("38.32"), what="thrust, kN per metre")
    pressed = [z for z, pressure in barrier.diagram.rows(0.0, 6.0) if pressure > 1e-6 or z < 6]
    agree(6 - max(z for z in pressed if z < 6), printed("2.64"), what="depth of the crack, m")


@pytest.mark.source(
    "DasFoundation",
    "published; Ex. 7.1, p. 319: φ′ 30° over φ′ 36°, 16 kN/m³, 3 m each, water at 3 "
    "m; the lower layer's saturated "
    "19 kN/m³ is from memory, to be confirmed; the height of the resultant is "
    "corrected, the companion notebook's 1.84 m "
    "takes a third of a triangle's area for a half",
)
def test_two_layers_with_water_between(agree: Agree) -> None:
    upper = layer("6 m", "16 kN/m3", "active", friction_angle="30 deg")
    lower = layer("3 m", "19 kN/m3", "active", friction_angle="36 deg")
    barrier = behind(upper, lower, height="6 m", level="3 m")
    boundary = np.array([3.0])
    agree(barrier.diagram.pressure(boundary) / 1e3, printed("16"), what="pressure above the boundary, kPa")
    under = barrier.diagram.pressure(boundary, at_underside=True)
    agree(under / 1e3, printed("12.46"), what="pressure below the boundary, kPa")
    agree(barrier.resultant.line_of_action, printed("1.78"), what="height of the resultant, m (corrected)")


@pytest.mark.source(
    "DasFoundation",
    "published; Ex. 7.7, p. 342: passive, φ′ 30° over φ′ 26° with cohesion 10 kPa, "
    "saturated 18.86 kN/m³ below 2 m; "
    "the 15.72 kN/m³ above follows from the first printed pressure",
)
def test_passive_pressure_of_two_layers(agree: Agree) -> None:
    upper = layer("3 m", "15.72 kN/m3", "passive", friction_angle="30 deg")
    lower = layer("1 m", "18.86 kN/m3", "passive", friction_angle="26 deg", cohesion="10 kPa")
    barrier = behind(upper, lower, height="3 m", level="1 m")
    soil = {load.name: load.diagram for load in barrier.loads}
    first, second = soil["sediment 1, flood side"], soil["sediment 2, flood side"]
    agree(first.pressure(np.array([1.0])) / 1e3, printed("94.32"), what="pressure at 2 m, upper layer, kPa")
    under = second.pressure(np.array([1.0]), at_underside=True)
    agree(under / 1e3, printed("112.53"), what="pressure at 2 m, lower layer, kPa")
    agree(second.pressure(np.array([0.0])) / 1e3, printed("135.7"), what="pressure at 3 m, kPa")
    assert sediment_alone(barrier).horizontal[0] < barrier.resultant.horizontal[0]


@pytest.mark.source(
    "DasFoundation",
    "published; Ex. 7.4, p. 326: Coulomb, 16.5 kN/m³, 4.6 m; the angles (φ′ 30°, wall "
    "friction two thirds of it) are "
    "from memory, to be confirmed",
)
def test_coulomb_thrust_on_a_rough_face(agree: Agree) -> None:
    rough = layer("4.6 m", "16.5 kN/m3", "active", friction_angle="30 deg", wall_friction="20 deg")
    across = behind(rough, height="4.6 m", level=DRY).resultant.horizontal
    agree(
        across / math.cos(math.radians(20)) / 1e3,
        printed("51.85"),
        abs=0.09,
        why="printed from the coefficient rounded to 0.297",
        what="thrust along its slope of 20°, kN per metre",
    )


@pytest.mark.source(
    "UsbrSiltRule",
    "published; as quoted: silt presses as a fluid of 85 lb/ft³, 13.35 kN/m³, its water included",
)
def test_silt_as_an_equivalent_fluid(agree: Agree) -> None:
    silt = {"side": "flood", "top": "10 ft", "pressure": "equivalent fluid", "fluid_unit_weight": "85 pcf"}
    flooded = behind(silt, height="10 ft", level="10 ft", unit="1 ft")
    drained = behind(silt, height="10 ft", level="0 ft", unit="1 ft")
    for barrier, state in ((flooded, "water to its top"), (drained, "no water above it")):
        pressure = barrier.diagram.pressure(np.array([0.0]))
        agree(pressure / 3.048 / 1e3, printed("13.35"), what=f"growth of pressure with depth, {state}, kN/m³")
        agree(barrier.resultant.horizontal / POUND, 85 * 10**2 / 2, rel=1e-12, what=f"force, {state}, lb/ft")
