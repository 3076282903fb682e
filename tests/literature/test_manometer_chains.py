"""Chains of fluids against worked examples of manometers, each with its source's own unit weights."""

from __future__ import annotations

import numpy as np
import pytest

from loads.arrays import FloatArray
from loads.manometer import Leg, pressure_change, rise_along
from tests.agreement import Agree, printed

FOOT = 0.3048
INCH = FOOT / 12
POUND = 0.45359237 * 9.80665
PCF = POUND / FOOT**3
PSI = POUND / INCH**2


def walk(*legs: tuple[float, float]) -> FloatArray:
    """Pressure at the end of legs of (unit weight, rise) less that at their start, in SI."""
    return pressure_change(
        [
            Leg(name=f"leg {number}", unit_weight=np.array([weight]), rise=np.array([rise]))
            for number, (weight, rise) in enumerate(legs, 1)
        ]
    ).total


@pytest.mark.source(
    "Munson", "published; Ex. 2.4, p. 52: tank of air over oil 0.90, mercury 13.6, water 62.4"
)
def test_u_tube_on_a_tank(agree: Agree) -> None:
    oil, mercury = 0.90 * 62.4 * PCF, 13.6 * 62.4 * PCF
    to_the_air = walk((oil, -36 * INCH), (oil, -6 * INCH), (mercury, 9 * INCH))
    agree(-to_the_air / PSI, printed("3.055"), what="pressure of the air in the tank, psi")


@pytest.mark.source("Munson", "published; Ex. 2.5, p. 53: 9.80 over 15.6 kN/m³, h₁ 1.0 m, h₂ 0.5 m")
def test_differential_across_a_nozzle(agree: Agree) -> None:
    a_to_b = walk((9800.0, 1.0), (15600.0, 0.5), (9800.0, -1.5))
    agree(-a_to_b / 1000, printed("2.90"), what="pA − pB, kPa")


@pytest.mark.source(
    "Fox", "published; Ex. 3.3, p. 62: water, mercury 13.6 and oil 0.88, five columns in inches"
)
def test_chain_of_five_columns(agree: Agree) -> None:
    water = 1.94 * 32.2 * PCF
    a_to_b = walk(
        (water, -10 * INCH),
        (13.6 * water, 3 * INCH),
        (0.88 * water, -4 * INCH),
        (13.6 * water, 5 * INCH),
        (water, 8 * INCH),
    )
    agree(-a_to_b / PSI, printed("3.73"), what="pA − pB, psi")


@pytest.mark.source("Subramanya", "published; Ex. 2.6, p. 23: oils 0.70 and 0.80, mercury 13.6, γ 9.79 kN/m³")
def test_differential_with_two_oils(agree: Agree) -> None:
    a_to_b = walk((0.70 * 9790, -0.31), (13.6 * 9790, 0.08), (0.80 * 9790, 0.13))
    agree(-a_to_b / 1000, printed("9.545"), what="pA − pB, kPa")


@pytest.mark.source("Douglas", "published; Ex. 2.7, p. 46: liquid 0.8 over mercury 13.6, γ 9.81 kN/m³")
@pytest.mark.parametrize(
    ("case", "liquid", "mercury", "pressure"), [("a", 0.5, 0.9, "116.15"), ("b", 0.1, -0.2, "-27.47")]
)
def test_u_tube_above_and_below_the_air(
    agree: Agree, case: str, liquid: float, mercury: float, pressure: str
) -> None:
    to_the_air = walk((0.8 * 9810, -liquid), (13.6 * 9810, mercury))
    agree(-to_the_air / 1000, printed(pressure), what=f"gauge pressure, case {case}, kPa")


@pytest.mark.source(
    "Douglas", "published; Ex. 2.8, p. 47: pipes 0.3 m apart in level, mercury 0.7 m, γ 9.81 kN/m³"
)
@pytest.mark.parametrize("down", [0.7, 1.0, 2.5])
def test_differential_between_pipes(agree: Agree, down: float) -> None:
    a_to_b = walk((9810.0, -down), (13.6 * 9810, 0.7), (9810.0, down - 0.7 + 0.3))
    agree(-a_to_b / 1000, printed("89.467"), what=f"pA − pB, {down} m down to the mercury, kPa")


@pytest.mark.source("SignRule", "common practice, no source; 1 m of water down and up again")
def test_down_adds_and_up_takes_off(agree: Agree) -> None:
    legs = [
        Leg(name="down", unit_weight=np.array([9810.0]), rise=np.array([-1.0])),
        Leg(name="up", unit_weight=np.array([9810.0]), rise=rise_along(np.array([2.0]), np.radians([30.0]))),
    ]
    found = pressure_change(legs)
    agree(found.by_leg[0, 0], 9810.0, rel=1e-12, what="1 m down, Pa")
    agree(found.by_leg[0, 1], -9810.0, rel=1e-12, what="2 m up along 30°, Pa")
    agree(found.total, 0.0, abs=1e-9, what="there and back, Pa")
    agree(found.rise, 0.0, abs=1e-12, what="rise, m")
