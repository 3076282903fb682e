"""Massey and Ward-Smith: two liquids on a disc, and a radial gate."""

from __future__ import annotations

import math

import pytest

from tests.agreement import Agree, printed
from tests.scenes import panel_under


@pytest.mark.source(
    "Massey", "published; Ex. 2.2, p. 64: end of a cylinder of 2 m, oil 880 kg/m³ above, water below"
)
def test_two_liquids_on_a_disc(agree: Agree) -> None:
    water = {"side": "flood", "top": "1 m", "pressure": "fluid mud", "fluid_unit_weight": "9.81 kN/m3"}
    disc = {"shape": "circle", "diameter": "2 m", "sediment": [water]}
    found = panel_under(disc, flood_side="2 m", unit_weight="8632.8 N/m3").resultant
    agree(found.horizontal, printed("27905.5"), what="force, N")
    agree(2 - found.line_of_action, printed("1.26"), what="centre of pressure below the top, m")


@pytest.mark.source(
    "Massey",
    "published; Ex. 2.3, p. 67: radial gate of 4 m over 30°, 5 m wide, 2 m high, "
    "surface 1 m above its top; the "
    "printed prism (rectangle + sector − triangle) belongs to an arc whose upper edge "
    "is level with the centre; the "
    "companion notebook calls the angle, which is in radians, degrees",
)
def test_radial_gate(agree: Agree) -> None:
    arc = {"shape": "arc", "width": "5 m", "height": "2 m", "radius": "4 m", "centre": "protected"}
    offset = -4 * (1 - math.cos(math.radians(30)))
    found = panel_under(
        arc | {"offset": f"{offset!r} m"}, flood_side="3 m", unit_weight="9.81 kN/m3"
    ).resultant
    agree(found.total, printed("205712"), what="resultant, N")
    angle = math.atan2(found.vertical[0], found.horizontal[0])
    agree(angle, printed("0.305"), what="slope of the resultant, rad")
