"""Dighe: a dock gate, water over a heavier liquid, and two beams that share a load."""

from __future__ import annotations

import pytest

from tests.agreement import Agree, printed
from tests.scenes import FOOT, POUND, panel_under


@pytest.mark.source(
    "Dighe", "published; Ex. 1.6, p. 13: dock gate 40 ft wide, sea water 64 lb/ft³, 27 ft and 9 ft"
)
def test_dock_gate_in_sea_water(agree: Agree) -> None:
    gate = {"width": "40 ft", "height": "27 ft"}
    found = panel_under(gate, flood_side="27 ft", protected_side="9 ft", fluid="sea").resultant
    agree(found.line_of_action / FOOT, printed("9.75"), what="height of the resultant, ft")


@pytest.mark.source(
    "Dighe", "published; Ex. 1.14, p. 21: 10 ft of water, 62.4 lb/ft³, over 4 ft of a liquid 1.6 times"
)
def test_water_over_a_heavier_liquid(agree: Agree) -> None:
    mud = {"side": "flood", "top": "4 ft", "pressure": "fluid mud", "fluid_unit_weight": "99.84 pcf"}
    wall = {"width": "1 ft", "height": "14 ft", "sediment": [mud]}
    found = panel_under(wall, flood_side="14 ft", unit_weight="62.4 pcf").resultant
    agree(found.line_of_action / FOOT, printed("4.5"), what="height of the resultant, ft")


@pytest.mark.source(
    "Dighe", "published; Ex. 1.27, p. 38: 9 ft of water, 10 ft wide, two equally loaded beams"
)
def test_load_of_two_equal_beams(agree: Agree) -> None:
    found = panel_under(
        {"width": "10 ft", "height": "9 ft"}, flood_side="9 ft", unit_weight="62.4 pcf"
    ).resultant
    agree(found.horizontal / 2 / POUND, printed("12636"), what="load of each beam, lb")
