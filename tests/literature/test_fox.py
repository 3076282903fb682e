"""Fox and McDonald: an inclined gate under water."""

from __future__ import annotations

import pytest

from tests.agreement import Agree, printed
from tests.scenes import arm, panel_under


@pytest.mark.source(
    "Fox",
    "published; Ex. 3.5, p. 70: 4 m by 5 m at 30°, upper edge 2 m deep, 999 kg/m³, water above the gate",
)
def test_inclined_gate(agree: Agree) -> None:
    gate = {"bottom": "-4 m", "width": "5 m", "height": "4 m", "tilt": "30 deg"}
    found = panel_under(gate, flood_side="0 m", unit_weight="9800.19 N/m3").resultant
    agree(found.total / 1e3, printed("588"), what="force, kN")
    agree(8 - arm(found), printed("6.22"), what="centre of pressure along the plane from the surface, m")
    assert found.vertical[0] < 0
