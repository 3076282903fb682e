"""Quimby: still salt water on the walls of a building."""

from __future__ import annotations

import numpy as np
import pytest

from tests.agreement import Agree, printed
from tests.scenes import FOOT, POUND, panel_under


@pytest.mark.source(
    "Quimby", "published; sec. 6.7.1, Ex. 6.1: flood level 54 ft, ground 50 ft less 1 ft of scour, salt water"
)
@pytest.mark.parametrize(("width", "force"), [("20 ft", "16"), ("10 ft", "8")])
def test_still_water_on_a_wall(agree: Agree, width: str, force: str) -> None:
    wall = {"bottom": "49 ft", "width": width, "height": "5 ft"}
    barrier = panel_under(wall, flood_side="54 ft", fluid="sea")
    pressure = barrier.diagram.pressure(np.array([barrier.face.bottom]))
    metres = float(width.removesuffix(" ft")) * FOOT
    agree(pressure / POUND * FOOT**2, printed("320"), what="pressure at the ground, lb/ft²")
    agree(barrier.resultant.horizontal / metres / POUND * FOOT, printed("800"), what="force, lb/ft")
    agree(barrier.resultant.horizontal / POUND / 1e3, printed(force), what=f"force on {width}, kip")
