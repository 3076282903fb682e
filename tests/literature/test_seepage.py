"""Creep, key points, exit gradient, drains and critical gradient."""

from __future__ import annotations

import numpy as np
import pytest

from loads.wall.seepage import (
    critical_gradient,
    exit_gradient_floor,
    interference_correction,
    key_point_heads,
    weighted_creep_ratio,
)
from tests.agreement import Agree, printed
from tests.walls import stable, uplift_at

FLOOR = {"shape": "gravity", "height": "1 m", "unit_weight": "22 kN/m3", "crack": "not opened"}


@pytest.mark.source(
    "PunmiaIrrigation",
    "published; Ex. 12.1, p. 576: floor 22 m, cutoffs 6 m and 8 m, head 4 m, specific gravity 2.24, "
    "line of creep",
)
def test_uplift_along_a_line_of_creep(agree: Agree) -> None:
    table = FLOOR | {
        "top_width": "22 m",
        "base_width": "22 m",
        "uplift": "line of creep",
        "cutoff": [{"position": "0 m", "depth": "6 m"}, {"position": "22 m", "depth": "8 m"}],
    }
    found = stable(table, 4.0)
    rows = ((6, "25.11", "2.75"), (12, "20.4", "2.24"), (18, "15.7", "1.72"))
    for place, pressure, thickness in rows:
        at = uplift_at(found, place) / 1e3
        agree(at, printed(pressure), what=f"uplift at {place} m, kPa")
        agree(4 / 3 * at / 9.81 / (2.24 - 1), printed(thickness), what="thickness there, m")


@pytest.mark.source(
    "PunmiaIrrigation",
    "published; Ex. 12.8, p. 635: floor 50 m, both cutoffs 8 m, head 5 m, downstream floor 2 m thick",
)
def test_key_point_with_corrections_and_exit_gradient(agree: Agree) -> None:
    floor, depth = np.array([50.0]), np.array([8.0])
    upper, tip, _ = key_point_heads(floor, np.zeros(1), depth)[0]
    agree(upper, 0.3499, digits=4, what="share of head at E without corrections")
    thick = (upper - tip) / 8 * 2
    other = interference_correction(depth, depth, floor, floor)
    agree((upper - thick - other) * 5, printed("1.49"), what="head at E, m")
    gradient = exit_gradient_floor(np.array([5.0]), floor, depth)
    agree(gradient, printed("0.1"), what="exit gradient")


@pytest.mark.source(
    "Lane1935",
    "from memory, to be confirmed; cutoffs 1.5 m and 1.0 m, 4.5 m of floor, head 1.2 m, worked by hand",
)
def test_weighted_creep_ratio(agree: Agree) -> None:
    vertical = np.array([2 * 1.5 + 2 * 1.0])
    found = weighted_creep_ratio(vertical, np.array([4.5]), np.array([1.2]))
    agree(found, 5.417, digits=4, what="ratio")


@pytest.mark.source("EM2200", "from memory, to be confirmed; par. 3-3, H₃ = (1 − E)(H₁ − H₂)(L − x)/L + H₂")
@pytest.mark.parametrize("effectiveness", [0.0, 0.25, 0.5, 1.0])
def test_head_at_a_drain(agree: Agree, effectiveness: float) -> None:
    table = FLOOR | {
        "height": "20 m",
        "top_width": "15 m",
        "base_width": "15 m",
        "drain": {"position": "3 m", "effectiveness": effectiveness},
    }
    found = stable(table, 18.0, 2.0)
    expected = (1 - effectiveness) * (18 - 2) * (15 - 3) / 15 + 2
    for side in (-1e-9, 1e-9):
        agree(uplift_at(found, 3 + side) / 9810, expected, rel=1e-8, what=f"head at the drain {side:g}, m")


@pytest.mark.source("Terzaghi1943", "from memory, to be confirmed; i_c = γ′/γ_w = (G − 1)/(1 + e)")
def test_critical_gradient_from_grains(agree: Agree) -> None:
    water = np.array([9.81])
    submerged = (2.65 - 1) / (1 + 0.65) * water
    agree(critical_gradient(submerged, water), 1.0, rel=1e-12, what="critical gradient")
