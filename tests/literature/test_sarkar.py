"""Sarkar: lock gate, wall, disc, triangle, and oil over water."""

from __future__ import annotations

import pytest

from tests.agreement import Agree, printed
from tests.scenes import panel_under

WATER = "9.81 kN/m3"


@pytest.mark.source("Sarkar", "published; Ex. 1.16, p. 21: lock gate 6 m wide, water 8 m and 4 m")
def test_lock_gate_with_water_on_both_sides(agree: Agree) -> None:
    gate = {"width": "6 m", "height": "8 m"}
    found = panel_under(gate, flood_side="8 m", protected_side="4 m", unit_weight=WATER).resultant
    agree(found.horizontal / 1e3, printed("1412.64"), what="net force, kN")
    agree(found.line_of_action, printed("3.1111"), what="height of the resultant, m")


@pytest.mark.source("Sarkar", "published; Ex. 1.17, p. 22: wall 10 m long, 2 m of water")
def test_partly_wetted_wall(agree: Agree) -> None:
    found = panel_under({"width": "10 m", "height": "3 m"}, flood_side="2 m", unit_weight=WATER).resultant
    agree(found.horizontal, printed("196200"), what="force, N")
    why = "printed from two thirds rounded to 0.6666"
    agree(2 - found.line_of_action, printed("1.3332"), abs=2e-4, why=why, what="depth of the resultant, m")


@pytest.mark.source(
    "Sarkar",
    "published; Ex. 1.22, p. 27: upright disc of 2 m, upper edge 0.5 m deep; the "
    "depth of the centre of pressure is "
    "corrected, the companion notebook's 1.54167 m leaves out the square of the diameter",
)
def test_upright_disc(agree: Agree) -> None:
    disc = {"shape": "circle", "bottom": "-2.5 m", "diameter": "2 m"}
    found = panel_under(disc, flood_side="0 m", unit_weight=WATER).resultant
    agree(found.horizontal, printed("46228.5"), what="force, N")
    agree(-found.line_of_action, printed("1.6667"), what="depth of the centre of pressure, m (corrected)")


@pytest.mark.source(
    "Sarkar",
    "published; Ex. 1.24, p. 29: triangle, upper base 1.5 m, 3 m along a plane at 30°, base 1.4 m deep",
)
def test_triangle_on_an_inclined_plane(agree: Agree) -> None:
    triangle = {"shape": "trapezoid", "bottom_width": "0 m", "top_width": "1.5 m", "height": "3 m"}
    found = panel_under(
        triangle | {"bottom": "-2.9 m", "tilt": "30 deg"}, flood_side="0 m", unit_weight=WATER
    ).resultant
    agree(found.total, printed("41937.8"), what="force, N")
    agree(-found.line_of_action, printed("1.9658"), what="depth of the centre of pressure, m")


@pytest.mark.source(
    "Sarkar", "published; Ex. 1.19, p. 24: wall 1.5 m wide, 0.9 m of oil (0.9) over 0.6 m of water"
)
def test_oil_over_water(agree: Agree) -> None:
    heavier = {"side": "flood", "top": "0.6 m", "pressure": "fluid mud", "fluid_unit_weight": WATER}
    wall = {"width": "1.5 m", "height": "1.5 m", "sediment": [heavier]}
    found = panel_under(wall, flood_side="1.5 m", unit_weight="8.829 kN/m3").resultant
    agree(found.horizontal, printed("15163.8"), what="force, N")
    why = "printed from intermediate figures of five digits"
    agree(1.5 - found.line_of_action, printed("1.00521"), abs=5e-5, why=why, what="depth of the resultant, m")
