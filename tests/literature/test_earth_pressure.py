"""Coefficients of earth pressure, and what follows from them in one line, against worked examples."""

from __future__ import annotations

import math

import numpy as np
import pytest

from loads.arrays import FloatArray
from loads.earth_pressure import (
    active_coefficient_rankine,
    at_rest_coefficient_overconsolidated,
    passive_coefficient_rankine,
    tension_depth,
)
from loads.earth_pressure_coulomb import active_coefficient_coulomb
from tests.agreement import Agree, printed


def degrees(angle: float) -> FloatArray:
    return np.radians([angle])


@pytest.mark.source(
    "DasGeotechnical",
    "published; Ex. 13.1, p. 430: at rest, φ′ 30°, OCR 2, 10 ft of 100 lb/ft³ over 5 ft of 122.4 under water",
)
def test_at_rest_thrust_of_overconsolidated_sand(agree: Agree) -> None:
    K = at_rest_coefficient_overconsolidated(degrees(30), np.array([2.0])).item()
    upper, rise, water = K * 100 * 10, K * (122.4 - 62.4) * 5, 62.4 * 5
    forces = np.array([upper * 10 / 2, upper * 5, rise * 5 / 2, water * 5 / 2])
    arms = np.array([5 + 10 / 3, 5 / 2, 5 / 3, 5 / 3])
    agree(forces @ arms / forces.sum(), printed("4.8"), what="height of the resultant, ft")


@pytest.mark.source("DasGeotechnical", "published; Ex. 13.2, p. 449: Rankine, φ′ 36°, 16 kN/m³, 6 m")
def test_rankine_thrusts(agree: Agree) -> None:
    weight = 16 * 6**2 / 2
    agree(
        weight * active_coefficient_rankine(degrees(36)), printed("74.8"), what="active thrust, kN per metre"
    )
    agree(
        weight * passive_coefficient_rankine(degrees(36)),
        printed("1109.2"),
        abs=0.2,
        why="the companion notebook takes 57.3 degrees to the radian, which is 0.01 %",
        what="passive thrust, kN per metre",
    )


@pytest.mark.source(
    "DasGeotechnical", "published; Ex. 13.5, p. 453: clay, φ 0°, cohesion 10 kPa, 16.5 kN/m³, 6 m"
)
def test_clay_before_and_after_the_tension_crack(agree: Agree) -> None:
    K = active_coefficient_rankine(degrees(0))
    crack = tension_depth(np.array([10.0]), np.array([16.5]), K)
    with_tension = K * 16.5 * 6**2 / 2 - 2 * 10 * np.sqrt(K) * 6
    agree(with_tension, printed("177"), what="thrust before the crack, kN per metre")
    agree(K * 16.5 * (6 - crack) ** 2 / 2, printed("189.1"), what="thrust after the crack, kN per metre")


@pytest.mark.source(
    "DasGeotechnical",
    "published; Ex. 13.6, p. 457: φ′ 20°, cohesion 250 lb/ft², 118 lb/ft³, ground at 10°, 15 ft, table K 0.3",
)
def test_cohesive_soil_under_sloping_ground(agree: Agree) -> None:
    K = active_coefficient_rankine(degrees(20))
    crack = tension_depth(np.array([250.0]), np.array([118.0]), K)
    foot = 118 * 15 * 0.3 * math.cos(math.radians(10))
    agree(
        (15 - crack) * foot / 2,
        printed("2339.8"),
        abs=0.1,
        why="the companion notebook takes 57.3 degrees to the radian",
        what="thrust after the crack, lb/ft",
    )


@pytest.mark.source(
    "DasGeotechnical",
    "published; Ex. 13.7, p. 459: Coulomb, φ′ 30°, wall friction 15°, ground 10°, 15 kN/m³, 4 m; the lean of "
    "the face, 5°, is not in the companion notebook and was found from the printed coefficient",
)
def test_coulomb_thrust_behind_a_leaning_face(agree: Agree) -> None:
    K = active_coefficient_coulomb(degrees(30), degrees(15), degrees(10), degrees(5))
    agree(K, printed("0.3872"), what="active coefficient")
    agree(K * 15 * 4**2 / 2, printed("46.5"), what="active thrust, kN per metre")


@pytest.mark.source(
    "DasFoundation", "published; Ex. 7.2, p. 321: φ′ 26°, cohesion 14.36 kPa, 17.4 kN/m³, 6 m"
)
def test_soil_with_cohesion_and_friction(agree: Agree) -> None:
    K = active_coefficient_rankine(degrees(26))
    crack = tension_depth(np.array([14.36]), np.array([17.4]), K)
    with_tension = K * 17.4 * 6**2 / 2 - 2 * 14.36 * np.sqrt(K) * 6
    foot = K * 17.4 * 6 - 2 * 14.36 * np.sqrt(K)
    agree(with_tension, printed("14.62"), what="thrust before the crack, kN per metre")
    agree(crack, printed("2.64"), what="depth of the crack, m")
    agree((6 - crack) * foot / 2, printed("38.32"), what="thrust after the crack, kN per metre")


@pytest.mark.source(
    "DasFoundation",
    "published; Ex. 7.7, p. 342: φ′ 30° over φ′ 26° with cohesion 10 kPa, saturated 18.86 kN/m³ below 2 m; "
    "the 15.72 kN/m³ above follows from the first printed pressure",
)
def test_passive_pressure_of_two_layers(agree: Agree) -> None:
    upper, lower = passive_coefficient_rankine(degrees(30)), passive_coefficient_rankine(degrees(26))
    stress = 15.72 * 2
    cohesion = 2 * 10 * np.sqrt(lower)
    agree(upper * stress, printed("94.32"), what="pressure at 2 m, upper layer, kPa")
    agree(lower * stress + cohesion, printed("112.53"), what="pressure at 2 m, lower layer, kPa")
    below = stress + (18.86 - 9.81) * 1
    agree(lower * below + cohesion, printed("135.7"), what="pressure at 3 m, kPa")


@pytest.mark.source(
    "DasFoundation",
    "published; Ex. 7.4, p. 326: Coulomb, 16.5 kN/m³, 4.6 m; the angles (φ′ 30°, wall friction two thirds of "
    "it) are from memory, to be confirmed",
)
def test_coulomb_thrust_on_a_rough_vertical_face(agree: Agree) -> None:
    K = active_coefficient_coulomb(degrees(30), degrees(20))
    agree(K, printed("0.297"), what="active coefficient")
    agree(
        K * 16.5 * 4.6**2 / 2,
        printed("51.85"),
        abs=0.09,
        why="printed from the coefficient rounded to 0.297",
        what="active thrust, kN per metre",
    )
