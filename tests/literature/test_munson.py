"""Munson, Young and Okiishi: an inclined disc, a triangle, and the wall of a half-full conduit."""

from __future__ import annotations

import math

import pytest

from tests.agreement import Agree, printed
from tests.scenes import FOOT, POUND, arm, panel_under


@pytest.mark.source(
    "Munson",
    "published; Ex. 2.6, p. 61: disc of 4 m at 60°, its middle 10 m deep, 9.80 kN/m³; "
    "the companion notebook prints "
    "1.23 kN for 1.23 MN",
)
def test_inclined_disc(agree: Agree) -> None:
    bottom = -10 - 2 * math.sin(math.radians(60))
    disc = {"shape": "circle", "bottom": f"{bottom!r} m", "diameter": "4 m", "tilt": "60 deg"}
    found = panel_under(disc, flood_side="0 m", unit_weight="9.80 kN/m3").resultant
    agree(found.total / 1e6, printed("1.23"), what="force, MN")
    agree(2 - arm(found), printed("0.0866"), what="centre of pressure below the middle, along the face, m")


@pytest.mark.source(
    "Munson",
    "published; Ex. 2.7, p. 62: right triangle of 3 ft by 3 ft, its centroid 9 ft "
    "deep, 64.0 lb/ft³; the depth of "
    "the centre of pressure is corrected, the companion notebook's 9.0 ft is an integer division",
)
def test_triangle(agree: Agree) -> None:
    corners = [["0 ft", "0 ft"], ["3 ft", "0 ft"], ["0 ft", "3 ft"]]
    triangle = {"shape": "outline", "bottom": "-10 ft", "points": corners}
    found = panel_under(triangle, flood_side="0 ft", unit_weight="64.0 pcf").resultant
    agree(found.horizontal / POUND, printed("2592"), what="force, lb")
    agree(
        -found.line_of_action / FOOT,
        printed("9.0556"),
        what="depth of the centre of pressure, ft (corrected)",
    )


@pytest.mark.source(
    "Munson", "published; Ex. 2.9, p. 68: quarter of a conduit of 6 ft, half full, 1 ft long, 62.4 lb/ft³"
)
def test_wall_of_a_half_full_conduit(agree: Agree) -> None:
    arc = {"shape": "arc", "width": "1 ft", "height": "3 ft", "offset": "3 ft", "radius": "3 ft"}
    found = panel_under(arc | {"centre": "flood"}, flood_side="3 ft", unit_weight="62.4 pcf").resultant
    agree(found.total / POUND, printed("522.9"), what="resultant, lb")
    across = (found.horizontal * found.line_of_action - found.moment) / found.vertical
    agree(across / FOOT, printed("1.273"), what="line of the vertical part from the middle, ft")
    assert found.vertical[0] < 0
