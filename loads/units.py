"""The trade's units: a closed list, each with its kind and its factor to SI. The only module that knows pint.

A person's text never reaches pint: it is read as a number and one unit of this list, and pint is asked
for the factor of an expression that stands here.
"""

from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal
from functools import cache
from typing import TypeVar

import pint

from loads.arrays import FloatArray

Number = TypeVar("Number", float, FloatArray)

_EXPRESSIONS: dict[str, dict[str, str]] = {
    "length": {"ft": "foot", "in": "inch", "m": "meter", "cm": "centimeter", "mm": "millimeter"},
    "pressure": {
        "psf": "lbf/foot**2",
        "lb/ft2": "lbf/foot**2",
        "psi": "psi",
        "ksf": "kip/foot**2",
        "ksi": "ksi",
        "kPa": "kilopascal",
        "Pa": "pascal",
        "MPa": "megapascal",
        "kN/m2": "kilonewton/meter**2",
        "hPa": "hectopascal",
        "mbar": "millibar",
        "mb": "millibar",
        "bar": "bar",
        "inHg": "inch_Hg",
        "mmHg": "millimeter_Hg",
        "inH2O": "inch_H2O",
        "ftH2O": "foot_H2O",
        "cmH2O": "centimeter_H2O",
        "mH2O": "centimeter_H2O*meter/centimeter",
    },
    "unit weight": {
        "pcf": "lbf/foot**3",
        "lb/ft3": "lbf/foot**3",
        "kN/m3": "kilonewton/meter**3",
        "N/m3": "newton/meter**3",
    },
    "force": {"lb": "lbf", "lbf": "lbf", "kip": "kip", "N": "newton", "kN": "kilonewton", "MN": "meganewton"},
    "line load": {
        "lb/ft": "lbf/foot",
        "plf": "lbf/foot",
        "klf": "kip/foot",
        "kN/m": "kilonewton/meter",
        "N/m": "newton/meter",
        "lb/in": "lbf/inch",
        "N/mm": "newton/millimeter",
    },
    "moment": {
        "lb·ft": "lbf*foot",
        "ft·lbf": "lbf*foot",
        "ft-lb": "lbf*foot",
        "lb-ft": "lbf*foot",
        "kip·ft": "kip*foot",
        "kip-ft": "kip*foot",
        "N·m": "newton*meter",
        "N-m": "newton*meter",
        "kN·m": "kilonewton*meter",
        "kN-m": "kilonewton*meter",
        "kNm": "kilonewton*meter",
        "lb·in": "lbf*inch",
        "N·mm": "newton*millimeter",
    },
    "moment per length": {"lb·ft/ft": "lbf*foot/foot", "kN·m/m": "kilonewton*meter/meter", "N·m/m": "newton"},
    "angle": {"deg": "degree", "°": "degree", "rad": "radian"},
    "temperature": {"degF": "degF", "°F": "degF", "degC": "degC", "°C": "degC", "K": "kelvin"},
    "density": {"kg/m3": "kilogram/meter**3", "g/L": "gram/liter", "mg/L": "milligram/liter"},
    "speed": {"ft/s": "foot/second", "m/s": "meter/second"},
    "stress": {
        "psi": "psi",
        "ksi": "ksi",
        "psf": "lbf/foot**2",
        "MPa": "megapascal",
        "N/mm2": "newton/millimeter**2",
        "GPa": "gigapascal",
        "kPa": "kilopascal",
    },
    "area": {
        "in2": "inch**2",
        "ft2": "foot**2",
        "mm2": "millimeter**2",
        "cm2": "centimeter**2",
        "m2": "meter**2",
    },
    "section modulus": {
        "in3": "inch**3",
        "mm3": "millimeter**3",
        "cm3": "centimeter**3",
        "m3": "meter**3",
    },
    "second moment of area": {
        "in4": "inch**4",
        "mm4": "millimeter**4",
        "cm4": "centimeter**4",
        "m4": "meter**4",
    },
    "weight": {
        "lb": "lbf",
        "lbf": "lbf",
        "kip": "kip",
        "kg": "kilogram*standard_gravity",
        "N": "newton",
        "kN": "kilonewton",
    },
    "duration": {"min": "minute", "h": "hour", "s": "second"},
    "flow": {
        "gpm": "gallon/minute",
        "gal/min": "gallon/minute",
        "cfs": "foot**3/second",
        "ft3/s": "foot**3/second",
        "L/s": "liter/second",
        "L/min": "liter/minute",
        "L/h": "liter/hour",
        "m3/s": "meter**3/second",
        "m3/h": "meter**3/hour",
    },
    "flow per length": {
        "gpm/ft": "gallon/minute/foot",
        "gal/min/ft": "gallon/minute/foot",
        "gph/ft": "gallon/hour/foot",
        "L/s/m": "liter/second/meter",
        "L/min/m": "liter/minute/meter",
        "L/h/m": "liter/hour/meter",
    },
}

SI_UNITS = {
    "length": "m",
    "pressure": "Pa",
    "unit weight": "N/m³",
    "force": "N",
    "line load": "N/m",
    "moment": "N·m",
    "moment per length": "N·m/m",
    "angle": "rad",
    "temperature": "K",
    "density": "kg/m³",
    "speed": "m/s",
    "stress": "Pa",
    "area": "m²",
    "section modulus": "m³",
    "second moment of area": "m⁴",
    "weight": "N",
    "duration": "s",
    "flow": "m³/s",
    "flow per length": "m²/s",
    "number": "",
    "deflection": "m",
    "section second moment": "m⁴",
    "section area": "m²",
    "part length": "m",
    "part force": "N",
    "part line load": "N/m",
    "part moment": "N·m",
}
"""Unit in which each kind is computed and printed as JSON."""

EXAMPLES = {
    "length": "9 in",
    "pressure": "400 psf",
    "unit weight": "110 pcf",
    "force": "12 kip",
    "line load": "900 lb/ft",
    "moment": "30 kip·ft",
    "moment per length": "2200 lb·ft/ft",
    "angle": "28 deg",
    "temperature": "50 degF",
    "density": "100 kg/m3",
    "speed": "5 ft/s",
    "stress": "19.5 ksi",
    "area": "4.5 in2",
    "section modulus": "12 in3",
    "second moment of area": "30 in4",
    "weight": "60 lb",
    "duration": "5 min",
    "flow": "20 gpm",
    "flow per length": "0.5 L/h/m",
}
"""What a value of each kind may look like, for messages and forms."""


@dataclass(frozen=True, kw_only=True)
class Unit:
    """One unit: SI value = (typed value) · factor + offset."""

    symbol: str
    kind: str
    factor: float
    offset: float = 0.0


@cache
def _registry() -> pint.UnitRegistry:  # type: ignore[type-arg]
    return pint.UnitRegistry(autoconvert_offset_to_baseunit=True, non_int_type=Decimal)


def _unit(symbol: str, kind: str, expression: str) -> Unit:
    registry = _registry()
    if kind == "temperature":
        at_zero = registry.Quantity(Decimal(0), expression).to("kelvin").magnitude
        per_degree = registry.Quantity(
            Decimal(1), "delta_" + expression if expression != "kelvin" else expression
        )
        return Unit(
            symbol=symbol,
            kind=kind,
            factor=float(per_degree.to("kelvin").magnitude),
            offset=float(at_zero),
        )
    return Unit(
        symbol=symbol,
        kind=kind,
        factor=float(registry.Quantity(Decimal(1), expression).to_base_units().magnitude),
    )


@cache
def units_of(kind: str) -> dict[str, Unit]:
    """Units accepted for a kind, by the symbol a person types.

    Parameters
    ----------
    kind
        One of the keys of `EXAMPLES`, for example "length".

    Returns
    -------
    dict of str to Unit
        In the order in which a message lists them.

    Raises
    ------
    KeyError
        The kind is unknown.

    Examples
    --------
    >>> units_of("length")["ft"].factor
    0.3048
    """
    return {symbol: _unit(symbol, kind, text) for symbol, text in _EXPRESSIONS[kind].items()}


@cache
def kinds_of(symbol: str) -> tuple[str, ...]:
    """Kinds that a unit symbol can belong to, empty when the symbol is unknown.

    Examples
    --------
    >>> kinds_of("pcf")
    ('unit weight',)
    """
    return tuple(kind for kind, symbols in _EXPRESSIONS.items() if symbol in symbols)


def to_si(value: Number, symbol: str, kind: str) -> Number:
    """Value in the SI base unit of its kind.

    Parameters
    ----------
    value
        Number or array in the unit `symbol`.
    symbol
        A unit of the closed list.
    kind
        Kind of quantity the unit belongs to.

    Examples
    --------
    >>> round(to_si(62.4, "pcf", "unit weight"), 6)
    9802.257744
    """
    unit = units_of(kind)[symbol]
    return value * unit.factor + unit.offset


def from_si(value: Number, symbol: str, kind: str) -> Number:
    """Value in the unit `symbol`, from the SI base unit of its kind.

    Examples
    --------
    >>> round(from_si(9802.257744003, "pcf", "unit weight"), 9)
    62.4
    """
    unit = units_of(kind)[symbol]
    return (value - unit.offset) / unit.factor
