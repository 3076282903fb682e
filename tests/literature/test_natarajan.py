"""Natarajan: a dam with a cubic face, as plane panels along its chords."""

from __future__ import annotations

import math

import numpy as np
import pytest

from tests.agreement import Agree, printed
from tests.scenes import chain_force


@pytest.mark.source(
    "Natarajan", "published; Ex. 2.12, p. 67: face x³ = 12 y, 40 m of water, 1 m long, 9.81 kN/m³"
)
def test_cubic_dam_face(agree: Agree) -> None:
    heights = [40 * share**2 for share in np.linspace(0.0, 1.0, 61).tolist()]
    points = [((12 * height) ** (1 / 3), height) for height in heights]
    across, up, _ = chain_force(points, "1 m", flood_side="40 m", unit_weight="9.81 kN/m3")
    agree(math.hypot(across, up) / 1e3, printed("8179"), what="resultant of 60 panels, kN per metre")
