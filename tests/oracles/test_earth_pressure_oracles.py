"""Earth pressure coefficients against a search over trial wedges, which knows only the balance of forces."""

from __future__ import annotations

import math

import numpy as np
import pytest
from scipy.optimize import minimize_scalar

from loads.arrays import FloatArray
from loads.earth_pressure import (
    active_coefficient_rankine,
    at_rest_coefficient_jaky,
    at_rest_coefficient_overconsolidated,
    passive_coefficient_rankine,
)
from loads.earth_pressure_coulomb import active_coefficient_coulomb, passive_coefficient_coulomb
from tests.agreement import Agree, printed

WEDGE = "published; balance of forces on a plane wedge, greatest or least thrust sought by trial"

ACTIVE = [
    ((30, 0, 0, 0), "0.33333333", 60.000),
    ((30, 20, 0, 0), "0.29731386", 55.984),
    ((35, 17.5, 0, 0), "0.24612295", 59.738),
    ((32, 16, 10, 0), "0.31453563", 55.445),
    ((30, 20, 15, 0), "0.37067775", 51.101),
    ((33, 22, 10, 10), "0.39530932", 58.123),
    ((36, 24, 0, 15), "0.36150370", 64.610),
    ((28, 15, 5, -8), "0.28917767", 51.099),
    ((34, 17, -10, 0), "0.23278270", 60.922),
    ((40, 20, 20, 5), "0.29821510", 60.284),
]
PASSIVE = [
    ((30, 0, 0, 0), "3.00000000", 30.000),
    ((30, 10, 0, 0), "4.14329951", 23.427),
    ((30, 15, 0, 0), "4.97650022", 20.654),
    ((35, 11.6667, 0, 0), "5.68019831", 20.435),
    ((32, 16, 5, 0), "7.46412592", 22.661),
    ((28, 14, -5, 0), "3.48841636", 17.871),
    ((33, 11, 0, 5), "4.31067223", 23.852),
    ((26, 13, 0, 0), "3.78698967", 23.214),
    ((35, 17.5, -10, 0), "4.34240640", 10.016),
    ((30, 15, 0, -10), "7.31372503", 16.312),
]


def thrust(slip: FloatArray, angles: tuple[float, ...], sense: int) -> FloatArray:
    """Thrust of the wedge above a plane at angle `slip`, unit weight and height one; nan where none holds.

    `sense` is 1 for a wedge that slides down, −1 for one pushed up.
    """
    phi, delta, beta, eta = np.radians(angles)
    crest_x, crest_y = -math.tan(eta), 1.0
    reach = (crest_y - crest_x * math.tan(beta)) / (np.sin(slip) - np.cos(slip) * math.tan(beta))
    x, y = reach * np.cos(slip), reach * np.sin(slip)
    weight = np.abs(crest_x * y - crest_y * x) / 2
    wall = (math.cos(eta + sense * delta), math.sin(eta + sense * delta))
    plane = (-np.sin(slip - sense * phi), np.cos(slip - sense * phi))
    determinant = wall[0] * plane[1] - wall[1] * plane[0]
    push, bearing = -plane[0] * weight / determinant, wall[0] * weight / determinant
    holds = (push > 0) & (bearing > 0) & (reach > 0) & (x > crest_x)
    return np.where(holds, push, np.nan)


def trial_wedge(angles: tuple[float, ...], sense: int) -> tuple[float, float]:
    """Search for coefficient and slip angle in degrees."""
    lowest = max(math.radians(angles[2]), 0.0) + 1e-4
    highest = math.pi / 2 + (max(math.radians(angles[3]), 0.0) if sense == 1 else 0.0) - 1e-4
    slips = np.linspace(lowest, highest, 2001)
    pushes = thrust(slips, angles, sense)
    best = int(np.nanargmax(pushes) if sense == 1 else np.nanargmin(pushes))
    found = minimize_scalar(
        lambda slip: -sense * float(thrust(np.array([slip]), angles, sense)[0]),
        bounds=(slips[best - 1], slips[best + 1]),
        method="bounded",
        options={"xatol": 1e-12},
    )
    return 2 * -sense * float(found.fun), math.degrees(found.x)


def radians(angles: tuple[float, ...]) -> list[FloatArray]:
    return [np.radians([angle]) for angle in angles]


@pytest.mark.source("Coulomb1776", WEDGE)
@pytest.mark.parametrize(("angles", "coefficient", "slip"), ACTIVE)
def test_active_wedge(agree: Agree, angles: tuple[float, ...], coefficient: str, slip: float) -> None:
    found = active_coefficient_coulomb(*radians(angles))
    searched, plane = trial_wedge(angles, 1)
    agree(found, searched, rel=1e-9, what="active coefficient against the search")
    agree(found, printed(coefficient), what="active coefficient against the table")
    agree(plane, slip, abs=1e-3, what="angle of the slip plane found by the search, degrees")


@pytest.mark.source("Coulomb1776", WEDGE)
@pytest.mark.parametrize(("angles", "coefficient", "slip"), PASSIVE)
def test_passive_wedge(agree: Agree, angles: tuple[float, ...], coefficient: str, slip: float) -> None:
    found = passive_coefficient_coulomb(*radians(angles))
    searched, plane = trial_wedge(angles, -1)
    agree(found, searched, rel=1e-9, what="passive coefficient against the search")
    agree(found, printed(coefficient), what="passive coefficient against the table")
    agree(plane, slip, abs=1e-3, what="angle of the slip plane found by the search, degrees")


@pytest.mark.source("Rankine1857", "published; thrust parallel to the ground, and " + WEDGE)
@pytest.mark.parametrize(
    ("friction_angle", "slope", "active", "passive"),
    [
        (30, 10, "0.34951983", "2.77479621"),
        (35, 15, "0.29678961", "3.14368385"),
        (30, 20, "0.41420533", "2.13184657"),
    ],
)
def test_rankine_under_sloping_ground(
    agree: Agree, friction_angle: float, slope: float, active: str, passive: str
) -> None:
    phi, beta = radians((friction_angle, slope))
    found = active_coefficient_rankine(phi, beta)
    agree(found, printed(active), what="active coefficient")
    agree(passive_coefficient_rankine(phi, beta), printed(passive), what="passive coefficient")
    searched, _ = trial_wedge((friction_angle, slope, slope, 0), 1)
    agree(found, searched, rel=1e-9, what="active coefficient against the search")


@pytest.mark.source("Jaky1944", "published; 1 − sin φ′ as tabulated by an open soil mechanics library")
@pytest.mark.parametrize(
    ("friction_angle", "coefficient"),
    [(28, "0.53052844"), (30, "0.5"), (32, "0.47008074"), (35, "0.42642356")],
)
def test_at_rest(agree: Agree, friction_angle: float, coefficient: str) -> None:
    phi = np.radians([float(friction_angle)])
    expected = printed(coefficient)
    once = np.array([1.0])
    agree(at_rest_coefficient_jaky(phi), expected.value, abs=5e-9, what="at rest")
    agree(at_rest_coefficient_overconsolidated(phi, once), expected.value, abs=5e-9, what="at rest, OCR 1")


@pytest.mark.source("MayneKulhawy1982", "published; as tabulated by an open soil mechanics library")
@pytest.mark.parametrize(("ratio", "coefficient"), [(2.0, "0.70710678"), (4.0, "1.00000000")])
def test_at_rest_overconsolidated(agree: Agree, ratio: float, coefficient: str) -> None:
    found = at_rest_coefficient_overconsolidated(np.radians([30.0]), np.array([ratio]))
    agree(found, printed(coefficient), what=f"at rest, OCR {ratio:g}")
