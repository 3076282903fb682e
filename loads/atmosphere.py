"""The lower atmosphere with a constant lapse rate, and the density of dry air.

Station pressure is what a barometer shows where it hangs. Sea-level pressure is the same carried down to sea
level, as weather services publish it; it is never the pressure at the station.
"""

from __future__ import annotations

from typing import Final

import numpy as np

from loads.arrays import FloatArray
from loads.density import STANDARD_GRAVITY
from loads.limits_of_use import LimitOfUse, outside, refuse_unless

STANDARD_SEA_LEVEL_PRESSURE: Final = 101325.0
"""Pressure of the standard atmosphere at sea level [StandardAtmosphere1976]. [Pa]"""

STANDARD_SEA_LEVEL_TEMPERATURE: Final = 288.15
"""Temperature of the standard atmosphere at sea level [StandardAtmosphere1976]. [K]"""

WARM_SEA_LEVEL_TEMPERATURE: Final = 300.0
"""Temperature at sea level by the habit of warm sites [AtmospherePractice]. [K]"""

LAPSE_RATE: Final = 0.0065
"""Fall of temperature with height below 11 km [StandardAtmosphere1976]. [K/m]"""

DRY_AIR_GAS_CONSTANT: Final = 287.05287
"""Gas constant of dry air [StandardAtmosphere1976]. [J/(kg K)]"""

ROUNDED_GAS_CONSTANT: Final = 287.0
"""Gas constant of dry air as the trade rounds it [AtmospherePractice]. [J/(kg K)]"""

EARTH_RADIUS: Final = 6356766.0
"""Radius that ties geopotential height to altitude [StandardAtmosphere1976]. [m]"""

HEIGHT: Final = LimitOfUse(
    quantity="height",
    low=-5000.0,
    high=10000.0,
    unit="m",
    note="one lapse rate holds up to about 10 km [AtmospherePractice]; above it there is no answer here",
)
SEA_LEVEL_PRESSURE: Final = LimitOfUse(
    quantity="sea_level_pressure",
    low=90000.0,
    high=106000.0,
    unit="Pa",
    note="from memory, to be confirmed: records are near 870 and 1085 hPa",
)


def geopotential_height(altitude: FloatArray) -> FloatArray:
    """Geopotential height of an altitude [StandardAtmosphere1976].

    Parameters
    ----------
    altitude
        Geometric altitude above sea level z, shape (n,). [m]

    Returns
    -------
    FloatArray
        Geopotential height H, shape (n,). [m]

    Raises
    ------
    OutsideFormulaError
        An altitude that no place has.

    Notes
    -----
    H = r z / (r + z), r = 6 356 766 m. Taking one for the other costs 1.7 Pa at 1 km and 64 Pa at 10 km.

    Examples
    --------
    >>> geopotential_height(np.array([1000.0, 10000.0])).round(3)
    array([ 999.843, 9984.293])
    """
    refuse_unless(altitude > -EARTH_RADIUS, "altitude", "must be a number above the centre of the earth")
    return np.asarray(EARTH_RADIUS * altitude / (EARTH_RADIUS + altitude), dtype=np.float64)


def geometric_altitude(height: FloatArray) -> FloatArray:
    """Altitude z of a geopotential height H, both of shape (n,) and in metres [StandardAtmosphere1976].

    Raises
    ------
    OutsideFormulaError
        A height that no altitude has.

    Notes
    -----
    z = r H / (r − H), r = 6 356 766 m, the reverse of `geopotential_height`.

    Examples
    --------
    >>> geometric_altitude(np.array([10000.0])).round(3)
    array([10015.756])
    """
    refuse_unless(height < EARTH_RADIUS, "height", "must be a number below the radius of the earth")
    return np.asarray(EARTH_RADIUS * height / (EARTH_RADIUS - height), dtype=np.float64)


def temperature_at(
    height: FloatArray,
    sea_level_temperature: FloatArray | float = STANDARD_SEA_LEVEL_TEMPERATURE,
    lapse_rate: float = LAPSE_RATE,
) -> FloatArray:
    """Temperature of the air at a height, falling evenly from sea level [StandardAtmosphere1976].

    Parameters
    ----------
    height
        Geopotential height H, shape (n,). [m]
    sea_level_temperature
        Temperature at sea level T₀, shape (n,) or one number. [K]
    lapse_rate
        Fall of temperature with height λ. [K/m]

    Returns
    -------
    FloatArray
        Temperature T = T₀ − λ H, shape (n,). [K]

    Raises
    ------
    OutsideFormulaError
        A height outside `HEIGHT`, a lapse rate that is not positive, or air at absolute zero.

    Examples
    --------
    >>> temperature_at(np.array([1000.0]))
    array([281.65])
    """
    refuse_unless(~outside(height, HEIGHT), "height", "must lie between −5000 m and 10 000 m above sea level")
    refuse_unless(np.asarray(lapse_rate > 0), "lapse_rate", "must be above zero")
    temperature = np.asarray(sea_level_temperature - lapse_rate * height, dtype=np.float64)
    refuse_unless(temperature > 0, "sea_level_temperature", "must leave the air above absolute zero")
    return temperature


def pressure_ratio(
    from_height: FloatArray,
    to_height: FloatArray,
    sea_level_temperature: FloatArray | float = STANDARD_SEA_LEVEL_TEMPERATURE,
    *,
    lapse_rate: float = LAPSE_RATE,
    gas_constant: float = DRY_AIR_GAS_CONSTANT,
) -> FloatArray:
    """Pressure of still air at one height over that at another [StandardAtmosphere1976].

    Parameters
    ----------
    from_height
        Geopotential height H₁ where the pressure is known, shape (n,). [m]
    to_height
        Geopotential height H₂ where it is wanted, shape (n,). [m]
    sea_level_temperature
        Temperature at sea level T₀, shape (n,) or one number; the standard 288.15 K unless given. [K]
    lapse_rate
        Fall of temperature with height λ. [K/m]
    gas_constant
        Gas constant of the air R. [J/(kg K)]

    Returns
    -------
    FloatArray
        p₂ / p₁, shape (n,). [–]

    Raises
    ------
    OutsideFormulaError
        A height outside `HEIGHT`, a lapse rate or gas constant that is not positive, or air at absolute zero.

    Notes
    -----
    p₂/p₁ = (T₂/T₁)ⁿ, n = g/(R λ) = 5.25588, T = T₀ − λ H; `HEIGHT`. It solves dp/dH = −ρ g with ρ = p/(R T).
    Heights are geopotential, `geopotential_height`. A lapse rate of g/R gives air of constant density, one
    close to zero air of constant temperature.

    Examples
    --------
    >>> pressure_ratio(np.array([250.0]), np.array([10.0])).round(10)
    array([1.02894941])
    """
    refuse_unless(np.asarray(gas_constant > 0), "gas_constant", "must be above zero")
    known = temperature_at(from_height, sea_level_temperature, lapse_rate)
    wanted = temperature_at(to_height, sea_level_temperature, lapse_rate)
    return np.asarray((wanted / known) ** (STANDARD_GRAVITY / (gas_constant * lapse_rate)), dtype=np.float64)


def station_pressure(
    sea_level_pressure: FloatArray,
    height: FloatArray,
    sea_level_temperature: FloatArray | float = STANDARD_SEA_LEVEL_TEMPERATURE,
) -> FloatArray:
    """Pressure where the station stands, from the pressure at sea level [StandardAtmosphere1976].

    Parameters
    ----------
    sea_level_pressure
        Pressure reduced to sea level p₀, shape (n,). [Pa]
    height
        Geopotential height of the station H, shape (n,). [m]
    sea_level_temperature
        Temperature at sea level T₀, shape (n,) or one number. [K]

    Returns
    -------
    FloatArray
        Station pressure p, shape (n,). [Pa]

    Raises
    ------
    OutsideFormulaError
        A pressure that is not positive; a height outside `HEIGHT`.

    Notes
    -----
    p = p₀ (T/T₀)ⁿ, as `pressure_ratio`. A service may have reduced with a temperature of its own; an
    altimeter setting is reduced with the standard atmosphere.

    Examples
    --------
    >>> station_pressure(np.array([101325.0]), np.array([1609.344])).round(3)
    array([83427.577])
    """
    refuse_unless(sea_level_pressure > 0, "sea_level_pressure", "must be above zero")
    return np.asarray(
        sea_level_pressure * pressure_ratio(np.zeros_like(height), height, sea_level_temperature),
        dtype=np.float64,
    )


def sea_level_pressure(
    station: FloatArray,
    height: FloatArray,
    sea_level_temperature: FloatArray | float = STANDARD_SEA_LEVEL_TEMPERATURE,
) -> FloatArray:
    """Pressure carried down to sea level, shape (n,), from that at a station. [Pa] [StandardAtmosphere1976].

    Parameters, refusals and limits are those of `station_pressure`, which this reverses.

    Notes
    -----
    p₀ = p (T₀/T)ⁿ.

    Examples
    --------
    >>> sea_level_pressure(np.array([83427.577]), np.array([1609.344])).round(2)
    array([101325.])
    """
    refuse_unless(station > 0, "station", "must be above zero")
    return np.asarray(
        station * pressure_ratio(height, np.zeros_like(height), sea_level_temperature), dtype=np.float64
    )


def air_density(
    pressure: FloatArray, temperature: FloatArray, gas_constant: float = DRY_AIR_GAS_CONSTANT
) -> FloatArray:
    """Density of dry air by the gas law [StandardAtmosphere1976].

    Parameters
    ----------
    pressure
        Absolute pressure p, shape (n,). [Pa]
    temperature
        Temperature T, shape (n,). [K]
    gas_constant
        Gas constant R; the trade's rounded figure is `ROUNDED_GAS_CONSTANT`. [J/(kg K)]

    Returns
    -------
    FloatArray
        Density ρ, shape (n,). [kg/m³]

    Raises
    ------
    OutsideFormulaError
        A pressure, temperature or gas constant that is not positive.

    Notes
    -----
    ρ = p/(R T), dry air; air half saturated at 20 °C is 0.4 % lighter.

    Examples
    --------
    >>> air_density(np.array([101325.0]), np.array([288.15])).round(4)
    array([1.225])
    """
    refuse_unless(pressure > 0, "pressure", "must be above zero")
    refuse_unless(temperature > 0, "temperature", "must be above absolute zero")
    refuse_unless(np.asarray(gas_constant > 0), "gas_constant", "must be above zero")
    return np.asarray(pressure / (gas_constant * temperature), dtype=np.float64)
