"""The chains that the weight of air and gas enters: the sealed logger with its barometer, and the bubbler."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from loads.arrays import FloatArray
from loads.atmosphere import (
    LAPSE_RATE,
    STANDARD_SEA_LEVEL_PRESSURE,
    STANDARD_SEA_LEVEL_TEMPERATURE,
    air_density,
    geopotential_height,
    pressure_ratio,
    station_pressure,
)
from loads.density import STANDARD_GRAVITY
from loads.reading_chain import Values
from loads.reading_links import (
    HABIT,
    STANDARD,
    Links,
    Series,
    assumed,
    computed,
    entered,
    less_zero,
    shown_links,
)
from loads.records.reading import Reading

_NOT_ENTERED = f"not entered; standard at sea level {STANDARD}"


def sealed_links(reading: Reading, series: Series) -> Links:
    """Links to the pressure of the water on a sensor that shows the absolute pressure."""
    shows = reading.barometer_shows or "station pressure"
    return [
        *shown_links(reading, series, "Absolute pressure, as shown"),
        entered("barometer", "p_b", f"Barometer, {shows}", reading.barometer, series.barometer),
        *_air_links(reading),
        computed(
            "water_pressure",
            "p",
            "Pressure of the water",
            "pressure",
            source=f"p = P − P₀ − p_a {HABIT}",
            formula=lambda v: less_zero(v) - v["air_pressure"],
        ),
    ]


def _air_links(reading: Reading) -> Links:
    at_sea_level = reading.barometer_shows == "sea-level pressure"
    meaning = "Air pressure over the water"
    if not at_sea_level and reading.barometer_altitude is None:
        source = "p_a = p_b, the barometer taken to hang at the water's altitude"
        return [
            computed(
                "air_pressure", "p_a", meaning, "pressure", source=source, formula=lambda v: v["barometer"]
            )
        ]
    return _from_sea_level(reading, meaning) if at_sea_level else _from_barometer(reading, meaning)


def _from_sea_level(reading: Reading, meaning: str) -> Links:
    return [
        *_height("site_altitude", "H", "the water", reading),
        *_sea_level_temperature(reading, "site_altitude_height"),
        computed(
            "air_pressure",
            "p_a",
            meaning,
            "pressure",
            source=f"p_a = p_b (T/T₀)ⁿ, T = T₀ − λ H, n = 5.25588 {STANDARD}",
            formula=lambda v: station_pressure(
                v["barometer"], v["site_altitude_height"], v["sea_level_temperature"]
            ),
        ),
    ]


def _from_barometer(reading: Reading, meaning: str) -> Links:
    return [
        *_height("site_altitude", "H", "the water", reading),
        *_height("barometer_altitude", "H_b", "the barometer", reading),
        *_sea_level_temperature(reading, "barometer_altitude_height"),
        computed(
            "pressure_ratio",
            "p_a/p_b",
            "Air pressure over the water over that at the barometer",
            "number",
            source=f"(T/T_b)ⁿ, T = T₀ − λ H, n = 5.25588 {STANDARD}",
            formula=lambda v: pressure_ratio(
                v["barometer_altitude_height"], v["site_altitude_height"], v["sea_level_temperature"]
            ),
        ),
        computed(
            "air_pressure",
            "p_a",
            meaning,
            "pressure",
            source="p_a = p_b · (p_a/p_b)",
            formula=lambda v: v["barometer"] * v["pressure_ratio"],
        ),
    ]


def _height(name: str, symbol: str, place: str, reading: Reading) -> Links:
    return [
        entered(
            name, symbol.replace("H", "z"), f"Altitude of {place} above sea level", getattr(reading, name)
        ),
        computed(
            f"{name}_height",
            symbol,
            f"Geopotential height of {place}",
            "length",
            source=f"r z/(r + z), r 6 356 766 m {STANDARD}",
            formula=lambda v: geopotential_height(v[name]),
        ),
    ]


def _sea_level_temperature(reading: Reading, height: str) -> Links:
    meaning = "Temperature of the air at sea level"
    if reading.air_temperature is not None:
        place = "site" if height.startswith("site") else "barometer"
        return [
            entered("air_temperature", "T_m", f"Air temperature at the {place}", reading.air_temperature),
            computed(
                "sea_level_temperature",
                "T₀",
                meaning,
                "temperature",
                source=f"T₀ = T_m + λ H, λ 6.5 K/km {STANDARD}",
                formula=lambda v: v["air_temperature"] + LAPSE_RATE * v[height],
            ),
        ]
    if reading.sea_level_temperature is not None:
        return [entered("sea_level_temperature", "T₀", meaning, reading.sea_level_temperature)]
    kelvin = STANDARD_SEA_LEVEL_TEMPERATURE
    return [assumed("sea_level_temperature", "T₀", meaning, "temperature", kelvin, source=_NOT_ENTERED)]


def bubbler_links(reading: Reading, series: Series) -> Links:
    """Links to the pressure at a bubbler's orifice, with the gas in its line counted when asked for."""
    if reading.instrument_elevation is None:
        source = f"p = P − P₀ {HABIT}; the weight of the gas in the line is not counted"
        return [
            *shown_links(reading, series, "Pressure above the air's, as shown"),
            computed(
                "water_pressure", "p", "Pressure of the water", "pressure", source=source, formula=less_zero
            ),
        ]
    return [
        *shown_links(reading, series, "Pressure above the air's, as shown"),
        entered("instrument_elevation", "zᵢ", "Elevation of the instrument", reading.instrument_elevation),
        entered("sensor_elevation", "zₛ", "Elevation of the orifice", reading.sensor_elevation),
        *_gas_links(reading, series),
        computed(
            "gas_column",
            "Δp_g",
            "Weight of the gas in the line",
            "pressure",
            source=f"ρ_g g (zᵢ − zₛ) {HABIT}",
            formula=_column_of("gas_density"),
        ),
        computed(
            "air_column",
            "Δp_a",
            "Weight of the air outside over the same height",
            "pressure",
            source=f"ρ_a g (zᵢ − zₛ) {HABIT}",
            formula=_column_of("air_density"),
        ),
        computed(
            "water_pressure",
            "p",
            "Pressure at the orifice, less that of air reaching as deep",
            "pressure",
            source=f"p = P − P₀ + Δp_g − Δp_a {HABIT}",
            formula=lambda v: less_zero(v) + v["gas_column"] - v["air_column"],
        ),
    ]


def _column_of(density: str) -> Callable[[Values], FloatArray]:
    def weight(values: Values) -> FloatArray:
        height = values["instrument_elevation"] - values["sensor_elevation"]
        return np.asarray(values[density] * STANDARD_GRAVITY * height, dtype=np.float64)

    return weight


def _gas_links(reading: Reading, series: Series) -> Links:
    links: Links = []
    if reading.gas_density is None or reading.air_density is None:
        links += _gas_state(reading, series)
    for name, symbol, meaning in (
        ("gas_density", "ρ_g", "Density of the gas in the line"),
        ("air_density", "ρ_a", "Density of the air outside"),
    ):
        quantity = getattr(reading, name)
        if quantity is not None:
            links.append(entered(name, symbol, meaning, quantity))
            continue
        source = f"gas law for dry air, ρ = p/(R T) {STANDARD}"
        formula = _gas_density if name == "gas_density" else _outside_density
        links.append(computed(name, symbol, meaning, "density", source=source, formula=formula))
    return links


def _gas_density(values: Values) -> FloatArray:
    return air_density(values["barometer"] + less_zero(values), values["gas_temperature"])


def _outside_density(values: Values) -> FloatArray:
    return air_density(values["barometer"], values["gas_temperature"])


def _gas_state(reading: Reading, series: Series) -> Links:
    pressure, temperature = "Air pressure at the instrument", "Temperature of gas and air"
    kelvin = STANDARD_SEA_LEVEL_TEMPERATURE
    return [
        entered("barometer", "p_b", pressure, reading.barometer, series.barometer)
        if reading.barometer is not None
        else assumed(
            "barometer", "p_b", pressure, "pressure", STANDARD_SEA_LEVEL_PRESSURE, source=_NOT_ENTERED
        ),
        entered("gas_temperature", "T_g", temperature, reading.gas_temperature)
        if reading.gas_temperature is not None
        else assumed("gas_temperature", "T_g", temperature, "temperature", kelvin, source=_NOT_ENTERED),
    ]
