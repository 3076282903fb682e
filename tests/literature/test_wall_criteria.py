"""Criteria as data and the friction table against their documents."""

from __future__ import annotations

import math

import numpy as np
import pytest

from loads.wall.base_pressure import base_pressure
from loads.wall.bearing import bearing_factors_meyerhof
from loads.wall.criteria import CATEGORIES, CRITERIA
from loads.wall.friction_table import BASE_FRICTION, BASE_FRICTION_ANGLES_DEGREES
from loads.wall.seepage import LANE_RATIOS
from tests.agreement import Agree, printed


@pytest.mark.source("EM2100", "from memory, to be confirmed; tables 3-2 to 3-5")
@pytest.mark.parametrize(
    ("key", "sliding"),
    [
        ("critical well defined", (1.7, 1.3, 1.1)),
        ("critical ordinary", (2.0, 1.7, 1.3)),
        ("normal well defined", (1.4, 1.2, 1.1)),
        ("normal ordinary", (1.5, 1.3, 1.1)),
    ],
)
def test_manual_of_2005(key: str, sliding: tuple[float, ...]) -> None:
    found = CRITERIA[f"EM 1110-2-2100 {key}"]
    assert tuple(found.sliding[name] for name in CATEGORIES) == sliding
    assert tuple(found.compression[name] for name in CATEGORIES) == (100, 75, 0)
    assert tuple(found.flotation[name] for name in CATEGORIES) == (1.3, 1.2, 1.1)
    assert "to be confirmed" in found.words
    assert "1 December 2005" in found.words


@pytest.mark.source("EM2502", "from memory, to be confirmed; sliding 1.5 and 1.33 as quoted, edition of 1989")
def test_manual_of_1989() -> None:
    found = CRITERIA["EM 1110-2-2502 1989 inland"]
    assert found.sliding == {"usual": 1.5, "unusual": 1.33}
    assert found.bearing == {"usual": 3.0, "unusual": 2.0}


@pytest.mark.source("EM2200", "from memory, to be confirmed; table 4-1; 1.7 unusual also as quoted")
def test_gravity_dam_manual() -> None:
    assert CRITERIA["EM 1110-2-2200 1995"].sliding == {"usual": 2.0, "unusual": 1.7, "extreme": 1.3}


@pytest.mark.source("EM2100", "from memory, to be confirmed; table 3-5: 75 % in compression is e/B = 1/4")
def test_compressed_share_and_eccentricity(agree: Agree) -> None:
    for off, share in ((1 / 6, 1.0), (0.25, 0.75), (0.5, 0.0)):
        found = base_pressure(np.ones(1), np.array([-(0.5 - off)]), np.ones(1))
        agree(found.compressed, share, abs=1e-12, what=f"compressed share at e/B = {off:.4f}")


@pytest.mark.source(
    "NAVFACDM7", "published; chapter 3, table 1: factors and angles of mass concrete on ground"
)
def test_friction_factors_and_their_angles(agree: Agree) -> None:
    assert list(BASE_FRICTION_ANGLES_DEGREES) == list(BASE_FRICTION)[:5]
    why = "both columns of the table are rounded"
    for material, angles in BASE_FRICTION_ANGLES_DEGREES.items():
        for angle, factor in zip(angles, BASE_FRICTION[material], strict=True):
            tangent = math.tan(math.radians(angle))
            agree(tangent, printed(f"{factor:.2f}"), abs=0.0061, why=why, what=f"tan {angle:g}°, {material}")


@pytest.mark.source("NAVFACDM7", "published; chapter 3, table 1: ranges without angles")
def test_friction_of_clay() -> None:
    assert BASE_FRICTION["very stiff and hard residual or preconsolidated clay"] == (0.40, 0.50)
    assert BASE_FRICTION["medium stiff and stiff clay and silty clay"] == (0.30, 0.35)


@pytest.mark.source("Lane1935", "from memory, to be confirmed; table of least weighted creep ratios")
def test_creep_table() -> None:
    assert list(LANE_RATIOS.values()) == [8.5, 7.0, 6.0, 5.0, 4.0, 3.5, 3.0, 2.5, 3.0, 2.0, 1.8, 1.6]


@pytest.mark.source("Meyerhof1963", "from memory, to be confirmed; factors at 30°: 30.1, 18.4, 15.7")
def test_bearing_factors(agree: Agree) -> None:
    factors = bearing_factors_meyerhof(np.radians([30.0]))
    for name, found, text in zip(("N_c", "N_q", "N_γ"), factors, ("30.1", "18.4", "15.7"), strict=True):
        agree(found, printed(text), what=name)
