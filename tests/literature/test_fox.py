"""Fox and McDonald: an inclined gate under water."""

from __future__ import annotations

import numpy as np
import pytest

from tests.agreement import Agree, printed
from tests.scenes import arm, chain_force, panel_under


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


@pytest.mark.source(
    "Fox",
    "from memory, to be confirmed; Ex. 3.7, p. 76: gate x = y²/4 of 5 m, 4 m of "
    "water, 999 kg/m³, held 5 m from its "
    "hinge; the companion notebook prints 104.54 kN because it takes the integral's error "
    "estimate for the integral",
)
def test_parabolic_gate(agree: Agree) -> None:
    points = [(height**2 / 4, height) for height in np.linspace(0.0, 4.0, 41).tolist()]
    _, _, moment = chain_force(points, "5 m", flood_side="4 m", unit_weight="9800.19 N/m3")
    agree(moment / 5 / 1e3, printed("167"), what="force that holds the gate, of 40 plane panels, kN")
