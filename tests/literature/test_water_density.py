"""Density of water against published tables and worked examples."""

from __future__ import annotations

import numpy as np
import pytest

from loads.arrays import FloatArray
from loads.density import (
    CONVENTIONAL_FRESH_UNIT_WEIGHT,
    CONVENTIONAL_SEA_UNIT_WEIGHT,
    fresh_water_density,
    muddy_water_density,
    sea_water_density,
)
from tests.agreement import Agree, printed

POUND_FORCE_PER_CUBIC_FOOT = 157.0874638462462
"""N/m³ for 1 lb/ft³, from the definitions of pound, foot and standard gravity."""


def kelvin(celsius: float, scale: int) -> FloatArray:
    """Temperature in kelvin for degrees Celsius of the scale of 1968 or 1990."""
    return np.array([celsius / (1.00024 if scale == 1968 else 1.0) + 273.15])


@pytest.mark.source("VSMOWTable", "published; table by temperature, taken on the 1968 scale")
@pytest.mark.parametrize(
    ("celsius", "density"),
    [
        (0, "999.842"),
        (4, "999.975"),
        (15, "999.103"),
        (20, "998.207"),
        (25, "997.048"),
        (37, "993.332"),
        (100, "958.366"),
    ],
)
def test_fresh_water(agree: Agree, celsius: float, density: str) -> None:
    agree(
        fresh_water_density(kelvin(celsius, 1968)),
        printed(density),
        abs=0.01,
        why="the greatest density is 999.972 kg/m³ in the equation, 999.975 in the table",
        what=f"density at {celsius} °C, kg/m³",
    )


@pytest.mark.source(
    "Kell1975", "published; erratum: 16.897850e-3 in quotations of the denominator, in place of 16.879850e-3"
)
def test_swapped_digits_of_a_quotation_are_not_ours(agree: Agree) -> None:
    ours = fresh_water_density(kelvin(20, 1968))
    swapped = ours * (1 + 16.879850e-3 * 20) / (1 + 16.897850e-3 * 20)
    agree(swapped, printed("997.936"), what="density at 20 °C by the misquoted equation, kg/m³")
    assert abs(ours.item() - 998.207) < 0.01


@pytest.mark.source("UNESCO44", "published; check values of the equation of state, p. 22, at zero pressure")
@pytest.mark.parametrize(
    ("salinity", "celsius", "density"),
    [(0, 0, "999.843"), (0, 30, "995.651"), (35, 0, "1028.11"), (35, 30, "1021.73")],
)
def test_sea_water(agree: Agree, salinity: float, celsius: float, density: str) -> None:
    agree(
        sea_water_density(kelvin(celsius, 1968), np.array([float(salinity)])),
        printed(density),
        what=f"density at S {salinity}, {celsius} °C, kg/m³",
    )


@pytest.mark.source("IAPWS95", "published; formulation at 0.101325 MPa, as run in an open library")
@pytest.mark.parametrize(("celsius", "density"), [(4, "999.975"), (20, "998.207"), (25, "997.048")])
@pytest.mark.parametrize("equation", ["fresh", "sea without salt"])
def test_reference_formulation(agree: Agree, equation: str, celsius: float, density: str) -> None:
    temperature = kelvin(celsius, 1990)
    found = (
        fresh_water_density(temperature)
        if equation == "fresh"
        else sea_water_density(temperature, np.array([0.0]))
    )
    agree(
        found,
        printed(density),
        abs=0.01,
        why="another formula than ours; such formulas differ by up to 3e-6",
        what=f"density, {equation}, at {celsius} °C, kg/m³",
    )


@pytest.mark.source(
    "MartinMcCutcheon1999", "published; table of unit weight by temperature, 9.81 times the density"
)
@pytest.mark.parametrize(
    ("celsius", "unit_weight"), [(5, "9810"), (10, "9807"), (20, "9793"), (30, "9768"), (40, "9734")]
)
def test_unit_weight_table(agree: Agree, celsius: float, unit_weight: str) -> None:
    agree(
        9.81 * fresh_water_density(kelvin(celsius, 1990)),
        printed(unit_weight),
        abs=0.8,
        why="half a printed unit, and 0.03 kg/m³ by which the table's older density formula is higher",
        what=f"unit weight at {celsius} °C, N/m³",
    )


@pytest.mark.source(
    "SuspensionBalance", "from memory, to be confirmed; 100 kg/m³ of grains of 2650 kg/m³ in water of 998.2"
)
def test_suspended_solids(agree: Agree) -> None:
    found = muddy_water_density(np.array([998.2]), np.array([100.0]), 2650.0)
    agree(found, printed("1060.5"), what="density of the mixture, kg/m³")


@pytest.mark.source(
    "Schaschke", "published; Ex. 1.6, p. 13: liquor 1270, crystals 2698 kg/m³, 22 kPa over 1.5 m"
)
def test_slurry_of_crystals(agree: Agree) -> None:
    concentration = 0.158 * 2698
    found = muddy_water_density(np.array([1270.0]), np.array([concentration]), 2698.0)
    agree(
        found,
        printed("1495.07"),
        abs=0.72,
        why="computed from the printed fraction 0.158, whose last half unit is 0.71 kg/m³",
        what="density of the slurry, kg/m³",
    )


@pytest.mark.source("FEMAP55", "published; legend of Eq. 8.6")
def test_conventional_sea_water(agree: Agree) -> None:
    found = CONVENTIONAL_SEA_UNIT_WEIGHT / POUND_FORCE_PER_CUBIC_FOOT
    agree(found, 64.0, rel=1e-12, what="unit weight of salt water, lb/ft³")


@pytest.mark.source("FreshUnitWeight", "common practice, no source")
def test_conventional_fresh_water(agree: Agree) -> None:
    found = CONVENTIONAL_FRESH_UNIT_WEIGHT / POUND_FORCE_PER_CUBIC_FOOT
    agree(found, 62.4, rel=1e-12, what="unit weight of fresh water, lb/ft³")
