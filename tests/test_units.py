"""Factors of the units against exact fractions and against another library."""

from __future__ import annotations

from fractions import Fraction

import numpy as np
import pytest
import scipy.constants
from hypothesis import given
from hypothesis import strategies as st

from loads.units import EXAMPLES, SI_UNITS, from_si, kinds_of, to_si, units_of

POUND = Fraction("0.45359237") * Fraction("9.80665")
FOOT = Fraction("0.3048")
GALLON = 231 * (FOOT / 12) ** 3
WATER = 1000 * Fraction("9.80665")
MERCURY = Fraction("13.5951") * WATER
EXACT: dict[tuple[str, str], Fraction] = {
    ("length", "ft"): FOOT,
    ("length", "in"): FOOT / 12,
    ("length", "cm"): Fraction(1, 100),
    ("length", "mm"): Fraction(1, 1000),
    ("pressure", "psf"): POUND / FOOT**2,
    ("pressure", "lb/ft2"): POUND / FOOT**2,
    ("pressure", "psi"): POUND / (FOOT / 12) ** 2,
    ("pressure", "ksf"): 1000 * POUND / FOOT**2,
    ("pressure", "ksi"): 1000 * POUND / (FOOT / 12) ** 2,
    ("pressure", "kPa"): Fraction(1000),
    ("pressure", "MPa"): Fraction(10**6),
    ("pressure", "kN/m2"): Fraction(1000),
    ("pressure", "hPa"): Fraction(100),
    ("pressure", "mbar"): Fraction(100),
    ("pressure", "mb"): Fraction(100),
    ("pressure", "bar"): Fraction(10**5),
    ("pressure", "inHg"): MERCURY * FOOT / 12,
    ("pressure", "mmHg"): MERCURY / 1000,
    ("pressure", "inH2O"): WATER * FOOT / 12,
    ("pressure", "ftH2O"): WATER * FOOT,
    ("pressure", "cmH2O"): WATER / 100,
    ("pressure", "mH2O"): WATER,
    ("unit weight", "pcf"): POUND / FOOT**3,
    ("unit weight", "lb/ft3"): POUND / FOOT**3,
    ("unit weight", "kN/m3"): Fraction(1000),
    ("force", "lb"): POUND,
    ("force", "lbf"): POUND,
    ("force", "kip"): 1000 * POUND,
    ("force", "kN"): Fraction(1000),
    ("force", "MN"): Fraction(10**6),
    ("line load", "lb/ft"): POUND / FOOT,
    ("line load", "plf"): POUND / FOOT,
    ("line load", "klf"): 1000 * POUND / FOOT,
    ("line load", "kN/m"): Fraction(1000),
    ("moment", "lb·ft"): POUND * FOOT,
    ("moment", "ft·lbf"): POUND * FOOT,
    ("moment", "kip·ft"): 1000 * POUND * FOOT,
    ("moment", "kN·m"): Fraction(1000),
    ("moment per length", "lb·ft/ft"): POUND,
    ("moment per length", "kN·m/m"): Fraction(1000),
    ("density", "g/L"): Fraction(1),
    ("density", "mg/L"): Fraction(1, 1000),
    ("speed", "ft/s"): FOOT,
    ("line load", "lb/in"): POUND / (FOOT / 12),
    ("line load", "N/mm"): Fraction(1000),
    ("moment", "lb·in"): POUND * FOOT / 12,
    ("moment", "N·mm"): Fraction(1, 1000),
    ("stress", "psi"): POUND / (FOOT / 12) ** 2,
    ("stress", "ksi"): 1000 * POUND / (FOOT / 12) ** 2,
    ("stress", "MPa"): Fraction(10**6),
    ("stress", "N/mm2"): Fraction(10**6),
    ("stress", "GPa"): Fraction(10**9),
    ("area", "in2"): (FOOT / 12) ** 2,
    ("area", "mm2"): Fraction(1, 10**6),
    ("section modulus", "in3"): (FOOT / 12) ** 3,
    ("section modulus", "cm3"): Fraction(1, 10**6),
    ("second moment of area", "in4"): (FOOT / 12) ** 4,
    ("second moment of area", "cm4"): Fraction(1, 10**8),
    ("weight", "lb"): POUND,
    ("weight", "kg"): Fraction("9.80665"),
    ("duration", "min"): Fraction(60),
    ("flow", "gpm"): GALLON / 60,
    ("flow", "gal/min"): GALLON / 60,
    ("flow", "cfs"): FOOT**3,
    ("flow", "ft3/s"): FOOT**3,
    ("flow", "L/s"): Fraction(1, 1000),
    ("flow", "L/min"): Fraction(1, 60_000),
    ("flow", "L/h"): Fraction(1, 3_600_000),
    ("flow", "m3/s"): Fraction(1),
    ("flow", "m3/h"): Fraction(1, 3600),
    ("flow per length", "gpm/ft"): GALLON / 60 / FOOT,
    ("flow per length", "gal/min/ft"): GALLON / 60 / FOOT,
    ("flow per length", "gph/ft"): GALLON / 3600 / FOOT,
    ("flow per length", "L/s/m"): Fraction(1, 1000),
    ("flow per length", "L/min/m"): Fraction(1, 60_000),
    ("flow per length", "L/h/m"): Fraction(1, 3_600_000),
    ("duration", "h"): Fraction(3600),
}


@pytest.mark.parametrize(("kind", "symbol"), sorted(EXACT))
def test_factor_is_the_exact_fraction(kind: str, symbol: str) -> None:
    assert units_of(kind)[symbol].factor == pytest.approx(float(EXACT[kind, symbol]), rel=4e-16)


@pytest.mark.parametrize(
    ("kind", "symbol", "name"),
    [
        ("length", "ft", "foot"),
        ("length", "in", "inch"),
        ("force", "lbf", "lbf"),
        ("pressure", "psi", "psi"),
        ("angle", "deg", "degree"),
    ],
)
def test_factor_is_that_of_another_library(kind: str, symbol: str, name: str) -> None:
    assert units_of(kind)[symbol].factor == pytest.approx(getattr(scipy.constants, name), rel=4e-16)


@pytest.mark.parametrize(
    ("value", "symbol", "kelvin"),
    [(32, "degF", 273.15), (212, "°F", 373.15), (-40, "degF", 233.15), (-40, "degC", 233.15), (20, "K", 20)],
)
def test_temperatures(value: float, symbol: str, kelvin: float) -> None:
    assert to_si(value, symbol, "temperature") == pytest.approx(kelvin, abs=1e-12)
    converted = scipy.constants.convert_temperature(
        value, {"°F": "F", "degF": "F"}.get(symbol, symbol[-1]), "K"
    )
    assert to_si(value, symbol, "temperature") == pytest.approx(converted, abs=1e-12)


def test_well_known_figures() -> None:
    assert to_si(62.4, "pcf", "unit weight") == pytest.approx(9802.257744, rel=1e-9)
    assert from_si(9806.65, "pcf", "unit weight") == pytest.approx(62.4279606, rel=1e-9)
    assert from_si(9810.0, "pcf", "unit weight") == pytest.approx(62.4492863, rel=1e-9)


SYMBOLS = sorted((kind, symbol) for kind in EXAMPLES for symbol in units_of(kind))


@given(st.sampled_from(SYMBOLS), st.floats(-1e6, 1e6))
def test_there_and_back(unit: tuple[str, str], value: float) -> None:
    kind, symbol = unit
    assert from_si(to_si(value, symbol, kind), symbol, kind) == pytest.approx(value, rel=1e-12, abs=1e-9)
    array = np.array([value, 2 * value])
    np.testing.assert_array_equal(to_si(array, symbol, kind)[:1], to_si(value, symbol, kind))


def test_every_kind_has_its_example_and_its_si_unit() -> None:
    for kind, text in EXAMPLES.items():
        number, symbol = text.split(" ", 1)
        assert float(number) > 0
        assert symbol in units_of(kind)
        assert kind in kinds_of(symbol)
        assert SI_UNITS[kind]
    assert kinds_of("furlong") == ()
    with pytest.raises(KeyError):
        units_of("colour")
