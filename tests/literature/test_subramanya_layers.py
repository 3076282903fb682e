"""Subramanya: oil over water, with a unit weight of water of his own."""

from __future__ import annotations

import pytest

from tests.agreement import Agree, printed
from tests.scenes import panel_under


@pytest.mark.source(
    "Subramanya", "published; Ex. 2.17, p. 28: 1.5 m wide, 0.9 m of oil (0.9) over 0.6 m, 9.79 kN/m³"
)
def test_oil_over_water(agree: Agree) -> None:
    heavier = {"side": "flood", "top": "0.6 m", "pressure": "fluid mud", "fluid_unit_weight": "9.79 kN/m3"}
    wall = {"width": "1.5 m", "height": "1.5 m", "sediment": [heavier]}
    found = panel_under(wall, flood_side="1.5 m", unit_weight="8.811 kN/m3").resultant
    agree(found.horizontal / 1e3, printed("15.133"), what="force, kN")
    agree(1.5 - found.line_of_action, printed("1.005"), what="depth of the resultant, m")
