"""The lower atmosphere against published tables and a worked example."""

from __future__ import annotations

import numpy as np
import pytest

from loads.arrays import FloatArray
from loads.atmosphere import (
    DRY_AIR_GAS_CONSTANT,
    LAPSE_RATE,
    ROUNDED_GAS_CONSTANT,
    STANDARD_SEA_LEVEL_PRESSURE,
    STANDARD_SEA_LEVEL_TEMPERATURE,
    WARM_SEA_LEVEL_TEMPERATURE,
    air_density,
    geopotential_height,
    pressure_ratio,
    station_pressure,
    temperature_at,
)
from loads.density import STANDARD_GRAVITY
from loads.limits_of_use import OutsideFormulaError
from tests.agreement import Agree, printed


def one(value: float) -> FloatArray:
    return np.array([value])


def standard_pressure(altitude: float) -> FloatArray:
    """Standard pressure at a geometric altitude. [Pa]."""
    return station_pressure(one(STANDARD_SEA_LEVEL_PRESSURE), geopotential_height(one(altitude)))


def standard_density(altitude: float) -> FloatArray:
    temperature = temperature_at(geopotential_height(one(altitude)))
    return air_density(standard_pressure(altitude), temperature)


US_1976 = [
    (0, "1.0132e5", "1.2250"),
    (2000, "7.9501e4", "1.0066"),
    (4000, "6.1660e4", "0.81935"),
    (6000, "4.7218e4", "0.66011"),
    (8000, "3.5652e4", "0.52579"),
    (10000, "2.6500e4", "0.41351"),
]


@pytest.mark.source("StandardAtmosphere1976", "published; table by geometric altitude, steps of 2 km")
@pytest.mark.parametrize(("altitude", "pressure", "density"), US_1976)
def test_table_of_1976(agree: Agree, altitude: int, pressure: str, density: str) -> None:
    expected = printed(pressure)
    if altitude == 0:
        agree(
            standard_pressure(0),
            expected,
            abs=5.0,
            why="the row prints 101 320 for 101 325, five digits",
            what="pressure at sea level, Pa",
        )
    else:
        agree(standard_pressure(altitude), expected, what=f"pressure at {altitude} m, Pa")
    agree(standard_density(altitude), printed(density), what=f"density at {altitude} m, kg/m³")


@pytest.mark.source("ICAOStandardAtmosphere", "published; table by geometric altitude")
@pytest.mark.parametrize(
    ("altitude", "temperature", "pressure", "density"),
    [(1000, "281.651", "8.98763e4", "1.11166"), (2000, "275.154", "7.95014e4", "1.00655")],
)
def test_icao_table(agree: Agree, altitude: int, temperature: str, pressure: str, density: str) -> None:
    found = temperature_at(geopotential_height(one(altitude)))
    agree(found, printed(temperature), what=f"temperature at {altitude} m, K")
    agree(standard_pressure(altitude), printed(pressure), what=f"pressure at {altitude} m, Pa")
    agree(standard_density(altitude), printed(density), what=f"density at {altitude} m, kg/m³")


@pytest.mark.source(
    "ICAOStandardAtmosphere",
    "published; the tables' rows above 10 km: 22 700 Pa at 11 km, 19 399 at 12 km, 14 170 at 14 km",
)
@pytest.mark.parametrize(("altitude", "pressure"), [(11000, 22699.9), (12000, 19399.0), (14000, 14170.0)])
def test_rows_above_ten_kilometres_are_refused_and_would_go_wrong(altitude: int, pressure: float) -> None:
    with pytest.raises(OutsideFormulaError, match="10 000 m"):
        standard_pressure(altitude)
    height = geopotential_height(one(altitude)).item()
    carried_on = (1 - LAPSE_RATE * height / STANDARD_SEA_LEVEL_TEMPERATURE) ** 5.255879812716677
    error = abs(carried_on * STANDARD_SEA_LEVEL_PRESSURE / pressure - 1)
    assert error < 1e-4 if altitude == 11000 else error > 1e-3


GAMMA, P0 = 0.076 * 157.0874638462462, 14.7 * 6894.757293168362
T0 = 288.15
DAUGHERTY_GAS_CONSTANT = P0 / (GAMMA / STANDARD_GRAVITY * T0)


def daugherty(lapse_rate: float) -> FloatArray:
    """Pressure at 20 000 ft in psi, air of 0.076 lb/ft³, 14.7 psi and 59 °F at sea level."""
    ratio = pressure_ratio(
        one(0.0), one(20000 * 0.3048), T0, lapse_rate=lapse_rate, gas_constant=DAUGHERTY_GAS_CONSTANT
    )
    return 14.7 * ratio


@pytest.mark.source("Daugherty", "published; Ex. 2.1, p. 24: 20 000 ft, constant density")
def test_air_of_constant_density(agree: Agree) -> None:
    found = daugherty(STANDARD_GRAVITY / DAUGHERTY_GAS_CONSTANT)
    agree(found, printed("4.14"), what="pressure by the lapse rate g/R, psi")
    agree(found, 14.7 - 0.076 * 20000 / 144, rel=1e-9, what="pressure p₀ − γ z, psi")


@pytest.mark.source("Daugherty", "published; Ex. 2.1, p. 24: 20 000 ft, constant temperature")
def test_air_of_constant_temperature(agree: Agree) -> None:
    found = daugherty(1e-7)
    agree(found, printed("7.17"), what="pressure by a lapse rate close to zero, psi")
    agree(found, 14.7 * np.exp(-0.076 * 20000 / (144 * 14.7)), rel=1e-6, what="pressure p₀ exp(−γ z/p₀), psi")


@pytest.mark.source("AtmospherePractice", "common practice, no source; exponent g/(R λ)")
def test_exponent(agree: Agree) -> None:
    rounded = 9.81 / (ROUNDED_GAS_CONSTANT * LAPSE_RATE)
    agree(rounded, printed("5.26"), what="9.81/(287 · 0.0065)")
    agree(rounded, printed("5.2586"), what="9.81/(287 · 0.0065), more digits")
    agree(STANDARD_GRAVITY / (DRY_AIR_GAS_CONSTANT * LAPSE_RATE), printed("5.26"), what="exponent used here")


@pytest.mark.source("AtmospherePractice", "common practice, no source; one mile up, 300 K and 288.15 K")
@pytest.mark.parametrize(
    ("temperature", "pressure"),
    [(WARM_SEA_LEVEL_TEMPERATURE, "84082.108"), (STANDARD_SEA_LEVEL_TEMPERATURE, "83427.577")],
)
def test_warm_and_standard_temperature(agree: Agree, temperature: float, pressure: str) -> None:
    found = station_pressure(one(STANDARD_SEA_LEVEL_PRESSURE), one(1609.344), temperature)
    agree(found, printed(pressure), what=f"pressure at 1609.344 m, {temperature} K at sea level, Pa")
