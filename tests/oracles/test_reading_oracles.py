"""Readings against figures worked with open libraries of the density of water and of the atmosphere."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
from chemicals import iapws95_rho

from loads.atmosphere import pressure_ratio
from loads.reading import LevelReading, level_of
from loads.records.reading import Reading
from tests.agreement import Agree

FOOT = 0.3048
BETWEEN_FORMULAS = 5e-6
"""Share by which Kell's density of water, and a head with it, differs from IAPWS-95 below 20 °C."""


def level(kind: str, **fields: Any) -> LevelReading:
    """Level of a reading whose sensor stands at zero."""
    return level_of(Reading.model_validate({"id": "R1", "kind": kind, "sensor_elevation": "0 m", **fields}))


def fresh(celsius: float) -> dict[str, str]:
    return {"fluid": "fresh", "temperature": f"{celsius} degC"}


def agree_head(agree: Agree, found: LevelReading, expected: float, celsius: float) -> None:
    """Hold a head against one by IAPWS-95, as it is and with the difference of densities taken out."""
    agree(found.head, expected, rel=BETWEEN_FORMULAS, what="head, m")
    density = {link.name: link for link in found.links}["density"].value
    agree(found.head * density / water_density(celsius), expected, rel=1e-9, what="head by its density, m")


def water_density(celsius: float) -> float:
    return float(iapws95_rho(celsius + 273.15, 101325.0))  # type: ignore[no-untyped-call]


@pytest.mark.source("IAPWS95", "published; 12.500 kPa over water of 10 °C")
def test_vented_logger(agree: Agree) -> None:
    found = level("vented logger", pressure="12.500 kPa", **fresh(10))
    agree_head(agree, found, 1.275024624, 10)
    weightless = level("vented logger", pressure="12.500 kPa", unit_weight="9806.65 N/m3")
    agree(weightless.head, 1.274645266, abs=5e-10, what="head in water of 1000 kg/m³, m")


@pytest.mark.source("IAPWS95", "published; 115.000 kPa absolute, barometer 100.500 kPa, water of 15 °C")
def test_sealed_logger(agree: Agree) -> None:
    found = level("sealed logger", pressure="115.000 kPa", barometer="100.500 kPa", **fresh(15))
    agree_head(agree, found, 1.479916554, 15)


@pytest.mark.source("IAPWS95", "published; 34.10 less 29.92 inches of conventional mercury, water of 15 °C")
def test_sealed_logger_in_inches_of_mercury(agree: Agree) -> None:
    found = level("sealed logger", pressure="34.10 inHg", barometer="29.92 inHg", **fresh(15))
    pressure = {link.name: link for link in found.links}["water_pressure"].value
    agree(pressure, 14155.104517, abs=5e-7, what="pressure of the water, Pa")
    agree_head(agree, found, 1.444715414, 15)
    agree(found.head / FOOT, 4.739879967, rel=BETWEEN_FORMULAS, what="head, ft")


BAROMETER_ABOVE = {
    "pressure": "118.000 kPa",
    "barometer": "98.000 kPa",
    "barometer_altitude": "250 m",
    "site_altitude": "10 m",
    "temperature": "10 degC",
    "fluid": "fresh",
}


@pytest.mark.source("StandardAtmosphere1976", "published; barometer 240 m above the logger, water of 10 °C")
def test_barometer_at_another_altitude(agree: Agree) -> None:
    ratio = pressure_ratio(np.array([250.0]), np.array([10.0]))
    agree(ratio, 1.0289494058, abs=5e-11, what="ratio of pressures, heights as geopotential")
    agree(98000 * ratio, 100837.041773, abs=5e-7, what="air pressure at the logger, Pa")
    found = level("sealed logger", **BAROMETER_ABOVE)
    air = {link.name: link for link in found.links}["air_pressure"].value
    agree(air, 100837.041773, abs=0.13, what="air pressure, altitudes taken as geometric, Pa")
    agree(found.head, 1.750655549, abs=0.00002, what="head, altitudes taken as geometric, m")
    assert abs(found.head.item() - 1.750655549) > 1e-6
    uncorrected = {key: value for key, value in BAROMETER_ABOVE.items() if not key.endswith("altitude")}
    agree(
        level("sealed logger", **uncorrected).head,
        2.040039398,
        rel=BETWEEN_FORMULAS,
        what="head with the barometer taken to hang at the logger, m",
    )


@pytest.mark.source("IAPWS95", "published; mercury 13595.1 kg/m³ 85 mm apart, water of 20 °C over both legs")
def test_mercury_under_water(agree: Agree) -> None:
    under_water = [
        {"water": True, "rise": "-0.5 m"},
        {"density": "13595.1 kg/m3", "rise": "85 mm"},
        {"water": True, "rise": "415 mm"},
    ]
    found = level("manometer", leg=under_water, **fresh(20))
    pressure = {link.name: link for link in found.links}["water_pressure"].value
    agree(pressure, 10500.332137, rel=BETWEEN_FORMULAS, what="difference of pressure, Pa")
    alone = level("manometer", leg=[{"density": "13595.1 kg/m3", "rise": "85 mm"}], **fresh(20))
    pressure = {link.name: link for link in alone.links}["water_pressure"].value
    agree(pressure, 11332.402930, abs=5e-7, what="mercury alone, Pa")


@pytest.mark.source("SignRule", "common practice, no source; oil of 827 kg/m³, 0.180 m along a tube at 25°")
def test_inclined_tube(agree: Agree) -> None:
    tube = [{"density": "827 kg/m3", "length": "0.180 m", "inclination": "25 deg"}]
    found = level("manometer", leg=tube, **fresh(20))
    pressure = {link.name: link for link in found.links}["water_pressure"].value
    agree(pressure, 616.945711, abs=5e-7, what="pressure, Pa")


@pytest.mark.source("IAPWS95", "published; 210.175 cmH2O, water of 12.103 °C")
def test_centimetres_of_water(agree: Agree) -> None:
    found = level("vented logger", pressure="210.175 cmH2O", **fresh(12.103))
    agree(water_density(12.103), 999.488538, rel=1e-9, what="library against its own figure, kg/m³")
    agree_head(agree, found, 2.102825516, 12.103)


GAS = {"pressure": "0 kPa", "instrument_elevation": "10 m", "gas_density": "1.225 kg/m3"}


@pytest.mark.source("InstrumentPractice", "common practice, no source; 10 m of gas of 1.225 kg/m³")
def test_gas_in_the_line(agree: Agree) -> None:
    found = level("bubbler", air_density="0 kg/m3", unit_weight="9806.65 N/m3", **GAS)
    links = {link.name: link.value for link in found.links}
    agree(links["gas_column"], 120.131, abs=5e-4, what="weight of the gas, Pa")
    agree(found.head * 1000, 12.25, abs=5e-3, what="head it stands for, mm")
    balanced = level("bubbler", air_density="1.225 kg/m3", **GAS)
    agree(balanced.head, 0.0, abs=1e-12, what="head with as much air outside, m")
