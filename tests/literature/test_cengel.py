"""Çengel and Cimbala: a submerged window, and a cylinder as a gate."""

from __future__ import annotations

import math

import pytest

from tests.agreement import Agree, printed
from tests.scenes import panel_under


@pytest.mark.source(
    "Cengel", "published; Ex. 3-8, p. 92: 1.2 m by 1.0 m upright, top edge 8 m deep, 9.81 kN/m³"
)
def test_submerged_upright_rectangle(agree: Agree) -> None:
    panel = {"bottom": "-9.2 m", "width": "1.0 m", "height": "1.2 m"}
    barrier = panel_under(panel, flood_side="0 m", unit_weight="9.81 kN/m3")
    force = barrier.resultant.horizontal
    agree(force / barrier.face.area / 1e3, printed("84.4"), what="mean pressure, kPa")
    agree(force / 1e3, printed("101.2"), what="force, kN")
    agree(-barrier.resultant.line_of_action, printed("8.61"), what="depth of the centre of pressure, m")


@pytest.mark.source(
    "Cengel",
    "published; Ex. 3-9, p. 95: quarter of a cylinder, radius 0.8 m, from 4.2 to 5.0 m deep, 1 m long",
)
def test_cylinder_that_overhangs_the_water(agree: Agree) -> None:
    arc = {"shape": "arc", "width": "1 m", "height": "0.8 m", "offset": "-0.8 m", "radius": "0.8 m"}
    found = panel_under(arc | {"centre": "protected"}, flood_side="5 m", unit_weight="9.81 kN/m3").resultant
    agree(found.total / 1e3, printed("52.3"), what="resultant, kN per metre")
    angle = math.degrees(math.atan2(found.vertical[0], found.horizontal[0]))
    agree(angle, printed("46.4"), what="slope of the resultant, degrees")
    agree(found.vertical / 1e3, printed("37.9"), what="weight of the cylinder that it lifts, kN per metre")
