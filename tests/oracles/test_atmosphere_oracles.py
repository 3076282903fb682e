"""The lower atmosphere against open libraries and an integration of the equation of still air."""

from __future__ import annotations

import numpy as np
import pytest
from ambiance import Atmosphere
from fluids.atmosphere import ATMOSPHERE_1976
from scipy.integrate import solve_ivp

from loads.arrays import FloatArray
from loads.atmosphere import (
    DRY_AIR_GAS_CONSTANT,
    LAPSE_RATE,
    air_density,
    geometric_altitude,
    geopotential_height,
    sea_level_pressure,
    station_pressure,
    temperature_at,
)
from loads.density import STANDARD_GRAVITY
from tests.agreement import Agree

P0 = 101325.0

CLOSED_FORM = {
    0: (288.150000, 101325.000000, 1.22500002, 101325.000000, 300.0, 1.17661252),
    250: (286.525000, 98357.534016, 1.19586792, 98473.397885, 298.375, 1.14972665),
    500: (284.900000, 95460.835337, 1.16726883, 95687.130404, 296.75, 1.12331332),
    1000: (281.650000, 89874.562916, 1.11164250, 90306.007857, 293.5, 1.07188118),
    1609.344: (277.689264, 83427.576759, 1.04661908, 84082.108144, 289.5393, 1.01165919),
    3000: (268.650000, 70108.526496, 0.90912186, 71171.471843, 280.5, 0.88391639),
    5000: (255.650000, 54019.888188, 0.73611555, 55460.924372, 267.5, 0.72227307),
    8000: (236.150000, 35599.785213, 0.52516713, 37257.633636, 248.0, 0.52336141),
    10000: (223.150000, 26436.242593, 0.41270615, 28074.545099, 235.0, 0.41618169),
}
"""By geopotential height: T, p, ρ for 288.15 K at sea level; p, T, ρ for 300 K."""

LIBRARIES = {
    0: ((101325.0000, 1.22499916), (101325.0000, 288.150000, 1.22500002)),
    250: ((98357.6514, 1.19586824), (98357.6493, 286.525064, 1.19586906)),
    500: ((95461.2895, 1.16727251), (95461.2855, 284.900256, 1.16727328)),
    1000: ((89876.2852, 1.11165899), (89876.2776, 281.651022, 1.11165967)),
    1609.344: ((83431.7691, 1.04666095), (83431.7577, 277.691912, 1.04666155)),
    3000: ((70121.1622, 0.90925394), (70121.1441, 268.659198, 0.90925435)),
    5000: ((54048.2861, 0.73642842), (54048.2622, 255.675543, 0.73642861)),
    8000: ((35651.6283, 0.52578602), (35651.6021, 236.215360, 0.52578601)),
    10000: ((26499.8981, 0.41351043), (26499.8731, 223.252093, 0.41351033)),
}
"""By geometric altitude: p, ρ of fluids 1.3.1; p, T, ρ of ambiance 1.3.1, as they came out when tabulated."""

HOT_DAY_DENSITY = {
    0: 1.17661252,
    250: 1.14837388,
    500: 1.12065675,
    1000: 1.06676017,
    1609.344: 1.00378400,
    3000: 0.87071511,
}


def one(value: float) -> FloatArray:
    return np.array([float(value)])


@pytest.mark.source("StandardAtmosphere1976", "published; closed form tabulated from its constants")
@pytest.mark.parametrize("height", CLOSED_FORM)
def test_closed_form(agree: Agree, height: float) -> None:
    T, p, rho, p_warm, T_warm, rho_warm = CLOSED_FORM[height]
    H = one(height)
    for sea, temperature, pressure, density in ((288.15, T, p, rho), (300.0, T_warm, p_warm, rho_warm)):
        found_temperature = temperature_at(H, sea)
        found = station_pressure(one(P0), H, sea)
        where = f"H {height} m, {sea} K at sea level"
        agree(found_temperature, temperature, abs=5e-5, what=f"T, {where}, K")
        agree(found, pressure, abs=1e-6, what=f"p, {where}, Pa")
        agree(air_density(found, found_temperature), density, abs=5e-9, what=f"ρ, {where}, kg/m³")
        agree(sea_level_pressure(found, H, sea), P0, rel=1e-13, what=f"back to sea level, {where}, Pa")


@pytest.mark.source(
    "StandardAtmosphere1976", "published; library fluids at geometric altitude, and its table"
)
@pytest.mark.parametrize("altitude", LIBRARIES)
def test_against_fluids(agree: Agree, altitude: float) -> None:
    library = ATMOSPHERE_1976(float(altitude))
    table = LIBRARIES[altitude][0]
    agree(library.P, table[0], abs=1e-4, what="library against its own table, Pa")
    agree(library.rho, table[1], abs=1e-8, what="library against its own table, kg/m³")
    H = geopotential_height(one(altitude))
    pressure = station_pressure(one(P0), H)
    agree(pressure, library.P, rel=1e-6, what=f"p at {altitude} m, Pa")
    agree(air_density(pressure, temperature_at(H)), library.rho, rel=1e-6, what=f"ρ at {altitude} m, kg/m³")


@pytest.mark.source(
    "ICAOStandardAtmosphere", "published; library ambiance at geometric altitude, and its table"
)
@pytest.mark.parametrize("altitude", LIBRARIES)
def test_against_ambiance(agree: Agree, altitude: float) -> None:
    library = Atmosphere(float(altitude))
    H = geopotential_height(one(altitude))
    T, p = temperature_at(H), station_pressure(one(P0), H)
    found = {"pressure": p, "temperature": T, "density": air_density(p, T)}
    for (name, value), table in zip(found.items(), LIBRARIES[altitude][1], strict=True):
        expected = float(getattr(library, name)[0])
        agree(expected, table, rel=1e-8, what=f"library against its own table, {name}")
        agree(value, expected, rel=1e-9, what=f"{name} at {altitude} m")


@pytest.mark.source(
    "ICAOStandardAtmosphere", "published; library ambiance, what altitude in place of height costs"
)
@pytest.mark.parametrize(("altitude", "error"), [(1000, 1.7), (10000, 64.0)])
def test_altitude_is_not_height(agree: Agree, altitude: int, error: float) -> None:
    wrong = station_pressure(one(P0), one(altitude))
    agree(
        Atmosphere(float(altitude)).pressure[0] - wrong.item(),
        error,
        digits=2,
        what=f"pressure lost at {altitude} m, Pa",
    )
    fed_back = float(Atmosphere(geometric_altitude(one(altitude)).item()).pressure[0])
    agree(wrong, fed_back, rel=1e-9, what=f"p at the height {altitude} m, Pa")


@pytest.mark.parametrize("sea", [288.15, 300.0])
def test_equation_of_still_air_integrated(agree: Agree, sea: float) -> None:
    def gradient(height: float, pressure: FloatArray) -> FloatArray:
        return -pressure * STANDARD_GRAVITY / (DRY_AIR_GAS_CONSTANT * (sea - LAPSE_RATE * height))

    heights = np.array([250.0, 1609.344, 5000.0, 10000.0])
    solved = solve_ivp(gradient, (0.0, 10000.0), [P0], method="DOP853", t_eval=heights, rtol=1e-13, atol=1e-9)
    found = station_pressure(np.full(4, P0), heights, sea)
    for height, value, expected in zip(heights, found, solved.y[0], strict=True):
        agree(value, expected, rel=1e-9, what=f"p at H {height} m, {sea} K, Pa")


@pytest.mark.source(
    "StandardAtmosphere1976", "published; standard pressure with the air 11.85 K warmer at each height"
)
@pytest.mark.parametrize("height", HOT_DAY_DENSITY)
def test_hot_day_at_standard_pressure(agree: Agree, height: float) -> None:
    H = one(height)
    found = air_density(station_pressure(one(P0), H), temperature_at(H) + 11.85)
    agree(found, HOT_DAY_DENSITY[height], abs=6e-9, what=f"ρ at H {height} m, kg/m³")
    if height:
        column_of_warm_air = air_density(station_pressure(one(P0), H, 300.0), temperature_at(H, 300.0))
        assert column_of_warm_air.item() > found.item()
