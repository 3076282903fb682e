"""Density of fresh, sea and muddy water at one atmosphere, and the unit weights the trade agrees on.

Temperatures are kelvin on the present scale (ITS-90). The published polynomials are in degrees Celsius of
the 1968 scale; the step between them is t68 = 1.00024 t90 [Saunders1990].
"""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.polynomial.polynomial import polyval

from loads.arrays import FloatArray
from loads.limits_of_use import LimitOfUse, refuse_unless

STANDARD_GRAVITY: Final = 9.80665
"""Standard acceleration of gravity [CGPM1901]. [m/s²]"""

_POUND_FORCE_PER_CUBIC_FOOT: Final = 0.45359237 * STANDARD_GRAVITY / 0.3048**3

CONVENTIONAL_FRESH_UNIT_WEIGHT: Final = 62.4 * _POUND_FORCE_PER_CUBIC_FOOT
"""Unit weight of fresh water by trade convention, 62.4 lb/ft³ [FreshUnitWeight]. [N/m³]"""

CONVENTIONAL_SEA_UNIT_WEIGHT: Final = 64.0 * _POUND_FORCE_PER_CUBIC_FOOT
"""Unit weight of salt water by convention, 64.0 lb/ft³ [FEMAP55]. [N/m³]"""

QUARTZ_DENSITY: Final = 2650.0
"""Usual density of mineral grains [SuspensionBalance]. [kg/m³]"""

_ICE_POINT: Final = 273.15
_SCALE_1968_PER_1990: Final = 1.00024

FRESH_WATER_TEMPERATURE: Final = LimitOfUse(
    quantity="temperature",
    low=273.15,
    high=373.15,
    unit="K",
    note="Kell's equation, used for liquid water at one atmosphere only",
)
SEA_WATER_TEMPERATURE: Final = LimitOfUse(
    quantity="temperature",
    low=271.15,
    high=313.15,
    unit="K",
    note="one-atmosphere equation of state of sea water",
)
SEA_WATER_SALINITY: Final = LimitOfUse(
    quantity="practical_salinity",
    low=0.0,
    high=42.0,
    unit="–",
    note="one-atmosphere equation of state of sea water",
)
SUSPENDED_SEDIMENT: Final = LimitOfUse(
    quantity="concentration",
    low=0.0,
    high=400.0,
    unit="kg/m³",
    note="from memory, to be confirmed: a denser suspension stands as mud, not as a liquid",
)

_KELL_NUMERATOR: Final = (
    999.83952,
    16.945176,
    -7.9870401e-3,
    -46.170461e-6,
    105.56302e-9,
    -280.54253e-12,
)
_KELL_DENOMINATOR: Final = 16.879850e-3

_PURE_WATER: Final = (999.842594, 6.793952e-2, -9.095290e-3, 1.001685e-4, -1.120083e-6, 6.536332e-9)
_SALINITY: Final = (8.24493e-1, -4.0899e-3, 7.6438e-5, -8.2467e-7, 5.3875e-9)
_SALINITY_THREE_HALVES: Final = (-5.72466e-3, 1.0227e-4, -1.6546e-6)
_SALINITY_SQUARED: Final = 4.8314e-4


def _celsius_1968(temperature: FloatArray) -> FloatArray:
    refuse_unless(temperature > 0, "temperature", "must be above absolute zero")
    return _SCALE_1968_PER_1990 * (temperature - _ICE_POINT)


def fresh_water_density(temperature: FloatArray) -> FloatArray:
    """Density of air-free fresh water at one atmosphere [Kell1975].

    Parameters
    ----------
    temperature
        Temperature T, shape (n,). [K]

    Returns
    -------
    FloatArray
        Density ρ, shape (n,). [kg/m³]

    Raises
    ------
    OutsideFormulaError
        A temperature not above absolute zero.

    Notes
    -----
    ρ = (999.83952 + 16.945176 t − 7.9870401·10⁻³ t² − 46.170461·10⁻⁶ t³ + 105.56302·10⁻⁹ t⁴
    − 280.54253·10⁻¹² t⁵) / (1 + 16.879850·10⁻³ t), t in °C of the 1968 scale; `FRESH_WATER_TEMPERATURE`.
    Quotations with 16.897850·10⁻³ in the denominator have two digits swapped and are 0.27 kg/m³ low at 20 °C.
    The equation is 0.003 kg/m³ below present reference values, whose greatest density is 999.975 kg/m³
    where Kell's is 999.972.

    Examples
    --------
    >>> fresh_water_density(np.array([277.15, 293.15])).round(2)
    array([999.97, 998.2 ])
    """
    t = _celsius_1968(temperature)
    return np.asarray(polyval(t, _KELL_NUMERATOR) / (1 + _KELL_DENOMINATOR * t), dtype=np.float64)


def sea_water_density(temperature: FloatArray, practical_salinity: FloatArray) -> FloatArray:
    """Density of sea and brackish water at one atmosphere [MilleroPoisson1981].

    The one-atmosphere part of the 1980 equation of state, as given with check values in [UNESCO44].

    Parameters
    ----------
    temperature
        Temperature T, shape (n,). [K]
    practical_salinity
        Practical salinity S (1978 scale), shape (n,). [–]

    Returns
    -------
    FloatArray
        Density ρ, shape (n,). [kg/m³]

    Raises
    ------
    OutsideFormulaError
        A temperature not above absolute zero, or a negative salinity.

    Notes
    -----
    ρ = ρ₀(t) + A(t) S + B(t) S³ᐟ² + C S², t in °C of the 1968 scale; `SEA_WATER_TEMPERATURE`,
    `SEA_WATER_SALINITY`. S is the practical salinity, not grams of salt per kilogram, which are half a
    percent more.

    Examples
    --------
    >>> sea_water_density(np.array([288.15]), np.array([35.0])).round(2)
    array([1025.97])
    """
    t = _celsius_1968(temperature)
    S = practical_salinity
    refuse_unless(S >= 0, "practical_salinity", "must not be negative")
    return np.asarray(
        polyval(t, _PURE_WATER)
        + polyval(t, _SALINITY) * S
        + polyval(t, _SALINITY_THREE_HALVES) * S * np.sqrt(S)
        + _SALINITY_SQUARED * S**2,
        dtype=np.float64,
    )


def muddy_water_density(
    water_density: FloatArray, concentration: FloatArray, grain_density: float = QUARTZ_DENSITY
) -> FloatArray:
    """Density of water that carries suspended sediment [SuspensionBalance].

    Balance of mass and volume; the sediment is taken as kept in suspension, the mixture as a liquid.

    Parameters
    ----------
    water_density
        Density of the clear water ρ_w, shape (n,). [kg/m³]
    concentration
        Dry mass of sediment in unit volume of mixture C, shape (n,). [kg/m³]
    grain_density
        Density of the grains ρ_s. [kg/m³]

    Returns
    -------
    FloatArray
        Density of the mixture ρ, shape (n,). [kg/m³]

    Raises
    ------
    OutsideFormulaError
        A density that is not positive, or a concentration that is negative or more than solid grain.

    Notes
    -----
    ρ = ρ_w + C (1 − ρ_w/ρ_s); `SUSPENDED_SEDIMENT`.

    Examples
    --------
    >>> muddy_water_density(np.array([1000.0]), np.array([53.0]))
    array([1033.])
    """
    refuse_unless(water_density > 0, "water_density", "must be above zero")
    refuse_unless(np.asarray(grain_density > 0), "grain_density", "must be above zero")
    refuse_unless(concentration >= 0, "concentration", "must not be negative")
    refuse_unless(concentration <= grain_density, "concentration", "must not exceed grain_density")
    return np.asarray(water_density + concentration * (1 - water_density / grain_density), dtype=np.float64)
