"""Paradise: a dam with a parabolic face, as plane panels along its chords."""

from __future__ import annotations

import math

import numpy as np
import pytest

from tests.agreement import Agree, printed
from tests.scenes import FOOT, POUND, chain_force

LONG_TON = 2240 * POUND


@pytest.mark.source(
    "Paradise",
    "published; Ex. 1.6, p. 10: parabolic face, its vertex at the foot, 60 ft of "
    "water, 32 ft across; long tons",
)
def test_parabolic_dam_face(agree: Agree) -> None:
    points = [(32 * FOOT * share, 60 * FOOT * share**2) for share in np.linspace(0.0, 1.0, 101).tolist()]
    across, up, _ = chain_force(points, "1 ft", flood_side="60 ft", unit_weight="62.4 pcf")
    agree(
        math.hypot(across, up) / LONG_TON, printed("61.5"), what="resultant of 100 panels, long tons per foot"
    )
    agree(math.degrees(math.atan2(-up, across)), printed("35.42"), what="its slope downward, degrees")
