"""Real records of sealed loggers and their barometer, from an installed package that carries such files."""

from __future__ import annotations

import importlib.util
import re
from pathlib import Path

import numpy as np
import pytest

from loads.arrays import FloatArray
from loads.reading import LevelReading, level_of
from loads.reading_links import Series
from loads.records.reading import Reading
from tests.agreement import Agree

SPEC = importlib.util.find_spec("gensor")
pytestmark = pytest.mark.skipif(
    SPEC is None, reason="package gensor, which carries the records, is not installed"
)

CM_OF_WATER = 98.0665
BAROMETER = "Barodiver_220427183008_BY222.csv"
WELLS = {"PB01A": "PB01A_moni_AV319_220427183019_AV319.csv", "PB02A": "PB02A_plain.csv"}
EXPECTED = {
    "PB01A": {"n": 15222, "first": 210.175, "max": 309.758, "min": -1.333, "mean": 229.8007477},
    "PB02A": {"n": 14003, "first": 299.658, "max": 382.000, "min": -1.742, "mean": 307.6177785},
}
"""Pressure over the barometer's, cm of water, as read and subtracted by other means."""


def rows(name: str) -> dict[str, tuple[float, float]]:
    """Pressure in cm of water and temperature in °C by time, as the logger wrote them."""
    assert SPEC is not None
    assert SPEC.submodule_search_locations is not None
    path = Path(SPEC.submodule_search_locations[0]) / "testdata" / name
    found = {}
    for text in path.read_text("latin-1").splitlines():
        if re.match(r"\d{4}/", text):
            moment, pressure, temperature = text.split(",")
            found[moment] = float(pressure), float(temperature)
    return found


def series(well: str) -> tuple[FloatArray, Series]:
    """Difference of the two instruments in cm of water, and the same hours as a series."""
    logger, barometer = rows(WELLS[well]), rows(BAROMETER)
    table = np.array([(*logger[hour], barometer[hour][0]) for hour in logger if hour in barometer])
    return table[:, 0] - table[:, 2], Series(
        shown=table[:, 0] * CM_OF_WATER, barometer=table[:, 2] * CM_OF_WATER, temperature=table[:, 1] + 273.15
    )


def levels(many: Series) -> LevelReading:
    reading = {
        "id": "well",
        "kind": "sealed logger",
        "sensor_elevation": "0 m",
        "pressure": {"value": "1200 cmH2O", "low": "1199.5 cmH2O", "high": "1200.5 cmH2O"},
        "barometer": {"value": "1030 cmH2O", "low": "1029.5 cmH2O", "high": "1030.5 cmH2O"},
        "site_altitude": "20 m",
        "fluid": "fresh",
    }
    return level_of(Reading.model_validate(reading), many)


@pytest.mark.parametrize("well", WELLS)
def test_head_of_every_hour(agree: Agree, well: str) -> None:
    difference, many = series(well)
    found, expected = levels(many), EXPECTED[well]
    links = {link.name: link.value for link in found.links}
    pressure = links["water_pressure"] / CM_OF_WATER
    assert len(pressure) == expected["n"]
    agree(pressure[0], expected["first"], abs=5e-4, what="first, cm of water")
    agree(pressure.max(), expected["max"], abs=5e-4, what="highest, cm of water")
    agree(pressure.min(), expected["min"], abs=5e-4, what="lowest, cm of water")
    agree(pressure.mean(), expected["mean"], abs=5e-8, what="mean, cm of water")
    np.testing.assert_allclose(pressure, difference, atol=1e-9)
    np.testing.assert_allclose(found.head, difference * 10 / links["density"], atol=1e-9)


@pytest.mark.parametrize("well", WELLS)
def test_hours_out_of_the_water_have_no_level(well: str) -> None:
    difference, many = series(well)
    found = levels(many)
    np.testing.assert_array_equal(found.dry, difference <= 0)
    assert found.dry.any()
    assert np.isnan(found.level[found.dry]).all()
    assert np.isfinite(found.level[~found.dry]).all()
    assert any(f"dry in {found.dry.sum()} of {len(difference)} readings" in text for text in found.remarks)
    wet = ~found.dry & ~found.may_be_dry
    np.testing.assert_allclose((found.worst.high - found.worst.low)[wet], 0.02, rtol=3e-3)
    np.testing.assert_allclose((found.quadrature.high - found.quadrature.low)[wet], 0.02 / 2**0.5, rtol=3e-3)


def test_taking_the_air_off_steadies_the_record(agree: Agree) -> None:
    _, many = series("PB01A")
    assert many.shown is not None
    agree(
        float(np.std(many.shown / CM_OF_WATER, ddof=1)), 39.786, abs=5e-4, what="as the logger shows it, cm"
    )
    pressure = {link.name: link.value for link in levels(many).links}["water_pressure"] / CM_OF_WATER
    agree(float(np.std(pressure, ddof=1)), 36.523, abs=5e-4, what="with the air taken off, cm")
